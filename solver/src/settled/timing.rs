//! What the two ways to settled fields take, for whoever changes them:
//! `cargo test --release settled::timing -- --ignored --nocapture`.
#![allow(
    clippy::unwrap_used,
    clippy::print_stdout,
    reason = "tests may stop at the first fault and print what they measured"
)]

use std::time::Instant;

use lenzbore_mesh::{Refinement, Regions};

use super::elimination::Elimination;
use super::elimination::elimination_seconds;
use super::lanczos::{Came, Lanczos};
use super::method::vectors;
use super::plan;
use crate::direct::DirectPlan;
use crate::grid_rules::reynolds_per_speed;
use crate::materials::Materials;
use crate::monitor::Unwatched;
use crate::operators::Operators;
use crate::placement::Placement;
use crate::problem::{Accuracy, Extent, Layer, Mover, Outline, Part, Problem, SnapshotPlan, Travel, Wall};
use crate::sources::{AxialField, Source};

fn problem(thickness: f64, mu_r: f64) -> Problem {
    let layer = Layer {
        name: "tube".to_owned(),
        inner_radius_m: 0.01,
        outer_radius_m: 0.01 * (1.0 + thickness),
        from_m: 0.0,
        to_m: 0.0,
        conductivity_s_per_m: 58e6,
        relative_permeability: mu_r,
    };
    let (outer_radius_m, length_m) = (0.008, 0.008);
    let source = Source::Magnet { inner_radius_m: 0.0, outer_radius_m, length_m, remanence_tesla: 1.2 };
    let outline = Outline { inner_radius_m: 0.0, outer_radius_m, length_m };
    Problem {
        wall: Wall { slots: 0, extent: Extent::Endless, layers: vec![layer] },
        mover: Mover {
            parts: vec![Part { name: "M".to_owned(), centre_m: 0.0, source, outline, coercivity_a_per_m: None }],
            mass_kg: None,
            recoil: None,
        },
        travel: Travel::Steady { velocity_m_per_s: 1.0 },
        accuracy: Accuracy::default(),
        snapshots: SnapshotPlan::None,
        stations: Vec::new(),
        warming: None,
    }
}

#[test]
#[ignore = "a timing"]
fn times() {
    for mu_r in [1.0, 50.0] {
        for thickness in [0.05, 0.2, 1.0] {
            for reynolds in [0.1, 1.0, 10.0, 100.0, 1000.0, 1e4] {
                let problem = problem(thickness, mu_r);
                let v = reynolds / reynolds_per_speed(&problem.wall);
                let plan = plan(&problem, &Placement::new(&problem), v).unwrap();
                for f in [Refinement::COARSEST, Refinement::first(3)[2]] {
                    let grid = plan.grid(f);
                    let materials = Materials::new(&problem.wall, &Regions::new(&grid, &plan.rectangles));
                    let operators = Operators::new(grid, materials);
                    let begin = Instant::now();
                    let mut factor = DirectPlan::new(&operators).unwrap().factor(&operators, 0.0).unwrap();
                    let factoring = begin.elapsed();
                    let z = operators.grid.z.nodes();
                    let slope: Vec<f64> = operators
                        .wall
                        .rows
                        .iter()
                        .flat_map(|row| (row.j..row.j + row.count).map(move |j| (row.i, j)))
                        .map(|(i, j)| {
                            let r = operators.grid.r.nodes()[i];
                            -r * problem.mover.flux_density_r(r, z[j])
                        })
                        .collect();
                    let mut lanczos = Lanczos::new(&operators, &mut factor, &slope);
                    let begin = Instant::now();
                    loop {
                        lanczos.recurrence.make_room();
                        if lanczos.step(v, 3000).unwrap() == Came::ToItsEnd {
                            break;
                        }
                    }
                    let recurring = begin.elapsed().as_secs_f64();
                    let m = lanczos.recurrence.len();
                    let left = lanczos.recurrence.residual(v);
                    let begin = Instant::now();
                    let mut right = vec![0.0; operators.unknowns()];
                    for ((&u, g), q) in operators.wall.unknown.iter().zip(&operators.wall.conductance).zip(&slope) {
                        right[u] = v * g * q;
                    }
                    let (_, residual) = Elimination::new(&operators, v, &Unwatched).unwrap().solve(&right).unwrap();
                    let eliminating = begin.elapsed().as_secs_f64();
                    let (radii, heights) = (operators.grid.nr() - 2, operators.grid.nz() - 2);
                    let forecast = elimination_seconds(&operators).unwrap();
                    println!(
                        "mu {mu_r} w/a {thickness} Re {reynolds} f {}: {} x {} wall {}; factor {factoring:.2?}; {m} vectors ({:.0} expected, residual {left:.0e}) {recurring:.3} s, {:.3} ms each; elimination {eliminating:.3} s = {:.0} vectors (forecast {forecast:.3} s), residual {residual:.1e}",
                        f.factor(),
                        radii,
                        heights,
                        operators.wall.len() / heights,
                        vectors(&problem.wall, v),
                        1e3 * recurring / m as f64,
                        eliminating * m as f64 / recurring
                    );
                }
            }
        }
    }
}

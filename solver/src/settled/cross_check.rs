//! The other way to the settled drag: one sparse LU of K - v C a speed. A cross-check of the recurrence, in tests.
#![allow(
    clippy::unwrap_used,
    clippy::print_stdout,
    reason = "tests may stop at the first fault and print what they measured"
)]

use std::f64::consts::PI;

use lenzbore_mesh::Refinement;
use nalgebra_sparse::factorization::CscCholesky;
use nalgebra_sparse::na::DMatrix;
use nalgebra_sparse::{CooMatrix, CscMatrix};

use super::lanczos::Came;
use super::level::{SettledLevel, Wanted, convect};
use super::plan;
use crate::monitor::Unwatched;
use crate::operators::Operators;
use crate::placement::Placement;
use crate::problem::{Accuracy, Extent, Layer, Mover, Outline, Part, Problem, SnapshotPlan, Travel, Wall};
use crate::sources::{AxialField, Source};
use crate::verification::Unsymmetric;

/// A magnet in a copper tube, with or without a permeable jacket.
fn problem(jacket: Option<f64>) -> Problem {
    let layer = |inner: f64, outer: f64, sigma: f64, mu_r: f64| Layer {
        name: format!("from {inner}"),
        inner_radius_m: inner,
        outer_radius_m: outer,
        from_m: 0.0,
        to_m: 0.0,
        conductivity_s_per_m: sigma,
        relative_permeability: mu_r,
    };
    let mut layers = vec![layer(0.007, 0.0085, 58e6, 1.0)];
    layers.extend(jacket.map(|mu_r| layer(0.0085, 0.0105, 6e6, mu_r)));
    let (outer_radius_m, length_m) = (0.005, 0.008);
    let source = Source::Magnet { inner_radius_m: 0.0, outer_radius_m, length_m, remanence_tesla: 1.2 };
    let outline = Outline { inner_radius_m: 0.0, outer_radius_m, length_m };
    Problem {
        wall: Wall { slots: 0, extent: Extent::Endless, layers },
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

/// A level for one speed.
fn level(problem: &Problem, velocity: f64, refinement: Refinement) -> SettledLevel {
    level_for(problem, &[velocity.abs()], velocity, refinement)
}

fn level_for(problem: &Problem, speeds: &[f64], velocity: f64, refinement: Refinement) -> SettledLevel {
    let plan = plan(problem, &Placement::new(problem), velocity).unwrap();
    let wanted = Wanted { velocity, speeds, monitor: &Unwatched };
    SettledLevel::new(problem, &plan, plan.grid(refinement), wanted).unwrap()
}

/// d psi_0/dz at the wall nodes, psi_0 the mover's own field and the static reaction of a permeable wall.
fn slope(problem: &Problem, level: &SettledLevel) -> Vec<f64> {
    let (operators, z) = (&level.operators, level.operators.grid.z.nodes());
    let mut slope = Vec::new();
    for row in &operators.wall.rows {
        for j in row.j..row.j + row.count {
            let r = operators.grid.r.nodes()[row.i];
            let own = -r * problem.mover.flux_density_r(r, z[j]);
            let added = level.static_reaction.as_ref().map_or(0.0, |psi| {
                let at = |j: usize| psi[operators.grid.node(row.i, j)];
                (at(j + 1) - at(j - 1)) / (z[j + 1] - z[j - 1])
            });
            slope.push(own + added);
        }
    }
    slope
}

/// Drag by J x B from one sparse LU: (K - v C) psi = v C psi_0, I = v (C psi + C psi_0).
fn drag_by_lu(problem: &Problem, level: &SettledLevel, velocity: f64) -> f64 {
    let (operators, slope) = (&level.operators, slope(problem, level));
    let wall = &operators.wall;
    let mut right = vec![0.0; operators.unknowns()];
    for (w, &u) in wall.unknown.iter().enumerate() {
        right[u] = velocity * wall.conductance[w] * slope[w];
    }
    let psi = Unsymmetric::new(operators, velocity).solve(&right);
    let mut carried = vec![0.0; wall.len()];
    convect(operators, &psi, &mut carried);
    let current = |w: usize| velocity * (carried[w] + wall.conductance[w] * slope[w]);
    2.0 * PI * slope.iter().enumerate().map(|(w, q)| current(w) * q).sum::<f64>()
}

/// The same drag on the same grid by recurrence and by LU, at speeds below, at and above that of greatest drag. The
/// recurrence ends at a residual of 1e-8 for the speed that it is made for, which bounds the drag's error there; at
/// lower speeds it has long converged.
#[test]
fn the_recurrence_gives_the_drag_of_a_sparse_lu() {
    const FASTEST: f64 = 60.0;
    for jacket in [None, Some(100.0)] {
        let problem = problem(jacket);
        for refinement in [Refinement::COARSEST, Refinement::first(3)[2]] {
            // Enough speeds to be worth a recurrence.
            let level = level_for(&problem, &[0.1, 15.0, 40.0, FASTEST], FASTEST, refinement);
            assert!(level.recurrence.serves(FASTEST));
            for (velocity, limit) in [(0.1, 1e-10), (15.0, 1e-10), (-15.0, 1e-10), (FASTEST, 1e-8)] {
                let found = level.figures(&problem.mover, velocity, &Unwatched).unwrap().drag;
                let wanted = drag_by_lu(&problem, &level, velocity);
                let (off, left) = ((found / wanted - 1.0).abs(), level.recurrence.residual(velocity));
                println!(
                    "{jacket:?} {velocity} m/s, f = {}: {found:.9} N, off {off:.1e}, residual {left:.1e}, {} vectors",
                    refinement.factor(),
                    level.recurrence.len()
                );
                assert!(off < limit, "{found} and {wanted}");
                approx::assert_relative_eq!(level.drag(velocity, &Unwatched).unwrap(), found, max_relative = 1e-12);
            }
        }
    }
}

/// A vector of the recurrence allocates nothing where there is room for it; making room allocates once in a block.
#[test]
fn a_recurrence_vector_allocates_nothing() {
    for jacket in [None, Some(100.0)] {
        let problem = problem(jacket);
        let mut level = level(&problem, 60.0, Refinement::COARSEST);
        let mut lanczos = level.lanczos();
        let (mut inside, mut room) = (0, 0);
        for _ in 0..100 {
            room += allocation_counter::measure(|| lanczos.recurrence.make_room()).count_total;
            let step = allocation_counter::measure(|| assert_eq!(lanczos.step(1e9, 1000).unwrap(), Came::On));
            inside += step.count_total;
        }
        println!("{jacket:?}: {inside} allocations in 100 vectors, {room} to make room for them");
        assert_eq!(inside, 0);
        assert!((1..30).contains(&room));
    }
}

/// The same drag, heat, peak current density and field by recurrence and by elimination, where either would do; and by
/// elimination and sparse LU where the recurrence would take thousands of vectors.
#[test]
fn an_elimination_gives_what_the_recurrence_gives() {
    for jacket in [None, Some(100.0)] {
        let problem = problem(jacket);
        for speed in [0.3_f64, 15.0, -60.0] {
            let mut shared = level_for(&problem, &[0.1, 10.0, 40.0, speed.abs()], speed, Refinement::COARSEST);
            assert!(shared.recurrence.serves(speed));
            let mut alone = level(&problem, speed, Refinement::COARSEST);
            alone.forget_recurrence();
            assert!(!alone.recurrence.serves(speed));
            let [a, b] = [&shared, &alone].map(|l| l.figures(&problem.mover, speed, &Unwatched).unwrap());
            println!(
                "{jacket:?} {speed} m/s: {} {} {} and {} {} {}",
                a.drag, a.drag_by_heat, a.peak, b.drag, b.drag_by_heat, b.peak
            );
            approx::assert_relative_eq!(a.drag, b.drag, max_relative = 1e-9);
            approx::assert_relative_eq!(a.drag_by_heat, b.drag_by_heat, max_relative = 1e-9);
            approx::assert_relative_eq!(a.peak, b.peak, max_relative = 1e-8);
            approx::assert_relative_eq!(alone.drag(speed, &Unwatched).unwrap(), b.drag, max_relative = 1e-12);
            let (psi, _) = shared.reaction(speed, &Unwatched).unwrap();
            let (other, _) = alone.reaction(speed, &Unwatched).unwrap();
            let size = psi.iter().fold(0.0_f64, |m, p| m.max(p.abs()));
            let off = psi.iter().zip(&other).fold(0.0_f64, |m, (p, o)| m.max((p - o).abs()));
            assert!(off < 1e-8 * size, "{off} of {size}");
        }
        for speed in [1e3, 1e6] {
            let level = level(&problem, speed, Refinement::COARSEST);
            assert!(level.recurrence.len() < 3, "the rule must not take the recurrence here");
            let found = level.drag(speed, &Unwatched).unwrap();
            let wanted = drag_by_lu(&problem, &level, speed);
            println!("{jacket:?} {speed} m/s: {found} and {wanted}");
            approx::assert_relative_eq!(found, wanted, max_relative = 1e-8);
        }
    }
}

fn independent(operators: &Operators) -> CscCholesky<f64> {
    let n = operators.unknowns();
    let mut entries = CooMatrix::new(n, n);
    for (row, values) in operators.stiffness.outer_iterator().enumerate() {
        values.iter().for_each(|(column, &value)| entries.push(row, column, value));
    }
    CscCholesky::factor(&CscMatrix::from(&entries)).unwrap()
}

/// The first-order reaction K^-1 C psi_0 by another library's Cholesky factor: its energy is the recurrence's first
/// coefficient.
#[test]
fn an_independent_cholesky_gives_the_first_reaction() {
    for jacket in [None, Some(100.0)] {
        let problem = problem(jacket);
        let level = level(&problem, 15.0, Refinement::COARSEST);
        let (operators, slope) = (&level.operators, slope(&problem, &level));
        let mut right = DMatrix::zeros(operators.unknowns(), 1);
        for (w, &u) in operators.wall.unknown.iter().enumerate() {
            right[(u, 0)] = operators.wall.conductance[w] * slope[w];
        }
        let psi = independent(operators).solve(&right);
        let energy = 2.0 * PI * right.dot(&psi);
        println!("{jacket:?}: {energy} N s2/m and {}", level.lag_product());
        approx::assert_relative_eq!(level.lag_product(), energy, max_relative = 1e-10);
    }
}

#![allow(
    clippy::unwrap_used,
    clippy::float_cmp,
    clippy::print_stdout,
    reason = "tests may stop at the first fault and print what they measured"
)]

use std::time::Instant;

use lenzbore_mesh::{Grid, NodeLine, Rectangle, Regions};

use super::*;
use crate::linear::RESIDUAL_LIMIT;
use crate::materials::Materials;
use crate::problem::{Extent, Layer, Wall};

/// Node lines that grow from 0 and end at `to`, with a node on every place of `through`.
fn line(from: f64, to: f64, through: &[f64], cells: usize) -> NodeLine {
    let mut nodes = vec![from];
    for &end in through.iter().chain([&to]) {
        let start = nodes[nodes.len() - 1];
        nodes.extend((1..=cells).map(|k| {
            let x = k as f64 / cells as f64;
            start + (end - start) * (0.7 * x + 0.3 * x * x)
        }));
    }
    NodeLine::from_nodes(nodes).unwrap()
}

fn layer(inner: f64, outer: f64, from: f64, to: f64, sigma: f64, mu_r: f64) -> Layer {
    Layer {
        name: format!("{inner} {from}"),
        inner_radius_m: inner,
        outer_radius_m: outer,
        from_m: from,
        to_m: to,
        conductivity_s_per_m: sigma,
        relative_permeability: mu_r,
    }
}

fn operators(layers: Vec<Layer>, r: NodeLine, z: NodeLine) -> Operators {
    let grid = Grid { r, z };
    let rectangles: Vec<Rectangle> = layers
        .iter()
        .map(|l| Rectangle { r_from_m: l.inner_radius_m, r_to_m: l.outer_radius_m, z_from_m: l.from_m, z_to_m: l.to_m })
        .collect();
    let wall = Wall { slots: 0, extent: Extent::Endless, layers };
    let materials = Materials::new(&wall, &Regions::new(&grid, &rectangles));
    Operators::new(grid, materials)
}

/// Walls of one to six segments, permeable or not, with a rod and a wall that runs through the whole grid.
fn cases() -> Vec<(&'static str, Operators)> {
    let far = 0.4;
    let r = |faces: &[f64]| line(0.0, far, faces, 9);
    let z = |ends: &[f64]| line(-far, 0.3 + far, ends, 14);
    let tube = |mu_r: f64| vec![layer(0.011, 0.013, 0.0, 0.3, 58e6, mu_r)];
    let through = |mu_r: f64| vec![layer(0.011, 0.013, f64::NEG_INFINITY, f64::INFINITY, 58e6, mu_r)];
    let collar = vec![
        layer(0.011, 0.013, 0.0, 0.3, 58e6, 1.0),
        layer(0.013, 0.017, 0.05, 0.1, 6e6, 80.0),
        layer(0.013, 0.017, 0.15, 0.2, 0.0, 300.0),
    ];
    vec![
        ("endless", operators(through(1.0), r(&[0.011, 0.013]), z(&[0.0]))),
        ("endless, permeable", operators(through(200.0), r(&[0.011, 0.013]), z(&[0.0]))),
        ("tube", operators(tube(1.0), r(&[0.011, 0.013]), z(&[0.0, 0.3]))),
        ("permeable tube", operators(tube(50.0), r(&[0.011, 0.013]), z(&[0.0, 0.3]))),
        ("rod", operators(vec![layer(0.0, 0.008, 0.0, 0.3, 3e6, 5.0)], r(&[0.008]), z(&[0.0, 0.3]))),
        ("collars", operators(collar, r(&[0.011, 0.013, 0.017]), z(&[0.0, 0.05, 0.1, 0.15, 0.2, 0.3]))),
    ]
}

/// Right sides that are nonzero at the wall's nodes only, without any symmetry.
fn right(operators: &Operators, seed: f64) -> Vec<f64> {
    let mut right = vec![0.0; operators.unknowns()];
    for (w, &u) in operators.wall.unknown.iter().enumerate() {
        right[u] = (seed + 1.7 * w as f64).sin() + 0.2;
    }
    right
}

fn largest(values: impl Iterator<Item = f64>) -> f64 {
    values.fold(0.0, |m, x| m.max(x.abs()))
}

/// The layered solution is the sparse factor's, for fields at rest, slow steps and fast ones.
#[test]
fn layered_and_sparse_solutions_agree() {
    for (name, operators) in cases() {
        let plan = DirectPlan::new(&operators).unwrap();
        assert!(matches!(plan, DirectPlan::Layered(_)), "{name}");
        let pattern = DirectPlan::Sparse(Pattern::new(&operators.stiffness).unwrap());
        for rate in [0.0, 10.0, 1e4] {
            let mut layered = plan.factor(&operators, rate).unwrap();
            let mut sparse = pattern.factor(&operators, rate).unwrap();
            let both: Vec<f64> = [right(&operators, 0.3), right(&operators, 2.0)].concat();
            let (mut found, mut wanted) = (both.clone(), both.clone());
            layered.solve_in_place(&mut found);
            sparse.solve_in_place(&mut wanted);
            let off = largest(found.iter().zip(&wanted).map(|(a, b)| a - b)) / largest(wanted.iter().copied());
            let n = operators.unknowns();
            let residual = layered.check(&operators, &found[n..], &both[n..], RESIDUAL_LIMIT).unwrap();
            let cross = sparse.check(&operators, &found[n..], &both[n..], RESIDUAL_LIMIT).unwrap();
            println!("{name}, rate {rate}: off {off:.1e}, residual {residual:.1e}, by the matrix {cross:.1e}");
            assert!(off < 1e-12 && residual < 1e-13 && cross < 1e-13, "{name}, rate {rate}");
            // What is left in the workspace must not matter.
            let mut again = both.clone();
            layered.solve_in_place(&mut again);
            assert_eq!(found, again, "{name}");
        }
    }
}

/// The check sees a wrong value anywhere, by as much as the assembled matrix does, and what is not finite.
#[test]
fn the_check_sees_what_the_matrix_sees() {
    for (name, operators) in cases() {
        let mut layered = DirectPlan::new(&operators).unwrap().factor(&operators, 300.0).unwrap();
        let pattern = Pattern::new(&operators.stiffness).unwrap();
        let mut sparse = DirectPlan::Sparse(pattern).factor(&operators, 300.0).unwrap();
        let right = right(&operators, 1.0);
        let mut psi = right.clone();
        layered.solve_in_place(&mut psi);
        for at in (0..psi.len()).step_by(psi.len() / 97) {
            let kept = psi[at];
            psi[at] += 1e-3 * largest(psi.iter().copied());
            let by_rows = layered.check(&operators, &psi, &right, f64::INFINITY).unwrap();
            let by_matrix = sparse.check(&operators, &psi, &right, f64::INFINITY).unwrap();
            // The scales differ: all terms of a row there, the largest one here.
            assert!(by_rows >= 0.999 * by_matrix && by_rows < 4.0 * by_matrix, "{name}: {by_rows} and {by_matrix}");
            assert!(layered.check(&operators, &psi, &right, RESIDUAL_LIMIT).is_err(), "{name}");
            psi[at] = f64::NAN;
            let fault = layered.check(&operators, &psi, &right, f64::INFINITY);
            assert!(matches!(fault, Err(SolveFault::NotFinite { .. })), "{name}");
            psi[at] = kept;
        }
    }
}

/// More radii than the size at which the library would divide and conquer, cells from 25 um to 50 mm, permeability 200.
#[test]
fn modes_hold_on_wide_grids() {
    let faces: Vec<f64> = (0..9).map(|k| 0.0105 + 2.5e-4 * f64::from(k)).collect();
    let wall = vec![layer(0.0105, 0.0125, f64::NEG_INFINITY, f64::INFINITY, 58e6, 200.0)];
    let operators = operators(wall, line(0.0, 0.5, &faces, 18), line(-0.5, 0.5, &[0.0], 40));
    assert!(operators.grid.nr() > 160);
    let mut layered = DirectPlan::new(&operators).unwrap().factor(&operators, 0.0).unwrap();
    let right = right(&operators, 0.1);
    let mut psi = right.clone();
    layered.solve_in_place(&mut psi);
    let residual = layered.check(&operators, &psi, &right, RESIDUAL_LIMIT).unwrap();
    println!("{} radii: residual {residual:.1e}", operators.grid.nr());
    assert!(residual < 1e-14);
}

/// A wall of so many sections that interfaces would be dearer than a sparse factor.
#[test]
fn many_sections_take_the_sparse_factor() {
    let ends: Vec<f64> = (0..=80).map(|k| 0.005 * f64::from(k)).collect();
    let layers = (0..80)
        .map(|k| layer(0.011, if k % 2 == 0 { 0.013 } else { 0.014 }, ends[k], ends[k + 1], 58e6, 1.0))
        .collect();
    let operators = operators(layers, line(0.0, 0.4, &[0.011, 0.013, 0.014], 6), line(-0.4, 0.8, &ends, 2));
    let plan = DirectPlan::new(&operators).unwrap();
    assert!(matches!(plan, DirectPlan::Sparse(_)));
    let mut factor = plan.factor(&operators, 100.0).unwrap();
    let right = right(&operators, 0.4);
    let mut psi = right.clone();
    factor.solve_in_place(&mut psi);
    factor.check(&operators, &psi, &right, RESIDUAL_LIMIT).unwrap();
}

/// Times of both, for whoever changes them: `cargo test --release direct::tests::times -- --ignored --nocapture`.
#[test]
#[ignore = "a timing"]
fn times() {
    let z = |cells| line(-0.5, 0.8, &[0.0, 0.3], cells);
    let tube = || vec![layer(0.011, 0.013, 0.0, 0.3, 58e6, 1.0)];
    for (radii, cells) in [(11, 80), (22, 160), (33, 240)] {
        let operators = operators(tube(), line(0.0, 0.5, &[0.011, 0.013], radii), z(cells));
        let sparse = DirectPlan::Sparse(Pattern::new(&operators.stiffness).unwrap());
        let right = right(&operators, 0.1);
        for (name, plan) in [("layered", DirectPlan::new(&operators).unwrap()), ("sparse", sparse)] {
            let begin = Instant::now();
            let mut factor = plan.factor(&operators, 500.0).unwrap();
            let factoring = begin.elapsed();
            let mut psi = right.clone();
            let (mut solves, mut checks) = (Vec::new(), Vec::new());
            for _ in 0..21 {
                psi.copy_from_slice(&right);
                let begin = Instant::now();
                factor.solve_in_place(&mut psi);
                solves.push(begin.elapsed());
                let begin = Instant::now();
                factor.check(&operators, &psi, &right, 1e-11).unwrap();
                checks.push(begin.elapsed());
            }
            solves.sort();
            checks.sort();
            println!(
                "{name} {} x {}: factor {factoring:.2?}, solve {:.3?}, check {:.3?}, {:.1} MB",
                operators.grid.nr(),
                operators.grid.nz(),
                solves[10],
                checks[10],
                plan.factor_bytes() as f64 / 1e6
            );
        }
    }
}

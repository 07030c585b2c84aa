//! Grids must be similar: levels that are each built by themselves break the even powers.
//!
//! Dipole in an endless tube at 5 m/s by sparse LU, on similar levels and on two kinds that look alike but aren't:
//! - planned alone: every size of the size law divided by f, cells counted and rounded to whole numbers on each
//!   level anew;
//! - grown alone: first cells h/f that grow by the f-th root of one ratio until they pass the end, then stretched to
//!   fit.

use std::f64::consts::PI;

use lenzbore_mesh::{Anchor, Cap, Grid, NodeLine, PlannedLine, Refinement, SizeLaw};

use super::cases::dipole;
use super::chamber::{EMPTY, Filling, materials};
use super::order::{Wanted, assert_orders, errors, factors, overall_order, short};
use super::unsymmetric::Unsymmetric;
use crate::band::{Ladder, two_routes};
use crate::extrapolate::extrapolate;
use crate::operators::{Operators, add_product};
use crate::sources::AxialField;

const INNER: f64 = 0.0105;
const OUTER: f64 = 0.0125;
const R_MAX: f64 = 0.25;
const Z_MAX: f64 = 0.3;
const VELOCITY: f64 = 5.0;

/// Breakpoints and sizes in r and in z, with every size (and growth) divided by `finer`.
fn laws(finer: f64) -> [(Vec<f64>, SizeLaw); 2] {
    let growth = 0.26 / finer;
    let anchor = |position_m: f64, size: f64| Anchor { position_m, size_m: size / finer };
    let across = SizeLaw { growth, anchors: vec![anchor(INNER, 0.0005), anchor(OUTER, 0.0005)], caps: Vec::new() };
    let cap = Cap { from_m: -0.01, to_m: 0.01, size_m: 0.0013 / finer, release_m: Some(0.01) };
    let along = SizeLaw { growth, anchors: vec![anchor(0.0, 0.0012)], caps: vec![cap] };
    [(vec![0.0, INNER, OUTER, R_MAX], across), (vec![-Z_MAX, 0.0, Z_MAX], along)]
}

fn planned_once(refinement: Refinement) -> Grid {
    let [r, z] = laws(1.0).map(|(points, law)| PlannedLine::new(&points, &law).unwrap().nodes(refinement));
    Grid { r, z }
}

fn planned_alone(refinement: Refinement) -> Grid {
    let [r, z] = laws(refinement.factor())
        .map(|(points, law)| PlannedLine::new(&points, &law).unwrap().nodes(Refinement::COARSEST));
    Grid { r, z }
}

/// Distances of nodes from a segment's fine end, 0 excluded: by the first cell at f = 1, the growth ratio and the
/// length.
type Growth = fn(first: f64, ratio: f64, length: f64, refinement: Refinement) -> Vec<f64>;

/// Even count of cells at f = 1, then x(i/f) of one map: (ratio^(i/f) - 1) / (ratio^N - 1).
fn grown_once(first: f64, ratio: f64, length: f64, refinement: Refinement) -> Vec<f64> {
    let mut cells = 2;
    while first * (ratio.powi(cells) - 1.0) / (ratio - 1.0) < length {
        cells += 2;
    }
    let count = refinement.times(usize::try_from(cells).unwrap());
    let place = |i: usize| (ratio.powf(i as f64 / refinement.factor()) - 1.0) / (ratio.powi(cells) - 1.0);
    (1..=count).map(|i| length * place(i)).collect()
}

/// First cell / f, ratio^(1/f), until the end is passed; stretched to fit.
fn grown_alone(first: f64, ratio: f64, length: f64, refinement: Refinement) -> Vec<f64> {
    let (mut nodes, mut reach, mut size) = (Vec::new(), 0.0, first / refinement.factor());
    while reach < length {
        reach += size;
        nodes.push(reach);
        size *= ratio.powf(1.0 / refinement.factor());
    }
    nodes.iter().map(|x| x * length / reach).collect()
}

fn grown(growth: Growth, refinement: Refinement) -> Grid {
    let upward = |from: f64, to: f64, first: f64, ratio: f64| {
        growth(first, ratio, to - from, refinement).into_iter().map(move |x| from + x)
    };
    // Without the far end, which the line begins with, but with the fine end.
    let downward = |from: f64, to: f64, first: f64, ratio: f64| {
        let distances = growth(first, ratio, to - from, refinement);
        distances.into_iter().rev().skip(1).chain([0.0]).map(move |x| to - x)
    };
    let wall = refinement.times(4);
    let mut r = vec![0.0];
    r.extend(downward(0.0, INNER, 0.0005, 1.1));
    r.extend((1..wall).map(|i| INNER + (OUTER - INNER) * i as f64 / wall as f64));
    r.push(OUTER);
    r.extend(upward(OUTER, R_MAX, 0.0005, 1.25));
    let mut z = vec![-Z_MAX];
    z.extend(downward(-Z_MAX, 0.0, 0.001, 1.12));
    z.extend(upward(0.0, Z_MAX, 0.001, 1.12));
    Grid { r: NodeLine::from_nodes(r).unwrap(), z: NodeLine::from_nodes(z).unwrap() }
}

/// Drag by J x B and by heat / speed, N.
fn drag(grid: Grid) -> (f64, f64) {
    let tube = |r: f64| if r > INNER && r < OUTER { Filling { sigma: 58e6, mu_r: 1.0 } } else { EMPTY };
    let materials = materials(&grid, tube);
    let operators = Operators::new(grid, materials);
    let (wall, z) = (&operators.wall, operators.grid.z.nodes());
    let heights = wall.rows.iter().flat_map(|row| &z[row.j..row.j + row.count]);
    let dipole = dipole().source;
    let slope: Vec<f64> = heights.zip(&wall.radius).map(|(&z, &r)| -r * dipole.flux_density_r(r, z)).collect();
    let mut right = vec![0.0; operators.unknowns()];
    for (w, &u) in wall.unknown.iter().enumerate() {
        right[u] = VELOCITY * wall.conductance[w] * slope[w];
    }
    let psi = Unsymmetric::new(&operators, VELOCITY).solve(&right);
    let mut currents = vec![0.0; psi.len()];
    add_product(&operators.stiffness, &psi, 1.0, &mut currents);
    let (mut force, mut heat) = (0.0, 0.0);
    for (w, &u) in wall.unknown.iter().enumerate() {
        force += 2.0 * PI * currents[u] * slope[w];
        heat += 2.0 * PI * currents[u] * currents[u] / wall.conductance[w];
    }
    (force, heat / VELOCITY)
}

/// Drags on all levels.
struct Levels(Vec<(f64, f64)>);

impl Levels {
    fn on(grid: impl Fn(Refinement) -> Grid) -> Self {
        Self(Refinement::first(5).into_iter().map(|f| drag(grid(f))).collect())
    }

    fn force(&self) -> Vec<f64> {
        self.0.iter().map(|l| l.0).collect()
    }

    /// The settled band's half-width over the first `count` levels, without the shares of boundary and solver, which
    /// all have alike.
    fn band(&self, count: usize) -> f64 {
        let ladder =
            |of: fn(&(f64, f64)) -> f64| Ladder::new(&factors(count), self.0[..count].iter().map(of).collect());
        two_routes(&ladder(|l| l.0), &ladder(|l| l.1), 0.0, 0.0)
    }
}

fn check(what: &str, kept: &Levels, broken: &Levels, bounds: &[f64]) {
    let exact = extrapolate(&factors(5), &kept.force());
    assert_orders(&format!("{what} once"), &kept.force(), exact, &Wanted::even(bounds));
    let left = errors(&broken.force(), exact, 2);
    let order = overall_order(&left, 2);
    println!(
        "{what} alone: {}, after runs of 2 {}, of 3 {}, order {order:.2}",
        short(&errors(&broken.force(), exact, 1)),
        short(&left),
        short(&errors(&broken.force(), exact, 3))
    );
    for count in [3, 4, 5] {
        let (narrow, wide) = (kept.band(count) / exact, broken.band(count) / exact);
        let off = extrapolate(&factors(count), &broken.force()[..count]) / exact - 1.0;
        println!("{what}, {count} levels: bands {narrow:.1e} and {wide:.1e}, the broken one {off:.1e} off");
    }
    assert!(order < 3.0, "{what} alone seems to keep the even powers: order {order}");
    let count = 4;
    assert!(broken.band(count) > 10.0 * kept.band(count), "{what} alone: the band hardly widens");
}

#[test]
fn levels_planned_alone_break_the_even_powers_and_widen_the_band() {
    check("planned", &Levels::on(planned_once), &Levels::on(planned_alone), &[7.5e-4, 7.3e-7]);
}

#[test]
fn levels_grown_alone_break_the_even_powers_and_widen_the_band() {
    let levels = |growth: Growth| Levels::on(|f| grown(growth, f));
    check("grown", &levels(grown_once), &levels(grown_alone), &[1.3e-3, 1.1e-7]);
}

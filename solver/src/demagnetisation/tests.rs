#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, reason = "tests may stop at the first fault")]

use lenzbore_mesh::{Grid, NodeLine};

use super::Watch;
use crate::constants::MU0;
use crate::problem::{Mover, Part, Travel};
use crate::verification::cases;

fn with_coercivity(part: Part) -> Part {
    Part { coercivity_a_per_m: Some(1.0e6), ..part }
}

fn alone(parts: Vec<Part>) -> Mover {
    Mover {
        parts,
        ..cases::problem(cases::endless(Vec::new()), Vec::new(), Travel::Steady { velocity_m_per_s: 1.0 }, 3).mover
    }
}

fn still() -> (Grid, Vec<f64>) {
    let line = |from: f64| NodeLine::from_nodes((0..9).map(|k| from + f64::from(k) * 0.01).collect()).unwrap();
    let grid = Grid { r: line(0.0), z: line(-0.04) };
    let psi = vec![0.0; grid.nodes()];
    (grid, psi)
}

/// A disc thin against its radius has the demagnetising factor 1 at its middle, and nowhere more: J. A. Osborn, Physical Review 67,
/// 351-357 (1945), limit of the oblate spheroid; on the axis of a cylinder N = 1 - L/sqrt(L^2 + 4 a^2) at its middle, by the closed form of
/// a solenoid.
#[test]
fn flat_magnet_opposes_itself_with_nearly_its_remanence() {
    let (grid, psi) = still();
    let mover = alone(vec![with_coercivity(cases::magnet(0.0, 20.0, 0.4, 1.2, 0.0))]);
    let worst = Watch::new(&mover).unwrap().worst(&grid, &psi, 0.0);
    assert!((MU0 * worst.field / 1.2 - 1.0).abs() < 0.02, "{worst:?}");
}

#[test]
fn field_on_the_axis_of_a_cylinder_is_that_of_its_poles() {
    let mover = alone(vec![with_coercivity(cases::magnet(0.0, 8.0, 12.0, 1.2, 0.0))]);
    let points = super::points::points_of(&mover);
    let middle = points.iter().filter(|p| p.z.abs() < 1e-9).min_by(|a, b| a.r.total_cmp(&b.r)).unwrap();
    let exact = 1.2 * (1.0 - 12.0 / 12.0_f64.hypot(16.0));
    // The point lies 0.16 mm off the axis.
    assert!((middle.own / exact - 1.0).abs() < 2e-3, "{} against {exact}", middle.own);
}

/// Opposed neighbours push each other harder than they push themselves; a reaction field against the magnet counts in full.
#[test]
fn neighbours_and_reaction_add_up() {
    let (grid, mut psi) = still();
    let one = cases::magnet(0.0, 8.0, 6.0, 1.2, 0.0);
    let other = cases::magnet(0.0, 8.0, 6.0, -1.2, 6.0);
    let margin = |parts, psi: &[f64]| Watch::new(&alone(parts)).unwrap().worst(&grid, psi, 0.0).margin;
    let by_itself = margin(vec![with_coercivity(one.clone())], &psi);
    let beside = margin(vec![with_coercivity(one.clone()), other], &psi);
    assert!(beside < by_itself - 0.1, "{beside} {by_itself}");
    for (n, value) in psi.iter_mut().enumerate() {
        let r = grid.r.nodes()[n % grid.nr()];
        *value = -0.5 * 0.05 * r * r;
    }
    let pushed = margin(vec![with_coercivity(one)], &psi);
    assert!((by_itself - pushed - 0.05 / (MU0 * 1.0e6)).abs() < 1e-9, "{pushed} {by_itself}");
}

#[test]
fn without_a_coercivity_nothing_is_watched() {
    assert!(Watch::new(&alone(vec![cases::magnet(0.0, 8.0, 6.0, 1.2, 0.0)])).is_none());
}

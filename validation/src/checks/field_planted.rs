//! Errors planted in the references: the same functions that pass must see them.
#![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

use lenzbore_solver::monitor::Unwatched;

use super::*;

/// Which comparisons with the table fall short; those of bands with the integral pass whatever the table says.
fn caught(verdict: &Verdict) -> Vec<&str> {
    let bad = verdict.comparisons.iter().filter(|c| !c.passes());
    bad.map(|c| c.what.as_str()).collect()
}

#[test]
fn a_drag_that_is_off_or_has_the_wrong_sign_is_seen() {
    let mut table = magnet_speed::DRAG;
    assert_eq!(caught(&speeds_against(&table, &Unwatched).unwrap()), [""; 0]);
    table[3].1 *= 1.03;
    table[6].1 *= -1.0;
    table[9].1 *= 1.0002;
    let verdict = speeds_against(&table, &Unwatched).unwrap();
    assert_eq!(caught(&verdict), ["drag at 1 m/s", "drag at 5 m/s", "drag at 15 m/s"]);
    assert!(!verdict.passed());
}

#[test]
fn a_swapped_column_is_seen() {
    let swapped = cylinder_damping::TABLE.map(|c| Cylinder { damping: c.dipole, dipole: c.damping, ..c });
    let verdict = cylinders_against(&swapped[..4], &Unwatched).unwrap();
    assert_eq!(caught(&verdict).len(), 4, "{verdict}");
}

#[test]
fn a_radius_typed_for_a_diameter_is_seen() {
    let line = cylinder_damping::TABLE[7];
    let halved = Cylinder { wall_mm: (2.0 * line.wall_mm.0, 2.0 * line.wall_mm.1), ..line };
    assert!(cylinders_against(&[line], &Unwatched).unwrap().passed());
    assert!(!cylinders_against(&[halved], &Unwatched).unwrap().passed());
}

#[test]
fn a_shifted_curve_is_seen() {
    let shifted: Vec<(f64, f64)> = thin_wall::CURVE[3..6].iter().map(|(v, f)| (*v, 1.0003 * f)).collect();
    assert_eq!(caught(&universal_against(&shifted, &Unwatched).unwrap()).len(), 3);
}

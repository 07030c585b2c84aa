//! Order in space of K: manufactured and exact fields in a closed cylinder on graded grids of all five levels.

use std::f64::consts::PI;

use lenzbore_mesh::Refinement;

use super::bessel::{FIRST_ZERO_OF_J1, j};
use super::chamber::{Chamber, EMPTY, LENGTH, RADIUS, at_shared_nodes, at_unknowns, dual_currents, solve};
use super::order::{Wanted, assert_field_orders};
use crate::constants::MU0;

/// psi at the shared nodes on all levels from a current density, and its exact values there.
fn levels(current: impl Fn(f64, f64) -> f64, exact: impl Fn(f64, f64) -> f64) -> (Vec<Vec<f64>>, Vec<f64>) {
    let chamber = Chamber::new();
    let mut levels = Vec::new();
    let mut truth = Vec::new();
    for refinement in Refinement::first(5) {
        let operators = chamber.operators(refinement, |_| EMPTY);
        let grid = &operators.grid;
        let psi = solve(&operators, &dual_currents(grid, &current));
        levels.push(at_shared_nodes(grid, refinement, &psi));
        truth = at_shared_nodes(grid, refinement, &at_unknowns(grid, &exact));
    }
    (levels, truth)
}

/// A = J1(lambda r) sin(k z) is a mode of the cylinder: J = (lambda^2 + k^2) A / mu0. Exact by separation of
/// variables.
#[test]
fn a_bessel_mode_converges_with_orders_2_4_6() {
    let (lambda, k) = (FIRST_ZERO_OF_J1 / RADIUS, PI / LENGTH);
    let a = |r: f64, z: f64| j(1, lambda * r) * (k * z).sin();
    let (found, exact) = levels(|r, z| (lambda * lambda + k * k) * a(r, z) / MU0, |r, z| r * a(r, z));
    assert_field_orders("Bessel mode", &found, &exact, &Wanted::even(&[2e-3, 4.5e-6, 2.7e-8]));
}

/// A = r (R^2 - r^2)(Z^2 - s^2), s from the middle, Z half the length: mu0 J = 8 r (Z^2 - s^2) + 2 r (R^2 - r^2). A
/// polynomial that behaves as r at the axis, manufactured by applying the differential operator by hand.
#[test]
fn a_polynomial_converges_with_orders_2_4_6() {
    let half = 0.5 * LENGTH;
    let across = |r: f64| RADIUS * RADIUS - r * r;
    let along = |z: f64| half * half - (z - half) * (z - half);
    let current = |r: f64, z: f64| (8.0 * r * along(z) + 2.0 * r * across(r)) / MU0;
    let (found, exact) = levels(current, |r, z| r * r * across(r) * along(z));
    assert_field_orders("polynomial", &found, &exact, &Wanted::even(&[1.1e-3, 4e-6, 3.5e-8]));
}

//! Order in space of K - v C: a conductor that fills the chamber and moves through a field.
//!
//! A = J1(lambda r) g(z) with g'' + P g' - lambda^2 g = -q, P = mu0 sigma v, g = 0 at both ends:
//! g = q/lambda^2 + c1 e^(s1 z) + c2 e^(s2 z), s = (-P +- sqrt(P^2 + 4 lambda^2))/2. One exponential is the steep
//! layer upstream, the other the slow decay of the wake; the source is J = (q/mu0) J1(lambda r). Exact by separation
//! of variables (derived here).

use lenzbore_mesh::Refinement;

use super::bessel::{FIRST_ZERO_OF_J1, j};
use super::chamber::{Chamber, Filling, LENGTH, RADIUS, at_shared_nodes, at_unknowns, dual_currents};
use super::order::{Wanted, assert_field_orders};
use super::unsymmetric::Unsymmetric;
use crate::constants::MU0;

/// Profile along the axis of the two waves that meet the ends.
fn profile(peclet_per_m: f64, lambda: f64) -> impl Fn(f64) -> f64 {
    let root = (peclet_per_m * peclet_per_m + 4.0 * lambda * lambda).sqrt();
    let (up, down) = (0.5 * (root - peclet_per_m), 0.5 * (-root - peclet_per_m));
    // e^(up z) is measured from the far end, so that nothing overflows: c1 e^(up (z - Z)) + c2 e^(down z) = -1 at
    // both ends.
    let (a, b) = ((-up * LENGTH).exp(), (down * LENGTH).exp());
    let c1 = -(1.0 - b) / (1.0 - a * b);
    let c2 = -(1.0 - a) / (1.0 - a * b);
    move |z| 1.0 + c1 * (up * (z - LENGTH)).exp() + c2 * (down * z).exp()
}

fn check(velocity: f64, bounds: &[f64]) {
    const SIGMA: f64 = 20e6;
    let lambda = FIRST_ZERO_OF_J1 / RADIUS;
    let g = profile(MU0 * SIGMA * velocity, lambda);
    let exact = |r: f64, z: f64| r * j(1, lambda * r) * g(z);
    let chamber = Chamber::new();
    let mut levels = Vec::new();
    let mut truth = Vec::new();
    for refinement in Refinement::first(5) {
        let operators = chamber.operators(refinement, |_| Filling { sigma: SIGMA, mu_r: 1.0 });
        let grid = &operators.grid;
        let right = dual_currents(grid, |r, _| lambda * lambda * j(1, lambda * r) / MU0);
        let psi = Unsymmetric::new(&operators, velocity).solve(&right);
        levels.push(at_shared_nodes(grid, refinement, &psi));
        truth = at_shared_nodes(grid, refinement, &at_unknowns(grid, exact));
    }
    assert_field_orders(&format!("medium at {velocity} m/s"), &levels, &truth, &Wanted::even(bounds));
}

/// P = 25 /m against lambda = 192 /m: diffusion leads.
#[test]
fn a_slow_medium_converges_with_orders_2_4_6() {
    check(1.0, &[1.1e-3, 5.2e-6, 1.8e-7]);
}

/// P = 500 /m: the layer upstream is 2 mm thick, the wake runs through the whole chamber.
#[test]
fn a_fast_medium_converges_with_orders_2_4_6() {
    check(20.0, &[4e-3, 2.4e-5, 6e-7]);
}

/// The same, moving the other way, so that layer and wake change ends; the grid is no mirror image of itself.
#[test]
fn a_medium_moving_backwards_converges_with_orders_2_4_6() {
    check(-20.0, &[4e-3, 2.4e-5, 6e-7]);
}

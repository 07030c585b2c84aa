//! Order in time: a mode of a conducting chamber dies out, stepped by the implicit midpoint rule as a march does it.
//!
//! A = J1(lambda r) sin(k z) exp(-g t), g = (lambda^2 + k^2)/(mu0 sigma), exact by separation of variables. On a
//! grid the mode is the eigenvector of K psi = g G psi next to it, and dies out exactly as exp(-g_grid t).

use std::f64::consts::PI;

use lenzbore_mesh::Refinement;

use super::bessel::{FIRST_ZERO_OF_J1, j};
use super::chamber::{Chamber, Filling, LENGTH, RADIUS, at_unknowns};
use super::order::{Wanted, assert_field_orders, assert_orders};
use crate::constants::MU0;
use crate::linear::{Factor, Pattern};
use crate::operators::{Operators, add_product};

const SIGMA: f64 = 58e6;
/// Steps over the decay on the coarsest level.
const STEPS: usize = 8;
/// Decay times that pass.
const DECAYS: f64 = 1.5;

fn rate() -> f64 {
    let (lambda, k) = (FIRST_ZERO_OF_J1 / RADIUS, PI / LENGTH);
    (lambda * lambda + k * k) / (MU0 * SIGMA)
}

/// The slowest mode of a grid and its decay rate.
struct Mode {
    operators: Operators,
    psi: Vec<f64>,
    rate: f64,
}

impl Mode {
    fn new(refinement: Refinement) -> Self {
        let operators = Chamber::new().operators(refinement, |_| Filling { sigma: SIGMA, mu_r: 1.0 });
        let (lambda, k) = (FIRST_ZERO_OF_J1 / RADIUS, PI / LENGTH);
        let mut psi = at_unknowns(&operators.grid, |r, z| r * j(1, lambda * r) * (k * z).sin());
        let pattern = Pattern::new(&operators.stiffness).unwrap();
        let mut factor = Factor::new(&pattern, &operators.stiffness, None).unwrap();
        // Inverse iteration: what else the start holds falls by at least 0.6 a pass.
        for _ in 0..80 {
            let flux = weighted(&operators, &psi);
            let size = dot(&psi, &flux).sqrt();
            psi = flux.iter().map(|x| x / size).collect();
            factor.solve_in_place(&mut psi);
        }
        let mut pulled = vec![0.0; psi.len()];
        add_product(&operators.stiffness, &psi, 1.0, &mut pulled);
        let rate = dot(&psi, &pulled) / dot(&psi, &weighted(&operators, &psi));
        Self { operators, psi, rate }
    }

    /// The mode after DECAYS / g, in `steps` steps: (2 G/dt + K) psi_mid = (2 G/dt) psi, psi <- 2 psi_mid - psi.
    fn after(&self, steps: usize) -> Vec<f64> {
        let dt = DECAYS / rate() / steps as f64;
        let ones = vec![1.0; self.psi.len()];
        let added: Vec<f64> = weighted(&self.operators, &ones).iter().map(|g| 2.0 * g / dt).collect();
        let pattern = Pattern::new(&self.operators.stiffness).unwrap();
        let mut factor = Factor::new(&pattern, &self.operators.stiffness, Some(&added)).unwrap();
        let mut psi = self.psi.clone();
        for _ in 0..steps {
            let mut middle: Vec<f64> = psi.iter().zip(&added).map(|(p, a)| p * a).collect();
            factor.solve_in_place(&mut middle);
            psi.iter_mut().zip(&middle).for_each(|(p, m)| *p = 2.0 * m - *p);
        }
        psi
    }
}

/// G psi.
fn weighted(operators: &Operators, psi: &[f64]) -> Vec<f64> {
    let mut out = vec![0.0; psi.len()];
    for (&u, g) in operators.wall.unknown.iter().zip(&operators.wall.conductance) {
        out[u] = g * psi[u];
    }
    out
}

fn dot(a: &[f64], b: &[f64]) -> f64 {
    a.iter().zip(b).map(|(a, b)| a * b).sum()
}

/// The grid's own decay rate against the exact one: K and G together, in space alone.
#[test]
fn the_decay_rate_converges_with_orders_2_4_6() {
    let rates: Vec<f64> = Refinement::first(5).into_iter().map(|f| Mode::new(f).rate).collect();
    assert_orders("decay rate", &rates, rate(), &Wanted::even(&[2e-3, 6.8e-6, 8.6e-8]));
}

/// Step sizes dt/f on one grid against the grid's exact decay: in time alone.
#[test]
fn steps_converge_with_orders_2_4_6_on_one_grid() {
    let mode = Mode::new(Refinement::COARSEST);
    let levels: Vec<Vec<f64>> = Refinement::first(5).into_iter().map(|f| mode.after(f.times(STEPS))).collect();
    let left = (-mode.rate * DECAYS / rate()).exp();
    let exact: Vec<f64> = mode.psi.iter().map(|p| left * p).collect();
    assert_field_orders("midpoint steps", &levels, &exact, &Wanted::even(&[7.1e-4, 3.5e-7, 3.6e-10]));
}

/// Steps dt/f on the grid of level f against the exact decay: space and time refined alongside, as every run does it.
#[test]
fn space_and_time_converge_together_with_orders_2_4_6() {
    let mut levels = Vec::new();
    for refinement in Refinement::first(5) {
        let mode = Mode::new(refinement);
        let after = mode.after(refinement.times(STEPS));
        levels.push(dot(&mode.psi, &after) / dot(&mode.psi, &mode.psi));
    }
    assert_orders("decay in space and time", &levels, (-DECAYS).exp(), &Wanted::even(&[2.3e-3, 4.2e-6, 1.8e-7]));
}

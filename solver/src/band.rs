//! The numerical band of a figure.
//!
//! For a settled drag, extrapolated by two routes (F: J x B, P: heat / speed) over levels 1 .. n:
//!
//!   half = c (|E_n F - E_n P| + max |E_n - E_(n-1)| + |half-domain cut - full|) + solver residual,
//!
//! E_(n-1) the extrapolation without the coarsest level. c = 0.75 belongs to the grid rule of this crate: both were fixed
//! together against exact integrals, and change together. A figure with one route only takes the whole first
//! difference that extrapolation leaves, by its own factor; a local figure (peak current density) five of it.

use crate::extrapolate::{even_powers, weights};

/// c of the rule.
const CAUTION: f64 = 0.75;
/// Share of the last extrapolation step that still counts where a second route exists.
const STEP_SHARE: f64 = 1.0;
/// Share of the last extrapolation step for a figure with one route.
const LONE_STEP_SHARE: f64 = 0.75;

/// What one more level usually makes of the extrapolation step, on the cautious side.
const LEVEL_GAIN: f64 = 0.1;

/// A figure on all levels, extrapolated with and without the coarsest.
#[derive(Debug, Clone, PartialEq)]
pub(crate) struct Ladder {
    /// Extrapolated over all levels.
    pub(crate) value: f64,
    /// |E_n - E_(n-1)|, with more than three levels at least a tenth of |E_(n-1) - E_(n-2)|.
    pub(crate) step: f64,
    /// The levels' own values.
    pub(crate) levels: Vec<f64>,
}

impl Ladder {
    /// Extrapolates `levels` at refinement `factors`, at least two.
    pub(crate) fn new(factors: &[f64], levels: Vec<f64>) -> Self {
        Self::with_powers(factors, levels, &even_powers(factors.len()))
    }

    /// The same where the error runs in other powers of the cell size.
    pub(crate) fn with_powers(factors: &[f64], levels: Vec<f64>, powers: &[f64]) -> Self {
        let without = |coarse: usize| -> f64 {
            let w = weights(&factors[coarse..], &powers[..factors.len() - coarse - 1]);
            w.iter().zip(&levels[coarse..]).map(|(w, v)| w * v).sum()
        };
        let value = without(0);
        let mut step = (value - without(1)).abs();
        if levels.len() > 3 {
            // Two high orders may agree by accident: an earlier step, less what a level usually gains, counts too.
            step = step.max(LEVEL_GAIN * (without(1) - without(2)).abs());
        }
        Self { value, step, levels }
    }
}

/// Half-width for a figure with two routes. `cut` is the change by cutting the domain to half, `residual` the solver's, absolute.
pub(crate) fn two_routes(first: &Ladder, second: &Ladder, cut: f64, residual: f64) -> f64 {
    let apart = (first.value - second.value).abs();
    CAUTION * (apart + STEP_SHARE * first.step.max(second.step) + cut.abs()) + residual.abs()
}

/// Steps that count for a local figure (a peak in space or time).
const LOCAL_STEPS: f64 = 5.0;

/// Half-width for a local figure: a peak converges less evenly than an integral.
pub(crate) fn local(figure: &Ladder, cut: f64, residual: f64) -> f64 {
    LOCAL_STEPS * figure.step + CAUTION * cut.abs() + residual.abs()
}

/// Half-width for a figure with one route.
pub(crate) fn one_route(figure: &Ladder, cut: f64, residual: f64) -> f64 {
    LONE_STEP_SHARE * figure.step + CAUTION * cut.abs() + residual.abs()
}

//! The numerical band of a figure.
//!
//! For a settled drag, extrapolated by two routes (F: J x B, P: heat / speed) over levels 1 .. n:
//!
//!   half = c (|E_n F - E_n P| + max |E_n - E_(n-1)| + |half-domain cut - full|) + solver residual,
//!
//! E_(n-1) the extrapolation without the coarsest level. c = 0.5 belongs to the grid rule of this crate: both were fixed
//! together against exact integrals, and change together. A figure with one route only takes the whole first
//! difference that extrapolation leaves, by its own factor; a local figure (peak current density) eight of it.
//!
//! Where the levels converge more slowly than even powers would, the step counts ten times and a caution says so.

use crate::extrapolate::{even_powers, weights};
use crate::outcome::Caution;

/// c of the rule.
const CAUTION: f64 = 0.5;
/// Share of the last extrapolation step that still counts where a second route exists.
const STEP_SHARE: f64 = 1.0;
/// Share of the last extrapolation step for a figure with one route.
const LONE_STEP_SHARE: f64 = 1.0;

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
    /// Observed order, where it can be read and is lower than the powers assumed.
    pub(crate) low_order: Option<LowOrder>,
}

/// An observed order that is too low.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct LowOrder {
    /// The order.
    pub(crate) found: f64,
    /// The order that even powers give: 2 for the levels themselves, 4 once they are extrapolated.
    pub(crate) wanted: u8,
}

/// Observed order below which the assumed even powers are in doubt.
const LEAST_ORDER: f64 = 1.7;
/// The same for once-extrapolated values (four levels and more).
const LEAST_SECOND_ORDER: f64 = 3.0;
/// How much wider the band becomes then.
const DOUBT: f64 = 10.0;

/// The order p with (F1 - F2) / (F2 - F3) = (f1^-p - f2^-p) / (f2^-p - f3^-p), by bisection in 0.05 .. 12; `None` where
/// differences change sign or lie in the round-off.
fn observed_order(factors: &[f64], values: &[f64]) -> Option<f64> {
    let (f, v) = (factors.last_chunk::<3>()?, values.last_chunk::<3>()?);
    let (first, second) = (v[0] - v[1], v[1] - v[2]);
    let noise = 1.0e-10 * v[2].abs();
    if first * second <= 0.0 || second.abs() <= noise {
        return None;
    }
    let ratio = |p: f64| (f[0].powf(-p) - f[1].powf(-p)) / (f[1].powf(-p) - f[2].powf(-p));
    let (mut low, mut high) = (0.05, 12.0);
    for _ in 0..60 {
        let middle = 0.5 * (low + high);
        if ratio(middle) < first / second { low = middle } else { high = middle }
    }
    Some(0.5 * (low + high))
}

/// The observed order where it is lower than even powers give: of the levels, or of their once-extrapolated values.
fn low_order(factors: &[f64], levels: &[f64]) -> Option<LowOrder> {
    let order = observed_order(factors, levels).filter(|&p| p < LEAST_ORDER);
    let order = order.map(|found| LowOrder { found, wanted: 2 });
    if order.is_some() || levels.len() < 4 {
        return order;
    }
    let once = |k: usize| {
        let w = weights(&factors[k..k + 2], &[2.0]);
        w[0] * levels[k] + w[1] * levels[k + 1]
    };
    let extrapolated: Vec<f64> = (0..levels.len() - 1).map(once).collect();
    let means: Vec<f64> = factors.windows(2).map(|f| (f[0] * f[1]).sqrt()).collect();
    let order = observed_order(&means, &extrapolated).filter(|&p| p < LEAST_SECOND_ORDER);
    order.map(|found| LowOrder { found, wanted: 4 })
}

impl Ladder {
    /// Extrapolates `levels` at refinement `factors`, at least two.
    pub(crate) fn new(factors: &[f64], levels: Vec<f64>) -> Self {
        let low_order = low_order(factors, &levels);
        Self { low_order, ..Self::with_powers(factors, levels, &even_powers(factors.len())) }
    }

    /// The step that the bands take: widened where the observed order is off.
    fn doubted_step(&self) -> f64 {
        if self.low_order.is_some() { DOUBT * self.step } else { self.step }
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
        Self { value, step, levels, low_order: None }
    }
}

/// Half-width for a figure with two routes. `cut` is the change by cutting the domain to half, `residual` the solver's, absolute.
pub(crate) fn two_routes(first: &Ladder, second: &Ladder, cut: f64, residual: f64) -> f64 {
    let apart = (first.value - second.value).abs();
    CAUTION * (apart + STEP_SHARE * first.doubted_step().max(second.doubted_step()) + cut.abs()) + residual.abs()
}

/// What reading a field between nodes may add to a force route, relative.
const READING: f64 = 3.0e-6;

/// Half-width for a force route that is compared with the others: its own step, and what reading it between nodes adds.
pub(crate) fn route(figure: &Ladder) -> f64 {
    one_route(figure, 0.0, READING * figure.value)
}

/// What the shielding by the wall adds to [`READING`], and where that ends (errors of 1e-5 to 6e-5 measured from 10 to 10000): a field
/// that the wall all but shuts out is the small difference of two.
const MOST_SHIELDING: f64 = 25.0;

/// The same for settled fields at this shielding, mu0 sigma w v.
pub(crate) fn settled_route(figure: &Ladder, shielding: f64) -> f64 {
    one_route(figure, 0.0, (1.0 + shielding.min(MOST_SHIELDING)) * READING * figure.value)
}

/// Steps that count for a local figure (a peak in space or time).
const LOCAL_STEPS: f64 = 8.0;

/// Half-width for a local figure: a peak converges less evenly than an integral.
pub(crate) fn local(figure: &Ladder, cut: f64, residual: f64) -> f64 {
    LOCAL_STEPS * figure.step + CAUTION * cut.abs() + residual.abs()
}

/// Half-width for a figure with one route.
pub(crate) fn one_route(figure: &Ladder, cut: f64, residual: f64) -> f64 {
    LONE_STEP_SHARE * figure.doubted_step() + CAUTION * cut.abs() + residual.abs()
}

/// The caution of a figure whose levels converge too slowly.
pub(crate) fn order_caution(name: &str, ladder: &Ladder) -> Option<Caution> {
    ladder.low_order.map(|LowOrder { found, wanted }| {
        let of = if wanted > 2 { "pairs of grid levels, extrapolated once," } else { "grid levels" };
        Caution {
            text: format!(
                "{name}: the {of} converge with order {found:.1} instead of {wanted}; its band is widened for that."
            ),
        }
    })
}

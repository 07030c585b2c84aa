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
use crate::problem::Problem;
use crate::sources::Source;

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
    /// How much more than itself the step counts; see [`near_permeable_wall`].
    doubt: f64,
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

    /// The same where corners of a permeable wall add powers of their own (`corners`, from [`crate::corner`]) to even ones: the
    /// value is that of even powers, and what the corners' powers would make of it instead counts as a step. On three levels a
    /// sleeve in a steel jacket is off by half of that.
    pub(crate) fn beside_corners(factors: &[f64], levels: Vec<f64>, corners: &[f64]) -> Self {
        let ladder = Self::new(factors, levels);
        let other = Self::with_powers(factors, ladder.levels.clone(), corners);
        Self { step: ladder.step.max((other.value - ladder.value).abs()), ..ladder }
    }

    /// The same with steps that count `doubt` times.
    pub(crate) fn doubted(self, doubt: f64) -> Self {
        Self { doubt, ..self }
    }

    /// The step that the bands take: widened where the observed order is off.
    fn doubted_step(&self) -> f64 {
        self.step * if self.low_order.is_some() { DOUBT.max(self.doubt) } else { self.doubt }
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
        Self { value, step, levels, low_order: None, doubt: 1.0 }
    }
}

/// Walls that carry the flux over many gaps, mu_r w / gap times this share of it, are hard on the coarsest grid.
const PERMEANCE_SHARE: f64 = 0.1;
/// The most that steps count for that.
const MOST_DOUBT: f64 = 30.0;

/// How many times a settled drag's step counts near a permeable wall.
///
/// A wall of mu_r w far above the gap draws the flux of a magnet's edges across the gap and along itself: the coarsest grid is then not
/// fine enough for its errors to run in even powers, and two extrapolations may agree by accident (seen: off by 24 steps at mu_r w = 290
/// gaps). Drawn cases of mu_r 100 to 1000 and w of 0.02 to 0.2 bore radii gave the rule: a tenth of mu_r w / gap, at most 30, the root
/// of it with one level more, and so on. A dipole has no edges near the wall.
pub(crate) fn near_permeable_wall(problem: &Problem, gap_m: f64, levels: usize) -> f64 {
    let dipoles = problem.mover.parts.iter().all(|p| matches!(p.source, Source::Dipole { .. }));
    if dipoles || !problem.wall.is_permeable() {
        return 1.0;
    }
    let permeance =
        problem.wall.layers.iter().map(|l| (l.relative_permeability - 1.0) * l.thickness_m()).fold(0.0, f64::max);
    let doubt = (PERMEANCE_SHARE * permeance / gap_m).clamp(1.0, MOST_DOUBT);
    let roots: f64 = (3..levels).map(|_| 1.0).sum::<f64>() + 1.0;
    doubt.powf(1.0 / roots)
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

#[cfg(test)]
mod tests {
    use super::*;
    use crate::corner::corner_exponent;

    /// Levels whose error runs in h^1.35, h^2 and h^4 of comparable size: even powers miss the truth by more than their own step, and
    /// the step beside corners holds it.
    #[test]
    fn the_step_beside_corners_holds_what_even_powers_miss() {
        let l = corner_exponent(100.0);
        let factors = [1.0, 1.5, 2.0];
        let level = |f: f64| 1.0 + 1e-4 * f.powf(-2.0 * l) + 1e-3 * f.powi(-2) + 2e-4 * f.powi(-4);
        let levels: Vec<f64> = factors.iter().map(|&f| level(f)).collect();
        let (even, beside) =
            (Ladder::new(&factors, levels.clone()), Ladder::beside_corners(&factors, levels, &[2.0 * l, 2.0]));
        approx::assert_relative_eq!(even.value, beside.value, max_relative = 1e-15);
        assert!(beside.step > (beside.value - 1.0).abs(), "{beside:?}");
        assert!(beside.step >= even.step);
    }
}

//! At which offsets an input is varied, and the weights that turn the figures found there into a slope.

use super::Input;

/// Smallest offset for a slope, relative to the value: the change must stand far above the numerical bands.
const LEAST_STEP: f64 = 0.005;
/// Largest: the slope is to be that of the nominal value.
const MOST_STEP: f64 = 0.1;

/// Where to vary one input.
#[derive(Debug, Clone, PartialEq)]
pub struct OffsetPlan {
    /// Half-width of the stencil around the nominal value.
    pub step: f64,
    /// Offsets for the slope: `-step`, `-step/2`, `step/2`, `step`.
    pub stencil: Vec<f64>,
    /// Ends of the tolerance that lie outside the stencil.
    pub ends: Vec<f64>,
}

/// Plans the offsets of an input.
///
/// The stencil is as wide as the tolerance, but at least 0.5 % and at most 10 % of the value (a temperature has no
/// such scale: there it is the tolerance). Ends of the tolerance inside the stencil are read off the polynomial through it.
#[must_use]
pub fn plan_offsets(input: &Input) -> OffsetPlan {
    let wide = input.widest();
    let step = if input.has_per_cent() {
        wide.clamp(LEAST_STEP * input.value.abs(), MOST_STEP * input.value.abs())
    } else {
        wide
    };
    let ends = [-input.minus, input.plus].into_iter().filter(|e| e.abs() > step * (1.0 + 1e-9)).collect();
    OffsetPlan { step, stencil: vec![-step, -0.5 * step, 0.5 * step, step], ends }
}

impl OffsetPlan {
    /// The one-sided stencil, for an input that cannot be varied to the other side (a friction of 0 +0.1 N).
    #[must_use]
    pub fn one_sided(&self, sign: f64) -> Vec<f64> {
        [0.25, 0.5, 0.75, 1.0].map(|share| sign.signum() * share * self.step).to_vec()
    }
}

/// Weights w with sum w_i f(x_i) = f'(0) for every polynomial of degree below the number of points.
///
/// By the derivative of Lagrange's polynomials at 0; `x` holds distinct offsets, 0 among them or not. Accuracy: rounding,
/// for up to some ten points within a few decades.
#[must_use]
pub fn slope_weights(x: &[f64]) -> Vec<f64> {
    (0..x.len()).map(|i| lagrange(x, i, None).1).collect()
}

/// Weights that read the polynomial through the points at `at`.
pub(super) fn value_weights(x: &[f64], at: f64) -> Vec<f64> {
    (0..x.len()).map(|i| lagrange(x, i, Some(at)).0).collect()
}

/// Value and derivative of Lagrange polynomial `i`, at `at` (or 0).
fn lagrange(x: &[f64], i: usize, at: Option<f64>) -> (f64, f64) {
    let at = at.unwrap_or(0.0);
    let (mut value, mut slope) = (1.0, 0.0);
    for (j, xj) in x.iter().enumerate() {
        if j != i {
            let scale = 1.0 / (x[i] - xj);
            slope = (slope * (at - xj) + value) * scale;
            value *= (at - xj) * scale;
        }
    }
    (value, slope)
}

//! One figure against one input.

use super::offsets::{slope_weights, value_weights};
use super::{Input, Reading};

/// A response that departs from a straight line by no more than this share of its change is called linear.
pub const STRAIGHT: f64 = 0.05;
/// How many times its bands a change must be to stand far above them.
const FAR_ABOVE: f64 = 10.0;

/// How a figure answers to one input, the others staying.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Response {
    /// Derivative at the nominal value, unit of the figure per SI unit of the input.
    pub slope: f64,
    /// What the numerical bands may make of it, at most.
    pub slope_band: f64,
    /// Per cent of the figure per per cent of the input; none where a per cent of either means nothing.
    pub per_cent: Option<f64>,
    /// The same for `slope_band`.
    pub per_cent_band: Option<f64>,
    /// Change of the figure at the lower end of the tolerance.
    pub low: f64,
    /// Change at the upper end.
    pub high: f64,
    /// Greatest departure of these from slope times offset, over the greatest change.
    pub nonlinearity: f64,
    /// Whether the change across the stencil is at least ten times the bands of its ends.
    pub clear: bool,
}

impl Response {
    /// From the readings at offsets of the input; the reading at 0 is `nominal`.
    ///
    /// Offsets within `step` make the slope; an end of the tolerance that was not solved for itself is read off the
    /// polynomial through them. `None` where fewer than two offsets were solved, or an end lies outside them.
    #[must_use]
    pub fn new(input: &Input, nominal: Reading, step: f64, found: &[(f64, Reading)]) -> Option<Self> {
        let mut near: Vec<(f64, Reading)> =
            found.iter().copied().filter(|(x, _)| x.abs() <= step * (1.0 + 1e-9)).collect();
        if near.len() < 2 {
            return None;
        }
        let widest_pair = ends_of(&near, nominal);
        near.push((0.0, nominal));
        let x: Vec<f64> = near.iter().map(|(x, _)| *x).collect();
        let weights = slope_weights(&x);
        let sum =
            |w: &[f64], of: &dyn Fn(&Reading) -> f64| -> f64 { w.iter().zip(&near).map(|(w, (_, r))| w * of(r)).sum() };
        let slope = sum(&weights, &|r| r.value);
        let absolute: Vec<f64> = weights.iter().map(|w| w.abs()).collect();
        let slope_band = sum(&absolute, &|r| r.band);
        let change_at = |at: f64| -> Option<f64> {
            if at.abs() <= 0.0 {
                return Some(0.0);
            }
            let solved = found.iter().find(|(x, _)| (x - at).abs() <= 1e-9 * at.abs());
            match solved {
                Some((_, r)) => Some(r.value - nominal.value),
                None if at.abs() <= step * (1.0 + 1e-9) => {
                    Some(sum(&value_weights(&x, at), &|r| r.value) - nominal.value)
                }
                None => None,
            }
        };
        let (low, high) = (change_at(-input.minus)?, change_at(input.plus)?);
        let bent = (low + slope * input.minus).abs().max((high - slope * input.plus).abs());
        let largest = low.abs().max(high.abs()).max((slope * input.widest()).abs());
        let scale = (input.has_per_cent() && nominal.value.abs() > 0.0).then(|| input.value / nominal.value);
        let (change, bands) = widest_pair;
        Some(Self {
            slope,
            slope_band,
            per_cent: scale.map(|s| slope * s),
            per_cent_band: scale.map(|s| slope_band * s.abs()),
            low,
            high,
            nonlinearity: if largest > 0.0 { bent / largest } else { 0.0 },
            clear: change.abs() >= FAR_ABOVE * bands,
        })
    }

    /// Whether the slope does not stand out from the numerical bands at all.
    #[must_use]
    pub fn unseen(&self) -> bool {
        self.slope.abs() <= self.slope_band
    }

    /// Whether the change at the ends of the tolerance is slope times offset within [`STRAIGHT`].
    #[must_use]
    pub fn is_linear(&self) -> bool {
        self.unseen() || self.nonlinearity <= STRAIGHT
    }

    /// How far the figure falls within the tolerance, >= 0.
    #[must_use]
    pub fn fall(&self) -> f64 {
        (-self.low.min(self.high)).max(0.0)
    }

    /// How far it rises, >= 0.
    #[must_use]
    pub fn rise(&self) -> f64 {
        self.low.max(self.high).max(0.0)
    }
}

/// Change between the outermost offsets (0 among them), and the sum of the two bands.
fn ends_of(near: &[(f64, Reading)], nominal: Reading) -> (f64, f64) {
    let zero = (0.0, nominal);
    let all = || near.iter().chain([&zero]);
    let first = all().min_by(|a, b| a.0.total_cmp(&b.0)).unwrap_or(&zero);
    let last = all().max_by(|a, b| a.0.total_cmp(&b.0)).unwrap_or(&zero);
    (last.1.value - first.1.value, last.1.band + first.1.band)
}

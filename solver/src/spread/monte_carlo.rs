//! A run of random draws, summed up.

use super::COVERAGE;
use super::combine::FigureSpread;

/// From so many draws on, the half-width is read off the 2.5 and 97.5 % points; below, it is 1.96 standard deviations.
const FOR_PERCENTILES: usize = 200;

/// What the draws made of one figure.
#[derive(Debug, Clone, PartialEq)]
pub struct Sampled {
    /// Name of the figure.
    pub name: String,
    /// Mean over the draws.
    pub mean: f64,
    /// Half-width at 95 %.
    pub half_width: f64,
    /// Half-width of the 95 % interval of that half-width, from the number of draws.
    pub error: f64,
    /// Whether the root sum square lies within `error` of it.
    pub agrees: bool,
}

/// A run of draws.
#[derive(Debug, Clone, PartialEq)]
pub struct MonteCarlo {
    /// Draws that were solved.
    pub draws: usize,
    /// Draws that were no possible case (a mover wider than its bore) and were drawn again.
    pub redrawn: usize,
    /// The seed.
    pub seed: u64,
    /// Figures that every draw had.
    pub figures: Vec<Sampled>,
}

impl Sampled {
    /// Sums up the values of one figure; `None` below two draws.
    #[must_use]
    pub fn new(spread: &FigureSpread, values: &[f64]) -> Option<Self> {
        let count = f64::from(u32::try_from(values.len()).ok()?);
        if values.len() < 2 {
            return None;
        }
        let mean = values.iter().sum::<f64>() / count;
        let deviation = (values.iter().map(|v| (v - mean).powi(2)).sum::<f64>() / (count - 1.0)).sqrt();
        let by_deviation = COVERAGE * deviation;
        // Standard error of a standard deviation of normal values: s / sqrt(2 (n - 1)).
        let error = COVERAGE * by_deviation / (2.0 * (count - 1.0)).sqrt();
        let (half_width, error) = match percentiles(values, count) {
            Some((half, error)) if values.len() >= FOR_PERCENTILES => (half, error),
            _ => (by_deviation, error),
        };
        let agrees = (half_width - spread.half_width()).abs() <= error;
        Some(Self { name: spread.name.clone(), mean, half_width, error, agrees })
    }
}

/// Half the distance of the 2.5 and 97.5 % points, and the half-width of its 95 % interval: the ranks of both points are
/// uncertain by 1.96 sqrt(n p (1 - p)), and the two are taken as independent.
fn percentiles(values: &[f64], count: f64) -> Option<(f64, f64)> {
    let mut sorted = values.to_vec();
    sorted.sort_by(f64::total_cmp);
    let at = |rank: f64| -> Option<f64> { interpolated(&sorted, rank.clamp(0.0, count - 1.0)) };
    let swing = COVERAGE * (count * 0.025 * 0.975).sqrt();
    let (low, high) = (0.025 * count - 0.5, 0.975 * count - 0.5);
    let width = |rank: f64| Some(0.5 * (at(rank + swing)? - at(rank - swing)?));
    let (of_low, of_high) = (width(low)?, width(high)?);
    Some((0.5 * (at(high)? - at(low)?), 0.5 * of_low.hypot(of_high)))
}

/// The value at a rank between whole ones.
fn interpolated(sorted: &[f64], rank: f64) -> Option<f64> {
    let below = (0..sorted.len()).rev().find(|&i| f64::from(u32::try_from(i).unwrap_or(u32::MAX)) <= rank)?;
    let share = rank - f64::from(u32::try_from(below).ok()?);
    let above = sorted.get(below + 1).unwrap_or(&sorted[below]);
    Some(sorted[below] * (1.0 - share) + above * share)
}

//! How closely a model, or our own solution of a changed case, says what the table says.

/// Likeness of a table to a model.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Likeness {
    /// Root mean square of (table - model) over the scale of each point.
    pub apart: f64,
    /// The greatest of these, as a magnitude.
    pub most: f64,
    /// Points that both have.
    pub points: usize,
}

/// Compares a table with a model's values; `scale` is what a difference is a share of. `None` below one common point.
#[must_use]
pub fn likeness(table: &[f64], model: &[Option<f64>], scale: &[f64]) -> Option<Likeness> {
    let shares: Vec<f64> = table
        .iter()
        .zip(model)
        .zip(scale)
        .filter_map(|((t, m), s)| m.filter(|m| m.is_finite() && *s > 0.0).map(|m| (t - m) / s))
        .collect();
    let count = f64::from(u32::try_from(shares.len()).ok()?);
    if shares.is_empty() {
        return None;
    }
    let apart = (shares.iter().map(|x| x * x).sum::<f64>() / count).sqrt();
    Some(Likeness { apart, most: shares.iter().fold(0.0, |m: f64, x| m.max(x.abs())), points: shares.len() })
}

/// The factor between table and ours, where it is the same within `within` (relative) at all points, two or more.
#[must_use]
pub fn steady_factor(table: &[f64], ours: &[f64], within: f64) -> Option<f64> {
    let ratios: Vec<f64> = table.iter().zip(ours).filter(|(_, o)| o.abs() > 0.0).map(|(t, o)| t / o).collect();
    if ratios.len() < 2 || ratios.len() < table.len() {
        return None;
    }
    let count = f64::from(u32::try_from(ratios.len()).ok()?);
    let mean = ratios.iter().sum::<f64>() / count;
    ratios.iter().all(|r| (r - mean).abs() <= within * mean.abs()).then_some(mean)
}

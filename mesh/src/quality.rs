//! Quality figures of a node line.

use crate::NodeLine;

/// Smallest and largest cell and the largest ratio of neighbours.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LineQuality {
    /// Smallest cell, m.
    pub smallest_m: f64,
    /// Largest cell, m.
    pub largest_m: f64,
    /// Largest ratio of neighbouring cells, >= 1.
    pub growth: f64,
}

impl LineQuality {
    /// Measures `line`.
    #[must_use]
    pub fn of(line: &NodeLine) -> Self {
        let cells: Vec<f64> = (0..line.len().saturating_sub(1)).map(|i| line.cell(i)).collect();
        let ratio = |p: &[f64]| (p[1] / p[0]).max(p[0] / p[1]);
        Self {
            smallest_m: cells.iter().copied().fold(f64::INFINITY, f64::min),
            largest_m: cells.iter().copied().fold(0.0, f64::max),
            growth: cells.windows(2).map(ratio).fold(1.0, f64::max),
        }
    }
}

/// Whole cells of `line` between `low` and `high`, both on nodes.
#[must_use]
pub fn cells_between(line: &NodeLine, low: f64, high: f64) -> usize {
    line.nearest(high).saturating_sub(line.nearest(low))
}

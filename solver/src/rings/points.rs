//! Gauss-Legendre points carried to an interval.

use crate::sources::gauss::rule;

/// The rule of `n` points, 1 to 24.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct GaussRule {
    n: usize,
}

impl GaussRule {
    pub fn new(n: usize) -> Self {
        Self { n }
    }

    /// Pairs (x, weight) on [a, b].
    pub fn on(self, a: f64, b: f64) -> impl Iterator<Item = (f64, f64)> {
        let (middle, half) = (0.5 * (a + b), 0.5 * (b - a));
        rule(self.n).points.iter().map(move |(x, w)| (middle + half * x, half * w))
    }
}

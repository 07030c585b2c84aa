//! Gauss-Legendre rules of any number of points.

use std::f64::consts::PI;

/// Nodes and weights on [-1, 1]; exact for polynomials of degree 2 n - 1.
#[derive(Debug, Clone, PartialEq)]
pub struct GaussRule {
    nodes: Vec<f64>,
    weights: Vec<f64>,
}

impl GaussRule {
    /// The rule of `n` points (at least 1), by Newton's method on the Legendre polynomial.
    ///
    /// Accurate to a few units of round-off for the sizes used here (n up to 100).
    #[must_use]
    pub fn new(n: usize) -> Self {
        let n = n.max(1);
        let mut nodes = vec![0.0; n];
        let mut weights = vec![0.0; n];
        for i in 0..n.div_ceil(2) {
            let (x, weight) = root(n, i);
            nodes[i] = -x;
            nodes[n - 1 - i] = x;
            weights[i] = weight;
            weights[n - 1 - i] = weight;
        }
        Self { nodes, weights }
    }

    /// Pairs (x, weight) of the rule carried to [a, b].
    pub fn on(&self, a: f64, b: f64) -> impl Iterator<Item = (f64, f64)> + '_ {
        let (middle, half) = (0.5 * (a + b), 0.5 * (b - a));
        self.nodes.iter().zip(&self.weights).map(move |(x, w)| (middle + half * x, half * w))
    }
}

/// Root number `i` (0 the largest) of the Legendre polynomial of degree `n`, and its weight.
fn root(n: usize, i: usize) -> (f64, f64) {
    let mut x = (PI * (i as f64 + 0.75) / (n as f64 + 0.5)).cos();
    let mut slope = 1.0;
    for _ in 0..50 {
        let (value, derivative) = legendre(n, x);
        slope = derivative;
        let step = value / derivative;
        x -= step;
        if step.abs() < 1e-16 {
            slope = legendre(n, x).1;
            break;
        }
    }
    (x, 2.0 / ((1.0 - x * x) * slope * slope))
}

/// Legendre polynomial of degree `n` and its derivative at `x`, |x| < 1.
fn legendre(n: usize, x: f64) -> (f64, f64) {
    let (mut before, mut value) = (1.0, x);
    for j in 2..=n {
        let j = j as f64;
        (before, value) = (value, ((2.0 * j - 1.0) * x * value - (j - 1.0) * before) / j);
    }
    if n == 1 {
        return (x, 1.0);
    }
    (value, n as f64 * (x * value - before) / (x * x - 1.0))
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    #[test]
    fn rules_are_exact_for_polynomials() {
        for (n, degree) in [(1, 1), (2, 3), (5, 9), (12, 23), (31, 61)] {
            let sum: f64 = GaussRule::new(n).on(0.0, 2.0).map(|(x, w)| w * (x / 2.0).powi(degree)).sum();
            assert_relative_eq!(sum, 2.0 / (f64::from(degree) + 1.0), max_relative = 2e-14);
        }
    }
}

//! Gauss-Legendre rules on [-1, 1], computed once, and the order that an analytic integrand needs.

use std::f64::consts::PI;
use std::sync::LazyLock;

/// Highest order kept.
const HIGHEST: usize = 24;

/// Nodes and weights of one rule on [-1, 1].
pub(crate) struct GaussRule {
    /// (node, weight).
    pub(crate) points: Vec<(f64, f64)>,
}

static RULES: LazyLock<Vec<GaussRule>> = LazyLock::new(|| (1..=HIGHEST).map(legendre_rule).collect());

/// The rule of `n` points, `n` clamped to 1..=24.
pub(crate) fn rule(n: usize) -> &'static GaussRule {
    &RULES[n.clamp(1, HIGHEST) - 1]
}

/// The rule whose error on a unit interval [-1, 1] is about 1e-15 for an integrand analytic but for points
/// at least `distance` > 1 from the centre.
///
/// The error of n points falls as rho^(-2n), rho = d + sqrt(d^2 - 1) being the sum of half axes of the largest ellipse of
/// analyticity (L. N. Trefethen, Approximation Theory and Approximation Practice, 2013, theorem 19.3; from memory).
pub(crate) fn rule_for_distance(distance: f64) -> &'static GaussRule {
    let d = distance.clamp(1.05, 1e12);
    let log_rho = (d + (d * d - 1.0).sqrt()).ln();
    let n = (0.5 * 36.0 / log_rho).ceil().clamp(1.0, 24.0) + 1.0;
    #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped to 2..=25 above")]
    let n = n as usize;
    rule(n)
}

impl GaussRule {
    /// Integral of `f` over [centre - half, centre + half].
    #[inline]
    pub(crate) fn integrate(&self, centre: f64, half: f64, mut f: impl FnMut(f64) -> f64) -> f64 {
        half * self.points.iter().map(|&(x, w)| w * f(centre + half * x)).sum::<f64>()
    }
}

/// Newton iteration on the Legendre polynomial from the Chebyshev-like guess.
fn legendre_rule(n: usize) -> GaussRule {
    #[expect(clippy::cast_precision_loss, reason = "n is at most 24")]
    let order = n as f64;
    let points = (0..n)
        .map(|i| {
            #[expect(clippy::cast_precision_loss, reason = "i is at most 24")]
            let mut x = -(PI * (i as f64 + 0.75) / (order + 0.5)).cos();
            for _ in 0..8 {
                let (p, dp) = legendre(n, x);
                x -= p / dp;
            }
            let (_, dp) = legendre(n, x);
            (x, 2.0 / ((1.0 - x * x) * dp * dp))
        })
        .collect();
    GaussRule { points }
}

/// P_n(x) and its derivative by the three-term recurrence.
fn legendre(n: usize, x: f64) -> (f64, f64) {
    let (mut p0, mut p1) = (1.0, x);
    for k in 2..=n {
        #[expect(clippy::cast_precision_loss, reason = "k is at most 24")]
        let k = k as f64;
        (p0, p1) = (p1, ((2.0 * k - 1.0) * x * p1 - (k - 1.0) * p0) / k);
    }
    #[expect(clippy::cast_precision_loss, reason = "n is at most 24")]
    let n = n as f64;
    (p1, n * (p0 - x * p1) / (1.0 - x * x))
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    #[test]
    fn exact_on_polynomials() {
        for n in 1..=HIGHEST {
            let degree = 2 * n - 2;
            #[allow(clippy::cast_precision_loss, reason = "small whole numbers")]
            let exact = 2.0 / (degree as f64 + 1.0);
            #[allow(clippy::cast_possible_truncation, clippy::cast_possible_wrap, reason = "small whole numbers")]
            let sum = rule(n).integrate(0.0, 1.0, |x| x.powi(degree as i32));
            assert_relative_eq!(sum, exact, max_relative = 3e-14);
        }
    }

    #[test]
    fn order_for_distance_reaches_its_promise() {
        // 1/(d - x) has its only singular point at distance d.
        for d in [1.8, 2.0, 3.0, 4.0, 10.0, 100.0, 1e6] {
            let sum = rule_for_distance(d).integrate(0.0, 1.0, |x| 1.0 / (d - x));
            let exact = (2.0 / (d - 1.0)).ln_1p();
            assert_relative_eq!(sum, exact, max_relative = 2e-14);
        }
    }
}

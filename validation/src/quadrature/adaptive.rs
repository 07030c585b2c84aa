//! Adaptive quadrature of several integrands at once.

use super::Estimate;
use super::kronrod::{GAUSS, KRONROD, NODES};
use crate::Error;

/// Most panels before the integral is given up.
const MOST_PANELS: usize = 20_000;

/// Values of several integrals over the same interval.
#[derive(Debug, Clone, PartialEq)]
pub struct Integral {
    /// One estimate an integrand. The error is the difference of the two rules, which over-states it.
    pub estimates: Vec<Estimate>,
    /// How many times the integrands were evaluated.
    pub evaluations: usize,
}

/// Integrates `count` functions over the panels between `breaks` (increasing), halving the panels with the largest error
/// until each integral is known within `tolerance` of the integral of its absolute value.
///
/// `f(x, out)` writes all functions at `x`. Interior points alone are asked for.
///
/// # Errors
/// Whatever `f` reports, and [`Error::Unsettled`] after twenty thousand panels.
pub fn integrate(
    mut f: impl FnMut(f64, &mut [f64]) -> Result<(), Error>,
    count: usize,
    breaks: &[f64],
    tolerance: f64,
) -> Result<Integral, Error> {
    let mut panels = Vec::with_capacity(2 * breaks.len());
    for pair in breaks.windows(2) {
        panels.push(Panel::new(&mut f, count, pair[0], pair[1])?);
    }
    let mut evaluations = 21 * panels.len();
    loop {
        let total = Totals::of(&panels, count);
        if total.settled(tolerance) {
            return Ok(total.finish(evaluations));
        }
        if panels.len() > MOST_PANELS {
            return Err(total.unsettled(panels.len()));
        }
        let allowed: Vec<f64> = total.absolute.iter().map(|a| tolerance * a / panels.len() as f64).collect();
        let (coarse, fine): (Vec<_>, Vec<_>) = panels.into_iter().partition(|p| p.exceeds(&allowed));
        if coarse.is_empty() {
            return Err(total.unsettled(fine.len()));
        }
        panels = fine;
        for panel in coarse {
            let middle = 0.5 * (panel.from + panel.to);
            panels.push(Panel::new(&mut f, count, panel.from, middle)?);
            panels.push(Panel::new(&mut f, count, middle, panel.to)?);
            evaluations += 42;
        }
    }
}

/// Both rules on one interval.
struct Panel {
    from: f64,
    to: f64,
    value: Vec<f64>,
    absolute: Vec<f64>,
    error: Vec<f64>,
}

impl Panel {
    fn new(
        f: &mut impl FnMut(f64, &mut [f64]) -> Result<(), Error>,
        count: usize,
        from: f64,
        to: f64,
    ) -> Result<Self, Error> {
        let (middle, half) = (0.5 * (from + to), 0.5 * (to - from));
        let mut value = vec![0.0; count];
        let mut absolute = vec![0.0; count];
        let mut error = vec![0.0; count];
        let mut at = vec![0.0; count];
        for (i, node) in NODES.iter().enumerate() {
            let gauss = if i % 2 == 1 { GAUSS[i / 2] } else { 0.0 };
            let signs: &[f64] = if i == 10 { &[0.0] } else { &[-1.0, 1.0] };
            for sign in signs {
                f(middle + sign * half * node, &mut at)?;
                for (c, y) in at.iter().enumerate() {
                    value[c] += half * KRONROD[i] * y;
                    absolute[c] += half * KRONROD[i] * y.abs();
                    error[c] += half * (KRONROD[i] - gauss) * y;
                }
            }
        }
        for (e, a) in error.iter_mut().zip(&absolute) {
            // Below round-off the difference of the rules says nothing.
            *e = if e.abs() < 10.0 * f64::EPSILON * a { 0.0 } else { e.abs() };
        }
        Ok(Self { from, to, value, absolute, error })
    }

    fn exceeds(&self, allowed: &[f64]) -> bool {
        self.error.iter().zip(allowed).any(|(e, a)| e > a)
    }
}

/// Sums over all panels.
struct Totals {
    value: Vec<f64>,
    absolute: Vec<f64>,
    error: Vec<f64>,
}

impl Totals {
    fn of(panels: &[Panel], count: usize) -> Self {
        let mut total = Self { value: vec![0.0; count], absolute: vec![0.0; count], error: vec![0.0; count] };
        for panel in panels {
            for c in 0..count {
                total.value[c] += panel.value[c];
                total.absolute[c] += panel.absolute[c];
                total.error[c] += panel.error[c];
            }
        }
        total
    }

    fn settled(&self, tolerance: f64) -> bool {
        self.error.iter().zip(&self.absolute).all(|(e, a)| *e <= tolerance * a)
    }

    fn finish(self, evaluations: usize) -> Integral {
        let round_off = 1e-15;
        let estimates = (self.value.iter().zip(&self.error).zip(&self.absolute))
            .map(|((&value, error), absolute)| Estimate { value, error: error + round_off * absolute })
            .collect();
        Integral { estimates, evaluations }
    }

    fn unsettled(&self, panels: usize) -> Error {
        let error = self.error.iter().fold(0.0, |m: f64, e| m.max(*e));
        let scale = self.absolute.iter().fold(0.0, |m: f64, a| m.max(*a));
        Error::Unsettled { panels, error, scale }
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]
    use super::*;
    use approx::assert_relative_eq;

    #[test]
    fn smooth_singular_and_oscillating_integrands_together() {
        let f = |x: f64, out: &mut [f64]| {
            out[0] = x.exp();
            out[1] = x.sqrt() * (1.0 - x.ln());
            out[2] = (40.0 * x).sin().powi(2);
            Ok(())
        };
        let found = integrate(f, 3, &[0.0, 0.5, 1.0], 1e-12).unwrap();
        let exact = [1.0_f64.exp() - 1.0, 2.0 / 3.0 + 4.0 / 9.0, 0.5 - 80.0_f64.sin() / 160.0];
        for (estimate, exact) in found.estimates.iter().zip(exact) {
            assert_relative_eq!(estimate.value, exact, max_relative = 1e-12);
            assert!((estimate.value - exact).abs() <= estimate.error);
        }
    }

    #[test]
    fn an_integral_beyond_reach_is_reported() {
        let too_many_periods = |x: f64, out: &mut [f64]| {
            out[0] = (1e8 * x).sin();
            Ok(())
        };
        assert!(matches!(integrate(too_many_periods, 1, &[0.0, 1.0], 1e-12), Err(Error::Unsettled { .. })));
        let no_number = |_: f64, out: &mut [f64]| {
            out[0] = f64::NAN;
            Ok(())
        };
        assert!(matches!(integrate(no_number, 1, &[0.0, 1.0], 1e-12), Err(Error::Unsettled { .. })));
    }
}

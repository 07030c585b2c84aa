//! The grid convergence index of three grids, by the procedure that journals of fluid mechanics ask for.
//!
//! With f1, f2, f3 on the finest, middle and coarsest grid and r21, r32 the ratios of their cell sizes, the observed order p is
//! the root of p = |ln|e32/e21| + q(p)| / ln r21, q = ln((r21^p - s)/(r32^p - s)), e21 = f2 - f1, e32 = f3 - f2, s = sign(e32/e21), by
//! fixed-point iteration from q = 0; the extrapolated value (r21^p f1 - f2)/(r21^p - 1); the index 1.25 |(f1 - f2)/f1| / (r21^p - 1).
//!
//! This program's own bands come from another rule, made for errors in even powers; the index is a second opinion on them.
//! Source: I. B. Celik, U. Ghia, P. J. Roache, C. J. Freitas, H. Coleman, P. E. Raad, "Procedure for estimation and reporting of
//! uncertainty due to discretization in CFD applications", ASME Journal of Fluids Engineering 130, 078001 (2008), the five
//! steps, from memory.

/// What three grids say.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct GridConvergence {
    /// Observed order p.
    pub order: f64,
    /// Extrapolated value.
    pub extrapolated: f64,
    /// |(f1 - f2)/f1|.
    pub relative_difference: f64,
    /// |(f_ext - f1)/f_ext|.
    pub extrapolated_difference: f64,
    /// The index of the finest grid, relative.
    pub index: f64,
}

/// Safety factor of the index with three grids.
const SAFETY: f64 = 1.25;

impl GridConvergence {
    /// Of values on three grids, finest first, and the ratios of cell sizes middle/finest and coarsest/middle, both above 1.
    ///
    /// `None` where two values are equal, a ratio is no refinement, or the iteration finds no order.
    ///
    /// ```
    /// use lenzbore_validation::grid_convergence::GridConvergence;
    /// // The first worked example of the source: order 1.53, index 2.2 %.
    /// let found = GridConvergence::of([6.063, 5.972, 5.863], [1.5, 4.0 / 3.0]).unwrap();
    /// assert!((found.order - 1.53).abs() < 0.005 && (found.index - 0.022).abs() < 5e-4);
    /// ```
    #[must_use]
    pub fn of([f1, f2, f3]: [f64; 3], [r21, r32]: [f64; 2]) -> Option<Self> {
        let (e21, e32) = (f2 - f1, f3 - f2);
        if !(e21.abs() > 0.0 && e32.abs() > 0.0 && r21 > 1.0 && r32 > 1.0) {
            return None;
        }
        let sign = (e32 / e21).signum();
        let next = |q: f64| ((e32 / e21).abs().ln() + q).abs() / r21.ln();
        let mut order = next(0.0);
        let mut settled = false;
        for _ in 0..500 {
            let q = ((r21.powf(order) - sign) / (r32.powf(order) - sign)).ln();
            let after = next(q);
            settled = (after - order).abs() < 1e-12 * order.max(1.0);
            order = after;
            if settled {
                break;
            }
        }
        let gain = r21.powf(order) - 1.0;
        let extrapolated = f1 - e21 / gain;
        let relative_difference = (e21 / f1).abs();
        let found = Self {
            order,
            extrapolated,
            relative_difference,
            extrapolated_difference: ((extrapolated - f1) / extrapolated).abs(),
            index: SAFETY * relative_difference / gain,
        };
        (settled && found.index.is_finite() && found.extrapolated_difference.is_finite()).then_some(found)
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use super::*;

    /// A pure power of the cell size gives its order and limit back, at unequal ratios too.
    #[test]
    fn a_pure_power_is_found() {
        let f = |h: f64| 2.0 - 0.3 * h.powf(1.7);
        let found = GridConvergence::of([f(1.0), f(1.5), f(2.4)], [1.5, 1.6]).unwrap();
        approx::assert_relative_eq!(found.order, 1.7, max_relative = 1e-9);
        approx::assert_relative_eq!(found.extrapolated, 2.0, max_relative = 1e-12);
        approx::assert_relative_eq!(found.index, 1.25 * 0.3 / f(1.0), max_relative = 1e-9);
    }

    #[test]
    fn grids_that_say_nothing_are_refused() {
        assert_eq!(GridConvergence::of([1.0, 1.0, 2.0], [2.0, 2.0]), None);
        assert_eq!(GridConvergence::of([1.0, 1.1, 1.3], [2.0, 1.0]), None);
        assert_eq!(GridConvergence::of([1.0, f64::NAN, 1.3], [2.0, 2.0]), None);
    }
}

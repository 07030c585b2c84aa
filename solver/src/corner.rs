//! The field's exponent at the corner of a permeable section.
//!
//! Around a right-angled corner of relative permeability mu_r the potential goes as rho^L, L < 1, with
//! cot(L pi / 4) / mu_r = -cot(3 L pi / 4) (even solution across the corner's bisector; common practice, derived here from the
//! continuity of B_n and H_t). A scheme of second order then has errors in powers 2 L, 2, 4 L, ... of the cell size instead
//! of even ones, in figures that the corners dominate.

use std::f64::consts::FRAC_PI_4;

use crate::problem::{Extent, Wall};

/// L for a corner of relative permeability `mu_r` >= 1; 1 without a contrast.
///
/// 0.673921 at mu_r = 100, 2/3 in the limit.
#[must_use]
pub(crate) fn corner_exponent(mu_r: f64) -> f64 {
    let excess = |l: f64| 1.0 / ((l * FRAC_PI_4).tan() * mu_r) + 1.0 / (3.0 * l * FRAC_PI_4).tan();
    let (mut low, mut high) = (2.0 / 3.0, 1.0);
    for _ in 0..60 {
        let middle = 0.5 * (low + high);
        if excess(middle) > 0.0 {
            low = middle;
        } else {
            high = middle;
        }
    }
    0.5 * (low + high)
}

/// Powers of the cell size in a figure that the corners of a finite permeable wall dominate, for `levels` levels; `None`
/// where there are no such corners.
pub(crate) fn corner_powers(wall: &Wall, levels: usize) -> Option<Vec<f64>> {
    if wall.extent == Extent::Endless || !wall.is_permeable() {
        return None;
    }
    let contrast = |mu: f64| mu.max(1.0 / mu);
    let mu_r = wall.layers.iter().map(|l| contrast(l.relative_permeability)).fold(1.0, f64::max);
    let l = corner_exponent(mu_r);
    Some([2.0 * l, 2.0, 4.0 * l, 4.0].into_iter().take(levels.saturating_sub(1)).collect())
}

#[cfg(test)]
mod tests {
    use super::corner_exponent;

    #[test]
    fn limits_and_a_value() {
        approx::assert_relative_eq!(corner_exponent(1.0), 1.0, max_relative = 1e-12);
        approx::assert_relative_eq!(corner_exponent(1e9), 2.0 / 3.0, max_relative = 1e-8);
        // Computed independently with SciPy's brentq.
        approx::assert_relative_eq!(corner_exponent(100.0), 0.673_921_228_716, max_relative = 1e-11);
    }
}

//! Bessel functions of order 0 and 1 for the exact solutions, by their integral representations.
//!
//! J_n(x) = (1/pi) int_0^pi cos(n t - x sin t) dt, I_n(x) = (1/pi) int_0^pi exp(x cos t) cos(n t) dt,
//! K_n(x) = int_0^inf exp(-x cosh t) cosh(n t) dt (M. Abramowitz and I. A. Stegun, Handbook of Mathematical
//! Functions, 1964, eqs 9.1.21, 9.6.19, 9.6.24; numbers of the equations from memory). The midpoint rule converges
//! faster than any power on the periodic integrands, the trapezoidal rule on the one that dies out doubly
//! exponentially.

use std::f64::consts::PI;

/// First zero of J1 (Handbook, table 9.5; recomputed with mpmath to all digits).
pub(super) const FIRST_ZERO_OF_J1: f64 = 3.831_705_970_207_512;

const POINTS: u32 = 64;

fn mean_over_half_turn(f: impl Fn(f64) -> f64) -> f64 {
    (0..POINTS).map(|k| f(PI * (f64::from(k) + 0.5) / f64::from(POINTS))).sum::<f64>() / f64::from(POINTS)
}

/// J_n(x), n = 0 or 1, |x| < 40.
pub(super) fn j(order: u8, x: f64) -> f64 {
    mean_over_half_turn(|t| (f64::from(order) * t - x * t.sin()).cos())
}

/// I_n(x), n = 0 or 1, 0 <= x < 20.
pub(super) fn i(order: u8, x: f64) -> f64 {
    mean_over_half_turn(|t| (x * t.cos()).exp() * (f64::from(order) * t).cos())
}

/// K_n(x), n = 0 or 1, x > 0.01.
pub(super) fn k(order: u8, x: f64) -> f64 {
    const STEP: f64 = 0.1;
    let integrand = |t: f64| (-x * t.cosh()).exp() * (f64::from(order) * t).cosh();
    STEP * (0.5 * integrand(0.0) + (1..130).map(|m| integrand(STEP * f64::from(m))).sum::<f64>())
}

/// Values at 1 from mpmath 1.3, and the Wronskian I0 K1 + I1 K0 = 1/x.
#[test]
fn agree_with_known_values() {
    for (found, wanted) in [
        (j(0, 1.0), 0.765_197_686_557_966_6),
        (j(1, 1.0), 0.440_050_585_744_933_5),
        (i(0, 1.0), 1.266_065_877_752_008_4),
        (i(1, 1.0), 0.565_159_103_992_485),
        (k(0, 1.0), 0.421_024_438_240_708_3),
        (k(1, 1.0), 0.601_907_230_197_234_6),
    ] {
        approx::assert_relative_eq!(found, wanted, max_relative = 2e-15);
    }
    for x in [0.1, 0.7, 3.0, 9.0] {
        approx::assert_relative_eq!(i(0, x) * k(1, x) + i(1, x) * k(0, x), 1.0 / x, max_relative = 1e-14);
    }
    assert!(j(1, FIRST_ZERO_OF_J1).abs() < 1e-15);
}

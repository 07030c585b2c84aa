//! Physical constants, SI.

use std::f64::consts::PI;

/// Magnetic constant mu0, H/m: the conventional 4 pi 1e-7, which the references used in the checks
/// share (CODATA 2022 differs from it by 1.3e-10 relative, far below any band).
pub const MU0: f64 = 4.0e-7 * PI;

/// Standard acceleration of gravity g0, m/s2 (CGPM 1901, exact).
pub const STANDARD_GRAVITY: f64 = 9.80665;

//! The rule of thumb: a point dipole in a thin, endless, resistive tube, in closed form.
//!
//!   F = k v,   k = 45 mu0^2 m^2 sigma w / (1024 a^4)   (thin wall, radius a, thickness w),
//!   k = (15 mu0^2 m^2 sigma / 1024) (1/a^3 - 1/b^3)    (any wall a < r < b: the integral of the former over r).
//!
//! Sources: W. M. Saslow, American Journal of Physics 60, 693-711 (1992); Y. Levin, F. L. da Silveira, F. B. Rizzato, American
//! Journal of Physics 74, 815-817 (2006) (both from memory); the constant 45/1024 follows from the integral of x^4 K1(x)^2 over
//! x > 0, 45 pi^2/512, computed independently. Range: magnets short against a, w << a, mu0 sigma w v << 1.

use std::f64::consts::PI;

use crate::constants::MU0;
use crate::sources::Source;

/// Damping coefficient of a dipole of `moment` (A m2) in a thin wall of radius `radius` (m) and sheet conductance sigma w (S), N s/m.
///
/// ```
/// use lenzbore_solver::ladder::thin_wall_coefficient;
/// // 0.75 A m2, copper 58 MS/m, radius 7.5 mm, thickness 2 mm: 1.43109 N s/m (computed independently).
/// assert!((thin_wall_coefficient(0.75, 7.5e-3, 5.8e7 * 2e-3) - 1.43109).abs() < 5e-6);
/// ```
#[must_use]
pub fn thin_wall_coefficient(moment: f64, radius: f64, sheet_conductance: f64) -> f64 {
    45.0 / 1024.0 * (MU0 * moment).powi(2) * sheet_conductance / radius.powi(4)
}

/// Damping coefficient of a dipole in a wall between the radii `inner` and `outer` (m) of conductivity `sigma` (S/m), N s/m.
///
/// ```
/// use lenzbore_solver::ladder::thick_wall_coefficient;
/// assert!((thick_wall_coefficient(0.75, 7.5e-3, 9.5e-3, 5.8e7) - 0.90865).abs() < 5e-6);
/// ```
#[must_use]
pub fn thick_wall_coefficient(moment: f64, inner: f64, outer: f64, sigma: f64) -> f64 {
    15.0 / 1024.0 * (MU0 * moment).powi(2) * sigma * (inner.powi(-3) - outer.powi(-3))
}

/// Magnetic moment of a source along +z, A m2: remanence / mu0 times the volume; ampere-turns times the mean area.
#[must_use]
pub fn moment(source: &Source) -> f64 {
    match *source {
        Source::Dipole { moment_a_m2 } => moment_a_m2,
        Source::Magnet { inner_radius_m: i, outer_radius_m: o, length_m, remanence_tesla } => {
            remanence_tesla / MU0 * PI * (o * o - i * i) * length_m
        }
        Source::Coil { inner_radius_m: i, outer_radius_m: o, ampere_turns, .. } => {
            ampere_turns * PI * (o * o + o * i + i * i) / 3.0
        }
    }
}

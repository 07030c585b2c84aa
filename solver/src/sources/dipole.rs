//! The ideal axial point dipole.
//!
//! psi = (mu0 m/4 pi) r^2/R^3, B_r = (mu0 m/4 pi) 3 r z/R^5, B_z = (mu0 m/4 pi) (2 z^2 - r^2)/R^5, R^2 = r^2 + z^2
//! (J. D. Jackson, Classical Electrodynamics, 3rd ed., 1999, eqs 5.55 and 5.56; from memory).

use super::AxialField;
use super::current_loop::Jet;
use crate::constants::MU0;
use std::f64::consts::PI;

/// A moment along +z at the origin.
///
/// At the origin itself psi and B_r are zero and B_z is infinite with the moment's sign.
///
/// ```
/// use lenzbore_solver::sources::{AxialField, Dipole};
/// let dipole = Dipole { moment_a_m2: 1.0 };
/// assert!((dipole.flux_density_z(0.0, 0.01) / 0.2 - 1.0).abs() < 1e-15);
/// ```
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Dipole {
    /// Moment along +z, A m2, signed.
    pub moment_a_m2: f64,
}

impl Dipole {
    fn strength(&self) -> f64 {
        MU0 * self.moment_a_m2 / (4.0 * PI)
    }

    pub(crate) fn jet(&self, r: f64, z: f64) -> Jet {
        let square = r * r + z * z;
        let psi = self.psi(r, z);
        if square > 0.0 {
            let u = z / square;
            Jet { psi, slope: -3.0 * u * psi, curvature: (15.0 * u * u - 3.0 / square) * psi }
        } else {
            Jet::default()
        }
    }
}

impl AxialField for Dipole {
    fn psi(&self, r: f64, z: f64) -> f64 {
        if r > 0.0 {
            let q = r / r.hypot(z);
            self.strength() * q * q / r.hypot(z)
        } else {
            0.0
        }
    }

    fn flux_density_r(&self, r: f64, z: f64) -> f64 {
        if r > 0.0 {
            let distance = r.hypot(z);
            self.strength() * 3.0 * (r / distance) * (z / distance) / (distance * distance * distance)
        } else {
            0.0
        }
    }

    fn flux_density_z(&self, r: f64, z: f64) -> f64 {
        let distance = r.hypot(z);
        if distance > 0.0 {
            let (s, c) = (r / distance, z / distance);
            self.strength() * (2.0 * c * c - s * s) / (distance * distance * distance)
        } else {
            f64::INFINITY.copysign(self.moment_a_m2)
        }
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::float_cmp, reason = "exact limits are compared exactly")]
    use super::*;
    use crate::sources::CylinderSheet;
    use approx::assert_relative_eq;

    #[test]
    fn a_small_magnet_seen_from_afar() {
        // Moment of the sheet: K pi a^2 2b; the next multipole is (a/R)^2 smaller.
        let sheet = CylinderSheet { radius_m: 1e-4, half_length_m: 0.866e-4, tesla: MU0 };
        let dipole = Dipole { moment_a_m2: PI * 1e-8 * 2.0 * 0.866e-4 };
        for (r, z) in [(1.0, 0.3), (0.2, -1.0), (1e-9, 1.0), (0.7, 0.7)] {
            assert_relative_eq!(dipole.psi(r, z), sheet.psi(r, z), max_relative = 1e-7);
            assert_relative_eq!(dipole.flux_density_r(r, z), sheet.flux_density_r(r, z), max_relative = 1e-7);
            assert_relative_eq!(dipole.flux_density_z(r, z), sheet.flux_density_z(r, z), max_relative = 1e-7);
        }
    }

    #[test]
    fn derivatives_of_psi() {
        let dipole = Dipole { moment_a_m2: -0.4 };
        for (r, z) in [(1.0, 0.3), (0.2, -1.0), (0.7, 0.0)] {
            let h = 1e-3;
            let jet = dipole.jet(r, z);
            let psi = |dz: f64| dipole.psi(r, z + dz);
            let slope = (8.0 * (psi(h) - psi(-h)) - (psi(2.0 * h) - psi(-2.0 * h))) / (12.0 * h);
            assert_relative_eq!(jet.slope, slope, epsilon = 1e-10 * jet.psi.abs());
            assert_relative_eq!(jet.slope, -r * dipole.flux_density_r(r, z), max_relative = 1e-14);
            let curvature =
                (16.0 * (psi(h) + psi(-h)) - (psi(2.0 * h) + psi(-2.0 * h)) - 30.0 * psi(0.0)) / (12.0 * h * h);
            assert_relative_eq!(jet.curvature, curvature, epsilon = 1e-8 * jet.psi.abs());
        }
    }

    #[test]
    fn on_the_axis_and_at_the_origin() {
        let dipole = Dipole { moment_a_m2: -2.0 };
        assert_eq!((dipole.psi(0.0, 1.0), dipole.flux_density_r(0.0, 1.0)), (0.0, 0.0));
        assert_relative_eq!(dipole.flux_density_z(0.0, -0.5), -2.0 * 2.0 * 1e-7 / 0.125, max_relative = 1e-15);
        assert_eq!((dipole.psi(0.0, 0.0), dipole.flux_density_r(0.0, 0.0)), (0.0, 0.0));
        assert_eq!(dipole.flux_density_z(0.0, 0.0), f64::NEG_INFINITY);
        assert_relative_eq!(dipole.psi(1e-9, 1.0) / 1e-18, -2e-7, max_relative = 1e-14);
    }
}

//! Cylinder and ring magnets, uniformly magnetised along the axis, recoil permeability 1.
//!
//! The magnetisation M = remanence/mu0 is equivalent to the surface current M on the outer face and -M on the bore, so
//! the field is that of an outer sheet less an inner one. It is B everywhere, inside the material too, where it equals
//! mu0 H + remanence.

use super::AxialField;
use super::current_loop::Jet;
use super::sheet::CylinderSheet;

/// A cylinder (`inner_radius_m` = 0) or ring.
///
/// Accuracy as for [`CylinderSheet`]; deep in the bore of a ring of half length b and inner radius a, where
/// the sheets nearly cancel, (b/a)^2 times less.
///
/// ```
/// use lenzbore_solver::sources::{AxialField, Magnet};
/// // A cube-like cylinder: on the axis at the middle B_z = Br/sqrt(2) when its length is its diameter.
/// let magnet = Magnet { inner_radius_m: 0.0, outer_radius_m: 0.01, half_length_m: 0.01, remanence_tesla: 1.2 };
/// assert!((magnet.flux_density_z(0.0, 0.0) - 1.2 * 0.5_f64.sqrt()).abs() < 1e-15);
/// ```
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Magnet {
    /// Inner radius, m; 0 for a cylinder.
    pub inner_radius_m: f64,
    /// Outer radius, m, > inner.
    pub outer_radius_m: f64,
    /// Half of the length, m, > 0.
    pub half_length_m: f64,
    /// Remanence along +z, T, signed.
    pub remanence_tesla: f64,
}

impl Magnet {
    fn sheet(&self, radius_m: f64) -> CylinderSheet {
        CylinderSheet { radius_m, half_length_m: self.half_length_m, tesla: self.remanence_tesla }
    }

    /// The current on the outer face.
    #[must_use]
    pub fn outer_sheet(&self) -> CylinderSheet {
        self.sheet(self.outer_radius_m)
    }

    /// The sheet to subtract for the bore; none for a cylinder.
    #[must_use]
    pub fn bore_sheet(&self) -> Option<CylinderSheet> {
        (self.inner_radius_m > 0.0).then(|| self.sheet(self.inner_radius_m))
    }

    fn difference(&self, field: impl Fn(&CylinderSheet) -> f64) -> f64 {
        field(&self.outer_sheet()) - self.bore_sheet().map_or(0.0, |sheet| field(&sheet))
    }

    pub(crate) fn jet(&self, r: f64, z: f64) -> Jet {
        let outer = self.outer_sheet().jet(r, z);
        self.bore_sheet().map_or(outer, |sheet| outer.plus(-1.0, sheet.jet(r, z)))
    }
}

impl AxialField for Magnet {
    fn psi(&self, r: f64, z: f64) -> f64 {
        self.difference(|sheet| sheet.psi(r, z))
    }

    fn flux_density_r(&self, r: f64, z: f64) -> f64 {
        self.difference(|sheet| sheet.flux_density_r(r, z))
    }

    fn flux_density_z(&self, r: f64, z: f64) -> f64 {
        self.difference(|sheet| sheet.flux_density_z(r, z))
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::sources::quadrature::{integrate, sheet_fields};
    use approx::assert_relative_eq;

    const RING: Magnet = Magnet { inner_radius_m: 0.6, outer_radius_m: 1.0, half_length_m: 0.8, remanence_tesla: -1.3 };

    #[test]
    fn ring_against_quadrature() {
        for r in [1e-9, 0.3, 0.599, 0.61, 0.8, 0.99, 1.01, 1.7, 200.0] {
            for z in [0.0, 1e-5, 0.5, 0.8, 0.81, 3.0, 200.0] {
                let (outer, inner) = (sheet_fields((1.0, 0.8), r, z), sheet_fields((0.6, 0.8), r, z));
                let [psi, br, bz] = [0, 1, 2].map(|i| RING.remanence_tesla * (outer[i] - inner[i]));
                // The use needs 1e-9; the largest difference met is 3e-14.
                assert_relative_eq!(RING.psi(r, z), r * r * psi, max_relative = 1e-12);
                assert_relative_eq!(RING.flux_density_r(r, z), r * br, max_relative = 1e-12);
                assert_relative_eq!(RING.flux_density_z(r, z), bz, epsilon = 1e-12 * bz.hypot(r * br));
            }
        }
    }

    #[test]
    fn equals_its_pole_faces_in_the_bore_of_a_long_ring() {
        // On the axis the charges +-Br on the end faces give B_z = (Br/2) [z'/sqrt(z'^2 + a^2)] taken over both radii
        // and ends; integrated here as discs of charge, which do not cancel as the sheets do.
        let ring = Magnet { inner_radius_m: 0.9, outer_radius_m: 1.0, half_length_m: 20.0, remanence_tesla: 1.0 };
        for z in [0.0, 5.0, 15.0] {
            let face = |u: f64| integrate(0.9, 1.0, 1e-13, &mut |a| a * u / (2.0 * (a * a + u * u).powf(1.5)));
            let exact = face(z - 20.0) - face(z + 20.0);
            assert_relative_eq!(ring.flux_density_z(0.0, z), exact, max_relative = 1e-10);
        }
    }

    #[test]
    fn flux_density_is_the_curl_of_psi() {
        for (r, z) in [(0.3, 0.2), (0.8, 0.7), (0.8, -0.9), (1.2, 0.8), (1.02, 0.1), (2.0, -5.0), (30.0, 11.0)] {
            let edge = (r - 1.0_f64).abs().min((r - 0.6_f64).abs()).max(1e-9);
            let h = 0.01 * edge.max(0.02);
            let richardson = |f: &dyn Fn(f64) -> f64| {
                let d = |h: f64| (f(h) - f(-h)) / (2.0 * h);
                let (d1, d2, d4) = (d(h), d(2.0 * h), d(4.0 * h));
                let (e1, e2) = ((4.0 * d1 - d2) / 3.0, (4.0 * d2 - d4) / 3.0);
                (16.0 * e1 - e2) / 15.0
            };
            let dr = richardson(&|h| RING.psi(r + h, z)) / r;
            let dz = -richardson(&|h| RING.psi(r, z + h)) / r;
            let whole = dr.hypot(dz);
            assert_relative_eq!(RING.flux_density_z(r, z), dr, epsilon = 1e-9 * whole);
            assert_relative_eq!(RING.flux_density_r(r, z), dz, epsilon = 1e-9 * whole);
        }
    }

    #[test]
    fn no_flux_is_lost_through_a_closed_cylinder() {
        for (r, low, high) in [(0.8_f64, -0.3, 0.5), (1.5, 0.2, 3.0), (0.3, -2.0, 0.8)] {
            let face = |z: f64| {
                let cuts = if r > 0.6 { vec![0.0, 0.6, r.min(1.0), r.max(1.0)] } else { vec![0.0, r] };
                let flux = &mut |x: f64| x * RING.flux_density_z(x, z);
                cuts.windows(2).filter(|c| c[1] <= r).map(|c| integrate(c[0], c[1], 1e-12, flux)).sum::<f64>()
            };
            let barrel = r * integrate(low, high, 1e-12, &mut |z| RING.flux_density_r(r, z));
            let (bottom, top) = (face(low), face(high));
            assert_relative_eq!(top - bottom + barrel, 0.0, epsilon = 1e-10 * top.abs());
            assert_relative_eq!(top, RING.psi(r, high), max_relative = 1e-10);
        }
    }

    #[test]
    fn inside_the_material_it_is_b() {
        // A flat disc has B ~ 0 and H ~ -M in it; a long rod has B ~ Br.
        let disc = Magnet { inner_radius_m: 0.0, outer_radius_m: 1.0, half_length_m: 1e-4, remanence_tesla: 1.0 };
        assert!(disc.flux_density_z(0.2, 0.0).abs() < 2e-4);
        let rod = Magnet { inner_radius_m: 0.0, outer_radius_m: 1.0, half_length_m: 100.0, remanence_tesla: 1.0 };
        assert_relative_eq!(rod.flux_density_z(0.2, 0.0), 1.0, epsilon = 1e-4);
    }
}

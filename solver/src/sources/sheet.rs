//! The thin cylindrical current sheet: an ideal solenoid, or the surface of a uniformly magnetised cylinder.
//!
//! With k'^2 = 4 a r/((a+r)^2 + z^2), h'^2 = 4 a r/(a+r)^2 and a sheet current K_s, the usual closed forms are, each
//! taken from z - b to z + b (alpha, beta: a, z over sqrt(z^2 + (r+a)^2); gamma = (a-r)/(a+r); C: Bulirsch's cel with
//! the complement of k'),
//!
//! - psi = (mu0 K_s/2 pi) sqrt(a r) z k' ((k'^2 + h'^2 - h'^2 k'^2)/(h'^2 k'^2) K - E/k'^2 + ((h'^2 - 1)/h'^2) Pi),
//!   E. E. Callaghan & S. H. Maslen, The magnetic field of a finite solenoid, NASA TN D-465 (1960);
//! - B_r = (mu0 K_s/pi) alpha C(1, 1, -1), B_z = (mu0 K_s/pi) (a/(a+r)) beta C(gamma^2, 1, gamma),
//!   N. Derby & S. Olbert, Cylindrical magnets and ideal solenoids, American Journal of Physics 78, 229-235 (2010).
//!
//! Both are from memory and were confirmed by quadrature. They are evaluated here in the cancellation-free form of
//! `current_loop.rs`. Where both ends are so far away that their difference would cancel, the loops between them are
//! summed by Gauss-Legendre quadrature, to the same 1e-15.

use super::AxialField;
use super::current_loop::{Jet, LoopGeometry};
use super::gauss::{GaussRule, rule_for_distance};

/// Distance from the middle of an interval to the filament's radius, in half intervals, from which the ends' difference
/// is replaced by quadrature (9 points at this distance, fewer beyond).
const FAR: f64 = 4.0;

/// Uniform azimuthal sheet current on r = `radius_m`, |z| < `half_length_m`.
///
/// psi, B_r and B_z are good to about 1e-14 relative (B_z: relative to |B| near its change of sign), on the axis, inside,
/// at the ends' planes and hundreds of radii away (beyond the end of a magnet some hundred radii long, where neither rule
/// applies well: 1e-11). At r = `radius_m` psi and B_r are continuous and B_z takes its mean; on the edge itself, where
/// B_r is logarithmically infinite, a finite value stands for it.
///
/// ```
/// use lenzbore_solver::sources::{AxialField, CylinderSheet};
/// let sheet = CylinderSheet { radius_m: 1.0, half_length_m: 1.0, tesla: 1.0 };
/// assert!((sheet.flux_density_z(0.0, 0.0) - 0.5_f64.sqrt()).abs() < 1e-15);
/// ```
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct CylinderSheet {
    /// Radius, m, > 0.
    pub radius_m: f64,
    /// Half of the length, m, > 0.
    pub half_length_m: f64,
    /// mu0 times the sheet current density (a magnet: its remanence), T, signed: positive for a moment along +z.
    pub tesla: f64,
}

/// Middle and half width of an interval, with the rule to integrate over it where that is better than a difference of its
/// ends.
struct Interval {
    centre: f64,
    half: f64,
    rule: Option<&'static GaussRule>,
}

impl CylinderSheet {
    fn at(&self, r: f64, z: f64) -> LoopGeometry {
        LoopGeometry::new(self.radius_m, r, z)
    }

    fn interval(&self, r: f64, centre: f64, half: f64) -> Interval {
        let distance = (centre * centre + (r - self.radius_m) * (r - self.radius_m)).sqrt();
        let rule = (distance > FAR * half).then(|| rule_for_distance(distance / half));
        Interval { centre, half, rule }
    }

    /// Heights of the field point over the loops, where it lies beyond an end.
    fn beyond(&self, r: f64, z: f64) -> Option<Interval> {
        (z.abs() > self.half_length_m).then(|| self.interval(r, z.abs(), self.half_length_m))
    }

    /// psi/r^2, T.
    pub(crate) fn psi_over_r2(&self, r: f64, z: f64) -> f64 {
        if let Some(Interval { centre, half, rule: Some(rule) }) = self.beyond(r, z) {
            return self.tesla * rule.integrate(centre, half, |u| self.at(r, u).psi_over_r2());
        }
        let (up, down) = (z + self.half_length_m, z - self.half_length_m);
        self.tesla * (self.at(r, up).column_psi_over_r2() - self.at(r, down).column_psi_over_r2())
    }

    /// (d psi/dz)/r^2 = -B_r/r, T/m. The loop's psi is even in z, so the sheet's slope is a difference over
    /// the interval of half width min(|z|, b) about max(|z|, b): it keeps its digits as z -> 0 too.
    pub(crate) fn slope_over_r2(&self, r: f64, z: f64) -> f64 {
        let b = self.half_length_m;
        let Interval { centre, half, rule } = self.interval(r, z.abs().max(b), z.abs().min(b));
        let difference = match rule {
            Some(rule) => rule.integrate(centre, half, |u| self.at(r, u).slope_over_r2()),
            None => self.at(r, z.abs() + b).psi_over_r2() - self.at(r, z.abs() - b).psi_over_r2(),
        };
        self.tesla * if z < 0.0 { -difference } else { difference }
    }

    /// psi and its derivatives along z.
    pub(crate) fn jet(&self, r: f64, z: f64) -> Jet {
        let (upper, lower) = (z + self.half_length_m, z - self.half_length_m);
        if let Some(Interval { rule: Some(_), .. }) = self.beyond(r, z) {
            let r2 = r * r;
            let curvature = self.at(r, upper).slope_over_r2() - self.at(r, lower).slope_over_r2();
            return Jet {
                psi: r2 * self.psi_over_r2(r, z),
                slope: r2 * self.slope_over_r2(r, z),
                curvature: self.tesla * r2 * curvature,
            };
        }
        let ends = self.at(r, upper).column_jet().plus(-1.0, self.at(r, lower).column_jet());
        Jet::default().plus(self.tesla, ends)
    }
}

impl AxialField for CylinderSheet {
    fn psi(&self, r: f64, z: f64) -> f64 {
        r * r * self.psi_over_r2(r, z)
    }

    fn flux_density_r(&self, r: f64, z: f64) -> f64 {
        -r * self.slope_over_r2(r, z)
    }

    fn flux_density_z(&self, r: f64, z: f64) -> f64 {
        if let Some(Interval { centre, half, rule: Some(rule) }) = self.beyond(r, z) {
            return self.tesla * rule.integrate(centre, half, |u| self.at(r, u).flux_density_z());
        }
        let (up, down) = (z + self.half_length_m, z - self.half_length_m);
        self.tesla * (self.at(r, up).column_flux_density_z() - self.at(r, down).column_flux_density_z())
    }
}

#[cfg(test)]
mod tests {
    #![allow(
        clippy::float_cmp,
        clippy::approx_constant,
        reason = "exact limits are compared exactly; tables give digits"
    )]
    use super::*;
    use crate::sources::quadrature::{integrate, sheet_fields};
    use approx::assert_relative_eq;
    use std::f64::consts::PI;

    fn sheet(half_length_m: f64) -> CylinderSheet {
        CylinderSheet { radius_m: 1.0, half_length_m, tesla: 1.0 }
    }

    /// Largest error of psi and B_r relative to themselves and of B_z relative to |B| at one point.
    fn worst_error(b: f64, r: f64, z: f64) -> f64 {
        let [psi, br, bz] = sheet_fields((1.0, b), r, z);
        let s = sheet(b);
        let e_psi = (s.psi_over_r2(r, z) / psi - 1.0).abs();
        let e_br = if z.abs() > 0.0 { (-s.slope_over_r2(r, z) / br - 1.0).abs() } else { s.slope_over_r2(r, z).abs() };
        let e_bz = (s.flux_density_z(r, z) - bz).abs() / bz.hypot(r * br);
        e_psi.max(e_br).max(e_bz)
    }

    /// The use needs 1e-9; the largest difference met is 3e-12, at 1e-6 radii from the edge (the references' own limit
    /// there), 3e-15 elsewhere.
    const PROMISE: f64 = 1e-11;

    #[test]
    fn near_and_far_against_quadrature() {
        for b in [1e-3, 0.3, 1.0, 7.0] {
            for r in [1e-9, 1e-4, 0.4, 0.97, 1.03, 2.0, 200.0] {
                for z in [0.0, 1e-6 * b, 0.6 * b, b, 1.02 * b, b + 0.5, 4.5 * b, 200.0] {
                    let error = worst_error(b, r, z);
                    assert!(error < PROMISE, "b {b} r {r} z {z}: {error:.1e}");
                }
            }
        }
    }

    #[test]
    fn near_the_edge_against_quadrature() {
        for d in [1e-2, 1e-4, 1e-6] {
            for (dr, dz) in [(d, 0.0), (-d, 0.0), (0.0, d), (0.0, -d), (d, d), (-d, -d), (0.3 * d, -d), (-d, 0.2 * d)] {
                let error = worst_error(0.8, 1.0 + dr, 0.8 + dz);
                assert!(error < PROMISE, "dr {dr} dz {dz}: {error:.1e}");
            }
        }
    }

    /// (b, r, z, B_r, B_z) with a = 1, mu0 K = 1: computed independently from the formulas of N. Derby & S. Olbert,
    /// American Journal of Physics 78, 229-235 (2010). Tolerance: the twelve digits given.
    const DERBY_OLBERT: [(f64, f64, f64, f64, f64); 21] = [
        (1.0, 0.0, 0.0, 0.0, 0.707_106_781_187),
        (1.0, 0.5, 0.0, 0.0, 0.739_446_877_768),
        (1.0, 0.9, 0.0, 0.0, 0.803_129_103_832),
        (1.0, 0.0, 1.0, 0.0, 0.447_213_595_500),
        (1.0, 0.5, 1.0, 0.128_394_173_322, 0.450_434_688_974),
        (1.0, 1.2, 0.0, 0.0, -0.143_297_918_091),
        (1.0, 1.2, 0.5, 0.096_729_784_110, -0.144_302_418_933),
        (1.0, 1.2, 1.0, 0.242_068_408_839, -0.037_377_253_437),
        (1.0, 1.5, 1.0, 0.116_420_410_967, -0.031_383_665_299),
        (1.0, 1.5, 2.0, 0.049_109_656_978, 0.030_058_094_976),
        (1.0, 2.0, 0.0, 0.0, -0.051_852_720_002),
        (1.0, 2.0, 3.0, 0.015_208_147_044, 0.011_527_672_972),
        (0.5, 0.0, 0.0, 0.0, 0.447_213_595_500),
        (0.5, 0.5, 0.0, 0.0, 0.506_266_182_630),
        (0.5, 0.5, 0.5, 0.097_977_879_233, 0.369_723_438_884),
        (0.5, 1.2, 0.5, 0.198_504_670_198, -0.071_648_959_046),
        (0.5, 1.5, 1.0, 0.065_875_229_810, 0.007_247_322_072),
        (2.0, 0.5, 0.0, 0.0, 0.900_869_377_948),
        (2.0, 0.5, 2.0, 0.137_219_072_436, 0.485_380_842_828),
        (2.0, 1.2, 2.0, 0.257_922_627_821, -0.013_274_962_179),
        (2.0, 1.5, 4.0, 0.019_421_336_912, 0.025_147_263_478),
    ];

    /// (b, r, z, A_phi) with a = 1, mu0 K = 1: computed independently from the formula of E. E. Callaghan & S. H. Maslen,
    /// NASA TN D-465 (1960), and confirmed by quadrature. Tolerance: the twelve digits given.
    const CALLAGHAN_MASLEN: [(f64, f64, f64, f64); 10] = [
        (1.0, 0.5, 0.0, 0.180_855_966_408),
        (1.0, 1.2, 0.0, 0.290_536_393_195),
        (1.0, 1.2, 1.0, 0.181_645_474_162),
        (1.0, 1.5, 2.0, 0.049_874_123_338),
        (1.0, 2.0, 0.0, 0.118_961_575_804),
        (0.5, 0.5, 0.0, 0.118_961_575_804),
        (0.5, 1.2, 0.0, 0.198_589_971_562),
        (0.5, 1.2, 0.5, 0.145_268_196_598),
        (0.5, 1.5, 1.0, 0.061_169_198_404),
        (0.5, 2.0, 0.0, 0.066_404_775_701),
    ];

    #[test]
    fn values_of_the_published_formulas() {
        for (b, r, z, br, bz) in DERBY_OLBERT {
            assert_relative_eq!(sheet(b).flux_density_r(r, z), br, epsilon = 6e-13);
            assert_relative_eq!(sheet(b).flux_density_z(r, z), bz, epsilon = 6e-13);
        }
        for (b, r, z, a_phi) in CALLAGHAN_MASLEN {
            assert_relative_eq!(sheet(b).psi(r, z), r * a_phi, epsilon = 6e-13 * r);
        }
    }

    /// (2a/l, K): computed independently from Lorenz's formula; 1.0, 0.5, 2, 5 and 10 agree with the values printed by H.
    /// Nagaoka, Journal of the College of Science, Tokyo 27(6) (1909), as remembered. Tolerance: the ten digits given.
    const NAGAOKA: [(f64, f64); 7] = [
        (0.05, 0.979_091_743_3),
        (0.2, 0.920_092_670_8),
        (0.5, 0.818_135_751_9),
        (1.0, 0.688_422_607_3),
        (2.0, 0.525_510_024_3),
        (5.0, 0.319_825_467_8),
        (10.0, 0.203_323_517_5),
    ];

    #[test]
    fn self_inductance_from_psi_on_the_sheet_itself() {
        // Mean linkage over the sheet: (1/l) int 2 pi psi dz = mu0 K pi a^2 x Nagaoka's coefficient.
        for (diameter_over_length, coefficient) in NAGAOKA {
            let b = 1.0 / diameter_over_length;
            let s = sheet(b);
            let mean = integrate(0.0, b, 1e-12, &mut |z| 2.0 * PI * s.psi(1.0, z)) / b;
            assert_relative_eq!(mean / PI, coefficient, epsilon = 1e-10);
        }
    }

    /// (gap/R, force/(mu0 M^2 R^2)) of two equal coaxial magnets of length R, magnetised alike: computed independently by
    /// integrating Maxwell's mutual inductance of loops over both surfaces. Tolerance: the nine digits given.
    const ATTRACTION: [(f64, f64); 6] = [
        (0.05, 0.816_799_841),
        (0.1, 0.712_225_375),
        (0.2, 0.565_085_798),
        (0.5, 0.320_282_937),
        (1.0, 0.146_379_021),
        (2.0, 0.041_122_657),
    ];

    #[test]
    fn force_between_magnets() {
        for (gap, expected) in ATTRACTION {
            // F_z on the upper sheet = -2 pi M int r B_r dz = 2 pi M (psi at its upper end - psi at its lower end).
            let s = sheet(0.5);
            let force = 2.0 * PI * (s.psi(1.0, 1.5 + gap) - s.psi(1.0, 0.5 + gap));
            assert_relative_eq!(-force, expected, epsilon = 1e-9);
        }
    }

    #[test]
    fn on_the_axis() {
        let s = sheet(0.7);
        for z in [0.0, 0.3, 0.7, 2.0, 200.0] {
            let cosine = |u: f64| u / u.hypot(1.0);
            let exact = 0.5 * (cosine(z + 0.7) - cosine(z - 0.7));
            assert_relative_eq!(s.flux_density_z(0.0, z), exact, max_relative = if z > 100.0 { 1e-10 } else { 1e-14 });
            assert_eq!((s.psi(0.0, z), s.flux_density_r(0.0, z)), (0.0, 0.0));
            // psi = r^2 B_z(0)/2, B_r = -(r/2) dB_z/dz close to the axis.
            assert_relative_eq!(s.psi(1e-9, z) / 1e-18, 0.5 * s.flux_density_z(0.0, z), max_relative = 1e-13);
        }
    }

    #[test]
    fn on_the_sheet() {
        let s = sheet(0.7);
        let step = 1e-9;
        for z in [0.0, 0.4, 0.69, 0.71, 1.5] {
            let jump = if z < 0.7 { 1.0 } else { 0.0 };
            let (inside, outside) = (s.flux_density_z(1.0 - step, z), s.flux_density_z(1.0 + step, z));
            assert_relative_eq!(inside - outside, jump, epsilon = 1e-6);
            assert_relative_eq!(s.flux_density_z(1.0, z), 0.5 * (inside + outside), epsilon = 1e-7);
            assert_relative_eq!(s.psi(1.0 - step, z), s.psi(1.0 + step, z), max_relative = 1e-7);
            assert_relative_eq!(s.flux_density_r(1.0 - step, z), s.flux_density_r(1.0 + step, z), epsilon = 1e-7);
        }
        // A point on the sheet between the ends sees one column upward, one downward: exact by symmetry at the end
        // plane.
        assert_relative_eq!(
            s.flux_density_z(1.0, 0.7),
            0.5 * sheet(1.4).flux_density_z(1.0, 0.0),
            max_relative = 1e-14
        );
        assert!(s.flux_density_r(1.0, 0.7).is_finite() && s.psi(1.0, 0.7).is_finite());
    }

    #[test]
    fn symmetric_in_z() {
        let s = sheet(0.7);
        for (r, z) in [(0.2, 0.1), (1.0, 0.7), (1.3, 2.0), (0.5, 9.0), (30.0, 0.4)] {
            assert_eq!(s.psi(r, z), s.psi(r, -z));
            assert_eq!(s.flux_density_r(r, z), -s.flux_density_r(r, -z));
            assert_eq!(s.flux_density_z(r, z), s.flux_density_z(r, -z));
        }
    }

    #[test]
    fn jet_repeats_the_fields() {
        let s = sheet(0.7);
        for (r, z) in [(0.2, 0.1), (0.999, 0.701), (1.3, 2.0), (0.5, -9.0), (30.0, 0.4), (2.0, -30.0)] {
            let jet = s.jet(r, z);
            assert_relative_eq!(jet.psi, s.psi(r, z), max_relative = 1e-13);
            assert_relative_eq!(jet.slope, -r * s.flux_density_r(r, z), max_relative = 1e-13);
            let h = 1e-3 * (z.abs() - 0.7).hypot(r - 1.0);
            let slope = |dz: f64| s.jet(r, z + dz).slope;
            let richardson = (8.0 * (slope(h) - slope(-h)) - (slope(2.0 * h) - slope(-2.0 * h))) / (12.0 * h);
            assert_relative_eq!(jet.curvature, richardson, max_relative = 3e-9);
        }
    }
}

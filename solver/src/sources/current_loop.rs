//! The circular filament and the half-endless current sheet above it: the kernels of every extended source.
//!
//! With a the filament's radius and (r, z) the field point, R = sqrt((a+r)^2 + z^2), R1 = sqrt((a-r)^2 + z^2),
//! S = R + R1, all integrals have modulus k = (R - R1)/(R + R1) = 4 a r/S^2, complement kc = 2 sqrt(R R1)/S and
//! characteristic h k, h = min(a, r)/max(a, r).
//!
//! These are Maxwell's and Callaghan & Maslen's closed forms after one Landen transformation. In the usual modulus
//! 4 a r/R^2 the first-, second- and third-kind terms cancel to O(k^2) for r << a and r >> a; after the transformation
//! (derived with w = exp(i phi) by shrinking the contour of the defining integral onto the cut 0 <= w <= k) all terms
//! have one sign but for one that is never near the sum of the others, so no digit is lost anywhere but in the true
//! sign change of a loop's B_z.
//!
//! Sources: J. C. Maxwell, A Treatise on Electricity and Magnetism, art. 701 (the transformed form of the mutual
//! inductance); NIST DLMF 19.34; E. E. Callaghan & S. H. Maslen, The magnetic field of a finite solenoid, NASA TN D-465
//! (1960); N. Derby & S. Olbert, Cylindrical magnets and ideal solenoids, American Journal of Physics 78, 229-235 (2010).

use super::elliptic::{cel, cel2};
use std::cmp::Ordering;
use std::f64::consts::PI;

/// Filament and field point. Lengths in m; every field is for mu0 x current (or mu0 x sheet current) = 1.
#[derive(Debug, Clone, Copy)]
pub(crate) struct LoopGeometry {
    /// Filament radius a > 0.
    a: f64,
    /// Field radius r >= 0.
    r: f64,
    /// Field height over the filament.
    z: f64,
    /// R R1.
    rr1: f64,
    /// R + R1.
    s: f64,
    /// |a^2 - r^2|, without cancellation.
    difference: f64,
    /// Complementary modulus.
    kc: f64,
}

/// The kernel of psi and its first two derivatives along z.
#[derive(Debug, Clone, Copy, Default, PartialEq)]
pub(crate) struct Jet {
    /// psi, Wb/rad.
    pub(crate) psi: f64,
    /// d psi/dz = -r B_r, Wb/(rad m).
    pub(crate) slope: f64,
    /// d2 psi/dz2, Wb/(rad m2).
    pub(crate) curvature: f64,
}

impl Jet {
    /// `self + factor * other`.
    pub(crate) fn plus(self, factor: f64, other: Self) -> Self {
        Self {
            psi: self.psi + factor * other.psi,
            slope: self.slope + factor * other.slope,
            curvature: self.curvature + factor * other.curvature,
        }
    }
}

impl LoopGeometry {
    #[inline]
    pub(crate) fn new(a: f64, r: f64, z: f64) -> Self {
        let zz = z * z;
        let far = ((a + r) * (a + r) + zz).sqrt();
        let near = ((a - r) * (a - r) + zz).sqrt();
        let (rr1, s) = (far * near, far + near);
        Self { a, r, z, rr1, s, difference: (a - r).abs() * (a + r), kc: 2.0 * rr1.sqrt() / s }
    }

    /// psi of the loop over r^2: (8 a^2/(pi S^3)) D(k), D = (K - E)/k^2.
    pub(crate) fn psi_over_r2(&self) -> f64 {
        8.0 * self.a * self.a / (PI * self.s * self.s * self.s) * cel2(self.kc, 0.0, 1.0)
    }

    /// d psi/dz of the loop over r^2: -(8 a^2 z/(pi S^3 R R1)) (2 B(k)/kc^2 + D(k)), B = K - D.
    pub(crate) fn slope_over_r2(&self) -> f64 {
        let bracket = cel2(self.kc, 2.0 / self.kc_squared(), 1.0);
        -8.0 * self.a * self.a * self.z / (PI * self.s * self.s * self.s * self.near_product()) * bracket
    }

    /// psi of the loop and its first two derivatives along z (not divided by r^2).
    ///
    /// With R1 the distance of the near side, R of the far one, sigma = a^2 + r^2 + z^2, in the usual modulus (kc = R1/R):
    /// psi' = -(z Q/(2 pi R)), Q = sigma E/R1^2 - K; psi'' is its derivative, off by some (a/r)^2 roundings where r << a.
    pub(crate) fn jet(&self) -> Jet {
        let Self { a, r, z, .. } = *self;
        let (near2, far2) = ((a - r) * (a - r) + z * z, (a + r) * (a + r) + z * z);
        let near2 = near2.max(1e-30 * far2);
        let kc = (near2 / far2).sqrt();
        let (b, d) = (cel2(kc, 1.0, 0.0), cel2(kc, 0.0, 1.0));
        let (k, e) = (b + d, b + kc * kc * d);
        let sigma = a * a + r * r + z * z;
        let q = sigma * e / near2 - k;
        let dq = z * (e / near2 - k / far2 - 4.0 * a * r * e / (near2 * near2) - sigma / (near2 * far2) * (e - k));
        let far = far2.sqrt();
        let curvature = -(q * (1.0 - z * z / far2) + z * dq) / (2.0 * PI * far);
        Jet { psi: r * r * self.psi_over_r2(), slope: r * r * self.slope_over_r2(), curvature }
    }

    /// B_z of the loop: (8 a^2/(pi S^3)) ((1 - 2t) B/kc^2 + (1 - t) D), t = r^2 (S^2 - 4 a^2)/(S^2 R R1).
    pub(crate) fn flux_density_z(&self) -> f64 {
        let Self { a, r, z, s, difference, .. } = *self;
        let rr1 = self.near_product();
        // S^2 - 4 a^2, each branch a sum of terms of one sign.
        let excess = if r < a {
            2.0 * z * z * (1.0 + (2.0 * (a * a + r * r) + z * z) / (rr1 + difference))
        } else {
            2.0 * (difference + z * z + rr1)
        };
        let t = r * r * excess / (s * s * rr1);
        8.0 * a * a / (PI * s * s * s) * cel2(self.kc, (1.0 - 2.0 * t) / self.kc_squared(), 1.0 - t)
    }

    /// Psi over r^2 of a sheet from the loop's plane (z = 0) up to height z, seen from the plane at its far end, that is
    /// int_0^z psi_loop dz'. Odd in z; tends to min(a, r)^2/4 over r^2.
    ///
    /// (z m^2/(pi S)) {K + (4 M^2/S^2) D - (4 |a^2 - r^2|/S^2) J}, m = min(a, r), M = max(a, r),
    /// J = cel(kc, 1 - hk, 0, 1).
    pub(crate) fn column_psi_over_r2(&self) -> f64 {
        if self.z.abs() > 0.0 {
            let largest = self.a.max(self.r);
            let s2 = self.s * self.s;
            let sum = cel2(self.kc, 1.0, 1.0 + 4.0 * largest * largest / s2);
            self.column_factor() * (sum - 4.0 * self.difference / s2 * self.third_kind())
        } else {
            0.0
        }
    }

    /// int_0^z B_z dz' of the loop. Odd in z; tends to 1/2 for r < a, to 0 for r > a.
    ///
    /// r < a: (2z/(pi S)) cel(kc, 1 - hk, 1, 1); r > a: -(2z/(pi S)) hk cel(kc, 1 - hk, 0, 1); r = a: their mean,
    /// (z/(pi S)) K.
    pub(crate) fn column_flux_density_z(&self) -> f64 {
        if self.z.abs() <= 0.0 {
            return 0.0;
        }
        let factor = 2.0 * self.z / (PI * self.s);
        match self.r.total_cmp(&self.a) {
            Ordering::Less => factor * cel(self.kc, self.p(), 1.0, 1.0),
            Ordering::Greater => -factor * 4.0 * self.a * self.a / (self.s * self.s) * self.third_kind(),
            Ordering::Equal => 0.5 * factor * cel2(self.kc, 1.0, 1.0),
        }
    }

    /// The column's psi and derivatives (not divided by r^2), sharing the integrals.
    pub(crate) fn column_jet(&self) -> Jet {
        let Self { a, r, z, s, difference, .. } = *self;
        let (b, d) = (cel2(self.kc, 1.0, 0.0), cel2(self.kc, 0.0, 1.0));
        let largest = a.max(r);
        let s2 = s * s;
        let psi = if z.abs() > 0.0 {
            let bracket = b + (1.0 + 4.0 * largest * largest / s2) * d - 4.0 * difference / s2 * self.third_kind();
            self.column_factor() * bracket * r * r
        } else {
            0.0
        };
        let amplitude = 8.0 * a * a * r * r / (PI * s2 * s);
        let curvature = -amplitude * z / self.near_product() * (2.0 * b / self.kc_squared() + d);
        Jet { psi, slope: amplitude * d, curvature }
    }

    /// z m^2/(pi S r^2).
    fn column_factor(&self) -> f64 {
        let q = if self.r > self.a { self.a / self.r } else { 1.0 };
        self.z * q * q / (PI * self.s)
    }

    /// p = 1 - hk = 2 (|a^2 - r^2| + z^2 + R R1)/S^2.
    fn p(&self) -> f64 {
        2.0 * (self.difference + self.z * self.z + self.rr1) / (self.s * self.s)
    }

    /// J = int sin^2/((cos^2 + p sin^2) sqrt(cos^2 + kc^2 sin^2)).
    fn third_kind(&self) -> f64 {
        cel(self.kc, self.p(), 0.0, 1.0)
    }

    /// R R1, kept off zero on the filament itself.
    fn near_product(&self) -> f64 {
        self.rr1.max(1e-60 * self.s * self.s)
    }

    /// kc^2, kept off zero on the filament itself.
    fn kc_squared(&self) -> f64 {
        (self.kc * self.kc).max(4e-60)
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::float_cmp, reason = "exact limits are compared exactly")]
    use super::*;
    use crate::constants::MU0;
    use crate::sources::quadrature::loop_fields;
    use approx::assert_relative_eq;

    /// (a, b, h in m; M in nH; dM/dh in H/m): computed independently from Maxwell's closed form (Treatise, art. 701; NIST
    /// DLMF 19.34), mu0 = 4 pi 1e-7. The first M is the worked example of E. B. Rosa & F. W. Grover, Bulletin of the
    /// Bureau of Standards 8, 1-237 (1912), 1036.66 cm: that figure is from memory. Tolerance: the digits given.
    const MUTUAL: [(f64, f64, f64, f64, f64); 8] = [
        (0.25, 0.25, 0.01, 1036.66484928, -3.13317825e-5),
        (0.25, 0.25, 0.10, 337.68471849, -2.74179666e-6),
        (0.25, 0.25, 0.25, 123.51961577, -7.18365673e-7),
        (0.25, 0.25, 0.50, 35.46498155, -1.52738446e-7),
        (0.25, 0.20, 0.10, 248.78735904, -1.85090472e-6),
        (0.20, 0.25, 0.20, 123.95742720, -8.04826668e-7),
        (0.10, 0.10, 0.02, 215.38560079, -6.01546143e-6),
        (0.05, 0.03, 0.02, 28.93301736, -8.57314662e-7),
    ];

    #[test]
    fn mutual_inductance_of_loops_and_its_slope() {
        for (a, b, h, nanohenry, slope) in MUTUAL {
            let geometry = LoopGeometry::new(a, b, h);
            let factor = 2.0 * PI * MU0 * b * b;
            assert_relative_eq!(factor * geometry.psi_over_r2() * 1e9, nanohenry, max_relative = 1e-9);
            assert_relative_eq!(factor * geometry.slope_over_r2(), slope, max_relative = 5e-9);
        }
    }

    #[test]
    fn fields_of_the_loop_against_quadrature() {
        for r in [1e-9, 1e-3, 0.3, 0.9, 0.999, 1.0, 1.001, 1.1, 3.0, 200.0] {
            for z in [1e-7, 1e-3, 0.02, 0.5, 2.0, 200.0] {
                let geometry = LoopGeometry::new(1.0, r, z);
                let [psi, br, bz] = loop_fields(1.0, r, z);
                assert_relative_eq!(geometry.psi_over_r2(), psi, max_relative = 1e-12);
                assert_relative_eq!(-geometry.slope_over_r2(), br, max_relative = 1e-12);
                let whole = bz.hypot(r * br);
                assert!((geometry.flux_density_z() - bz).abs() < 2e-12 * whole, "r {r} z {z}");
            }
        }
    }

    #[test]
    fn a_column_reaches_its_limits() {
        // Far above the base the column is half an endless solenoid: psi = min(a, r)^2/4, B_z = 1/2 inside, 0 outside.
        for (r, psi_over_r2, bz) in [(0.0, 0.25, 0.5), (1e-9, 0.25, 0.5), (0.5, 0.25, 0.5), (2.0, 0.0625, 0.0)] {
            let top = LoopGeometry::new(1.0, r, 1e9);
            assert_relative_eq!(top.column_psi_over_r2(), psi_over_r2, max_relative = 1e-15);
            assert_relative_eq!(top.column_flux_density_z(), bz, max_relative = 1e-15, epsilon = 1e-15);
            let bottom = LoopGeometry::new(1.0, r, -1e9);
            assert_eq!(bottom.column_psi_over_r2(), -top.column_psi_over_r2());
            assert_eq!(bottom.column_flux_density_z(), -top.column_flux_density_z());
        }
        assert_eq!(LoopGeometry::new(1.0, 0.3, 0.0).column_psi_over_r2(), 0.0);
        assert_eq!(LoopGeometry::new(1.0, 1.0, 0.0).column_flux_density_z(), 0.0);
    }

    #[test]
    fn nothing_is_undefined_on_the_filament() {
        for z in [0.0, -0.0, 1e-300, 1e-170, 1e-100, 1e-31, 1e-20] {
            for r in [1.0, 1.0 - 1e-16, 1.0 + 3e-16] {
                let geometry = LoopGeometry::new(1.0, r, z);
                let jet = geometry.column_jet();
                for value in [
                    geometry.psi_over_r2(),
                    geometry.slope_over_r2(),
                    geometry.flux_density_z(),
                    geometry.column_psi_over_r2(),
                    geometry.column_flux_density_z(),
                    jet.psi,
                    jet.slope,
                    jet.curvature,
                ] {
                    assert!(value.is_finite(), "r {r} z {z}: {value}");
                }
            }
        }
    }

    #[test]
    fn the_loop_s_own_jet_is_its_psi_and_derivatives() {
        for (r, z) in [(0.3, 0.2), (1.4, -0.7), (5.0, 0.1), (1.0, 0.3), (1.01, 0.0), (0.02, 0.5)] {
            let jet = LoopGeometry::new(1.0, r, z).jet();
            let slope = |dz: f64| r * r * LoopGeometry::new(1.0, r, z + dz).slope_over_r2();
            assert_relative_eq!(jet.psi, r * r * LoopGeometry::new(1.0, r, z).psi_over_r2(), max_relative = 1e-14);
            assert_relative_eq!(jet.slope, slope(0.0), max_relative = 1e-14);
            let h = 1e-3 * (r - 1.0_f64).hypot(z);
            let d = |h: f64| (8.0 * (slope(h) - slope(-h)) - (slope(2.0 * h) - slope(-2.0 * h))) / (12.0 * h);
            assert_relative_eq!(jet.curvature, (16.0 * d(0.5 * h) - d(h)) / 15.0, max_relative = 1e-9);
        }
    }

    #[test]
    fn jet_repeats_the_single_kernels() {
        for (r, z) in [(0.3, 0.2), (1.4, -0.7), (5.0, 0.1), (1.0, 0.3)] {
            let geometry = LoopGeometry::new(1.0, r, z);
            let jet = geometry.column_jet();
            assert_relative_eq!(jet.psi, r * r * geometry.column_psi_over_r2(), max_relative = 1e-14);
            assert_relative_eq!(jet.slope, r * r * geometry.psi_over_r2(), max_relative = 1e-14);
            assert_relative_eq!(jet.curvature, r * r * geometry.slope_over_r2(), max_relative = 1e-14);
        }
    }
}

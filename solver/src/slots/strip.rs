//! One strip between two slots, at one axial wavenumber: what power it takes of an unbroken wall's.
//!
//! At low speed the mover's field drives E_phi = e(r) cos(kz) alike round the whole wall. In a strip of azimuthal extent 2 pi/n charges
//! add -grad(Phi), and no current leaves at its two faces. Of all currents without divergence the true one makes
//! 2 integral(J E) - integral(J^2/sigma) greatest, and this greatest value is the power. So the power is
//!
//! - not below that without any radial current: every shell is a strip of its own. In it the stream function obeys
//!   Laplace(Psi) = S cos(kz), Psi = 0 at both faces, so Psi ~ 1 - cosh(ky)/cosh(kW/2), y along the width W = 2 pi r/n, and the mean over
//!   y gives the share 1 - tanh(x)/x, x = kW/2 = k pi r/n ([`thin_strip_share`]);
//! - not above that without resistance along the radius: Phi(phi, z) is common to all radii,
//!   C1 Phi_phiphi + C2 Phi_zz = 0, C1 = integral(sigma/r dr), C2 = integral(sigma r dr), and the sum of the current ends at the faces.
//!   Then power = S2 - S1^2/C1 tanh(x)/x, x = k sqrt(C2/C1) pi/n, S2 = integral(sigma e^2 r dr), S1 = integral(sigma e dr).
//!
//! For a thin wall both are the same.

use std::f64::consts::PI;

use num_complex::Complex64;

use crate::sources::gauss;

/// 1 - tanh(x)/x: the share of its power that a thin wall keeps at an axial wavenumber k with n slots, x = k pi a/n.
///
/// ```
/// use lenzbore_solver::slots::thin_strip_share;
/// assert!((thin_strip_share(1.0) - 0.238_405_844_044_235).abs() < 1e-15); // 1 - tanh(1), computed independently
/// assert!((thin_strip_share(1e-4) / (1e-8 / 3.0) - 1.0).abs() < 1e-8); // x^2/3 for many slots
/// ```
#[must_use]
pub fn thin_strip_share(x: f64) -> f64 {
    if x.abs() < 0.02 {
        let square = x * x;
        return square * (1.0 / 3.0 - square * (2.0 / 15.0 - square * 17.0 / 315.0));
    }
    1.0 - x.tanh() / x
}

/// A conducting shell within a layer: where the sums over the radius are taken.
#[derive(Debug, Clone, Copy)]
pub(super) struct Shell {
    /// Radius, m.
    pub(super) radius: f64,
    /// Conductivity times the shell's weight, S.
    pub(super) conductance: f64,
}

/// Gauss points a layer.
const POINTS: usize = 8;

/// The shells of a layer.
pub(super) fn shells(inner: f64, outer: f64, conductivity: f64) -> impl Iterator<Item = Shell> {
    let (centre, half) = (0.5 * (inner + outer), 0.5 * (outer - inner));
    let shell = move |&(x, w): &(f64, f64)| Shell { radius: centre + half * x, conductance: conductivity * half * w };
    gauss::rule(POINTS).points.iter().map(shell)
}

/// Power at one wavenumber, in a common unit: of the unbroken wall, and the two bounds with slots.
#[derive(Debug, Clone, Copy, Default)]
pub(super) struct Power {
    pub(super) unbroken: f64,
    pub(super) least: f64,
    pub(super) most: f64,
}

/// The powers at wavenumber `k` (1/m) with `slots` slots; `slope(i)` is the amplitude of d psi/dz at shell i, so that e = slope/r.
pub(super) fn power(shells: &[Shell], k: f64, slots: f64, slope: impl Fn(usize) -> Complex64) -> Power {
    let mut power = Power::default();
    let (mut s1, mut c1, mut c2) = (Complex64::default(), 0.0, 0.0);
    for (i, shell) in shells.iter().enumerate() {
        let (r, s) = (shell.radius, shell.conductance);
        let e = slope(i) / r;
        let share = e.norm_sqr() * s * r;
        power.unbroken += share;
        power.least += share * thin_strip_share(k * PI * r / slots);
        s1 += e * s;
        c1 += s / r;
        c2 += s * r;
    }
    if c1 > 0.0 {
        let x = k * (c2 / c1).sqrt() * PI / slots;
        // 1 - share = tanh(x)/x.
        power.most = power.unbroken - s1.norm_sqr() / c1 * (1.0 - thin_strip_share(x));
    }
    power
}

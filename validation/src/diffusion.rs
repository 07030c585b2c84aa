//! A uniform axial field switched on around a conductor at rest, by its series of decaying modes.
//!
//! In a long rod or tube, or a hollow sphere (with a factor sin theta), the vector potential is
//! A(r, t) = B0 r/2 - B0 sum over n of c_n u_n(r) exp(-kappa_n^2 t / (mu0 sigma)), u_n = f(kappa r) G - g(kappa r) F with f, g the Bessel
//! functions of order 1 (sphere: spherical ones). In the bore the field is uniform, A = C r, so r u' = u at r = a, which gives F
//! and G; outside, a long body leaves the applied field as it is, (r u)' = 0 at r = b, and a sphere adds a dipole,
//! r u' + 2 u = 0. The modes are orthogonal over the metal with the weight r (sphere: r^2), and A = 0 there at the start.
//!
//! Source of the method: H. S. Carslaw, J. C. Jaeger, Conduction of Heat in Solids, 2nd ed. (1959), sections 7.6 and 13.4, from
//! memory; the conditions at the bore and around the sphere were derived here.

use std::f64::consts::PI;

use lenzbore_solver::constants::MU0;

use crate::quadrature::GaussRule;

/// A conductor that fills the radii from `inner_radius_m` to `outer_radius_m`.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Body {
    /// Its form.
    pub form: Form,
    /// Inner radius, m; 0 for a long body makes it a rod.
    pub inner_radius_m: f64,
    /// Outer radius, m.
    pub outer_radius_m: f64,
    /// Conductivity, S/m.
    pub conductivity_s_per_m: f64,
}

/// What the conductor is.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Form {
    /// A rod or tube without ends.
    Long,
    /// A hollow sphere.
    Sphere,
}

impl Form {
    /// Power of r in the weight, and factor of u in the outer condition.
    fn order(self) -> i32 {
        match self {
            Self::Long => 1,
            Self::Sphere => 2,
        }
    }

    /// f, g and their derivatives.
    fn functions(self, x: f64) -> [f64; 4] {
        match self {
            Self::Long => {
                let (j, y, dj, dy) = puruspe::besseljy(1.0, x);
                [j, y, dj, dy]
            }
            Self::Sphere => {
                let (sin, cos) = x.sin_cos();
                let (j, y) = (sin / (x * x) - cos / x, -cos / (x * x) - sin / x);
                [j, y, sin / x - 2.0 * j / x, -cos / x - 2.0 * y / x]
            }
        }
    }
}

/// One decaying mode.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Mode {
    /// Radial wavenumber, 1/m.
    kappa: f64,
    /// Parts of f and g.
    parts: (f64, f64),
    /// c_n.
    amplitude: f64,
}

/// The series of a body.
///
/// ```
/// use lenzbore_validation::diffusion::{Body, Form, StepResponse};
/// let rod = Body { form: Form::Long, inner_radius_m: 0.0, outer_radius_m: 10e-3, conductivity_s_per_m: 58e6 };
/// let response = StepResponse::new(rod);
/// // At t = mu0 sigma a^2 / 10; the same series summed independently: 0.151644887 on the axis, 0.605824194 in the mean.
/// let time_s = 0.1 * 4e-7 * std::f64::consts::PI * 58e6 * 1e-4;
/// assert!((response.on_axis(time_s) - 0.151_644_887).abs() < 1e-8);
/// assert!((response.mean(10e-3, time_s) - 0.605_824_194).abs() < 1e-8);
/// ```
#[derive(Debug, Clone, PartialEq)]
pub struct StepResponse {
    body: Body,
    modes: Vec<Mode>,
}

/// Modes of the series at most: at the earliest times asked of the references the last is smaller than 1e-15.
const MODES: usize = 60;
/// Largest argument that the Bessel functions are asked for; a wall thinner than a thousandth of its radius has few modes below it.
const LARGEST: f64 = 5000.0;

impl StepResponse {
    /// Finds the modes of `body`.
    #[must_use]
    pub fn new(body: Body) -> Self {
        let spacing = PI / (body.outer_radius_m - body.inner_radius_m);
        let (step, mut modes) = (spacing / 40.0, Vec::with_capacity(MODES));
        let mut low = 1e-3 * step;
        let mut before = body.outer_condition(low);
        while modes.len() < MODES && (low + step) * body.outer_radius_m < LARGEST {
            let high = low + step;
            let after = body.outer_condition(high);
            if before * after < 0.0 {
                modes.push(body.mode(bisected(|kappa| body.outer_condition(kappa), low, high)));
            }
            (low, before) = (high, after);
        }
        Self { body, modes }
    }

    /// Time constants mu0 sigma / kappa^2 of the modes, slowest first, s.
    pub fn time_constants_s(&self) -> impl Iterator<Item = f64> {
        self.modes.iter().map(|m| MU0 * self.body.conductivity_s_per_m / (m.kappa * m.kappa))
    }

    /// Mean of B_z over the disc of radius r in the metal or at its faces, over B0 (sphere: the disc in its middle plane).
    #[must_use]
    pub fn mean(&self, r_m: f64, time_s: f64) -> f64 {
        1.0 - self.sum(time_s, |mode| 2.0 * self.body.value(mode, r_m) / r_m)
    }

    /// B_z on the axis of a rod, over B0.
    #[must_use]
    pub fn on_axis(&self, time_s: f64) -> f64 {
        // J1(x) -> x/2.
        1.0 - self.sum(time_s, |mode| mode.kappa * mode.parts.0)
    }

    /// B_z = (1/r) d(r A)/dr at radius r in a long body, over B0.
    #[must_use]
    pub fn at(&self, r_m: f64, time_s: f64) -> f64 {
        1.0 - self.sum(time_s, |mode| self.body.value(mode, r_m) / r_m + self.body.slope(mode, r_m))
    }

    fn sum(&self, time_s: f64, of: impl Fn(&Mode) -> f64) -> f64 {
        let rate = 1.0 / (MU0 * self.body.conductivity_s_per_m);
        let term = |m: &Mode| m.amplitude * (-m.kappa * m.kappa * rate * time_s).exp() * of(m);
        // Small terms first.
        self.modes.iter().rev().map(term).sum()
    }
}

impl Body {
    /// Parts of f and g that leave the bore's field uniform.
    fn parts(&self, kappa: f64) -> (f64, f64) {
        if self.inner_radius_m <= 0.0 {
            return (1.0, 0.0);
        }
        let x = kappa * self.inner_radius_m;
        let [f, g, df, dg] = self.form.functions(x);
        (x * dg - g, -(x * df - f))
    }

    /// b u' + order u at r = b: zero for a mode.
    fn outer_condition(&self, kappa: f64) -> f64 {
        let (p, q) = self.parts(kappa);
        let x = kappa * self.outer_radius_m;
        let [f, g, df, dg] = self.form.functions(x);
        let order = f64::from(self.form.order());
        p * (x * df + order * f) + q * (x * dg + order * g)
    }

    fn mode(&self, kappa: f64) -> Mode {
        let bare = Mode { kappa, parts: self.parts(kappa), amplitude: 1.0 };
        let rule = GaussRule::new(16);
        let (mut over, mut norm) = (0.0, 0.0);
        let (mut from, panel) = (self.inner_radius_m, 2.0 / kappa);
        while from < self.outer_radius_m {
            let to = self.outer_radius_m.min(from + panel);
            for (r, weight) in rule.on(from, to) {
                let u = self.value(&bare, r);
                let weight = weight * r.powi(self.form.order());
                over += weight * 0.5 * r * u;
                norm += weight * u * u;
            }
            from = to;
        }
        Mode { amplitude: over / norm, ..bare }
    }

    fn value(&self, mode: &Mode, r: f64) -> f64 {
        let [f, g, ..] = self.form.functions(mode.kappa * r);
        mode.parts.0 * f + mode.parts.1 * g
    }

    fn slope(&self, mode: &Mode, r: f64) -> f64 {
        let [.., df, dg] = self.form.functions(mode.kappa * r);
        mode.kappa * (mode.parts.0 * df + mode.parts.1 * dg)
    }
}

/// A zero of `f` between two places where its signs differ, to round-off.
fn bisected(f: impl Fn(f64) -> f64, mut low: f64, mut high: f64) -> f64 {
    let start = f(low);
    for _ in 0..200 {
        let middle = 0.5 * (low + high);
        if middle <= low || middle >= high {
            break;
        }
        if f(middle) * start > 0.0 { low = middle } else { high = middle }
    }
    0.5 * (low + high)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// A thin shell: one time constant, mu0 sigma a w / 2 (tube), mu0 sigma a w / 3 (sphere), by the balance of flux and drop.
    #[test]
    fn thin_shells_have_one_time_constant() {
        for (form, share) in [(Form::Long, 0.5), (Form::Sphere, 1.0 / 3.0)] {
            let (a, w, sigma) = (0.1, 1e-4, 1e7);
            let body = Body { form, inner_radius_m: a, outer_radius_m: a + w, conductivity_s_per_m: sigma };
            let step = StepResponse::new(body);
            let tau = share * MU0 * sigma * a * w;
            let found = step.time_constants_s().next().unwrap_or(0.0);
            approx::assert_relative_eq!(found, tau, max_relative = 2.0 * w / a);
            approx::assert_relative_eq!(step.mean(a, tau), 1.0 - (-1.0_f64).exp(), max_relative = 2e-3);
        }
    }
}

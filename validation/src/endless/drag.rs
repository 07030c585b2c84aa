//! Drag at any speed.
//!
//! Heat in the wall: P = 2 pi^2 integral_0^inf k^2 v^2 sum over layers of sigma integral r |A_k|^2 dr dk, and drag = P/v. By
//! d(r A* H)/dr = r q^2 |A|^2/mu + r mu |H|^2 the radial integral is the step of -Im(r A* H) across the layer; where that step
//! is small against its terms (low speed) the integral itself is taken by Gauss rules.

use std::f64::consts::PI;

use lenzbore_solver::problem::{Mover, Wall};

use super::cascade::{Cascade, Wave};
use super::setup::{Endless, breaks};
use crate::Error;
use crate::quadrature::{Estimate, GaussRule, integrate};

/// Relative tolerance of the integral over k.
pub(super) const TOLERANCE: f64 = 1e-11;

/// Drag on `mover` at signed velocity `velocity_m_per_s`, N: positive when it opposes the motion, 0 at rest.
///
/// Relative accuracy 1e-10 or better; some milliseconds.
///
/// ```
/// use lenzbore_validation::endless::drag;
/// # use lenzbore_solver::problem::{Extent, Layer, Mover, Outline, Part, Wall};
/// # use lenzbore_solver::sources::Source;
/// # let layer = Layer {
/// #     name: "tube".into(),
/// #     inner_radius_m: 10.5e-3,
/// #     outer_radius_m: 12.5e-3,
/// #     from_m: 0.0,
/// #     to_m: 0.0,
/// #     conductivity_s_per_m: 58e6,
/// #     relative_permeability: 1.0,
/// # };
/// # let outline = Outline { inner_radius_m: 0.0, outer_radius_m: 0.0, length_m: 0.0 };
/// # let source = Source::Dipole { moment_a_m2: 1.0 };
/// # let dipole = Part { name: "D".into(), centre_m: 0.0, source, outline, coercivity_a_per_m: None };
/// # let wall = Wall { slots: 0, extent: Extent::Endless, layers: vec![layer] };
/// # let mover = Mover { parts: vec![dipole], mass_kg: None, recoil: None };
/// // A dipole of 1 A m2 in a wall of 10.5 to 12.5 mm and 58 MS/m at 5 m/s, computed independently in another language: 2.212929281 N.
/// assert!((drag(&wall, &mover, 5.0)?.value - 2.212_929_281).abs() < 5e-10);
/// # Ok::<(), lenzbore_validation::Error>(())
/// ```
///
/// # Errors
/// As [`Endless::new`], and a velocity that is no number.
pub fn drag(wall: &Wall, mover: &Mover, velocity_m_per_s: f64) -> Result<Estimate, Error> {
    Endless::of(wall, mover)?.drag(velocity_m_per_s)
}

impl Endless {
    /// Drag at a signed velocity, N: positive when it opposes the motion, 0 at rest.
    ///
    /// # Errors
    /// A velocity that is no number, or a failure of the quadrature.
    pub fn drag(&self, velocity_m_per_s: f64) -> Result<Estimate, Error> {
        let speed = velocity_m_per_s.abs();
        if !speed.is_finite() {
            return Err(Error::OutOfRange { what: "velocity, m/s", found: velocity_m_per_s, legal: "finite" });
        }
        if speed <= 0.0 || self.is_idle() {
            return Ok(Estimate { value: 0.0, error: 0.0 });
        }
        let rule = GaussRule::new(12);
        let integrand = |k: f64, out: &mut [f64]| {
            let cascade = Cascade::new(&self.regions, k, Self::settled(k, speed))?;
            let waves = self.waves(&cascade, &self.amplitudes(k)?);
            let mut sum = 0.0;
            for (i, wave) in waves.into_iter().enumerate() {
                if self.regions[i].conducts() {
                    sum += self.loss(&cascade, i, wave, k * speed, &rule)?;
                }
            }
            out[0] = 2.0 * PI * PI * k * sum;
            Ok(())
        };
        let found = integrate(integrand, 1, &breaks(2.0 * self.gap(), self.length()), TOLERANCE)?;
        Ok(found.estimates[0])
    }

    /// sigma k v integral of r |A|^2 over layer `i`, `rate` being k v.
    pub(super) fn loss(
        &self,
        cascade: &Cascade<'_>,
        i: usize,
        wave: Wave,
        rate: f64,
        rule: &GaussRule,
    ) -> Result<f64, Error> {
        let region = &self.regions[i];
        let mut step = 0.0;
        let mut size = 0.0;
        if i > 0 {
            let (a, h) = cascade.at_inner(i, wave);
            let product = region.inner * a.conj() * h;
            step += product.im;
            size += product.norm();
        }
        let (a, h) = cascade.at_outer(i, wave);
        let product = region.outer * a.conj() * h;
        step -= product.im;
        size += product.norm();
        if step > 1e-3 * size {
            return Ok(step);
        }
        Ok(rate * region.sigma * self.weighted_square(cascade, i, wave, rule)?)
    }

    /// Integral of r |A|^2 over annulus `i`.
    pub(super) fn weighted_square(
        &self,
        cascade: &Cascade<'_>,
        i: usize,
        wave: Wave,
        rule: &GaussRule,
    ) -> Result<f64, Error> {
        let mut sum = 0.0;
        for (from, to) in self.radial_panels(cascade, i) {
            for (r, weight) in rule.on(from, to) {
                sum += weight * r * cascade.at_radius(i, wave, r)?.0.norm_sqr();
            }
        }
        Ok(sum)
    }

    /// Panels on which 12 Gauss points resolve products of two waves of annulus `i`; depths that no wave reaches are left out.
    pub(super) fn radial_panels(&self, cascade: &Cascade<'_>, i: usize) -> Vec<(f64, f64)> {
        let (inner, outer) = (self.regions[i].inner, self.regions[i].outer);
        let q = cascade.q(i);
        let reach = 20.0 / q.re;
        let mut stretches = vec![(inner, outer)];
        if outer - inner > 2.0 * reach {
            stretches = vec![(inner, inner + reach), (outer - reach, outer)];
        }
        let longest = 4.0 / q.norm();
        let mut panels = Vec::new();
        for (start, end) in stretches {
            let mut from = start;
            while from < end {
                let doubled = if from > 0.0 { 2.0 * from } else { f64::INFINITY };
                let to = end.min(from + longest).min(doubled);
                panels.push((from, to));
                from = to;
            }
        }
        panels
    }
}

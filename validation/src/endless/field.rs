//! Flux density anywhere clear of the mover's currents.

use lenzbore_solver::problem::{Mover, Wall};
use num_complex::Complex64;

use super::cascade::Cascade;
use super::drag::TOLERANCE;
use super::setup::{Endless, breaks};
use crate::Error;
use crate::quadrature::{Estimate, integrate};

/// Both components at one point, T.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct FluxDensity {
    /// Radial component.
    pub radial: Estimate,
    /// Axial component.
    pub axial: Estimate,
}

/// Flux density at (r, z) of the settled field, z from the mover's reference point, T.
///
/// # Errors
/// As [`Endless::new`], and a radius at which the mover's currents flow.
pub fn flux_density(
    wall: &Wall,
    mover: &Mover,
    velocity_m_per_s: f64,
    r_m: f64,
    z_m: f64,
) -> Result<FluxDensity, Error> {
    let line = flux_density_along(wall, mover, velocity_m_per_s, r_m, &[z_m])?;
    Ok(line[0])
}

/// Flux density along a line of constant radius: one value for each of `z_m`, T.
///
/// # Errors
/// As [`flux_density`].
pub fn flux_density_along(
    wall: &Wall,
    mover: &Mover,
    velocity_m_per_s: f64,
    r_m: f64,
    z_m: &[f64],
) -> Result<Vec<FluxDensity>, Error> {
    Endless::of(wall, mover)?.flux_density_along(velocity_m_per_s, r_m, z_m)
}

impl Endless {
    /// Flux density along a line of constant radius, T; a face of the wall counts to the annulus outside it.
    ///
    /// B_r = Re integral -i k A_k exp(i k z) dk, B_z = Re integral mu H_k exp(i k z) dk. Errors are estimated against the
    /// integral of the absolute value, about the greatest field on the line.
    ///
    /// # Errors
    /// A radius at which the mover's currents flow, or a failure of the quadrature.
    pub fn flux_density_along(&self, velocity_m_per_s: f64, r_m: f64, z_m: &[f64]) -> Result<Vec<FluxDensity>, Error> {
        let place = self.place(r_m)?;
        let integrand = |k: f64, out: &mut [f64]| {
            let (a, b) = self.potential(k, Self::settled(k, velocity_m_per_s), r_m, place)?;
            for (pair, z) in out.chunks_exact_mut(2).zip(z_m) {
                let turn = Complex64::new(0.0, k * z).exp();
                pair[0] = (Complex64::new(0.0, -k) * a * turn).re;
                pair[1] = (b * turn).re;
            }
            Ok(())
        };
        let breaks = breaks(self.clearance(r_m, place), self.swing(z_m));
        let found = integrate(integrand, 2 * z_m.len(), &breaks, TOLERANCE)?;
        Ok(found.estimates.chunks_exact(2).map(|p| FluxDensity { radial: p[0], axial: p[1] }).collect())
    }

    /// A_k and mu H_k at radius r, the free field included.
    pub(super) fn potential(
        &self,
        k: f64,
        s: Complex64,
        r: f64,
        place: usize,
    ) -> Result<(Complex64, Complex64), Error> {
        let cascade = Cascade::new(&self.regions, k, s)?;
        let waves = self.waves(&cascade, &self.amplitudes(k)?);
        let (mut a, h) = cascade.at_radius(place, waves[place], r)?;
        let mut b = self.regions[place].mu * h;
        for group in self.groups.iter().filter(|g| g.home == place) {
            let (free_a, free_b) = group.spectrum.free(k, r)?;
            a += free_a;
            b += free_b;
        }
        Ok((a, b))
    }

    /// Index of the annulus at radius r.
    pub(super) fn place(&self, r_m: f64) -> Result<usize, Error> {
        if !(r_m > 0.0 && r_m.is_finite()) {
            return Err(Error::OutOfRange { what: "radius of a point, m", found: r_m, legal: "greater than 0" });
        }
        let place = self.regions.iter().position(|r| r_m < r.outer).unwrap_or(self.regions.len() - 1);
        if let Some(emitter) = self.emitters.iter().find(|e| e.carries_current_at(r_m)) {
            return Err(Error::PointInSource { radius_m: r_m, part: emitter.name.clone() });
        }
        Ok(place)
    }

    /// Distance over which the integrand at radius r falls by exp(-k distance): to the nearest current, through the wall or not.
    pub(super) fn clearance(&self, r: f64, place: usize) -> f64 {
        let each = self.groups.iter().map(|g| {
            if g.home != place {
                return g.spectrum.clearance(r);
            }
            let region = &self.regions[place];
            let mirrored = (region.outer - g.spectrum.outermost) + (region.outer - r);
            let below = (g.spectrum.innermost - region.inner) + (r - region.inner);
            let below = if place > 0 { below } else { f64::INFINITY };
            g.spectrum.clearance(r).min(mirrored).min(below)
        });
        each.fold(f64::INFINITY, f64::min)
    }

    /// Length that sets the period of the integrand at the given heights.
    pub(super) fn swing(&self, z_m: &[f64]) -> f64 {
        let far = z_m.iter().fold(0.0_f64, |m, z| m.max(z.abs()));
        let ends = self.groups.iter().fold(0.0_f64, |m, g| m.max(g.spectrum.span.0.abs()).max(g.spectrum.span.1.abs()));
        far + ends
    }
}

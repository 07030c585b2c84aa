//! Current density in the wall, and where it is greatest.

use lenzbore_solver::problem::{Mover, Wall};
use num_complex::Complex64;

use super::drag::TOLERANCE;
use super::setup::{Endless, breaks};
use crate::Error;
use crate::quadrature::{Estimate, integrate};

/// The greatest magnitude of the current density, and where.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct CurrentPeak {
    /// |J_phi|, A/m2.
    pub magnitude: Estimate,
    /// Radius, m.
    pub r_m: f64,
    /// Height from the mover's reference point, m.
    pub z_m: f64,
}

/// Current density J_phi at (r, z) of the settled field, A/m2; 0 where nothing conducts.
///
/// J_phi = Re integral i k sigma v A_k exp(i k z) dk.
///
/// # Errors
/// As [`Endless::new`].
pub fn current_density(
    wall: &Wall,
    mover: &Mover,
    velocity_m_per_s: f64,
    r_m: f64,
    z_m: f64,
) -> Result<Estimate, Error> {
    Ok(current_density_along(wall, mover, velocity_m_per_s, r_m, &[z_m])?[0])
}

/// Current density along a line of constant radius, A/m2.
///
/// # Errors
/// As [`Endless::new`].
pub fn current_density_along(
    wall: &Wall,
    mover: &Mover,
    velocity_m_per_s: f64,
    r_m: f64,
    z_m: &[f64],
) -> Result<Vec<Estimate>, Error> {
    let endless = Endless::of(wall, mover)?;
    let place = endless.place(r_m)?;
    endless.current_density_along(velocity_m_per_s, r_m, place, z_m)
}

/// The greatest |J_phi| in the wall.
///
/// J_phi obeys an equation with a maximum principle inside each layer, so the peak lies on a face.
///
/// # Errors
/// As [`Endless::new`].
pub fn current_density_peak(wall: &Wall, mover: &Mover, velocity_m_per_s: f64) -> Result<CurrentPeak, Error> {
    Endless::of(wall, mover)?.current_density_peak(velocity_m_per_s)
}

impl Endless {
    /// Current density in annulus `place` along a line at radius r (a face belongs to the annulus named), A/m2.
    fn current_density_along(&self, velocity: f64, r: f64, place: usize, z_m: &[f64]) -> Result<Vec<Estimate>, Error> {
        let sigma = self.regions[place].sigma;
        if sigma <= 0.0 || self.is_idle() {
            return Ok(vec![Estimate { value: 0.0, error: 0.0 }; z_m.len()]);
        }
        let integrand = |k: f64, out: &mut [f64]| {
            let (a, _) = self.potential(k, Self::settled(k, velocity), r, place)?;
            for (value, z) in out.iter_mut().zip(z_m) {
                let turn = Complex64::new(0.0, k * z).exp();
                *value = (Complex64::new(0.0, k * sigma * velocity) * a * turn).re;
            }
            Ok(())
        };
        let breaks = breaks(self.clearance(r, place), self.swing(z_m));
        Ok(integrate(integrand, z_m.len(), &breaks, TOLERANCE)?.estimates)
    }

    /// The greatest |J_phi| in the wall.
    ///
    /// # Errors
    /// A failure of the quadrature.
    pub fn current_density_peak(&self, velocity_m_per_s: f64) -> Result<CurrentPeak, Error> {
        let nothing = Estimate { value: 0.0, error: 0.0 };
        let mut peak = CurrentPeak { magnitude: nothing, r_m: 0.0, z_m: 0.0 };
        if self.is_idle() {
            return Ok(peak);
        }
        for (place, region) in self.regions.iter().enumerate().filter(|(_, r)| r.conducts()) {
            for r in [region.inner, region.outer].into_iter().filter(|r| *r > 0.0) {
                let found = self.peak_on_face(velocity_m_per_s, r, place)?;
                if found.magnitude.value > peak.magnitude.value {
                    peak = found;
                }
            }
        }
        Ok(peak)
    }

    /// Scans a face, then narrows the bracket around the largest magnitude.
    fn peak_on_face(&self, velocity: f64, r: f64, place: usize) -> Result<CurrentPeak, Error> {
        let reach = 4.0 * r;
        let low = self.groups.iter().map(|g| g.spectrum.span.0).fold(f64::INFINITY, f64::min) - reach;
        let high = self.groups.iter().map(|g| g.spectrum.span.1).fold(f64::NEG_INFINITY, f64::max) + reach;
        let (mut from, mut to) = (low, high);
        let step = (0.25 * self.clearance(r, place)).max((high - low) / 2000.0);
        let mut points = ((high - low) / step).ceil().max(40.0);
        loop {
            let count = points;
            let heights: Vec<f64> =
                (0..).map(f64::from).take_while(|i| *i <= count).map(|i| from + (to - from) * i / count).collect();
            let line = self.current_density_along(velocity, r, place, &heights)?;
            let best =
                (0..line.len()).max_by(|a, b| line[*a].value.abs().total_cmp(&line[*b].value.abs())).unwrap_or(0);
            let spacing = (to - from) / count;
            if spacing < 1e-6 * r {
                let magnitude = Estimate { value: line[best].value.abs(), error: line[best].error };
                return Ok(CurrentPeak { magnitude, r_m: r, z_m: heights[best] });
            }
            (from, to) = (heights[best] - spacing, heights[best] + spacing);
            points = 40.0;
        }
    }
}

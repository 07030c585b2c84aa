//! The limit of low speed: damping coefficient and lag.

use std::f64::consts::PI;

use lenzbore_solver::problem::{Mover, Wall};
use num_complex::Complex64;

use super::cascade::Cascade;
use super::drag::TOLERANCE;
use super::setup::{Endless, breaks};
use crate::Error;
use crate::quadrature::{Estimate, GaussRule, integrate};

/// Drag at low speed and gentle acceleration: c (v - tau dv/dt).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LowSpeed {
    /// Damping coefficient c, N s/m.
    pub damping_coefficient: Estimate,
    /// Lag tau, s.
    pub lag_time: Estimate,
}

/// Damping coefficient c = lim drag/speed as speed -> 0, N s/m, relative accuracy 1e-10.
///
/// c = 2 pi^2 integral k^2 sum over layers of sigma integral r |A_k|^2 dr dk with the static A_k.
///
/// # Errors
/// As [`Endless::new`].
pub fn damping_coefficient(wall: &Wall, mover: &Mover) -> Result<Estimate, Error> {
    Endless::of(wall, mover)?.damping_coefficient()
}

/// Damping coefficient and lag.
///
/// # Errors
/// As [`Endless::new`].
pub fn low_speed(wall: &Wall, mover: &Mover) -> Result<LowSpeed, Error> {
    Endless::of(wall, mover)?.low_speed()
}

impl Endless {
    /// Damping coefficient at zero speed, N s/m.
    ///
    /// # Errors
    /// A failure of the quadrature.
    pub fn damping_coefficient(&self) -> Result<Estimate, Error> {
        if self.is_idle() {
            return Ok(Estimate { value: 0.0, error: 0.0 });
        }
        let rule = GaussRule::new(12);
        let integrand = |k: f64, out: &mut [f64]| {
            let cascade = Cascade::new(&self.regions, k, Complex64::ZERO)?;
            let waves = self.waves(&cascade, &self.amplitudes(k)?);
            let mut sum = 0.0;
            for (i, region) in self.regions.iter().enumerate() {
                if region.conducts() {
                    sum += region.sigma * self.weighted_square(&cascade, i, waves[i], &rule)?;
                }
            }
            out[0] = 2.0 * PI * PI * k * k * sum;
            Ok(())
        };
        Ok(integrate(integrand, 1, &breaks(2.0 * self.gap(), self.length()), TOLERANCE)?.estimates[0])
    }

    /// Damping coefficient and lag at low speed.
    ///
    /// For fields that vary as exp(s t) the response is c(s) = 2 pi^2 integral k^2 sum of sigma integral r A_k(0)* A_k(s) dr dk
    /// = c (1 - tau s + ...); its slope is taken by Cauchy's integral over a circle well inside the wall's slowest decay rate.
    ///
    /// # Errors
    /// A failure of the quadrature.
    pub fn low_speed(&self) -> Result<LowSpeed, Error> {
        let damping_coefficient = self.damping_coefficient()?;
        if self.is_idle() {
            return Ok(LowSpeed { damping_coefficient, lag_time: Estimate { value: 0.0, error: 0.0 } });
        }
        let radius = 0.03 / self.slowest_decay();
        let rule = GaussRule::new(12);
        let integrand = |k: f64, out: &mut [f64]| {
            out[0] = -2.0 * PI * PI * k * k * self.slope(k, radius, &rule)?;
            Ok(())
        };
        let found = integrate(integrand, 1, &breaks(2.0 * self.gap(), self.length()), TOLERANCE)?.estimates[0];
        let lag = found.value / damping_coefficient.value;
        let error =
            lag.abs() * (found.error / found.value.abs() + damping_coefficient.error / damping_coefficient.value);
        Ok(LowSpeed { damping_coefficient, lag_time: Estimate { value: lag, error: error + 1e-11 * lag.abs() } })
    }

    /// Scale of the slowest decay of currents in the wall, s: sum of mu sigma b w over layers.
    fn slowest_decay(&self) -> f64 {
        let layers = self.regions.iter().filter(|r| r.conducts());
        layers.map(|r| r.mu * r.sigma * r.outer * (r.outer - r.inner)).sum()
    }

    /// d/ds at s = 0 of the sum over layers of sigma integral r A(0)* A(s) dr, from eight points on a circle.
    fn slope(&self, k: f64, radius: f64, rule: &GaussRule) -> Result<f64, Error> {
        let amplitudes = self.amplitudes(k)?;
        let still = Cascade::new(&self.regions, k, Complex64::ZERO)?;
        let still_waves = self.waves(&still, &amplitudes);
        let mut slope = 0.0;
        for point in 0..8 {
            let turn = Complex64::from_polar(1.0, PI * (f64::from(point) + 0.5) / 4.0);
            let moved = Cascade::new(&self.regions, k, turn * radius)?;
            let moved_waves = self.waves(&moved, &amplitudes);
            for (i, region) in self.regions.iter().enumerate().filter(|(_, r)| r.conducts()) {
                for (from, to) in self.radial_panels(&moved, i) {
                    for (r, weight) in rule.on(from, to) {
                        let before = still.at_radius(i, still_waves[i], r)?.0.conj();
                        let after = moved.at_radius(i, moved_waves[i], r)?.0;
                        slope += (region.sigma * weight * r * before * after / turn).re / (8.0 * radius);
                    }
                }
            }
        }
        Ok(slope)
    }
}

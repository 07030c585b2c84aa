//! Strokes of vanishing amplitude: damping coefficient over frequency.
//!
//! A mover at X cos(omega t) changes the wave k of its field by i k X; all of them vary at the one angular frequency omega, where a
//! travelling mover's vary at k v each. Heat in the wall, time average: P = (omega X)^2 pi^2 integral_0^inf k^2 sum over layers of sigma
//! integral r |A_k|^2 dr dk, A_k the waves of the mover's own spectrum at the rate omega, and c = 2 P / (omega X)^2.

use std::f64::consts::PI;

use super::cascade::Cascade;
use super::drag::TOLERANCE;
use super::setup::{Endless, breaks};
use crate::Error;
use crate::quadrature::{Estimate, GaussRule, integrate};

impl Endless {
    /// Damping coefficient of a stroke of vanishing amplitude at angular frequency `omega`, rad/s, N s/m.
    ///
    /// # Errors
    /// A frequency that is not positive, or a failure of the quadrature.
    pub fn stroke_damping(&self, omega: f64) -> Result<Estimate, Error> {
        if !(omega.is_finite() && omega > 0.0) {
            return Err(Error::OutOfRange { what: "angular frequency, rad/s", found: omega, legal: "positive" });
        }
        if self.is_idle() {
            return Ok(Estimate { value: 0.0, error: 0.0 });
        }
        let rule = GaussRule::new(12);
        let integrand = |k: f64, out: &mut [f64]| {
            // The rate of a wave of unit length that travels at omega.
            let cascade = Cascade::new(&self.regions, k, Self::settled(1.0, omega))?;
            let waves = self.waves(&cascade, &self.amplitudes(k)?);
            let mut sum = 0.0;
            for (i, wave) in waves.into_iter().enumerate() {
                if self.regions[i].conducts() {
                    sum += self.loss(&cascade, i, wave, omega, &rule)?;
                }
            }
            out[0] = 2.0 * PI * PI * k * k * sum / omega;
            Ok(())
        };
        let found = integrate(integrand, 1, &breaks(2.0 * self.gap(), self.length()), TOLERANCE)?;
        Ok(found.estimates[0])
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use super::*;
    use crate::cases;

    /// At low frequency the damping coefficient of a mover at low speed; at high frequency, 1/6 of the wall's thickness deep, it falls
    /// with the power 3/2 within what the depth is of the clearance.
    #[test]
    fn strokes_have_the_limits_of_low_and_high_frequency() {
        let wall = cases::endless_tube((11e-3, 13e-3), 58e6, 1.0);
        let mover = cases::cylinder(9e-3, 12e-3, 1.25);
        let endless = Endless::of(&wall, &mover).unwrap();
        let slow = super::super::damping_coefficient(&wall, &mover).unwrap();
        let c = |omega: f64| endless.stroke_damping(omega).unwrap().value;
        approx::assert_relative_eq!(c(1e-2), slow.value, max_relative = 1e-9);
        let power = (c(4e6) / c(1e6)).ln() / 4.0_f64.ln();
        assert!((power + 1.5).abs() < 0.03, "{power}");
        assert!(endless.stroke_damping(0.0).is_err());
    }
}

//! The forces on a free mover beside the magnetic one.

use crate::problem::Free;

/// A mover of given mass under a law of free travel.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Equation<'a> {
    pub mass: f64,
    pub law: &'a Free,
}

impl Equation<'_> {
    /// Everything but friction and the magnetic force, N along +z.
    pub fn driving_force(&self, z: f64, v: f64) -> f64 {
        let law = self.law;
        let weight = self.mass * law.gravity_m_per_s2;
        law.push_newton
            - weight * law.tilt_rad.cos()
            - law.air_drag_n_s2_per_m2 * v * v.abs()
            - law.spring_rate_n_per_m * (z - law.spring_free_at_m)
    }

    /// Friction of a moving mover, N, against the motion.
    pub fn friction(&self) -> f64 {
        let weight = self.mass * self.law.gravity_m_per_s2;
        self.law.friction_newton + self.law.friction_coefficient * (weight * self.law.tilt_rad.sin()).abs()
    }

    /// Everything but the magnetic force, N along +z. At rest friction takes what it can of the driving force.
    pub fn force(&self, z: f64, v: f64) -> f64 {
        let (drive, rub) = (self.driving_force(z, v), self.friction());
        if v.abs() > 0.0 {
            return drive - rub * v.signum();
        }
        drive - drive.clamp(-rub, rub)
    }

    /// Whether friction holds a mover at rest at `z` against `magnetic`, N.
    pub fn is_held(&self, z: f64, magnetic: f64) -> bool {
        let rub = self.friction();
        rub > 0.0 && (self.driving_force(z, 0.0) + magnetic).abs() <= rub
    }
}

//! The law of motion: uniform speed, a prescribed path, or m dv/dt = all forces.

use super::path::Path;
use crate::problem::{Free, Sine};

/// What moves the mover.
#[derive(Debug, Clone)]
pub(crate) enum Motion {
    /// Uniform velocity, m/s.
    Uniform {
        /// Signed velocity.
        velocity: f64,
    },
    /// Along a path against time.
    Prescribed(Path),
    /// Equation of motion.
    Free {
        /// Forces other than the magnetic one.
        law: Free,
        /// Mass, kg.
        mass: f64,
    },
}

impl Motion {
    /// The stroke, where it is one.
    pub(crate) fn sine(&self) -> Option<&Sine> {
        match self {
            Self::Prescribed(Path::Sine(sine)) => Some(sine),
            _ => None,
        }
    }

    /// Whole cycles of a stroke before `t`; 0 for other motions.
    pub(crate) fn cycle(&self, t: f64) -> u32 {
        if let Self::Prescribed(path) = self { path.cycle(t) } else { 0 }
    }

    /// Whether it follows a path.
    pub(crate) fn is_prescribed(&self) -> bool {
        matches!(self, Self::Prescribed(_))
    }
}

/// A force with its derivatives by position and velocity.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Force {
    pub(crate) value: f64,
    pub(crate) by_position: f64,
    pub(crate) by_velocity: f64,
}

/// Sum of weight, push, friction, air drag and spring, N; `direction` is the sense of sliding (0: no friction).
pub(crate) fn other_force(law: &Free, mass: f64, position: f64, velocity: f64, direction: f64) -> Force {
    let free = frictionless(law, mass, position);
    let air = law.air_drag_n_s2_per_m2;
    Force {
        value: free - direction * friction(law, mass) - air * velocity * velocity.abs(),
        by_position: -law.spring_rate_n_per_m,
        by_velocity: -2.0 * air * velocity.abs(),
    }
}

/// Weight along the axis, push and spring, N.
pub(crate) fn frictionless(law: &Free, mass: f64, position: f64) -> f64 {
    law.push_newton
        - mass * law.gravity_m_per_s2 * law.tilt_rad.cos()
        - law.spring_rate_n_per_m * (position - law.spring_free_at_m)
}

/// Greatest friction, N: the constant part and the coefficient times the weight across the axis.
pub(crate) fn friction(law: &Free, mass: f64) -> f64 {
    law.friction_newton + law.friction_coefficient * mass * law.gravity_m_per_s2 * law.tilt_rad.sin().abs()
}

/// Energy that friction and air take over a step, J.
pub(crate) fn losses(law: &Free, mass: f64, travel: f64, velocity: f64) -> f64 {
    (friction(law, mass) + law.air_drag_n_s2_per_m2 * velocity * velocity) * travel.abs()
}

/// Potential energy of weight, push and spring, J.
pub(crate) fn potential_energy(law: &Free, mass: f64, position: f64) -> f64 {
    let stretch = position - law.spring_free_at_m;
    (mass * law.gravity_m_per_s2 * law.tilt_rad.cos() - law.push_newton) * position
        + 0.5 * law.spring_rate_n_per_m * stretch * stretch
}

//! How the mover travels.

use super::stroke::{MotionTable, Sine};
use crate::constants::STANDARD_GRAVITY;

/// The law of motion.
#[derive(Debug, Clone, PartialEq)]
pub enum Travel {
    /// Uniform speed with settled fields, endless wall.
    Steady {
        /// Signed velocity, m/s.
        velocity_m_per_s: f64,
    },
    /// Uniform speed through a finite wall.
    Traverse(Traverse),
    /// Equation of motion.
    Free(Free),
    /// Strokes to and fro, settled.
    Sine(Sine),
    /// A motion given point by point.
    Table(MotionTable),
    /// Coils at rest with alternating current.
    Alternating(Alternating),
}

/// Uniform speed from one position to another.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Traverse {
    /// Speed, m/s, > 0.
    pub speed_m_per_s: f64,
    /// Position of the reference point at the start, m.
    pub from_m: f64,
    /// Position of the reference point at the end, m.
    pub to_m: f64,
}

/// Coils at rest, in series, with alternating current I cos(omega t); all parts of the mover are coils.
#[derive(Debug, Clone, PartialEq)]
pub struct Alternating {
    /// Frequencies, Hz, > 0, increasing.
    pub frequencies_hz: Vec<f64>,
    /// Current in every coil, A, zero to peak, > 0: a coil's ampere-turns over it are its turns, negative where it is wound or connected
    /// the other way.
    pub current_ampere: f64,
    /// Position of the reference point, m; 0 in an endless wall.
    pub position_m: f64,
    /// Resistance of the winding itself, ohm, >= 0.
    pub winding_resistance_ohm: f64,
}

impl Alternating {
    /// The winding's own resistance left out, the reference point at `position_m`.
    #[must_use]
    pub fn at(position_m: f64, current_ampere: f64, frequencies_hz: Vec<f64>) -> Self {
        Self { frequencies_hz, current_ampere, position_m, winding_resistance_ohm: 0.0 }
    }

    /// 2 pi times the frequencies, rad/s.
    #[must_use]
    pub fn angular_frequencies(&self) -> Vec<f64> {
        self.frequencies_hz.iter().map(|f| 2.0 * std::f64::consts::PI * f).collect()
    }
}

/// m dv/dt = -m g cos(tilt) + push - friction - air drag - spring + magnetic force.
#[derive(Debug, Clone, PartialEq)]
pub struct Free {
    /// Position of the reference point at release, m.
    pub release_m: f64,
    /// Signed velocity at release, m/s.
    pub entry_velocity_m_per_s: f64,
    /// The run ends when the reference point reaches this position, m.
    pub until_m: f64,
    /// The run ends after this time, s.
    pub time_limit_s: f64,
    /// Acceleration of gravity, m/s2, along -z (before tilt).
    pub gravity_m_per_s2: f64,
    /// Tilt of the axis from the vertical, rad.
    pub tilt_rad: f64,
    /// Constant axial force, N, signed.
    pub push_newton: f64,
    /// Constant friction, N, >= 0, against the motion.
    pub friction_newton: f64,
    /// Coulomb friction coefficient on the weight's component across the axis (with tilt).
    pub friction_coefficient: f64,
    /// Quadratic air drag, N s2/m2: force = -coefficient v |v|.
    pub air_drag_n_s2_per_m2: f64,
    /// Spring rate, N/m; 0 for none.
    pub spring_rate_n_per_m: f64,
    /// Position where the spring is free of force, m.
    pub spring_free_at_m: f64,
    /// Gate positions, m: first and second.
    pub gates_m: [f64; 2],
}

impl Free {
    /// Released at rest at `release_m` under standard gravity in a vertical tube, with nothing but the wall to slow it; ends
    /// at `until_m` or after 60 s. Other forces go in by struct update.
    ///
    /// ```
    /// use lenzbore_solver::problem::Free;
    /// let law = Free { friction_newton: 0.2, ..Free::let_go(0.33, -0.06, [0.3, 0.0]) };
    /// assert_eq!((law.release_m, law.gravity_m_per_s2, law.friction_newton), (0.33, 9.80665, 0.2));
    /// ```
    #[must_use]
    pub fn let_go(release_m: f64, until_m: f64, gates_m: [f64; 2]) -> Self {
        Self {
            release_m,
            entry_velocity_m_per_s: 0.0,
            until_m,
            time_limit_s: 60.0,
            gravity_m_per_s2: STANDARD_GRAVITY,
            tilt_rad: 0.0,
            push_newton: 0.0,
            friction_newton: 0.0,
            friction_coefficient: 0.0,
            air_drag_n_s2_per_m2: 0.0,
            spring_rate_n_per_m: 0.0,
            spring_free_at_m: 0.0,
            gates_m,
        }
    }
}

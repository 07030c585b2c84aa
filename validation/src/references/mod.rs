//! Values to hold the program against, each table beside its source.
//!
//! Every table says how its values were obtained. Most of the formulas are published without numbers; the numbers were then
//! computed independently of this program, in another language and with other quadratures, from the formula cited.

pub mod coil_impedance;
pub mod coil_inductance;
pub mod cooling;
pub mod cylinder_damping;
pub mod demagnetisation;
pub mod dipole_drag;
pub mod fall;
pub mod falling_magnet;
pub mod grid_index;
pub mod hollow_sphere;
pub mod integral;
pub mod loops;
pub mod magnet_force;
pub mod magnet_speed;
pub mod moving_loop;
pub mod nagaoka;
pub mod passage;
pub mod permeable_tube;
pub mod position;
pub mod recoil;
pub mod rod_alternating;
pub mod slots;
pub mod solenoid;
pub mod sphere_alternating;
pub mod stacks;
pub mod station;
pub mod step_rod;
pub mod step_tube;
pub mod stroke;
pub mod thin_wall;
pub mod tube_alternating;

/// How the numbers of a table came about.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Obtained {
    /// Read in the text cited.
    Read,
    /// Computed independently of this program from the formula of the text cited.
    ComputedIndependently,
    /// Remembered, and reproduced by computing the closed form.
    FromMemoryAndComputed,
}

impl Obtained {
    /// The words used in lists of checks.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Self::Read => "read in the text",
            Self::ComputedIndependently => "computed independently from the formula",
            Self::FromMemoryAndComputed => "from memory, reproduced by computing the formula",
        }
    }
}

/// Where a table comes from and how far it can be trusted.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Source {
    /// Author and year, for a column of a table.
    pub short: &'static str,
    /// Authors, title, journal, year; section, equation or table.
    pub citation: &'static str,
    /// How the numbers were obtained.
    pub obtained: Obtained,
    /// How well they are known.
    pub uncertainty: &'static str,
    /// What a comparison may differ by, and why.
    pub tolerance: &'static str,
}

/// Half a unit of the last digit of a value printed with `decimals` places, a hair widened for binary round-off.
#[must_use]
pub fn half_decimal(decimals: i32) -> f64 {
    0.5001 * 10.0_f64.powi(-decimals)
}

/// Half a unit of the last digit of `value` printed with `digits` significant figures.
#[must_use]
pub fn half_figure(value: f64, digits: i32) -> f64 {
    if value.abs() > 0.0 { 0.5001 * 10.0_f64.powf(value.abs().log10().floor() + 1.0 - f64::from(digits)) } else { 0.0 }
}

//! The numbers of a problem: what each is called, its unit, and the range in which it makes sense.

use std::fmt::{Display, Formatter};

/// A closed range of sensible magnitudes; outside it a number is a slip of unit or decimal point, not a design.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SensibleRange {
    /// Lowest sensible value.
    pub lowest: f64,
    /// Highest sensible value.
    pub highest: f64,
    /// Whether exactly 0 is allowed below `lowest`.
    pub zero: bool,
    /// Whether the negative of the range is allowed too.
    pub signed: bool,
}

impl SensibleRange {
    const fn positive(lowest: f64, highest: f64) -> Self {
        Self { lowest, highest, zero: false, signed: false }
    }

    const fn with_zero(lowest: f64, highest: f64) -> Self {
        Self { lowest, highest, zero: true, signed: false }
    }

    const fn signed(highest: f64) -> Self {
        Self { lowest: 0.0, highest, zero: true, signed: true }
    }

    /// Whether `value` is finite and within the range.
    #[must_use]
    pub fn holds(&self, value: f64) -> bool {
        let magnitude = if self.signed { value.abs() } else { value };
        let inside = magnitude >= self.lowest && magnitude <= self.highest;
        value.is_finite() && (inside || (self.zero && magnitude.abs() <= 0.0))
    }
}

/// Greatest speed, m/s: a hundredth of that of light. The displacement current, which the equations leave out, takes part as its square.
const FASTEST_M_PER_S: f64 = 3.0e6;

/// The numbers of a [`super::Problem`] that are checked one by one.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
#[non_exhaustive]
pub enum Quantity {
    /// Inner radius, m; 0 for a rod or a cylinder.
    InnerRadius,
    /// Outer radius, m.
    OuterRadius,
    /// Length of the wall or of a part, m.
    Length,
    /// Position along the axis, m.
    Position,
    /// Amplitude of a stroke, zero to peak, m.
    Amplitude,
    /// Electrical conductivity, S/m.
    Conductivity,
    /// Relative permeability.
    RelativePermeability,
    /// Recoil permeability of a magnet.
    RecoilPermeability,
    /// Dipole moment, A m2.
    Moment,
    /// Remanence, T.
    Remanence,
    /// Turns times current, A.
    AmpereTurns,
    /// Mass, kg.
    Mass,
    /// Speed of a traverse, m/s.
    Speed,
    /// Signed velocity, m/s.
    Velocity,
    /// Acceleration of gravity, m/s2.
    Gravity,
    /// Tilt from the vertical, rad.
    Tilt,
    /// Signed constant force, N.
    Push,
    /// Constant friction, N.
    Friction,
    /// Coulomb friction coefficient.
    FrictionCoefficient,
    /// Quadratic air drag, N s2/m2.
    AirDrag,
    /// Spring rate, N/m.
    SpringRate,
    /// A time, s.
    Time,
    /// Frequency of an alternating current or of a stroke, Hz.
    Frequency,
    /// Current in a coil, A, zero to peak.
    Current,
    /// Resistance of a winding, ohm.
    Resistance,
    /// Wanted relative half-width of the bands.
    TargetRelative,
}

impl Quantity {
    /// What it is called in messages.
    #[must_use]
    pub const fn name(self) -> &'static str {
        match self {
            Self::InnerRadius => "inner radius",
            Self::OuterRadius => "outer radius",
            Self::Length => "length",
            Self::Position => "position",
            Self::Amplitude => "amplitude",
            Self::Conductivity => "conductivity",
            Self::RelativePermeability => "relative permeability",
            Self::RecoilPermeability => "recoil permeability",
            Self::Moment => "dipole moment",
            Self::Remanence => "remanence",
            Self::AmpereTurns => "turns times current",
            Self::Mass => "mass",
            Self::Speed => "speed",
            Self::Velocity => "velocity",
            Self::Gravity => "gravity",
            Self::Tilt => "tilt from the vertical",
            Self::Push => "push",
            Self::Friction => "friction",
            Self::FrictionCoefficient => "friction coefficient",
            Self::AirDrag => "air drag",
            Self::SpringRate => "spring rate",
            Self::Time => "time",
            Self::Frequency => "frequency",
            Self::Current => "current",
            Self::Resistance => "resistance",
            Self::TargetRelative => "accuracy target",
        }
    }

    /// Its SI unit; empty for a pure number.
    #[must_use]
    pub const fn unit(self) -> &'static str {
        match self {
            Self::InnerRadius | Self::OuterRadius | Self::Length | Self::Position | Self::Amplitude => "m",
            Self::Conductivity => "S/m",
            Self::RelativePermeability
            | Self::RecoilPermeability
            | Self::FrictionCoefficient
            | Self::TargetRelative => "",
            Self::Moment => "A m2",
            Self::Remanence => "T",
            Self::AmpereTurns => "A",
            Self::Mass => "kg",
            Self::Speed | Self::Velocity => "m/s",
            Self::Gravity => "m/s2",
            Self::Tilt => "rad",
            Self::Push | Self::Friction => "N",
            Self::AirDrag => "N s2/m2",
            Self::SpringRate => "N/m",
            Self::Time => "s",
            Self::Frequency => "Hz",
            Self::Current => "A",
            Self::Resistance => "ohm",
        }
    }

    /// The range in which it makes sense. Wide on purpose: it catches slips of unit, not unusual designs.
    #[must_use]
    pub const fn sensible(self) -> SensibleRange {
        match self {
            Self::InnerRadius => SensibleRange::with_zero(1e-9, 1e4),
            Self::OuterRadius | Self::Length => SensibleRange::positive(1e-9, 1e4),
            Self::Position => SensibleRange::signed(1e4),
            Self::Amplitude => SensibleRange::positive(1e-9, 1e4),
            Self::Conductivity => SensibleRange::with_zero(1e-12, 1e10),
            Self::RelativePermeability => SensibleRange::positive(1e-6, 1e7),
            Self::RecoilPermeability => SensibleRange::positive(1.0, 20.0),
            Self::Moment => SensibleRange::signed(1e9),
            Self::Remanence => SensibleRange::signed(10.0),
            Self::AmpereTurns => SensibleRange::signed(1e9),
            Self::Mass => SensibleRange::positive(1e-9, 1e7),
            Self::Speed => SensibleRange::positive(1e-12, FASTEST_M_PER_S),
            Self::Velocity => SensibleRange::signed(FASTEST_M_PER_S),
            Self::Gravity => SensibleRange::with_zero(1e-12, 1e5),
            Self::Tilt => SensibleRange::with_zero(1e-12, std::f64::consts::FRAC_PI_2),
            Self::Push => SensibleRange::signed(1e9),
            Self::Friction => SensibleRange::with_zero(1e-15, 1e9),
            Self::FrictionCoefficient => SensibleRange::with_zero(1e-12, 10.0),
            Self::AirDrag => SensibleRange::with_zero(1e-15, 1e6),
            Self::SpringRate => SensibleRange::with_zero(1e-12, 1e12),
            Self::Time => SensibleRange::positive(1e-12, 1e9),
            Self::Frequency => SensibleRange::positive(1e-6, 1e9),
            Self::Current => SensibleRange::positive(1e-12, 1e9),
            Self::Resistance => SensibleRange::with_zero(1e-12, 1e9),
            Self::TargetRelative => SensibleRange::positive(1e-9, 0.5),
        }
    }
}

impl Display for Quantity {
    fn fmt(&self, f: &mut Formatter<'_>) -> std::fmt::Result {
        f.write_str(self.name())
    }
}

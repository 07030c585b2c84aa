//! What a word measures, its SI unit, and the units a user would write.

use super::dimension::Dimension;

/// The kinds of quantity that words of the case file take.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[non_exhaustive]
pub enum Kind {
    /// m
    Length,
    /// m/s
    Speed,
    /// K; `degC` and `degF` are points on their scales
    Temperature,
    /// S/m; a resistivity is inverted
    Conductivity,
    /// 1/K
    TemperatureCoefficient,
    /// a pure number, `%` allowed
    Ratio,
    /// T
    FluxDensity,
    /// A/m
    FieldStrength,
    /// A m2
    Moment,
    /// A
    Current,
    /// ohm
    Resistance,
    /// kg
    Mass,
    /// kg/m3
    Density,
    /// J/(kg K)
    SpecificHeat,
    /// W/(m K)
    ThermalConductivity,
    /// W/(m2 K)
    FilmCoefficient,
    /// s
    Time,
    /// Hz
    Frequency,
    /// m/s2
    Acceleration,
    /// rad
    Angle,
    /// N
    Force,
    /// N s2/m2
    AirDrag,
    /// N/m
    SpringRate,
    /// N s/m
    DampingCoefficient,
    /// W
    Power,
    /// J
    Energy,
    /// N s
    Impulse,
    /// A/m2
    CurrentDensity,
}

/// Every kind, in the order in which a unit's dimension is given a name.
const KINDS: [Kind; 28] = [
    Kind::Length,
    Kind::Speed,
    Kind::Temperature,
    Kind::Conductivity,
    Kind::TemperatureCoefficient,
    Kind::Ratio,
    Kind::FluxDensity,
    Kind::FieldStrength,
    Kind::Moment,
    Kind::Current,
    Kind::Resistance,
    Kind::Mass,
    Kind::Density,
    Kind::SpecificHeat,
    Kind::ThermalConductivity,
    Kind::FilmCoefficient,
    Kind::Time,
    Kind::Frequency,
    Kind::Acceleration,
    Kind::Angle,
    Kind::Force,
    Kind::AirDrag,
    Kind::SpringRate,
    Kind::DampingCoefficient,
    Kind::Power,
    Kind::Energy,
    Kind::Impulse,
    Kind::CurrentDensity,
];

impl Kind {
    /// Name with its article, SI unit, dimension, and the units that a message offers (the SI unit need not be first).
    const fn row(self) -> (&'static str, &'static str, Dimension, &'static [&'static str]) {
        const fn d(metre: i8, kilogram: i8, second: i8, ampere: i8, kelvin: i8) -> Dimension {
            Dimension::new(metre, kilogram, second, ampere, kelvin)
        }
        match self {
            Self::Length => ("a length", "m", d(1, 0, 0, 0, 0), &["mm", "um", "cm", "m", "in", "mil"]),
            Self::Speed => ("a speed", "m/s", d(1, 0, -1, 0, 0), &["m/s", "mm/s", "in/s"]),
            Self::Temperature => ("a temperature", "K", d(0, 0, 0, 0, 1), &["degC", "K", "degF"]),
            Self::Conductivity => (
                "a conductivity",
                "S/m",
                d(-3, -1, 3, 2, 0),
                &["MS/m", "S/m", "%IACS", "nohm m", "uohm cm", "ohm mm2/m"],
            ),
            Self::TemperatureCoefficient => {
                ("a temperature coefficient", "1/K", d(0, 0, 0, 0, -1), &["/K", "%/K", "%/degC"])
            }
            Self::Ratio => ("a ratio", "1", Dimension::NONE, &["%"]),
            Self::FluxDensity => ("a flux density", "T", d(0, 1, -2, -1, 0), &["T", "mT", "kG", "G"]),
            Self::FieldStrength => ("a field strength", "A/m", d(-1, 0, 0, 1, 0), &["kA/m", "A/m", "Oe", "kOe"]),
            Self::Moment => ("a dipole moment", "A m2", d(2, 0, 0, 1, 0), &["A m2", "mA m2", "J/T"]),
            Self::Current => ("a current", "A", d(0, 0, 0, 1, 0), &["A", "mA"]),
            Self::Resistance => ("a resistance", "ohm", d(2, 1, -3, -2, 0), &["ohm", "mohm", "kohm"]),
            Self::Mass => ("a mass", "kg", d(0, 1, 0, 0, 0), &["kg", "g"]),
            Self::Density => ("a density", "kg/m3", d(-3, 1, 0, 0, 0), &["kg/m3", "g/cm3"]),
            Self::SpecificHeat => {
                ("a specific heat", "J/(kg K)", d(2, 0, -2, 0, -1), &["J/(kg K)", "kJ/(kg K)", "J/(g K)"])
            }
            Self::ThermalConductivity => {
                ("a thermal conductivity", "W/(m K)", d(1, 1, -3, 0, -1), &["W/(m K)", "W/(cm K)"])
            }
            Self::FilmCoefficient => {
                ("a film coefficient", "W/(m2 K)", d(0, 1, -3, 0, -1), &["W/(m2 K)", "kW/(m2 K)", "W/(cm2 K)"])
            }
            Self::Time => ("a time", "s", d(0, 0, 1, 0, 0), &["s", "ms", "us", "min", "h"]),
            Self::Frequency => ("a frequency", "Hz", d(0, 0, -1, 0, 0), &["Hz", "kHz", "rpm"]),
            Self::Acceleration => ("an acceleration", "m/s2", d(1, 0, -2, 0, 0), &["m/s2", "mm/s2", "in/s2"]),
            Self::Angle => ("an angle", "rad", Dimension::ANGLE, &["deg", "rad"]),
            Self::Force => ("a force", "N", d(1, 1, -2, 0, 0), &["N", "mN", "kN", "kgf", "lbf"]),
            Self::AirDrag => ("a quadratic air drag", "N s2/m2", d(-1, 1, 0, 0, 0), &["N s2/m2", "kg/m", "lbf s2/in2"]),
            Self::SpringRate => ("a spring rate", "N/m", d(0, 1, -2, 0, 0), &["N/m", "N/mm", "kgf/mm", "lbf/in"]),
            Self::DampingCoefficient => ("a damping coefficient", "N s/m", d(0, 1, -1, 0, 0), &["N s/m", "lbf s/in"]),
            Self::Power => ("a power", "W", d(2, 1, -3, 0, 0), &["W", "mW", "kW"]),
            Self::Energy => ("an energy", "J", d(2, 1, -2, 0, 0), &["J", "mJ", "kJ", "N m"]),
            Self::Impulse => ("an impulse", "N s", d(1, 1, -1, 0, 0), &["N s", "mN s", "lbf s"]),
            Self::CurrentDensity => ("a current density", "A/m2", d(-2, 0, 0, 1, 0), &["A/mm2", "A/m2", "MA/m2"]),
        }
    }

    /// The SI unit in which [`super::Quantity::si`] is given.
    #[must_use]
    pub const fn si_unit(self) -> &'static str {
        self.row().1
    }

    /// Its dimension.
    #[must_use]
    pub const fn dimension(self) -> Dimension {
        self.row().2
    }

    /// Units that a user may write for it (some of many).
    #[must_use]
    pub const fn fitting_units(self) -> &'static [&'static str] {
        self.row().3
    }

    /// The first kind with this dimension.
    #[must_use]
    pub fn of_dimension(dimension: Dimension) -> Option<Self> {
        KINDS.into_iter().find(|k| k.dimension() == dimension)
    }
}

impl std::fmt::Display for Kind {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.write_str(self.row().0)
    }
}

//! The numbers that a grade has: their words, what they measure, their sensible range, how they are shown.

use crate::units::Kind;

/// One number of a grade, as a word of the book.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct NumberWord {
    /// The word.
    pub word: &'static str,
    /// What it measures.
    pub kind: Kind,
    /// Lowest sensible value, SI. Wide on purpose, here and above: it catches slips of unit.
    pub lowest: f64,
    /// Highest sensible value, SI.
    pub highest: f64,
    /// The unit it is shown in; empty for a pure number.
    pub unit: &'static str,
    /// One SI unit in [`Self::unit`].
    pub scale: f64,
    /// Zero of [`Self::unit`] in SI.
    pub zero: f64,
    /// How it is written.
    pub example: &'static str,
}

impl NumberWord {
    /// An SI value in the unit it is shown in.
    #[must_use]
    pub fn shown(&self, si: f64) -> f64 {
        (si - self.zero) * self.scale
    }
}

const fn word(
    word: &'static str,
    kind: Kind,
    [lowest, highest]: [f64; 2],
    (unit, scale): (&'static str, f64),
    example: &'static str,
) -> NumberWord {
    NumberWord { word, kind, lowest, highest, unit, scale, zero: 0.0, example }
}

const CONDUCTIVITY: NumberWord = word(
    "conductivity",
    Kind::Conductivity,
    [1e-12, 1e10],
    ("MS/m", 1e-6),
    "conductivity = { typical = \"46.4 MS/m\", source = \"measured on the batch, four points\" }",
);
const DENSITY: NumberWord = word(
    "density",
    Kind::Density,
    [10.0, 1e5],
    ("kg/m3", 1.0),
    "density = { typical = \"8.94 g/cm3\", source = \"the maker's data sheet\" }",
);
const SPECIFIC_HEAT: NumberWord = word(
    "specific_heat",
    Kind::SpecificHeat,
    [10.0, 1e5],
    ("J/(kg K)", 1.0),
    "specific_heat = { typical = \"385 J/(kg K)\", source = \"the maker's data sheet\" }",
);
const THERMAL_CONDUCTIVITY: NumberWord = word(
    "thermal_conductivity",
    Kind::ThermalConductivity,
    [1e-3, 1e4],
    ("W/(m K)", 1.0),
    "thermal_conductivity = { typical = \"330 W/(m K)\", source = \"the maker's data sheet\" }",
);

/// Numbers of a conductor.
pub const CONDUCTOR_NUMBERS: [NumberWord; 6] = [
    CONDUCTIVITY,
    word(
        "temperature_coefficient",
        Kind::TemperatureCoefficient,
        [-0.1, 0.1],
        ("/K", 1.0),
        "temperature_coefficient = { typical = \"0.0033 /K\", source = \"the maker's data sheet\" }",
    ),
    word(
        "permeability",
        Kind::Ratio,
        [1e-6, 1e7],
        ("", 1.0),
        "permeability = { typical = 1, source = \"copper is not magnetic\" }",
    ),
    DENSITY,
    SPECIFIC_HEAT,
    THERMAL_CONDUCTIVITY,
];

/// Numbers of a magnet.
pub const MAGNET_NUMBERS: [NumberWord; 11] = [
    word(
        "remanence",
        Kind::FluxDensity,
        [1e-6, 10.0],
        ("T", 1.0),
        "remanence = { typical = \"1.30 T\", source = \"the maker's certificate\" }",
    ),
    word(
        "remanence_coefficient",
        Kind::TemperatureCoefficient,
        [-0.1, 0.1],
        ("%/K", 100.0),
        "remanence_coefficient = { typical = \"-0.12 %/K\", source = \"the maker's data sheet\" }",
    ),
    word(
        "recoil_permeability",
        Kind::Ratio,
        [0.5, 100.0],
        ("", 1.0),
        "recoil_permeability = { typical = 1.05, source = \"the maker's data sheet\" }",
    ),
    word(
        "coercivity_hcb",
        Kind::FieldStrength,
        [1.0, 1e8],
        ("kA/m", 1e-3),
        "coercivity_hcb = { minimum = \"923 kA/m\", source = \"the maker's data sheet\" }",
    ),
    word(
        "coercivity_hcj",
        Kind::FieldStrength,
        [1.0, 1e8],
        ("kA/m", 1e-3),
        "coercivity_hcj = { minimum = \"20 kOe\", source = \"the maker's data sheet\" }",
    ),
    word(
        "coercivity_hcj_coefficient",
        Kind::TemperatureCoefficient,
        [-0.1, 0.1],
        ("%/K", 100.0),
        "coercivity_hcj_coefficient = { typical = \"-0.55 %/K\", source = \"the maker's data sheet\" }",
    ),
    NumberWord {
        word: "greatest_temperature",
        kind: Kind::Temperature,
        lowest: 200.0,
        highest: 2000.0,
        unit: "degC",
        scale: 1.0,
        zero: 273.15,
        example: "greatest_temperature = { typical = \"150 degC\", source = \"the maker's data sheet\" }",
    },
    DENSITY,
    SPECIFIC_HEAT,
    THERMAL_CONDUCTIVITY,
    CONDUCTIVITY,
];

/// Words of `[[conductor]]` beside its numbers.
pub(super) const CONDUCTOR_WORDS: [&str; 7] = ["family", "name", "also", "standards", "about", "not_linear", "caution"];
/// Words of `[[magnet]]` beside its numbers.
pub(super) const MAGNET_WORDS: [&str; 7] = ["family", "name", "also", "standards", "about", "classes", "caution"];
/// Words of `[class.NAME]` beside its numbers.
pub(super) const CLASS_WORDS: [&str; 2] = ["letters", "like"];
/// Words of a number.
pub(super) const NUMBER_WORDS: [&str; 5] = ["typical", "minimum", "maximum", "source", "range_source"];
/// Words of the file.
pub(super) const FILE_WORDS: [&str; 4] = ["sources", "conductor", "class", "magnet"];

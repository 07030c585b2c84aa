//! The unit table: names, factors, dimensions, and which of them take SI prefixes.

use super::dimension::Dimension;

/// A unit as a multiple of the SI unit of its dimension: `mantissa * 10^exponent`.
///
/// The power of ten is kept apart so that `12 mm` becomes exactly the float nearest to 0.012.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Unit {
    /// Factor beside the power of ten.
    pub mantissa: f64,
    /// Power of ten.
    pub exponent: i32,
    /// What it measures.
    pub dimension: Dimension,
}

impl Unit {
    /// The number one.
    pub const ONE: Self = Self { mantissa: 1.0, exponent: 0, dimension: Dimension::NONE };

    /// The whole factor to SI.
    #[must_use]
    pub fn factor(self) -> f64 {
        scaled(self.mantissa, self.exponent)
    }
}

/// `x * 10^exponent`, dividing by an exact power of ten where the exponent is negative.
pub(super) fn scaled(x: f64, exponent: i32) -> f64 {
    if exponent < 0 { x / 10f64.powi(-exponent) } else { x * 10f64.powi(exponent) }
}

struct Row {
    name: &'static str,
    mantissa: f64,
    exponent: i32,
    dimension: Dimension,
    prefixes: bool,
}

const fn row(name: &'static str, mantissa: f64, exponent: i32, dimension: Dimension, prefixes: bool) -> Row {
    Row { name, mantissa, exponent, dimension, prefixes }
}

const fn dim(metre: i8, kilogram: i8, second: i8, ampere: i8, kelvin: i8) -> Dimension {
    Dimension::new(metre, kilogram, second, ampere, kelvin)
}

/// Every unit by its plain name. Factors: SI Brochure, 9th edition (2019), tables 4 and 8; inch, pound-force and
/// kilogram-force are exact by definition (1 in = 25.4 mm, 1 lbf = 0.453 592 37 kg x 9.806 65 m/s2); the gauss and
/// the oersted as 1e-4 T and 1000/(4 pi) A/m; 100 %IACS = 58.0 MS/m (IEC 60028:1925). Typed from memory.
const ROWS: [Row; 34] = [
    row("m", 1.0, 0, dim(1, 0, 0, 0, 0), true),
    row("g", 1.0, -3, dim(0, 1, 0, 0, 0), true),
    row("s", 1.0, 0, dim(0, 0, 1, 0, 0), true),
    row("A", 1.0, 0, dim(0, 0, 0, 1, 0), true),
    row("K", 1.0, 0, dim(0, 0, 0, 0, 1), true),
    row("rad", 1.0, 0, Dimension::ANGLE, true),
    row("Hz", 1.0, 0, dim(0, 0, -1, 0, 0), true),
    row("N", 1.0, 0, dim(1, 1, -2, 0, 0), true),
    row("Pa", 1.0, 0, dim(-1, 1, -2, 0, 0), true),
    row("J", 1.0, 0, dim(2, 1, -2, 0, 0), true),
    row("W", 1.0, 0, dim(2, 1, -3, 0, 0), true),
    row("C", 1.0, 0, dim(0, 0, 1, 1, 0), true),
    row("V", 1.0, 0, dim(2, 1, -3, -1, 0), true),
    row("F", 1.0, 0, dim(-2, -1, 4, 2, 0), true),
    row("ohm", 1.0, 0, dim(2, 1, -3, -2, 0), true),
    row("S", 1.0, 0, dim(-2, -1, 3, 2, 0), true),
    row("Wb", 1.0, 0, dim(2, 1, -2, -1, 0), true),
    row("T", 1.0, 0, dim(0, 1, -2, -1, 0), true),
    row("H", 1.0, 0, dim(2, 1, -2, -2, 0), true),
    row("G", 1.0, -4, dim(0, 1, -2, -1, 0), true),
    row("Oe", 250.0 / std::f64::consts::PI, 0, dim(-1, 0, 0, 1, 0), true),
    row("min", 6.0, 1, dim(0, 0, 1, 0, 0), false),
    row("h", 36.0, 2, dim(0, 0, 1, 0, 0), false),
    row("in", 254.0, -4, dim(1, 0, 0, 0, 0), false),
    row("mil", 254.0, -7, dim(1, 0, 0, 0, 0), false),
    row("kgf", 9.80665, 0, dim(1, 1, -2, 0, 0), false),
    row("lbf", 4.448_221_615_260_5, 0, dim(1, 1, -2, 0, 0), false),
    row("deg", std::f64::consts::PI / 180.0, 0, Dimension::ANGLE, false),
    // Revolutions a minute, as a frequency.
    row("rpm", 1.0 / 60.0, 0, dim(0, 0, -1, 0, 0), false),
    row("%", 1.0, -2, Dimension::NONE, false),
    row("%IACS", 58.0, 4, dim(-3, -1, 3, 2, 0), false),
    // In products and quotients a degree is a difference; alone it is a point on its scale (see `quantity`).
    row("degC", 1.0, 0, dim(0, 0, 0, 0, 1), false),
    row("degF", 5.0 / 9.0, 0, dim(0, 0, 0, 0, 1), false),
    row("1", 1.0, 0, Dimension::NONE, false),
];

/// SI prefixes (SI Brochure, 9th edition with the 2022 additions, table 7).
const PREFIXES: [(&str, i32); 24] = [
    ("q", -30),
    ("r", -27),
    ("y", -24),
    ("z", -21),
    ("a", -18),
    ("f", -15),
    ("p", -12),
    ("n", -9),
    ("u", -6),
    ("m", -3),
    ("c", -2),
    ("d", -1),
    ("da", 1),
    ("h", 2),
    ("k", 3),
    ("M", 6),
    ("G", 9),
    ("T", 12),
    ("P", 15),
    ("E", 18),
    ("Z", 21),
    ("Y", 24),
    ("R", 27),
    ("Q", 30),
];

/// Finds one unit name, with or without a prefix. A whole name wins over a prefix: `min` is the minute.
pub(super) fn find(name: &str) -> Option<Unit> {
    let plain = |name: &str| ROWS.iter().find(|r| r.name == name);
    if let Some(r) = plain(name) {
        return Some(Unit { mantissa: r.mantissa, exponent: r.exponent, dimension: r.dimension });
    }
    PREFIXES.iter().find_map(|(prefix, power)| {
        let r = name.strip_prefix(prefix).and_then(plain).filter(|r| r.prefixes)?;
        Some(Unit { mantissa: r.mantissa, exponent: r.exponent + power, dimension: r.dimension })
    })
}

/// Every plain unit name, without prefixes.
pub fn unit_names() -> impl Iterator<Item = &'static str> {
    ROWS.iter().map(|r| r.name).filter(|n| *n != "1")
}

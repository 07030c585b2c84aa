//! A number with its unit, read to SI.

use super::expression::read_unit;
use super::fault::QuantityFault;
use super::kind::Kind;
use super::number::{Split, split};
use super::table::{Unit, scaled};

/// Zero of the Celsius scale, K (exact by definition).
const CELSIUS_ZERO_K: f64 = 273.15;
/// Zero of the Fahrenheit scale is this many Fahrenheit degrees above absolute zero (exact by definition).
const FAHRENHEIT_ZERO: f64 = 459.67;

/// A quantity in SI.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Quantity {
    /// Value in the SI unit of its kind ([`Kind::si_unit`]).
    pub si: f64,
    /// What it measures.
    pub kind: Kind,
}

/// Reads `text` as a quantity of `kind`.
///
/// Temperatures in `degC` and `degF` are points on their scales. Where a conductivity is wanted, a resistivity is
/// inverted. A ratio may stand without a unit, every other kind needs one. Decimal multiples are rounded once:
/// `"12 mm"` is the float nearest to 0.012.
///
/// ```
/// use lenzbore_io::units::{Kind, read_quantity};
/// let copper = read_quantity("0.01724 ohm mm2/m", Kind::Conductivity)?.si;
/// assert!((copper - 58.004_64e6).abs() < 10.0);
/// # Ok::<(), lenzbore_io::units::QuantityFault>(())
/// ```
///
/// # Errors
/// A [`QuantityFault`] that says what is wrong, what would fit and how to mend it.
pub fn read_quantity(text: &str, kind: Kind) -> Result<Quantity, QuantityFault> {
    let number = split(text)?;
    let si = if number.rest.is_empty() {
        if kind != Kind::Ratio {
            return Err(QuantityFault::MissingUnit { text: text.trim().to_owned(), wanted: kind });
        }
        number.value_scaled(0)
    } else {
        with_unit(&number, kind)?
    };
    finite(si, text, kind)
}

/// A bare number is already in the SI unit of its kind.
///
/// # Errors
/// [`QuantityFault::NotFinite`] for NaN and infinities.
pub fn read_bare_number(value: f64, kind: Kind) -> Result<Quantity, QuantityFault> {
    finite(value, &value.to_string(), kind)
}

fn finite(si: f64, text: &str, kind: Kind) -> Result<Quantity, QuantityFault> {
    if si.is_finite() {
        Ok(Quantity { si, kind })
    } else {
        Err(QuantityFault::NotFinite { text: text.trim().to_owned() })
    }
}

fn with_unit(number: &Split<'_>, kind: Kind) -> Result<f64, QuantityFault> {
    if kind == Kind::Temperature
        && let Some(kelvin) = on_scale(number)
    {
        return Ok(kelvin);
    }
    let unit = read_unit(number.rest, kind)?;
    if unit.dimension == kind.dimension() {
        return Ok(value(number, unit));
    }
    if kind == Kind::Conductivity && unit.dimension == kind.dimension().reciprocal() {
        return conductivity_of(value(number, unit));
    }
    Err(QuantityFault::WrongKind {
        unit: number.rest.to_owned(),
        measures: Kind::of_dimension(unit.dimension).filter(|k| *k != kind),
        wanted: kind,
    })
}

/// Celsius and Fahrenheit scales.
fn on_scale(number: &Split<'_>) -> Option<f64> {
    let degrees = number.value_scaled(0);
    match number.rest {
        "degC" | "\u{b0}C" | "\u{2103}" => Some(degrees + CELSIUS_ZERO_K),
        "degF" | "\u{b0}F" | "\u{2109}" => Some((degrees + FAHRENHEIT_ZERO) * 5.0 / 9.0),
        _ => None,
    }
}

fn value(number: &Split<'_>, unit: Unit) -> f64 {
    let decimal = (unit.mantissa - 1.0).abs() <= 0.0;
    if decimal {
        number.value_scaled(unit.exponent)
    } else {
        scaled(number.value_scaled(0) * unit.mantissa, unit.exponent)
    }
}

fn conductivity_of(resistivity: f64) -> Result<f64, QuantityFault> {
    if resistivity.abs() > 0.0 { Ok(1.0 / resistivity) } else { Err(QuantityFault::ZeroResistivity) }
}

//! Units as products and quotients: `N s/m`, `kg/m^3`, `W/(m K)`, `/K`.

use super::dimension::Dimension;
use super::fault::QuantityFault;
use super::kind::Kind;
use super::table::{Unit, find, unit_names};

/// Highest power that may be written behind a unit.
const LARGEST_POWER: i8 = 9;
/// Longest text that is looked at.
const LONGEST: usize = 80;

/// Reads a unit; `wanted` only serves the messages.
///
/// A space, `*` or a middle dot multiplies; one `/` divides by the factor (or the bracket) behind it. A power stands
/// behind its unit, with or without `^`. `a/b c` can be read in two ways and is refused.
///
/// # Errors
/// [`QuantityFault::UnknownUnit`] and [`QuantityFault::Unreadable`].
pub fn read_unit(text: &str, wanted: Kind) -> Result<Unit, QuantityFault> {
    let plain = plain_letters(text.trim());
    let unreadable = |why| QuantityFault::Unreadable { unit: text.trim().to_owned(), why, wanted };
    if plain.len() > LONGEST {
        return Err(unreadable("it is too long"));
    }
    let (over, under) = match plain.split_once('/') {
        None => (plain.as_str(), None),
        Some((_, under)) if under.contains('/') => {
            return Err(unreadable("it has two slashes: put all that is below into one bracket"));
        }
        Some((over, under)) => (over.trim(), Some(under.trim())),
    };
    let over = without_bracket(over).ok_or_else(|| unreadable("its brackets do not match"))?;
    let mut unit = Unit::ONE;
    let read = |unit: &mut Unit, text: &str, sign: i8| -> Result<(), QuantityFault> {
        for factor in factors(text) {
            let (name, power) = name_and_power(factor).ok_or_else(|| unreadable("a power is a whole number to 9"))?;
            let one = find(name).ok_or_else(|| unknown(name, wanted))?;
            *unit = times(*unit, one, sign * power).ok_or_else(|| unreadable("its powers are too high"))?;
        }
        Ok(())
    };
    read(&mut unit, over, 1)?;
    if let Some(under) = under {
        let bracketed = under.starts_with('(');
        let under = without_bracket(under).ok_or_else(|| unreadable("its brackets do not match"))?;
        match factors(under).count() {
            0 => return Err(unreadable("nothing stands below the slash")),
            1 => {}
            _ if !bracketed => return Err(unreadable("it can be read in two ways: use brackets, as \"W/(m K)\"")),
            _ => {}
        }
        read(&mut unit, under, -1)?;
    }
    Ok(unit)
}

/// Letters that stand for the same unit, and superscripts, in plain ASCII.
fn plain_letters(text: &str) -> String {
    let mut plain = String::with_capacity(text.len());
    for c in text.chars() {
        match c {
            '\u{b5}' | '\u{3bc}' => plain.push('u'),
            '\u{3a9}' | '\u{2126}' => plain.push_str("ohm"),
            '\u{b0}' | '\u{ba}' => plain.push_str("deg"),
            '\u{b7}' | '\u{22c5}' | '*' => plain.push(' '),
            '\u{b9}' => plain.push('1'),
            '\u{b2}' => plain.push('2'),
            '\u{b3}' => plain.push('3'),
            '\u{207b}' | '\u{2212}' => plain.push('-'),
            c => plain.push(c),
        }
    }
    plain.replace("% IACS", "%IACS")
}

/// Takes one pair of brackets off; `None` where brackets stand elsewhere.
fn without_bracket(text: &str) -> Option<&str> {
    let inner = match text.strip_prefix('(') {
        Some(rest) => rest.strip_suffix(')')?,
        None => text,
    };
    (!inner.contains(['(', ')'])).then_some(inner.trim())
}

fn factors(text: &str) -> impl Iterator<Item = &str> {
    text.split_whitespace()
}

/// `m2`, `m^2` and `s^-1`; a unit without digits has power 1.
fn name_and_power(factor: &str) -> Option<(&str, i8)> {
    if factor == "1" {
        return Some((factor, 1));
    }
    let end = factor.find(|c: char| c.is_ascii_digit() || c == '^' || c == '-').unwrap_or(factor.len());
    let (name, tail) = factor.split_at(end);
    let digits = tail.strip_prefix('^').unwrap_or(tail);
    if tail.is_empty() {
        return Some((name, 1));
    }
    digits.parse().ok().filter(|p: &i8| p.abs() <= LARGEST_POWER && *p != 0).map(|p| (name, p))
}

fn times(unit: Unit, factor: Unit, power: i8) -> Option<Unit> {
    let dimension: Dimension = unit.dimension.times_power(factor.dimension, power)?;
    let mantissa = unit.mantissa * factor.mantissa.powi(i32::from(power));
    let exponent = unit.exponent + factor.exponent * i32::from(power);
    (mantissa.is_finite() && mantissa > 0.0 && exponent.abs() < 300).then_some(Unit { mantissa, exponent, dimension })
}

/// The fault for one unknown name, with the nearest fitting unit or the nearest name of the table.
fn unknown(name: &str, wanted: Kind) -> QuantityFault {
    let fitting = wanted.fitting_units().iter().copied();
    let nearest = spelled_out(name)
        .map(str::to_owned)
        .or_else(|| crate::message::nearest(name, fitting.chain(unit_names())).map(str::to_owned));
    QuantityFault::UnknownUnit { unit: name.to_owned(), nearest, wanted }
}

/// Spellings that are not near the symbol they mean.
fn spelled_out(name: &str) -> Option<&'static str> {
    const NAMES: [(&str, &str); 22] = [
        ("millimeter", "mm"),
        ("millimetre", "mm"),
        ("meter", "m"),
        ("metre", "m"),
        ("micron", "um"),
        ("inch", "in"),
        ("inche", "in"),
        ("\"", "in"),
        ("thou", "mil"),
        ("second", "s"),
        ("sec", "s"),
        ("minute", "min"),
        ("hour", "h"),
        ("hr", "h"),
        ("tesla", "T"),
        ("gauss", "G"),
        ("newton", "N"),
        ("gram", "g"),
        ("celsiu", "degC"),
        ("celcius", "degC"),
        ("kelvin", "K"),
        ("iacs", "%IACS"),
    ];
    let lower = name.to_lowercase();
    let singular = lower.strip_suffix('s').unwrap_or(&lower);
    NAMES.iter().find(|(n, _)| *n == lower || *n == singular).map(|(_, unit)| *unit)
}

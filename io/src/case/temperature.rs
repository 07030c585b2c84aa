//! Temperatures, and what they do to resistivity and remanence.

use lenzbore_solver::problem::SensibleRange;

use super::reader::{Reader, Section, Wanted};
use super::tree::{Node, Value};
use crate::message::CaseFault;
use crate::units::Kind;

/// 20 degC, K: the temperature at which book values hold.
pub(super) const ROOM_K: f64 = 293.15;
/// 0 degC, K.
pub(super) const CELSIUS_ZERO_K: f64 = 273.15;
/// A bare number is kelvin; below this it was meant as degC.
const LOWEST_BARE_K: f64 = 150.0;
/// Linear coefficients are trusted from here ...
const LINEAR_FROM_K: f64 = CELSIUS_ZERO_K - 60.0;
/// ... to here.
pub(super) const LINEAR_TO_K: f64 = CELSIUS_ZERO_K + 200.0;

const RANGE: SensibleRange = SensibleRange { lowest: 1.0, highest: 2000.0, zero: false, signed: false };
/// How a temperature is read.
pub(super) const TEMPERATURE: Wanted = Wanted { kind: Kind::Temperature, range: RANGE };

/// Reads a temperature; 20 degC where it is absent. A bare number that makes no sense as kelvin is refused.
pub(super) fn temperature(reader: &mut Reader, section: &Section<'_>, word: &'static str) -> f64 {
    if section.table.get(word).is_some_and(|node| is_unlikely(reader, node, word)) {
        return ROOM_K;
    }
    reader.quantity_or(section, word, TEMPERATURE, ROOM_K, "room temperature, 20 degC")
}

/// A temperature of a list.
pub(super) fn temperature_of(reader: &mut Reader, node: &Node, word: &str) -> Option<f64> {
    if is_unlikely(reader, node, word) { None } else { reader.value(node, word, TEMPERATURE) }
}

/// Refuses a bare number that makes no sense as kelvin.
fn is_unlikely(reader: &mut Reader, node: &Node, word: &str) -> bool {
    let Value::Number(bare) = node.value else { return false };
    if !bare.is_finite() || (LOWEST_BARE_K..=RANGE.highest).contains(&bare) {
        return false;
    }
    let fault = CaseFault::Impossible {
        word: word.to_owned(),
        found: bare.to_string(),
        legal: format!("a bare number is in K, and {bare} K is no likely temperature"),
        mend: Some(format!("did you mean \"{bare} degC\"? (or write \"{bare} K\")")),
    };
    reader.fault(node.place.clone(), fault);
    true
}

/// `degC` for messages.
pub(super) fn celsius(kelvin: f64) -> String {
    let degrees = ((kelvin - CELSIUS_ZERO_K) * 1e6).round() / 1e6;
    format!("{degrees} degC")
}

/// Conductivity at `to_k` from its value at `from_k`, with resistivity rising linearly:
/// rho(T) = rho(T0) [1 + alpha (T - T0)], alpha at T0 = `coefficient_at_k`. `None` where that is not positive.
pub(super) fn conductivity_at(
    value: f64,
    from_k: f64,
    to_k: f64,
    coefficient: f64,
    coefficient_at_k: f64,
) -> Option<f64> {
    let rise = |t: f64| 1.0 + coefficient * (t - coefficient_at_k);
    let (before, after) = (rise(from_k), rise(to_k));
    (before > 0.0 && after > 0.0).then(|| if (from_k - to_k).abs() <= 0.0 { value } else { value * before / after })
}

/// Remanence at `to_k` from its value at 20 degC. `None` where it would change its sign.
pub(super) fn remanence_at(value: f64, to_k: f64, coefficient: f64) -> Option<f64> {
    let factor = 1.0 + coefficient * (to_k - ROOM_K);
    (factor > 0.0).then_some(value * factor)
}

/// Says so where a linear coefficient is stretched too far.
pub(super) fn caution_if_far(reader: &mut Reader, what: &str, kelvin: f64) {
    if !(LINEAR_FROM_K..=LINEAR_TO_K).contains(&kelvin) {
        let text = format!(
            "{what} at {}: a linear temperature coefficient is trusted from {} to {}",
            celsius(kelvin),
            celsius(LINEAR_FROM_K),
            celsius(LINEAR_TO_K)
        );
        reader.cautions.push(text);
    }
}

//! Diameters of a layer, read from any two of its three sizes or from its trade size.

use super::measures::{HOLE, LENGTH};
use super::reader::{Reader, Section};
use super::resolved::ResolvedValue;
use super::sizes::{ACROSS, split_trade_size};
use super::tree::{Node, Value};
use crate::message::CaseFault;
use crate::units::Kind;

/// Inner and outer diameter, m, from any two of the three sizes.
pub(super) fn diameters(reader: &mut Reader, section: &Section<'_>) -> Option<[f64; 2]> {
    let given: Vec<&'static str> = ACROSS.into_iter().filter(|w| section.table.has(w)).collect();
    if section.table.has("size") {
        if let Some(word) = given.first() {
            let words = format!("'size' and '{word}'");
            let why = "the trade size gives outer diameter and thickness already".to_owned();
            let mend = format!("take out 'size' or '{word}'");
            reader.fault(section.place_of(word), CaseFault::Clash { words, why, mend });
            return None;
        }
        return trade_size(reader, section);
    }
    match given.as_slice() {
        [_, _, _] => {
            let words = "'inner_diameter', 'outer_diameter' and 'thickness'".to_owned();
            let why = "any two of the three sizes give the third".to_owned();
            let mend = "give two, the third follows".to_owned();
            reader.fault(section.place_of("thickness"), CaseFault::Clash { words, why, mend });
            None
        }
        [_, _] => two_sizes(reader, section),
        _ => {
            let lacking = if given.first() == Some(&"outer_diameter") { "thickness" } else { "outer_diameter" };
            let why = "two of inner_diameter, outer_diameter and thickness give the size";
            reader.missing(
                section,
                lacking,
                why,
                "size = \"28 x 1.5 mm\", or outer_diameter = \"28 mm\" and thickness = \"1.5 mm\"",
            );
            for word in given {
                reader.quantity(section, word, if word == "inner_diameter" { HOLE } else { LENGTH });
            }
            None
        }
    }
}

fn trade_size(reader: &mut Reader, section: &Section<'_>) -> Option<[f64; 2]> {
    let example = "size = \"28 x 1.5 mm\"";
    let text = reader.text(section, "size", example)?;
    let place = section.place_of("size");
    let Some((outer, thickness)) = split_trade_size(&text) else {
        let why = "a trade size is outer diameter x wall, with a unit";
        reader.fault(place, CaseFault::List { word: "size".to_owned(), why, example });
        return None;
    };
    let node = |text: String| Node { value: Value::Text(text), place: place.clone() };
    let thickness = reader.value(&node(thickness), "thickness of size", LENGTH)?;
    let outer = reader.value(&node(outer), "outer diameter of size", LENGTH)?;
    for (word, si) in [("outer_diameter", outer), ("thickness", thickness)] {
        let origin = reader.origin(&place);
        reader.note(section, word, ResolvedValue::Number(si), "m", origin);
    }
    inner_of(reader, section, outer, thickness).map(|inner| [inner, outer])
}

fn two_sizes(reader: &mut Reader, section: &Section<'_>) -> Option<[f64; 2]> {
    let inner = reader.quantity(section, "inner_diameter", HOLE);
    let outer = reader.quantity(section, "outer_diameter", LENGTH);
    let thickness = reader.quantity(section, "thickness", LENGTH);
    match (inner, outer, thickness) {
        (Some(inner), Some(outer), None) if !section.table.has("thickness") => {
            let from = "half the difference of outer and inner diameter";
            reader.note_follows(section, "thickness", 0.5 * (outer - inner), Kind::Length, from);
            Some([inner, outer])
        }
        (Some(inner), None, Some(thickness)) if !section.table.has("outer_diameter") => {
            let outer = inner + 2.0 * thickness;
            reader.note_follows(section, "outer_diameter", outer, Kind::Length, "inner diameter and thickness");
            Some([inner, outer])
        }
        (None, Some(outer), Some(thickness)) if !section.table.has("inner_diameter") => {
            inner_of(reader, section, outer, thickness).map(|inner| [inner, outer])
        }
        _ => None,
    }
}

/// The inner diameter that outer diameter and thickness leave; rounding beside 0 is 0.
fn inner_of(reader: &mut Reader, section: &Section<'_>, outer: f64, thickness: f64) -> Option<f64> {
    let inner = outer - 2.0 * thickness;
    let inner = if inner.abs() <= 1e-9 * outer { 0.0 } else { inner };
    if inner < 0.0 {
        let place = section.place_of_any(&["thickness", "size"]);
        let fault = CaseFault::Impossible {
            word: "thickness".to_owned(),
            found: reader.sources.written(&place),
            legal: format!("a wall of outer diameter {} mm is at most {} mm thick (a rod)", 1e3 * outer, 500.0 * outer),
            mend: None,
        };
        reader.fault(place, fault);
        return None;
    }
    reader.note_follows(section, "inner_diameter", inner, Kind::Length, "outer diameter and thickness");
    Some(inner)
}

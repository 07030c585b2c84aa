//! Sizes across a layer: any two of inner diameter, outer diameter and thickness, or a trade size.

use super::tree::{Entry, Node, Table, Value};
use crate::message::Place;

/// The words for sizes across, in the order in which a given one stays when a third is set: the bore (and so the
/// running clearance) first, then the gauge.
pub(super) const ACROSS: [&str; 3] = ["inner_diameter", "thickness", "outer_diameter"];

/// Takes the trade size `"28 x 1.5 mm"` apart into outer diameter and thickness, each with its unit.
///
/// One unit at the end serves both.
pub(super) fn split_trade_size(text: &str) -> Option<(String, String)> {
    let mut pieces = text.split(['x', 'X', '\u{d7}']);
    let (outer, thickness) = (pieces.next()?.trim(), pieces.next()?.trim());
    if pieces.next().is_some() || outer.is_empty() || thickness.is_empty() {
        return None;
    }
    let is_bare = |t: &str| t.chars().all(|c| c.is_ascii_digit() || ".,+-".contains(c));
    let unit_start = thickness.find(|c: char| !(c.is_ascii_digit() || ".,+- ".contains(c)))?;
    let unit = &thickness[unit_start..];
    let outer = if is_bare(outer) { format!("{outer} {unit}") } else { outer.to_owned() };
    Some((outer, thickness.to_owned()))
}

/// Replaces `size` by the two words it stands for, where it can be read; both point at the trade size.
pub(super) fn expand_trade_size(layer: &mut Table) {
    let Some((outer, thickness)) = layer.text("size").and_then(split_trade_size) else { return };
    if ACROSS.iter().any(|w| layer.has(w)) {
        return;
    }
    let Some(size) = layer.remove("size") else { return };
    for (word, text) in [("outer_diameter", outer), ("thickness", thickness)] {
        layer.put(entry(word, &size.word_place, text, &size.node.place));
    }
}

fn entry(word: &str, word_place: &Place, text: String, place: &Place) -> Entry {
    let node = Node { value: Value::Text(text), place: place.clone() };
    Entry { word: word.to_owned(), word_place: word_place.clone(), node }
}

/// Prepares a layer for the words of `over`: those of its sizes across that cannot stay are taken out.
///
/// Two or three words, or a trade size, replace all. One word replaces its own old value. If it is the third, one of the two given
/// must give way: the inner diameter stays where it was given, else the thickness. Returns the word that
/// gave way.
pub(super) fn make_way_for(layer: &mut Table, over: &Table) -> Option<&'static str> {
    let set: Vec<&'static str> = ACROSS.into_iter().filter(|w| over.has(w)).collect();
    if over.has("size") || set.len() > 1 {
        layer.remove("size");
        for word in ACROSS {
            layer.remove(word);
        }
        return None;
    }
    let third = *set.first()?;
    expand_trade_size(layer);
    let given: Vec<&'static str> = ACROSS.into_iter().filter(|w| layer.has(w)).collect();
    if given.len() < 2 || given.contains(&third) {
        return None;
    }
    let dropped = *given.last()?;
    layer.remove(dropped).map(|_| dropped)
}

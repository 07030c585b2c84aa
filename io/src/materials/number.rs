//! One number of a grade: `{ typical, minimum, maximum, source, range_source }`.

use std::collections::BTreeMap;

use super::grade::BookNumber;
use super::shelf::{Row, Shelf};
use super::words::{NUMBER_WORDS, NumberWord};
use crate::case::tree::{Node, Table, Value};
use crate::message::{CaseFault, nearest};
use crate::units::{Kind, QuantityFault, read_bare_number, read_quantity};

/// The numbers of a grade by their words.
pub(super) type Numbers = BTreeMap<&'static str, BookNumber>;

/// Reads the number that `node` has for `word`; faults go to the shelf.
pub(super) fn number(shelf: &mut Shelf<'_>, word: &NumberWord, node: &Node) -> Option<BookNumber> {
    let Value::Table(table) = &node.value else {
        let wanted = "a number with its source";
        shelf.fault(
            &node.place,
            CaseFault::WrongShape {
                word: word.word.to_owned(),
                found: node.value.shape(),
                wanted,
                example: word.example,
            },
        );
        return None;
    };
    let label = format!("the number '{}'", word.word);
    shelf.check_words(table, &label, &[&NUMBER_WORDS]);
    let row = Row { table, place: &node.place, label: &label };
    let faults_before = shelf.faults.len();
    let value = |shelf: &mut Shelf<'_>, which: &str| table.get(which).and_then(|n| quantity(shelf, word, n));
    let (typical, minimum, maximum) = (value(shelf, "typical"), value(shelf, "minimum"), value(shelf, "maximum"));
    let text = source(shelf, &row, "source");
    if !table.has("source") {
        let why = "every number says where it comes from: a standard, a handbook, a measurement, or 'from memory'";
        shelf.missing(&row, "source", why, word.example);
    }
    let range_source = if table.has("range_source") { source(shelf, &row, "range_source") } else { text.clone() };
    if !["typical", "minimum"].iter().any(|w| table.has(w)) {
        shelf.missing(&row, "typical", "the number itself, or a 'minimum' that the grade guarantees", word.example);
    }
    if shelf.faults.len() > faults_before {
        return None;
    }
    in_order(shelf, word, node, [minimum, typical, maximum])?;
    Some(BookNumber {
        typical: typical.or(minimum)?,
        minimum: minimum.filter(|_| typical.is_some()),
        maximum,
        is_least: typical.is_none(),
        source: text?,
        range_source: range_source?,
    })
}

/// lowest <= typical <= highest.
fn in_order(shelf: &mut Shelf<'_>, word: &NumberWord, node: &Node, values: [Option<f64>; 3]) -> Option<()> {
    let values: Vec<f64> = values.into_iter().flatten().collect();
    if values.is_sorted() {
        return Some(());
    }
    let words = format!("'minimum', 'typical' and 'maximum' of {}", word.word);
    let why = "they do not rise in this order".to_owned();
    let mend = if word.kind == Kind::Conductivity {
        "the lowest conductivity belongs to the highest resistivity".to_owned()
    } else {
        "the lowest value is the minimum, the highest the maximum".to_owned()
    };
    shelf.fault(&node.place, CaseFault::Clash { words, why, mend });
    None
}

/// One value, SI, in its sensible range.
fn quantity(shelf: &mut Shelf<'_>, word: &NumberWord, node: &Node) -> Option<f64> {
    let read = match &node.value {
        Value::Text(text) => read_quantity(text, word.kind),
        Value::Number(bare) if word.kind == Kind::Temperature => {
            let text = bare.to_string();
            Err(QuantityFault::MissingUnit { text, wanted: word.kind })
        }
        Value::Number(bare) => read_bare_number(*bare, word.kind),
        other => {
            let (found, wanted) = (other.shape(), "a value with its unit");
            let fault = CaseFault::WrongShape { word: word.word.to_owned(), found, wanted, example: word.example };
            shelf.fault(&node.place, fault);
            return None;
        }
    };
    match read {
        Ok(q) if (word.lowest..=word.highest).contains(&q.si) => Some(q.si),
        Ok(_) => {
            let unit = word.kind.si_unit();
            let found = shelf.sources.written(&node.place);
            let legal = format!("it lies between {:e} and {:e} {unit}", word.lowest, word.highest);
            let fault = CaseFault::Impossible { word: word.word.to_owned(), found, legal, mend: None };
            shelf.fault(&node.place, fault);
            None
        }
        Err(fault) => {
            shelf.fault(&node.place, CaseFault::Quantity { word: word.word.to_owned(), fault });
            None
        }
    }
}

/// A source in full: an entry of `[sources]`, or a text of its own, which has more than one word.
fn source(shelf: &mut Shelf<'_>, row: &Row<'_>, word: &'static str) -> Option<String> {
    let text = shelf.text(row, word)?;
    let place = row.table.get(word).map_or(row.place, |n| &n.place);
    let found = match named_sources(shelf.document).find(|(id, _)| *id == text) {
        Some((_, full)) => full.to_owned(),
        None if text.split_whitespace().count() > 1 => text,
        None => {
            let names: Vec<String> = named_sources(shelf.document).map(|(id, _)| id.to_owned()).collect();
            let nearest = nearest(&text, names.iter().map(String::as_str)).map(str::to_owned);
            let table = "[sources]".to_owned();
            shelf.fault(place, CaseFault::UnknownName { name: text, table, names, nearest });
            return None;
        }
    };
    Some(if shelf.own { format!("{found} ({})", shelf.sources.describe(place)) } else { found })
}

fn named_sources(document: &Table) -> impl Iterator<Item = (&str, &str)> {
    let entries = document.table("sources").map_or(&[][..], |t| t.entries.as_slice());
    entries.iter().filter_map(|e| match &e.node.value {
        Value::Text(text) => Some((e.word.as_str(), text.as_str())),
        _ => None,
    })
}

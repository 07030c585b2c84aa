//! Names of layers and parts, by which overrides, stacks and results address them.

use std::collections::BTreeMap;

use super::reader::{Reader, Section};
use super::words::table_words;
use crate::message::{CaseFault, Diagnostic, Place};

/// Names that are taken, each with its place.
#[derive(Debug, Default)]
pub(super) struct Names(BTreeMap<String, Place>);

/// Longest name.
const LONGEST: usize = 60;

/// The name of an entry, or `fallback` with its number where it has none. Faults are collected.
pub(super) fn name_of(
    reader: &mut Reader,
    section: &Section<'_>,
    table: &str,
    fallback: String,
    names: &mut Names,
) -> String {
    let given = reader.text(section, "name", "name = \"sleeve\"").map(|n| n.trim().to_owned());
    let place = section.place_of("name");
    let Some(name) = given else {
        names.0.entry(fallback.clone()).or_insert(place);
        return fallback;
    };
    if let Some(why) = objection(&name, table) {
        reader.fault(place.clone(), CaseFault::Name { name: name.clone(), why });
    }
    match names.0.get(&name) {
        Some(first) => {
            let fault = CaseFault::Name {
                name: name.clone(),
                why: "is taken: names differ, so that each part can be addressed",
            };
            reader.faults.push(Diagnostic::at(place, fault).with_related(first.clone(), "first"));
        }
        None => {
            names.0.insert(name.clone(), place);
        }
    }
    name
}

fn objection(name: &str, table: &str) -> Option<&'static str> {
    let is_word = table_words(table).is_some_and(|t| t.words.contains(&name));
    if name.is_empty() {
        Some("is empty")
    } else if name.chars().count() > LONGEST {
        Some("is longer than 60 characters")
    } else if name.chars().any(|c| c.is_control() || "\"'.=[]".contains(c)) {
        Some("has a character that overrides cannot address: no quotes, points, brackets or equals signs")
    } else if name.ends_with(['+', '-', '\u{2212}']) {
        Some("ends in a sign, which a stack reads as the way its north points")
    } else if is_word {
        Some("is a word of the same table: overrides could not tell them apart")
    } else {
        None
    }
}

//! Explanations are in step with the words that the reader knows and with what a result holds.

#![allow(clippy::unwrap_used, clippy::panic, reason = "tests may stop at the first fault")]

use std::collections::BTreeSet;
use std::path::Path;

use lenzbore_solver::problem::SensibleRange;
use serde_json::Value;

use super::*;
use crate::case::{CaseSource, LAWS, ResolvedCase, STARTERS, TABLES, read_case};
use crate::result::{demo, summary};
use crate::table::FIGURES as COMPARED;
use crate::units::Kind;

#[test]
fn every_word_of_a_case_is_explained() {
    let lacking: Vec<String> = TABLES
        .iter()
        .flat_map(|t| t.words.iter().map(move |w| (t.path, *w)))
        .filter(|(path, word)| case_word(path, word).is_none())
        .map(|(path, word)| format!("'{word}' of table '{path}'"))
        .collect();
    assert!(lacking.is_empty(), "no entry in io/src/explain/case_words/: {}", lacking.join(", "));
    let unknown: Vec<String> = CASE_TABLES
        .iter()
        .flat_map(|t| t.words.iter().map(move |w| (t.path, w.word)))
        .filter(|(path, word)| !TABLES.iter().any(|t| t.path == *path && t.words.contains(word)))
        .map(|(path, word)| format!("'{word}' of table '{path}'"))
        .collect();
    assert!(unknown.is_empty(), "no word of io/src/case/words.rs: {}", unknown.join(", "));
}

/// What the reader wants of a word is what is explained; called wherever a test of this crate reads a quantity.
pub(crate) fn assert_explained(table: &str, word: &str, kind: Kind, range: SensibleRange) {
    // A word without its entry fails a test of its own.
    let Some(explained) = case_word(table, word) else { return };
    // A speed is held to its range by the reader itself, in words of its own.
    let range = if range.highest < f64::MAX { Some(Form::Quantity(kind, range)) } else { None };
    let holds = |form: &Form| match (form, range) {
        (Form::Quantity(k, _), None) => *k == kind,
        (form, wanted) => Some(*form) == wanted,
    };
    let known = match explained.form {
        Form::Any(forms) => forms.iter().any(holds),
        form => holds(&form),
    };
    assert!(known, "'{word}' of table '{table}' is read as {kind} ({range:?}) and explained as {:?}", explained.form);
}

#[test]
fn every_law_is_explained_and_its_words_are_words() {
    for law in LAWS {
        assert!(case_words::LAW_MEANINGS.iter().any(|(l, _)| *l == law.law), "law '{}' has no meaning", law.law);
        for word in law.words {
            assert!(case_word("travel", word).is_some(), "'{word}' of law '{}'", law.law);
        }
    }
}

#[test]
fn explanations_are_whole() {
    for table in CASE_TABLES {
        for w in table.words {
            let place = format!("'{}' of table '{}'", w.word, table.path);
            assert!(!w.about.is_empty() && !w.absent.is_empty(), "{place}");
            assert!(!w.about.ends_with('.') && !w.about.contains("  "), "{place}: {}", w.about);
            let has_value = !matches!(w.form, Form::Table | Form::Tables);
            assert_eq!(has_value, !w.example.is_empty(), "{place}: a value has an example");
        }
    }
    for f in FIGURES {
        assert!(!f.about.is_empty() && !f.source.is_empty() && !f.by.is_empty(), "{}", f.name);
    }
}

/// Every example case and every starter.
fn cases() -> Vec<(String, ResolvedCase)> {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("../examples");
    let files = std::fs::read_dir(folder).unwrap().map(|e| e.unwrap().path());
    let toml = files.filter(|p| p.extension().is_some_and(|e| e == "toml"));
    let mut cases: Vec<(String, ResolvedCase)> = toml
        .map(|p| (p.display().to_string(), read_case(&CaseSource::Path(&p), &[]).unwrap_or_else(|e| panic!("{e}"))))
        .collect();
    for starter in STARTERS {
        let text = CaseSource::Text { name: starter.kind, text: starter.text, base_dir: Path::new("") };
        cases.push((starter.kind.to_owned(), read_case(&text, &[]).unwrap_or_else(|e| panic!("{e}"))));
    }
    cases
}

/// The table of a resolved path: `wall.sleeve.thickness` is a word of `wall.layer`.
fn explained(path: &[String]) -> Vec<&'static CaseWord> {
    let Some((word, above)) = path.split_last() else { return Vec::new() };
    match above {
        [] => case_word("", word).into_iter().collect(),
        [table] => case_word(table, word).into_iter().collect(),
        [table, ..] => {
            let lists = TABLES.iter().find(|t| t.path == *table).map_or(&[][..], |t| t.lists);
            lists.iter().filter_map(|l| case_word(&format!("{table}.{l}"), word)).collect()
        }
    }
}

#[test]
fn resolved_words_have_the_unit_that_is_explained() {
    for (name, case) in cases() {
        for (path, word) in case.resolved.words() {
            // What follows from other words need not be a word itself.
            let words = explained(path);
            let kinds: Vec<_> = words.iter().flat_map(|w| w.form.kinds()).collect();
            if path[0] == "tolerance" || word.unit.is_empty() || words.is_empty() {
                continue;
            }
            let units: Vec<_> = kinds.iter().map(|k| k.si_unit()).collect();
            // How often fields are kept is a length or a time, in words.
            let known = units.contains(&word.unit) || path.join(".") == "output.fields";
            assert!(known, "{name}: {} is noted in {}, explained as {units:?}", path.join("."), word.unit);
        }
    }
}

/// Keys of an object and of all below it.
fn keys(value: &Value, into: &mut BTreeSet<String>) {
    match value {
        Value::Object(map) => {
            for (key, below) in map {
                into.insert(key.clone());
                if !matches!(key.as_str(), "resolved" | "record" | "spread" | "input_spread" | "strokes") {
                    keys(below, into);
                }
            }
        }
        Value::Array(list) => list.iter().for_each(|v| keys(v, into)),
        _ => {}
    }
}

#[test]
fn every_key_of_a_summary_is_explained() {
    let mut all = BTreeSet::new();
    for (_, outcome) in [demo::free(), demo::duty(), demo::curve(), demo::steady()] {
        keys(&summary(&demo::header("t"), &outcome).unwrap(), &mut all);
    }
    let known = meanings();
    let lacking: Vec<&String> = all.iter().filter(|k| find(k, &known).is_empty()).collect();
    assert!(lacking.is_empty(), "no entry in io/src/explain/: {lacking:?}");
}

#[test]
fn figures_that_can_be_compared_are_explained() {
    for compared in COMPARED {
        let about = figure_meaning(compared.name).unwrap_or_else(|| panic!("figure '{}'", compared.name));
        assert_eq!(about.unit, compared.kind.si_unit(), "{}", compared.name);
    }
}

#[test]
fn words_are_found_as_people_write_them() {
    let all = meanings();
    let what = |asked: &str| find(asked, &all).iter().map(|m| m.what.clone()).collect::<Vec<_>>();
    assert_eq!(what("[[wall.layer]]"), ["table of the case file"]);
    assert!(what("layer").iter().any(|w| w == "table of the case file"));
    assert_eq!(what("wall.layer.thickness"), ["word of [[wall.layer]]"]);
    assert_eq!(what("Drag Peak"), ["figure of a result"]);
    assert_eq!(what("steady"), ["law of travel"]);
    assert!(what("drag_N").iter().any(|w| w == "column of trace.csv"));
    assert!(what("flux_density_z_T").iter().any(|w| w == "array of run.h5"));
    assert!(what("length").len() > 3, "every table with a length");
    assert!(find("nosuchword", &all).is_empty());
    assert_eq!(nearest_names("thicknes", &all)[0], "thickness");
    assert!(nearest_names("peak force", &all).iter().any(|n| n == "drag_peak"));
    assert!(nearest_names("qqqq", &all).is_empty());
}

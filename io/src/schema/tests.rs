//! The schema knows what the reader knows: cases pass, unknown words and wrong shapes do not.

#![allow(clippy::unwrap_used, clippy::panic, reason = "tests may stop at the first fault")]

use std::path::Path;

use jsonschema::Validator;
use serde_json::{Map, Value, json};

use super::case_schema;
use crate::case::{LAWS, STARTERS, TABLES};
use crate::explain::{CASE_TABLES, Form};

fn validator() -> Validator {
    jsonschema::draft202012::new(&case_schema()).unwrap()
}

fn faults(case: &str) -> Vec<String> {
    let value: Value = toml::from_str(case).unwrap_or_else(|e| panic!("{e}\n{case}"));
    validator().iter_errors(&value).map(|e| format!("{}: {e}", e.instance_path())).collect()
}

#[test]
fn the_schema_is_one_of_its_draft() {
    assert!(jsonschema::draft202012::meta::is_valid(&case_schema()));
}

#[test]
fn examples_and_starters_pass() {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("../examples");
    let mut seen = 0;
    for entry in std::fs::read_dir(folder).unwrap() {
        let path = entry.unwrap().path();
        if path.extension().is_some_and(|e| e == "toml") {
            let found = faults(&std::fs::read_to_string(&path).unwrap());
            assert!(found.is_empty(), "{}: {found:#?}", path.display());
            seen += 1;
        }
    }
    assert!(seen >= 9);
    for starter in STARTERS {
        let found = faults(starter.text);
        assert!(found.is_empty(), "{}: {found:#?}", starter.kind);
    }
}

/// A case that starts from another and has this line in the table at `path`.
fn with_line(path: &str, line: &str) -> String {
    let table = TABLES.iter().find(|t| t.path == path).unwrap();
    let heading = if path.is_empty() { String::new() } else { format!("{}\n", table.label) };
    // Top words come first; `like` itself is one.
    let like = if path.is_empty() && line.starts_with("like") { "" } else { "like = \"base.toml\"\n" };
    format!("{like}{heading}{line}\n")
}

#[test]
fn every_example_line_passes_and_every_word_is_known() {
    for table in CASE_TABLES {
        for word in table.words.iter().filter(|w| !matches!(w.form, Form::Table | Form::Tables | Form::Tolerances)) {
            let found = faults(&with_line(table.path, word.example));
            assert!(found.is_empty(), "'{}' of '{}': {found:#?}", word.word, table.path);
        }
    }
    assert!(faults(&with_line("", "[tolerance]\n\"wall.sleeve.thickness\" = \"10 %\"")).is_empty());
    assert!(faults(&with_line("", "[tolerance]\nwall.sleeve.thickness = [\"1 mm\", 0.0]")).is_empty());
}

#[test]
fn unknown_words_fail_in_every_table() {
    for table in TABLES {
        let found = faults(&with_line(table.path, "nosuchword = 1"));
        assert!(found.iter().any(|f| f.contains("nosuchword")), "{}: {found:#?}", table.label);
    }
}

#[test]
fn every_word_refuses_what_is_none_of_its_shapes() {
    for table in CASE_TABLES {
        for word in table.words {
            // No word is true or false; a list of a list belongs nowhere either.
            for value in ["true", "[[true]]"] {
                let found = faults(&with_line(table.path, &format!("{} = {value}", word.word)));
                assert!(!found.is_empty(), "'{}' of '{}' takes {value}", word.word, table.path);
            }
        }
    }
}

#[test]
fn a_law_allows_its_own_words_alone() {
    for law in LAWS {
        for other in LAWS.iter().flat_map(|l| l.words) {
            let word = crate::explain::case_word("travel", other).unwrap();
            let case = with_line("travel", &format!("law = \"{}\"\n{}", law.law, word.example));
            assert_eq!(faults(&case).is_empty(), law.words.contains(other), "'{other}' under law '{}'", law.law);
        }
    }
}

#[test]
fn choices_quantities_and_counts_are_held_to_theirs() {
    let fails = |path: &str, line: &str| !faults(&with_line(path, line)).is_empty();
    assert!(fails("mover.magnet", "north = \"left\""));
    assert!(fails("wall.layer", "thickness = \"thick\""));
    assert!(fails("accuracy", "levels = 9"));
    assert!(fails("travel", "gates = [\"1 mm\"]"));
    assert!(fails("output", "fields = \"sometimes\""));
    assert!(!fails("wall", "length = \"endless\""));
    assert!(!fails("wall", "length = 0.6"));
    let bare: Value = Value::Object(Map::from_iter([("title".to_owned(), json!("no wall"))]));
    assert!(!validator().is_valid(&bare), "a case has wall and mover, or starts from one that has");
}

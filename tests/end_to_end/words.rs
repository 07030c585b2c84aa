//! `schema`, `explain` and `completions`: the words of the program, told by the program.

use serde_json::Value;

use crate::rig::Bench;

#[test]
fn the_schema_is_one_json_object() {
    let schema = Bench::new().succeed(&["schema"]).json();
    assert_eq!(schema["$schema"], "https://json-schema.org/draft/2020-12/schema");
    assert_eq!(schema["properties"]["wall"]["additionalProperties"], false);
    let thickness = &schema["properties"]["wall"]["properties"]["layer"]["items"]["properties"]["thickness"];
    assert!(thickness["description"].as_str().unwrap().contains("a bare number is in m"));
}

#[test]
fn a_word_is_explained_with_unit_default_and_source() {
    let bench = Bench::new();
    let gravity = bench.succeed(&["explain", "gravity"]).output;
    for said in ["word of [travel]", "m/s2", "where absent", "9.80665", "General Conference", "law free"] {
        assert!(gravity.contains(said), "{said} in {gravity}");
    }
    let drag = bench.succeed(&["explain", "drag_peak"]).output;
    assert!(drag.contains("figure of a result") && drag.contains("unit         N"), "{drag}");
    let command = bench.succeed(&["explain", "compare"]).output;
    assert!(command.contains("lenzbore compare"), "{command}");
    let json = bench.succeed(&["explain", "wall.layer.thickness", "--json"]).json();
    assert_eq!(json["meanings"][0]["what"], "word of [[wall.layer]]");
}

#[test]
fn without_a_word_all_are_listed() {
    let all = Bench::new().succeed(&["explain"]).output;
    for word in ["thickness", "transit_time", "drag_band_N", "ledger", "run.h5", "alternating", "materials"] {
        assert!(all.contains(word), "{word} in {all}");
    }
}

#[test]
fn an_unknown_word_is_refused_with_the_nearest() {
    let ran = Bench::new().run(&["explain", "thicknes"]);
    assert_eq!(ran.status, Some(2));
    assert!(ran.errors.contains("'thicknes'") && ran.errors.contains("thickness"), "{}", ran.errors);
}

#[test]
fn each_shell_has_its_script() {
    let bench = Bench::new();
    for shell in ["bash", "zsh", "fish", "powershell", "elvish"] {
        let script = bench.succeed(&["completions", shell]).output;
        for word in ["lenzbore", "compare", "monte-carlo"] {
            assert!(script.contains(word), "{shell}: {word}");
        }
    }
    assert_eq!(bench.run(&["completions", "nosuchshell"]).status, Some(2));
}

/// The figures of a summary are words of `explain`, with its unit.
pub fn assert_figures_are_explained(summary: &Value) {
    for (name, figure) in summary["figures"].as_object().unwrap() {
        let about = lenzbore_io::explain::figure_meaning(name)
            .unwrap_or_else(|| panic!("figure '{name}' has no entry in io/src/explain/figures.rs"));
        assert_eq!(about.unit, figure["unit"], "{name}");
    }
}

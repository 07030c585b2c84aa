//! `lenzbore validate`: lists, runs, writes, and ends with the right status.

use crate::rig::{Bench, entries, read_json, root};

#[test]
fn the_list_names_every_check_with_kind_and_source() {
    let list = Bench::new().succeed(&["validate", "--list"]).output;
    assert!(list.lines().count() >= 25, "{list}");
    for part in [
        "code verification",
        "cross-check",
        "validation (experiment)",
        "Nagaoka 1909",
        "field-thin-wall",
        "step-sphere",
    ] {
        assert!(list.contains(part), "{part} lacks in\n{list}");
    }
}

#[test]
fn checks_run_by_name_and_say_kind_source_reference_difference_and_verdict() {
    let bench = Bench::new();
    let ran = bench.succeed(&["validate", "--only", "loops", "--only", "grid-convergence"]);
    let head = ran.output.lines().next().unwrap();
    for column in ["check", "kind", "source", "reference", "ours", "band", "difference", "allowed", "verdict"] {
        assert!(head.contains(column), "{head}");
    }
    assert!(ran.output.contains("passes (16 of 16)"), "eight pairs of loops, M and dM/dh each: {}", ran.output);
    assert!(ran.output.contains("2 of 2 checks pass"), "{}", ran.output);
    assert_eq!(ran.errors, "");
    assert_eq!(bench.entries(), [""; 0]);
}

#[test]
fn json_and_folder_hold_every_comparison_with_its_source() {
    let bench = Bench::new();
    let words =
        ["validate", "--only", "field-critical-speed", "--only", "field-thin-wall", "--json", "--out", "result"];
    let ran = bench.succeed(&words);
    let json = ran.json();
    assert_eq!(json["passed"], true);
    let check = &json["checks"][1];
    assert_eq!(check["name"], "field-critical-speed");
    assert!(check["source"]["citation"].as_str().unwrap().contains("Saslow"));
    // Greatest drag of a dipole in a thin sheet, computed independently: V = 2.6932.
    let value = check["comparisons"][0]["value"].as_f64().unwrap();
    assert!((value - 2.6932).abs() < 1e-4, "{value}");
    let files = entries(&bench.path("result"));
    assert_eq!(
        files,
        ["differences.svg", "overview.md", "thin_wall.svg", "validation.html", "validation.json", "validation.md"]
    );
    assert_eq!(read_json(&bench.path("result/validation.json")), json);
    let page = std::fs::read_to_string(bench.path("result/validation.html")).unwrap();
    assert_eq!(page.matches("<svg").count(), 2);
    assert!(!page.contains("src=") && !page.contains("href=\"http"), "the page needs nothing else");
    let again = bench.run(&words);
    assert_eq!(again.status, Some(2), "an older result is not overwritten: {}", again.errors);
    bench.succeed(&[&words[..], &["--replace"]].concat());
}

#[test]
fn an_unknown_name_is_answered_with_the_nearest() {
    let ran = Bench::new().run(&["validate", "--only", "loop", "--only", "field-fal", "--only", "loops"]);
    assert_eq!(ran.status, Some(2));
    assert!(ran.errors.contains("'loop' is no check; did you mean 'loops'?"), "{}", ran.errors);
    assert!(ran.errors.contains("did you mean 'field-fall'?"), "{}", ran.errors);
    assert_eq!(ran.output, "");
}

#[test]
fn words_that_do_not_go_together_are_refused() {
    for words in [
        &["validate", "--coverage", "--only", "loops"][..],
        &["validate", "--seed", "7"],
        &["validate", "--coverage", "--cases", "3"],
        &["validate", "--replace"],
        &["validate", "--list", "--json"],
    ] {
        assert_eq!(Bench::new().run(words).status, Some(2), "{words:?}");
    }
}

/// Twenty cases: enough to see the words, too few for a verdict on the ratio, so either end is right; the study of 200 is run
/// with `lenzbore validate --coverage`, and one of 40 among the checks.
#[test]
fn the_study_of_the_bands_is_repeated_by_its_seed() {
    let bench = Bench::new();
    let study =
        |out: &str| bench.run(&["validate", "--coverage", "--cases", "20", "--seed", "7", "--json", "--out", out]);
    let first = study("a");
    assert!([Some(0), Some(1)].contains(&first.status), "{}", first.errors);
    let json = first.json();
    assert_eq!(json["cases"], 20);
    assert!(json["share_held"].as_f64().unwrap() >= 0.85, "{json}");
    assert_eq!(json["passed"].as_bool().unwrap(), first.status == Some(0));
    assert_eq!(entries(&bench.path("a")), ["coverage.html", "coverage.json", "coverage.md", "coverage.svg"]);
    assert_eq!(study("b").json()["errors"], json["errors"]);
}

/// The guide's lines are what this version says, but for digits below the limits.
#[test]
fn the_guide_shows_what_validate_says() {
    let guide = std::fs::read_to_string(root().join("io/guide/src/checks/about.md")).unwrap();
    let (head, _) = guide.split_once("verdict            figure").unwrap();
    let block = &guide[head.rfind("```text").unwrap()..];
    let shown: Vec<Vec<&str>> = block.lines().skip(1).take(4).map(columns).collect();
    let mut words = vec!["validate"];
    for line in &shown[1..] {
        words.extend(["--only", line[0]]);
    }
    let output = Bench::new().succeed(&words).output;
    let said: Vec<Vec<&str>> = output.lines().take(4).map(columns).collect();
    assert_eq!(shown[0], said[0]);
    for (shown, said) in shown.iter().zip(&said).skip(1) {
        for column in [0, 1, 2, 3, 7, 8, 9] {
            assert_eq!(shown[column], said[column], "the guide shows {shown:?}");
        }
        let number = |cell: &str| cell.parse::<f64>().unwrap();
        let apart = (number(shown[4]) - number(said[4])).abs();
        assert!(apart <= number(said[7]), "the guide shows {shown:?}, the program says {said:?}");
    }
}

/// Cells of a line, which two blanks or more keep apart.
fn columns(line: &str) -> Vec<&str> {
    line.split("  ").map(str::trim).filter(|cell| !cell.is_empty()).collect()
}

//! A result folder appears whole or not at all, and never in the place of another unasked.

use crate::rig::{Bench, QUICK, SETTLED_FILES, entries};

#[test]
fn an_existing_result_is_refused_and_untouched() {
    let bench = Bench::with("case.toml", QUICK);
    bench.succeed(&["run", "case.toml"]);
    let summary = bench.path("out/case/summary.json");
    std::fs::write(&summary, "kept").unwrap();
    let before = entries(&bench.path("out/case"));
    let ran = bench.run(&["run", "case.toml"]);
    assert_eq!(ran.status, Some(2));
    assert!(ran.errors.contains("out/case exists already") && ran.errors.contains("--replace"), "{}", ran.errors);
    assert_eq!(ran.output, "");
    assert_eq!(std::fs::read_to_string(&summary).unwrap(), "kept");
    assert_eq!(entries(&bench.path("out/case")), before);
}

#[test]
fn replace_puts_the_new_result_in_its_place() {
    let bench = Bench::with("case.toml", QUICK);
    bench.succeed(&["run", "case.toml"]);
    std::fs::write(bench.path("out/case/stale.txt"), "of the old result").unwrap();
    std::fs::write(bench.path("out/case/summary.json"), "old").unwrap();
    bench.succeed(&["run", "case.toml", "--replace"]);
    assert_eq!(entries(&bench.path("out")), ["case"], "nothing of the old result lies beside");
    assert_eq!(entries(&bench.path("out/case")), SETTLED_FILES);
    assert_ne!(std::fs::read_to_string(bench.path("out/case/summary.json")).unwrap(), "old");
}

#[test]
fn replace_spares_a_folder_that_is_no_result() {
    let bench = Bench::with("case.toml", QUICK);
    std::fs::create_dir(bench.path("home")).unwrap();
    std::fs::write(bench.path("home/letter.txt"), "dear").unwrap();
    let ran = bench.run(&["run", "case.toml", "--out", "home", "--replace"]);
    assert_eq!(ran.status, Some(2), "{}", ran.errors);
    assert_eq!(entries(&bench.path("home")), ["letter.txt"]);
    let ran = bench.run(&["run", "case.toml", "--out", "case.toml", "--replace"]);
    assert_eq!(ran.status, Some(2), "{}", ran.errors);
    assert_eq!(std::fs::read_to_string(bench.path("case.toml")).unwrap(), QUICK);
}

#[test]
fn only_what_is_asked_is_written() {
    let bench = Bench::with("case.toml", QUICK);
    bench.succeed(&["run", "case.toml", "--set", "output.write=[\"summary\"]"]);
    assert_eq!(entries(&bench.path("out/case")), ["summary.json"]);
    bench.succeed(&["run", "case.toml", "--replace", "--set", "output.fields=\"none\""]);
    assert_eq!(entries(&bench.path("out/case")), ["report.html", "section.png", "section.svg", "summary.json"]);
}

//! Every starter that `new` writes passes `check`, solves in seconds and meets its target.

use std::time::{Duration, Instant};

use crate::rig::Bench;

/// The longest a starter may take, on a machine that does other things beside.
const PATIENCE: Duration = Duration::from_secs(60);

#[test]
fn each_starter_is_commented_checked_and_solved() {
    for kind in ["arrestor", "damper", "coil-probe"] {
        let bench = Bench::new();
        let said = bench.succeed(&["new", "--kind", kind, "my.toml"]).output;
        assert!(said.contains("lenzbore check my.toml"), "{said}");
        let text = std::fs::read_to_string(bench.path("my.toml")).unwrap();
        assert!(text.lines().filter(|l| l.contains('#')).count() >= 12, "{kind} is commented");
        let checked = bench.succeed(&["check", "my.toml"]).output;
        assert!(checked.contains("running clearance"), "{kind}: {checked}");
        let begun = Instant::now();
        let summary = bench.succeed(&["run", "my.toml", "--out", "result", "--json"]).json();
        assert!(begun.elapsed() < PATIENCE, "{kind} took {:?}", begun.elapsed());
        assert_eq!(summary["accuracy"]["met"], true, "{kind}");
        crate::words::assert_figures_are_explained(&summary);
        if text.contains("[curve]") {
            let curve = bench.succeed(&["curve", "my.toml", "--out", "curve", "--json"]).json();
            assert_eq!(curve["accuracy"]["met"], true, "{kind}");
        }
    }
    let bench = Bench::new();
    assert!(bench.run(&["new", "--kind", "brake"]).errors.contains("coil-probe"));
    assert!(bench.entries().is_empty());
}

//! How warm the wall gets: what the binary reads, writes and says of it.

use crate::rig::{Bench, count_shown, entries, figure, root, run_example};

const SHUTTLE: &str = "shuttle-brake";

#[test]
fn a_duty_settles_where_it_gives_off_what_each_stop_brings() {
    let (summary, bench) = run_example(SHUTTLE, &[]);
    assert!(summary["accuracy"]["met"].as_bool().unwrap());
    let thermal = &summary["thermal"];
    assert!(thermal["duty"]["settled"].as_bool().unwrap());
    // Work = heat + field energy, and heat = stored + given off.
    let ledger = &thermal["heat_ledger"];
    assert!(ledger["imbalance_relative"].as_f64().unwrap().abs() < 1e-8, "{ledger}");
    assert!(summary["ledger"]["imbalance_relative"].as_f64().unwrap().abs() < 1e-5);
    // The mean rise of one event is its heat over mass and specific heat.
    let rise = figure(&summary, "temperature_rise_mean") * figure(&summary, "wall_heat_capacity");
    assert!((rise / summary["ledger"]["heat"].as_f64().unwrap() - 1.0).abs() < 1e-9);
    let files = entries(&bench.path("result"));
    for file in ["duty.csv", "duty.png", "duty.svg", "run.h5"] {
        assert!(files.iter().any(|f| f == file), "{file} lacks in {files:?}");
    }
    let text = std::fs::read_to_string(bench.path("result/duty.csv")).unwrap();
    assert_eq!(text.lines().count() - 1, usize::try_from(thermal["duty"]["stops"].as_u64().unwrap()).unwrap());
    let cautions = summary["cautions"].to_string();
    assert!(cautions.contains("ISO 13732-1") && cautions.contains("the drag would change"), "{cautions}");
    let shown = count_shown("io/guide/src/case/warmth.md", "# How warm the wall gets", &summary);
    assert!(shown > 10, "{shown}");
}

/// Names of the faults of a case with these words added.
fn refused(more: &str, set: &str) -> String {
    let bench = Bench::new();
    let text = std::fs::read_to_string(root().join("examples/stroke-damper.toml")).unwrap();
    bench.write("case.toml", &format!("{text}\n{more}"));
    let ran = bench.run(&["run", "case.toml", "--set", set]);
    assert_eq!(ran.status, Some(2), "{}", ran.errors);
    ran.errors
}

#[test]
fn what_cannot_be_told_is_refused_with_its_reason() {
    let errors = refused("[duty]\nperiod = \"20 s\"\n", "accuracy.levels=3");
    assert!(errors.contains("a stroke goes on and on"), "{errors}");
    assert!(errors.contains("a wall that gives off no heat never settles"), "all faults at once: {errors}");
    let errors = refused("[cooling]\nbore_film_coefficient = \"8 W/m2\"\n", "accuracy.levels=3");
    assert!(errors.contains("a film coefficient") && errors.contains("W/(m2 K)"), "{errors}");
}

//! `rerun` from outside: a result solves again without its case file.

use crate::rig::{Bench, QUICK, read_json, root};

#[test]
fn a_run_comes_back_without_its_files() {
    let bench = Bench::with("case.toml", QUICK);
    bench.succeed(&["run", "case.toml", "--out", "result", "--set", "travel.speed=7 m/s"]);
    std::fs::remove_file(bench.path("case.toml")).unwrap();
    let ran = bench.succeed(&["rerun", "result"]);
    assert!(ran.output.contains("drag") && ran.output.contains(" back"), "{}", ran.output);
    assert!(!ran.output.contains("NOT BACK") && !ran.output.contains("others now"), "{}", ran.output);
    let json = bench.succeed(&["rerun", "result", "--json"]).json();
    assert_eq!(json["all_back"], true);
    assert_eq!(json["digest_then"], json["digest_now"]);
    assert_eq!(bench.entries(), ["result"], "rerun writes nothing");
}

#[test]
fn a_curve_and_a_motion_from_a_table_come_back() {
    let bench = Bench::with("case.toml", QUICK);
    bench.succeed(&["curve", "case.toml", "--out", "curve"]);
    assert_eq!(bench.succeed(&["rerun", "curve", "--json"]).json()["all_back"], true);
    let cam = root().join("examples/cam-follower.toml");
    bench.succeed(&["run", cam.to_str().unwrap(), "--out", "cam"]);
    assert_eq!(bench.succeed(&["rerun", "cam", "--json"]).json()["all_back"], true);
}

#[test]
fn a_figure_that_does_not_come_back_is_named() {
    let bench = Bench::with("case.toml", QUICK);
    bench.succeed(&["run", "case.toml", "--out", "result"]);
    let mut summary = read_json(&bench.path("result/summary.json"));
    let drag = summary["figures"]["drag"]["value"].as_f64().unwrap();
    let band = summary["figures"]["drag"]["band"].as_f64().unwrap();
    summary["figures"]["drag"]["value"] = (drag + 3.0 * band).into();
    summary["resolved"]["wall"]["tube"]["conductivity"]["value"] = 57.0e6.into();
    std::fs::write(bench.path("result/summary.json"), summary.to_string()).unwrap();
    let ran = bench.run(&["rerun", "result"]);
    assert_eq!(ran.status, Some(1));
    let line = ran.output.lines().find(|l| l.starts_with("drag ")).unwrap();
    assert!(line.contains("NOT BACK"), "{line}");
    assert!(ran.output.contains("wall.tube.conductivity: 57000000.0 then, 58000000.0 now"), "{}", ran.output);
    assert_eq!(ran.errors, "1 of 4 figures did not come back within their bands\n");
}

#[test]
fn what_cannot_be_solved_again_says_why() {
    let bench = Bench::with("case.toml", QUICK);
    let none = bench.run(&["rerun", "nosuchfolder"]);
    assert_eq!(none.status, Some(2));
    assert!(none.errors.contains("nosuchfolder holds no result"), "{}", none.errors);
    bench.succeed(&["ladder", "case.toml", "--out", "ladder"]);
    let ladder = bench.run(&["rerun", "ladder"]);
    assert_eq!(ladder.status, Some(2));
    assert!(ladder.errors.contains("`ladder`"), "{}", ladder.errors);
}

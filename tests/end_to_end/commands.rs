//! What the commands say and how they end.

use std::io::Write as _;
use std::process::{Command, Stdio};

use crate::rig::{Bench, QUICK, Ran, SETTLED_FILES, SLOW, entries, figure, read_json, root};

fn run_on_standard_input(bench: &Bench, words: &[&str], text: &str) -> Ran {
    let mut command = bench.command(words);
    let mut child = command.stdin(Stdio::piped()).stdout(Stdio::piped()).stderr(Stdio::piped()).spawn().unwrap();
    child.stdin.take().unwrap().write_all(text.as_bytes()).unwrap();
    Ran::of(&child.wait_with_output().unwrap())
}

#[test]
fn a_run_says_its_figures_and_writes_them() {
    let bench = Bench::with("case.toml", QUICK);
    let ran = bench.succeed(&["run", "case.toml"]);
    for part in ["Dipole in a tube", "drag ", "N s/m", "+/-", "three forces", "ledger: work", "written to out/case:"] {
        assert!(ran.output.contains(part), "{part} lacks in\n{}", ran.output);
    }
    assert_eq!(bench.entries(), ["case.toml", "out"]);
    assert_eq!(entries(&bench.path("out")), ["case"]);
    let files = entries(&bench.path("out/case"));
    assert_eq!(files, SETTLED_FILES);
    // Fourier-Bessel integral of this dipole and wall, computed independently: 2.212929281 N.
    let drag = figure(&read_json(&bench.path("out/case/summary.json")), "drag");
    assert!((drag / 2.212_929_281 - 1.0).abs() < 2e-5, "{drag}");
}

#[test]
fn a_curve_goes_to_a_folder_of_its_own() {
    let bench = Bench::with("case.toml", QUICK);
    bench.succeed(&["run", "case.toml"]);
    bench.succeed(&["curve", "case.toml"]);
    assert_eq!(entries(&bench.path("out")), ["case", "case-curve"]);
    let table = std::fs::read_to_string(bench.path("out/case-curve/curve.csv")).unwrap();
    let mut lines = table.lines();
    assert!(lines.next().unwrap().starts_with("speed_m_per_s,drag_N,drag_band_N"), "{table}");
    let last: Vec<f64> = lines.last().unwrap().split(',').map(|x| x.parse().unwrap()).collect();
    // The same integral at 100 m/s: 2.574114186 N.
    assert_eq!(last[0], 100.0);
    assert!((last[1] / 2.574_114_186 - 1.0).abs() < 2e-5, "{}", last[1]);
}

#[test]
fn json_is_the_summary_and_nothing_else() {
    let bench = Bench::with("case.toml", QUICK);
    for (command, folder) in [("run", "out/case"), ("curve", "out/case-curve")] {
        let ran = bench.succeed(&[command, "case.toml", "--json"]);
        assert_eq!(ran.json(), read_json(&bench.path(folder).join("summary.json")));
        assert_eq!(ran.errors, "");
    }
    let forecast = bench.succeed(&["check", "case.toml", "--json"]).json();
    assert!(forecast["forecast"]["run"]["memory_bytes"].as_f64().unwrap() > 1e5);
    assert!(forecast["forecast"]["curve"]["time_s"].as_f64().unwrap() > 0.0);
}

#[test]
fn a_case_comes_from_standard_input() {
    let bench = Bench::new();
    let ran = run_on_standard_input(&bench, &["run", "-"], QUICK);
    assert_eq!(ran.status, Some(0), "{}", ran.errors);
    assert_eq!(entries(&bench.path("out")), ["case"]);
    let ran = run_on_standard_input(&bench, &["run", "-", "--out", "other"], &QUICK.replace("2 mm", "2 mT"));
    assert_eq!(ran.status, Some(2));
    assert!(ran.errors.starts_with("-:10:13: thickness"), "{}", ran.errors);
    assert!(!bench.path("other").exists());
}

#[test]
fn set_overrides_any_word() {
    let bench = Bench::with("case.toml", QUICK);
    let at = |words: &[&str]| {
        let all: Vec<&str> =
            ["run", "case.toml", "--json", "--replace"].into_iter().chain(words.iter().copied()).collect();
        figure(&bench.succeed(&all).json(), "drag")
    };
    let plain = at(&[]);
    // The drag of a dipole goes with its moment squared.
    let double = at(&["--set", "mover.D.moment=2 A m2"]);
    assert!((double / plain - 4.0).abs() < 1e-9, "{plain} {double}");
    // Conductivity s times higher at speed v / s: the same drag.
    let scaled = at(&["--set", "wall.tube.conductivity=\"29 MS/m\"", "--set", "travel.speed=\"10 m/s\""]);
    assert!((scaled / plain - 1.0).abs() < 1e-6, "{plain} {scaled}");
}

#[test]
fn a_case_starts_from_another() {
    let bench = Bench::with("base.toml", QUICK);
    bench.write("thick.toml", "like = \"base.toml\"\n[[wall.layer]]\nname = \"tube\"\nthickness = \"4 mm\"\n");
    let resolved = bench.succeed(&["check", "thick.toml", "--json"]).json().to_string();
    assert!(resolved.contains("0.004"), "{resolved}");
}

#[test]
fn a_missed_target_ends_with_4_advice_and_results() {
    let bench = Bench::with("case.toml", QUICK);
    let ran = bench.run(&["run", "case.toml", "--set", "accuracy.target=\"1e-7 %\""]);
    assert_eq!(ran.status, Some(4), "{}", ran.errors);
    assert!(ran.errors.starts_with("the accuracy target was missed: "), "{}", ran.errors);
    assert!(ran.errors.contains("accuracy."), "it says what would help: {}", ran.errors);
    assert!(ran.output.contains("TARGET MISSED"), "{}", ran.output);
    let summary = read_json(&bench.path("out/case/summary.json"));
    assert_eq!(summary["accuracy"]["met"], false);
    assert!(ran.errors.contains(summary["accuracy"]["advice"].as_str().unwrap()));
    assert!(summary["accuracy"]["worst"]["band_relative"].as_f64().unwrap() > 1e-9);
}

#[test]
fn commands_that_are_not_built_say_so() {
    let bench = Bench::with("case.toml", QUICK);
    for word in ["sweep", "identify"] {
        let ran = bench.run(&[word, "case.toml"]);
        assert_eq!(ran.status, Some(2), "{word}");
        assert_eq!(ran.errors, format!("'lenzbore {word}' is not built yet\n"));
        assert_eq!(ran.output, "");
    }
    let ran = bench.run(&["runn", "case.toml"]);
    assert_eq!(ran.status, Some(2));
    assert!(ran.errors.contains("did you mean 'run'?"), "{}", ran.errors);
    assert_eq!(bench.entries(), ["case.toml"]);
}

#[test]
fn the_starter_can_be_checked_and_is_never_overwritten() {
    let bench = Bench::new();
    bench.succeed(&["new"]);
    let starter = std::fs::read_to_string(bench.path("case.toml")).unwrap();
    let ran = bench.succeed(&["check", "case.toml"]);
    assert!(ran.output.contains("lenzbore run: equation of motion"), "{}", ran.output);
    assert!(ran.output.contains("lenzbore curve: "), "{}", ran.output);
    bench.write("case.toml", "mine");
    let ran = bench.run(&["new"]);
    assert_eq!(ran.status, Some(2));
    assert!(ran.errors.contains("case.toml exists already"), "{}", ran.errors);
    assert_eq!(std::fs::read_to_string(bench.path("case.toml")).unwrap(), "mine");
    assert_eq!(bench.succeed(&["new", "-"]).output, starter);
}

#[test]
fn materials_have_sources() {
    let ran = Bench::new().succeed(&["materials", "--search", "Cu-DHP"]);
    assert!(ran.output.starts_with("copper Cu-DHP"), "{}", ran.output);
    assert!(ran.output.contains("MS/m"), "{}", ran.output);
    let bench = Bench::with("case.toml", &QUICK.replace("conductivity = \"58 MS/m\"", "material = \"copper\""));
    let ran = bench.run(&["run", "case.toml"]);
    assert_eq!(ran.status, Some(2));
    assert!(ran.errors.contains("copper Cu-DHP"), "a bare metal is refused with its grades: {}", ran.errors);
}

/// `script` gives the program a terminal; without one there is no bar.
#[test]
fn a_bar_shows_on_a_terminal_only() {
    let bench = Bench::with("case.toml", &SLOW.replace("\"15 m\"", "\"1.5 m\"").replace("15.02 m", "1.52 m"));
    let plain = bench.succeed(&["run", "case.toml"]);
    assert_eq!(plain.errors, "");
    let line = format!("{} run case.toml --replace", assert_cmd::cargo::cargo_bin!("lenzbore").display());
    let mut command = Command::new("script");
    command.args(["-qec", &line, "/dev/null"]).current_dir(bench.path(".")).stdin(Stdio::null()).env("TERM", "xterm");
    let seen = Ran::of(&command.output().unwrap());
    assert_eq!(seen.status, Some(0), "{}", seen.output);
    assert!(seen.output.contains(" left"), "no bar with time left in {:?}", seen.output);
}

#[test]
fn help_names_the_commands_and_the_exit_statuses() {
    let ran = Bench::new().succeed(&["--help"]);
    for part in ["new", "check", "run", "curve", "materials", "Exit status: 0 done", "not an approval"] {
        assert!(ran.output.contains(part), "{part} lacks in\n{}", ran.output);
    }
}

/// The README's commands name files that are there and words that the program knows.
#[test]
fn the_readme_gives_two_commands() {
    let text = std::fs::read_to_string(root().join("README.md")).unwrap();
    let lines = |what: &str| text.lines().filter(|l| l.contains(what)).count();
    assert_eq!(lines("; cargo test --release --workspace"), 1, "one test command, which .ci/run takes from here");
    assert_eq!(lines("; cargo run --release -- curve examples/arrest-sleeve.toml"), 1);
    for link in text.split("](").skip(1).filter_map(|l| l.split(')').next()) {
        assert!(root().join(link).exists(), "README.md points at {link}, which is not there");
    }
}

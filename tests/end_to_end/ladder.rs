//! `lenzbore ladder`: its folder, its top, what it names, and what the guide shows of it.

use serde_json::Value;

use crate::rig::{Bench, QUICK, band, entries, figure, read_json, root};

fn effects(summary: &Value) -> Vec<&str> {
    summary["rungs"].as_array().unwrap().iter().map(|r| r["effect"].as_str().unwrap()).collect()
}

/// The last rung and the figures are those of `run`.
fn assert_top_is_the_run(bench: &Bench, case: &str, ladder: &Value) {
    let run = bench.succeed(&["run", case, "--json", "--out", "the-run"]).json();
    let rungs = ladder["rungs"].as_array().unwrap();
    for (name, own) in run["figures"].as_object().unwrap() {
        let value = own["value"].as_f64().unwrap();
        let top = rungs[rungs.len() - 1]["figures"][name]["value"].as_f64().unwrap();
        // The same computation; two runs of it may differ by rounding, as threads come in another order.
        assert!((top / value - 1.0).abs() < 1e-9, "{name}: {top} on the ladder, {value} by run");
        assert_eq!(ladder["figures"][name]["value"].as_f64().unwrap(), top, "{name}");
    }
}

#[test]
fn a_settled_case_climbs_to_its_run() {
    let bench = Bench::with("case.toml", QUICK);
    let ran = bench.succeed(&["ladder", "case.toml", "--json"]);
    assert_eq!(ran.errors, "");
    let ladder = ran.json();
    assert_eq!(ladder, read_json(&bench.path("out/case-ladder/summary.json")));
    let files = entries(&bench.path("out/case-ladder"));
    let pictures = ["error_map.png", "error_map.svg", "waterfall.png", "waterfall.svg"];
    for file in ["ladder.csv", "report.html", "summary.json"].into_iter().chain(pictures) {
        assert!(files.iter().any(|f| f == file), "{file} lacks in {files:?}");
    }
    assert_eq!(files.len(), 7);
    assert_top_is_the_run(&bench, "case.toml", &ladder);
    assert_eq!(effects(&ladder), ["quick rule", "wall thickness", "induction"]);
    // A dipole in a thin tube: 45 mu0^2 m^2 sigma w v / (1024 a^4), the published rule (W. M. Saslow, Am. J. Phys. 60, 693, 1992).
    let mu0 = 4e-7 * std::f64::consts::PI;
    let rule = 45.0 / 1024.0 * mu0 * mu0 * 58e6 * 2e-3 * 5.0 / 10.5e-3_f64.powi(4);
    let foot = ladder["ladder"]["drag"]["values"][0]["value"].as_f64().unwrap();
    assert!((foot / rule - 1.0).abs() < 1e-6, "{foot} {rule}");
    // A second ladder does not overwrite the first.
    let again = bench.run(&["ladder", "case.toml"]);
    assert_eq!(again.status, Some(2));
    bench.succeed(&["ladder", "case.toml", "--replace"]);
}

#[test]
fn temperature_and_the_curve_have_their_ladders() {
    let bench = Bench::with("case.toml", QUICK);
    let warm = ["--set", "wall.temperature=\"80 degC\"", "--set", "wall.tube.temperature_coefficient=\"0.0039 /K\""];
    let words: Vec<&str> = ["ladder", "case.toml", "--json", "--out", "warm"].into_iter().chain(warm).collect();
    let ladder = bench.succeed(&words).json();
    assert_eq!(effects(&ladder), ["quick rule", "wall thickness", "induction", "temperature"]);
    // Conductivity falls to 1/(1 + 0.0039 x 60), and at 5 m/s the drag almost with it.
    let steps = ladder["ladder"]["drag"]["steps"].as_array().unwrap();
    let worth = steps[steps.len() - 1]["worth_percent"].as_f64().unwrap();
    assert!((-23.4..-20.0).contains(&worth), "{worth}");
    let curve = bench.succeed(&["ladder", "case.toml", "--json", "--curve", "--out", "curve"]).json();
    let own = bench.succeed(&["curve", "case.toml", "--json", "--out", "own"]).json();
    for name in ["drag_max", "critical_speed", "damping_coefficient_zero_speed"] {
        assert!((figure(&curve, name) / figure(&own, name) - 1.0).abs() < 1e-9, "{name}");
    }
    assert!(curve["ladder"]["critical_speed"]["steps"].as_array().unwrap().is_empty(), "no quick model has one");
    let bare = QUICK.split("[curve]").next().unwrap();
    bench.write("bare.toml", bare);
    let ran = bench.run(&["ladder", "bare.toml", "--curve"]);
    assert_eq!(ran.status, Some(2));
    assert!(ran.errors.contains("the case has no [curve]"), "{}", ran.errors);
}

#[test]
fn errors_that_cancel_are_named() {
    let case = QUICK
        .replace("[[mover.dipole]]\nname = \"D\"\nmoment = \"1 A m2\"", MAGNET)
        .replace(
            "inner_diameter = \"21 mm\"\nthickness = \"2 mm\"",
            "inner_diameter = \"20 mm\"\nthickness = \"10 mm\"",
        )
        // mu0 sigma v a = 3.
        .replace("speed = \"5 m/s\"", "speed = \"4.116 m/s\"");
    let bench = Bench::with("case.toml", &case);
    let ran = bench.succeed(&["ladder", "case.toml"]);
    let model = "ring sum: magnets as they are, mean radius: drag";
    let (_, after) = ran.output.split_once(model).unwrap_or_else(|| panic!("{}", ran.output));
    let line = after.lines().nth(1).unwrap();
    assert!(line.contains("because two errors cancel"), "{line}");
    assert!(line.contains("leaving out induction") && line.contains("leaving out wall thickness"), "{line}");
}

const MAGNET: &str = r#"[[mover.magnet]]
name = "M"
remanence = "1.2 T"
recoil_permeability = 1
outer_diameter = "16 mm"
length = "16 mm""#;

/// The guide's ladder is what this version gives: figures within their bands, rungs to the digits shown (coupled rings and
/// what stands above them to 1e-3 of the figure).
#[test]
fn the_guide_shows_this_ladder() {
    let bench = Bench::new();
    let case = root().join("examples/arrest-sleeve.toml");
    let ladder = bench.succeed(&["ladder", case.to_str().unwrap(), "--json", "--out", "result"]).json();
    let text = std::fs::read_to_string(root().join("io/guide/src/judge/ladder.md")).unwrap();
    let (_, after) = text.split_once("# What simpler models cost").unwrap();
    let block = after.split("```").nth(1).unwrap();
    let mut name = "";
    let mut shown = 0;
    for line in block.lines() {
        if let Some((left, right)) = line.split_once(" = ") {
            name = left;
            let words: Vec<&str> = right.split_whitespace().collect();
            let value: f64 = words[0].parse().unwrap();
            let shown_band: f64 = words[words.len() - 1].parse().unwrap();
            assert!((value - figure(&ladder, name)).abs() <= 1.05 * (shown_band + band(&ladder, name)), "{line}");
        } else if line.starts_with("  ") && !name.is_empty() {
            let restored: Vec<&Value> = ladder["ladder"][name]["values"].as_array().unwrap().iter().collect();
            let found = restored.iter().find(|v| line.trim_start().starts_with(v["effect"].as_str().unwrap())).unwrap();
            let found = found["value"].as_f64().unwrap();
            let value: f64 = line[34..].split_whitespace().next().unwrap().parse().unwrap();
            assert!((value / found - 1.0).abs() < 1e-3, "the guide shows {line}; now {found}");
            shown += 1;
        }
    }
    assert!(shown >= 14, "two ladders of seven rungs, {shown} lines found");
}

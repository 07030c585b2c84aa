//! Gauges at fixed places: what a run writes of them, and that it is physics.

use serde_json::Value;

use crate::rig::{Bench, entries, figure, read_json, root};

const SLEEVE: &str = "gauge-sleeve";

/// The columns of `stations.csv` by name.
fn column(bench: &Bench, name: &str) -> Vec<f64> {
    let text = std::fs::read_to_string(bench.path("result/stations.csv")).unwrap();
    let mut lines = text.lines();
    let at = lines.next().unwrap().split(',').position(|n| n == name).unwrap_or_else(|| panic!("no column {name}"));
    lines.map(|l| l.split(',').nth(at).unwrap().parse().unwrap()).collect()
}

#[test]
fn a_bench_with_gauges() {
    let bench = Bench::new();
    let case = root().join(format!("examples/{SLEEVE}.toml"));
    let summary: Value = bench.succeed(&["run", case.to_str().unwrap(), "--json", "--out", "result"]).json();
    assert_eq!(summary, read_json(&bench.path("result/summary.json")));
    assert!(summary["accuracy"]["met"].as_bool().unwrap());
    let files = entries(&bench.path("result"));
    for file in ["stations.csv", "stations.png", "stations.svg", "run.h5"] {
        assert!(files.iter().any(|f| f == file), "{file} lacks in {files:?}");
    }
    let time = column(&bench, "time_s");
    // A search coil's e.m.f. integrates to nothing over a passage.
    for coil in ["coil around", "coil before"] {
        let emf = column(&bench, &format!("{coil}:emf_V"));
        let area = |f: fn(f64) -> f64| -> f64 {
            (1..time.len()).map(|k| 0.5 * (f(emf[k]) + f(emf[k - 1])) * (time[k] - time[k - 1])).sum()
        };
        assert!(area(|v| v).abs() < 2e-3 * area(f64::abs), "{coil}: {} of {}", area(|v| v), area(f64::abs));
        let peak = figure(&summary, &format!("station.{coil}.emf_peak"));
        let greatest = emf.iter().fold(0.0_f64, |m, v| m.max(v.abs()));
        assert!(peak.abs() >= greatest * (1.0 - 1e-9) && peak.abs() < 1.05 * greatest, "{peak} and {greatest}");
        let bands = column(&bench, &format!("{coil}:emf_band_V"));
        assert!(bands.iter().all(|b| *b > 0.0 && *b < 2e-3 * greatest), "bands that tell something");
    }
    // The wall shields the coil around it: the same turns before its end see more.
    let of = |coil: &str| figure(&summary, &format!("station.{coil}.emf_peak")).abs();
    assert!(of("coil before") > of("coil around"));
    assert_eq!(summary["stations"]["probe"]["what"], "flux density");
}

#[test]
fn what_no_gauge_can_read_is_refused() {
    let case = root().join(format!("examples/{SLEEVE}.toml"));
    let bench = Bench::new();
    for (set, why) in [
        ("output.probe.diameter=10 mm", "stands in the way of part"),
        ("output.wall.radius=20 mm", "no layer conducts"),
        ("output.probe.at=5 m", "farther"),
    ] {
        let ran = bench.run(&["check", case.to_str().unwrap(), "--set", set]);
        assert_eq!(ran.status, Some(2), "{set}");
        assert!(ran.errors.contains(why), "{set}: {}", ran.errors);
    }
}

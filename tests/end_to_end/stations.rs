//! Gauges at fixed places: what a run writes of them, and that it is physics.

use std::f64::consts::PI;

use lenzbore_solver::sources::{AxialField, Source};
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

/// psi of the example's two magnets at the coils' radius, `above` their middle, Wb/rad.
fn pair(above: f64) -> f64 {
    let magnet = |remanence_tesla| Source::Magnet {
        inner_radius_m: 0.0,
        outer_radius_m: 11e-3,
        length_m: 14e-3,
        remanence_tesla,
    };
    magnet(1.28).psi(14.5e-3, above + 7.05e-3) + magnet(-1.28).psi(14.5e-3, above - 7.05e-3)
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
    // A search coil's e.m.f. integrates to the turns times the flux linkage that the mover took away: closed form, no currents left.
    for (coil, at) in [("coil around", 50e-3), ("coil before", 110e-3)] {
        let emf = column(&bench, &format!("{coil}:emf_V"));
        let area = |f: fn(f64) -> f64| -> f64 {
            (1..time.len()).map(|k| 0.5 * (f(emf[k]) + f(emf[k - 1])) * (time[k] - time[k - 1])).sum()
        };
        let taken = 40.0 * 2.0 * PI * (pair(at + 60e-3) - pair(at - 160e-3));
        let (found, all) = (area(|v| v), area(f64::abs));
        assert!((found - taken).abs() < 2e-3 * all, "{coil}: {found} of {all}, {taken} by the flux");
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

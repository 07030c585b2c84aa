//! Coils at rest with alternating current: the example, its files, its words.
//!
//! Values of the probe coil in an endless tube: the integral of C. V. Dodd and W. E. Deeds, J. Appl. Phys. 39, 2829-2838 (1968), equation derived anew,
//! computed independently with SciPy (Bessel functions scaled, 60 panels of 40 points over the wavenumber); its inductance alone by Maxwell's mutual
//! inductance of loops over both sections. A tube of 400 mm has ends that change them by less than 1e-6 (the induced field falls with the third power of
//! the distance, its heat with the sixth).

use serde_json::Value;

use crate::rig::{Bench, band, entries, figure, read_json, root};

fn example() -> String {
    root().join("examples/coil-probe.toml").to_str().unwrap().to_owned()
}

fn point(summary: &Value, k: usize) -> (f64, f64, f64) {
    let p = &summary["frequency"]["points"][k];
    let of = |name: &str| p[name]["value"].as_f64().unwrap();
    (p["frequency_Hz"].as_f64().unwrap(), of("resistance_change_ohm"), of("reactance_change_ohm"))
}

#[test]
fn the_probe_in_a_long_tube_has_the_impedance_of_the_integral() {
    let bench = Bench::new();
    let sets = ["--set", "wall.length=\"400 mm\"", "--set", "travel.position=\"200 mm\""];
    let case = example();
    let words = [&["run", case.as_str(), "--json", "--out", "result"], sets.as_slice()].concat();
    let summary = bench.succeed(&words).json();
    assert!((figure(&summary, "inductance_alone") / 189.873_369_344e-6 - 1.0).abs() < 1e-9);
    for (k, hertz, resistance, reactance) in [
        (0, 50.0, 0.001_070_705_773_8, -5.098_698_123_2e-5),
        (12, 3_162.277_660_168_379, 0.562_970_749_70, -1.316_151_757_6),
        (24, 200_000.0, 5.517_330_349_7, -117.505_747_807),
    ] {
        let (found, r, x) = point(&summary, k);
        assert!((found / hertz - 1.0).abs() < 1e-12, "{found}");
        assert!((r / resistance - 1.0).abs() < 1e-5, "{hertz} Hz: {r} and {resistance}");
        assert!((x / reactance - 1.0).abs() < 1e-5, "{hertz} Hz: {x} and {reactance}");
    }
    // The greatest ratio of the same integral, found by Brent's method.
    assert!((figure(&summary, "critical_frequency") / 1_230.405_6 - 1.0).abs() < 1e-5);
}

#[test]
fn the_example_writes_tables_fields_and_pictures() {
    let bench = Bench::new();
    let summary = bench.succeed(&["run", &example(), "--json", "--out", "result"]).json();
    crate::words::assert_figures_are_explained(&summary);
    assert_eq!(summary, read_json(&bench.path("result/summary.json")));
    assert!(summary["accuracy"]["met"].as_bool().unwrap());
    let files = entries(&bench.path("result"));
    for file in ["frequency.csv", "across.csv", "run.h5", "impedance.png", "impedance.svg", "current_across.png"] {
        assert!(files.iter().any(|f| f == file), "{file} lacks in {files:?}");
    }
    let table = std::fs::read_to_string(bench.path("result/frequency.csv")).unwrap();
    assert!(
        table.starts_with("frequency_Hz,resistance_ohm,reactance_ohm,inductance_H,resistance_change_ohm,"),
        "{table}"
    );
    assert_eq!(table.lines().count(), 26);
    // Resistance is the winding's 1.4 ohm and what the wall adds; heat gives the same.
    let last: Vec<f64> = table.lines().last().unwrap().split(',').map(|c| c.parse().unwrap()).collect();
    assert!((last[1] - 1.4 - last[4]).abs() < 1e-12 && (last[8] / last[4] - 1.0).abs() < 1e-5, "{last:?}");
    guide(&summary);
}

/// The figures in the guide lie within the bands of those just computed.
fn guide(summary: &Value) {
    let text = std::fs::read_to_string(root().join("io/guide/src/case/coil-probe.md")).unwrap();
    let (_, block) = text.split_once("Probe coil in a brass tube\nended: settled").unwrap();
    let mut shown = 0;
    for line in block.lines().take_while(|l| *l != "```").filter(|l| l.contains(" +/- ")) {
        let words: Vec<&str> = line.split_whitespace().collect();
        let value: f64 = words[1].parse().unwrap();
        let apart = (value - figure(summary, words[0])).abs();
        assert!(apart <= 2.1 * band(summary, words[0]), "the guide shows {} = {value}: {apart} away", words[0]);
        shown += 1;
    }
    assert_eq!(shown, 3);
}

#[test]
fn one_frequency_has_its_figures_and_a_magnet_is_refused() {
    let bench = Bench::new();
    let text = std::fs::read_to_string(example()).unwrap();
    let one = text.replace("frequencies = [\"50 Hz\", \"200 kHz\"]\npoints = 25", "frequency = \"5 kHz\"");
    bench.write("one.toml", &one);
    let summary = bench.succeed(&["run", "one.toml", "--json", "--out", "result"]).json();
    crate::words::assert_figures_are_explained(&summary);
    for name in ["resistance", "reactance", "inductance", "shielding_factor", "skin_depth", "dissipated_power"] {
        assert!(figure(&summary, name) > 0.0, "{name}");
    }
    assert!(figure(&summary, "reactance_change") < 0.0 && figure(&summary, "shielding_factor") < 1.0);
    assert!(summary["ledger"]["imbalance_relative"].as_f64().unwrap().abs() < 1e-5);
    bench.write(
        "magnet.toml",
        &one.replace("[travel]", "[[mover.dipole]]\nmoment = \"1 A m2\"\nat = \"30 mm\"\n[travel]"),
    );
    let ran = bench.run(&["run", "magnet.toml"]);
    assert_eq!(ran.status, Some(2));
    assert!(ran.errors.contains("drives coils"), "{}", ran.errors);
}

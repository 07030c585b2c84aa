//! Strokes and motions from a table: what the binary reads, writes and says of them.

use crate::rig::{Bench, band, check_shown, entries, figure, root, run_example};

const STROKE: &str = "stroke-damper";
const CAM: &str = "cam-follower";
const DAMPING: &str = "damping_coefficient_equivalent";

#[test]
fn a_stroke_settles_and_its_loss_is_work_and_heat() {
    let (summary, bench) = run_example(STROKE, &[]);
    assert!(summary["accuracy"]["met"].as_bool().unwrap() && summary["forces"]["agree"].as_bool().unwrap());
    check_shown("io/guide/src/case/damper.md", "```text\nStroke damper for a slender tool\n", &summary);
    let loss = figure(&summary, "loss_per_cycle");
    for part in ["work", "heat"] {
        let other = summary["ledger"][part].as_f64().unwrap();
        assert!((other / loss - 1.0).abs() < 1e-6, "{part}: {other} and {loss}");
    }
    // loss = pi omega c X^2.
    let (omega, x) = (std::f64::consts::TAU * 85.0, 4e-3);
    assert!((loss / (std::f64::consts::PI * omega * figure(&summary, DAMPING) * x * x) - 1.0).abs() < 1e-9);
    let cautions = summary["cautions"].as_array().unwrap();
    assert!(cautions.iter().any(|c| c.as_str().unwrap().contains("by which the stroke had settled")), "{cautions:?}");
    let files = entries(&bench.path("result"));
    for file in
        ["force_loop.png", "force_loop.svg", "stroke_response.png", "strokes.csv", "trace.csv", "travel_time.svg"]
    {
        assert!(files.iter().any(|f| f == file), "{file} lacks in {files:?}");
    }
    assert!(!files.iter().any(|f| f.starts_with("travel_position")), "the loop stands for it");
}

/// Small strokes at the stroke's own frequency are those of 40 um amplitude, within bands and the square of the amplitude: 4 mm add 0.9 % to
/// the damping coefficient and 2 % to the stiffness, a hundredth of it a ten-thousandth of that.
#[test]
fn small_strokes_are_those_of_a_small_amplitude() {
    let (summary, bench) = run_example(STROKE, &["travel.amplitude=40 um"]);
    let points = summary["strokes"]["points"].as_array().unwrap();
    let own = points.iter().find(|p| p["frequency_Hz"].as_f64() == Some(85.0)).unwrap();
    for (word, name) in [("damping_coefficient_N_s_per_m", DAMPING), ("stiffness_N_per_m", "stiffness")] {
        let of = |key: &str| own[word][key].as_f64().unwrap();
        let apart = (of("value") - figure(&summary, name)).abs();
        assert!(apart <= of("band") + band(&summary, name) + 4e-6 * of("value"), "{name}: {apart} apart");
    }
    let rows = std::fs::read_to_string(bench.path("result/strokes.csv")).unwrap();
    assert!(rows.starts_with("frequency_Hz,damping_coefficient_N_s_per_m,"), "{}", &rows[..100]);
    assert_eq!(rows.lines().count(), points.len() + 1);
    let models = summary["strokes"]["lumped"]["models"].as_array().unwrap();
    let errors: Vec<f64> = models.iter().map(|m| m["largest_error_relative"].as_f64().unwrap()).collect();
    assert_eq!(errors.len(), 3);
    assert!(errors[0] > errors[1] && errors[1] > errors[2] && errors[2] < 2e-3, "{errors:?}");
    // At a tenth of the slowest frequency wanted the model of three terms has the damping coefficient of the slowest point.
    let at_rest = models[2]["damping_coefficient_zero_speed_N_s_per_m"].as_f64().unwrap();
    let slowest = points[0]["damping_coefficient_N_s_per_m"]["value"].as_f64().unwrap();
    assert!((at_rest / slowest - 1.0).abs() < 2e-3, "{at_rest} and {slowest}");
}

/// One cycle has not settled: its band holds the settled figure, misses the target, and the advice is more cycles.
#[test]
fn as_many_cycles_as_the_case_asks() {
    let bench = Bench::new();
    let case = root().join(format!("examples/{STROKE}.toml"));
    let sets = ["--set", "travel.frequency=600 Hz", "--set", "travel.amplitude=1 mm", "--set", "travel.cycles=1"];
    let ran = bench.run(&[&["run", case.to_str().unwrap(), "--json", "--out", "result"], &sets[..]].concat());
    assert_eq!(ran.status, Some(4), "{}", ran.errors);
    assert!(ran.errors.contains("leave 'cycles' out of the travel, or give more"), "{}", ran.errors);
    let one = ran.json();
    let (all, _) = run_example(STROKE, &["travel.frequency=600 Hz", "travel.amplitude=1 mm"]);
    let off = (figure(&one, DAMPING) - figure(&all, DAMPING)).abs();
    assert!(off > 0.01 * figure(&all, DAMPING) && off <= band(&one, DAMPING), "{off} and {}", band(&one, DAMPING));
    let cautions = one["cautions"].as_array().unwrap();
    assert!(cautions.iter().any(|c| c.as_str().unwrap().contains("cycle 1, as the case asks")), "{cautions:?}");
}

#[test]
fn a_table_beside_the_case_is_followed() {
    let (summary, bench) = run_example(CAM, &[]);
    assert!(summary["accuracy"]["met"].as_bool().unwrap() && summary["forces"]["agree"].as_bool().unwrap());
    assert!(summary["ledger"]["imbalance_relative"].as_f64().unwrap().abs() < 1e-5);
    // At rest at the end: the work is heat, and the field has died away.
    let (heat, energy) = (summary["ledger"]["heat"].as_f64().unwrap(), figure(&summary, "dissipated_energy"));
    assert!((heat / energy - 1.0).abs() < 1e-6);
    // Down in 40 ms instead of up in 60 ms: half as fast again, and the drag follows the speed at this low Reynolds number within 2 %.
    let trace = std::fs::read_to_string(bench.path("result/trace.csv")).unwrap();
    let rows: Vec<Vec<f64>> =
        trace.lines().skip(1).map(|l| l.split(',').map(|x| x.parse().unwrap()).collect()).collect();
    let greatest =
        |from: f64, to: f64| rows.iter().filter(|r| r[0] > from && r[0] < to).map(|r| r[3]).fold(0.0, f64::max);
    let (up, down) = (greatest(0.0, 0.06), greatest(0.08, 0.12));
    assert!((down / up / 1.5 - 1.0).abs() < 0.02, "{up} and {down}");
    assert!(rows.iter().filter(|r| r[0] > 0.065 && r[0] < 0.078).all(|r| r[3].abs() < 1e-2 * up), "it dwells");
    // Velocities are those of the law that the table samples, 24 mm / 60 ms at most upwards.
    let fastest = rows.iter().filter(|r| r[0] < 0.06).map(|r| r[2]).fold(0.0, f64::max);
    assert!((fastest / 0.4 - 1.0).abs() < 3e-3, "{fastest}");
}

/// A case with this table beside it is refused, in the words and at the place given.
fn refused(table: &str, words: &[&str]) {
    let bench = Bench::new();
    let case = std::fs::read_to_string(root().join(format!("examples/{CAM}.toml"))).unwrap();
    bench.write("case.toml", &case);
    bench.write("cam-follower.csv", table);
    let ran = bench.run(&["run", "case.toml"]);
    assert_eq!(ran.status, Some(2), "{table}");
    for word in words {
        assert!(ran.errors.contains(word), "'{word}' is not in\n{}", ran.errors);
    }
    assert_eq!(bench.entries(), ["cam-follower.csv", "case.toml"], "nothing is written");
}

#[test]
fn tables_that_are_no_motion_are_pointed_at() {
    refused("time_s,position\n0,1\n1,2\n2,1\n", &["cam-follower.csv:1:8: the column 'position' has no unit", "mm, um"]);
    refused("time_s,speed_m_per_s\n0,1\n1,2\n2,1\n", &["cam-follower.csv:1:1", "no columns time and position"]);
    refused("time_s,position_mm\n0,1\n1,2\n1,3\n", &["cam-follower.csv:4:1", "1 s follows 1 s"]);
    refused("time_s,position_mm\n0,1\n1,\n2,3\n", &["cam-follower.csv:3:1", "a gap in line 3"]);
    refused("time_s,position_mm\n0,1\n1,2\n", &["2 points"]);
    refused("time_s,position_mm\n0,1\n1,nan\n2,3\n", &["cam-follower.csv:3:3", "'nan' is no number"]);
    refused("time_s,position_mm\n0,1\n1e-7,20\n2,3\n", &["case.toml:", "the motion jumps from 1 mm to 20 mm"]);
    refused("time_s,position_mm\n0,1\n1,1\n2,1\n", &["case.toml:", "the travel ends where it starts"]);
    refused("", &["the table has"]);
}

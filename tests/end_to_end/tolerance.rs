//! `[tolerance]`: sensitivities against derivatives of closed forms, combination, ranking, random draws, refusals.
//!
//! Closed forms at low speed, drag = c v:
//! - point dipole, thick wall: c = (15 mu0^2 m^2 sigma / 1024)(1/a^3 - 1/b^3), after W. M. Saslow, Am. J. Phys. 60, 693-711
//!   (1992); this thick-wall form derived independently (integral of x^4 K1^2 = 45 pi^2/512).
//! - cylinder magnet, thick wall: c = 8 sigma mu0^2 M^2 R^2 integral dk sin^2(kL/2) I1(kR)^2 [G(k, b) - G(k, a)] with
//!   dG/dr = r K1(kr)^2; derived independently. Its derivatives are taken under the integral, here, by Simpson's rule.
//!
//! The tolerance of 0.1 % is what sensitivities are promised to; differences of solutions whose bands are some 1e-6 over
//! steps of some per cent leave about a tenth of it.

use puruspe::{In, Kn};
use serde_json::Value;

use crate::rig::{Bench, QUICK, figure, read_json, root};

const PROMISED: f64 = 1e-3;

/// % of the figure per % of the input.
fn sensitivity(summary: &Value, figure: &str, word: &str) -> f64 {
    row(summary, figure, word)["per_cent_per_per_cent"].as_f64().unwrap()
}

fn row<'a>(summary: &'a Value, figure: &str, word: &str) -> &'a Value {
    let rows = summary["spread"]["sensitivities"].as_array().unwrap();
    rows.iter().find(|r| r["figure"] == figure && r["word"] == word).unwrap_or_else(|| panic!("{figure} to {word}"))
}

fn spread_of(summary: &Value, figure: &str, what: &str) -> f64 {
    summary["figures"][figure]["input_spread"][what].as_f64().unwrap_or_else(|| panic!("{what} of {figure}"))
}

fn check(summary: &Value, figure: &str, expected: &[(&str, f64)]) {
    for (word, value) in expected {
        let found = sensitivity(summary, figure, word);
        assert!((found / value - 1.0).abs() < PROMISED, "{figure} to {word}: {found}, expected {value}");
    }
}

/// A dipole at 1 mm/s in a wall of 21 mm bore and 2 mm thickness.
fn slow_dipole(sizes: &str, tolerances: &str) -> String {
    let text = QUICK.replace("inner_diameter = \"21 mm\"\nthickness = \"2 mm\"", sizes);
    let text = text.replace("speed = \"5 m/s\"", "speed = \"1 mm/s\"");
    format!("{text}\n[tolerance]\n{tolerances}\n")
}

#[test]
fn a_dipole_answers_as_its_closed_form() {
    let bench = Bench::new();
    let (a, b): (f64, f64) = (0.0105, 0.0125);
    let w = b - a;
    let bracket = a.powi(-3) - b.powi(-3);
    let common = "\"mover.D.moment\" = \"5 %\"\n\"wall.tube.conductivity\" = \"10 %\"\n\"travel.speed\" = \"1 %\"\n";
    // Bore and thickness are given: a thicker wall grows outward, a wider bore carries its wall along.
    let sizes = "inner_diameter = \"21 mm\"\nthickness = \"2 mm\"";
    let tolerances =
        format!("{common}\"wall.tube.thickness\" = \"10 %\"\n\"wall.tube.inner_diameter\" = \"0.02 mm\"\n");
    bench.write("inner.toml", &slow_dipole(sizes, &tolerances));
    let summary = bench.succeed(&["run", "inner.toml", "--json"]).json();
    let outward = 3.0 * w * b.powi(-4) / bracket;
    let wider = 3.0 * a * (b.powi(-4) - a.powi(-4)) / bracket;
    let all = [
        ("mover.D.moment", 2.0),
        ("wall.tube.conductivity", 1.0),
        ("wall.tube.thickness", outward),
        ("wall.tube.inner_diameter", wider),
    ];
    check(&summary, "damping_coefficient", &all);
    check(&summary, "drag", &[("travel.speed", 1.0)]);
    check(&summary, "dissipated_power", &[("travel.speed", 2.0)]);
    // Outer diameter and thickness are given: a thicker wall grows into the bore, which is another sensitivity.
    let sizes = "size = \"25 x 2 mm\"";
    bench.write("outer.toml", &slow_dipole(sizes, "\"wall.tube.thickness\" = \"10 %\""));
    let ran = bench.succeed(&["run", "outer.toml"]);
    assert!(ran.output.contains("outer diameter stays, inner diameter follows"), "{}", ran.output);
    let summary = read_json(&bench.path("out/outer/summary.json"));
    let inward = 3.0 * w * a.powi(-4) / bracket;
    check(&summary, "damping_coefficient", &[("wall.tube.thickness", inward)]);
    assert!(inward > 2.0 * outward - 1e-3, "the two differ by a factor of two: {inward}, {outward}");
    // 10 % is too wide for a straight line, and the summary says so.
    let thickness = row(&summary, "damping_coefficient", "wall.tube.thickness");
    let at = |a: f64| (a.powi(-3) - b.powi(-3)) / bracket - 1.0;
    let c = figure(&summary, "damping_coefficient");
    for (key, value) in [("change_low", at(a + 0.1 * w)), ("change_high", at(a - 0.1 * w))] {
        let found = thickness[key].as_f64().unwrap() / c;
        assert!((found / value - 1.0).abs() < PROMISED, "{key}: {found}, expected {value}");
    }
}

/// The cylinder's coefficient and its derivatives by M, R, L, a, b over the value itself: % per % after scaling.
fn cylinder(r: f64, l: f64, a: f64, b: f64) -> [f64; 4] {
    let g = |k: f64, r: f64| {
        let x = k * r;
        0.5 * r * r * (Kn(1, x).powi(2) - Kn(0, x) * Kn(2, x))
    };
    let ring = |k: f64, r: f64| r * Kn(1, k * r).powi(2);
    let (first, last, panels) = (1e-3 / b, 30.0 / (a - r), 4000);
    let step = (last - first) / f64::from(panels);
    let mut sums = [0.0; 5];
    for i in 0..=panels {
        let k = first + step * f64::from(i);
        let weight = if i == 0 || i == panels {
            1.0
        } else if i % 2 == 1 {
            4.0
        } else {
            2.0
        };
        let (sine, i1) = ((0.5 * k * l).sin(), In(1, k * r));
        let slope = In(0, k * r) - i1 / (k * r);
        let (front, depth) = (sine * sine * i1 * i1, g(k, b) - g(k, a));
        let terms = [
            front * depth,
            sine * sine * 2.0 * i1 * slope * k * depth,
            0.5 * k * (k * l).sin() * i1 * i1 * depth,
            -front * ring(k, a),
            front * ring(k, b),
        ];
        for (sum, term) in sums.iter_mut().zip(terms) {
            *sum += weight * term;
        }
    }
    [2.0 + r * sums[1] / sums[0], l * sums[2] / sums[0], a * sums[3] / sums[0], b * sums[4] / sums[0]]
}

#[test]
fn a_cylinder_answers_as_its_closed_form() {
    let dipole = "[[mover.dipole]]\nname = \"D\"\nmoment = \"1 A m2\"\n";
    let magnet = "[[mover.magnet]]\nname = \"M\"\nremanence = \"1.2 T\"\nrecoil_permeability = 1\n\
                  outer_diameter = \"10 mm\"\nlength = \"10 mm\"\n";
    let sizes = "inner_diameter = \"15 mm\"\nouter_diameter = \"19 mm\"";
    let tolerances = "\"mover.M.remanence\" = \"3 %\"\n\"mover.M.outer_diameter\" = \"0.1 mm\"\n\
                      \"mover.M.length\" = \"0.2 mm\"\n\"wall.tube.inner_diameter\" = \"1 %\"\n\
                      \"wall.tube.outer_diameter\" = \"0.1 mm\"\n";
    let bench = Bench::with("case.toml", &slow_dipole(sizes, tolerances).replace(dipole, magnet));
    let summary = bench.succeed(&["run", "case.toml", "--json"]).json();
    // 0.755653 N s/m: the same integral, computed independently.
    assert!((figure(&summary, "damping_coefficient") / 0.755_653 - 1.0).abs() < 1e-5);
    let [radius, length, inner, outer] = cylinder(0.005, 0.010, 0.0075, 0.0095);
    let all = [
        ("mover.M.remanence", 2.0),
        ("mover.M.outer_diameter", radius),
        ("mover.M.length", length),
        ("wall.tube.inner_diameter", inner),
        ("wall.tube.outer_diameter", outer),
    ];
    check(&summary, "damping_coefficient", &all);
}

#[test]
fn the_spread_is_the_root_sum_square_and_draws_confirm_it() {
    let tolerances =
        "\"mover.D.moment\" = \"1 %\"\n\"wall.tube.conductivity\" = \"3 %\"\n\"wall.tube.thickness\" = \"2 %\"\n";
    let bench = Bench::with("case.toml", &format!("{QUICK}\n[tolerance]\n{tolerances}"));
    let words = ["run", "case.toml", "--json", "--monte-carlo", "200", "--seed", "7"];
    let summary = bench.succeed(&words).json();
    let drag = figure(&summary, "drag");
    let root: f64 = [("mover.D.moment", 0.01), ("wall.tube.conductivity", 0.03), ("wall.tube.thickness", 0.02)]
        .iter()
        .map(|(word, half)| (sensitivity(&summary, "drag", word) * half * drag).powi(2))
        .sum::<f64>()
        .sqrt();
    assert!((spread_of(&summary, "drag", "half_width") / root - 1.0).abs() < 1e-3, "{root}");
    let run = &summary["spread"]["monte_carlo"];
    let sampled = &run["figures"]["drag"];
    let apart = (sampled["half_width"].as_f64().unwrap() - spread_of(&summary, "drag", "half_width")).abs();
    assert!(apart <= sampled["error"].as_f64().unwrap() && sampled["agrees"].as_bool().unwrap(), "{sampled}");
    assert_eq!((run["draws"].as_u64(), run["seed"].as_u64()), (Some(200), Some(7)));
    // The worst case lies beyond 95 %, and was solved where all inputs are at their ends.
    assert!(spread_of(&summary, "drag", "worst_plus") > spread_of(&summary, "drag", "plus"));
    assert_eq!(summary["figures"]["drag"]["input_spread"]["worst_by"], "solution at the corners");
    let first = &summary["spread"]["measure_better_first"][0];
    assert_eq!(first["word"], "wall.tube.conductivity", "3 % x 0.9 is more than 1 % x 2 and 2 % x 0.8");
    // The same seed gives the same draws.
    let again = bench.succeed(&[&words[..], &["--replace"]].concat()).json();
    assert_eq!(again["spread"]["monte_carlo"], summary["spread"]["monte_carlo"]);
}

#[test]
fn a_run_writes_table_and_picture_and_a_curve_has_a_spread_too() {
    let bench = Bench::with("case.toml", &format!("{QUICK}\n[tolerance]\n\"wall.tube.conductivity\" = \"5 %\"\n"));
    let ran = bench.succeed(&["run", "case.toml"]);
    for part in
        ["what to measure better first", "wall.tube.conductivity", "% of the figure per % of the input", "worst:"]
    {
        assert!(ran.output.contains(part), "{part} lacks in\n{}", ran.output);
    }
    let table = std::fs::read_to_string(bench.path("out/case/sensitivities.csv")).unwrap();
    assert!(table.starts_with("figure,unit,value,band,word,"), "{table}");
    assert_eq!(table.lines().count(), 5, "four figures, one input");
    for file in ["input_spread.png", "input_spread.svg"] {
        assert!(bench.path("out/case").join(file).exists(), "{file}");
    }
    let summary = bench.succeed(&["curve", "case.toml", "--json"]).json();
    // Speed enters as mu0 sigma v: a wall that conducts 1 % better has its critical speed 1 % lower and the same maximum.
    check(&summary, "critical_speed", &[("wall.tube.conductivity", -1.0)]);
    check(&summary, "damping_coefficient_zero_speed", &[("wall.tube.conductivity", 1.0)]);
    assert!(sensitivity(&summary, "drag_max", "wall.tube.conductivity").abs() < 1e-3);
    let plain = bench.succeed(&["run", "case.toml", "--json", "--replace", "--no-spread"]).json();
    assert!(plain["spread"].is_null() && plain["figures"]["drag"]["input_spread"].is_null());
    assert_eq!(figure(&plain, "drag"), figure(&read_json(&bench.path("out/case/summary.json")), "drag"));
}

/// A fall past a wall that hardly conducts: v = sqrt(v0^2 + 2 g h) at the second gate.
#[test]
fn a_free_fall_answers_as_newton_says() {
    let text = "[wall]\nlength = \"20 mm\"\n[[wall.layer]]\nname = \"tube\"\nconductivity = \"1 S/m\"\n\
                inner_diameter = \"20 mm\"\nthickness = \"2 mm\"\n[mover]\nmass = \"0.1 kg\"\n[[mover.magnet]]\nname = \"M\"\n\
                remanence = \"1.2 T\"\nrecoil_permeability = 1\nouter_diameter = \"12 mm\"\nlength = \"8 mm\"\n\
                [travel]\nlaw = \"free\"\nrelease = \"60 mm\"\nentry_velocity = \"-0.5 m/s\"\nuntil = \"-5 mm\"\n\
                gates = [\"40 mm\", \"0 mm\"]\n[tolerance]\n\"travel.gravity\" = \"1 %\"\n\"travel.release\" = \"1 mm\"\n";
    let bench = Bench::with("case.toml", text);
    let summary = bench.succeed(&["run", "case.toml", "--json"]).json();
    let (g, h) = (9.80665, 0.06);
    let square: f64 = 0.25 + 2.0 * g * h;
    assert!((figure(&summary, "exit_speed") / square.sqrt() - 1.0).abs() < 1e-4);
    check(&summary, "exit_speed", &[("travel.gravity", g * h / square), ("travel.release", g * h / square)]);
}

#[test]
fn what_cannot_be_varied_is_refused() {
    let bench = Bench::with("none.toml", QUICK);
    let ran = bench.run(&["run", "none.toml", "--monte-carlo", "10"]);
    assert_eq!(ran.status, Some(2));
    assert!(ran.errors.contains("[tolerance]"), "{}", ran.errors);
    // The bore may close on the magnet.
    let magnet = QUICK.replace(
        "[[mover.dipole]]\nname = \"D\"\nmoment = \"1 A m2\"",
        "[[mover.magnet]]\nname = \"M\"\nremanence = \"1 T\"\nrecoil_permeability = 1\nouter_diameter = \"20 mm\"\nlength = \"5 mm\"",
    );
    bench.write("close.toml", &format!("{magnet}\n[tolerance]\n\"wall.tube.inner_diameter\" = \"2 mm\"\n"));
    let ran = bench.run(&["run", "close.toml"]);
    assert_eq!(ran.status, Some(2), "{}", ran.errors);
    for part in ["close.toml:30:1", "the tolerance of wall.tube.inner_diameter reaches 0.019", "no running clearance"] {
        assert!(ran.errors.contains(part), "{part} lacks in {}", ran.errors);
    }
    assert_eq!(bench.entries(), ["close.toml", "none.toml"], "nothing is written");
}

/// Each spread that the guide shows is the one just computed, to a hundredth of a per cent; and the ranking is as shown.
#[test]
fn the_guide_shows_what_the_example_gives() {
    let bench = Bench::new();
    let case = root().join("examples/arrest-sleeve-tolerances.toml");
    let summary = bench.succeed(&["curve", case.to_str().unwrap(), "--json", "--out", "result"]).json();
    let guide = std::fs::read_to_string(root().join("io/guide/src/case/tolerances.md")).unwrap();
    let mut shown = 0;
    for line in guide.lines().filter(|l| l.contains(" 95 %: -")) {
        let name = line.split_whitespace().next().unwrap();
        let numbers: Vec<f64> =
            line.split_once("95 %:").unwrap().1.split_whitespace().filter_map(|w| w.parse().ok()).collect();
        let value = figure(&summary, name);
        for (number, what) in numbers.iter().zip(["minus", "plus", "worst_minus", "worst_plus"]) {
            let found = 100.0 * spread_of(&summary, name, what) / value;
            assert!((number.abs() - found.abs()).abs() < 0.01, "the guide shows {what} of {name} = {number}: {found}");
        }
        assert_eq!(numbers.len(), 4);
        shown += 1;
    }
    assert_eq!(shown, summary["figures"].as_object().unwrap().len());
    for (place, entry) in summary["spread"]["measure_better_first"].as_array().unwrap().iter().take(3).enumerate() {
        let row = format!("[{}] {}", place + 1, entry["word"].as_str().unwrap());
        assert!(guide.contains(&row), "the guide lacks {row}");
    }
}

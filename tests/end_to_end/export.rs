//! `export` from outside. The steady system that it writes is held against the field that the run itself has stored: what solves the
//! one must solve the other.

use std::collections::BTreeMap;
use std::path::Path;

use crate::rig::{Bench, QUICK, figure, read_json};

/// `(row, column, value)` of a coordinate file.
fn entries(path: &Path) -> Vec<(usize, usize, f64)> {
    let text = std::fs::read_to_string(path).unwrap();
    let lines = text.lines().filter(|l| !l.starts_with('%')).skip(1);
    lines
        .map(|l| {
            let words: Vec<&str> = l.split_whitespace().collect();
            let index = |k: usize| words[k].parse::<usize>().unwrap() - 1;
            (index(0), index(1), words[2].parse().unwrap())
        })
        .collect()
}

fn vector(path: &Path) -> Vec<f64> {
    let text = std::fs::read_to_string(path).unwrap();
    text.lines().filter(|l| !l.starts_with('%')).skip(1).map(|l| l.parse().unwrap()).collect()
}

fn add(out: &mut [f64], entries: &[(usize, usize, f64)], x: &[f64], factor: f64) {
    for (row, column, value) in entries {
        out[*row] += factor * value * x[*column];
    }
}

#[test]
fn the_steady_system_is_solved_by_the_field_of_the_run() {
    let bench = Bench::with("case.toml", QUICK);
    let summary = bench.succeed(&["run", "case.toml", "--out", "result", "--json"]).json();
    let said = bench.succeed(&["export", "result", "--to", "matrix-market"]).output;
    assert!(said.contains("result-matrix-market"), "{said}");
    bench.succeed(&["export", "result", "--to", "csv"]);
    let about = read_json(&bench.path("result-matrix-market/export.json"));
    let velocity = about["about"]["drive"]["velocity_m_per_s"].as_f64().unwrap();
    let levels = about["about"]["levels"].as_array().unwrap();
    assert_eq!(levels.len(), summary["grids"].as_array().unwrap().len());
    let finest = levels.last().unwrap();
    let file = |key: &str| bench.path(&format!("result-matrix-market/{}", finest["files"][key].as_str().unwrap()));
    let (stiffness, convection, conductance) = (entries(&file("K")), entries(&file("C")), entries(&file("G")));
    let slope = vector(&file("slope"));
    // psi of the run at the rows, by place.
    let nodes = std::fs::read_to_string(bench.path("result-csv/nodes.csv")).unwrap();
    let at: BTreeMap<(String, String), f64> = nodes
        .lines()
        .skip(1)
        .map(|l| {
            let words: Vec<&str> = l.split(',').collect();
            ((words[0].to_owned(), words[1].to_owned()), words[3].parse().unwrap())
        })
        .collect();
    let rows = std::fs::read_to_string(file("rows")).unwrap();
    let psi: Vec<f64> = rows
        .lines()
        .skip(1)
        .map(|l| {
            let words: Vec<&str> = l.split(',').collect();
            at[&(words[3].to_owned(), words[4].to_owned())]
        })
        .collect();
    assert_eq!(psi.len(), slope.len());
    let mut currents = vec![0.0; psi.len()];
    add(&mut currents, &convection, &psi, velocity);
    add(&mut currents, &conductance, &slope, velocity);
    let mut residual = currents.iter().map(|i| -i).collect::<Vec<f64>>();
    add(&mut residual, &stiffness, &psi, 1.0);
    let largest = |x: &[f64]| x.iter().fold(0.0_f64, |most, v| most.max(v.abs()));
    assert!(largest(&residual) < 1e-8 * largest(&currents), "{} of {}", largest(&residual), largest(&currents));
    let drag = 2.0 * std::f64::consts::PI * slope.iter().zip(&currents).map(|(q, i)| q * i).sum::<f64>();
    let level = summary["figures"]["drag"]["levels"].as_array().unwrap().last().unwrap().as_f64().unwrap();
    assert!((drag / level - 1.0).abs() < 1e-9, "{drag} {level}");
    assert!((drag / figure(&summary, "drag") - 1.0).abs() > 1e-9, "a level's own value is not the extrapolated one");
}

#[test]
fn exports_lie_beside_the_result_and_are_never_overwritten() {
    let bench = Bench::with("case.toml", QUICK);
    bench.succeed(&["run", "case.toml", "--out", "result"]);
    for (format, file) in [("vtk", "fields.pvd"), ("xdmf", "run.xdmf"), ("csv", "cells.csv")] {
        bench.succeed(&["export", "result", "--to", format]);
        assert!(bench.path(&format!("result-{format}/{file}")).is_file());
        let again = bench.run(&["export", "result", "--to", format]);
        assert_eq!(again.status, Some(2), "{format}");
        assert!(again.errors.contains("exists already"), "{}", again.errors);
        bench.succeed(&["export", "result", "--to", format, "--replace"]);
    }
}

#[test]
fn what_cannot_be_exported_says_why() {
    let bench = Bench::with("case.toml", QUICK);
    let refused = |words: &[&str]| {
        let ran = bench.run(words);
        assert_eq!(ran.status, Some(2), "{words:?}: {}", ran.errors);
        ran.errors
    };
    assert!(refused(&["export", "case.toml", "--to", "vtk"]).contains("holds no result"));
    bench.succeed(&["curve", "case.toml", "--out", "curve"]);
    assert!(refused(&["export", "curve", "--to", "vtk"]).contains("does not hold fields"));
    assert!(refused(&["export", "curve", "--to", "pdf"]).contains("matrix-market"));
    assert!(refused(&["export", "curve", "--to", "csv", "--at", "3 mm"]).contains("time"));
    assert!(refused(&["export", "curve", "--to", "vtk", "--at", "3 s"]).contains("--to csv"));
    bench.succeed(&["export", "curve", "--to", "csv"]);
    assert!(bench.path("curve-csv/curve.csv").is_file());
    assert_eq!(bench.entries(), ["case.toml", "curve", "curve-csv"]);
}

//! Starts the Python peers beside this file and reads the JSON that they print.

use std::io::Write;
use std::path::{Path, PathBuf};
use std::process::Command;

use lenzbore_solver::outcome::{Outcome, Trace};
use lenzbore_solver::probe::node_lines;
use lenzbore_solver::problem::Problem;
use serde_json::{Value, json};
use tempfile::NamedTempFile;

use crate::fault::BenchFault;

/// Settings of the linear-algebra library under NumPy that would hold it back.
const HOLDING_BACK: [&str; 2] = ["OPENBLAS_CORETYPE", "OPENBLAS_L2_SIZE"];

fn folder() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("benches").join("peers")
}

/// Makes sure that python3 and `packages` are there.
///
/// # Errors
/// `NoPython` with what is missing and how to get it.
pub(crate) fn require(packages: &[&str]) -> Result<(), BenchFault> {
    for package in packages {
        match Command::new("python3").args(["-c", &format!("import {package}")]).output() {
            Err(_) => return Err(BenchFault::NoPython("python3 isn't installed".to_owned())),
            Ok(output) if !output.status.success() => {
                let list = folder().join("requirements.txt");
                let why = format!("python3 can't import {package}; `pip install -r {}` gets it", list.display());
                return Err(BenchFault::NoPython(why));
            }
            Ok(_) => {}
        }
    }
    Ok(())
}

/// Runs a peer and reads its answer.
///
/// # Errors
/// The program fails or prints no JSON.
pub(crate) fn peer(script: &str, arguments: &[String]) -> Result<Value, BenchFault> {
    let mut command = Command::new("python3");
    command.arg(folder().join(script)).args(arguments);
    for name in HOLDING_BACK {
        command.env_remove(name);
    }
    let output = command.output()?;
    if !output.status.success() {
        let text = String::from_utf8_lossy(&output.stderr);
        let message = text.lines().last().unwrap_or("no message").to_owned();
        return Err(BenchFault::Peer { script: script.to_owned(), message });
    }
    Ok(serde_json::from_slice(&output.stdout)?)
}

/// A number in an answer.
///
/// # Errors
/// It isn't there.
pub(crate) fn number(answer: &Value, from: &str, key: &str) -> Result<f64, BenchFault> {
    let missing = || BenchFault::Value { from: from.to_owned(), key: key.to_owned() };
    answer.get(key).and_then(Value::as_f64).ok_or_else(missing)
}

/// A list of numbers in an answer.
///
/// # Errors
/// It isn't there.
pub(crate) fn numbers(answer: &Value, from: &str, key: &str) -> Result<Vec<f64>, BenchFault> {
    let missing = || BenchFault::Value { from: from.to_owned(), key: key.to_owned() };
    let list = answer.get(key).and_then(Value::as_array).ok_or_else(missing)?;
    list.iter().map(|v| v.as_f64().ok_or_else(missing)).collect()
}

/// The grids of `outcome` as a file for the peers, and its levels as their `--factors`; with the steps of its march too.
///
/// # Errors
/// A grid that can't be built, or a file that can't be written.
pub(crate) fn same_grids(
    problem: &Problem,
    curve_speed: Option<f64>,
    outcome: &Outcome,
) -> Result<(NamedTempFile, Vec<String>), BenchFault> {
    let mut problem = problem.clone();
    problem.accuracy.levels = Some(outcome.grids.len());
    let lines = node_lines(&problem, curve_speed)?;
    let levels: Vec<Value> = lines.iter().map(|(r, z)| json!({"r": r, "z": z})).collect();
    let mut content = json!({"levels": levels});
    let pairs = pair_steps(&outcome.trace);
    if !pairs.is_empty() {
        content["pairs_s"] = json!(pairs);
    }
    let mut file = NamedTempFile::new()?;
    serde_json::to_writer(&mut file, &content)?;
    file.flush()?;
    let mut arguments = vec!["--grids".to_owned(), file.path().display().to_string(), "--factors".to_owned()];
    arguments.extend(outcome.grids.iter().map(|g| g.refinement.to_string()));
    Ok((file, arguments))
}

/// Step of every pair on the coarsest level, s, from the middles of the pairs: a ladder of powers of two of the first.
fn pair_steps(trace: &Trace) -> Vec<f64> {
    let Some(&first) = trace.time_s.first() else { return Vec::new() };
    let mut start = 0.0;
    let mut steps = Vec::with_capacity(trace.time_s.len());
    for &middle in &trace.time_s {
        let step = first * ((middle - start) / first).log2().round().exp2();
        steps.push(step);
        start += 2.0 * step;
    }
    steps
}

//! The whole curve against a general finite-element library that solves a single speed to the same true error.

use serde_json::Value;

use crate::cases::{cylinder, dipole};
use crate::curve::{ours, true_errors};
use crate::fault::BenchFault;
use crate::python::{number, peer, require};
use crate::sample::{median, range, times, verdict};

const ROUNDS: usize = 3;
const RUNS: usize = 5;
const SCRIPT: &str = "steady_fem.py";
/// Speed of the single solve: the peer's own default.
const SPEED: &str = "5 m/s";

/// Both cases, both kinds of element.
///
/// # Errors
/// A solve or a peer that fails.
pub(crate) fn run() -> Result<(), BenchFault> {
    require(&["numpy", "scipy", "skfem"])?;
    for (name, problem) in [("dipole", dipole()), ("cylinder", cylinder())] {
        let errors = true_errors(name, &ours(&problem)?)?;
        let target = median(&errors);
        println!(
            "{name}: quadratic elements at {SPEED} to the median error of our curve, {target:.1e} (also to its worst, {:.1e})",
            range(&errors).1
        );
        for (target, rounds) in [(target, ROUNDS), (range(&errors).1, ROUNDS)] {
            for element in ["triangle", "quadrilateral"] {
                let arguments = [&target.to_string(), "--case", name, "--element", element].map(str::to_owned);
                let (mut mine, mut theirs, mut ratios) = (Vec::new(), Vec::new(), Vec::new());
                let mut answer = Value::Null;
                for _ in 0..rounds {
                    mine.push(median(&times(RUNS, || ours(&problem))?.1));
                    answer = peer(SCRIPT, &arguments)?;
                    theirs.push(number(&answer, SCRIPT, "seconds")?);
                    ratios.push(theirs[theirs.len() - 1] / mine[mine.len() - 1]);
                }
                print(element, target, &answer, [&mine, &theirs, &ratios])?;
            }
        }
    }
    Ok(())
}

fn print(element: &str, target: f64, answer: &Value, [mine, theirs, ratios]: [&[f64]; 3]) -> Result<(), BenchFault> {
    let ratio = median(ratios);
    let reached = answer.get("reached").and_then(Value::as_bool).unwrap_or(false);
    let note = if reached { String::new() } else { " (not reached on its finest mesh, which is timed)".to_owned() };
    println!(
        "  {element:13} to {target:.1e}{note}: ratio {ratio:.2} ({:.2} to {:.2}), above 1: {}; our whole curve {:.1} ms, their one speed {:.3} s ({} unknowns, error {:.1e}; search for the mesh {:.2} s)",
        range(ratios).0,
        range(ratios).1,
        verdict(ratio > 1.0),
        1e3 * median(mine),
        median(theirs),
        number(answer, SCRIPT, "unknowns")?,
        number(answer, SCRIPT, "relative_error")?,
        number(answer, SCRIPT, "seconds_with_coarser_meshes")?
    );
    Ok(())
}

//! The whole curve against a general finite-element library that solves a single speed to the same true error.

use serde_json::Value;

use crate::cases::{cylinder, dipole};
use crate::curve::{ours, true_errors};
use crate::duel::{Duel, Rounds};
use crate::fault::BenchFault;
use crate::python::{number, require};
use crate::sample::{median, range, verdict};

const ROUNDS: Rounds = Rounds { rounds: 3, runs: 5 };
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
        for target in [target, range(&errors).1] {
            for element in ["triangle", "quadrilateral"] {
                let arguments = [&target.to_string(), "--case", name, "--element", element].map(str::to_owned);
                let duel = Duel::run(ROUNDS, || ours(&problem), SCRIPT, &arguments)?;
                print(element, target, &duel)?;
            }
        }
    }
    Ok(())
}

fn print(element: &str, target: f64, duel: &Duel) -> Result<(), BenchFault> {
    let answer = &duel.answer;
    let reached = answer.get("reached").and_then(Value::as_bool).unwrap_or(false);
    let note = if reached { "" } else { " (not reached on its finest mesh, which is timed)" };
    println!(
        "  {element} to {target:.1e}{note}: whole curve against one speed, {}; above 1: {}",
        duel.text(),
        verdict(duel.ratio() > 1.0)
    );
    println!(
        "  {:13} {} unknowns, error {:.1e}; the search for that mesh took {:.2} s",
        "",
        number(answer, SCRIPT, "unknowns")?,
        number(answer, SCRIPT, "relative_error")?,
        number(answer, SCRIPT, "seconds_with_coarser_meshes")?
    );
    Ok(())
}

//! One case in a process of its own: what it takes, and the peak of its memory.

use std::process::Command;

use lenzbore_solver::cost::forecast;
use lenzbore_solver::monitor::Unwatched;
use lenzbore_solver::{drag_curve, solve};
use serde_json::{Value, json};

use crate::cases::{Case, all};
use crate::fault::BenchFault;
use crate::machine::status_bytes;
use crate::sample::times;

/// What a child is asked.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Ask {
    Forecast,
    Solve,
}

impl Ask {
    fn word(self) -> &'static str {
        match self {
            Self::Forecast => "forecast",
            Self::Solve => "solve",
        }
    }
}

/// Starts this program again for one case.
///
/// # Errors
/// The child fails.
pub(crate) fn start(case: &str, ask: Ask) -> Result<Value, BenchFault> {
    let output = Command::new(std::env::current_exe()?).args(["child", ask.word(), case]).output()?;
    if !output.status.success() {
        let message = String::from_utf8_lossy(&output.stdout).into_owned();
        return Err(BenchFault::Child { case: case.to_owned(), message });
    }
    Ok(serde_json::from_slice(&output.stdout)?)
}

/// The child itself: prints one JSON object. `arguments`: what is asked, the case.
///
/// # Errors
/// An unknown case, or a solve that fails.
pub(crate) fn run(arguments: &[String]) -> Result<(), BenchFault> {
    let ask = arguments.first().map_or("", String::as_str);
    let wanted = arguments.get(1).map_or("", String::as_str);
    let cases = all();
    let unknown = || {
        let known = cases.iter().map(|c| c.name).collect::<Vec<_>>().join(", ");
        BenchFault::Argument { found: wanted.to_owned(), known }
    };
    let case = cases.iter().find(|c| c.name == wanted).ok_or_else(unknown)?;
    let answer = if ask == Ask::Forecast.word() { forecast_of(case)? } else { solve_of(case)? };
    println!("{answer}");
    Ok(())
}

fn forecast_of(case: &Case) -> Result<Value, BenchFault> {
    let (told, seconds) = times(1, || forecast(&case.problem, case.curve.as_deref()))?;
    Ok(json!({
        "time_s": told.time_s,
        "memory_bytes": told.memory_bytes,
        "steps": told.steps,
        "solves": told.solves,
        "seconds": seconds[0],
    }))
}

fn solve_of(case: &Case) -> Result<Value, BenchFault> {
    let base = status_bytes("VmRSS");
    let (outcome, seconds) = times(1, || match &case.curve {
        Some(speeds) => drag_curve(&case.problem, speeds, &Unwatched),
        None => solve(&case.problem, &Unwatched),
    })?;
    Ok(json!({
        "time_s": seconds[0],
        "memory_bytes": status_bytes("VmHWM"),
        "base_bytes": base,
        "steps": outcome.counters.steps,
        "solves": outcome.counters.solves,
        "levels": outcome.grids.len(),
    }))
}

//! A fall with its bands against SciPy prototypes of the same scheme on the same grids and steps.

use lenzbore_solver::monitor::Unwatched;
use lenzbore_solver::outcome::Outcome;
use lenzbore_solver::solve;
use serde_json::Value;

use crate::cases::fall;
use crate::fault::BenchFault;
use crate::machine::processor_seconds;
use crate::python::{number, peer, require, same_grids};
use crate::sample::{median, range, times, verdict};

/// Wanted: so many times faster than the plain prototype.
const WANTED: f64 = 10.0;
const RUNS: usize = 3;
const SCRIPT: &str = "free_scipy.py";

/// The plain and the tuned prototype.
///
/// # Errors
/// A solve or a peer that fails.
pub(crate) fn run() -> Result<(), BenchFault> {
    require(&["numpy", "scipy"])?;
    let problem = fall(0.3);
    let outcome = solve(&problem, &Unwatched)?;
    let steps: Vec<String> = outcome.grids.iter().map(|g| g.steps.to_string()).collect();
    let transit = figure(&outcome, "transit_time")?;
    println!(
        "{} levels, {} steps, {} back-solves, {} factorisations; transit {:.6} s, band {:.1e} s",
        outcome.grids.len(),
        steps.join(" + "),
        outcome.counters.solves,
        outcome.counters.factorisations,
        transit.0,
        transit.1
    );
    let (file, grids) = same_grids(&problem, None, &outcome)?;
    for (flux, ordering, about, rounds) in [
        ("closed-form", "default", "plain (bare splu, elliptic integrals every step)", 3),
        ("spline", "symmetric", "tuned (symmetric ordering, spline made once)", 5),
    ] {
        let mut arguments = grids.clone();
        arguments.extend(["--flux", flux, "--ordering", ordering].map(str::to_owned));
        let (mut mine, mut theirs, mut ratios, mut shares) = (Vec::new(), Vec::new(), Vec::new(), Vec::new());
        let mut answer = Value::Null;
        for _ in 0..rounds {
            let before = processor_seconds();
            let (_, seconds) = times(RUNS, || solve(&problem, &Unwatched))?;
            if let (Some(a), Some(b)) = (before, processor_seconds()) {
                shares.push((b - a) / seconds.iter().sum::<f64>());
            }
            answer = peer(SCRIPT, &arguments)?;
            mine.push(median(&seconds));
            theirs.push(number(&answer, SCRIPT, "seconds")?);
            ratios.push(theirs[theirs.len() - 1] / mine[mine.len() - 1]);
        }
        let ratio = median(&ratios);
        let wanted = if flux == "closed-form" {
            format!(", at least {WANTED}: {}", verdict(ratio >= WANTED))
        } else {
            String::new()
        };
        println!(
            "against {about}: ratio {ratio:.1} ({:.1} to {:.1}){wanted}; ours {:.3} s with bands on {:.2} processors, theirs {:.2} s",
            range(&ratios).0,
            range(&ratios).1,
            median(&mine),
            median(&shares),
            median(&theirs)
        );
        let apart = transit.0 - number(&answer, SCRIPT, "transit_time_s")?;
        println!("  their steps {}; transit times differ by {apart:.1e} s", their_steps(&answer));
    }
    drop(file);
    Ok(())
}

fn figure(outcome: &Outcome, name: &str) -> Result<(f64, f64), BenchFault> {
    let missing = || BenchFault::Value { from: "our own fall".to_owned(), key: name.to_owned() };
    outcome.figures.iter().find(|f| f.name == name).map(|f| (f.value, f.band)).ok_or_else(missing)
}

fn their_steps(answer: &Value) -> String {
    let levels = answer.get("levels").and_then(Value::as_array);
    let steps = levels.into_iter().flatten().filter_map(|l| l.get("steps")).map(Value::to_string);
    steps.collect::<Vec<_>>().join(" + ")
}

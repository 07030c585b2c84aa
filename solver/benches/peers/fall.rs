//! A fall with its bands against SciPy prototypes of the same scheme on the same grids and steps.

use lenzbore_solver::monitor::Unwatched;
use lenzbore_solver::outcome::Outcome;
use lenzbore_solver::solve;
use serde_json::Value;

use crate::cases::fall;
use crate::duel::{Duel, Rounds};
use crate::fault::BenchFault;
use crate::python::{number, require, same_grids};
use crate::sample::{times, verdict};

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
    let mut problem = fall(0.3);
    let (outcome, seconds) = times(1, || solve(&problem, &Unwatched))?;
    let worst = outcome.accuracy.worst.unwrap_or_default();
    println!(
        "at default settings: {} levels, {:.3} s; worst figure {}, {:.1e}",
        outcome.grids.len(),
        seconds[0],
        worst.0,
        worst.1
    );
    // On the levels of the peers.
    problem.accuracy.levels = Some(3);
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
        let duel = Duel::run(Rounds { rounds, runs: RUNS }, || solve(&problem, &Unwatched), SCRIPT, &arguments)?;
        let wanted = if flux == "closed-form" {
            format!("; at least {WANTED}: {}", verdict(duel.ratio() >= WANTED))
        } else {
            String::new()
        };
        println!("with bands against {about}: {}{wanted}", duel.text());
        let apart = transit.0 - number(&duel.answer, SCRIPT, "transit_time_s")?;
        println!("  their steps {}; transit times differ by {apart:.1e} s", their_steps(&duel.answer));
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

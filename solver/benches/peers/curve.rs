//! A drag-speed curve of 60 points with bands against SciPy solving the same grids speed by speed.

use lenzbore_solver::drag_curve;
use lenzbore_solver::fault::SolveFault;
use lenzbore_solver::monitor::Unwatched;
use lenzbore_solver::outcome::{DragPoint, Outcome};
use lenzbore_solver::problem::Problem;
use serde_json::Value;

use crate::cases::{curve_speeds, cylinder, dipole};
use crate::duel::{Duel, Rounds};
use crate::fault::BenchFault;
use crate::python::{numbers, peer, require, same_grids};
use crate::sample::{count, median, range, verdict};

/// Wanted: so many times faster than a bare speed-by-speed solve.
const WANTED: f64 = 40.0;
const ROUNDS: Rounds = Rounds { rounds: 5, runs: 5 };
const SCRIPT: &str = "curve_scipy.py";

/// Both cases, both settings of the peer.
///
/// # Errors
/// A solve or a peer that fails.
pub(crate) fn run() -> Result<(), BenchFault> {
    require(&["numpy", "scipy"])?;
    for (name, problem) in [("dipole", dipole()), ("cylinder", cylinder())] {
        let compared = Compared::new(name, problem)?;
        compared.print_error()?;
        for (ordering, about) in [("default", "bare splu"), ("symmetric", "tuned splu")] {
            compared.against(ordering, about)?;
        }
    }
    Ok(())
}

/// One curve of ours.
///
/// # Errors
/// See [`SolveFault`].
pub(crate) fn ours(problem: &Problem) -> Result<Outcome, SolveFault> {
    drag_curve(problem, &curve_speeds(), &Unwatched)
}

/// Relative errors of our curve on `case` of the peers (`dipole`, `cylinder`) against the exact integral, absolute.
///
/// # Errors
/// A peer that fails.
pub(crate) fn true_errors(case: &str, outcome: &Outcome) -> Result<Vec<f64>, BenchFault> {
    let speeds = curve_speeds();
    // The peer's own grids are of no account here: only its exact values are used.
    let mut arguments: Vec<String> =
        ["--case", case, "--exact", "--factors", "1", "1.5", "--at"].map(str::to_owned).into();
    arguments.extend(speeds.iter().map(f64::to_string));
    let exact = numbers(&peer(SCRIPT, &arguments)?, SCRIPT, "exact_N")?;
    let points = points(outcome);
    Ok(points.iter().zip(&exact).map(|(p, e)| (p.drag_newton / e - 1.0).abs()).collect())
}

fn points(outcome: &Outcome) -> &[DragPoint] {
    outcome.curve.as_ref().map_or(&[], |c| &c.points)
}

struct Compared {
    name: &'static str,
    problem: Problem,
    outcome: Outcome,
}

impl Compared {
    fn new(name: &'static str, problem: Problem) -> Result<Self, BenchFault> {
        let outcome = ours(&problem)?;
        Ok(Self { name, problem, outcome })
    }

    fn print_error(&self) -> Result<(), BenchFault> {
        let errors = true_errors(self.name, &self.outcome)?;
        let bands: Vec<f64> = points(&self.outcome).iter().map(|p| p.band_newton / p.drag_newton).collect();
        let held = errors.iter().zip(&bands).filter(|(e, b)| e <= b).count();
        println!(
            "{}: {} levels, {} back-solves, {} vectors; error against the exact integral median {:.1e}, worst {:.1e}; band median {:.1e}, holds the truth at {held} of {}",
            self.name,
            self.outcome.grids.len(),
            self.outcome.counters.solves,
            self.outcome.counters.recurrence,
            median(&errors),
            range(&errors).1,
            median(&bands),
            errors.len()
        );
        Ok(())
    }

    fn against(&self, ordering: &str, about: &str) -> Result<(), BenchFault> {
        let (file, mut arguments) = same_grids(&self.problem, Some(curve_speeds()[59]), &self.outcome)?;
        arguments.extend(["--case", self.name, "--ordering", ordering, "--at"].map(str::to_owned));
        arguments.extend(curve_speeds().iter().map(f64::to_string));
        let duel = Duel::run(ROUNDS, || ours(&self.problem), SCRIPT, &arguments)?;
        drop(file);
        let wanted = if ordering == "default" {
            format!("; at least {WANTED}: {}", verdict(duel.ratio() >= WANTED))
        } else {
            String::new()
        };
        println!("{} with bands against {about}: {}{wanted}", self.name, duel.text());
        println!(
            "{:8} on the same unknowns {}; largest difference between the two {:.1e}",
            "",
            unknowns(&duel.answer)?,
            self.apart(&duel.answer)?
        );
        Ok(())
    }

    fn apart(&self, answer: &Value) -> Result<f64, BenchFault> {
        let theirs = numbers(answer, SCRIPT, "drag_N")?;
        let apart = points(&self.outcome).iter().zip(&theirs).map(|(p, t)| (p.drag_newton / t - 1.0).abs());
        Ok(apart.fold(0.0, f64::max))
    }
}

fn unknowns(answer: &Value) -> Result<String, BenchFault> {
    let counts = numbers(answer, SCRIPT, "unknowns")?;
    let total: f64 = counts.iter().sum();
    Ok(format!(
        "{} ({total} in all, {} levels)",
        counts.iter().map(f64::to_string).collect::<Vec<_>>().join(" + "),
        count(counts.len())
    ))
}

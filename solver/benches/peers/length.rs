//! How the cost of a march grows with the length of the wall.

use lenzbore_solver::monitor::Unwatched;
use lenzbore_solver::problem::Problem;
use lenzbore_solver::solve;

use crate::cases::{fall, traverse};
use crate::fault::BenchFault;
use crate::sample::{count, exponent, median, times, verdict};

const LENGTHS_M: [f64; 4] = [0.15, 0.3, 0.6, 1.2];
const RUNS: usize = 3;
/// Speed of the traverse, m/s.
const SPEED: f64 = 3.0;

/// A fall and a traverse through walls of four lengths.
///
/// # Errors
/// A solve that fails.
pub(crate) fn run() -> Result<(), BenchFault> {
    // What L log L itself would give over these lengths, L taken in cells along the wall: just above 1.
    let cells: Vec<f64> = LENGTHS_M.iter().map(|l| l / 1.5e-3).collect();
    let bound = exponent(&cells, &cells.iter().map(|n| n * n.ln()).collect::<Vec<f64>>());
    per_length("fall", fall, bound)?;
    per_length("traverse", |length| traverse(length, SPEED), bound)
}

fn per_length(name: &str, problem: impl Fn(f64) -> Problem, bound: f64) -> Result<(), BenchFault> {
    let (mut seconds, mut solves, mut each) = (Vec::new(), Vec::new(), Vec::new());
    for length in LENGTHS_M {
        let problem = problem(length);
        let (outcome, all) = times(RUNS, || solve(&problem, &Unwatched))?;
        let time = median(&all);
        let finest = outcome.grids.last().map_or((0, 0), |g| (g.nodes_r, g.nodes_z));
        println!(
            "{name:9} {length:5.2} m: {time:8.3} s, {} levels, finest {} x {} nodes, {} steps, {} back-solves, {:.3} ms a solve",
            outcome.grids.len(),
            finest.0,
            finest.1,
            outcome.counters.steps,
            outcome.counters.solves,
            1e3 * time / count(outcome.counters.solves)
        );
        seconds.push(time);
        solves.push(count(outcome.counters.solves));
        each.push(time / count(outcome.counters.solves));
    }
    let whole = exponent(&LENGTHS_M, &seconds);
    println!(
        "{name:9} time ~ length^{whole:.2} = solves ~ length^{:.2} times time a solve ~ length^{:.2}; length times logarithm would be {bound:.2}: {}",
        exponent(&LENGTHS_M, &solves),
        exponent(&LENGTHS_M, &each),
        verdict(whole <= bound + 0.05)
    );
    let last = [LENGTHS_M.len() - 2, LENGTHS_M.len() - 1];
    println!(
        "{name:9} over the last doubling: length^{:.2}",
        exponent(&last.map(|k| LENGTHS_M[k]), &last.map(|k| seconds[k]))
    );
    Ok(())
}

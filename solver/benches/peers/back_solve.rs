//! Time of a back-solve against the bandwidth bound: bytes of the factor read twice over the measured bandwidth.

use lenzbore_solver::probe::{BackSolve, back_solve};
use lenzbore_solver::problem::Problem;

use crate::cases::{cylinder, dipole, fall};
use crate::fault::BenchFault;
use crate::machine::{Sweeper, far_beyond_caches, home, read_bandwidth};
use crate::sample::{count, median, verdict};

/// Wanted: at most this many times the bound.
const WANTED: f64 = 2.5;
/// Back-solves timed in a round: as many as fit into this time, s, within these limits.
const ROUND_S: f64 = 1.0;
const LEAST_REPEATS: usize = 5;
const MOST_REPEATS: usize = 201;
const COLD_REPEATS: usize = 5;
const ROUNDS: usize = 3;

/// Measures all sizes.
///
/// # Errors
/// A solve that fails.
pub(crate) fn run() -> Result<(), BenchFault> {
    println!(
        "A factor that stays in a cache between solves (warm, as in a row of steps) is bound by that cache, not by memory:"
    );
    println!("`own bound` reads an array as large as the factor. `cold`: after all caches were swept.");
    println!(
        "{:34} {:>8} {:>9} {:>8} {:>6} | {:>8} {:>8} {:>12} {:>12} | {:>8} {:>12} | {:>8}",
        "finest grid of",
        "unknowns",
        "entries",
        "factor",
        "in",
        "warm ms",
        "two, ms",
        "/ mem. bound",
        "/ own bound",
        "cold ms",
        "/ mem. bound",
        "residual"
    );
    let mut memory = Vec::new();
    let mut worst = (0.0_f64, 0.0_f64);
    for (name, problem, curve) in sizes() {
        let row = Row::measure(name, &problem, curve)?;
        row.print();
        worst = (worst.0.max(row.warm_over_memory), worst.1.max(row.cold_over_memory));
        memory.push(row.memory_bandwidth);
    }
    println!(
        "streaming read from an array of {:.0} MiB: {:.2} GB/s, one thread",
        count(far_beyond_caches()) / 1048576.0,
        median(&memory) / 1e9
    );
    println!(
        "back-solve / bandwidth bound, at most {WANTED}: warm {:.2} {}, cold {:.2} {}",
        worst.0,
        verdict(worst.0 <= WANTED),
        worst.1,
        verdict(worst.1 <= WANTED)
    );
    Ok(())
}

fn sizes() -> Vec<(&'static str, Problem, Option<f64>)> {
    let finer = |levels: usize, mut problem: Problem| {
        problem.accuracy.levels = Some(levels);
        problem
    };
    vec![
        ("curve, dipole", dipole(), Some(100.0)),
        ("curve, cylinder", cylinder(), Some(100.0)),
        ("fall, 300 mm", fall(0.3), None),
        ("fall, 1.2 m", fall(1.2), None),
        ("fall, 1.2 m, five levels", finer(5, fall(1.2)), None),
        ("fall, 4.8 m, five levels", finer(5, fall(4.8)), None),
    ]
}

struct Row {
    name: &'static str,
    solve: BackSolve,
    cold_seconds: f64,
    memory_bandwidth: f64,
    warm_over_memory: f64,
    warm_over_own: f64,
    cold_over_memory: f64,
}

impl Row {
    /// Medians over rounds in each of which bandwidth and solve are measured one after the other.
    fn measure(name: &'static str, problem: &Problem, curve: Option<f64>) -> Result<Self, BenchFault> {
        let sweeper = Sweeper::new();
        let mut rounds: Vec<[f64; 6]> = Vec::new();
        let mut last = back_solve(problem, curve, 1, || ())?;
        let repeats =
            (LEAST_REPEATS..MOST_REPEATS).find(|n| count(*n) * last.seconds > ROUND_S).unwrap_or(MOST_REPEATS);
        for _ in 0..ROUNDS {
            last = back_solve(problem, curve, repeats, || ())?;
            let memory = read_bandwidth(far_beyond_caches());
            let cold = back_solve(problem, curve, COLD_REPEATS, || sweeper.sweep())?;
            let bytes = count(last.bytes_read);
            let own = read_bandwidth(last.bytes_read / 2);
            rounds.push([
                last.seconds,
                cold.seconds,
                memory,
                last.seconds * memory / bytes,
                last.seconds * own / bytes,
                cold.seconds * memory / bytes,
            ]);
        }
        let of = |k: usize| median(&rounds.iter().map(|r| r[k]).collect::<Vec<f64>>());
        Ok(Self {
            name,
            solve: BackSolve { seconds: of(0), ..last },
            cold_seconds: of(1),
            memory_bandwidth: of(2),
            warm_over_memory: of(3),
            warm_over_own: of(4),
            cold_over_memory: of(5),
        })
    }

    fn print(&self) {
        let solve = &self.solve;
        let bytes = solve.bytes_read / 2;
        println!(
            "{:34} {:8} {:9} {:4.1} MiB {:>6} | {:8.3} {:8.3} {:12.2} {:12.2} | {:8.3} {:12.2} | {:8.1e}",
            self.name,
            solve.unknowns,
            solve.factor_entries,
            count(bytes) / 1048576.0,
            home(bytes),
            1e3 * solve.seconds,
            1e3 * solve.seconds_two_columns,
            self.warm_over_memory,
            self.warm_over_own,
            1e3 * self.cold_seconds,
            self.cold_over_memory,
            solve.residual
        );
        println!(
            "{:34} solver in use: {:.3} ms, {:.1} MiB, factored in {:.2} ms; {:.2} of that bound. Assembly {:.2} ms; Cholesky: ordering {:.2} ms, factorisation {:.2} ms",
            "",
            1e3 * solve.direct_seconds,
            count(solve.direct_bytes) / 1048576.0,
            1e3 * solve.direct_factorisation_seconds,
            self.warm_over_memory * solve.direct_seconds / solve.seconds,
            1e3 * solve.assembly_seconds,
            1e3 * solve.ordering_seconds,
            1e3 * solve.factorisation_seconds
        );
    }
}

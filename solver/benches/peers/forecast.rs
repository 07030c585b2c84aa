//! The forecast of time and memory against what the solve then takes.

use crate::cases::all;
use crate::child::{Ask, start};
use crate::fault::BenchFault;
use crate::python::number;
use crate::sample::{median, verdict};

/// Wanted: forecast and truth within this factor of each other.
const WANTED: f64 = 2.0;
const ROUNDS: usize = 5;

/// Each case in processes of its own, so that every peak of memory is its own.
///
/// # Errors
/// A child that fails.
pub(crate) fn run() -> Result<(), BenchFault> {
    println!(
        "forecast / measured; memory is the peak of the process that solves (about 3 MiB of it the program itself)"
    );
    let (mut times, mut memories) = (Vec::new(), Vec::new());
    for case in all() {
        let (mut told, mut took) = (Vec::new(), Vec::new());
        for _ in 0..ROUNDS {
            told.push(start(case.name, Ask::Forecast)?);
            took.push(start(case.name, Ask::Solve)?);
        }
        let ratio = |key: &str| -> Result<f64, BenchFault> {
            let pairs = told.iter().zip(&took);
            let each: Result<Vec<f64>, BenchFault> =
                pairs.map(|(a, b)| Ok(number(a, case.name, key)? / number(b, case.name, key)?)).collect();
            Ok(median(&each?))
        };
        let middle = |list: &[serde_json::Value], key: &str| -> Result<f64, BenchFault> {
            let each: Result<Vec<f64>, BenchFault> = list.iter().map(|v| number(v, case.name, key)).collect();
            Ok(median(&each?))
        };
        let (time, memory) = (ratio("time_s")?, ratio("memory_bytes")?);
        println!(
            "{:15} time {time:5.2} ({:8.4} s / {:8.4} s)  memory {memory:5.2} ({:6.1} MiB / {:6.1} MiB)  steps {} / {}  back-solves {:.0} / {}  {} levels; the forecast itself took {:.4} s  [{}]",
            case.name,
            middle(&told, "time_s")?,
            middle(&took, "time_s")?,
            middle(&told, "memory_bytes")? / 1048576.0,
            middle(&took, "memory_bytes")? / 1048576.0,
            middle(&told, "steps")?,
            middle(&took, "steps")?,
            middle(&told, "solves")?,
            middle(&took, "solves")?,
            middle(&took, "levels")?,
            middle(&told, "seconds")?,
            case.about
        );
        times.push(time);
        memories.push(memory);
    }
    for (what, ratios) in [("time", &times), ("memory", &memories)] {
        let within = ratios.iter().filter(|r| **r <= WANTED && **r >= 1.0 / WANTED).count();
        println!(
            "{what} within a factor {WANTED}: {within} of {} cases: {}",
            ratios.len(),
            verdict(within == ratios.len())
        );
    }
    Ok(())
}

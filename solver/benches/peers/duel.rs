//! Our run and a peer's, one after the other, some rounds long.

use lenzbore_solver::fault::SolveFault;
use serde_json::Value;

use crate::fault::BenchFault;
use crate::machine::processor_seconds;
use crate::python::{number, peer};
use crate::sample::{count, median, range, times};

/// How often each side runs.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Rounds {
    /// Rounds; the median of their ratios counts.
    pub(crate) rounds: usize,
    /// Our own runs in each round; their median counts.
    pub(crate) runs: usize,
}

/// Times of all rounds.
#[derive(Debug, Default)]
pub(crate) struct Duel {
    ours_s: Vec<f64>,
    theirs_s: Vec<f64>,
    ratios: Vec<f64>,
    /// Processor seconds of all threads, ours and theirs, where both are told.
    processors: Vec<(f64, f64)>,
    /// The peer's last answer.
    pub(crate) answer: Value,
}

impl Duel {
    /// Runs `ours` and `script` in turn.
    ///
    /// # Errors
    /// A solve or a peer that fails.
    pub(crate) fn run<T>(
        Rounds { rounds, runs }: Rounds,
        mut ours: impl FnMut() -> Result<T, SolveFault>,
        script: &str,
        arguments: &[String],
    ) -> Result<Self, BenchFault> {
        let mut duel = Self::default();
        for _ in 0..rounds {
            let before = processor_seconds();
            let (_, seconds) = times(runs, &mut ours)?;
            let worked = before.zip(processor_seconds()).map(|(a, b)| (b - a) / count(runs));
            let answer = peer(script, arguments)?;
            let (mine, theirs) = (median(&seconds), number(&answer, script, "seconds")?);
            duel.ours_s.push(mine);
            duel.theirs_s.push(theirs);
            duel.ratios.push(theirs / mine);
            duel.processors.extend(worked.zip(answer.get("processor_seconds").and_then(Value::as_f64)));
            duel.answer = answer;
        }
        Ok(duel)
    }

    /// Median ratio of their time to ours.
    pub(crate) fn ratio(&self) -> f64 {
        median(&self.ratios)
    }

    /// The figures in one line.
    pub(crate) fn text(&self) -> String {
        let (low, high) = range(&self.ratios);
        let (ours, theirs) = (median(&self.ours_s), median(&self.theirs_s));
        let line = format!(
            "ratio {:.1} ({low:.1} to {high:.1}); ours {:.1} ms, theirs {theirs:.3} s",
            self.ratio(),
            1e3 * ours
        );
        if self.processors.is_empty() {
            return line;
        }
        let of = |f: fn(&(f64, f64)) -> f64| median(&self.processors.iter().map(f).collect::<Vec<f64>>());
        let (ratio, ours, theirs) = (of(|p| p.1 / p.0), of(|p| p.0), of(|p| p.1));
        format!("{line}; by processor time {ratio:.1} ({:.0} ms, {theirs:.3} s)", 1e3 * ours)
    }
}

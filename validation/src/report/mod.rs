//! The published checks run and told: on the terminal, as Markdown, JSON and one HTML page with pictures.
//!
//! Kinds are named as in ASME V&V 10 (verification and validation in computational solid mechanics) and V&V 20 (in fluid dynamics
//! and heat transfer), from memory: code verification against exact solutions, validation against experiments, and between them
//! cross-checks by independent methods. A difference is the comparison error E = S - D: ours less the reference.

mod coverage;
mod html;
mod json;
mod markdown;
mod pictures;
mod text;

pub use coverage::CoverageReport;
pub use text::list;

use std::time::Instant;

use lenzbore_io::result::{IoFault, folder::PendingFolder, names};
use lenzbore_solver::fault::SolveFault;
use lenzbore_solver::monitor::Monitor;

use crate::Error;
use crate::checks::{Check, Kind, Verdict};
use crate::side_by_side::side_by_side;

/// What a check came to.
#[derive(Debug, Clone)]
pub struct Finding {
    /// The check.
    pub check: Check,
    /// Its comparisons, or why there are none.
    pub verdict: Result<Verdict, Error>,
    /// How long it took, s.
    pub seconds: f64,
}

impl Finding {
    /// Whether all its comparisons pass.
    #[must_use]
    pub fn passed(&self) -> bool {
        self.verdict.as_ref().is_ok_and(Verdict::passed)
    }

    /// The word of the column.
    #[must_use]
    pub fn word(&self) -> &'static str {
        match &self.verdict {
            Ok(verdict) if verdict.passed() => "passes",
            Ok(_) => "FALLS SHORT",
            Err(_) => "NO ANSWER",
        }
    }
}

/// All findings.
#[derive(Debug, Clone)]
pub struct Report {
    /// In the order of the registry.
    pub findings: Vec<Finding>,
    /// Version of the program.
    pub version: String,
    /// How long all of it took, s.
    pub seconds: f64,
}

impl Report {
    /// Runs `checks` side by side.
    ///
    /// # Errors
    /// [`SolveFault::Interrupted`] where the monitor asks to stop; a check that fails is a finding.
    pub fn run(checks: &[Check], version: &str, monitor: &dyn Monitor) -> Result<Self, Error> {
        let begin = Instant::now();
        let find = |check: &Check, monitor: &dyn Monitor| {
            let begin = Instant::now();
            let verdict = (check.run)(monitor);
            Finding { check: *check, verdict, seconds: begin.elapsed().as_secs_f64() }
        };
        let findings =
            side_by_side(checks, monitor, |check| check.name.to_owned(), find).ok_or(SolveFault::Interrupted)?;
        Ok(Self { findings, version: version.to_owned(), seconds: begin.elapsed().as_secs_f64() })
    }

    /// Whether there is a check, and all pass.
    #[must_use]
    pub fn passed(&self) -> bool {
        !self.findings.is_empty() && self.findings.iter().all(Finding::passed)
    }

    /// Checks with a comparison out of its limits.
    pub fn short(&self) -> impl Iterator<Item = &Finding> {
        self.findings.iter().filter(|f| f.verdict.as_ref().is_ok_and(|v| !v.passed()))
    }

    /// Checks whose methods failed.
    pub fn unanswered(&self) -> impl Iterator<Item = (&Finding, &Error)> {
        self.findings.iter().filter_map(|f| f.verdict.as_ref().err().map(|e| (f, e)))
    }

    /// Comparisons in all, and those that pass.
    #[must_use]
    pub fn comparisons(&self) -> (usize, usize) {
        let all = || self.findings.iter().filter_map(|f| f.verdict.as_ref().ok()).flat_map(|v| &v.comparisons);
        (all().count(), all().filter(|c| c.passes()).count())
    }

    /// Checks of each kind, and those that pass.
    fn kinds(&self) -> [(Kind, usize, usize); 3] {
        [Kind::CodeVerification, Kind::CrossCheck, Kind::Validation].map(|kind| {
            let of = || self.findings.iter().filter(move |f| f.check.kind == kind);
            (kind, of().count(), of().filter(|f| f.passed()).count())
        })
    }

    /// One sentence: how many checks pass.
    #[must_use]
    pub fn sentence(&self) -> String {
        let passed = self.findings.iter().filter(|f| f.passed()).count();
        let (comparisons, within) = self.comparisons();
        format!(
            "{passed} of {} checks pass; {within} of {comparisons} comparisons are within their limits ({:.0} s)",
            self.findings.len(),
            self.seconds
        )
    }

    /// Writes Markdown (with all comparisons, and an overview), JSON, one HTML page and the pictures into a folder that appears whole.
    ///
    /// # Errors
    /// See [`IoFault`].
    pub fn write(&self, folder: &mut PendingFolder) -> Result<(), IoFault> {
        let pictures = pictures::all(self);
        folder.write(names::VALIDATION, format!("{:#}\n", self.json()).as_bytes())?;
        folder.write("validation.md", self.markdown(&pictures).as_bytes())?;
        folder.write("overview.md", self.overview(&pictures).as_bytes())?;
        folder.write("validation.html", self.html(&pictures).as_bytes())?;
        for picture in &pictures {
            folder.write(&format!("{}.svg", picture.name), picture.svg.as_bytes())?;
        }
        Ok(())
    }
}

/// What the kinds are evidence for.
const KINDS: [(Kind, &str); 3] = [
    (Kind::CodeVerification, "are the equations solved right? Against an exact solution of the same equations"),
    (Kind::CrossCheck, "does another method say the same? Two that share nothing but the statement of the problem"),
    (Kind::Validation, "are they the right equations? Against an experiment, within what its conditions are known to"),
];

/// Nine significant digits at most, and no idle zeros.
fn number(value: f64) -> String {
    let trimmed = |text: &str| {
        if text.contains('.') { text.trim_end_matches('0').trim_end_matches('.').to_owned() } else { text.to_owned() }
    };
    if value.abs() > 0.0 && !(1e-4..1e6).contains(&value.abs()) {
        let text = format!("{value:.8e}");
        return text.split_once('e').map_or(text.clone(), |(mantissa, power)| format!("{}e{power}", trimmed(mantissa)));
    }
    let digits = if value.abs() > 0.0 { 8.0 - value.abs().log10().floor() } else { 0.0 };
    #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped to 0 .. 15")]
    let decimals = digits.clamp(0.0, 15.0) as usize;
    trimmed(&format!("{value:.decimals$}"))
}

/// Two significant digits.
fn rough(value: f64) -> String {
    if value.abs() > 0.0 { format!("{value:.1e}") } else { "0".to_owned() }
}

/// A unit behind its number; nothing for pure numbers.
fn unit(unit: &str) -> String {
    if unit == "1" { String::new() } else { format!(" {unit}") }
}

#[cfg(test)]
mod tests;

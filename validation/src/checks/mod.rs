//! The registry of checks.
//!
//! A check holds figures of the program, or of an independent method in this crate, against values with a source. Tests call
//! each of them; so can a command.

mod closed_form;
mod demagnetisation;
mod endless;
mod experiment;
mod field;
mod field_coverage;
mod field_fall;
mod field_loop;
mod field_passage;
mod field_position;
mod field_station;
mod field_stroke;
mod grid_index;
mod harmonic;
mod recoil;
mod rings;
mod slots;
mod sources;
mod sphere;
mod step;
mod verdict;
mod warmth;

pub use field_coverage::{COVERAGE_SEED, Coverage};
pub use verdict::{Banded, Comparison, Limits, Series, Verdict};

use lenzbore_solver::monitor::Monitor;

use crate::Error;
use crate::references::Source;

/// What a check is evidence for, in the words of ASME V&V 10 and V&V 20.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Kind {
    /// The equations are solved right: against an exact solution of the same equations.
    CodeVerification,
    /// Two independent methods agree.
    CrossCheck,
    /// The equations are the right ones: against an experiment.
    Validation,
}

impl Kind {
    /// The words used in lists of checks.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Self::CodeVerification => "code verification",
            Self::CrossCheck => "cross-check",
            Self::Validation => "validation (experiment)",
        }
    }
}

/// One check.
#[derive(Debug, Clone, Copy)]
pub struct Check {
    /// Short name, words joined by hyphens.
    pub name: &'static str,
    /// One sentence: what is held against what.
    pub about: &'static str,
    /// What it is evidence for.
    pub kind: Kind,
    /// Where the values come from.
    pub source: &'static Source,
    /// Runs it; the monitor may ask it to stop.
    pub run: fn(&dyn Monitor) -> Result<Verdict, Error>,
}

impl Check {
    /// A check of the code against an exact solution of the same equations.
    const fn code_verification(
        name: &'static str,
        about: &'static str,
        source: &'static Source,
        run: fn(&dyn Monitor) -> Result<Verdict, Error>,
    ) -> Self {
        Self { name, about, kind: Kind::CodeVerification, source, run }
    }
}

/// All checks, those of the independent methods first.
#[must_use]
pub fn all() -> Vec<Check> {
    let groups = [
        closed_form::CHECKS,
        sources::CHECKS,
        recoil::CHECKS,
        endless::CHECKS,
        rings::CHECKS,
        slots::CHECKS,
        demagnetisation::CHECKS,
        grid_index::CHECKS,
        step::CHECKS,
        sphere::CHECKS,
        field::CHECKS,
        field_loop::CHECKS,
        field_coverage::CHECKS,
        field_passage::CHECKS,
        field_fall::CHECKS,
        field_position::CHECKS,
        field_station::CHECKS,
        field_stroke::CHECKS,
        harmonic::CHECKS,
        warmth::CHECKS,
        experiment::CHECKS,
    ];
    groups.concat()
}

/// The check of that name.
#[must_use]
pub fn named(name: &str) -> Option<Check> {
    all().into_iter().find(|c| c.name == name)
}

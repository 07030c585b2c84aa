//! The field solver's fall against the coupled rings, at default settings.

use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::outcome::Outcome;
use lenzbore_solver::problem::Travel;

use super::rings::fall_case;
use super::{Banded, Check, Kind, Limits, Verdict};
use crate::references::fall as reference;
use crate::{Error, cases};

pub(super) const CHECKS: &[Check] = &[Check {
    name: "field-fall",
    about: "transit time and exit speed of a falling magnet, and the energy ledger",
    kind: Kind::CrossCheck,
    source: &reference::SOURCE,
    run: fall,
}];

fn fall(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let (wall, mover, law) = fall_case();
    let outcome = lenzbore_solver::solve(&cases::question(wall, mover, Travel::Free(law)), monitor)?;
    let mut verdict = Verdict::default();
    let transit = figure(&outcome, "transit_time")?;
    verdict.compare("transit time", transit.value, reference::TRANSIT_S, reference::TRANSIT_TOLERANCE_S, "s");
    let limits = Limits { allowed: 1e-5, known_within: reference::REFINED_TRANSIT_WITHIN_S };
    verdict.compare_banded("transit time, band", transit, reference::REFINED_TRANSIT_S, limits, "s");
    let speed = figure(&outcome, "exit_speed")?;
    let allowed = reference::EXIT_SPEED_TOLERANCE_M_PER_S;
    verdict.compare("exit speed", speed.value, reference::EXIT_SPEED_M_PER_S, allowed, "m/s");
    let limits = Limits { allowed: 1e-5, known_within: reference::REFINED_EXIT_SPEED_WITHIN_M_PER_S };
    verdict.compare_banded("exit speed, band", speed, reference::REFINED_EXIT_SPEED_M_PER_S, limits, "m/s");
    let ledger = outcome.ledger.ok_or(Error::MissingFigure("ledger"))?;
    verdict.compare("energy ledger, open part of the work", ledger.imbalance_relative, 0.0, 1e-5, "1");
    Ok(verdict)
}

/// The figure of that name with its band.
pub(super) fn figure(outcome: &Outcome, name: &'static str) -> Result<Banded, Error> {
    let figure = outcome.figures.iter().find(|f| f.name == name).ok_or(Error::MissingFigure(name))?;
    Ok(Banded { value: figure.value, band: figure.band })
}

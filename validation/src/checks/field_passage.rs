//! The field solver's passage through a finite wall against the coupled rings, at default settings.

use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::problem::{Travel, Traverse};

use super::field_fall::figure;
use super::{Check, Kind, Limits, Verdict};
use crate::references::passage as reference;
use crate::rings::{self, Cutting, RingCircuit, extrapolate};
use crate::{Error, cases};

pub(super) const CHECKS: &[Check] = &[Check {
    name: "field-passage",
    about: "peak drag, impulse and heat of a magnet carried through a short wall",
    kind: Kind::CrossCheck,
    source: &reference::SOURCE,
    run: passage,
}];

fn passage(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let wall = cases::finite_tube(reference::WALL_M, reference::WALL_LENGTH_M, reference::CONDUCTIVITY_S_PER_M);
    let mover = cases::cylinder(reference::MAGNET_M.0, reference::MAGNET_M.1, reference::REMANENCE_T);
    let (from_m, to_m) = reference::TRAVEL_M;
    let travel = Traverse { speed_m_per_s: reference::SPEED_M_PER_S, from_m, to_m };
    let mut sizes = Vec::new();
    let mut found = [Vec::new(), Vec::new(), Vec::new()];
    for across in [3_u32, 4, 5, 6] {
        let pitch_m = 6e-3 / f64::from(across);
        let circuit = RingCircuit::new(&wall, Cutting { across: across as usize, pitch_m })?;
        let passage = rings::pass(&circuit, &mover, &travel, 0.25e-3)?;
        sizes.push(pitch_m);
        found[0].push(passage.drag_peak_newton);
        found[1].push(passage.impulse_newton_s);
        found[2].push(passage.heat_joule + passage.field_energy_joule);
    }
    let problem = cases::question(wall, mover, Travel::Traverse(travel));
    let outcome = lenzbore_solver::solve(&problem, monitor)?;
    let mut verdict = Verdict::default();
    let names = [("drag_peak", "N"), ("impulse", "N s"), ("dissipated_energy", "J")];
    for ((name, unit), values) in names.into_iter().zip(found) {
        let rings = extrapolate(&sizes, &values);
        let limits = Limits { allowed: 5e-5 * rings.value, known_within: rings.change.abs() };
        verdict.compare_banded(name, figure(&outcome, name)?, rings.value, limits, unit);
        verdict.compare(format!("{name} by rings, last change"), rings.change, 0.0, 1e-5 * rings.value, unit);
    }
    Ok(verdict)
}

//! What goes with a settled figure: forces by three routes, fields, cautions.

use super::levels::{Levels, Point};
use super::method::shielding;
use crate::band::{self, Ladder};
use crate::fault::SolveFault;
use crate::fields::{empty_fields, snapshot};
use crate::force::{by_stress, on_mover};
use crate::outcome::{Caution, Fields, Forces};
use crate::problem::{Problem, SnapshotPlan};

/// The three routes, extrapolated, with the band within which they must agree.
///
/// # Errors
/// See [`SolveFault`].
pub(super) fn three_forces(
    problem: &Problem,
    levels: &mut Levels<'_>,
    velocity: f64,
    point: &Point,
) -> Result<Forces, SolveFault> {
    let sign = -velocity.signum();
    let shielding = shielding(&problem.wall, velocity);
    let (mut on_mover_levels, mut stress_levels) = (Vec::new(), Vec::new());
    for level in &mut levels.levels {
        let (psi, _) = level.reaction(velocity, levels.monitor)?;
        let grid = &level.operators.grid;
        on_mover_levels.push(sign * on_mover(grid, &psi, &problem.mover, 0.0, levels.placement.gap_m));
        stress_levels.push(sign * by_stress(grid, &psi, problem, &levels.placement, 0.0));
    }
    let (mover, stress) = (Ladder::new(&levels.factors, on_mover_levels), Ladder::new(&levels.factors, stress_levels));
    let wall_newton = velocity.signum() * point.drag.value;
    let (mover_newton, stress_newton) = (mover.value, stress.value);
    let band_newton =
        point.drag_band + band::settled_route(&mover, shielding).max(band::settled_route(&stress, shielding));
    let apart = (mover_newton - wall_newton).abs().max((stress_newton - wall_newton).abs());
    Ok(Forces { wall_newton, mover_newton, stress_newton, band_newton, agree: apart <= band_newton, time_s: 0.0 })
}

/// The settled fields of the finest level, unless none are wanted.
///
/// # Errors
/// See [`SolveFault`].
pub(super) fn wanted_fields(
    problem: &Problem,
    levels: &mut Levels<'_>,
    velocity: f64,
) -> Result<Option<Fields>, SolveFault> {
    if problem.snapshots == SnapshotPlan::None {
        return Ok(None);
    }
    let Some(finest) = levels.levels.last_mut() else { return Ok(None) };
    let (mut psi, currents) = finest.reaction(velocity, levels.monitor)?;
    if let Some(fixed) = &finest.static_reaction {
        psi.iter_mut().zip(fixed).for_each(|(p, s)| *p += s);
    }
    let operators = &finest.operators;
    let mut fields = empty_fields(&operators.grid, &operators.materials, &problem.wall);
    fields.snapshots.push(snapshot(operators, problem, &psi, &currents, 0.0, 0.0));
    Ok(Some(fields))
}

/// What the user should know of the model here.
pub(super) fn cautions(problem: &Problem) -> Vec<Caution> {
    let mut cautions = Vec::new();
    if problem.wall.is_permeable() {
        cautions.push(Caution {
            text: "Permeability is taken as linear: a steel near saturation behaves otherwise.".to_owned(),
        });
    }
    cautions
}

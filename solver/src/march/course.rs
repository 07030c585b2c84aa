//! Where a march goes: motion, start and end, the grids made for it.

use lenzbore_mesh::{Grid, Refinement};

use super::lines::LevelLines;
use super::motion::{Motion, friction, frictionless, potential_energy};
use super::window::WindowRule;
use crate::fault::SolveFault;
use crate::grid_rules::{Frame, GridPlan};
use crate::placement::Placement;
use crate::problem::{Free, Problem, Travel};

/// Where a run begins and ends.
#[derive(Debug, Clone)]
pub(crate) struct Course {
    pub(crate) from: f64,
    pub(crate) velocity: f64,
    /// The run ends at this position ...
    pub(crate) until: f64,
    /// ... or at this instant.
    pub(crate) time_limit: f64,
    /// Travel in a step at most, m, on the coarsest level.
    pub(crate) stride: f64,
}

impl Course {
    /// True once `position` is at or beyond the end.
    pub(super) fn passed(&self, position: f64) -> bool {
        if self.until < self.from { position <= self.until } else { position >= self.until }
    }
}

/// The grids of a march, and the speed that they are made for.
///
/// # Errors
/// See [`SolveFault`].
pub(crate) fn plan(problem: &Problem, placement: &Placement) -> Result<(GridPlan, f64), SolveFault> {
    let (motion, course) = set_out(problem)?;
    let reach = reach(problem, course.from, course.until);
    let speed = fastest(&motion, course.velocity, reach);
    if !(speed > 0.0 && speed.is_finite()) {
        return Err(SolveFault::Unsuited(
            "the mover does not move: nothing drives it, or friction holds it at release",
        ));
    }
    let plan = GridPlan::new(problem, placement, Frame::Wall { low: reach.0, high: reach.1, speed })?;
    Ok((plan, speed))
}

/// The grids that a march goes through: one that is typical for each of `refinements`, and how many there are.
///
/// # Errors
/// A line that cannot be built.
pub(crate) fn grids_on_the_way(
    problem: &Problem,
    placement: &Placement,
    (plan, speed): (&GridPlan, f64),
    refinements: &[Refinement],
) -> Result<(Vec<Grid>, usize), SolveFault> {
    let (_, course) = set_out(problem)?;
    let reach = reach(problem, course.from, course.until);
    let rule = WindowRule::new(problem, placement, plan, reach, speed)?;
    let window = rule.as_ref().map(|rule| rule.typical(reach));
    let grids = refinements.iter().map(|&f| LevelLines::new(plan, rule.as_ref(), f, false).grid(window));
    let number = rule.as_ref().map_or(1, |rule| rule.windows_along(reach));
    Ok((grids.collect::<Result<_, _>>()?, number))
}

/// The motion, and its course but for the stride.
pub(super) fn set_out(problem: &Problem) -> Result<(Motion, Course), SolveFault> {
    match &problem.travel {
        Travel::Traverse(t) => {
            let velocity = (t.to_m - t.from_m).signum() * t.speed_m_per_s;
            let time_limit = (t.to_m - t.from_m).abs() / t.speed_m_per_s;
            let course = Course { from: t.from_m, velocity, until: t.to_m, time_limit, stride: 0.0 };
            Ok((Motion::Uniform { velocity }, course))
        }
        Travel::Free(law) => {
            let mass = problem.mover.mass_kg.ok_or(SolveFault::Unsuited("free travel needs the mover's mass"))?;
            let course = Course {
                from: law.release_m,
                velocity: law.entry_velocity_m_per_s,
                until: law.until_m,
                time_limit: law.time_limit_s,
                stride: 0.0,
            };
            Ok((Motion::Free { law: law.clone(), mass }, course))
        }
        Travel::Steady { .. } | Travel::Alternating(_) => Err(SolveFault::Unsuited("settled fields are no march")),
    }
}

/// Positions that the reference point may take, with a little room beyond the end.
pub(super) fn reach(problem: &Problem, from: f64, to: f64) -> (f64, f64) {
    let room = 0.02 * (to - from).abs();
    let (mut low, mut high) = (from.min(to) - room, from.max(to) + room);
    if let Travel::Free(law) = &problem.travel
        && law.spring_rate_n_per_m > 0.0
    {
        low = low.min(law.spring_free_at_m);
        high = high.max(law.spring_free_at_m);
    }
    (low, high)
}

/// Greatest speed that the motion can reach without drag, m/s; 0 where it cannot start.
fn fastest(motion: &Motion, velocity: f64, reach: (f64, f64)) -> f64 {
    match motion {
        Motion::Uniform { velocity } => velocity.abs(),
        Motion::Free { law, mass } => {
            if velocity.abs() <= 0.0 && frictionless(law, *mass, law.release_m).abs() <= friction(law, *mass) {
                return 0.0;
            }
            free_speed(law, *mass, velocity, reach)
        }
    }
}

fn free_speed(law: &Free, mass: f64, velocity: f64, reach: (f64, f64)) -> f64 {
    let start = potential_energy(law, mass, law.release_m);
    let lowest = [reach.0, reach.1, law.spring_free_at_m.clamp(reach.0, reach.1)]
        .into_iter()
        .map(|z| potential_energy(law, mass, z))
        .fold(f64::INFINITY, f64::min);
    (velocity * velocity + 2.0 * (start - lowest).max(0.0) / mass).sqrt()
}

//! Where a march goes: motion, start and end, the grids made for it.

use lenzbore_mesh::{Grid, Refinement};

use super::lines::LevelLines;
use super::motion::{Motion, friction, frictionless, potential_energy};
use super::pace::steps;
use super::path::{Path, TablePath};
use super::window::WindowRule;
use crate::constants::MU0;
use crate::fault::SolveFault;
use crate::grid_rules::{Frame, GridPlan};
use crate::placement::Placement;
use crate::problem::{Free, Layer, MOST_CYCLES, Problem, Travel, Wall};

/// What ends a run.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) enum End {
    /// A position of the reference point, m, or the time limit.
    Place(f64),
    /// The time limit alone.
    Instant,
}

/// Where a run begins and ends.
#[derive(Debug, Clone)]
pub(crate) struct Course {
    pub(crate) from: f64,
    pub(crate) velocity: f64,
    /// The run ends here ...
    pub(crate) end: End,
    /// ... or at this instant.
    pub(crate) time_limit: f64,
    /// From this instant on the run counts, s: the start of the settled cycle of a stroke, else 0.
    pub(crate) since: f64,
    /// Travel in a step at most, m, on the coarsest level.
    pub(crate) stride: f64,
}

impl Course {
    /// True once `position` is at or beyond the end.
    pub(super) fn passed(&self, position: f64) -> bool {
        match self.end {
            End::Place(until) if until < self.from => position <= until,
            End::Place(until) => position >= until,
            End::Instant => false,
        }
    }

    /// Share of the way at `position`.
    pub(super) fn gone(&self, position: f64) -> f64 {
        match self.end {
            End::Place(until) => (position - self.from) / (until - self.from),
            End::Instant => 0.0,
        }
    }

    /// Sense in which the way to its end leads; 0 where it has none.
    pub(super) fn ahead(&self) -> f64 {
        match self.end {
            End::Place(until) => (until - self.from).signum(),
            End::Instant => 0.0,
        }
    }
}

/// The grids of a march, and the speed that they are made for.
///
/// # Errors
/// See [`SolveFault`].
pub(crate) fn plan(problem: &Problem, placement: &Placement) -> Result<(GridPlan, f64), SolveFault> {
    let (motion, course) = set_out(problem)?;
    let reach = reach(problem, &motion, &course);
    let speed = fastest(&motion, course.velocity, reach, placement.wavelength_m);
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
    let (motion, course) = set_out(problem)?;
    let reach = reach(problem, &motion, &course);
    let rule = windows(problem, placement, plan, &motion, (reach, speed))?;
    let window = rule.as_ref().map(|rule| rule.typical(reach));
    let grids = refinements.iter().map(|&f| LevelLines::new(plan, rule.as_ref(), f, false).grid(window));
    let number = rule.as_ref().map_or(1, |rule| rule.windows_along(reach));
    Ok((grids.collect::<Result<_, _>>()?, number))
}

/// The rule of the windows, where there are any: a mover that turns round would go back into the one it left.
pub(super) fn windows(
    problem: &Problem,
    placement: &Placement,
    plan: &GridPlan,
    motion: &Motion,
    (reach, speed): ((f64, f64), f64),
) -> Result<Option<WindowRule>, SolveFault> {
    if motion.is_prescribed() {
        return Ok(None);
    }
    Ok(WindowRule::new(problem, placement, plan, reach, speed)?)
}

/// Steps of a prescribed motion on the coarsest level of `plan`, about; `None` for other motions.
pub(crate) fn prescribed_steps(problem: &Problem, plan: &GridPlan) -> Option<f64> {
    let (Motion::Prescribed(path), course) = set_out(problem).ok()? else { return None };
    let cycles = match &path {
        Path::Sine(sine) => sine.cycles.map_or_else(
            // 14 life times take currents to 1e-6.
            || (2.0 + 14.0 * life_time(&problem.wall) * sine.frequency_hz).min(f64::from(MOST_CYCLES)),
            f64::from,
        ),
        Path::Table(_) => 1.0,
    };
    Some(steps(&path, HELD_STRIDE * plan.axial_cell_m, cycles)).filter(|s| s.is_finite() && course.time_limit > 0.0)
}

/// How long currents live at most, s, about: mu0 sigma w a / 2 in a thin wall.
pub(super) fn life_time(wall: &Wall) -> f64 {
    let live =
        |l: &Layer| 0.5 * MU0 * l.relative_permeability * l.conductivity_s_per_m * l.thickness_m() * l.outer_radius_m;
    wall.layers.iter().map(live).sum()
}

/// Travel in a step where the motion is given, in axial cells.
pub(super) const HELD_STRIDE: f64 = 0.5;

/// The motion, and its course but for the stride.
pub(super) fn set_out(problem: &Problem) -> Result<(Motion, Course), SolveFault> {
    match &problem.travel {
        Travel::Traverse(t) => {
            let velocity = (t.to_m - t.from_m).signum() * t.speed_m_per_s;
            let time_limit = (t.to_m - t.from_m).abs() / t.speed_m_per_s;
            let end = End::Place(t.to_m);
            let course = Course { from: t.from_m, velocity, end, time_limit, since: 0.0, stride: 0.0 };
            Ok((Motion::Uniform { velocity }, course))
        }
        Travel::Free(law) => {
            let mass = problem.mover.mass_kg.ok_or(SolveFault::Unsuited("free travel needs the mover's mass"))?;
            let course = Course {
                from: law.release_m,
                velocity: law.entry_velocity_m_per_s,
                end: End::Place(law.until_m),
                time_limit: law.time_limit_s,
                since: 0.0,
                stride: 0.0,
            };
            Ok((Motion::Free { law: law.clone(), mass }, course))
        }
        Travel::Sine(sine) => {
            let cycles = sine.cycles.unwrap_or(MOST_CYCLES);
            Ok(along(Path::Sine(*sine), f64::from(cycles) * sine.period_s()))
        }
        Travel::Table(table) => {
            let path = TablePath::new(table);
            let duration = path.duration();
            Ok(along(Path::Table(path), duration))
        }
        Travel::Steady { .. } | Travel::Alternating(_) => Err(SolveFault::Unsuited("settled fields are no march")),
    }
}

fn along(path: Path, time_limit: f64) -> (Motion, Course) {
    let (from, velocity) = (path.position(0.0), path.velocity(0.0));
    let course = Course { from, velocity, end: End::Instant, time_limit, since: 0.0, stride: 0.0 };
    (Motion::Prescribed(path), course)
}

/// Positions that the reference point may take, with a little room beyond the end.
pub(super) fn reach(problem: &Problem, motion: &Motion, course: &Course) -> (f64, f64) {
    let (from, to) = match (motion, course.end) {
        (Motion::Prescribed(path), _) => path.span(),
        (_, End::Place(until)) => (course.from, until),
        (_, End::Instant) => (course.from, course.from),
    };
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

/// Greatest speed that the motion can reach without drag, m/s; 0 where it cannot start. A motion that changes at the rate omega has the
/// skin depth sqrt(2 / (mu sigma omega)), which is the depth at the speed omega `wavelength`.
fn fastest(motion: &Motion, velocity: f64, reach: (f64, f64), wavelength: f64) -> f64 {
    match motion {
        Motion::Prescribed(path) => path.greatest_speed().max(path.rate() * wavelength),
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

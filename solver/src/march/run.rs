//! The loop over steps: the coarsest level chooses the schedule, finer levels replay it.

mod follow;
mod record;

use lenzbore_mesh::Refinement;

use record::PEAK_REACH;

use super::course::Course;
use super::gauge::{Gauges, channels};
use super::heating::Heating;
use super::level::MarchLevel;
use super::motion::{Motion, friction, frictionless, other_force};
use super::pace::{PlannedPair, pairs_of_table};
use super::path::TablePath;
use super::resample::Resampler;
use super::schedule::Schedule;
use super::series::Series;
use super::step::{State, StepReport, Stepper};
use super::window::Window;
use crate::demagnetisation::Watch;
use crate::fault::SolveFault;
use crate::monitor::Monitor;
use crate::outcome::Snapshot;

/// Greatest change of speed in a pair of steps, relative to the speed.
const SPEED_CHANGE: f64 = 0.15;
/// Pairs at most.
const MOST_PAIRS: usize = 2_000_000;
/// Pairs run on beyond the end, so that the end itself is read between steps.
pub(super) const PAIRS_BEYOND: u32 = 2;
/// Speed at the start of a prescribed motion, relative to its greatest, above which it starts with a jerk.
const SUDDEN: f64 = 1.0e-3;

/// How far along a whole job this run's progress counts.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Share {
    pub(crate) from: f64,
    pub(crate) to: f64,
}

/// One level under way.
pub(crate) struct Run<'a, 'p> {
    level: &'a mut MarchLevel<'p>,
    motion: &'a Motion,
    stepper: Stepper,
    state: State,
    saved: State,
    series: Series,
    currents: Vec<f64>,
    near: [f64; 2 * PEAK_REACH + 1],
    psi_nodes: Vec<f64>,
    greatest_drag: f64,
    /// Cycle of a stroke that the greatest drag belongs to.
    cycle: u32,
    heat: f64,
    work: f64,
    losses: f64,
    window: Option<Window>,
    resampler: Option<Resampler>,
    gauges: Gauges,
    snapshots: Vec<Snapshot>,
    magnets: Option<Watch>,
    course: Course,
    heating: Option<Heating>,
}

impl<'a, 'p> Run<'a, 'p> {
    /// Sets the mover at the start, its field at rest in the wall.
    ///
    /// # Errors
    /// See [`SolveFault`].
    pub(crate) fn new(
        level: &'a mut MarchLevel<'p>,
        motion: &'a Motion,
        course: &Course,
        window: Option<Window>,
    ) -> Result<Self, SolveFault> {
        let (wall, grid) = (level.operators.wall.len(), &level.operators.grid);
        let nodes = grid.nodes();
        let (mut source, mut slope) = (vec![0.0; wall], vec![0.0; wall]);
        level.fill_source(course.from, &mut source, &mut slope);
        let (flux, energy_start) = level.field_at_rest(&source)?;
        let acceleration = match motion {
            Motion::Uniform { .. } | Motion::Prescribed(_) => 0.0,
            Motion::Free { law, mass } => driving_force(law, *mass, course) / mass,
        };
        let state = State::new(course.from, course.velocity, flux, source, acceleration);
        let problem = level.problem;
        let gauges = Gauges::new(&problem.stations, &level.operators, &problem.wall);
        let readings = problem.stations.iter().map(|s| channels(s.gauge)).sum();
        let mut series = Series { energy_start, stations: vec![Vec::new(); readings], ..Series::default() };
        series.time.push(0.0);
        series.position.push(course.from);
        series.velocity.push(course.velocity);
        series.heat.push(0.0);
        series.work.push(0.0);
        series.losses.push(0.0);
        Ok(Self {
            stepper: Stepper::new(level),
            saved: state.clone(),
            state,
            series,
            currents: vec![0.0; wall],
            near: [0.0; 2 * PEAK_REACH + 1],
            psi_nodes: vec![0.0; nodes],
            greatest_drag: 0.0,
            cycle: 0,
            heat: 0.0,
            work: 0.0,
            losses: 0.0,
            window,
            resampler: None,
            gauges,
            snapshots: Vec::new(),
            magnets: Watch::new(&level.problem.mover),
            course: course.clone(),
            heating: level.problem.warming.is_some().then(|| Heating::new(level)).transpose()?,
            level,
            motion,
        })
    }

    /// Runs the coarsest level to its end, choosing the schedule.
    ///
    /// # Errors
    /// See [`SolveFault`].
    pub(crate) fn choose(
        mut self,
        course: &Course,
        monitor: &dyn Monitor,
        share: Share,
    ) -> Result<(Series, Schedule), SolveFault> {
        let (first_dt, floor) = first_step(&self.state, course);
        let mut schedule = Schedule::new(first_dt);
        let mut rung = Schedule::first_rung();
        let mut beyond = 0;
        while schedule.pairs() < MOST_PAIRS {
            if monitor.cancelled() {
                return Err(SolveFault::Interrupted);
            }
            self.follow(&mut schedule)?;
            rung = self.wanted_rung(&schedule, rung, course, floor);
            rung = self.accepted_pair(&mut schedule, rung, course, floor)?;
            let gone = course.gone(self.state.position);
            let elapsed = schedule.start(schedule.pairs()) / course.time_limit;
            monitor.progress(share.from + (share.to - share.from) * gone.max(elapsed).clamp(0.0, 1.0), "first level");
            self.series.lost = self.level.problem.is_lost(self.state.position, self.state.velocity);
            if self.series.stopped_at.is_some() || self.series.lost {
                break;
            }
            let over = course.passed(self.state.position) || elapsed >= 1.0;
            beyond = if over { beyond + 1 } else { 0 };
            if beyond > PAIRS_BEYOND {
                break;
            }
        }
        Ok((self.finish(), schedule))
    }

    /// Runs the coarsest level through a table of positions.
    ///
    /// # Errors
    /// See [`SolveFault`].
    pub(crate) fn through_table(
        mut self,
        table: &TablePath,
        course: &Course,
        monitor: &dyn Monitor,
        share: Share,
    ) -> Result<(Series, Schedule), SolveFault> {
        let mut schedule = Schedule::planned();
        let pairs = pairs_of_table(table, course.stride, PAIRS_BEYOND);
        for (k, &pair) in pairs.iter().enumerate() {
            if monitor.cancelled() {
                return Err(SolveFault::Interrupted);
            }
            self.planned(&mut schedule, pair)?;
            monitor.progress(share.from + (share.to - share.from) * count(k + 1) / count(pairs.len()), "first level");
        }
        Ok((self.finish(), schedule))
    }

    /// A planned pair of steps; the first in shorter ones where the motion starts with a jerk.
    pub(super) fn planned(&mut self, schedule: &mut Schedule, pair: PlannedPair) -> Result<(), SolveFault> {
        if schedule.pairs() == 0 && self.starts_suddenly() {
            return pair.graded(0.0).into_iter().try_for_each(|part| self.planned_pair(schedule, part));
        }
        self.planned_pair(schedule, pair)
    }

    fn planned_pair(&mut self, schedule: &mut Schedule, pair: PlannedPair) -> Result<(), SolveFault> {
        let begin = schedule.start(schedule.pairs());
        self.series.reserve(2);
        self.level.prepare(pair.dt_s)?;
        for n in 0..2 {
            self.step_and_record(begin + count(n) * pair.dt_s, pair.dt_s)?;
        }
        schedule.push_planned(pair);
        Ok(())
    }

    fn starts_suddenly(&self) -> bool {
        let Motion::Prescribed(path) = self.motion else { return false };
        path.velocity(0.0).abs() > SUDDEN * path.greatest_speed()
    }

    /// What has been recorded so far.
    pub(super) fn series(&self) -> &Series {
        &self.series
    }

    /// Ends the run with its record.
    pub(super) fn finish(mut self) -> Series {
        self.level.counters.steps += self.series.time_mid.len();
        let stroke = self.motion.sine().is_some();
        self.series.heat_left = self.heating.map(|h| h.finish(self.level, stroke));
        self.series
    }

    /// Replays `schedule` at `refinement`, keeping snapshots at the step middles nearest to `instants`.
    ///
    /// # Errors
    /// See [`SolveFault`].
    pub(crate) fn replay(
        mut self,
        schedule: &Schedule,
        refinement: Refinement,
        instants: &[f64],
        monitor: &dyn Monitor,
        share: Share,
    ) -> Result<(Series, Vec<Snapshot>), SolveFault> {
        let mut wanted = instants.iter().copied().peekable();
        for k in 0..schedule.pairs() {
            if let Some(window) = schedule.window_from(k) {
                self.enter(window)?;
            }
            let (steps, dt) = schedule.steps(k, refinement);
            self.series.reserve(steps);
            self.level.prepare(dt)?;
            for n in 0..steps {
                if monitor.cancelled() {
                    return Err(SolveFault::Interrupted);
                }
                let begin = schedule.start(k) + count(n) * dt;
                let report = self.step_and_record(begin, dt)?;
                while wanted.next_if(|&t| t < begin + dt).is_some() {
                    self.keep_snapshot(begin + 0.5 * dt, report.travel)?;
                }
            }
            monitor
                .progress(share.from + (share.to - share.from) * count(k + 1) / count(schedule.pairs()), "finer level");
            if self.series.stopped_at.is_some() {
                break;
            }
        }
        let snapshots = std::mem::take(&mut self.snapshots);
        Ok((self.finish(), snapshots))
    }

    /// Makes room for `steps` more, and the factor of `dt` ready.
    #[cfg(test)]
    pub(super) fn make_ready(&mut self, steps: usize, dt: f64) -> Result<(), SolveFault> {
        self.series.reserve(steps);
        self.level.prepare(dt)
    }

    /// One rung up where the last pair leaves room for it, else as many down as it must.
    fn wanted_rung(&self, schedule: &Schedule, rung: u32, course: &Course, floor: f64) -> u32 {
        let Motion::Free { .. } = self.motion else { return rung };
        if schedule.pairs() == 0 {
            return rung;
        }
        let speed = self.state.velocity.abs();
        let acceleration = self.series.acceleration_mid.last().copied().unwrap_or(0.0).abs();
        let by_travel = course.stride / speed;
        let by_change = 0.5 * SPEED_CHANGE * speed.max(floor) / acceleration;
        let by_time = course.time_limit / 16.0;
        let limit = 0.95 * by_travel.min(by_change).min(by_time);
        let mut rung = rung + 1;
        while rung > 0 && schedule.dt(rung) > limit {
            rung -= 1;
        }
        rung
    }

    /// Tries pairs from `rung` down until one keeps within stride and speed change; records it.
    fn accepted_pair(
        &mut self,
        schedule: &mut Schedule,
        mut rung: u32,
        course: &Course,
        floor: f64,
    ) -> Result<u32, SolveFault> {
        let begin = schedule.start(schedule.pairs());
        self.series.reserve(2);
        loop {
            let dt = schedule.dt(rung);
            self.level.prepare(dt)?;
            self.saved.copy_from(&self.state);
            if let Some(heating) = &mut self.heating {
                heating.save();
            }
            let keep = (self.heat, self.work, self.losses, self.series.time_mid.len());
            for n in 0..2 {
                let start = begin + count(n) * dt;
                self.step_and_record(start, dt)?;
                if self.series.stopped_at.is_some() {
                    break;
                }
            }
            let (before, after) = (self.saved.velocity, self.state.velocity);
            let fastest = before.abs().max(after.abs());
            let change = (after - before).abs() / fastest.max(floor);
            let uniform = matches!(self.motion, Motion::Uniform { .. });
            let fits = fastest * dt <= course.stride * (1.0 + 1.0e-9) && change <= SPEED_CHANGE;
            if uniform || fits || rung == 0 || self.series.stopped_at.is_some() {
                schedule.push(rung);
                return Ok(rung);
            }
            self.state.copy_from(&self.saved);
            if let Some(heating) = &mut self.heating {
                heating.restore();
            }
            (self.heat, self.work, self.losses) = (keep.0, keep.1, keep.2);
            self.series.truncate(keep.3, begin);
            rung -= 1;
        }
    }

    /// One step with its record, the level being ready for `dt`. Allocates nothing while the series has room.
    pub(super) fn step_and_record(&mut self, begin: f64, dt: f64) -> Result<StepReport, SolveFault> {
        let report = self.stepper.step(self.level, self.motion, &mut self.state, &mut self.currents, begin, dt)?;
        self.record(begin, dt, &report);
        Ok(report)
    }
}

/// Force at release without the magnetic one, N: friction holds, or acts against the sliding.
fn driving_force(law: &crate::problem::Free, mass: f64, course: &Course) -> f64 {
    let pull = frictionless(law, mass, course.from);
    let direction = if course.velocity.abs() > 0.0 { course.velocity.signum() } else { pull.signum() };
    let force = other_force(law, mass, course.from, course.velocity, direction).value;
    let held = course.velocity.abs() <= 0.0 && pull.abs() <= friction(law, mass);
    if held { 0.0 } else { force }
}

/// The first step and the speed below which changes are taken absolute.
fn first_step(state: &State, course: &Course) -> (f64, f64) {
    let (speed, acceleration) = (state.velocity.abs(), state.first_acceleration().abs());
    let floor = (acceleration * course.stride).sqrt();
    let by_rest = 0.05 * (course.stride / acceleration).sqrt();
    let by_speed = if speed > 0.0 { course.stride / speed } else { f64::INFINITY };
    (by_rest.min(by_speed).min(course.time_limit / 16.0), floor)
}

#[expect(clippy::cast_precision_loss, reason = "step counts stay far below 2^52")]
fn count(n: usize) -> f64 {
    n as f64
}

//! Levels to figures: the coarsest level chooses the steps, finer ones replay them, all are extrapolated.

use lenzbore_mesh::{Refinement, Regions};

use super::combine::{Margins, combine};
use super::course::{Course, HELD_STRIDE, life_time, plan, reach, set_out, windows};
use super::cycles::Settling;
use super::figures::{LevelFigure, end_of};
use super::level::MarchLevel;
use super::lines::LevelLines;
use super::motion::{Motion, potential_energy};
use super::path::Path;
use super::routes::Routes;
use super::run::{Run, Share};
use super::schedule::Schedule;
use super::series::Series;
use super::small::around;
use super::snapshots::instants;
use super::stations::{Marched, station_traces};
use super::window::{Window, WindowRule};
use crate::band::{self, Ladder};
use crate::corner::corner_powers;
use crate::extrapolate::extrapolate;
use crate::fault::SolveFault;
use crate::fields::empty_fields;
use crate::grid_report::grid_report;
use crate::grid_rules::GridPlan;
use crate::interpolate::sampled;
use crate::materials::Materials;
use crate::monitor::{Monitor, Quiet};
use crate::outcome::{
    Caution, Fields, Figure, GridReport, Ledger, Outcome, Snapshot, StationTrace, Stop, Sweeps, Trace, WorkCounters,
};
use crate::placement::Placement;
use crate::problem::{Problem, Sine, SnapshotPlan};
use crate::regime::regime;
use crate::target::{refine, verdict};

/// Levels added at most on our own: a march costs the cube of the refinement.
const MOST_MARCH_LEVELS: usize = 4;

/// One level's record.
pub(super) struct LevelRecord {
    pub(super) series: Series,
    report: GridReport,
    counters: WorkCounters,
    fields: Option<Fields>,
}

/// A march set up: where it goes, on which grids.
pub(super) struct Journey<'p> {
    pub(super) problem: &'p Problem,
    placement: Placement,
    plan: GridPlan,
    pub(super) motion: Motion,
    pub(super) course: Course,
    reach: (f64, f64),
    speed: f64,
    windows: Option<WindowRule>,
}

/// Solves a motion in time.
///
/// # Errors
/// See [`SolveFault`].
pub(crate) fn march(problem: &Problem, monitor: &dyn Monitor) -> Result<Outcome, SolveFault> {
    Journey::new(problem)?.solve(monitor)
}

/// The same of a stroke, without small strokes over frequency.
///
/// # Errors
/// See [`SolveFault`].
pub(crate) fn settled_stroke(problem: &Problem, monitor: &dyn Monitor) -> Result<Outcome, SolveFault> {
    Ok(Journey::new(problem)?.through_levels(monitor)?.1)
}

/// The same without windows.
///
/// # Errors
/// See [`SolveFault`].
#[cfg(test)]
pub(crate) fn march_on_whole_grids(problem: &Problem, monitor: &dyn Monitor) -> Result<Outcome, SolveFault> {
    Journey { windows: None, ..Journey::new(problem)? }.solve(monitor)
}

/// Names and values of the figures of the coarsest level alone, through windows and without.
///
/// # Errors
/// See [`SolveFault`].
#[cfg(test)]
pub(crate) fn coarsest_both_ways(
    problem: &Problem,
    monitor: &dyn Monitor,
) -> Result<Vec<(&'static str, [f64; 2])>, SolveFault> {
    let figures = |journey: Journey<'_>| {
        let records = journey.first(monitor)?;
        Ok::<_, SolveFault>(super::figures::level_figures(problem, &records.levels[0].series, &records.course))
    };
    let windows = Journey::new(problem)?;
    assert!(windows.windows.is_some(), "the wall is too short for windows");
    let (windows, whole) = (figures(windows)?, figures(Journey { windows: None, ..Journey::new(problem)? })?);
    Ok(windows.iter().zip(&whole).map(|(a, b)| (a.name, [a.value, b.value])).collect())
}

/// The schedule, the levels so far, the coarsest level on half the domain.
pub(super) struct Records {
    /// The course, a stroke's with its last cycle.
    pub(super) course: Course,
    settling: Option<Settling>,
    pub(super) schedule: Schedule,
    pub(super) levels: Vec<LevelRecord>,
    cut: Option<LevelRecord>,
}

impl<'p> Journey<'p> {
    pub(super) fn new(problem: &'p Problem) -> Result<Self, SolveFault> {
        let placement = Placement::new(problem);
        let (plan, speed) = plan(problem, &placement)?;
        let (motion, course) = set_out(problem)?;
        // v dt <= h for free motion, half of it where the speed is held.
        let share = if let Motion::Free { .. } = motion { 1.0 } else { HELD_STRIDE };
        let course = Course { stride: share * plan.axial_cell_m, ..course };
        let reach = reach(problem, &motion, &course);
        let windows = windows(problem, &placement, &plan, &motion, (reach, speed))?;
        Ok(Self { problem, placement, plan, motion, course, reach, speed, windows })
    }

    fn solve(&self, monitor: &dyn Monitor) -> Result<Outcome, SolveFault> {
        let (records, mut outcome) = self.through_levels(monitor)?;
        if let Some(sine) = self.motion.sine()
            && life_time(&self.problem.wall) > 0.0
        {
            outcome.strokes = Some(around(self.problem, sine, monitor)?);
        }
        self.warm(&records, &mut outcome, monitor)?;
        monitor.progress(1.0, "done");
        Ok(outcome)
    }

    fn through_levels(&self, monitor: &dyn Monitor) -> Result<(Records, Outcome), SolveFault> {
        let mut records = self.first(monitor)?;
        let outcome = refine(&self.problem.accuracy, MOST_MARCH_LEVELS, |count| {
            self.replay_missing(&mut records, count, monitor)?;
            Ok::<_, SolveFault>(self.outcome(&mut records))
        })?;
        Ok((records, outcome))
    }

    /// The window to begin with.
    pub(super) fn window(&self) -> Option<Window> {
        self.windows.as_ref().map(|rule| rule.choose(self.course.from, self.course.ahead()))
    }

    pub(super) fn level(&self, refinement: Refinement, half: bool) -> Result<MarchLevel<'_>, SolveFault> {
        let lines = LevelLines::new(&self.plan, self.windows.as_ref(), refinement, half);
        MarchLevel::new(self.problem, &self.placement, lines, self.window(), self.reach)
    }

    pub(super) fn first(&self, monitor: &dyn Monitor) -> Result<Records, SolveFault> {
        let mut level = self.level(Refinement::COARSEST, false)?;
        let run = Run::new(&mut level, &self.motion, &self.course, self.window())?;
        let share = Share { from: 0.0, to: 0.08 };
        let mut course = self.course.clone();
        let (series, schedule, settling) = match &self.motion {
            Motion::Prescribed(Path::Sine(sine)) => {
                let (series, schedule, settling) = run.choose_cycles(sine, &course, monitor, share)?;
                let cycles = f64::from(settling.cycles);
                course.since = (cycles - 1.0) * sine.period_s();
                course.time_limit = cycles * sine.period_s();
                (series, schedule, Some(settling))
            }
            Motion::Prescribed(Path::Table(table)) => {
                let (series, schedule) = run.through_table(table, &course, monitor, share)?;
                (series, schedule, None)
            }
            Motion::Uniform { .. } | Motion::Free { .. } => {
                let (series, schedule) = run.choose(&course, monitor, share)?;
                (series, schedule, None)
            }
        };
        let record = self.record(&level, series, Refinement::COARSEST, None)?;
        Ok(Records { course, settling, schedule, levels: vec![record], cut: None })
    }

    /// Replays the levels not yet there: the finest beside the others, so that two cores are busy.
    fn replay_missing(&self, records: &mut Records, count: usize, monitor: &dyn Monitor) -> Result<(), SolveFault> {
        let refinements = Refinement::first(count);
        let missing = &refinements[records.levels.len()..];
        let Some((&finest, others)) = missing.split_last() else { return Ok(()) };
        let wanted = instants(&self.problem.snapshots, &records.levels[0].series, &records.course);
        let keep = self.problem.snapshots != SnapshotPlan::None;
        let schedule = &records.schedule;
        let quiet = Quiet { inner: monitor };
        let need_cut = records.cut.is_none();
        let (fine, coarse) = std::thread::scope(|scope| {
            let beside = scope.spawn(|| {
                let mut list = Vec::new();
                for &refinement in others {
                    list.push(self.replay(schedule, refinement, false, &[], false, &quiet)?);
                }
                let cut = if need_cut {
                    Some(self.replay(schedule, Refinement::COARSEST, true, &[], false, &quiet)?)
                } else {
                    None
                };
                Ok::<_, SolveFault>((list, cut))
            });
            let fine = self.replay(schedule, finest, false, &wanted, keep, monitor);
            (fine, beside.join())
        });
        let (list, cut) = coarse.map_err(|_| SolveFault::NotFinite { what: "a level's thread" })??;
        records.levels.iter_mut().for_each(|l| l.fields = None);
        records.levels.extend(list);
        records.levels.push(fine?);
        records.cut = records.cut.take().or(cut);
        Ok(())
    }

    pub(super) fn replay(
        &self,
        schedule: &Schedule,
        refinement: Refinement,
        half: bool,
        wanted: &[f64],
        keep: bool,
        monitor: &dyn Monitor,
    ) -> Result<LevelRecord, SolveFault> {
        let mut level = self.level(refinement, half)?;
        let run = Run::new(&mut level, &self.motion, &self.course, self.window())?;
        let (series, snapshots) = run.replay(schedule, refinement, wanted, monitor, Share { from: 0.08, to: 1.0 })?;
        self.record(&level, series, refinement, keep.then_some(snapshots))
    }

    fn record(
        &self,
        level: &MarchLevel<'_>,
        series: Series,
        refinement: Refinement,
        snapshots: Option<Vec<Snapshot>>,
    ) -> Result<LevelRecord, SolveFault> {
        let operators = &level.operators;
        let mut report = grid_report(self.problem, &self.placement, &operators.grid, refinement.factor(), self.speed);
        report.steps = series.time_mid.len();
        report.residual = level.worst_residual;
        let fields = match snapshots {
            Some(snapshots) => {
                let grid = level.lines.grid(None)?;
                let materials = Materials::new(&self.problem.wall, &Regions::new(&grid, &self.plan.rectangles));
                Some(Fields { snapshots, ..empty_fields(&grid, &materials, &self.problem.wall) })
            }
            None => None,
        };
        Ok(LevelRecord { series, report, counters: level.counters, fields })
    }

    fn outcome(&self, records: &mut Records) -> Outcome {
        let factors: Vec<f64> = Refinement::first(records.levels.len()).iter().map(|f| f.factor()).collect();
        let (stop, _) = end_of(&records.levels[0].series, &records.course);
        let by_level: Vec<Vec<LevelFigure>> =
            records.levels.iter().map(|l| self.figures_of(l, &records.course)).collect();
        let cut = records.cut.as_ref().map(|c| self.figures_of(c, &records.course));
        let residual = records.levels.iter().map(|l| l.report.residual).fold(0.0, f64::max);
        let corners = corner_powers(&self.problem.wall, factors.len());
        let routes = self.routes(records, &factors);
        let ledger = self.ledger(records, &factors);
        let unsettled = records.settling.map_or_else(Vec::new, |s| unsettled(&s, &ledger, self.motion.sine()));
        let margins = Margins { residual, apart: routes.apart(), corners, unsettled };
        let (figures, slow) = combine(&factors, &by_level, cut.as_deref(), &margins);
        let trace = self.trace(records, &factors);
        let stations = self.stations(records, &factors, &trace);
        let peak_time = figures.iter().find(|f| f.name == "drag_peak").and_then(|f| f.location?.t_s);
        // A gauge reads a field at one point: its band is no part of the target.
        let mut accuracy = verdict(&figures, self.problem.accuracy.target_relative, factors.len());
        if let (Some(settling), Some(advice)) = (&records.settling, &mut accuracy.advice)
            && !settling.settled()
        {
            *advice = unsettled_advice(settling);
        }
        let mut figures = figures;
        figures.extend(stations.iter().flat_map(StationTrace::figures));
        let mut counters = WorkCounters::default();
        for level in records.levels.iter().chain(records.cut.as_ref()) {
            counters.factorisations += level.counters.factorisations;
            counters.solves += level.counters.solves;
            counters.steps += level.counters.steps;
        }
        Outcome {
            regime: regime(self.problem, &self.placement, self.regime_speed(&trace)),
            grids: records.levels.iter().map(|l| l.report.clone()).collect(),
            counters,
            cautions: self.cautions(stop, &figures, records.settling.as_ref()).into_iter().chain(slow).collect(),
            stop,
            accuracy,
            trace,
            curve: None,
            frequency: None,
            strokes: None,
            sweeps: Sweeps::default(),
            stations,
            thermal: None,
            slotted: None,
            forces: peak_time.map(|t| routes.forces(t)),
            ledger: Some(ledger),
            fields: records.levels.last_mut().and_then(|l| l.fields.clone()),
            figures,
        }
    }

    fn regime_speed(&self, trace: &Trace) -> f64 {
        if self.motion.is_prescribed() {
            return self.speed;
        }
        let largest =
            (0..trace.drag_newton.len()).max_by(|&a, &b| trace.drag_newton[a].total_cmp(&trace.drag_newton[b]));
        largest.map_or(self.speed, |k| trace.velocity_m_per_s[k].abs())
    }

    /// The series at the middles of the coarsest level's pairs, extrapolated.
    fn trace(&self, records: &Records, factors: &[f64]) -> Trace {
        let (_, end) = end_of(&records.levels[0].series, &records.course);
        let mut trace = Trace::default();
        for t in self.trace_instants(records).take_while(|&t| t <= end) {
            let of = |read: fn(&Series, f64) -> f64| -> Ladder {
                Ladder::new(factors, records.levels.iter().map(|l| read(&l.series, t)).collect())
            };
            let velocity = of(|s, t| s.at(&s.velocity, t)).value;
            let force = of(|s, t| s.mid_at(&s.force_mid, t) - s.mid_at(&s.pull_mid, t));
            trace.time_s.push(t);
            trace.position_m.push(of(|s, t| s.at(&s.position, t)).value);
            trace.velocity_m_per_s.push(velocity);
            trace.drag_newton.push(-velocity.signum() * force.value);
            trace.drag_band_newton.push(band::one_route(&force, 0.0, 0.0));
            trace.heat_watt.push(of(|s, t| s.mid_at(&s.heat_rate_mid, t)).value);
        }
        trace
    }

    /// What the gauges read at the instants of the trace.
    fn stations(&self, records: &Records, factors: &[f64], trace: &Trace) -> Vec<StationTrace> {
        let marched = Marched {
            levels: records.levels.iter().map(|l| &l.series).collect(),
            cut: records.cut.as_ref().map(|c| &c.series),
            factors,
            corners: corner_powers(&self.problem.wall, factors.len()),
        };
        station_traces(self.problem, &marched, (&trace.time_s, &trace.position_m), records.course.since)
    }

    /// Middles of the coarsest level's pairs; of its steps where the path is given, so that a stroke's loop is round.
    fn trace_instants(&self, records: &Records) -> impl Iterator<Item = f64> {
        let off: &[f64] = if self.motion.is_prescribed() { &[-0.5, 0.5] } else { &[0.0] };
        let schedule = &records.schedule;
        (0..schedule.pairs()).flat_map(move |k| {
            off.iter().map(move |share| schedule.middle(k) + share * schedule.steps(k, Refinement::COARSEST).1)
        })
    }

    /// The three routes at the instant of the greatest drag, extrapolated.
    fn routes(&self, records: &Records, factors: &[f64]) -> Routes {
        let at = |l: &LevelRecord, of: fn(&Series, f64) -> f64| {
            let series = &l.series;
            let t = super::figures::drag_peak(series, &records.course).0;
            let pull = series.mid_at(&series.pull_mid, t);
            // Where the mover turns round, its greatest force may be met at rest.
            let sense = if self.motion.is_prescribed() {
                -(series.mid_at(&series.force_mid, t) - pull)
            } else {
                series.at(&series.velocity, t)
            };
            -sense.signum() * (of(series, t) - pull)
        };
        let ladder =
            |of: fn(&Series, f64) -> f64| Ladder::new(factors, records.levels.iter().map(|l| at(l, of)).collect());
        Routes {
            wall: ladder(|s, t| s.mid_at(&s.force_mid, t)),
            mover: ladder(|s, t| s.mid_at(&s.force_on_mover_mid, t)),
            stress: ladder(|s, t| sampled(&s.time_stress, &s.force_by_stress, t)),
        }
    }

    fn ledger(&self, records: &Records, factors: &[f64]) -> Ledger {
        let entry = |l: &LevelRecord| {
            let series = &l.series;
            let (_, end) = end_of(series, &records.course);
            let since = records.course.since;
            let before = if since > 0.0 { series.mid_at(&series.energy_mid, since) } else { series.energy_start };
            let energy = series.mid_at(&series.energy_mid, end) - before;
            let heat = series.at(&series.heat, end) - series.at(&series.heat, since);
            (self.work_against_drag(series, (since, end)), heat, energy)
        };
        let entries: Vec<(f64, f64, f64)> = records.levels.iter().map(entry).collect();
        let value = |of: fn(&(f64, f64, f64)) -> f64| extrapolate(factors, &entries.iter().map(of).collect::<Vec<_>>());
        let (work, heat, field_energy) = (value(|e| e.0), value(|e| e.1), value(|e| e.2));
        // Of the largest entry: where nothing conducts, the work comes back and sums to nothing.
        let largest = work.abs().max(heat.abs()).max(field_energy.abs());
        let imbalance_relative = if largest > 0.0 { (work - heat - field_energy) / largest } else { 0.0 };
        Ledger { work, heat, field_energy, imbalance_relative, unit: "J" }
    }

    /// Work done against the magnetic force: of the prescribed motion, or out of the mover's mechanical energy.
    fn work_against_drag(&self, series: &Series, (since, end): (f64, f64)) -> f64 {
        match &self.motion {
            Motion::Uniform { .. } => -series.at(&series.work, end),
            Motion::Prescribed(_) => series.at(&series.work, since) - series.at(&series.work, end),
            Motion::Free { law, mass } => {
                let energy = |z: f64, v: f64| 0.5 * mass * v * v + potential_energy(law, *mass, z);
                let (z, v) = (series.at(&series.position, end), series.at(&series.velocity, end));
                energy(self.course.from, self.course.velocity) - energy(z, v) - series.at(&series.losses, end)
            }
        }
    }

    fn cautions(&self, stop: Stop, figures: &[Figure], settling: Option<&Settling>) -> Vec<Caution> {
        let mut texts: Vec<String> = settling.map(said).into_iter().collect();
        if self.problem.wall.is_permeable() {
            texts.push("Permeability is taken as linear: a steel near saturation behaves otherwise.".to_owned());
            texts.push(
                "A permeable wall pulls on the mover at rest too: drag figures leave that static pull out.".to_owned(),
            );
        }
        if let Motion::Free { .. } = self.motion {
            if stop == Stop::TimeLimit {
                texts.push("The time limit ended the run before the end of travel.".to_owned());
            }
            if stop == Stop::OutOfReach {
                texts.push(
                    "The mover left the wall's field away from the end of travel, and nothing brings it back: the run ended there."
                        .to_owned(),
                );
            }
            if stop == Stop::AtRest {
                texts.push("Friction brought the mover to rest before the end of travel.".to_owned());
            }
            if !figures.iter().any(|f| f.name == "transit_time") {
                texts.push("The mover did not pass both gates: times and speeds at them are left out.".to_owned());
            }
        }
        texts.into_iter().map(|text| Caution { text }).collect()
    }
}

/// What a stroke adds to the bands: the change that more cycles would bring, and what its balance of energy leaves open.
fn unsettled(settling: &Settling, ledger: &Ledger, sine: Option<&Sine>) -> Vec<(&'static str, f64)> {
    let Some(sine) = sine else { return Vec::new() };
    let open = ledger.imbalance_relative.abs() * ledger.work.abs().max(ledger.heat.abs());
    let loss = settling.loss_left + open;
    let x = sine.amplitude_m;
    let damping = loss / (std::f64::consts::PI * sine.angular_frequency() * x * x);
    let mut list = vec![
        ("loss_per_cycle", loss),
        ("damping_coefficient_equivalent", damping),
        ("stiffness", settling.stiffness_left),
    ];
    list.retain(|(_, half)| half.is_finite());
    list
}

/// What would narrow the bands of a stroke that has not settled.
fn unsettled_advice(settling: &Settling) -> String {
    let cycles = settling.cycles;
    if settling.given {
        format!("the stroke has not settled in {cycles} cycles: leave 'cycles' out of the travel, or give more")
    } else {
        format!("the stroke has not settled in {cycles} cycles, as many as are followed")
    }
}

/// How a stroke settled, in words.
fn said(settling: &Settling) -> String {
    let cycles = settling.cycles;
    match (settling.given, settling.settled()) {
        (false, true) => format!(
            "The figures are those of cycle {cycles}, by which the stroke had settled: loss and stiffness of the next would be the same within a millionth."
        ),
        (true, true) => {
            format!("The figures are those of cycle {cycles}, as the case asks; more cycles would change nothing.")
        }
        (true, false) => format!(
            "The figures are those of cycle {cycles}, as the case asks; settled, loss or stiffness would differ by {:.1e} of the force, which the bands hold.",
            settling.left
        ),
        (false, false) => format!(
            "The stroke had not settled after {cycles} cycles: loss or stiffness would still change by {:.1e} of the force, which the bands hold.",
            settling.left
        ),
    }
}

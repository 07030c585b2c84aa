//! The event again and again, on three grids: stop by stop, what it fades to, where it settles.

use lenzbore_mesh::Refinement;

use super::answer::{Event, LEVELS, extrapolated, factors};
use super::cautions;
use super::deposit::deposit;
use super::law::EventLaw;
use super::operator::HeatOperator;
use super::stops::{LevelHeat, LevelStop, LevelStops, Routine};
use crate::band::{Ladder, local, one_route};
use crate::extrapolate::extrapolate;
use crate::fault::SolveFault;
use crate::monitor::{Monitor, Quiet};
use crate::outcome::{Basis, DutyOutcome, DutyStop, Figure, HeatLedger, TemperatureField};
use crate::problem::{Duty, Problem, Warming};

/// Distance from the settled temperature at which stops are counted as settled, of the rise before it.
const NEAR_SETTLED: f64 = 0.01;

/// What a duty adds to an answer.
pub(super) struct Repeated {
    pub(super) outcome: DutyOutcome,
    pub(super) figures: Vec<Figure>,
    pub(super) cautions: Vec<String>,
    pub(super) ledger: HeatLedger,
    pub(super) fields: Vec<TemperatureField>,
}

/// The event's own numbers, extrapolated, with their relative half-widths.
struct Base {
    heat: f64,
    heat_share: f64,
    drag: f64,
    drag_share: f64,
}

impl Base {
    fn new(event: &Event, known: &[Figure]) -> Self {
        let figure = |name: &str| known.iter().find(|f| f.name == name);
        let share =
            |f: Option<&Figure>| f.map_or(0.0, |f| if f.value.abs() > 0.0 { f.band / f.value.abs() } else { 0.0 });
        let levels: Vec<f64> = Refinement::first(event.levels.len()).iter().map(|f| f.factor()).collect();
        let heat = extrapolate(&levels, &event.levels.iter().map(|l| l.heat).collect::<Vec<_>>());
        let (energy, drag) = (figure("dissipated_energy"), figure("drag_peak"));
        Self { heat, heat_share: share(energy), drag: drag.map_or(0.0, |f| f.value), drag_share: share(drag) }
    }
}

/// Repeats the event as `duty` says.
///
/// # Errors
/// See [`SolveFault`].
pub(super) fn repeat(
    problem: &Problem,
    warming: &Warming,
    duty: Duty,
    (event, known): (&Event, &[Figure]),
    operators: &[HeatOperator],
    monitor: &dyn Monitor,
) -> Result<Repeated, SolveFault> {
    let thinnest = problem.wall.layers.iter().map(|l| l.thickness_m()).fold(f64::INFINITY, f64::min);
    let routine = Routine::new(warming.start_k, warming.cooling, duty, &warming.layers, thinnest);
    let mut levels = levels(event, operators);
    let quiet = Quiet { inner: monitor };
    let count = duty.repeats.map(|n| n as usize);
    monitor.progress(0.0, "how warm it gets");
    let first = levels[0].run(&EventLaw::constant(warming.start_k), &routine, count, &quiet)?;
    let before = || first.stops.iter().map(|s| s.before);
    let span = (before().fold(f64::INFINITY, f64::min), before().fold(f64::NEG_INFINITY, f64::max));
    let law = EventLaw::solved(problem, warming, span, monitor)?;
    add_changes(&mut levels, &law);
    monitor.progress(0.5, "stop by stop");
    let runs = runs(&levels, &law, &routine, count, monitor)?;
    let base = Base::new(event, known);
    let answer = Answer { runs: &runs, law: &law, base: &base, routine: &routine };
    let outcome = answer.outcome();
    let told = cautions::of_duty(event, &outcome, &duty, runs[0].left);
    let fields = answer.fields(operators);
    Ok(Repeated {
        figures: answer.figures(warming, problem, &outcome),
        ledger: answer.ledger(),
        fields,
        cautions: told,
        outcome,
    })
}

fn levels(event: &Event, operators: &[HeatOperator]) -> Vec<LevelHeat> {
    let parts = operators.iter().zip(&event.levels).zip(Refinement::first(LEVELS));
    let level = |((operator, event), refinement): ((&HeatOperator, &crate::march::CoarseEvent), Refinement)| {
        LevelHeat { own: deposit(&event.left, operator), changes: Vec::new(), operator: operator.clone(), refinement }
    };
    parts.map(level).collect()
}

/// What the event leaves elsewhere at other temperatures, by the coarsest level.
fn add_changes(levels: &mut [LevelHeat], law: &EventLaw) {
    for level in levels {
        let all: Vec<Vec<f64>> = law.events.iter().map(|e| deposit(&e.left, &level.operator)).collect();
        let change = |heat: &Vec<f64>| heat.iter().zip(&all[0]).map(|(q, first)| q - first).collect();
        level.changes = all.iter().map(change).collect();
    }
}

/// All levels' stops; the coarsest says how many.
fn runs(
    levels: &[LevelHeat],
    law: &EventLaw,
    routine: &Routine<'_>,
    count: Option<usize>,
    monitor: &dyn Monitor,
) -> Result<Vec<LevelStops>, SolveFault> {
    let quiet = Quiet { inner: monitor };
    let coarsest = levels[0].run(law, routine, count, &quiet)?;
    let stops = Some(coarsest.stops.len());
    let finer = std::thread::scope(|scope| {
        let (quiet, work) = (&quiet, &levels[1..]);
        let beside: Vec<_> = work.iter().map(|l| scope.spawn(move || l.run(law, routine, stops, quiet))).collect();
        beside.into_iter().map(std::thread::ScopedJoinHandle::join).collect::<Vec<_>>()
    });
    let mut all = vec![coarsest];
    for run in finer {
        all.push(run.map_err(|_| SolveFault::NotFinite { what: "a level's thread" })??);
    }
    Ok(all)
}

/// Everything that the figures are read from.
struct Answer<'a> {
    runs: &'a [LevelStops],
    law: &'a EventLaw,
    base: &'a Base,
    routine: &'a Routine<'a>,
}

impl Answer<'_> {
    fn ladder(&self, n: usize, of: fn(&LevelStop) -> f64) -> Ladder {
        Ladder::new(&factors(), self.runs.iter().map(|r| of(&r.stops[n])).collect())
    }

    fn count(&self) -> usize {
        self.runs[0].stops.len()
    }

    fn outcome(&self) -> DutyOutcome {
        let stop = |n: usize| {
            let read = |of: fn(&LevelStop) -> f64| self.ladder(n, of).value;
            let (number, before) = (u32::try_from(n + 1).unwrap_or(u32::MAX), read(|s| s.before));
            DutyStop {
                number: f64::from(number),
                time_s: f64::from(number - 1) * self.routine.duty.period_s,
                energy_joule: read(|s| s.energy),
                drag_peak_newton: self.base.drag * self.law.drag_at(before),
                temperature_before_k: before,
                temperature_mean_k: read(|s| s.mean),
                temperature_peak_k: read(|s| s.peak),
                surface_bore_k: if self.has_bore() { read(|s| s.bore) } else { read(|s| s.outside) },
                surface_outside_k: read(|s| s.outside),
            }
        };
        let last = self.count() - 1;
        let (before, hottest) = (self.ladder(last, |s| s.before).value, self.ladder(last, |s| s.hottest_before).value);
        let (here, there) = (self.law.drag_at(before), self.law.drag_at(hottest));
        let solved = self.law.at_k.iter().zip(self.law.heat_ratio.iter().zip(&self.law.drag_ratio));
        DutyOutcome {
            stops: (0..self.count()).map(stop).collect(),
            has_bore: self.has_bore(),
            settled: self.runs[0].settled,
            solved_at: solved.map(|(t, (q, d))| [*t, q * self.base.heat, d * self.base.drag]).collect(),
            uniform_cost: if here > 0.0 { there / here - 1.0 } else { 0.0 },
        }
    }

    fn has_bore(&self) -> bool {
        self.runs[0].stops[0].bore.is_finite()
    }

    /// What the heat's own uncertainty and stops still to come make of a temperature, K.
    fn more(&self, value: f64) -> f64 {
        let rise = value - self.routine.ambient_k.min(self.routine.start_k);
        let left = if self.routine.duty.repeats.is_none() { self.runs[0].left } else { 0.0 };
        (self.base.heat_share + self.law.heat_band) * rise.abs() + if left.is_finite() { left } else { 0.0 }
    }

    fn figures(&self, warming: &Warming, problem: &Problem, outcome: &DutyOutcome) -> Vec<Figure> {
        let last = self.count() - 1;
        let energy = self.ladder(last, |s| s.energy);
        let share = (self.base.heat_share + self.law.heat_band) * energy.value;
        let mut figures = vec![extrapolated("energy_per_stop", "J", energy.clone(), share)];
        let capacity = warming.heat_capacity_j_per_k(&problem.wall);
        let rise = Ladder::new(&factors(), energy.levels.iter().map(|e| e / capacity).collect());
        figures.push(extrapolated("temperature_rise_per_stop", "K", rise, share / capacity));
        figures.push(self.fade(outcome));
        let word = if outcome.settled { "settled" } else { "last" };
        let mut temperature = |name: String, of: fn(&LevelStop) -> f64, is_local: bool| {
            let ladder = self.ladder(last, of);
            let band = if is_local { local(&ladder, 0.0, 0.0) } else { one_route(&ladder, 0.0, 0.0) };
            let more = band - one_route(&ladder, 0.0, 0.0) + self.more(ladder.value);
            figures.push(extrapolated(&name, "K", ladder, more));
        };
        temperature(format!("temperature_{word}_mean"), |s| s.mean, false);
        temperature(format!("temperature_{word}_peak"), |s| s.peak, true);
        if self.has_bore() {
            temperature("surface_temperature_bore".to_owned(), |s| s.bore, true);
        }
        temperature("surface_temperature_outside".to_owned(), |s| s.outside, true);
        figures.extend(self.stops_to_settle(outcome));
        figures
    }

    /// Loss of the greatest drag from the first stop to the last, relative to the first.
    fn fade(&self, outcome: &DutyOutcome) -> Figure {
        let (first, last) = (&outcome.stops[0], &outcome.stops[outcome.stops.len() - 1]);
        let (before, after) =
            (self.law.drag_at(first.temperature_before_k), self.law.drag_at(last.temperature_before_k));
        let value = 1.0 - after / before;
        let warmer = last.temperature_before_k - first.temperature_before_k;
        let more =
            self.more(last.temperature_before_k) + one_route(&self.ladder(self.count() - 1, |s| s.before), 0.0, 0.0);
        let by_temperature = if warmer.abs() > 0.0 { (value / warmer * more).abs() } else { 0.0 };
        Figure {
            name: "drag_fade".to_owned(),
            value,
            unit: "1",
            band: self.law.drag_band + by_temperature + self.base.drag_share * value.abs(),
            basis: Basis::Extrapolated,
            location: None,
            levels: Vec::new(),
        }
    }

    /// Stops until the temperature before one is within a hundredth of the whole rise from where it settles.
    fn stops_to_settle(&self, outcome: &DutyOutcome) -> Option<Figure> {
        let (first, last) = (outcome.stops.first()?, outcome.stops.last()?);
        let (start, settled) = (first.temperature_before_k, last.temperature_before_k);
        let near = |s: &&DutyStop| (settled - s.temperature_before_k).abs() <= NEAR_SETTLED * (settled - start).abs();
        let number = outcome.stops.iter().find(near)?.number;
        let name = "stops_to_settle".to_owned();
        let (basis, location) = (Basis::Extrapolated, None);
        let figure = Figure { name, value: number, unit: "1", band: 1.0, basis, location, levels: Vec::new() };
        outcome.settled.then_some(figure)
    }

    /// On the finest grid.
    fn ledger(&self) -> HeatLedger {
        let run = &self.runs[self.runs.len() - 1];
        let open = run.heat - run.stored - run.lost;
        let imbalance_relative = if run.heat > 0.0 { open / run.heat } else { 0.0 };
        HeatLedger { heat: run.heat, stored: run.stored, lost: run.lost, imbalance_relative }
    }

    fn fields(&self, operators: &[HeatOperator]) -> Vec<TemperatureField> {
        let (run, operator) = (&self.runs[self.runs.len() - 1], &operators[operators.len() - 1]);
        let field = |moment, description, values: &[f64]| TemperatureField {
            moment,
            description,
            temperature_k: operator.on_nodes(values, self.routine.ambient_k),
        };
        vec![
            field("before_last_stop", "just before the last stop", &run.before_last),
            field("after_last_stop", "right after the last stop, before its heat spreads", &run.after_last),
        ]
    }
}

//! All grid levels with coils at rest, each read at every frequency.

use lenzbore_mesh::Refinement;
use num_complex::Complex64;

use super::across::{self, Line};
use super::groups::{Group, groups};
use super::heat::heat_watt;
use super::level::HarmonicLevel;
use super::{grid, shield};
use crate::band::Ladder;
use crate::corner::corner_powers;
use crate::fault::SolveFault;
use crate::grid_report::grid_report;
use crate::monitor::Monitor;
use crate::outcome::{GridReport, WorkCounters};
use crate::placement::Placement;
use crate::problem::{Alternating, Problem};

/// What is read, and where.
pub(super) struct Places {
    /// Height of the line across the wall, m.
    pub(super) height: f64,
    /// The line's samples in each layer.
    pub(super) lines: Vec<Line>,
    /// Where shielding is taken: radius and height, m.
    pub(super) shield_at: (f64, f64),
    /// The layer whose face is nearest to the coils, by its place in `lines`, and whether that is its inner face.
    pub(super) facing: Option<(usize, bool)>,
}

/// One level at one frequency.
#[derive(Debug, Clone)]
pub(super) struct Reading {
    /// What the wall adds to the impedance, ohm.
    pub(super) change: Complex64,
    /// Its real part from the wall's heat, ohm.
    pub(super) by_heat: f64,
    /// Field with the wall over that without it.
    pub(super) shield: Option<Complex64>,
    /// Current density at the samples of every line, A/m2.
    pub(super) density: Vec<Vec<Complex64>>,
    /// Depth at which it has fallen to 1/e, m.
    pub(super) depth: Option<f64>,
    /// Relative residual of solves and recurrence.
    pub(super) residual: f64,
}

/// Levels from coarse to fine, and the coarsest once more on half the domain.
pub(super) struct Levels<'p> {
    /// With the mover in the wall's frame.
    pub(super) problem: &'p Problem,
    pub(super) law: &'p Alternating,
    pub(super) placement: Placement,
    pub(super) places: Places,
    pub(super) factors: Vec<f64>,
    pub(super) levels: Vec<HarmonicLevel>,
    /// Of each level, at each frequency.
    pub(super) readings: Vec<Vec<Reading>>,
    /// Of the coarsest on half the domain.
    pub(super) cut: Vec<Reading>,
    cut_counters: WorkCounters,
    /// Powers of the cell size at a permeable wall's corners.
    pub(super) corners: Option<Vec<f64>>,
}

impl<'p> Levels<'p> {
    /// Solves `count` levels for the frequencies of `law`.
    ///
    /// # Errors
    /// See [`SolveFault`].
    pub(super) fn new(
        problem: &'p Problem,
        law: &'p Alternating,
        count: usize,
        monitor: &dyn Monitor,
    ) -> Result<Self, SolveFault> {
        let placement = Placement::new(problem);
        let omegas = law.angular_frequencies();
        let highest = omegas.iter().copied().fold(0.0, f64::max);
        let plan = grid::plan(problem, &placement, highest)?;
        let places = Places::new(problem);
        let groups = groups(&omegas);
        let work = Work { problem, law, places: &places, groups: &groups, omegas: &omegas, monitor };
        let refinements = Refinement::first(count);
        let Some((&finest, others)) = refinements.split_last() else {
            return Err(SolveFault::Unsuited("no grid level was asked for"));
        };
        let one = |f: Refinement| work.level(&plan, plan.grid(f));
        // The finest level takes as long as all others: two cores share the work.
        let (last, beside) = std::thread::scope(|scope| {
            let beside = scope.spawn(|| {
                let coarse: Result<Vec<_>, _> = others.iter().map(|&f| one(f)).collect();
                coarse.and_then(|c| Ok((c, work.level(&plan, plan.half_grid(Refinement::COARSEST))?)))
            });
            (one(finest), beside.join())
        });
        let (mut all, (cut_level, cut)) = beside.map_err(|_| SolveFault::NotFinite { what: "a level's thread" })??;
        all.push(last?);
        monitor.progress(0.9, "alternating fields");
        let (levels, readings) = all.into_iter().unzip();
        Ok(Self {
            corners: corner_powers(&problem.wall, count),
            factors: refinements.iter().map(|f| f.factor()).collect(),
            cut_counters: cut_level.counters,
            problem,
            law,
            placement,
            places,
            levels,
            readings,
            cut,
        })
    }

    /// A figure on all levels, extrapolated.
    pub(super) fn ladder(&self, values: Vec<f64>) -> Ladder {
        match &self.corners {
            Some(powers) => Ladder::with_powers(&self.factors, values, powers),
            None => Ladder::new(&self.factors, values),
        }
    }

    /// A figure of the readings at frequency `k`, extrapolated.
    pub(super) fn read(&self, k: usize, of: impl Fn(&Reading) -> f64) -> Ladder {
        self.ladder(self.readings.iter().map(|r| of(&r[k])).collect())
    }

    /// What cutting the domain to half makes of a figure at frequency `k`.
    pub(super) fn cut_change(&self, k: usize, of: impl Fn(&Reading) -> f64) -> f64 {
        of(&self.cut[k]) - self.readings.first().map_or(0.0, |r| of(&r[k]))
    }

    /// Largest residual at frequency `k`, relative.
    pub(super) fn residual(&self, k: usize) -> f64 {
        self.readings.iter().map(|r| r[k].residual).fold(0.0, f64::max)
    }

    /// Ohm for each unit of what [`HarmonicLevel::linked`] gives, at angular frequency `omega`.
    pub(super) fn ohm(&self, omega: f64) -> Complex64 {
        ohm(self.law, omega)
    }

    pub(super) fn reports(&self, speed: f64) -> Vec<GridReport> {
        let mut reports = Vec::with_capacity(self.levels.len());
        for (level, &factor) in self.levels.iter().zip(&self.factors) {
            let mut report = grid_report(self.problem, &self.placement, &level.operators.grid, factor, speed);
            report.residual = level.residual;
            reports.push(report);
        }
        reports
    }

    pub(super) fn counters(&self) -> WorkCounters {
        let mut sum = self.cut_counters;
        for level in &self.levels {
            sum.factorisations += level.counters.factorisations;
            sum.solves += level.counters.solves;
            sum.recurrence += level.counters.recurrence;
        }
        sum
    }
}

fn ohm(law: &Alternating, omega: f64) -> Complex64 {
    Complex64::new(0.0, 2.0 * std::f64::consts::PI * omega / (law.current_ampere * law.current_ampere))
}

/// What is the same for all levels.
struct Work<'w> {
    problem: &'w Problem,
    law: &'w Alternating,
    places: &'w Places,
    groups: &'w [Group],
    omegas: &'w [f64],
    monitor: &'w dyn Monitor,
}

impl Work<'_> {
    /// A level and what is read of it at every frequency.
    fn level(
        &self,
        plan: &crate::grid_rules::GridPlan,
        grid: lenzbore_mesh::Grid,
    ) -> Result<(HarmonicLevel, Vec<Reading>), SolveFault> {
        let mut level = HarmonicLevel::new(self.problem, plan, grid, self.groups, self.monitor)?;
        let readings: Result<Vec<_>, _> = self.omegas.iter().map(|&omega| self.read(&mut level, omega)).collect();
        Ok((level, readings?))
    }

    fn read(&self, level: &mut HarmonicLevel, omega: f64) -> Result<Reading, SolveFault> {
        if self.monitor.cancelled() {
            return Err(SolveFault::Interrupted);
        }
        let reaction = level.reaction(omega);
        let field = level.spread(&reaction)?;
        let current = self.law.current_ampere;
        let operators = &level.operators;
        let density: Vec<Vec<Complex64>> = self
            .places
            .lines
            .iter()
            .map(|line| across::current_density(operators, &reaction, (self.problem, line), self.places.height))
            .collect();
        let facing = self.places.facing;
        let reading = Reading {
            change: ohm(self.law, omega) * level.linked(&reaction),
            by_heat: 2.0 * heat_watt(operators, &reaction) / (current * current),
            shield: shield::ratio(&operators.grid, &field, &self.problem.mover, self.places.shield_at),
            depth: facing.and_then(|(k, inner)| across::depth_of_fall(&self.places.lines[k], &density[k], inner)),
            density,
            residual: level.residual.max(level.left(omega)),
        };
        if reading.change.is_finite() && reading.by_heat.is_finite() {
            Ok(reading)
        } else {
            Err(SolveFault::NotFinite { what: "the impedance of the coils" })
        }
    }
}

impl Places {
    /// The height is that of the first coil's middle, or the wall's end next to it.
    fn new(problem: &Problem) -> Self {
        let middle = problem.mover.parts.first().map_or(0.0, |p| p.centre_m);
        let height = problem.wall.length_m().map_or(middle, |length| middle.clamp(0.0, length));
        let lines = across::lines(problem, height);
        Self { height, shield_at: shield::place(problem, middle), facing: facing(problem, &lines), lines }
    }
}

/// The face of a line nearest to a coil.
fn facing(problem: &Problem, lines: &[Line]) -> Option<(usize, bool)> {
    let mut best: Option<(f64, usize, bool)> = None;
    for (k, line) in lines.iter().enumerate() {
        let layer = &problem.wall.layers[line.layer];
        for part in &problem.mover.parts {
            let (inner, outer, _) = crate::placement::source_sizes(&part.source);
            let from_inside = layer.inner_radius_m >= outer;
            let gap = if from_inside { layer.inner_radius_m - outer } else { inner - layer.outer_radius_m };
            if best.is_none_or(|b| gap < b.0) {
                best = Some((gap, k, from_inside));
            }
        }
    }
    best.map(|(_, k, from_inside)| (k, from_inside))
}

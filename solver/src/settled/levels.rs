//! All grid levels of one settled problem, and the figures that they extrapolate to.

use lenzbore_mesh::Refinement;

use super::level::{LevelDrag, SettledLevel, Wanted};
use crate::band::{self, Ladder};
use crate::fault::SolveFault;
use crate::grid_report::grid_report;
use crate::grid_rules::{Frame, GridPlan};
use crate::monitor::Monitor;
use crate::outcome::{Basis, Figure, GridReport, WorkCounters};
use crate::placement::Placement;
use crate::problem::Problem;

/// All levels of one settled problem, with the coarsest once more on half the domain.
pub(super) struct Levels<'p> {
    pub(super) problem: &'p Problem,
    pub(super) placement: Placement,
    plan: GridPlan,
    pub(super) factors: Vec<f64>,
    pub(super) levels: Vec<SettledLevel>,
    pub(super) cut: SettledLevel,
    pub(super) velocity: f64,
    pub(super) monitor: &'p dyn Monitor,
}

impl<'p> Levels<'p> {
    pub(super) fn new(problem: &'p Problem, wanted: Wanted<'p>, count: usize) -> Result<Self, SolveFault> {
        let placement = Placement::new(problem);
        let Wanted { velocity, monitor, .. } = wanted;
        let plan = plan(problem, &placement, velocity)?;
        let refinements = Refinement::first(count);
        let level = |refinement: Refinement| SettledLevel::new(problem, &plan, plan.grid(refinement), wanted);
        let half = || SettledLevel::new(problem, &plan, plan.half_grid(Refinement::COARSEST), wanted);
        let Some((&finest, others)) = refinements.split_last() else {
            return Err(SolveFault::Unsuited("no grid level was asked for"));
        };
        // The finest level takes as long as all others: two cores share the work.
        let (last, beside) = std::thread::scope(|scope| {
            let beside = scope.spawn(|| {
                let coarse: Result<Vec<_>, _> = others.iter().map(|&f| level(f)).collect();
                coarse.and_then(|c| Ok((c, half()?)))
            });
            let last = level(finest);
            (last, beside.join())
        });
        let (mut levels, cut) = beside.map_err(|_| SolveFault::NotFinite { what: "a level's thread" })??;
        levels.push(last?);
        monitor.progress(0.9, "settled fields");
        let factors = refinements.iter().map(|f| f.factor()).collect();
        Ok(Self { problem, placement, plan, factors, levels, cut, velocity, monitor })
    }

    /// Adds finer levels until there are `count`, for what was `wanted` of the others.
    ///
    /// # Errors
    /// Those of a level.
    pub(super) fn grow(&mut self, wanted: Wanted<'p>, count: usize) -> Result<(), SolveFault> {
        for refinement in Refinement::first(count).into_iter().skip(self.levels.len()) {
            self.levels.push(SettledLevel::new(self.problem, &self.plan, self.plan.grid(refinement), wanted)?);
            self.factors.push(refinement.factor());
        }
        Ok(())
    }

    /// How many times the figures' steps count.
    fn doubt(&self) -> f64 {
        band::near_permeable_wall(self.problem, self.placement.gap_m, self.levels.len())
    }

    pub(super) fn ladder(&self, figure: impl Fn(&SettledLevel) -> f64) -> Ladder {
        Ladder::new(&self.factors, self.levels.iter().map(figure).collect()).doubted(self.doubt())
    }

    /// Relative change by the cut of a figure on the coarsest level, times `value`.
    pub(super) fn cut_change(&self, value: f64, figure: impl Fn(&SettledLevel) -> f64) -> f64 {
        self.levels.first().map_or(0.0, |full| changed(figure(full), figure(&self.cut), value))
    }

    /// Backward error of the back-solves, of a figure of this value.
    pub(super) fn residual(&self, value: f64) -> f64 {
        self.levels.iter().map(SettledLevel::solve_residual).fold(0.0, f64::max) * value.abs()
    }

    /// The drag at `velocity` on all levels.
    ///
    /// # Errors
    /// Those of a level.
    pub(super) fn drag(&self, velocity: f64) -> Result<Ladder, SolveFault> {
        let drags: Result<Vec<f64>, _> = self.levels.iter().map(|l| l.drag(velocity, self.monitor)).collect();
        Ok(Ladder::new(&self.factors, drags?).doubted(self.doubt()))
    }

    pub(super) fn reports(&self, problem: &Problem) -> Vec<GridReport> {
        let mut reports = Vec::with_capacity(self.levels.len());
        for (level, &factor) in self.levels.iter().zip(&self.factors) {
            let mut report = grid_report(problem, &self.placement, &level.operators.grid, factor, self.velocity.abs());
            report.residual = level.solve_residual();
            reports.push(report);
        }
        reports
    }

    pub(super) fn counters(&self) -> WorkCounters {
        let mut sum = WorkCounters::default();
        for level in self.levels.iter().chain([&self.cut]) {
            sum.factorisations += level.counters.factorisations;
            sum.solves += level.counters.solves;
            sum.recurrence += level.counters.recurrence;
        }
        sum
    }

    /// Drag, heat and peak at `velocity` with their bands.
    ///
    /// # Errors
    /// Those of a level.
    pub(super) fn point(&self, velocity: f64) -> Result<Point, SolveFault> {
        let mover = &self.problem.mover;
        let at: Result<Vec<LevelDrag>, _> =
            self.levels.iter().map(|l| l.figures(mover, velocity, self.monitor)).collect();
        let at = at?;
        let doubt = self.doubt();
        let ladder = |f: fn(&LevelDrag) -> f64| Ladder::new(&self.factors, at.iter().map(f).collect()).doubted(doubt);
        let (drag, heat, peak) = (ladder(|d| d.drag), ladder(|d| d.drag_by_heat), ladder(|d| d.peak));
        let coarsest = drag.levels.first().copied().unwrap_or(0.0);
        let cut = changed(coarsest, self.cut.drag(velocity, self.monitor)?, drag.value);
        // Backward error of the solves and the rest of the recurrence, taken in full.
        let worst = at.iter().map(|d| d.residual).fold(0.0, f64::max);
        let drag_band = band::two_routes(&drag, &heat, cut, worst * drag.value.abs());
        let peak_cut = if drag.value.abs() > 0.0 { cut / drag.value * peak.value } else { 0.0 };
        let peak_band = band::local(&peak, peak_cut, worst * peak.value.abs());
        let peak_at = at.last().map_or((0.0, 0.0), |d| d.peak_at);
        Ok(Point { drag, heat, peak, drag_band, peak_band, peak_at })
    }
}

/// The relative change from `full` to `cut`, times `value`.
fn changed(full: f64, cut: f64, value: f64) -> f64 {
    if full.abs() > 0.0 { (cut - full) / full * value } else { 0.0 }
}

/// The grids for settled fields at up to |`velocity`|.
///
/// # Errors
/// A line that cannot be built.
pub(crate) fn plan(problem: &Problem, placement: &Placement, velocity: f64) -> Result<GridPlan, SolveFault> {
    Ok(GridPlan::new(problem, placement, Frame::Mover { velocity })?)
}

/// Drag by two routes and peak current density at one speed, with bands.
pub(super) struct Point {
    pub(super) drag: Ladder,
    pub(super) heat: Ladder,
    pub(super) peak: Ladder,
    pub(super) drag_band: f64,
    pub(super) peak_band: f64,
    pub(super) peak_at: (f64, f64),
}

/// The zero-speed damping coefficient under `name`.
pub(super) fn damping_at_rest(levels: &Levels<'_>, name: &str) -> Figure {
    let ladder = levels.ladder(SettledLevel::damping_coefficient);
    let cut = levels.cut_change(ladder.value, SettledLevel::damping_coefficient);
    plain(name, "N s/m", &ladder, band::one_route(&ladder, cut, levels.residual(ladder.value)))
}

/// A figure without place.
pub(super) fn plain(name: &str, unit: &'static str, ladder: &Ladder, band: f64) -> Figure {
    Figure {
        name: name.to_owned(),
        value: ladder.value,
        unit,
        band,
        basis: Basis::Extrapolated,
        location: None,
        levels: ladder.levels.clone(),
    }
}

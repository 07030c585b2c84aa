//! Levels to figures: a single speed, or a whole drag-speed curve.

use lenzbore_mesh::Refinement;

use super::level::{LevelDrag, SettledLevel};
use crate::band::{self, Ladder};
use crate::fault::SolveFault;
use crate::fields::{empty_fields, snapshot};
use crate::force::{by_stress, on_mover};
use crate::grid_report::grid_report;
use crate::grid_rules::{Frame, GridPlan};
use crate::interpolate::greatest;
use crate::monitor::Monitor;
use crate::outcome::{
    Basis, Caution, DragCurve, DragPoint, Fields, Figure, Forces, GridReport, Ledger, Location, Outcome, Stop, Trace,
    WorkCounters,
};
use crate::placement::Placement;
use crate::problem::{Problem, SnapshotPlan};
use crate::regime::regime;
use crate::target::{MOST_LEVELS, levels_wanted, may_add_level, verdict};

/// How closely the critical speed is searched, relative.
const SEARCH: f64 = 1.0e-7;

/// All levels of one settled problem, with the coarsest once more on half the domain.
struct Levels<'p> {
    problem: &'p Problem,
    placement: Placement,
    factors: Vec<f64>,
    levels: Vec<SettledLevel>,
    cut: SettledLevel,
    velocity: f64,
}

impl<'p> Levels<'p> {
    fn new(problem: &'p Problem, velocity: f64, count: usize, monitor: &dyn Monitor) -> Result<Self, SolveFault> {
        let placement = Placement::new(problem);
        let plan = plan(problem, &placement, velocity)?;
        let refinements = Refinement::first(count);
        let level = |refinement: Refinement| SettledLevel::new(problem, &plan, plan.grid(refinement), velocity, monitor);
        let half = || SettledLevel::new(problem, &plan, plan.half_grid(Refinement::COARSEST), velocity, monitor);
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
        Ok(Self { problem, placement, factors, levels, cut, velocity })
    }

    fn ladder(&self, figure: impl Fn(&SettledLevel) -> f64) -> Ladder {
        Ladder::new(&self.factors, self.levels.iter().map(figure).collect())
    }

    /// Relative change by the cut of a figure on the coarsest level, times `value`.
    fn cut_change(&self, value: f64, figure: impl Fn(&SettledLevel) -> f64) -> f64 {
        self.levels.first().map_or(0.0, |full| {
            let (full, cut) = (figure(full), figure(&self.cut));
            if full.abs() > 0.0 { (cut - full) / full * value } else { 0.0 }
        })
    }

    fn residual(&self, value: f64) -> f64 {
        // Backward error of the back-solves and the rest of the recurrence, taken in full.
        let worst = self.levels.iter().map(|l| l.residual + l.recurrence.residual(self.velocity)).fold(0.0, f64::max);
        worst * value.abs()
    }

    fn reports(&self, problem: &Problem) -> Vec<GridReport> {
        let mut reports = Vec::with_capacity(self.levels.len());
        for (level, &factor) in self.levels.iter().zip(&self.factors) {
            let mut report =
                grid_report(problem, &self.placement, &level.operators.grid, factor, self.velocity.abs());
            report.residual = level.residual;
            reports.push(report);
        }
        reports
    }

    fn counters(&self) -> WorkCounters {
        let mut sum = WorkCounters::default();
        for level in self.levels.iter().chain([&self.cut]) {
            sum.factorisations += level.counters.factorisations;
            sum.solves += level.counters.solves;
            sum.recurrence += level.counters.recurrence;
        }
        sum
    }

    /// Drag, heat and peak at `velocity` with their bands.
    fn point(&self, velocity: f64) -> Point {
        let at: Vec<LevelDrag> = self.levels.iter().map(|l| l.figures(&self.problem.mover, velocity)).collect();
        let ladder = |f: fn(&LevelDrag) -> f64| Ladder::new(&self.factors, at.iter().map(f).collect());
        let (drag, heat, peak) = (ladder(|d| d.drag), ladder(|d| d.drag_by_heat), ladder(|d| d.peak));
        let cut = self.cut_change(drag.value, |l| l.drag(velocity));
        let residual = self.residual(drag.value);
        let drag_band = band::two_routes(&drag, &heat, cut, residual);
        let peak_cut = if drag.value.abs() > 0.0 { cut / drag.value * peak.value } else { 0.0 };
        let peak_band = band::local(&peak, peak_cut, self.residual(peak.value));
        let peak_at = at.last().map_or((0.0, 0.0), |d| d.peak_at);
        Point { drag, heat, peak, drag_band, peak_band, peak_at }
    }
}

/// The grids for settled fields at up to |`velocity`|.
///
/// # Errors
/// A line that cannot be built.
pub(crate) fn plan(problem: &Problem, placement: &Placement, velocity: f64) -> Result<GridPlan, SolveFault> {
    Ok(GridPlan::new(problem, placement, Frame::Mover { velocity })?)
}

struct Point {
    drag: Ladder,
    heat: Ladder,
    peak: Ladder,
    drag_band: f64,
    peak_band: f64,
    peak_at: (f64, f64),
}

/// Settled fields at one velocity.
///
/// # Errors
/// See [`SolveFault`].
pub(crate) fn steady(problem: &Problem, velocity: f64, monitor: &dyn Monitor) -> Result<Outcome, SolveFault> {
    let mut count = levels_wanted(&problem.accuracy);
    loop {
        let outcome = steady_on(problem, velocity, count, monitor)?;
        if outcome.accuracy.met || !may_add_level(&problem.accuracy, count, MOST_LEVELS) {
            return Ok(outcome);
        }
        count += 1;
    }
}

fn steady_on(problem: &Problem, velocity: f64, count: usize, monitor: &dyn Monitor) -> Result<Outcome, SolveFault> {
    let mut levels = Levels::new(problem, velocity, count, monitor)?;
    let speed = velocity.abs();
    let (figures, forces, ledger, fields) = if speed > 0.0 {
        let point = levels.point(velocity);
        let forces = three_forces(problem, &mut levels, velocity, &point)?;
        let fields = wanted_fields(problem, &mut levels, velocity)?;
        let power = point.heat.value * velocity;
        let ledger = Ledger {
            work: point.drag.value * velocity,
            heat: power,
            field_energy: 0.0,
            imbalance_relative: (point.drag.value - point.heat.value) / point.drag.value,
            unit: "W",
        };
        (moving_figures(&point, velocity), Some(forces), Some(ledger), fields)
    } else {
        (resting_figures(&levels), None, None, None)
    };
    let accuracy = verdict(&figures, problem.accuracy.target_relative, count);
    monitor.progress(1.0, "settled fields");
    Ok(Outcome {
        regime: regime(problem, &levels.placement, speed),
        grids: levels.reports(problem),
        counters: levels.counters(),
        cautions: cautions(problem),
        stop: Stop::Settled,
        accuracy,
        trace: Trace::default(),
        curve: None,
        figures,
        forces,
        ledger,
        fields,
    })
}

fn moving_figures(point: &Point, velocity: f64) -> Vec<Figure> {
    let sign = velocity.signum();
    let scaled = |name: &str, ladder: &Ladder, unit, factor: f64, band: f64| Figure {
        name: name.to_owned(),
        value: factor * ladder.value,
        unit,
        band: factor.abs() * band,
        basis: Basis::Extrapolated,
        location: None,
        levels: ladder.levels.iter().map(|v| factor * v).collect(),
    };
    let mut peak = scaled("current_density_peak", &point.peak, "A/m2", 1.0, point.peak_band);
    peak.location = Some(Location { r_m: Some(point.peak_at.0), z_m: Some(point.peak_at.1), t_s: None });
    vec![
        scaled("drag", &point.drag, "N", sign, point.drag_band),
        scaled("damping_coefficient", &point.drag, "N s/m", 1.0 / velocity, point.drag_band),
        scaled("dissipated_power", &point.heat, "W", velocity, point.drag_band),
        peak,
    ]
}

fn resting_figures(levels: &Levels<'_>) -> Vec<Figure> {
    let zero = |name: &str, unit| Figure {
        name: name.to_owned(),
        value: 0.0,
        unit,
        band: 0.0,
        basis: Basis::ClosedForm,
        location: None,
        levels: vec![0.0; levels.levels.len()],
    };
    vec![
        zero("drag", "N"),
        damping_at_rest(levels, "damping_coefficient"),
        zero("dissipated_power", "W"),
        zero("current_density_peak", "A/m2"),
    ]
}

fn damping_at_rest(levels: &Levels<'_>, name: &str) -> Figure {
    let ladder = levels.ladder(SettledLevel::damping_coefficient);
    let cut = levels.cut_change(ladder.value, SettledLevel::damping_coefficient);
    plain(name, "N s/m", &ladder, band::one_route(&ladder, cut, levels.residual(ladder.value)))
}

fn plain(name: &str, unit: &'static str, ladder: &Ladder, band: f64) -> Figure {
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

/// The three routes, extrapolated, with the band within which they must agree.
fn three_forces(problem: &Problem, levels: &mut Levels<'_>, velocity: f64, point: &Point) -> Result<Forces, SolveFault> {
    let sign = -velocity.signum();
    let (mut on_mover_levels, mut stress_levels) = (Vec::new(), Vec::new());
    for level in &mut levels.levels {
        let (psi, _, _) = level.reaction(velocity)?;
        let grid = &level.operators.grid;
        on_mover_levels.push(sign * on_mover(grid, &psi, &problem.mover, 0.0, levels.placement.gap_m));
        stress_levels.push(sign * by_stress(grid, &psi, problem, &levels.placement, 0.0));
    }
    let (mover, stress) = (Ladder::new(&levels.factors, on_mover_levels), Ladder::new(&levels.factors, stress_levels));
    let wall_newton = velocity.signum() * point.drag.value;
    let (mover_newton, stress_newton) = (mover.value, stress.value);
    let band_newton = point.drag_band + band::one_route(&mover, 0.0, 0.0).max(band::one_route(&stress, 0.0, 0.0));
    let apart = (mover_newton - wall_newton).abs().max((stress_newton - wall_newton).abs());
    Ok(Forces { wall_newton, mover_newton, stress_newton, band_newton, agree: apart <= band_newton, time_s: 0.0 })
}

fn wanted_fields(problem: &Problem, levels: &mut Levels<'_>, velocity: f64) -> Result<Option<Fields>, SolveFault> {
    if problem.snapshots == SnapshotPlan::None {
        return Ok(None);
    }
    let Some(finest) = levels.levels.last_mut() else { return Ok(None) };
    let (mut psi, currents, _) = finest.reaction(velocity)?;
    if let Some(fixed) = &finest.static_reaction {
        psi.iter_mut().zip(fixed).for_each(|(p, s)| *p += s);
    }
    let operators = &finest.operators;
    let mut fields = empty_fields(&operators.grid, &operators.materials, &problem.wall);
    fields.snapshots.push(snapshot(operators, problem, &psi, &currents, 0.0, 0.0));
    Ok(Some(fields))
}

fn cautions(problem: &Problem) -> Vec<Caution> {
    let mut cautions = Vec::new();
    if problem.wall.is_permeable() {
        cautions.push(Caution {
            text: "Permeability is taken as linear: a steel near saturation behaves otherwise.".to_owned(),
        });
    }
    cautions
}

/// Drag against speed.
///
/// # Errors
/// See [`SolveFault`].
pub(crate) fn curve(problem: &Problem, speeds: &[f64], monitor: &dyn Monitor) -> Result<Outcome, SolveFault> {
    let mut count = levels_wanted(&problem.accuracy);
    loop {
        let outcome = curve_on(problem, speeds, count, monitor)?;
        if outcome.accuracy.met || !may_add_level(&problem.accuracy, count, MOST_LEVELS) {
            return Ok(outcome);
        }
        count += 1;
    }
}

fn curve_on(problem: &Problem, speeds: &[f64], count: usize, monitor: &dyn Monitor) -> Result<Outcome, SolveFault> {
    let fastest = speeds.iter().copied().fold(0.0, f64::max);
    let mut levels = Levels::new(problem, fastest, count, monitor)?;
    let mut points = Vec::with_capacity(speeds.len());
    for &speed in speeds {
        points.push(curve_point(&levels, speed));
    }
    let mut cautions = cautions(problem);
    let mut figures = vec![damping_at_rest(&levels, "damping_coefficient_zero_speed")];
    figures.push(lag_time(&levels));
    let mut forces = None;
    if let Some(speed) = critical_speed(&levels, speeds) {
        let at = levels.point(speed);
        figures.insert(1, critical_figure(&levels, speed, &at));
        figures.insert(2, plain("drag_max", "N", &at.drag, at.drag_band));
        forces = Some(three_forces(problem, &mut levels, speed, &at)?);
    } else {
        cautions.push(Caution {
            text: "The greatest drag does not lie inside the range of speeds: critical_speed and drag_max are left out."
                .to_owned(),
        });
    }
    let accuracy = verdict(&figures, problem.accuracy.target_relative, count);
    monitor.progress(1.0, "drag against speed");
    Ok(Outcome {
        regime: regime(problem, &levels.placement, fastest),
        grids: levels.reports(problem),
        counters: levels.counters(),
        cautions,
        stop: Stop::Settled,
        accuracy,
        trace: Trace::default(),
        curve: Some(DragCurve { points }),
        figures,
        forces,
        ledger: None,
        fields: None,
    })
}

fn curve_point(levels: &Levels<'_>, speed: f64) -> DragPoint {
    if speed <= 0.0 {
        return DragPoint {
            speed_m_per_s: 0.0,
            drag_newton: 0.0,
            band_newton: 0.0,
            heat_watt: 0.0,
            current_density_peak: 0.0,
            current_density_band: 0.0,
        };
    }
    let point = levels.point(speed);
    DragPoint {
        speed_m_per_s: speed,
        drag_newton: point.drag.value,
        band_newton: point.drag_band,
        heat_watt: point.heat.value * speed,
        current_density_peak: point.peak.value,
        current_density_band: point.peak_band,
    }
}

/// tau in drag ~ c (v - tau dv/dt) at low speed, s.
fn lag_time(levels: &Levels<'_>) -> Figure {
    let of = |l: &SettledLevel| l.lag_product() / l.damping_coefficient();
    let ladder = levels.ladder(of);
    let cut = levels.cut_change(ladder.value, of);
    plain("lag_time", "s", &ladder, band::one_route(&ladder, cut, levels.residual(ladder.value)))
}

/// Speed of the greatest extrapolated drag, where it lies inside the range: golden section on the small problems.
fn critical_speed(levels: &Levels<'_>, speeds: &[f64]) -> Option<f64> {
    let mut sorted: Vec<f64> = speeds.iter().copied().filter(|&v| v > 0.0).collect();
    sorted.sort_by(f64::total_cmp);
    let drag = |v: f64| levels.ladder(|l| l.drag(v)).value;
    let best = (0..sorted.len()).max_by(|&a, &b| drag(sorted[a]).total_cmp(&drag(sorted[b])))?;
    if best + 1 == sorted.len() {
        return None;
    }
    let low = if best > 0 { sorted[best - 1] } else { 0.0 };
    let high = sorted[best + 1];
    Some(greatest(drag, low, high, SEARCH * high))
}

/// The critical speed, with the band that the levels' own maxima leave.
fn critical_figure(levels: &Levels<'_>, speed: f64, at: &Point) -> Figure {
    let (low, high) = (0.5 * speed, 1.5 * speed);
    let ladder = levels.ladder(|l| greatest(|v| l.drag(v), low, high, SEARCH * high));
    // Near the maximum drag ~ drag_max (1 - ((v - vc) / s)^2): a change of the drag's slope moves the place.
    let search = SEARCH * speed;
    let relative = at.drag_band / at.drag.value.abs();
    Figure { value: speed, ..plain("critical_speed", "m/s", &ladder, band::one_route(&ladder, 0.0, 0.0) + search + 2.0 * relative * speed) }
}

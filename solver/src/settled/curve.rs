//! Drag against speed: every speed from the same recurrence.

use std::cell::RefCell;

use super::balance::{cautions, three_forces};
use super::level::{SettledLevel, Wanted};
use super::levels::{Levels, Point, damping_at_rest, plain};
use crate::band::{self, Ladder};
use crate::fault::SolveFault;
use crate::interpolate::greatest;
use crate::monitor::Monitor;
use crate::outcome::{Caution, DragCurve, DragPoint, Figure, Outcome, Stop, Sweeps, Trace};
use crate::problem::Problem;
use crate::regime::regime;
use crate::target::{MOST_LEVELS, levels_wanted, refine, verdict};

/// How closely the critical speed is searched, relative.
const SEARCH: f64 = 1.0e-7;

/// Drag against speed.
///
/// # Errors
/// See [`SolveFault`].
pub(crate) fn curve(problem: &Problem, speeds: &[f64], monitor: &dyn Monitor) -> Result<Outcome, SolveFault> {
    let fastest = speeds.iter().copied().fold(0.0, f64::max);
    let wanted = Wanted { velocity: fastest, speeds, monitor };
    let mut levels = Levels::new(problem, wanted, levels_wanted(&problem.accuracy))?;
    refine(&problem.accuracy, MOST_LEVELS, |count| {
        levels.grow(wanted, count)?;
        curve_on(problem, speeds, &mut levels)
    })
}

fn curve_on(problem: &Problem, speeds: &[f64], levels: &mut Levels<'_>) -> Result<Outcome, SolveFault> {
    let fastest = levels.velocity;
    let points = curve_points(levels, speeds)?;
    let mut cautions = cautions(problem);
    let mut figures = vec![damping_at_rest(levels, "damping_coefficient_zero_speed")];
    figures.push(lag_time(levels));
    let mut forces = None;
    if let Some(speed) = critical_speed(levels, &points)? {
        let at = levels.point(speed)?;
        figures.insert(1, critical_figure(levels, speed, &at)?);
        figures.insert(2, plain("drag_max", "N", &at.drag, at.drag_band));
        forces = Some(three_forces(problem, levels, speed, &at)?);
    } else {
        cautions.push(Caution {
            text:
                "The greatest drag does not lie inside the range of speeds: critical_speed and drag_max are left out."
                    .to_owned(),
        });
    }
    let accuracy = verdict(&figures, problem.accuracy.target_relative, levels.levels.len());
    levels.monitor.progress(1.0, "drag against speed");
    Ok(Outcome {
        regime: regime(problem, &levels.placement, fastest),
        grids: levels.reports(problem),
        counters: levels.counters(),
        cautions,
        stop: Stop::Settled,
        accuracy,
        trace: Trace::default(),
        curve: Some(DragCurve { points }),
        frequency: None,
        strokes: None,
        sweeps: Sweeps::default(),
        stations: Vec::new(),
        thermal: None,
        slotted: None,
        figures,
        forces,
        ledger: None,
        fields: None,
    })
}

/// The points, on two cores: every other one, for faster ones may take longer.
fn curve_points(levels: &Levels<'_>, speeds: &[f64]) -> Result<Vec<DragPoint>, SolveFault> {
    let points = |first: usize| -> Result<Vec<DragPoint>, SolveFault> {
        speeds.iter().skip(first).step_by(2).map(|&speed| curve_point(levels, speed)).collect()
    };
    let (even, odd) = std::thread::scope(|scope| {
        let beside = scope.spawn(|| points(1));
        (points(0), beside.join())
    });
    let (even, odd) = (even?, odd.map_err(|_| SolveFault::NotFinite { what: "a level's thread" })??);
    let mut odd = odd.into_iter();
    Ok(even.into_iter().flat_map(|point| std::iter::once(point).chain(odd.next())).collect())
}

fn curve_point(levels: &Levels<'_>, speed: f64) -> Result<DragPoint, SolveFault> {
    if levels.monitor.cancelled() {
        return Err(SolveFault::Interrupted);
    }
    let conducts = levels.problem.wall.layers.iter().any(|l| l.conductivity_s_per_m > 0.0);
    if speed <= 0.0 || !conducts {
        return Ok(DragPoint {
            speed_m_per_s: speed,
            drag_newton: 0.0,
            band_newton: 0.0,
            heat_watt: 0.0,
            current_density_peak: 0.0,
            current_density_band: 0.0,
        });
    }
    let point = levels.point(speed)?;
    Ok(DragPoint {
        speed_m_per_s: speed,
        drag_newton: point.drag.value,
        band_newton: point.drag_band,
        heat_watt: point.heat.value * speed,
        current_density_peak: point.peak.value,
        current_density_band: point.peak_band,
    })
}

/// tau in drag ~ c (v - tau dv/dt) at low speed, s.
fn lag_time(levels: &Levels<'_>) -> Figure {
    let of = |l: &SettledLevel| {
        let damping = l.damping_coefficient();
        if damping > 0.0 { l.lag_product() / damping } else { 0.0 }
    };
    let ladder = levels.ladder(of);
    let cut = levels.cut_change(ladder.value, of);
    plain("lag_time", "s", &ladder, band::one_route(&ladder, cut, levels.residual(ladder.value)))
}

/// Speed of the greatest extrapolated drag, where it lies inside the range: golden section between the points next to the
/// greatest.
fn critical_speed(levels: &Levels<'_>, points: &[DragPoint]) -> Result<Option<f64>, SolveFault> {
    let mut sorted: Vec<&DragPoint> = points.iter().filter(|p| p.speed_m_per_s > 0.0).collect();
    sorted.sort_by(|a, b| a.speed_m_per_s.total_cmp(&b.speed_m_per_s));
    let best = (0..sorted.len()).max_by(|&a, &b| sorted[a].drag_newton.total_cmp(&sorted[b].drag_newton));
    let Some(best) = best.filter(|best| best + 1 < sorted.len()) else { return Ok(None) };
    let low = if best > 0 { sorted[best - 1].speed_m_per_s } else { 0.0 };
    let high = sorted[best + 1].speed_m_per_s;
    greatest_within(|v| Ok(levels.drag(v)?.value), low, high).map(Some)
}

/// Where a drag that may fail is greatest.
fn greatest_within(drag: impl Fn(f64) -> Result<f64, SolveFault>, low: f64, high: f64) -> Result<f64, SolveFault> {
    let fault = RefCell::new(None);
    let value = |v: f64| match drag(v) {
        Ok(drag) => drag,
        Err(error) => {
            fault.borrow_mut().get_or_insert(error);
            f64::NEG_INFINITY
        }
    };
    let at = greatest(value, low, high, SEARCH * high);
    fault.into_inner().map_or(Ok(at), Err)
}

/// The critical speed, with the band that the levels' own maxima leave.
fn critical_figure(levels: &Levels<'_>, speed: f64, at: &Point) -> Result<Figure, SolveFault> {
    let (low, high) = (0.5 * speed, 1.5 * speed);
    let of = |l: &SettledLevel| greatest_within(|v| l.drag(v, levels.monitor), low, high);
    let maxima: Result<Vec<f64>, _> = levels.levels.iter().map(of).collect();
    let ladder = Ladder::new(&levels.factors, maxima?);
    // Near the maximum drag ~ drag_max (1 - ((v - vc) / s)^2): a change of the drag's slope moves the place.
    let search = SEARCH * speed;
    let relative = at.drag_band / at.drag.value.abs();
    let band = band::one_route(&ladder, 0.0, 0.0) + search + 2.0 * relative * speed;
    Ok(Figure { value: speed, ..plain("critical_speed", "m/s", &ladder, band) })
}

//! The figures that one level's series give.

use super::course::{Course, End};
use super::cycles::CycleSums;
use super::series::Series;
use crate::constants::STANDARD_GRAVITY;
use crate::demagnetisation;
use crate::outcome::{Location, Stop};
use crate::placement::Placement;
use crate::problem::{Free, Problem, Sine, Travel};

/// Relative change of speed over a scale length below which the speed counts as terminal.
const TERMINAL_CHANGE: f64 = 1.0e-3;

/// A figure of one level.
#[derive(Debug, Clone, Copy)]
pub(crate) struct LevelFigure {
    pub(crate) name: &'static str,
    pub(crate) unit: &'static str,
    pub(crate) value: f64,
    pub(crate) location: Option<Location>,
}

/// Why and when a run ended.
pub(crate) fn end_of(series: &Series, course: &Course) -> (Stop, f64) {
    let last = series.time.last().copied().unwrap_or(0.0);
    if let Some(t) = series.stopped_at {
        return (Stop::AtRest, t);
    }
    let place = match course.end {
        End::Place(until) => until,
        End::Instant => return (Stop::EndOfTravel, course.time_limit.min(last)),
    };
    match series.crossing(place) {
        Some(t) if t <= course.time_limit * (1.0 + 1.0e-12) => (Stop::EndOfTravel, t),
        _ if (last - course.time_limit).abs() <= 1.0e-9 * last => (Stop::EndOfTravel, last),
        _ if series.lost => (Stop::OutOfReach, last),
        _ => (Stop::TimeLimit, course.time_limit.min(last)),
    }
}

/// Drag at the step middles: the force against the motion, without a permeable wall's static pull, N.
fn drag_mid(series: &Series) -> Vec<f64> {
    let force = series.force_mid.iter().zip(&series.pull_mid);
    force.zip(series.position.windows(2)).map(|((f, pull), z)| -(f - pull) * (z[1] - z[0]).signum()).collect()
}

/// Instant and value of the greatest drag. A motion that turns round may have the wall push it along after the turning, and the greatest
/// force at the turning itself: there it is the greatest force, either way.
pub(crate) fn drag_peak(series: &Series, course: &Course) -> (f64, f64) {
    let drag = match course.end {
        End::Place(_) => drag_mid(series),
        End::Instant => series.force_mid.iter().zip(&series.pull_mid).map(|(f, pull)| (f - pull).abs()).collect(),
    };
    greatest(series, &drag, (course.since, end_of(series, course).1))
}

/// Peaks of the two halves of a cycle that differ by less, relative, are one.
const SAME_PEAK: f64 = 1.0e-6;

/// The greatest of a span; in a stroke's cycle the earlier of two that are as good as equal, or rounding would choose.
fn greatest(series: &Series, values: &[f64], (since, end): (f64, f64)) -> (f64, f64) {
    let all = series.greatest(values, (since, end));
    if since <= 0.0 {
        return all;
    }
    let first = series.greatest(values, (since, 0.5 * (since + end)));
    if first.1 >= (1.0 - SAME_PEAK) * all.1 { first } else { all }
}

/// All figures of a level.
pub(crate) fn level_figures(problem: &Problem, series: &Series, course: &Course) -> Vec<LevelFigure> {
    let end = end_of(series, course).1;
    let mut figures = Vec::new();
    let (t_drag, drag) = drag_peak(series, course);
    let drag = LevelFigure { name: "drag_peak", unit: "N", value: drag, location: Some(at_time(series, t_drag)) };
    let span = (course.since, end);
    let energy = LevelFigure {
        name: "dissipated_energy",
        unit: "J",
        value: series.at(&series.heat, end) + series.mid_at(&series.energy_mid, end) - series.energy_start,
        location: None,
    };
    match &problem.travel {
        Travel::Free(law) => {
            gate_figures(law, series, end, &mut figures);
            terminal(problem, series, &mut figures);
            figures.push(drag);
            acceleration_figures(law, series, end, &mut figures);
            figures.push(energy);
        }
        Travel::Sine(sine) => {
            stroke_figures(problem, sine, series, span, &mut figures);
            figures.push(drag);
        }
        Travel::Traverse(_) | Travel::Table(_) | Travel::Steady { .. } | Travel::Alternating(_) => {
            figures.push(drag);
            figures.push(LevelFigure { name: "impulse", unit: "N s", value: impulse(series, end), location: None });
            figures.push(energy);
        }
    }
    figures.push(current_peak(series, span));
    figures.extend(magnet_figures(series, span).into_iter().flatten());
    if series.pull_mid.iter().any(|p| p.abs() > 0.0) {
        let pull: Vec<f64> = series.pull_mid.iter().map(|p| p.abs()).collect();
        let (t, value) = series.greatest(&pull, span);
        figures.push(LevelFigure { name: "static_pull_peak", unit: "N", value, location: Some(at_time(series, t)) });
    }
    figures
}

/// Integral of the drag over time, N s.
fn impulse(series: &Series, end: f64) -> f64 {
    let steps = series.time.windows(2).zip(drag_mid(series));
    steps.map(|(t, drag)| drag * (t[1].min(end) - t[0].min(end))).sum()
}

/// Figures of the cycle from `from` to `to`, s.
fn stroke_figures(
    problem: &Problem,
    sine: &Sine,
    series: &Series,
    (from, to): (f64, f64),
    figures: &mut Vec<LevelFigure>,
) {
    let sums = CycleSums::new(series, sine, from, to);
    let mut figure = |name, unit, value| figures.push(LevelFigure { name, unit, value, location: None });
    figure("damping_coefficient_equivalent", "N s/m", sums.damping(sine));
    figure("stiffness", "N/m", sums.stiffness);
    if problem.wall.is_permeable() {
        figure("stiffness_static", "N/m", sums.static_stiffness);
    }
    figure("loss_per_cycle", "J", sums.loss);
}

fn gate_figures(law: &Free, series: &Series, end: f64, figures: &mut Vec<LevelFigure>) {
    let passed = |gate: f64| series.crossing(gate).filter(|&t| t <= end * (1.0 + 1.0e-12));
    let (first, second) = (passed(law.gates_m[0]), passed(law.gates_m[1]));
    let mut event = |name, unit, value, t| {
        figures.push(LevelFigure { name, unit, value, location: Some(at_time(series, t)) });
    };
    if let Some(t) = first {
        event("entry_time", "s", t, t);
    }
    if let Some(t) = second {
        event("exit_time", "s", t, t);
        if let Some(entry) = first {
            event("transit_time", "s", t - entry, t);
        }
        event("exit_speed", "m/s", series.velocity_at(t).abs(), t);
    }
}

/// The speed where it hardly changes any more: the whole mover well inside the wall, and as fast a scale length before and after.
fn terminal(problem: &Problem, series: &Series, figures: &mut Vec<LevelFigure>) {
    let length = problem.wall.length_m().unwrap_or(0.0);
    let placement = Placement::new(problem);
    let margin = 2.0 * placement.scale_m;
    let (lowest, highest) = (margin - placement.lowest_m, length - margin - placement.highest_m);
    let speed_at = |t: f64| series.at(&series.velocity, t).abs();
    let change = |k: usize| {
        let t = series.time_mid[k];
        let speed = speed_at(t);
        let while_passing = placement.scale_m / speed;
        let off = |t: f64| (speed_at(t.clamp(0.0, series.time.last().copied().unwrap_or(t))) / speed - 1.0).abs();
        off(t - while_passing).max(off(t + while_passing))
    };
    let inside = (0..series.time_mid.len()).filter(|&k| (lowest..highest).contains(&series.position_mid[k]));
    let steadiest = inside.map(|k| (k, change(k))).min_by(|a, b| a.1.total_cmp(&b.1));
    if let Some((k, _)) = steadiest.filter(|(_, change)| *change < TERMINAL_CHANGE) {
        let t = series.time_mid[k];
        let value = series.velocity_at(t).abs();
        figures.push(LevelFigure { name: "terminal_speed", unit: "m/s", value, location: Some(at_time(series, t)) });
    }
}

fn acceleration_figures(law: &Free, series: &Series, end: f64, figures: &mut Vec<LevelFigure>) {
    let moves = series.position.windows(2).map(|z| sense(z[1] - z[0]));
    let slowing: Vec<f64> = series.acceleration_mid.iter().zip(moves).map(|(a, s)| -a * s).collect();
    let weight = law.gravity_m_per_s2 * law.tilt_rad.cos();
    let felt: Vec<f64> = series.acceleration_mid.iter().map(|a| (a + weight).abs() / STANDARD_GRAVITY).collect();
    for (name, unit, values) in [("deceleration_peak", "m/s2", slowing), ("felt_acceleration_peak", "1", felt)] {
        let (t, value) = series.greatest(&values, (0.0, end));
        // Where nothing decelerates there is no such peak.
        if value > 0.0 {
            figures.push(LevelFigure { name, unit, value, location: Some(at_time(series, t)) });
        }
    }
}

/// -1, 0 or 1.
fn sense(travel: f64) -> f64 {
    if travel.abs() > 0.0 { travel.signum() } else { 0.0 }
}

fn current_peak(series: &Series, span: (f64, f64)) -> LevelFigure {
    let (t, value) = greatest(series, &series.peak_mid, span);
    let k = series.time_mid.partition_point(|&s| s < t).min(series.time_mid.len().saturating_sub(1));
    let read = |values: &[f64]| values.get(k).copied();
    let location = Location { r_m: read(&series.peak_r_mid), z_m: read(&series.peak_z_mid), t_s: Some(t) };
    LevelFigure { name: "current_density_peak", unit: "A/m2", value, location: Some(location) }
}

/// Location of an event at `t`.
fn at_time(series: &Series, t: f64) -> Location {
    Location { r_m: None, z_m: Some(series.at(&series.position, t)), t_s: Some(t) }
}

/// The greatest opposing field in the magnets and what their coercivity leaves, where one is known.
fn magnet_figures(series: &Series, span: (f64, f64)) -> [Option<LevelFigure>; 2] {
    let worst = |name, unit, columns: &[Vec<f64>; 3], taken: fn(f64) -> f64| {
        let [values, r, z] = columns;
        let taken_of: Vec<f64> = values.iter().map(|v| taken(*v)).collect();
        let (t, value) = Some(greatest(series, &taken_of, span)).filter(|_| !values.is_empty())?;
        let k = series.time_mid.partition_point(|&s| s < t).min(series.time_mid.len().saturating_sub(1));
        let location = Location { r_m: r.get(k).copied(), z_m: z.get(k).copied(), t_s: Some(t) };
        Some(LevelFigure { name, unit, value: taken(value), location: Some(location) })
    };
    // The least margin is where the coercivity's share, 1 - margin, is greatest.
    [
        worst(demagnetisation::FIELD, "A/m", &series.opposing_mid, |field| field),
        worst(demagnetisation::MARGIN, "1", &series.margin_mid, |margin| 1.0 - margin),
    ]
}

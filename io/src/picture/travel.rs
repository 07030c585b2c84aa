//! Drag and speed along the travel, against position and against time.

use lenzbore_solver::outcome::{Figure, Outcome, Trace};
use lenzbore_solver::problem::{Problem, Travel};

use super::axes::{Axis, Frame, frame, grid, linear, room_below, room_left, tight};
use super::key::{Swatch, key, title};
use super::letters::width;
use super::paper::{COLUMN, Picture};
use super::ribbon::Banded;
use super::scale::{Scale, significant, with_band};
use super::style::{CURVE, GREY, MARGIN, MARK, ORANGE, SMALL, letters};
use super::svg::{Anchor, Stroke, Svg, Type};
use super::units::Shown;

const PANEL: f64 = 330.0;
const BETWEEN: f64 = 26.0;
/// Colour of the stretch that lies in the wall.
const WALL: &str = "#f0ece4";

/// Draws drag and speed against position and against time, or nothing where the outcome has no series.
#[must_use]
pub fn travel(heading: &str, problem: &Problem, outcome: &Outcome) -> Vec<Picture> {
    if outcome.trace.time_s.len() < 2 {
        return Vec::new();
    }
    let by_time = View::against_time(problem, &outcome.trace).draw("travel_time", heading, outcome);
    if let Travel::Sine(_) = problem.travel {
        // Against position the strokes lie on one another: the force-displacement loop shows the settled one.
        return vec![by_time];
    }
    vec![View::against_position(problem, &outcome.trace).draw("travel_position", heading, outcome), by_time]
}

/// One picture: what runs along its level axis, and what is marked on it.
struct View {
    subtitle: &'static str,
    axis_title: String,
    /// Places along the level axis, in its unit.
    along: Vec<f64>,
    /// Unit of the level axis over SI.
    factor: f64,
    /// Stretches where the reference point is within the wall.
    in_wall: Vec<(f64, f64)>,
    gates: Vec<(f64, &'static str)>,
    by_time: bool,
}

impl View {
    fn against_position(problem: &Problem, trace: &Trace) -> Self {
        let largest = trace.position_m.iter().fold(0.0_f64, |m, z| m.max(z.abs()));
        let unit = Shown::length(largest);
        let along: Vec<f64> = trace.position_m.iter().map(|z| z * unit.factor).collect();
        let (low, high) = range(&along);
        let wall = problem.wall.length_m().map(|length| (low.max(0.0), high.min(length * unit.factor)));
        let gates = gates(problem).into_iter().map(|(z, name)| (z * unit.factor, name));
        Self {
            subtitle: "Drag and speed along the travel",
            axis_title: format!("Position of the reference point, {} {}", unit.unit, sense(trace)),
            gates: gates.filter(|(z, _)| *z >= low && *z <= high).collect(),
            in_wall: wall.filter(|(from, to)| to > from).into_iter().collect(),
            along,
            factor: unit.factor,
            by_time: false,
        }
    }

    fn against_time(problem: &Problem, trace: &Trace) -> Self {
        let unit = Shown::prefixed("s", trace.time_s.last().copied().unwrap_or(0.0));
        let along: Vec<f64> = trace.time_s.iter().map(|t| t * unit.factor).collect();
        let passes = |z: f64| crossings(trace, z).into_iter().map(|t| t * unit.factor);
        let gates = gates(problem).into_iter().flat_map(|(z, name)| passes(z).map(move |t| (t, name))).collect();
        Self {
            subtitle: "Drag and speed against time",
            axis_title: format!("Time from the start, {}", unit.unit),
            in_wall: problem.wall.length_m().map_or_else(Vec::new, |length| stretches(trace, &along, length)),
            gates,
            along,
            factor: unit.factor,
            by_time: true,
        }
    }

    fn draw(&self, name: &'static str, heading: &str, outcome: &Outcome) -> Picture {
        let mut svg = Svg::new(COLUMN);
        let labelled = !self.gates.is_empty() || !self.in_wall.is_empty();
        let top = title(&mut svg, COLUMN, heading, self.subtitle) + if labelled { 34.0 } else { 0.0 };
        let (drag, drag_unit) = self.drag(&outcome.trace);
        let (speed, speed_title) = self.speed(&outcome.trace);
        let lower = top + PANEL + BETWEEN;
        let drag_axis = upright(&drag, format!("Drag, {}", drag_unit.unit), top);
        let speed_axis = upright(&speed, speed_title, lower);
        let left = MARGIN + room_left(&drag_axis).max(room_left(&speed_axis));
        let right = COLUMN - MARGIN - 8.0;
        let (low, high) = range(&self.along);
        let low = if self.by_time && low < 0.02 * high { 0.0 } else { low };
        let x = Axis { scale: tight(low, high, left, right), title: self.axis_title.clone() };
        let upper_frame = Frame { edge: MARGIN, left, right, top, bottom: top + PANEL };
        let lower_frame = Frame { edge: MARGIN, left, right, top: lower, bottom: lower + PANEL };
        for (area, axis, curve) in [(&upper_frame, &drag_axis, &drag), (&lower_frame, &speed_axis, &speed)] {
            self.panel(&mut svg, area, &x, axis, curve);
        }
        self.labels(&mut svg, &upper_frame, &x.scale);
        let peak = self.peak(&mut svg, &x.scale, &drag_axis.scale, &drag, &drag_unit, outcome);
        frame(&mut svg, &upper_frame, &unlabelled(&x), &drag_axis);
        frame(&mut svg, &lower_frame, &x, &speed_axis);
        let entries = self.entries(&drag, &drag_axis.scale, peak);
        let end = key(&mut svg, left, COLUMN - MARGIN, lower_frame.bottom + room_below() + 6.0, &entries);
        Picture { name, svg: svg.finish(end + MARGIN, heading, self.subtitle) }
    }

    fn drag(&self, trace: &Trace) -> (Banded, Shown) {
        let unit = Shown::prefixed("N", trace.drag_newton.iter().fold(0.0, |m, f| m.max(f.abs())));
        let scaled = |values: &[f64]| values.iter().map(|v| v * unit.factor).collect::<Vec<_>>();
        let curve =
            Banded { x: self.along.clone(), y: scaled(&trace.drag_newton), band: scaled(&trace.drag_band_newton) };
        (curve, unit)
    }

    /// Speed where the sense of travel never turns, else the signed velocity.
    fn speed(&self, trace: &Trace) -> (Banded, String) {
        let largest = trace.velocity_m_per_s.iter().fold(0.0_f64, |m, v| m.max(v.abs()));
        let unit = Shown::speed(largest);
        let turns = trace.velocity_m_per_s.iter().any(|v| *v > 1e-6 * largest)
            && trace.velocity_m_per_s.iter().any(|v| *v < -1e-6 * largest);
        let shown = |v: &f64| unit.factor * if turns { *v } else { v.abs() };
        let y: Vec<f64> = trace.velocity_m_per_s.iter().map(shown).collect();
        let word = if turns { "Velocity (up positive)" } else { "Speed" };
        (Banded { x: self.along.clone(), band: vec![0.0; y.len()], y }, format!("{word}, {}", unit.unit))
    }

    fn panel(&self, svg: &mut Svg, area: &Frame, x: &Axis, y: &Axis, curve: &Banded) {
        for (from, to) in &self.in_wall {
            svg.rectangle(x.scale.at(*from), area.top, x.scale.at(*to), area.bottom, WALL, None);
        }
        grid(svg, area, x, y);
        for (place, _) in &self.gates {
            let at = x.scale.at(*place);
            svg.line((at, area.top), (at, area.bottom), MARK);
        }
        curve.draw(svg, &x.scale, &y.scale);
    }

    /// Names of wall and gates above the upper panel; one that would overlap its neighbour is left out.
    fn labels(&self, svg: &mut Svg, area: &Frame, x: &Scale) {
        let mut taken: Vec<(f64, f64)> = Vec::new();
        let wall = self.in_wall.iter().map(|(from, to)| (0.5 * (from + to), "wall"));
        for (place, name) in self.gates.iter().copied().chain(wall) {
            let half = 0.5 * width(name, SMALL, false);
            let at = x.at(place).clamp(area.left + half, area.right - half);
            if taken.iter().any(|(from, to)| at + half + 10.0 > *from && at - half - 10.0 < *to) {
                continue;
            }
            taken.push((at - half, at + half));
            svg.text(at, area.top - 10.0, name, Type { colour: GREY, ..letters(SMALL, Anchor::Middle) });
        }
    }

    /// Rings the greatest drag where the figures say when it was.
    fn peak(
        &self,
        svg: &mut Svg,
        x: &Scale,
        y: &Scale,
        drag: &Banded,
        unit: &Shown,
        outcome: &Outcome,
    ) -> Option<String> {
        let peak = outcome.figures.iter().find(|f| f.name == "drag_peak")?;
        let time = peak.location?.t_s?;
        let along = if self.by_time { time * self.factor } else { interpolated(&outcome.trace.time_s, &drag.x, time)? };
        // A mover that turns round may be pushed along by its greatest force.
        let sense = interpolated(&outcome.trace.time_s, &drag.y, time).map_or(1.0, f64::signum);
        let shown = sense * peak.value * unit.factor;
        if !x.holds(along) || !y.holds(shown) {
            return None;
        }
        let at = (x.at(along), y.at(shown));
        svg.circle(at, 9.0, "#ffffff", Some(Stroke::full(ORANGE, 3.4)));
        Some(self.peak_text(peak, time, if sense < 0.0 { "force, along the motion," } else { "drag" }))
    }

    fn peak_text(&self, peak: &Figure, time: f64, what: &str) -> String {
        let place = peak.location.and_then(|l| l.z_m).filter(|_| !self.by_time);
        let place =
            place.map_or_else(|| format!("{} s", significant(time, 5)), |z| format!("{} mm", significant(1e3 * z, 5)));
        format!("greatest {what} {} N, at {place}", with_band(peak.value, peak.band))
    }

    fn entries(&self, drag: &Banded, scale: &Scale, peak: Option<String>) -> Vec<(Swatch, String)> {
        let swatch = if drag.is_visible(scale) { Swatch::Ribbon(CURVE) } else { Swatch::Line(CURVE) };
        let mut entries = vec![(swatch, format!("drag; {}", drag.remark_on_greatest(scale, "drag")))];
        entries.extend(peak.map(|text| (Swatch::Ring(ORANGE), text)));
        if !self.in_wall.is_empty() {
            entries.push((Swatch::Patch(WALL), "reference point within the length of the wall".to_owned()));
        }
        if !self.gates.is_empty() {
            entries.push((Swatch::Line(MARK), "gates".to_owned()));
        }
        entries
    }
}

fn upright(curve: &Banded, title: String, top: f64) -> Axis {
    let edges = |sign: f64| curve.y.iter().zip(&curve.band).map(move |(y, b)| y + sign * b);
    let low = edges(-1.0).fold(f64::INFINITY, f64::min);
    let high = edges(1.0).fold(f64::NEG_INFINITY, f64::max);
    Axis { scale: linear(low.min(0.0), high, top + PANEL, top), title }
}

/// The same axis with ticks only.
fn unlabelled(axis: &Axis) -> Axis {
    Axis { title: String::new(), ..axis.clone() }
}

fn range(values: &[f64]) -> (f64, f64) {
    values.iter().fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), v| (low.min(*v), high.max(*v)))
}

/// An arrow that says which way the travel runs along a position axis.
fn sense(trace: &Trace) -> &'static str {
    let turns = |sign: f64| trace.velocity_m_per_s.iter().any(|v| v * sign > 0.0);
    match (turns(1.0), turns(-1.0)) {
        (true, false) => "(travel \u{2192})",
        (false, true) => "(travel \u{2190})",
        _ => "",
    }
}

fn gates(problem: &Problem) -> Vec<(f64, &'static str)> {
    match &problem.travel {
        Travel::Free(free) => vec![(free.gates_m[0], "gate 1"), (free.gates_m[1], "gate 2")],
        Travel::Steady { .. } | Travel::Traverse(_) | Travel::Sine(_) | Travel::Table(_) | Travel::Alternating(_) => {
            Vec::new()
        }
    }
}

/// Instants at which the reference point passes `z`.
fn crossings(trace: &Trace, z: f64) -> Vec<f64> {
    let pairs = trace.position_m.windows(2).zip(trace.time_s.windows(2));
    pairs
        .filter(|(p, _)| (p[0] - z) * (p[1] - z) <= 0.0 && (p[1] - p[0]).abs() > 0.0 && (p[0] - z).abs() > 0.0)
        .map(|(p, t)| t[0] + (z - p[0]) / (p[1] - p[0]) * (t[1] - t[0]))
        .collect()
}

/// Stretches of the level axis during which the reference point is within the wall.
fn stretches(trace: &Trace, along: &[f64], length: f64) -> Vec<(f64, f64)> {
    let scale = along.last().copied().unwrap_or(1.0) / trace.time_s.last().copied().unwrap_or(1.0);
    let mut edges: Vec<f64> =
        crossings(trace, 0.0).into_iter().chain(crossings(trace, length)).map(|t| t * scale).collect();
    let inside = |z: Option<&f64>| z.is_some_and(|z| *z > 0.0 && *z < length);
    if inside(trace.position_m.first()) {
        edges.extend(along.first());
    }
    if inside(trace.position_m.last()) {
        edges.extend(along.last());
    }
    edges.sort_by(f64::total_cmp);
    edges.chunks_exact(2).map(|pair| (pair[0], pair[1])).collect()
}

/// Linear interpolation of `y` over increasing `x`.
fn interpolated(x: &[f64], y: &[f64], at: f64) -> Option<f64> {
    let i = x.partition_point(|v| *v < at).clamp(1, x.len().checked_sub(1)?);
    let t = ((at - x[i - 1]) / (x[i] - x[i - 1])).clamp(0.0, 1.0);
    Some(y[i - 1] + t * (y[i] - y[i - 1]))
}

#[cfg(test)]
#[path = "travel_tests.rs"]
mod tests;

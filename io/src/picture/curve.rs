//! Drag against speed, with the band, the greatest drag and the law of low speed.

use lenzbore_solver::outcome::{DragPoint, Figure, Outcome, SlottedPoint};

use super::axes::{Axis, Frame, frame, grid, linear, logarithmic, room_below, room_left, tight};
use super::key::{Swatch, key, title};
use super::paper::{COLUMN, Picture};
use super::ribbon::Banded;
use super::scale::{Kind, Scale, with_band};
use super::smooth::smooth;
use super::style::{CURVE, LAW, MARGIN, MARK, ORANGE};
use super::svg::{Stroke, Svg, polyline};
use super::units::Shown;

const HEIGHT: f64 = 520.0;
/// A range wider than this is shown on a logarithmic axis.
const WIDE: f64 = 40.0;

/// Draws the curve, or nothing where the outcome has none.
#[must_use]
pub fn curve(heading: &str, outcome: &Outcome) -> Option<Picture> {
    let points = &outcome.curve.as_ref()?.points;
    let (first, last) = (points.first()?, points.last()?);
    let drag_unit = Shown::prefixed("N", points.iter().map(|p| p.drag_newton).fold(0.0, f64::max));
    let speed_unit = Shown::speed(last.speed_m_per_s);
    let mut svg = Svg::new(COLUMN);
    let top = title(&mut svg, COLUMN, heading, "Drag against speed, settled fields, endless wall");
    let slotted = outcome.slotted.as_ref().map_or(&[][..], |s| &s.points);
    let y = drag_axis((points, slotted), &drag_unit, top, first.speed_m_per_s > 0.0);
    let area =
        Frame { edge: MARGIN, left: MARGIN + room_left(&y), right: COLUMN - MARGIN - 8.0, top, bottom: top + HEIGHT };
    let x = speed_axis(first.speed_m_per_s, last.speed_m_per_s, &speed_unit, &area);
    let plot = Plot { x, y, area, drag_unit, speed_unit };
    let mut entries = Vec::new();
    grid(&mut svg, &plot.area, &plot.x, &plot.y);
    plot.law(&mut svg, outcome, &mut entries);
    plot.drag(&mut svg, points, &mut entries);
    plot.slotted(&mut svg, slotted, &mut entries);
    plot.greatest(&mut svg, outcome, &mut entries);
    frame(&mut svg, &plot.area, &plot.x, &plot.y);
    let below = plot.area.bottom + room_below() + 6.0;
    let end = key(&mut svg, plot.area.left, COLUMN - MARGIN, below, &entries);
    Some(Picture { name: "drag_speed", svg: svg.finish(end + MARGIN, heading, "Drag against speed") })
}

struct Plot {
    x: Axis,
    y: Axis,
    area: Frame,
    drag_unit: Shown,
    speed_unit: Shown,
}

fn speed_axis(low: f64, high: f64, unit: &Shown, area: &Frame) -> Axis {
    let (low, high) = (low * unit.factor, high * unit.factor);
    let scale = if low > 0.0 && high / low >= WIDE {
        logarithmic(low, high, 1.0, area.left, area.right)
    } else if low > 0.35 * high {
        tight(low, high, area.left, area.right)
    } else {
        tight(0.0, high, area.left, area.right)
    };
    Axis { scale, title: format!("Speed, {}", unit.unit) }
}

/// Logarithmic where speed and drag both run over a wide range.
fn drag_axis(
    (points, slotted): (&[DragPoint], &[SlottedPoint]),
    unit: &Shown,
    top: f64,
    speeds_positive: bool,
) -> Axis {
    let values = || {
        let all = points.iter().map(|p| p.drag_newton).chain(slotted.iter().map(|p| p.drag_newton - p.band_newton));
        all.map(|drag| drag * unit.factor)
    };
    let (low, high) = (values().fold(f64::INFINITY, f64::min), values().fold(0.0, f64::max));
    let speeds = || points.iter().map(|p| p.speed_m_per_s);
    let wide = speeds_positive && speeds().fold(0.0, f64::max) / speeds().fold(f64::INFINITY, f64::min) >= WIDE;
    let (start, end) = (top + HEIGHT, top);
    let scale = if wide && low > 0.0 && high / low >= WIDE {
        logarithmic(low, high, 1.6, start, end)
    } else {
        linear(low.min(0.0), high, start, end)
    };
    Axis { scale, title: format!("Drag, {}", unit.unit) }
}

impl Plot {
    /// The dashed line drag = c0 speed, from the edge of the plot to where it leaves it.
    fn law(&self, svg: &mut Svg, outcome: &Outcome, entries: &mut Vec<(Swatch, String)>) {
        let Some(c0) = figure(outcome, "damping_coefficient_zero_speed") else { return };
        let slope = c0.value * self.drag_unit.factor / self.speed_unit.factor;
        if slope <= 0.0 {
            return;
        }
        let (x, y) = (&self.x.scale, &self.y.scale);
        let from = x.low.max(if y.kind == Kind::Log { y.low / slope } else { 0.0 });
        let to = x.high.min(y.high / slope);
        let places = 60;
        let between = |i: i32| match x.kind {
            Kind::Log => from * (to / from).powf(f64::from(i) / f64::from(places)),
            Kind::Linear => from + (to - from) * f64::from(i) / f64::from(places),
        };
        if to > from {
            let line: Vec<(f64, f64)> = (0..=places).map(between).map(|v| (x.at(v), y.at(slope * v))).collect();
            svg.path(&polyline(&super::simplify::simplified(&line, 0.2)), LAW);
            let text = format!("low-speed law: {} N s/m × speed", with_band(c0.value, c0.band));
            entries.push((Swatch::Line(LAW), text));
        }
    }

    /// The curve through the points that were computed, and dots on these.
    fn drag(&self, svg: &mut Svg, points: &[DragPoint], entries: &mut Vec<(Swatch, String)>) {
        let on_axis = |p: &&DragPoint| self.x.scale.kind == Kind::Linear || p.speed_m_per_s > 0.0;
        let points: Vec<&DragPoint> = points.iter().filter(on_axis).collect();
        let banded = Banded {
            x: points.iter().map(|p| p.speed_m_per_s * self.speed_unit.factor).collect(),
            y: points.iter().map(|p| p.drag_newton * self.drag_unit.factor).collect(),
            band: points.iter().map(|p| p.band_newton * self.drag_unit.factor).collect(),
        };
        smooth(&banded, &self.x.scale, &self.y.scale).draw(svg, &self.x.scale, &self.y.scale);
        if points.len() <= 80 {
            for (speed, drag) in banded.x.iter().zip(&banded.y) {
                svg.circle((self.x.scale.at(*speed), self.y.scale.at(*drag)), 4.4, CURVE.colour, None);
            }
        }
        let visible = banded.is_visible(&self.y.scale);
        let line = if visible { Swatch::Ribbon(CURVE) } else { Swatch::Line(CURVE) };
        let dots = if points.len() <= 80 { " (dots: computed speeds)" } else { "" };
        entries.insert(0, (line, format!("drag{dots}; {}", banded.remark_on_each(&self.y.scale))));
    }

    /// The drag with slots, between the edges of its model band.
    fn slotted(&self, svg: &mut Svg, points: &[SlottedPoint], entries: &mut Vec<(Swatch, String)>) {
        if points.is_empty() {
            return;
        }
        let middle = Stroke::dashed(ORANGE, CURVE.width, "20 8");
        let edge = Stroke::full(ORANGE, 1.6);
        for (part, stroke) in [(-1.0, edge), (1.0, edge), (0.0, middle)] {
            let at = |p: &SlottedPoint| {
                let drag = (p.drag_newton + part * p.band_newton) * self.drag_unit.factor;
                let place = (p.speed_m_per_s * self.speed_unit.factor, drag);
                holds(&self.y.scale, place.1).then(|| (self.x.scale.at(place.0), self.y.scale.at(place.1)))
            };
            let line: Vec<(f64, f64)> = points.iter().filter_map(at).collect();
            svg.path(&polyline(&line), stroke);
        }
        entries.push((
            Swatch::Line(middle),
            "with slots: an approximation, between the edges of its model band".to_owned(),
        ));
    }

    /// Rings the greatest drag and drops a line to its speed.
    fn greatest(&self, svg: &mut Svg, outcome: &Outcome, entries: &mut Vec<(Swatch, String)>) {
        let (Some(most), Some(speed)) = (figure(outcome, "drag_max"), figure(outcome, "critical_speed")) else {
            return;
        };
        let (v, f) = (speed.value * self.speed_unit.factor, most.value * self.drag_unit.factor);
        if !self.x.scale.holds(v) || !holds(&self.y.scale, f) {
            return;
        }
        let at = (self.x.scale.at(v), self.y.scale.at(f));
        svg.line((at.0, self.area.bottom), at, MARK);
        svg.line((self.area.left, at.1), at, MARK);
        svg.circle(at, 9.0, "#ffffff", Some(Stroke::full(ORANGE, 3.4)));
        let text = format!(
            "greatest drag {} N at critical speed {} m/s",
            with_band(most.value, most.band),
            with_band(speed.value, speed.band)
        );
        entries.push((Swatch::Ring(ORANGE), text));
    }
}

fn holds(scale: &Scale, value: f64) -> bool {
    value > 0.0 && scale.holds(value)
}

fn figure<'a>(outcome: &'a Outcome, name: &str) -> Option<&'a Figure> {
    outcome.figures.iter().find(|f| f.name == name)
}

#[cfg(test)]
#[path = "curve_tests.rs"]
mod tests;

//! Several curves over one axis, each in its colour, with its numerical band where that is wider than its line.

use super::axes::{Axis, Frame, frame, grid, room_below, room_left};
use super::key::{Swatch, key, title};
use super::paper::{COLUMN, Picture};
use super::ribbon::Banded;
use super::scale::Scale;
use super::simplify::simplified;
use super::smooth::smooth;
use super::style::{MARGIN, MARK};
use super::svg::{Stroke, Svg, polygon, polyline};

/// Height of the plot.
pub(super) const HEIGHT: f64 = 520.0;
/// Colours from cold to hot, apart for the colour-blind and in grey too.
const COLOURS: [&str; 6] = ["#1f5a96", "#3f93c4", "#6a9a5b", "#c98a1b", "#b5500c", "#6e1423"];
const WIDTH: f64 = 4.2;
/// Dashes tell the lines apart where colours repeat.
const DASHES: [&str; 3] = ["", "16 7", "5 6"];

/// One curve: places in shown units, and what the key says of it.
pub(super) struct Member {
    pub curve: Banded,
    pub label: String,
    /// Its stroke, where it is not the next of the family.
    pub stroke: Option<Stroke>,
}

/// The sheet: title, axes, what is drawn across.
pub(super) struct Family<'a> {
    pub name: &'static str,
    pub heading: &'a str,
    pub subtitle: &'a str,
    /// Whether curves are rounded off between their points.
    pub smooth: bool,
    pub members: Vec<Member>,
    /// Places along the level axis that are marked across the plot, with a line of the key.
    pub marks: Vec<f64>,
    pub marks_label: Option<String>,
}

/// Stroke of line `k` out of `count`.
pub(super) fn stroke(k: usize, count: usize) -> Stroke {
    let last = COLOURS.len() - 1;
    let place = if count > 1 && count <= COLOURS.len() { k * last / (count - 1) } else { k % COLOURS.len() };
    Stroke { dash: DASHES[(k / COLOURS.len()).min(DASHES.len() - 1)], ..Stroke::full(COLOURS[place], WIDTH) }
}

impl Family<'_> {
    /// Draws it; `x_of` and `y_of` make the axes between two places on paper.
    pub(super) fn draw(self, x_of: impl Fn(f64, f64) -> Axis, y_of: impl Fn(f64, f64) -> Axis) -> Picture {
        let mut svg = Svg::new(COLUMN);
        let top = title(&mut svg, COLUMN, self.heading, self.subtitle);
        let y = y_of(top + HEIGHT, top);
        let left = MARGIN + room_left(&y);
        let area = Frame { edge: MARGIN, left, right: COLUMN - MARGIN - 8.0, top, bottom: top + HEIGHT };
        let x = x_of(area.left, area.right);
        grid(&mut svg, &area, &x, &y);
        for place in self.marks.iter().filter(|m| x.scale.holds(**m)) {
            svg.line((x.scale.at(*place), area.top), (x.scale.at(*place), area.bottom), MARK);
        }
        let count = self.members.iter().filter(|m| m.stroke.is_none()).count();
        let mut entries = Vec::new();
        for (k, member) in self.members.iter().enumerate() {
            let stroke = member.stroke.unwrap_or_else(|| stroke(k, count));
            let line = if self.smooth { smooth(&member.curve, &x.scale, &y.scale) } else { member.curve.clone() };
            draw(&mut svg, &line, (&x.scale, &y.scale), stroke);
            entries.push((Swatch::Line(stroke), member.label.clone()));
        }
        if let Some(text) = self.marks_label {
            entries.push((Swatch::Line(MARK), text));
        }
        frame(&mut svg, &area, &x, &y);
        let end = key(&mut svg, area.left, COLUMN - MARGIN, area.bottom + room_below() + 6.0, &entries);
        Picture { name: self.name, svg: svg.finish(end + MARGIN, self.heading, self.subtitle) }
    }
}

/// The ribbon where it shows, and the line on it.
pub(super) fn draw(svg: &mut Svg, curve: &Banded, (x, y): (&Scale, &Scale), stroke: Stroke) {
    let at = |k: usize, sign: f64| {
        let value = (curve.y[k] + sign * curve.band[k]).clamp(y.low, y.high);
        (x.at(curve.x[k].clamp(x.low, x.high)), y.at(value))
    };
    if curve.is_visible(y) {
        let edge = |sign: f64| simplified(&(0..curve.x.len()).map(|k| at(k, sign)).collect::<Vec<_>>(), 0.25);
        let mut outline = edge(1.0);
        outline.extend(edge(-1.0).into_iter().rev());
        svg.area(&polygon(&outline), stroke.colour, 0.25, None);
    }
    let points: Vec<(f64, f64)> = (0..curve.x.len()).map(|k| at(k, 0.0)).collect();
    svg.path(&polyline(&simplified(&points, 0.25)), stroke);
}

//! What the pictures of a comparison are drawn from, and what both share.

use lenzbore_solver::comparison::Verdict;

use super::axes::{Axis, Frame, linear, logarithmic, tight};
use super::scale::{Kind, Scale};
use super::style::{BLUE, ORANGE};
use super::svg::{Stroke, Svg};
use super::units::Shown;

/// A range wider than this is shown on a logarithmic axis.
const WIDE: f64 = 40.0;

/// One value of the table and ours.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PlotPoint {
    /// Along the abscissa, SI, or the number of the row.
    pub x: f64,
    /// The table's value, SI.
    pub table: f64,
    /// Half-width of its uncertainty, 95 %.
    pub table_half: f64,
    /// Our value.
    pub ours: f64,
    /// Half-width of ours, 95 %.
    pub ours_half: f64,
    /// (table - ours) over the scale.
    pub share: f64,
    /// Half-width of the validation uncertainty over the scale, 95 %.
    pub share_half: f64,
    /// The allowed difference over the scale.
    pub share_allowed: f64,
    /// The verdict.
    pub verdict: Verdict,
}

/// The points of one column in one case, in the order of x.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct PlotCurve {
    /// Its points.
    pub points: Vec<PlotPoint>,
}

/// One column of the table.
#[derive(Debug, Clone, PartialEq)]
pub struct PlotPanel {
    /// Its name.
    pub name: String,
    /// Its SI unit.
    pub unit: &'static str,
    /// One curve a case.
    pub curves: Vec<PlotCurve>,
}

/// A comparison as it is drawn.
#[derive(Debug, Clone, PartialEq)]
pub struct ComparedPlot {
    /// Title.
    pub heading: String,
    /// The verdict in words.
    pub verdict: String,
    /// Name of the abscissa; `row` where there is none.
    pub x_name: String,
    /// Its SI unit; empty for rows.
    pub x_unit: &'static str,
    /// Whether differences above zero, below zero, or both are judged.
    pub judged: (bool, bool),
    /// One a column.
    pub panels: Vec<PlotPanel>,
}

impl ComparedPlot {
    /// The abscissa's unit as shown.
    pub(super) fn x_shown(&self) -> Shown {
        let largest = self.all().map(|p| p.x.abs()).fold(0.0, f64::max);
        match self.x_unit {
            "m/s" => Shown::speed(largest),
            "m" => Shown::length(largest),
            "" => Shown { unit: String::new(), factor: 1.0 },
            unit => Shown::prefixed(unit, largest),
        }
    }

    /// Every point.
    pub(super) fn all(&self) -> impl Iterator<Item = &PlotPoint> {
        self.panels.iter().flat_map(|p| p.curves.iter().flat_map(|c| &c.points))
    }

    /// The level axis: logarithmic for speeds over a wide range.
    pub(super) fn x_axis(&self, shown: &Shown, area: &Frame) -> Axis {
        let values = || self.all().map(|p| p.x * shown.factor);
        let (low, high) = (values().fold(f64::INFINITY, f64::min), values().fold(f64::NEG_INFINITY, f64::max));
        let scale = if self.x_unit == "m/s" && low > 0.0 && high / low >= WIDE {
            logarithmic(low, high, 1.15, area.left, area.right)
        } else if self.x_unit.is_empty() || high <= low {
            tight(low - 0.5, high + 0.5, area.left, area.right)
        } else {
            let air = 0.03 * (high - low);
            tight(if low >= 0.0 && low < 0.2 * high { 0.0 } else { low - air }, high + air, area.left, area.right)
        };
        let name = capital(&self.x_name);
        let title = if shown.unit.is_empty() { name } else { format!("{name}, {}", shown.unit) };
        Axis { scale, title }
    }
}

/// Colour of a point by its verdict.
pub(super) const fn colour(verdict: Verdict) -> &'static str {
    match verdict {
        Verdict::Passes => BLUE,
        Verdict::Undecided => "#7a7a7a",
        Verdict::FallsShort => ORANGE,
    }
}

/// A mark by its verdict: full, ringed, or a full square, so that it reads without colour.
pub(super) fn mark(svg: &mut Svg, at: (f64, f64), verdict: Verdict) {
    let colour = colour(verdict);
    match verdict {
        Verdict::Passes => svg.circle(at, 7.0, colour, None),
        Verdict::Undecided => svg.circle(at, 7.0, "#ffffff", Some(Stroke::full(colour, 3.0))),
        Verdict::FallsShort => svg.rectangle(at.0 - 6.5, at.1 - 6.5, at.0 + 6.5, at.1 + 6.5, colour, None),
    }
}

/// An upright bar with tips from one value to another, kept on the axis.
pub(super) fn bar(svg: &mut Svg, x: f64, y: &Scale, (from, to): (f64, f64), stroke: Stroke) {
    let (from, to) = (y.at(kept(y, from)), y.at(kept(y, to)));
    if (from - to).abs() < 3.0 {
        return;
    }
    svg.line((x, from), (x, to), stroke);
    for end in [from, to] {
        svg.line((x - 6.0, end), (x + 6.0, end), stroke);
    }
}

/// A value kept on its axis.
pub(super) fn kept(y: &Scale, value: f64) -> f64 {
    let value = if y.kind == Kind::Log { value.max(y.low) } else { value };
    value.clamp(y.low, y.high)
}

/// An upright axis for values that may be all positive over a wide range.
pub(super) fn y_axis(values: &[f64], may_be_log: bool, start: f64, end: f64) -> Scale {
    let (low, high) = (
        values.iter().copied().fold(f64::INFINITY, f64::min),
        values.iter().copied().fold(f64::NEG_INFINITY, f64::max),
    );
    if may_be_log && low > 0.0 && high / low >= WIDE {
        logarithmic(low, high, 1.6, start, end)
    } else {
        linear(low, high, start, end)
    }
}

/// First letter large, underscores as blanks.
pub(super) fn capital(name: &str) -> String {
    let plain = name.replace('_', " ");
    let mut letters = plain.chars();
    letters.next().map_or_else(String::new, |c| c.to_uppercase().chain(letters).collect())
}

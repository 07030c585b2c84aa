//! A plot's frame: grid, ticks, labels, titles.

use super::letters::{CAPITAL, width};
use super::scale::{Kind, Scale};
use super::style::{FRAME, GRID, LABEL, SMALL, letters};
use super::svg::{Anchor, Stroke, Svg, Type};

/// A frame on paper, y downward.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Frame {
    /// Where upright titles begin: the left edge of everything.
    pub edge: f64,
    pub left: f64,
    pub right: f64,
    pub top: f64,
    pub bottom: f64,
}

/// An axis: its scale in the shown unit, and its title with that unit.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Axis {
    pub scale: Scale,
    pub title: String,
}

const TICK: Stroke = Stroke::full("#444444", 1.8);
const APART_X: f64 = 92.0;
const APART_Y: f64 = 66.0;
/// Room between frame and tick label.
const GAP: f64 = 10.0;

/// Room that tick labels and title of an upright axis take left of the frame.
pub(super) fn room_left(axis: &Axis) -> f64 {
    let widest = axis.scale.ticks(APART_Y).iter().map(|t| width(&t.label, SMALL, false)).fold(0.0, f64::max);
    LABEL + 14.0 + widest + GAP
}

/// Room below the frame that tick labels and title of a level axis take.
pub(super) fn room_below() -> f64 {
    GAP + SMALL + LABEL + 12.0
}

/// Grid lines: draw them first, what lies on them next, the frame last.
pub(super) fn grid(svg: &mut Svg, frame: &Frame, x: &Axis, y: &Axis) {
    for tick in x.scale.ticks(APART_X) {
        let at = x.scale.at(tick.value);
        svg.line((at, frame.top), (at, frame.bottom), GRID);
    }
    for tick in y.scale.ticks(APART_Y) {
        let at = y.scale.at(tick.value);
        svg.line((frame.left, at), (frame.right, at), GRID);
    }
}

/// Grid lines of a level axis alone, for a plot whose lines have names instead of an upright axis.
pub(super) fn level_grid(svg: &mut Svg, frame: &Frame, x: &Axis) {
    for tick in x.scale.ticks(APART_X) {
        let at = x.scale.at(tick.value);
        svg.line((at, frame.top), (at, frame.bottom), GRID);
    }
}

/// Frame with ticks, labels and title of a level axis alone.
pub(super) fn level_frame(svg: &mut Svg, frame: &Frame, x: &Axis) {
    svg.rectangle(frame.left, frame.top, frame.right, frame.bottom, "none", Some(FRAME));
    level_axis(svg, frame, x);
}

/// Frame, ticks, labels and titles; an x axis without a title keeps its ticks only.
pub(super) fn frame(svg: &mut Svg, frame: &Frame, x: &Axis, y: &Axis) {
    svg.rectangle(frame.left, frame.top, frame.right, frame.bottom, "none", Some(FRAME));
    level_axis(svg, frame, x);
    upright_axis(svg, frame, y);
}

fn level_axis(svg: &mut Svg, frame: &Frame, x: &Axis) {
    let base = frame.bottom + GAP + CAPITAL * SMALL;
    for tick in x.scale.ticks(APART_X) {
        let at = x.scale.at(tick.value);
        svg.line((at, frame.bottom), (at, frame.bottom - 10.0), TICK);
        if !x.title.is_empty() {
            svg.text(at, base, &tick.label, letters(SMALL, Anchor::Middle));
        }
    }
    for value in small_ticks(&x.scale, APART_X) {
        let at = x.scale.at(value);
        svg.line((at, frame.bottom), (at, frame.bottom - 5.0), TICK);
    }
    let middle = 0.5 * (frame.left + frame.right);
    if x.title.is_empty() {
        return;
    }
    svg.text(middle, frame.bottom + GAP + SMALL + 4.0 + LABEL, &x.title, letters(LABEL, Anchor::Middle));
}

fn upright_axis(svg: &mut Svg, frame: &Frame, y: &Axis) {
    for tick in y.scale.ticks(APART_Y) {
        let at = y.scale.at(tick.value);
        svg.line((frame.left, at), (frame.left + 10.0, at), TICK);
        svg.text(frame.left - GAP, at + 0.5 * CAPITAL * SMALL, &tick.label, letters(SMALL, Anchor::End));
    }
    for value in small_ticks(&y.scale, APART_Y) {
        let at = y.scale.at(value);
        svg.line((frame.left, at), (frame.left + 5.0, at), TICK);
    }
    let edge = frame.edge + CAPITAL * LABEL;
    let kind = Type { upright: true, ..letters(LABEL, Anchor::Middle) };
    svg.text(edge, 0.5 * (frame.top + frame.bottom), &y.title, kind);
}

/// Small ticks, unless a logarithmic axis runs over so many decades that they would merge.
fn small_ticks(scale: &Scale, apart: f64) -> Vec<f64> {
    let decade = (scale.end - scale.start).abs() / (scale.high / scale.low).abs().log10();
    if scale.kind == Kind::Log && decade < 40.0 { Vec::new() } else { scale.small_ticks(apart) }
}

/// A linear axis that holds `low` to `high` with a little air, and zero where it is near.
pub(super) fn linear(low: f64, high: f64, start: f64, end: f64) -> Scale {
    if high <= low {
        let (low, high) =
            if high.abs() > 0.0 { (high - 0.5 * high.abs(), high + 0.5 * high.abs()) } else { (0.0, 1.0) };
        return Scale { kind: Kind::Linear, low, high, start, end };
    }
    let span = high - low;
    let near_zero = |edge: f64| edge.abs() < 0.35 * span;
    let low = if low >= 0.0 && near_zero(low) { 0.0 } else { low - 0.06 * span };
    let high = if high <= 0.0 && near_zero(high) { 0.0 } else { high + 0.08 * span };
    Scale { kind: Kind::Linear, low, high, start, end }
}

/// A linear axis that ends exactly where its values do.
pub(super) fn tight(low: f64, high: f64, start: f64, end: f64) -> Scale {
    let high = if high > low { high } else { low + if low.abs() > 0.0 { low.abs() } else { 1.0 } };
    Scale { kind: Kind::Linear, low, high, start, end }
}

/// A logarithmic axis from a little below `low` to a little above `high`, both positive.
pub(super) fn logarithmic(low: f64, high: f64, air: f64, start: f64, end: f64) -> Scale {
    Scale { kind: Kind::Log, low: low / air, high: high * air, start, end }
}

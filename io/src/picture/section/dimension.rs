//! Dimension lines as drawing offices set them: extension lines, filled arrows, the size on the line.

use crate::picture::letters::width;
use crate::picture::style::{SMALL, letters};
use crate::picture::svg::{Anchor, Stroke, Svg, Type, polygon};

const THIN: Stroke = Stroke::full("#222222", 1.5);
const ARROW: (f64, f64) = (20.0, 6.5);
/// Gap between a body and its extension line, and how far that line runs on.
const CLEAR: f64 = 5.0;
const BEYOND: f64 = 8.0;

/// Height that one row of level dimensions takes.
pub(super) const ROW: f64 = 42.0;

/// A level dimension between `x.0` and `x.1` on the line `y`; extension lines come from heights `from`.
pub(super) fn level(svg: &mut Svg, x: (f64, f64), from: (f64, f64), y: f64, text: &str) {
    for (x, from) in [(x.0, from.0), (x.1, from.1)] {
        let away = if y > from { 1.0 } else { -1.0 };
        svg.line((x, from + away * CLEAR), (x, y + away * BEYOND), THIN);
    }
    let room = x.1 - x.0;
    let kind = Type { rim: "#ffffff", ..letters(SMALL, Anchor::Middle) };
    if room >= width(text, SMALL, false) + 2.0 * ARROW.0 + 12.0 {
        svg.line((x.0, y), (x.1, y), THIN);
        head(svg, (x.0, y), (-1.0, 0.0));
        head(svg, (x.1, y), (1.0, 0.0));
        svg.text(0.5 * (x.0 + x.1), y - 10.0, text, kind);
    } else {
        outside(svg, x, y, text);
    }
}

/// The same where the room is too small: arrows from without, the size on the right.
fn outside(svg: &mut Svg, x: (f64, f64), y: f64, text: &str) {
    let end = x.1 + ARROW.0 + 14.0 + width(text, SMALL, false) + 8.0;
    svg.line((x.0 - ARROW.0 - 16.0, y), (x.0, y), THIN);
    svg.line((x.0, y), (end, y), THIN);
    head(svg, (x.0, y), (1.0, 0.0));
    head(svg, (x.1, y), (-1.0, 0.0));
    svg.text(x.1 + ARROW.0 + 10.0, y - 10.0, text, Type { rim: "#ffffff", ..letters(SMALL, Anchor::Start) });
}

/// An upright dimension between heights `y.0` (upper) and `y.1` on the line `x`, read from the right.
pub(super) fn upright(svg: &mut Svg, y: (f64, f64), from: f64, x: f64, text: &str) {
    for y in [y.0, y.1] {
        svg.line((from + CLEAR, y), (x + BEYOND, y), THIN);
    }
    let middle = 0.5 * (y.0 + y.1);
    let kind = Type { upright: true, rim: "#ffffff", ..letters(SMALL, Anchor::Middle) };
    let room = y.1 - y.0;
    if room >= 2.0 * ARROW.0 + 8.0 {
        svg.line((x, y.0), (x, y.1), THIN);
        head(svg, (x, y.0), (0.0, -1.0));
        head(svg, (x, y.1), (0.0, 1.0));
    } else {
        svg.line((x, y.0 - ARROW.0 - 16.0), (x, y.1 + ARROW.0 + 16.0), THIN);
        head(svg, (x, y.0), (0.0, 1.0));
        head(svg, (x, y.1), (0.0, -1.0));
    }
    let fits = room >= width(text, SMALL, false) + 12.0;
    let place = if fits { middle } else { y.0 - ARROW.0 - 22.0 - 0.5 * width(text, SMALL, false) };
    svg.text(x - 9.0, place, text, kind);
}

/// The arrow head of a dimension line.
fn head(svg: &mut Svg, tip: (f64, f64), along: (f64, f64)) {
    arrow_head(svg, tip, along, ARROW);
}

/// A filled arrow head of a length and width, with its tip at a point, pointing along a unit vector.
pub(super) fn arrow_head(svg: &mut Svg, tip: (f64, f64), along: (f64, f64), size: (f64, f64)) {
    let back = (tip.0 - size.0 * along.0, tip.1 - size.0 * along.1);
    let side = (-0.5 * size.1 * along.1, 0.5 * size.1 * along.0);
    let points = [tip, (back.0 + side.0, back.1 + side.1), (back.0 - side.0, back.1 - side.1)];
    svg.area(&polygon(&points), "#222222", 1.0, None);
}

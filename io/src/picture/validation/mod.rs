//! Pictures of the published checks: how far figures lie from their references, and what the bands are worth.

mod convergence;
mod coverage;
mod differences;
mod thin_wall;

pub use convergence::{ConvergenceLine, convergence};
pub use coverage::{CoveragePoint, coverage};
pub use differences::{DifferenceRow, differences};
pub use thin_wall::thin_wall;

use super::axes::Frame;
use super::axes::{Axis, room_left};
use super::paper::COLUMN;
use super::style::MARGIN;

/// Height of a plot.
const HEIGHT: f64 = 520.0;

/// The frame of a plot below `top`, once its upright axis is known; both axes are laid along it.
fn framed(top: f64, mut x: Axis, mut y: Axis) -> (Frame, Axis, Axis) {
    (y.scale.start, y.scale.end) = (top + HEIGHT, top);
    let left = MARGIN + room_left(&y);
    let area = Frame { edge: MARGIN, left, right: COLUMN - MARGIN - 10.0, top, bottom: top + HEIGHT };
    (x.scale.start, x.scale.end) = (area.left, area.right);
    (area, x, y)
}

/// Smallest and largest positive value, or 1 and 10 where there is none.
fn positive_range(values: impl Iterator<Item = f64>) -> (f64, f64) {
    let range = |(low, high): (f64, f64), v: f64| (low.min(v), high.max(v));
    let (low, high) = values.filter(|v| *v > 0.0 && v.is_finite()).fold((f64::INFINITY, 0.0), range);
    if high > 0.0 { (low, high) } else { (1.0, 10.0) }
}

//! Sizes and colours common to all pictures. Lengths in 0.1 mm; 3.5 of them make a typographic point.

use super::svg::{Anchor, Stroke, Type};

/// Margin round the sheet.
pub(super) const MARGIN: f64 = 22.0;
/// Letters of the title.
pub(super) const TITLE: f64 = 29.0;
/// Letters of axis titles and of what stands in a drawing.
pub(super) const LABEL: f64 = 26.0;
/// Letters of ticks and keys.
pub(super) const SMALL: f64 = 24.0;

/// Letters.
pub(super) const INK: &str = "#222222";
/// Letters that stand back.
pub(super) const GREY: &str = "#555555";
/// The curve.
pub(super) const BLUE: &str = "#1f5a96";
/// Marked points.
pub(super) const ORANGE: &str = "#b5500c";

/// The frame of a plot.
pub(super) const FRAME: Stroke = Stroke::full("#444444", 2.2);
/// Lines of its grid.
pub(super) const GRID: Stroke = Stroke::full("#e2e2e2", 1.4);
/// The curve itself.
pub(super) const CURVE: Stroke = Stroke::full(BLUE, 4.5);
/// A simpler law to compare with.
pub(super) const LAW: Stroke = Stroke::dashed("#6b6b6b", 3.2, "14 8");
/// A place that is marked across the plot.
pub(super) const MARK: Stroke = Stroke::dashed("#8a8a8a", 2.4, "3 6");

/// Plain letters of a size, standing on a side of their point.
pub(super) const fn letters(size: f64, anchor: Anchor) -> Type {
    Type::plain(size).anchored(anchor)
}

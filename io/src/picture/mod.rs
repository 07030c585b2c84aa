//! Pictures of a run, SVG and PNG: drag against speed, travel, section of wall and mover.
//!
//! Drawn for one column of a page (85 mm) on white; letters are bundled, so a PNG is the same on every machine.

mod alternating;
mod alternating_across;
mod axes;
mod compared;
mod curve;
mod duty;
mod error_map;
mod family;
mod force_loop;
mod key;
mod letters;
#[cfg(test)]
pub(crate) mod look;
mod overlay;
mod paper;
mod residual;
mod ribbon;
mod scale;
mod section;
mod simplify;
mod smooth;
mod spread;
mod stations;
mod strokes;
mod style;
mod svg;
mod sweeps;
mod travel;
mod units;
pub mod validation;
mod waterfall;

pub use alternating::impedance;
pub use alternating_across::current_across;
pub use compared::{ComparedPlot, PlotCurve, PlotPanel, PlotPoint};
pub use curve::curve;
pub use duty::duty;
pub use error_map::error_map;
pub use force_loop::force_loop;
pub use overlay::overlay;
pub use paper::{COLUMN_WIDTH_M, DOTS_PER_INCH, Picture, png_of, resized};
pub use residual::residual;
pub use section::{drawing, overview, section};
pub use spread::spread;
pub use stations::stations;
pub use strokes::stroke_response;
pub use sweeps::{positions, strokes as stroke_curve, temperatures};
pub use travel::travel;
pub use waterfall::waterfall;

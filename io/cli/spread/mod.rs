//! The input spread of a case: its tolerances varied one by one, at the worst corners, and at random.

mod cases;
mod study;
mod text;
mod workers;

pub use study::{Question, study};
pub use text::spread_text;
pub use workers::side_by_side;

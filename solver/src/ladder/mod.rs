//! The ladder: the same question answered by simplified models, one dropped effect restored at a time, up to the field solution.
//!
//! At the foot stands the rule of thumb (a point dipole in a thin, endless, resistive tube); then come the fields of all magnets
//! together, their size, the thickness of the wall, its ends, the induction of the wall's own currents, and the field solution
//! itself, with permeability and temperature where the case has them. What a rung moves a figure by is what the models
//! below it got wrong.
//!
//! Models that can be called alone:
//! - [`thin_wall_coefficient`], [`thick_wall_coefficient`]: the closed forms of a dipole;
//! - [`RingSum`]: independent resistive rings under any [`Assumptions`]: [`RingSum::drag`] at a speed, [`RingSum::travel`]
//!   for the series and figures of `traverse` and `free`.

mod assumptions;
mod causes;
mod climb;
mod coupled_rings;
mod design;
mod dipole_thin_ring;
mod drive;
mod effect;
mod models;
mod outcome;
mod path;
mod range;
mod ring_sum;
mod ring_travel;
mod rows;
mod share;
mod sources;
mod sweeps;

pub use assumptions::{Assumptions, EndModel, MagnetModel, WallModel};
pub use climb::{Question, climb, ladder};
pub use dipole_thin_ring::{moment, thick_wall_coefficient, thin_wall_coefficient};
pub use effect::Effect;
pub use outcome::{
    Cancelling, ErrorMap, FallsBelow, FigureLadder, Inside, Interval, LadderOutcome, QuickError, QuickModel, Range,
    Rung, Skipped, Step, Swept,
};
pub use path::{ModelFigure, Simulated};
pub use ring_sum::{RingSum, takes_dipoles};

#[cfg(test)]
mod climb_tests;
#[cfg(test)]
mod ring_tests;

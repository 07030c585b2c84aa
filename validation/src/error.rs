//! What can be wrong with a question put to the independent methods.

use lenzbore_solver::fault::SolveFault;
use thiserror::Error;

/// Faults of the independent methods.
#[derive(Debug, Clone, PartialEq, Error)]
#[non_exhaustive]
pub enum Error {
    /// The Fourier-Bessel integral needs a wall without ends.
    #[error("the wall ends ({length_m} m long); the Fourier-Bessel integral answers for an endless wall")]
    WallEnds {
        /// Length found, m.
        length_m: f64,
    },
    /// A number is out of its range.
    #[error("{what} is {found}; it must be {legal}")]
    OutOfRange {
        /// The quantity.
        what: &'static str,
        /// Its value, SI.
        found: f64,
        /// What is legal.
        legal: &'static str,
    },
    /// Two layers share the same radii.
    #[error("layers {first:?} and {second:?} overlap")]
    LayersOverlap {
        /// Name of the inner layer.
        first: String,
        /// Name of the outer layer.
        second: String,
    },
    /// A part of the mover reaches into the wall.
    #[error("part {part:?} (radii {inner_m} to {outer_m} m) touches the wall; it must lie clear of every layer")]
    PartInWall {
        /// Name of the part.
        part: String,
        /// Smallest radius of its currents, m.
        inner_m: f64,
        /// Largest radius of its currents, m.
        outer_m: f64,
    },
    /// The field is asked at a radius where the mover's own currents flow.
    #[error("radius {radius_m} m lies on or within the currents of part {part:?}")]
    PointInSource {
        /// Radius asked, m.
        radius_m: f64,
        /// Name of the part.
        part: String,
    },
    /// A Bessel function could not be evaluated.
    #[error("modified Bessel function of argument {re} + {im}j: {reason}")]
    Bessel {
        /// Real part of the argument.
        re: f64,
        /// Imaginary part of the argument.
        im: f64,
        /// What the library says.
        reason: complex_bessel::Error,
    },
    /// The adaptive quadrature ran out of panels.
    #[error("the integral did not settle within {panels} panels: error {error:e} of {scale:e}")]
    Unsettled {
        /// Panels used.
        panels: usize,
        /// Estimated error left.
        error: f64,
        /// Integral of the absolute value.
        scale: f64,
    },
    /// The field solver refused or failed.
    #[error("the field solver: {0}")]
    Solver(#[from] SolveFault),
    /// The field solver gave an answer without a figure that it owes.
    #[error("the field solver gave no figure {0:?}")]
    MissingFigure(&'static str),
}

//! What can be wrong with a grid.

use thiserror::Error;

/// A grid that cannot be built.
#[derive(Debug, Clone, PartialEq, Error)]
#[non_exhaustive]
pub enum MeshFault {
    /// Breakpoints are not finite and strictly increasing.
    #[error("two faces or ends lie at one place, or one is no number: the {index}th along its line, at {position_m} m")]
    Breakpoints {
        /// Index of the first offending breakpoint.
        index: usize,
        /// Its position, m.
        position_m: f64,
    },
    /// The size law asks for a cell that is not positive and finite.
    #[error("its cells at {position_m} m would have to be {size_m} m in size")]
    Size {
        /// Where, m.
        position_m: f64,
        /// The size, m.
        size_m: f64,
    },
    /// The line would have more cells than is sensible.
    #[error(
        "it would take {cells:.0} cells along one direction, and {limit} are the most: wall or travel are very long for the finest part"
    )]
    TooManyCells {
        /// Cells asked.
        cells: f64,
        /// The limit.
        limit: usize,
    },
}

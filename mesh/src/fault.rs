//! What can be wrong with a grid.

use thiserror::Error;

/// A grid that cannot be built.
#[derive(Debug, Clone, PartialEq, Error)]
#[non_exhaustive]
pub enum MeshFault {
    /// Breakpoints are not finite and strictly increasing.
    #[error("breakpoint {index} at {position_m} m does not lie above the one before it")]
    Breakpoints {
        /// Index of the first offending breakpoint.
        index: usize,
        /// Its position, m.
        position_m: f64,
    },
    /// The size law asks for a cell that is not positive and finite.
    #[error("the cell size at {position_m} m is {size_m} m")]
    Size {
        /// Where, m.
        position_m: f64,
        /// The size, m.
        size_m: f64,
    },
    /// The line would have more cells than is sensible.
    #[error("a node line would need {cells:.0} cells (limit {limit})")]
    TooManyCells {
        /// Cells asked.
        cells: f64,
        /// The limit.
        limit: usize,
    },
}

//! What is asked: wall, mover, travel, accuracy, all in SI units and valid by construction.

mod accuracy;
mod mover;
mod travel;
mod wall;

pub use accuracy::{Accuracy, SnapshotPlan};
pub use mover::{Mover, Outline, Part};
pub use travel::{Free, Travel, Traverse};
pub use wall::{Extent, Layer, Wall};

/// One question for the solver.
#[derive(Debug, Clone, PartialEq)]
pub struct Problem {
    /// The conductor at rest.
    pub wall: Wall,
    /// Everything that travels.
    pub mover: Mover,
    /// How it travels.
    pub travel: Travel,
    /// What accuracy is wanted, and overrides of the automatic grids.
    pub accuracy: Accuracy,
    /// When the fields are kept.
    pub snapshots: SnapshotPlan,
}

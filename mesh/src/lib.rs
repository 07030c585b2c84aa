//! Graded node lines, tensor (r, z) grids, measures, regions and quality figures. Knows no physics.
//!
//! Everything is built so that a second-order scheme on these grids has an error in even powers of
//! the cell size: between breakpoints the nodes of every refinement level lie on **one** smooth map,
//! and breakpoints and boundary are the same on all levels.

mod fault;
mod grid;
mod line;
mod quadrature;
mod quality;
mod refinement;
mod region;
mod size;

pub use fault::MeshFault;
pub use grid::Grid;
pub use line::{NodeLine, PlannedLine};
pub use quality::{LineQuality, cells_between};
pub use refinement::Refinement;
pub use region::{Rectangle, Regions};
pub use size::{Anchor, Cap, SizeLaw};

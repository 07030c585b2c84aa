//! Published checks, each beside its source, and independent semi-analytic paths.
//!
//! The independent paths share no code with the field solver beyond the statement of the problem:
//! [`endless`] solves a layered wall without ends by its Fourier-Bessel integral, [`rings`] a wall with ends as coupled circuits,
//! [`diffusion`] a field switched on around a conductor at rest by its series of modes.
//! [`references`] holds values with their sources, [`checks`] what is held against what.

pub mod cases;
pub mod checks;
pub mod diffusion;
pub mod endless;
mod error;
pub mod grid_convergence;
pub mod quadrature;
pub mod references;
pub mod report;
mod side_by_side;

pub use error::Error;
pub use lenzbore_solver::rings::{self, loops as elliptic};

//! A wall with ends, cut into coupled rings: a circuit solution that shares nothing with the field solver but Gauss points.
//!
//! Each ring carries a current spread evenly over its section. L di/dt + R i = -v df/dz with f_i(z) the flux of the mover at z
//! through ring i, averaged over its section; L by Maxwell's mutual inductance of coaxial loops averaged over both sections; the
//! force on the mover is i . df/dz. The currents are followed in the eigenmodes of L x = tau R x, each exact in time for a drive
//! that is quadratic over a step. For relative permeability 1.

mod cell;
mod circuit;
pub(crate) mod equation;
mod events;
mod fall;
mod follow;
mod inductance;
mod linkage;
pub mod loops;
mod modes;
mod motion;
mod points;
mod richardson;

pub use cell::Cutting;
pub use circuit::RingCircuit;
pub use fall::{Fall, fall};
pub(crate) use follow::{Moment, follow};
pub use inductance::self_inductance;
pub use motion::{Passage, pass};
pub use richardson::{Extrapolated, extrapolate};

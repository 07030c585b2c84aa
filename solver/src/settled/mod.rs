//! Uniform motion with settled fields in an endless wall: (K - v C) psi_r = v C psi_s in the mover's frame.
//!
//! K^-1 C is skew-adjoint in the inner product of K and its Krylov space does not depend on the speed: one factorisation of K
//! and one three-term recurrence give the drag at every speed. It needs more vectors the faster the mover: where an elimination
//! of K - v C for each speed is cheaper, that takes its place (`method.rs` has the rule).

mod back_action;
mod balance;
#[cfg(test)]
mod cross_check;
mod curve;
mod elimination;
mod lanczos;
mod level;
mod levels;
mod magnets;
mod method;
mod recurrence;
mod steady;
#[cfg(test)]
mod timing;
mod vectors;

pub(crate) use back_action::back_action;
pub(crate) use curve::curve;
pub(crate) use elimination::{elimination_bytes, elimination_seconds};
pub(crate) use level::{greatest_node, slope, static_reaction, wall_source};
pub(crate) use levels::plan;
pub(crate) use method::{Share, share, shielding};
pub(crate) use steady::steady;

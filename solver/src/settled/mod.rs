//! Uniform motion with settled fields in an endless wall: (K - v C) psi_r = v C psi_s in the mover's frame.
//!
//! K^-1 C is skew-adjoint in the inner product of K and its Krylov space does not depend on the speed: one Cholesky
//! factorisation and one three-term recurrence give the drag at every speed.

mod balance;
#[cfg(test)]
mod cross_check;
mod curve;
mod level;
mod levels;
mod recurrence;
mod steady;

pub(crate) use curve::curve;
pub(crate) use level::greatest_node;
pub(crate) use levels::plan;
pub(crate) use steady::steady;

//! Uniform motion with settled fields in an endless wall: (K - v C) psi_r = v C psi_s in the mover's frame.
//!
//! K^-1 C is skew-adjoint in the inner product of K and its Krylov space does not depend on the speed: one Cholesky
//! factorisation and one three-term recurrence give the drag at every speed.

mod answer;
mod cross_check;
mod level;
mod recurrence;

pub(crate) use answer::{curve, plan, steady};
pub(crate) use level::greatest_node;

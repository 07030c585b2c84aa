//! The axisymmetric magnetic diffusion solver.
//!
//! A [`problem::Problem`] states wall, mover and travel in SI units; solving it gives an
//! [`outcome::Outcome`]: figures with numerical bands, forces by three routes, the energy ledger,
//! the trace and the fields. This crate knows no files.
//!
//! Signs: z upward positive, velocities signed, drag positive when it opposes the motion.

pub mod constants;
pub mod monitor;
pub mod outcome;
pub mod problem;
pub mod sources;

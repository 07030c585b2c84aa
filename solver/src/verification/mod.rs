//! Verification: observed orders on exact and manufactured solutions, and properties that every answer must have.
//!
//! Each test says what it checks and where its truth comes from. Tolerances are about one and a half times what was
//! measured where the error is the scheme's, and the theory's own where it is round-off.
#![allow(
    clippy::unwrap_used,
    clippy::expect_used,
    clippy::float_cmp,
    clippy::panic,
    clippy::print_stdout,
    clippy::cast_precision_loss,
    reason = "tests may stop at the first fault, print what they measured, and count small numbers"
)]

mod balances;
mod bessel;
pub(crate) mod cases;
mod chamber;
mod decay;
mod dissimilar_levels;
mod falls;
mod limits;
mod moving_medium;
mod null_fields;
mod order;
mod passage;
mod permeable_shell;
mod positions;
mod settled_drag;
mod static_fields;
mod step_ladders;
mod strokes;
mod symmetries;
mod unsymmetric;
mod windows;

pub(crate) use unsymmetric::Unsymmetric;

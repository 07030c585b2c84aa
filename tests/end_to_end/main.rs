//! The built binary from outside: output, exit status, files.

#![allow(
    clippy::unwrap_used,
    clippy::expect_used,
    clippy::panic,
    clippy::float_cmp,
    reason = "a test may stop at the first fault"
)]

mod alternating;
mod bad_input;
mod commands;
mod compare;
mod examples;
mod export;
mod folders;
mod guide;
mod interruption;
mod ladder;
mod materials;
mod programs;
mod report;
mod rerun;
mod rig;
mod starters;
mod stations;
mod strokes;
mod sweeps;
mod tolerance;
mod validate;
mod warmth;
mod words;

//! What a cross-check of the frequency domain needs of one level.
#![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

use lenzbore_mesh::Refinement;

use super::small::{level_and_slope, plan, responses};
use crate::monitor::Unwatched;
use crate::operators::Operators;
use crate::placement::Placement;
use crate::problem::Problem;

/// Operators and s of one level, and [k, c] there at each of `frequencies_hz`.
pub(crate) fn coarsest(
    problem: &Problem,
    centre_m: f64,
    frequencies_hz: &[f64],
    refinement: Refinement,
) -> (Operators, Vec<f64>, Vec<[f64; 2]>) {
    let omegas: Vec<f64> = frequencies_hz.iter().map(|f| std::f64::consts::TAU * f).collect();
    let placement = Placement::new(problem);
    let plan = plan(problem, &placement, centre_m, &omegas).unwrap();
    let level = (refinement, false);
    let found = responses(problem, &placement, &plan, level, (centre_m, &omegas), &Unwatched).unwrap();
    let (level, slope) = level_and_slope(problem, &placement, &plan, level, centre_m).unwrap();
    (level.operators, slope, found)
}

//! Coils at rest in or around the wall with alternating current: (K + i omega G) psi_r = -i omega G psi_s - (K - K0) psi_s.
//!
//! All quantities vary as exp(+i omega t), amplitudes zero to peak. The coils' own field psi_s is exact; psi_r, what currents and permeability of the wall
//! add, is solved for on grids made for the least skin depth, and every figure is extrapolated over them. K^-1 G is self-adjoint in
//! the inner product of K (and (K + s G)^-1 G in that of K + s G): a real symmetric recurrence serves a range of frequencies (`recurrence.rs`).

mod across;
mod answer;
#[cfg(test)]
mod cross_check;
mod grid;
mod groups;
mod heat;
mod inductance;
mod level;
mod levels;
mod point;
mod recurrence;
mod search;
mod shield;

pub(crate) use groups::{Group, group_of, groups};
pub(crate) use recurrence::Recurrence;

use crate::fault::SolveFault;
use crate::grid_rules::GridPlan;
use crate::monitor::Monitor;
use crate::outcome::Outcome;
use crate::placement::Placement;
use crate::problem::{Alternating, Problem};
use crate::target::{MOST_LEVELS, refine};

/// The impedance of coils at rest, and the field that they drive.
///
/// # Errors
/// See [`SolveFault`].
pub(crate) fn alternating(problem: &Problem, law: &Alternating, monitor: &dyn Monitor) -> Result<Outcome, SolveFault> {
    let placed = in_the_walls_frame(problem, law);
    refine(&problem.accuracy, MOST_LEVELS, |count| answer::answer(&placed, law, count, monitor))
}

/// The grids for `law`, with the speed that stands for its highest frequency in `regime`: wavelength times angular frequency.
///
/// # Errors
/// A line that cannot be built.
pub(crate) fn plan(problem: &Problem, law: &Alternating) -> Result<(GridPlan, f64), SolveFault> {
    let placed = in_the_walls_frame(problem, law);
    let placement = Placement::new(&placed);
    let highest = law.angular_frequencies().into_iter().fold(0.0, f64::max);
    Ok((grid::plan(&placed, &placement, highest)?, placement.wavelength_m * highest))
}

/// Recurrence vectors that the frequencies of `law` take on each level, about.
pub(crate) fn vectors(law: &Alternating) -> f64 {
    let one = |group: groups::Group| {
        // Residual 1e-12 at rho a vector.
        let pole = |omega: f64| ellipse(group.shift, omega).ln();
        let slowest = pole(group.range.0).min(pole(group.range.1));
        1.0e12_f64.ln() / slowest
    };
    groups(&law.angular_frequencies()).into_iter().map(one).sum()
}

/// Sum of half axes of the ellipse with foci at -1 and 1 through the pole that the reaction at `omega` has, 0 .. 1/shift mapped to -1 .. 1:
/// z = (s + i omega) / (s - i omega), on the unit circle at angle 2 atan(omega / s).
fn ellipse(shift: f64, omega: f64) -> f64 {
    let angle = 2.0 * (omega / shift).atan();
    // |z| = 1: z = cosh(log rho + i t), cosh^2(log rho) - sin^2 t = 1 and cosh(log rho) cos t = cos angle give sinh^2(log rho) = |sin angle|.
    angle.sin().abs().sqrt().asinh().exp()
}

/// `problem` with every part at its height over the wall's lower end.
pub(crate) fn in_the_walls_frame(problem: &Problem, law: &Alternating) -> Problem {
    let mut placed = problem.clone();
    placed.mover.parts.iter_mut().for_each(|part| part.centre_m += law.position_m);
    placed
}

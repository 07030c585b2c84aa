//! The axisymmetric magnetic diffusion solver.
//!
//! A [`problem::Problem`] states wall, mover and travel in SI units; [`solve`] and [`drag_curve`] give an
//! [`outcome::Outcome`]: figures with numerical bands, forces by three routes, the energy ledger,
//! the trace and the fields. This crate knows no files.
//!
//! Unknown psi(r, z, t) = r A_phi; B_z = (1/r) dpsi/dr, B_r = -(1/r) dpsi/dz, E_phi = -(1/r) dpsi/dt, J_phi = sigma E_phi:
//!
//!   -d/dr((nu/r) dpsi/dr) - d/dz((nu/r) dpsi/dz) + (sigma/r) dpsi/dt = J_source + curl of (nu mu0 M).
//!
//! Signs: z upward positive, velocities signed, drag positive when it opposes the motion.

pub mod comparison;
pub mod constants;
pub mod cost;
pub mod extrapolate;
pub mod fault;
pub mod ladder;
pub mod monitor;
pub mod outcome;
pub mod probe;
pub mod problem;
pub mod rings;
pub mod slots;
pub mod sources;
pub mod spread;
pub mod step_field;

mod band;
mod corner;
mod direct;
mod fields;
mod force;
mod grid_report;
mod grid_rules;
mod harmonic;
mod interpolate;
mod linear;
mod march;
mod materials;
mod numbering;
mod operators;
mod placement;
mod regime;
mod settled;
mod target;
#[cfg(test)]
mod verification;
mod wall_nodes;

use fault::SolveFault;
use monitor::Monitor;
use outcome::Outcome;
use problem::{Extent, Problem, Travel};

/// Solves what the problem's law of travel asks.
///
/// # Errors
/// See [`SolveFault`].
pub fn solve(problem: &Problem, monitor: &dyn Monitor) -> Result<Outcome, SolveFault> {
    let mut outcome = match &problem.travel {
        Travel::Steady { velocity_m_per_s } => {
            require_endless(problem)?;
            settled::steady(problem, *velocity_m_per_s, monitor)
        }
        Travel::Traverse(_) | Travel::Free(_) | Travel::Sine(_) | Travel::Table(_) => {
            require_finite(problem)?;
            march::march(problem, monitor)
        }
        Travel::Alternating(law) => harmonic::alternating(problem, law, monitor),
    }?;
    slots::add_to(&mut outcome, problem);
    Ok(outcome)
}

/// Drag against speed with settled fields; a finite wall is taken as endless by the caller.
///
/// # Errors
/// See [`SolveFault`].
pub fn drag_curve(problem: &Problem, speeds_m_per_s: &[f64], monitor: &dyn Monitor) -> Result<Outcome, SolveFault> {
    require_endless(problem)?;
    let mut outcome = settled::curve(problem, speeds_m_per_s, monitor)?;
    slots::add_to(&mut outcome, problem);
    Ok(outcome)
}

/// Stiffness and damping coefficient of strokes of vanishing amplitude about `centre_m`, m, in a finite wall, at each of `frequencies_hz`;
/// the static pull of a permeable wall is left out.
///
/// # Errors
/// See [`SolveFault`].
pub fn small_strokes(
    problem: &Problem,
    centre_m: f64,
    frequencies_hz: &[f64],
    monitor: &dyn Monitor,
) -> Result<Vec<outcome::SmallStroke>, SolveFault> {
    require_finite(problem)?;
    march::small_strokes(problem, centre_m, frequencies_hz, monitor)
}

/// Damping coefficient as the speed vanishes, with the reference point at each of `positions_m`, in a finite wall; the law of travel takes no
/// part in it.
///
/// # Errors
/// See [`SolveFault`].
pub fn damping_against_position(
    problem: &Problem,
    positions_m: &[f64],
    monitor: &dyn Monitor,
) -> Result<Outcome, SolveFault> {
    require_finite(problem)?;
    march::damping_against_position(problem, positions_m, monitor)
}

/// As [`solve`] for strokes of law `sine`, without the small strokes over frequency beside them.
///
/// # Errors
/// See [`SolveFault`].
pub fn settled_stroke(problem: &Problem, monitor: &dyn Monitor) -> Result<Outcome, SolveFault> {
    require_finite(problem)?;
    if !matches!(problem.travel, Travel::Sine(_)) {
        return Err(SolveFault::Unsuited("a settled stroke is of law 'sine'"));
    }
    march::settled_stroke(problem, monitor)
}

/// A wall's currents as `terms` first-order lags, fitted to small strokes over frequency; `None` with fewer points than terms, or where
/// nothing damps.
#[must_use]
pub fn lumped_model(points: &[outcome::SmallStroke], terms: usize) -> Option<outcome::LumpedModel> {
    march::lumped_model(points, terms)
}

fn require_endless(problem: &Problem) -> Result<(), SolveFault> {
    match problem.wall.extent {
        Extent::Endless => Ok(()),
        Extent::Finite { .. } => {
            Err(SolveFault::Unsuited("settled fields need an endless wall; use traverse for a finite one"))
        }
    }
}

fn require_finite(problem: &Problem) -> Result<(), SolveFault> {
    match problem.wall.extent {
        Extent::Finite { .. } => Ok(()),
        Extent::Endless => Err(SolveFault::Unsuited("a motion in time needs the wall's length")),
    }
}

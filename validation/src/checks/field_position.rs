//! The damping coefficient against position in a wall with ends, against closed forms and the endless wall.

use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::problem::{Travel, Traverse};

use super::{Banded, Check, Limits, Verdict};
use crate::references::{magnet_speed, position as reference};
use crate::{Error, cases, endless};

pub(super) const CHECKS: &[Check] = &[Check::code_verification(
    "field-position",
    "zero-speed damping coefficient of a dipole near the wall's ends, and of a magnet far from them",
    &reference::SOURCE,
    position,
)];

fn position(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    against(&reference::DAMPING, monitor)
}

/// Any travel: the coefficient asks for none.
fn somewhere(length_m: f64) -> Travel {
    Travel::Traverse(Traverse { speed_m_per_s: 1.0, from_m: -length_m, to_m: 2.0 * length_m })
}

fn against(table: &[(f64, f64)], monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let wall = cases::finite_tube(reference::WALL_M, reference::LENGTH_M, reference::CONDUCTIVITY_S_PER_M);
    let problem = cases::question(wall, cases::dipole(reference::MOMENT_A_M2), somewhere(reference::LENGTH_M));
    let places: Vec<f64> = table.iter().map(|(z, _)| *z).collect();
    let outcome = lenzbore_solver::damping_against_position(&problem, &places, monitor)?;
    let mut verdict = Verdict::default();
    for (&(z, exact), found) in table.iter().zip(&outcome.sweeps.positions) {
        let limits = Limits { allowed: 1e-4 * exact, known_within: 1e-10 };
        let what = format!("dipole at {} mm", 1e3 * z);
        verdict.compare_banded(what, banded(found), exact, limits, "N s/m");
    }
    magnet(&mut verdict, monitor)?;
    Ok(verdict)
}

fn banded(at: &lenzbore_solver::outcome::AtPosition) -> Banded {
    Banded { value: at.damping, band: at.damping_band }
}

/// In the middle of a long wall the coefficient is that of an endless one.
fn magnet(verdict: &mut Verdict, monitor: &dyn Monitor) -> Result<(), Error> {
    let mover = cases::cylinder(magnet_speed::RADIUS_M, magnet_speed::LENGTH_M, magnet_speed::REMANENCE_T);
    let wall = cases::endless_tube(magnet_speed::WALL_M, magnet_speed::CONDUCTIVITY_S_PER_M, 1.0);
    let exact = endless::damping_coefficient(&wall, &mover)?.value;
    let wall = cases::finite_tube(magnet_speed::WALL_M, reference::LONG_M, magnet_speed::CONDUCTIVITY_S_PER_M);
    let problem = cases::question(wall, mover, somewhere(reference::LONG_M));
    let outcome = lenzbore_solver::damping_against_position(&problem, &[0.5 * reference::LONG_M], monitor)?;
    let found = outcome.sweeps.positions.first().ok_or(Error::MissingFigure("damping_coefficient_greatest"))?;
    let limits = Limits { allowed: 1e-4 * exact, known_within: 1e-8 * exact };
    verdict.compare_banded("magnet in the middle of a long wall", banded(found), exact, limits, "N s/m");
    Ok(())
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use lenzbore_solver::monitor::Unwatched;

    use super::*;

    #[test]
    fn a_table_that_is_off_falls_short() {
        let planted: Vec<(f64, f64)> = reference::DAMPING.iter().map(|(z, c)| (*z, 1.001 * c)).collect();
        assert!(!against(&planted, &Unwatched).unwrap().passed());
    }
}

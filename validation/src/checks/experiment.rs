//! An experiment: the remanence that the measured fall of a magnet implies.

use lenzbore_solver::constants::STANDARD_GRAVITY;
use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::problem::{Mover, Travel};

use super::field_fall::figure;
use super::{Banded, Check, Kind, Limits, Verdict};
use crate::references::falling_magnet as reference;
use crate::{Error, cases};

pub(super) const CHECKS: &[Check] = &[Check {
    name: "experiment-falling-magnet",
    about: "remanence implied by the measured fall of a magnet through a copper tube, which must suit its material",
    kind: Kind::Validation,
    source: &reference::SOURCE,
    run: falling_magnet,
}];

fn falling_magnet(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let mut verdict = Verdict::default();
    implied(&mut verdict, reference::DAMPING_COEFFICIENT, monitor)?;
    fall(&mut verdict, monitor)?;
    Ok(verdict)
}

/// Damping coefficient at zero speed of the magnet at 1 T, N s/m.
fn coefficient_at_1_t(conductivity: f64, monitor: &dyn Monitor) -> Result<Banded, Error> {
    let wall = cases::endless_tube(reference::TUBE_M, conductivity, 1.0);
    let magnet = cases::cylinder(reference::MAGNET_M.0, reference::MAGNET_M.1, 1.0);
    let problem = cases::question(wall, magnet, Travel::Steady { velocity_m_per_s: 0.1 });
    let outcome = lenzbore_solver::drag_curve(&problem, &[0.05, reference::SPEED_M_PER_S], monitor)?;
    figure(&outcome, "damping_coefficient_zero_speed")
}

/// From the coefficient that was measured, at each conductivity of drawn copper.
fn implied(verdict: &mut Verdict, measured: f64, monitor: &dyn Monitor) -> Result<(), Error> {
    let highest = reference::IMPLIED[2].0;
    let at_1_t = coefficient_at_1_t(highest, monitor)?;
    let limits = Limits { allowed: 5e-5 * at_1_t.value, known_within: 5.1e-7 };
    verdict.compare_banded("damping coefficient at 1 T", at_1_t, reference::COEFFICIENT_AT_1_T, limits, "N s/m");
    let (low, high) = reference::REMANENCE_T;
    let weighed = reference::MASS_KG * STANDARD_GRAVITY * reference::FALL_TIME_S / reference::LENGTH_M;
    verdict.compare("damping coefficient from weight and time", weighed, measured, 0.005, "N s/m");
    for (conductivity, computed) in reference::IMPLIED {
        // At low speed the drag goes with the remanence squared and the conductivity.
        let implied = (measured / at_1_t.value * highest / conductivity).sqrt();
        let at = format!("implied remanence at {} MS/m", 1e-6 * conductivity);
        verdict.compare(at.as_str(), implied, 0.5 * (low + high), 0.5 * (high - low), "T");
        verdict.compare(format!("{at}, as computed by the integral"), implied, computed, 1e-4, "T");
    }
    Ok(())
}

/// The fall itself, ends included, at the middle conductivity and the remanence that it implies.
fn fall(verdict: &mut Verdict, monitor: &dyn Monitor) -> Result<(), Error> {
    let (conductivity, remanence) = reference::IMPLIED[1];
    let wall = cases::finite_tube(reference::TUBE_M, reference::LENGTH_M, conductivity);
    let magnet = cases::cylinder(reference::MAGNET_M.0, reference::MAGNET_M.1, remanence);
    let mover = Mover { mass_kg: Some(reference::MASS_KG), ..magnet };
    let law = cases::free_fall(reference::LENGTH_M, -5e-3, [reference::LENGTH_M, 0.0]);
    let mut problem = cases::question(wall, mover, Travel::Free(law));
    // The experiment tells no more closely than 2 %: a band of 0.1 % is narrow enough.
    problem.accuracy.target_relative = 1e-3;
    let outcome = lenzbore_solver::solve(&problem, monitor)?;
    let time = figure(&outcome, "transit_time")?;
    let (low, high) = reference::REMANENCE_T;
    // The time goes with the remanence squared.
    let allowed = reference::FALL_TIME_S * ((high / low).powi(2) - 1.0) * 0.5;
    verdict.compare("time of the fall", time.value, reference::FALL_TIME_S, allowed, "s");
    Ok(())
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use lenzbore_solver::monitor::Unwatched;

    use super::*;

    /// A coefficient 5 % off would imply another material; a wrong sign no remanence at all.
    #[test]
    fn a_wrong_measurement_is_seen() {
        for (factor, passes) in [(1.0, true), (1.05, false), (0.95, false), (-1.0, false)] {
            let mut verdict = Verdict::default();
            implied(&mut verdict, factor * reference::DAMPING_COEFFICIENT, &Unwatched).unwrap();
            assert_eq!(verdict.passed(), passes, "{factor}\n{verdict}");
        }
    }
}

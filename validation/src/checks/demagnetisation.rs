//! The field against a magnet in settled travel: its neighbour's and the wall's part against the Fourier-Bessel integral.

use lenzbore_solver::constants::MU0;
use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::outcome::Figure;
use lenzbore_solver::problem::{Mover, Travel};
use lenzbore_solver::sources::Source;

use super::{Banded, Check, Limits, Verdict};
use crate::references::demagnetisation::SOURCE;
use crate::{Error, cases, endless};

pub(super) const CHECKS: &[Check] = &[Check::code_verification(
    "demagnetisation",
    "field against two opposed magnets in settled travel, where it is greatest, against the Fourier-Bessel integral",
    &SOURCE,
    run,
)];

/// Radii of the wall, m, and its conductivity, S/m.
const WALL: ((f64, f64), f64) = ((12.5e-3, 14.5e-3), 58.0e6);
/// Radius, length, remanence of the magnets and the spacer between them.
const MAGNET: (f64, f64, f64, f64) = (11.0e-3, 10.0e-3, 1.25, 4.0e-3);
const COERCIVITY_A_PER_M: f64 = 1.2e6;
/// What the field may be off by, relative: a local figure, read by cubics.
const RELATIVE: f64 = 2e-4;

fn run(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    against(monitor, 1.0)
}

/// `wrong` multiplies what the wall does, to see the check fall short.
fn against(monitor: &dyn Monitor, wrong: f64) -> Result<Verdict, Error> {
    let ((inner, outer), conductivity) = WALL;
    let wall = cases::endless_tube((inner, outer), conductivity, 1.0);
    let (radius, length, remanence, spacer) = MAGNET;
    let mut mover = cases::stack(radius, length, remanence, &[1.0, -1.0], spacer);
    mover.parts.iter_mut().for_each(|p| p.coercivity_a_per_m = Some(COERCIVITY_A_PER_M));
    let mut verdict = Verdict::default();
    for speed in [2.0, 40.0] {
        let travel = Travel::Steady { velocity_m_per_s: speed };
        let outcome = lenzbore_solver::solve(&cases::question(wall.clone(), mover.clone(), travel), monitor)?;
        let named = |name| outcome.figures.iter().find(|f| f.name == name).ok_or(Error::MissingFigure(name));
        let (field, margin) = (named("demagnetising_field_peak")?, named("demagnetisation_margin")?);
        let (r, z) = place(field)?;
        let with = endless::flux_density(&wall, &mover, speed, r, z)?.axial.value;
        let without =
            endless::flux_density(&cases::endless_tube((inner, outer), 1.0, 1.0), &mover, speed, r, z)?.axial.value;
        let sense = sense_at(&mover, z);
        let exact = (remanence - sense * (without + wrong * (with - without))) / MU0;
        let limits = |size: f64| Limits { known_within: 1e-8 * size, allowed: RELATIVE * size };
        let of = |f: &Figure| Banded { value: f.value, band: f.band };
        verdict.compare_banded(format!("field at {speed} m/s"), of(field), exact, limits(exact), "A/m");
        let left = 1.0 - exact / COERCIVITY_A_PER_M;
        verdict.compare_banded(format!("margin at {speed} m/s"), of(margin), left, limits(1.0), "1");
    }
    Ok(verdict)
}

fn place(figure: &Figure) -> Result<(f64, f64), Error> {
    let at = figure.location.and_then(|l| Some((l.r_m?, l.z_m?)));
    at.ok_or(Error::MissingFigure("place of the demagnetising field"))
}

/// Sense of the magnet that holds height `z`.
fn sense_at(mover: &Mover, z: f64) -> f64 {
    let holds = |p: &&lenzbore_solver::problem::Part| (z - p.centre_m).abs() < 0.5 * p.outline.length_m;
    match mover.parts.iter().find(holds).map(|p| p.source) {
        Some(Source::Magnet { remanence_tesla, .. }) => remanence_tesla.signum(),
        _ => 0.0,
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use lenzbore_solver::monitor::Unwatched;

    use super::*;

    #[test]
    fn a_reaction_that_is_off_is_seen() {
        let (right, wrong) = (against(&Unwatched, 1.0).unwrap(), against(&Unwatched, 0.97).unwrap());
        assert!(right.passed(), "{right}");
        assert!(!wrong.passed(), "{wrong}");
    }
}

//! The ring circuit against the integral, and the fall that it decides.

use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::problem::{Free, Mover, Traverse, Wall};

use super::{Check, Kind, Verdict};
use crate::references::{fall as reference, magnet_speed};
use crate::rings::{self, Cutting, RingCircuit, extrapolate};
use crate::{Error, cases, endless};

pub(super) const CHECKS: &[Check] = &[
    Check {
        name: "rings-long-wall",
        about: "drag in the middle of a long ring wall against the Fourier-Bessel integral",
        kind: Kind::CrossCheck,
        source: &magnet_speed::SOURCE,
        run: long_wall,
    },
    Check {
        name: "rings-fall",
        about: "transit time and exit speed of a falling magnet by coupled rings",
        kind: Kind::CrossCheck,
        source: &reference::SOURCE,
        run: fall,
    },
];

/// Three cuttings of the same proportions.
const CUTTINGS: [Cutting; 3] = [
    Cutting { across: 2, pitch_m: 3e-3 },
    Cutting { across: 3, pitch_m: 2e-3 },
    Cutting { across: 4, pitch_m: 1.5e-3 },
];
/// Their sizes relative to the first.
const SIZES: [f64; 3] = [1.0, 1.0 / 1.5, 0.5];

fn long_wall(_: &dyn Monitor) -> Result<Verdict, Error> {
    let length = 0.24;
    let wall = cases::finite_tube(magnet_speed::WALL_M, length, magnet_speed::CONDUCTIVITY_S_PER_M);
    let endless_wall = cases::endless_tube(magnet_speed::WALL_M, magnet_speed::CONDUCTIVITY_S_PER_M, 1.0);
    let mover = cases::cylinder(magnet_speed::RADIUS_M, magnet_speed::LENGTH_M, magnet_speed::REMANENCE_T);
    let speeds = [1.0, 5.0, 15.0];
    let mut drags = vec![Vec::new(); speeds.len()];
    for cutting in CUTTINGS {
        let circuit = RingCircuit::new(&wall, cutting)?;
        for (speed, drags) in speeds.iter().zip(&mut drags) {
            let travel = Traverse { speed_m_per_s: *speed, from_m: -0.1, to_m: 0.5 * length + 3e-3 };
            drags.push(mean_over_rings(&rings::pass(&circuit, &mover, &travel, 0.25e-3)?.drag, 6e-3));
        }
    }
    let mut verdict = Verdict::default();
    for (speed, drags) in speeds.into_iter().zip(drags) {
        let found = extrapolate(&SIZES, &drags).value;
        let expected = endless::drag(&endless_wall, &mover, speed)?.value;
        verdict.compare(format!("drag at {speed} m/s"), found, expected, 1e-4 * expected, "N");
    }
    Ok(verdict)
}

/// Mean of the drag over the last `travel` metres, a whole number of rings: the ripple of single rings goes out.
fn mean_over_rings(drag: &[(f64, f64)], travel: f64) -> f64 {
    let (end, _) = drag[drag.len() - 1];
    let within: Vec<f64> = drag.iter().filter(|(z, _)| *z > end - travel + 1e-9).map(|(_, f)| *f).collect();
    within.iter().sum::<f64>() / within.len() as f64
}

/// Wall, mover and law of the fall.
pub(super) fn fall_case() -> (Wall, Mover, Free) {
    let wall = cases::finite_tube(reference::WALL_M, reference::WALL_LENGTH_M, reference::CONDUCTIVITY_S_PER_M);
    let magnet =
        cases::cylinder(0.5 * reference::MAGNET_DIAMETER_M, reference::MAGNET_LENGTH_M, reference::REMANENCE_T);
    let mover = Mover { mass_kg: Some(reference::MASS_KG), ..magnet };
    let release = reference::WALL_LENGTH_M + reference::RELEASE_ABOVE_M;
    (wall, mover, cases::free_fall(release, -reference::RELEASE_ABOVE_M, [reference::WALL_LENGTH_M, 0.0]))
}

fn fall(_: &dyn Monitor) -> Result<Verdict, Error> {
    let (wall, mover, law) = fall_case();
    let (mut transits, mut speeds, mut ledger) = (Vec::new(), Vec::new(), 0.0_f64);
    for cutting in CUTTINGS {
        let circuit = RingCircuit::new(&wall, cutting)?;
        let found = rings::fall(&circuit, &mover, &law, 1e-3)?;
        transits.push(found.transit_time_s);
        speeds.push(found.exit_speed_m_per_s);
        let open = found.work_joule - found.heat_joule - found.field_energy_joule;
        ledger = ledger.max((open / found.work_joule).abs());
    }
    let mut verdict = Verdict::default();
    let transit = extrapolate(&SIZES, &transits).value;
    verdict.compare("transit time", transit, reference::TRANSIT_S, reference::TRANSIT_TOLERANCE_S, "s");
    let speed = extrapolate(&SIZES, &speeds).value;
    let allowed = reference::EXIT_SPEED_TOLERANCE_M_PER_S;
    verdict.compare("exit speed", speed, reference::EXIT_SPEED_M_PER_S, allowed, "m/s");
    verdict.compare("energy ledger, open part of the work", ledger, 0.0, 2e-6, "1");
    Ok(verdict)
}

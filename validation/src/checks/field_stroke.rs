//! The field solver's strokes against the Fourier-Bessel integral at one frequency.

use std::f64::consts::TAU;

use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::problem::{Sine, Travel};

use super::{Banded, Check, Kind, Limits, Verdict};
use crate::endless::Endless;
use crate::references::stroke as reference;
use crate::{Error, cases};

pub(super) const CHECKS: &[Check] = &[Check {
    name: "field-stroke",
    about: "damping coefficient of small strokes from 5 Hz to 20 kHz, and of a marched one",
    kind: Kind::CodeVerification,
    source: &reference::SOURCE,
    run: stroke,
}];

fn stroke(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    const NAME: &str = "damping_coefficient_equivalent";
    let mover = cases::cylinder(reference::MAGNET_M.0, reference::MAGNET_M.1, reference::REMANENCE_T);
    let endless = Endless::of(&cases::endless_tube(reference::WALL_M, reference::CONDUCTIVITY_S_PER_M, 1.0), &mover)?;
    let wall = cases::finite_tube(reference::WALL_M, reference::WALL_LENGTH_M, reference::CONDUCTIVITY_S_PER_M);
    let (centre_m, frequency_hz) = (0.5 * reference::WALL_LENGTH_M, reference::MARCHED_HZ);
    let sine = Sine { centre_m, amplitude_m: reference::AMPLITUDE_M, frequency_hz, cycles: None };
    let problem = cases::question(wall, mover, Travel::Sine(sine));
    let points = lenzbore_solver::small_strokes(&problem, centre_m, &reference::FREQUENCIES_HZ, monitor)?;
    let outcome = lenzbore_solver::solve(&problem, monitor)?;
    let figure = |name| outcome.figures.iter().find(|f| f.name == name).ok_or(Error::MissingFigure(name));
    let (marched, restoring) = (figure(NAME)?, figure("stiffness")?);
    let mut verdict = Verdict::default();
    let mut hold = |what: String, frequency_hz: f64, found: Banded, stiffness: f64| {
        let omega = TAU * frequency_hz;
        let exact = endless.stroke_damping(omega)?.value;
        let whole = exact.hypot(stiffness / omega);
        let limits = Limits { allowed: 2e-5 * whole, known_within: 1e-6 * whole };
        verdict.compare_banded(what, found, exact, limits, "N s/m");
        Ok::<_, Error>(())
    };
    for p in &points {
        let found = Banded { value: p.damping, band: p.damping_band };
        hold(format!("small strokes at {} Hz", p.frequency_hz), p.frequency_hz, found, p.stiffness)?;
    }
    hold(
        format!("2 um at {frequency_hz} Hz, settled"),
        frequency_hz,
        Banded { value: marched.value, band: marched.band },
        restoring.value,
    )?;
    Ok(verdict)
}

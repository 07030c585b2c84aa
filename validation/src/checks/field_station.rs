//! What gauges read in a march, against closed forms and the Fourier-Bessel integral, instant by instant.

use std::f64::consts::TAU;

use lenzbore_solver::constants::MU0;
use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::outcome::{StationSeries, StationTrace};
use lenzbore_solver::problem::{Gauge, Mover, Problem, Station, Travel, Traverse, Wall};

use super::{Banded, Check, Limits, Verdict};
use crate::references::station as reference;
use crate::{Error, cases, endless};

pub(super) const CHECKS: &[Check] = &[Check::code_verification(
    "field-station",
    "e.m.f. of a search coil passed by a dipole; flux and current density at gauges while a magnet passes",
    &reference::SOURCE,
    station,
)];

fn station(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    against(1.0, monitor)
}

/// `off` multiplies what is expected: 1, but for a test that plants an error.
fn against(off: f64, monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let mut verdict = Verdict::default();
    open_circuit(off, &mut verdict, monitor)?;
    for speed in reference::SPEEDS_M_PER_S {
        passing(off, speed, &mut verdict, monitor)?;
    }
    Ok(verdict)
}

fn traces(
    wall: Wall,
    mover: Mover,
    speed_m_per_s: f64,
    stations: Vec<Station>,
    monitor: &dyn Monitor,
) -> Result<Vec<StationTrace>, Error> {
    let (from_m, to_m) = (-0.06, wall.length_m().unwrap_or(0.0) + 0.06);
    let travel = Travel::Traverse(Traverse { speed_m_per_s, from_m, to_m });
    let problem = Problem { stations, ..cases::question(wall, mover, travel) };
    Ok(lenzbore_solver::solve(&problem, monitor)?.stations)
}

fn gauge(name: &str, radius_m: f64, at_m: f64, gauge: Gauge) -> Station {
    Station { name: name.to_owned(), at_m, radius_m, gauge }
}

/// Values at heights over the mover, m, by the method that the gauge is held against.
type Exact<'a> = &'a mut dyn FnMut(&[f64]) -> Result<Vec<f64>, Error>;

/// Holds a series against `exact`, by the position of the mover, within `reach` of the gauge: the worst difference, and the instant at which the
/// band is exceeded most, or is nearest to it.
fn hold(
    verdict: &mut Verdict,
    what: &str,
    (trace, series): (&StationTrace, &StationSeries),
    reach: f64,
    exact: Exact<'_>,
) -> Result<(), Error> {
    let chosen: Vec<usize> =
        (0..trace.time_s.len()).filter(|k| (trace.position_m[*k] - trace.at_m).abs() <= reach).collect();
    let heights: Vec<f64> = chosen.iter().map(|k| trace.at_m - trace.position_m[*k]).collect();
    let exact = exact(&heights)?;
    let largest = exact.iter().fold(0.0_f64, |m, v| m.max(v.abs()));
    let share = |n: usize| {
        let k = chosen[n];
        (series.values[k] - exact[n]).abs() / series.bands[k]
    };
    let Some(worst) = (0..chosen.len()).max_by(|a, b| share(*a).total_cmp(&share(*b))) else {
        return Err(Error::MissingFigure("stations"));
    };
    let k = chosen[worst];
    let found = Banded { value: series.values[k], band: series.bands[k] };
    let limits = Limits { allowed: 6e-4 * largest, known_within: 1e-8 * largest };
    verdict.compare_banded(
        format!("{what}, {} instants, the worst", chosen.len()),
        found,
        exact[worst],
        limits,
        series.unit,
    );
    Ok(())
}

/// A dipole on the axis past a coil of radius a: flux 2 pi psi = mu0 m a^2 / (2 (a^2 + z^2)^(3/2)).
fn open_circuit(off: f64, verdict: &mut Verdict, monitor: &dyn Monitor) -> Result<(), Error> {
    let (turns, a) = reference::COIL;
    let (m, v) = (reference::MOMENT_A_M2, reference::DIPOLE_SPEED_M_PER_S);
    let wall = cases::finite_tube(reference::WALL_M, 0.1, reference::NO_CONDUCTIVITY_S_PER_M);
    let coil = gauge("coil", a, 0.05, Gauge::SearchCoil { turns, length_m: 0.0 });
    let trace = traces(wall, cases::dipole(m), v, vec![coil], monitor)?;
    let (Some(trace), true) = (trace.first(), trace.len() == 1) else { return Err(Error::MissingFigure("stations")) };
    let series = &trace.series[0];
    // -turns d(flux)/dt with z = at - v t.
    let emf = |z: f64| -off * turns * MU0 * m * a * a * 1.5 * z * v * (a * a + z * z).powf(-2.5);
    hold(verdict, "search coil, dipole", (trace, series), 1.0, &mut |z| Ok(z.iter().map(|z| emf(*z)).collect()))?;
    // The time integral is minus the change of the flux linkage: nothing over the passage, the linkage itself up to the middle.
    let linkage = |z: f64| 0.5 * turns * MU0 * m * a * a * (a * a + z * z).powf(-1.5);
    let (mut sum, mut worst) = (0.0, (0.0_f64, 0.0, 0.0));
    let height = |k: usize| trace.at_m - trace.position_m[k];
    for k in 1..trace.time_s.len() {
        sum += 0.5 * (series.values[k] + series.values[k - 1]) * (trace.time_s[k] - trace.time_s[k - 1]);
        let exact = -off * (linkage(height(k)) - linkage(height(0)));
        if exact.abs() > worst.0 {
            worst = (exact.abs(), sum, exact);
        }
    }
    verdict.compare("integral of the e.m.f. over the passage", sum, 0.0, 1e-6 * linkage(0.0), "V s");
    // Trapezoids of width h add h^2 / 12 times the slope at the end: (h / a)^2 / 4 of the linkage, 2.4e-3 at the 1.4 mm of a step.
    verdict.compare("the same up to the greatest linkage", worst.1, worst.2, 4e-3 * linkage(0.0), "V s");
    let peak = (0..200).map(|k| emf(-a * f64::from(k) / 200.0).abs()).fold(0.0, f64::max);
    verdict.compare("greatest e.m.f.", series.peak.abs(), peak, 2e-4 * peak, "V");
    Ok(())
}

/// A magnet past gauges in the middle of a long conducting wall.
fn passing(off: f64, speed: f64, verdict: &mut Verdict, monitor: &dyn Monitor) -> Result<(), Error> {
    let mover = cases::cylinder(reference::MAGNET_M.0, reference::MAGNET_M.1, reference::REMANENCE_T);
    let wall = cases::finite_tube(reference::WALL_M, reference::LENGTH_M, reference::CONDUCTIVITY_S_PER_M);
    let long = cases::endless_tube(reference::WALL_M, reference::CONDUCTIVITY_S_PER_M, 1.0);
    let middle = 0.5 * reference::LENGTH_M;
    let fluxes = [("in the gap", 10e-3), ("in the wall", 12e-3), ("on the outside", 13e-3), ("outside", 20e-3)];
    let currents = [("near the bore", 11.2e-3), ("within", 12.1e-3)];
    let mut stations: Vec<Station> =
        fluxes.iter().map(|(n, r)| gauge(n, *r, middle + 1.3e-3, Gauge::FluxDensity)).collect();
    stations.extend(currents.iter().map(|(n, r)| gauge(n, *r, middle + 1.3e-3, Gauge::CurrentDensity)));
    let (turns, coil_m) = (20.0, 15e-3);
    stations.push(gauge("coil", coil_m, middle - 2.1e-3, Gauge::SearchCoil { turns, length_m: 0.0 }));
    let found = traces(wall, mover.clone(), speed, stations, monitor)?;
    for (trace, (name, r)) in found.iter().zip(fluxes) {
        for (part, series) in trace.series.iter().enumerate() {
            let component = if part == 0 { "radial" } else { "axial" };
            hold(
                verdict,
                &format!("{component} flux density {name}, {speed} m/s"),
                (trace, series),
                reference::REACH_M,
                &mut |z| {
                    let line = endless::flux_density_along(&long, &mover, speed, r, z)?;
                    Ok(line.iter().map(|b| off * if part == 0 { b.radial.value } else { b.axial.value }).collect())
                },
            )?;
        }
    }
    for (trace, (name, r)) in found.iter().skip(fluxes.len()).zip(currents) {
        hold(
            verdict,
            &format!("current density {name}, {speed} m/s"),
            (trace, &trace.series[0]),
            reference::REACH_M,
            &mut |z| {
                let line = endless::current_density_along(&long, &mover, speed, r, z)?;
                Ok(line.iter().map(|j| off * j.value).collect())
            },
        )?;
    }
    if let Some(trace) = found.last() {
        // E.m.f. = -turns d(2 pi psi)/dt = -turns 2 pi v r B_r.
        hold(verdict, &format!("search coil, {speed} m/s"), (trace, &trace.series[0]), reference::REACH_M, &mut |z| {
            let line = endless::flux_density_along(&long, &mover, speed, coil_m, z)?;
            Ok(line.iter().map(|b| -off * turns * TAU * speed * coil_m * b.radial.value).collect())
        })?;
    }
    Ok(())
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use lenzbore_solver::monitor::Unwatched;

    use super::*;

    #[test]
    fn values_that_are_off_fall_short() {
        let verdict = against(1.001, &Unwatched).unwrap();
        assert!(!verdict.passed());
    }
}

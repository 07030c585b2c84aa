//! The field solver's drag against published tables, at default settings.
//!
//! Each figure is held against its table twice: within the tolerance, and its band against the Fourier-Bessel integral, which
//! knows the truth to ten digits.

use lenzbore_solver::constants::MU0;
use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::outcome::Outcome;
use lenzbore_solver::problem::{Mover, Travel, Wall};

use super::field_fall::figure;
use super::{Banded, Check, Limits, Series, Verdict};
use crate::references::cylinder_damping::Cylinder;
use crate::references::{
    cylinder_damping, dipole_drag, half_decimal, half_figure, magnet_speed, permeable_tube, stacks, thin_wall,
};
use crate::{Error, cases, endless};

pub(super) const CHECKS: &[Check] = &[
    Check::code_verification(
        "field-dipole",
        "drag of a dipole in a copper wall at four speeds",
        &dipole_drag::SOURCE,
        dipole,
    ),
    Check::code_verification(
        "field-cylinders",
        "damping coefficients of cylinder magnets",
        &cylinder_damping::SOURCE,
        cylinders,
    ),
    Check::code_verification(
        "field-stacks",
        "damping coefficients of magnet stacks",
        &stacks::SOURCE,
        stack_coefficients,
    ),
    Check::code_verification("field-speeds", "drag of a magnet from 0.01 to 100 m/s", &magnet_speed::SOURCE, speeds),
    Check::code_verification(
        "field-permeable",
        "drag in tubes of permeability 1, 50 and 200",
        &permeable_tube::SOURCE,
        permeable,
    ),
    Check::code_verification(
        "field-thin-wall",
        "drag of a dipole in a thin wall against the universal curve",
        &thin_wall::SOURCE,
        universal,
    ),
    Check::code_verification(
        "field-critical-speed",
        "critical speed and greatest drag of a dipole in a thin wall",
        &thin_wall::SOURCE,
        critical,
    ),
];

/// Settled drag at several speeds.
fn curve(wall: &Wall, mover: &Mover, speeds: &[f64], monitor: &dyn Monitor) -> Result<Outcome, Error> {
    let travel = Travel::Steady { velocity_m_per_s: speeds[0] };
    let problem = cases::question(wall.clone(), mover.clone(), travel);
    Ok(lenzbore_solver::drag_curve(&problem, speeds, monitor)?)
}

/// Drag with bands at several speeds.
fn drags(wall: &Wall, mover: &Mover, speeds: &[f64], monitor: &dyn Monitor) -> Result<Vec<Banded>, Error> {
    let curve = curve(wall, mover, speeds, monitor)?.curve.ok_or(Error::MissingFigure("curve"))?;
    Ok(curve.points.iter().map(|p| Banded { value: p.drag_newton, band: p.band_newton }).collect())
}

/// Damping coefficient at zero speed with its band.
fn coefficient(wall: &Wall, mover: &Mover, monitor: &dyn Monitor) -> Result<Banded, Error> {
    const NAME: &str = "damping_coefficient_zero_speed";
    let outcome = curve(wall, mover, &[0.1, 1.0], monitor)?;
    let figure = outcome.figures.iter().find(|f| f.name == NAME).ok_or(Error::MissingFigure(NAME))?;
    Ok(Banded { value: figure.value, band: figure.band })
}

/// A table's value and how well it is printed, the integral's value, and the relative tolerance.
struct Truth {
    table: f64,
    printed: f64,
    integral: f64,
    relative: f64,
}

/// Holds a figure against its table, and its band against the integral.
fn hold(verdict: &mut Verdict, what: &str, figure: Banded, truth: &Truth, unit: &'static str) {
    let allowed = (truth.relative * truth.table.abs()).max(truth.printed);
    verdict.compare(what, figure.value, truth.table, allowed, unit);
    let limits = Limits { allowed, known_within: 1e-10 * truth.integral.abs() };
    verdict.compare_banded(format!("{what}, band"), figure, truth.integral, limits, unit);
}

fn dipole(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let wall = cases::endless_tube(dipole_drag::WALL_M, dipole_drag::CONDUCTIVITY_S_PER_M, 1.0);
    let mover = cases::dipole(dipole_drag::MOMENT_A_M2);
    let mut verdict = Verdict::default();
    for (speed, table) in dipole_drag::DRAG {
        let travel = Travel::Steady { velocity_m_per_s: speed };
        let problem = cases::question(wall.clone(), mover.clone(), travel);
        let outcome = lenzbore_solver::solve(&problem, monitor)?;
        let figure = outcome.figures.iter().find(|f| f.name == "drag").ok_or(Error::MissingFigure("drag"))?;
        let figure = Banded { value: figure.value, band: figure.band };
        let integral = endless::drag(&wall, &mover, speed)?.value;
        let truth = Truth { table, printed: half_decimal(9), integral, relative: 2e-5 };
        hold(&mut verdict, &format!("drag at {speed} m/s"), figure, &truth, "N");
    }
    Ok(verdict)
}

fn cylinders(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    cylinders_against(&cylinder_damping::TABLE, monitor)
}

fn cylinders_against(table: &[Cylinder], monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let mut verdict = Verdict::default();
    for line in table {
        let radii = (1e-3 * line.wall_mm.0, 1e-3 * line.wall_mm.1);
        let wall = cases::endless_tube(radii, cylinder_damping::CONDUCTIVITY_S_PER_M, 1.0);
        let mover = cases::cylinder(cylinder_damping::RADIUS_M, 1e-3 * line.length_mm, cylinder_damping::REMANENCE_T);
        let what = format!("damping, length {} mm, wall {} to {} mm", line.length_mm, line.wall_mm.0, line.wall_mm.1);
        let integral = endless::damping_coefficient(&wall, &mover)?.value;
        let printed = half_decimal(cylinder_damping::DECIMALS);
        let truth = Truth { table: line.damping, printed, integral, relative: 5e-5 };
        hold(&mut verdict, &what, coefficient(&wall, &mover, monitor)?, &truth, "N s/m");
    }
    Ok(verdict)
}

fn stack_coefficients(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let wall = cases::endless_tube(magnet_speed::WALL_M, magnet_speed::CONDUCTIVITY_S_PER_M, 1.0);
    let mut verdict = Verdict::default();
    for stack in stacks::TABLE {
        let mover = cases::stack(
            magnet_speed::RADIUS_M,
            magnet_speed::LENGTH_M,
            magnet_speed::REMANENCE_T,
            stack.signs,
            1e-3 * stack.spacer_mm,
        );
        let integral = endless::damping_coefficient(&wall, &mover)?.value;
        let printed = half_decimal(stacks::DECIMALS);
        let truth = Truth { table: stack.damping, printed, integral, relative: 5e-5 };
        hold(&mut verdict, stack.name, coefficient(&wall, &mover, monitor)?, &truth, "N s/m");
    }
    Ok(verdict)
}

fn speeds(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    speeds_against(&magnet_speed::DRAG, monitor)
}

fn speeds_against(table: &[(f64, f64)], monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let wall = cases::endless_tube(magnet_speed::WALL_M, magnet_speed::CONDUCTIVITY_S_PER_M, 1.0);
    let mover = cases::cylinder(magnet_speed::RADIUS_M, magnet_speed::LENGTH_M, magnet_speed::REMANENCE_T);
    let speeds: Vec<f64> = table.iter().map(|(speed, _)| *speed).collect();
    let found = drags(&wall, &mover, &speeds, monitor)?;
    let mut verdict = Verdict::default();
    for (&(speed, table), figure) in table.iter().zip(found) {
        let integral = endless::drag(&wall, &mover, speed)?.value;
        let truth = Truth { table, printed: half_decimal(magnet_speed::DECIMALS), integral, relative: 5e-5 };
        hold(&mut verdict, &format!("drag at {speed} m/s"), figure, &truth, "N");
    }
    Ok(verdict)
}

fn permeable(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let mover = cases::cylinder(permeable_tube::RADIUS_M, permeable_tube::LENGTH_M, permeable_tube::REMANENCE_T);
    let mut verdict = Verdict::default();
    for (column, mu) in permeable_tube::PERMEABILITIES.into_iter().enumerate() {
        let wall = cases::endless_tube(permeable_tube::WALL_M, permeable_tube::CONDUCTIVITY_S_PER_M, mu);
        let found = drags(&wall, &mover, &permeable_tube::DRAG.map(|(speed, _)| speed), monitor)?;
        let relative = if mu > 1.0 { 2e-4 } else { 5e-5 };
        for ((speed, drag), figure) in permeable_tube::DRAG.into_iter().zip(found) {
            let table = drag[column];
            let integral = endless::drag(&wall, &mover, speed)?.value;
            let printed = 2.0 * half_figure(table, permeable_tube::FIGURES);
            let truth = Truth { table, printed, integral, relative };
            hold(&mut verdict, &format!("drag at {speed} m/s, permeability {mu}"), figure, &truth, "N");
        }
    }
    Ok(verdict)
}

/// The wall's thickness over its mean radius: thin enough that the sheet is meant to 1e-5 up to V = 100.
const THINNESS: f64 = 1e-5;
/// Mean radius, m, conductivity, S/m, and moment, A m2, of the thin wall's case.
const THIN: (f64, f64, f64) = (10e-3, 58e6, 1.0);

fn thin_wall_case() -> (Wall, Mover) {
    let (a, sigma, moment) = THIN;
    (cases::endless_tube((a * (1.0 - 0.5 * THINNESS), a * (1.0 + 0.5 * THINNESS)), sigma, 1.0), cases::dipole(moment))
}

/// Steps of the curve that is drawn, V = 0.01 to 100.
const DRAWN: u32 = 64;

/// Speed, m/s, at a given V = mu0 sigma w v.
fn thin_speed(loss: f64) -> f64 {
    let (a, sigma, _) = THIN;
    loss / (MU0 * sigma * a * THINNESS)
}

/// f = drag a^4 / (mu0 m^2) over drag, 1/N.
fn thin_scale() -> f64 {
    let (a, _, moment) = THIN;
    a.powi(4) / (MU0 * moment * moment)
}

/// f of a dipole in a thin wall at each V, with bands, as the field solver finds it.
fn thin_wall_curve(losses: &[f64], monitor: &dyn Monitor) -> Result<Vec<Banded>, Error> {
    let (wall, mover) = thin_wall_case();
    let speeds: Vec<f64> = losses.iter().map(|loss| thin_speed(*loss)).collect();
    let drags = drags(&wall, &mover, &speeds, monitor)?;
    Ok(drags.iter().map(|d| Banded { value: thin_scale() * d.value, band: thin_scale() * d.band }).collect())
}

fn universal(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    universal_against(&thin_wall::CURVE, monitor)
}

fn universal_against(table: &[(f64, f64)], monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let (wall, mover) = thin_wall_case();
    let mut losses: Vec<f64> = table.iter().map(|(loss, _)| *loss).collect();
    losses.extend((0..=DRAWN).map(|k| 0.01 * 10.0_f64.powf(4.0 * f64::from(k) / f64::from(DRAWN))));
    let found = thin_wall_curve(&losses, monitor)?;
    let mut verdict = Verdict::default();
    let drawn = losses.iter().zip(&found).skip(table.len()).map(|(loss, f)| (*loss, f.value)).collect();
    verdict.series.push(Series { name: "field solver".to_owned(), points: drawn });
    for (&(loss, table), figure) in table.iter().zip(found) {
        let integral = thin_scale() * endless::drag(&wall, &mover, thin_speed(loss))?.value;
        let truth = Truth { table, printed: half_figure(table, thin_wall::FIGURES), integral, relative: 5e-5 };
        hold(&mut verdict, &format!("drag a^4/(mu0 m^2) at V = {loss}"), figure, &truth, "1");
    }
    Ok(verdict)
}

fn critical(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let (wall, mover) = thin_wall_case();
    let speeds: Vec<f64> = [0.5, 1.0, 2.0, 4.0, 8.0].map(thin_speed).to_vec();
    let outcome = curve(&wall, &mover, &speeds, monitor)?;
    let (loss, drag) = thin_wall::GREATEST;
    let mut verdict = Verdict::default();
    let critical = figure(&outcome, "critical_speed")?;
    let found = Banded { value: critical.value / thin_speed(1.0), band: critical.band / thin_speed(1.0) };
    let limits = Limits { allowed: 2.0 * half_decimal(4), known_within: half_decimal(4) };
    verdict.compare_banded("V of the greatest drag", found, loss, limits, "1");
    let most = figure(&outcome, "drag_max")?;
    let found = Banded { value: thin_scale() * most.value, band: thin_scale() * most.band };
    // The sheet's thickness moves f by 1e-5 of it.
    let limits = Limits { allowed: 5e-5 * drag, known_within: THINNESS * drag + half_figure(drag, thin_wall::FIGURES) };
    verdict.compare_banded("greatest drag a^4/(mu0 m^2)", found, drag, limits, "1");
    Ok(verdict)
}

#[cfg(test)]
#[path = "field_planted.rs"]
mod planted;

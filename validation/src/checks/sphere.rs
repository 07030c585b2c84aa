//! A field switched on around a hollow sphere: a curved rim on a rectangular grid, and the order that this leaves.

use lenzbore_mesh::{Anchor, PlannedLine, Refinement, SizeLaw};
use lenzbore_solver::fault::SolveFault;
use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::step_field::StepField;

use super::step::{evenly, follow};
use super::{Check, Kind, Series, Verdict};
use crate::Error;
use crate::diffusion::{Body, Form, StepResponse};
use crate::references::{half_decimal, hollow_sphere as reference};

pub(super) const CHECKS: &[Check] = &[Check {
    name: "step-sphere",
    about: "field in a hollow sphere after a uniform field is switched on, its curved rim laid out in steps and in shares of cells",
    kind: Kind::CodeVerification,
    source: &reference::SOURCE,
    run: hollow_sphere,
}];

/// Levels of the grid.
const LEVELS: usize = 4;
/// Greatest error on the finest of them, over the applied field: 1.3 times what was found.
const STAIRCASE_ERROR: f64 = 5e-4;
const SHARES_ERROR: f64 = 7e-4;
/// The order that shares of cells give is 2; found 1.9 over these levels.
const ORDER_WITHIN: f64 = 0.3;
/// Steps have no steady order: from level to level the error falls with orders from 0.5 to 7, or rises (on levels 1 to 3 it was
/// 3.9e-3, 1.5e-3, 1.3e-3, 2.6e-4, 3.8e-4). It stays below this times the cell size over the thickness, so first order is what can be
/// counted on.
const STAIRCASE_BOUND: f64 = 2e-2;

/// The shell of the reference.
fn shell() -> Body {
    let (inner_radius_m, outer_radius_m) = reference::SHELL_M;
    let conductivity_s_per_m = reference::CONDUCTIVITY_S_PER_M;
    Body { form: Form::Sphere, inner_radius_m, outer_radius_m, conductivity_s_per_m }
}

/// Root mean square error of the cavity's field over the samples, by cell size over the shell's thickness.
fn convergence(rim: Rim, monitor: &dyn Monitor) -> Result<Vec<Level>, Error> {
    let series = StepResponse::new(shell());
    let samples = reference::CAVITY.map(|(t, _)| t);
    let mut levels = Vec::new();
    for refinement in Refinement::first(LEVELS) {
        let found = sphere(shell(), rim, refinement, &samples, monitor)?;
        let errors = found.iter().zip(samples).map(|(f, t)| f - series.mean(shell().inner_radius_m, t));
        let (sum, worst) = errors.fold((0.0, 0.0_f64), |(s, w), e: f64| (s + e * e, w.max(e.abs())));
        let cell = 1.0 / (ACROSS as f64 * refinement.factor());
        levels.push(Level { cell, error: (sum / samples.len() as f64).sqrt(), worst, found });
    }
    Ok(levels)
}

/// One level of a convergence study.
#[derive(Debug, Clone, PartialEq)]
struct Level {
    /// Cell size over the shell's thickness.
    cell: f64,
    /// Root mean square error over the samples, over the applied field.
    error: f64,
    /// Greatest error.
    worst: f64,
    /// Field in the cavity at the samples.
    found: Vec<f64>,
}

/// Slope of the straight line through ln(error) over ln(cell size).
fn order(levels: &[Level]) -> f64 {
    let n = levels.len() as f64;
    let points = || levels.iter().map(|l| (l.cell.ln(), l.error.ln()));
    let (mx, my) = (points().map(|p| p.0).sum::<f64>() / n, points().map(|p| p.1).sum::<f64>() / n);
    points().map(|(x, y)| (x - mx) * (y - my)).sum::<f64>() / points().map(|(x, _)| (x - mx).powi(2)).sum::<f64>()
}

fn hollow_sphere(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let mut verdict = Verdict::default();
    let series = StepResponse::new(shell());
    for (time, expected) in reference::CAVITY {
        let what = format!("cavity at {:.0} ms, series", 1e3 * time);
        verdict.compare(
            what,
            series.mean(shell().inner_radius_m, time),
            expected,
            half_decimal(reference::DECIMALS),
            "1",
        );
    }
    let rims =
        [(Rim::Staircase, "steps by cell centres", STAIRCASE_ERROR), (Rim::Shares, "shares of cells", SHARES_ERROR)];
    for (rim, name, allowed) in rims {
        let levels = convergence(rim, monitor)?;
        let points = levels.iter().map(|l| (l.cell, l.error)).collect();
        let steady =
            if rim == Rim::Shares { format!("order {:.1}", order(&levels)) } else { "no steady order".to_owned() };
        verdict.series.push(Series { name: format!("{name}: {steady}"), points });
        if let Some(finest) = levels.last() {
            for ((time, expected), found) in reference::CAVITY.into_iter().zip(&finest.found) {
                verdict.compare(format!("cavity at {:.0} ms, {name}", 1e3 * time), *found, expected, allowed, "1");
            }
            verdict.compare(format!("greatest error, {name}"), finest.worst, 0.0, allowed, "1");
        }
        if rim == Rim::Shares {
            verdict.compare(format!("order, {name}"), order(&levels), 2.0, ORDER_WITHIN, "1");
            continue;
        }
        for level in &levels {
            let what = format!("greatest error at {:.0} cells across, {name}", 1.0 / level.cell);
            verdict.compare(what, level.worst, 0.0, STAIRCASE_BOUND * level.cell, "1");
        }
    }
    Ok(verdict)
}

/// Each cell's share of metal.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Rim {
    /// All or nothing, by the centre of the cell.
    Staircase,
    /// The share of the cell that lies in the metal.
    Shares,
}

/// Square cells across the metal on the coarsest level, 11 thicknesses making the outer radius; the fine part ends half a thickness
/// outside the sphere.
const ACROSS: usize = 4;
/// Distance of the boundary, in outer radii.
const FAR: f64 = 60.0;

/// Mean of B_z over the middle disc of the cavity of half its radius, at all samples, over B0.
fn sphere(
    body: Body,
    rim: Rim,
    refinement: Refinement,
    samples_s: &[f64],
    monitor: &dyn Monitor,
) -> Result<Vec<f64>, Error> {
    let (inner, outer) = (body.inner_radius_m, body.outer_radius_m);
    let size = (outer - inner) / ACROSS as f64;
    let fine = outer + 2.0 * size;
    let law = SizeLaw { growth: 0.3, anchors: vec![Anchor { position_m: fine, size_m: size }], caps: Vec::new() };
    let outside = PlannedLine::new(&[fine, FAR * outer], &law).map_err(SolveFault::from)?;
    let mut r = evenly(0.0, fine, refinement.times(11 * ACROSS + 2));
    r.extend(outside.nodes(refinement).nodes());
    let z: Vec<f64> = r.iter().skip(1).rev().map(|r| -r).chain(r.iter().copied()).collect();
    let (columns, rows) = (r.len() - 1, z.len() - 1);
    let mut sigma = vec![0.0; columns * rows];
    for (cell, sigma) in sigma.iter_mut().enumerate() {
        let (i, j) = (cell % columns, cell / columns);
        *sigma = body.conductivity_s_per_m * share(rim, (inner, outer), (r[i], r[i + 1]), (z[j], z[j + 1]));
    }
    let mut field = StepField::new(&r, &z, &sigma, 1.0)?;
    let (middle, half) = (r.len() - 1, refinement.times(5 * ACROSS));
    let mut found = Vec::new();
    follow(&mut field, samples_s, refinement, monitor, |field| {
        found.push(field.mean_flux_density()?[middle * r.len() + half]);
        Ok(())
    })?;
    Ok(found)
}

/// Points a side at which a cell is asked whether it is metal.
const POINTS: u32 = 16;

fn share(rim: Rim, (inner, outer): (f64, f64), r: (f64, f64), z: (f64, f64)) -> f64 {
    let is_metal = |r: f64, z: f64| (inner..outer).contains(&r.hypot(z));
    let points = if rim == Rim::Staircase { 1 } else { POINTS };
    let between = |(from, to): (f64, f64), k: u32| from + (to - from) * (f64::from(k) + 0.5) / f64::from(points);
    let all = (0..points).flat_map(|i| (0..points).map(move |j| (i, j)));
    let metal = all.filter(|(i, j)| is_metal(between(r, *i), between(z, *j))).count();
    metal as f64 / f64::from(points * points)
}

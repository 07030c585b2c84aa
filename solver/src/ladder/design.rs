//! The design in an endless wall, and its neighbours: other wall thickness, other size of magnets.

use super::rows::runs_inside;
use crate::fault::SolveFault;
use crate::grid_rules::reynolds_per_speed;
use crate::placement::source_sizes;
use crate::problem::{Accuracy, Extent, Layer, Mover, Part, Problem, SnapshotPlan, Travel};
use crate::sources::Source;

/// Closest that scaled magnets come to the wall, relative to the bore radius.
const LEAST_GAP: f64 = 0.03;

/// The same cross-section without ends, settled fields at `speed`; none where layers do not run from end to end.
pub(super) fn endless(problem: &Problem, speed: f64) -> Option<Problem> {
    if let Extent::Finite { length_m } = problem.wall.extent {
        let whole = |l: &Layer| l.from_m <= 1e-9 * length_m && l.to_m >= length_m * (1.0 - 1e-9);
        if !problem.wall.layers.iter().all(whole) {
            return None;
        }
    }
    let mut endless = problem.clone();
    endless.wall.extent = Extent::Endless;
    for layer in &mut endless.wall.layers {
        (layer.from_m, layer.to_m) = (0.0, 0.0);
    }
    endless.travel = Travel::Steady { velocity_m_per_s: speed };
    endless.accuracy = Accuracy { target_relative: 1.0e-2, levels: Some(3), cells_across_wall: None };
    endless.snapshots = SnapshotPlan::None;
    Some(endless)
}

/// Speed at which mu0 times the sum of sigma mu_r w times it is 1, m/s; none where nothing conducts.
pub(super) fn reference_speed(problem: &Problem) -> Option<f64> {
    let per_speed = reynolds_per_speed(&problem.wall);
    (per_speed > 0.0).then(|| 1.0 / per_speed)
}

/// Whether the mover runs inside all layers, or around all of them; none where it runs between them.
pub(super) fn side(problem: &Problem) -> Option<bool> {
    let inside = |l: &Layer| runs_inside(l, &problem.mover);
    let around = |l: &Layer| problem.mover.parts.iter().all(|p| source_sizes(&p.source).0 > l.outer_radius_m);
    let layers = &problem.wall.layers;
    if layers.iter().all(inside) {
        Some(true)
    } else if layers.iter().all(around) {
        Some(false)
    } else {
        None
    }
}

/// Radius of the face towards the mover, m.
pub(super) fn face(problem: &Problem, inside: bool) -> f64 {
    if inside { problem.wall.inner_radius_m() } else { problem.wall.outer_radius_m() }
}

/// Whole thickness of the wall over the radius of its face towards the mover.
pub(super) fn thickness_ratio(problem: &Problem, inside: bool) -> f64 {
    (problem.wall.outer_radius_m() - problem.wall.inner_radius_m()) / face(problem, inside)
}

/// The wall made `scale` times as thick, all layers alike; the face towards the mover stays.
pub(super) fn with_thickness(problem: &Problem, inside: bool, scale: f64) -> Problem {
    let face = face(problem, inside);
    let mut scaled = problem.clone();
    for layer in &mut scaled.wall.layers {
        for radius in [&mut layer.inner_radius_m, &mut layer.outer_radius_m] {
            *radius = (face + scale * (*radius - face)).max(0.0);
        }
    }
    scaled
}

/// The scales between which magnets clear the wall, at most a quarter to twice their size.
pub(super) fn magnet_scales(problem: &Problem, inside: bool) -> (f64, f64) {
    let face = face(problem, inside);
    let sizes = problem.mover.parts.iter().map(|p| source_sizes(&p.source));
    if inside {
        let outer = sizes.map(|s| s.1).fold(0.0, f64::max);
        (0.25, f64::min(2.0, (1.0 - LEAST_GAP) * face / outer.max(1e-12)))
    } else {
        let inner = sizes.map(|s| s.0).fold(f64::INFINITY, f64::min);
        (f64::max(0.25, (1.0 + LEAST_GAP) * face / inner), 2.0)
    }
}

/// All parts and their distances made `scale` times as large; remanences stay.
///
/// # Errors
/// Those of the recoil permeability, solved again.
pub(super) fn with_magnets(problem: &Problem, scale: f64) -> Result<Problem, SolveFault> {
    let part = |p: &Part| {
        let mut part = p.clone();
        part.centre_m *= scale;
        for size in [&mut part.outline.inner_radius_m, &mut part.outline.outer_radius_m, &mut part.outline.length_m] {
            *size *= scale;
        }
        match &mut part.source {
            Source::Dipole { moment_a_m2 } => *moment_a_m2 *= scale.powi(3),
            Source::Magnet { inner_radius_m, outer_radius_m, length_m, .. }
            | Source::Coil { inner_radius_m, outer_radius_m, length_m, .. } => {
                *inner_radius_m *= scale;
                *outer_radius_m *= scale;
                *length_m *= scale;
            }
        }
        part
    };
    let mut mover = Mover { parts: problem.mover.parts.iter().map(part).collect(), ..problem.mover.clone() };
    mover.renew_recoil()?;
    Ok(Problem { mover, ..problem.clone() })
}

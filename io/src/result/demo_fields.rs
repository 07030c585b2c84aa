//! Made-up fields: the mover's own by its closed form, a wake of wall currents by formula.

#![allow(clippy::unwrap_used, clippy::cast_precision_loss, reason = "made-up data for tests")]

use lenzbore_solver::outcome::{Fields, Snapshot};
use lenzbore_solver::problem::{Extent, Problem};
use lenzbore_solver::sources::AxialField as _;

/// Grid and one snapshot a position of the mover, moving at `velocity`.
pub(crate) fn fields(problem: &Problem, positions: &[f64], velocity: f64) -> Fields {
    let (r_m, z_m) = (radii(problem), heights(problem, positions));
    let (nr, nz) = (r_m.len(), z_m.len());
    let cells = || (0..nz - 1).flat_map(|j| (0..nr - 1).map(move |i| (i, j)));
    let middle = |x: &[f64], i: usize| 0.5 * (x[i] + x[i + 1]);
    let region: Vec<usize> = cells().map(|(i, j)| region(problem, middle(&r_m, i), middle(&z_m, j))).collect();
    let of = |pick: fn(&lenzbore_solver::problem::Layer) -> f64, free: f64| {
        region.iter().map(|n| n.checked_sub(1).map_or(free, |n| pick(&problem.wall.layers[n]))).collect::<Vec<f64>>()
    };
    let conductivity = of(|l| l.conductivity_s_per_m, 0.0);
    let mut fields = Fields {
        relative_permeability: of(|l| l.relative_permeability, 1.0),
        region_names: std::iter::once("free space".to_owned())
            .chain(problem.wall.layers.iter().map(|l| l.name.clone()))
            .collect(),
        region,
        conductivity,
        r_m,
        z_m,
        snapshots: Vec::new(),
    };
    for (n, position) in positions.iter().enumerate() {
        let snapshot = snapshot(problem, &fields, 0.05 * n as f64, *position, velocity);
        fields.snapshots.push(snapshot);
    }
    fields
}

fn snapshot(problem: &Problem, fields: &Fields, time_s: f64, position: f64, velocity: f64) -> Snapshot {
    let mover = &problem.mover;
    let nodes = || fields.z_m.iter().flat_map(|z| fields.r_m.iter().map(move |r| (*r, *z - position)));
    let a = problem.wall.inner_radius_m().max(1e-3);
    let b = problem.wall.outer_radius_m();
    let reaction = |r: f64, z: f64| {
        let z = z - 0.3 * b * velocity.signum();
        let outside = mover.psi(r.hypot(b), z + 0.1 * b) - mover.psi(r.hypot(b), z - 0.1 * b);
        0.2 * velocity * (r / b).powi(2) / (1.0 + (r / b).powi(2)) * outside
    };
    let psi_reaction: Vec<f64> = nodes().map(|(r, z)| reaction(r, z)).collect();
    let psi_total = nodes().zip(&psi_reaction).map(|((r, z), part)| mover.psi(r, z) + part).collect();
    let (nr, nz) = (fields.r_m.len(), fields.z_m.len());
    let cells: Vec<(f64, f64)> = (0..nz - 1)
        .flat_map(|j| (0..nr - 1).map(move |i| (i, j)))
        .map(|(i, j)| (0.5 * (fields.r_m[i] + fields.r_m[i + 1]), 0.5 * (fields.z_m[j] + fields.z_m[j + 1]) - position))
        .collect();
    let current_density_phi: Vec<f64> = cells
        .iter()
        .zip(&fields.conductivity)
        .map(|((r, z), sigma)| {
            let depth = (r - a).max(0.0) / a;
            let lag = 0.3 * depth * a * velocity.signum();
            if *sigma > 0.0 { -sigma * velocity * mover.flux_density_r(*r, z - lag) * (-depth).exp() } else { 0.0 }
        })
        .collect();
    Snapshot {
        time_s,
        mover_position_m: position,
        psi_total,
        psi_reaction,
        flux_density_r: cells.iter().map(|(r, z)| mover.flux_density_r(*r, *z)).collect(),
        flux_density_z: cells.iter().map(|(r, z)| mover.flux_density_z(*r, *z)).collect(),
        heat_density: current_density_phi
            .iter()
            .zip(&fields.conductivity)
            .map(|(j, sigma)| if *sigma > 0.0 { j * j / sigma } else { 0.0 })
            .collect(),
        current_density_phi,
    }
}

fn region(problem: &Problem, r: f64, z: f64) -> usize {
    let inside = |l: &lenzbore_solver::problem::Layer| {
        let along = problem.wall.extent == Extent::Endless || (l.from_m..l.to_m).contains(&z);
        along && (l.inner_radius_m..l.outer_radius_m).contains(&r)
    };
    problem.wall.layers.iter().position(inside).map_or(0, |n| n + 1)
}

/// Lines on every face, eight cells a layer, growing to ten outer radii.
fn radii(problem: &Problem) -> Vec<f64> {
    let mut faces: Vec<f64> = std::iter::once(0.0)
        .chain(problem.wall.layers.iter().flat_map(|l| [l.inner_radius_m, l.outer_radius_m]))
        .collect();
    faces.sort_by(f64::total_cmp);
    faces.dedup();
    let mut lines = vec![0.0];
    for pair in faces.windows(2) {
        lines.extend((1..=8).map(|i| pair[0] + (pair[1] - pair[0]) * f64::from(i) / 8.0));
    }
    let outer = *faces.last().unwrap();
    lines.extend((1..=14).map(|i| outer * 10.0_f64.powf(f64::from(i) / 14.0)));
    lines
}

/// Lines on the ends of the wall, close about the mover, growing outward.
fn heights(problem: &Problem, positions: &[f64]) -> Vec<f64> {
    let a = problem.wall.outer_radius_m();
    let low = positions.iter().copied().fold(f64::INFINITY, f64::min) - 4.0 * a;
    let high = positions.iter().copied().fold(f64::NEG_INFINITY, f64::max) + 4.0 * a;
    let mut lines: Vec<f64> = (0..=120).map(|i| low + (high - low) * f64::from(i) / 120.0).collect();
    lines.extend((1..=10).map(|i| low - a * (1.4_f64.powi(i) - 1.0)));
    lines.extend((1..=10).map(|i| high + a * (1.4_f64.powi(i) - 1.0)));
    if let Some(length) = problem.wall.length_m() {
        lines.extend([0.0, length]);
    }
    lines.sort_by(f64::total_cmp);
    lines.dedup_by(|b, a| *b - *a < 1e-9);
    lines
}

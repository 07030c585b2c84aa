//! The field at one point with the wall over that without it.

use lenzbore_mesh::Grid;
use num_complex::Complex64;

use crate::interpolate::{ALONG_POINTS, POINTS, Stencil};
use crate::problem::{Mover, Problem};
use crate::sources::{AxialField, Source};

/// Radius of the point outside the wall, in its outer radii.
const OUTSIDE: f64 = 1.5;

/// Where shielding is taken: 1.5 outer radii from the axis where coils stand within a layer, else on the axis; at height `z`.
pub(super) fn place(problem: &Problem, z: f64) -> (f64, f64) {
    let enclosed = problem.mover.parts.iter().any(|part| match part.source {
        Source::Coil { outer_radius_m, .. } => problem.wall.layers.iter().any(|l| l.inner_radius_m >= outer_radius_m),
        _ => false,
    });
    if enclosed { (OUTSIDE * problem.wall.outer_radius_m(), z) } else { (0.0, z) }
}

/// B . B_s / |B_s|^2 at `point`: B_s the coils' own field (exact), B with the wall's reaction. `None` where B_s vanishes.
pub(super) fn ratio(grid: &Grid, reaction: &[Vec<f64>; 2], mover: &Mover, point: (f64, f64)) -> Option<Complex64> {
    let own = (mover.flux_density_r(point.0, point.1), mover.flux_density_z(point.0, point.1));
    let square = own.0 * own.0 + own.1 * own.1;
    if square <= 0.0 {
        return None;
    }
    let [real, imaginary] = [0, 1].map(|k| {
        let (b_r, b_z) = flux_density(grid, &reaction[k], point);
        (own.0 * b_r + own.1 * b_z) / square
    });
    Some(Complex64::new(1.0 + real, imaginary))
}

/// B_r and B_z of psi at `(r, z)`: on the axis from 2 psi / r^2 at the three radii next to it, an even function of r.
fn flux_density(grid: &Grid, psi: &[f64], (r, z): (f64, f64)) -> (f64, f64) {
    let along = Stencil::<ALONG_POINTS>::at(grid.z.nodes(), z);
    if r <= 0.0 {
        let nodes = grid.r.nodes();
        let squares = [1, 2, 3].map(|i| nodes[i] * nodes[i]);
        let to_axis = Stencil::<3>::over(&squares, 0.0);
        let row = |n: usize| {
            let at = |k: usize| 2.0 * psi[grid.node(k + 1, along.first + n)] / squares[k];
            (0..3).map(|k| to_axis.value[k] * at(k)).sum::<f64>()
        };
        return (0.0, along.value.iter().enumerate().map(|(n, w)| w * row(n)).sum());
    }
    let across = Stencil::<POINTS>::at(grid.r.nodes(), r);
    let row = |n: usize| &psi[grid.node(0, along.first + n)..];
    let slope_z: f64 = along.slope.iter().enumerate().map(|(n, w)| w * across.value_of(row(n))).sum();
    let slope_r: f64 = along.value.iter().enumerate().map(|(n, w)| w * across.slope_of(row(n))).sum();
    (-slope_z / r, slope_r / r)
}

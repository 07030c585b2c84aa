//! Quality figures of one grid level.

use lenzbore_mesh::{Grid, LineQuality, cells_between};

use crate::grid_rules::depth;
use crate::outcome::GridReport;
use crate::placement::Placement;
use crate::problem::Problem;

/// Measures `grid` for `problem` at `speed`.
pub(crate) fn grid_report(
    problem: &Problem,
    placement: &Placement,
    grid: &Grid,
    refinement: f64,
    speed: f64,
) -> GridReport {
    let (r, z) = (LineQuality::of(&grid.r), LineQuality::of(&grid.z));
    let mut across = usize::MAX;
    let mut aspect = 1.0_f64;
    let mut in_depth = f64::INFINITY;
    for layer in &problem.wall.layers {
        across = across.min(cells_between(&grid.r, layer.inner_radius_m, layer.outer_radius_m));
        let first = grid.r.nearest(layer.inner_radius_m);
        let last = grid.r.nearest(layer.outer_radius_m);
        let smallest = (first..last).map(|i| grid.r.cell(i)).fold(f64::INFINITY, f64::min);
        aspect = aspect.max(z.smallest_m / smallest).max(smallest / z.smallest_m);
        // The cells at the faces, where currents crowd (a rod has one face).
        let inner = if layer.inner_radius_m > 0.0 { grid.r.cell(first) } else { f64::INFINITY };
        let at_face = grid.r.cell(last - 1).min(inner);
        in_depth = in_depth.min(depth(layer, placement.wavelength_m, speed) / at_face);
    }
    GridReport {
        refinement,
        nodes_r: grid.nr(),
        nodes_z: grid.nz(),
        cells_across_wall: across,
        cells_across_depth: in_depth.is_finite().then_some(in_depth),
        growth: r.growth.max(z.growth),
        aspect,
        steps: 0,
        residual: 0.0,
    }
}

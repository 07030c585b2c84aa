//! The greatest opposing field at one instant, with the reaction of the wall.

use lenzbore_mesh::Grid;

use super::points::{Point, points_of};
use crate::constants::MU0;
use crate::interpolate::Stencil;
use crate::problem::Mover;

/// Nodes of an interpolation, either way.
const NODES: usize = 4;

/// The magnets that are watched.
#[derive(Debug, Clone)]
pub(crate) struct Watch {
    points: Vec<Point>,
}

/// The greatest opposing field, and where the coercivity leaves least.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub(crate) struct Opposed {
    /// -H, A/m.
    pub(crate) field: f64,
    /// Its place in the mover's frame (r, z), m.
    pub(crate) field_at: (f64, f64),
    /// 1 - (-H) / HcJ.
    pub(crate) margin: f64,
    /// Its place in the mover's frame (r, z), m.
    pub(crate) margin_at: (f64, f64),
}

impl Watch {
    /// Watches the magnets of `mover` whose coercivity is known; `None` where there is none.
    pub(crate) fn new(mover: &Mover) -> Option<Self> {
        let points = points_of(mover);
        if points.is_empty() { None } else { Some(Self { points }) }
    }

    /// The worst with the reaction field `psi` at the nodes of `grid` (Wb/rad), the mover's reference point at `position`, m.
    pub(crate) fn worst(&self, grid: &Grid, psi: &[f64], position: f64) -> Opposed {
        let mut worst = Opposed { field: f64::NEG_INFINITY, margin: f64::INFINITY, ..Opposed::default() };
        for point in &self.points {
            let opposing = point.own - point.sense * axial_flux_density(grid, psi, point.r, position + point.z);
            let (field, margin) = (opposing / MU0, 1.0 - opposing / point.coercivity);
            if field > worst.field {
                (worst.field, worst.field_at) = (field, (point.r, point.z));
            }
            if margin < worst.margin {
                (worst.margin, worst.margin_at) = (margin, (point.r, point.z));
            }
        }
        worst
    }
}

/// B_z = (1/r) d psi/dr = 2 d psi/d(r^2) at (r, z) by cubics through the nearest nodes, in r^2 for psi is even in r; nothing beyond the grid.
fn axial_flux_density(grid: &Grid, psi: &[f64], r: f64, z: f64) -> f64 {
    let (rs, zs) = (grid.r.nodes(), grid.z.nodes());
    let inside = |nodes: &[f64], x: f64| {
        nodes.first().is_some_and(|low| x >= *low) && nodes.last().is_some_and(|high| x <= *high)
    };
    if rs.len() < NODES || zs.len() < NODES || !inside(rs, r) || !inside(zs, z) {
        return 0.0;
    }
    let first = rs.partition_point(|&x| x <= r).saturating_sub(NODES / 2).min(rs.len() - NODES);
    let squares: [f64; NODES] = std::array::from_fn(|i| rs[first + i] * rs[first + i]);
    let (across, along) = (Stencil::<NODES>::over(&squares, r * r), Stencil::<NODES>::at(zs, z));
    let slope = |j: usize| across.slope_of(&psi[grid.node(first, along.first + j)..]);
    2.0 * along.value.iter().enumerate().map(|(j, weight)| weight * slope(j)).sum::<f64>()
}

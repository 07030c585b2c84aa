//! Dimensionless numbers that say which effects matter.

use crate::grid_rules::{depth, reynolds_per_speed};
use crate::outcome::Regime;
use crate::placement::Placement;
use crate::problem::Problem;

/// The regime of `problem` at `speed`.
pub(crate) fn regime(problem: &Problem, placement: &Placement, speed: f64) -> Regime {
    let wall = &problem.wall;
    let thickness: f64 = wall.outer_radius_m() - wall.inner_radius_m();
    let shallowest = wall
        .layers
        .iter()
        .map(|l| depth(l, placement.wavelength_m, speed) / l.thickness_m())
        .fold(f64::INFINITY, f64::min);
    Regime {
        thickness_ratio: thickness / placement.scale_m,
        gap_ratio: placement.gap_m / placement.scale_m,
        magnetic_reynolds: reynolds_per_speed(wall) * speed,
        depth_ratio: shallowest.is_finite().then_some(shallowest),
        speed_m_per_s: speed,
    }
}

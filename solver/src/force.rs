//! Force on the mover by two of the three routes: the reaction field on the mover's equivalent currents, and the Maxwell
//! stress in the running gap. (The third, J x B over the wall, is a sum over ring currents and stands with each law.)

use std::f64::consts::PI;

use lenzbore_mesh::Grid;

use crate::constants::MU0;
use crate::interpolate::{POINTS, Stencil};
use crate::placement::{MoverSide, StressBand};
use crate::problem::Mover;
use crate::sources::Source;

/// Axial force of a reaction field on the mover's equivalent currents with its reference point at `position`, N.
///
/// A current sheet K from z1 to z2 at radius R feels 2 pi K (psi(R, z2) - psi(R, z1)); a dipole m feels m dB_z/dz.
pub(crate) fn on_mover(grid: &Grid, psi_reaction: &[f64], mover: &Mover, position: f64) -> f64 {
    let psi = |r: f64, z: f64| psi_at(grid, psi_reaction, r, z);
    let mut force = 0.0;
    for part in &mover.parts {
        let centre = position + part.centre_m;
        force += match part.source {
            Source::Dipole { moment_a_m2 } => moment_a_m2 * axial_gradient_on_axis(grid, psi_reaction, centre),
            Source::Magnet { inner_radius_m, outer_radius_m, length_m, remanence_tesla } => {
                let rise = |r: f64| psi(r, centre + 0.5 * length_m) - psi(r, centre - 0.5 * length_m);
                let inner = if inner_radius_m > 0.0 { rise(inner_radius_m) } else { 0.0 };
                2.0 * PI * remanence_tesla / MU0 * (rise(outer_radius_m) - inner)
            }
            Source::Coil { inner_radius_m, outer_radius_m, length_m, ampere_turns } => {
                let rise = |r: f64| psi(r, centre + 0.5 * length_m) - psi(r, centre - 0.5 * length_m);
                let density = ampere_turns / (length_m * (outer_radius_m - inner_radius_m));
                2.0 * PI * density * simpson(inner_radius_m, outer_radius_m, rise)
            }
        };
    }
    force
}

/// Composite Simpson rule with 16 panels, for the smooth reaction field across a coil.
fn simpson(from: f64, to: f64, f: impl Fn(f64) -> f64) -> f64 {
    const PANELS: u32 = 16;
    let h = (to - from) / f64::from(PANELS);
    let inner: f64 = (1..PANELS).map(|k| if k % 2 == 1 { 4.0 } else { 2.0 } * f(from + h * f64::from(k))).sum();
    (f(from) + inner + f(to)) * h / 3.0
}

/// psi at any point by local interpolation; psi = 0 on the axis.
pub(crate) fn psi_at(grid: &Grid, psi: &[f64], r: f64, z: f64) -> f64 {
    let (qr, qz) = (Stencil::<POINTS>::at(grid.r.nodes(), r), Stencil::<POINTS>::at(grid.z.nodes(), z));
    let row = |n: usize| qr.value_of(&psi[grid.node(0, qz.first + n)..]);
    qz.value.iter().enumerate().map(|(n, w)| w * row(n)).sum()
}

/// Points along the axis for the gradient that a dipole feels: B_z of the wall's currents is smooth there on the scale
/// of the bore radius, in cells of an eighth of it.
const AXIAL_POINTS: usize = 10;
/// Radii from the axis whose polynomial in r^2 gives the limit on it.
const AXIS_RADII: usize = 4;

/// dB_z/dz on the axis: B_z = 2 psi / r^2 there, as the limit of the polynomial in r^2 through the first radii.
fn axial_gradient_on_axis(grid: &Grid, psi: &[f64], z: f64) -> f64 {
    let squares: Vec<f64> = grid.r.nodes()[1..=AXIS_RADII].iter().map(|r| r * r).collect();
    let limit_weight = |k: usize| -> f64 {
        (0..AXIS_RADII).filter(|&m| m != k).map(|m| squares[m] / (squares[m] - squares[k])).product()
    };
    let qz = Stencil::<AXIAL_POINTS>::at(grid.z.nodes(), z);
    let on_axis = |n: usize| -> f64 {
        let base = grid.node(1, qz.first + n);
        (0..AXIS_RADII).map(|k| limit_weight(k) * 2.0 * psi[base + k] / squares[k]).sum()
    };
    qz.slope.iter().enumerate().map(|(n, w)| w * on_axis(n)).sum()
}

/// Axial force on the mover by the Maxwell stress averaged over the running gap, N.
///
/// F = (2 pi / (mu0 (r2 - r1))) integral of r (B_sr B_rz + B_rr B_sz) dr dz, the mover's own field s and the reaction
/// field r from differences of `psi_source` and `psi_reaction` (all nodes; the source's are read in the bands only). Products
/// of either field with itself carry no net force.
pub(crate) fn by_stress(grid: &Grid, psi_reaction: &[f64], psi_source: &[f64], bands: &[StressBand]) -> f64 {
    let r = grid.r.nodes();
    let mut force = 0.0;
    for band in bands {
        let (first, last) = (grid.r.nearest(band.inner_m), grid.r.nearest(band.outer_m));
        let mut sum = 0.0;
        for j in 0..grid.nz() - 1 {
            for i in first..last {
                let (b_r, b_z) = cell_flux_density(grid, psi_reaction, i, j);
                let (s_r, s_z) = cell_flux_density(grid, psi_source, i, j);
                sum += 0.5 * (r[i] + r[i + 1]) * (s_r * b_z + b_r * s_z) * grid.r.cell(i) * grid.z.cell(j);
            }
        }
        let sign = if band.mover == MoverSide::Inside { 1.0 } else { -1.0 };
        force += sign * 2.0 * PI / (MU0 * (r[last] - r[first])) * sum;
    }
    force
}

/// Flux density (B_r, B_z) at the centre of cell (i, j) from differences of psi, T.
pub(crate) fn cell_flux_density(grid: &Grid, psi: &[f64], i: usize, j: usize) -> (f64, f64) {
    let r = grid.r.nodes();
    let (p00, p10) = (psi[grid.node(i, j)], psi[grid.node(i + 1, j)]);
    let (p01, p11) = (psi[grid.node(i, j + 1)], psi[grid.node(i + 1, j + 1)]);
    let area = (r[i + 1] - r[i]) * (r[i + 1] + r[i]);
    let b_z = ((p10 - p00) + (p11 - p01)) / area;
    // B_r = -(1/r) dpsi/dz, zero on the axis: the mean of the two bands.
    let outer = (p11 - p10) / r[i + 1];
    let inner = if i > 0 { (p01 - p00) / r[i] } else { 0.0 };
    (-0.5 * (inner + outer) / grid.z.cell(j), b_z)
}

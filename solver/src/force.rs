//! Force on the mover by two of the three routes: the reaction field on the mover's equivalent currents, and the Maxwell
//! stress in the running gap. (The third, J x B over the wall, is a sum over ring currents and stands with each law.)

use std::f64::consts::PI;

use lenzbore_mesh::Grid;

use crate::constants::MU0;
use crate::interpolate::{ALONG_POINTS, POINTS, Stencil};
use crate::placement::{MoverSide, Placement, StressFace};
use crate::problem::{Mover, Problem};
use crate::sources::{AxialField, Source};

/// Axial force of a reaction field on the mover's equivalent currents with its reference point at `position`, N.
///
/// A current sheet K from z1 to z2 at radius R feels 2 pi K (psi(R, z2) - psi(R, z1)); a dipole m feels m dB_z/dz. `gap` is the
/// free distance around a dipole, m. The filaments of a recoil permeability feel 2 pi I d psi/dz.
pub(crate) fn on_mover(grid: &Grid, psi_reaction: &[f64], mover: &Mover, position: f64, gap: f64) -> f64 {
    let psi = |r: f64, z: f64| psi_at(grid, psi_reaction, r, z);
    let mut force = 0.0;
    for part in &mover.parts {
        let centre = position + part.centre_m;
        force += match part.source {
            Source::Dipole { moment_a_m2 } => on_dipole(grid, psi_reaction, moment_a_m2, centre, gap),
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
    force + on_recoil(grid, psi_reaction, mover, position)
}

/// Force on the bound currents that recoil permeability adds, N: a filament I feels 2 pi I d psi/dz.
fn on_recoil(grid: &Grid, psi: &[f64], mover: &Mover, position: f64) -> f64 {
    let slope = |r: f64, z: f64| {
        let (qr, qz) = (Stencil::<POINTS>::at(grid.r.nodes(), r), Stencil::<ALONG_POINTS>::at(grid.z.nodes(), z));
        let row = |n: usize| qr.value_of(&psi[grid.node(0, qz.first + n)..]);
        qz.slope.iter().enumerate().map(|(n, w)| w * row(n)).sum::<f64>()
    };
    let filaments = mover.recoil.iter().flat_map(|recoil| recoil.filaments());
    2.0 * PI / MU0 * filaments.map(|f| f.tesla_metre * slope(f.radius_m, position + f.height_m)).sum::<f64>()
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
    let (qr, qz) = (Stencil::<POINTS>::at(grid.r.nodes(), r), Stencil::<ALONG_POINTS>::at(grid.z.nodes(), z));
    let row = |n: usize| qr.value_of(&psi[grid.node(0, qz.first + n)..]);
    qz.value.iter().enumerate().map(|(n, w)| w * row(n)).sum()
}

/// Midpoints over a meridian of the sphere that stands for a dipole; the integrand is smooth and periodic.
const MERIDIAN_POINTS: u32 = 32;

/// m dB_z/dz for a dipole, as the force on a uniformly magnetised sphere of the same moment and `radius`: by the mean value
/// of a harmonic field they are the same, and the sphere needs no derivative at a point.
///
/// F = 2 pi M radius integral of (d psi/dz)(radius sin t, radius cos t) sin t dt, M = 3 m / (4 pi radius^3).
fn on_dipole(grid: &Grid, psi: &[f64], moment: f64, centre: f64, radius: f64) -> f64 {
    let step = PI / f64::from(MERIDIAN_POINTS);
    let mut sum = 0.0;
    for k in 0..MERIDIAN_POINTS {
        let (sin, cos) = ((f64::from(k) + 0.5) * step).sin_cos();
        let qr = Stencil::<POINTS>::at(grid.r.nodes(), radius * sin);
        let qz = Stencil::<ALONG_POINTS>::at(grid.z.nodes(), centre + radius * cos);
        let row = |n: usize| qr.value_of(&psi[grid.node(0, qz.first + n)..]);
        let slope: f64 = qz.slope.iter().enumerate().map(|(n, w)| w * row(n)).sum();
        sum += slope * sin * step;
    }
    1.5 * moment * sum / (radius * radius)
}

/// Distance from the mover's ends, in bore radii, beyond which the product of both fields no longer counts (it falls with
/// the seventh power of the distance at least).
const STRESS_REACH: f64 = 16.0;

/// Axial force on the mover by the Maxwell stress on the wall's faces, its reference point at `position`, N.
///
/// F = (2 pi R / mu0) integral of (B_sr B_rz + B_rr B_sz) dz over a cylinder around the mover (with the other sign inside
/// it), by the trapezoidal rule over the nodes, the mover's own field s exact. Products of either field with itself carry no
/// net force.
pub(crate) fn by_stress(
    grid: &Grid,
    psi_reaction: &[f64],
    problem: &Problem,
    placement: &Placement,
    position: f64,
) -> f64 {
    let z = grid.z.nodes();
    let reach = STRESS_REACH * placement.scale_m;
    let first = grid.z.nearest(position + placement.lowest_m - reach).max(1);
    let last = grid.z.nearest(position + placement.highest_m + reach).min(grid.nz() - 2);
    let mut force = 0.0;
    for face in &placement.stress_faces {
        let reader = FaceReader::new(grid, face);
        let mut sum = 0.0;
        for (j, &height) in z.iter().enumerate().take(last + 1).skip(first) {
            let (slope_r, slope_z) = reader.slopes(psi_reaction, j);
            let own_r = problem.mover.flux_density_r(face.radius_m, height - position);
            let own_z = problem.mover.flux_density_z(face.radius_m, height - position);
            sum += grid.z.dual(j) * (own_r * slope_r - slope_z * own_z);
        }
        let sign = if face.mover == MoverSide::Inside { 1.0 } else { -1.0 };
        force += sign * 2.0 * PI / MU0 * sum;
    }
    force
}

/// Reads d psi/dr and d psi/dz of the reaction on the air side of a wall face.
struct FaceReader<'g> {
    grid: &'g Grid,
    /// Node row of the face, and its neighbour in the air.
    face: usize,
    air: usize,
    /// Off the face: first of the rows in the air, and the stencil across them.
    across: Option<(usize, Stencil<POINTS>)>,
}

impl<'g> FaceReader<'g> {
    fn new(grid: &'g Grid, face: &StressFace) -> Self {
        let r = grid.r.nodes();
        let i = grid.r.nearest(face.face_m);
        let (air, from) = match face.mover {
            MoverSide::Inside => (i.saturating_sub(1), i.saturating_sub(POINTS - 1)),
            MoverSide::Outside => (i + 1, i),
        };
        let off_face = (face.radius_m - face.face_m).abs() > 0.0;
        let across = off_face.then(|| (from, Stencil::over(&r[from..from + POINTS], face.radius_m)));
        Self { grid, face: i, air, across }
    }

    fn slopes(&self, psi: &[f64], j: usize) -> (f64, f64) {
        let z = self.grid.z.nodes();
        let central = |value: &dyn Fn(usize) -> f64| (value(j + 1) - value(j - 1)) / (z[j + 1] - z[j - 1]);
        if let Some((from, across)) = &self.across {
            let row = |j: usize| across.value_of(&psi[self.grid.node(*from, j)..]);
            return (across.slope_of(&psi[self.grid.node(*from, j)..]), central(&row));
        }
        let row = |j: usize| psi[self.grid.node(self.face, j)];
        (self.slope_at_face(psi, j), central(&row))
    }

    /// d psi/dr on the face's air side as the scheme itself sees it: the flux through the annulus next to the face, carried over
    /// half a cell by dB_z/dr = dB_r/dz. Its error runs in even powers.
    fn slope_at_face(&self, psi: &[f64], j: usize) -> f64 {
        let (r, z) = (self.grid.r.nodes(), self.grid.z.nodes());
        let (here, there) = (r[self.face], r[self.air]);
        let at = |i: usize, j: usize| psi[self.grid.node(i, j)];
        let flux = 2.0 * (at(self.face, j) - at(self.air, j)) / ((here - there) * (here + there));
        let rise = (at(self.face, j + 1) - at(self.face, j)) / (z[j + 1] - z[j]);
        let fall = (at(self.face, j) - at(self.face, j - 1)) / (z[j] - z[j - 1]);
        here * flux - 0.5 * (here - there) * (rise - fall) / self.grid.z.dual(j)
    }
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

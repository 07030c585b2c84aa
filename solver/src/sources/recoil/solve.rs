//! The boundary integral: the change c of the bound currents on all faces, by collocation at the panels' nodes.
//!
//! c = fixed + factor (B0 + Bbar[c]) at every node, B0 the closed-form field of all parts with recoil permeability 1, Bbar[c] the
//! tangential field of the sheets c themselves. Coplanar sheets make no B_r in their plane, and on a cylinder the kernel is only
//! logarithmic, so the mean of both sides needs no limit.

use faer::Mat;
use faer::linalg::solvers::Solve;

use super::faces::{Face, Surface};
use super::panels::{Basis, Density, Panel, near_points, panels};
use crate::fault::SolveFault;
use crate::sources::AxialField;
use crate::sources::current_loop::LoopGeometry;

/// How finely the boundary is cut.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Fineness {
    /// Nodes a panel.
    pub(super) nodes: usize,
    /// The panels at edges against the usual.
    pub(super) size: f64,
}

impl Fineness {
    /// What production takes: 1e-9 of the field outside, see the tests.
    pub(super) const USUAL: Self = Self { nodes: 12, size: 1.0 };
}

/// A collocation point.
struct Point {
    face: usize,
    panel: usize,
    r: f64,
    z: f64,
    /// d s/d u.
    stretch: f64,
}

/// Solves for the densities on `faces` in the field `free` of all parts with recoil permeability 1.
///
/// # Errors
/// A solution that is not finite.
pub(super) fn solve(
    faces: &[Face],
    free: &dyn AxialField,
    basis: &Basis,
    size: f64,
) -> Result<Vec<Density>, SolveFault> {
    let cut: Vec<Vec<Panel>> = faces.iter().map(|f| panels(f, size)).collect();
    let points = points(faces, &cut, basis);
    let count = points.len();
    let mut matrix = Mat::<f64>::identity(count, count);
    let mut right = Mat::<f64>::zeros(count, 1);
    let mut row = vec![0.0; count];
    for (i, point) in points.iter().enumerate() {
        let face = &faces[point.face];
        right[(i, 0)] = face.fixed + face.factor * tangential(face, free, point);
        fill_row(faces, &cut, basis, point, &mut row);
        // The unknown is c d s/d u at the nodes; the row holds the field of each.
        for (j, (field, other)) in row.iter().zip(&points).enumerate() {
            matrix[(i, j)] -= face.factor * field * other.stretch;
        }
    }
    let solution = matrix.partial_piv_lu().solve(&right);
    let mut next = 0;
    let mut densities = Vec::with_capacity(faces.len());
    for panels in cut {
        let here = panels.len() * basis.len();
        let values: Vec<f64> = (next..next + here).map(|k| solution[(k, 0)] * points[k].stretch).collect();
        if values.iter().any(|v| !v.is_finite()) {
            return Err(SolveFault::NotFinite { what: "a bound current of a magnet" });
        }
        densities.push(Density { panels, values });
        next += here;
    }
    Ok(densities)
}

fn points(faces: &[Face], cut: &[Vec<Panel>], basis: &Basis) -> Vec<Point> {
    let mut points = Vec::new();
    for (f, (face, panels)) in faces.iter().zip(cut).enumerate() {
        for (p, panel) in panels.iter().enumerate() {
            for &(u, _) in &basis.nodes {
                let (s, stretch) = panel.place(u);
                let (r, z) = face.at(s);
                points.push(Point { face: f, panel: p, r, z, stretch });
            }
        }
    }
    points
}

fn tangential(face: &Face, field: &dyn AxialField, point: &Point) -> f64 {
    match face.surface {
        Surface::Cylinder(_) => field.flux_density_z(point.r, point.z),
        Surface::Plane(_) => field.flux_density_r(point.r, point.z),
    }
}

/// The tangential field at `point` of a unit of c d s/d u at each node, T/(T m).
fn fill_row(faces: &[Face], cut: &[Vec<Panel>], basis: &Basis, point: &Point, row: &mut [f64]) {
    let target = (point.r, point.z);
    let wanted = faces[point.face].surface;
    let mut polynomials = vec![0.0; basis.len()];
    let mut next = 0;
    for (face, panels) in faces.iter().zip(cut) {
        for panel in panels {
            let here = &mut row[next..next + basis.len()];
            next += basis.len();
            here.fill(0.0);
            if in_one_plane(wanted, face.surface) {
                continue;
            }
            let field = |u: f64| kernel(wanted, face.at(panel.place(u).0), target);
            let near = near_points(face, panel, target, &mut |u, weight| {
                basis.fill(u, &mut polynomials);
                let value = weight * field(u);
                here.iter_mut().zip(&polynomials).for_each(|(h, l)| *h += value * l);
            });
            if !near {
                here.iter_mut().zip(&basis.nodes).for_each(|(h, &(u, weight))| *h = weight * field(u));
            }
        }
    }
    debug_assert!(point.panel < cut[point.face].len());
}

/// Sheets in one plane make no radial field there.
fn in_one_plane(a: Surface, b: Surface) -> bool {
    matches!((a, b), (Surface::Plane(p), Surface::Plane(q)) if (p - q).abs() <= 0.0)
}

/// The field at `target` along the surface `wanted` of a loop of mu0 I = 1 T m at `source`, 1/m.
fn kernel(wanted: Surface, source: (f64, f64), target: (f64, f64)) -> f64 {
    let geometry = LoopGeometry::new(source.0, target.0, target.1 - source.1);
    match wanted {
        Surface::Cylinder(_) => geometry.flux_density_z(),
        Surface::Plane(_) => -target.0 * geometry.slope_over_r2(),
    }
}

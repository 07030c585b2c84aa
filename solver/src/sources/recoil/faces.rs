//! The faces on which recoil permeability makes bound currents: each stretch of a cylinder or of an end plane with one medium on
//! either side, shared where magnets touch.
//!
//! With B = mu0 mu H + Br e_z and the mean Bbar of both sides (the principal value of all sheets), continuity of the tangential H
//! gives the sheet k = mu0 K (positive for a moment along +z):
//! - a cylinder, - inside and + outside, k = B_z(-) - B_z(+): k S/2 = Br_-/mu_- - Br_+/mu_+ - Bbar_z (1/mu_- - 1/mu_+);
//! - an end plane, - below and + above, k = B_r(+) - B_r(-): k S/2 = Bbar_r (1/mu_- - 1/mu_+);
//!
//! S = 1/mu_- + 1/mu_+. What is wanted is c = k - (Br_- - Br_+), the change against a magnet of recoil permeability 1.

use crate::problem::Part;
use crate::sources::Source;

/// Faces closer than this part of the largest size touch.
const TOUCHING: f64 = 1.0e-9;

/// On what a face lies.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum Surface {
    /// A cylinder of this radius, m.
    Cylinder(f64),
    /// A plane at this height, m.
    Plane(f64),
}

/// A stretch of surface with one medium on either side.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Face {
    pub(super) surface: Surface,
    /// Lower height of a cylinder, inner radius of a plane, m.
    pub(super) from: f64,
    /// Upper height, outer radius, m.
    pub(super) to: f64,
    /// c = fixed + factor Bbar: the share that does not depend on the field, T.
    pub(super) fixed: f64,
    /// The factor.
    pub(super) factor: f64,
    /// Distance from the lower end to the nearest other edge, m; none where there is no edge (the axis).
    pub(super) near_from: Option<f64>,
    /// The same at the upper end.
    pub(super) near_to: Option<f64>,
}

impl Face {
    /// (r, z) at `s` along it.
    pub(super) fn at(&self, s: f64) -> (f64, f64) {
        match self.surface {
            Surface::Cylinder(radius) => (radius, s),
            Surface::Plane(height) => (s, height),
        }
    }

    /// Distance from (r, z) to the stretch between `low` and `high`, m.
    pub(super) fn distance(&self, (r, z): (f64, f64), (low, high): (f64, f64)) -> f64 {
        let (across, along) = match self.surface {
            Surface::Cylinder(radius) => (r - radius, z),
            Surface::Plane(height) => (z - height, r),
        };
        across.hypot((low - along).max(along - high).max(0.0))
    }
}

/// A medium: relative permeability and remanence, T.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Medium {
    mu: f64,
    remanence: f64,
}

const AIR: Medium = Medium { mu: 1.0, remanence: 0.0 };

/// A magnet's cross-section, with faces that touch made equal.
#[derive(Debug, Clone, Copy)]
struct Body {
    radii: [f64; 2],
    heights: [f64; 2],
    medium: Medium,
}

/// All faces of the magnets among `parts`, `permeability` one a part.
pub(super) fn faces(parts: &[Part], permeability: &[f64]) -> Vec<Face> {
    let bodies = bodies(parts, permeability);
    let edges: Vec<(f64, f64)> = bodies
        .iter()
        .flat_map(|b| b.radii.map(|r| b.heights.map(|z| (r, z))))
        .flatten()
        .filter(|&(r, _)| r > 0.0)
        .collect();
    let mut faces = Vec::new();
    for radius in distinct(bodies.iter().flat_map(|b| b.radii).filter(|&r| r > 0.0)) {
        let of = |k: usize| bodies.iter().filter(move |b| same(b.radii[k], radius));
        let cuts = distinct(of(0).chain(of(1)).flat_map(|b| b.heights));
        for ends in cuts.windows(2) {
            let middle = 0.5 * (ends[0] + ends[1]);
            let medium = |k: usize| medium_of(of(k), |b| b.heights, middle);
            let (Some(inside), Some(outside)) = sides(medium(1), medium(0)) else { continue };
            faces.push(cylinder(radius, (ends[0], ends[1]), inside, outside));
        }
    }
    for height in distinct(bodies.iter().flat_map(|b| b.heights)) {
        let of = |k: usize| bodies.iter().filter(move |b| same(b.heights[k], height));
        let cuts = distinct(of(0).chain(of(1)).flat_map(|b| b.radii));
        for ends in cuts.windows(2) {
            let middle = 0.5 * (ends[0] + ends[1]);
            let medium = |k: usize| medium_of(of(k), |b| b.radii, middle);
            let (Some(below), Some(above)) = sides(medium(1), medium(0)) else { continue };
            faces.push(plane(height, (ends[0], ends[1]), below, above));
        }
    }
    faces.retain(|f| f.factor.abs() > 0.0 || f.fixed.abs() > 0.0);
    for face in &mut faces {
        let near = |s: f64| nearest(&edges, face.at(s));
        (face.near_from, face.near_to) = (near(face.from), near(face.to));
    }
    faces
}

/// Both media of a face, air where there is no magnet; none where there is none on either side.
fn sides(first: Option<Medium>, second: Option<Medium>) -> (Option<Medium>, Option<Medium>) {
    if first.is_none() && second.is_none() {
        return (None, None);
    }
    (Some(first.unwrap_or(AIR)), Some(second.unwrap_or(AIR)))
}

fn medium_of<'b>(
    bodies: impl Iterator<Item = &'b Body>,
    span: impl Fn(&Body) -> [f64; 2],
    middle: f64,
) -> Option<Medium> {
    let mut bodies = bodies;
    bodies.find(|b| span(b)[0] < middle && middle < span(b)[1]).map(|b| b.medium)
}

fn cylinder(radius: f64, (from, to): (f64, f64), inside: Medium, outside: Medium) -> Face {
    let sum = 1.0 / inside.mu + 1.0 / outside.mu;
    let driven = 2.0 * (inside.remanence / inside.mu - outside.remanence / outside.mu) / sum;
    Face {
        surface: Surface::Cylinder(radius),
        from,
        to,
        fixed: driven - (inside.remanence - outside.remanence),
        factor: -2.0 * (1.0 / inside.mu - 1.0 / outside.mu) / sum,
        near_from: None,
        near_to: None,
    }
}

fn plane(height: f64, (from, to): (f64, f64), below: Medium, above: Medium) -> Face {
    let sum = 1.0 / below.mu + 1.0 / above.mu;
    let factor = 2.0 * (1.0 / below.mu - 1.0 / above.mu) / sum;
    Face { surface: Surface::Plane(height), from, to, fixed: 0.0, factor, near_from: None, near_to: None }
}

/// Distance from an end of a face to the nearest edge that is not the end itself; none on the axis.
fn nearest(edges: &[(f64, f64)], (r, z): (f64, f64)) -> Option<f64> {
    if r <= 0.0 {
        return None;
    }
    let apart = edges.iter().map(|e| (e.0 - r).hypot(e.1 - z)).filter(|&d| d > 0.0);
    Some(apart.fold(f64::INFINITY, f64::min))
}

fn bodies(parts: &[Part], permeability: &[f64]) -> Vec<Body> {
    let mut bodies: Vec<Body> = Vec::new();
    for (part, &mu) in parts.iter().zip(permeability) {
        if let Source::Magnet { inner_radius_m, outer_radius_m, length_m, remanence_tesla } = part.source {
            let half = 0.5 * length_m;
            bodies.push(Body {
                radii: [inner_radius_m, outer_radius_m],
                heights: [part.centre_m - half, part.centre_m + half],
                medium: Medium { mu, remanence: remanence_tesla },
            });
        }
    }
    let largest = |all: &dyn Fn(&Body) -> [f64; 2]| bodies.iter().flat_map(all).fold(0.0, |m: f64, x| m.max(x.abs()));
    let tolerance = TOUCHING * largest(&|b| b.radii).max(largest(&|b| b.heights));
    let radii = joined(bodies.iter().flat_map(|b| b.radii), tolerance);
    let heights = joined(bodies.iter().flat_map(|b| b.heights), tolerance);
    for body in &mut bodies {
        body.radii = body.radii.map(|r| of(&radii, r, tolerance));
        body.heights = body.heights.map(|z| of(&heights, z, tolerance));
    }
    bodies
}

fn joined(all: impl Iterator<Item = f64>, tolerance: f64) -> Vec<f64> {
    let mut kept: Vec<f64> = vec![0.0];
    for x in all {
        if kept.iter().all(|k| (k - x).abs() > tolerance) {
            kept.push(x);
        }
    }
    kept
}

fn of(kept: &[f64], x: f64, tolerance: f64) -> f64 {
    kept.iter().copied().find(|k| (k - x).abs() <= tolerance).unwrap_or(x)
}

fn same(a: f64, b: f64) -> bool {
    (a - b).abs() <= 0.0
}

fn distinct(all: impl Iterator<Item = f64>) -> Vec<f64> {
    let mut all: Vec<f64> = all.collect();
    all.sort_by(f64::total_cmp);
    all.dedup_by(|a, b| same(*a, *b));
    all
}

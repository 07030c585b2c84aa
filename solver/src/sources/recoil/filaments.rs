//! Coaxial filaments that stand for the currents of a face at some distance from it.
//!
//! On a piece of length l seen from a distance d the kernel is a polynomial but for rho^-n (n nodes, rho = x + sqrt(x^2 + 1), x = 2d/l):
//! the currents, however they crowd into the edges, are spread on its Gauss-Legendre nodes by Lagrange's polynomials. Away from the
//! edges the currents themselves are smooth, and the nodes take what flows there: rho^-2n.

use super::faces::Face;
use super::panels::{Basis, Density};
use crate::sources::gauss::rule;

/// A coaxial filament.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Filament {
    /// Radius, m.
    pub radius_m: f64,
    /// Height over the mover's reference point, m.
    pub height_m: f64,
    /// mu0 times its current, T m, positive for a moment along +z.
    pub tesla_metre: f64,
}

/// Filaments good from a distance on.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Tier {
    /// The distance, m.
    pub(super) clearance: f64,
    pub(super) filaments: Vec<Filament>,
}

/// Error of a tier relative to the field, where the change of the currents is as large as the currents themselves.
const ERROR: f64 = 3.0e-10;
/// Nodes of a piece near an edge, and of one between.
const NODES: usize = 16;
/// Fewest nodes of a face far off, where what its currents make together is small against each of them.
const FEWEST: f64 = 8.0;
/// Each tier is good from so many times the distance of the one before.
const TIER_STEP: f64 = 2.0;
/// The last tier is good from so many lengths of the face.
const FARTHEST: f64 = 20.0;

/// Tiers from `clearance` on, near ones first; `share` is about the largest change of a current against the currents.
pub(super) fn tiers(face: &Face, density: &Density, basis: &Basis, clearance: f64, share: f64) -> Vec<Tier> {
    let digits = (share / ERROR).ln().max(5.0);
    let length = face.to - face.from;
    let mut tiers = Vec::new();
    let mut from = clearance;
    while tiers.is_empty() || from < FARTHEST * length * TIER_STEP {
        tiers.push(Tier { clearance: from, filaments: filaments(face, density, basis, (from, digits)) });
        from *= TIER_STEP;
    }
    tiers
}

/// Length over distance of a piece on which rho^-`powers` is exp(-digits).
fn reach(digits: f64, powers: f64) -> f64 {
    // sinh(ln rho) = x.
    2.0 / (digits / powers).sinh()
}

#[expect(clippy::cast_precision_loss, reason = "a small count")]
fn filaments(face: &Face, density: &Density, basis: &Basis, (clearance, digits): (f64, f64)) -> Vec<Filament> {
    let length = face.to - face.from;
    let edge = reach(digits, NODES as f64) * clearance;
    let mut all = Vec::new();
    if 2.0 * edge >= length {
        let nodes = nodes_for(digits, length / clearance);
        if nodes <= 24 {
            spread(face, density, basis, (face.from, face.to), nodes, &mut all);
        } else {
            let middle = 0.5 * (face.from + face.to);
            spread(face, density, basis, (face.from, middle), NODES, &mut all);
            spread(face, density, basis, (middle, face.to), NODES, &mut all);
        }
        return all;
    }
    spread(face, density, basis, (face.from, face.from + edge), NODES, &mut all);
    spread(face, density, basis, (face.to - edge, face.to), NODES, &mut all);
    let between = length - 2.0 * edge;
    let pieces = (between / (reach(digits, 2.0 * NODES as f64) * clearance)).ceil().max(1.0);
    let step = between / pieces;
    let mut low = face.from + edge;
    while low < face.to - edge - 0.5 * step {
        for &(x, weight) in &rule(NODES).points {
            let s = low + 0.5 * step * (1.0 + x);
            push(face, s, 0.5 * step * weight * density.at(s, basis), &mut all);
        }
        low += step;
    }
    all
}

/// Nodes for a piece of so many distances' length.
#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "a small positive number")]
fn nodes_for(digits: f64, lengths: f64) -> usize {
    (digits / (2.0 / lengths).asinh()).ceil().clamp(FEWEST, 1.0e3) as usize
}

/// Puts the currents between `low` and `high` on the piece's Gauss-Legendre nodes.
fn spread(
    face: &Face,
    density: &Density,
    basis: &Basis,
    (low, high): (f64, f64),
    nodes: usize,
    all: &mut Vec<Filament>,
) {
    let own = Basis::new(nodes);
    let (mut share, mut sum) = (vec![0.0; nodes], vec![0.0; nodes]);
    density.over((low, high), basis, &mut |s, current| {
        own.fill((s - low) / (high - low), &mut share);
        sum.iter_mut().zip(&share).for_each(|(sum, l)| *sum += current * l);
    });
    for (&(u, _), current) in own.nodes.iter().zip(sum) {
        push(face, low + (high - low) * u, current, all);
    }
}

fn push(face: &Face, s: f64, tesla_metre: f64, all: &mut Vec<Filament>) {
    let (radius_m, height_m) = face.at(s);
    all.push(Filament { radius_m, height_m, tesla_metre });
}

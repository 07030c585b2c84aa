//! How strongly a moving mover drives a thin ring: the square of the flux slope along z, and its integral.
//!
//! f(r, h) = 2 pi psi(r, h) is the mover's flux through a ring h above its reference point; at speed v the ring sees the voltage
//! v df/dh. A row of thin rings (sheet conductance s, radius r, from z1 to z2) then brakes with c = s/(2 pi r) [S(z2 - z) - S(z1 - z)],
//! S(h) = integral of (df/dh)^2 from far below to h: the limit of many rings.

use std::f64::consts::PI;

use super::assumptions::MagnetModel;
use super::dipole_thin_ring::moment;
use crate::placement::source_sizes;
use crate::problem::{Mover, Part};
use crate::sources::{Source, gauss};

/// Far limit in radii beyond the mover's ends: what is left of S there falls with the seventh power.
const REACH: f64 = 25.0;
/// Panel width over the distance to the nearest edge of a source.
const FINENESS: f64 = 0.2;
/// Gauss points a panel.
const POINTS: usize = 8;

/// S at one radius, as a table.
#[derive(Debug, Clone)]
pub(super) struct Drive {
    /// Heights above the mover's reference point, m, increasing.
    nodes: Vec<f64>,
    /// S, (df/dh)^2 and its derivative at the nodes.
    values: Vec<[f64; 3]>,
    /// |df/dh| at the nodes, Wb/m.
    slopes: Vec<f64>,
}

/// The mover with every part as the model takes it.
pub(super) fn simplified(mover: &Mover, model: MagnetModel) -> Mover {
    let part = |part: &Part| match model {
        MagnetModel::Finite => part.clone(),
        MagnetModel::LoneDipoles | MagnetModel::Dipoles => {
            Part { source: Source::Dipole { moment_a_m2: moment(&part.source) }, ..part.clone() }
        }
    };
    let recoil = if model == MagnetModel::Finite { mover.recoil.clone() } else { None };
    Mover { parts: mover.parts.iter().map(part).collect(), mass_kg: mover.mass_kg, recoil }
}

impl Drive {
    /// The drive of `mover`'s parts (as they stand) at `radius`; fields added, or for lone dipoles squares.
    pub(super) fn new(mover: &Mover, model: MagnetModel, radius: f64) -> Self {
        let nodes = nodes(mover, radius);
        let at = |h: f64| square(mover, model, radius, h);
        let rule = gauss::rule(POINTS);
        let mut values = Vec::with_capacity(nodes.len());
        let mut sum = 0.0;
        for (k, &h) in nodes.iter().enumerate() {
            if k > 0 {
                let (low, high) = (nodes[k - 1], h);
                sum += rule.integrate(0.5 * (low + high), 0.5 * (high - low), |h| at(h).0);
            }
            let (square, bend) = at(h);
            values.push([sum, square, bend]);
        }
        let slopes = values.iter().map(|v| v[1].sqrt()).collect();
        Self { nodes, values, slopes }
    }

    /// S(h), Wb2/m; the two infinities are its limits.
    pub(super) fn integral(&self, h: f64) -> f64 {
        let last = self.nodes.len() - 1;
        if h <= self.nodes[0] {
            return 0.0;
        }
        if h >= self.nodes[last] {
            return self.values[last][0];
        }
        let k = self.nodes.partition_point(|&x| x <= h).clamp(1, last) - 1;
        let width = self.nodes[k + 1] - self.nodes[k];
        quintic(&self.values[k], &self.values[k + 1], width, (h - self.nodes[k]) / width)
    }

    /// S over all heights, Wb2/m.
    pub(super) fn total(&self) -> f64 {
        self.values[self.values.len() - 1][0]
    }

    /// Greatest |df/dh| for heights between `low` and `high`, Wb/m, at the nodes.
    pub(super) fn greatest_slope(&self, low: f64, high: f64) -> f64 {
        let first = self.nodes.partition_point(|&h| h < low);
        let last = self.nodes.partition_point(|&h| h <= high);
        self.slopes[first.min(last)..last].iter().copied().fold(0.0, f64::max)
    }
}

/// (df/dh)^2 and its derivative.
fn square(mover: &Mover, model: MagnetModel, radius: f64, h: f64) -> (f64, f64) {
    let jets = mover
        .parts
        .iter()
        .map(|p| p.source.jet(radius, h - p.centre_m))
        .map(|j| (2.0 * PI * j.slope, 2.0 * PI * j.curvature));
    if model == MagnetModel::LoneDipoles {
        return jets.fold((0.0, 0.0), |sum, (s, c)| (sum.0 + s * s, sum.1 + 2.0 * s * c));
    }
    let recoil = mover.recoil.as_ref().map(|recoil| recoil.jet(radius, h));
    let start = recoil.map_or((0.0, 0.0), |j| (2.0 * PI * j.slope, 2.0 * PI * j.curvature));
    let (s, c) = jets.fold(start, |sum, (s, c)| (sum.0 + s, sum.1 + c));
    (s * s, 2.0 * s * c)
}

/// Heights close together where the field bends: panels a fifth of the distance to the nearest edge of a source.
fn nodes(mover: &Mover, radius: f64) -> Vec<f64> {
    let edges: Vec<(f64, f64)> = mover
        .parts
        .iter()
        .flat_map(|p| {
            let (inner, outer, half) = source_sizes(&p.source);
            let across = if inner > radius { inner - radius } else { radius - outer };
            [(p.centre_m - half, across), (p.centre_m + half, across)]
        })
        .collect();
    let lowest = edges.iter().map(|e| e.0).fold(f64::INFINITY, f64::min) - REACH * radius;
    let highest = edges.iter().map(|e| e.0).fold(f64::NEG_INFINITY, f64::max) + REACH * radius;
    let distance = |h: f64| edges.iter().map(|&(z, across)| (h - z).hypot(across)).fold(f64::INFINITY, f64::min);
    let mut nodes = vec![lowest];
    let mut h = lowest;
    while h < highest {
        // The distance at the far end of the panel counts as well.
        let step = FINENESS * distance(h);
        h += FINENESS * distance(h + step).min(distance(h + 0.5 * step)).min(distance(h));
        nodes.push(h);
    }
    nodes
}

/// Value at fraction `t` of the quintic with given value, slope and second derivative at both ends of an interval `width` long.
fn quintic(start: &[f64; 3], end: &[f64; 3], width: f64, t: f64) -> f64 {
    let (c0, c1, c2) = (start[0], start[1] * width, 0.5 * start[2] * width * width);
    let rise = end[0] - c0 - c1 - c2;
    let slope = end[1] * width - c1 - 2.0 * c2;
    let bend = end[2] * width * width - 2.0 * c2;
    let c3 = 10.0 * rise - 4.0 * slope + 0.5 * bend;
    let c4 = -15.0 * rise + 7.0 * slope - bend;
    let c5 = 6.0 * rise - 3.0 * slope + 0.5 * bend;
    c0 + t * (c1 + t * (c2 + t * (c3 + t * (c4 + t * c5))))
}

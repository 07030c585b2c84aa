//! Panels of a face: halved towards its edges, the last one with nodes that crowd into the edge, and integrals over them.
//!
//! Near an edge the current goes as a power or logarithm of the distance d. On the panel that ends there d = h u^5, so that current
//! times d(d)/du is smooth enough for Gauss-Legendre nodes in u; panels further off are no longer than their distance from the edge.

use super::faces::Face;
use crate::sources::gauss::{GaussRule, rule};

/// Exponent of the panel at an edge.
const CROWDING: i32 = 5;
/// The panel at an edge against the face's length, at most.
const EDGE_SHARE: f64 = 1.0 / 16.0;
/// The panel at an edge against the distance of the nearest other edge, at most.
const NEIGHBOUR_SHARE: f64 = 0.5;
/// Nodes by which a piece of a panel is integrated.
const PIECE_NODES: usize = 16;
/// Halvings of a panel after which a piece is too narrow to matter.
const DEEPEST: u32 = 52;

/// Where a panel meets an edge.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Crowd {
    Nowhere,
    Lower,
    Upper,
}

/// A panel between `from` and `to` along its face, over u in [0, 1].
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Panel {
    from: f64,
    to: f64,
    crowd: Crowd,
}

impl Panel {
    /// Place along the face at `u`, and d s/d u.
    pub(super) fn place(&self, u: f64) -> (f64, f64) {
        let length = self.to - self.from;
        let power = f64::from(CROWDING);
        match self.crowd {
            Crowd::Nowhere => (self.from + length * u, length),
            Crowd::Lower => (self.from + length * u.powi(CROWDING), length * power * u.powi(CROWDING - 1)),
            Crowd::Upper => {
                let v = 1.0 - u;
                (self.to - length * v.powi(CROWDING), length * power * v.powi(CROWDING - 1))
            }
        }
    }

    /// u at the place `s`, within [0, 1].
    fn parameter(&self, s: f64) -> f64 {
        let length = self.to - self.from;
        let root = |x: f64| x.clamp(0.0, 1.0).powf(1.0 / f64::from(CROWDING));
        match self.crowd {
            Crowd::Nowhere => ((s - self.from) / length).clamp(0.0, 1.0),
            Crowd::Lower => root((s - self.from) / length),
            Crowd::Upper => 1.0 - root((self.to - s) / length),
        }
    }
}

/// The panels of `face`, each of `size` times the usual length at the edges.
pub(super) fn panels(face: &Face, size: f64) -> Vec<Panel> {
    let length = face.to - face.from;
    let first = |near: Option<f64>| near.map(|d| size * (EDGE_SHARE * length).min(NEIGHBOUR_SHARE * d));
    let (low, high) = (first(face.near_from), first(face.near_to));
    let reach = match (low, high) {
        (Some(_), Some(_)) => 0.5 * length,
        _ => length,
    };
    let mut panels = Vec::new();
    if let Some(h) = low {
        for (k, step) in doubling(h, reach).windows(2).enumerate() {
            let crowd = if k == 0 { Crowd::Lower } else { Crowd::Nowhere };
            panels.push(Panel { from: face.from + step[0], to: face.from + step[1], crowd });
        }
    }
    if let Some(h) = high {
        for (k, step) in doubling(h, reach).windows(2).enumerate() {
            let crowd = if k == 0 { Crowd::Upper } else { Crowd::Nowhere };
            panels.push(Panel { from: face.to - step[1], to: face.to - step[0], crowd });
        }
    }
    if panels.is_empty() {
        panels.push(Panel { from: face.from, to: face.to, crowd: Crowd::Nowhere });
    }
    panels
}

/// 0, h, 2h, 4h, ... up to `reach`.
fn doubling(h: f64, reach: f64) -> Vec<f64> {
    let mut steps = vec![0.0];
    let mut at = h.min(reach);
    while at < 0.75 * reach {
        steps.push(at);
        at *= 2.0;
    }
    steps.push(reach);
    steps
}

/// Lagrange's polynomials on Gauss-Legendre nodes over [0, 1].
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Basis {
    /// Nodes in [0, 1] and their weights.
    pub(super) nodes: Vec<(f64, f64)>,
    barycentric: Vec<f64>,
}

impl Basis {
    pub(super) fn new(count: usize) -> Self {
        let nodes: Vec<(f64, f64)> = rule(count).points.iter().map(|&(x, w)| (0.5 * (x + 1.0), 0.5 * w)).collect();
        let barycentric = (0..nodes.len())
            .map(|j| {
                let others = nodes.iter().enumerate().filter(|(k, _)| *k != j);
                others.map(|(_, &(x, _))| 0.25 / (nodes[j].0 - x)).product()
            })
            .collect();
        Self { nodes, barycentric }
    }

    pub(super) fn len(&self) -> usize {
        self.nodes.len()
    }

    /// The values of all polynomials at `u`.
    pub(super) fn fill(&self, u: f64, out: &mut [f64]) {
        if let Some(k) = self.nodes.iter().position(|&(x, _)| (x - u).abs() <= 0.0) {
            out.fill(0.0);
            out[k] = 1.0;
            return;
        }
        let mut sum = 0.0;
        for ((&(x, _), b), out) in self.nodes.iter().zip(&self.barycentric).zip(out.iter_mut()) {
            *out = b / (u - x);
            sum += *out;
        }
        out.iter_mut().for_each(|o| *o /= sum);
    }

    /// The interpolant of `values` at `u`.
    pub(super) fn value(&self, values: &[f64], u: f64) -> f64 {
        let (mut above, mut below) = (0.0, 0.0);
        for ((&(x, _), b), value) in self.nodes.iter().zip(&self.barycentric).zip(values) {
            let apart = u - x;
            if apart.abs() <= 0.0 {
                return *value;
            }
            above += b / apart * value;
            below += b / apart;
        }
        above / below
    }
}

/// Visits Gauss-Legendre points (u, weight) of `panel` so close together that a kernel singular at `target` (r, z) is integrated to
/// 1e-10; false where the panel's own nodes do.
pub(super) fn near_points(face: &Face, panel: &Panel, target: (f64, f64), visit: &mut impl FnMut(f64, f64)) -> bool {
    let near = is_near(face, panel, target, (0.0, 1.0));
    if near {
        let pieces = rule(PIECE_NODES);
        split(face, panel, target, (0.0, 0.5), 0, pieces, visit);
        split(face, panel, target, (0.5, 1.0), 0, pieces, visit);
    }
    near
}

/// Whether `target` lies closer to the piece between two u than the piece is long.
fn is_near(face: &Face, panel: &Panel, target: (f64, f64), (low, high): (f64, f64)) -> bool {
    let (from, to) = (panel.place(low).0, panel.place(high).0);
    face.distance(target, (from, to)) < to - from
}

fn split(
    face: &Face,
    panel: &Panel,
    target: (f64, f64),
    (low, high): (f64, f64),
    depth: u32,
    pieces: &GaussRule,
    visit: &mut impl FnMut(f64, f64),
) {
    if depth < DEEPEST && is_near(face, panel, target, (low, high)) {
        let middle = 0.5 * (low + high);
        split(face, panel, target, (low, middle), depth + 1, pieces, visit);
        split(face, panel, target, (middle, high), depth + 1, pieces, visit);
    } else {
        let (centre, half) = (0.5 * (low + high), 0.5 * (high - low));
        pieces.points.iter().for_each(|&(x, w)| visit(centre + half * x, half * w));
    }
}

/// Current times d s/d u at the nodes of each panel of one face.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Density {
    pub(super) panels: Vec<Panel>,
    /// Values at the basis' nodes, panel by panel, T m.
    pub(super) values: Vec<f64>,
}

impl Density {
    /// The values of panel `k`.
    pub(super) fn of_panel(&self, k: usize, basis: &Basis) -> &[f64] {
        &self.values[k * basis.len()..(k + 1) * basis.len()]
    }

    /// The current at `s`, T.
    pub(super) fn at(&self, s: f64, basis: &Basis) -> f64 {
        let k = self.panels.iter().position(|p| s >= p.from && s <= p.to).unwrap_or(0);
        let u = self.panels[k].parameter(s);
        basis.value(self.of_panel(k, basis), u) / self.panels[k].place(u).1
    }

    /// Visits points (s, current times weight in T m) of the stretch between `low` and `high`.
    pub(super) fn over(&self, (low, high): (f64, f64), basis: &Basis, visit: &mut impl FnMut(f64, f64)) {
        let fine = rule(24);
        for (k, panel) in self.panels.iter().enumerate() {
            let (from, to) = (low.max(panel.from), high.min(panel.to));
            if to <= from {
                continue;
            }
            let (a, b) = (panel.parameter(from), panel.parameter(to));
            let (centre, half) = (0.5 * (a + b), 0.5 * (b - a));
            for &(x, w) in &fine.points {
                let u = centre + half * x;
                visit(panel.place(u).0, half * w * basis.value(self.of_panel(k, basis), u));
            }
        }
    }
}

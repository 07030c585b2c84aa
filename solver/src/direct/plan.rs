//! The grid cut into segments along z, within each of which the operators factor into radial and axial ones.
//!
//! With dz* the dual length of a row and a the inverse length of a cell, row j of K + rate G in a segment reads
//!
//!   dz*_j (K_r + rate G_r) psi_j + D (a_(j-1) (psi_j - psi_(j-1)) + a_j (psi_j - psi_(j+1))),
//!
//! K_r tridiagonal and symmetric, G_r and D diagonal, none of them depending on j. Where two segments meet, the row (an
//! interface) has half a dual length of each, and the D of the segment below and above.

use std::ops::Range;

use lenzbore_mesh::Grid;

use super::product::padded;
use crate::constants::MU0;
use crate::operators::Operators;

/// Unknowns on interfaces at most: their Schur complement is dense.
const MOST_INTERFACE_UNKNOWNS: usize = 1500;

/// Radial operators for a unit of dual length.
#[derive(Debug, Clone)]
pub(super) struct Radial {
    /// K_r: diagonal, and what couples each unknown to the next (0 for the last).
    pub(super) diagonal: Vec<f64>,
    pub(super) next: Vec<f64>,
    /// G_r.
    pub(super) conductance: Vec<f64>,
}

/// Rows between two changes of material.
#[derive(Debug, Clone)]
pub(super) struct Segment {
    /// Rows of unknowns within.
    pub(super) rows: Range<usize>,
    pub(super) radial: Radial,
    /// D.
    pub(super) axial: Vec<f64>,
    /// Whether the wall runs through it: only there is the right side nonzero.
    pub(super) wall: bool,
}

/// Segments from bottom to top, and the interfaces between them.
#[derive(Debug, Clone)]
pub(crate) struct LayeredPlan {
    /// Unknowns along r.
    pub(super) nr: usize,
    pub(super) segments: Vec<Segment>,
    /// Half a dual length of the segments below and above, for each interface.
    pub(super) interfaces: Vec<Radial>,
    /// Dual length of each row of unknowns, m.
    pub(super) duals: Vec<f64>,
    /// Inverse length of each row of cells, 1/m.
    pub(super) inverse_cells: Vec<f64>,
    /// Radii of the wall's nodes, as a range of unknowns along r.
    pub(super) wall: Range<usize>,
}

impl LayeredPlan {
    /// Cuts the grid; `None` where materials change along z in so many places that a sparse factor is better.
    pub(super) fn new(operators: &Operators) -> Option<Self> {
        let grid = &operators.grid;
        let rows: Vec<&[usize]> = operators.materials.region.chunks_exact(grid.nr() - 1).collect();
        let mu_r: Vec<&[f64]> = operators.materials.mu_r.chunks_exact(grid.nr() - 1).collect();
        let mut segments = Vec::new();
        let mut start = 0;
        for end in 1..=rows.len() {
            if end == rows.len() || rows[end] != rows[start] || mu_r[end] != mu_r[start] {
                segments.push(Segment::new(operators, start, end));
                start = end;
            }
        }
        let nr = grid.nr() - 2;
        if (segments.len() - 1) * nr > MOST_INTERFACE_UNKNOWNS || segments.iter().any(|s| s.rows.is_empty()) {
            return None;
        }
        let inverse_cells: Vec<f64> = (0..grid.nz() - 1).map(|j| 1.0 / grid.z.cell(j)).collect();
        let meet = |pair: &[Segment]| {
            let row = pair[0].rows.end;
            let (below, above) = (0.5 / inverse_cells[row], 0.5 / inverse_cells[row + 1]);
            pair[0].radial.combined(below, &pair[1].radial, above)
        };
        let radii = operators.wall.rows.iter().map(|row| row.i);
        Some(Self {
            nr,
            interfaces: segments.windows(2).map(meet).collect(),
            duals: (1..grid.nz() - 1).map(|j| grid.z.dual(j)).collect(),
            wall: radii.clone().min()? - 1..radii.max()?,
            inverse_cells,
            segments,
        })
    }

    /// Amplitudes of a row, padded to whole lanes.
    pub(super) fn width(&self) -> usize {
        padded(self.nr)
    }

    /// Unknowns.
    pub(super) fn unknowns(&self) -> usize {
        self.nr * self.duals.len()
    }

    /// Bytes of one factor with its workspace.
    pub(super) fn factor_bytes(&self) -> usize {
        let interfaces = self.interfaces.len() * self.nr;
        size_of::<f64>()
            * (4 * self.width() * self.duals.len()
                + 2 * self.segments.len() * self.nr * self.nr
                + interfaces * interfaces / 2)
    }
}

impl Segment {
    /// The segment of the cell rows `first..end`.
    fn new(operators: &Operators, first: usize, end: usize) -> Self {
        let (grid, materials) = (&operators.grid, &operators.materials);
        let r = grid.r.nodes();
        let nu = |i: usize| 1.0 / (MU0 * materials.mu_r[grid.cell(i, first)]);
        let sigma = |i: usize| materials.sigma[grid.cell(i, first)];
        let edge = |i: usize| 2.0 * nu(i) / ((r[i + 1] - r[i]) * (r[i + 1] + r[i]));
        let nodes = 1..grid.nr() - 1;
        let next = |i: usize| if i + 2 < grid.nr() { -edge(i) } else { 0.0 };
        Self {
            rows: first..end - 1,
            radial: Radial {
                diagonal: nodes.clone().map(|i| edge(i - 1) + edge(i)).collect(),
                next: nodes.clone().map(next).collect(),
                conductance: nodes.clone().map(|i| mean_over_radius(grid, i, sigma)).collect(),
            },
            axial: nodes.map(|i| mean_over_radius(grid, i, nu)).collect(),
            wall: (0..grid.nr() - 1).any(|i| materials.region[grid.cell(i, first)] > 0),
        }
    }
}

/// Sum of a property of the cells on both sides of node `i` times half their widths, over the node's radius.
fn mean_over_radius(grid: &Grid, i: usize, of: impl Fn(usize) -> f64) -> f64 {
    0.5 * (of(i - 1) * grid.r.cell(i - 1) + of(i) * grid.r.cell(i)) / grid.r.nodes()[i]
}

impl Radial {
    /// `p` self + `q` other.
    fn combined(&self, p: f64, other: &Self, q: f64) -> Self {
        let sum = |a: &[f64], b: &[f64]| a.iter().zip(b).map(|(a, b)| p * a + q * b).collect();
        Self {
            diagonal: sum(&self.diagonal, &other.diagonal),
            next: sum(&self.next, &other.next),
            conductance: sum(&self.conductance, &other.conductance),
        }
    }
}

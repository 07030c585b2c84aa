//! The flux-exact scheme: K = D^T N D, the conductance map G, and the wall's nodes.
//!
//! psi = r A_phi at nodes; 2 pi psi is a flux, so differences of psi along edges are exact fluxes:
//! B_z = 2 dpsi / (r2^2 - r1^2) over an annulus, B_r = -dpsi / (r dz) over a cylindrical band. Only the two
//! material maps are approximated: N_r = 2 sum(nu dz/2) / (r2^2 - r1^2), N_z = sum(nu dr/2) / (r dz). The magnetic
//! energy is pi psi^T K psi, J; ring currents are I = -G dpsi/dt, A, with G = sum(sigma dr dz / 4) / r.

use lenzbore_mesh::Grid;
use sprs::{CsMat, TriMat};

use crate::constants::MU0;
use crate::materials::Materials;
use crate::numbering::unknown_of;
use crate::wall_nodes::WallNodes;

/// The discrete operators of one grid. Unknowns are the interior nodes, `[z][r]`.
#[derive(Debug)]
pub(crate) struct Operators {
    pub(crate) grid: Grid,
    pub(crate) materials: Materials,
    /// K on the unknowns, both triangles.
    pub(crate) stiffness: CsMat<f64>,
    /// K with the permeability of free space, where the wall is permeable.
    pub(crate) stiffness_free: Option<CsMat<f64>>,
    /// (K - K0) from all nodes to unknowns, where the wall is permeable.
    pub(crate) excess: Option<CsMat<f64>>,
    /// Nodes that conduct or touch permeable cells.
    pub(crate) wall: WallNodes,
}

impl Operators {
    /// Assembles the operators.
    pub(crate) fn new(grid: Grid, materials: Materials) -> Self {
        let stiffness = stiffness(&grid, &materials.mu_r);
        let permeable = materials.mu_r.iter().any(|m| (m - 1.0).abs() > 0.0);
        let stiffness_free = permeable.then(|| self::stiffness(&grid, &vec![1.0; grid.cells()]));
        let excess = permeable.then(|| excess(&grid, &materials.mu_r));
        let wall = WallNodes::new(&grid, &materials);
        Self { grid, materials, stiffness, stiffness_free, excess, wall }
    }

    /// The same with magnets of the permeability `magnets` of each cell, 1 outside them: in K, but not in what a permeable wall adds to
    /// the mover's own field, which has it already.
    pub(crate) fn with_magnets(grid: Grid, wall: Materials, magnets: &[f64]) -> Self {
        let plain = Self::new(grid, wall);
        let mut materials = plain.materials.clone();
        materials.mu_r.iter_mut().zip(magnets).for_each(|(mu, magnet)| *mu *= magnet);
        Self { stiffness: stiffness(&plain.grid, &materials.mu_r), materials, ..plain }
    }

    /// Number of unknowns.
    pub(crate) fn unknowns(&self) -> usize {
        (self.grid.nr() - 2) * (self.grid.nz() - 2)
    }

    /// K0: the stiffness of free space.
    pub(crate) fn stiffness_free(&self) -> &CsMat<f64> {
        self.stiffness_free.as_ref().unwrap_or(&self.stiffness)
    }

    /// Unknowns spread over all nodes, zero on axis and boundary.
    pub(crate) fn spread(&self, unknowns: &[f64]) -> Vec<f64> {
        let (nr, nz) = (self.grid.nr(), self.grid.nz());
        let mut nodes = vec![0.0; nr * nz];
        for (j, row) in unknowns.chunks_exact(nr - 2).enumerate() {
            nodes[(j + 1) * nr + 1..(j + 2) * nr - 1].copy_from_slice(row);
        }
        nodes
    }
}

/// An edge from node `a` to node `b` and its weight in N.
struct Edge {
    a: (usize, usize),
    b: (usize, usize),
    weight: f64,
}

/// All edges with the weights of N for the given reluctivity (1/H/m) of each cell; zero weights are left out.
fn edges(grid: &Grid, nu: impl Fn(usize) -> f64) -> Vec<Edge> {
    let (nr, nz) = (grid.nr(), grid.nz());
    let (r, z) = (grid.r.nodes(), grid.z.nodes());
    let mut edges = Vec::with_capacity(2 * nr * nz);
    for j in 1..nz - 1 {
        for i in 0..nr - 1 {
            let dual = 0.5 * (nu(grid.cell(i, j - 1)) * grid.z.cell(j - 1) + nu(grid.cell(i, j)) * grid.z.cell(j));
            let area = (r[i + 1] - r[i]) * (r[i + 1] + r[i]);
            edges.push(Edge { a: (i, j), b: (i + 1, j), weight: 2.0 * dual / area });
        }
    }
    for j in 0..nz - 1 {
        for (i, &radius) in r.iter().enumerate().take(nr - 1).skip(1) {
            let dual = 0.5 * (nu(grid.cell(i - 1, j)) * grid.r.cell(i - 1) + nu(grid.cell(i, j)) * grid.r.cell(i));
            edges.push(Edge { a: (i, j), b: (i, j + 1), weight: dual / (radius * (z[j + 1] - z[j])) });
        }
    }
    edges.retain(|e| e.weight.abs() > 0.0);
    edges
}

/// D on the unknowns: one row an edge, -1 at its start and +1 at its end.
fn difference(
    grid: &Grid,
    edges: &[Edge],
    columns: usize,
    column_of: impl Fn(&Grid, (usize, usize)) -> Option<usize>,
) -> CsMat<f64> {
    let mut d = TriMat::with_capacity((edges.len(), columns), 2 * edges.len());
    for (row, edge) in edges.iter().enumerate() {
        if let Some(column) = column_of(grid, edge.a) {
            d.add_triplet(row, column, -1.0);
        }
        if let Some(column) = column_of(grid, edge.b) {
            d.add_triplet(row, column, 1.0);
        }
    }
    d.to_csr()
}

fn weights(edges: &[Edge]) -> CsMat<f64> {
    let n = edges.len();
    CsMat::new((n, n), (0..=n).collect(), (0..n).collect(), edges.iter().map(|e| e.weight).collect())
}

fn unknowns(grid: &Grid) -> usize {
    (grid.nr() - 2) * (grid.nz() - 2)
}

/// K = D^T N D on the unknowns, N from the relative permeability of each cell.
fn stiffness(grid: &Grid, mu_r: &[f64]) -> CsMat<f64> {
    let edges = edges(grid, |cell| 1.0 / (MU0 * mu_r[cell]));
    let d = difference(grid, &edges, unknowns(grid), |g, (i, j)| unknown_of(g, i, j));
    let nd = &weights(&edges) * &d;
    (&d.transpose_view() * &nd).to_csr()
}

/// D^T (N - N0) D with all nodes as columns and unknowns as rows.
pub(crate) fn excess(grid: &Grid, mu_r: &[f64]) -> CsMat<f64> {
    let edges = edges(grid, |cell| (1.0 / mu_r[cell] - 1.0) / MU0);
    let inner = difference(grid, &edges, unknowns(grid), |g, (i, j)| unknown_of(g, i, j));
    let all = difference(grid, &edges, grid.nodes(), |g, (i, j)| Some(g.node(i, j)));
    let nd = &weights(&edges) * &all;
    (&inner.transpose_view() * &nd).to_csr()
}

/// `out += factor * matrix * x`.
pub(crate) fn add_product(matrix: &CsMat<f64>, x: &[f64], factor: f64, out: &mut [f64]) {
    for (row, entries) in matrix.outer_iterator().enumerate() {
        let mut sum = 0.0;
        for (column, value) in entries.iter() {
            sum += value * x[column];
        }
        out[row] += factor * sum;
    }
}

//! The nodes of the wall, row by row: every conducting node is a ring with its own conductance.

use lenzbore_mesh::Grid;

use crate::materials::Materials;
use crate::numbering::unknown_of;

/// A run of wall nodes at one radius.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) struct WallRow {
    /// Radial node index.
    pub(crate) i: usize,
    /// First axial node index.
    pub(crate) j: usize,
    /// Number of nodes.
    pub(crate) count: usize,
    /// Index of the first among the wall nodes.
    pub(crate) start: usize,
}

/// All wall nodes, ordered by radius, then height.
#[derive(Debug, Clone, Default)]
pub(crate) struct WallNodes {
    pub(crate) rows: Vec<WallRow>,
    /// Unknown of each wall node.
    pub(crate) unknown: Vec<usize>,
    /// Conductance of each ring, G: sum(sigma dr dz / 4) / r, S.
    pub(crate) conductance: Vec<f64>,
    /// Largest conductivity of the cells that meet there, S/m.
    pub(crate) sigma_max: Vec<f64>,
    /// Radius of each node, m.
    pub(crate) radius: Vec<f64>,
}

impl WallNodes {
    pub(crate) fn new(grid: &Grid, materials: &Materials) -> Self {
        let mut wall = Self::default();
        for i in 1..grid.nr() - 1 {
            let mut open = false;
            for j in 1..grid.nz() - 1 {
                let cells = [(i - 1, j - 1), (i, j - 1), (i - 1, j), (i, j)];
                let of_wall = cells.iter().any(|&(a, b)| materials.region[grid.cell(a, b)] > 0);
                let Some(unknown) = unknown_of(grid, i, j).filter(|_| of_wall) else {
                    open = false;
                    continue;
                };
                if !open {
                    wall.rows.push(WallRow { i, j, count: 0, start: wall.unknown.len() });
                    open = true;
                }
                if let Some(row) = wall.rows.last_mut() {
                    row.count += 1;
                }
                let (mut sum, mut largest) = (0.0, 0.0_f64);
                for (a, b) in cells {
                    let sigma = materials.sigma[grid.cell(a, b)];
                    sum += 0.25 * sigma * grid.r.cell(a) * grid.z.cell(b);
                    largest = largest.max(sigma);
                }
                let radius = grid.r.nodes()[i];
                wall.unknown.push(unknown);
                wall.conductance.push(sum / radius);
                wall.sigma_max.push(largest);
                wall.radius.push(radius);
            }
        }
        wall
    }

    pub(crate) fn len(&self) -> usize {
        self.unknown.len()
    }
}

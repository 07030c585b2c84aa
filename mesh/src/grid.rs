//! Tensor grid of node lines in r and z.

use crate::NodeLine;

/// Nodes (r_i, z_j); node arrays are `[z][r]`: index `j * nr + i`.
#[derive(Debug, Clone, PartialEq)]
pub struct Grid {
    /// Node radii, m, from 0.
    pub r: NodeLine,
    /// Node heights, m.
    pub z: NodeLine,
}

impl Grid {
    /// Nodes along r.
    #[must_use]
    pub fn nr(&self) -> usize {
        self.r.len()
    }

    /// Nodes along z.
    #[must_use]
    pub fn nz(&self) -> usize {
        self.z.len()
    }

    /// All nodes.
    #[must_use]
    pub fn nodes(&self) -> usize {
        self.nr() * self.nz()
    }

    /// Index of node (i, j).
    #[must_use]
    pub fn node(&self, i: usize, j: usize) -> usize {
        j * self.nr() + i
    }

    /// Index of the cell between nodes (i, j) and (i + 1, j + 1).
    #[must_use]
    pub fn cell(&self, i: usize, j: usize) -> usize {
        j * (self.nr() - 1) + i
    }

    /// All cells.
    #[must_use]
    pub fn cells(&self) -> usize {
        (self.nr() - 1) * (self.nz() - 1)
    }
}

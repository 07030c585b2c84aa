//! Which nodes are unknowns, and in which order: all but axis and boundary, `[z][r]`.

use lenzbore_mesh::Grid;

/// Index of interior node (i, j) among the unknowns.
pub(crate) fn unknown_of(grid: &Grid, i: usize, j: usize) -> Option<usize> {
    (i > 0 && j > 0 && i + 1 < grid.nr() && j + 1 < grid.nz()).then(|| (j - 1) * (grid.nr() - 2) + i - 1)
}

//! Which region each cell belongs to.

use crate::Grid;

/// An axis-parallel rectangle whose sides lie on grid lines.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Rectangle {
    /// Inner radius, m.
    pub r_from_m: f64,
    /// Outer radius, m.
    pub r_to_m: f64,
    /// Lower side, m (minus infinity: to the lower boundary).
    pub z_from_m: f64,
    /// Upper side, m (infinity: to the upper boundary).
    pub z_to_m: f64,
}

/// Region of every cell: 0 is free space, `k + 1` the k-th rectangle.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Regions {
    of_cell: Vec<usize>,
}

impl Regions {
    /// Paints `rectangles` on `grid`, by cell centres.
    #[must_use]
    pub fn new(grid: &Grid, rectangles: &[Rectangle]) -> Self {
        let mut of_cell = vec![0; grid.cells()];
        let (r, z) = (grid.r.nodes(), grid.z.nodes());
        for j in 0..grid.nz() - 1 {
            let zc = 0.5 * (z[j] + z[j + 1]);
            for i in 0..grid.nr() - 1 {
                let rc = 0.5 * (r[i] + r[i + 1]);
                let inside = |q: &Rectangle| rc > q.r_from_m && rc < q.r_to_m && zc > q.z_from_m && zc < q.z_to_m;
                if let Some(k) = rectangles.iter().position(inside) {
                    of_cell[grid.cell(i, j)] = k + 1;
                }
            }
        }
        Self { of_cell }
    }

    /// Region of each cell, `[z][r]`.
    #[must_use]
    pub fn of_cell(&self) -> &[usize] {
        &self.of_cell
    }
}

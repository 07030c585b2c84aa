//! Heat in the wall, cell by cell: the second route to the resistance that the wall adds.
//!
//! The coils' side sums over rings, at nodes; here E_phi is averaged to the middle of every cell and squared there. Both end at the same heat, by
//! different errors in h^2.

use std::f64::consts::PI;

use num_complex::Complex64;

use super::level::Reaction;
use crate::operators::Operators;

/// Mean heat in the wall, W: 1/2 sum sigma |E|^2 2 pi r dr dz over its cells.
pub(super) fn heat_watt(operators: &Operators, reaction: &Reaction) -> f64 {
    let (grid, wall, materials) = (&operators.grid, &operators.wall, &operators.materials);
    let r = grid.r.nodes();
    let mut field = vec![Complex64::ZERO; grid.nodes()];
    for row in &wall.rows {
        for k in 0..row.count {
            let w = row.start + k;
            field[grid.node(row.i, row.j + k)] =
                Complex64::new(0.0, -reaction.omega) * reaction.flux[w] / wall.radius[w];
        }
    }
    let mut heat = 0.0;
    for j in 0..grid.nz() - 1 {
        for i in 0..grid.nr() - 1 {
            let sigma = materials.sigma[grid.cell(i, j)];
            if sigma > 0.0 {
                let corners = [grid.node(i, j), grid.node(i + 1, j), grid.node(i, j + 1), grid.node(i + 1, j + 1)];
                let mean = 0.25 * corners.iter().map(|&n| field[n]).sum::<Complex64>();
                heat += sigma * mean.norm_sqr() * (r[i] + r[i + 1]) * grid.r.cell(i) * grid.z.cell(j);
            }
        }
    }
    0.5 * PI * heat
}

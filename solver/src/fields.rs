//! Fields for export: flux density, current density and heat density at cell centres.

use lenzbore_mesh::Grid;

use crate::force::cell_flux_density;
use crate::materials::Materials;
use crate::operators::Operators;
use crate::outcome::{Fields, Snapshot};
use crate::problem::{Problem, Wall};
use crate::sources::AxialField;

/// Grid and regions, without snapshots.
pub(crate) fn empty_fields(grid: &Grid, materials: &Materials, wall: &Wall) -> Fields {
    let mut region_names = vec!["free space".to_owned()];
    region_names.extend(wall.layers.iter().map(|l| l.name.clone()));
    Fields {
        r_m: grid.r.nodes().to_vec(),
        z_m: grid.z.nodes().to_vec(),
        region: materials.region.clone(),
        region_names,
        conductivity: materials.sigma.clone(),
        relative_permeability: materials.mu_r.clone(),
        snapshots: Vec::new(),
    }
}

/// One instant from the reaction field (all nodes) and the ring currents (wall nodes), mover at `position`.
pub(crate) fn snapshot(
    operators: &Operators,
    problem: &Problem,
    psi_reaction: &[f64],
    currents: &[f64],
    time: f64,
    position: f64,
) -> Snapshot {
    let grid = &operators.grid;
    let (r, z) = (grid.r.nodes(), grid.z.nodes());
    let mover = &problem.mover;
    let mut psi_total = psi_reaction.to_vec();
    for (j, &zj) in z.iter().enumerate() {
        for (i, &ri) in r.iter().enumerate().skip(1) {
            psi_total[grid.node(i, j)] += mover.psi(ri, zj - position);
        }
    }
    let e_phi = electric_field(operators, currents);
    let cells = grid.cells();
    let mut shot = Snapshot {
        time_s: time,
        mover_position_m: position,
        psi_total,
        psi_reaction: psi_reaction.to_vec(),
        flux_density_r: Vec::with_capacity(cells),
        flux_density_z: Vec::with_capacity(cells),
        current_density_phi: Vec::with_capacity(cells),
        heat_density: Vec::with_capacity(cells),
    };
    for j in 0..grid.nz() - 1 {
        for i in 0..grid.nr() - 1 {
            let (rc, zc) = (0.5 * (r[i] + r[i + 1]), 0.5 * (z[j] + z[j + 1]) - position);
            let (b_r, b_z) = cell_flux_density(grid, psi_reaction, i, j);
            shot.flux_density_r.push(b_r + mover.flux_density_r(rc, zc));
            shot.flux_density_z.push(b_z + mover.flux_density_z(rc, zc));
            let sigma = operators.materials.sigma[grid.cell(i, j)];
            let corners = [grid.node(i, j), grid.node(i + 1, j), grid.node(i, j + 1), grid.node(i + 1, j + 1)];
            let field = 0.25 * corners.iter().map(|&n| e_phi[n]).sum::<f64>();
            shot.current_density_phi.push(sigma * field);
            shot.heat_density.push(sigma * field * field);
        }
    }
    shot
}

/// E_phi = I / (G r) at nodes, V/m; zero off the wall and on the axis.
fn electric_field(operators: &Operators, currents: &[f64]) -> Vec<f64> {
    let (grid, wall) = (&operators.grid, &operators.wall);
    let mut field = vec![0.0; grid.nodes()];
    for row in &wall.rows {
        for k in 0..row.count {
            let w = row.start + k;
            if wall.conductance[w] > 0.0 {
                field[grid.node(row.i, row.j + k)] = currents[w] / (wall.conductance[w] * wall.radius[w]);
            }
        }
    }
    field
}

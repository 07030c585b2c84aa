//! One level's system from its operators.

use lenzbore_mesh::{Grid, Refinement, Regions};
use sprs::TriMat;

use super::{LevelSystem, SparseMatrix, SystemRow};
use crate::direct::DirectPlan;
use crate::fault::SolveFault;
use crate::grid_rules::GridPlan;
use crate::materials::Materials;
use crate::operators::{Operators, add_product};
use crate::outcome::WorkCounters;
use crate::problem::Problem;
use crate::settled::{slope, static_reaction, wall_source};

/// The system of one refinement; `moving` gives it C.
pub(super) fn level(
    problem: &Problem,
    plan: &GridPlan,
    refinement: Refinement,
    moving: bool,
) -> Result<LevelSystem, SolveFault> {
    let grid = plan.grid(refinement);
    let materials = Materials::new(&problem.wall, &Regions::new(&grid, &plan.rectangles));
    let operators = Operators::new(grid, materials);
    let fixed = fixed(&operators, problem)?;
    let own = wall_source(&operators, problem);
    let n = operators.unknowns();
    let (mut source, mut conductance, mut gradient) = (vec![0.0; n], vec![0.0; n], vec![0.0; n]);
    let wall = &operators.wall;
    let slopes = slope(&operators, problem, fixed.as_deref());
    for row in &wall.rows {
        for k in 0..row.count {
            let (w, node) = (row.start + k, operators.grid.node(row.i, row.j + k));
            let u = wall.unknown[w];
            source[u] = own[node] + fixed.as_ref().map_or(0.0, |f| f[node]);
            conductance[u] = wall.conductance[w];
            gradient[u] = slopes[w];
        }
    }
    let mut region_names = vec!["free space".to_owned()];
    region_names.extend(problem.wall.layers.iter().map(|l| l.name.clone()));
    Ok(LevelSystem {
        refinement: refinement.factor(),
        r_m: operators.grid.r.nodes().to_vec(),
        z_m: operators.grid.z.nodes().to_vec(),
        region_names,
        rows: rows(&operators),
        stiffness: SparseMatrix::of(&operators.stiffness),
        convection: moving.then(|| convection(&operators)),
        static_reaction: unknowns(&operators, fixed.as_deref()),
        static_linkage: static_linkage(&operators, &own, &source),
        conductance,
        source,
        slope: gradient,
    })
}

/// The static reaction of a permeable wall at all nodes.
fn fixed(operators: &Operators, problem: &Problem) -> Result<Option<Vec<f64>>, SolveFault> {
    if operators.excess.is_none() {
        return Ok(None);
    }
    let mut factor = DirectPlan::new(operators)?.factor(operators, 0.0)?;
    Ok(static_reaction(operators, &mut factor, problem, &mut WorkCounters::default())?.0)
}

/// Values at all nodes, taken at the unknowns; zeros where there are none.
fn unknowns(operators: &Operators, nodes: Option<&[f64]>) -> Vec<f64> {
    let Some(nodes) = nodes else { return vec![0.0; operators.unknowns()] };
    let grid = &operators.grid;
    inner(grid).map(|(i, j)| nodes[grid.node(i, j)]).collect()
}

/// The nodes that are unknowns, in their order.
fn inner(grid: &Grid) -> impl Iterator<Item = (usize, usize)> + use<> {
    let (nr, nz) = (grid.nr(), grid.nz());
    (1..nz - 1).flat_map(move |j| (1..nr - 1).map(move |i| (i, j)))
}

fn rows(operators: &Operators) -> Vec<SystemRow> {
    let (grid, region) = (&operators.grid, &operators.materials.region);
    let one = |(i, j): (usize, usize)| {
        let cells = [(i - 1, j - 1), (i, j - 1), (i - 1, j), (i, j)];
        let touched = cells.iter().map(|&(a, b)| region[grid.cell(a, b)]).filter(|&k| k > 0).min();
        let beside = [i == 1, i + 2 == grid.nr(), j == 1, j + 2 == grid.nz()];
        SystemRow { i, j, region: touched.unwrap_or(0), beside }
    };
    inner(grid).map(one).collect()
}

/// C: G d/dz by central differences, psi zero on the boundary.
fn convection(operators: &Operators) -> SparseMatrix {
    let (grid, wall) = (&operators.grid, &operators.wall);
    let (stride, z, n) = (grid.nr() - 2, grid.z.nodes(), operators.unknowns());
    let mut entries = TriMat::with_capacity((n, n), 2 * wall.len());
    for row in &wall.rows {
        for k in 0..row.count {
            let (w, j) = (row.start + k, row.j + k);
            let (u, weight) = (wall.unknown[w], wall.conductance[w] / (z[j + 1] - z[j - 1]));
            if weight.abs() > 0.0 && j > 1 {
                entries.add_triplet(u, u - stride, -weight);
            }
            if weight.abs() > 0.0 && j + 2 < grid.nz() {
                entries.add_triplet(u, u + stride, weight);
            }
        }
    }
    SparseMatrix::of(&entries.to_csr())
}

/// -psi_0 . (K - K0) psi_s.
fn static_linkage(operators: &Operators, own: &[f64], source: &[f64]) -> f64 {
    let Some(excess) = &operators.excess else { return 0.0 };
    let mut right = vec![0.0; operators.unknowns()];
    add_product(excess, own, -1.0, &mut right);
    right.iter().zip(source).map(|(r, s)| r * s).sum()
}

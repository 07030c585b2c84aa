//! A closed cylinder, psi = 0 on its axis, mantle and ends, filled at will: where exact solutions are held against
//! the discrete operators.

use lenzbore_mesh::{Anchor, Grid, PlannedLine, Refinement, SizeLaw};

use crate::linear::{Factor, Pattern};
use crate::materials::Materials;
use crate::operators::Operators;

/// Radius of the chamber, m.
pub(super) const RADIUS: f64 = 0.02;
/// Length of the chamber, m: z from 0.
pub(super) const LENGTH: f64 = 0.03;

/// Radii that are grid lines, m: the faces of a shell in the chamber.
pub(super) const FACES: [f64; 2] = [0.007, 0.011];

/// The lines of the chamber, graded: fine at the faces, and at two heights off the middle.
pub(super) struct Chamber {
    r: PlannedLine,
    z: PlannedLine,
}

/// What fills a place.
#[derive(Debug, Clone, Copy)]
pub(super) struct Filling {
    pub(super) sigma: f64,
    pub(super) mu_r: f64,
}

/// Nothing.
pub(super) const EMPTY: Filling = Filling { sigma: 0.0, mu_r: 1.0 };

impl Chamber {
    pub(super) fn new() -> Self {
        let law = |positions: [f64; 2], sizes: [f64; 2]| SizeLaw {
            growth: 0.26,
            anchors: (0..2).map(|k| Anchor { position_m: positions[k], size_m: sizes[k] }).collect(),
            caps: Vec::new(),
        };
        let r = PlannedLine::new(&[0.0, FACES[0], FACES[1], RADIUS], &law(FACES, [0.0005, 0.0007])).unwrap();
        let heights = [0.012, 0.02];
        let z = PlannedLine::new(&[0.0, heights[0], heights[1], LENGTH], &law(heights, [0.0008, 0.0011])).unwrap();
        Self { r, z }
    }

    pub(super) fn grid(&self, refinement: Refinement) -> Grid {
        Grid { r: self.r.nodes(refinement), z: self.z.nodes(refinement) }
    }

    /// Operators with the filling of each cell by its centre; every cell counts as wall that conducts or is
    /// permeable.
    pub(super) fn operators(&self, refinement: Refinement, filling: impl Fn(f64) -> Filling) -> Operators {
        let grid = self.grid(refinement);
        let materials = materials(&grid, filling);
        Operators::new(grid, materials)
    }
}

/// Materials by the radius of the cells' centres.
pub(super) fn materials(grid: &Grid, filling: impl Fn(f64) -> Filling) -> Materials {
    let r = grid.r.nodes();
    let of_cell: Vec<Filling> =
        (0..grid.cells()).map(|cell| cell % (grid.nr() - 1)).map(|i| filling(0.5 * (r[i] + r[i + 1]))).collect();
    Materials {
        sigma: of_cell.iter().map(|f| f.sigma).collect(),
        mu_r: of_cell.iter().map(|f| f.mu_r).collect(),
        region: of_cell.iter().map(|f| usize::from(f.sigma > 0.0 || f.mu_r != 1.0)).collect(),
    }
}

/// A function of (r, z) at all nodes.
pub(super) fn at_nodes(grid: &Grid, f: impl Fn(f64, f64) -> f64) -> Vec<f64> {
    let mut values = Vec::with_capacity(grid.nodes());
    for &z in grid.z.nodes() {
        values.extend(grid.r.nodes().iter().map(|&r| f(r, z)));
    }
    values
}

/// A function of (r, z) at the unknowns.
pub(super) fn at_unknowns(grid: &Grid, f: impl Fn(f64, f64) -> f64) -> Vec<f64> {
    let mut values = Vec::new();
    for &z in &grid.z.nodes()[1..grid.nz() - 1] {
        values.extend(grid.r.nodes()[1..grid.nr() - 1].iter().map(|&r| f(r, z)));
    }
    values
}

/// The current through each unknown's dual cell, A, of a current density `j`(r, z), A/m2.
pub(super) fn dual_currents(grid: &Grid, j: impl Fn(f64, f64) -> f64) -> Vec<f64> {
    let mut currents = at_unknowns(grid, j);
    for (row, values) in currents.chunks_exact_mut(grid.nr() - 2).enumerate() {
        for (column, value) in values.iter_mut().enumerate() {
            *value *= grid.r.dual(column + 1) * grid.z.dual(row + 1);
        }
    }
    currents
}

/// K^-1 of `right`.
pub(super) fn solve(operators: &Operators, right: &[f64]) -> Vec<f64> {
    let pattern = Pattern::new(&operators.stiffness).unwrap();
    let mut psi = right.to_vec();
    Factor::new(&pattern, &operators.stiffness, None).unwrap().solve_in_place(&mut psi);
    psi
}

/// Values of unknowns at the nodes that all levels share: every second one of the coarsest.
pub(super) fn at_shared_nodes(grid: &Grid, refinement: Refinement, unknowns: &[f64]) -> Vec<f64> {
    let step = refinement.times(2);
    let mut values = Vec::new();
    for j in (step..grid.nz() - 1).step_by(step) {
        for i in (step..grid.nr() - 1).step_by(step) {
            values.push(unknowns[(j - 1) * (grid.nr() - 2) + i - 1]);
        }
    }
    values
}

//! One grid level of a march: operators, the mover's field at the wall, factors by step size.

use std::collections::VecDeque;
use std::f64::consts::PI;

use lenzbore_mesh::Regions;

use super::lines::LevelLines;
use super::window::Window;
use crate::direct::{DirectFactor, DirectPlan};
use crate::fault::SolveFault;
use crate::linear::RESIDUAL_LIMIT;
use crate::materials::Materials;
use crate::operators::{Operators, add_product};
use crate::outcome::WorkCounters;
use crate::placement::Placement;
use crate::problem::Problem;
use crate::sources::SourceTable;
use crate::wall_nodes::WallNodes;

/// Factors kept at a time, one a step size.
const KEPT_FACTORS: usize = 4;
/// Accuracy of the table of the mover's field, relative to the largest |psi| at a radius.
const TABLE_TOLERANCE: f64 = 1.0e-11;

/// A level of the march.
pub(crate) struct MarchLevel<'a> {
    pub(crate) problem: &'a Problem,
    pub(crate) placement: &'a Placement,
    pub(crate) lines: LevelLines<'a>,
    pub(crate) operators: Operators,
    direct: DirectPlan,
    factors: VecDeque<(u64, DirectFactor)>,
    at_rest: Option<AtRest>,
    table: SourceTable,
    /// Row of the table for each run of wall nodes.
    table_rows: Vec<usize>,
    pub(crate) counters: WorkCounters,
    pub(crate) worst_residual: f64,
}

impl<'a> MarchLevel<'a> {
    /// Builds the level for positions of the reference point between `low` and `high`, on the grid of `window` or the whole one.
    ///
    /// # Errors
    /// See [`SolveFault`].
    pub(crate) fn new(
        problem: &'a Problem,
        placement: &'a Placement,
        lines: LevelLines<'a>,
        window: Option<Window>,
        (low, high): (f64, f64),
    ) -> Result<Self, SolveFault> {
        let operators = assemble(problem, &lines, window)?;
        let direct = DirectPlan::new(&operators)?;
        let at_rest = AtRest::new(&operators, &direct)?;
        let radii: Vec<f64> = table_radii(&operators.wall).iter().map(|&i| operators.grid.r.nodes()[i]).collect();
        let (bottom, top) = (0.0, problem.wall.length_m().unwrap_or(0.0));
        let table = SourceTable::new(&problem.mover, &radii, bottom - high, top - low, TABLE_TOLERANCE);
        Ok(Self {
            problem,
            placement,
            lines,
            table_rows: table_rows(&operators.wall),
            table,
            direct,
            factors: VecDeque::new(),
            at_rest,
            operators,
            counters: WorkCounters::default(),
            worst_residual: 0.0,
        })
    }

    /// Goes over to the grid of `window`; factors are made anew as they are needed.
    ///
    /// # Errors
    /// See [`SolveFault`].
    pub(crate) fn enter(&mut self, window: Window) -> Result<(), SolveFault> {
        self.operators = assemble(self.problem, &self.lines, Some(window))?;
        self.direct = DirectPlan::new(&self.operators)?;
        self.at_rest = AtRest::new(&self.operators, &self.direct)?;
        self.table_rows = table_rows(&self.operators.wall);
        self.factors.clear();
        Ok(())
    }

    /// psi_s at the wall nodes with the mover at `position`, and d psi_s / d position.
    pub(crate) fn fill_source(&self, position: f64, psi: &mut [f64], by_position: &mut [f64]) {
        let z = self.operators.grid.z.nodes();
        for (row, &table_row) in self.operators.wall.rows.iter().zip(&self.table_rows) {
            let range = row.start..row.start + row.count;
            let heights = &z[row.j..row.j + row.count];
            self.table.fill_both(table_row, heights, position, &mut psi[range.clone()], &mut by_position[range]);
        }
        by_position.iter_mut().for_each(|s| *s = -*s);
    }

    /// Makes sure that the factor of K + 2 G / dt is at hand.
    ///
    /// # Errors
    /// See [`SolveFault`].
    pub(crate) fn prepare(&mut self, dt: f64) -> Result<(), SolveFault> {
        let key = dt.to_bits();
        if let Some(at) = self.factors.iter().position(|(k, _)| *k == key) {
            // Most recently used first.
            if let Some(entry) = self.factors.remove(at) {
                self.factors.push_front(entry);
            }
            return Ok(());
        }
        self.factors.truncate(KEPT_FACTORS - 1);
        self.factors.push_front((key, self.direct.factor(&self.operators, 2.0 / dt)?));
        self.counters.factorisations += 1;
        Ok(())
    }

    /// Solves (K + 2 G / dt) x = b in place for one or two columns with the factor made ready last.
    pub(crate) fn solve(&mut self, columns: &mut [f64]) {
        if let Some((_, factor)) = self.factors.front_mut() {
            factor.solve_in_place(columns);
            self.counters.solves += columns.len() / self.operators.unknowns();
        }
    }

    /// Checks a solution of (K + 2 G / dt) x = b with the factor made ready last, and keeps the worst residual.
    ///
    /// # Errors
    /// Not finite, or above `limit`.
    pub(crate) fn check(&mut self, x: &[f64], b: &[f64], limit: f64) -> Result<(), SolveFault> {
        if let Some((_, factor)) = self.factors.front_mut() {
            self.worst_residual = self.worst_residual.max(factor.check(&self.operators, x, b, limit)?);
        }
        Ok(())
    }

    /// y at rest: the static field of mover (`psi_source` at the wall nodes) and permeable wall, and the field energy, J.
    ///
    /// # Errors
    /// See [`SolveFault`].
    pub(crate) fn field_at_rest(&mut self, psi_source: &[f64]) -> Result<(Vec<f64>, f64), SolveFault> {
        let mut flux = psi_source.to_vec();
        let Some(at_rest) = &mut self.at_rest else { return Ok((flux, 0.0)) };
        at_rest.solve(&self.operators, psi_source);
        self.counters.solves += 1;
        at_rest.factor.check(&self.operators, &at_rest.psi, &at_rest.right, RESIDUAL_LIMIT)?;
        // pi (psi_r K psi_r + 2 psi_r (K - K0) psi_s + psi_s (K - K0) psi_s), with K psi_r = -(K - K0) psi_s.
        let mut energy = 0.0;
        for (w, &u) in self.operators.wall.unknown.iter().enumerate() {
            flux[w] += at_rest.psi[u];
            energy -= PI * (at_rest.psi[u] + psi_source[w]) * at_rest.right[u];
        }
        Ok((flux, energy))
    }

    /// Axial force of a permeable wall on the mover at rest at `position`, N: 2 pi (K0 psi_r) . d psi_s / d position.
    pub(crate) fn static_pull(&mut self, position: f64) -> f64 {
        let Some(mut at_rest) = self.at_rest.take() else { return 0.0 };
        let (mut source, mut slope) = (std::mem::take(&mut at_rest.source), std::mem::take(&mut at_rest.slope));
        self.fill_source(position, &mut source, &mut slope);
        at_rest.solve(&self.operators, &source);
        self.counters.solves += 1;
        let free = self.operators.stiffness_free();
        let mut force = 0.0;
        for (s, &u) in slope.iter().zip(&self.operators.wall.unknown) {
            let row = free.outer_view(u);
            force += 2.0 * PI * s * row.map_or(0.0, |q| q.iter().map(|(c, v)| v * at_rest.psi[c]).sum());
        }
        (at_rest.source, at_rest.slope) = (source, slope);
        self.at_rest = Some(at_rest);
        force
    }
}

fn assemble(problem: &Problem, lines: &LevelLines<'_>, window: Option<Window>) -> Result<Operators, SolveFault> {
    let grid = lines.grid(window)?;
    let materials = Materials::new(&problem.wall, &Regions::new(&grid, &lines.plan.rectangles));
    Ok(Operators::new(grid, materials))
}

/// Radial node indices of the wall, increasing: one row of the table of the mover's field each.
fn table_radii(wall: &WallNodes) -> Vec<usize> {
    let mut indices: Vec<usize> = wall.rows.iter().map(|row| row.i).collect();
    indices.sort_unstable();
    indices.dedup();
    indices
}

/// Row of the table for each run of wall nodes.
fn table_rows(wall: &WallNodes) -> Vec<usize> {
    let indices = table_radii(wall);
    wall.rows.iter().map(|row| indices.partition_point(|&k| k < row.i)).collect()
}

/// The static problem of a permeable wall: K psi_r = -(K - K0) psi_s.
struct AtRest {
    factor: DirectFactor,
    nodes: Vec<f64>,
    right: Vec<f64>,
    psi: Vec<f64>,
    source: Vec<f64>,
    slope: Vec<f64>,
}

impl AtRest {
    fn new(operators: &Operators, direct: &DirectPlan) -> Result<Option<Self>, SolveFault> {
        if operators.excess.is_none() {
            return Ok(None);
        }
        let (n, w) = (operators.unknowns(), operators.wall.len());
        Ok(Some(Self {
            factor: direct.factor(operators, 0.0)?,
            nodes: vec![0.0; operators.grid.nodes()],
            right: vec![0.0; n],
            psi: vec![0.0; n],
            source: vec![0.0; w],
            slope: vec![0.0; w],
        }))
    }

    fn solve(&mut self, operators: &Operators, psi_source: &[f64]) {
        spread_wall(operators, psi_source, &mut self.nodes);
        self.right.fill(0.0);
        if let Some(excess) = &operators.excess {
            add_product(excess, &self.nodes, -1.0, &mut self.right);
        }
        self.psi.copy_from_slice(&self.right);
        self.factor.solve_in_place(&mut self.psi);
    }
}

/// Wall values spread over all nodes (other nodes untouched).
pub(crate) fn spread_wall(operators: &Operators, values: &[f64], nodes: &mut [f64]) {
    let grid = &operators.grid;
    for row in &operators.wall.rows {
        for k in 0..row.count {
            nodes[grid.node(row.i, row.j + k)] = values[row.start + k];
        }
    }
}

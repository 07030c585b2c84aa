//! One grid level with coils at rest.

use lenzbore_mesh::{Grid, Regions};
use num_complex::Complex64;

use super::groups::{Group, group_of};
use super::recurrence::Recurrence;
use crate::direct::{DirectFactor, DirectPlan};
use crate::fault::SolveFault;
use crate::grid_rules::GridPlan;
use crate::linear::RESIDUAL_LIMIT;
use crate::materials::Materials;
use crate::monitor::Monitor;
use crate::operators::{Operators, add_product};
use crate::outcome::WorkCounters;
use crate::problem::Problem;
use crate::sources::AxialField;

/// A level: operators, the coils' static field at the wall, and a recurrence for each group of frequencies.
pub(super) struct HarmonicLevel {
    pub(super) operators: Operators,
    /// K, factored.
    factor: DirectFactor,
    /// psi_0 at the wall's nodes, psi_0 the coils' own field and the static reaction of a permeable wall.
    pub(super) flux: Vec<f64>,
    /// Static reaction of a permeable wall, all nodes.
    pub(super) static_reaction: Option<Vec<f64>>,
    /// What it adds to 1/(2 pi) of ampere-turns times linkage: -psi_0^T (K - K0) psi_s.
    static_linkage: f64,
    groups: Vec<Group>,
    recurrences: Vec<Recurrence>,
    pub(super) counters: WorkCounters,
    /// Largest relative residual of a solve.
    pub(super) residual: f64,
}

/// The wall's reaction at one frequency, at the wall's nodes.
pub(super) struct Reaction {
    /// Angular frequency, rad/s.
    pub(super) omega: f64,
    /// psi_0 + phi, Wb/rad.
    pub(super) flux: Vec<Complex64>,
    /// Ring currents -i omega G (psi_0 + phi), A.
    pub(super) currents: Vec<Complex64>,
}

impl HarmonicLevel {
    /// Builds the level on `grid` for `problem`, whose mover stands in the wall's frame.
    ///
    /// # Errors
    /// See [`SolveFault`].
    pub(super) fn new(
        problem: &Problem,
        plan: &GridPlan,
        grid: Grid,
        groups: &[Group],
        monitor: &dyn Monitor,
    ) -> Result<Self, SolveFault> {
        let materials = Materials::new(&problem.wall, &Regions::new(&grid, &plan.rectangles));
        let operators = Operators::new(grid, materials);
        let direct = DirectPlan::new(&operators)?;
        let mut level = Self {
            factor: direct.factor(&operators, 0.0)?,
            flux: Vec::new(),
            static_reaction: None,
            static_linkage: 0.0,
            groups: groups.to_vec(),
            recurrences: Vec::with_capacity(groups.len()),
            counters: WorkCounters { factorisations: 1, ..WorkCounters::default() },
            residual: 0.0,
            operators,
        };
        level.settle(problem)?;
        for group in groups {
            let mut factor = direct.factor(&level.operators, group.shift)?;
            let omegas = [group.range.0, group.range.1];
            let recurrence =
                Recurrence::new(&level.operators, &mut factor, &level.flux, (group.shift, &omegas), monitor)?;
            level.counters.factorisations += 1;
            level.counters.solves += recurrence.len() + 1;
            level.counters.recurrence += recurrence.len();
            level.residual = level.residual.max(recurrence.residual);
            level.recurrences.push(recurrence);
        }
        Ok(level)
    }

    /// The coils' own field at the wall, and K psi = -(K - K0) psi_s: what a permeable wall adds at rest.
    fn settle(&mut self, problem: &Problem) -> Result<(), SolveFault> {
        let (operators, wall) = (&self.operators, &self.operators.wall);
        let grid = &operators.grid;
        let mut own = vec![0.0; grid.nodes()];
        for row in &wall.rows {
            let r = grid.r.nodes()[row.i];
            // A row beyond both ends: the excess of a permeable wall reaches the boundary of the grid.
            for j in row.j - 1..=row.j + row.count {
                own[grid.node(row.i, j)] = problem.mover.psi(r, grid.z.nodes()[j]);
            }
        }
        self.flux = at_wall(operators, &own);
        let Some(excess) = &operators.excess else { return Ok(()) };
        let mut right = vec![0.0; operators.unknowns()];
        add_product(excess, &own, -1.0, &mut right);
        let mut psi = right.clone();
        self.factor.solve_in_place(&mut psi);
        self.counters.solves += 1;
        self.residual = self.factor.check(operators, &psi, &right, RESIDUAL_LIMIT)?;
        self.flux.iter_mut().zip(&wall.unknown).for_each(|(f, &u)| *f += psi[u]);
        self.static_linkage = wall.unknown.iter().zip(&self.flux).map(|(&u, f)| right[u] * f).sum();
        self.static_reaction = Some(operators.spread(&psi));
        Ok(())
    }

    /// The wall's reaction at `omega`, rad/s, within the frequencies that the level was made for.
    pub(super) fn reaction(&self, omega: f64) -> Reaction {
        let mut flux = self.recurrence(omega).flux(omega);
        flux.resize(self.flux.len(), Complex64::ZERO);
        flux.iter_mut().zip(&self.flux).for_each(|(f, own)| *f += own);
        let minus_i_omega = Complex64::new(0.0, -omega);
        let currents = self.operators.wall.conductance.iter().zip(&flux).map(|(g, f)| minus_i_omega * g * f).collect();
        Reaction { omega, flux, currents }
    }

    fn recurrence(&self, omega: f64) -> &Recurrence {
        &self.recurrences[group_of(&self.groups, omega)]
    }

    /// 1/(2 pi) of ampere-turns times the linkage that the wall adds, A Wb/rad, from its ring currents:
    /// psi_0^T I - psi_0^T (K - K0) psi_s, by reciprocity.
    pub(super) fn linked(&self, reaction: &Reaction) -> Complex64 {
        let by_currents: Complex64 = self.flux.iter().zip(&reaction.currents).map(|(f, i)| f * i).sum();
        by_currents + self.static_linkage
    }

    /// The same from the tridiagonal problem alone.
    pub(super) fn linked_quickly(&self, omega: f64) -> Complex64 {
        let wall = &self.operators.wall;
        let own: f64 = wall.conductance.iter().zip(&self.flux).map(|(g, f)| g * f * f).sum();
        Complex64::new(0.0, -omega) * (own + self.recurrence(omega).linked(omega)) + self.static_linkage
    }

    /// Residual that the recurrence leaves at `omega`.
    pub(super) fn left(&self, omega: f64) -> f64 {
        self.recurrence(omega).left(omega)
    }

    /// Real and imaginary part of the reaction at all nodes, the static one included, by K psi = I.
    ///
    /// # Errors
    /// Not finite, or too large a residual.
    pub(super) fn spread(&mut self, reaction: &Reaction) -> Result<[Vec<f64>; 2], SolveFault> {
        let n = self.operators.unknowns();
        let mut right = vec![0.0; 2 * n];
        for (&u, current) in self.operators.wall.unknown.iter().zip(&reaction.currents) {
            (right[u], right[n + u]) = (current.re, current.im);
        }
        let mut psi = right.clone();
        self.factor.solve_in_place(&mut psi);
        self.counters.solves += 2;
        for (x, b) in psi.chunks_exact(n).zip(right.chunks_exact(n)) {
            self.factor.check(&self.operators, x, b, RESIDUAL_LIMIT)?;
        }
        let mut real = self.operators.spread(&psi[..n]);
        if let Some(fixed) = &self.static_reaction {
            real.iter_mut().zip(fixed).for_each(|(p, s)| *p += s);
        }
        Ok([real, self.operators.spread(&psi[n..])])
    }
}

/// Values at all nodes, taken at the wall's.
fn at_wall(operators: &Operators, nodes: &[f64]) -> Vec<f64> {
    let (grid, wall) = (&operators.grid, &operators.wall);
    let mut values = vec![0.0; wall.len()];
    for row in &wall.rows {
        for k in 0..row.count {
            values[row.start + k] = nodes[grid.node(row.i, row.j + k)];
        }
    }
    values
}

//! One grid level of the settled problem.

use std::f64::consts::PI;

use lenzbore_mesh::{Grid, Regions};

use super::recurrence::Recurrence;
use crate::direct::{DirectFactor, DirectPlan};
use crate::fault::SolveFault;
use crate::grid_rules::GridPlan;
use crate::interpolate::{ALONG_POINTS, Stencil, peak_near};
use crate::linear::RESIDUAL_LIMIT;
use crate::materials::Materials;
use crate::monitor::Monitor;
use crate::operators::{Operators, add_product};
use crate::outcome::WorkCounters;
use crate::problem::{Mover, Problem};
use crate::sources::AxialField;
use crate::wall_nodes::WallRow;

/// Recurrence residual at which the drag has converged to 2e-11 (measured at 100 m/s).
const RECURRENCE_LIMIT: f64 = 1.0e-10;
/// More vectors than this is a failure.
const MOST_VECTORS: usize = 6000;

/// A level: operators, the factor of K, the static field at the wall, the recurrence.
pub(crate) struct SettledLevel {
    pub(crate) operators: Operators,
    factor: DirectFactor,
    /// d psi_0/dz at the wall nodes, psi_0 the static field (mover and permeable wall).
    slope: Vec<f64>,
    /// Static reaction of a permeable wall, all nodes.
    pub(crate) static_reaction: Option<Vec<f64>>,
    pub(crate) recurrence: Recurrence,
    /// 2 pi (K v_k) . slope: the drag of each recurrence vector, N.
    vector_drag: Vec<f64>,
    pub(crate) counters: WorkCounters,
    pub(crate) residual: f64,
}

/// Figures of one level at one speed.
#[derive(Debug, Clone, Copy)]
pub(crate) struct LevelDrag {
    /// Drag by J x B over the wall, N.
    pub(crate) drag: f64,
    /// Drag as heat / speed, N.
    pub(crate) drag_by_heat: f64,
    /// Peak current density, A/m2, and where.
    pub(crate) peak: f64,
    pub(crate) peak_at: (f64, f64),
}

impl SettledLevel {
    /// Builds the level on `grid` for speeds up to |`velocity`|.
    ///
    /// # Errors
    /// See [`SolveFault`].
    pub(crate) fn new(
        problem: &Problem,
        plan: &GridPlan,
        grid: Grid,
        velocity: f64,
        monitor: &dyn Monitor,
    ) -> Result<Self, SolveFault> {
        let materials = Materials::new(&problem.wall, &Regions::new(&grid, &plan.rectangles));
        let operators = Operators::new(grid, materials);
        let mut factor = DirectPlan::new(&operators)?.factor(&operators, 0.0)?;
        let mut counters = WorkCounters { factorisations: 1, ..WorkCounters::default() };
        let (static_reaction, static_residual) = static_reaction(&operators, &mut factor, problem, &mut counters)?;
        let slope = slope(&operators, problem, static_reaction.as_deref());
        let (recurrence, residual) = recur(&operators, &mut factor, &slope, velocity, monitor, &mut counters)?;
        let vector_drag = recurrence.currents.iter().map(|c| drag_of(c, &slope)).collect();
        Ok(Self {
            operators,
            factor,
            slope,
            static_reaction,
            recurrence,
            vector_drag,
            counters,
            residual: residual.max(static_residual),
        })
    }

    /// Zero-speed damping coefficient, N s/m: 2 pi sum G (d psi_0/dz)^2.
    pub(crate) fn damping_coefficient(&self) -> f64 {
        let wall = &self.operators.wall;
        2.0 * PI * wall.conductance.iter().zip(&self.slope).map(|(g, q)| g * q * q).sum::<f64>()
    }

    /// Damping coefficient times lag time, N s2/m: 2 pi beta_1^2, from the first-order reaction's energy.
    pub(crate) fn lag_product(&self) -> f64 {
        2.0 * PI * self.recurrence.beta_1 * self.recurrence.beta_1
    }

    /// Drag by J x B alone, N (odd in velocity), from the small tridiagonal problem.
    pub(crate) fn drag(&self, velocity: f64) -> f64 {
        let x = self.recurrence.coefficients(velocity);
        velocity * self.recurrence.beta_1 * x.iter().zip(&self.vector_drag).map(|(x, d)| x * d).sum::<f64>()
    }

    /// Drag by two routes, and the peak current density.
    pub(crate) fn figures(&self, mover: &Mover, velocity: f64) -> LevelDrag {
        let currents = self.recurrence.ring_currents(velocity);
        let heat = self.heat(&currents);
        let (peak, peak_at) = self.peak(mover, velocity, &currents);
        LevelDrag { drag: drag_of(&currents, &self.slope), drag_by_heat: heat / velocity, peak, peak_at }
    }

    /// Heat in the wall, W: 2 pi sum I^2 / G.
    fn heat(&self, currents: &[f64]) -> f64 {
        let wall = &self.operators.wall;
        let rings = currents.iter().zip(&wall.conductance).filter(|(_, g)| **g > 0.0);
        2.0 * PI * rings.map(|(i, g)| i * i / g).sum::<f64>()
    }

    /// The greatest current density and its (r, z): sigma v |d psi/dz| / r, the mover's own part exact, the reaction's
    /// from a high-order stencil along the wall.
    fn peak(&self, mover: &Mover, velocity: f64, currents: &[f64]) -> (f64, (f64, f64)) {
        let (grid, wall) = (&self.operators.grid, &self.operators.wall);
        let Some((row, k)) = greatest_node(&self.operators, currents) else { return (0.0, (0.0, 0.0)) };
        let (r, z) = (grid.r.nodes()[row.i], &grid.z.nodes()[row.j..row.j + row.count]);
        let mut flux = self.recurrence.flux(velocity, row.start..row.start + row.count);
        if let Some(fixed) = &self.static_reaction {
            flux.iter_mut().enumerate().for_each(|(n, f)| *f += fixed[grid.node(row.i, row.j + n)]);
        }
        let field = |s: f64| {
            let reaction = Stencil::<ALONG_POINTS>::at(z, s).slope_of(&flux);
            velocity * (reaction / r - mover.flux_density_r(r, s))
        };
        let (at, field) = peak_near(z, k, field);
        (wall.sigma_max[row.start + k] * field, (r, at))
    }

    /// The reaction of the moving wall at `velocity` at all nodes (without the static part), with its ring currents and
    /// the residual of (K - v C) psi = v C psi_0.
    ///
    /// # Errors
    /// Not finite, or too large a residual.
    pub(crate) fn reaction(&mut self, velocity: f64) -> Result<(Vec<f64>, Vec<f64>, f64), SolveFault> {
        let currents = self.recurrence.ring_currents(velocity);
        let mut right = vec![0.0; self.operators.unknowns()];
        for (&u, &i) in self.operators.wall.unknown.iter().zip(&currents) {
            right[u] = i;
        }
        let mut psi = right.clone();
        self.factor.solve_in_place(&mut psi);
        self.counters.solves += 1;
        self.factor.check(&self.operators, &psi, &right, RESIDUAL_LIMIT)?;
        let mut carried = vec![0.0; currents.len()];
        convect(&self.operators, &psi, &mut carried);
        let (mut off, mut scale) = (0.0_f64, 0.0_f64);
        for (w, &current) in currents.iter().enumerate() {
            let wanted = velocity * (carried[w] + self.operators.wall.conductance[w] * self.slope[w]);
            off = off.max((current - wanted).abs());
            scale = scale.max(current.abs());
        }
        let residual = if scale > 0.0 { off / scale } else { 0.0 };
        Ok((self.operators.spread(&psi), currents, residual))
    }
}

/// J x B over the wall: 2 pi sum I d psi_0/dz, N.
fn drag_of(currents: &[f64], slope: &[f64]) -> f64 {
    2.0 * PI * currents.iter().zip(slope).map(|(i, q)| i * q).sum::<f64>()
}

/// The wall node of the greatest current density: its row, and its number in the row.
pub(crate) fn greatest_node(operators: &Operators, currents: &[f64]) -> Option<(WallRow, usize)> {
    let wall = &operators.wall;
    let density = |w: usize| {
        let g = wall.conductance[w];
        if g > 0.0 { (wall.sigma_max[w] * currents[w] / (g * wall.radius[w])).abs() } else { 0.0 }
    };
    let best = (0..wall.len()).map(|w| (w, density(w))).max_by(|a, b| a.1.total_cmp(&b.1)).filter(|b| b.1 > 0.0)?.0;
    let row = wall.rows[wall.rows.partition_point(|row| row.start <= best) - 1];
    Some((row, best - row.start))
}

/// psi of the mover at all nodes of the wall's radii (boundary rows included), zero elsewhere.
fn wall_source(operators: &Operators, problem: &Problem) -> Vec<f64> {
    let grid = &operators.grid;
    let mut psi = vec![0.0; grid.nodes()];
    for row in &operators.wall.rows {
        let r = grid.r.nodes()[row.i];
        for (j, &z) in grid.z.nodes().iter().enumerate() {
            psi[grid.node(row.i, j)] = problem.mover.psi(r, z);
        }
    }
    psi
}

/// K psi = -(K - K0) psi_s: the static reaction of a permeable wall, at all nodes, with its residual.
fn static_reaction(
    operators: &Operators,
    factor: &mut DirectFactor,
    problem: &Problem,
    counters: &mut WorkCounters,
) -> Result<(Option<Vec<f64>>, f64), SolveFault> {
    let Some(excess) = &operators.excess else { return Ok((None, 0.0)) };
    let source = wall_source(operators, problem);
    let mut right = vec![0.0; operators.unknowns()];
    add_product(excess, &source, -1.0, &mut right);
    let mut psi = right.clone();
    factor.solve_in_place(&mut psi);
    counters.solves += 1;
    let residual = factor.check(operators, &psi, &right, RESIDUAL_LIMIT)?;
    Ok((Some(operators.spread(&psi)), residual))
}

/// d psi_0/dz along the wall: exact for the mover's own field (-r B_r), central differences for the static reaction.
fn slope(operators: &Operators, problem: &Problem, reaction: Option<&[f64]>) -> Vec<f64> {
    let grid = &operators.grid;
    let (r, z) = (grid.r.nodes(), grid.z.nodes());
    let mut slope = vec![0.0; operators.wall.len()];
    for row in &operators.wall.rows {
        for k in 0..row.count {
            let j = row.j + k;
            let own = -r[row.i] * problem.mover.flux_density_r(r[row.i], z[j]);
            let (below, above) = (grid.node(row.i, j - 1), grid.node(row.i, j + 1));
            let added = reaction.map_or(0.0, |p| (p[above] - p[below]) / (z[j + 1] - z[j - 1]));
            slope[row.start + k] = own + added;
        }
    }
    slope
}

/// C psi at the wall nodes: G d psi/dz by central differences, psi zero on the boundary. C is skew-symmetric.
pub(crate) fn convect(operators: &Operators, psi: &[f64], out: &mut [f64]) {
    let grid = &operators.grid;
    let (stride, z) = (grid.nr() - 2, grid.z.nodes());
    for row in &operators.wall.rows {
        for k in 0..row.count {
            let (w, j) = (row.start + k, row.j + k);
            let unknown = operators.wall.unknown[w];
            let above = if j + 2 < grid.nz() { psi[unknown + stride] } else { 0.0 };
            let below = if j > 1 { psi[unknown - stride] } else { 0.0 };
            out[w] = operators.wall.conductance[w] * (above - below) / (z[j + 1] - z[j - 1]);
        }
    }
}

/// Runs the recurrence until the reaction at |velocity| has converged.
fn recur(
    operators: &Operators,
    factor: &mut DirectFactor,
    slope: &[f64],
    velocity: f64,
    monitor: &dyn Monitor,
    counters: &mut WorkCounters,
) -> Result<(Recurrence, f64), SolveFault> {
    let wall = &operators.wall;
    let mut current: Vec<f64> = wall.conductance.iter().zip(slope).map(|(g, q)| g * q).collect();
    let mut vector = vec![0.0; operators.unknowns()];
    let mut recurrence = Recurrence { beta_1: 0.0, betas: Vec::new(), currents: Vec::new(), fluxes: Vec::new() };
    let mut right = vec![0.0; operators.unknowns()];
    let mut worst = 0.0_f64;
    for k in 0..MOST_VECTORS {
        if monitor.cancelled() {
            return Err(SolveFault::Interrupted);
        }
        // next = K^-1 current, where current = C v_k + beta_k K v_(k-1) at the wall.
        right.fill(0.0);
        for (&u, &c) in wall.unknown.iter().zip(&current) {
            right[u] = c;
        }
        vector.copy_from_slice(&right);
        factor.solve_in_place(&mut vector);
        counters.solves += 1;
        worst = worst.max(factor.check(operators, &vector, &right, RESIDUAL_LIMIT)?);
        let square: f64 = wall.unknown.iter().zip(&current).map(|(&u, c)| c * vector[u]).sum();
        let beta = square.max(0.0).sqrt();
        if k == 0 {
            recurrence.beta_1 = beta;
        } else {
            recurrence.betas.push(beta);
            let residual = recurrence.residual(velocity);
            if residual < RECURRENCE_LIMIT {
                counters.recurrence = recurrence.len();
                return Ok((recurrence, worst));
            }
        }
        if beta <= f64::MIN_POSITIVE {
            counters.recurrence = recurrence.len();
            return Ok((recurrence, worst));
        }
        vector.iter_mut().for_each(|x| *x /= beta);
        current.iter_mut().for_each(|x| *x /= beta);
        recurrence.currents.push(current.clone());
        recurrence.fluxes.push(wall.unknown.iter().map(|&u| vector[u]).collect());
        let mut next = vec![0.0; wall.len()];
        convect(operators, &vector, &mut next);
        if k > 0 {
            // The previous K v is the last but one stored.
            let previous = &recurrence.currents[k - 1];
            next.iter_mut().zip(previous).for_each(|(n, p)| *n += beta * p);
        }
        current = next;
    }
    Err(SolveFault::Recurrence { steps: MOST_VECTORS, residual: recurrence.residual(velocity) })
}

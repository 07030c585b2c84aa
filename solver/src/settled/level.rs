//! One grid level of the settled problem.

use std::borrow::Cow;
use std::f64::consts::PI;
use std::sync::Arc;

use lenzbore_mesh::{Grid, Regions};

use super::elimination::Elimination;
use super::lanczos::{Came, Lanczos};
use super::method::{share, shielding};
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

/// Shielding above which currents are interpolated instead of fields: from 0.0005 to 0.01 m walls of 58 MS/m around dipoles and
/// cylinders either way is off by some 1e-3 at 10; at 1000, fields by 16 % and currents by 0.6 % (measured against the integral).
const SHIELDED: f64 = 10.0;

/// A level: operators, the factor of K, the static field at the wall, the recurrence, and what was solved at one speed alone.
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
    /// The reaction at the one speed that was asked for, where the recurrence doesn't serve it.
    alone: Option<Arc<Alone>>,
    /// Times speed: see [`shielding`].
    shielding: f64,
    pub(crate) counters: WorkCounters,
    residual: f64,
}

/// The moving wall's reaction at one speed, by elimination.
#[derive(Debug)]
struct Alone {
    velocity: f64,
    /// Reaction at the unknowns, Wb/rad.
    psi: Vec<f64>,
    /// Ring currents at the wall nodes, A.
    currents: Vec<f64>,
    residual: f64,
}

/// What is the same for all levels of a solve.
#[derive(Clone, Copy)]
pub(super) struct Wanted<'w> {
    /// Velocity that the grids are made for, m/s.
    pub(super) velocity: f64,
    /// Speeds that will be asked for.
    pub(super) speeds: &'w [f64],
    pub(super) monitor: &'w dyn Monitor,
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
    /// Backward error of the solves and rest of the recurrence.
    pub(crate) residual: f64,
}

impl SettledLevel {
    /// Builds the level on `grid` for the speeds `wanted`.
    ///
    /// # Errors
    /// See [`SolveFault`].
    pub(super) fn new(problem: &Problem, plan: &GridPlan, grid: Grid, wanted: Wanted<'_>) -> Result<Self, SolveFault> {
        let materials = Materials::new(&problem.wall, &Regions::new(&grid, &plan.rectangles));
        Self::on(problem, Operators::new(grid, materials), wanted)
    }

    /// Builds the level of `operators` for the speeds `wanted`.
    ///
    /// # Errors
    /// See [`SolveFault`].
    pub(super) fn on(problem: &Problem, operators: Operators, wanted: Wanted<'_>) -> Result<Self, SolveFault> {
        let mut factor = DirectPlan::new(&operators)?.factor(&operators, 0.0)?;
        let mut counters = WorkCounters { factorisations: 1, ..WorkCounters::default() };
        let (static_reaction, static_residual) = static_reaction(&operators, &mut factor, problem, &mut counters)?;
        let slope = slope(&operators, problem, static_reaction.as_deref());
        let share = share(&problem.wall, wanted.speeds);
        let (recurrence, residual) = recur(&operators, &mut factor, &slope, (share.reach, share.most), wanted.monitor)?;
        counters.recurrence = recurrence.len();
        counters.solves += recurrence.len() + 1;
        let vector_drag = recurrence.currents.iter().map(|c| drag_of(c, &slope)).collect();
        let mut level = Self {
            operators,
            factor,
            slope,
            static_reaction,
            recurrence,
            vector_drag,
            alone: None,
            shielding: shielding(&problem.wall, 1.0),
            counters,
            residual: residual.max(static_residual),
        };
        if let [speed] = wanted.speeds
            && !level.recurrence.serves(*speed)
        {
            level.alone = Some(level.alone(wanted.velocity, wanted.monitor)?);
            level.counters.factorisations += 1;
            level.counters.solves += 1;
        }
        Ok(level)
    }

    /// Its recurrence from the start.
    #[cfg(test)]
    pub(super) fn lanczos(&mut self) -> Lanczos<'_> {
        Lanczos::new(&self.operators, &mut self.factor, &self.slope)
    }

    /// Leaves every speed to elimination.
    #[cfg(test)]
    pub(super) fn forget_recurrence(&mut self) {
        let mut short = Recurrence { betas: vec![1.0], ..Recurrence::new(self.operators.wall.len()) };
        short.currents.push(self.slope.iter().copied());
        self.recurrence = short;
    }

    /// The reaction at `velocity` by elimination.
    fn alone(&self, velocity: f64, monitor: &dyn Monitor) -> Result<Arc<Alone>, SolveFault> {
        if let Some(kept) = self.alone.as_ref().filter(|a| (a.velocity - velocity).abs() <= 0.0) {
            return Ok(Arc::clone(kept));
        }
        let wall = &self.operators.wall;
        let driven: Vec<f64> = wall.conductance.iter().zip(&self.slope).map(|(g, q)| velocity * g * q).collect();
        let mut right = vec![0.0; self.operators.unknowns()];
        for (&u, d) in wall.unknown.iter().zip(&driven) {
            right[u] = *d;
        }
        let (psi, residual) = Elimination::new(&self.operators, velocity, monitor)?.solve(&right)?;
        let mut currents = vec![0.0; wall.len()];
        convect(&self.operators, &psi, &mut currents);
        currents.iter_mut().zip(&driven).for_each(|(c, d)| *c = velocity * *c + d);
        Ok(Arc::new(Alone { velocity, psi, currents, residual }))
    }

    /// The reaction at `velocity` by elimination, where the recurrence doesn't serve it.
    fn beyond(&self, velocity: f64, monitor: &dyn Monitor) -> Result<Option<Arc<Alone>>, SolveFault> {
        if self.recurrence.serves(velocity) { Ok(None) } else { self.alone(velocity, monitor).map(Some) }
    }

    /// Largest relative residual of the solves that do not depend on the speed.
    pub(super) fn solve_residual(&self) -> f64 {
        self.residual
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

    /// Drag by J x B alone, N (odd in velocity): from the small tridiagonal problem, or by elimination.
    ///
    /// # Errors
    /// Those of an elimination.
    pub(super) fn drag(&self, velocity: f64, monitor: &dyn Monitor) -> Result<f64, SolveFault> {
        if let Some(alone) = self.beyond(velocity, monitor)? {
            return Ok(drag_of(&alone.currents, &self.slope));
        }
        let x = self.recurrence.coefficients(velocity);
        Ok(velocity * self.recurrence.beta_1 * x.iter().zip(&self.vector_drag).map(|(x, d)| x * d).sum::<f64>())
    }

    /// Drag by two routes, and the peak current density.
    ///
    /// # Errors
    /// Those of an elimination.
    pub(super) fn figures(&self, mover: &Mover, velocity: f64, monitor: &dyn Monitor) -> Result<LevelDrag, SolveFault> {
        let alone = self.beyond(velocity, monitor)?;
        let (currents, solved) = match &alone {
            Some(alone) => (Cow::Borrowed(&alone.currents), alone.residual),
            None => (Cow::Owned(self.recurrence.ring_currents(velocity)), self.recurrence.residual(velocity)),
        };
        let heat = self.heat(&currents);
        let (peak, peak_at) = self.peak(mover, velocity, &currents, alone.as_deref());
        let drag = drag_of(&currents, &self.slope);
        Ok(LevelDrag { drag, drag_by_heat: heat / velocity, peak, peak_at, residual: self.residual + solved })
    }

    /// Heat in the wall, W: 2 pi sum I^2 / G.
    fn heat(&self, currents: &[f64]) -> f64 {
        let wall = &self.operators.wall;
        let rings = currents.iter().zip(&wall.conductance).filter(|(_, g)| **g > 0.0);
        2.0 * PI * rings.map(|(i, g)| i * i / g).sum::<f64>()
    }

    /// The greatest current density and its (r, z): sigma v |d psi/dz| / r, the mover's own part exact, the reaction's
    /// from a high-order stencil along the wall. Where the wall shuts the field out, the two all but cancel and their
    /// difference is lost: there the ring currents themselves, which the scheme keeps consistent, are interpolated.
    fn peak(&self, mover: &Mover, velocity: f64, currents: &[f64], alone: Option<&Alone>) -> (f64, (f64, f64)) {
        let (grid, wall) = (&self.operators.grid, &self.operators.wall);
        let Some((row, k)) = greatest_node(&self.operators, currents) else { return (0.0, (0.0, 0.0)) };
        let (r, z) = (grid.r.nodes()[row.i], &grid.z.nodes()[row.j..row.j + row.count]);
        let nodes = row.start..row.start + row.count;
        let mut flux = match alone {
            Some(alone) => wall.unknown[nodes].iter().map(|&u| alone.psi[u]).collect(),
            None => self.recurrence.flux(velocity, nodes),
        };
        if let Some(fixed) = &self.static_reaction {
            flux.iter_mut().enumerate().for_each(|(n, f)| *f += fixed[grid.node(row.i, row.j + n)]);
        }
        let field = |s: f64| {
            let reaction = Stencil::<ALONG_POINTS>::at(z, s).slope_of(&flux);
            velocity * (reaction / r - mover.flux_density_r(r, s))
        };
        let (at, field) = if self.shielding * velocity.abs() > SHIELDED {
            let electric =
                |w: usize| if wall.conductance[w] > 0.0 { currents[w] / (wall.conductance[w] * r) } else { 0.0 };
            let electric: Vec<f64> = (row.start..row.start + row.count).map(electric).collect();
            peak_near(z, k, |s| Stencil::<ALONG_POINTS>::at(z, s).value_of(&electric))
        } else {
            peak_near(z, k, field)
        };
        (wall.sigma_max[row.start + k] * field, (r, at))
    }

    /// The reaction of the moving wall at `velocity` at all nodes (without the static part), with its ring currents.
    ///
    /// # Errors
    /// Not finite, or too large a residual.
    pub(super) fn reaction(
        &mut self,
        velocity: f64,
        monitor: &dyn Monitor,
    ) -> Result<(Vec<f64>, Vec<f64>), SolveFault> {
        if let Some(alone) = self.beyond(velocity, monitor)? {
            return Ok((self.operators.spread(&alone.psi), alone.currents.clone()));
        }
        let currents = self.recurrence.ring_currents(velocity);
        let mut right = vec![0.0; self.operators.unknowns()];
        for (&u, &i) in self.operators.wall.unknown.iter().zip(&currents) {
            right[u] = i;
        }
        let mut psi = right.clone();
        self.factor.solve_in_place(&mut psi);
        self.counters.solves += 1;
        self.factor.check(&self.operators, &psi, &right, RESIDUAL_LIMIT)?;
        Ok((self.operators.spread(&psi), currents))
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
pub(crate) fn wall_source(operators: &Operators, problem: &Problem) -> Vec<f64> {
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
pub(crate) fn static_reaction(
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
pub(crate) fn slope(operators: &Operators, problem: &Problem, reaction: Option<&[f64]>) -> Vec<f64> {
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

/// Runs the recurrence until the reaction at `reach` has converged or there are `most` vectors; gives the largest relative
/// residual of its back-solves too.
fn recur(
    operators: &Operators,
    factor: &mut DirectFactor,
    slope: &[f64],
    (reach, most): (f64, usize),
    monitor: &dyn Monitor,
) -> Result<(Recurrence, f64), SolveFault> {
    let mut lanczos = Lanczos::new(operators, factor, slope);
    loop {
        if monitor.cancelled() {
            return Err(SolveFault::Interrupted);
        }
        lanczos.recurrence.make_room();
        if lanczos.step(reach, most)? == Came::ToItsEnd {
            return Ok((lanczos.recurrence, lanczos.residual));
        }
    }
}

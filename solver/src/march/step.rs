//! One step of the implicit midpoint rule, with the mover's equation of motion solved along with it.

use std::f64::consts::PI;

use super::level::{MarchLevel, spread_wall};
use super::motion::{Force, Motion, friction, frictionless, other_force};
use crate::fault::SolveFault;
use crate::operators::add_product;
use crate::problem::Free;

/// Newton passes a step, at most. One gives the converged digits unless the first guess is poor.
const MOST_PASSES: usize = 8;
/// Imbalance of the equation of motion that ends the passes, relative to the forces in it.
const MOTION_LIMIT: f64 = 1.0e-8;
/// Roundings of the speed that the equation of motion may be off by.
const ROUNDING: f64 = 16.0;
/// Residual limit of the step's linear system.
const STEP_RESIDUAL: f64 = 1.0e-11;

/// Travel in a step, in bore radii, below which the force is taken from the slope of the mover's field instead of its difference.
const LEAST_TRAVEL: f64 = 1.0e-6;

/// Everything that a step changes.
#[derive(Debug, Clone)]
pub(crate) struct State {
    pub(crate) position: f64,
    pub(crate) velocity: f64,
    /// Total flux function at the wall nodes.
    pub(crate) flux: Vec<f64>,
    /// The mover's own at the wall nodes.
    pub(crate) source: Vec<f64>,
    /// Acceleration at the last step's middle, its rate of change and that step's size, for the first guess.
    acceleration: f64,
    acceleration_rate: f64,
    last_dt: f64,
}

impl State {
    /// At rest relative to its own field's history: no currents yet.
    pub(crate) fn new(position: f64, velocity: f64, flux: Vec<f64>, source: Vec<f64>, acceleration: f64) -> Self {
        Self { position, velocity, flux, source, acceleration, acceleration_rate: 0.0, last_dt: 0.0 }
    }

    /// Acceleration that the first guess starts from, m/s2.
    pub(crate) fn first_acceleration(&self) -> f64 {
        self.acceleration
    }

    /// Carries the wall's flux over to another grid: `flux` and the mover's own `source` at its nodes.
    pub(crate) fn carried(&self, flux: Vec<f64>, source: Vec<f64>) -> Self {
        Self { flux, source, ..*self }
    }

    /// Copies `other` without allocating.
    pub(crate) fn copy_from(&mut self, other: &Self) {
        self.position = other.position;
        self.velocity = other.velocity;
        self.flux.copy_from_slice(&other.flux);
        self.source.copy_from_slice(&other.source);
        self.acceleration = other.acceleration;
        self.acceleration_rate = other.acceleration_rate;
        self.last_dt = other.last_dt;
    }
}

/// The mechanical side of a step.
struct Mechanics<'a> {
    law: &'a Free,
    mass: f64,
    /// Sense of sliding, for friction.
    direction: f64,
}

impl Mechanics<'_> {
    fn other_force(&self, position: f64, velocity: f64) -> Force {
        other_force(self.law, self.mass, position, velocity, self.direction)
    }
}

/// What a step reports.
#[derive(Debug, Clone, Copy)]
pub(crate) struct StepReport {
    /// Force on the mover, N, mean over the step.
    pub(crate) force: f64,
    /// Heat, J.
    pub(crate) heat: f64,
    /// Field energy at the middle, J.
    pub(crate) energy: f64,
    /// Acceleration, m/s2.
    pub(crate) acceleration: f64,
    /// Travel, m.
    pub(crate) travel: f64,
    /// True where friction now holds the mover.
    pub(crate) held: bool,
}

/// Buffers of a step, allocated once.
pub(crate) struct Stepper {
    /// Reaction at the middle, then the tangent: two columns of unknowns.
    columns: Vec<f64>,
    right: Vec<f64>,
    source_next: Vec<f64>,
    source_slope: Vec<f64>,
    mean: Vec<f64>,
    /// Equivalent currents K0 psi of both columns at the wall nodes.
    equivalent: [Vec<f64>; 2],
    nodes: Vec<f64>,
    rings: Vec<f64>,
}

impl Stepper {
    pub(crate) fn new(level: &MarchLevel<'_>) -> Self {
        let (n, w) = (level.operators.unknowns(), level.operators.wall.len());
        let nodes = if level.operators.excess.is_some() { level.operators.grid.nodes() } else { 0 };
        Self {
            columns: vec![0.0; 2 * n],
            right: vec![0.0; 2 * n],
            source_next: vec![0.0; w],
            source_slope: vec![0.0; w],
            mean: vec![0.0; w],
            equivalent: [vec![0.0; w], vec![0.0; w]],
            nodes: vec![0.0; nodes],
            rings: vec![0.0; w],
        }
    }

    /// Reaction at the middle of the last step, unknowns.
    pub(crate) fn reaction(&self) -> &[f64] {
        &self.columns[..self.columns.len() / 2]
    }

    /// Ring currents at the middle of the last step, A: (2 G / dt)(y_n - mean psi_s - psi_mid).
    pub(crate) fn ring_currents(&self, level: &MarchLevel<'_>, state_before: &State, dt: f64, out: &mut [f64]) {
        let wall = &level.operators.wall;
        for (w, out) in out.iter_mut().enumerate() {
            let psi = self.columns[wall.unknown[w]];
            *out = 2.0 * wall.conductance[w] / dt * (state_before.flux[w] - self.mean[w] - psi);
        }
    }

    /// Advances `state` by `dt`; the level has been made ready for it.
    ///
    /// # Errors
    /// Not finite, a residual, or no convergence of the equation of motion.
    pub(crate) fn step(
        &mut self,
        level: &mut MarchLevel<'_>,
        motion: &Motion,
        state: &mut State,
        currents: &mut [f64],
        time: f64,
        dt: f64,
    ) -> Result<StepReport, SolveFault> {
        let travel = match motion {
            Motion::Uniform { velocity } => {
                let travel = velocity * dt;
                self.field_for(level, state, state.position + travel, dt, false)?;
                travel
            }
            Motion::Prescribed(path) => {
                let end = path.position(time + dt);
                self.field_for(level, state, end, dt, false)?;
                end - state.position
            }
            Motion::Free { law, mass } => {
                let mechanics = Mechanics { law, mass: *mass, direction: sliding(law, *mass, state) };
                self.travel_of(level, state, &mechanics, time, dt)?
            }
        };
        self.ring_currents(level, state, dt, currents);
        self.equivalents(level, currents, dt, 1);
        let force = self.force(level, state, travel);
        let mut report = StepReport {
            force,
            heat: dt * heat_rate(level, currents),
            energy: self.energy(level),
            acceleration: 0.0,
            travel,
            held: false,
        };
        self.accept(motion, level, state, travel, dt, &mut report);
        if let Motion::Prescribed(path) = motion {
            state.position = path.position(time + dt);
            state.velocity = path.velocity(time + dt);
        }
        Ok(report)
    }

    /// The travel that balances the equation of motion: Newton passes with the exact tangent as a second right-hand side.
    fn travel_of(
        &mut self,
        level: &mut MarchLevel<'_>,
        state: &State,
        mechanics: &Mechanics<'_>,
        time: f64,
        dt: f64,
    ) -> Result<f64, SolveFault> {
        let mass = mechanics.mass;
        let expected = state.acceleration + state.acceleration_rate * 0.5 * (state.last_dt + dt);
        let mut travel = dt * (state.velocity + 0.5 * dt * expected);
        for _ in 0..MOST_PASSES {
            self.field_for(level, state, state.position + travel, dt, true)?;
            let (force, slope) = self.force_and_slope(level, state, travel, dt);
            let velocity = travel / dt;
            let other = mechanics.other_force(state.position + 0.5 * travel, velocity);
            let inertia = 2.0 * mass * (velocity - state.velocity) / dt;
            let imbalance = inertia - force - other.value;
            let stiffness = 2.0 * mass / (dt * dt) - slope - 0.5 * other.by_position - other.by_velocity / dt;
            let shift = -imbalance / stiffness;
            self.shift(level, state, travel + shift, shift);
            travel += shift;
            let size = mass * mechanics.law.gravity_m_per_s2.abs() + force.abs() + inertia.abs() + other.value.abs();
            if !shift.is_finite() {
                return Err(SolveFault::NotFinite { what: "the mover's travel" });
            }
            // Speeds are differences of places: what their rounding makes of the inertia is no imbalance.
            let rounding = ROUNDING * f64::EPSILON * mass * velocity.abs().max(state.velocity.abs()) / dt;
            if self.imbalance_after(level, state, mechanics, travel, dt) <= MOTION_LIMIT * size + rounding {
                return Ok(travel);
            }
        }
        Err(SolveFault::Motion { time_s: time })
    }

    /// What the linearised shift left of the equation of motion, N.
    fn imbalance_after(
        &mut self,
        level: &MarchLevel<'_>,
        state: &State,
        mechanics: &Mechanics<'_>,
        travel: f64,
        dt: f64,
    ) -> f64 {
        self.equivalents_of(level, state, dt, 1);
        let other = mechanics.other_force(state.position + 0.5 * travel, travel / dt);
        (2.0 * mechanics.mass * (travel / dt - state.velocity) / dt - self.force(level, state, travel) - other.value)
            .abs()
    }

    /// Solves for the reaction at the middle with the mover ending at `position`; with its tangent where asked.
    fn field_for(
        &mut self,
        level: &mut MarchLevel<'_>,
        state: &State,
        position: f64,
        dt: f64,
        tangent: bool,
    ) -> Result<(), SolveFault> {
        level.fill_source(position, &mut self.source_next, &mut self.source_slope);
        self.update_mean(state);
        let n = level.operators.unknowns();
        self.right.fill(0.0);
        let wall = &level.operators.wall;
        for w in 0..wall.len() {
            let (u, g) = (wall.unknown[w], 2.0 * wall.conductance[w] / dt);
            self.right[u] = g * (state.flux[w] - self.mean[w]);
            self.right[n + u] = -0.5 * g * self.source_slope[w];
        }
        if let Some(excess) = &level.operators.excess {
            spread_wall(&level.operators, &self.mean, &mut self.nodes);
            add_product(excess, &self.nodes, -1.0, &mut self.right[..n]);
            spread_wall(&level.operators, &self.source_slope, &mut self.nodes);
            add_product(excess, &self.nodes, -0.5, &mut self.right[n..]);
        }
        let used = if tangent { 2 * n } else { n };
        self.columns[..used].copy_from_slice(&self.right[..used]);
        level.solve(&mut self.columns[..used]);
        level.check(&self.columns[..n], &self.right[..n], STEP_RESIDUAL)?;
        Ok(())
    }

    fn update_mean(&mut self, state: &State) {
        for ((m, a), b) in self.mean.iter_mut().zip(&state.source).zip(&self.source_next) {
            *m = 0.5 * (a + b);
        }
    }

    /// Equivalent currents K0 psi at the wall nodes for the first `count` columns; `currents` are the rings' own.
    fn equivalents(&mut self, level: &MarchLevel<'_>, currents: &[f64], dt: f64, count: usize) {
        let (wall, n) = (&level.operators.wall, level.operators.unknowns());
        if let Some(free) = &level.operators.stiffness_free {
            for (column, out) in self.equivalent.iter_mut().enumerate().take(count) {
                let psi = &self.columns[column * n..(column + 1) * n];
                for (out, &u) in out.iter_mut().zip(&wall.unknown) {
                    *out = free.outer_view(u).map_or(0.0, |row| row.iter().map(|(c, v)| v * psi[c]).sum());
                }
            }
            return;
        }
        // K0 = K: the equivalent currents are the ring currents, and the tangent's their change.
        self.equivalent[0].copy_from_slice(currents);
        if count > 1 {
            for w in 0..wall.len() {
                let change = 0.5 * self.source_slope[w] + self.columns[n + wall.unknown[w]];
                self.equivalent[1][w] = -2.0 * wall.conductance[w] / dt * change;
            }
        }
    }

    /// The same with ring currents worked out on the spot.
    fn equivalents_of(&mut self, level: &MarchLevel<'_>, state: &State, dt: f64, count: usize) {
        let mut rings = std::mem::take(&mut self.rings);
        self.ring_currents(level, state, dt, &mut rings);
        self.equivalents(level, &rings, dt, count);
        self.rings = rings;
    }

    /// F = 2 pi sum (K0 psi_mid) . dpsi_s / travel, N; where it hardly moves, the derivative instead of the difference, of which rounding
    /// would be left.
    fn force(&self, level: &MarchLevel<'_>, state: &State, travel: f64) -> f64 {
        2.0 * PI * self.virtual_work(level, state, travel, 0)
    }

    fn virtual_work(&self, level: &MarchLevel<'_>, state: &State, travel: f64, column: usize) -> f64 {
        let equivalent = &self.equivalent[column];
        if travel.abs() > LEAST_TRAVEL * level.placement.scale_m {
            let ends = self.source_next.iter().zip(&state.source);
            equivalent.iter().zip(ends).map(|(i, (b, a))| i * (b - a)).sum::<f64>() / travel
        } else {
            equivalent.iter().zip(&self.source_slope).map(|(i, s)| i * s).sum()
        }
    }

    /// The force and its derivative by the step's end position.
    fn force_and_slope(&mut self, level: &MarchLevel<'_>, state: &State, travel: f64, dt: f64) -> (f64, f64) {
        self.equivalents_of(level, state, dt, 2);
        let force = self.force(level, state, travel);
        let by_currents = 2.0 * PI * self.virtual_work(level, state, travel, 1);
        let by_place: f64 = self.equivalent[0].iter().zip(&self.source_slope).map(|(i, s)| i * s).sum();
        let moves = travel.abs() > LEAST_TRAVEL * level.placement.scale_m;
        let by_length = if moves { (2.0 * PI * by_place - force) / travel } else { 0.0 };
        (force, by_currents + by_length)
    }

    /// Moves the end of the step by `shift`: the reaction linearly, the mover's own field exactly.
    fn shift(&mut self, level: &MarchLevel<'_>, state: &State, end_travel: f64, shift: f64) {
        let n = level.operators.unknowns();
        let (psi, tangent) = self.columns.split_at_mut(n);
        psi.iter_mut().zip(tangent).for_each(|(p, t)| *p += shift * *t);
        level.fill_source(state.position + end_travel, &mut self.source_next, &mut self.source_slope);
        self.update_mean(state);
    }

    /// Field energy at the middle, J: pi (psi_r K psi_r + 2 psi_r (K - K0) psi_s + psi_s (K - K0) psi_s).
    fn energy(&mut self, level: &MarchLevel<'_>) -> f64 {
        let (operators, wall) = (&level.operators, &level.operators.wall);
        let mut energy = 0.0;
        for (w, i) in self.equivalent[0].iter().enumerate() {
            energy += PI * i * self.columns[wall.unknown[w]];
        }
        if let Some(excess) = &operators.excess {
            // (K - K0)(psi_r + psi_s) contracted with (psi_r + psi_s), rows and columns at wall nodes.
            for row in &wall.rows {
                for w in row.start..row.start + row.count {
                    let node = operators.grid.node(row.i, row.j + w - row.start);
                    self.nodes[node] = self.columns[wall.unknown[w]] + self.mean[w];
                }
            }
            for row in &wall.rows {
                for w in row.start..row.start + row.count {
                    let total = self.nodes[operators.grid.node(row.i, row.j + w - row.start)];
                    let product = excess.outer_view(wall.unknown[w]);
                    let product: f64 = product.map_or(0.0, |q| q.iter().map(|(c, v)| v * self.nodes[c]).sum());
                    energy += PI * total * product;
                }
            }
        }
        energy
    }

    fn accept(
        &self,
        motion: &Motion,
        level: &MarchLevel<'_>,
        state: &mut State,
        travel: f64,
        dt: f64,
        report: &mut StepReport,
    ) {
        let wall = &level.operators.wall;
        for w in 0..wall.len() {
            state.flux[w] = 2.0 * (self.columns[wall.unknown[w]] + self.mean[w]) - state.flux[w];
        }
        state.source.copy_from_slice(&self.source_next);
        state.position += travel;
        let velocity = 2.0 * travel / dt - state.velocity;
        if let Motion::Free { law, mass } = motion {
            report.acceleration = (velocity - state.velocity) / dt;
            let turned = state.velocity * velocity < 0.0;
            let driving = report.force + frictionless(law, *mass, state.position);
            report.held = turned && driving.abs() <= friction(law, *mass);
            if state.last_dt > 0.0 {
                state.acceleration_rate = (report.acceleration - state.acceleration) / (0.5 * (state.last_dt + dt));
            }
            state.acceleration = report.acceleration;
            state.velocity = velocity;
        }
        state.last_dt = dt;
    }
}

/// Sense of sliding: of the motion, or at rest of the driving force.
fn sliding(law: &Free, mass: f64, state: &State) -> f64 {
    if friction(law, mass) <= 0.0 {
        return 0.0;
    }
    if state.velocity.abs() > 0.0 { state.velocity.signum() } else { state.acceleration.signum() }
}

/// Heat rate in the wall, W.
pub(crate) fn heat_rate(level: &MarchLevel<'_>, currents: &[f64]) -> f64 {
    let rings = currents.iter().zip(&level.operators.wall.conductance).filter(|(_, g)| **g > 0.0);
    2.0 * PI * rings.map(|(i, g)| i * i / g).sum::<f64>()
}

//! A mover among the rings: at given speed, and by its own equation of motion.
//!
//! Over a step the drive u = v df/dz of every mode is taken as the parabola through its values at the start, middle and end, and
//! so is the acceleration; positions and velocities follow by integration (Lobatto's three points, order 4). The middle and the
//! end are found by fixed-point iteration, which contracts as (step) x (damping coefficient) / mass.

use crate::problem::{Free, Mover, Traverse};
use nalgebra_sparse::na::DVector;

use super::circuit::RingCircuit;
use super::events::{Instant, crossing};
use super::linkage::Linkage;
use super::modes::{Drive, StepWeights};
use crate::fault::SolveFault;

/// What came of a passage at uniform speed.
#[derive(Debug, Clone, PartialEq)]
pub struct Passage {
    /// Greatest drag, N.
    pub drag_peak_newton: f64,
    /// Position of the reference point then, m.
    pub drag_peak_at_m: f64,
    /// Integral of the drag over time, N s.
    pub impulse_newton_s: f64,
    /// I^2 R of all rings, J.
    pub heat_joule: f64,
    /// Energy left in the rings' own field, J.
    pub field_energy_joule: f64,
    /// Position, m, and drag, N, at the steps.
    pub drag: Vec<(f64, f64)>,
}

/// What came of a motion by its own equation.
#[derive(Debug, Clone, PartialEq)]
pub struct Fall {
    /// From release to the first gate, s.
    pub entry_time_s: f64,
    /// From release to the second gate, s.
    pub exit_time_s: f64,
    /// Between the gates, s.
    pub transit_time_s: f64,
    /// Speed at the second gate, m/s.
    pub exit_speed_m_per_s: f64,
    /// Greatest drag at the steps, N.
    pub drag_peak_newton: f64,
    /// I^2 R of all rings, J.
    pub heat_joule: f64,
    /// Energy left in the rings' own field, J.
    pub field_energy_joule: f64,
    /// Work done against the drag, J.
    pub work_joule: f64,
    /// Steps taken.
    pub steps: usize,
}

/// Drive and drag of all modes for a mover at one place.
struct Coupling<'a> {
    circuit: &'a RingCircuit,
    linkage: Linkage,
    slopes: DVector<f64>,
}

impl<'a> Coupling<'a> {
    fn new(circuit: &'a RingCircuit, mover: &Mover, low: f64, high: f64) -> Self {
        let linkage = Linkage::new(&circuit.lattices, mover, low, high);
        Self { circuit, linkage, slopes: DVector::zeros(circuit.rings()) }
    }

    /// df/dz in the modes, with the mover at z.
    fn at(&mut self, z: f64, out: &mut DVector<f64>) {
        self.linkage.slopes(z, self.slopes.as_mut_slice());
        out.gemv_tr(1.0, &self.circuit.to_modes, &self.slopes, 0.0);
    }

    fn field_energy(&self, y: &DVector<f64>) -> f64 {
        0.5 * y.iter().zip(self.circuit.tau.iter()).map(|(y, tau)| tau * y * y).sum::<f64>()
    }
}

/// Carries `mover` through the wall at uniform speed, starting without currents, with steps of about `step_m` of travel.
///
/// Order 4 in the step.
///
/// # Errors
/// A speed or step that is not greater than 0.
pub fn pass(circuit: &RingCircuit, mover: &Mover, travel: &Traverse, step_m: f64) -> Result<Passage, SolveFault> {
    let (speed, distance) = (travel.speed_m_per_s, (travel.to_m - travel.from_m).abs());
    if !(speed > 0.0 && step_m > 0.0 && distance > 0.0) {
        return Err(SolveFault::OutOfRange { what: "speed of a passage, m/s", found: speed, legal: "greater than 0" });
    }
    let (low, high) = (travel.from_m.min(travel.to_m), travel.from_m.max(travel.to_m));
    let mut coupling = Coupling::new(circuit, mover, low, high);
    let steps = (distance / step_m).ceil();
    let velocity = if travel.to_m > travel.from_m { speed } else { -speed };
    let dt = distance / (speed * steps);
    let weights = StepWeights::new(&circuit.tau, dt);
    let zero = DVector::zeros(circuit.rings());
    let (mut y, mut y_middle, mut y_end) = (zero.clone(), zero.clone(), zero.clone());
    let (mut start, mut middle, mut end) = (zero.clone(), zero.clone(), zero);
    coupling.at(travel.from_m, &mut start);
    let sign = velocity.signum();
    let mut passage = Passage {
        drag_peak_newton: 0.0,
        drag_peak_at_m: travel.from_m,
        impulse_newton_s: 0.0,
        heat_joule: 0.0,
        field_energy_joule: 0.0,
        drag: vec![(travel.from_m, 0.0)],
    };
    let mut n = 0.0;
    while n < steps {
        let z = travel.from_m + velocity * dt * n;
        coupling.at(z + 0.5 * velocity * dt, &mut middle);
        coupling.at(z + velocity * dt, &mut end);
        let scaled = [&start * velocity, &middle * velocity, &end * velocity];
        let drive = Drive { start: &scaled[0], middle: &scaled[1], end: &scaled[2] };
        weights.advance(&y, &drive, &mut y_middle, &mut y_end);
        let force = [y.dot(&start), y_middle.dot(&middle), y_end.dot(&end)].map(|f| -sign * f);
        passage.impulse_newton_s += dt / 6.0 * (force[0] + 4.0 * force[1] + force[2]);
        passage.heat_joule += dt / 6.0 * (y.norm_squared() + 4.0 * y_middle.norm_squared() + y_end.norm_squared());
        passage.drag.push((z + 0.5 * velocity * dt, force[1]));
        passage.drag.push((z + velocity * dt, force[2]));
        std::mem::swap(&mut start, &mut end);
        std::mem::swap(&mut y, &mut y_end);
        n += 1.0;
    }
    passage.field_energy_joule = coupling.field_energy(&y);
    (passage.drag_peak_at_m, passage.drag_peak_newton) = peak(&passage.drag);
    Ok(passage)
}

/// Place and height of the greatest entry, by the parabola through it and its neighbours.
fn peak(series: &[(f64, f64)]) -> (f64, f64) {
    let best = (0..series.len()).max_by(|a, b| series[*a].1.total_cmp(&series[*b].1)).unwrap_or(0);
    if best == 0 || best + 1 >= series.len() {
        return series[best];
    }
    let (before, at, after) = (series[best - 1], series[best], series[best + 1]);
    let bend = before.1 - 2.0 * at.1 + after.1;
    let shift = 0.5 * (before.1 - after.1) / bend;
    (at.0 + shift * (after.0 - at.0), at.1 - 0.25 * (before.1 - after.1) * shift)
}

/// Follows `mover` of mass `mover.mass_kg` through the wall by its equation of motion, from release without currents until it
/// passes the second gate.
///
/// The travel over a step is at most `step_m`; near rest, the step is the time that the present acceleration needs for it.
/// Order 4 in `step_m`. Friction is taken against the motion and cannot hold the mover.
///
/// # Errors
/// A missing mass, a step that is not greater than 0, or a gate that is not reached in time.
pub fn fall(circuit: &RingCircuit, mover: &Mover, law: &Free, step_m: f64) -> Result<Fall, SolveFault> {
    let mass = mover.mass_kg.unwrap_or(0.0);
    if !(mass > 0.0 && step_m > 0.0) {
        return Err(SolveFault::OutOfRange { what: "mass of the mover, kg", found: mass, legal: "greater than 0" });
    }
    let low = law.until_m.min(law.release_m).min(law.gates_m[0]).min(law.gates_m[1]) - 10.0 * step_m;
    let high = law.until_m.max(law.release_m).max(law.gates_m[0]).max(law.gates_m[1]) + 10.0 * step_m;
    let mut faller = Faller::new(Coupling::new(circuit, mover, low, high), mass, law);
    let mut entry = None;
    let mut time = 0.0;
    while time < law.time_limit_s {
        let before = faller.now;
        let dt = faller.step_size(step_m);
        faller.step(dt);
        for (i, gate) in law.gates_m.into_iter().enumerate() {
            let Some((part, velocity)) = crossing(before, faller.now, dt, gate) else { continue };
            match (i, entry) {
                (0, None) => entry = Some(time + part * dt),
                (1, Some(entry)) => return Ok(faller.finish(entry, time + part * dt, velocity.abs())),
                _ => {}
            }
        }
        time += dt;
    }
    let gate_m = if entry.is_none() { law.gates_m[0] } else { law.gates_m[1] };
    Err(SolveFault::GateNotReached { gate_m, time_s: law.time_limit_s })
}

/// State and workspace of a motion.
struct Faller<'a> {
    coupling: Coupling<'a>,
    mass: f64,
    law: &'a Free,
    now: Instant,
    y: DVector<f64>,
    slope: DVector<f64>,
    weights: Option<StepWeights>,
    heat: f64,
    work: f64,
    drag_peak: f64,
    steps: usize,
}

impl<'a> Faller<'a> {
    fn new(mut coupling: Coupling<'a>, mass: f64, law: &'a Free) -> Self {
        let size = coupling.circuit.rings();
        let mut slope = DVector::zeros(size);
        coupling.at(law.release_m, &mut slope);
        let now = Instant { z: law.release_m, v: law.entry_velocity_m_per_s, a: 0.0 };
        let y = DVector::zeros(size);
        let mut faller =
            Self { coupling, mass, law, now, y, slope, weights: None, heat: 0.0, work: 0.0, drag_peak: 0.0, steps: 0 };
        faller.now.a = faller.other_forces(now.z, now.v) / mass;
        faller
    }

    /// Everything but the magnetic force, N along +z.
    fn other_forces(&self, z: f64, v: f64) -> f64 {
        let law = self.law;
        let weight = self.mass * law.gravity_m_per_s2;
        let rub = law.friction_newton + law.friction_coefficient * weight * law.tilt_rad.sin().abs();
        let against = if v.abs() > 0.0 { v.signum() } else { 0.0 };
        law.push_newton
            - weight * law.tilt_rad.cos()
            - rub * against
            - law.air_drag_n_s2_per_m2 * v * v.abs()
            - law.spring_rate_n_per_m * (z - law.spring_free_at_m)
    }

    /// Time for a travel of `step`: at the present speed, or from rest at the present acceleration.
    fn step_size(&self, step: f64) -> f64 {
        let from_rest = (2.0 * step / self.now.a.abs().max(0.1 * self.law.gravity_m_per_s2.abs()).max(1e-3)).sqrt();
        let wanted = from_rest.min(step / self.now.v.abs().max(1e-9));
        match &self.weights {
            // Keep a step that is near enough: its weights are made already.
            Some(w) if w.dt() <= wanted && w.dt() > 0.8 * wanted => w.dt(),
            _ => wanted,
        }
    }

    fn step(&mut self, dt: f64) {
        let weights = match self.weights.take() {
            Some(w) if (w.dt() - dt).abs() <= 0.0 => w,
            _ => StepWeights::new(&self.coupling.circuit.tau, dt),
        };
        let Instant { z, v, a } = self.now;
        let drive_start = &self.slope * v;
        let size = self.y.len();
        let mut slopes = [DVector::zeros(size), DVector::zeros(size)];
        let mut states = [DVector::zeros(size), DVector::zeros(size)];
        let (mut a_middle, mut a_end) = (a, a);
        let mut forces = [0.0; 2];
        let mut v_ends = [v; 2];
        let mut z_ends = [z; 2];
        for _ in 0..40 {
            let v_middle = v + dt * (5.0 * a + 8.0 * a_middle - a_end) / 24.0;
            let v_end = v + dt * (a + 4.0 * a_middle + a_end) / 6.0;
            let z_middle = z + dt * (5.0 * v + 8.0 * v_middle - v_end) / 24.0;
            let z_end = z + dt * (v + 4.0 * v_middle + v_end) / 6.0;
            let moved = (z_middle - z_ends[0]).abs() + (z_end - z_ends[1]).abs();
            let hurried = (v_middle - v_ends[0]).abs() + (v_end - v_ends[1]).abs();
            let settled = hurried < 1e-13 * (1e-3 + v.abs()) && moved < 1e-15;
            (v_ends, z_ends) = ([v_middle, v_end], [z_middle, z_end]);
            let (first, second) = slopes.split_at_mut(1);
            self.coupling.at(z_middle, &mut first[0]);
            self.coupling.at(z_end, &mut second[0]);
            let driven = [&first[0] * v_middle, &second[0] * v_end];
            let drive = Drive { start: &drive_start, middle: &driven[0], end: &driven[1] };
            let (middle, end) = states.split_at_mut(1);
            weights.advance(&self.y, &drive, &mut middle[0], &mut end[0]);
            forces = [middle[0].dot(&first[0]), end[0].dot(&second[0])];
            a_middle = (forces[0] + self.other_forces(z_middle, v_middle)) / self.mass;
            a_end = (forces[1] + self.other_forces(z_end, v_end)) / self.mass;
            if settled {
                break;
            }
        }
        let start_force = self.y.dot(&self.slope);
        let [middle, end] = states;
        self.heat += dt / 6.0 * (self.y.norm_squared() + 4.0 * middle.norm_squared() + end.norm_squared());
        self.work -= dt / 6.0 * (start_force * v + 4.0 * forces[0] * v_ends[0] + forces[1] * v_ends[1]);
        self.drag_peak = self.drag_peak.max(-forces[1] * v_ends[1].signum());
        let [_, slope] = slopes;
        (self.y, self.slope) = (end, slope);
        self.now = Instant { z: z_ends[1], v: v_ends[1], a: a_end };
        self.weights = Some(weights);
        self.steps += 1;
    }

    fn finish(&self, entry: f64, exit: f64, speed: f64) -> Fall {
        Fall {
            entry_time_s: entry,
            exit_time_s: exit,
            transit_time_s: exit - entry,
            exit_speed_m_per_s: speed,
            drag_peak_newton: self.drag_peak,
            heat_joule: self.heat,
            field_energy_joule: self.coupling.field_energy(&self.y),
            work_joule: self.work,
            steps: self.steps,
        }
    }
}

//! A mover among the rings by its own equation of motion, step by step.
//!
//! Over a step the drive u = v df/dz of every mode is taken as the parabola through its values at the start, middle and end, and
//! so is the acceleration; positions and velocities follow by integration (Lobatto's three points, order 4). The accelerations at
//! the middle and the end are found by Newton's method on the response of the forces to the speeds, which holds however strong
//! the damping.

use nalgebra_sparse::na::DVector;

use super::circuit::RingCircuit;
use super::equation::Equation;
use super::events::{Instant, crossing};
use super::modes::{Drive, StepWeights};
use super::motion::Coupling;
use crate::fault::SolveFault;
use crate::problem::{Free, Mover};

/// Most the speed may change over a step, relative to it or to what the step's travel from rest would give.
const MOST_CHANGE: f64 = 0.3;
/// Most a step may grow over the one before: what an A-stable rule does not damp has died by then.
const MOST_GROWTH: f64 = 1.3;

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

/// Follows `mover` of mass `mover.mass_kg` through the wall by its equation of motion, from release without currents until it
/// passes the second gate.
///
/// The travel over a step is at most `step_m`, the change of speed at most 30 %; order 4 in `step_m`.
///
/// # Errors
/// A missing mass, a step that is not greater than 0, a gate that is not reached in time, or a motion that does not converge.
pub fn fall(circuit: &RingCircuit, mover: &Mover, law: &Free, step_m: f64) -> Result<Fall, SolveFault> {
    let mut faller = Faller::new(circuit, mover, law, step_m)?;
    let mut entry = None;
    let mut drag_peak: f64 = 0.0;
    while faller.time < law.time_limit_s {
        let (time, before) = (faller.time, faller.now);
        let dt = faller.step(f64::INFINITY)?;
        drag_peak = drag_peak.max(-faller.force * faller.now.v.signum());
        for (i, gate) in law.gates_m.into_iter().enumerate() {
            let Some((part, velocity)) = crossing(before, faller.now, dt, gate) else { continue };
            match (i, entry) {
                (0, None) => entry = Some(time + part * dt),
                (1, Some(entry)) => return Ok(faller.finish(entry, time + part * dt, velocity.abs(), drag_peak)),
                _ => {}
            }
        }
    }
    let gate_m = if entry.is_none() { law.gates_m[0] } else { law.gates_m[1] };
    Err(SolveFault::GateNotReached { gate_m, time_s: law.time_limit_s })
}

/// State and workspace of a motion.
pub(super) struct Faller<'a> {
    coupling: Coupling<'a>,
    pub equation: Equation<'a>,
    travel: f64,
    pub time: f64,
    pub now: Instant,
    /// Force of the rings on the mover, N along +z.
    pub force: f64,
    y: DVector<f64>,
    slope: DVector<f64>,
    weights: Option<StepWeights>,
    pub heat: f64,
    work: f64,
    steps: usize,
}

/// What a trial step ends in.
struct Trial {
    now: Instant,
    force: f64,
    y: DVector<f64>,
    slope: DVector<f64>,
    heat: f64,
    work: f64,
}

impl<'a> Faller<'a> {
    pub fn new(circuit: &'a RingCircuit, mover: &Mover, law: &'a Free, step_m: f64) -> Result<Self, SolveFault> {
        let mass = mover.mass_kg.unwrap_or(0.0);
        if !(mass > 0.0 && step_m > 0.0) {
            return Err(SolveFault::OutOfRange { what: "mass of the mover, kg", found: mass, legal: "greater than 0" });
        }
        let low = law.until_m.min(law.release_m).min(law.gates_m[0]).min(law.gates_m[1]) - 10.0 * step_m;
        let high = law.until_m.max(law.release_m).max(law.gates_m[0]).max(law.gates_m[1]) + 10.0 * step_m;
        let mut coupling = Coupling::new(circuit, mover, low, high);
        let mut slope = DVector::zeros(circuit.rings());
        coupling.at(law.release_m, &mut slope);
        let equation = Equation { mass, law };
        let (z, v) = (law.release_m, law.entry_velocity_m_per_s);
        let now = Instant { z, v, a: equation.force(z, v) / mass };
        let y = DVector::zeros(circuit.rings());
        Ok(Self {
            coupling,
            equation,
            travel: step_m,
            time: 0.0,
            now,
            force: 0.0,
            y,
            slope,
            weights: None,
            heat: 0.0,
            work: 0.0,
            steps: 0,
        })
    }

    /// Heat rate of the rings, W.
    pub fn heat_rate(&self) -> f64 {
        self.y.norm_squared()
    }

    /// Energy in the rings' own field, J.
    pub fn field_energy(&self) -> f64 {
        self.coupling.field_energy(&self.y)
    }

    /// Takes one step, no longer than `longest`, and gives its length, s. It ends early where the mover comes to rest.
    pub fn step(&mut self, longest: f64) -> Result<f64, SolveFault> {
        let mut dt = self.step_size().min(longest);
        let rubs = self.equation.friction() > 0.0;
        for _ in 0..40 {
            let weights = self.weights_for(dt);
            match self.trial(&weights) {
                Some(trial) if rubs && self.now.v * trial.now.v < -1e-9 * self.now.v * self.now.v => {
                    // The motion turns within the step, and friction with it: stop where it stands still.
                    dt *= (self.now.v / (self.now.v - trial.now.v)).min(0.9);
                }
                Some(mut trial) => {
                    if rubs && trial.now.v.abs() <= 1e-4 * self.now.v.abs() {
                        trial.now.v = 0.0;
                        trial.now.a = (trial.force + self.equation.force(trial.now.z, 0.0)) / self.equation.mass;
                    }
                    self.accept(trial, dt);
                    self.weights = Some(weights);
                    return Ok(dt);
                }
                None => dt *= 0.5,
            }
        }
        Err(SolveFault::Motion { time_s: self.time })
    }

    fn accept(&mut self, trial: Trial, dt: f64) {
        self.time += dt;
        self.heat += trial.heat;
        self.work += trial.work;
        (self.now, self.force, self.y, self.slope) = (trial.now, trial.force, trial.y, trial.slope);
        self.steps += 1;
    }

    /// Time for the step's travel at the present speed, or from rest at the present acceleration.
    fn step_size(&self) -> f64 {
        let Instant { v, a, .. } = self.now;
        let gentle = 0.1 * self.equation.law.gravity_m_per_s2.abs();
        let from_rest = (2.0 * self.travel / a.abs().max(gentle).max(1e-3)).sqrt();
        let steady = MOST_CHANGE * (v.abs() / a.abs().max(1e-12)).max(from_rest);
        let wanted = from_rest.min(self.travel / v.abs().max(1e-9)).min(steady.max(MOST_CHANGE * from_rest));
        match &self.weights {
            // Keep a step that is near enough: its weights are made already.
            Some(w) if w.dt() <= wanted && w.dt() > 0.8 * wanted => w.dt(),
            Some(w) => wanted.min(MOST_GROWTH * w.dt()),
            None => wanted.min(MOST_CHANGE * self.equation.mass / self.slope.norm_squared().max(1e-300)),
        }
    }

    fn weights_for(&mut self, dt: f64) -> StepWeights {
        match self.weights.take() {
            Some(w) if (w.dt() - dt).abs() <= 0.0 => w,
            _ => StepWeights::new(&self.coupling.circuit.tau, dt),
        }
    }

    /// Other forces with friction against the motion at the start of the step.
    fn other(&self, z: f64, v: f64) -> f64 {
        let sense = if self.now.v.abs() > 0.0 { self.now.v } else { self.now.a };
        let rub = if sense.abs() > 0.0 { self.equation.friction() * sense.signum() } else { 0.0 };
        self.equation.driving_force(z, v) - rub
    }

    /// One step with the given weights; none where Newton's method does not converge.
    fn trial(&mut self, weights: &StepWeights) -> Option<Trial> {
        let dt = weights.dt();
        let mass = self.equation.mass;
        let Instant { z, v, a } = self.now;
        let drive_start = &self.slope * v;
        let zero = || DVector::zeros(self.y.len());
        let (mut f_middle, mut f_end, mut y_middle, mut y_end) = (zero(), zero(), zero(), zero());
        let mut accelerations = [a, a];
        let mut last = [v, v, z, z];
        for _ in 0..40 {
            let [a_middle, a_end] = accelerations;
            let v_middle = v + dt * (5.0 * a + 8.0 * a_middle - a_end) / 24.0;
            let v_end = v + dt * (a + 4.0 * a_middle + a_end) / 6.0;
            let z_middle = z + dt * (5.0 * v + 8.0 * v_middle - v_end) / 24.0;
            let z_end = z + dt * (v + 4.0 * v_middle + v_end) / 6.0;
            let hurried = (v_middle - last[0]).abs() + (v_end - last[1]).abs();
            let moved = (z_middle - last[2]).abs() + (z_end - last[3]).abs();
            last = [v_middle, v_end, z_middle, z_end];
            self.coupling.at(z_middle, &mut f_middle);
            self.coupling.at(z_end, &mut f_end);
            let driven = [&f_middle * v_middle, &f_end * v_end];
            let drive = Drive { start: &drive_start, middle: &driven[0], end: &driven[1] };
            weights.advance(&self.y, &drive, &mut y_middle, &mut y_end);
            let forces = [y_middle.dot(&f_middle), y_end.dot(&f_end)];
            let wanted =
                [(forces[0] + self.other(z_middle, v_middle)) / mass, (forces[1] + self.other(z_end, v_end)) / mass];
            if !(wanted[0].is_finite() && wanted[1].is_finite()) {
                return None;
            }
            let scale = 1e-3 + v.abs();
            if hurried < 1e-12 * scale && moved < 1e-12 * (dt * scale + 1e-3) {
                let work = self.y.dot(&self.slope) * v + 4.0 * forces[0] * v_middle + forces[1] * v_end;
                let heat = self.y.norm_squared() + 4.0 * y_middle.norm_squared() + y_end.norm_squared();
                return Some(Trial {
                    now: Instant { z: z_end, v: v_end, a: wanted[1] },
                    force: forces[1],
                    y: y_end,
                    slope: f_end,
                    heat: dt / 6.0 * heat,
                    work: -dt / 6.0 * work,
                });
            }
            accelerations = newton(accelerations, wanted, weights.response(&f_middle, &f_end), dt / mass);
        }
        None
    }

    fn finish(&self, entry: f64, exit: f64, speed: f64, drag_peak: f64) -> Fall {
        Fall {
            entry_time_s: entry,
            exit_time_s: exit,
            transit_time_s: exit - entry,
            exit_speed_m_per_s: speed,
            drag_peak_newton: drag_peak,
            heat_joule: self.heat,
            field_energy_joule: self.field_energy(),
            work_joule: self.work,
            steps: self.steps,
        }
    }
}

/// Newton's step for the accelerations at the middle and the end, a = wanted(a), with the forces' response to the speeds.
fn newton(a: [f64; 2], wanted: [f64; 2], response: [[f64; 2]; 2], dt_per_mass: f64) -> [f64; 2] {
    // d(speed at the middle, at the end)/d(acceleration at the middle, at the end), over dt.
    const SPEED: [[f64; 2]; 2] = [[8.0 / 24.0, -1.0 / 24.0], [4.0 / 6.0, 1.0 / 6.0]];
    let mut j = [[1.0, 0.0], [0.0, 1.0]];
    for (row, r) in j.iter_mut().zip(response) {
        for (k, entry) in row.iter_mut().enumerate() {
            *entry -= dt_per_mass * (r[0] * SPEED[0][k] + r[1] * SPEED[1][k]);
        }
    }
    let miss = [wanted[0] - a[0], wanted[1] - a[1]];
    let det = j[0][0] * j[1][1] - j[0][1] * j[1][0];
    [a[0] + (miss[0] * j[1][1] - miss[1] * j[0][1]) / det, a[1] + (miss[1] * j[0][0] - miss[0] * j[1][0]) / det]
}

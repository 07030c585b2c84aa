//! A mover carried through the rings at uniform speed, and what couples it to them.
//!
//! Over a step the drive u = v df/dz of every mode is taken as the parabola through its values at the start, middle and end.

use crate::problem::{Mover, Traverse};
use nalgebra_sparse::na::DVector;

use super::circuit::RingCircuit;
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

/// Drive and drag of all modes for a mover at one place.
pub(super) struct Coupling<'a> {
    pub circuit: &'a RingCircuit,
    linkage: Linkage,
    slopes: DVector<f64>,
}

impl<'a> Coupling<'a> {
    pub fn new(circuit: &'a RingCircuit, mover: &Mover, low: f64, high: f64) -> Self {
        let linkage = Linkage::new(&circuit.lattices, mover, low, high);
        Self { circuit, linkage, slopes: DVector::zeros(circuit.rings()) }
    }

    /// df/dz in the modes, with the mover at z.
    pub fn at(&mut self, z: f64, out: &mut DVector<f64>) {
        self.linkage.slopes(z, self.slopes.as_mut_slice());
        out.gemv_tr(1.0, &self.circuit.to_modes, &self.slopes, 0.0);
    }

    pub fn field_energy(&self, y: &DVector<f64>) -> f64 {
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

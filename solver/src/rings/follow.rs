//! A whole motion among the rings, to the end of travel.

use super::circuit::RingCircuit;
use super::events::{Instant, crossing};
use super::fall::Faller;
use crate::fault::SolveFault;
use crate::monitor::Monitor;
use crate::outcome::Stop;
use crate::problem::{Free, Mover};

/// One instant of a motion.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Moment {
    pub time: f64,
    pub z: f64,
    pub v: f64,
    pub a: f64,
    /// Force of the rings on the mover, N along +z.
    pub force: f64,
    pub heat_rate: f64,
}

/// Follows `mover` from release until it reaches the end of travel, the time limit, or rest; moments, why it ended, and what was
/// dissipated: heat of the rings and what is left in their field, J.
///
/// # Errors
/// As [`super::fall()`], and [`SolveFault::Interrupted`].
pub(crate) fn follow(
    circuit: &RingCircuit,
    mover: &Mover,
    law: &Free,
    step_m: f64,
    monitor: &dyn Monitor,
) -> Result<(Vec<Moment>, Stop, f64), SolveFault> {
    let mut faller = Faller::new(circuit, mover, law, step_m)?;
    let mut moments = vec![moment(&faller)];
    let longest = law.time_limit_s / 100.0;
    let stop = loop {
        if monitor.cancelled() {
            return Err(SolveFault::Interrupted);
        }
        let (time, before) = (faller.time, faller.now);
        if before.v.abs() <= 0.0 && faller.equation.is_held(before.z, faller.force) {
            break Stop::AtRest;
        }
        let saved = faller.heat;
        let dt = faller.step(longest.min(law.time_limit_s - time))?;
        if let Some((part, v)) = crossing(before, faller.now, dt, law.until_m) {
            faller.heat = saved + part * (faller.heat - saved);
            moments.push(within(&moments[moments.len() - 1], &moment(&faller), part, v, law.until_m));
            break Stop::EndOfTravel;
        }
        moments.push(moment(&faller));
        if faller.time >= law.time_limit_s * (1.0 - 1e-12) {
            break Stop::TimeLimit;
        }
    };
    let dissipated = faller.heat + faller.field_energy();
    Ok((moments, stop, dissipated))
}

fn moment(faller: &Faller<'_>) -> Moment {
    let Instant { z, v, a } = faller.now;
    Moment { time: faller.time, z, v, a, force: faller.force, heat_rate: faller.heat_rate() }
}

/// The moment at fraction `part` of the last step.
fn within(before: &Moment, after: &Moment, part: f64, v: f64, z: f64) -> Moment {
    let between = |a: f64, b: f64| a + part * (b - a);
    Moment {
        time: between(before.time, after.time),
        z,
        v,
        a: between(before.a, after.a),
        force: between(before.force, after.force),
        heat_rate: between(before.heat_rate, after.heat_rate),
    }
}

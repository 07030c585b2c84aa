//! Strokes: cycle after cycle until the figures of one no longer change.
//!
//! Currents in the wall die away of themselves, whatever the mover does, so that every stroke settles; how many cycles that takes
//! depends on their life time over the period. The first cycle, begun with the wall at rest, may be off by a tenth.

use super::course::Course;
use super::pace::{pair_of_cycle, pairs_a_cycle};
use super::run::{PAIRS_BEYOND, Run, Share};
use super::schedule::Schedule;
use super::series::Series;
use crate::fault::SolveFault;
use crate::monitor::Monitor;
use crate::problem::{MOST_CYCLES, Sine};

/// Change from one cycle to the next, and estimated change still to come, relative, below which a cycle counts as settled.
const SETTLED: f64 = 1.0e-6;
/// Share of a change that is left after the next cycle where nothing tells it, and at most.
const UNKNOWN_DECAY: f64 = 0.5;
const SLOWEST_DECAY: f64 = 0.98;
/// Share of a permeable wall's static pull below which a wall that does not conduct has nothing to settle.
const ROUNDING: f64 = 1.0e-6;

/// What a cycle adds up to.
#[derive(Debug, Clone, Copy)]
pub(crate) struct CycleSums {
    /// Work against the magnetic force, J.
    pub(crate) loss: f64,
    /// Part of the force in phase with the displacement over it, N/m, positive where it restores.
    pub(crate) stiffness: f64,
    /// The same of a permeable wall's static pull alone, N/m.
    pub(crate) static_stiffness: f64,
}

impl CycleSums {
    /// Over the steps of the cycle from `from` to `to`, s: with z = X sin(omega t) about the centre, the part of F in phase is
    /// (2/T) integral F sin(omega t) dt = -k X; the midpoint sum over whole cycles of even steps converges faster than any power.
    pub(crate) fn new(series: &Series, sine: &Sine, from: f64, to: f64) -> Self {
        let sliver = 1.0e-9 * sine.period_s();
        let first = series.time.partition_point(|&t| t < from - sliver);
        let last = series.time.partition_point(|&t| t < to - sliver).min(series.time.len() - 1);
        let (mut force, mut pull) = (0.0, 0.0);
        for k in first..last {
            let z = series.position_mid[k] - sine.centre_m;
            let dt = series.time[k + 1] - series.time[k];
            force += series.force_mid[k] * z * dt;
            pull += series.pull_mid[k] * z * dt;
        }
        let scale = -2.0 / (sine.amplitude_m * sine.amplitude_m * (series.time[last] - series.time[first]));
        let loss = series.work[first] - series.work[last];
        Self { loss, stiffness: scale * force, static_stiffness: scale * pull }
    }

    /// loss / (pi omega X^2), N s/m.
    pub(crate) fn damping(&self, sine: &Sine) -> f64 {
        let x = sine.amplitude_m;
        self.loss / (std::f64::consts::PI * sine.angular_frequency() * x * x)
    }

    /// |k + i omega c| without the static part, N/m; never less than what rounding makes of the static part.
    fn size(&self, sine: &Sine) -> f64 {
        let moving = (self.stiffness - self.static_stiffness).hypot(sine.angular_frequency() * self.damping(sine));
        moving.max(ROUNDING * self.static_stiffness.abs()).max(f64::MIN_POSITIVE)
    }

    /// The loss, never less than what rounding makes of the static part, J.
    fn loss_size(&self, sine: &Sine) -> f64 {
        let x = sine.amplitude_m;
        let rounding = ROUNDING * std::f64::consts::PI * x * x * self.static_stiffness.abs();
        self.loss.abs().max(rounding).max(f64::MIN_POSITIVE)
    }
}

/// How a stroke settled on the coarsest level.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Settling {
    /// Cycles run, the last of which gives the figures.
    pub(crate) cycles: u32,
    /// Whether the case gave their number.
    pub(crate) given: bool,
    /// What more cycles would change, J and N/m.
    pub(crate) loss_left: f64,
    pub(crate) stiffness_left: f64,
    /// The greater of both, relative.
    pub(crate) left: f64,
}

impl Settling {
    /// Whether what is left is negligible.
    pub(crate) fn settled(&self) -> bool {
        self.left < SETTLED
    }
}

/// What is left of a sequence that settles, from its last changes: before the last value (`before`) or after it.
fn left(values: &[f64], before: bool) -> f64 {
    let change = |k: usize| (values[k] - values[k - 1]).abs();
    let last = values.len() - 1;
    let decay = match last {
        0 => return f64::INFINITY,
        1 => UNKNOWN_DECAY,
        _ if change(last - 1) > 0.0 => (change(last) / change(last - 1)).min(SLOWEST_DECAY),
        _ => UNKNOWN_DECAY,
    };
    change(last) * if before { 1.0 } else { decay } / (1.0 - decay)
}

/// The cycles so far; where their number is given, one more has been run to see what is left.
fn settling(sums: &[CycleSums], sine: &Sine) -> Settling {
    let given = sine.cycles.is_some();
    let loss_left = left(&sums.iter().map(|s| s.loss).collect::<Vec<_>>(), given);
    let stiffness_left = left(&sums.iter().map(|s| s.stiffness).collect::<Vec<_>>(), given);
    let counted = u32::try_from(sums.len()).unwrap_or(MOST_CYCLES);
    let relative =
        sums.last().map_or(f64::INFINITY, |s| (loss_left / s.loss_size(sine)).max(stiffness_left / s.size(sine)));
    let cycles = if given { counted - 1 } else { counted };
    Settling { cycles, given, loss_left, stiffness_left, left: relative }
}

/// Whether the last cycle is as good as the next: neither its change nor what is estimated to come counts.
fn is_settled(sums: &[CycleSums], sine: &Sine) -> bool {
    let [.., before, last] = sums else { return false };
    let change = (last.loss - before.loss).abs() / last.loss_size(sine);
    let bend = (last.stiffness - before.stiffness).abs() / last.size(sine);
    change.max(bend) < SETTLED && settling(sums, sine).settled()
}

impl Run<'_, '_> {
    /// Runs the coarsest level of a stroke, choosing how many cycles.
    ///
    /// # Errors
    /// See [`SolveFault`].
    pub(crate) fn choose_cycles(
        mut self,
        sine: &Sine,
        course: &Course,
        monitor: &dyn Monitor,
        share: Share,
    ) -> Result<(Series, Schedule, Settling), SolveFault> {
        let a_cycle = pairs_a_cycle(sine, course.stride);
        let most = sine.cycles.map_or(MOST_CYCLES, |c| c + 1);
        let mut schedule = Schedule::planned();
        let mut sums: Vec<CycleSums> = Vec::new();
        let mut k = 0;
        let mut along = |it: &mut Self, schedule: &mut Schedule, pairs: u32| {
            for _ in 0..pairs {
                if monitor.cancelled() {
                    return Err(SolveFault::Interrupted);
                }
                it.planned(schedule, pair_of_cycle(sine, a_cycle, k))?;
                k += 1;
            }
            Ok(())
        };
        for cycle in 0..most {
            along(&mut self, &mut schedule, a_cycle)?;
            let (from, to) = (f64::from(cycle) * sine.period_s(), f64::from(cycle + 1) * sine.period_s());
            sums.push(CycleSums::new(self.series(), sine, from, to));
            monitor.progress(share.from + (share.to - share.from) * progress(cycle, sine), "first level");
            if sine.cycles.is_none() && is_settled(&sums, sine) {
                break;
            }
        }
        if sine.cycles.is_none() {
            along(&mut self, &mut schedule, PAIRS_BEYOND)?;
        }
        let settling = settling(&sums, sine);
        // Where a cycle more was run to see what is left, the finer levels need none of it.
        let end = (f64::from(settling.cycles * a_cycle + PAIRS_BEYOND) - 0.5) * sine.period_s() / f64::from(a_cycle);
        schedule.end_by(end);
        Ok((self.finish(), schedule, settling))
    }
}

/// How far along a run is after `cycle` cycles.
fn progress(cycle: u32, sine: &Sine) -> f64 {
    let done = f64::from(cycle + 1);
    sine.cycles.map_or(done / (done + 4.0), |all| done / f64::from(all + 1))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn what_is_left_of_a_geometric_sequence_is_exact() {
        let values: Vec<f64> = (0..6).map(|k| 3.0 + 0.5 * 0.3_f64.powi(k)).collect();
        approx::assert_relative_eq!(left(&values, false), 0.5 * 0.3_f64.powi(5), max_relative = 1e-9);
        approx::assert_relative_eq!(left(&values, true), 0.5 * 0.3_f64.powi(4), max_relative = 1e-9);
        assert!(left(&values[..1], false).is_infinite());
    }
}

//! The step sizes, fixed once on the coarsest level, in pairs, and replayed at dt / f: a ladder of powers of two for free motion, planned
//! ones for a prescribed motion.
//!
//! A ladder chosen anew on each level would break the even powers of the error.

use lenzbore_mesh::Refinement;

use super::pace::PlannedPair;
use super::window::Window;

/// Halvings below the first rung that the clock resolves.
const FINEST: u32 = 20;

/// A pair of steps.
#[derive(Debug, Clone, Copy)]
struct Pair {
    start_s: f64,
    dt_s: f64,
}

/// Pairs of steps on the coarsest level. Times are whole ticks, or planned beforehand, so nothing accumulates.
#[derive(Debug, Clone)]
pub(crate) struct Schedule {
    tick_s: f64,
    pairs: Vec<Pair>,
    /// Ticks, and seconds, of all pairs so far.
    now: u64,
    end_s: f64,
    /// Pairs before which the window moves, and where to.
    windows: Vec<(usize, Window)>,
}

impl Schedule {
    /// A schedule whose first rung has the step `first_dt_s`.
    pub(crate) fn new(first_dt_s: f64) -> Self {
        let tick_s = first_dt_s / f64::from(1_u32 << FINEST);
        Self { tick_s, pairs: Vec::new(), now: 0, end_s: 0.0, windows: Vec::new() }
    }

    /// A schedule of planned pairs.
    pub(super) fn planned() -> Self {
        Self::new(0.0)
    }

    /// The first rung.
    pub(crate) fn first_rung() -> u32 {
        FINEST
    }

    /// Step of a rung on the coarsest level, s.
    pub(crate) fn dt(&self, rung: u32) -> f64 {
        self.tick_s * ticks(rung)
    }

    /// Accepts a pair of steps at `rung`.
    #[expect(clippy::cast_precision_loss, reason = "tick counts stay far below 2^52 in any run of sensible length")]
    pub(crate) fn push(&mut self, rung: u32) {
        self.pairs.push(Pair { start_s: self.end_s, dt_s: self.dt(rung) });
        self.now += 2_u64 << rung.min(60);
        self.end_s = self.now as f64 * self.tick_s;
    }

    /// Accepts a planned pair.
    pub(super) fn push_planned(&mut self, pair: PlannedPair) {
        self.pairs.push(Pair { start_s: self.end_s, dt_s: pair.dt_s });
        self.end_s = pair.end_s;
    }

    /// Forgets all pairs that start after `time_s`.
    pub(super) fn end_by(&mut self, time_s: f64) {
        let kept = self.pairs.partition_point(|p| p.start_s <= time_s);
        if let Some(pair) = self.pairs.get(kept) {
            self.end_s = pair.start_s;
            self.pairs.truncate(kept);
        }
    }

    /// From the next pair on, the grid is that of `window`.
    pub(crate) fn move_window(&mut self, window: Window) {
        self.windows.push((self.pairs.len(), window));
    }

    /// The window that begins with pair `k`.
    pub(crate) fn window_from(&self, k: usize) -> Option<Window> {
        let at = self.windows.binary_search_by_key(&k, |(pair, _)| *pair).ok()?;
        Some(self.windows[at].1)
    }

    /// Pairs so far.
    pub(crate) fn pairs(&self) -> usize {
        self.pairs.len()
    }

    /// Start of pair `k`, or of the next one, s.
    pub(crate) fn start(&self, k: usize) -> f64 {
        self.pairs.get(k).map_or(self.end_s, |p| p.start_s)
    }

    /// Middle of pair `k`, s.
    pub(crate) fn middle(&self, k: usize) -> f64 {
        self.start(k) + self.pairs[k].dt_s
    }

    /// Number of steps and step size of pair `k` at `refinement`.
    pub(crate) fn steps(&self, k: usize, refinement: Refinement) -> (usize, f64) {
        (refinement.times(2), self.pairs[k].dt_s / refinement.factor())
    }
}

fn ticks(rung: u32) -> f64 {
    f64::from(rung.min(1000)).exp2()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn pairs_cover_the_same_time_on_every_level() {
        let mut schedule = Schedule::new(1.0e-3);
        for rung in [FINEST, FINEST + 1, FINEST + 1, FINEST - 2] {
            schedule.push(rung);
        }
        for refinement in Refinement::first(5) {
            for k in 0..schedule.pairs() {
                let (steps, dt) = schedule.steps(k, refinement);
                #[expect(clippy::cast_precision_loss, reason = "small whole numbers")]
                let end = schedule.start(k) + steps as f64 * dt;
                approx::assert_relative_eq!(end, schedule.start(k + 1), max_relative = 1e-14);
            }
        }
    }
}

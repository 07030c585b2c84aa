//! The step sizes: a ladder of powers of two, fixed once on the coarsest level, in pairs, and replayed at dt / f.
//!
//! A ladder chosen anew on each level would break the even powers of the error.

use lenzbore_mesh::Refinement;

use super::window::Window;

/// Halvings below the first rung that the clock resolves.
const FINEST: u32 = 20;

/// Pairs of steps on the coarsest level. Times are whole ticks, so nothing accumulates.
#[derive(Debug, Clone)]
pub(crate) struct Schedule {
    tick_s: f64,
    /// Rung of each pair: dt = tick 2^rung.
    rungs: Vec<u32>,
    /// Ticks before each pair.
    starts: Vec<u64>,
    now: u64,
    /// Pairs before which the window moves, and where to.
    windows: Vec<(usize, Window)>,
}

impl Schedule {
    /// A schedule whose first rung has the step `first_dt_s`.
    pub(crate) fn new(first_dt_s: f64) -> Self {
        let tick_s = first_dt_s / f64::from(1_u32 << FINEST);
        Self { tick_s, rungs: Vec::new(), starts: Vec::new(), now: 0, windows: Vec::new() }
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
    pub(crate) fn push(&mut self, rung: u32) {
        self.rungs.push(rung);
        self.starts.push(self.now);
        self.now += 2_u64 << rung.min(60);
    }

    /// From the next pair on, the grid is that of `window`.
    pub(crate) fn move_window(&mut self, window: Window) {
        self.windows.push((self.rungs.len(), window));
    }

    /// The window that begins with pair `k`.
    pub(crate) fn window_from(&self, k: usize) -> Option<Window> {
        let at = self.windows.binary_search_by_key(&k, |(pair, _)| *pair).ok()?;
        Some(self.windows[at].1)
    }

    /// Pairs so far.
    pub(crate) fn pairs(&self) -> usize {
        self.rungs.len()
    }

    /// Start of pair `k`, or of the next one, s.
    #[expect(clippy::cast_precision_loss, reason = "tick counts stay far below 2^52 in any run of sensible length")]
    pub(crate) fn start(&self, k: usize) -> f64 {
        self.starts.get(k).copied().unwrap_or(self.now) as f64 * self.tick_s
    }

    /// Middle of pair `k`, s.
    pub(crate) fn middle(&self, k: usize) -> f64 {
        self.start(k) + self.dt(self.rungs[k])
    }

    /// Number of steps and step size of pair `k` at `refinement`.
    pub(crate) fn steps(&self, k: usize, refinement: Refinement) -> (usize, f64) {
        (refinement.times(2), self.dt(self.rungs[k]) / refinement.factor())
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

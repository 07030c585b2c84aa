//! The step sizes of a prescribed motion on the coarsest level: known before anything is solved.

use super::path::{Path, TablePath};
use crate::problem::Sine;

/// Steps a cycle at least.
const LEAST_STEPS: f64 = 48.0;
/// Steps a cycle come in multiples of this, so that every level has a step's end at the turning points.
const MULTIPLE: u32 = 8;
/// Change of velocity in a pair of steps at most, relative to the greatest speed.
const VELOCITY_CHANGE: f64 = 0.15;
/// Step sizes that differ by less, relative, are taken as one, so that one factor serves them.
const SAME: f64 = 1.0e-9;

/// A pair of steps.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct PlannedPair {
    pub(super) dt_s: f64,
    pub(super) end_s: f64,
}

/// Halvings of the first step where a motion starts with a jerk.
const HALVINGS: i32 = 8;

impl PlannedPair {
    /// The same stretch of time, which begins at `begin`, from steps 1/256 as long that double pair by pair. A sudden start excites currents of
    /// all life times; each dies away where the steps are about as long, and whole pairs keep the error in even powers. One long step would
    /// only turn over what lives much shorter.
    pub(super) fn graded(self, begin: f64) -> Vec<Self> {
        let mut pairs: Vec<Self> = Vec::new();
        let mut ends = 0.5_f64.powi(HALVINGS);
        pairs.push(Self { dt_s: self.dt_s * ends, end_s: begin + 2.0 * self.dt_s * ends });
        for halvings in (1..=HALVINGS).rev() {
            let share = 0.5_f64.powi(halvings);
            ends += share;
            pairs.push(Self { dt_s: self.dt_s * share, end_s: begin + 2.0 * self.dt_s * ends });
        }
        if let Some(last) = pairs.last_mut() {
            last.end_s = self.end_s;
        }
        pairs
    }
}

/// Pairs of steps a cycle, for a travel of at most `stride` a step.
pub(super) fn pairs_a_cycle(sine: &Sine, stride: f64) -> u32 {
    let wanted = LEAST_STEPS.max(sine.greatest_speed() * sine.period_s() / stride);
    let multiples = (wanted / f64::from(MULTIPLE)).ceil().min(1.0e8);
    #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "a small positive number")]
    let multiples = multiples as u32;
    multiples * MULTIPLE / 2
}

/// Pair `k` of a stroke with `a_cycle` pairs a cycle.
pub(super) fn pair_of_cycle(sine: &Sine, a_cycle: u32, k: u32) -> PlannedPair {
    let end = f64::from(k + 1) / f64::from(a_cycle);
    PlannedPair { dt_s: 0.5 * sine.period_s() / f64::from(a_cycle), end_s: end * sine.period_s() }
}

/// Pairs of steps through a table: each of its pieces in whole pairs, as the rate of the acceleration jumps between them; then `beyond` more.
pub(super) fn pairs_of_table(table: &TablePath, stride: f64, beyond: u32) -> Vec<PlannedPair> {
    let mut pairs: Vec<PlannedPair> = Vec::new();
    let fastest = (0..table.pieces()).map(|k| table.greatest_speed(k)).fold(0.0, f64::max);
    for k in 0..table.pieces() {
        let (length, speed) = (table.length(k), table.greatest_speed(k));
        let by_travel = 0.5 * length * speed / stride;
        let by_change = length * table.greatest_acceleration(k) / (VELOCITY_CHANGE * fastest);
        #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "a positive number of steps")]
        let count = by_travel.max(by_change).ceil().clamp(1.0, 1.0e8) as u32;
        let own = 0.5 * length / f64::from(count);
        let before = pairs.last().map(|p| p.dt_s).filter(|last| (last / own - 1.0).abs() < SAME);
        let dt_s = before.unwrap_or(own);
        pairs.extend((1..=count).map(|n| {
            let end_s = if n == count { table.times[k + 1] } else { table.times[k] + 2.0 * own * f64::from(n) };
            PlannedPair { dt_s, end_s }
        }));
    }
    for _ in 0..beyond {
        if let Some(&PlannedPair { dt_s, end_s }) = pairs.last() {
            pairs.push(PlannedPair { dt_s, end_s: end_s + 2.0 * dt_s });
        }
    }
    pairs
}

/// Steps on the coarsest level: of `cycles` cycles, or through the table.
pub(super) fn steps(path: &Path, stride: f64, cycles: f64) -> f64 {
    match path {
        Path::Sine(sine) => 2.0 * f64::from(pairs_a_cycle(sine, stride)) * cycles,
        #[expect(clippy::cast_precision_loss, reason = "step counts are far below 2^52")]
        Path::Table(table) => 2.0 * pairs_of_table(table, stride, 0).len() as f64,
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::problem::MotionTable;

    #[test]
    fn every_level_has_a_steps_end_at_the_turning_points() {
        for amplitude_m in [1e-5, 3e-3, 0.0731] {
            let sine = Sine { centre_m: 0.0, amplitude_m, frequency_hz: 7.0, cycles: None };
            let pairs = pairs_a_cycle(&sine, 1e-3);
            assert!(pairs >= 24 && pairs.is_multiple_of(4));
            assert!(sine.greatest_speed() * pair_of_cycle(&sine, pairs, 0).dt_s <= 1e-3);
            approx::assert_relative_eq!(
                pair_of_cycle(&sine, pairs, 3 * pairs - 1).end_s,
                3.0 / 7.0,
                max_relative = 1e-15
            );
        }
    }

    #[test]
    fn a_graded_pair_takes_as_long_as_the_pair() {
        let pair = PlannedPair { dt_s: 0.3, end_s: 1.6 };
        let pairs = pair.graded(1.0);
        let mut begin = 1.0;
        for part in &pairs {
            approx::assert_relative_eq!(part.end_s - begin, 2.0 * part.dt_s, max_relative = 1e-12);
            begin = part.end_s;
        }
        assert_eq!((pairs.len(), pairs[8].dt_s, begin), (9, 0.15, 1.6));
    }

    #[test]
    fn points_of_a_table_lie_between_pairs_and_even_points_take_one_step_size() {
        let time_s: Vec<f64> = (0..20).map(|k| 0.01 * f64::from(k)).collect();
        let position_m = time_s.iter().map(|t| 0.05 * (9.0 * t).sin()).collect();
        let table = TablePath::new(&MotionTable { time_s, position_m });
        let pairs = pairs_of_table(&table, 1e-3, 2);
        assert!(table.times[1..].iter().all(|t| pairs.iter().any(|p| (p.end_s - t).abs() < 1e-15)));
        let mut begin = 0.0;
        for pair in &pairs {
            approx::assert_relative_eq!(pair.end_s - begin, 2.0 * pair.dt_s, max_relative = 1e-8);
            begin = pair.end_s;
        }
        let mut sizes: Vec<u64> = pairs.iter().map(|p| p.dt_s.to_bits()).collect();
        sizes.dedup();
        assert!(sizes.len() <= 8, "{} step sizes", sizes.len());
    }
}

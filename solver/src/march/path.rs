//! Prescribed motion: position and velocity of the reference point against time.

use std::f64::consts::TAU;

use crate::problem::{MotionTable, Sine};

/// Where the reference point is at each instant since the start.
#[derive(Debug, Clone)]
pub(crate) enum Path {
    /// z = centre + amplitude sin(2 pi f t).
    Sine(Sine),
    /// Cubics between the points of a table.
    Table(TablePath),
}

/// The cubic spline through given points, from time 0 on: velocity and acceleration are continuous, and at both ends the slope is that of
/// the parabola through the three points there, so that a quadratic motion is met exactly. Beyond the last point the motion goes on straight.
#[derive(Debug, Clone)]
pub(crate) struct TablePath {
    pub(super) times: Vec<f64>,
    positions: Vec<f64>,
    slopes: Vec<f64>,
}

impl Path {
    /// Position at `t`, m.
    pub(crate) fn position(&self, t: f64) -> f64 {
        match self {
            Self::Sine(sine) => sine.centre_m + sine.amplitude_m * (TAU * (sine.frequency_hz * t).fract()).sin(),
            Self::Table(table) => table.at(t).0,
        }
    }

    /// Velocity at `t`, m/s.
    pub(crate) fn velocity(&self, t: f64) -> f64 {
        match self {
            Self::Sine(sine) => sine.greatest_speed() * (TAU * (sine.frequency_hz * t).fract()).cos(),
            Self::Table(table) => table.at(t).1,
        }
    }

    /// Lowest and highest position, m.
    pub(crate) fn span(&self) -> (f64, f64) {
        match self {
            Self::Sine(sine) => (sine.centre_m - sine.amplitude_m, sine.centre_m + sine.amplitude_m),
            Self::Table(table) => {
                let samples = || table.samples().map(|t| table.at(t).0);
                (samples().fold(f64::INFINITY, f64::min), samples().fold(f64::NEG_INFINITY, f64::max))
            }
        }
    }

    /// Greatest speed, m/s.
    pub(crate) fn greatest_speed(&self) -> f64 {
        match self {
            Self::Sine(sine) => sine.greatest_speed(),
            Self::Table(table) => table.samples().map(|t| table.at(t).1.abs()).fold(0.0, f64::max),
        }
    }

    /// How fast the motion changes, rad/s: the angular frequency, or the greatest acceleration over the greatest speed.
    pub(crate) fn rate(&self) -> f64 {
        match self {
            Self::Sine(sine) => sine.angular_frequency(),
            Self::Table(table) => {
                let greatest = (0..table.pieces()).map(|k| table.greatest_acceleration(k)).fold(0.0, f64::max);
                greatest / self.greatest_speed().max(f64::MIN_POSITIVE)
            }
        }
    }

    /// Number of whole cycles before `t`; 0 where there are none.
    pub(crate) fn cycle(&self, t: f64) -> u32 {
        match self {
            #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "some hundreds, not negative")]
            Self::Sine(sine) => (sine.frequency_hz * t) as u32,
            Self::Table(_) => 0,
        }
    }
}

impl TablePath {
    /// Through the points of `table`: three at least, whose times increase.
    pub(crate) fn new(table: &MotionTable) -> Self {
        let start = table.time_s.first().copied().unwrap_or(0.0);
        let times: Vec<f64> = table.time_s.iter().map(|t| t - start).collect();
        let slopes = spline_slopes(table, &times);
        Self { times, positions: table.position_m.clone(), slopes }
    }

    /// Time of the last point, s.
    pub(crate) fn duration(&self) -> f64 {
        self.times[self.times.len() - 1]
    }

    /// Number of cubics.
    pub(super) fn pieces(&self) -> usize {
        self.times.len() - 1
    }

    /// Length of piece `k`, s.
    pub(super) fn length(&self, k: usize) -> f64 {
        self.times[k + 1] - self.times[k]
    }

    /// Greatest acceleration on piece `k`, m/s2: it is linear in time, so at one of its ends.
    pub(super) fn greatest_acceleration(&self, k: usize) -> f64 {
        let (h, [square, cubic]) = (self.length(k), self.bends(k));
        (2.0 * square).abs().max((2.0 * square + 6.0 * cubic).abs()) / (h * h)
    }

    /// Greatest speed on piece `k`, m/s.
    pub(super) fn greatest_speed(&self, k: usize) -> f64 {
        (0..=16).map(|n| self.on_piece(k, f64::from(n) / 16.0).1.abs()).fold(0.0, f64::max)
    }

    /// Coefficients of x^2 and x^3 on piece `k`, x from 0 to 1.
    fn bends(&self, k: usize) -> [f64; 2] {
        let h = self.length(k);
        let (p, q) = (self.positions[k], self.positions[k + 1]);
        let (a, b) = (h * self.slopes[k], h * self.slopes[k + 1]);
        [3.0 * (q - p) - 2.0 * a - b, 2.0 * (p - q) + a + b]
    }

    fn on_piece(&self, k: usize, x: f64) -> (f64, f64) {
        let (h, [square, cubic]) = (self.length(k), self.bends(k));
        let a = h * self.slopes[k];
        (self.positions[k] + x * (a + x * (square + x * cubic)), (a + x * (2.0 * square + 3.0 * x * cubic)) / h)
    }

    /// Position and velocity at `t`.
    fn at(&self, t: f64) -> (f64, f64) {
        let last = self.pieces();
        if t >= self.duration() {
            return (self.positions[last] + self.slopes[last] * (t - self.duration()), self.slopes[last]);
        }
        let k = self.times.partition_point(|&s| s <= t).clamp(1, last) - 1;
        self.on_piece(k, (t - self.times[k]) / self.length(k))
    }

    /// Instants close enough to see the extremes.
    fn samples(&self) -> impl Iterator<Item = f64> {
        let pairs = self.times.windows(2);
        pairs.flat_map(|t| (0..=16).map(move |n| t[0] + (t[1] - t[0]) * f64::from(n) / 16.0))
    }
}

/// Slopes m_k of the cubic spline: m_(k-1)/h_(k-1) + 2 m_k (1/h_(k-1) + 1/h_k) + m_(k+1)/h_k = 3 (p_(k-1)/h_(k-1) + p_k/h_k), p the
/// chords, both ends given; the matrix is diagonally dominant and eliminated downwards.
fn spline_slopes(table: &MotionTable, times: &[f64]) -> Vec<f64> {
    let last = times.len() - 1;
    let length = |k: usize| times[k + 1] - times[k];
    // The parabola through three points: its slope at the middle one weighs the chords by the other's length.
    let at_end = |middle: usize, end: usize| {
        let (p, q) = (table.chord(middle - 1), table.chord(middle));
        let bend = (q - p) / (length(middle - 1) + length(middle));
        p + bend * length(middle - 1) + 2.0 * bend * (times[end] - times[middle])
    };
    let mut slopes = vec![0.0; last + 1];
    (slopes[0], slopes[last]) = (at_end(1, 0), at_end(last - 1, last));
    let (mut above, mut right) = (vec![0.0; last], vec![0.0; last]);
    for k in 1..last {
        let (before, after) = (1.0 / length(k - 1), 1.0 / length(k));
        let wanted = 3.0 * (table.chord(k - 1) * before + table.chord(k) * after);
        let (up, known) = if k == 1 { (0.0, slopes[0]) } else { (above[k - 1], right[k - 1]) };
        let pivot = 2.0 * (before + after) - before * up;
        above[k] = after / pivot;
        right[k] = (wanted - before * known) / pivot;
    }
    for k in (1..last).rev() {
        slopes[k] = right[k] - above[k] * slopes[k + 1];
    }
    slopes
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_quadratic_motion_is_met_exactly() {
        let instants = [0.0, 0.1, 0.25, 0.3, 0.7];
        let position_m = instants.iter().map(|t| 1.0 - 2.0 * t + 3.0 * t * t).collect();
        let time_s = instants.iter().map(|t| t + 5.0).collect();
        let path = Path::Table(TablePath::new(&MotionTable { time_s, position_m }));
        for t in [0.0, 0.05, 0.2, 0.28, 0.5, 0.7] {
            approx::assert_relative_eq!(path.position(t), 1.0 - 2.0 * t + 3.0 * t * t, max_relative = 1e-13);
            approx::assert_relative_eq!(path.velocity(t), -2.0 + 6.0 * t, max_relative = 1e-12, epsilon = 1e-12);
        }
        let (low, high) = path.span();
        approx::assert_relative_eq!(low, 2.0 / 3.0, max_relative = 1e-3);
        approx::assert_relative_eq!(high, 1.07, max_relative = 1e-12);
        // The acceleration is 6 m/s2 throughout, the speed 2.2 m/s at most.
        approx::assert_relative_eq!(path.rate(), 6.0 / 2.2, max_relative = 1e-9);
        approx::assert_relative_eq!(path.position(0.8), 1.07 + 0.1 * 2.2, max_relative = 1e-12);
    }

    #[test]
    fn a_sampled_sine_is_followed_to_the_fourth_power_of_the_spacing() {
        let off = |count: u32| {
            let time_s: Vec<f64> = (0..=count).map(|k| f64::from(k) / f64::from(count)).collect();
            let position_m = time_s.iter().map(|t| (TAU * t + 0.4).sin()).collect();
            let path = Path::Table(TablePath::new(&MotionTable { time_s, position_m }));
            // Away from the ends, whose slopes are those of parabolas.
            let inside = (250..750).map(|k| f64::from(k) / 1000.0);
            inside.map(|t| (path.position(t) - (TAU * t + 0.4).sin()).abs()).fold(0.0, f64::max)
        };
        let (coarse, fine) = (off(40), off(80));
        assert!(coarse < 3e-6 && (coarse / fine).log2() > 3.7, "{coarse:.1e} {fine:.1e}");
    }

    #[test]
    fn a_sine_comes_back_to_the_bit_after_whole_cycles() {
        let path = Path::Sine(Sine { centre_m: 0.1, amplitude_m: 0.02, frequency_hz: 8.0, cycles: None });
        approx::assert_relative_eq!(path.position(0.03125), 0.12, max_relative = 1e-15);
        for t in [0.0, 0.01, 0.07] {
            approx::assert_relative_eq!(path.position(t), path.position(t + 31.25), max_relative = 1e-13);
        }
        assert_eq!((path.cycle(0.124), path.cycle(0.126)), (0, 1));
    }
}

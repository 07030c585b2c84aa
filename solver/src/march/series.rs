//! What one level records, and its reading at any instant.

use super::heating::HeatLeft;
use crate::interpolate::{ALONG_POINTS, Stencil, sampled};

/// Values at step ends (`time` and the like) and at step middles (`*_mid`).
#[derive(Debug, Clone, Default)]
pub(crate) struct Series {
    pub(crate) time: Vec<f64>,
    pub(crate) position: Vec<f64>,
    pub(crate) velocity: Vec<f64>,
    /// Heat since the start, J.
    pub(crate) heat: Vec<f64>,
    /// Work of the magnetic force on the mover since the start, J, negative where it brakes.
    pub(crate) work: Vec<f64>,
    pub(crate) time_mid: Vec<f64>,
    pub(crate) position_mid: Vec<f64>,
    /// Axial force on the mover by the wall route (discrete gradient), N.
    pub(crate) force_mid: Vec<f64>,
    /// The same by the reaction field on the mover, N.
    pub(crate) force_on_mover_mid: Vec<f64>,
    /// Instants at which the stress was taken, and the force by it, N: near the greatest forces only.
    pub(crate) time_stress: Vec<f64>,
    pub(crate) force_by_stress: Vec<f64>,
    /// Heat rate, W.
    pub(crate) heat_rate_mid: Vec<f64>,
    /// Field energy beyond the mover's own, J.
    pub(crate) energy_mid: Vec<f64>,
    /// Static pull of a permeable wall on the mover, N (zero otherwise); part of the forces above.
    pub(crate) pull_mid: Vec<f64>,
    /// Energy lost to friction and air since the start, J.
    pub(crate) losses: Vec<f64>,
    /// Acceleration, m/s2.
    pub(crate) acceleration_mid: Vec<f64>,
    /// Peak current density, A/m2, and where.
    pub(crate) peak_mid: Vec<f64>,
    pub(crate) peak_r_mid: Vec<f64>,
    pub(crate) peak_z_mid: Vec<f64>,
    /// Greatest opposing field in magnets of known coercivity, A/m, and its r and z, m; empty where there is none.
    pub(crate) opposing_mid: [Vec<f64>; 3],
    /// What the coercivity leaves, where it leaves least, and its r and z, m; empty where there is none.
    pub(crate) margin_mid: [Vec<f64>; 3],
    /// What each gauge reads of the reaction, a series of step middles a reading.
    pub(crate) stations: Vec<Vec<f64>>,
    /// Field energy at the start, J (a permeable wall's pull).
    pub(crate) energy_start: f64,
    /// Instant at which friction held the mover, s.
    pub(crate) stopped_at: Option<f64>,
    /// The mover left the wall's field for good.
    pub(crate) lost: bool,
    /// The heat that the run has left in the wall, node by node, where it is asked for.
    pub(crate) heat_left: Option<HeatLeft>,
}

impl Series {
    /// Forgets all steps after the first `steps`, which end at `time`.
    pub(crate) fn truncate(&mut self, steps: usize, time: f64) {
        let kept = self.time_stress.partition_point(|&t| t < time);
        self.at_stress().into_iter().for_each(|values| values.truncate(kept));
        self.at_ends().into_iter().for_each(|values| values.truncate(steps + 1));
        self.at_middles().into_iter().for_each(|values| values.truncate(steps));
        self.of_magnets().for_each(|values| values.truncate(steps));
        self.stations.iter_mut().for_each(|values| values.truncate(steps));
    }

    /// Makes room for `steps` more, so that recording them allocates nothing.
    pub(crate) fn reserve(&mut self, steps: usize) {
        self.at_stress().into_iter().for_each(|values| values.reserve(steps));
        self.at_ends().into_iter().for_each(|values| values.reserve(steps));
        self.at_middles().into_iter().for_each(|values| values.reserve(steps));
        self.of_magnets().for_each(|values| values.reserve(steps));
        self.stations.iter_mut().for_each(|values| values.reserve(steps));
    }

    fn at_stress(&mut self) -> [&mut Vec<f64>; 2] {
        [&mut self.time_stress, &mut self.force_by_stress]
    }

    fn at_ends(&mut self) -> [&mut Vec<f64>; 6] {
        [&mut self.time, &mut self.position, &mut self.velocity, &mut self.heat, &mut self.work, &mut self.losses]
    }

    fn at_middles(&mut self) -> [&mut Vec<f64>; 11] {
        [
            &mut self.time_mid,
            &mut self.position_mid,
            &mut self.force_mid,
            &mut self.force_on_mover_mid,
            &mut self.heat_rate_mid,
            &mut self.energy_mid,
            &mut self.pull_mid,
            &mut self.acceleration_mid,
            &mut self.peak_mid,
            &mut self.peak_r_mid,
            &mut self.peak_z_mid,
        ]
    }

    fn of_magnets(&mut self) -> impl Iterator<Item = &mut Vec<f64>> {
        self.opposing_mid.iter_mut().chain(&mut self.margin_mid)
    }

    /// A quantity of step ends at `t`.
    pub(crate) fn at(&self, values: &[f64], t: f64) -> f64 {
        sampled(&self.time, values, t)
    }

    /// A quantity of step middles at `t`.
    pub(crate) fn mid_at(&self, values: &[f64], t: f64) -> f64 {
        sampled(&self.time_mid, values, t)
    }

    /// Instant when the position first passes `level`, s.
    pub(crate) fn crossing(&self, level: f64) -> Option<f64> {
        let z = &self.position;
        if z.first().is_some_and(|&start| (start - level).abs() <= 0.0) {
            return self.time.first().copied();
        }
        let k = z.windows(2).position(|p| (p[0] - level) * (p[1] - level) <= 0.0)?;
        Some(self.root(k, level))
    }

    /// Bisects the interpolated position for `level` inside step `k`.
    fn root(&self, k: usize, level: f64) -> f64 {
        let (mut low, mut high) = (self.time[k], self.time[k + 1]);
        let rising = self.position[k + 1] > self.position[k];
        for _ in 0..80 {
            let middle = 0.5 * (low + high);
            if (self.at(&self.position, middle) < level) == rising {
                low = middle;
            } else {
                high = middle;
            }
        }
        0.5 * (low + high)
    }

    /// Velocity at `t` as the slope of the interpolated position, m/s.
    pub(crate) fn velocity_at(&self, t: f64) -> f64 {
        if self.time.len() < ALONG_POINTS {
            return sampled(&self.time, &self.velocity, t);
        }
        Stencil::<ALONG_POINTS>::at(&self.time, t).slope_of(&self.position)
    }

    /// Greatest value of a quantity of step middles from `since` up to `until`, with its instant.
    pub(crate) fn greatest(&self, values: &[f64], (since, until): (f64, f64)) -> (f64, f64) {
        let first = self.time_mid.partition_point(|&t| t < since);
        let n = self.time_mid.partition_point(|&t| t <= until).max(1).min(values.len());
        let largest = (first..n).max_by(|&a, &b| values[a].total_cmp(&values[b]));
        let Some(k) = largest else { return (0.0, 0.0) };
        let from = k.saturating_sub(4);
        let to = (k + 5).min(values.len());
        let lift = values[from..to].iter().copied().fold(f64::INFINITY, f64::min);
        let lifted: Vec<f64> = values[from..to].iter().map(|v| v - lift).collect();
        let (t, v) = crate::interpolate::peak(&self.time_mid[from..to], &lifted);
        (t, v + lift)
    }
}

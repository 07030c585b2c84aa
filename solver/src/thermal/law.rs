//! What an event does at the temperature that the wall has: solved at a few uniform temperatures, interpolated between them.

use crate::fault::SolveFault;
use crate::march::{CoarseEvent, coarse_events};
use crate::monitor::Monitor;
use crate::problem::{Problem, SnapshotPlan, Warming};

/// Differences of temperature below which the event is the same, K.
const SAME_K: f64 = 0.01;
/// How many times the change from one level to the next counts in the band of a ratio.
const LEVEL_STEPS: f64 = 2.0;

/// The event at a few temperatures, the first of which is that at the start.
pub(crate) struct EventLaw {
    /// Temperatures of the whole wall, K.
    pub(crate) at_k: Vec<f64>,
    /// Heat and greatest drag at each over those at the first.
    pub(crate) heat_ratio: Vec<f64>,
    pub(crate) drag_ratio: Vec<f64>,
    /// The coarsest level's event at each, where there are more than one.
    pub(crate) events: Vec<CoarseEvent>,
    /// Half-widths of the ratios that are furthest from the first's.
    pub(crate) heat_band: f64,
    pub(crate) drag_band: f64,
}

impl EventLaw {
    /// The same at all temperatures.
    pub(crate) fn constant(start_k: f64) -> Self {
        Self {
            at_k: vec![start_k],
            heat_ratio: vec![1.0],
            drag_ratio: vec![1.0],
            events: Vec::new(),
            heat_band: 0.0,
            drag_band: 0.0,
        }
    }

    /// Solves the event where the wall's temperature goes, from `lowest_k` to `highest_k`.
    ///
    /// # Errors
    /// Those of a march.
    pub(crate) fn solved(
        problem: &Problem,
        warming: &Warming,
        (lowest_k, highest_k): (f64, f64),
        monitor: &dyn Monitor,
    ) -> Result<Self, SolveFault> {
        let start = warming.start_k;
        let at_k = temperatures(start, lowest_k, highest_k);
        let knows = warming.layers.iter().any(|l| l.resistivity_coefficient_per_k.is_some());
        if at_k.len() == 1 || !knows {
            return Ok(Self::constant(start));
        }
        let mut events = Vec::new();
        let mut finer = Vec::new();
        for (k, &t) in at_k.iter().enumerate() {
            // The first and the last on two levels: what a finer grid makes of their ratio is its band.
            let levels = if k == 0 || k + 1 == at_k.len() { 2 } else { 1 };
            let mut solved = coarse_events(&at_temperature(problem, warming, t), levels, monitor)?;
            finer.extend(if levels > 1 { solved.pop() } else { None });
            events.extend(solved.pop());
        }
        Ok(Self::of(at_k, events, &finer))
    }

    fn of(at_k: Vec<f64>, events: Vec<CoarseEvent>, finer: &[CoarseEvent]) -> Self {
        let ratios = |list: &[CoarseEvent], of: fn(&CoarseEvent) -> f64| -> Vec<f64> {
            list.iter().map(|e| if of(&list[0]) > 0.0 { of(e) / of(&list[0]) } else { 1.0 }).collect()
        };
        let band = |of: fn(&CoarseEvent) -> f64| match (ratios(&events, of).last(), ratios(finer, of).last()) {
            (Some(coarse), Some(fine)) => LEVEL_STEPS * (fine - coarse).abs(),
            _ => 0.0,
        };
        let (heat_band, drag_band) = (band(|e| e.heat), band(|e| e.drag_peak));
        let (heat_ratio, drag_ratio) = (ratios(&events, |e| e.heat), ratios(&events, |e| e.drag_peak));
        Self { at_k, heat_ratio, drag_ratio, events, heat_band, drag_band }
    }

    /// Weights of the event's values at a temperature of the wall: the polynomial through all of them, held constant beyond.
    pub(crate) fn weights(&self, at_k: f64) -> Vec<f64> {
        let (low, high) = self.range();
        let t = at_k.clamp(low, high);
        let n = self.at_k.len();
        let others = |k: usize| (0..n).filter(move |&m| m != k);
        (0..n).map(|k| others(k).map(|m| (t - self.at_k[m]) / (self.at_k[k] - self.at_k[m])).product()).collect()
    }

    /// Lowest and highest temperature at which it was solved, K.
    pub(crate) fn range(&self) -> (f64, f64) {
        let pick = |with: fn(f64, f64) -> f64| self.at_k.iter().copied().reduce(with).unwrap_or(0.0);
        (pick(f64::min), pick(f64::max))
    }

    /// Greatest drag at a temperature, over that at the start.
    pub(crate) fn drag_at(&self, at_k: f64) -> f64 {
        self.weights(at_k).iter().zip(&self.drag_ratio).map(|(w, d)| w * d).sum()
    }
}

/// The start, and two more between which the wall's temperature goes.
fn temperatures(start: f64, lowest: f64, highest: f64) -> Vec<f64> {
    let (below, above) = (start - lowest, highest - start);
    if below.max(above) < SAME_K {
        return vec![start];
    }
    let far = if above >= below { highest } else { lowest };
    let near = if below.min(above) > 0.1 * below.max(above) { lowest + highest - far } else { 0.5 * (start + far) };
    vec![start, near, far]
}

/// The problem with the whole wall at `at_k`; the mover stays as it is.
fn at_temperature(problem: &Problem, warming: &Warming, at_k: f64) -> Problem {
    let mut other = Problem { snapshots: SnapshotPlan::None, stations: Vec::new(), ..problem.clone() };
    for (k, layer) in other.wall.layers.iter_mut().enumerate() {
        layer.conductivity_s_per_m *= warming.conductivity_ratio(k, at_k);
    }
    other
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn weights_interpolate_and_hold_beyond() {
        let law =
            EventLaw { drag_ratio: vec![1.0, 0.9, 0.7], at_k: vec![300.0, 320.0, 340.0], ..EventLaw::constant(300.0) };
        for (t, ratio) in law.at_k.iter().zip(&law.drag_ratio) {
            approx::assert_relative_eq!(law.drag_at(*t), *ratio, max_relative = 1e-14);
        }
        // A parabola through them: 1 - 0.1 x (x + 1) / 2, x = (T - 300) / 20.
        approx::assert_relative_eq!(law.drag_at(310.0), 1.0 - 0.1 * 0.5 * 1.5 / 2.0, max_relative = 1e-13);
        approx::assert_relative_eq!(law.drag_at(500.0), 0.7, max_relative = 1e-13);
    }

    #[test]
    fn the_temperatures_lie_where_the_wall_goes() {
        assert_eq!(temperatures(300.0, 300.0, 300.005), [300.0]);
        assert_eq!(temperatures(300.0, 300.0, 340.0), [300.0, 320.0, 340.0]);
        assert_eq!(temperatures(300.0, 280.0, 340.0), [300.0, 280.0, 340.0]);
    }
}

//! Stop after stop on one level: an event leaves its heat at one instant, the wall conducts and cools until the next.

use lenzbore_mesh::Refinement;

use super::law::EventLaw;
use super::operator::HeatOperator;
use super::step::Period;
use crate::fault::SolveFault;
use crate::monitor::Monitor;
use crate::problem::{Cooling, Duty, LayerHeat, MOST_STOPS};

/// What is still to come, relative to what has come, below which a temperature has settled.
const SETTLED: f64 = 1.0e-4;
/// Rise that is never worth another stop, K.
const LEAST_K: f64 = 1.0e-6;
/// First stretch of a period, in times that heat takes across the thinnest layer.
const FIRST_STRETCH: f64 = 0.1;

/// One level's heat equation and the event's heat on it.
pub(crate) struct LevelHeat {
    pub(crate) operator: HeatOperator,
    /// The event's heat at the start, J.
    pub(crate) own: Vec<f64>,
    /// What the event leaves elsewhere at each of the law's temperatures, J.
    pub(crate) changes: Vec<Vec<f64>>,
    pub(crate) refinement: Refinement,
}

/// A stop on one level.
#[derive(Debug, Clone, Copy, Default)]
pub(crate) struct LevelStop {
    pub(crate) energy: f64,
    pub(crate) before: f64,
    pub(crate) hottest_before: f64,
    pub(crate) mean: f64,
    pub(crate) peak: f64,
    pub(crate) bore: f64,
    pub(crate) outside: f64,
}

/// All stops of a level, in K and J.
#[derive(Debug, Default)]
pub(crate) struct LevelStops {
    pub(crate) stops: Vec<LevelStop>,
    /// Temperature before the last stop and right after it, K.
    pub(crate) before_last: Vec<f64>,
    pub(crate) after_last: Vec<f64>,
    pub(crate) heat: f64,
    pub(crate) lost: f64,
    pub(crate) stored: f64,
    pub(crate) settled: bool,
    /// What more stops would add to the temperature before one, K.
    pub(crate) left: f64,
}

/// Where the stops begin, and how they follow.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Routine<'a> {
    pub(crate) start_k: f64,
    pub(crate) ambient_k: f64,
    pub(crate) duty: Duty,
    pub(crate) layers: &'a [LayerHeat],
    pub(crate) thinnest_m: f64,
}

impl<'a> Routine<'a> {
    pub(crate) fn new(
        start_k: f64,
        cooling: Option<Cooling>,
        duty: Duty,
        layers: &'a [LayerHeat],
        thinnest_m: f64,
    ) -> Self {
        Self { start_k, ambient_k: cooling.map_or(start_k, |c| c.ambient_k), duty, layers, thinnest_m }
    }

    /// Time that heat takes across the thinnest layer, w^2 / diffusivity of the best conductor, s.
    fn across_s(&self) -> f64 {
        let diffusivity = |l: &LayerHeat| l.thermal_conductivity_w_per_m_k.unwrap_or(0.0) / l.volumetric_j_per_m3_k();
        let best = self.layers.iter().map(diffusivity).fold(0.0, f64::max);
        self.thinnest_m * self.thinnest_m / best
    }
}

impl LevelHeat {
    /// Runs `count` stops, or as many as it takes to settle.
    ///
    /// # Errors
    /// Interrupted, not finite, or a residual.
    pub(crate) fn run(
        &self,
        law: &EventLaw,
        routine: &Routine<'_>,
        count: Option<usize>,
        monitor: &dyn Monitor,
    ) -> Result<LevelStops, SolveFault> {
        let operator = &self.operator;
        let (start, ambient) = (routine.start_k - routine.ambient_k, routine.ambient_k);
        let mut period =
            Period::new(operator, routine.duty.period_s, FIRST_STRETCH * routine.across_s(), self.refinement)?;
        let mut above = vec![start; operator.len()];
        let mut all = LevelStops::default();
        let most = count.unwrap_or(MOST_STOPS as usize);
        while all.stops.len() < most {
            if monitor.cancelled() {
                return Err(SolveFault::Interrupted);
            }
            let before = above.clone();
            let mut stop = self.hit(law, ambient, &mut above);
            all.heat += stop.energy;
            all.after_last.clone_from(&above);
            let greatest = |places: &[usize], v: &[f64]| places.iter().map(|&u| v[u]).fold(f64::NEG_INFINITY, f64::max);
            (stop.bore, stop.outside) = (greatest(&operator.bore, &above), greatest(&operator.outside, &above));
            all.lost += period.conduct(operator, &mut above, |v| {
                stop.bore = stop.bore.max(greatest(&operator.bore, v));
                stop.outside = stop.outside.max(greatest(&operator.outside, v));
            })?;
            (stop.bore, stop.outside) = (stop.bore + ambient, stop.outside + ambient);
            all.before_last = before;
            all.stops.push(stop);
            (all.left, all.settled) = left(&all.stops);
            if count.is_none() && all.settled {
                break;
            }
        }
        all.stored = operator.capacity.iter().zip(&above).map(|(c, v)| c * (v - start)).sum();
        for field in [&mut all.before_last, &mut all.after_last] {
            field.iter_mut().for_each(|v| *v += ambient);
        }
        Ok(all)
    }

    /// An event's heat falls in: what it is at the temperature that the wall has where it falls.
    fn hit(&self, law: &EventLaw, ambient: f64, above: &mut [f64]) -> LevelStop {
        let own: f64 = self.own.iter().sum();
        let weighted: f64 = self.own.iter().zip(above.iter()).map(|(q, v)| q * v).sum();
        let before = ambient + if own > 0.0 { weighted / own } else { 0.0 };
        let hottest_before = ambient + above.iter().copied().fold(f64::NEG_INFINITY, f64::max);
        let weights = law.weights(before);
        let mut energy = 0.0;
        for (u, v) in above.iter_mut().enumerate() {
            let change: f64 = weights.iter().zip(&self.changes).map(|(w, c)| w * c[u]).sum();
            let heat = self.own[u] + change;
            energy += heat;
            *v += heat / self.operator.capacity[u];
        }
        let stored: f64 = self.operator.capacity.iter().zip(above.iter()).map(|(c, v)| c * v).sum();
        let peak = ambient + above.iter().copied().fold(f64::NEG_INFINITY, f64::max);
        let mean = ambient + stored / self.operator.total_capacity();
        LevelStop { energy, before, hottest_before, mean, peak, ..LevelStop::default() }
    }
}

/// What is still to come of the temperature before a stop, K, from its last two changes; and whether that no longer counts.
fn left(stops: &[LevelStop]) -> (f64, bool) {
    let [.., first, second, third] = stops else { return (f64::INFINITY, false) };
    let (before, last) = (second.before - first.before, third.before - second.before);
    let decay = if before.abs() > 0.0 { (last / before).abs() } else { 0.0 };
    if decay >= 1.0 {
        return (f64::INFINITY, last.abs() <= f64::EPSILON * third.before);
    }
    let left = (last * decay / (1.0 - decay)).abs();
    let come = (third.before - stops[0].before).abs();
    (left, left.max(last.abs()) <= (SETTLED * come).max(LEAST_K))
}

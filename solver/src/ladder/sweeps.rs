//! The quick models against settled fields of the design and its neighbours, in an endless wall.

use super::assumptions::Assumptions;
use super::design::{face, magnet_scales, reference_speed, side, thickness_ratio, with_magnets, with_thickness};
use super::outcome::{ErrorMap, FallsBelow, Range, Swept};
use super::range::{TOLERANCES, first_reaching, range};
use super::ring_sum::RingSum;
use crate::fault::SolveFault;
use crate::monitor::Monitor;
use crate::outcome::Outcome;
use crate::problem::{Accuracy, Problem};

/// Points of the sweep over speed.
const SPEEDS: usize = 61;
/// Slowest and fastest speed swept, in units of the speed at which mu0 sum(sigma mu_r w) v = 1; widened to hold the design's.
const SPEED_SPAN: (f64, f64) = (3.0e-3, 30.0);
/// Every so many of these speeds is a column of the map.
const MAP_STRIDE: usize = 2;
/// Thinnest and thickest wall swept, in units of the design's.
const THICKNESS_SPAN: (f64, f64) = (1.0 / 8.0, 8.0);
const THICKNESSES: usize = 13;
/// The thickest wall, over the bore radius; a thicker design is its own limit.
const THICKEST: f64 = 1.25;
/// The thickest wall of a rod, over its radius.
const THICKEST_ROD: f64 = 0.98;
/// Points of the sweep over the size of the magnets.
const SCALES: usize = 10;

/// All sweeps of a design.
pub(super) struct Sweeps {
    /// One list of ranges a quick model.
    pub ranges: Vec<Vec<Range>>,
    pub map: Option<ErrorMap>,
    /// Damping coefficient of the field solution at zero speed, N s/m, and its band.
    pub at_rest: (f64, f64),
    /// Where the field solution's drag falls below the law of low speed.
    pub falls_below: Vec<FallsBelow>,
}

/// The problems swept: the truth's and what the quick models take for it (permeability 1, 20 degC).
pub(super) struct Designs<'a> {
    /// Endless, as it is.
    pub truth: &'a Problem,
    /// Endless, as quick models see it.
    pub seen: &'a Problem,
    /// Speed of the design, m/s.
    pub here: f64,
}

/// Drag over speed of each model: relative errors `[model][speed]`.
struct Errors {
    by_model: Vec<Vec<f64>>,
    outcome: Outcome,
}

impl Designs<'_> {
    /// Sweeps speed, thickness and size of magnets.
    pub fn sweep(&self, quick: &[Assumptions], monitor: &dyn Monitor) -> Result<Option<Sweeps>, SolveFault> {
        let Some(reference) = reference_speed(self.truth) else { return Ok(None) };
        let speeds = self.speeds(reference);
        // The speeds come almost free once the levels are there: 1 % is read well only from a drag good to far less.
        let fine = Problem { accuracy: Accuracy::default(), ..self.truth.clone() };
        let along = errors(&fine, self.seen, quick, &speeds, monitor)?;
        let at_rest = along.outcome.figures.iter().find(|f| f.name == super::models::AT_REST);
        let at_rest = at_rest.map_or((0.0, 0.0), |f| (f.value, f.band));
        monitor.progress(0.1, "");
        let mut ranges: Vec<Vec<Range>> = Vec::new();
        for by_speed in along.by_model {
            let pairs = speeds.iter().copied().zip(by_speed).collect();
            ranges.push(vec![range(Swept::Speed, self.here, pairs)]);
        }
        let falls_below = falls_below(&ranges, quick, reference);
        let mut map = None;
        if let Some(inside) = side(self.truth) {
            map = Some(self.thicknesses(inside, &speeds, quick, &mut ranges, monitor)?);
            self.magnets(inside, quick, &mut ranges, monitor)?;
        }
        Ok(Some(Sweeps { ranges, map, at_rest, falls_below }))
    }

    fn speeds(&self, reference: f64) -> Vec<f64> {
        let low = (SPEED_SPAN.0 * reference).min(0.5 * self.here);
        let high = (SPEED_SPAN.1 * reference).max(2.0 * self.here);
        logarithmic(low, high, SPEEDS)
    }

    fn thicknesses(
        &self,
        inside: bool,
        speeds: &[f64],
        quick: &[Assumptions],
        ranges: &mut [Vec<Range>],
        monitor: &dyn Monitor,
    ) -> Result<ErrorMap, SolveFault> {
        let design = thickness_ratio(self.truth, inside);
        let limit = if inside { THICKEST.max(design) } else { THICKEST_ROD };
        let ratios = logarithmic(THICKNESS_SPAN.0 * design, limit.min(THICKNESS_SPAN.1 * design), THICKNESSES);
        let columns: Vec<f64> = speeds.iter().copied().step_by(MAP_STRIDE).collect();
        let mut asked = columns.clone();
        asked.push(self.here);
        let mapped: Vec<Assumptions> = quick.to_vec();
        let mut along = vec![Vec::new(); mapped.len()];
        let mut rows = vec![Vec::new(); mapped.len()];
        for (k, &ratio) in ratios.iter().enumerate() {
            let at = |p: &Problem| with_thickness(p, inside, ratio / design);
            let found = errors(&at(self.truth), &at(self.seen), &mapped, &asked, monitor)?;
            for (m, mut by_speed) in found.by_model.into_iter().enumerate() {
                along[m].extend(by_speed.pop().map(|here| (ratio, here)));
                rows[m].push(by_speed);
            }
            monitor.progress(0.1 + 0.6 * (k as f64 + 1.0) / THICKNESSES as f64, "");
        }
        for (ranges, along) in ranges.iter_mut().zip(along) {
            ranges.push(range(Swept::ThicknessRatio, design, along));
        }
        let errors = mapped.into_iter().zip(rows).collect();
        Ok(ErrorMap { speeds_m_per_s: columns, thickness_ratios: ratios, errors, here: (self.here, design) })
    }

    fn magnets(
        &self,
        inside: bool,
        quick: &[Assumptions],
        ranges: &mut [Vec<Range>],
        monitor: &dyn Monitor,
    ) -> Result<(), SolveFault> {
        let (low, high) = magnet_scales(self.truth, inside);
        if !(high > low && face(self.truth, inside) > 0.0) {
            return Ok(());
        }
        let mut along = vec![Vec::new(); quick.len()];
        let scales = logarithmic(low, high, SCALES);
        for (k, &scale) in scales.iter().enumerate() {
            let at = |p: &Problem| with_magnets(p, scale);
            let found = errors(&at(self.truth)?, &at(self.seen)?, quick, &[self.here], monitor)?;
            for (m, by_speed) in found.by_model.into_iter().enumerate() {
                along[m].extend(by_speed.first().map(|&here| (scale, here)));
            }
            monitor.progress(0.7 + 0.3 * (k as f64 + 1.0) / SCALES as f64, "");
        }
        for (ranges, along) in ranges.iter_mut().zip(along) {
            ranges.push(range(Swept::MagnetScale, 1.0, along));
        }
        Ok(())
    }
}

/// Where the truth falls short of the law of low speed by each tolerance, in units of that law.
fn falls_below(ranges: &[Vec<Range>], quick: &[Assumptions], reference: f64) -> Vec<FallsBelow> {
    let law = quick.iter().position(|a| *a == Assumptions::RESISTIVE);
    let Some(errors) = law.and_then(|k| ranges.get(k)).and_then(|r| r.first()).map(|r| &r.errors) else {
        return Vec::new();
    };
    // Relative to the truth the law is e too high; relative to itself, e / (1 + e).
    let place = |share: f64| first_reaching(errors, share / (1.0 - share));
    let at = |share: f64, v: f64| FallsBelow { share, speed_m_per_s: v, magnetic_reynolds: v / reference };
    TOLERANCES.iter().filter_map(|&share| place(share).map(|v| at(share, v))).collect()
}

/// Relative errors of the models' drags at `speeds` against settled fields.
fn errors(
    truth: &Problem,
    seen: &Problem,
    quick: &[Assumptions],
    speeds: &[f64],
    monitor: &dyn Monitor,
) -> Result<Errors, SolveFault> {
    if monitor.cancelled() {
        return Err(SolveFault::Interrupted);
    }
    let quiet = crate::monitor::Quiet { inner: monitor };
    let outcome = crate::drag_curve(truth, speeds, &quiet)?;
    let points = outcome.curve.as_ref().map(|c| c.points.clone()).unwrap_or_default();
    let mut by_model = Vec::new();
    for &assumptions in quick {
        let model = RingSum::new(seen, assumptions)?;
        by_model.push(points.iter().map(|p| model.drag(p.speed_m_per_s) / p.drag_newton - 1.0).collect());
    }
    Ok(Errors { by_model, outcome })
}

/// `count` values from `low` to `high`, evenly apart in their logarithms.
fn logarithmic(low: f64, high: f64, count: usize) -> Vec<f64> {
    (0..count).map(|k| low * (high / low).powf(k as f64 / (count - 1) as f64)).collect()
}

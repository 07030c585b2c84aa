//! The frequency at which the wall adds most resistance for the coils' own reactance: the critical frequency.

use super::level::HarmonicLevel;
use super::levels::Levels;
use super::point::Point;
use crate::band;
use crate::interpolate::greatest;
use crate::outcome::{Basis, Figure, Measured};

/// How closely the frequency is searched, in its logarithm.
const SEARCH: f64 = 1.0e-7;

/// `critical_frequency` and `resistance_ratio_max` where the maximum lies inside the range of a sweep.
pub(super) fn greatest_ratio(levels: &Levels<'_>, points: &[Point], alone: Measured) -> Option<[Figure; 2]> {
    let omega = |p: &Point| 2.0 * std::f64::consts::PI * p.point.frequency_hz;
    let ratio_of = |p: &Point| p.resistance.value / (omega(p) * alone.value);
    let best = (0..points.len()).max_by(|&a, &b| ratio_of(&points[a]).total_cmp(&ratio_of(&points[b])))?;
    if best == 0 || best + 1 >= points.len() {
        return None;
    }
    let (low, high) = (omega(&points[best - 1]).ln(), omega(&points[best + 1]).ln());
    let on_level = |level: &HarmonicLevel, log: f64| {
        let omega = log.exp();
        (levels.ohm(omega) * level.linked_quickly(omega)).re / (omega * alone.value)
    };
    let ratios = |log: f64| levels.ladder(levels.levels.iter().map(|l| on_level(l, log)).collect());
    let at = greatest(|log| ratios(log).value, low, high, SEARCH);
    let ratio = ratios(at);
    let near = &points[best];
    let relative = near.point.resistance_change.band / near.resistance.value.abs();
    let own: Vec<f64> =
        levels.levels.iter().map(|l| greatest(|log| on_level(l, log), low, high, SEARCH).exp()).collect();
    let hertz = |omega: f64| omega / (2.0 * std::f64::consts::PI);
    let places = levels.ladder(own.iter().map(|&o| hertz(o)).collect());
    // Near the maximum the ratio is flat: an error of its slope moves the place.
    let place_band = band::one_route(&places, 0.0, 0.0) + (SEARCH + 2.0 * relative) * hertz(at.exp());
    let figure = |name: &str, unit, value, band, levels| Figure {
        name: name.to_owned(),
        value,
        unit,
        band,
        basis: Basis::Extrapolated,
        location: None,
        levels,
    };
    let ratio_band = band::one_route(&ratio, 0.0, relative * ratio.value) + alone.band / alone.value * ratio.value;
    Some([
        figure("critical_frequency", "Hz", hertz(at.exp()), place_band, places.levels),
        figure("resistance_ratio_max", "1", ratio.value, ratio_band, ratio.levels),
    ])
}

//! What the user should know of the temperatures.

use super::answer::Event;
use crate::outcome::{DutyOutcome, Thermal};
use crate::problem::{Duty, LayerHeat, Problem, Warming};

/// Change of conductivity over one event below which nothing is said of it.
const WORTH_SAYING: f64 = 5.0e-4;
/// Rise of a surface below which nothing is said of touching it, K.
const FELT_K: f64 = 1.0;
/// 0 degC, K.
const CELSIUS_ZERO_K: f64 = 273.15;

/// A temperature as people say it.
fn celsius(kelvin: f64) -> String {
    format!("{:.1} degC", kelvin - CELSIUS_ZERO_K)
}

/// Of one event.
pub(super) fn of_event(problem: &Problem, warming: &Warming, event: &Event, thermal: &Thermal) -> Vec<String> {
    conduction(problem, warming, event).into_iter().chain(conductivity(thermal)).collect()
}

/// What the run's constant conductivity leaves out.
fn conductivity(thermal: &Thermal) -> Option<String> {
    let layers = thermal.layers.iter().filter_map(|l| l.conductivity_change.map(|c| (l, c)));
    let (layer, change) = layers.min_by(|a, b| a.1.total_cmp(&b.1))?;
    if change.abs() < WORTH_SAYING {
        return None;
    }
    let mean = thermal.conductivity_change_mean.unwrap_or(0.0);
    Some(format!(
        "Conductivity is held at its starting temperature within an event. The hottest point of layer '{}' warms by {:.2} K without conduction, which would lower its conductivity by {:.2} %; weighted by where the heat falls it is {:.2} % by the end, about what the drag of a slow mover would lose (a model estimate, in no band).",
        layer.name,
        layer.rise_peak_k,
        -100.0 * change,
        -100.0 * mean
    ))
}

/// How conduction within the event compares.
fn conduction(problem: &Problem, warming: &Warming, event: &Event) -> Option<String> {
    let across = |(layer, heat): (&crate::problem::Layer, &LayerHeat)| {
        let k = heat.thermal_conductivity_w_per_m_k?;
        Some(layer.thickness_m() * layer.thickness_m() * heat.volumetric_j_per_m3_k() / k)
    };
    let layers = problem.wall.layers.iter().zip(&warming.layers);
    let slowest = layers.map(across).collect::<Option<Vec<f64>>>()?.into_iter().fold(0.0, f64::max);
    (slowest < event.duration_s).then(|| {
        format!(
            "Heat crosses the wall in about {slowest:.2e} s and the event takes {:.2e} s: temperature_rise_peak leaves conduction out and is more than the hottest point warms by; temperature_rise_section_peak has the heat evened out across the layer.",
            event.duration_s
        )
    })
}

/// Of a repeated event.
pub(super) fn of_duty(event: &Event, outcome: &DutyOutcome, duty: &Duty, left_k: f64) -> Vec<String> {
    let mut texts = Vec::new();
    let stops = outcome.stops.len();
    if duty.repeats.is_none() && !outcome.settled {
        texts.push(format!(
            "The temperatures had not settled after {stops} stops, as many as are followed; about {left_k:.2} K were still to come."
        ));
    }
    if event.duration_s > duty.period_s {
        texts.push(format!(
            "The event takes {:.3} s, longer than the period of {:.3} s: stops would overlap.",
            event.duration_s, duty.period_s
        ));
    }
    texts.push(format!(
        "Each stop's heat falls in at one instant, and its drag and heat follow one temperature of the wall (where the heat falls); were the whole wall as hot as its hottest point before the last stop, the drag would change by another {:.2} %. The mover's temperature stays as stated: warmer magnets are weaker.",
        100.0 * outcome.uniform_cost
    ));
    texts
}

/// Of temperatures, whatever led to them.
pub(super) fn of_temperatures(
    problem: &Problem,
    warming: &Warming,
    thermal: &Thermal,
    after_event: &[f64],
) -> Vec<String> {
    let greatest = |values: &[f64]| values.iter().copied().fold(f64::NEG_INFINITY, f64::max);
    let peak_of_layers = thermal.layers.iter().map(|l| thermal.start_k + l.rise_peak_k).collect::<Vec<_>>();
    let duty = thermal.duty.as_ref().map(|d| d.stops.iter().map(|s| s.temperature_peak_k).fold(0.0, f64::max));
    let mut texts = Vec::new();
    for (k, layer) in warming.layers.iter().enumerate() {
        let hottest = peak_of_layers[k].max(duty.unwrap_or(0.0));
        let name = &problem.wall.layers[k].name;
        texts.extend(limits(name, layer, hottest));
    }
    let surface = duty.unwrap_or(0.0).max(greatest(after_event));
    if surface - thermal.start_k >= FELT_K || duty.is_some() {
        texts.push(format!(
            "The wall gets as hot as {}: whether it may be touched is judged by ISO 13732-1 (contact with hot surfaces), which goes by material and time of contact; no limit is set here.",
            celsius(surface)
        ));
    }
    texts
}

/// A layer beyond what its numbers are trusted for, or melting.
fn limits(name: &str, layer: &LayerHeat, hottest_k: f64) -> Option<String> {
    let hot = celsius(hottest_k);
    if let Some(melting) = layer.melting_k.filter(|&m| hottest_k >= m) {
        return Some(format!(
            "Layer '{name}' would reach {hot}, beyond where it melts ({}): it fails.",
            celsius(melting)
        ));
    }
    (hottest_k > layer.trusted_to_k).then(|| {
        format!(
            "Layer '{name}' reaches {hot}; its temperature coefficient and specific heat are trusted up to {}.",
            celsius(layer.trusted_to_k)
        )
    })
}

//! The thermal side of an answer, put together.

use lenzbore_mesh::Refinement;

use super::cautions;
use super::decay::time_constant;
use super::deposit::deposit;
use super::duty::{Repeated, repeat};
use super::grid::ThermalPlan;
use super::operator::HeatOperator;
use crate::band::{Ladder, one_route};
use crate::extrapolate::extrapolate;
use crate::fault::SolveFault;
use crate::march::CoarseEvent;
use crate::monitor::Monitor;
use crate::outcome::{Basis, Figure, HeatLedger, LayerWarmth, TemperatureField, Thermal};
use crate::problem::{Problem, Warming};

/// Thermal grids.
pub(super) const LEVELS: usize = 3;

/// An event on all levels.
pub(crate) struct Event {
    pub(crate) levels: Vec<CoarseEvent>,
    /// How long it takes, s.
    pub(crate) duration_s: f64,
}

/// What the wall's warming adds to an answer.
pub(crate) struct Warmed {
    pub(crate) thermal: Thermal,
    pub(crate) figures: Vec<Figure>,
    pub(crate) cautions: Vec<String>,
}

/// The factors of the thermal levels.
pub(super) fn factors() -> Vec<f64> {
    Refinement::first(LEVELS).iter().map(|f| f.factor()).collect()
}

/// How warm the wall gets by `event`, whose figures so far are `known`.
///
/// # Errors
/// See [`SolveFault`].
pub(crate) fn warm(
    problem: &Problem,
    warming: &Warming,
    event: &Event,
    known: &[Figure],
    monitor: &dyn Monitor,
) -> Result<Warmed, SolveFault> {
    let operators = operators(problem, warming)?;
    let mut figures = masses(problem, warming);
    let repeated = match &warming.duty {
        Some(duty) => Some(repeat(problem, warming, *duty, (event, known), &operators, monitor)?),
        None => None,
    };
    figures.extend(cooling_figure(&operators)?);
    let (mut thermal, finest) = thermal_of_event(problem, warming, event, &operators)?;
    let mut cautions = cautions::of_event(problem, warming, event, &thermal);
    if let Some(Repeated { outcome, figures: more, cautions: told, ledger, fields }) = repeated {
        figures.extend(more);
        cautions.extend(told);
        thermal.ledger = ledger;
        thermal.fields.extend(fields);
        thermal.duty = Some(outcome);
    }
    cautions.extend(cautions::of_temperatures(problem, warming, &thermal, &finest));
    Ok(Warmed { thermal, figures, cautions })
}

fn operators(problem: &Problem, warming: &Warming) -> Result<Vec<HeatOperator>, SolveFault> {
    let plan = ThermalPlan::new(&problem.wall)?;
    let levels = Refinement::first(LEVELS).into_iter().map(|f| plan.level(f));
    levels.map(|space| HeatOperator::new(space, &warming.layers, warming.cooling)).collect()
}

/// A figure without a band.
fn exact(name: &str, unit: &'static str, value: f64) -> Figure {
    let (name, basis, location) = (name.to_owned(), Basis::ClosedForm, None);
    Figure { name, value, unit, band: 0.0, basis, location, levels: Vec::new() }
}

/// A figure extrapolated over the thermal grids, with `more` added to its band.
pub(super) fn extrapolated(name: &str, unit: &'static str, ladder: Ladder, more: f64) -> Figure {
    Figure {
        name: name.to_owned(),
        value: ladder.value,
        unit,
        band: one_route(&ladder, 0.0, 0.0) + more.abs(),
        basis: Basis::Extrapolated,
        location: None,
        levels: ladder.levels,
    }
}

fn masses(problem: &Problem, warming: &Warming) -> Vec<Figure> {
    let mass: f64 = (0..warming.layers.len()).map(|k| warming.mass_kg(&problem.wall, k)).sum();
    let capacity = warming.heat_capacity_j_per_k(&problem.wall);
    vec![exact("wall_mass", "kg", mass), exact("wall_heat_capacity", "J/K", capacity)]
}

/// The time constant of cooling, where the wall cools.
fn cooling_figure(operators: &[HeatOperator]) -> Result<Option<Figure>, SolveFault> {
    let found: Vec<Option<f64>> = operators.iter().map(time_constant).collect::<Result<_, _>>()?;
    let found: Option<Vec<f64>> = found.into_iter().collect();
    Ok(found.map(|values| extrapolated("cooling_time_constant", "s", Ladder::new(&factors(), values), 0.0)))
}

/// The thermal side of one event, and the temperatures right after it on the finest grid.
fn thermal_of_event(
    problem: &Problem,
    warming: &Warming,
    event: &Event,
    operators: &[HeatOperator],
) -> Result<(Thermal, Vec<f64>), SolveFault> {
    let (Some(finest), Some(level)) = (operators.last(), event.levels.get(operators.len() - 1)) else {
        return Err(SolveFault::Unsuited("temperatures need three grid levels"));
    };
    let heat = deposit(&level.left, finest);
    let rises: Vec<f64> = heat.iter().zip(&finest.capacity).map(|(q, c)| q / c).collect();
    let stored: f64 = rises.iter().zip(&finest.capacity).map(|(rise, c)| rise * c).sum();
    let ambient = warming.cooling.map_or(warming.start_k, |c| c.ambient_k);
    let warm: Vec<f64> = rises.iter().map(|rise| warming.start_k + rise).collect();
    let field = TemperatureField {
        moment: "after_event",
        description: "right after one event, before its heat spreads",
        temperature_k: finest.on_nodes(&warm, ambient),
    };
    let imbalance_relative = if level.heat > 0.0 { (level.heat - stored) / level.heat } else { 0.0 };
    let thermal = Thermal {
        start_k: warming.start_k,
        layers: layers(problem, warming, event),
        conductivity_change_mean: conductivity_change_mean(warming, level),
        ledger: HeatLedger { heat: level.heat, stored, lost: 0.0, imbalance_relative },
        r_m: finest.space.grid.r.nodes().to_vec(),
        z_m: finest.space.grid.z.nodes().to_vec(),
        fields: vec![field],
        duty: None,
    };
    Ok((thermal, warm))
}

/// Heat, mass and rises of each layer, extrapolated over the levels of the event.
fn layers(problem: &Problem, warming: &Warming, event: &Event) -> Vec<LayerWarmth> {
    let factors: Vec<f64> = Refinement::first(event.levels.len()).iter().map(|f| f.factor()).collect();
    let count = warming.layers.len();
    let by_level: Vec<Vec<f64>> = event.levels.iter().map(|l| l.left.by_layer(count)).collect();
    let of = |k: usize| {
        let layer = &warming.layers[k];
        let mass_kg = warming.mass_kg(&problem.wall, k);
        let heat_capacity_j_per_k = mass_kg * layer.specific_heat_j_per_kg_k;
        let heat_joule = extrapolate(&factors, &by_level.iter().map(|h| h[k]).collect::<Vec<_>>());
        let peaks: Vec<f64> = event.levels.iter().map(|l| l.left.hottest_in(k, layer).value).collect();
        let rise_peak_k = extrapolate(&factors, &peaks);
        LayerWarmth {
            name: problem.wall.layers[k].name.clone(),
            mass_kg,
            heat_capacity_j_per_k,
            heat_joule,
            rise_mean_k: heat_joule / heat_capacity_j_per_k,
            rise_peak_k,
            conductivity_change: layer.resistivity_coefficient_per_k.map(|a| 1.0 / (1.0 + a * rise_peak_k) - 1.0),
        }
    };
    (0..count).map(of).collect()
}

/// Change of conductivity over one event, weighted by where its heat falls: coefficient times the local rise, J by J.
fn conductivity_change_mean(warming: &Warming, level: &CoarseEvent) -> Option<f64> {
    let (mut sum, mut known) = (0.0, 0.0);
    level.left.quarters(|q| {
        let layer = &warming.layers[q.layer];
        if let Some(a) = layer.resistivity_coefficient_per_k {
            sum += q.heat * (1.0 / (1.0 + a * q.heat / (q.volume() * layer.volumetric_j_per_m3_k())) - 1.0);
            known += q.heat;
        }
    });
    (known > 0.0).then(|| sum / known)
}

//! How warm the wall gets: the columns of `duty.csv`, and its place in `summary.json`.

use std::borrow::Cow;

use lenzbore_solver::outcome::{DutyOutcome, DutyStop, LayerWarmth, Thermal};
use serde_json::{Value, json};

use super::fault::IoFault;
use super::finite::number;
use super::series::{Column, column, vetted};

/// A repeated event stop by stop.
///
/// # Errors
/// [`IoFault::NotFinite`].
pub fn duty_columns(duty: &DutyOutcome) -> Result<Vec<Column<'_>>, IoFault> {
    let of = |pick: fn(&DutyStop) -> f64| Cow::Owned(duty.stops.iter().map(pick).collect::<Vec<_>>());
    let mut columns = vec![
        column("stop", "1", "number of the stop, from 1", of(|s| s.number)),
        column("time_s", "s", "when it begins", of(|s| s.time_s)),
        column("energy_J", "J", "heat that it leaves in the wall", of(|s| s.energy_joule)),
        column("drag_peak_N", "N", "its greatest drag", of(|s| s.drag_peak_newton)),
        column(
            "temperature_before_K",
            "K",
            "temperature of the wall before it, weighted by where its heat falls: what its drag and heat follow",
            of(|s| s.temperature_before_k),
        ),
        column("temperature_mean_K", "K", "mean temperature of the wall right after it", of(|s| s.temperature_mean_k)),
        column("temperature_peak_K", "K", "hottest point of the wall right after it", of(|s| s.temperature_peak_k)),
        column(
            "surface_outside_K",
            "K",
            "hottest point of the outside from its event to the next",
            of(|s| s.surface_outside_k),
        ),
    ];
    if duty.has_bore {
        let about = "hottest point of the bore's surface from its event to the next";
        columns.push(column("surface_bore_K", "K", about, of(|s| s.surface_bore_k)));
    }
    vetted(columns)
}

/// The entry of `summary.json`.
///
/// # Errors
/// [`IoFault::NotFinite`].
pub(super) fn thermal_object(thermal: &Thermal) -> Result<Value, IoFault> {
    let change = thermal.conductivity_change_mean;
    let ledger = &thermal.ledger;
    Ok(json!({
        "temperature_start_K": number("the wall's temperature at the start", thermal.start_k)?,
        "layers": thermal.layers.iter().map(layer).collect::<Result<Vec<_>, _>>()?,
        "conductivity_change_mean": change.map(|c| number("the change of conductivity", c)).transpose()?,
        "heat_ledger": {
            "unit": "J",
            "heat": number("the heat left in the wall", ledger.heat)?,
            "stored": number("the heat stored", ledger.stored)?,
            "lost": number("the heat given off", ledger.lost)?,
            "imbalance_relative": number("the heat ledger's imbalance", ledger.imbalance_relative)?,
        },
        "duty": thermal.duty.as_ref().map(duty).transpose()?,
    }))
}

fn layer(layer: &LayerWarmth) -> Result<Value, IoFault> {
    let change = layer.conductivity_change;
    Ok(json!({
        "layer": layer.name,
        "mass_kg": number("a layer's mass", layer.mass_kg)?,
        "heat_capacity_J_per_K": number("a layer's heat capacity", layer.heat_capacity_j_per_k)?,
        "heat_J": number("a layer's heat", layer.heat_joule)?,
        "rise_mean_K": number("a layer's mean rise", layer.rise_mean_k)?,
        "rise_peak_K": number("a layer's peak rise", layer.rise_peak_k)?,
        "conductivity_change": change.map(|c| number("a layer's change of conductivity", c)).transpose()?,
    }))
}

fn duty(duty: &DutyOutcome) -> Result<Value, IoFault> {
    let solved = |[kelvin, heat, drag]: &[f64; 3]| {
        Ok::<_, IoFault>(json!({
            "temperature_K": number("a temperature of the event", *kelvin)?,
            "heat_J": number("its heat", *heat)?,
            "drag_peak_N": number("its greatest drag", *drag)?,
        }))
    };
    Ok(json!({
        "stops": duty.stops.len(),
        "settled": duty.settled,
        "solved_at": duty.solved_at.iter().map(solved).collect::<Result<Vec<_>, _>>()?,
        "uniform_temperature_cost": number("the cost of a uniform temperature", duty.uniform_cost)?,
    }))
}

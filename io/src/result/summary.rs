//! `summary.json`: the whole outcome but its fields and its long series, as one object. `--json` prints the same.

use lenzbore_solver::outcome::{
    Accuracies, DragCurve, Figure, Forces, GridReport, Ledger, Location, Outcome, Regime, SlottedDrag, WorkCounters,
};
use lenzbore_solver::spread::{FigureSpread, Spread};
use serde_json::{Map, Value, json};

use super::fault::IoFault;
use super::finite::number;
use super::frequency::frequency_object;
use super::header::ResultHeader;
use super::series::curve_columns;
use super::spread::{input_spread, spread_object};
use super::stations::stations_object;
use super::strokes::strokes_object;
use super::sweeps::{positions_object, stroke_curve_object, temperatures_object};
use super::thermal::thermal_object;

/// The summary of a run.
///
/// Every number is in the SI unit that its name or its `unit` says. `regime.depth_ratio` and `cells_across_depth` are
/// `null` at rest, where no depth limits the field.
///
/// # Errors
/// [`IoFault::NotFinite`] where any number is NaN or infinite.
pub fn summary(header: &ResultHeader, outcome: &Outcome) -> Result<Value, IoFault> {
    let mut top = Map::new();
    let mut put = |name: &str, value: Value| top.insert(name.to_owned(), value);
    put("title", json!(header.title));
    put("program", json!({"name": header.program.name, "version": header.program.version}));
    put("record", Value::Object(header.record.clone()));
    put("command", json!(header.command));
    put("digest", json!(header.digest));
    put("figures", figures(&outcome.figures, header.spread.as_ref())?);
    if let Some(spread) = &header.spread {
        put("spread", spread_object(spread)?);
    }
    put("forces", optional(outcome.forces.as_ref(), forces)?);
    put("ledger", optional(outcome.ledger.as_ref(), ledger)?);
    put("regime", regime(&outcome.regime)?);
    put("independent", header.independent.clone().unwrap_or(Value::Null));
    put("accuracy", accuracy(&outcome.accuracy)?);
    put("grids", outcome.grids.iter().map(grid).collect::<Result<Vec<_>, _>>()?.into());
    put("work", work(&outcome.counters));
    put("stop", json!(outcome.stop.word()));
    if let Some(drag) = &outcome.curve {
        put("curve", curve(drag, outcome.slotted.as_ref())?);
    }
    if let Some(response) = &outcome.frequency {
        put("frequency", frequency_object(response)?);
    }
    if let Some(response) = &outcome.strokes {
        put("strokes", strokes_object(response)?);
    }
    if !outcome.stations.is_empty() {
        put("stations", stations_object(&outcome.stations)?);
    }
    let sweeps = &outcome.sweeps;
    if !sweeps.temperatures.is_empty() {
        put("temperatures", temperatures_object(&sweeps.temperatures)?);
    }
    if !sweeps.positions.is_empty() {
        put("positions", positions_object(&sweeps.positions)?);
    }
    if !sweeps.strokes.is_empty() {
        put("stroke_curve", stroke_curve_object(&sweeps.strokes)?);
    }
    if let Some(thermal) = &outcome.thermal {
        put("thermal", thermal_object(thermal)?);
    }
    let of_the_run = outcome.cautions.iter().map(|c| c.text.clone());
    put("cautions", header.cautions.iter().cloned().chain(of_the_run).collect::<Vec<_>>().into());
    put("not_modelled", header.not_modelled.clone().into());
    put("geometry", json!(header.geometry));
    put("resolved", header.resolved.clone());
    put("case", header.case.clone());
    Ok(Value::Object(top))
}

/// The summary as the text of the file: two blanks a level, one line feed at the end.
///
/// # Errors
/// As [`summary`].
pub fn summary_text(header: &ResultHeader, outcome: &Outcome) -> Result<String, IoFault> {
    Ok(format!("{:#}\n", summary(header, outcome)?))
}

fn optional<T>(part: Option<&T>, write: impl Fn(&T) -> Result<Value, IoFault>) -> Result<Value, IoFault> {
    part.map_or(Ok(Value::Null), write)
}

fn figures(figures: &[Figure], spread: Option<&Spread>) -> Result<Value, IoFault> {
    let mut all = Map::new();
    for figure in figures {
        let of_inputs = spread.and_then(|s| s.figure(&figure.name));
        all.insert(figure.name.clone(), self::figure(figure, of_inputs)?);
    }
    Ok(Value::Object(all))
}

fn figure(figure: &Figure, spread: Option<&FigureSpread>) -> Result<Value, IoFault> {
    let name = &figure.name;
    let mut entry = Map::new();
    entry.insert("value".into(), number(name, figure.value)?);
    entry.insert("unit".into(), json!(figure.unit));
    entry.insert("band".into(), number(&format!("the band of {name}"), figure.band)?);
    if let Some(spread) = spread {
        entry.insert("input_spread".into(), input_spread(spread)?);
    }
    entry.insert("basis".into(), json!(figure.basis.word()));
    if let Some(location) = &figure.location {
        entry.insert("where".into(), place(name, location)?);
    }
    let level = |value: &f64| number(&format!("a grid level's {name}"), *value);
    entry.insert("levels".into(), figure.levels.iter().map(level).collect::<Result<Vec<_>, _>>()?.into());
    Ok(Value::Object(entry))
}

fn place(name: &str, location: &Location) -> Result<Value, IoFault> {
    let mut entry = Map::new();
    for (key, value) in [("r_m", location.r_m), ("z_m", location.z_m), ("t_s", location.t_s)] {
        if let Some(value) = value {
            entry.insert(key.into(), number(&format!("{key} of {name}"), value)?);
        }
    }
    Ok(Value::Object(entry))
}

fn forces(forces: &Forces) -> Result<Value, IoFault> {
    Ok(json!({
        "wall_N": number("the force on the wall", forces.wall_newton)?,
        "mover_N": number("the force on the mover", forces.mover_newton)?,
        "stress_N": number("the force by Maxwell stress", forces.stress_newton)?,
        "band_N": number("the band of the three forces", forces.band_newton)?,
        "agree": forces.agree,
        "time_s": number("the time of the three forces", forces.time_s)?,
    }))
}

fn ledger(ledger: &Ledger) -> Result<Value, IoFault> {
    Ok(json!({
        "unit": ledger.unit,
        "work": number("the ledger's work", ledger.work)?,
        "heat": number("the ledger's heat", ledger.heat)?,
        "field_energy": number("the ledger's field energy", ledger.field_energy)?,
        "imbalance_relative": number("the ledger's imbalance", ledger.imbalance_relative)?,
    }))
}

fn regime(regime: &Regime) -> Result<Value, IoFault> {
    Ok(json!({
        "thickness_ratio": number("thickness ratio", regime.thickness_ratio)?,
        "gap_ratio": number("gap ratio", regime.gap_ratio)?,
        "magnetic_reynolds": number("magnetic Reynolds number", regime.magnetic_reynolds)?,
        "depth_ratio": optional(regime.depth_ratio.as_ref(), |d| number("depth ratio", *d))?,
        "speed_m_per_s": number("the regime's speed", regime.speed_m_per_s)?,
    }))
}

fn grid(grid: &GridReport) -> Result<Value, IoFault> {
    Ok(json!({
        "refinement": number("refinement", grid.refinement)?,
        "nodes_r": grid.nodes_r,
        "nodes_z": grid.nodes_z,
        "cells_across_wall": grid.cells_across_wall,
        "cells_across_depth": optional(grid.cells_across_depth.as_ref(), |c| number("cells across the depth", *c))?,
        "growth": number("growth", grid.growth)?,
        "aspect": number("aspect", grid.aspect)?,
        "steps": grid.steps,
        "residual": number("residual", grid.residual)?,
    }))
}

fn accuracy(accuracy: &Accuracies) -> Result<Value, IoFault> {
    let worst = match &accuracy.worst {
        None => Value::Null,
        Some((name, band)) => json!({
            "figure": name,
            "band_relative": number(&format!("the relative band of {name}"), *band)?,
        }),
    };
    Ok(json!({
        "target_relative": number("the wanted accuracy", accuracy.target_relative)?,
        "met": accuracy.met,
        "worst": worst,
        "advice": accuracy.advice,
    }))
}

fn work(counters: &WorkCounters) -> Value {
    json!({
        "factorisations": counters.factorisations,
        "solves": counters.solves,
        "steps": counters.steps,
        "recurrence": counters.recurrence,
    })
}

/// One object a speed, keys as the columns of `curve.csv`.
fn curve(curve: &DragCurve, slotted: Option<&SlottedDrag>) -> Result<Value, IoFault> {
    let columns = curve_columns(curve, slotted)?;
    let point = |row: usize| -> Result<Value, IoFault> {
        let entries = columns.iter().map(|c| Ok((c.name.to_owned(), number(c.name, c.values[row])?)));
        Ok(Value::Object(entries.collect::<Result<Map<_, _>, IoFault>>()?))
    };
    Ok((0..curve.points.len()).map(point).collect::<Result<Vec<_>, _>>()?.into())
}

#[cfg(test)]
#[path = "summary_tests.rs"]
mod tests;

//! Coils at rest over frequency: the columns of `frequency.csv` and `across.csv`, and their place in `summary.json`.

use std::borrow::Cow;

use lenzbore_solver::outcome::{CurrentSample, FrequencyPoint, FrequencyResponse, Measured};
use serde_json::{Map, Value, json};

use super::fault::IoFault;
use super::finite::number;
use super::series::{Column, column, vetted};

/// Impedance, shielding and depths, a row a frequency; `current_depth_m` only where every frequency has one.
///
/// # Errors
/// [`IoFault::NotFinite`].
pub fn frequency_columns(response: &FrequencyResponse) -> Result<Vec<Column<'_>>, IoFault> {
    let points = &response.points;
    let of = |pick: fn(&FrequencyPoint) -> f64| Cow::Owned(points.iter().map(pick).collect::<Vec<_>>());
    let mut columns = vec![
        column("frequency_Hz", "Hz", "frequency", of(|p| p.frequency_hz)),
        column(
            "resistance_ohm",
            "ohm",
            "resistance: the winding's own and what the wall adds",
            of(|p| p.resistance_ohm),
        ),
        column("reactance_ohm", "ohm", "reactance", of(|p| p.reactance_ohm)),
        column("inductance_H", "H", "reactance / (2 pi frequency)", of(|p| p.inductance_henry)),
        column(
            "resistance_change_ohm",
            "ohm",
            "what the wall adds to the resistance",
            of(|p| p.resistance_change.value),
        ),
        column(
            "resistance_change_band_ohm",
            "ohm",
            "half-width of the resistance change's numerical band",
            of(|p| p.resistance_change.band),
        ),
        column("reactance_change_ohm", "ohm", "what the wall adds to the reactance", of(|p| p.reactance_change.value)),
        column(
            "reactance_change_band_ohm",
            "ohm",
            "half-width of the reactance change's numerical band",
            of(|p| p.reactance_change.band),
        ),
        column(
            "resistance_change_by_heat_ohm",
            "ohm",
            "the resistance change from the wall's heat",
            of(|p| p.resistance_by_heat_ohm),
        ),
    ];
    let all = |pick: fn(&FrequencyPoint) -> Option<f64>| points.iter().map(pick).collect::<Option<Vec<f64>>>();
    for (name, unit, description, values) in [
        (
            "shielding_factor",
            "1",
            "field with the wall over field without it",
            all(|p| p.shielding.map(|s| s.magnitude())),
        ),
        ("shielding_band", "1", "half-width of the shielding factor's band", all(|p| p.shielding.map(|s| s.band))),
        (
            "shielding_phase_deg",
            "deg",
            "phase of the field with the wall",
            all(|p| p.shielding.map(|s| s.phase_rad().to_degrees())),
        ),
        ("skin_depth_m", "m", "sqrt(2 / (omega mu sigma)) of the layer that faces the coils", all(|p| p.skin_depth_m)),
        (
            "current_depth_m",
            "m",
            "depth at which the current density is 1/e of that at the face",
            all(|p| p.current_depth.map(|d| d.value)),
        ),
    ] {
        columns.extend(values.map(|v| column(name, unit, description, Cow::Owned(v))));
    }
    vetted(columns)
}

/// Current density across the wall, a row a radius of each frequency.
///
/// # Errors
/// [`IoFault::NotFinite`].
pub fn across_columns(response: &FrequencyResponse) -> Result<Vec<Column<'_>>, IoFault> {
    let rows = || response.points.iter().flat_map(|p| p.across.iter().map(move |s| (p.frequency_hz, s)));
    let of = |pick: fn(&CurrentSample) -> f64| Cow::Owned(rows().map(|(_, s)| pick(s)).collect::<Vec<_>>());
    vetted(vec![
        column("frequency_Hz", "Hz", "frequency", Cow::Owned(rows().map(|(f, _)| f).collect())),
        column("layer", "1", "number of the layer, from 1 in the order of the case", of(layer_number)),
        column("r_m", "m", "radius", of(|s| s.r_m)),
        column("current_density_A_per_m2", "A/m2", "magnitude, zero to peak", of(CurrentSample::magnitude)),
        column("phase_deg", "deg", "phase ahead of the coils' current", of(|s| s.phase_rad().to_degrees())),
        column("real_A_per_m2", "A/m2", "in phase with the coils' current", of(|s| s.real)),
        column("imaginary_A_per_m2", "A/m2", "a quarter period ahead of it", of(|s| s.imaginary)),
        column("band_A_per_m2", "A/m2", "half-width of the magnitude's numerical band", of(|s| s.band)),
    ])
}

fn layer_number(sample: &CurrentSample) -> f64 {
    u32::try_from(sample.layer + 1).map_or(f64::MAX, f64::from)
}

/// The response but for the current density across the wall, which is long.
///
/// # Errors
/// [`IoFault::NotFinite`].
pub(super) fn frequency_object(response: &FrequencyResponse) -> Result<Value, IoFault> {
    let points = response.points.iter().map(point).collect::<Result<Vec<_>, _>>()?;
    Ok(json!({
        "convention": "exp(+i omega t), amplitudes zero to peak",
        "current_A": number("the coils' current", response.current_ampere)?,
        "winding_resistance_ohm": number("the winding's resistance", response.winding_resistance_ohm)?,
        "inductance_alone_H": measured("inductance_alone", response.inductance_alone)?,
        "across_at_z_m": number("the height of the line across the wall", response.height_m)?,
        "shielding_at": {
            "r_m": number("the radius of the shielding", response.shielding_at_m.0)?,
            "z_m": number("the height of the shielding", response.shielding_at_m.1)?,
        },
        "facing_layer": response.layer_names.get(response.facing_layer),
        "points": points,
    }))
}

fn measured(name: &str, of: Measured) -> Result<Value, IoFault> {
    Ok(json!({"value": number(name, of.value)?, "band": number(&format!("the band of {name}"), of.band)?}))
}

fn point(p: &FrequencyPoint) -> Result<Value, IoFault> {
    let mut entry = Map::new();
    let mut put = |name: &str, value: Value| entry.insert(name.to_owned(), value);
    put("frequency_Hz", number("frequency", p.frequency_hz)?);
    put("resistance_ohm", number("resistance", p.resistance_ohm)?);
    put("reactance_ohm", number("reactance", p.reactance_ohm)?);
    put("inductance_H", number("inductance", p.inductance_henry)?);
    put("resistance_change_ohm", measured("resistance_change", p.resistance_change)?);
    put("reactance_change_ohm", measured("reactance_change", p.reactance_change)?);
    put("resistance_change_by_heat_ohm", number("the resistance change by heat", p.resistance_by_heat_ohm)?);
    let shielding = match p.shielding {
        None => Value::Null,
        Some(s) => json!({
            "factor": number("shielding_factor", s.magnitude())?,
            "band": number("the band of shielding_factor", s.band)?,
            "phase_deg": number("the phase of the shielding", s.phase_rad().to_degrees())?,
        }),
    };
    put("shielding", shielding);
    put("skin_depth_m", p.skin_depth_m.map_or(Ok(Value::Null), |d| number("skin_depth", d))?);
    put("current_depth_m", p.current_depth.map_or(Ok(Value::Null), |d| measured("current_depth", d))?);
    Ok(Value::Object(entry))
}

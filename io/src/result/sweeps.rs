//! What a curve sweeps beside speed: the columns of its tables, and its places in `summary.json`.

use std::borrow::Cow;

use lenzbore_solver::outcome::{AtPosition, AtStroke, AtTemperature, DragPoint, Figure};
use serde_json::{Map, Value, json};

use super::fault::IoFault;
use super::finite::number;
use super::series::{Column, column, vetted};

/// Figures of a curve with the columns that they make: name, unit, column, what it is, column of the band.
const FIGURES: [(&str, &str, &str, &str, &str); 4] = [
    (
        "damping_coefficient_zero_speed",
        "N s/m",
        "damping_coefficient_zero_speed_N_s_per_m",
        "drag over speed as the speed vanishes",
        "damping_coefficient_zero_speed_band_N_s_per_m",
    ),
    ("critical_speed", "m/s", "critical_speed_m_per_s", "speed of the greatest drag", "critical_speed_band_m_per_s"),
    ("drag_max", "N", "drag_max_N", "greatest drag", "drag_max_band_N"),
    ("lag_time", "s", "lag_time_s", "lag of the drag at low speed", "lag_time_band_s"),
];

/// The figures of the curve at each temperature; a figure that one temperature lacks is left out.
///
/// # Errors
/// [`IoFault::NotFinite`].
pub fn temperature_columns(all: &[AtTemperature]) -> Result<Vec<Column<'_>>, IoFault> {
    let kelvin = all.iter().map(|t| t.temperature_k).collect::<Vec<_>>();
    let mut columns = vec![column("temperature_K", "K", "temperature of wall and mover", Cow::Owned(kelvin))];
    for (name, unit, own, description, band) in FIGURES {
        let figures: Option<Vec<&Figure>> = all.iter().map(|t| t.figure(name)).collect();
        let Some(figures) = figures else { continue };
        let of = |pick: fn(&Figure) -> f64| Cow::Owned(figures.iter().map(|f| pick(f)).collect::<Vec<_>>());
        columns.push(column(own, unit, description, of(|f| f.value)));
        columns.push(column(band, unit, "half-width of its numerical band", of(|f| f.band)));
    }
    vetted(columns)
}

/// Drag at every speed and temperature, a row a pair.
///
/// # Errors
/// [`IoFault::NotFinite`].
pub fn temperature_curve_columns(all: &[AtTemperature]) -> Result<Vec<Column<'_>>, IoFault> {
    let rows: Vec<(f64, DragPoint)> = all.iter().flat_map(|t| t.points.iter().map(|p| (t.temperature_k, *p))).collect();
    let of = |pick: fn(&(f64, DragPoint)) -> f64| Cow::Owned(rows.iter().map(pick).collect::<Vec<_>>());
    vetted(vec![
        column("temperature_K", "K", "temperature of wall and mover", of(|r| r.0)),
        column("speed_m_per_s", "m/s", "speed, a magnitude", of(|r| r.1.speed_m_per_s)),
        column("drag_N", "N", "drag with settled fields", of(|r| r.1.drag_newton)),
        column("drag_band_N", "N", "half-width of the drag's numerical band", of(|r| r.1.band_newton)),
        column("heat_W", "W", "heat in the wall, by its own route", of(|r| r.1.heat_watt)),
    ])
}

/// The zero-speed damping coefficient at each position.
///
/// # Errors
/// [`IoFault::NotFinite`].
pub fn position_columns(all: &[AtPosition]) -> Result<Vec<Column<'_>>, IoFault> {
    let of = |pick: fn(&AtPosition) -> f64| Cow::Owned(all.iter().map(pick).collect::<Vec<_>>());
    vetted(vec![
        column("position_m", "m", "position of the mover's reference point", of(|p| p.position_m)),
        column(
            "damping_coefficient_zero_speed_N_s_per_m",
            "N s/m",
            "drag over speed as the speed vanishes",
            of(|p| p.damping),
        ),
        column(
            "damping_coefficient_zero_speed_band_N_s_per_m",
            "N s/m",
            "half-width of its numerical band",
            of(|p| p.damping_band),
        ),
    ])
}

/// Settled strokes, a row a pair of frequency and amplitude.
///
/// # Errors
/// [`IoFault::NotFinite`].
pub fn stroke_curve_columns(all: &[AtStroke]) -> Result<Vec<Column<'_>>, IoFault> {
    let of = |pick: fn(&AtStroke) -> f64| Cow::Owned(all.iter().map(pick).collect::<Vec<_>>());
    const BAND: &str = "half-width of its numerical band";
    vetted(vec![
        column("frequency_Hz", "Hz", "frequency", of(|s| s.frequency_hz)),
        column("amplitude_m", "m", "amplitude, zero to peak", of(|s| s.amplitude_m)),
        column(
            "damping_coefficient_equivalent_N_s_per_m",
            "N s/m",
            "equivalent damping coefficient, loss / (pi omega X^2)",
            of(|s| s.damping),
        ),
        column("damping_coefficient_equivalent_band_N_s_per_m", "N s/m", BAND, of(|s| s.damping_band)),
        column("stiffness_N_per_m", "N/m", "in-phase stiffness", of(|s| s.stiffness)),
        column("stiffness_band_N_per_m", "N/m", BAND, of(|s| s.stiffness_band)),
        column("loss_per_cycle_J", "J", "loss in a cycle", of(|s| s.loss)),
        column("loss_per_cycle_band_J", "J", BAND, of(|s| s.loss_band)),
        column("drag_peak_N", "N", "greatest drag in the cycle", of(|s| s.drag_peak)),
        column("drag_peak_band_N", "N", BAND, of(|s| s.drag_peak_band)),
    ])
}

fn banded(name: &str, value: f64, band: f64) -> Result<Value, IoFault> {
    Ok(json!({"value": number(name, value)?, "band": number(&format!("the band of {name}"), band)?}))
}

/// An entry a temperature.
///
/// # Errors
/// [`IoFault::NotFinite`].
pub(super) fn temperatures_object(all: &[AtTemperature]) -> Result<Value, IoFault> {
    let entry = |at: &AtTemperature| {
        let mut figures = Map::new();
        for f in &at.figures {
            let mut entry = banded(&f.name, f.value, f.band)?;
            entry["unit"] = json!(f.unit);
            figures.insert(f.name.clone(), entry);
        }
        let sigma = at.conductivities_s_per_m.iter().map(|s| number("a layer's conductivity", *s));
        Ok(json!({
            "temperature_K": number("a temperature", at.temperature_k)?,
            "conductivity_S_per_m": sigma.collect::<Result<Vec<_>, IoFault>>()?,
            "figures": figures,
        }))
    };
    Ok(all.iter().map(entry).collect::<Result<Vec<_>, IoFault>>()?.into())
}

/// An entry a position.
///
/// # Errors
/// [`IoFault::NotFinite`].
pub(super) fn positions_object(all: &[AtPosition]) -> Result<Value, IoFault> {
    let entry = |at: &AtPosition| {
        Ok(json!({
            "position_m": number("a position", at.position_m)?,
            "damping_coefficient_zero_speed_N_s_per_m": banded("a damping coefficient", at.damping, at.damping_band)?,
        }))
    };
    Ok(all.iter().map(entry).collect::<Result<Vec<_>, IoFault>>()?.into())
}

/// An entry a stroke.
///
/// # Errors
/// [`IoFault::NotFinite`].
pub(super) fn stroke_curve_object(all: &[AtStroke]) -> Result<Value, IoFault> {
    let entry = |at: &AtStroke| {
        Ok(json!({
            "frequency_Hz": number("a frequency", at.frequency_hz)?,
            "amplitude_m": number("an amplitude", at.amplitude_m)?,
            "damping_coefficient_equivalent_N_s_per_m": banded("a damping coefficient", at.damping, at.damping_band)?,
            "stiffness_N_per_m": banded("a stiffness", at.stiffness, at.stiffness_band)?,
            "loss_per_cycle_J": banded("a loss", at.loss, at.loss_band)?,
            "drag_peak_N": banded("a drag", at.drag_peak, at.drag_peak_band)?,
        }))
    };
    Ok(all.iter().map(entry).collect::<Result<Vec<_>, IoFault>>()?.into())
}

//! Small strokes over frequency: the columns of `strokes.csv`, and their place in `summary.json`.

use std::borrow::Cow;

use lenzbore_solver::outcome::{LumpedModel, SmallStroke, StrokeResponse};
use serde_json::{Value, json};

use super::fault::IoFault;
use super::finite::number;
use super::series::{Column, column, vetted};

/// Damping coefficient and stiffness of small strokes with their bands, a row a frequency.
///
/// # Errors
/// [`IoFault::NotFinite`].
pub fn stroke_columns(response: &StrokeResponse) -> Result<Vec<Column<'_>>, IoFault> {
    let of = |pick: fn(&SmallStroke) -> f64| Cow::Owned(response.points.iter().map(pick).collect::<Vec<_>>());
    vetted(vec![
        column("frequency_Hz", "Hz", "frequency", of(|p| p.frequency_hz)),
        column(
            "damping_coefficient_N_s_per_m",
            "N s/m",
            "damping coefficient at vanishing amplitude",
            of(|p| p.damping),
        ),
        column(
            "damping_coefficient_band_N_s_per_m",
            "N s/m",
            "half-width of the damping coefficient's numerical band",
            of(|p| p.damping_band),
        ),
        column("stiffness_N_per_m", "N/m", "in-phase stiffness at vanishing amplitude", of(|p| p.stiffness)),
        column(
            "stiffness_band_N_per_m",
            "N/m",
            "half-width of the stiffness's numerical band",
            of(|p| p.stiffness_band),
        ),
    ])
}

/// The entry of `summary.json`: points and lumped models.
///
/// # Errors
/// [`IoFault::NotFinite`].
pub(super) fn strokes_object(response: &StrokeResponse) -> Result<Value, IoFault> {
    let points = response.points.iter().map(point).collect::<Result<Vec<_>, _>>()?;
    let models = response.lumped.iter().map(model).collect::<Result<Vec<_>, _>>()?;
    Ok(json!({
        "amplitude": "vanishing",
        "points": points,
        "lumped": {"law": "tau dF/dt + F = -c v, forces of the terms added", "models": models},
    }))
}

fn point(p: &SmallStroke) -> Result<Value, IoFault> {
    let banded = |name: &str, value: f64, band: f64| {
        Ok::<_, IoFault>(json!({"value": number(name, value)?, "band": number(&format!("the band of {name}"), band)?}))
    };
    Ok(json!({
        "frequency_Hz": number("frequency", p.frequency_hz)?,
        "damping_coefficient_N_s_per_m": banded("damping_coefficient", p.damping, p.damping_band)?,
        "stiffness_N_per_m": banded("stiffness", p.stiffness, p.stiffness_band)?,
    }))
}

fn model(model: &LumpedModel) -> Result<Value, IoFault> {
    let terms = model.terms.iter().map(|t| {
        Ok::<_, IoFault>(json!({
            "damping_coefficient_N_s_per_m": number("a term's damping coefficient", t.damping_n_s_per_m)?,
            "lag_time_s": number("a term's lag time", t.lag_s)?,
        }))
    });
    Ok(json!({
        "terms": terms.collect::<Result<Vec<_>, _>>()?,
        "damping_coefficient_zero_speed_N_s_per_m": number("a model's damping coefficient", model.damping_at_rest())?,
        "lag_time_s": number("a model's lag time", model.lag())?,
        "largest_error_relative": number("a model's largest error", model.largest_error)?,
    }))
}

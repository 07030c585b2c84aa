//! The columns of `trace.csv` and `curve.csv`, which `run.h5` holds under the same names.

use std::borrow::Cow;

use lenzbore_solver::outcome::{DragCurve, DragPoint, SlottedDrag, SlottedPoint, Trace};

use super::fault::IoFault;
use super::finite::all_finite;

/// One column of a table.
#[derive(Debug, Clone, PartialEq)]
pub struct Column<'a> {
    /// Name with the unit, as in the header line.
    pub name: &'static str,
    /// SI unit.
    pub unit: &'static str,
    /// What it is.
    pub description: &'static str,
    /// The values.
    pub values: Cow<'a, [f64]>,
}

/// The columns of a run's series; none for settled fields.
///
/// # Errors
/// [`IoFault::Length`] where columns differ in length, [`IoFault::NotFinite`].
pub fn trace_columns(trace: &Trace) -> Result<Vec<Column<'_>>, IoFault> {
    let speed = trace.velocity_m_per_s.iter().map(|v| v.abs()).collect::<Vec<_>>();
    let columns = vec![
        column("time_s", "s", "time from the start", Cow::Borrowed(&trace.time_s)),
        column("position_m", "m", "position of the mover's reference point", Cow::Borrowed(&trace.position_m)),
        column("speed_m_per_s", "m/s", "speed, a magnitude", Cow::Owned(speed)),
        column("drag_N", "N", "drag, positive when it opposes the motion", Cow::Borrowed(&trace.drag_newton)),
        column("drag_band_N", "N", "half-width of the drag's numerical band", Cow::Borrowed(&trace.drag_band_newton)),
        column("velocity_m_per_s", "m/s", "velocity, upward positive", Cow::Borrowed(&trace.velocity_m_per_s)),
        column("heat_W", "W", "heat rate in the wall", Cow::Borrowed(&trace.heat_watt)),
    ];
    vetted(columns)
}

/// The columns of a drag-speed curve; with slots also what they leave of it.
///
/// # Errors
/// [`IoFault::NotFinite`].
pub fn curve_columns<'a>(curve: &'a DragCurve, slotted: Option<&'a SlottedDrag>) -> Result<Vec<Column<'a>>, IoFault> {
    let of = |pick: fn(&DragPoint) -> f64| Cow::Owned(curve.points.iter().map(pick).collect::<Vec<_>>());
    let mut columns = vec![
        column("speed_m_per_s", "m/s", "speed, a magnitude", of(|p| p.speed_m_per_s)),
        column("drag_N", "N", "drag with settled fields", of(|p| p.drag_newton)),
        column("drag_band_N", "N", "half-width of the drag's numerical band", of(|p| p.band_newton)),
        column("heat_W", "W", "heat in the wall, by its own route", of(|p| p.heat_watt)),
        column("current_density_peak_A_per_m2", "A/m2", "peak current density", of(|p| p.current_density_peak)),
        column(
            "current_density_peak_band_A_per_m2",
            "A/m2",
            "half-width of the peak current density's numerical band",
            of(|p| p.current_density_band),
        ),
    ];
    columns.extend(slotted.into_iter().flat_map(slotted_columns));
    vetted(columns)
}

fn slotted_columns(slotted: &SlottedDrag) -> [Column<'_>; 4] {
    let of = |pick: fn(&SlottedPoint) -> f64| Cow::Owned(slotted.points.iter().map(pick).collect::<Vec<_>>());
    [
        column("slot_factor", "1", "share of the drag that the slots leave, an approximation", of(|p| p.share.value)),
        column("slot_factor_band", "1", "half-width of the share's model band", of(|p| p.share.band)),
        column("drag_slotted_N", "N", "drag with slots, an approximation", of(|p| p.drag_newton)),
        column("drag_slotted_band_N", "N", "half-width of its band, numerical and model", of(|p| p.band_newton)),
    ]
}

/// The table as text: a header line, then shortest decimals that read back to the same numbers.
#[must_use]
pub fn csv(columns: &[Column<'_>]) -> String {
    let mut text = columns.iter().map(|c| c.name).collect::<Vec<_>>().join(",");
    text.push('\n');
    let rows = columns.iter().map(|c| c.values.len()).min().unwrap_or(0);
    for row in 0..rows {
        let cells = columns.iter().map(|c| decimal(c.values[row])).collect::<Vec<_>>();
        text.push_str(&cells.join(","));
        text.push('\n');
    }
    text
}

/// Shortest decimal that reads back to `value`, with an exponent where the digits would run long.
pub(super) fn decimal(value: f64) -> String {
    let value = value + 0.0;
    let magnitude = value.abs();
    if magnitude > 0.0 && !(1e-4..1e15).contains(&magnitude) { format!("{value:e}") } else { format!("{value}") }
}

pub(super) fn column<'a>(
    name: &'static str,
    unit: &'static str,
    description: &'static str,
    values: Cow<'a, [f64]>,
) -> Column<'a> {
    Column { name, unit, description, values }
}

pub(super) fn vetted(columns: Vec<Column<'_>>) -> Result<Vec<Column<'_>>, IoFault> {
    let expected = columns.first().map_or(0, |c| c.values.len());
    for column in &columns {
        if column.values.len() != expected {
            return Err(IoFault::Length { what: column.name.to_owned(), expected, found: column.values.len() });
        }
        all_finite(column.name, &column.values)?;
    }
    Ok(columns)
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, clippy::float_cmp, reason = "tests may stop at the first fault")]

    use super::*;
    use crate::result::demo;

    #[test]
    fn the_header_is_the_contract() {
        let trace = demo::free().1.trace;
        let text = csv(&trace_columns(&trace).unwrap());
        assert!(text.starts_with("time_s,position_m,speed_m_per_s,drag_N,drag_band_N,velocity_m_per_s,heat_W\n"));
        let curve = demo::curve().1.curve.unwrap();
        let text = csv(&curve_columns(&curve, None).unwrap());
        assert!(text.starts_with(
            "speed_m_per_s,drag_N,drag_band_N,heat_W,current_density_peak_A_per_m2,current_density_peak_band_A_per_m2\n"
        ));
    }

    #[test]
    fn every_number_reads_back_exactly() {
        let trace = demo::free().1.trace;
        let text = csv(&trace_columns(&trace).unwrap());
        let rows: Vec<Vec<f64>> =
            text.lines().skip(1).map(|l| l.split(',').map(|c| c.parse().unwrap()).collect()).collect();
        assert_eq!(rows.len(), trace.time_s.len());
        for (row, (time, velocity)) in rows.iter().zip(trace.time_s.iter().zip(&trace.velocity_m_per_s)) {
            assert_eq!(row[0], *time);
            assert_eq!(row[5], *velocity);
            assert_eq!(row[2], velocity.abs());
        }
    }

    #[test]
    fn decimals_stay_short() {
        assert_eq!(decimal(-0.0), "0");
        assert_eq!(decimal(2.5e-9), "2.5e-9");
        assert_eq!(decimal(0.1), "0.1");
        assert_eq!(decimal(3e20), "3e20");
    }

    #[test]
    fn uneven_columns_and_non_numbers_are_faults() {
        let mut trace = demo::free().1.trace;
        trace.heat_watt.pop();
        assert!(matches!(trace_columns(&trace), Err(IoFault::Length { what, .. }) if what == "heat_W"));
        let mut trace = demo::free().1.trace;
        trace.drag_newton[3] = f64::NAN;
        assert!(matches!(trace_columns(&trace), Err(IoFault::NotFinite { what, .. }) if what == "drag_N [3]"));
    }
}

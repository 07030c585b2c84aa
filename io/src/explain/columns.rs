//! The columns of every table that a result holds, read off the writers themselves.

use lenzbore_solver::outcome::{
    DragCurve, DutyOutcome, FrequencyResponse, Measured, SlotShare, SlottedDrag, StrokeResponse, Trace,
};

use crate::result::{
    Column, IoFault, across_columns, curve_columns, duty_columns, frequency_columns, names, position_columns,
    snapshot_arrays, stroke_columns, stroke_curve_columns, temperature_columns, temperature_curve_columns,
    trace_columns,
};

/// A column: the file, its name, its unit, what it is.
pub(super) struct ColumnMeaning {
    pub file: &'static str,
    pub name: &'static str,
    pub unit: &'static str,
    pub about: &'static str,
}

/// Every column, and every array of `run.h5` over its grid.
pub(super) fn column_meanings() -> Vec<ColumnMeaning> {
    let coils = no_frequency();
    let (trace, curve) = (Trace::default(), DragCurve::default());
    let slotted = SlottedDrag { slots: 1, low_speed: SlotShare { value: 1.0, band: 0.0 }, points: Vec::new() };
    let strokes = StrokeResponse { points: Vec::new(), lumped: Vec::new() };
    let duty =
        DutyOutcome { stops: Vec::new(), has_bore: true, settled: false, solved_at: Vec::new(), uniform_cost: 0.0 };
    let tables = [
        (names::TRACE, trace_columns(&trace)),
        (names::CURVE, curve_columns(&curve, Some(&slotted))),
        (names::FREQUENCY, frequency_columns(&coils)),
        (names::ACROSS, across_columns(&coils)),
        (names::STROKES, stroke_columns(&strokes)),
        (names::TEMPERATURES, temperature_columns(&[])),
        (names::TEMPERATURE_CURVES, temperature_curve_columns(&[])),
        (names::POSITIONS, position_columns(&[])),
        (names::STROKE_CURVE, stroke_curve_columns(&[])),
        (names::DUTY, duty_columns(&duty)),
    ];
    let arrays = snapshot_arrays().map(|(name, unit, about)| ColumnMeaning { file: names::FIELDS, name, unit, about });
    tables.into_iter().flat_map(|(file, columns)| of_table(file, columns)).chain(arrays).collect()
}

/// Tables without rows cannot hold a number that is none.
fn of_table(file: &'static str, columns: Result<Vec<Column<'_>>, IoFault>) -> Vec<ColumnMeaning> {
    let one = |c: Column<'_>| ColumnMeaning { file, name: c.name, unit: c.unit, about: c.description };
    columns.map(|all| all.into_iter().map(one).collect()).unwrap_or_default()
}

fn no_frequency() -> FrequencyResponse {
    FrequencyResponse {
        current_ampere: 1.0,
        winding_resistance_ohm: 0.0,
        inductance_alone: Measured::default(),
        height_m: 0.0,
        shielding_at_m: (0.0, 0.0),
        facing_layer: 0,
        layer_names: Vec::new(),
        points: Vec::new(),
    }
}

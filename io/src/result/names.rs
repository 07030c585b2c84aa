//! The names of the files in a result folder.

/// Figures, forces, ledger, cautions, the resolved case.
pub const SUMMARY: &str = "summary.json";
/// The series of a run.
pub const TRACE: &str = "trace.csv";
/// Drag against speed.
pub const CURVE: &str = "curve.csv";
/// Impedance over frequency.
pub const FREQUENCY: &str = "frequency.csv";
/// Current density across the wall.
pub const ACROSS: &str = "across.csv";
/// Small strokes over frequency.
pub const STROKES: &str = "strokes.csv";
/// What gauges at fixed places read.
pub const STATIONS: &str = "stations.csv";
/// Figures of the curve at each temperature.
pub const TEMPERATURES: &str = "temperatures.csv";
/// Drag against speed at each temperature.
pub const TEMPERATURE_CURVES: &str = "curve_temperatures.csv";
/// Damping coefficient against position.
pub const POSITIONS: &str = "positions.csv";
/// Settled strokes over frequency and amplitude.
pub const STROKE_CURVE: &str = "stroke_curve.csv";
/// A repeated event stop by stop.
pub const DUTY: &str = "duty.csv";
/// What each input makes of each figure.
pub const SENSITIVITIES: &str = "sensitivities.csv";
/// Figures at every rung of a ladder.
pub const LADDER: &str = "ladder.csv";
/// Grid, regions, snapshots, traces, figures of every level.
pub const FIELDS: &str = "run.h5";
/// Opens `run.h5` in a visualisation program.
pub const FIELDS_INDEX: &str = "run.xdmf";
/// The page for people, made of the other files.
pub const REPORT: &str = "report.html";
/// Every comparison of the published checks.
pub const VALIDATION: &str = "validation.json";
/// The study of the bands.
pub const COVERAGE: &str = "coverage.json";

/// What an export holds.
pub const EXPORT: &str = "export.json";

/// Files by any of which a folder is known as a run's result.
pub const RESULT_MARKS: [&str; 7] = [SUMMARY, TRACE, CURVE, FIELDS, VALIDATION, COVERAGE, EXPORT];

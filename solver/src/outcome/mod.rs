//! What is answered: figures with bands, forces, ledger, regime, grids, trace, fields.

mod fields;
mod figure;
mod frequency;
mod report;
mod slots;
mod station;
mod stroke;
mod sweep;
mod thermal;

pub use fields::{Fields, Snapshot};
pub use figure::{Basis, Figure, Location};
pub use frequency::{CurrentSample, FrequencyPoint, FrequencyResponse, Measured, Shielding};
pub use report::{
    Accuracies, Caution, DragCurve, DragPoint, Forces, GridReport, Ledger, Outcome, Regime, Stop, Trace, WorkCounters,
};
pub use slots::{SlotShare, SlottedDrag, SlottedPoint};
pub use station::{StationSeries, StationTrace};
pub use stroke::{LumpedModel, LumpedTerm, SmallStroke, StrokeResponse};
pub use sweep::{AtPosition, AtStroke, AtTemperature, Sweeps};
pub use thermal::{DutyOutcome, DutyStop, HeatLedger, LayerWarmth, TemperatureField, Thermal};

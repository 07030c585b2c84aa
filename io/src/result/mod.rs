//! Everything that leaves a run: summary, tables, fields and pictures, in one folder that appears whole or not at all.

#[cfg(test)]
pub(crate) mod demo;
#[cfg(test)]
mod demo_fields;
#[cfg(test)]
mod demo_thermal;
mod earlier;
mod fault;
mod finite;
pub mod folder;
mod frequency;
mod hdf5;
mod header;
mod ladder;
mod ladder_write;
pub mod names;
mod series;
mod sheaf;
mod spread;
mod stations;
mod strokes;
mod summary;
mod sweeps;
mod thermal;
mod write;
mod xdmf;

pub use earlier::{Earlier, EarlierFigure, changed_words, read_earlier};
pub use fault::IoFault;
pub(crate) use folder::write_beside;
pub use frequency::{across_columns, frequency_columns};
pub use hdf5::{read_fields, snapshot_arrays};
pub use header::{Program, ResultHeader};
pub use ladder::{ladder_csv, ladder_summary};
pub use ladder_write::write_ladder;
pub use series::{Column, csv, curve_columns, trace_columns};
pub(crate) use sheaf::Sheaf;
pub use spread::{sensitivities_csv, spread_object};
pub use stations::stations_csv;
pub use strokes::stroke_columns;
pub use summary::{summary, summary_text};
pub use sweeps::{position_columns, stroke_curve_columns, temperature_columns, temperature_curve_columns};
pub use thermal::duty_columns;
pub use write::{WriteOptions, Written, pictures_of, write};
pub use xdmf::xdmf;

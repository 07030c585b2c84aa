//! `run.h5`: grid, regions, snapshots, series and the figures of every grid level.
//!
//! Every data set says its `units`, a `description` and its `location` on the grid (`node`, `cell`, or `none` where it
//! lies on no grid). Arrays over the grid run `[z, r]`, snapshots `[t, z, r]`, one compressed chunk a snapshot.

mod dataset;
mod frequency;
mod levels;
mod read;
mod regions;
mod snapshots;
mod stations;
mod thermal;

use std::path::Path;

use hdf5::{File, Group};
use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::outcome::{Fields, Outcome};

use super::fault::IoFault;
use super::finite::all_finite;
use super::frequency::frequency_columns;
use super::header::ResultHeader;
use super::series::{Column, curve_columns, trace_columns};
use super::strokes::stroke_columns;
use super::thermal::duty_columns;
use dataset::{About, put, text};
pub use read::read_fields;
pub use snapshots::snapshot_arrays;

const STORED: &str = "Stored fields are those of the finest grid, with its discretisation error. Figures are extrapolated \
     over the grid levels and stand in summary.json; /levels holds them for each level.";
const SIGNS: &str = "Cylinder coordinates; z upward positive, in the wall's frame (endless wall: from the mover's \
     reference point). psi = r A_phi: 2 pi psi is the flux through the disc of radius r. phi turns right-handed about +z. \
     Velocities are signed; drag is positive when it opposes the motion.";

/// Writes the field file.
///
/// # Errors
/// [`IoFault::Length`] or [`IoFault::NotFinite`] for arrays that do not fit, [`IoFault::Interrupted`] when the monitor
/// says so, else what disk and HDF5 library say. The file may then be half written: it belongs into a pending folder.
pub fn write_fields(
    path: &Path,
    header: &ResultHeader,
    outcome: &Outcome,
    fields: &Fields,
    monitor: &dyn Monitor,
) -> Result<(), IoFault> {
    vet(fields)?;
    let trace = trace_columns(&outcome.trace)?;
    let curve =
        outcome.curve.as_ref().map(|c| curve_columns(c, outcome.slotted.as_ref())).transpose()?.unwrap_or_default();
    let blame = |error| IoFault::from_field_file(path, error);
    let file = File::create(path).map_err(blame)?;
    describe(&file, header).map_err(blame)?;
    grid(&file, fields).map_err(blame)?;
    regions::write(&file, fields).map_err(blame)?;
    table(&file, "trace", &trace).map_err(blame)?;
    table(&file, "curve", &curve).map_err(blame)?;
    levels::write(&file, outcome).map_err(blame)?;
    if let Some(response) = &outcome.frequency {
        table(&file, "frequency", &frequency_columns(response)?).map_err(blame)?;
        frequency::write(&file, response, fields).map_err(blame)?;
    }
    if let Some(response) = &outcome.strokes {
        table(&file, "strokes", &stroke_columns(response)?).map_err(blame)?;
    }
    stations::write(&file, &outcome.stations).map_err(blame)?;
    if let Some(warm) = &outcome.thermal {
        if let Some(duty) = &warm.duty {
            table(&file, "duty", &duty_columns(duty)?).map_err(blame)?;
        }
        for field in &warm.fields {
            array(field.moment, &field.temperature_k, warm.r_m.len() * warm.z_m.len())?;
        }
        thermal::write(&file, warm).map_err(blame)?;
    }
    snapshots::write(&file, fields, path, monitor)?;
    file.flush().map_err(blame)?;
    file.close().map_err(blame)
}

fn describe(file: &File, header: &ResultHeader) -> hdf5::Result<()> {
    text(file, "title", &header.title)?;
    text(file, "program", &format!("{} {}", header.program.name, header.program.version))?;
    text(file, "digest", &header.digest)?;
    text(file, "stored", STORED)?;
    text(file, "signs", SIGNS)
}

fn grid(file: &File, fields: &Fields) -> hdf5::Result<()> {
    let group = file.create_group("grid")?;
    let about = |description| About { units: "m", description, location: "node" };
    put(&group, "r_m", &[fields.r_m.len()], &fields.r_m, &about("radii of the node lines, finest grid"))?;
    put(&group, "z_m", &[fields.z_m.len()], &fields.z_m, &about("heights of the node lines, finest grid"))?;
    Ok(())
}

/// One group of equally long columns; left out where there is nothing to hold.
fn table(file: &File, name: &str, columns: &[Column<'_>]) -> hdf5::Result<()> {
    if columns.iter().all(|c| c.values.is_empty()) {
        return Ok(());
    }
    let group: Group = file.create_group(name)?;
    for column in columns {
        let about = About { units: column.unit, description: column.description, location: "none" };
        put(&group, column.name, &[column.values.len()], &column.values, &about)?;
    }
    Ok(())
}

/// Every array has the length that the grid asks for, and holds numbers only.
fn vet(fields: &Fields) -> Result<(), IoFault> {
    let nodes = fields.r_m.len() * fields.z_m.len();
    let cells = fields.r_m.len().saturating_sub(1) * fields.z_m.len().saturating_sub(1);
    length("region", fields.region.len(), cells)?;
    all_finite("grid/r_m", &fields.r_m)?;
    all_finite("grid/z_m", &fields.z_m)?;
    array("conductivity", &fields.conductivity, cells)?;
    array("relative permeability", &fields.relative_permeability, cells)?;
    for snapshot in &fields.snapshots {
        all_finite("snapshot time and position", &[snapshot.time_s, snapshot.mover_position_m])?;
        for (name, values) in snapshots::node_arrays(snapshot) {
            array(name, values, nodes)?;
        }
        for (name, values) in snapshots::cell_arrays(snapshot) {
            array(name, values, cells)?;
        }
    }
    Ok(())
}

fn array(what: &str, values: &[f64], expected: usize) -> Result<(), IoFault> {
    length(what, values.len(), expected)?;
    all_finite(what, values)
}

fn length(what: &str, found: usize, expected: usize) -> Result<(), IoFault> {
    if found == expected { Ok(()) } else { Err(IoFault::Length { what: what.to_owned(), expected, found }) }
}

#[cfg(test)]
#[path = "hdf5/tests.rs"]
mod tests;

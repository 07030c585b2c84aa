//! One call that writes everything a run leaves.

use std::path::{Path, PathBuf};

use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::outcome::Outcome;
use lenzbore_solver::problem::Problem;

use super::fault::IoFault;
use super::folder::PendingFolder;
use super::header::ResultHeader;
use super::sheaf::Sheaf;
use super::{
    across_columns, csv, curve_columns, duty_columns, frequency_columns, hdf5, names, position_columns,
    sensitivities_csv, stations_csv, stroke_columns, stroke_curve_columns, summary_text, temperature_columns,
    temperature_curve_columns, trace_columns, xdmf,
};
use crate::picture::{self, COLUMN_WIDTH_M, Picture};
use crate::report;

/// What to write; what does not apply to a run (no series, no fields, no curve) is left out without a word.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct WriteOptions {
    /// Put the result in the place of an older one.
    pub replace: bool,
    /// `summary.json`.
    pub summary: bool,
    /// `trace.csv` and `curve.csv`.
    pub trace: bool,
    /// `run.h5` and `run.xdmf`.
    pub fields: bool,
    /// SVG and PNG pictures.
    pub pictures: bool,
    /// `report.html`, made of the other files; without the summary there is none.
    pub report: bool,
    /// Width of the pictures on paper, m.
    pub picture_width_m: f64,
}

impl Default for WriteOptions {
    /// Everything, and nothing replaced.
    fn default() -> Self {
        Self {
            replace: false,
            summary: true,
            trace: true,
            fields: true,
            pictures: true,
            report: true,
            picture_width_m: COLUMN_WIDTH_M,
        }
    }
}

/// What was written.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Written {
    /// The result folder, absolute.
    pub folder: PathBuf,
    /// Names of the files in it, in the order they were written.
    pub files: Vec<String>,
}

/// Writes a result folder that appears whole, or not at all.
///
/// # Errors
/// [`IoFault::Exists`] and its like where the folder may not be written, [`IoFault::NotFinite`] where the outcome holds
/// a number that is none, [`IoFault::Interrupted`] when the monitor says so, else what disk and libraries say. After any
/// of them nothing stands under the folder's name that did not stand there before.
pub fn write(
    folder: &Path,
    options: &WriteOptions,
    header: &ResultHeader,
    problem: &Problem,
    outcome: &Outcome,
    monitor: &dyn Monitor,
) -> Result<Written, IoFault> {
    let pending = PendingFolder::begin(folder, options.replace)?;
    let mut sheaf = Sheaf { pending, files: Vec::new(), monitor };
    if let Err(fault) = fill(&mut sheaf, options, header, problem, outcome) {
        return Err(sheaf.pending.in_users_words(fault));
    }
    Ok(Written { folder: sheaf.pending.commit()?, files: sheaf.files })
}

/// Writes every file that was asked for.
fn fill(
    sheaf: &mut Sheaf<'_>,
    options: &WriteOptions,
    header: &ResultHeader,
    problem: &Problem,
    outcome: &Outcome,
) -> Result<(), IoFault> {
    if options.summary {
        sheaf.put(names::SUMMARY, summary_text(header, outcome)?.as_bytes())?;
    }
    if options.trace {
        tables(sheaf, outcome)?;
        if let Some(spread) = &header.spread {
            sheaf.put(names::SENSITIVITIES, sensitivities_csv(spread)?.as_bytes())?;
        }
    }
    if options.fields {
        fields(sheaf, header, outcome)?;
    }
    if options.pictures {
        let all = pictures_of(header, problem, outcome)?;
        pictures(sheaf, all, options.picture_width_m)?;
    }
    if options.report && options.summary {
        let page = report::build(sheaf.pending.path())?;
        sheaf.put(names::REPORT, page.as_bytes())?;
    }
    sheaf.pause()
}

/// The pictures that apply to a run: drag against speed, travel, section where there is something new to see in it.
///
/// # Errors
/// [`IoFault::Picture`].
pub fn pictures_of(header: &ResultHeader, problem: &Problem, outcome: &Outcome) -> Result<Vec<Picture>, IoFault> {
    let mut all: Vec<Picture> = picture::curve(&header.title, outcome).into_iter().collect();
    all.extend(picture::temperatures(&header.title, outcome));
    all.extend(picture::positions(&header.title, outcome));
    all.extend(picture::stroke_curve(&header.title, outcome));
    all.extend(picture::travel(&header.title, problem, outcome));
    all.extend(picture::stations(&header.title, outcome));
    all.extend(picture::force_loop(&header.title, problem, outcome));
    all.extend(picture::stroke_response(&header.title, problem, outcome));
    all.extend(picture::duty(&header.title, outcome));
    all.extend(picture::impedance(&header.title, outcome));
    all.extend(picture::current_across(&header.title, outcome));
    all.extend(header.spread.as_ref().and_then(|s| picture::spread(&header.title, s)));
    let known = !header.geometry.wall.layers.is_empty();
    if outcome.fields.is_some() || !known {
        all.push(picture::section(&header.title, problem, outcome)?);
    }
    if known {
        let parts = picture::drawing(&header.title, &header.geometry)?;
        let name = if outcome.fields.is_some() { parts.name } else { "section" };
        all.push(Picture { name, ..parts });
        all.extend(picture::overview(&header.title, &header.geometry));
    }
    Ok(all)
}

fn tables(sheaf: &mut Sheaf<'_>, outcome: &Outcome) -> Result<(), IoFault> {
    if !outcome.trace.time_s.is_empty() {
        sheaf.put(names::TRACE, csv(&trace_columns(&outcome.trace)?).as_bytes())?;
    }
    if let Some(curve) = &outcome.curve {
        sheaf.put(names::CURVE, csv(&curve_columns(curve, outcome.slotted.as_ref())?).as_bytes())?;
    }
    if !outcome.stations.is_empty() {
        sheaf.put(names::STATIONS, stations_csv(&outcome.stations)?.as_bytes())?;
    }
    let sweeps = &outcome.sweeps;
    if !sweeps.temperatures.is_empty() {
        sheaf.put(names::TEMPERATURES, csv(&temperature_columns(&sweeps.temperatures)?).as_bytes())?;
        sheaf.put(names::TEMPERATURE_CURVES, csv(&temperature_curve_columns(&sweeps.temperatures)?).as_bytes())?;
    }
    if !sweeps.positions.is_empty() {
        sheaf.put(names::POSITIONS, csv(&position_columns(&sweeps.positions)?).as_bytes())?;
    }
    if !sweeps.strokes.is_empty() {
        sheaf.put(names::STROKE_CURVE, csv(&stroke_curve_columns(&sweeps.strokes)?).as_bytes())?;
    }
    if let Some(response) = &outcome.frequency {
        sheaf.put(names::FREQUENCY, csv(&frequency_columns(response)?).as_bytes())?;
        sheaf.put(names::ACROSS, csv(&across_columns(response)?).as_bytes())?;
    }
    if let Some(response) = &outcome.strokes {
        sheaf.put(names::STROKES, csv(&stroke_columns(response)?).as_bytes())?;
    }
    if let Some(duty) = outcome.thermal.as_ref().and_then(|t| t.duty.as_ref()) {
        sheaf.put(names::DUTY, csv(&duty_columns(duty)?).as_bytes())?;
    }
    Ok(())
}

fn fields(sheaf: &mut Sheaf<'_>, header: &ResultHeader, outcome: &Outcome) -> Result<(), IoFault> {
    let Some(fields) = &outcome.fields else { return Ok(()) };
    let path = sheaf.pending.path().join(names::FIELDS);
    hdf5::write_fields(&path, header, outcome, fields, sheaf.monitor)?;
    sheaf.files.push(names::FIELDS.to_owned());
    sheaf.put(names::FIELDS_INDEX, xdmf::xdmf(fields).as_bytes())
}

fn pictures(sheaf: &mut Sheaf<'_>, all: Vec<Picture>, width_m: f64) -> Result<(), IoFault> {
    for picture in all {
        let picture = picture.at_width(width_m);
        sheaf.put(&format!("{}.svg", picture.name), picture.svg.as_bytes())?;
        sheaf.put(&format!("{}.png", picture.name), &picture.png()?)?;
    }
    Ok(())
}

#[cfg(test)]
#[path = "write_tests.rs"]
mod tests;

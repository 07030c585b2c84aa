//! The sections of the page, each made of one part of the result.

mod cautions;
mod comparison;
mod curve;
mod drawing;
mod field;
mod figures;
mod frequency;
mod grids;
mod ladder;
mod ledger;
mod others;
pub(super) mod record;
mod regime;
mod series;
mod spread;
mod strokes;
mod sweeps;
mod travel;

use super::chart::Charts;
use super::source::Source;
use crate::result::IoFault;

/// One section.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Section {
    /// Its anchor.
    pub id: &'static str,
    /// Its heading, to be escaped.
    pub heading: String,
    /// Its body, escaped.
    pub html: String,
}

impl Section {
    /// A section.
    pub(super) fn new(id: &'static str, heading: &str, html: String) -> Self {
        Self { id, heading: heading.to_owned(), html }
    }
}

/// All sections that apply, in the order of the page.
///
/// # Errors
pub(super) fn all(source: &Source, charts: &mut Charts) -> Result<Vec<Section>, IoFault> {
    let mut out: Vec<Section> = Vec::new();
    out.extend(figures::section(source));
    out.extend(comparison::section(source, charts));
    out.extend(cautions::section(source));
    out.extend(drawing::section(source)?);
    out.extend(curve::section(source, charts));
    out.extend(sweeps::temperatures(source, charts));
    out.extend(sweeps::positions(source, charts));
    out.extend(travel::section(source, charts));
    out.extend(strokes::section(source, charts));
    out.extend(sweeps::strokes(source, charts));
    out.extend(frequency::section(source, charts));
    out.extend(field::section(source, charts)?);
    out.extend(ladder::section(source, charts));
    out.extend(spread::section(source, charts));
    out.extend(ledger::section(source));
    out.extend(regime::section(source));
    out.extend(grids::section(source));
    out.extend(others::section(source, charts));
    out.extend(record::section(source));
    Ok(out)
}

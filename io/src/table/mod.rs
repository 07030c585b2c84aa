//! Tables of calculators and measurements: what a calculator's export, a spreadsheet or a logger writes, read to SI.
//!
//! - Separators: comma, semicolon, tab or bar; with other separators than the comma a decimal comma is read too. A byte-order
//!   mark, UTF-16 and older 8-bit text are read; lines that begin with `#` are remarks.
//! - A header names each column and its unit: `drag_N`, `drag [N]`, `drag (N)`, `drag / N`, `speed_m_per_s`; or the units stand in a
//!   second line.
//! - Columns: `speed` or signed `velocity`, `time`, `position` (of the mover's reference point) or `displacement` (from its
//!   start, along the travel), `drag` (or `force`), any figure of a run (`exit_time`, `drag_peak`, ...), `temperature` (of wall and
//!   mover), any word of the case (`wall.sleeve.thickness [mm]`: each row is then a case of its own); an uncertainty
//!   (`drag uncertainty (k=2) [N]`, `u_drag [N]`, `uncertainty [%]`) and its coverage factor `k`.
//! - Or one figure a line: `figure; value; unit`, with `uncertainty` and `k` where there are any.

mod cells;
mod encoding;
mod fault;
mod header;
mod read;
mod roles;
mod rows;

pub use fault::TableFault;
pub use read::{KnownWords, read_table};
pub use roles::{Abscissa, FIGURES, FigureName};

use crate::message::{Diagnostic, Diagnostics, Place, Sources};

#[cfg(test)]
mod tests;

/// One number that is compared, with what the table says of its uncertainty.
#[derive(Debug, Clone, PartialEq)]
pub struct Entry {
    /// Value, SI.
    pub value: f64,
    /// Standard uncertainty (k = 1), SI, where the table has one.
    pub uncertainty: Option<f64>,
    /// Where it stands.
    pub place: Place,
}

/// A column that is compared.
#[derive(Debug, Clone, PartialEq)]
pub struct Ordinate {
    /// What it is: `drag`, `position`, `displacement`, `speed`, `velocity`, or a figure of a run.
    pub name: &'static str,
    /// SI unit.
    pub unit: &'static str,
}

/// A column that makes each row a case of its own.
#[derive(Debug, Clone, PartialEq)]
pub struct Parameter {
    /// The word, as `wall.sleeve.thickness`; `temperature` moves wall and mover.
    pub word: String,
    /// The unit as written; empty for a pure number or a text.
    pub unit: String,
}

/// What a row sets.
#[derive(Debug, Clone, PartialEq)]
pub struct Setting {
    /// `wall.sleeve.thickness=2.1 mm`; a temperature sets two words.
    pub sets: Vec<String>,
    /// The number as written, in the column's unit; none for a text.
    pub number: Option<f64>,
    /// As written.
    pub text: String,
    /// Where.
    pub place: Place,
}

/// One row.
#[derive(Debug, Clone, PartialEq)]
pub struct Row {
    /// Line in the file, from 1.
    pub line: usize,
    /// Along the abscissa, SI.
    pub at: Option<f64>,
    /// Where that stands.
    pub at_place: Option<Place>,
    /// One a parameter.
    pub settings: Vec<Setting>,
    /// One an ordinate.
    pub values: Vec<Option<Entry>>,
}

/// A table, read.
#[derive(Debug, Clone, PartialEq)]
pub struct Table {
    /// What the rows run along; none for single figures.
    pub abscissa: Option<Abscissa>,
    /// What is compared.
    pub ordinates: Vec<Ordinate>,
    /// What each row sets.
    pub parameters: Vec<Parameter>,
    /// The rows.
    pub rows: Vec<Row>,
    /// What was taken for granted.
    pub notes: Vec<String>,
    /// The text, for messages that point into it.
    pub sources: Sources,
}

impl Table {
    /// Whether the table says how uncertain its values are.
    #[must_use]
    pub fn has_uncertainty(&self) -> bool {
        self.rows.iter().flat_map(|r| r.values.iter().flatten()).any(|e| e.uncertainty.is_some())
    }

    /// Faults found later that point into the table.
    #[must_use]
    pub fn diagnostics(&self, faults: Vec<(Place, TableFault)>) -> Diagnostics {
        let faults = faults.into_iter().map(|(place, fault)| Diagnostic::at(place, fault.into())).collect();
        Diagnostics::new(self.sources.clone(), faults)
    }

    /// `table.csv:7:3`.
    #[must_use]
    pub fn describe(&self, place: &Place) -> String {
        self.sources.describe(place)
    }
}

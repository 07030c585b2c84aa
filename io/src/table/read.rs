//! From the bytes of a file to a [`Table`], or to every fault at once.

use super::cells::{lines, separator};
use super::encoding::decode;
use super::fault::TableFault;
use super::header::{Heading, Subject, heading};
use super::roles::Role;
use super::rows::{fill, one_a_line};
use super::{Abscissa, Table};
use crate::message::{CaseFault, Diagnostic, Diagnostics, SourceKind, Sources};

/// What the words of the case measure: `Some("m")`, `Some("")` for a pure number or a text, `None` for no word of the case.
pub type KnownWords<'a> = dyn Fn(&str) -> Option<&'static str> + 'a;

/// Reads a table.
///
/// ```
/// use lenzbore_io::table::{Abscissa, read_table};
/// let text = "speed [in/s];drag [lbf]\n10;2\n";
/// let table = read_table("table.csv", text.as_bytes(), &|_| None)?;
/// assert_eq!(table.abscissa, Some(Abscissa::Speed));
/// // By definition: 10 in = 0.254 m, 2 lbf = 2 x 4.4482216152605 N.
/// assert!((table.rows[0].at.unwrap() - 0.254).abs() < 1e-12);
/// assert!((table.rows[0].values[0].as_ref().unwrap().value - 8.896_443_230_521).abs() < 1e-9);
/// # Ok::<(), lenzbore_io::message::Diagnostics>(())
/// ```
///
/// # Errors
/// Every fault of the table at once, each with file, line and column.
pub fn read_table(label: &str, bytes: &[u8], words: &KnownWords<'_>) -> Result<Table, Diagnostics> {
    let (text, note) = decode(bytes);
    let mut sources = Sources::default();
    let source = sources.add(label, &text, SourceKind::File);
    let separator = separator(&text);
    let all = lines(&text, separator, source);
    let mut work =
        Work { faults: Vec::new(), notes: note.map(str::to_owned).into_iter().collect(), comma: separator != b',' };
    let Some((header, rows)) = all.split_first() else {
        let fault = CaseFault::from(TableFault::Empty { what: "nothing in it" });
        return Err(Diagnostics::new(sources, vec![Diagnostic::of_input(fault)]));
    };
    let mut headings: Vec<Heading> = header.cells.iter().map(|c| heading(&c.text)).collect();
    let rows = units_row(&mut headings, rows);
    if rows.is_empty() {
        work.fault(&header.place, TableFault::Empty { what: "no rows below its header" });
    }
    let uneven = rows.iter().filter(|r| r.cells.len() != header.cells.len());
    for row in uneven {
        let (found, expected) = (row.cells.len(), header.cells.len());
        work.fault(&row.place, TableFault::Uneven { found, expected, commas: separator == b',' && found > expected });
    }
    let long = |r: Role| headings.iter().any(|h| h.subject == Subject::Known(r));
    let table = if long(Role::FigureWord) || long(Role::Value) {
        one_a_line(&mut work, &headings, header, rows)
    } else {
        fill(&mut work, &headings, header, rows, words)
    };
    match table {
        Some(table) if work.faults.is_empty() => Ok(Table { notes: work.notes, sources, ..table }),
        _ => Err(Diagnostics::new(sources, work.faults)),
    }
}

/// What is gathered while a table is read.
pub(super) struct Work {
    pub faults: Vec<Diagnostic>,
    pub notes: Vec<String>,
    /// Whether a comma can be the decimal mark.
    pub comma: bool,
}

impl Work {
    pub fn fault(&mut self, place: &crate::message::Place, fault: TableFault) {
        self.faults.push(Diagnostic::at(place.clone(), fault.into()));
    }
}

/// A second line that holds nothing but units gives them to the columns.
fn units_row<'a>(headings: &mut [Heading], rows: &'a [super::cells::Line]) -> &'a [super::cells::Line] {
    let Some((first, rest)) = rows.split_first() else { return rows };
    let bare = |text: &str| text.trim_matches(['[', ']', '(', ')']).trim().to_owned();
    let is_unit = |text: &str| {
        let text = bare(text);
        text.is_empty() || text == "-" || crate::units::read_unit(&text, crate::units::Kind::Ratio).is_ok()
    };
    let any_number = first.cells.iter().any(|c| super::cells::number(&c.text, true).is_some());
    let some = first.cells.iter().any(|c| !c.text.is_empty());
    if any_number || !some || first.cells.len() != headings.len() || !first.cells.iter().all(|c| is_unit(&c.text)) {
        return rows;
    }
    for (heading, cell) in headings.iter_mut().zip(&first.cells) {
        if heading.unit.is_empty() {
            heading.unit = bare(&cell.text);
        }
    }
    rest
}

/// What the rows run along: time before place before speed; the others are compared.
pub(super) fn abscissa(roles: &[Role]) -> Option<(usize, Abscissa)> {
    let find = |role: Role| roles.iter().position(|r| *r == role);
    let candidates = [
        (Role::Time, Abscissa::Time),
        (Role::Position, Abscissa::Position),
        (Role::Displacement, Abscissa::Displacement),
        (Role::Speed, Abscissa::Speed),
        (Role::Velocity, Abscissa::Speed),
    ];
    candidates.into_iter().find_map(|(role, abscissa)| find(role).map(|i| (i, abscissa)))
}

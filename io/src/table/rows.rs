//! The rows of a table, once its header is understood.

use super::cells::{Cell, Line, number};
use super::fault::TableFault;
use super::header::{Heading, Subject, nearest_name};
use super::read::{KnownWords, Work, abscissa};
use super::roles::{FIGURES, Role, role_of};
use super::{Entry, Ordinate, Parameter, Row, Setting, Table};
use crate::message::Sources;
use crate::units::{Kind, QuantityFault, read_quantity, read_unit};

/// An uncertainty column: of which column, in which unit, with which coverage factor.
struct Uncertain {
    column: usize,
    of: usize,
    expanded: bool,
    coverage: Option<f64>,
}

/// What each column turned out to be.
#[derive(Default)]
struct Plan {
    roles: Vec<(usize, Role)>,
    words: Vec<(usize, String)>,
    uncertain: Vec<Uncertain>,
    coverage: Option<usize>,
}

/// A table with a column for everything.
pub(super) fn fill(
    work: &mut Work,
    headings: &[Heading],
    header: &Line,
    lines: &[Line],
    words: &KnownWords<'_>,
) -> Option<Table> {
    let plan = plan(work, headings, header, words);
    let roles: Vec<Role> = plan.roles.iter().map(|(_, r)| *r).collect();
    let along = abscissa(&roles).map(|(i, a)| (plan.roles[i].0, a));
    let mut values = Vec::new();
    let mut ordinates: Vec<Ordinate> = Vec::new();
    for (column, role) in &plan.roles {
        if along.is_some_and(|(c, _)| c == *column) || *role == Role::Temperature {
            continue;
        }
        let ordinate = ordinate(*role)?;
        if let Some(k) = ordinates.iter().position(|o| o.name == ordinate.name) {
            let first: usize = values[k];
            let fault = TableFault::Twice {
                first: headings[first].written.clone(),
                second: headings[*column].written.clone(),
                why: "say the same",
            };
            work.fault(&header.cells[*column].place, fault);
            continue;
        }
        ordinates.push(ordinate);
        values.push(*column);
    }
    if ordinates.is_empty() && work.faults.is_empty() {
        work.fault(&header.place, TableFault::Empty { what: "nothing to compare: no drag, no travel, no figure" });
    }
    let mut parameters: Vec<Parameter> = plan
        .words
        .iter()
        .map(|(column, word)| Parameter { word: word.clone(), unit: headings[*column].unit.clone() })
        .collect();
    let warm = plan.roles.iter().find(|(_, r)| *r == Role::Temperature).map(|(c, _)| *c);
    if let Some(column) = warm {
        parameters.push(Parameter { word: "temperature".to_owned(), unit: headings[column].unit.clone() });
    }
    let mut rows = Vec::new();
    for line in lines.iter().filter(|l| l.cells.len() == headings.len()) {
        let read = Reading { headings, line, plan: &plan, warm };
        let at = along.and_then(|(column, _)| read.quantity(work, column, kind_at(&plan, column)));
        let at = match at {
            // A velocity along the abscissa counts by its magnitude: drag is the same both ways.
            Some(v) if along.is_some_and(|(_, a)| a == super::Abscissa::Speed) => Some(v.abs()),
            other => other,
        };
        let settings = read.settings(work);
        let entries = values.iter().map(|column| read.entry(work, *column, kind_at(&plan, *column))).collect();
        let at_place = along.map(|(column, _)| line.cells[column].place.clone());
        rows.push(Row { line: line.number, at, at_place, settings, values: entries });
    }
    note_coverage(work, &plan, headings);
    Some(Table {
        abscissa: along.map(|(_, a)| a),
        ordinates,
        parameters,
        rows,
        notes: Vec::new(),
        sources: Sources::default(),
    })
}

fn kind_at(plan: &Plan, column: usize) -> Kind {
    plan.roles.iter().find(|(c, _)| *c == column).and_then(|(_, r)| r.kind()).unwrap_or(Kind::Ratio)
}

fn ordinate(role: Role) -> Option<Ordinate> {
    let name = match role {
        Role::Speed => "speed",
        Role::Velocity => "velocity",
        Role::Time => "time",
        Role::Position => "position",
        Role::Displacement => "displacement",
        Role::Figure(figure) => figure.name,
        _ => return None,
    };
    Some(Ordinate { name, unit: role.kind()?.si_unit() })
}

/// Says of each column what it is; faults point at the header.
fn plan(work: &mut Work, headings: &[Heading], header: &Line, words: &KnownWords<'_>) -> Plan {
    let mut plan = Plan::default();
    let mut owners: Vec<(String, usize)> = Vec::new();
    for (column, heading) in headings.iter().enumerate() {
        let place = &header.cells[column].place;
        match &heading.subject {
            Subject::Known(Role::Remark) => {}
            Subject::Known(Role::Coverage) => plan.coverage = Some(column),
            Subject::Known(Role::Uncertainty { expanded }) => match plan.roles.last() {
                Some((of, _)) => {
                    let (of, expanded, coverage) = (*of, *expanded, heading.coverage);
                    plan.uncertain.push(Uncertain { column, of, expanded, coverage });
                }
                None => work.fault(place, TableFault::WhoseUncertainty { header: heading.written.clone() }),
            },
            Subject::Known(role) => {
                if let Some(kind) = role.kind() {
                    check_unit(work, heading, place, kind);
                    plan.roles.push((column, *role));
                    if let Subject::Known(role) = &heading.subject {
                        owners.extend(ordinate(*role).map(|o| (o.name.to_owned(), column)));
                    }
                }
            }
            Subject::UncertaintyOf { .. } => {}
            Subject::Word(word) => match words(word) {
                Some(si) => {
                    check_word_unit(work, heading, place, si);
                    plan.words.push((column, word.clone()));
                }
                None => {
                    let why = format!("'{word}' is no word of this case, or none that a row can set");
                    unknown(work, heading, place, None, Some(why));
                }
            },
            Subject::Unknown(name) => unknown(work, heading, place, nearest_name(name), None),
        }
    }
    for (column, heading) in headings.iter().enumerate() {
        let Subject::UncertaintyOf { name, expanded } = &heading.subject else { continue };
        let owner = role_of(name).and_then(ordinate).and_then(|o| owners.iter().find(|(n, _)| n == o.name));
        match owner {
            Some((_, of)) => {
                plan.uncertain.push(Uncertain { column, of: *of, expanded: *expanded, coverage: heading.coverage });
            }
            None => {
                let fault = TableFault::WhoseUncertainty { header: heading.written.clone() };
                work.fault(&header.cells[column].place, fault);
            }
        }
    }
    for u in &plan.uncertain {
        let heading = &headings[u.column];
        if heading.unit != "%" {
            check_unit(work, heading, &header.cells[u.column].place, kind_at(&plan, u.of));
        }
    }
    plan
}

fn unknown(
    work: &mut Work,
    heading: &Heading,
    place: &crate::message::Place,
    nearest: Option<String>,
    why: Option<String>,
) {
    work.fault(place, TableFault::UnknownColumn { header: heading.written.clone(), nearest, why });
}

fn check_unit(work: &mut Work, heading: &Heading, place: &crate::message::Place, kind: Kind) {
    let header = heading.written.clone();
    if heading.unit.is_empty() {
        if kind != Kind::Ratio {
            work.fault(place, TableFault::NoUnit { header, fitting: kind.fitting_units().to_vec() });
        }
        return;
    }
    if let Err(fault) = read_quantity(&format!("1 {}", heading.unit), kind) {
        work.fault(place, TableFault::Unit { header, fault });
    }
}

/// A word's unit must measure what the word does; of a conductivity, a resistivity's unit is read too.
fn check_word_unit(work: &mut Work, heading: &Heading, place: &crate::message::Place, si: &str) {
    let header = heading.written.clone();
    if si.is_empty() {
        return;
    }
    let wanted = read_unit(si, Kind::Ratio).ok().and_then(|u| Kind::of_dimension(u.dimension)).unwrap_or(Kind::Ratio);
    if heading.unit.is_empty() {
        work.fault(place, TableFault::NoUnit { header, fitting: wanted.fitting_units().to_vec() });
    } else if let Err(fault) = read_quantity(&format!("1 {}", heading.unit), wanted) {
        work.fault(place, TableFault::Unit { header, fault });
    }
}

/// One line while it is read.
struct Reading<'a> {
    headings: &'a [Heading],
    line: &'a Line,
    plan: &'a Plan,
    warm: Option<usize>,
}

impl Reading<'_> {
    /// A cell's number as written.
    fn number(&self, work: &mut Work, column: usize) -> Option<f64> {
        let cell = &self.line.cells[column];
        let found = number(&cell.text, work.comma);
        if found.is_none() {
            let header = self.headings[column].written.clone();
            work.fault(&cell.place, TableFault::NoNumber { found: cell.text.clone(), header, mend: mend_of(cell) });
        }
        found
    }

    /// The same in SI.
    fn quantity(&self, work: &mut Work, column: usize, kind: Kind) -> Option<f64> {
        let number = self.number(work, column)?;
        // The unit itself has been checked at the header.
        to_si(number, &self.headings[column].unit, kind).ok()
    }

    fn entry(&self, work: &mut Work, column: usize, kind: Kind) -> Option<Entry> {
        let cell = &self.line.cells[column];
        if cell.text.is_empty() {
            return None;
        }
        let value = self.quantity(work, column, kind)?;
        let uncertainty =
            self.plan.uncertain.iter().find(|u| u.of == column).and_then(|u| self.uncertainty(work, u, value));
        Some(Entry { value, uncertainty, place: cell.place.clone() })
    }

    /// Standard uncertainty, SI.
    fn uncertainty(&self, work: &mut Work, u: &Uncertain, value: f64) -> Option<f64> {
        if self.line.cells[u.column].text.is_empty() {
            return None;
        }
        let number = self.number(work, u.column)?.abs();
        let unit = &self.headings[u.column].unit;
        let half = if unit == "%" {
            0.01 * number * value.abs()
        } else {
            // A difference: a temperature's would have no zero of its own.
            to_si(number, unit, kind_at(self.plan, u.of)).ok()?
        };
        let k = match (self.plan.coverage, u.coverage) {
            (Some(column), _) => self.number(work, column).filter(|k| *k > 0.0)?,
            (None, Some(k)) => k,
            (None, None) if u.expanded => 2.0,
            (None, None) => 1.0,
        };
        Some(half / k)
    }

    fn settings(&self, work: &mut Work) -> Vec<Setting> {
        let mut all = Vec::new();
        for (column, word) in &self.plan.words {
            let cell = &self.line.cells[*column];
            let unit = &self.headings[*column].unit;
            let found = if unit.is_empty() { number(&cell.text, work.comma) } else { self.number(work, *column) };
            let value = match found {
                Some(n) if unit.is_empty() => format!("{n}"),
                Some(n) => format!("{n} {unit}"),
                None => cell.text.clone(),
            };
            all.push(Setting {
                sets: vec![format!("{word}={value}")],
                number: found,
                text: value,
                place: cell.place.clone(),
            });
        }
        if let Some(column) = self.warm {
            let cell = &self.line.cells[column];
            if let Some(n) = self.number(work, column) {
                let text = format!("{n} {}", self.headings[column].unit);
                let sets = ["wall", "mover"].map(|part| format!("{part}.temperature={text}")).to_vec();
                all.push(Setting { sets, number: Some(n), text, place: cell.place.clone() });
            }
        }
        all
    }
}

fn mend_of(cell: &Cell) -> Option<&'static str> {
    let begins = cell.text.starts_with(|c: char| c.is_ascii_digit() || "+-.".contains(c));
    if cell.text.contains(',') && cell.text.contains('.') {
        Some("digits are not grouped: one decimal mark, point or comma")
    } else if begins && cell.text.contains(char::is_alphabetic) {
        Some("a unit belongs in the header")
    } else {
        None
    }
}

fn to_si(number: f64, unit: &str, kind: Kind) -> Result<f64, QuantityFault> {
    read_quantity(&format!("{number} {unit}"), kind).map(|q| q.si)
}

/// An uncertainty whose coverage is not told is taken as expanded with k = 2.
fn note_coverage(work: &mut Work, plan: &Plan, headings: &[Heading]) {
    for u in plan.uncertain.iter().filter(|u| u.expanded && u.coverage.is_none() && plan.coverage.is_none()) {
        let header = &headings[u.column].written;
        work.notes.push(format!("the column '{header}' does not say its coverage factor: taken as expanded, k = 2"));
    }
}

/// A table with one figure a line: figure, value, unit, and an uncertainty with its k where there is one.
pub(super) fn one_a_line(work: &mut Work, headings: &[Heading], header: &Line, lines: &[Line]) -> Option<Table> {
    let find =
        |role: fn(&Role) -> bool| headings.iter().position(|h| matches!(&h.subject, Subject::Known(r) if role(r)));
    let figure = find(|r| matches!(r, Role::FigureWord));
    let value = find(|r| matches!(r, Role::Value));
    let unit = find(|r| matches!(r, Role::Unit));
    let uncertainty = find(|r| matches!(r, Role::Uncertainty { .. }));
    let coverage = find(|r| matches!(r, Role::Coverage));
    let (Some(figure), Some(value), Some(unit)) = (figure, value, unit) else {
        let what = "one figure a line, but not all of the columns figure, value and unit";
        work.fault(&header.place, TableFault::Empty { what });
        return None;
    };
    for (heading, cell) in headings.iter().zip(&header.cells) {
        let known = matches!(
            heading.subject,
            Subject::Known(
                Role::FigureWord | Role::Value | Role::Unit | Role::Uncertainty { .. } | Role::Coverage | Role::Remark
            )
        );
        if !known {
            unknown(work, heading, &cell.place, None, Some("of a table with one figure a line".to_owned()));
        }
    }
    let mut ordinates: Vec<Ordinate> = Vec::new();
    let mut found: Vec<(usize, usize, Entry)> = Vec::new();
    let mut assumed = false;
    for line in lines.iter().filter(|l| l.cells.len() == headings.len()) {
        let name = super::header::snake(&line.cells[figure].text);
        let known = match role_of(&name) {
            Some(Role::Figure(figure)) => Some(figure),
            _ => FIGURES.into_iter().find(|f| f.name == name),
        };
        let Some(known) = known else {
            let cell = &line.cells[figure];
            let nearest = nearest_name(&name);
            work.fault(&cell.place, TableFault::UnknownColumn { header: cell.text.clone(), nearest, why: None });
            continue;
        };
        let place = line.cells[value].place.clone();
        let si = |work: &mut Work, column: usize| -> Option<f64> {
            let cell = &line.cells[column];
            let Some(n) = number(&cell.text, work.comma) else {
                let header = headings[column].written.clone();
                work.fault(&cell.place, TableFault::NoNumber { found: cell.text.clone(), header, mend: mend_of(cell) });
                return None;
            };
            let written = &line.cells[unit].text;
            to_si(n, if written == "1" { "" } else { written }, known.kind)
                .map_err(|fault| {
                    let place = &line.cells[unit].place;
                    work.fault(place, TableFault::Unit { header: known.name.to_owned(), fault });
                })
                .ok()
        };
        let Some(number_si) = si(work, value) else { continue };
        let half = uncertainty.filter(|c| !line.cells[*c].text.is_empty()).and_then(|c| si(work, c));
        let k = coverage.and_then(|c| number(&line.cells[c].text, work.comma)).filter(|k| *k > 0.0);
        assumed |= half.is_some() && k.is_none();
        let entry = Entry { value: number_si, uncertainty: half.map(|h| h.abs() / k.unwrap_or(2.0)), place };
        let k = ordinates.iter().position(|o| o.name == known.name).unwrap_or_else(|| {
            ordinates.push(Ordinate { name: known.name, unit: known.kind.si_unit() });
            ordinates.len() - 1
        });
        found.push((line.number, k, entry));
    }
    if assumed {
        work.notes.push("the uncertainties do not say their coverage factor: taken as expanded, k = 2".to_owned());
    }
    let rows = found
        .into_iter()
        .map(|(line, k, entry)| {
            let mut values = vec![None; ordinates.len()];
            values[k] = Some(entry);
            Row { line, at: None, at_place: None, settings: Vec::new(), values }
        })
        .collect();
    Some(Table {
        abscissa: None,
        ordinates,
        parameters: Vec::new(),
        rows,
        notes: Vec::new(),
        sources: Sources::default(),
    })
}

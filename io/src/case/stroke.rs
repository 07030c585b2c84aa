//! `[travel]` of laws `sine` and `table`: motions that are given.

use lenzbore_solver::problem::{MOST_CYCLES, MotionTable, Quantity as Number, Sine, Travel};

use sha2::{Digest, Sha256};

use super::CaseSource;
use super::load::named_file;
use super::measures::POSITION;
use super::reader::{Reader, Section, Wanted, wanted};
use super::resolved::{Origin, ResolvedValue};
use super::travel::{Surroundings, law};
use crate::message::{CaseFault, Diagnostic, Place, SourceKind};
use crate::table::{Abscissa, Table, TableFault, read_table};
use crate::units::Kind;

pub(super) const AMPLITUDE: Wanted = wanted(Kind::Length, Number::Amplitude);
pub(super) const FREQUENCY: Wanted = wanted(Kind::Frequency, Number::Frequency);
const FILE: &str = "file = \"motion.csv\"";
/// A table with fewer points says nothing of a motion.
const LEAST_POINTS: usize = 3;

/// The law asked for, where it is one of these.
pub(super) fn is_given_motion(section: &Section<'_>) -> bool {
    section.table.text("law").is_some_and(|l| matches!(l.trim(), "sine" | "table"))
}

/// Reads the law; `None` where it is faulty.
pub(super) fn read_given_motion(
    reader: &mut Reader,
    section: &Section<'_>,
    around: Surroundings,
    source: &CaseSource<'_>,
) -> Option<Travel> {
    let before = reader.faults.len();
    let travel = match law(reader, section)? {
        "sine" => sine(reader, section, around).map(Travel::Sine),
        _ => table(reader, section, source).map(Travel::Table),
    };
    travel.filter(|_| reader.faults.len() == before)
}

fn sine(reader: &mut Reader, section: &Section<'_>, around: Surroundings) -> Option<Sine> {
    let middle = 0.5 * around.length_m;
    let centre = reader.quantity_or(section, "centre", POSITION, middle, "the middle of the wall");
    let why = "half the stroke, from the centre to a turning point";
    let amplitude = reader.required(section, "amplitude", AMPLITUDE, why, "amplitude = \"5 mm\"");
    let frequency =
        reader.required(section, "frequency", FREQUENCY, "how often it goes to and fro", "frequency = \"20 Hz\"");
    let cycles = reader.count(section, "cycles", 1, MOST_CYCLES).and_then(|n| u32::try_from(n).ok());
    if !section.table.has("cycles") {
        let why = "until loss and stiffness no longer change".to_owned();
        let value = ResolvedValue::Text("as many as it takes".to_owned());
        reader.note(section, "cycles", value, "", Origin::Default { why });
    }
    Some(Sine { centre_m: centre, amplitude_m: amplitude?, frequency_hz: frequency?, cycles })
}

fn table(reader: &mut Reader, section: &Section<'_>, source: &CaseSource<'_>) -> Option<MotionTable> {
    if !section.table.has("file") {
        reader.missing(section, "file", "a table of time and position beside the case", FILE);
        return None;
    }
    let name = reader.text(section, "file", FILE)?;
    let place = section.place_of("file");
    let (label, bytes) = named_file(&place, source, &reader.sources, name.trim());
    reader.note_text(section, "file", &name);
    let (motion, text) = motion(reader, &place, (&label, bytes))?;
    // The digest knows the motion itself, not the name of its file alone.
    let content = Sha256::digest(text.as_bytes()).iter().map(|byte| format!("{byte:02x}")).collect();
    let origin = reader.origin(&place);
    reader.note(section, "file_sha256", ResolvedValue::Text(content), "", origin);
    reader.kept_files.insert(name.trim().to_owned(), text);
    Some(motion)
}

/// Reads the file that the case names at `place`, and gives its text beside the motion; its faults join those of the case.
fn motion(
    reader: &mut Reader,
    place: &Place,
    (label, bytes): (&str, Result<Vec<u8>, String>),
) -> Option<(MotionTable, String)> {
    let bytes = match bytes {
        Ok(bytes) => bytes,
        Err(why) => {
            reader.fault(place.clone(), CaseFault::UnreadableFile { path: label.to_owned(), why });
            return None;
        }
    };
    match read_table(label, &bytes, &|_| None) {
        Ok(table) => {
            let text = table.sources.text(&Place::new(0, 0..0)).map_or_else(String::new, |t| t.text.clone());
            let index = reader.sources.add(label, &text, SourceKind::File);
            reader.cautions.extend(table.notes.iter().map(|note| format!("{label}: {note}")));
            points(reader, &table, index).map(|motion| (motion, text))
        }
        Err(faults) => {
            let text = faults.sources().text(&Place::new(0, 0..0)).map_or_else(String::new, |t| t.text.clone());
            let index = reader.sources.add(label, &text, SourceKind::File);
            reader.faults.extend(faults.faults().iter().map(|d| Diagnostic {
                fault: Box::new(of_motion(&d.fault)),
                place: d.place.as_ref().map(|p| here(p, index)).or_else(|| Some(place.clone())),
                ..d.clone()
            }));
            None
        }
    }
}

/// What is said of a table to compare, said of a motion.
fn of_motion(fault: &CaseFault) -> CaseFault {
    match fault {
        CaseFault::Table(TableFault::UnknownColumn { header, .. }) => TableFault::NoMotion {
            what: format!("a column '{header}', which is neither time nor position"),
            mend: "a header as time_s,position_mm, and a row for each instant".to_owned(),
        }
        .into(),
        other => other.clone(),
    }
}

/// The same place in the text number `index`.
fn here(place: &Place, index: usize) -> Place {
    Place { source: index, ..place.clone() }
}

/// Time and position, point by point; every gap and every step back is pointed at.
fn points(reader: &mut Reader, table: &Table, index: usize) -> Option<MotionTable> {
    let top = Place::new(index, 0..0);
    let position = table.ordinates.iter().position(|o| o.name == "position");
    let (Some(position), Some(Abscissa::Time)) = (position, table.abscissa) else {
        let what = "no columns time and position of the reference point".to_owned();
        let mend = "a header as time_s,position_mm, and a row for each instant".to_owned();
        reader.fault(top, TableFault::NoMotion { what, mend }.into());
        return None;
    };
    let before = reader.faults.len();
    let (mut time_s, mut position_m) = (Vec::new(), Vec::new());
    let mut last: Option<f64> = None;
    for row in &table.rows {
        let at = || row.at_place.as_ref().map_or_else(|| top.clone(), |p| here(p, index));
        let (Some(time), Some(entry)) = (row.at, row.values[position].as_ref()) else {
            let what = format!("a gap in line {}: time or position lacks", row.line);
            let mend = "take the row out, or fill it: between points the motion is a smooth curve".to_owned();
            reader.fault(at(), TableFault::NoMotion { what, mend }.into());
            continue;
        };
        if let Some(earlier) = last.filter(|earlier| time <= *earlier) {
            let what = format!("times that do not increase: {time} s follows {earlier} s");
            let mend = "sort the rows by time, and give each instant once".to_owned();
            reader.fault(at(), TableFault::NoMotion { what, mend }.into());
        }
        last = Some(time);
        time_s.push(time);
        position_m.push(entry.value);
    }
    if time_s.len() < LEAST_POINTS && reader.faults.len() == before {
        let what = format!("{} points, and a motion takes at least {LEAST_POINTS}", time_s.len());
        reader.fault(top, TableFault::NoMotion { what, mend: "add rows".to_owned() }.into());
    }
    if let Some(first) = time_s.first().filter(|t| t.abs() > 0.0) {
        reader.cautions.push(format!("instants of the answer count from the table's first point, at {first} s"));
    }
    (reader.faults.len() == before).then_some(MotionTable { time_s, position_m })
}

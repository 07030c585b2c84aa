//! `[[output.station]]`: gauges at fixed places.

use lenzbore_solver::problem::{Gauge, Quantity as Number, SensibleRange, Station};

use super::measures::{HOLE, LENGTH, POSITION};
use super::names::{Names, name_of};
use super::reader::{Reader, Section, Wanted};
use crate::message::CaseFault;
use crate::units::Kind;

const EXAMPLE: &str = "[[output.station]] with at = \"90 mm\", diameter = \"28 mm\" and what = \"flux density\"";
const TURNS: Wanted =
    Wanted { kind: Kind::Ratio, range: SensibleRange { lowest: 1e-3, highest: 1e7, zero: false, signed: false } };
const RADIUS: Wanted = Wanted { kind: Kind::Length, range: Number::InnerRadius.sensible() };
const WHATS: [&str; 3] = ["flux density", "current density", "search coil"];

/// Reads all stations, each with its section.
pub(super) fn read_stations<'t>(reader: &mut Reader, output: &Section<'t>) -> Vec<(Station, Section<'t>)> {
    let mut names = Names::default();
    let mut stations = Vec::new();
    for (i, mut section) in reader.tables(output, "station", EXAMPLE).into_iter().enumerate() {
        let name = name_of(reader, &section, "output", format!("station {}", i + 1), &mut names);
        section.path = vec!["output".to_owned(), name.clone()];
        let before = reader.faults.len();
        let station = read_station(reader, &section, name);
        if let Some(station) = station.filter(|_| reader.faults.len() == before) {
            stations.push((station, section));
        }
    }
    stations
}

fn read_station(reader: &mut Reader, section: &Section<'_>, name: String) -> Option<Station> {
    reader.check_words(section);
    let at = reader.required(section, "at", POSITION, "its height above the wall's lower end", "at = \"90 mm\"");
    let radius = radius(reader, section);
    if !section.table.has("what") {
        let why = "what the gauge reads: flux density, current density or search coil";
        reader.missing(section, "what", why, "what = \"flux density\"");
        return None;
    }
    let what = reader.choice(section, "what", &WHATS, "what = \"flux density\"")?;
    reader.note_text(section, "what", what);
    let gauge = match what {
        "search coil" => search_coil(reader, section)?,
        other => {
            no_coil_words(reader, section, other);
            if other == "flux density" { Gauge::FluxDensity } else { Gauge::CurrentDensity }
        }
    };
    Some(Station { name, at_m: at?, radius_m: radius?, gauge })
}

/// Half the diameter, or the radius: one of the two is given.
fn radius(reader: &mut Reader, section: &Section<'_>) -> Option<f64> {
    match (section.table.has("radius"), section.table.has("diameter")) {
        (true, true) => {
            let words = "'radius' and 'diameter'".to_owned();
            let why = "one says the other".to_owned();
            let mend = "take one of them out".to_owned();
            reader.fault(section.place_of("radius"), CaseFault::Clash { words, why, mend });
            None
        }
        (true, false) => reader.quantity(section, "radius", RADIUS),
        (false, true) => reader.quantity(section, "diameter", HOLE).map(|d| 0.5 * d),
        (false, false) => {
            reader.missing(section, "diameter", "how far from the axis it sits", "diameter = \"28 mm\"");
            None
        }
    }
}

fn search_coil(reader: &mut Reader, section: &Section<'_>) -> Option<Gauge> {
    let turns = reader.required(section, "turns", TURNS, "the e.m.f. goes with them", "turns = 50");
    let length_m = if section.table.has("length") {
        reader.quantity(section, "length", LENGTH)?
    } else {
        reader.note_default(section, "length", 0.0, Kind::Length, "all turns at one height");
        0.0
    };
    Some(Gauge::SearchCoil { turns: turns?, length_m })
}

fn no_coil_words(reader: &mut Reader, section: &Section<'_>, what: &str) {
    for word in ["turns", "length"] {
        if section.table.has(word) {
            let words = format!("'{word}' of a gauge for {what}");
            let why = "it is a word of a search coil".to_owned();
            let mend = format!("take '{word}' out, or give what = \"search coil\"");
            reader.fault(section.place_of(word), CaseFault::Clash { words, why, mend });
        }
    }
}

//! `[travel]` of law `alternating`: coils at rest, in series.

use lenzbore_solver::problem::{Alternating, Extent, Quantity as Number, Travel, Wall};
use lenzbore_solver::sources::Source;

use super::measures::POSITION;
use super::mover::MoverReading;
use super::reader::{Reader, Section, Wanted, wanted};
use super::travel::law;
use crate::message::CaseFault;
use crate::units::Kind;

/// The law's name.
const LAW: &str = "alternating";
/// Points of a sweep, where a case does not say.
const POINTS: usize = 25;
const FREQUENCY: Wanted = wanted(Kind::Frequency, Number::Frequency);
const CURRENT: Wanted = wanted(Kind::Current, Number::Current);
const RESISTANCE: Wanted = wanted(Kind::Resistance, Number::Resistance);
const ONE: &str = "frequency = \"50 Hz\"";
const SEVERAL: &str = "frequencies = [\"10 Hz\", \"100 kHz\"]";
/// Currents that differ by less, relative, are one current.
const SAME: f64 = 1e-9;

/// Whether this is the law asked for.
pub(super) fn is_asked(section: &Section<'_>) -> bool {
    section.table.text("law").is_some_and(|l| l.trim() == LAW)
}

/// Reads the law; `None` where it is faulty.
pub(super) fn read_alternating(
    reader: &mut Reader,
    section: &Section<'_>,
    wall: Option<&Wall>,
    mover: Option<&MoverReading<'_>>,
) -> Option<Travel> {
    law(reader, section)?;
    let before = reader.faults.len();
    let frequencies_hz = frequencies(reader, section);
    let position_m = position(reader, section, wall);
    let winding = reader.quantity_or(section, "winding_resistance", RESISTANCE, 0.0, "not given");
    let current = mover.and_then(|m| common_current(reader, m));
    if reader.faults.len() > before {
        return None;
    }
    // Without a coil to read a current from, the faults of the mover say what is missing.
    Some(Travel::Alternating(Alternating {
        frequencies_hz: frequencies_hz?,
        current_ampere: current.unwrap_or(1.0),
        position_m: position_m?,
        winding_resistance_ohm: winding,
    }))
}

fn frequencies(reader: &mut Reader, section: &Section<'_>) -> Option<Vec<f64>> {
    let has = |word: &str| section.table.has(word);
    if has("frequency") && has("frequencies") {
        let words = "'frequency' and 'frequencies'".to_owned();
        let why = "one is a single frequency, the other a sweep".to_owned();
        let mend = "take one of them out".to_owned();
        reader.fault(section.place_of("frequency"), CaseFault::Clash { words, why, mend });
        return None;
    }
    if has("frequencies") {
        return sweep(reader, section);
    }
    if has("points") {
        let words = "'points' without 'frequencies'".to_owned();
        let why = "it spreads points between two frequencies".to_owned();
        let mend = format!("give {SEVERAL}, or take 'points' out");
        reader.fault(section.place_of("points"), CaseFault::Clash { words, why, mend });
    }
    let why = "one frequency, or 'frequencies' for a sweep";
    reader.required(section, "frequency", FREQUENCY, why, ONE).map(|f| vec![f])
}

fn sweep(reader: &mut Reader, section: &Section<'_>) -> Option<Vec<f64>> {
    let nodes = reader.list(section, "frequencies", SEVERAL)?;
    let read: Vec<Option<f64>> = nodes.iter().map(|n| reader.value(n, "frequencies", FREQUENCY)).collect();
    let points = reader.count(section, "points", 2, 1000);
    let listed: Vec<f64> = read.into_iter().collect::<Option<_>>()?;
    if listed.len() < 2 || listed.windows(2).any(|w| w[0] >= w[1]) {
        let (word, why) = ("frequencies".to_owned(), "frequencies increase, and there are at least two");
        reader.fault(section.place_of("frequencies"), CaseFault::List { word, why, example: SEVERAL });
        return None;
    }
    reader.note_numbers(section, "frequencies", &listed, Kind::Frequency);
    let [first, last] = listed[..] else {
        if section.table.has("points") {
            let words = "'points' beside a list of more than two frequencies".to_owned();
            let why = "it spreads points between two frequencies".to_owned();
            let mend = "give two frequencies, or take 'points' out".to_owned();
            reader.fault(section.place_of("points"), CaseFault::Clash { words, why, mend });
        }
        return Some(listed);
    };
    if !section.table.has("points") {
        reader.note_default(section, "points", 25.0, Kind::Ratio, "25 points, evenly spread over the logarithm");
    }
    let count = u32::try_from(points.unwrap_or(POINTS)).unwrap_or(2).max(2);
    let at = |i: u32| match i {
        0 => first,
        i if i + 1 == count => last,
        i => first * (last / first).powf(f64::from(i) / f64::from(count - 1)),
    };
    Some((0..count).map(at).collect())
}

/// Height of the reference point: the wall's middle unless the case says otherwise, 0 in an endless wall.
fn position(reader: &mut Reader, section: &Section<'_>, wall: Option<&Wall>) -> Option<f64> {
    match wall.map(|w| w.extent) {
        Some(Extent::Finite { length_m }) => {
            Some(reader.quantity_or(section, "position", POSITION, 0.5 * length_m, "the wall's middle"))
        }
        Some(Extent::Endless) if section.table.has("position") => {
            let words = "'position' in an endless wall".to_owned();
            let why = "it has no ends to count from: heights count from the reference point itself".to_owned();
            let mend = "give the wall a length, or take 'position' out".to_owned();
            reader.fault(section.place_of("position"), CaseFault::Clash { words, why, mend });
            None
        }
        _ => Some(0.0),
    }
}

/// The current that all coils carry, A: they are in series.
fn common_current(reader: &mut Reader, mover: &MoverReading<'_>) -> Option<f64> {
    let coils = mover.mover.parts.iter().zip(&mover.parts).filter(|(p, _)| matches!(p.source, Source::Coil { .. }));
    let mut common: Option<f64> = None;
    for (part, section) in coils {
        let node = section.table.get("current")?;
        let signed = Wanted { range: Number::AmpereTurns.sensible(), ..CURRENT };
        let current = reader.value(node, "current", signed)?.abs();
        match common {
            Some(first) if (current - first).abs() > SAME * first => {
                let words = format!("'current' of coil '{}' and of a coil before it", part.name);
                let why = format!("coils of law '{LAW}' are in series: {current} A and {first} A are two currents");
                let mend = "give them one current; a coil connected the other way has it with a minus sign".to_owned();
                reader.fault(node.place.clone(), CaseFault::Clash { words, why, mend });
                return None;
            }
            _ => common = common.or(Some(current)),
        }
    }
    common
}

//! `[curve]`: what is swept. Speeds with settled fields, temperatures of wall and mover beside them; positions in a wall with ends;
//! frequencies and amplitudes of strokes.

use lenzbore_solver::problem::{Extent, Travel};

use super::measures::POSITION;
use super::reader::{Reader, Section, Wanted};
use super::stroke::{AMPLITUDE, FREQUENCY};
use super::temperature::temperature_of;
use super::travel::CURVE_SPEED;
use super::tree::Node;
use super::wall::WallReading;
use super::{CurvePlan, StrokesPlan};
use crate::message::CaseFault;
use crate::units::Kind;

/// Points of a curve, where a case does not say.
const POINTS: usize = 40;
const EXAMPLE: &str = "speeds = [\"0.01 m/s\", \"50 m/s\"]";
const TEMPERATURES: &str = "temperatures = [\"-30 degC\", \"20 degC\", \"70 degC\"]";
const POSITIONS: &str = "positions = [\"0 mm\", \"90 mm\"]";
const FREQUENCIES: &str = "frequencies = [\"10 Hz\", \"50 Hz\", \"200 Hz\"]";
const AMPLITUDES: &str = "amplitudes = [\"1 mm\", \"4 mm\"]";

/// A list that a curve sweeps.
struct Swept {
    word: &'static str,
    kind: Kind,
    least: usize,
    why: &'static str,
    example: &'static str,
}

const SPEEDS: Swept = Swept {
    word: "speeds",
    kind: Kind::Speed,
    least: 2,
    why: "speeds increase, and there are at least two",
    example: EXAMPLE,
};

/// Reads `[curve]`; `None` where it is faulty. `travel` says whether the case has one, and what it is where it could be read.
pub(super) fn read_curve(
    reader: &mut Reader,
    section: &Section<'_>,
    wall: Option<&WallReading<'_>>,
    travel: (bool, Option<&Travel>),
) -> Option<CurvePlan> {
    reader.check_words(section);
    let before = reader.faults.len();
    let given = |word: &str| section.table.has(word);
    let with_speeds = given("speeds") || given("temperatures");
    let others = given("positions") || given("frequencies") || given("amplitudes");
    let spread = Spread::read(reader, section);
    let speeds = if with_speeds || !others { speeds(reader, section, &spread) } else { Some(Vec::new()) };
    let temperatures = temperatures(reader, section);
    let positions = positions(reader, section, wall, &spread);
    let strokes = strokes(reader, section, travel);
    spread.check(reader, section);
    let cautions = if with_speeds { taken_as_endless(reader, section, wall) } else { Vec::new() };
    let length_m = wall.and_then(|w| w.wall.length_m());
    let plan = CurvePlan {
        speeds_m_per_s: speeds?,
        temperatures_k: temperatures?,
        positions_m: positions?,
        strokes: strokes?,
        length_m,
        cautions,
    };
    (reader.faults.len() == before).then_some(plan)
}

/// How points are spread between two values.
struct Spread {
    points: Option<usize>,
    linear: bool,
}

impl Spread {
    fn read(reader: &mut Reader, section: &Section<'_>) -> Self {
        let points = reader.count(section, "points", 2, 10_000);
        let spacing = reader.choice(section, "spacing", &["log", "linear"], "spacing = \"log\"");
        Self { points, linear: spacing == Some("linear") }
    }

    /// `points` values from `first` to `last`, both included to the bit.
    fn between(&self, first: f64, last: f64, log: bool) -> Vec<f64> {
        let count = u32::try_from(self.points.unwrap_or(POINTS)).unwrap_or(2).max(2);
        let steps = f64::from(count - 1);
        (0..count)
            .map(|i| match i {
                0 => first,
                i if i + 1 == count => last,
                i if log => first * (last / first).powf(f64::from(i) / steps),
                i => first + (last - first) * (f64::from(i) / steps),
            })
            .collect()
    }

    /// Refuses words that have nothing to spread, notes those left out.
    fn check(&self, reader: &mut Reader, section: &Section<'_>) {
        if !["speeds", "temperatures", "positions", "frequencies", "amplitudes"].iter().any(|w| section.table.has(w)) {
            // Nothing is swept: that has its own fault.
            return;
        }
        let two = |word: &str| section.table.get(word).is_some_and(is_pair);
        let (speeds, positions) = (two("speeds"), two("positions"));
        for (word, serves) in [("points", speeds || positions), ("spacing", speeds)] {
            if section.table.has(word) && !serves {
                let list = if section.table.has("speeds") { "a list of more than two speeds" } else { "no two speeds" };
                let words = format!("'{word}' beside {list}");
                let why = "it spreads points between two speeds".to_owned();
                let mend = format!("give two speeds, or take '{word}' out");
                reader.fault(section.place_of(word), CaseFault::Clash { words, why, mend });
            }
        }
        if (speeds || positions) && !section.table.has("points") {
            reader.note_default(section, "points", 40.0, Kind::Ratio, "40 points");
        }
        if speeds && !section.table.has("spacing") {
            reader.note_text(section, "spacing", "log");
        }
    }
}

fn is_pair(node: &Node) -> bool {
    matches!(&node.value, super::tree::Value::List(nodes) if nodes.len() == 2)
}

fn speeds(reader: &mut Reader, section: &Section<'_>, spread: &Spread) -> Option<Vec<f64>> {
    if !section.table.has("speeds") {
        reader.missing(section, "speeds", "the first and last speed, or a list of speeds", EXAMPLE);
        return None;
    }
    let speeds = swept(reader, section, &SPEEDS, |reader, node| reader.value(node, "speeds", CURVE_SPEED))?;
    Some(if let [first, last] = speeds[..] { spread.between(first, last, !spread.linear) } else { speeds })
}

fn temperatures(reader: &mut Reader, section: &Section<'_>) -> Option<Vec<f64>> {
    let list = Swept {
        word: "temperatures",
        kind: Kind::Temperature,
        least: 1,
        why: "temperatures increase, and there is at least one",
        example: TEMPERATURES,
    };
    swept(reader, section, &list, |reader, node| temperature_of(reader, node, "temperatures"))
}

fn positions(
    reader: &mut Reader,
    section: &Section<'_>,
    wall: Option<&WallReading<'_>>,
    spread: &Spread,
) -> Option<Vec<f64>> {
    let list = Swept {
        word: "positions",
        kind: Kind::Length,
        least: 1,
        why: "positions increase, and there is at least one",
        example: POSITIONS,
    };
    let positions = swept(reader, section, &list, |reader, node| reader.value(node, "positions", POSITION))?;
    if !positions.is_empty() && wall.is_some_and(|w| w.extent == Some(Extent::Endless)) {
        let words = "'positions' of [curve] in an endless wall".to_owned();
        let why = "without ends one place is like another".to_owned();
        let mend = "give the wall a length, or take 'positions' out".to_owned();
        reader.fault(section.place_of("positions"), CaseFault::Clash { words, why, mend });
        return None;
    }
    Some(if let [first, last] = positions[..] { spread.between(first, last, false) } else { positions })
}

/// Frequencies and amplitudes of strokes; where one of the two is left out, the travel's.
fn strokes(
    reader: &mut Reader,
    section: &Section<'_>,
    (has_travel, travel): (bool, Option<&Travel>),
) -> Option<Option<StrokesPlan>> {
    let of = |word, kind, why, example| Swept { word, kind, least: 1, why, example };
    let frequencies =
        of("frequencies", Kind::Frequency, "frequencies increase, and there is at least one", FREQUENCIES);
    let amplitudes = of("amplitudes", Kind::Length, "amplitudes increase, and there is at least one", AMPLITUDES);
    let value = |word: &'static str, wanted: Wanted| move |r: &mut Reader, node: &Node| r.value(node, word, wanted);
    let frequencies_hz = swept(reader, section, &frequencies, value("frequencies", FREQUENCY));
    let amplitudes_m = swept(reader, section, &amplitudes, value("amplitudes", AMPLITUDE));
    let given = ["frequencies", "amplitudes"].into_iter().find(|word| section.table.has(word));
    let Some(word) = given else { return Some(None) };
    let Some(Travel::Sine(sine)) = travel else {
        // A travel that could not be read has its own fault.
        if !has_travel || travel.is_some() {
            let words = format!("'{word}' of [curve] without strokes");
            let why = "it sweeps the stroke of law 'sine'".to_owned();
            let mend = "give [travel] law = \"sine\" with amplitude and frequency".to_owned();
            reader.fault(section.place_of(word), CaseFault::Clash { words, why, mend });
        }
        return None;
    };
    let or_own = |list: Vec<f64>, own: f64| if list.is_empty() { vec![own] } else { list };
    Some(Some(StrokesPlan {
        frequencies_hz: or_own(frequencies_hz?, sine.frequency_hz),
        amplitudes_m: or_own(amplitudes_m?, sine.amplitude_m),
    }))
}

/// The values of a list, which increase; empty where the word is absent.
fn swept(
    reader: &mut Reader,
    section: &Section<'_>,
    list: &Swept,
    mut read: impl FnMut(&mut Reader, &Node) -> Option<f64>,
) -> Option<Vec<f64>> {
    if !section.table.has(list.word) {
        return Some(Vec::new());
    }
    let nodes = reader.list(section, list.word, list.example)?;
    let read: Vec<Option<f64>> = nodes.iter().map(|n| read(reader, n)).collect();
    let values: Vec<f64> = read.into_iter().collect::<Option<_>>()?;
    if values.len() < list.least || values.windows(2).any(|w| w[0] >= w[1]) {
        let fault = CaseFault::List { word: list.word.to_owned(), why: list.why, example: list.example };
        reader.fault(section.place_of(list.word), fault);
        return None;
    }
    reader.note_numbers(section, list.word, &values, list.kind);
    Some(values)
}

/// A curve over speed has settled fields, so a finite wall is taken as endless, and one with sections cannot be.
fn taken_as_endless(reader: &mut Reader, section: &Section<'_>, wall: Option<&WallReading<'_>>) -> Vec<String> {
    let Some(WallReading { wall, extent: Some(Extent::Finite { length_m }), .. }) = wall else { return Vec::new() };
    let tolerance = 1e-9 * length_m;
    let short = wall.layers.iter().find(|l| l.from_m.abs() > tolerance || (l.to_m - length_m).abs() > tolerance);
    if let Some(layer) = short {
        let words = "[curve] with a wall that changes along its length".to_owned();
        let why =
            format!("settled fields need an endless wall, and layer '{}' does not run from end to end", layer.name);
        let mend = "take [curve] out, or let every layer run the whole length".to_owned();
        reader.fault(section.place.clone(), CaseFault::Clash { words, why, mend });
        return Vec::new();
    }
    vec![format!("the curve takes the wall as endless; its {} mm have ends that are left out", 1e3 * length_m)]
}

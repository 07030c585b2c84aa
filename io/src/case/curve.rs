//! `[curve]`: the speeds at which settled drag is wanted.

use lenzbore_solver::problem::Extent;

use super::CurvePlan;
use super::reader::{Reader, Section};
use super::travel::CURVE_SPEED;
use super::wall::WallReading;
use crate::message::CaseFault;
use crate::units::Kind;

/// Points of a curve, where a case does not say.
const POINTS: usize = 40;
const EXAMPLE: &str = "speeds = [\"0.01 m/s\", \"50 m/s\"]";

/// Reads `[curve]`; `None` where it is faulty.
pub(super) fn read_curve(
    reader: &mut Reader,
    section: &Section<'_>,
    wall: Option<&WallReading<'_>>,
) -> Option<CurvePlan> {
    reader.check_words(section);
    for (word, what) in [("temperatures", "curves over temperature"), ("positions", "damping against position")] {
        if let Some(entry) = section.table.entry(word) {
            let what = format!("{what} ('{word}' of [curve])");
            reader.not_modelled_yet(entry, &what, Some("drag against speed is: 'speeds', 'points', 'spacing'"));
        }
    }
    let speeds_m_per_s = speeds(reader, section);
    let cautions = taken_as_endless(reader, section, wall);
    Some(CurvePlan { speeds_m_per_s: speeds_m_per_s?, cautions })
}

fn speeds(reader: &mut Reader, section: &Section<'_>) -> Option<Vec<f64>> {
    if !section.table.has("speeds") {
        reader.missing(section, "speeds", "the first and last speed, or a list of speeds", EXAMPLE);
        return None;
    }
    let nodes = reader.list(section, "speeds", EXAMPLE)?;
    let read: Vec<Option<f64>> = nodes.iter().map(|n| reader.value(n, "speeds", CURVE_SPEED)).collect();
    let points = reader.count(section, "points", 2, 10_000);
    let spacing = reader.choice(section, "spacing", &["log", "linear"], "spacing = \"log\"");
    let speeds: Vec<f64> = read.into_iter().collect::<Option<_>>()?;
    if speeds.len() < 2 || speeds.windows(2).any(|w| w[0] >= w[1]) {
        let (word, why) = ("speeds".to_owned(), "speeds increase, and there are at least two");
        reader.fault(section.place_of("speeds"), CaseFault::List { word, why, example: EXAMPLE });
        return None;
    }
    reader.note_numbers(section, "speeds", &speeds, Kind::Speed);
    if let [first, last] = speeds[..] {
        if !section.table.has("points") {
            reader.note_default(section, "points", 40.0, Kind::Ratio, "40 points");
        }
        if !section.table.has("spacing") {
            reader.note_text(section, "spacing", "log");
        }
        return Some(spread(first, last, points.unwrap_or(POINTS), spacing != Some("linear")));
    }
    for word in ["points", "spacing"] {
        if section.table.has(word) {
            let words = format!("'{word}' beside a list of more than two speeds");
            let why = "it spreads points between two speeds".to_owned();
            let mend = format!("give two speeds, or take '{word}' out");
            reader.fault(section.place_of(word), CaseFault::Clash { words, why, mend });
        }
    }
    Some(speeds)
}

/// `points` speeds from `first` to `last`, both included to the bit.
fn spread(first: f64, last: f64, points: usize, log: bool) -> Vec<f64> {
    let count = u32::try_from(points).unwrap_or(2).max(2);
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

/// A curve has settled fields, so a finite wall is taken as endless, and one with sections cannot be.
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

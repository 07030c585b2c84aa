//! `[travel]`: how the mover travels.

use lenzbore_solver::constants::STANDARD_GRAVITY;
use lenzbore_solver::problem::{Extent, Free, Quantity as Number, SensibleRange, Travel, Traverse, Wall};

use super::measures::POSITION;
use super::reader::{Reader, Section, Wanted, wanted};
use super::resolved::{Origin, ResolvedValue};
use super::words::{LAWS, law_words};
use crate::message::{CaseFault, nearest};
use crate::units::Kind;

/// What the positions that a case leaves out are counted from.
#[derive(Debug, Clone, Copy)]
pub(super) struct Surroundings {
    /// Length of the wall, m; 0 where it is endless or not known.
    pub length_m: f64,
    /// Bore diameter, or the wall's outer diameter for a mover around it, m.
    pub diameter_m: f64,
    /// Lower and upper end of the mover from its reference point, m.
    pub ends_m: [f64; 2],
}

impl Surroundings {
    /// From wall and mover as far as they could be read.
    pub fn new(wall: Option<&Wall>, ends_m: Option<[f64; 2]>) -> Self {
        let length_m = match wall.map(|w| w.extent) {
            Some(Extent::Finite { length_m }) => length_m,
            _ => 0.0,
        };
        let diameter_m = wall.filter(|w| !w.layers.is_empty()).map_or(0.0, |w| {
            let bore = 2.0 * w.inner_radius_m();
            if bore > 0.0 { bore } else { 2.0 * w.outer_radius_m() }
        });
        let ends_m = ends_m.filter(|e| e.iter().all(|x| x.is_finite())).unwrap_or([0.0, 0.0]);
        Self { length_m, diameter_m, ends_m }
    }

    /// Reference point where the mover is `diameters` clear below the wall.
    fn below(&self, diameters: f64) -> f64 {
        -diameters * self.diameter_m - self.ends_m[1]
    }

    /// Reference point where the mover is `diameters` clear above the wall.
    fn above(&self, diameters: f64) -> f64 {
        self.length_m + diameters * self.diameter_m - self.ends_m[0]
    }
}

/// A traverse starts and ends with the mover so many bore diameters clear of the wall.
const CLEAR_DIAMETERS: f64 = 6.0;
/// Free travel ends with the reference point so many bore diameters beyond the far gate.
const BEYOND_DIAMETERS: f64 = 2.0;
/// A free run that has not ended by then, s, is stopped.
const TIME_LIMIT_S: f64 = 60.0;

const fn signed_speed() -> Wanted {
    wanted(Kind::Speed, Number::Velocity)
}

/// Reads `[travel]`; `None` where it is absent or faulty.
pub(super) fn read_travel(reader: &mut Reader, section: &Section<'_>, around: Surroundings) -> Option<Travel> {
    let law = law(reader, section)?;
    let before = reader.faults.len();
    let travel = match law {
        "steady" => {
            let velocity_m_per_s = speed(reader, section, "the drag is the same both ways")?;
            Travel::Steady { velocity_m_per_s }
        }
        "traverse" => traverse(reader, section, around)?,
        _ => free(reader, section, around)?,
    };
    (reader.faults.len() == before).then_some(travel)
}

/// The law, where it can be solved and has no words of another.
pub(super) fn law(reader: &mut Reader, section: &Section<'_>) -> Option<&'static str> {
    let example = "law = \"traverse\"";
    if !section.table.has("law") {
        reader.missing(
            section,
            "law",
            "how the mover travels: steady, traverse, free, sine or table; alternating for coils at rest",
            example,
        );
        reader.check_words(section);
        return None;
    }
    let asked = section.table.text("law").unwrap_or_default().trim();
    if let Some(later) = LAWS.iter().find(|l| l.law == asked && !l.modelled) {
        let what = format!("law = \"{}\"", later.law);
        let instead =
            Some("laws that are: \"steady\", \"traverse\", \"free\", \"sine\", \"table\", \"alternating\"".to_owned());
        reader.fault(section.place_of("law"), CaseFault::NotModelled { what, instead });
        return None;
    }
    let laws: Vec<&'static str> = LAWS.iter().filter(|l| l.modelled).map(|l| l.law).collect();
    let Some(words) = reader.choice(section, "law", &laws, example).and_then(law_words) else {
        reader.check_words(section);
        return None;
    };
    check_law_words(reader, section, words.law, words.words);
    Some(words.law)
}

fn check_law_words(reader: &mut Reader, section: &Section<'_>, law: &'static str, words: &[&'static str]) {
    for entry in section.table.entries.iter().filter(|e| e.word != "law" && !words.contains(&e.word.as_str())) {
        let of_word = LAWS.iter().filter(|l| l.words.contains(&entry.word.as_str()));
        let owners: Vec<String> = of_word.map(|l| format!("'{}'", l.law)).collect();
        let fault = match owners.as_slice() {
            [_, ..] => CaseFault::Clash {
                words: format!("'{}' in a travel of law '{law}'", entry.word),
                why: format!("it is a word of law {}", owners.join(", ")),
                mend: format!("words of law '{law}': {}", words.join(", ")),
            },
            [] => CaseFault::UnknownWord {
                word: entry.word.clone(),
                table: section.label.to_owned(),
                nearest: nearest(&entry.word, words.iter().copied().chain(["law"])),
                elsewhere: super::words::elsewhere(&entry.word, section.kind),
                legal: words.iter().copied().chain(["law"]).collect(),
            },
        };
        reader.fault(entry.word_place.clone(), fault);
    }
}

/// A speed is a magnitude; `mend` says how the other direction is asked for.
fn speed(reader: &mut Reader, section: &Section<'_>, mend: &str) -> Option<f64> {
    let why = "how fast the mover travels";
    let any = SensibleRange { highest: f64::MAX, ..signed_speed().range };
    let wanted = Wanted { kind: Kind::Speed, range: any };
    let speed = reader.required(section, "speed", wanted, why, "speed = \"2 m/s\"")?;
    let fastest = signed_speed().range.highest;
    let (legal, mend) = if speed < 0.0 {
        ("a speed is a magnitude, 0 or greater".to_owned(), mend)
    } else if speed > fastest {
        let legal = format!("at most {fastest} m/s, a hundredth of the speed of light");
        (legal, "nearer to it the displacement current counts, which is left out of the equations")
    } else {
        return Some(speed);
    };
    let place = section.place_of("speed");
    let found = reader.sources.written(&place);
    reader.fault(place, CaseFault::Impossible { word: "speed".to_owned(), found, legal, mend: Some(mend.to_owned()) });
    None
}

fn traverse(reader: &mut Reader, section: &Section<'_>, around: Surroundings) -> Option<Travel> {
    let speed = speed(reader, section, "swap 'from' and 'to' to travel the other way");
    if speed.is_some_and(|s| s <= 0.0) {
        let place = section.place_of("speed");
        let found = reader.sources.written(&place);
        let legal = "a traverse gets through the wall: its speed is greater than 0".to_owned();
        reader.fault(place, CaseFault::Impossible { word: "speed".to_owned(), found, legal, mend: None });
    }
    let given = |word: &str| section.table.has(word);
    let from = reader.quantity(section, "from", POSITION);
    let to = reader.quantity(section, "to", POSITION);
    if (given("from") && from.is_none()) || (given("to") && to.is_none()) {
        return None;
    }
    let middle = 0.5 * around.length_m;
    let (below, above) = (around.below(CLEAR_DIAMETERS), around.above(CLEAR_DIAMETERS));
    let other = |x: f64| if x < middle { above } else { below };
    let (from_m, to_m) = match (from, to) {
        (Some(from), Some(to)) => (from, to),
        (Some(from), None) => (from, other(from)),
        (None, Some(to)) => (other(to), to),
        (None, None) => (below, above),
    };
    let why = "the whole mover 6 bore diameters clear of the wall's end";
    for (word, si) in [("from", from_m), ("to", to_m)] {
        if !given(word) {
            reader.note_default(section, word, si, Kind::Length, why);
        }
    }
    Some(Travel::Traverse(Traverse { speed_m_per_s: speed?, from_m, to_m }))
}

fn free(reader: &mut Reader, section: &Section<'_>, around: Surroundings) -> Option<Travel> {
    let release = reader.required(
        section,
        "release",
        POSITION,
        "where the reference point is when the mover is let go",
        "release = \"640 mm\"",
    );
    let number = |n: Number, kind: Kind| wanted(kind, n);
    let plain =
        |reader: &mut Reader, word, wanted, default, why: &str| reader.quantity_or(section, word, wanted, default, why);
    let entry_velocity = plain(reader, "entry_velocity", signed_speed(), 0.0, "let go at rest");
    let time_limit_s = plain(reader, "time_limit", number(Number::Time, Kind::Time), TIME_LIMIT_S, "60 s");
    let gravity =
        plain(reader, "gravity", number(Number::Gravity, Kind::Acceleration), STANDARD_GRAVITY, "standard gravity");
    let tilt_rad = plain(reader, "tilt_from_vertical", number(Number::Tilt, Kind::Angle), 0.0, "vertical");
    let push_newton = plain(reader, "push", number(Number::Push, Kind::Force), 0.0, "none");
    let friction_newton = plain(reader, "friction", number(Number::Friction, Kind::Force), 0.0, "none");
    let coefficient = number(Number::FrictionCoefficient, Kind::Ratio);
    let friction_coefficient = plain(reader, "friction_coefficient", coefficient, 0.0, "none");
    let air_drag = plain(reader, "air_drag", number(Number::AirDrag, Kind::AirDrag), 0.0, "none");
    let spring_rate = plain(reader, "spring_rate", number(Number::SpringRate, Kind::SpringRate), 0.0, "no spring");
    if spring_rate > 0.0 && !section.table.has("spring_free_at") {
        let why = "where the spring is free of force";
        reader.missing(section, "spring_free_at", why, "spring_free_at = \"300 mm\"");
    }
    let spring_free_at_m = plain(reader, "spring_free_at", POSITION, 0.0, "no spring");
    if friction_coefficient > 0.0 && tilt_rad <= 0.0 {
        reader.cautions.push(
            "the friction coefficient acts on the weight across the axis: in a vertical bore it does nothing"
                .to_owned(),
        );
    }
    let gates_m = gates(reader, section, release, around);
    let until_m = until(reader, section, release, gates_m, around);
    Some(Travel::Free(Free {
        release_m: release?,
        entry_velocity_m_per_s: entry_velocity,
        until_m: until_m?,
        time_limit_s,
        gravity_m_per_s2: gravity,
        tilt_rad,
        push_newton,
        friction_newton,
        friction_coefficient,
        air_drag_n_s2_per_m2: air_drag,
        spring_rate_n_per_m: spring_rate,
        spring_free_at_m,
        gates_m: gates_m?,
    }))
}

/// Both gates; by default the wall's ends, the nearer to the release first.
fn gates(reader: &mut Reader, section: &Section<'_>, release: Option<f64>, around: Surroundings) -> Option<[f64; 2]> {
    let example = "gates = [\"600 mm\", \"0 mm\"]";
    if !section.table.has("gates") {
        let from_above = release.is_none_or(|r| r >= 0.5 * around.length_m);
        let gates = if from_above { [around.length_m, 0.0] } else { [0.0, around.length_m] };
        let list = gates.iter().map(|g| ResolvedValue::Number(*g)).collect();
        let why = "the wall's ends, the nearer to the release first".to_owned();
        reader.note(section, "gates", ResolvedValue::List(list), "m", Origin::Default { why });
        return Some(gates);
    }
    let nodes = reader.list(section, "gates", example)?;
    let read: Vec<Option<f64>> = nodes.iter().map(|n| reader.value(n, "gates", POSITION)).collect();
    match read.as_slice() {
        [Some(first), Some(second)] => {
            reader.note_numbers(section, "gates", &[*first, *second], Kind::Length);
            Some([*first, *second])
        }
        [_, _] => None,
        _ => {
            let why = "there are two gates: the first and the second that the reference point passes";
            reader.fault(section.place_of("gates"), CaseFault::List { word: "gates".to_owned(), why, example });
            None
        }
    }
}

/// Where the run ends; by default beyond the gate that lies away from the release.
fn until(
    reader: &mut Reader,
    section: &Section<'_>,
    release: Option<f64>,
    gates: Option<[f64; 2]>,
    around: Surroundings,
) -> Option<f64> {
    if section.table.has("until") {
        return reader.quantity(section, "until", POSITION);
    }
    let (release, [first, second]) = (release?, gates?);
    let beyond = BEYOND_DIAMETERS * around.diameter_m;
    let (until, why) = if release >= 0.5 * (first + second) {
        (first.min(second) - beyond, "2 bore diameters below the lower gate")
    } else {
        (first.max(second) + beyond, "2 bore diameters above the upper gate, for it is let go below")
    };
    reader.note_default(section, "until", until, Kind::Length, why);
    Some(until)
}

/// A speed of a curve: a magnitude above 0.
pub(super) const CURVE_SPEED: Wanted =
    Wanted { kind: Kind::Speed, range: SensibleRange { lowest: 1e-9, highest: 3e6, zero: false, signed: false } };

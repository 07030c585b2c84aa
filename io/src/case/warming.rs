//! How the wall warms: `density` and the like of its layers, `[cooling]`, `[duty]`.

use std::sync::Arc;

use lenzbore_solver::problem::{Cooling, Duty, LayerHeat, MOST_STOPS, SensibleRange, Travel, Warming};

use super::conductor::note_book;
use super::reader::{Reader, Section, Wanted};
use super::resolved::{Origin, ResolvedValue};
use super::temperature::{CELSIUS_ZERO_K, LINEAR_TO_K, ROOM_K, temperature};
use super::tree::Value;
use super::wall::WallReading;
use crate::materials::{BookNumber, Conductor, book};
use crate::message::CaseFault;
use crate::units::Kind;

const fn positive(lowest: f64, highest: f64) -> SensibleRange {
    SensibleRange { lowest, highest, zero: false, signed: false }
}

/// A density.
pub(crate) const DENSITY: Wanted = Wanted { kind: Kind::Density, range: positive(1.0, 5.0e4) };
/// A specific heat.
pub(crate) const SPECIFIC_HEAT: Wanted = Wanted { kind: Kind::SpecificHeat, range: positive(10.0, 2.0e4) };
/// A thermal conductivity.
pub(crate) const CONDUCTION: Wanted = Wanted { kind: Kind::ThermalConductivity, range: positive(1.0e-3, 1.0e4) };
/// A film coefficient.
pub(crate) const FILM: Wanted = Wanted {
    kind: Kind::FilmCoefficient,
    range: SensibleRange { lowest: 1.0e-3, highest: 1.0e7, zero: true, signed: false },
};
/// The period of a duty.
pub(crate) const PERIOD: Wanted = Wanted { kind: Kind::Time, range: positive(1.0e-3, 1.0e9) };
/// Repeats until the temperatures no longer change.
pub(crate) const UNTIL_SETTLED: &str = "until settled";

/// Melting points of the pure metals, fixed points of the International Temperature Scale of 1990 (H. Preston-Thomas, Metrologia 27, 3-10,
/// 1990, table 1; from memory): alloys begin to melt below them.
const MELTING_K: [(&str, f64); 2] = [("copper", CELSIUS_ZERO_K + 1084.62), ("aluminium", CELSIUS_ZERO_K + 660.323)];

/// Reads everything; `None` where no temperatures can or need be told.
pub(super) fn read_warming(
    reader: &mut Reader,
    root: &Section<'_>,
    wall: &WallReading<'_>,
    travel: Option<&Travel>,
) -> Option<Warming> {
    let cooling_section = reader.table(root, "cooling", "[cooling] with outside_film_coefficient = \"10 W/(m2 K)\"");
    let duty_section = reader.table(root, "duty", "[duty] with period = \"20 s\"");
    let start_k = reader.resolved.number("wall.temperature").unwrap_or(ROOM_K);
    let cooling = cooling_section.as_ref().map(|s| read_cooling(reader, s, start_k));
    let duty = duty_section.as_ref().and_then(|s| read_duty(reader, s));
    let layers: Vec<LayerReading> = wall.layers.iter().map(|s| layer(reader, s, start_k)).collect();
    for section in [&duty_section, &cooling_section].into_iter().flatten() {
        refuse_misfit(reader, section, travel);
    }
    if let (Some(duty), Some(section)) = (&duty, &duty_section)
        && duty.repeats.is_none()
        && !cooling.is_some_and(|c| c.cools())
    {
        let words = format!("repeats = \"{UNTIL_SETTLED}\" without cooling");
        let why = "a wall that gives off no heat never settles".to_owned();
        let mend = "give [cooling] with a film coefficient, or repeats as a whole number".to_owned();
        reader.fault(section.place_of("repeats"), CaseFault::Clash { words, why, mend });
    }
    if !matches!(travel, Some(Travel::Traverse(_) | Travel::Free(_) | Travel::Sine(_) | Travel::Table(_))) {
        return None;
    }
    let asked = cooling.is_some() || duty.is_some();
    let layers = known_layers(reader, wall, &layers, asked)?;
    Some(Warming { start_k, layers, cooling, duty })
}

/// Film coefficients and ambient.
fn read_cooling(reader: &mut Reader, section: &Section<'_>, start_k: f64) -> Cooling {
    reader.check_words(section);
    let mut film = |word, why| reader.quantity_or(section, word, FILM, 0.0, why);
    let bore_w_per_m2_k = film("bore_film_coefficient", "the bore's surface insulated");
    let outside_w_per_m2_k = film("outside_film_coefficient", "the outside insulated");
    let ends_w_per_m2_k = film("ends_film_coefficient", "the ends insulated");
    let ambient_k = if section.table.has("ambient") {
        temperature(reader, section, "ambient")
    } else {
        reader.note_default(section, "ambient", start_k, Kind::Temperature, "the wall's temperature at the start");
        start_k
    };
    let cooling = Cooling { bore_w_per_m2_k, outside_w_per_m2_k, ends_w_per_m2_k, ambient_k };
    if !cooling.cools()
        && !["bore", "outside", "ends"].iter().any(|w| section.table.has(&format!("{w}_film_coefficient")))
    {
        let why = "how well a face gives off heat to the air";
        reader.missing(section, "outside_film_coefficient", why, "outside_film_coefficient = \"10 W/(m2 K)\"");
    }
    cooling
}

fn read_duty(reader: &mut Reader, section: &Section<'_>) -> Option<Duty> {
    reader.check_words(section);
    let why = "from the start of one event to the next";
    let period = reader.required(section, "period", PERIOD, why, "period = \"20 s\"");
    let repeats = repeats(reader, section);
    Some(Duty { period_s: period?, repeats: repeats? })
}

/// A number of events, or `None` for as many as it takes; outer `None` where it is faulty.
fn repeats(reader: &mut Reader, section: &Section<'_>) -> Option<Option<u32>> {
    let Some(node) = section.table.get("repeats") else {
        let why = "until the temperatures no longer change".to_owned();
        reader.note(section, "repeats", ResolvedValue::Text(UNTIL_SETTLED.to_owned()), "", Origin::Default { why });
        return Some(None);
    };
    if let Value::Text(text) = &node.value {
        if text.trim() == UNTIL_SETTLED {
            return reader.choice(section, "repeats", &[UNTIL_SETTLED], "repeats = 30").map(|_| None);
        }
        let choices = vec![UNTIL_SETTLED.to_owned(), format!("a whole number from 1 to {MOST_STOPS}")];
        let nearest = crate::message::nearest(text, [UNTIL_SETTLED]).map(str::to_owned);
        let fault = CaseFault::UnknownChoice { word: "repeats".to_owned(), found: text.clone(), choices, nearest };
        reader.fault(node.place.clone(), fault);
        return None;
    }
    reader.count(section, "repeats", 1, MOST_STOPS).map(|n| u32::try_from(n).ok())
}

/// Cooling and duty belong to travel that heats the wall in events.
fn refuse_misfit(reader: &mut Reader, section: &Section<'_>, travel: Option<&Travel>) {
    let (label, is_duty) = (section.label, section.kind == "duty");
    let why = match travel {
        Some(Travel::Steady { .. }) => "settled fields in an endless wall heat it without end",
        Some(Travel::Alternating(_)) => "how warm alternating current makes a wall is not modelled yet",
        Some(Travel::Sine(_)) if is_duty => "a stroke goes on and on: duty repeats events that end",
        _ => return,
    };
    let laws = if is_duty { "traverse, free or table" } else { "traverse, free, sine or table" };
    let (words, mend) = (format!("{label} with this law"), format!("it goes with law {laws}"));
    reader.fault(section.place.clone(), CaseFault::Clash { words, why: why.to_owned(), mend });
}

/// What is known of a layer.
struct LayerReading {
    density: Option<f64>,
    specific_heat: Option<f64>,
    conduction: Option<f64>,
    coefficient: Option<f64>,
    melting_k: Option<f64>,
}

fn layer(reader: &mut Reader, section: &Section<'_>, start_k: f64) -> LayerReading {
    let grade = grade(reader, section);
    let grade = grade.as_deref();
    let density = number(reader, section, ("density", DENSITY), grade, |g| g.density_kg_per_m3.as_ref());
    let specific_heat =
        number(reader, section, ("specific_heat", SPECIFIC_HEAT), grade, |g| g.specific_heat_j_per_kg_k.as_ref());
    let conduction = number(reader, section, ("thermal_conductivity", CONDUCTION), grade, |g| {
        g.thermal_conductivity_w_per_m_k.as_ref()
    });
    let family = grade.map(|g| g.grade.family.as_str());
    let melting_k = MELTING_K.iter().find(|(metal, _)| Some(*metal) == family).map(|(_, t)| *t);
    let coefficient = coefficient_at(reader, section, start_k);
    LayerReading { density, specific_heat, conduction, coefficient, melting_k }
}

/// The layer's grade, without a word where it has none or a faulty one: that was said when its conductivity was read.
fn grade(reader: &Reader, section: &Section<'_>) -> Option<Arc<Conductor>> {
    let text = section.table.text("material")?;
    book().with(&reader.own_materials).conductor(text).ok()
}

/// A number of the layer: its own word, else the grade's.
fn number(
    reader: &mut Reader,
    section: &Section<'_>,
    (word, wanted): (&'static str, Wanted),
    grade: Option<&Conductor>,
    of: fn(&Conductor) -> Option<&BookNumber>,
) -> Option<f64> {
    if section.table.has(word) {
        return reader.quantity(section, word, wanted);
    }
    let grade = grade?;
    let known = of(grade)?;
    let full_name = grade.grade.full_name();
    note_book(reader, section, (word, known.typical, wanted.kind.si_unit()), &full_name, &known.source);
    Some(known.typical)
}

/// The temperature coefficient of resistivity referred to the wall's temperature: a / (1 + a (start - where a holds)).
fn coefficient_at(reader: &Reader, section: &Section<'_>, start_k: f64) -> Option<f64> {
    let read = |word: &str| reader.resolved.number(&[&section.path.join("."), word].join("."));
    let coefficient = read("temperature_coefficient")?;
    let own = section.table.has("temperature_coefficient") && section.table.has("conductivity");
    let at = if own { read("conductivity_at").unwrap_or(ROOM_K) } else { ROOM_K };
    let over = 1.0 + coefficient * (start_k - at);
    (over > 0.0).then(|| coefficient / over)
}

/// All layers, where everything needed is known; else what is missing is said, or refused where temperatures were asked for.
fn known_layers(
    reader: &mut Reader,
    wall: &WallReading<'_>,
    layers: &[LayerReading],
    asked: bool,
) -> Option<Vec<LayerHeat>> {
    let mut known = Vec::new();
    let mut lacking: Vec<String> = Vec::new();
    for (section, layer) in wall.layers.iter().zip(layers) {
        let name = section.path.last().cloned().unwrap_or_default();
        let mut missing = |word: &'static str, why: &'static str, example: &'static str| {
            if section.table.has(word) {
                return;
            }
            if asked {
                reader.missing(section, word, why, example);
            }
            lacking.push(format!("'{word}' of layer '{name}'"));
        };
        if layer.density.is_none() {
            missing("density", "how warm the wall gets; or name a material", "density = \"8940 kg/m3\"");
        }
        if layer.specific_heat.is_none() {
            missing("specific_heat", "how warm the wall gets; or name a material", "specific_heat = \"385 J/(kg K)\"");
        }
        if asked && layer.conduction.is_none() {
            let example = "thermal_conductivity = \"340 W/(m K)\"";
            missing("thermal_conductivity", "how heat spreads in the wall; or name a material", example);
        }
        if let (Some(density), Some(specific_heat)) = (layer.density, layer.specific_heat) {
            known.push(LayerHeat {
                density_kg_per_m3: density,
                specific_heat_j_per_kg_k: specific_heat,
                thermal_conductivity_w_per_m_k: layer.conduction,
                resistivity_coefficient_per_k: layer.coefficient,
                trusted_to_k: LINEAR_TO_K,
                melting_k: layer.melting_k,
            });
        }
    }
    if !lacking.is_empty() && !asked {
        reader.not_modelled.push(format!("how warm the wall gets: {} not known", lacking.join(", ")));
    }
    (lacking.is_empty() && known.len() == wall.wall.layers.len()).then_some(known)
}

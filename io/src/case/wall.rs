//! `[wall]` and its layers.

use lenzbore_solver::problem::{Extent, Layer, Quantity as Number, SensibleRange, Wall};

use super::names::{Names, name_of};
use super::reader::{Reader, Section, Wanted, wanted};
use super::sizes::{ACROSS, split_trade_size};
use super::temperature::{ROOM_K, caution_if_far, celsius, conductivity_at, temperature};
use super::tree::{Node, Value};
use crate::materials::{self, Conductor, GradeValue};
use crate::message::CaseFault;
use crate::units::Kind;

/// What `[wall]` says.
#[derive(Debug)]
pub(super) struct WallReading<'t> {
    pub section: Section<'t>,
    pub wall: Wall,
    /// One a layer of `wall`, in the same order.
    pub layers: Vec<Section<'t>>,
    /// `None` where the length could not be read.
    pub extent: Option<Extent>,
    /// Whether every layer could be read.
    pub complete: bool,
}

pub(super) const LENGTH: Wanted = wanted(Kind::Length, Number::Length);
pub(super) const POSITION: Wanted = wanted(Kind::Length, Number::Position);
pub(super) const HOLE: Wanted = wanted(Kind::Length, Number::InnerRadius);
pub(super) const COEFFICIENT: Wanted = Wanted {
    kind: Kind::TemperatureCoefficient,
    range: SensibleRange { lowest: 0.0, highest: 1.0, zero: true, signed: true },
};
const EXAMPLE: &str = "[[wall.layer]] with name, material and size = \"28 x 1.5 mm\"";

/// Reads the wall; `None` where there is none.
pub(super) fn read_wall<'t>(reader: &mut Reader, root: &Section<'t>) -> Option<WallReading<'t>> {
    if !root.table.has("wall") {
        reader.missing(root, "wall", "the conductor at rest", "[wall]");
    }
    let section = reader.table(root, "wall", "[wall]")?;
    reader.check_words(&section);
    let extent = extent(reader, &section);
    let warmth = temperature(reader, &section, "temperature");
    let sections = reader.tables(&section, "layer", EXAMPLE);
    if !section.table.has("layer") {
        reader.missing(&section, "layer", "a wall has at least one layer", EXAMPLE);
    }
    let mut names = Names::default();
    let (mut layers, mut kept) = (Vec::new(), Vec::new());
    let complete_before = reader.faults.len();
    for (i, mut layer) in sections.into_iter().enumerate() {
        let name = name_of(reader, &layer, "wall", format!("layer {}", i + 1), &mut names);
        layer.path = vec!["wall".to_owned(), name.clone()];
        let before = reader.faults.len();
        let read = read_layer(reader, &layer, name, extent, warmth);
        if let Some(read) = read.filter(|_| reader.faults.len() == before) {
            layers.push(read);
            kept.push(layer);
        }
    }
    let complete = reader.faults.len() == complete_before && !layers.is_empty();
    let wall = Wall { extent: extent.unwrap_or(Extent::Endless), layers }.with_faces_joined();
    Some(WallReading { section, wall, layers: kept, extent, complete })
}

fn extent(reader: &mut Reader, section: &Section<'_>) -> Option<Extent> {
    let example = "length = \"600 mm\", or length = \"endless\"";
    let Some(node) = section.table.get("length") else {
        reader.missing(section, "length", "the wall ends somewhere, or is endless", example);
        return None;
    };
    if let Value::Text(text) = &node.value {
        if text.trim() == "endless" {
            reader.note_text(section, "length", "endless");
            return Some(Extent::Endless);
        }
        if !text.contains(|c: char| c.is_ascii_digit()) {
            let near = crate::message::nearest(text, ["endless"]).map(str::to_owned);
            let choices = vec!["endless".to_owned(), "600 mm (any length)".to_owned()];
            let fault =
                CaseFault::UnknownChoice { word: "length".to_owned(), found: text.clone(), choices, nearest: near };
            reader.fault(node.place.clone(), fault);
            return None;
        }
    }
    reader.quantity(section, "length", LENGTH).map(|length_m| Extent::Finite { length_m })
}

fn read_layer(
    reader: &mut Reader,
    section: &Section<'_>,
    name: String,
    extent: Option<Extent>,
    warmth: f64,
) -> Option<Layer> {
    reader.check_words(section);
    let diameters = diameters(reader, section);
    let electric = material(reader, section, &name, warmth);
    let (from_m, to_m) = axial_extent(reader, section, extent);
    let ([inner, outer], (conductivity_s_per_m, relative_permeability)) = (diameters?, electric?);
    Some(Layer {
        name,
        inner_radius_m: 0.5 * inner,
        outer_radius_m: 0.5 * outer,
        from_m,
        to_m,
        conductivity_s_per_m,
        relative_permeability,
    })
}

/// Inner and outer diameter, m, from any two of the three sizes.
fn diameters(reader: &mut Reader, section: &Section<'_>) -> Option<[f64; 2]> {
    let given: Vec<&'static str> = ACROSS.into_iter().filter(|w| section.table.has(w)).collect();
    if section.table.has("size") {
        if let Some(word) = given.first() {
            let words = format!("'size' and '{word}'");
            let why = "the trade size gives outer diameter and thickness already".to_owned();
            let mend = format!("take out 'size' or '{word}'");
            reader.fault(section.place_of(word), CaseFault::Clash { words, why, mend });
            return None;
        }
        return trade_size(reader, section);
    }
    match given.as_slice() {
        [_, _, _] => {
            let words = "'inner_diameter', 'outer_diameter' and 'thickness'".to_owned();
            let why = "any two of the three sizes give the third".to_owned();
            let mend = "give two, the third follows".to_owned();
            reader.fault(section.place_of("thickness"), CaseFault::Clash { words, why, mend });
            None
        }
        [_, _] => two_sizes(reader, section),
        _ => {
            let lacking = if given.first() == Some(&"outer_diameter") { "thickness" } else { "outer_diameter" };
            let why = "two of inner_diameter, outer_diameter and thickness give the size";
            reader.missing(
                section,
                lacking,
                why,
                "size = \"28 x 1.5 mm\", or outer_diameter = \"28 mm\" and thickness = \"1.5 mm\"",
            );
            for word in given {
                reader.quantity(section, word, if word == "inner_diameter" { HOLE } else { LENGTH });
            }
            None
        }
    }
}

fn trade_size(reader: &mut Reader, section: &Section<'_>) -> Option<[f64; 2]> {
    let example = "size = \"28 x 1.5 mm\"";
    let text = reader.text(section, "size", example)?;
    let place = section.place_of("size");
    let Some((outer, thickness)) = split_trade_size(&text) else {
        let why = "a trade size is outer diameter x wall, with a unit";
        reader.fault(place, CaseFault::List { word: "size".to_owned(), why, example });
        return None;
    };
    let node = |text: String| Node { value: Value::Text(text), place: place.clone() };
    let thickness = reader.value(&node(thickness), "thickness of size", LENGTH)?;
    let outer = reader.value(&node(outer), "outer diameter of size", LENGTH)?;
    for (word, si) in [("outer_diameter", outer), ("thickness", thickness)] {
        let origin = reader.origin(&place);
        reader.note(section, word, super::resolved::ResolvedValue::Number(si), "m", origin);
    }
    inner_of(reader, section, outer, thickness).map(|inner| [inner, outer])
}

fn two_sizes(reader: &mut Reader, section: &Section<'_>) -> Option<[f64; 2]> {
    let inner = reader.quantity(section, "inner_diameter", HOLE);
    let outer = reader.quantity(section, "outer_diameter", LENGTH);
    let thickness = reader.quantity(section, "thickness", LENGTH);
    match (inner, outer, thickness) {
        (Some(inner), Some(outer), None) if !section.table.has("thickness") => {
            let from = "half the difference of outer and inner diameter";
            reader.note_follows(section, "thickness", 0.5 * (outer - inner), Kind::Length, from);
            Some([inner, outer])
        }
        (Some(inner), None, Some(thickness)) if !section.table.has("outer_diameter") => {
            let outer = inner + 2.0 * thickness;
            reader.note_follows(section, "outer_diameter", outer, Kind::Length, "inner diameter and thickness");
            Some([inner, outer])
        }
        (None, Some(outer), Some(thickness)) if !section.table.has("inner_diameter") => {
            inner_of(reader, section, outer, thickness).map(|inner| [inner, outer])
        }
        _ => None,
    }
}

/// The inner diameter that outer diameter and thickness leave; rounding beside 0 is 0.
fn inner_of(reader: &mut Reader, section: &Section<'_>, outer: f64, thickness: f64) -> Option<f64> {
    let inner = outer - 2.0 * thickness;
    let inner = if inner.abs() <= 1e-9 * outer { 0.0 } else { inner };
    if inner < 0.0 {
        let place = section.place_of_any(&["thickness", "size"]);
        let fault = CaseFault::Impossible {
            word: "thickness".to_owned(),
            found: reader.sources.written(&place),
            legal: format!("a wall of outer diameter {} mm is at most {} mm thick (a rod)", 1e3 * outer, 500.0 * outer),
            mend: None,
        };
        reader.fault(place, fault);
        return None;
    }
    reader.note_follows(section, "inner_diameter", inner, Kind::Length, "outer diameter and thickness");
    Some(inner)
}

/// Conductivity at the wall's temperature and relative permeability.
fn material(reader: &mut Reader, section: &Section<'_>, name: &str, warmth: f64) -> Option<(f64, f64)> {
    let (grade, named) = grade(reader, section);
    let which = grade_value(reader, section, named);
    let permeability = permeability(reader, section, grade);
    if let Some(caution) = grade.and_then(|g| g.caution.as_deref()).filter(|_| !section.table.has("conductivity")) {
        reader.cautions.push(format!("layer '{name}': {caution}"));
    }
    let given = section.table.has("conductivity");
    if !given && section.table.has("conductivity_at") {
        let words = "'conductivity_at' without 'conductivity'".to_owned();
        let why = "it says at which temperature a given conductivity holds; book values hold at 20 degC".to_owned();
        let mend = "give 'conductivity', or take 'conductivity_at' out".to_owned();
        reader.fault(section.place_of("conductivity_at"), CaseFault::Clash { words, why, mend });
        return None;
    }
    if !given && grade.is_none() {
        if !named {
            let why = "what the layer conducts: a grade of the material book as 'material', or the value itself";
            reader.missing(
                section,
                "conductivity",
                why,
                "material = \"copper Cu-DHP\", or conductivity = \"85 %IACS\"",
            );
        }
        return None;
    }
    let (value, value_at) = match grade.filter(|_| !given) {
        Some(g) => {
            let number = &g.conductivity_s_per_m;
            note_book(
                reader,
                section,
                ("conductivity", number.pick(which), "S/m"),
                &g.grade.full_name(),
                number.source_of(which),
            );
            (Some(number.pick(which)), ROOM_K)
        }
        None => {
            caution_if_overridden(reader, section, name);
            let value = reader.quantity(section, "conductivity", wanted(Kind::Conductivity, Number::Conductivity));
            (value, temperature(reader, section, "conductivity_at"))
        }
    };
    let coefficient = coefficient(reader, section, grade, value_at);
    let value = at_wall_temperature(reader, section, name, (value?, value_at), warmth, coefficient)?;
    Some((value, permeability?))
}

/// The grade, and whether a material was named at all.
fn grade(reader: &mut Reader, section: &Section<'_>) -> (Option<&'static Conductor>, bool) {
    let named = section.table.has("material");
    let Some(text) = reader.text(section, "material", "material = \"copper Cu-DHP\"") else { return (None, named) };
    match materials::conductor(&text) {
        Ok(grade) => {
            reader.note_text(section, "material", &grade.grade.full_name());
            (Some(grade), named)
        }
        Err(fault) => {
            reader.fault(section.place_of("material"), fault);
            (None, named)
        }
    }
}

/// Which of the grade's values is meant.
pub(super) fn grade_value(reader: &mut Reader, section: &Section<'_>, named: bool) -> GradeValue {
    if section.table.has("grade_value") && !named {
        let words = "'grade_value' without 'material'".to_owned();
        let why = "it picks one of a grade's values".to_owned();
        let mend = "name a material, or take 'grade_value' out".to_owned();
        reader.fault(section.place_of("grade_value"), CaseFault::Clash { words, why, mend });
    }
    let choices = ["minimum", "typical", "maximum"];
    match reader.choice(section, "grade_value", &choices, "grade_value = \"typical\"") {
        Some("minimum") => GradeValue::Minimum,
        Some("maximum") => GradeValue::Maximum,
        _ => GradeValue::Typical,
    }
}

/// Notes a number of the material book.
pub(super) fn note_book(
    reader: &mut Reader,
    section: &Section<'_>,
    (word, value, unit): (&str, f64, &'static str),
    grade: &str,
    source: &str,
) {
    let origin = super::resolved::Origin::Book { grade: grade.to_owned(), source: source.to_owned() };
    reader.note(section, word, super::resolved::ResolvedValue::Number(value), unit, origin);
}

fn permeability(reader: &mut Reader, section: &Section<'_>, grade: Option<&Conductor>) -> Option<f64> {
    if section.table.has("permeability") {
        return reader.quantity(section, "permeability", wanted(Kind::Ratio, Number::RelativePermeability));
    }
    match grade {
        Some(g) => {
            let number = &g.relative_permeability;
            note_book(reader, section, ("permeability", number.typical, ""), &g.grade.full_name(), &number.source);
            Some(number.typical)
        }
        None => {
            reader.note_default(section, "permeability", 1.0, Kind::Ratio, "not magnetic");
            Some(1.0)
        }
    }
}

/// A conductivity from one file stands against a material named in another.
fn caution_if_overridden(reader: &mut Reader, section: &Section<'_>, name: &str) {
    let (Some(material), Some(conductivity)) = (section.table.get("material"), section.table.get("conductivity"))
    else {
        return;
    };
    if material.place.source != conductivity.place.source {
        let text = format!(
            "layer '{name}': its conductivity ({}) stands, although its material was named elsewhere ({})",
            reader.sources.describe(&conductivity.place),
            reader.sources.describe(&material.place)
        );
        reader.cautions.push(text);
    }
}

/// The temperature coefficient of resistivity and the temperature at which it holds.
fn coefficient(
    reader: &mut Reader,
    section: &Section<'_>,
    grade: Option<&Conductor>,
    value_at: f64,
) -> Option<(f64, f64)> {
    if section.table.has("temperature_coefficient") {
        return reader.quantity(section, "temperature_coefficient", COEFFICIENT).map(|c| (c, value_at));
    }
    let g = grade?;
    let number = &g.temperature_coefficient_per_k;
    note_book(
        reader,
        section,
        ("temperature_coefficient", number.typical, "1/K"),
        &g.grade.full_name(),
        &number.source,
    );
    Some((number.typical, ROOM_K))
}

fn at_wall_temperature(
    reader: &mut Reader,
    section: &Section<'_>,
    name: &str,
    (value, value_at): (f64, f64),
    warmth: f64,
    coefficient: Option<(f64, f64)>,
) -> Option<f64> {
    let Some((coefficient, coefficient_at)) = coefficient else {
        if value > 0.0 && !section.table.has("temperature_coefficient") {
            reader.cautions.push(format!(
                "layer '{name}': without a temperature coefficient its conductivity is taken as constant, as it was at {}, and the wall is at {}",
                celsius(value_at),
                celsius(warmth)
            ));
        }
        return Some(value);
    };
    caution_if_far(reader, &format!("layer '{name}'"), warmth);
    match conductivity_at(value, value_at, warmth, coefficient, coefficient_at) {
        Some(in_use) => {
            let from = format!("conductivity and temperature coefficient, at {}", celsius(warmth));
            reader.note_follows(section, "conductivity_in_use", in_use, Kind::Conductivity, &from);
            Some(in_use)
        }
        None => {
            let fault = CaseFault::Impossible {
                word: "temperature_coefficient".to_owned(),
                found: format!("{coefficient} /K"),
                legal: format!(
                    "from {} to {} the resistivity would fall to zero or below",
                    celsius(value_at),
                    celsius(warmth)
                ),
                mend: None,
            };
            reader.fault(section.place_of_any(&["temperature_coefficient", "material"]), fault);
            None
        }
    }
}

/// Lower and upper end of a layer; the whole wall where it does not say.
fn axial_extent(reader: &mut Reader, section: &Section<'_>, extent: Option<Extent>) -> (f64, f64) {
    if extent == Some(Extent::Endless) {
        for word in ["from", "to"] {
            if section.table.has(word) {
                let words = format!("'{word}' in an endless wall");
                let why = "an endless wall has no sections".to_owned();
                let mend = "give the wall a length, or take 'from' and 'to' out".to_owned();
                reader.fault(section.place_of(word), CaseFault::Clash { words, why, mend });
            }
        }
        return (0.0, 0.0);
    }
    let length = match extent {
        Some(Extent::Finite { length_m }) => length_m,
        _ => 0.0,
    };
    let from = reader.quantity_or(section, "from", POSITION, 0.0, "the wall's lower end");
    let to = reader.quantity_or(section, "to", POSITION, length, "the wall's upper end");
    (from, to)
}

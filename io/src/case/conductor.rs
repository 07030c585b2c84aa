//! What a layer is made of: a grade of the material book or values of its own, at the wall's temperature.

use std::sync::Arc;

use lenzbore_solver::problem::Quantity as Number;

use super::measures::COEFFICIENT;
use super::reader::{Reader, Section, wanted};
use super::resolved::{Origin, ResolvedValue};
use super::temperature::{ROOM_K, caution_if_far, celsius, conductivity_at, temperature};
use crate::materials::{Conductor, GradeValue, Permeability, book};
use crate::message::CaseFault;
use crate::units::Kind;

/// Conductivity at the wall's temperature and relative permeability.
pub(super) fn material(reader: &mut Reader, section: &Section<'_>, name: &str, warmth: f64) -> Option<(f64, f64)> {
    let (grade, named) = grade(reader, section);
    let grade = grade.as_deref();
    let which = grade_value(reader, section, named);
    let permeability = permeability(reader, section, grade);
    if let Some(caution) = grade.and_then(|g| g.grade.caution.as_deref()).filter(|_| !section.table.has("conductivity"))
    {
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
fn grade(reader: &mut Reader, section: &Section<'_>) -> (Option<Arc<Conductor>>, bool) {
    let named = section.table.has("material");
    let Some(text) = reader.text(section, "material", "material = \"copper Cu-DHP\"") else { return (None, named) };
    match book().with(&reader.own_materials).conductor(&text) {
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
    let origin = Origin::Book { grade: grade.to_owned(), source: source.to_owned() };
    reader.note(section, word, ResolvedValue::Number(value), unit, origin);
}

fn permeability(reader: &mut Reader, section: &Section<'_>, grade: Option<&Conductor>) -> Option<f64> {
    if section.table.has("permeability") {
        return reader.quantity(section, "permeability", wanted(Kind::Ratio, Number::RelativePermeability));
    }
    match grade.map(|g| (g.grade.full_name(), &g.permeability)) {
        Some((grade, Permeability::Linear(number))) => {
            note_book(reader, section, ("permeability", number.typical, ""), &grade, &number.source);
            Some(number.typical)
        }
        Some((grade, Permeability::NotLinear(why))) => {
            let words = format!("'{grade}' without 'permeability'");
            let mend = "give 'permeability' (relative, linear), with the field in mind that the wall sees".to_owned();
            reader.fault(section.place_of("material"), CaseFault::Clash { words, why: why.clone(), mend });
            None
        }
        Some((_, Permeability::NotGiven)) | None => {
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
    let number = g.temperature_coefficient_per_k.as_ref()?;
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
            let taken = "without a temperature coefficient its conductivity is taken as constant";
            let (given, wall) = (celsius(value_at), celsius(warmth));
            reader.cautions.push(if given == wall {
                format!("layer '{name}': {taken}; it is taken to hold at the wall's {wall}, so nothing is lost here")
            } else {
                format!("layer '{name}': {taken}, as at {given}, and the wall is at {wall}")
            });
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

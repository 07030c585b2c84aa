//! The parts of the mover: magnets, spacers, dipoles and coils, each read on its own.

use std::sync::Arc;

use lenzbore_solver::problem::{Outline, Quantity as Number, SensibleRange};
use lenzbore_solver::sources::{North, Source, coated_magnet};

use super::coercivity::coercivity;
use super::conductor::{grade_value, note_book};
use super::measures::{COEFFICIENT, HOLE, LENGTH};
use super::reader::{Reader, Section, Wanted, unit_of, wanted};
use super::resolved::ResolvedValue;
use super::temperature::{ROOM_K, caution_if_far, celsius, remanence_at};
use crate::materials::{GradeValue, MagnetGrade, book};
use crate::message::CaseFault;
use crate::units::Kind;

/// What an entry of the mover is.
#[derive(Debug, Clone)]
pub(super) enum Body {
    /// A part with a field; `north` as its own word says, `recoil` its recoil permeability (1 for what is no magnet).
    Magnetic { source: Source, outline: Outline, north: North, recoil: f64, coercivity_a_per_m: Option<f64> },
    /// A length without field.
    Spacer { length_m: f64 },
    /// An entry that could not be read; its fault stands.
    Faulty,
}

impl Body {
    /// Its recoil permeability; 1 for what is no magnet.
    pub fn recoil(&self) -> f64 {
        if let Self::Magnetic { recoil, .. } = self { *recoil } else { 1.0 }
    }

    /// Coercivity of a magnet, A/m, where it is known.
    pub fn coercivity_a_per_m(&self) -> Option<f64> {
        if let Self::Magnetic { coercivity_a_per_m, .. } = self { *coercivity_a_per_m } else { None }
    }
}

const REMANENCE: Wanted = wanted(Kind::FluxDensity, Number::Remanence);
const TURNS: Wanted =
    Wanted { kind: Kind::Ratio, range: SensibleRange { lowest: 1e-3, highest: 1e7, zero: false, signed: false } };
const CURRENT: Wanted =
    Wanted { kind: Kind::Current, range: SensibleRange { lowest: 0.0, highest: 1e7, zero: true, signed: true } };

/// What taking a recoil permeability as 1 costs, from an own study of one damper.
const RECOIL_COST: &str = "if it is 1.05, the zero-speed damping coefficient comes out about 3.7 % too high (own study: 25/28 mm copper \
                           tube, magnet 22 x 12 mm)";

pub(super) fn read_magnet(reader: &mut Reader, section: &Section<'_>, name: &str, warmth: f64) -> Body {
    let sizes = body_sizes(reader, section);
    let coating = reader.quantity_or(section, "coating", HOLE, 0.0, "no coating");
    let grade = magnet_grade(reader, section);
    let (remanence, recoil) = remanence(reader, section, name, grade.as_deref(), warmth);
    let coercivity_a_per_m = coercivity(reader, section, name, grade.as_deref(), warmth);
    let north = match reader.choice(section, "north", &["up", "down"], "north = \"up\"") {
        Some("down") => North::Down,
        _ => North::Up,
    };
    if !section.table.has("north") {
        reader.note_text(section, "north", "up");
    }
    let (Some([inner, outer, length]), Some(remanence), Some(recoil)) = (sizes, remanence, recoil) else {
        return Body::Faulty;
    };
    match coated_magnet(0.5 * inner, 0.5 * outer, length, coating, remanence) {
        Some((source, outline)) => Body::Magnetic { source, outline, north, recoil, coercivity_a_per_m },
        None => {
            let place = section.place_of("coating");
            let fault = CaseFault::Impossible {
                word: "coating".to_owned(),
                found: reader.sources.written(&place),
                legal: "a coating is a side, and the sizes are over it: less than half the length and half the wall"
                    .to_owned(),
                mend: None,
            };
            reader.fault(place, fault);
            Body::Faulty
        }
    }
}

/// Inner diameter (0 where absent), outer diameter and length, m.
fn body_sizes(reader: &mut Reader, section: &Section<'_>) -> Option<[f64; 3]> {
    let inner = reader.quantity_or(section, "inner_diameter", HOLE, 0.0, "no hole");
    let outer =
        reader.required(section, "outer_diameter", LENGTH, "every part has a size", "outer_diameter = \"22 mm\"");
    let length = reader.required(section, "length", LENGTH, "every part has a length", "length = \"12 mm\"");
    let (outer, length) = (outer?, length?);
    if inner >= outer {
        let words = "'inner_diameter' and 'outer_diameter'".to_owned();
        let why = format!("a hole of {} mm does not fit into {} mm", 1e3 * inner, 1e3 * outer);
        let mend = "the inner diameter is the smaller one".to_owned();
        reader.fault(section.place_of("inner_diameter"), CaseFault::Clash { words, why, mend });
        return None;
    }
    Some([inner, outer, length])
}

/// Remanence at the mover's temperature, T, and recoil permeability.
fn remanence(
    reader: &mut Reader,
    section: &Section<'_>,
    name: &str,
    grade: Option<&MagnetGrade>,
    warmth: f64,
) -> (Option<f64>, Option<f64>) {
    let named = section.table.has("material");
    let which = grade_value(reader, section, named);
    let recoil = recoil(reader, section, name, grade);
    (remanence_of(reader, section, (name, warmth), (named, grade, which)), recoil)
}

fn remanence_of(
    reader: &mut Reader,
    section: &Section<'_>,
    (name, warmth): (&str, f64),
    (named, grade, which): (bool, Option<&MagnetGrade>, GradeValue),
) -> Option<f64> {
    let given = section.table.has("remanence");
    if !given && grade.is_none() {
        if !named {
            let why = "how strong the magnet is: a grade of the material book as 'material', or the value itself";
            reader.missing(section, "remanence", why, "material = \"NdFeB N42SH\", or remanence = \"1.30 T\"");
        }
        return None;
    }
    let value = match grade.filter(|_| !given) {
        Some(g) => Some(book_remanence(reader, section, g, which)),
        None => reader.quantity(section, "remanence", REMANENCE),
    };
    let coefficient = remanence_coefficient(reader, section, grade);
    if let Some(caution) = grade.and_then(|g| g.grade.caution.as_deref()).filter(|_| !given) {
        reader.cautions.push(format!("magnet '{name}': {caution}"));
    }
    let greatest = grade.and_then(|g| Some((g, g.greatest_temperature_k.as_ref()?)));
    if let Some((g, greatest)) = greatest.filter(|(_, t)| warmth > t.typical) {
        reader.cautions.push(format!(
            "magnet '{name}' at {}: {} is made for at most {} ({}) and may lose strength for good",
            celsius(warmth),
            g.grade.full_name(),
            celsius(greatest.typical),
            greatest.source
        ));
    }
    at_temperature(reader, section, name, value?, warmth, coefficient)
}

fn magnet_grade(reader: &mut Reader, section: &Section<'_>) -> Option<Arc<MagnetGrade>> {
    let text = reader.text(section, "material", "material = \"NdFeB N42SH\"")?;
    match book().with(&reader.own_materials).magnet(&text) {
        Ok(grade) => {
            reader.note_text(section, "material", &grade.grade.full_name());
            Some(grade)
        }
        Err(fault) => {
            reader.fault(section.place_of("material"), fault);
            None
        }
    }
}

fn book_remanence(reader: &mut Reader, section: &Section<'_>, g: &MagnetGrade, which: GradeValue) -> f64 {
    let number = &g.remanence_tesla;
    let value = number.pick(which);
    note_book(reader, section, ("remanence", value, "T"), &g.grade.full_name(), number.source_of(which));
    value
}

fn remanence_coefficient(reader: &mut Reader, section: &Section<'_>, grade: Option<&MagnetGrade>) -> Option<f64> {
    if section.table.has("remanence_coefficient") {
        return reader.quantity(section, "remanence_coefficient", COEFFICIENT);
    }
    let g = grade?;
    let number = g.remanence_coefficient_per_k.as_ref()?;
    note_book(reader, section, ("remanence_coefficient", number.typical, "1/K"), &g.grade.full_name(), &number.source);
    Some(number.typical)
}

fn at_temperature(
    reader: &mut Reader,
    section: &Section<'_>,
    name: &str,
    value: f64,
    warmth: f64,
    coefficient: Option<f64>,
) -> Option<f64> {
    let Some(coefficient) = coefficient else {
        if (warmth - ROOM_K).abs() > 1e-9 && !section.table.has("remanence_coefficient") {
            reader.cautions.push(format!(
                "magnet '{name}': without a coefficient its remanence at {} is taken as it is at 20 degC",
                celsius(warmth)
            ));
        }
        return Some(value);
    };
    caution_if_far(reader, &format!("magnet '{name}'"), warmth);
    match remanence_at(value, warmth, coefficient) {
        Some(in_use) => {
            let from = format!("remanence at 20 degC and its coefficient, at {}", celsius(warmth));
            reader.note_follows(section, "remanence_in_use", in_use, Kind::FluxDensity, &from);
            Some(in_use)
        }
        None => {
            let fault = CaseFault::Impossible {
                word: "remanence_coefficient".to_owned(),
                found: format!("{coefficient} /K"),
                legal: format!("at {} the remanence would fall to zero or below", celsius(warmth)),
                mend: None,
            };
            reader.fault(section.place_of_any(&["remanence_coefficient", "material"]), fault);
            None
        }
    }
}

/// The recoil permeability: given, else the grade's, else 1 with a caution.
fn recoil(reader: &mut Reader, section: &Section<'_>, name: &str, grade: Option<&MagnetGrade>) -> Option<f64> {
    let word = "recoil_permeability";
    if section.table.has(word) {
        return reader.quantity(section, word, wanted(Kind::Ratio, Number::RecoilPermeability));
    }
    if let Some((g, number)) = grade.and_then(|g| Some((g, g.recoil_permeability.as_ref()?))) {
        note_book(reader, section, (word, number.typical, ""), &g.grade.full_name(), &number.source);
        return Some(number.typical);
    }
    reader.note_default(section, word, 1.0, Kind::Ratio, "no grade says otherwise");
    reader.cautions.push(format!(
        "magnet '{name}': no recoil permeability is given or known of its grade, so it is taken as 1; {RECOIL_COST}"
    ));
    Some(1.0)
}

pub(super) fn read_spacer(reader: &mut Reader, section: &Section<'_>) -> Body {
    let length = reader.required(section, "length", LENGTH, "a spacer has a length", "length = \"4 mm\"");
    length.map_or(Body::Faulty, |length_m| Body::Spacer { length_m })
}

pub(super) fn read_dipole(reader: &mut Reader, section: &Section<'_>) -> Body {
    let moment = reader.required(
        section,
        "moment",
        wanted(Kind::Moment, Number::Moment),
        "a dipole has a moment",
        "moment = \"1.2 A m2\"",
    );
    let Some(moment_a_m2) = moment else { return Body::Faulty };
    let outline = Outline { inner_radius_m: 0.0, outer_radius_m: 0.0, length_m: 0.0 };
    let source = Source::Dipole { moment_a_m2 };
    Body::Magnetic { source, outline, north: North::Up, recoil: 1.0, coercivity_a_per_m: None }
}

pub(super) fn read_coil(reader: &mut Reader, section: &Section<'_>) -> Body {
    let sizes = body_sizes(reader, section);
    let turns = reader.required(section, "turns", TURNS, "turns times current make its field", "turns = 200");
    let current =
        reader.required(section, "current", CURRENT, "turns times current make its field", "current = \"2 A\"");
    let (Some([inner, outer, length_m]), Some(turns), Some(current)) = (sizes, turns, current) else {
        return Body::Faulty;
    };
    let ampere_turns = turns * current;
    let from = "turns times current";
    let origin = super::resolved::Origin::Follows { from: from.to_owned() };
    reader.note(section, "ampere_turns", ResolvedValue::Number(ampere_turns), unit_of(Kind::Current), origin);
    let (inner_radius_m, outer_radius_m) = (0.5 * inner, 0.5 * outer);
    Body::Magnetic {
        source: Source::Coil { inner_radius_m, outer_radius_m, length_m, ampere_turns },
        outline: Outline { inner_radius_m, outer_radius_m, length_m },
        north: North::Up,
        recoil: 1.0,
        coercivity_a_per_m: None,
    }
}

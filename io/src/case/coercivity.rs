//! Intrinsic coercivity of a magnet at the mover's temperature: against it stands the field that would demagnetise it.

use lenzbore_solver::problem::SensibleRange;

use super::conductor::note_book;
use super::measures::COEFFICIENT;
use super::reader::{Reader, Section, Wanted};
use super::temperature::{ROOM_K, celsius};
use crate::materials::MagnetGrade;
use crate::message::CaseFault;
use crate::units::Kind;

const HCJ: Wanted = Wanted {
    kind: Kind::FieldStrength,
    range: SensibleRange { lowest: 1e2, highest: 1e8, zero: false, signed: false },
};

/// HcJ at `warmth` (K) as the case gives it or the material book has it (the least that the grade is sold with), A/m; `None` where neither does.
pub(super) fn coercivity(
    reader: &mut Reader,
    section: &Section<'_>,
    name: &str,
    grade: Option<&MagnetGrade>,
    warmth: f64,
) -> Option<f64> {
    let value = if section.table.has("coercivity_hcj") {
        reader.quantity(section, "coercivity_hcj", HCJ)?
    } else {
        let number = grade?.coercivity_hcj_a_per_m.as_ref()?;
        note_book(
            reader,
            section,
            ("coercivity_hcj", number.typical, "A/m"),
            &grade?.grade.full_name(),
            &number.source,
        );
        number.typical
    };
    let Some(coefficient) = coefficient(reader, section, grade) else {
        if (warmth - ROOM_K).abs() > 1e-9 {
            reader.cautions.push(format!(
                "magnet '{name}': without a coefficient its coercivity at {} is taken as it is at 20 degC",
                celsius(warmth)
            ));
        }
        return Some(value);
    };
    let in_use = value * (1.0 + coefficient * (warmth - ROOM_K));
    if in_use <= 0.0 {
        let fault = CaseFault::Impossible {
            word: "coercivity_hcj_coefficient".to_owned(),
            found: format!("{coefficient} /K"),
            legal: format!("at {} the coercivity would fall to zero or below", celsius(warmth)),
            mend: None,
        };
        reader.fault(section.place_of_any(&["coercivity_hcj_coefficient", "coercivity_hcj", "material"]), fault);
        return None;
    }
    let from = format!("coercivity at 20 degC and its coefficient, at {}", celsius(warmth));
    reader.note_follows(section, "coercivity_hcj_in_use", in_use, Kind::FieldStrength, &from);
    Some(in_use)
}

fn coefficient(reader: &mut Reader, section: &Section<'_>, grade: Option<&MagnetGrade>) -> Option<f64> {
    if section.table.has("coercivity_hcj_coefficient") {
        return reader.quantity(section, "coercivity_hcj_coefficient", COEFFICIENT);
    }
    let grade = grade?;
    let number = grade.coercivity_hcj_coefficient_per_k.as_ref()?;
    let (name, value) = (grade.grade.full_name(), number.typical);
    note_book(reader, section, ("coercivity_hcj_coefficient", value, "1/K"), &name, &number.source);
    Some(value)
}

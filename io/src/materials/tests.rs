#![allow(
    clippy::unwrap_used,
    clippy::expect_used,
    clippy::float_cmp,
    clippy::panic,
    reason = "tests may stop at the first fault"
)]

use std::collections::{BTreeMap, BTreeSet};

use super::book::{FILES, read_book};
use super::*;
use crate::message::CaseFault;

mod own;
mod physics;

/// Every number of the book with the grade that has it.
fn all_numbers() -> Vec<(String, NumberWord, BookNumber)> {
    let conductors = book().conductors.iter().map(|c| (c.grade.full_name(), c.numbers()));
    let magnets = book().magnets.iter().map(|m| (m.grade.full_name(), m.numbers()));
    let all = conductors.chain(magnets);
    all.flat_map(|(name, n)| n.into_iter().map(move |(w, n)| (name.clone(), w, n.clone()))).collect()
}

#[test]
fn the_book_reads_and_every_grade_has_every_number() {
    let book = read_book().unwrap_or_else(|faults| panic!("{faults}"));
    assert!(book.conductors.len() >= 25 && book.magnets.len() >= 60);
    for c in &book.conductors {
        // A steel without linear permeability says why.
        let refused = matches!(c.permeability, Permeability::NotLinear(_));
        assert_eq!(c.numbers().len() + usize::from(refused), CONDUCTOR_NUMBERS.len(), "{}", c.grade.full_name());
    }
    for m in &book.magnets {
        assert_eq!(m.numbers().len(), MAGNET_NUMBERS.len(), "{}", m.grade.full_name());
        let range = [m.remanence_tesla.minimum, m.remanence_tesla.maximum];
        assert!(range.iter().all(Option::is_some), "{}", m.grade.full_name());
    }
}

/// Every number, so also those that reach a grade through a class: none is of unknown origin.
#[test]
fn a_source_says_how_its_number_was_obtained() {
    let numbers = all_numbers();
    assert!(numbers.len() > 700, "{}", numbers.len());
    for (grade, word, n) in numbers {
        for source in [&n.source, &n.range_source] {
            let read = source.split(|c: char| !c.is_alphabetic()).any(|w| w == "read");
            let told = read || ["from memory", "computed", "common practice"].iter().any(|w| source.contains(w));
            assert!(told && source.len() > 20, "{grade} {}: {source}", word.word);
        }
    }
}

#[test]
fn every_source_of_the_book_is_used() {
    for (label, text) in FILES {
        let raw: toml::Table = toml::from_str(text).unwrap();
        for id in raw["sources"].as_table().unwrap().keys() {
            assert!(text.contains(&format!("ource = \"{id}\"")), "{label}: {id}");
        }
    }
}

#[test]
fn names_are_distinct_across_the_book() {
    let mut seen = BTreeSet::new();
    for g in book().grades() {
        for name in g.also.iter().chain([&g.name]) {
            assert!(seen.insert(name.to_lowercase()), "{name} twice");
        }
    }
}

#[test]
fn the_families_of_the_trade_are_there() {
    let mut families: BTreeMap<&str, usize> = BTreeMap::new();
    for g in book().grades() {
        *families.entry(g.family.as_str()).or_default() += 1;
    }
    let least = [("copper", 5), ("aluminium", 10), ("brass", 2), ("bronze", 2), ("stainless", 3), ("steel", 3)];
    for (family, count) in least.into_iter().chain([("NdFeB", 40), ("SmCo", 8), ("ferrite", 4), ("AlNiCo", 2)]) {
        assert!(families[family] >= count, "{family}: {families:?}");
    }
    for grade in ["N35", "N35EH", "N42SH", "N48H", "N52", "SmCo5-20", "Sm2Co17-30", "Y30BH", "AlNiCo5"] {
        assert!(book().magnet(grade).is_ok(), "{grade}");
    }
}

#[test]
fn grades_are_found_under_the_names_people_use() {
    for (text, name) in [
        ("copper Cu-DHP", "Cu-DHP"),
        ("Cu-DHP", "Cu-DHP"),
        ("copper cu dhp", "Cu-DHP"),
        ("CW024A", "Cu-DHP"),
        ("Cu-OF", "Cu-OF"),
        ("CuCrZr", "CuCr1Zr"),
        ("aluminium 6061-T6", "6061-T6"),
        ("aluminum 6061-T6", "6061-T6"),
        ("1050A", "1050A-H14"),
        ("brass CuZn37", "CuZn37"),
        ("bronze CuAl10Ni", "CuAl10Ni5Fe4"),
        ("stainless 304", "304"),
        ("1.4301", "304"),
        ("316", "316L"),
        ("1.4404", "316L"),
        ("mild steel", "S235"),
    ] {
        assert_eq!(book().conductor(text).unwrap().grade.name, name, "{text}");
    }
    for (text, name) in
        [("NdFeB N42SH", "N42SH"), ("n52", "N52"), ("SmCo Sm2Co17-28", "Sm2Co17-28"), ("SmCo20", "SmCo5-20")]
    {
        assert_eq!(book().magnet(text).unwrap().grade.name, name, "{text}");
    }
}

#[test]
fn bare_metals_are_refused_with_their_grades() {
    for (text, first) in [
        ("copper", "copper Cu-ETP"),
        ("Cu", "copper Cu-ETP"),
        ("aluminum", "aluminium 1350"),
        ("phosphor bronze", "bronze CuSn8"),
        ("steel", "steel S235"),
    ] {
        let CaseFault::BareMaterial { grades, .. } = book().conductor(text).unwrap_err() else { panic!("{text}") };
        assert_eq!(grades[0], first);
    }
    for text in ["NdFeB", "neodymium", "SmCo", "SmCo5", "Sm2Co17", "ferrite", "AlNiCo"] {
        assert!(matches!(book().magnet(text), Err(CaseFault::BareMaterial { .. })), "{text}");
    }
}

#[test]
fn unknown_grades_get_the_nearest() {
    for (text, near) in [("copper Cu-DPH", "copper Cu-DHP"), ("6082-T7", "6082-T6"), ("coper Cu-ETP", "copper Cu-ETP")]
    {
        let CaseFault::UnknownMaterial { nearest, .. } = book().conductor(text).unwrap_err() else { panic!("{text}") };
        assert_eq!(nearest.as_deref(), Some(near));
    }
    assert!(matches!(book().conductor("N42"), Err(CaseFault::UnknownMaterial { wanted: "conductor", .. })));
    assert!(matches!(book().magnet("copper Cu-DHP"), Err(CaseFault::UnknownMaterial { wanted: "magnet", .. })));
    assert!(matches!(book().magnet(""), Err(CaseFault::UnknownMaterial { .. })));
}

#[test]
fn search_looks_into_names_standards_and_descriptions() {
    let found = |text: &str| book().search(text).grades().map(Grade::full_name).collect::<Vec<_>>();
    assert_eq!(found("plumbing"), ["copper Cu-DHP"]);
    assert!(found("n42").contains(&"NdFeB N42SH".to_owned()));
    assert_eq!(found("CW614N"), ["brass CuZn39Pb3"]);
    assert_eq!(found("EN 1057"), ["copper Cu-DHP"]);
    assert_eq!(found("EN12449"), ["copper Cu-DHP", "brass CuZn37", "bronze CuSn8"]);
    assert_eq!(found("tube copper phosphorus"), ["copper Cu-DHP"]);
    assert_eq!(found("unobtainium"), Vec::<String>::new());
    assert_eq!(found("").len(), book().grades().count());
}

#[test]
fn a_class_gives_what_the_row_leaves_out() {
    let (plain, hot) = (book().magnet("N35").unwrap(), book().magnet("N35SH").unwrap());
    assert_eq!(plain.greatest_temperature_c(), Some(80.0));
    assert_eq!(hot.greatest_temperature_c(), Some(150.0));
    assert_eq!(plain.remanence_tesla, hot.remanence_tesla);
    assert_eq!(plain.density_kg_per_m3, hot.density_kg_per_m3, "from the class that SH is like");
    let hcj = |m: &MagnetGrade| m.coercivity_hcj_a_per_m.clone().unwrap();
    assert!(hcj(&plain).is_least && hcj(&hot).is_least);
    // 12 and 20 kOe; 1 Oe = 1000/(4 pi) A/m.
    approx::assert_relative_eq!(hcj(&plain).typical, 954_929.7, max_relative = 1e-6);
    approx::assert_relative_eq!(hcj(&hot).typical, 1_591_549.4, max_relative = 1e-6);
    // N52 has its own, below its class's.
    assert!(hcj(&book().magnet("N52").unwrap()).typical < hcj(&plain).typical);
    assert!(book().magnet("Y30").unwrap().coercivity_hcj_coefficient_per_k.clone().unwrap().typical > 0.0);
}

#[test]
fn bounds_are_picked_with_their_sources() {
    let tube = book().conductor("Cu-DHP").unwrap();
    let sigma = &tube.conductivity_s_per_m;
    let picked = [GradeValue::Minimum, GradeValue::Typical, GradeValue::Maximum].map(|w| sigma.pick(w));
    assert_eq!(picked, [41.0e6, 46.4e6, 52.0e6]);
    let etp = book().conductor("Cu-ETP").unwrap();
    assert!(etp.conductivity_s_per_m.source_of(GradeValue::Typical).starts_with("IEC 60028"));
    assert!(etp.conductivity_s_per_m.source_of(GradeValue::Minimum).starts_with("handbook table"));
    let slope = etp.temperature_coefficient_per_k.as_ref().unwrap();
    assert_eq!(slope.pick(GradeValue::Maximum), slope.typical, "no bounds: the typical value");
    assert_eq!(slope.source_of(GradeValue::Maximum), slope.source);
}

//! A document of grades, the book's or a user's, to records: every fault at once, each with its place.

use std::sync::Arc;

use super::grade::{Book, Conductor, Grade, MagnetGrade, Permeability};
use super::lookup::same_name;
use super::number::{Numbers, number};
use super::shelf::{Row, Shelf};
use super::words::{
    CLASS_WORDS, CONDUCTOR_NUMBERS, CONDUCTOR_WORDS, FILE_WORDS, MAGNET_NUMBERS, MAGNET_WORDS, NumberWord,
};
use crate::case::parse::parse_document;
use crate::case::tree::{Table, Value};
use crate::message::{CaseFault, Diagnostic, Place, SourceKind, Sources};

/// Reads the grades of `text`; names that `known` has are refused. The text is added to `sources`.
pub(super) fn read_document(
    label: &str,
    text: &str,
    known: Option<&Book>,
    sources: &mut Sources,
) -> Result<Book, Vec<Diagnostic>> {
    let index = sources.add(label, text, SourceKind::File);
    let document = parse_document(text, index)?;
    let own = known.is_some();
    let mut shelf = Shelf { document: &document, sources, faults: Vec::new(), own, label: label.to_owned() };
    shelf.check_words(&document, "a file of materials", &[&FILE_WORDS]);
    check_sources(&mut shelf);
    let mut book = Book::default();
    let mut names = Vec::new();
    for (table, place) in shelf.rows(&document, "conductor") {
        let row = Row { table, place, label: "[[conductor]]" };
        if let Some(c) = conductor(&mut shelf, &row) {
            names.push((c.grade.clone(), name_place(&row)));
            book.conductors.push(Arc::new(c));
        }
    }
    check_classes(&mut shelf);
    for (table, place) in shelf.rows(&document, "magnet") {
        let row = Row { table, place, label: "[[magnet]]" };
        for m in magnets(&mut shelf, &row) {
            names.push((m.grade.clone(), name_place(&row)));
            book.magnets.push(Arc::new(m));
        }
    }
    check_names(&mut shelf, known, &names);
    if shelf.faults.is_empty() { Ok(book) } else { Err(shelf.faults) }
}

fn name_place(row: &Row<'_>) -> Place {
    row.table.get("name").map_or(row.place, |n| &n.place).clone()
}

fn check_sources(shelf: &mut Shelf<'_>) {
    let document = shelf.document;
    let Some(entry) = document.entry("sources") else { return };
    let Value::Table(table) = &entry.node.value else {
        let (found, wanted) = (entry.node.value.shape(), "a table of texts");
        let example = "[sources]\nsheet = \"the maker's data sheet of 2025\"";
        shelf.fault(&entry.word_place, CaseFault::WrongShape { word: entry.word.clone(), found, wanted, example });
        return;
    };
    for source in &table.entries {
        let silent = !matches!(&source.node.value, Value::Text(text) if !text.trim().is_empty());
        if silent {
            let (found, wanted) = (source.node.value.shape(), "a text that says where numbers come from");
            let example = "sheet = \"the maker's data sheet of 2025\"";
            let fault = CaseFault::WrongShape { word: source.word.clone(), found, wanted, example };
            shelf.fault(&source.node.place, fault);
        }
    }
}

fn grade(shelf: &mut Shelf<'_>, row: &Row<'_>) -> Option<Grade> {
    let family = shelf.text(row, "family");
    let name = shelf.text(row, "name");
    let example = if row.label == "[[magnet]]" { "family = \"NdFeB\"" } else { "family = \"copper\"" };
    for (word, why, example) in [
        ("family", "what the grades of one kind are called", example),
        ("name", "what a case file calls the grade", "name = \"Cu-DHP, batch 7\""),
    ] {
        if !row.table.has(word) {
            shelf.missing(row, word, why, example);
        }
    }
    let (also, standards) = (shelf.texts(row, "also"), shelf.texts(row, "standards"));
    let (about, caution) = (shelf.text(row, "about"), shelf.text(row, "caution"));
    let file = shelf.own.then(|| shelf.label.clone());
    Some(Grade { family: family?, name: name?, also, standards, about: about.unwrap_or_default(), caution, file })
}

/// The numbers found first in these tables, in their order.
fn numbers(shelf: &mut Shelf<'_>, words: &[NumberWord], tables: &[&Table]) -> Numbers {
    let mut numbers = Numbers::new();
    for word in words {
        let node = tables.iter().find_map(|t| t.get(word.word));
        if let Some(n) = node.and_then(|n| number(shelf, word, n)) {
            numbers.insert(word.word, n);
        }
    }
    numbers
}

fn words_of(numbers: &[NumberWord]) -> Vec<&'static str> {
    numbers.iter().map(|n| n.word).collect()
}

fn conductor(shelf: &mut Shelf<'_>, row: &Row<'_>) -> Option<Conductor> {
    shelf.check_words(row.table, row.label, &[&CONDUCTOR_WORDS, &words_of(&CONDUCTOR_NUMBERS)]);
    let grade = grade(shelf, row);
    let mut numbers = numbers(shelf, &CONDUCTOR_NUMBERS, &[row.table]);
    if !row.table.has("conductivity") {
        let why = "a conductor without it conducts nothing";
        shelf.missing(row, "conductivity", why, CONDUCTOR_NUMBERS[0].example);
    }
    let why = shelf.text(row, "not_linear");
    if row.table.has("permeability")
        && let Some(node) = row.table.get("not_linear")
    {
        let words = "'permeability' and 'not_linear'".to_owned();
        let why = "the second says why there is no linear permeability".to_owned();
        let mend = "take one of them out".to_owned();
        shelf.fault(&node.place, CaseFault::Clash { words, why, mend });
    }
    let permeability = match (numbers.remove("permeability"), why) {
        (Some(n), _) => Permeability::Linear(n),
        (None, Some(why)) => Permeability::NotLinear(why),
        (None, None) => Permeability::NotGiven,
    };
    Some(Conductor {
        grade: grade?,
        conductivity_s_per_m: numbers.remove("conductivity")?,
        temperature_coefficient_per_k: numbers.remove("temperature_coefficient"),
        permeability,
        density_kg_per_m3: numbers.remove("density"),
        specific_heat_j_per_kg_k: numbers.remove("specific_heat"),
        thermal_conductivity_w_per_m_k: numbers.remove("thermal_conductivity"),
    })
}

/// One grade for each class of the row; one where it has no classes.
fn magnets(shelf: &mut Shelf<'_>, row: &Row<'_>) -> Vec<MagnetGrade> {
    shelf.check_words(row.table, row.label, &[&MAGNET_WORDS, &words_of(&MAGNET_NUMBERS)]);
    let Some(grade) = grade(shelf, row) else { return Vec::new() };
    if !row.table.has("classes") {
        return magnet(shelf, row, grade, &[row.table]).into_iter().collect();
    }
    let mut magnets = Vec::new();
    for class in shelf.texts(row, "classes") {
        let Some(table) = class_of(shelf, row, "classes", &class) else { continue };
        let letters = table.get("letters").map_or(Some(class.as_str()), |_| table.text("letters"));
        let mut tables = vec![row.table, table];
        if let Some(base) = table.text("like") {
            let place = table.get("like").map_or(row.place, |n| &n.place);
            let class_row = Row { table, place, label: "[class]" };
            tables.extend(class_of(shelf, &class_row, "like", base));
        }
        let mut grade = grade.clone();
        grade.name.push_str(letters.unwrap_or_default());
        magnets.extend(magnet(shelf, row, grade, &tables));
    }
    magnets
}

fn magnet(shelf: &mut Shelf<'_>, row: &Row<'_>, grade: Grade, tables: &[&Table]) -> Option<MagnetGrade> {
    let mut numbers = numbers(shelf, &MAGNET_NUMBERS, tables);
    if !tables.iter().any(|t| t.has("remanence")) {
        let why = "a magnet without it has no field";
        shelf.missing(row, "remanence", why, MAGNET_NUMBERS[0].example);
    }
    Some(MagnetGrade {
        grade,
        remanence_tesla: numbers.remove("remanence")?,
        remanence_coefficient_per_k: numbers.remove("remanence_coefficient"),
        recoil_permeability: numbers.remove("recoil_permeability"),
        coercivity_hcb_a_per_m: numbers.remove("coercivity_hcb"),
        coercivity_hcj_a_per_m: numbers.remove("coercivity_hcj"),
        coercivity_hcj_coefficient_per_k: numbers.remove("coercivity_hcj_coefficient"),
        greatest_temperature_k: numbers.remove("greatest_temperature"),
        density_kg_per_m3: numbers.remove("density"),
        specific_heat_j_per_kg_k: numbers.remove("specific_heat"),
        thermal_conductivity_w_per_m_k: numbers.remove("thermal_conductivity"),
        conductivity_s_per_m: numbers.remove("conductivity"),
    })
}

fn check_classes(shelf: &mut Shelf<'_>) {
    let document = shelf.document;
    let Some(entry) = document.entry("class") else { return };
    let example = "[class.SH]";
    let classes = match &entry.node.value {
        Value::Table(table) => table.entries.as_slice(),
        other => {
            let (found, wanted) = (other.shape(), "tables of numbers by class");
            shelf.fault(&entry.word_place, CaseFault::WrongShape { word: "class".to_owned(), found, wanted, example });
            return;
        }
    };
    for class in classes {
        match &class.node.value {
            Value::Table(table) => {
                let label = format!("[class.{}]", class.word);
                shelf.check_words(table, &label, &[&CLASS_WORDS, &words_of(&MAGNET_NUMBERS)]);
            }
            other => {
                let (found, wanted) = (other.shape(), "a table of numbers");
                let fault = CaseFault::WrongShape { word: class.word.clone(), found, wanted, example };
                shelf.fault(&class.word_place, fault);
            }
        }
    }
}

/// The table of a class that `word` of the row names.
fn class_of<'t>(shelf: &mut Shelf<'t>, row: &Row<'_>, word: &str, name: &str) -> Option<&'t Table> {
    let document: &'t Table = shelf.document;
    let classes = document.table("class");
    let found = classes.and_then(|c| c.table(name));
    if found.is_none() {
        let names: Vec<String> = classes.map_or(&[][..], |c| &c.entries).iter().map(|e| e.word.clone()).collect();
        let nearest = crate::message::nearest(name, names.iter().map(String::as_str)).map(str::to_owned);
        let place = row.table.get(word).map_or(row.place, |n| &n.place);
        let fault = CaseFault::UnknownName { name: name.to_owned(), table: "[class]".to_owned(), names, nearest };
        shelf.fault(place, fault);
    }
    found
}

/// Two grades under one name would leave open which is meant.
fn check_names(shelf: &mut Shelf<'_>, known: Option<&Book>, names: &[(Grade, Place)]) {
    for (i, (grade, place)) in names.iter().enumerate() {
        let before = names[..i].iter().map(|(g, _)| g);
        let book = known.into_iter().flat_map(Book::grades);
        let Some(other) = before.chain(book).find(|g| same_name(g, grade)) else { continue };
        let owner = if other.file.is_some() { "this file" } else { "the material book" };
        let words = format!("the grade '{}'", grade.full_name());
        let why = format!("{owner} has '{}' under the same name", other.full_name());
        let mend = "give it a name of its own".to_owned();
        shelf.fault(place, CaseFault::Clash { words, why, mend });
    }
}

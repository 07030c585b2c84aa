//! Reads words of tables: shape, unit and range are checked, faults collected, values noted with their origin.

use std::collections::BTreeMap;

use lenzbore_solver::problem::{Quantity as Number, SensibleRange};

use super::resolved::{Origin, Resolved, ResolvedValue, ResolvedWord};
use super::tree::{Entry, Table, Value};
use super::words::{elsewhere, table_words};
use crate::materials::Book;
use crate::message::{CaseFault, Diagnostic, Place, SourceKind, Sources, nearest};
use crate::units::Kind;

/// Everything that is gathered while a case is read.
#[derive(Debug, Default)]
pub(super) struct Reader {
    pub sources: Sources,
    pub faults: Vec<Diagnostic>,
    pub cautions: Vec<String>,
    pub not_modelled: Vec<String>,
    pub resolved: Resolved,
    /// Grades of the case's own file of materials.
    pub own_materials: Book,
    /// Contents of the files that the case names, by the name as it stands there.
    pub kept_files: BTreeMap<String, String>,
}

/// A table, what messages call it, and the path of its words.
#[derive(Debug, Clone)]
pub(super) struct Section<'t> {
    pub table: &'t Table,
    /// Path in the vocabulary, as `wall.layer`.
    pub kind: &'static str,
    /// What messages call it.
    pub label: &'static str,
    /// Path of its words in the resolved case.
    pub path: Vec<String>,
    pub place: Place,
}

impl Section<'_> {
    /// Place of a word's value, or of the table where the word is absent.
    pub fn place_of(&self, word: &str) -> Place {
        self.table.get(word).map_or_else(|| self.place.clone(), |n| n.place.clone())
    }

    /// Place of the first of these words that is there, or of the table.
    pub fn place_of_any(&self, words: &[&str]) -> Place {
        words.iter().find_map(|w| self.table.get(w)).map_or_else(|| self.place.clone(), |n| n.place.clone())
    }

    /// Whether an unknown word of the table is most likely this one.
    pub fn misspells(&self, word: &str) -> bool {
        let legal = table_words(self.kind).map_or(&[][..], |t| t.words);
        let unknown = self.table.entries.iter().filter(|e| !legal.contains(&e.word.as_str()));
        unknown.into_iter().any(|e| nearest(&e.word, legal.iter().copied()) == Some(word))
    }

    fn path_of(&self, word: &str) -> Vec<String> {
        self.path.iter().cloned().chain([word.to_owned()]).collect()
    }
}

/// How a quantity is read: what it measures, and the range of sense.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Wanted {
    pub kind: Kind,
    pub range: SensibleRange,
}

/// Wants a quantity of `kind` within the sensible range of `number`.
pub(super) const fn wanted(kind: Kind, number: Number) -> Wanted {
    Wanted { kind, range: number.sensible() }
}

impl Reader {
    pub fn fault(&mut self, place: Place, fault: CaseFault) {
        self.faults.push(Diagnostic::at(place, fault));
    }

    /// Refuses words that the table does not have.
    pub fn check_words(&mut self, section: &Section<'_>) {
        let legal = table_words(section.kind).map_or(&[][..], |t| t.words);
        for entry in &section.table.entries {
            if !legal.contains(&entry.word.as_str()) {
                let fault = CaseFault::UnknownWord {
                    word: entry.word.clone(),
                    table: section.label.to_owned(),
                    nearest: nearest(&entry.word, legal.iter().copied()),
                    elsewhere: elsewhere(&entry.word, section.kind),
                    legal: legal.to_vec(),
                };
                self.fault(entry.word_place.clone(), fault);
            }
        }
    }

    pub fn not_modelled_yet(&mut self, entry: &Entry, what: &str, instead: Option<&str>) {
        let fault = CaseFault::NotModelled { what: what.to_owned(), instead: instead.map(str::to_owned) };
        self.fault(entry.word_place.clone(), fault);
    }

    /// A table below `section`; absent or of another shape gives `None`.
    pub fn table<'t>(&mut self, section: &Section<'t>, word: &str, example: &'static str) -> Option<Section<'t>> {
        let entry = section.table.entry(word)?;
        let Value::Table(table) = &entry.node.value else {
            self.wrong_shape(entry, "a table", example);
            return None;
        };
        Some(self.section(section, table, word, &entry.word_place))
    }

    /// A list of tables below `section`.
    pub fn tables<'t>(&mut self, section: &Section<'t>, word: &str, example: &'static str) -> Vec<Section<'t>> {
        let Some(entry) = section.table.entry(word) else { return Vec::new() };
        let Value::List(nodes) = &entry.node.value else {
            self.wrong_shape(entry, "a list of tables", example);
            return Vec::new();
        };
        let mut sections = Vec::new();
        for node in nodes {
            match &node.value {
                Value::Table(table) => sections.push(self.section(section, table, word, &node.place)),
                other => {
                    let (found, wanted) = (other.shape(), "a table");
                    let fault = CaseFault::WrongShape { word: word.to_owned(), found, wanted, example };
                    self.fault(node.place.clone(), fault);
                }
            }
        }
        sections
    }

    fn section<'t>(&self, above: &Section<'t>, table: &'t Table, word: &str, place: &Place) -> Section<'t> {
        let kind = if above.kind.is_empty() { word.to_owned() } else { format!("{}.{word}", above.kind) };
        let words = table_words(&kind);
        Section {
            table,
            kind: words.map_or("", |w| w.path),
            label: words.map_or("", |w| w.label),
            path: above.path_of(word),
            place: place.clone(),
        }
    }

    pub fn wrong_shape(&mut self, entry: &Entry, wanted: &'static str, example: &'static str) {
        let found = entry.node.value.shape();
        let place = match entry.node.value {
            Value::Table(_) => entry.word_place.clone(),
            _ => entry.node.place.clone(),
        };
        self.fault(place, CaseFault::WrongShape { word: entry.word.clone(), found, wanted, example });
    }

    /// Where a value at `place` comes from.
    pub fn origin(&self, place: &Place) -> Origin {
        let text = self.sources.written(place);
        match self.sources.text(place) {
            Some(source) if source.kind == SourceKind::Option => Origin::Override { text: source.text.clone() },
            _ => Origin::Given { place: self.sources.describe(place), text },
        }
    }

    /// Notes a resolved word.
    pub fn note(
        &mut self,
        section: &Section<'_>,
        word: &str,
        value: ResolvedValue,
        unit: &'static str,
        origin: Origin,
    ) {
        self.resolved.note(section.path_of(word), ResolvedWord { value, unit, origin });
    }

    /// Notes a number that follows from other words.
    pub fn note_follows(&mut self, section: &Section<'_>, word: &str, si: f64, kind: Kind, from: &str) {
        let origin = Origin::Follows { from: from.to_owned() };
        self.note(section, word, ResolvedValue::Number(si), unit_of(kind), origin);
    }

    /// Notes a default.
    pub fn note_default(&mut self, section: &Section<'_>, word: &str, si: f64, kind: Kind, why: &str) {
        let origin = Origin::Default { why: why.to_owned() };
        self.note(section, word, ResolvedValue::Number(si), unit_of(kind), origin);
    }

    /// Notes a list of numbers.
    pub fn note_numbers(&mut self, section: &Section<'_>, word: &'static str, numbers: &[f64], kind: Kind) {
        let origin = self.origin(&section.place_of(word));
        let list = numbers.iter().map(|n| ResolvedValue::Number(*n)).collect();
        self.note(section, word, ResolvedValue::List(list), unit_of(kind), origin);
    }
}

/// The unit noted beside a value.
pub(super) fn unit_of(kind: Kind) -> &'static str {
    if kind == Kind::Ratio { "" } else { kind.si_unit() }
}

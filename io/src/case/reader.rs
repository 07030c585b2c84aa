//! Reads words of tables: shape, unit and range are checked, faults collected, values noted with their origin.

use lenzbore_solver::problem::{Quantity as Number, SensibleRange};

use super::resolved::{Origin, Resolved, ResolvedValue, ResolvedWord};
use super::tree::{Entry, Node, Table, Value};
use super::words::{elsewhere, table_words};
use crate::message::{CaseFault, Diagnostic, Place, SourceKind, Sources, nearest};
use crate::units::{Kind, read_bare_number, read_quantity};

/// Everything that is gathered while a case is read.
#[derive(Debug, Default)]
pub(super) struct Reader {
    pub sources: Sources,
    pub faults: Vec<Diagnostic>,
    pub cautions: Vec<String>,
    pub not_modelled: Vec<String>,
    pub resolved: Resolved,
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

    fn path_of(&self, word: &str) -> Vec<String> {
        self.path.iter().cloned().chain([word.to_owned()]).collect()
    }
}

/// How a quantity is read: what it measures, and the range of sense.
#[derive(Debug, Clone, Copy)]
pub(super) struct Wanted {
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

    /// A quantity, if it is there and sound; faults are collected.
    pub fn quantity(&mut self, section: &Section<'_>, word: &'static str, wanted: Wanted) -> Option<f64> {
        let node = section.table.get(word)?;
        let si = self.value(node, word, wanted)?;
        let origin = self.origin(&node.place);
        self.note(section, word, ResolvedValue::Number(si), unit_of(wanted.kind), origin);
        Some(si)
    }

    /// A quantity that must be there.
    pub fn required(
        &mut self,
        section: &Section<'_>,
        word: &'static str,
        wanted: Wanted,
        why: &'static str,
        example: &'static str,
    ) -> Option<f64> {
        if !section.table.has(word) {
            self.missing(section, word, why, example);
        }
        self.quantity(section, word, wanted)
    }

    pub fn missing(&mut self, section: &Section<'_>, word: &'static str, why: &'static str, example: &'static str) {
        let fault = CaseFault::Missing { table: section.label.to_owned(), word, why, example };
        self.fault(section.place.clone(), fault);
    }

    /// A quantity, or its default where it is absent (or faulty: then the fault stands).
    pub fn quantity_or(
        &mut self,
        section: &Section<'_>,
        word: &'static str,
        wanted: Wanted,
        default: f64,
        why: &str,
    ) -> f64 {
        if section.table.has(word) {
            return self.quantity(section, word, wanted).unwrap_or(default);
        }
        self.note_default(section, word, default, wanted.kind, why);
        default
    }

    /// Reads one value to SI.
    pub fn value(&mut self, node: &Node, word: &str, wanted: Wanted) -> Option<f64> {
        let read = match &node.value {
            Value::Text(text) => read_quantity(text, wanted.kind),
            Value::Number(number) => read_bare_number(*number, wanted.kind),
            other => {
                let (found, example) = (other.shape(), example_of(wanted.kind));
                let fault = CaseFault::WrongShape { word: word.to_owned(), found, wanted: "a quantity", example };
                self.fault(node.place.clone(), fault);
                return None;
            }
        };
        let si = match read {
            Ok(quantity) => quantity.si,
            Err(fault) => {
                self.fault(node.place.clone(), CaseFault::Quantity { word: word.to_owned(), fault });
                return None;
            }
        };
        if !wanted.range.holds(si) {
            self.impossible(node, word, si, wanted);
            return None;
        }
        Some(si)
    }

    fn impossible(&mut self, node: &Node, word: &str, si: f64, wanted: Wanted) {
        let SensibleRange { lowest, highest, zero, signed } = wanted.range;
        let unit = wanted.kind.si_unit();
        let unit = if unit == "1" { String::new() } else { format!(" {unit}") };
        let legal = match (signed, zero) {
            (true, _) => format!("sensible: {}{unit} to {highest}{unit}", -highest),
            (false, true) if si < 0.0 => format!("it is 0 or greater, at most {highest}{unit}"),
            (false, false) if si <= 0.0 => format!("it is greater than 0, at most {highest}{unit}"),
            (false, true) => format!("sensible: 0, or {lowest}{unit} to {highest}{unit}"),
            (false, false) => format!("sensible: {lowest}{unit} to {highest}{unit}"),
        };
        let mend = match &node.value {
            Value::Number(_) if wanted.kind != Kind::Ratio => Some(format!(
                "a bare number is in {}: was a unit meant, as in {}?",
                wanted.kind.si_unit(),
                example_of(wanted.kind)
            )),
            _ => None,
        };
        let found = self.sources.written(&node.place);
        self.fault(node.place.clone(), CaseFault::Impossible { word: word.to_owned(), found, legal, mend });
    }

    /// A text, if it is there and a text.
    pub fn text(&mut self, section: &Section<'_>, word: &'static str, example: &'static str) -> Option<String> {
        let entry = section.table.entry(word)?;
        match &entry.node.value {
            Value::Text(text) => Some(text.clone()),
            // A bare number as typed on a shell can be meant as a text.
            Value::Number(_) if self.is_option(&entry.node.place) => Some(self.sources.written(&entry.node.place)),
            _ => {
                self.wrong_shape(entry, "a text", example);
                None
            }
        }
    }

    fn is_option(&self, place: &Place) -> bool {
        self.sources.text(place).is_some_and(|s| s.kind == SourceKind::Option)
    }

    /// Notes a text with its origin.
    pub fn note_text(&mut self, section: &Section<'_>, word: &'static str, text: &str) {
        let origin = match section.table.get(word) {
            Some(node) => self.origin(&node.place),
            None => Origin::Default { why: "default".to_owned() },
        };
        self.note(section, word, ResolvedValue::Text(text.to_owned()), "", origin);
    }

    /// One of several values; `None` where it is absent or none of them.
    pub fn choice(
        &mut self,
        section: &Section<'_>,
        word: &'static str,
        choices: &[&'static str],
        example: &'static str,
    ) -> Option<&'static str> {
        let text = self.text(section, word, example)?;
        let found = choices.iter().copied().find(|c| *c == text.trim());
        match found {
            Some(choice) => self.note_text(section, word, choice),
            None => {
                let fault = CaseFault::UnknownChoice {
                    word: word.to_owned(),
                    nearest: nearest(&text, choices.iter().copied()).map(str::to_owned),
                    found: text,
                    choices: choices.iter().map(|c| (*c).to_owned()).collect(),
                };
                self.fault(section.place_of(word), fault);
            }
        }
        found
    }

    /// A whole number from `least` to `most`.
    pub fn count(&mut self, section: &Section<'_>, word: &'static str, least: u32, most: u32) -> Option<usize> {
        let entry = section.table.entry(word)?;
        let number = match &entry.node.value {
            Value::Number(n) => *n,
            _ => {
                self.wrong_shape(entry, "a whole number", "points = 40");
                return None;
            }
        };
        let whole = (least..=most).find(|n| (f64::from(*n) - number).abs() <= 0.0);
        let Some(whole) = whole else {
            let found = self.sources.written(&entry.node.place);
            let legal = format!("a whole number from {least} to {most}");
            self.fault(
                entry.node.place.clone(),
                CaseFault::Impossible { word: word.to_owned(), found, legal, mend: None },
            );
            return None;
        };
        let origin = self.origin(&entry.node.place);
        self.note(section, word, ResolvedValue::Number(f64::from(whole)), "", origin);
        usize::try_from(whole).ok()
    }

    /// The nodes of a list.
    pub fn list<'t>(&mut self, section: &Section<'t>, word: &'static str, example: &'static str) -> Option<&'t [Node]> {
        let entry = section.table.entry(word)?;
        match &entry.node.value {
            Value::List(nodes) => Some(nodes),
            _ => {
                self.wrong_shape(entry, "a list", example);
                None
            }
        }
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

fn example_of(kind: Kind) -> &'static str {
    match kind {
        Kind::Length => "\"12 mm\"",
        Kind::Speed => "\"2 m/s\"",
        Kind::Temperature => "\"20 degC\"",
        Kind::Conductivity => "\"58 MS/m\"",
        Kind::TemperatureCoefficient => "\"0.0033 /K\"",
        Kind::FluxDensity => "\"1.3 T\"",
        Kind::Moment => "\"1.2 A m2\"",
        Kind::Current => "\"2 A\"",
        Kind::Mass => "\"0.42 kg\"",
        Kind::Time => "\"60 s\"",
        Kind::Acceleration => "\"9.80665 m/s2\"",
        Kind::Angle => "\"5 deg\"",
        Kind::Force => "\"0.5 N\"",
        Kind::AirDrag => "\"0.002 N s2/m2\"",
        Kind::SpringRate => "\"120 N/m\"",
        Kind::Ratio => "0.2",
        _ => "a number with its unit in quotes",
    }
}

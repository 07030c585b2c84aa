//! Values of words: quantities, texts, choices, counts and lists, each checked as it is read.

use lenzbore_solver::problem::SensibleRange;

use super::reader::{Reader, Section, Wanted, unit_of};
use super::resolved::{Origin, ResolvedValue};
use super::tree::{Node, Value};
use crate::explain::short;
use crate::message::{CaseFault, Place, SourceKind, nearest};
use crate::units::{Kind, read_bare_number, read_quantity};

impl Reader {
    /// A quantity, if it is there and sound; faults are collected.
    pub fn quantity(&mut self, section: &Section<'_>, word: &'static str, wanted: Wanted) -> Option<f64> {
        #[cfg(test)]
        crate::explain::assert_explained(section.kind, word, wanted.kind, wanted.range);
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

    /// Says that a word is missing, unless it is there with a slip, which has its own fault.
    pub fn missing(&mut self, section: &Section<'_>, word: &'static str, why: &'static str, example: &'static str) {
        if section.misspells(word) {
            return;
        }
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
            (true, _) => format!("sensible: {}{unit} to {}{unit}", short(-highest), short(highest)),
            (false, true) if si < 0.0 => format!("it is 0 or greater, at most {highest}{unit}"),
            (false, false) if si <= 0.0 => format!("it is greater than 0, at most {highest}{unit}"),
            (false, true) => format!("sensible: 0, or {}{unit} to {}{unit}", short(lowest), short(highest)),
            (false, false) => format!("sensible: {}{unit} to {}{unit}", short(lowest), short(highest)),
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
        Kind::Density => "\"8940 kg/m3\"",
        Kind::SpecificHeat => "\"385 J/(kg K)\"",
        Kind::ThermalConductivity => "\"340 W/(m K)\"",
        Kind::FilmCoefficient => "\"10 W/(m2 K)\"",
        Kind::Ratio => "0.2",
        _ => "a number with its unit in quotes",
    }
}

//! What is gathered while a document of grades is read: texts, faults, and how words and shapes are checked.

use crate::case::tree::{Node, Table, Value};
use crate::message::{CaseFault, Diagnostic, Place, Sources, nearest};

/// One document being read.
pub(super) struct Shelf<'t> {
    pub document: &'t Table,
    pub sources: &'t mut Sources,
    pub faults: Vec<Diagnostic>,
    /// Whether it is a user's file.
    pub own: bool,
    /// What messages call the file.
    pub label: String,
}

/// A table of the document, where it stands, and what messages call it.
pub(super) struct Row<'t> {
    pub table: &'t Table,
    pub place: &'t Place,
    pub label: &'t str,
}

impl Shelf<'_> {
    pub fn fault(&mut self, place: &Place, fault: CaseFault) {
        self.faults.push(Diagnostic::at(place.clone(), fault));
    }

    pub fn missing(&mut self, row: &Row<'_>, word: &'static str, why: &'static str, example: &'static str) {
        let table = row.label.to_owned();
        self.fault(row.place, CaseFault::Missing { table, word, why, example });
    }

    /// Refuses words that are in none of the lists.
    pub fn check_words(&mut self, table: &Table, label: &str, legal: &[&[&'static str]]) {
        for entry in &table.entries {
            if legal.iter().any(|l| l.contains(&entry.word.as_str())) {
                continue;
            }
            let legal: Vec<&'static str> = legal.concat();
            let fault = CaseFault::UnknownWord {
                word: entry.word.clone(),
                table: label.to_owned(),
                nearest: nearest(&entry.word, legal.iter().copied()),
                elsewhere: None,
                legal,
            };
            self.fault(&entry.word_place, fault);
        }
    }

    /// A text that says something; absent gives `None`.
    pub fn text(&mut self, row: &Row<'_>, word: &'static str) -> Option<String> {
        let node = row.table.get(word)?;
        self.said(node, word)
    }

    /// A list of texts; absent gives an empty one.
    pub fn texts(&mut self, row: &Row<'_>, word: &'static str) -> Vec<String> {
        let Some(node) = row.table.get(word) else { return Vec::new() };
        match &node.value {
            Value::List(nodes) => nodes.iter().filter_map(|n| self.said(n, word)).collect(),
            other => {
                self.shape(node, word, other.shape(), "a list of texts");
                Vec::new()
            }
        }
    }

    fn said(&mut self, node: &Node, word: &'static str) -> Option<String> {
        let found = match &node.value {
            Value::Text(text) if text.trim().is_empty() => "an empty text",
            Value::Text(text) => return Some(text.trim().to_owned()),
            other => other.shape(),
        };
        self.shape(node, word, found, "a text that says something");
        None
    }

    fn shape(&mut self, node: &Node, word: &'static str, found: &'static str, wanted: &'static str) {
        let example = match word {
            "also" => "also = [\"CW024A\"]",
            "standards" => "standards = [\"EN 12449\"]",
            "classes" => "classes = [\"M\", \"H\"]",
            "source" | "range_source" => "source = \"measured on the batch, four points\"",
            _ => "name = \"Cu-DHP, batch 7\"",
        };
        self.fault(&node.place, CaseFault::WrongShape { word: word.to_owned(), found, wanted, example });
    }

    /// The tables of a list of tables.
    pub fn rows<'d>(&mut self, document: &'d Table, word: &'static str) -> Vec<(&'d Table, &'d Place)> {
        let Some(entry) = document.entry(word) else { return Vec::new() };
        let example = if word == "conductor" { "[[conductor]]" } else { "[[magnet]]" };
        let wanted = "a list of tables";
        let Value::List(nodes) = &entry.node.value else {
            let found = entry.node.value.shape();
            let fault = CaseFault::WrongShape { word: word.to_owned(), found, wanted, example };
            self.fault(&entry.word_place, fault);
            return Vec::new();
        };
        let mut rows = Vec::new();
        for node in nodes {
            match &node.value {
                Value::Table(table) => rows.push((table, &node.place)),
                other => {
                    let found = other.shape();
                    let fault = CaseFault::WrongShape { word: word.to_owned(), found, wanted, example };
                    self.fault(&node.place, fault);
                }
            }
        }
        rows
    }
}

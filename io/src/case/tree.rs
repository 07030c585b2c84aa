//! A case file as a tree of words and values, each with the place it was written at.

use crate::message::Place;

/// A value and where it stands.
#[derive(Debug, Clone, PartialEq)]
pub(crate) struct Node {
    pub value: Value,
    pub place: Place,
}

/// What a value can be.
#[derive(Debug, Clone, PartialEq)]
pub(crate) enum Value {
    Text(String),
    Number(f64),
    Flag(bool),
    Date,
    List(Vec<Node>),
    Table(Table),
}

impl Value {
    /// What it is called in messages.
    pub fn shape(&self) -> &'static str {
        match self {
            Self::Text(_) => "a text",
            Self::Number(_) => "a number",
            Self::Flag(_) => "true or false",
            Self::Date => "a date",
            Self::List(_) => "a list",
            Self::Table(_) => "a table",
        }
    }
}

/// One word of a table with its value.
#[derive(Debug, Clone, PartialEq)]
pub(crate) struct Entry {
    pub word: String,
    pub word_place: Place,
    pub node: Node,
}

/// Words in the order in which they were read.
#[derive(Debug, Clone, PartialEq, Default)]
pub(crate) struct Table {
    pub entries: Vec<Entry>,
}

impl Table {
    pub fn entry(&self, word: &str) -> Option<&Entry> {
        self.entries.iter().find(|e| e.word == word)
    }

    pub fn get(&self, word: &str) -> Option<&Node> {
        self.entry(word).map(|e| &e.node)
    }

    pub fn has(&self, word: &str) -> bool {
        self.entry(word).is_some()
    }

    pub fn text(&self, word: &str) -> Option<&str> {
        match &self.get(word)?.value {
            Value::Text(text) => Some(text),
            _ => None,
        }
    }

    pub fn table(&self, word: &str) -> Option<&Table> {
        match &self.get(word)?.value {
            Value::Table(table) => Some(table),
            _ => None,
        }
    }

    /// The tables of a list of tables (elements of other shapes are left out).
    pub fn tables(&self, word: &str) -> impl Iterator<Item = &Table> {
        let nodes = match self.get(word).map(|n| &n.value) {
            Some(Value::List(nodes)) => nodes.as_slice(),
            _ => &[],
        };
        nodes.iter().filter_map(|n| match &n.value {
            Value::Table(table) => Some(table),
            _ => None,
        })
    }

    /// Sets a word, in place of its old value where it has one.
    pub fn put(&mut self, entry: Entry) {
        match self.entries.iter_mut().find(|e| e.word == entry.word) {
            Some(old) => *old = entry,
            None => self.entries.push(entry),
        }
    }

    pub fn remove(&mut self, word: &str) -> Option<Entry> {
        let index = self.entries.iter().position(|e| e.word == word)?;
        Some(self.entries.remove(index))
    }
}

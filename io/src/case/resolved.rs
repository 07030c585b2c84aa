//! The resolved case: every word with its value in SI, its unit, and where it comes from.

use std::collections::BTreeMap;

use serde_json::{Map, Value as Json, json};
use sha2::{Digest, Sha256};

/// A resolved value.
#[derive(Debug, Clone, PartialEq)]
pub enum ResolvedValue {
    /// A number in the unit beside it.
    Number(f64),
    /// A text.
    Text(String),
    /// Several values.
    List(Vec<ResolvedValue>),
}

impl ResolvedValue {
    fn json(&self) -> Json {
        match self {
            Self::Number(n) => json!(n),
            Self::Text(t) => json!(t),
            Self::List(l) => l.iter().map(Self::json).collect(),
        }
    }
}

/// Where a value comes from.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Origin {
    /// Written in a case file.
    Given {
        /// `sleeve.toml:12:13`.
        place: String,
        /// As written.
        text: String,
    },
    /// Set on the command line.
    Override {
        /// As written.
        text: String,
    },
    /// From the material book.
    Book {
        /// The grade.
        grade: String,
        /// The source that the book names.
        source: String,
    },
    /// A default.
    Default {
        /// Which.
        why: String,
    },
    /// Follows from other words.
    Follows {
        /// From which.
        from: String,
    },
}

impl Origin {
    fn json(&self) -> Json {
        match self {
            Self::Given { place, text } => json!({"from": "given", "place": place, "text": text}),
            Self::Override { text } => json!({"from": "--set", "text": text}),
            Self::Book { grade, source } => json!({"from": "material book", "grade": grade, "source": source}),
            Self::Default { why } => json!({"from": "default", "why": why}),
            Self::Follows { from } => json!({"from": "other words", "how": from}),
        }
    }
}

/// One resolved word.
#[derive(Debug, Clone, PartialEq)]
pub struct ResolvedWord {
    /// Its value, SI.
    pub value: ResolvedValue,
    /// SI unit; empty for texts and pure numbers.
    pub unit: &'static str,
    /// Where it comes from.
    pub origin: Origin,
}

/// Every word of a case, by its path (`wall`, `sleeve`, `thickness`).
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Resolved {
    words: BTreeMap<Vec<String>, ResolvedWord>,
}

impl Resolved {
    /// Notes a word; a word noted twice keeps the later value.
    pub(super) fn note(&mut self, path: Vec<String>, word: ResolvedWord) {
        self.words.insert(path, word);
    }

    /// A word by its path as `--set` writes it, without quotes: `wall.sleeve.thickness`.
    #[must_use]
    pub fn get(&self, path: &str) -> Option<&ResolvedWord> {
        self.words.iter().find(|(p, _)| p.join(".") == path).map(|(_, w)| w)
    }

    /// A number by its path.
    #[must_use]
    pub fn number(&self, path: &str) -> Option<f64> {
        match self.get(path)?.value {
            ResolvedValue::Number(n) => Some(n),
            _ => None,
        }
    }

    /// All words in the order of their paths.
    pub fn words(&self) -> impl Iterator<Item = (&[String], &ResolvedWord)> {
        self.words.iter().map(|(p, w)| (p.as_slice(), w))
    }

    /// Nested by table and name; every word as `{value, unit, origin}`.
    #[must_use]
    pub fn to_json(&self) -> Json {
        let mut root = Map::new();
        for (path, word) in &self.words {
            let leaf = json!({"value": word.value.json(), "unit": word.unit, "origin": word.origin.json()});
            insert(&mut root, path, leaf);
        }
        Json::Object(root)
    }

    /// SHA-256, in hexadecimal digits, of the words in the order of their paths, each with its value in SI and its
    /// unit. Where a value was written, and in which unit, does not change it; values that follow from others are left
    /// out; title and record are in.
    #[must_use]
    pub fn digest(&self) -> String {
        let inputs: Vec<Json> = self
            .words
            .iter()
            .filter(|(_, w)| !matches!(w.origin, Origin::Follows { .. }))
            .map(|(path, w)| json!([path, w.value.json(), w.unit]))
            .collect();
        let hash = Sha256::digest(Json::Array(inputs).to_string().as_bytes());
        hash.iter().map(|byte| format!("{byte:02x}")).collect()
    }
}

/// Puts a leaf below its tables.
fn insert(tables: &mut Map<String, Json>, path: &[String], leaf: Json) {
    match path {
        [] => {}
        [word] => {
            tables.insert(word.clone(), leaf);
        }
        [table, below @ ..] => {
            let inner = tables.entry(table.clone()).or_insert_with(|| Json::Object(Map::new()));
            if let Json::Object(inner) = inner {
                insert(inner, below, leaf);
            }
        }
    }
}

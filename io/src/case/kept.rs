//! The case as a result keeps it: one TOML text with base files and overrides laid in, and the contents of every file that it
//! names, so that it can be read again without any of them.

use std::collections::BTreeMap;

use serde_json::{Value as Json, json};

use super::tree::{Table, Value};

/// A case that needs no file beside it.
#[derive(Debug, Clone, PartialEq, Eq, Default)]
pub struct KeptCase {
    /// The words of the case, base files and overrides laid in.
    pub toml: String,
    /// Contents of the files that it names, by the name as it stands in the case.
    pub files: BTreeMap<String, String>,
}

impl KeptCase {
    /// As it stands in `summary.json`.
    #[must_use]
    pub fn to_json(&self) -> Json {
        json!({"toml": self.toml, "files": self.files})
    }

    /// Reads what [`Self::to_json`] has written; `None` where it is something else.
    #[must_use]
    pub fn from_json(json: &Json) -> Option<Self> {
        let text = |value: &Json| value.as_str().map(str::to_owned);
        let files = json.get("files")?.as_object()?;
        let files = files.iter().map(|(name, content)| Some((name.clone(), text(content)?)));
        Some(Self { toml: text(json.get("toml")?)?, files: files.collect::<Option<_>>()? })
    }
}

/// The words as TOML.
pub(super) fn toml_text(tree: &Table) -> String {
    toml::to_string(&of_table(tree)).unwrap_or_default()
}

fn of_table(table: &Table) -> toml::Table {
    table.entries.iter().filter_map(|e| Some((e.word.clone(), of_value(&e.node.value)?))).collect()
}

/// No word of a case is a date.
fn of_value(value: &Value) -> Option<toml::Value> {
    Some(match value {
        Value::Text(text) => toml::Value::String(text.clone()),
        Value::Number(number) => of_number(*number),
        Value::Flag(flag) => toml::Value::Boolean(*flag),
        Value::List(nodes) => toml::Value::Array(nodes.iter().filter_map(|n| of_value(&n.value)).collect()),
        Value::Table(table) => toml::Value::Table(of_table(table)),
        Value::Date => return None,
    })
}

/// A whole number without its point.
fn of_number(number: f64) -> toml::Value {
    let whole = number.abs() < 1.0e15 && number.fract().abs() <= 0.0;
    match format!("{number:.0}").parse() {
        Ok(integer) if whole => toml::Value::Integer(integer),
        _ => toml::Value::Float(number),
    }
}

//! JSON Schema (2020-12) of the case file, for completion and checks in editors; made of the tables of words and their
//! explanations, so that it cannot fall behind them.
//!
//! ```
//! let schema = lenzbore_io::schema::case_schema();
//! assert_eq!(schema["$schema"], "https://json-schema.org/draft/2020-12/schema");
//! assert_eq!(schema["properties"]["wall"]["properties"]["layer"]["type"], "array");
//! ```

mod form;
#[cfg(test)]
mod tests;

use serde_json::{Map, Value, json};

use crate::case::{LAWS, TABLES, TableWords};
use crate::explain::{CaseWord, Form, case_table, case_word};
use form::form_schema;

/// The schema of a case file.
///
/// It knows every word, its shape, its choices, and the words of each law of travel. What ties words together (two of three
/// sizes, a magnet that fits the bore) the reader alone checks. A quantity is a text that begins with a number, or a bare
/// number.
#[must_use]
pub fn case_schema() -> Value {
    let mut top = Map::new();
    top.insert("$schema".to_owned(), json!("https://json-schema.org/draft/2020-12/schema"));
    top.insert("title".to_owned(), json!("lenzbore case file"));
    if let Some(root) = TABLES.iter().find(|t| t.path.is_empty()) {
        top.extend(table_schema(root));
    }
    top.insert("anyOf".to_owned(), json!([{"required": ["like"]}, {"required": ["wall", "mover"]}]));
    top.insert("$defs".to_owned(), json!({"tolerance": form::tolerance()}));
    Value::Object(top)
}

/// The entries of one table's schema.
fn table_schema(table: &TableWords) -> Map<String, Value> {
    let mut entries = Map::new();
    entries.insert("type".to_owned(), json!("object"));
    if let Some(about) = case_table(table.path) {
        entries.insert("description".to_owned(), json!(about.about));
    }
    let properties = table.words.iter().map(|word| ((*word).to_owned(), word_schema(table.path, word)));
    entries.insert("properties".to_owned(), Value::Object(properties.collect()));
    entries.insert("additionalProperties".to_owned(), json!(false));
    if table.path == "travel" {
        entries.insert("allOf".to_owned(), laws());
    }
    entries
}

/// One word: a table of its own, a list of them, or a value.
fn word_schema(path: &str, word: &str) -> Value {
    let below = if path.is_empty() { word.to_owned() } else { format!("{path}.{word}") };
    let about = case_word(path, word);
    if let Some(table) = TABLES.iter().find(|t| t.path == below) {
        let inner = Value::Object(table_schema(table));
        let is_list = TABLES.iter().any(|t| t.path == path && t.lists.contains(&word));
        return if is_list { json!({"type": "array", "items": inner, "description": text(about)}) } else { inner };
    }
    let mut value = about.map_or_else(Map::new, |w| form_schema(&w.form));
    value.insert("description".to_owned(), json!(text(about)));
    if let Some(example) = about.and_then(example) {
        value.insert("examples".to_owned(), json!([example]));
    }
    Value::Object(value)
}

/// What an editor shows beside the word.
fn text(word: Option<&CaseWord>) -> String {
    let Some(word) = word else { return String::new() };
    match word.form {
        Form::Table | Form::Tables => word.about.to_owned(),
        _ => format!("{}\nTakes {}.\nWhere absent: {}.", word.about, word.form.words(), word.absent),
    }
}

/// The value of the example line.
fn example(word: &CaseWord) -> Option<Value> {
    let table: Map<String, Value> = toml::from_str(word.example).ok()?;
    table.get(word.word).cloned()
}

/// Each law allows its own words beside `law`.
fn laws() -> Value {
    let one = |law: &str, words: &[&str]| {
        let allowed: Vec<&str> = std::iter::once("law").chain(words.iter().copied()).collect();
        json!({
            "if": {"properties": {"law": {"const": law}}, "required": ["law"]},
            "then": {"propertyNames": {"enum": allowed}},
        })
    };
    LAWS.iter().map(|l| one(l.law, l.words)).collect()
}

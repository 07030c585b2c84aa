//! Record, versions, and the whole case as it was resolved.

use serde_json::{Map, Value};

use super::Section;
use crate::report::escape::text;
use crate::report::numbers::significant;
use crate::report::source::Source;
use crate::report::table::{Cell, HtmlTable};

/// The section; every result has a program and a digest.
pub(super) fn section(source: &Source) -> Option<Section> {
    let mut table = HtmlTable::new("Record", &["entry", "text"]);
    for (key, value) in source.part("record").and_then(Value::as_object).into_iter().flatten() {
        table.row(&[Cell::Text(crate::report::words::plain(key)), Cell::text(value.as_str().unwrap_or(""))]);
    }
    let program = source.part("program");
    let of = |key: &str| program.and_then(|p| p.get(key)).and_then(Value::as_str).unwrap_or("");
    table.row(&[Cell::text("Program"), Cell::Text(format!("{} {}", of("name"), of("version")))]);
    table.row(&[Cell::text("Digest of the case"), Cell::text(source.text("digest"))]);
    table.row(&[Cell::text("The run ended"), Cell::text(source.text("stop"))]);
    let resolved = source.part("resolved").and_then(Value::as_object).map(resolved).unwrap_or_default();
    Some(Section::new("record", "Record and resolved case", format!("{}{resolved}", table.html())))
}

/// Every word of the case with its value and where it comes from.
fn resolved(words: &Map<String, Value>) -> String {
    let mut table = HtmlTable::new("The resolved case", &["word", "value", "unit", "comes from"]);
    let mut rows = Vec::new();
    collect(words, "", &mut rows);
    for (word, leaf) in &rows {
        let unit = leaf.get("unit").and_then(Value::as_str).unwrap_or("");
        let value = leaf.get("value").map_or_else(String::new, shown);
        let origin = leaf.get("origin").map_or_else(String::new, origin);
        table.row(&[Cell::text(word), Cell::Number(value), Cell::text(unit), Cell::Text(origin)]);
    }
    let line =
        format!("The case as it was resolved: {} words, every default and book value with its source", rows.len());
    table.folded(&line)
}

fn collect<'a>(words: &'a Map<String, Value>, path: &str, rows: &mut Vec<(String, &'a Map<String, Value>)>) {
    for (key, value) in words {
        let Some(inner) = value.as_object() else { continue };
        let path = if path.is_empty() { key.clone() } else { format!("{path}.{key}") };
        if inner.contains_key("value") && inner.contains_key("origin") {
            rows.push((path, inner));
        } else {
            collect(inner, &path, rows);
        }
    }
}

fn shown(value: &Value) -> String {
    match value {
        Value::Number(n) => n.as_f64().map_or_else(|| n.to_string(), |x| significant(x, 9)),
        Value::String(text) => text.clone(),
        Value::Array(list) => list.iter().map(shown).collect::<Vec<_>>().join("; "),
        Value::Bool(_) | Value::Null | Value::Object(_) => value.to_string(),
    }
}

/// Where a word comes from, in words.
fn origin(origin: &Value) -> String {
    let of = |key: &str| origin.get(key).and_then(Value::as_str).unwrap_or("");
    match of("from") {
        "given" => format!("{} ({})", of("text"), of("place")),
        "--set" => format!("{} (--set)", of("text")),
        "material book" => format!("material book, {}: {}", of("grade"), of("source")),
        "default" => format!("default: {}", of("why")),
        "other words" => format!("follows from {}", of("how")),
        other => other.to_owned(),
    }
}

/// The record in one line, for the head of the page; escaped.
pub(in crate::report) fn line(source: &Source) -> String {
    let record = source.part("record").and_then(Value::as_object);
    let entries = record.into_iter().flatten().filter_map(|(key, value)| Some((key, value.as_str()?)));
    entries
        .map(|(key, value)| format!("<span>{}: <b>{}</b></span>", text(key), text(value)))
        .collect::<Vec<_>>()
        .join(" ")
}

//! Whatever no other section knows: parts of the summary as tables, tables as charts.

use serde_json::Value;

use super::Section;
use super::series::{chart, is_wide};
use crate::report::chart::Charts;
use crate::report::escape::text;
use crate::report::folder_tables::{Cells, Table};
use crate::report::numbers::{Unit, significant};
use crate::report::source::Source;
use crate::report::table::{Cell, HtmlTable};
use crate::report::{thin, words};
use crate::result::names;

/// Parts of the summary that have sections of their own, or stand in the head of the page.
const KNOWN_PARTS: [&str; 46] = [
    "command",
    "case",
    "temperatures",
    "positions",
    "stroke_curve",
    "title",
    "program",
    "record",
    "digest",
    "figures",
    "spread",
    "forces",
    "ledger",
    "regime",
    "independent",
    "accuracy",
    "grids",
    "work",
    "stop",
    "curve",
    "frequency",
    "strokes",
    "cautions",
    "not_modelled",
    "geometry",
    "resolved",
    "ladder",
    "rungs",
    "quick_models",
    "falls_below_low_speed_law",
    "map",
    "skipped",
    "accuracy_met",
    "table",
    "table_is",
    "verdict",
    "tolerance",
    "sentence",
    "rows",
    "apart_rms",
    "domain",
    "allowance",
    "reasons",
    "made_by",
    "models",
    "points",
];
/// Tables that have sections of their own.
const KNOWN_TABLES: [&str; 12] = [
    names::TEMPERATURES,
    names::TEMPERATURE_CURVES,
    names::POSITIONS,
    names::STROKE_CURVE,
    names::TRACE,
    names::CURVE,
    names::FREQUENCY,
    names::ACROSS,
    names::STROKES,
    names::SENSITIVITIES,
    names::LADDER,
    "comparison.csv",
];
/// Charts that an unknown table gets.
const CHARTS: usize = 6;
/// Rows of a table that are shown.
const ROWS: usize = 40;

/// The section, where there is anything left.
pub(super) fn section(source: &Source, charts: &mut Charts) -> Option<Section> {
    let mut html = String::new();
    for (name, value) in source.summary.iter().filter(|(n, v)| !v.is_null() && !KNOWN_PARTS.contains(&n.as_str())) {
        html.push_str(&part(name, value));
    }
    for table in source.tables.iter().filter(|t| !KNOWN_TABLES.contains(&t.file.as_str())) {
        html.push_str(&unknown_table(table, charts));
    }
    (!html.is_empty()).then(|| Section::new("others", "Further results", html))
}

/// A part of the summary, its leaves one a line.
pub(super) fn part(name: &str, value: &Value) -> String {
    let mut rows = Vec::new();
    leaves(value, "", &mut rows);
    let heading = words::plain(name);
    let mut table = HtmlTable::new(&heading, &["entry", "value"]);
    for (path, shown) in &rows {
        table.row(&[Cell::text(path), Cell::Number(shown.clone())]);
    }
    let body = if rows.len() > ROWS { table.folded(&format!("{} entries", rows.len())) } else { table.html() };
    format!("<h3>{}</h3>\n{body}", text(&heading))
}

/// Every leaf with its path; a `{value, band, unit}` counts as one leaf.
fn leaves(value: &Value, path: &str, rows: &mut Vec<(String, String)>) {
    let below = |key: &str| if path.is_empty() { key.to_owned() } else { format!("{path}, {key}") };
    match value {
        Value::Object(map) => match measured(value) {
            Some(shown) => rows.push((path.to_owned(), shown)),
            None => map.iter().for_each(|(key, inner)| leaves(inner, &below(&key.replace('_', " ")), rows)),
        },
        Value::Array(list) if list.iter().all(|v| v.is_number() || v.is_string()) && list.len() <= 8 => {
            rows.push((path.to_owned(), list.iter().map(leaf).collect::<Vec<_>>().join("; ")));
        }
        Value::Array(list) => {
            list.iter().enumerate().for_each(|(i, inner)| leaves(inner, &below(&(i + 1).to_string()), rows))
        }
        other => rows.push((path.to_owned(), leaf(other))),
    }
}

/// A value with its band and unit.
fn measured(value: &Value) -> Option<String> {
    let number = value.get("value")?.as_f64()?;
    let unit = Unit::for_values(value.get("unit").and_then(Value::as_str).unwrap_or(""), number);
    let shown = significant(unit.of(number), 7);
    Some(match value.get("band").and_then(Value::as_f64) {
        Some(band) => format!("{shown} \u{b1} {}{}", significant(unit.width(band), 2), unit.behind()),
        None => format!("{shown}{}", unit.behind()),
    })
}

fn leaf(value: &Value) -> String {
    match value {
        Value::Number(n) => n.as_f64().map_or_else(|| n.to_string(), |x| significant(x, 7)),
        Value::String(text) => text.clone(),
        Value::Bool(true) => "yes".to_owned(),
        Value::Bool(false) => "no".to_owned(),
        _ => "\u{2013}".to_owned(),
    }
}

/// A table of whatever kind: charts of its columns against the first, where that is a series; else its rows.
pub(super) fn unknown_table(table: &Table, charts: &mut Charts) -> String {
    let stem = table.file.trim_end_matches(".csv");
    let mut html = format!("<h3>{}</h3>\n", text(&words::plain(stem)));
    let first = table.columns.first();
    let series = first.and_then(|c| c.numbers()).is_some_and(|x| x.len() > 2 && x.windows(2).all(|w| w[1] > w[0]));
    let Some(first) = first.filter(|_| series) else {
        html.push_str(&rows(table));
        return html;
    };
    let columns = table.columns.iter().skip(1).filter(|c| c.numbers().is_some() && !c.is_band());
    let mut pair = String::new();
    for column in columns.take(CHARTS) {
        let title = words::column(&column.stem);
        if let Some(mut chart) = chart(table, stem, &title, &first.stem, &[&column.stem]) {
            chart.x.log = is_wide(&chart.lines[0].x) && first.stem != "time";
            chart.cursor = first.stem == "time";
            pair.push_str(&charts.add(chart));
        }
    }
    html.push_str(&format!("<div class=\"pair\">\n{pair}</div>\n"));
    html
}

fn rows(table: &Table) -> String {
    let head: Vec<String> = table.columns.iter().map(|c| c.header.replace('_', " ")).collect();
    let mut html = HtmlTable::new(&table.file, &head.iter().map(String::as_str).collect::<Vec<_>>());
    for row in thin::evenly(table.rows(), ROWS) {
        let cell = |column: &crate::report::folder_tables::Column| match &column.cells {
            Cells::Numbers(numbers) => Cell::Number(significant(numbers.get(row).copied().unwrap_or(f64::NAN), 6)),
            Cells::Texts(texts) => Cell::text(texts.get(row).map_or("", String::as_str)),
        };
        html.row(&table.columns.iter().map(cell).collect::<Vec<_>>());
    }
    if table.rows() > ROWS { html.folded(&format!("{ROWS} of {} rows", table.rows())) } else { html.html() }
}

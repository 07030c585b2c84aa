//! The regime of the case in its pure numbers, and an independent value where there is one.

use serde_json::Value;

use super::Section;
use crate::explain;
use crate::report::escape::text;
use crate::report::numbers::{Unit, significant, with_band};
use crate::report::source::Source;
use crate::report::table::{Cell, HtmlTable};
use crate::report::words;

/// Names of the regime's numbers that need more than their underscores taken out.
const NAMES: [(&str, &str); 3] = [
    ("magnetic_reynolds", "Magnetic Reynolds number"),
    ("depth_ratio", "Depth over thickness"),
    ("speed_m_per_s", "Speed, m/s"),
];

/// The section.
pub(super) fn section(source: &Source) -> Option<Section> {
    let mut html = source.part("regime").and_then(regime).unwrap_or_default();
    html.push_str(&source.part("independent").and_then(|i| independent(i, source)).unwrap_or_default());
    (!html.is_empty()).then(|| Section::new("regime", "Regime and independent check", html))
}

fn regime(regime: &Value) -> Option<String> {
    let regime = regime.as_object()?;
    let mut table = HtmlTable::new("Regime", &["number", "value", "what it says"]);
    for (key, value) in regime {
        let meaning = explain::KEYS.iter().find(|k| k.0 == key).map_or("", |k| k.1);
        let name = NAMES.iter().find(|n| n.0 == key).map_or_else(|| words::plain(key), |n| n.1.to_owned());
        let shown = value.as_f64().map_or_else(|| "\u{2013}".to_owned(), |x| significant(x, 4));
        table.row(&[Cell::Text(name), Cell::Number(shown), Cell::text(meaning)]);
    }
    Some(table.html())
}

fn independent(independent: &Value, source: &Source) -> Option<String> {
    let name = independent.get("figure")?.as_str()?;
    let value = independent.get("value")?.as_f64()?;
    let error = independent.get("error").and_then(Value::as_f64).unwrap_or(0.0);
    let unit = Unit::for_values(independent.get("unit").and_then(Value::as_str).unwrap_or(""), value);
    let (shown, _) = with_band(unit.of(value), unit.width(error.max(1e-7 * value.abs())));
    let inside = match independent.get("inside_band").and_then(Value::as_bool) {
        Some(true) => "which lies inside the band of the figure above",
        Some(false) => "which lies outside the band of the figure above",
        None => "",
    };
    let ours = source.figure(name).filter(|_| value.abs() > 0.0);
    let apart = ours
        .map_or_else(String::new, |o| format!(" (apart by {} of it)", significant((o - value).abs() / value.abs(), 2)));
    let method = independent.get("method").and_then(Value::as_str).unwrap_or("");
    let words =
        format!("{}: {shown}{} by another method, {inside}{apart}. {method}.", words::heading(name), unit.behind());
    Some(format!("<h3>Independent check</h3>\n<p>{}</p>\n", text(&words)))
}

//! Small strokes over frequency, and the lumped models fitted to them.

use serde_json::Value;

use super::Section;
use super::series::chart;
use crate::report::chart::Charts;
use crate::report::numbers::{percent, significant};
use crate::report::source::Source;
use crate::report::table::{Cell, HtmlTable};
use crate::result::names;

/// Damping coefficient and stiffness over frequency.
pub(super) fn section(source: &Source, charts: &mut Charts) -> Option<Section> {
    let table = source.table(names::STROKES)?;
    let mut pair = String::new();
    for (id, title, stem) in [
        ("damping-frequency", "Damping coefficient of small strokes", "damping_coefficient"),
        ("stiffness-frequency", "Stiffness of small strokes", "stiffness"),
    ] {
        if let Some(chart) = chart(table, id, title, "frequency", &[stem]) {
            pair.push_str(&charts.add(chart));
        }
    }
    let lumped = source.part("strokes").and_then(|s| s.get("lumped")).and_then(lumped).unwrap_or_default();
    let html = format!("<div class=\"pair\">\n{pair}</div>\n{lumped}");
    Some(Section::new("strokes", "Small strokes over frequency", html))
}

/// The lumped models for system simulation.
fn lumped(lumped: &Value) -> Option<String> {
    let models = lumped.get("models")?.as_array()?;
    let head = ["terms", "damping coefficients, N·s/m", "lag times, ms", "largest error"];
    let mut table = HtmlTable::new("Lumped models", &head);
    for model in models {
        let terms = model.get("terms")?.as_array()?;
        let list = |key: &str, factor: f64| {
            let of = |t: &Value| t.get(key).and_then(Value::as_f64).map(|x| significant(factor * x, 5));
            terms.iter().filter_map(of).collect::<Vec<_>>().join("; ")
        };
        let error = model.get("largest_error_relative").and_then(Value::as_f64).map_or_else(String::new, percent);
        table.row(&[
            Cell::Number(terms.len().to_string()),
            Cell::Number(list("damping_coefficient_N_s_per_m", 1.0)),
            Cell::Number(list("lag_time_s", 1e3)),
            Cell::Number(error),
        ]);
    }
    let law = lumped.get("law").and_then(Value::as_str).unwrap_or("");
    Some(format!(
        "<h3>Lumped model for system simulation</h3>\n<p>{}.</p>\n{}",
        crate::report::escape::text(law),
        table.html()
    ))
}

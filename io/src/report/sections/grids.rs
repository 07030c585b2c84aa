//! The grids, and what every figure was on each of them.

use serde_json::Value;

use super::Section;
use crate::report::numbers::{Unit, significant, with_band};
use crate::report::source::Source;
use crate::report::table::{Cell, HtmlTable};
use crate::report::words;

/// Columns of the table of grids, in this order; others follow under their own names.
const COLUMNS: [(&str, &str); 9] = [
    ("refinement", "refinement"),
    ("nodes_r", "nodes across"),
    ("nodes_z", "nodes along"),
    ("steps", "time steps"),
    ("cells_across_wall", "cells across the wall"),
    ("cells_across_depth", "cells across the depth"),
    ("growth", "largest growth of neighbours"),
    ("aspect", "largest aspect"),
    ("residual", "residual of the equations"),
];

/// The section.
pub(super) fn section(source: &Source) -> Option<Section> {
    let grids = source.part("grids")?.as_array()?;
    let mut html = String::from(
        "<p>The same question is solved on nested grids, with time steps refined alongside; each figure is extrapolated from its \
         values on them, and its band follows from what the last refinements changed.</p>\n",
    );
    html.push_str(&grid_table(grids)?);
    html.push_str(&convergence(source).unwrap_or_default());
    Some(Section::new("grids", "Grids and convergence", html))
}

fn grid_table(grids: &[Value]) -> Option<String> {
    let first = grids.first()?.as_object()?;
    let mut keys: Vec<(&str, &str)> = COLUMNS.iter().copied().filter(|(k, _)| first.contains_key(*k)).collect();
    let others = first.keys().filter(|k| !COLUMNS.iter().any(|c| c.0 == k.as_str()));
    keys.extend(others.map(|k| (k.as_str(), k.as_str())));
    let head: Vec<&str> = keys.iter().map(|k| k.1).collect();
    let mut table = HtmlTable::new("Grids, coarse to fine", &head);
    for grid in grids {
        let cell = |(key, _): &(&str, &str)| {
            let number = grid.get(*key).and_then(Value::as_f64);
            Cell::Number(
                number
                    .map_or_else(|| "\u{2013}".to_owned(), |x| significant(x, if *key == "residual" { 2 } else { 6 })),
            )
        };
        table.row(&keys.iter().map(cell).collect::<Vec<_>>());
    }
    Some(table.html())
}

/// Every figure on every level, its extrapolated value, and the share that the last refinement changed.
fn convergence(source: &Source) -> Option<String> {
    let figures = source.part("figures")?.as_object()?;
    let levels = figures.values().filter_map(|f| f.get("levels")?.as_array()).map(Vec::len).max()?;
    if levels == 0 {
        return None;
    }
    let mut head = vec!["figure".to_owned(), "unit".to_owned()];
    head.extend((1..=levels).map(|k| format!("grid {k}")));
    head.extend(["extrapolated".to_owned(), "band \u{b1}".to_owned(), "last step".to_owned()]);
    let mut table = HtmlTable::new("Figures on each grid", &head.iter().map(String::as_str).collect::<Vec<_>>());
    let mut names: Vec<&String> = figures.keys().collect();
    names.sort_by_key(|name| (words::rank(name), (*name).clone()));
    for name in names {
        let row = figures.get(name).and_then(|f| figure_row(name, f, levels));
        if let Some(row) = row {
            table.row(&row);
        }
    }
    Some(format!("<h3>Figures on each grid</h3>\n{}", table.html()))
}

fn figure_row(name: &str, figure: &Value, levels: usize) -> Option<Vec<Cell>> {
    let values: Vec<f64> = figure.get("levels")?.as_array()?.iter().filter_map(Value::as_f64).collect();
    if values.is_empty() {
        return None;
    }
    let (value, band) = (figure.get("value")?.as_f64()?, figure.get("band")?.as_f64()?);
    let unit = Unit::of_named(name, figure.get("unit")?.as_str()?, value);
    let (shown, half) = with_band(unit.of(value), unit.width(band));
    let mut row = vec![Cell::Text(words::heading(name)), Cell::text(&unit.text)];
    for k in 0..levels {
        let of = values.get(k).map_or_else(|| "\u{2013}".to_owned(), |v| with_band(unit.of(*v), unit.width(band)).0);
        row.push(Cell::Number(of));
    }
    let last = values
        .last()
        .filter(|_| value.abs() > 0.0)
        .map_or_else(String::new, |l| format!("{}\u{a0}%", significant(100.0 * (value - l) / value, 2)));
    row.extend([Cell::Number(shown), Cell::Number(half), Cell::Number(last)]);
    Some(row)
}

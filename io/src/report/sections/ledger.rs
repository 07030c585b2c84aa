//! Drag by three routes, and the ledger of work, heat and field energy.

use serde_json::Value;

use super::Section;
use crate::report::escape::text;
use crate::report::numbers::{Unit, significant, with_band};
use crate::report::source::Source;
use crate::report::table::{Cell, HtmlTable};

/// The three forces and the ledger.
pub(super) fn section(source: &Source) -> Option<Section> {
    let forces = source.part("forces").and_then(forces);
    let ledger = source.part("ledger").and_then(ledger);
    if forces.is_none() && ledger.is_none() {
        return None;
    }
    let html = format!("{}{}", forces.unwrap_or_default(), ledger.unwrap_or_default());
    Some(Section::new("checks", "Three forces and the energy ledger", html))
}

fn forces(forces: &Value) -> Option<String> {
    let of = |key: &str| forces.get(key).and_then(Value::as_f64);
    let band = of("band_N")?;
    let unit = Unit::for_values("N", of("wall_N")?);
    let head = format!("drag, {}", unit.text);
    let mut table = HtmlTable::new("Drag by three routes", &["route", &head]);
    for (route, key) in [
        ("force of the currents in the wall, J × B", "wall_N"),
        ("reaction field on the mover's own currents", "mover_N"),
        ("Maxwell stress on a cylinder in the air gap", "stress_N"),
    ] {
        let (value, _) = with_band(unit.of(of(key)?), unit.width(0.1 * band));
        table.row(&[Cell::text(route), Cell::Number(value)]);
    }
    let (_, half) = with_band(unit.of(of("wall_N")?), unit.width(band));
    let verdict =
        if forces.get("agree").and_then(Value::as_bool) == Some(true) { "They agree" } else { "They do not agree" };
    let time =
        of("time_s").filter(|t| *t > 0.0).map_or_else(String::new, |t| format!(" at {}\u{a0}s", significant(t, 4)));
    let words = format!(
        "{verdict}{time} within the band of \u{b1} {half}{}. They come from one field: the test is one of consistency, not of accuracy.",
        unit.behind()
    );
    Some(format!("<h3>Drag by three routes</h3>\n<p>{}</p>\n{}", text(&words), table.html()))
}

fn ledger(ledger: &Value) -> Option<String> {
    let of = |key: &str| ledger.get(key).and_then(Value::as_f64);
    let si = ledger.get("unit").and_then(Value::as_str).unwrap_or("J");
    let unit = Unit::for_values(si, of("work")?);
    let mut table = HtmlTable::new("Energy ledger", &["entry", &unit.text]);
    let rows = [
        ("work done on the wall and the field", "work"),
        ("heat in the wall", "heat"),
        ("still in the field", "field_energy"),
    ];
    for (name, key) in rows {
        table.row(&[Cell::text(name), Cell::Number(significant(unit.of(of(key)?), 8))]);
    }
    // Entries that others add are shown under their own names.
    let known = ["unit", "work", "heat", "field_energy", "imbalance_relative"];
    for (key, value) in ledger.as_object()?.iter().filter(|(k, _)| !known.contains(&k.as_str())) {
        if let Some(value) = value.as_f64() {
            table.row(&[Cell::Text(crate::report::words::plain(key)), Cell::Number(significant(value, 8))]);
        }
    }
    let open = significant(of("imbalance_relative")?, 2);
    let words = format!("Work less heat and field energy leaves {open} of the work.");
    Some(format!("<h3>Energy ledger</h3>\n<p>{}</p>\n{}", text(&words), table.html()))
}

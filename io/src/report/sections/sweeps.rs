//! What a curve is over temperature and position, and strokes over frequency and amplitude.

use super::Section;
use super::series::{chart, groups, parted};
use crate::report::chart::Charts;
use crate::report::folder_tables::Table;
use crate::report::source::Source;
use crate::result::names;

/// Figures over temperature.
pub(super) fn temperatures(source: &Source, charts: &mut Charts) -> Option<Section> {
    let table = source.table(names::TEMPERATURES)?;
    let stems = ["damping_coefficient_zero_speed", "drag_max", "critical_speed", "lag_time"];
    Some(Section::new("temperatures", "Over temperature", pair(table, "temperature", &stems, charts)))
}

/// The damping coefficient along the wall.
pub(super) fn positions(source: &Source, charts: &mut Charts) -> Option<Section> {
    let table = source.table(names::POSITIONS)?;
    let title = "Damping coefficient at low speed along the wall";
    let chart = chart(table, "positions", title, "position", &["damping_coefficient_zero_speed"])?;
    Some(Section::new("positions", "Over position", charts.add(chart)))
}

/// Settled strokes: a line an amplitude.
pub(super) fn strokes(source: &Source, charts: &mut Charts) -> Option<Section> {
    let table = source.table(names::STROKE_CURVE)?;
    let amplitudes = groups(table, "amplitude")?;
    let mut html = String::new();
    for stem in ["damping_coefficient_equivalent", "stiffness", "loss_per_cycle", "drag_peak"] {
        let title = format!("{} over frequency, a line an amplitude", crate::report::words::column(stem));
        if let Some(chart) = chart(table, stem, &title, "frequency", &[stem]) {
            html.push_str(&charts.add(parted(chart, &amplitudes)));
        }
    }
    let html = format!("<div class=\"pair\">\n{html}</div>\n");
    Some(Section::new("stroke-curve", "Strokes over frequency and amplitude", html))
}

fn pair(table: &Table, x: &str, stems: &[&str], charts: &mut Charts) -> String {
    let mut html = String::new();
    for stem in stems {
        if let Some(chart) = chart(table, stem, &crate::report::words::column(stem), x, &[stem]) {
            html.push_str(&charts.add(chart));
        }
    }
    format!("<div class=\"pair\">\n{html}</div>\n")
}

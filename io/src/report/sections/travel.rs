//! The travel: where the mover is, how fast, and what brakes it.

use super::Section;
use super::series::{chart, shown};
use crate::report::chart::{Axis, Chart, Charts, Line, Look, Mark};
use crate::report::folder_tables::Table;
use crate::report::source::Source;
use crate::result::names;

/// Series over time and over position; for strokes the loop of force and displacement first.
pub(super) fn section(source: &Source, charts: &mut Charts) -> Option<Section> {
    let table = source.table(names::TRACE)?;
    let mut html = String::new();
    if source.law() == "sine" {
        html.push_str(&force_loop(table).map(|c| charts.add(c)).unwrap_or_default());
    }
    let monotonic = table.numbers("position").is_some_and(is_monotonic);
    let along = chart(table, "drag-position", "Drag along the way", "position", &["drag"]).filter(|_| monotonic);
    html.push_str(&along.map(|drag| charts.add(with_gates(drag, source))).unwrap_or_default());
    let mut pair = String::new();
    let over_time = [
        ("drag-time", "Drag over time", "drag"),
        ("speed-time", "Speed over time", if monotonic { "speed" } else { "velocity" }),
        ("position-time", "Position over time", "position"),
        ("heat-time", "Heat rate in the wall over time", "heat"),
    ];
    for (id, title, stem) in over_time {
        if let Some(mut chart) = chart(table, id, title, "time", &[stem]) {
            chart.cursor = true;
            pair.push_str(&charts.add(chart));
        }
    }
    html.push_str(&format!("<div class=\"pair\">\n{pair}</div>\n"));
    (!html.is_empty()).then(|| Section::new("travel", "Travel", html))
}

fn is_monotonic(position: &[f64]) -> bool {
    position.windows(2).all(|w| w[1] >= w[0]) || position.windows(2).all(|w| w[1] <= w[0])
}

/// Gates and ends of the wall as marks on an axis of positions.
fn with_gates(mut chart: Chart, source: &Source) -> Chart {
    let Some(layout) = &source.layout else { return chart };
    let Some(table) = source.table(names::TRACE) else { return chart };
    let Some(position) = shown(table, "position") else { return chart };
    for (number, gate) in layout.gates_m.iter().enumerate() {
        let text = if number == 0 { "first gate" } else { "second gate" };
        chart.marks.push(Mark { x: position.unit.of(*gate), y: None, text: text.to_owned() });
    }
    if let Some(length) = layout.wall.length_m.filter(|_| layout.gates_m.is_empty()) {
        for (at, text) in [(0.0, "lower end of the wall"), (length, "upper end of the wall")] {
            chart.marks.push(Mark { x: position.unit.of(at), y: None, text: text.to_owned() });
        }
    }
    chart
}

/// Force on the mover against its position.
fn force_loop(table: &Table) -> Option<Chart> {
    let (position, drag) = (shown(table, "position")?, shown(table, "drag")?);
    let velocity = table.numbers("velocity")?;
    let force = drag.values.iter().zip(velocity).map(|(drag, v)| -drag * v.signum()).collect();
    let up = Axis { name: "Force on the mover, upward positive".to_owned(), ..drag.axis };
    let mut chart = Chart::new("force-loop", "Force against displacement, one settled cycle", position.axis, up);
    chart.file.clone_from(&table.file);
    let name = "force on the mover".to_owned();
    Some(chart.with(Line { name, x: position.values, y: force, band: drag.band, look: Look::Line }))
}

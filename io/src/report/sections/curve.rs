//! The force-speed sheet.

use super::Section;
use super::series::{chart, groups, parted, shown};
use crate::report::chart::{Chart, Charts, Line, Look, Mark};
use crate::report::folder_tables::Table;
use crate::report::numbers::significant;
use crate::report::source::Source;
use crate::result::names;

/// Drag against speed: over temperature first, where the case asks for that; heat and current density below.
pub(super) fn section(source: &Source, charts: &mut Charts) -> Option<Section> {
    let table = source.table(names::CURVE)?;
    let mut html =
        source.table(names::TEMPERATURE_CURVES).and_then(over_temperature).map(|c| charts.add(c)).unwrap_or_default();
    let mut drag = chart(table, "force-speed", "Drag against speed", "speed", &["drag", "drag_slotted"])?;
    mark(source, &mut drag);
    low_speed_law(source, &mut drag);
    html.push_str(&charts.add(drag));
    let mut small = String::new();
    for (id, title, stem) in [
        ("heat-speed", "Heat in the wall against speed", "heat"),
        ("current-speed", "Peak current density against speed", "current_density_peak"),
    ] {
        small.push_str(&chart(table, id, title, "speed", &[stem]).map(|c| charts.add(c)).unwrap_or_default());
    }
    if !small.is_empty() {
        html.push_str(&format!("<div class=\"pair\">\n{small}</div>\n"));
    }
    Some(Section::new("force-speed", "Force against speed", html))
}

/// A line a temperature.
fn over_temperature(table: &Table) -> Option<Chart> {
    let temperatures = groups(table, "temperature")?;
    let drag = chart(table, "force-speed-temperature", "Drag against speed at each temperature", "speed", &["drag"])?;
    Some(parted(drag, &temperatures))
}

/// Points out the greatest drag.
fn mark(source: &Source, drag: &mut Chart) {
    let (Some(speed), Some(most)) = (source.figure("critical_speed"), source.figure("drag_max")) else { return };
    let Some(table) = source.table(names::CURVE) else { return };
    let (Some(x), Some(y)) = (shown(table, "speed"), shown(table, "drag")) else { return };
    let (x_shown, y_shown) = (x.unit.of(speed), y.unit.of(most));
    let text = format!(
        "greatest drag {}{} at {}{}",
        significant(y_shown, 4),
        y.unit.behind(),
        significant(x_shown, 4),
        x.unit.behind()
    );
    drag.marks.push(Mark { x: x_shown, y: Some(y_shown), text });
}

/// The straight line that the drag leaves as speed rises.
fn low_speed_law(source: &Source, drag: &mut Chart) {
    let (Some(c0), Some(most)) = (source.figure("damping_coefficient_zero_speed"), source.figure("drag_max")) else {
        return;
    };
    let Some(table) = source.table(names::CURVE) else { return };
    let (Some(x), Some(y)) = (shown(table, "speed"), shown(table, "drag")) else { return };
    let speeds = table.numbers("speed").unwrap_or(&[]);
    let kept: Vec<f64> = speeds.iter().copied().filter(|v| c0 * v <= 1.6 * most).collect();
    if kept.len() > 1 {
        drag.lines.push(Line {
            name: "low-speed law: damping coefficient at low speed × speed".to_owned(),
            x: kept.iter().map(|v| x.unit.of(*v)).collect(),
            y: kept.iter().map(|v| y.unit.of(c0 * v)).collect(),
            band: Vec::new(),
            look: Look::Broken,
        });
    }
}

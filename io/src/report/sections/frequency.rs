//! Coils at rest with alternating current: impedance over frequency, current across the wall.

use super::Section;
use super::series::{chart, groups, is_wide, parted, shown};
use crate::report::chart::{Chart, Charts, Line, Look};
use crate::report::folder_tables::Table;
use crate::report::source::Source;
use crate::report::thin;
use crate::result::names;

/// Lines across the wall that one chart shows.
const LINES: usize = 6;

/// Impedance, shielding, depth and the current across the wall.
pub(super) fn section(source: &Source, charts: &mut Charts) -> Option<Section> {
    let table = source.table(names::FREQUENCY)?;
    let mut pair = String::new();
    let all: [(&str, &str, &[&str]); 4] = [
        ("added-resistance", "What the wall adds to the coils' impedance", &["resistance_change", "reactance_change"]),
        ("inductance", "Inductance of the coils with the wall", &["inductance"]),
        ("shielding", "Shielding factor", &["shielding_factor"]),
        ("depths", "Depth of the current in the wall", &["skin_depth", "current_depth"]),
    ];
    for (id, title, stems) in all {
        if let Some(mut chart) = chart(table, id, title, "frequency", stems) {
            chart.y.log = id == "depths" && chart.lines.iter().all(|l| is_wide(&l.y));
            if stems.len() > 1 {
                chart.y.name = if id == "depths" { "Depth" } else { "Added" }.to_owned();
            }
            if id == "shielding" {
                shielding_band(table, &mut chart);
            }
            pair.push_str(&charts.add(chart));
        }
    }
    pair.push_str(&across(source).map(|c| charts.add(c)).unwrap_or_default());
    Some(Section::new("frequency", "Coils over frequency", format!("<div class=\"pair\">\n{pair}</div>\n")))
}

/// The shielding factor's band stands under a name of its own.
fn shielding_band(table: &Table, chart: &mut Chart) {
    if let (Some(band), Some(line)) = (table.numbers("shielding_band"), chart.lines.first_mut()) {
        line.band = band.to_vec();
    }
}

/// Current density across the wall at some of the frequencies.
fn across(source: &Source) -> Option<Chart> {
    let table = source.table(names::ACROSS)?;
    let (r, density) = (shown(table, "r")?, shown(table, "current_density")?);
    let groups = groups(table, "frequency")?;
    let kept: Vec<_> = thin::evenly(groups.len(), LINES).into_iter().filter_map(|i| groups.get(i).cloned()).collect();
    let band = table.numbers("band").map_or_else(Vec::new, |b| b.iter().map(|x| density.unit.width(*x)).collect());
    let mut chart = Chart::new("across", "Current density across the wall", r.axis, density.axis);
    chart.file.clone_from(&table.file);
    chart.lines.push(Line { name: String::new(), x: r.values, y: density.values, band, look: Look::Line });
    Some(parted(chart, &kept))
}

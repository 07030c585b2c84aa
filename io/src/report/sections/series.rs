//! Charts of columns against a column.

use crate::report::chart::{Axis, Chart, Line, Look};
use crate::report::folder_tables::Table;
use crate::report::numbers::{Unit, significant};
use crate::report::words;

/// A range wider than this is shown on a logarithmic axis.
const WIDE: f64 = 40.0;
/// Points up to which a line shows each of them.
const FEW: usize = 80;
/// The same where nothing was swept by choice.
const FEWEST: usize = 16;

/// A column in its shown unit.
pub(super) struct Shown {
    /// Axis with name and unit.
    pub axis: Axis,
    /// Unit.
    pub unit: Unit,
    /// Values as shown.
    pub values: Vec<f64>,
    /// Half-widths of the band as shown; empty for none.
    pub band: Vec<f64>,
}

/// A column by its name without unit.
pub(super) fn shown(table: &Table, stem: &str) -> Option<Shown> {
    let column = table.column(stem)?;
    let numbers = column.numbers()?;
    let largest = numbers.iter().filter(|x| x.is_finite()).fold(0.0_f64, |m, x| m.max(x.abs()));
    // Over a wide range the unit suits the middle of the logarithmic axis.
    let least = numbers.iter().filter(|x| x.is_finite()).fold(f64::INFINITY, |m, x| m.min(*x));
    let usual =
        if matches!(stem, "speed" | "frequency") && is_wide(numbers) { (least * largest).sqrt() } else { largest };
    let unit = Unit::of_named(stem, &column.unit, usual);
    let band = table.band_of(stem).map_or_else(Vec::new, |b| b.iter().map(|x| unit.width(*x)).collect());
    let values = numbers.iter().map(|x| unit.of(*x)).collect();
    let axis = Axis { name: words::column(stem), unit: unit.text.clone(), log: false };
    Some(Shown { axis, unit, values, band })
}

/// Whether values are positive and run over so wide a range that a logarithmic axis shows them better.
pub(super) fn is_wide(values: &[f64]) -> bool {
    let finite = || values.iter().copied().filter(|x| x.is_finite());
    let (low, high) = (finite().fold(f64::INFINITY, f64::min), finite().fold(0.0, f64::max));
    low > 0.0 && high / low >= WIDE
}

/// Columns against another, on one pair of axes; columns of a unit other than the first one's are left out.
pub(super) fn chart(table: &Table, id: &str, title: &str, x: &str, y: &[&str]) -> Option<Chart> {
    let mut across = shown(table, x)?;
    let mut columns: Vec<(&str, Shown)> = y.iter().filter_map(|stem| Some((*stem, shown(table, stem)?))).collect();
    let first = columns.first()?.1.axis.clone();
    columns.retain(|(_, c)| c.axis.unit == first.unit);
    let sweep = matches!(x, "speed" | "frequency");
    across.axis.log = sweep && is_wide(&across.values);
    let mut up = first;
    up.log = across.axis.log && columns.iter().all(|(_, c)| is_wide(&c.values)) && x == "speed";
    let mut chart = Chart::new(id, title, across.axis, up);
    chart.file.clone_from(&table.file);
    let few = across.values.len() <= if sweep { FEW } else { FEWEST };
    let look = if few { Look::Points } else { Look::Line };
    for (stem, column) in columns {
        let name = words::column(stem);
        chart.lines.push(Line { name, x: across.values.clone(), y: column.values, band: column.band, look });
    }
    Some(chart)
}

/// The rows of a table parted by the value of a column: (the value with its unit, the rows).
pub(super) fn groups(table: &Table, stem: &str) -> Option<Vec<(String, Vec<usize>)>> {
    let column = shown(table, stem)?;
    let mut groups: Vec<(f64, Vec<usize>)> = Vec::new();
    for (row, value) in column.values.iter().enumerate() {
        match groups.iter_mut().find(|(v, _)| (v - value).abs() <= 1e-9 * value.abs()) {
            Some((_, rows)) => rows.push(row),
            None => groups.push((*value, vec![row])),
        }
    }
    let name = |value: f64| format!("{}{}", significant(value, 4), column.unit.behind());
    Some(groups.into_iter().map(|(value, rows)| (name(value), rows)).collect())
}

/// One line a group of rows instead of one line for all.
pub(super) fn parted(mut chart: Chart, groups: &[(String, Vec<usize>)]) -> Chart {
    let Some(line) = chart.lines.first().cloned() else { return chart };
    let pick =
        |values: &[f64], rows: &[usize]| rows.iter().filter_map(|i| values.get(*i).copied()).collect::<Vec<f64>>();
    chart.lines = groups
        .iter()
        .map(|(name, rows)| Line {
            name: name.clone(),
            x: pick(&line.x, rows),
            y: pick(&line.y, rows),
            band: pick(&line.band, rows),
            look: line.look,
        })
        .collect();
    chart
}

//! A calculator's or a measurement's table held against the field solution.

use std::collections::BTreeMap;

use serde_json::Value;

use super::Section;
use super::series::is_wide;
use crate::report::chart::{Axis, Chart, Charts, Line, Look};
use crate::report::escape::text;
use crate::report::numbers::{Unit, percent, significant};
use crate::report::source::Source;
use crate::report::table::{Cell, HtmlTable};
use crate::report::words;

/// The verdict, why, and both side by side.
pub(super) fn section(source: &Source, charts: &mut Charts) -> Option<Section> {
    let points = source.part("points")?.as_array()?;
    let verdict = source.text("verdict");
    let mut html = format!(
        "<p class=\"verdict {}\"><b>{}</b> {}</p>\n",
        if verdict == "passes" { "good" } else { "bad" },
        text(&words::plain(verdict)),
        text(source.text("sentence"))
    );
    let reasons: String = source.texts("reasons").iter().map(|r| format!("<li>{}</li>\n", text(r))).collect();
    if !reasons.is_empty() {
        html.push_str(&format!("<h3>Why</h3>\n<ul>\n{reasons}</ul>\n"));
    }
    let mut figures: BTreeMap<&str, Vec<&Value>> = BTreeMap::new();
    for point in points {
        figures.entry(point.get("figure").and_then(Value::as_str).unwrap_or("")).or_default().push(point);
    }
    for (figure, points) in &figures {
        html.push_str(&overlay(figure, points).map(|c| charts.add(c)).unwrap_or_default());
        html.push_str(&residual(figure, points).map(|c| charts.add(c)).unwrap_or_default());
    }
    html.push_str(&rows(points));
    html.push_str(&models(source).unwrap_or_default());
    Some(Section::new("comparison", "The table against the field solution", html))
}

/// Abscissas of the points with their axis; the line of the table where it has no abscissa.
fn abscissas(points: &[&Value]) -> (Axis, Vec<f64>) {
    let of = |p: &&Value| p.pointer("/abscissa/value").and_then(Value::as_f64);
    if let Some(values) = points.iter().map(of).collect::<Option<Vec<f64>>>() {
        let word = |key: &str| points.first().and_then(|p| p.pointer(key)).and_then(Value::as_str).unwrap_or("");
        let unit = Unit::for_values(word("/abscissa/unit"), values.iter().fold(0.0_f64, |m, x| m.max(x.abs())));
        let axis = Axis { name: words::column(word("/abscissa/word")), unit: unit.text.clone(), log: is_wide(&values) };
        return (axis, values.iter().map(|x| unit.of(*x)).collect());
    }
    let lines = points.iter().map(|p| p.get("line").and_then(Value::as_f64).unwrap_or(f64::NAN)).collect();
    (Axis { name: "Line of the table".to_owned(), unit: String::new(), log: false }, lines)
}

fn numbers(points: &[&Value], pointer: &str) -> Vec<f64> {
    points.iter().map(|p| p.pointer(pointer).and_then(Value::as_f64).unwrap_or(f64::NAN)).collect()
}

/// Both sets of values over the abscissa.
fn overlay(figure: &str, points: &[&Value]) -> Option<Chart> {
    let (across, x) = abscissas(points);
    let (table, ours) = (numbers(points, "/table"), numbers(points, "/ours"));
    let largest = ours.iter().chain(&table).filter(|v| v.is_finite()).fold(0.0_f64, |m, v| m.max(v.abs()));
    let unit = Unit::for_values(points.first()?.get("unit")?.as_str()?, largest);
    let log = across.log && is_wide(&ours) && is_wide(&table);
    let up = Axis { name: words::column(figure), unit: unit.text.clone(), log };
    let title = format!("{}: the table and the field solution", words::heading(figure));
    let mut chart = Chart::new("overlay", &title, across, up);
    let shown = |values: &[f64]| values.iter().map(|v| unit.of(*v)).collect::<Vec<f64>>();
    let band = numbers(points, "/uncertainty/numerical").iter().map(|u| unit.width(2.0 * u)).collect();
    let name = |n: &str| n.to_owned();
    chart.lines.push(Line { name: name("field solution"), x: x.clone(), y: shown(&ours), band, look: Look::Points });
    chart.lines.push(Line { name: name("table"), x, y: shown(&table), band: Vec::new(), look: Look::Dots });
    "comparison.csv".clone_into(&mut chart.file);
    Some(chart)
}

/// The difference over the scale, with what is allowed.
fn residual(figure: &str, points: &[&Value]) -> Option<Chart> {
    let (across, x) = abscissas(points);
    let scale = numbers(points, "/scale");
    let share = |values: Vec<f64>| values.iter().zip(&scale).map(|(v, s)| 100.0 * v / s.abs()).collect::<Vec<f64>>();
    let (error, allowed) = (share(numbers(points, "/error")), share(numbers(points, "/allowed")));
    let up = Axis { name: "Table less field solution".to_owned(), unit: "%".to_owned(), log: false };
    let title = format!("{}: difference and what is allowed", words::heading(figure));
    let mut chart = Chart::new("residual", &title, across, up);
    let line = |name: &str, y: Vec<f64>, look| Line { name: name.to_owned(), x: x.clone(), y, band: Vec::new(), look };
    let band = share(numbers(points, "/uncertainty/expanded_95"));
    chart.lines.push(Line { band, ..line("difference", error, Look::Dots) });
    chart.lines.push(line("allowed", allowed.clone(), Look::Broken));
    chart.lines.push(line("allowed, other way", allowed.iter().map(|a| -a).collect(), Look::Broken));
    Some(chart)
}

fn rows(points: &[Value]) -> String {
    let head = ["line", "figure", "at", "table", "field solution", "difference", "uncertainty, 95 %", "verdict"];
    let mut table = HtmlTable::new("Every row", &head);
    for p in points {
        let number = |key: &str| p.pointer(key).and_then(Value::as_f64);
        let word = |key: &str| p.pointer(key).and_then(Value::as_str).unwrap_or("");
        let unit = Unit::for_values(word("/unit"), number("/ours").unwrap_or(0.0));
        let with_unit = |x: Option<f64>| x.map_or_else(String::new, |x| significant(unit.of(x), 6) + &unit.behind());
        let at = number("/abscissa/value").map_or_else(String::new, |x| {
            format!("{} {}", significant(x, 4), crate::report::numbers::raised(word("/abscissa/unit")))
        });
        table.row(&[
            Cell::Number(number("/line").map_or_else(String::new, |l| significant(l, 6))),
            Cell::text(word("/figure")),
            Cell::Number(at),
            Cell::Number(with_unit(number("/table"))),
            Cell::Number(with_unit(number("/ours"))),
            Cell::Number(number("/error_share").map_or_else(String::new, percent)),
            Cell::Number(with_unit(number("/uncertainty/expanded_95"))),
            Cell::text(word("/verdict")),
        ]);
    }
    table.folded(&format!("Every row of the table ({})", points.len()))
}

fn models(source: &Source) -> Option<String> {
    let mut table =
        HtmlTable::new("Models that could have made the table", &["model", "apart", "explains", "leaves out"]);
    for model in source.part("models")?.as_array()? {
        let share = |key: &str| model.get(key).and_then(Value::as_f64).map_or_else(String::new, percent);
        let left: Vec<&str> = model.get("leaves_out")?.as_array()?.iter().filter_map(Value::as_str).collect();
        table.row(&[
            Cell::text(model.get("model")?.as_str()?),
            Cell::Number(share("apart_rms")),
            Cell::Number(share("explains")),
            Cell::Text(left.join(", ")),
        ]);
    }
    Some(format!("<h3>Models that could have made the table</h3>\n{}", table.html()))
}

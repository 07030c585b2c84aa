//! What the tolerances of the inputs make of the figures.

use serde_json::Value;

use super::Section;
use crate::report::chart::{Axis, Bar, Chart, Charts};
use crate::report::escape::text;
use crate::report::numbers::{Unit, percent, significant};
use crate::report::source::Source;
use crate::report::table::{Cell, HtmlTable};
use crate::report::words;

/// Inputs, and for the first figures which of them matters most.
pub(super) fn section(source: &Source, charts: &mut Charts) -> Option<Section> {
    let spread = source.part("spread")?;
    let mut html =
        format!("<p>{}.</p>\n", text(&words::plain(spread.get("combined_by").and_then(Value::as_str).unwrap_or(""))));
    html.push_str(&inputs(spread).unwrap_or_default());
    let all = spread.get("sensitivities").and_then(Value::as_array)?;
    let mut names: Vec<&str> = all.iter().filter_map(|s| s.get("figure")?.as_str()).collect();
    names.sort_by_key(|name| (words::rank(name), *name));
    names.dedup();
    let mut bars: Vec<String> = names.iter().filter_map(|n| changes(n, all, source)).map(|c| charts.add(c)).collect();
    let folded = bars.split_off(bars.len().min(2));
    html.push_str(&format!("<div class=\"pair\">\n{}</div>\n", bars.concat()));
    if !folded.is_empty() {
        html.push_str(&format!(
            "<details class=\"more\"><summary>The other figures</summary>\n<div class=\"pair\">\n{}</div></details>\n",
            folded.concat()
        ));
    }
    let cautions = spread.get("cautions").and_then(Value::as_array).cloned().unwrap_or_default();
    let cautions: String =
        cautions.iter().filter_map(Value::as_str).map(|c| format!("<li>{}</li>\n", text(c))).collect();
    if !cautions.is_empty() {
        html.push_str(&format!("<ul>\n{cautions}</ul>\n"));
    }
    Some(Section::new("inputs", "What the inputs' tolerances make of it", html))
}

/// The inputs, those first that are worth measuring better.
fn inputs(spread: &Value) -> Option<String> {
    let head = ["input", "value", "tolerance", "mean share of the spread"];
    let mut table = HtmlTable::new("Inputs with tolerances", &head);
    let shares = spread.get("measure_better_first").and_then(Value::as_array);
    let order =
        |word: &str| shares.and_then(|s| s.iter().position(|e| e.get("word").and_then(Value::as_str) == Some(word)));
    let mut all: Vec<&Value> = spread.get("inputs")?.as_array()?.iter().collect();
    all.sort_by_key(|i| order(i.get("word").and_then(Value::as_str).unwrap_or("")).unwrap_or(usize::MAX));
    for input in all {
        let word = input.get("word")?.as_str()?;
        let value = input.get("value")?.as_f64()?;
        let unit = Unit::for_values(input.get("unit").and_then(Value::as_str).unwrap_or(""), value);
        let share = order(word).and_then(|i| shares?.get(i)?.get("mean_share")?.as_f64());
        table.row(&[
            Cell::text(word),
            Cell::Number(significant(unit.of(value), 6) + &unit.behind()),
            Cell::text(input.get("tolerance").and_then(Value::as_str).unwrap_or("")),
            Cell::Number(share.map_or_else(String::new, percent)),
        ]);
    }
    Some(format!("<h3>Worth measuring better, first to last</h3>\n{}", table.html()))
}

/// How far each input moves a figure, the largest first.
fn changes(name: &str, all: &[Value], source: &Source) -> Option<Chart> {
    let value = source.figure(name)?;
    let of = |s: &Value, key: &str| s.get(key).and_then(Value::as_f64);
    let mut mine: Vec<(&str, f64, f64)> = all
        .iter()
        .filter(|s| s.get("figure").and_then(Value::as_str) == Some(name))
        .filter_map(|s| Some((s.get("word")?.as_str()?, of(s, "change_low")?, of(s, "change_high")?)))
        .collect();
    mine.sort_by(|a, b| b.1.abs().max(b.2.abs()).total_cmp(&a.1.abs().max(a.2.abs())));
    let share = |change: f64| 100.0 * change / value.abs();
    let bars = mine.iter().filter(|_| value.abs() > 0.0).map(|(word, low, high)| {
        let text = format!("{} / {} %", significant(share(*low), 2), significant(share(*high), 2));
        Bar { name: (*word).to_owned(), from: share(low.min(*high)), to: share(high.max(*low)), text, whole: false }
    });
    let across =
        Axis { name: format!("Change of {}", words::heading(name).to_lowercase()), unit: "%".to_owned(), log: false };
    let up = Axis { name: "input".to_owned(), unit: String::new(), log: false };
    let mut chart = Chart::new("inputs", &format!("{}: what each input moves it by", words::heading(name)), across, up);
    chart.bars = bars.collect();
    chart.says = mine.first().map_or_else(String::new, |m| format!("{} matters most.", m.0));
    (!chart.bars.is_empty()).then_some(chart)
}

//! The ladder: one dropped effect restored at a time, and what each is worth.

use serde_json::Value;

use super::Section;
use crate::report::chart::{Axis, Bar, Chart, Charts};
use crate::report::escape::text;
use crate::report::numbers::{Unit, significant};
use crate::report::source::Source;
use crate::report::table::{Cell, HtmlTable};
use crate::report::words;

/// Figures whose waterfall stands open; the others are folded.
const OPEN: usize = 2;

/// Waterfalls, models with their sources, and what the ladder left out.
pub(super) fn section(source: &Source, charts: &mut Charts) -> Option<Section> {
    let ladder = source.part("ladder")?.as_object()?;
    let mut names: Vec<&String> = ladder.keys().collect();
    names.sort_by_key(|name| (words::rank(name), (*name).clone()));
    let mut html = String::from(
        "<p>The same question asked of simplified models, one dropped effect restored at a time; the last is the field solution. Each \
         bar is what one effect is worth.</p>\n",
    );
    let falls: Vec<String> = names
        .iter()
        .filter_map(|name| waterfall(name, ladder.get(*name)?, source))
        .map(|chart| charts.add(chart))
        .collect();
    let (open, folded) = falls.split_at(falls.len().min(OPEN));
    open.iter().for_each(|f| html.push_str(f));
    if !folded.is_empty() {
        html.push_str("<details class=\"more\"><summary>Waterfalls of the other figures</summary>\n");
        folded.iter().for_each(|f| html.push_str(f));
        html.push_str("</details>\n");
    }
    html.push_str(&rungs(source).unwrap_or_default());
    html.push_str(&quick_models(source).unwrap_or_default());
    html.push_str(&skipped(source));
    Some(Section::new("ladder", "The ladder of models", html))
}

/// First and last value as whole bars, the steps between them as changes.
fn waterfall(name: &str, figure: &Value, source: &Source) -> Option<Chart> {
    let values = figure.get("values")?.as_array()?;
    let known: Vec<(&str, f64)> =
        values.iter().filter_map(|v| Some((v.get("effect")?.as_str()?, v.get("value")?.as_f64()?))).collect();
    let (first, last) = (known.first()?, known.last()?);
    let largest = known.iter().fold(0.0_f64, |m, (_, v)| m.max(v.abs()));
    let unit = Unit::of_named(name, figure.get("unit")?.as_str()?, largest);
    let shown = |value: f64| significant(unit.of(value), 4) + &unit.behind();
    let whole = |name: String, value: f64| Bar { name, from: 0.0, to: unit.of(value), text: shown(value), whole: true };
    let mut bars = vec![whole(format!("{} alone", first.0), first.1)];
    for step in figure.get("steps")?.as_array()? {
        let (before, after) = (step.get("before")?.as_f64()?, step.get("after")?.as_f64()?);
        let effects: Vec<&str> = step.get("effects")?.as_array()?.iter().filter_map(Value::as_str).collect();
        let worth = step.get("worth_percent").and_then(Value::as_f64).unwrap_or(0.0);
        let sign = if worth > 0.0 { "+" } else { "" };
        let text = format!("{sign}{} %", significant(worth, 2));
        bars.push(Bar { name: effects.join(" and "), from: unit.of(before), to: unit.of(after), text, whole: false });
    }
    let top = source.figure(name).unwrap_or(last.1);
    bars.push(whole("field solution".to_owned(), top));
    let across = Axis { name: words::heading(name), unit: unit.text.clone(), log: false };
    let up = Axis { name: "effect restored".to_owned(), unit: String::new(), log: false };
    let mut chart =
        Chart::new("waterfall", &format!("{}: what each effect is worth", words::heading(name)), across, up);
    chart.bars = bars;
    chart.says = format!("From {} by the quick rule to {} by the field solution.", shown(first.1), shown(top));
    Some(chart)
}

fn rungs(source: &Source) -> Option<String> {
    let mut table = HtmlTable::new("Rungs of the ladder", &["effect restored", "model", "published in"]);
    for rung in source.part("rungs")?.as_array()? {
        let of = |key: &str| Cell::text(rung.get(key).and_then(Value::as_str).unwrap_or(""));
        table.row(&[of("effect"), of("model"), of("source")]);
    }
    Some(format!("<h3>The models</h3>\n{}", table.html()))
}

/// What each quick model makes of each figure.
fn quick_models(source: &Source) -> Option<String> {
    let models = source.part("quick_models")?.as_array()?;
    let figures = source.part("figures")?.as_object()?;
    let mut names: Vec<&String> = figures.keys().collect();
    names.sort_by_key(|name| (words::rank(name), (*name).clone()));
    let mut head = vec!["quick model".to_owned()];
    head.extend(names.iter().map(|n| words::heading(n)));
    let mut table = HtmlTable::new("Quick models", &head.iter().map(String::as_str).collect::<Vec<_>>());
    for model in models {
        let mut row = vec![Cell::text(model.get("model")?.as_str()?)];
        for name in &names {
            let error = model.pointer(&format!("/figures/{name}/error_percent")).and_then(Value::as_f64);
            row.push(Cell::Number(error.map_or_else(|| "\u{2013}".to_owned(), |e| format!("{} %", significant(e, 3)))));
        }
        table.row(&row);
    }
    Some(format!(
        "<h3>How far quick models are off</h3>\n<p>Against the field solution of this case.</p>\n{}",
        table.html()
    ))
}

fn skipped(source: &Source) -> String {
    let all = source.part("skipped").and_then(Value::as_array).cloned().unwrap_or_default();
    let line =
        |s: &Value| Some(format!("<li>{}: {}</li>\n", text(s.get("what")?.as_str()?), text(s.get("why")?.as_str()?)));
    let lines: String = all.iter().filter_map(line).collect();
    if lines.is_empty() { lines } else { format!("<h3>Rungs left out</h3>\n<ul>\n{lines}</ul>\n") }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use serde_json::{Map, json};

    use super::*;

    #[test]
    fn bars_join_end_to_end() {
        let mut summary = Map::new();
        summary.insert("figures".into(), json!({"drag": {"value": 12.0, "unit": "N", "band": 0.1}}));
        let source = Source { summary, tables: Vec::new(), fields: None, layout: None };
        let figure = json!({"unit": "N",
            "values": [{"effect": "quick rule", "value": 10.0}, {"effect": "finite magnet", "value": 15.0}, {"effect": "field", "value": 12.0}],
            "steps": [{"before": 10.0, "after": 15.0, "effects": ["finite magnet"], "worth_percent": 41.7},
                      {"before": 15.0, "after": 12.0, "effects": ["field"], "worth_percent": -25.0}]});
        let chart = waterfall("drag", &figure, &source).unwrap();
        assert_eq!(chart.bars.len(), 4);
        for pair in chart.bars[..3].windows(2) {
            assert!((pair[0].to - pair[1].from).abs() < 1e-12);
        }
        assert!((chart.bars[3].to - 12.0).abs() < 1e-12 && chart.bars[3].whole);
    }
}

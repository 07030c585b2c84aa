//! The figures, each with its three lines: numerical band, inputs, not modelled.

use std::fmt::Write as _;

use serde_json::{Map, Value};

use super::Section;
use crate::report::escape::text;
use crate::report::numbers::{Unit, percent, significant, with_band};
use crate::report::source::Source;
use crate::report::words;

/// Every figure of the summary; those that people ask for first come first.
pub(super) fn section(source: &Source) -> Option<Section> {
    let figures = source.part("figures")?.as_object()?;
    let mut names: Vec<&String> = figures.keys().collect();
    names.sort_by_key(|name| (words::rank(name), (*name).clone()));
    let left_out = left_out(source);
    let cards: String = names.iter().filter_map(|name| card(name, figures.get(*name)?, &left_out)).collect();
    if cards.is_empty() {
        return None;
    }
    let lead = accuracy(source).map_or_else(String::new, |t| format!("<p class=\"lead\">{}</p>\n", text(&t)));
    Some(Section::new("figures", "Figures", format!("{lead}<div class=\"cards\">\n{cards}</div>\n")))
}

/// Whether the accuracy that was asked for is reached, in a sentence.
fn accuracy(source: &Source) -> Option<String> {
    let accuracy = source.part("accuracy")?;
    let target = percent(accuracy.get("target_relative")?.as_f64()?);
    let worst = accuracy.get("worst").filter(|w| !w.is_null());
    let worst = worst.and_then(|w| Some((w.get("figure")?.as_str()?, w.get("band_relative")?.as_f64()?)));
    let widest = worst.map_or_else(String::new, |(figure, band)| {
        format!(
            " The widest band among the headline figures is \u{b1} {} ({}).",
            percent(band),
            words::heading(figure).to_lowercase()
        )
    });
    Some(if accuracy.get("met")?.as_bool()? {
        let local = if source.figure("current_density_peak").is_some() {
            " (the peak current density, the field at one point, to a hundred times that)"
        } else {
            ""
        };
        format!("Every headline figure is computed to \u{b1} {target} or better, as was asked for{local}.{widest}")
    } else {
        let advice = accuracy.get("advice").and_then(Value::as_str).unwrap_or("");
        format!("The accuracy that was asked for, \u{b1} {target}, was missed.{widest} {advice}")
    })
}

fn card(name: &str, figure: &Value, left_out: &str) -> Option<String> {
    let figure = figure.as_object()?;
    let value = figure.get("value")?.as_f64()?;
    let band = figure.get("band").and_then(Value::as_f64).unwrap_or(0.0);
    let unit = shown_unit(name, figure.get("unit").and_then(Value::as_str).unwrap_or(""), value);
    let (shown, _) = with_band(unit.of(value), unit.width(band));
    let mut html = format!(
        "<article class=\"card\" id=\"figure-{}\"><h3>{}</h3>\n<p class=\"value\">{}<span class=\"unit\">{}</span></p>\n",
        text(name),
        text(&words::heading(name)),
        text(&shown),
        text(&unit.behind())
    );
    let mut meaning = words::meaning(name).unwrap_or("").to_owned();
    if let Some(place) = figure.get("where").and_then(Value::as_object).and_then(place) {
        meaning = if meaning.is_empty() { place } else { format!("{meaning}; {place}") };
    }
    if !meaning.is_empty() {
        // Writing into a string cannot fail.
        let _ = writeln!(html, "<p class=\"meaning\">{}</p>", text(&meaning));
    }
    let _ = writeln!(
        html,
        "<dl><div><dt>Numerical band</dt><dd>{}</dd></div><div><dt>Inputs</dt><dd>{}</dd></div>\
         <div><dt>Not modelled</dt><dd>{}</dd></div></dl></article>",
        text(&numerical(value, band, &unit, figure.get("basis").and_then(Value::as_str))),
        text(&inputs(figure.get("input_spread"), value, &unit)),
        text(left_out)
    );
    Some(html)
}

/// A figure's unit; multiples of standard gravity are pure numbers in results.
fn shown_unit(name: &str, si: &str, value: f64) -> Unit {
    let unit = Unit::of_named(name, si, value);
    if name == "felt_acceleration_peak" { Unit { text: "g\u{2080}".to_owned(), ..unit } } else { unit }
}

/// The numerical line: how exactly the equations were solved.
fn numerical(value: f64, band: f64, unit: &Unit, basis: Option<&str>) -> String {
    let basis = basis.map_or_else(String::new, |b| format!(", {b}"));
    if band <= 0.0 {
        return format!("exact to the digits shown{basis}");
    }
    let (_, half) = with_band(unit.of(value), unit.width(band));
    let share = if value.abs() > 0.0 { format!(" ({})", percent(band / value.abs())) } else { String::new() };
    format!("\u{b1} {half}{}{share}{basis}", unit.behind())
}

/// The line of the inputs: what their tolerances make of the figure.
fn inputs(spread: Option<&Value>, value: f64, unit: &Unit) -> String {
    let Some(spread) = spread.and_then(Value::as_object) else { return "no tolerances given".to_owned() };
    let of = |key: &str| spread.get(key).and_then(Value::as_f64).map(|x| unit.width(x));
    let (Some(minus), Some(plus)) = (of("minus"), of("plus")) else { return "not had".to_owned() };
    let shown = |x: f64| significant(x.abs(), 3);
    let behind = unit.behind();
    let mut text = if (minus.abs() - plus.abs()).abs() <= 0.02 * plus.abs() {
        format!("\u{b1} {}{behind}", shown(plus))
    } else {
        format!("\u{2212} {} / + {}{behind}", shown(minus), shown(plus))
    };
    if value.abs() > 0.0 {
        let half = 0.5 * (minus.abs() + plus.abs()) / unit.width(value).abs();
        let _ = write!(text, " ({}), with 95 %", percent(half));
    }
    if let (Some(low), Some(high)) = (of("worst_minus"), of("worst_plus")) {
        let _ = write!(text, "; all inputs at their worst: \u{2212} {} / + {}{behind}", shown(low), shown(high));
    }
    if spread.get("complete").and_then(Value::as_bool) == Some(false) {
        text.push_str("; not every input could be varied");
    }
    text
}

/// Where and when a figure is had.
fn place(place: &Map<String, Value>) -> Option<String> {
    let of = |key: &str| place.get(key).and_then(Value::as_f64);
    // A place that rounds to zero is zero.
    let millimetres = |x: f64| format!("{}\u{a0}mm", significant((1e8 * x).round() / 1e5 + 0.0, 5));
    let mut parts = Vec::new();
    parts.extend(of("r_m").map(|r| format!("radius {}", millimetres(r))));
    parts.extend(of("z_m").map(|z| format!("height {}", millimetres(z))));
    parts.extend(of("t_s").map(|t| format!("{}\u{a0}s after the start", significant(t, 5))));
    (!parts.is_empty()).then(|| format!("at {}", parts.join(", ")))
}

/// What the model leaves out, without the remarks in brackets.
fn left_out(source: &Source) -> String {
    let items = source.texts("not_modelled");
    if items.is_empty() {
        return "nothing that the case names; see Cautions".to_owned();
    }
    items.iter().map(|i| i.split(" (").next().unwrap_or(i).trim().to_owned()).collect::<Vec<_>>().join("; ")
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use serde_json::json;

    use super::*;

    #[test]
    fn a_card_has_its_three_lines() {
        let figure = json!({"value": 100.352_68, "unit": "N", "band": 0.003_78, "basis": "extrapolated",
            "input_spread": {"minus": 10.9, "plus": 10.4, "worst_minus": -21.0, "worst_plus": 21.4, "complete": true},
            "where": {"t_s": 0.0286, "z_m": 0.20335}});
        let html = card("drag_peak", &figure, "recoil permeability of magnets").unwrap();
        for part in [
            "Peak drag",
            "100.3527",
            "± 0.0038\u{a0}N (0.0038\u{a0}%), extrapolated",
            "− 10.9 / + 10.4\u{a0}N (11\u{a0}%), with 95 %",
            "recoil permeability of magnets",
            "height 203.35\u{a0}mm",
        ] {
            assert!(html.contains(part), "{part}: {html}");
        }
    }

    #[test]
    fn an_unknown_figure_is_shown_all_the_same() {
        let html = card("bore_temperature_peak", &json!({"value": 341.5, "unit": "K", "band": 0.02}), "").unwrap();
        assert!(html.contains("Bore temperature peak") && html.contains("68.350") && html.contains("°C"), "{html}");
        assert!(html.contains("no tolerances given"));
        assert!(card("broken", &json!({"unit": "N"}), "").is_none());
    }
}

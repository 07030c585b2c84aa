//! The ladder as one JSON object (`summary.json` of a ladder's folder) and as a table (`ladder.csv`).

use std::fmt::Write as _;

use lenzbore_solver::ladder::{
    Cancelling, ErrorMap, FigureLadder, Interval, LadderOutcome, ModelFigure, QuickError, QuickModel, Range, Rung, Step,
};
use serde_json::{Map, Value, json};

use super::fault::IoFault;
use super::finite::{finite, number};
use super::header::ResultHeader;

/// The whole ladder. Relative numbers carry `_percent`; `worth_percent` is per cent of the value at the top.
///
/// # Errors
/// [`IoFault::NotFinite`] where any number is NaN or infinite.
pub fn ladder_summary(header: &ResultHeader, outcome: &LadderOutcome) -> Result<Value, IoFault> {
    let mut top = Map::new();
    let mut put = |name: &str, value: Value| top.insert(name.to_owned(), value);
    put("title", json!(header.title));
    put("program", json!({"name": header.program.name, "version": header.program.version}));
    put("record", Value::Object(header.record.clone()));
    put("command", json!(header.command));
    put("digest", json!(header.digest));
    put("figures", named(&outcome.figures, |f| &f.name, top_figure)?);
    put("ladder", named(&outcome.figures, |f| &f.name, |f| steps_of(f, &outcome.rungs))?);
    put("rungs", list(&outcome.rungs, rung)?);
    put("quick_models", list(&outcome.quick, quick_model)?);
    put("falls_below_low_speed_law", falls_below(outcome)?);
    put("map", outcome.map.as_ref().map_or(Ok(Value::Null), map)?);
    put("skipped", outcome.skipped.iter().map(|s| json!({"what": s.what, "why": s.why})).collect::<Vec<_>>().into());
    put("accuracy_met", json!(outcome.top.accuracy.met));
    put("stop", json!(outcome.top.stop.word()));
    let of_the_run = outcome.top.cautions.iter().map(|c| c.text.clone());
    put("cautions", header.cautions.iter().cloned().chain(of_the_run).collect::<Vec<_>>().into());
    put("not_modelled", header.not_modelled.clone().into());
    put("geometry", json!(header.geometry));
    put("resolved", header.resolved.clone());
    put("case", header.case.clone());
    Ok(Value::Object(top))
}

fn list<T>(items: &[T], write: impl Fn(&T) -> Result<Value, IoFault>) -> Result<Value, IoFault> {
    Ok(items.iter().map(write).collect::<Result<Vec<_>, _>>()?.into())
}

fn named<T>(
    items: &[T],
    name: impl Fn(&T) -> &String,
    write: impl Fn(&T) -> Result<Value, IoFault>,
) -> Result<Value, IoFault> {
    let entries = items.iter().map(|item| Ok((name(item).clone(), write(item)?)));
    Ok(Value::Object(entries.collect::<Result<Map<_, _>, IoFault>>()?))
}

fn percent(what: &str, relative: f64) -> Result<Value, IoFault> {
    number(what, 100.0 * relative)
}

fn top_figure(figure: &FigureLadder) -> Result<Value, IoFault> {
    let name = &figure.name;
    Ok(json!({
        "value": number(name, figure.top)?,
        "unit": figure.unit,
        "band": number(&format!("the band of {name}"), figure.band)?,
    }))
}

fn steps_of(figure: &FigureLadder, rungs: &[Rung]) -> Result<Value, IoFault> {
    let values = rungs.iter().zip(&figure.values).map(|(rung, value)| {
        let value = value.map_or(Ok(Value::Null), |v| number(&figure.name, v))?;
        Ok(json!({"effect": rung.effect.word(), "value": value}))
    });
    let dominant = figure.dominant.and_then(|k| figure.steps.get(k)).map(effects);
    Ok(json!({
        "unit": figure.unit,
        "values": values.collect::<Result<Vec<_>, IoFault>>()?,
        "steps": list(&figure.steps, step)?,
        "dominant": dominant,
    }))
}

fn effects(step: &Step) -> Value {
    step.effects.iter().map(|e| e.word()).collect::<Vec<_>>().into()
}

fn step(step: &Step) -> Result<Value, IoFault> {
    Ok(json!({
        "effects": effects(step),
        "before": number("a figure below a rung", step.before)?,
        "after": number("a figure on a rung", step.after)?,
        "worth_percent": percent("the worth of a rung", step.worth)?,
    }))
}

fn rung(rung: &Rung) -> Result<Value, IoFault> {
    let figure = |f: &ModelFigure| Ok(json!({"value": number(&f.name, f.value)?, "unit": f.unit}));
    Ok(json!({
        "effect": rung.effect.word(),
        "model": rung.model,
        "source": rung.source,
        "figures": named(&rung.figures, |f| &f.name, figure)?,
    }))
}

fn quick_model(model: &QuickModel) -> Result<Value, IoFault> {
    Ok(json!({
        "model": model.assumptions.words(),
        "figures": named(&model.errors, |e| &e.name, quick_error)?,
        "ranges": list(&model.ranges, range)?,
    }))
}

fn quick_error(error: &QuickError) -> Result<Value, IoFault> {
    Ok(json!({
        "value": number(&error.name, error.value)?,
        "unit": error.unit,
        "error_percent": percent(&error.name, error.error)?,
        "left_out": list(&error.causes, step)?,
        "cancelling": error.cancelling.as_ref().map_or(Ok(Value::Null), cancelling)?,
    }))
}

fn cancelling(both: &Cancelling) -> Result<Value, IoFault> {
    let words = |effects: &[lenzbore_solver::ladder::Effect]| effects.iter().map(|e| e.word()).collect::<Vec<_>>();
    Ok(json!({
        "too_high": {"effects": words(&both.high_effects), "percent": percent("a cancelling error", both.high)?},
        "too_low": {"effects": words(&both.low_effects), "percent": percent("a cancelling error", both.low)?},
    }))
}

fn range(range: &Range) -> Result<Value, IoFault> {
    let point = |&(value, error): &(f64, f64)| {
        Ok(json!([number(range.swept.word(), value)?, percent("an error along a sweep", error)?]))
    };
    let inside = range.inside.iter().map(|inside| {
        let intervals = list(&inside.intervals, interval)?;
        Ok(json!({"tolerance_percent": 100.0 * inside.tolerance, "intervals": intervals}))
    });
    Ok(json!({
        "swept": range.swept.word(),
        "here": number("the design's place on a sweep", range.here)?,
        "inside": inside.collect::<Result<Vec<_>, IoFault>>()?,
        "error_percent": list(&range.errors, point)?,
    }))
}

fn interval(interval: &Interval) -> Result<Value, IoFault> {
    Ok(json!({
        "from": number("an interval's end", interval.from)?,
        "to": number("an interval's end", interval.to)?,
        "open_below": interval.open_below,
        "open_above": interval.open_above,
        "by_cancellation": interval.by_cancellation,
    }))
}

fn falls_below(outcome: &LadderOutcome) -> Result<Value, IoFault> {
    list(&outcome.falls_below, |f| {
        Ok(json!({
            "share_percent": 100.0 * f.share,
            "speed_m_per_s": number("a speed", f.speed_m_per_s)?,
            "magnetic_reynolds": number("a magnetic Reynolds number", f.magnetic_reynolds)?,
        }))
    })
}

fn map(map: &ErrorMap) -> Result<Value, IoFault> {
    let numbers = |what: &str, values: &[f64]| list(values, |v| number(what, *v));
    let model = |(assumptions, rows): &(lenzbore_solver::ladder::Assumptions, Vec<Vec<f64>>)| {
        let row = |row: &Vec<f64>| list(row, |e| percent("an error of the map", *e));
        Ok(json!({"model": assumptions.words(), "error_percent": list(rows, row)?}))
    };
    Ok(json!({
        "speed_m_per_s": numbers("a speed of the map", &map.speeds_m_per_s)?,
        "thickness_ratio": numbers("a thickness of the map", &map.thickness_ratios)?,
        "models": list(&map.errors, model)?,
        "here": {
            "speed_m_per_s": number("the design's speed", map.here.0)?,
            "thickness_ratio": number("the design's thickness", map.here.1)?,
        },
    }))
}

/// One line a figure and rung: figure, unit, effect, model, value, worth in per cent of the top.
///
/// # Errors
/// As [`ladder_summary`].
pub fn ladder_csv(outcome: &LadderOutcome) -> Result<String, IoFault> {
    let mut text = String::from("figure,unit,restored,model,value,worth_percent\n");
    for figure in &outcome.figures {
        let mut steps = figure.steps.iter();
        let mut begun = false;
        for (rung, value) in outcome.rungs.iter().zip(&figure.values) {
            let Some(value) = value else { continue };
            let worth = if begun { steps.next().map(|s| 100.0 * s.worth) } else { None };
            begun = true;
            let worth = worth.map_or(Ok(String::new()), |w| finite("a rung's worth", w).map(|w| w.to_string()))?;
            let value = finite(&figure.name, *value)?;
            // Writing into a string cannot fail.
            let _ = writeln!(
                text,
                "{},{},{},\"{}\",{value},{worth}",
                figure.name,
                figure.unit,
                rung.effect.word(),
                rung.model
            );
        }
    }
    Ok(text)
}

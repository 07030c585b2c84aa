//! The input spread on its way out: `input_spread` of each figure, the study as a whole, and `sensitivities.csv`.

use std::fmt::Write as _;

use lenzbore_solver::spread::{FigureSpread, Input, MonteCarlo, Response, Spread};
use serde_json::{Value, json};

use super::fault::IoFault;
use super::finite::{finite, number};

/// What `[tolerance]` makes of one figure.
///
/// # Errors
/// [`IoFault::NotFinite`].
pub(super) fn input_spread(spread: &FigureSpread) -> Result<Value, IoFault> {
    let of = |what: &str, value: f64| number(&format!("{what} of {}", spread.name), value);
    Ok(json!({
        "half_width": of("the input spread", spread.half_width())?,
        "minus": of("the input spread below", spread.minus)?,
        "plus": of("the input spread above", spread.plus)?,
        "worst_minus": of("the worst case below", spread.worst_minus)?,
        "worst_plus": of("the worst case above", spread.worst_plus)?,
        "worst_by": if spread.worst_solved { "solution at the corners" } else { "sum of the changes" },
        "numerical_share": of("the share of the bands in the input spread", spread.numerical)?,
        "complete": spread.complete(),
    }))
}

/// The whole study: inputs, sensitivities, ranking, random draws, cautions.
///
/// # Errors
/// [`IoFault::NotFinite`].
pub fn spread_object(spread: &Spread) -> Result<Value, IoFault> {
    let mut rows = Vec::new();
    for figure in &spread.figures {
        for (i, response) in figure.responses.iter().enumerate() {
            if let Some(response) = response {
                rows.push(sensitivity(figure, &spread.inputs[i], response, figure.shares[i])?);
            }
        }
    }
    let ranking = spread.ranking.iter().map(|&i| {
        let share = number("a share of the input spread", spread.mean_share(i))?;
        Ok(json!({"word": spread.inputs[i].path, "mean_share": share}))
    });
    Ok(json!({
        "coverage": 0.95,
        "combined_by": "root sum square of independent inputs, each normal with its half-width as 95 %",
        "inputs": spread.inputs.iter().map(input).collect::<Result<Vec<_>, _>>()?,
        "measure_better_first": ranking.collect::<Result<Vec<_>, IoFault>>()?,
        "sensitivities": rows,
        "monte_carlo": spread.monte_carlo.as_ref().map(monte_carlo).transpose()?,
        "solutions": spread.solutions,
        "cautions": spread.cautions,
    }))
}

fn input(input: &Input) -> Result<Value, IoFault> {
    let of = |value: f64| number(&input.path, value);
    Ok(json!({
        "word": input.path, "value": of(input.value)?, "unit": input.unit,
        "minus": of(input.minus)?, "plus": of(input.plus)?, "tolerance": input.written,
        "stays": input.stays, "follows": input.follows,
    }))
}

fn sensitivity(figure: &FigureSpread, input: &Input, r: &Response, share: f64) -> Result<Value, IoFault> {
    let of = |value: f64| number(&format!("the sensitivity of {} to {}", figure.name, input.path), value);
    Ok(json!({
        "figure": figure.name, "word": input.path,
        "per_cent_per_per_cent": r.per_cent.map(of).transpose()?,
        "per_cent_band": r.per_cent_band.map(of).transpose()?,
        "slope": of(r.slope)?, "slope_band": of(r.slope_band)?, "slope_unit": slope_unit(figure.unit, input.unit),
        "change_low": of(r.low)?, "change_high": of(r.high)?, "share": of(share)?,
        "nonlinearity": of(r.nonlinearity)?, "linear": r.is_linear(), "far_above_bands": r.clear,
    }))
}

fn monte_carlo(run: &MonteCarlo) -> Result<Value, IoFault> {
    let mut figures = serde_json::Map::new();
    for f in &run.figures {
        let of = |value: f64| number(&format!("the draws of {}", f.name), value);
        let entry =
            json!({"mean": of(f.mean)?, "half_width": of(f.half_width)?, "error": of(f.error)?, "agrees": f.agrees});
        figures.insert(f.name.clone(), entry);
    }
    Ok(json!({"draws": run.draws, "redrawn": run.redrawn, "seed": run.seed, "figures": figures}))
}

/// `N/m` over `m` and the like, as one unit with a bracket.
fn slope_unit(figure: &str, input: &str) -> String {
    match (figure, input) {
        (figure, "") => figure.to_owned(),
        (figure, input) => format!("({figure})/({input})"),
    }
}

/// One line a figure and input: what `sensitivities.csv` holds.
///
/// # Errors
/// [`IoFault::NotFinite`].
pub fn sensitivities_csv(spread: &Spread) -> Result<String, IoFault> {
    let mut text = String::from(
        "figure,unit,value,band,word,word_unit,word_value,minus,plus,stays,follows,per_cent_per_per_cent,slope,\
         slope_band,change_low,change_high,share,nonlinearity,far_above_bands\n",
    );
    for f in &spread.figures {
        for ((input, response), share) in spread.inputs.iter().zip(&f.responses).zip(&f.shares) {
            let Some(r) = response else { continue };
            let what = "a sensitivity";
            let per_cent = r.per_cent.map_or(Ok(String::new()), |p| finite(what, p).map(|p| p.to_string()))?;
            let numbers = [r.slope, r.slope_band, r.low, r.high, *share, r.nonlinearity]
                .map(|x| finite(what, x).map(|x| format!("{x:e}")))
                .into_iter()
                .collect::<Result<Vec<_>, _>>()?;
            // Writing into a string cannot fail.
            let _ = writeln!(
                text,
                "{},{},{:e},{:e},{},{},{:e},{:e},{:e},{},{},{per_cent},{},{}",
                f.name,
                f.unit,
                finite(what, f.nominal.value)?,
                finite(what, f.nominal.band)?,
                quoted(&input.path),
                input.unit,
                finite(what, input.value)?,
                finite(what, input.minus)?,
                finite(what, input.plus)?,
                input.stays.join(" "),
                input.follows.join(" "),
                numbers.join(","),
                r.clear
            );
        }
    }
    Ok(text)
}

/// A part's name may hold a comma.
fn quoted(text: &str) -> String {
    if text.contains([',', ';', '"']) { format!("\"{}\"", text.replace('"', "\"\"")) } else { text.to_owned() }
}

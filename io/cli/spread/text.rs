//! The study as text: spreads, ranking, sensitivities, random draws.

use std::fmt::Write as _;

use lenzbore_solver::spread::{FigureSpread, Input, Response, Spread};

/// Inputs side by side in the table of sensitivities.
const ABREAST: usize = 5;

/// The study in text.
pub fn spread_text(study: &Spread) -> String {
    let mut text = String::new();
    // Writing into a string cannot fail.
    let _ = writeln!(
        text,
        "\ninput spread: 95 % of normal inputs, and all inputs at their worst ends ({} more solutions)",
        study.solutions
    );
    for figure in &study.figures {
        let _ = writeln!(text, "{}", spread_line(figure));
    }
    ranking(&mut text, study);
    sensitivities(&mut text, study);
    draws(&mut text, study);
    for caution in &study.cautions {
        let _ = writeln!(text, "  - {caution}");
    }
    text
}

fn spread_line(f: &FigureSpread) -> String {
    let unit = if f.unit == "1" { "" } else { f.unit };
    let share = |x: f64| if f.nominal.value.abs() > 0.0 { 100.0 * x / f.nominal.value.abs() } else { 0.0 };
    let above = format!("+{:.3} %", share(f.plus));
    format!(
        "{:<32}{:>12} {unit:<6} 95 %: -{:.3} {above:<9} worst: {:.3} +{:.3} %{}",
        f.name,
        short(f.nominal.value),
        share(f.minus),
        share(f.worst_minus),
        share(f.worst_plus),
        if f.worst_solved { "" } else { " (added up)" },
    )
}

/// Five significant digits.
fn short(value: f64) -> String {
    let magnitude = value.abs();
    if magnitude > 0.0 && !(1e-3..1e6).contains(&magnitude) {
        return format!("{value:.4e}");
    }
    let whole = if magnitude > 0.0 { magnitude.log10().floor() } else { 0.0 };
    #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped to 0 to 8")]
    let decimals = (4.0 - whole).clamp(0.0, 8.0) as usize;
    format!("{value:.decimals$}")
}

fn ranking(text: &mut String, study: &Spread) {
    let widest = study.inputs.iter().map(|i| i.path.chars().count()).max().unwrap_or(0).max(5);
    let _ = writeln!(
        text,
        "\nwhat to measure better first{:>w$}  tolerance  sizes across",
        "share",
        w = widest.saturating_sub(19) + 5
    );
    for (place, &i) in study.ranking.iter().enumerate() {
        let input = &study.inputs[i];
        let _ = writeln!(
            text,
            "  [{}] {:<widest$} {:>5.1} %  {:<9}  {}",
            place + 1,
            input.path,
            100.0 * study.mean_share(i),
            tolerance(input),
            companions(input)
        );
    }
}

fn tolerance(input: &Input) -> String {
    if input.written.starts_with('-') { input.written.clone() } else { format!("+/- {}", input.written) }
}

fn companions(input: &Input) -> String {
    let words = |list: &[String]| list.iter().map(|w| w.replace('_', " ")).collect::<Vec<_>>().join(" and ");
    match (input.stays.is_empty(), input.follows.is_empty()) {
        (true, true) => "-".to_owned(),
        (false, true) => format!("{} stays", words(&input.stays)),
        (true, false) => format!("{} follows", words(&input.follows)),
        (false, false) => format!("{} stays, {} follows", words(&input.stays), words(&input.follows)),
    }
}

fn sensitivities(text: &mut String, study: &Spread) {
    let _ = writeln!(
        text,
        "\nsensitivity: % of the figure per % of the input (share of its spread); ~ not linear, ? not far above the bands"
    );
    for (part, columns) in study.ranking.chunks(ABREAST).enumerate() {
        let _ = write!(text, "{:<32}", "");
        for k in 0..columns.len() {
            let _ = write!(text, "{:>20}", format!("[{}]", part * ABREAST + k + 1));
        }
        text.push('\n');
        for figure in &study.figures {
            let _ = write!(text, "{:<32}", figure.name);
            for &i in columns {
                let _ = write!(
                    text,
                    "{:>20}",
                    cell(figure, &study.inputs[i], figure.responses[i].as_ref(), figure.shares[i])
                );
            }
            text.push('\n');
        }
    }
}

fn cell(figure: &FigureSpread, input: &Input, response: Option<&Response>, share: f64) -> String {
    let Some(r) = response else { return "not had".to_owned() };
    if r.unseen() {
        return "0 (0 %)".to_owned();
    }
    let mark = match (r.clear, r.is_linear()) {
        (false, _) => "?",
        (true, false) => "~",
        (true, true) => "",
    };
    let value = match r.per_cent {
        Some(p) => format!("{p:.3}"),
        // Per unit of the input: per kelvin, per millimetre.
        None => {
            let (factor, unit) = match input.unit {
                "m" => (1e-3, "mm"),
                unit => (1.0, unit),
            };
            format!("{:.3} %/{unit}", 100.0 * factor * r.slope / figure.nominal.value.abs())
        }
    };
    format!("{mark}{value} ({:.0} %)", 100.0 * share)
}

fn draws(text: &mut String, study: &Spread) {
    let Some(run) = &study.monte_carlo else { return };
    let redrawn =
        if run.redrawn > 0 { format!(", {} impossible ones drawn again", run.redrawn) } else { String::new() };
    let _ = writeln!(
        text,
        "\n{} random draws, seed {}{redrawn}: half-width at 95 % beside the root sum square",
        run.draws, run.seed
    );
    for s in &run.figures {
        let Some(f) = study.figure(&s.name) else { continue };
        let share = |x: f64| if f.nominal.value.abs() > 0.0 { 100.0 * x / f.nominal.value.abs() } else { x };
        let _ = writeln!(
            text,
            "{:<32}{:>9.3} +/- {:.3} %   {:>9.3} %   {}",
            s.name,
            share(s.half_width),
            share(s.error),
            share(f.half_width()),
            if s.agrees { "agrees" } else { "DOES NOT AGREE" }
        );
    }
}

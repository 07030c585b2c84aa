//! The ladder in text.

use std::fmt::Write as _;

use lenzbore_io::result::ResultHeader;
use lenzbore_solver::ladder::{Effect, FigureLadder, Interval, LadderOutcome, QuickError, QuickModel, Range, Swept};

use crate::say::with_band;

/// Figures that the quick models are judged by in text.
const JUDGED: [&str; 6] = ["drag", "drag_max", "drag_peak", "transit_time", "exit_speed", "impulse"];

/// Rungs of every figure, quick models, how far they reach.
pub fn ladder(header: &ResultHeader, outcome: &LadderOutcome) -> String {
    let mut text = String::new();
    // Writing into a string cannot fail.
    let _ = writeln!(text, "{}", header.title);
    for figure in &outcome.figures {
        rungs(&mut text, figure, outcome);
    }
    let _ = writeln!(text, "\nquick models against the top:");
    for model in &outcome.quick {
        quick(&mut text, model);
    }
    for swept in [Swept::Speed, Swept::ThicknessRatio, Swept::MagnetScale] {
        reach(&mut text, outcome, swept);
    }
    falls_below(&mut text, outcome);
    let skipped: Vec<String> = outcome.skipped.iter().map(|s| format!("{}: {}", s.what, s.why)).collect();
    list(&mut text, "not on this ladder", &skipped);
    let of_the_run = outcome.top.cautions.iter().map(|c| c.text.clone());
    list(&mut text, "cautions", &header.cautions.iter().cloned().chain(of_the_run).collect::<Vec<_>>());
    list(&mut text, "not modelled", &header.not_modelled);
    text
}

fn list(text: &mut String, heading: &str, items: &[String]) {
    if items.is_empty() {
        return;
    }
    let _ = writeln!(text, "\n{heading}:");
    for item in items {
        let _ = writeln!(text, "  - {item}");
    }
}

fn rungs(text: &mut String, figure: &FigureLadder, outcome: &LadderOutcome) {
    let (value, band) = with_band(figure.top, figure.band);
    let unit = if figure.unit == "1" { "" } else { figure.unit };
    let _ = writeln!(text, "\n{} = {value} {unit} +/- {band}", figure.name);
    if figure.steps.is_empty() {
        let _ = writeln!(text, "  no simpler model has this figure");
        return;
    }
    let mut steps = figure.steps.iter().enumerate();
    let mut begun = false;
    for (rung, value) in outcome.rungs.iter().zip(&figure.values) {
        let Some(value) = value else { continue };
        let step = if begun { steps.next() } else { None };
        let (worth, mark) = step.map_or((String::new(), ""), |(k, s)| {
            (signed(s.worth), if figure.dominant == Some(k) { "  <- moves it most" } else { "" })
        });
        let restored = step.map_or_else(
            || rung.effect.word().to_owned(),
            |(_, s)| s.effects.iter().map(|e| e.word()).collect::<Vec<_>>().join(", "),
        );
        begun = true;
        let _ = writeln!(text, "  {restored:<32}{:>12} {worth:>10}{mark}", short(*value));
    }
}

/// Five digits, or powers of ten far from one.
fn short(value: f64) -> String {
    if value.abs() >= 1e6 || (value.abs() < 1e-4 && value.abs() > 0.0) {
        return format!("{value:.4e}");
    }
    let whole = value.abs().max(1e-300).log10().floor();
    let digits = (4.0 - whole).clamp(0.0, 9.0);
    #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped to 0 .. 9")]
    let digits = digits as usize;
    format!("{value:.digits$}")
}

fn signed(relative: f64) -> String {
    format!("{:+.2} %", 100.0 * relative)
}

fn quick(text: &mut String, model: &QuickModel) {
    let judged = model.errors.iter().filter(|e| JUDGED.contains(&e.name.as_str()));
    let errors: Vec<String> = judged.clone().map(|e| format!("{} {}", e.name, signed(e.error))).collect();
    let _ = writeln!(text, "  {}: {}", model.assumptions.words(), errors.join(", "));
    for error in judged {
        cancelling(text, error);
    }
}

fn cancelling(text: &mut String, error: &QuickError) {
    let Some(both) = &error.cancelling else { return };
    let words = |effects: &[Effect]| effects.iter().map(|e| e.word()).collect::<Vec<_>>().join(" and ");
    let _ = writeln!(
        text,
        "    {} looks right ({}) because two errors cancel: {} from leaving out {}, {} from leaving out {}",
        error.name,
        signed(error.error),
        signed(both.high),
        words(&both.high_effects),
        signed(both.low),
        words(&both.low_effects)
    );
}

fn reach(text: &mut String, outcome: &LadderOutcome, swept: Swept) {
    let range = |m: &QuickModel| m.ranges.iter().find(|r| r.swept == swept).cloned();
    let Some(first) = outcome.quick.iter().find_map(range) else { return };
    let unit = if swept == Swept::Speed { " m/s" } else { "" };
    let _ = writeln!(
        text,
        "\ndrag in an endless wall over {} (this design: {}{unit}); within 1, 2, 5, 10 %:",
        swept.word(),
        short(first.here)
    );
    for model in &outcome.quick {
        let Some(range) = range(model) else { continue };
        let inside: Vec<String> = range.inside.iter().map(|i| intervals(&i.intervals)).collect();
        let _ = writeln!(text, "  {}: {}", model.assumptions.words(), inside.join(" | "));
        if let Some(note) = by_luck(&range) {
            let _ = writeln!(text, "    {note}");
        }
    }
}

fn intervals(all: &[Interval]) -> String {
    let one = |i: &Interval| {
        let star = if i.by_cancellation { "*" } else { "" };
        match (i.open_below, i.open_above) {
            (true, true) => "everywhere swept".to_owned(),
            (true, false) => format!("up to {}{star}", significant(i.to)),
            (false, true) => format!("from {}{star}", significant(i.from)),
            (false, false) => format!("{} to {}{star}", significant(i.from), significant(i.to)),
        }
    };
    if all.is_empty() { "nowhere".to_owned() } else { all.iter().map(one).collect::<Vec<_>>().join(", ") }
}

fn significant(value: f64) -> String {
    let whole = value.abs().max(1e-300).log10().floor();
    let digits = (2.0 - whole).clamp(0.0, 6.0);
    #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped to 0 .. 6")]
    let digits = digits as usize;
    format!("{value:.digits$}")
}

fn by_luck(range: &Range) -> Option<&'static str> {
    let starred = range.inside.iter().flat_map(|i| &i.intervals).any(|i| i.by_cancellation);
    starred.then_some("* only while two larger errors cancel: too low on one side, too high on the other")
}

fn falls_below(text: &mut String, outcome: &LadderOutcome) {
    if outcome.falls_below.is_empty() {
        return;
    }
    let _ = writeln!(text, "\nthe drag falls below the low-speed law c v (settled fields, endless wall):");
    for f in &outcome.falls_below {
        let _ = writeln!(
            text,
            "  by {:>2.0} % at {} m/s (mu0 sigma w v = {})",
            100.0 * f.share,
            significant(f.speed_m_per_s),
            significant(f.magnetic_reynolds)
        );
    }
}

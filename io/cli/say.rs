//! What is said on the terminal.

mod sweeps;

use std::borrow::Cow;
use std::fmt::Write as _;
use std::io::Write as _;

use lenzbore_io::result::ResultHeader;
use lenzbore_solver::outcome::{
    Basis, DragCurve, Figure, FrequencyResponse, LumpedModel, Outcome, SlottedDrag, StrokeResponse,
};

mod warmth;

/// Points of a curve shown on the terminal.
const SHOWN_POINTS: usize = 12;

/// Writes to standard output; a closed pipe is no fault.
pub fn to_standard_output(text: &str) {
    let _ = std::io::stdout().lock().write_all(harmless(text).as_bytes());
}

/// Text without characters that a terminal obeys: they come out as JSON writes them, so that JSON stays what it is.
fn harmless(text: &str) -> Cow<'_, str> {
    let obeyed = |c: char| c.is_control() && c != '\n' && c != '\t';
    if !text.contains(obeyed) {
        return Cow::Borrowed(text);
    }
    let mut shown = String::with_capacity(text.len());
    for c in text.chars() {
        if obeyed(c) {
            // Writing into a string cannot fail.
            let _ = write!(shown, "\\u{:04x}", u32::from(c));
        } else {
            shown.push(c);
        }
    }
    Cow::Owned(shown)
}

/// Writes a line to standard error.
pub fn to_standard_error(text: &str) {
    let mut stream = std::io::stderr().lock();
    let _ = writeln!(stream, "{}", harmless(text.trim_end()));
}

/// The answer in text: figures with bands, forces, ledger, cautions.
pub fn answer(header: &ResultHeader, outcome: &Outcome) -> String {
    let mut text = String::new();
    // Writing into a string cannot fail.
    let _ = writeln!(text, "{}", header.title);
    let _ = writeln!(text, "ended: {}\n", outcome.stop.word());
    for figure in &outcome.figures {
        let _ = writeln!(text, "{}", figure_line(figure));
    }
    if let Some(curve) = &outcome.curve {
        curve_lines(&mut text, curve, outcome.slotted.as_ref());
    }
    if let Some(response) = &outcome.frequency {
        frequency_lines(&mut text, response);
    }
    if let Some(response) = &outcome.strokes {
        stroke_lines(&mut text, response);
    }
    sweeps::lines(&mut text, &outcome.sweeps);
    if let Some(duty) = outcome.thermal.as_ref().and_then(|t| t.duty.as_ref()) {
        text.push_str(&warmth::duty_lines(duty));
    }
    balance(&mut text, outcome);
    if let Some(thermal) = &outcome.thermal {
        text.push_str(&warmth::ledger_line(thermal));
    }
    regime(&mut text, outcome);
    let cautions: Vec<&str> =
        header.cautions.iter().map(String::as_str).chain(outcome.cautions.iter().map(|c| c.text.as_str())).collect();
    list(&mut text, "cautions", &cautions);
    list(&mut text, "not modelled", &header.not_modelled.iter().map(String::as_str).collect::<Vec<_>>());
    text
}

fn list(text: &mut String, heading: &str, items: &[&str]) {
    if items.is_empty() {
        return;
    }
    let _ = writeln!(text, "\n{heading}:");
    for item in items {
        let _ = writeln!(text, "  - {item}");
    }
}

fn figure_line(figure: &Figure) -> String {
    let (value, band) = if figure.band <= 0.0 && figure.value.abs() > 0.0 {
        (significant(figure.value), "0".to_owned())
    } else {
        with_band(figure.value, figure.band)
    };
    let place = figure.location.map_or(String::new(), |l| {
        // A place that rounds to zero has no sign.
        let millimetres = |x: f64| format!("{:.2} mm", (1e5 * x).round() / 1e2 + 0.0);
        let r = l.r_m.map(|r| format!("r = {}", millimetres(r)));
        let z = l.z_m.map(|z| format!("z = {}", millimetres(z)));
        let t = l.t_s.filter(|_| figure.unit != "s").map(|t| format!("t = {t:.4} s"));
        let parts: Vec<String> = [r, z, t].into_iter().flatten().collect();
        if parts.is_empty() { String::new() } else { format!("   at {}", parts.join(", ")) }
    });
    let unit = if figure.unit == "1" { "" } else { figure.unit };
    let share = percent(figure.band, figure.value);
    let model = if figure.basis == Basis::Approximation { "   approximation, with a model band" } else { "" };
    // A long name takes of the blanks before its value.
    let width = 48_usize.saturating_sub(figure.name.chars().count()).max(1);
    format!("{}{value:>width$} {unit:<6} +/- {band:<10} {share}{place}{model}", figure.name)
}

fn percent(band: f64, value: f64) -> String {
    if value.abs() > 0.0 && band > 0.0 { format!("({:.1e} %)", 100.0 * band / value.abs()) } else { String::new() }
}

/// A value to the band's second digit, and the band.
pub fn with_band(value: f64, band: f64) -> (String, String) {
    if band <= 0.0 || !band.is_finite() {
        return (format!("{value}"), "0".to_owned());
    }
    let digits = (1.0 - band.log10().floor()).clamp(0.0, 15.0);
    if value.abs() >= 1.0e6 || (value.abs() < 1.0e-4 && value.abs() > 0.0) {
        let significant = (value.abs() / band).log10().ceil().clamp(1.0, 15.0) + 1.0;
        return (format!("{value:.*e}", whole(significant)), format!("{band:.1e}"));
    }
    let band = if band < 1.0e-4 { format!("{band:.1e}") } else { format!("{band:.*}", whole(digits)) };
    (format!("{value:.*}", whole(digits)), band)
}

/// Significant digits of forces and energies.
const DIGITS: f64 = 8.0;

/// A number to eight significant digits.
pub fn significant(value: f64) -> String {
    let size = value.abs();
    if size > 0.0 && !(1.0e-3..1.0e7).contains(&size) {
        return format!("{value:.*e}", whole(DIGITS - 1.0));
    }
    let before = if size > 0.0 { size.log10().floor() } else { 0.0 };
    format!("{value:.*}", whole((DIGITS - 1.0 - before).clamp(0.0, 15.0)))
}

#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped to 0 .. 16 by the callers")]
fn whole(digits: f64) -> usize {
    digits as usize
}

fn curve_lines(text: &mut String, curve: &DragCurve, slotted: Option<&SlottedDrag>) {
    let count = curve.points.len();
    let stride = count.div_ceil(SHOWN_POINTS).max(1);
    let slots =
        slotted.map_or_else(String::new, |s| format!("  {:>16}  {:>10}", format!("{} slots N", s.slots), "band N"));
    let _ = writeln!(text, "\n{:>16}  {:>16}  {:>10}{slots}", "speed m/s", "drag N", "band N");
    for (k, point) in curve.points.iter().enumerate() {
        if k % stride == 0 || k + 1 == count {
            let (drag, _) = with_band(point.drag_newton, point.band_newton);
            let with_slots = slotted.and_then(|s| s.points.get(k)).map_or_else(String::new, |p| {
                format!("  {:>16}  {:>10.1e}", with_band(p.drag_newton, p.band_newton).0, p.band_newton)
            });
            let (speed, band) = (point.speed_m_per_s, point.band_newton);
            let _ = writeln!(text, "{speed:>16.6}  {drag:>16}  {band:>10.1e}{with_slots}");
        }
    }
}

fn frequency_lines(text: &mut String, response: &FrequencyResponse) {
    let count = response.points.len();
    let stride = count.div_ceil(SHOWN_POINTS).max(1);
    let _ = writeln!(
        text,
        "\n{:>14} {:>17} {:>9} {:>17} {:>9} {:>15} {:>11} {:>10}",
        "frequency Hz", "added R ohm", "band", "added X ohm", "band", "inductance H", "shielding", "skin mm"
    );
    let or_dash = |value: Option<String>| value.unwrap_or_else(|| "-".to_owned());
    for (k, p) in response.points.iter().enumerate() {
        if k % stride == 0 || k + 1 == count {
            let (r, x) = (p.resistance_change, p.reactance_change);
            let shielding = or_dash(p.shielding.map(|s| format!("{:.6}", s.magnitude())));
            let skin = or_dash(p.skin_depth_m.map(|d| format!("{:.4}", 1e3 * d)));
            let _ = writeln!(
                text,
                "{:>14.6} {:>17} {:>9.1e} {:>17} {:>9.1e} {:>15.8e} {shielding:>11} {skin:>10}",
                p.frequency_hz,
                with_band(r.value, r.band).0,
                r.band,
                with_band(x.value, x.band).0,
                x.band,
                p.inductance_henry
            );
        }
    }
}

/// Small strokes over frequency, and what stands for them in a simulation.
fn stroke_lines(text: &mut String, response: &StrokeResponse) {
    let count = response.points.len();
    let stride = count.div_ceil(SHOWN_POINTS).max(1);
    let heading = ("small strokes Hz", "damping N s/m", "band", "stiffness N/m", "band");
    let _ = writeln!(text, "\n{:>16} {:>17} {:>9} {:>17} {:>9}", heading.0, heading.1, heading.2, heading.3, heading.4);
    for (k, p) in response.points.iter().enumerate() {
        if k % stride == 0 || k + 1 == count {
            let (c, s) = (with_band(p.damping, p.damping_band).0, with_band(p.stiffness, p.stiffness_band).0);
            let f = p.frequency_hz;
            let _ = writeln!(text, "{f:>16.6} {c:>17} {:>9.1e} {s:>17} {:>9.1e}", p.damping_band, p.stiffness_band);
        }
    }
    let _ = writeln!(text, "\nfor a simulation of small strokes, F = sum of F_k with tau_k dF_k/dt + F_k = -c_k v:");
    for model in &response.lumped {
        let _ = writeln!(text, "{}", lumped_line(model));
    }
}

fn lumped_line(model: &LumpedModel) -> String {
    let term = |t: &lenzbore_solver::outcome::LumpedTerm| {
        format!("c {:.5} N s/m tau {:.5} ms", t.damping_n_s_per_m, 1e3 * t.lag_s)
    };
    let terms: Vec<String> = model.terms.iter().map(term).collect();
    format!("  within {:>6.2} %: {}", 100.0 * model.largest_error, terms.join("; "))
}

fn balance(text: &mut String, outcome: &Outcome) {
    if let Some(f) = outcome.forces {
        let verdict = if f.agree { "agree" } else { "DO NOT AGREE" };
        let _ = writeln!(
            text,
            "\nthree forces at the greatest drag: wall {} N, mover {} N, stress in the gap {} N: {verdict} within {:.1e} N",
            significant(f.wall_newton),
            significant(f.mover_newton),
            significant(f.stress_newton),
            f.band_newton
        );
    }
    if let Some(l) = outcome.ledger {
        let _ = writeln!(
            text,
            "ledger: work {} {u} = heat {} {u} + field energy {:.2e} {u}; open by {:.1e} of the work",
            significant(l.work),
            significant(l.heat),
            l.field_energy,
            l.imbalance_relative.abs(),
            u = l.unit
        );
    }
    let a = &outcome.accuracy;
    if a.met {
        let _ = writeln!(text, "accuracy: every band is within the target of {:.1e} %", 100.0 * a.target_relative);
    } else if let Some(advice) = &a.advice {
        let _ = writeln!(text, "accuracy: TARGET MISSED: {advice}");
    }
}

fn regime(text: &mut String, outcome: &Outcome) {
    let r = &outcome.regime;
    if outcome.frequency.is_some() {
        let depth = r.depth_ratio.map_or("none".to_owned(), |d| format!("{d:.3}"));
        let _ = writeln!(
            text,
            "regime at the highest frequency: wall/bore {:.3}, gap/bore {:.3}, least skin depth/wall {depth}",
            r.thickness_ratio, r.gap_ratio
        );
        return;
    }
    let depth = r.depth_ratio.map_or("at rest".to_owned(), |d| format!("depth/wall {d:.3}"));
    let _ = writeln!(
        text,
        "regime at {:.4} m/s: wall/bore {:.3}, gap/bore {:.3}, mu0 sigma w v {:.4}, {depth}",
        r.speed_m_per_s, r.thickness_ratio, r.gap_ratio, r.magnetic_reynolds
    );
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn what_a_terminal_obeys_is_shown_instead() {
        assert_eq!(harmless("a\u{1b}[2J\u{9b}31m\r\n\tb\u{7f}"), "a\\u001b[2J\\u009b31m\\u000d\n\tb\\u007f");
        assert!(matches!(harmless("plain\n"), Cow::Borrowed(_)));
    }

    #[test]
    fn numbers_keep_their_digits_whatever_their_size() {
        assert_eq!(significant(2.212_929_281), "2.2129293");
        assert_eq!(significant(-1_234.567_89), "-1234.5679");
        assert_eq!(significant(3.5e-9), "3.5000000e-9");
        assert_eq!(significant(0.0), "0.0000000");
    }
}

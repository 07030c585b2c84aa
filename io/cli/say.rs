//! What is said on the terminal.

use std::fmt::Write as _;
use std::io::Write as _;

use lenzbore_io::result::ResultHeader;
use lenzbore_solver::outcome::{DragCurve, Figure, Outcome};

/// Points of a curve shown on the terminal.
const SHOWN_POINTS: usize = 12;

/// Writes to standard output; a closed pipe is no fault.
pub fn to_standard_output(text: &str) {
    let _ = std::io::stdout().lock().write_all(text.as_bytes());
}

/// Writes a line to standard error.
pub fn to_standard_error(text: &str) {
    let mut stream = std::io::stderr().lock();
    let _ = writeln!(stream, "{}", text.trim_end());
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
        curve_lines(&mut text, curve);
    }
    balance(&mut text, outcome);
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
    let (value, band) = with_band(figure.value, figure.band);
    let place = figure.location.map_or(String::new(), |l| {
        let millimetres = |x: f64| format!("{:.2} mm", 1e3 * x);
        let r = l.r_m.map(|r| format!("r = {}", millimetres(r)));
        let z = l.z_m.map(|z| format!("z = {}", millimetres(z)));
        let t = l.t_s.filter(|_| figure.unit != "s").map(|t| format!("t = {t:.4} s"));
        let parts: Vec<String> = [r, z, t].into_iter().flatten().collect();
        if parts.is_empty() { String::new() } else { format!("   at {}", parts.join(", ")) }
    });
    let unit = if figure.unit == "1" { "" } else { figure.unit };
    let share = percent(figure.band, figure.value);
    format!("{:<32}{value:>16} {unit:<6} +/- {band:<10} {share}{place}", figure.name)
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

#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped to 0 .. 16 by the callers")]
fn whole(digits: f64) -> usize {
    digits as usize
}

fn curve_lines(text: &mut String, curve: &DragCurve) {
    let count = curve.points.len();
    let stride = count.div_ceil(SHOWN_POINTS).max(1);
    let _ = writeln!(text, "\n{:>16}  {:>16}  {:>10}", "speed m/s", "drag N", "band N");
    for (k, point) in curve.points.iter().enumerate() {
        if k % stride == 0 || k + 1 == count {
            let (drag, _) = with_band(point.drag_newton, point.band_newton);
            let _ = writeln!(text, "{:>16.6}  {drag:>16}  {:>10.1e}", point.speed_m_per_s, point.band_newton);
        }
    }
}

fn balance(text: &mut String, outcome: &Outcome) {
    if let Some(f) = outcome.forces {
        let verdict = if f.agree { "agree" } else { "DO NOT AGREE" };
        let _ = writeln!(
            text,
            "\nthree forces at the greatest drag: wall {:.7} N, mover {:.7} N, stress in the gap {:.7} N: {verdict} within {:.1e} N",
            f.wall_newton, f.mover_newton, f.stress_newton, f.band_newton
        );
    }
    if let Some(l) = outcome.ledger {
        let _ = writeln!(
            text,
            "ledger: work {:.7} {u} = heat {:.7} {u} + field energy {:.2e} {u}; open by {:.1e} of the work",
            l.work,
            l.heat,
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
    let depth = r.depth_ratio.map_or("at rest".to_owned(), |d| format!("depth/wall {d:.3}"));
    let _ = writeln!(
        text,
        "regime at {:.4} m/s: wall/bore {:.3}, gap/bore {:.3}, mu0 sigma w v {:.4}, {depth}",
        r.speed_m_per_s, r.thickness_ratio, r.gap_ratio, r.magnetic_reynolds
    );
}

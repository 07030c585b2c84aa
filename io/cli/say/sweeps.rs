//! What a curve sweeps beside speed, as tables on the terminal.

use std::fmt::Write as _;

use lenzbore_solver::outcome::{AtPosition, AtStroke, AtTemperature, Sweeps};

use super::{SHOWN_POINTS, with_band};

/// 0 degC, K.
const CELSIUS_ZERO_K: f64 = 273.15;

/// All that was swept.
pub(super) fn lines(text: &mut String, sweeps: &Sweeps) {
    // Writing into a string cannot fail.
    if !sweeps.temperatures.is_empty() {
        temperatures(text, &sweeps.temperatures);
    }
    if !sweeps.positions.is_empty() {
        positions(text, &sweeps.positions);
    }
    if !sweeps.strokes.is_empty() {
        strokes(text, &sweeps.strokes);
    }
}

/// A row a temperature.
fn temperatures(text: &mut String, all: &[AtTemperature]) {
    let _ = writeln!(
        text,
        "\n{:>16} {:>16} {:>9} {:>14} {:>14} {:>12}",
        "temperature degC", "damping N s/m", "band", "critical m/s", "drag_max N", "lag_time ms"
    );
    for at in all {
        let c0 = at.figure("damping_coefficient_zero_speed").map_or((0.0, 0.0), |f| (f.value, f.band));
        let of = |name: &str, factor: f64| {
            at.figure(name).map_or_else(|| "-".to_owned(), |f| with_band(factor * f.value, factor * f.band).0)
        };
        let _ = writeln!(
            text,
            "{:>16.2} {:>16} {:>9.1e} {:>14} {:>14} {:>12}",
            at.temperature_k - CELSIUS_ZERO_K,
            with_band(c0.0, c0.1).0,
            c0.1,
            of("critical_speed", 1.0),
            of("drag_max", 1.0),
            of("lag_time", 1e3),
        );
    }
}

fn positions(text: &mut String, all: &[AtPosition]) {
    let stride = all.len().div_ceil(SHOWN_POINTS).max(1);
    let _ = writeln!(text, "\n{:>16} {:>16} {:>9}", "position mm", "damping N s/m", "band");
    for (k, at) in all.iter().enumerate() {
        if k % stride == 0 || k + 1 == all.len() {
            let (damping, band) = (with_band(at.damping, at.damping_band).0, at.damping_band);
            let _ = writeln!(text, "{:>16.4} {damping:>16} {band:>9.1e}", 1e3 * at.position_m);
        }
    }
}

fn strokes(text: &mut String, all: &[AtStroke]) {
    let _ = writeln!(
        text,
        "\n{:>12} {:>12} {:>16} {:>9} {:>15} {:>9} {:>15} {:>9}",
        "amplitude mm", "frequency Hz", "damping N s/m", "band", "stiffness N/m", "band", "loss J", "band"
    );
    for at in all {
        let shown = |value: f64, band: f64| with_band(value, band).0;
        let _ = writeln!(
            text,
            "{:>12.4} {:>12.5} {:>16} {:>9.1e} {:>15} {:>9.1e} {:>15} {:>9.1e}",
            1e3 * at.amplitude_m,
            at.frequency_hz,
            shown(at.damping, at.damping_band),
            at.damping_band,
            shown(at.stiffness, at.stiffness_band),
            at.stiffness_band,
            shown(at.loss, at.loss_band),
            at.loss_band
        );
    }
}

//! How warm the wall gets, on the terminal.

use std::fmt::Write as _;

use lenzbore_solver::outcome::{DutyOutcome, Thermal};

use super::{SHOWN_POINTS, significant};

const CELSIUS_ZERO_K: f64 = 273.15;

/// Stop by stop: some of them, the last among them.
pub fn duty_lines(duty: &DutyOutcome) -> String {
    let mut text = String::new();
    // Writing into a string cannot fail.
    let _ = writeln!(
        text,
        "\n{:>6} {:>10} {:>12} {:>13} {:>13} {:>13} {:>13}",
        "stop", "time s", "heat J", "drag peak N", "before degC", "mean degC", "peak degC"
    );
    let count = duty.stops.len();
    let stride = count.div_ceil(SHOWN_POINTS).max(1);
    for (k, s) in duty.stops.iter().enumerate() {
        if k % stride == 0 || k + 1 == count {
            let celsius = |kelvin: f64| format!("{:.3}", kelvin - CELSIUS_ZERO_K);
            let _ = writeln!(
                text,
                "{:>6} {:>10.3} {:>12.5} {:>13.5} {:>13} {:>13} {:>13}",
                s.number,
                s.time_s,
                s.energy_joule,
                s.drag_peak_newton,
                celsius(s.temperature_before_k),
                celsius(s.temperature_mean_k),
                celsius(s.temperature_peak_k)
            );
        }
    }
    text
}

/// Where the heat went.
pub fn ledger_line(thermal: &Thermal) -> String {
    let l = &thermal.ledger;
    format!(
        "heat: {} J = stored {} J + given off {} J; open by {:.1e} of it\n",
        significant(l.heat),
        significant(l.stored),
        significant(l.lost),
        l.imbalance_relative.abs()
    )
}

//! A wall that warms, for tests: invented, but of the right shape.

use lenzbore_solver::outcome::{DutyOutcome, DutyStop, HeatLedger, LayerWarmth, TemperatureField, Thermal};

/// Forty stops that settle at 30 K above the start.
pub(crate) fn thermal() -> Thermal {
    let stop = |n: u32| {
        let number = f64::from(n);
        let before = 293.15 + 30.0 * (1.0 - (-(number - 1.0) / 8.0).exp());
        DutyStop {
            number,
            time_s: 20.0 * (number - 1.0),
            energy_joule: 40.0 - 0.03 * (before - 293.15),
            drag_peak_newton: 50.0 / (1.0 + 0.0037 * (before - 293.15)),
            temperature_before_k: before,
            temperature_mean_k: before + 3.0,
            temperature_peak_k: before + 5.0,
            surface_bore_k: before + 5.0,
            surface_outside_k: before + 3.5,
        }
    };
    let stops: Vec<DutyStop> = (1..=40).map(stop).collect();
    let layer = LayerWarmth {
        name: "tube".into(),
        mass_kg: 0.1,
        heat_capacity_j_per_k: 38.5,
        heat_joule: 40.0,
        rise_mean_k: 1.04,
        rise_peak_k: 2.2,
        conductivity_change: Some(-0.0085),
    };
    let field = |moment, description| TemperatureField { moment, description, temperature_k: vec![293.15; 6] };
    Thermal {
        start_k: 293.15,
        layers: vec![layer],
        conductivity_change_mean: Some(-0.005),
        ledger: HeatLedger { heat: 1600.0, stored: 1200.0, lost: 400.0, imbalance_relative: 0.0 },
        r_m: vec![0.01, 0.011, 0.012],
        z_m: vec![0.0, 0.12],
        fields: vec![
            field("after_event", "right after one event"),
            field("after_last_stop", "right after the last stop"),
        ],
        duty: Some(DutyOutcome {
            stops,
            has_bore: true,
            settled: true,
            solved_at: vec![[293.15, 40.0, 50.0], [323.15, 39.1, 45.0]],
            uniform_cost: -0.004,
        }),
    }
}

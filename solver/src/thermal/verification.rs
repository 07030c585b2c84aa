//! The heat of an event to the last joule, and duties whose end is known exactly.
#![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

use crate::problem::{Cooling, Duty, Problem, Warming};
use crate::verification::cases::{
    answer, figure, finite, layer, long_passage, magnet, problem, traverse, value, warmed,
};

/// A short traverse whose heat is followed.
fn passage() -> Problem {
    let wall = finite(0.06, vec![layer(11.0, 13.0, 58.0, 1.0), layer(13.0, 14.0, 10.0, 1.0)]);
    warmed(problem(wall, vec![magnet(0.0, 9.0, 12.0, 1.25, 0.0)], traverse(4.0, 130.0, -70.0), 3))
}

fn repeated(cooling: Option<Cooling>, duty: Duty) -> Problem {
    let problem = passage();
    let warming = problem.warming.clone().unwrap();
    // Without a temperature coefficient every event is the same.
    let layers = warming.layers.iter().map(|l| crate::problem::LayerHeat { resistivity_coefficient_per_k: None, ..*l });
    Problem { warming: Some(Warming { layers: layers.collect(), cooling, duty: Some(duty), ..warming }), ..problem }
}

#[test]
fn the_mean_rise_is_energy_over_mass_and_specific_heat() {
    let outcome = answer(&passage());
    let ledger = outcome.ledger.unwrap();
    let capacity = value(&outcome, "wall_heat_capacity");
    approx::assert_relative_eq!(value(&outcome, "temperature_rise_mean"), ledger.heat / capacity, max_relative = 1e-12);
    let thermal = outcome.thermal.unwrap();
    let by_layer: f64 = thermal.layers.iter().map(|l| l.heat_joule).sum();
    approx::assert_relative_eq!(by_layer, ledger.heat, max_relative = 1e-12);
    assert!(thermal.ledger.imbalance_relative.abs() < 1e-12, "{:?}", thermal.ledger);
    assert!(value_of_peak(&thermal) > 1.5 * ledger.heat / capacity);
}

fn value_of_peak(thermal: &crate::outcome::Thermal) -> f64 {
    thermal.layers.iter().map(|l| l.rise_peak_k).fold(0.0, f64::max)
}

#[test]
fn windows_leave_the_same_heat_as_whole_grids() {
    let outcome = answer(&warmed(long_passage(0.3, 3.0)));
    let layers = outcome.thermal.unwrap().layers;
    let heat: f64 = layers.iter().map(|l| l.heat_joule).sum();
    approx::assert_relative_eq!(heat, outcome.ledger.unwrap().heat, max_relative = 1e-12);
    let peak = outcome.figures.iter().find(|f| f.name == "temperature_rise_peak").unwrap();
    let whole =
        crate::march::march_on_whole_grids(&warmed(long_passage(0.3, 3.0)), &crate::monitor::Unwatched).unwrap();
    let of_whole = figure(&whole, "temperature_rise_peak");
    assert!(
        (peak.value - of_whole.value).abs() <= peak.band + of_whole.band + 1e-5 * peak.value,
        "{peak:?} {of_whole:?}"
    );
}

#[test]
fn an_insulated_wall_keeps_every_stop() {
    let outcome = answer(&repeated(None, Duty { period_s: 5.0, repeats: Some(4) }));
    let thermal = outcome.thermal.clone().unwrap();
    // The ledger of the heat is the finest grid's, as that of one event is.
    let once = answer(&passage()).thermal.unwrap().ledger.heat;
    approx::assert_relative_eq!(thermal.ledger.heat, 4.0 * once, max_relative = 1e-10);
    approx::assert_relative_eq!(thermal.ledger.stored, thermal.ledger.heat, max_relative = 1e-8);
    assert!(thermal.ledger.lost.abs() <= 0.0);
    let rise = value(&outcome, "temperature_last_mean") - 293.15;
    approx::assert_relative_eq!(rise, 4.0 * value(&outcome, "temperature_rise_mean"), max_relative = 1e-6);
    assert!(value(&outcome, "drag_fade").abs() <= 0.0);
}

/// A wall whose inside is far better than its films cools as one lump: tau = C / (h A), and settles at Q / (1 - exp(-P / tau)) right
/// after a stop. Its Biot number, h w / k = 4e-4, bounds what is left out.
#[test]
fn a_thin_wall_settles_as_a_lump() {
    let film = 25.0;
    let cooling = Cooling { bore_w_per_m2_k: 0.0, outside_w_per_m2_k: film, ends_w_per_m2_k: 0.0, ambient_k: 293.15 };
    let outcome = answer(&repeated(Some(cooling), Duty { period_s: 30.0, repeats: None }));
    let capacity = value(&outcome, "wall_heat_capacity");
    let area = 2.0 * std::f64::consts::PI * 0.014 * 0.06;
    let tau = capacity / (film * area);
    approx::assert_relative_eq!(value(&outcome, "cooling_time_constant"), tau, max_relative = 1e-3);
    let rise = value(&outcome, "temperature_settled_mean") - 293.15;
    let lump = value(&outcome, "energy_per_stop") / capacity / (1.0 - (-30.0_f64 / tau).exp());
    approx::assert_relative_eq!(rise, lump, max_relative = 2e-3);
    let ledger = outcome.thermal.unwrap().ledger;
    assert!(ledger.lost > 0.0 && ledger.imbalance_relative.abs() < 1e-8, "{ledger:?}");
}

//! Order of the settled drag through the public interface, against the exact integral.
//!
//! Dipole of 1 A m2 in an endless tube, radii 10.5 and 12.5 mm, 58 MS/m. F = (mu0 m^2/2 pi^2) int k^3 Im Gamma dk,
//! Gamma(k) from the matching of modified Bessel functions at both faces (after M. H. Partovi and E. J. Morris,
//! "Electrodynamics of a magnet moving through a conducting pipe", Can. J. Phys. 84, 253-271 (2006); matching
//! derived anew). Computed with mpmath 1.3 at 25 digits, independently of this program.

use super::cases::{answer, dipole, endless, figure, layer, problem};
use super::order::{Wanted, assert_orders};
use crate::problem::{Accuracy, Problem, Travel};

const SPEEDS_AND_DRAGS: [(f64, f64); 4] = [
    (0.1, 0.047_203_003_705_038_5),
    (5.0, 2.212_929_280_712_75),
    (20.0, 4.728_058_310_287_23),
    (100.0, 2.574_114_186_353_67),
];

fn tube(velocity_m_per_s: f64, levels: usize) -> Problem {
    let wall = endless(vec![layer(10.5, 12.5, 58.0, 1.0)]);
    problem(wall, vec![dipole()], Travel::Steady { velocity_m_per_s }, levels)
}

fn check(case: usize, wanted: &[Wanted]) {
    let (speed, exact) = SPEEDS_AND_DRAGS[case];
    let outcome = answer(&tube(speed, 5));
    let drag = figure(&outcome, "drag");
    println!("{speed} m/s: {:.1e} off, band {:.1e}", drag.value / exact - 1.0, drag.band / exact);
    assert_orders(&format!("{speed} m/s"), &drag.levels, exact, wanted);
    assert!((drag.value - exact).abs() <= drag.band, "the truth is outside the band");
}

#[test]
fn drag_at_0_1_m_per_s_converges_with_orders_2_4_6() {
    check(0, &Wanted::even(&[3.7e-4, 6.2e-7, 7.7e-9]));
}

#[test]
fn drag_at_5_m_per_s_converges_with_orders_2_4_6() {
    check(1, &Wanted::even(&[6.5e-4, 8.6e-8, 8.6e-9]));
}

/// After two extrapolations 1e-8 and less is left: the boundary's share.
#[test]
fn drag_at_20_m_per_s_converges_with_orders_2_4() {
    check(2, &Wanted::even_to_four(&[2.6e-3, 1.7e-6, 1e-8]));
}

/// After two extrapolations 1e-8 and less is left: the boundary's share.
#[test]
fn drag_at_100_m_per_s_converges_with_orders_2_4() {
    check(3, &Wanted::even_to_four(&[5.6e-3, 3.6e-6, 1.1e-8]));
}

/// With nothing said about accuracy: within 0.002 %, the truth inside the band.
#[test]
fn drag_at_default_settings_is_right_and_knows_how_far() {
    for (speed, exact) in SPEEDS_AND_DRAGS {
        let mut problem = tube(speed, 3);
        problem.accuracy = Accuracy::default();
        let outcome = answer(&problem);
        let drag = figure(&outcome, "drag");
        println!("{speed} m/s: {:.1e} off, band {:.1e}", drag.value / exact - 1.0, drag.band / exact);
        assert!((drag.value / exact - 1.0).abs() < 2e-5);
        assert!((drag.value - exact).abs() <= drag.band, "the truth is outside the band at {speed} m/s");
        assert!(outcome.accuracy.met, "{speed} m/s: {:?}", outcome.accuracy);
    }
}

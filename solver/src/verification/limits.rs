//! Limits with closed forms: rest, thin walls.

use super::cases::{answer, dipole, endless, figure, layer, steady, value};
use crate::constants::MU0;
use crate::extrapolate::weights;

/// Zero-speed damping coefficient of a dipole m on the axis of a tube from a to b:
/// (15 mu0^2 m^2 sigma/1024)(1/a^3 - 1/b^3). Derived here from int x^4 K1(x)^2 dx = 45 pi^2/512; its thin-wall limit
/// is 45 mu0^2 m^2 sigma w/(1024 a^4) (W. M. Saslow, Am. J. Phys. 60, 693-711 (1992); citation from memory).
fn thick_tube(a: f64, b: f64, sigma: f64) -> f64 {
    15.0 * MU0 * MU0 * sigma / 1024.0 * (a.powi(-3) - b.powi(-3))
}

fn thin_tube(a: f64, b: f64, sigma: f64) -> f64 {
    45.0 * MU0 * MU0 * sigma * (b - a) / (1024.0 * a.powi(4))
}

/// At rest there is no drag and no heat, exactly, and the damping coefficient is the zero-speed one.
#[test]
fn at_rest_there_is_no_drag_and_the_closed_damping_coefficient() {
    let outcome = answer(&steady(endless(vec![layer(10.5, 12.5, 58.0, 1.0)]), vec![dipole()], 0.0));
    for name in ["drag", "dissipated_power", "current_density_peak"] {
        assert_eq!((value(&outcome, name), figure(&outcome, name).band), (0.0, 0.0), "{name}");
    }
    let coefficient = figure(&outcome, "damping_coefficient");
    let exact = thick_tube(0.0105, 0.0125, 58e6);
    println!("at rest: {:.1e} off, band {:.1e}", coefficient.value / exact - 1.0, coefficient.band / exact);
    assert!((coefficient.value / exact - 1.0).abs() < 3e-7);
    assert!((coefficient.value - exact).abs() <= coefficient.band);
}

/// Slow motion meets rest: what is left goes with the square of the magnetic Reynolds number, 1.5e-4 here.
#[test]
fn slow_drag_over_speed_is_the_coefficient_at_rest() {
    let wall = || endless(vec![layer(10.5, 12.5, 58.0, 1.0)]);
    let slow = answer(&steady(wall(), vec![dipole()], 1e-3));
    assert!((value(&slow, "damping_coefficient") / thick_tube(0.0105, 0.0125, 58e6) - 1.0).abs() < 3e-7);
}

/// Every thin wall meets the closed form of its own thickness; extrapolated to thickness zero in w/a, w/a squared
/// and cubed, drag / speed meets the thin-wall law. What extrapolation leaves is 7 (w/a)^4 over the four walls:
/// 2.8e-7.
#[test]
fn drag_over_speed_goes_to_the_thin_wall_law() {
    let ratios = [0.04, 0.02, 0.01, 0.005];
    let mut reduced = Vec::new();
    for ratio in ratios {
        let (a, b, sigma) = (0.0105, 0.0105 * (1.0 + ratio), 58e6);
        let wall = endless(vec![layer(1e3 * a, 1e3 * b, 1e-6 * sigma, 1.0)]);
        let outcome = answer(&steady(wall, vec![dipole()], 1e-3));
        let coefficient = value(&outcome, "damping_coefficient");
        println!("w/a {ratio}: {:.1e} off", coefficient / thick_tube(a, b, sigma) - 1.0);
        assert!((coefficient / thick_tube(a, b, sigma) - 1.0).abs() < 4e-7, "w/a = {ratio}");
        reduced.push(coefficient / thin_tube(a, b, sigma));
    }
    let w = weights(&ratios.map(f64::recip), &[1.0, 2.0, 3.0]);
    let limit: f64 = w.iter().zip(&reduced).map(|(w, x)| w * x).sum();
    println!("thin-wall limit {limit}");
    assert!((limit - 1.0).abs() < 6e-7);
}

//! The Fourier-Bessel path against closed forms, symmetries and its own energy balance.
#![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

use std::f64::consts::PI;

use approx::assert_relative_eq;
use lenzbore_solver::constants::MU0;
use lenzbore_solver::problem::{Layer, Mover};
use lenzbore_solver::sources::Source;
use lenzbore_validation::endless::{Emitter, Endless, Shape};
use lenzbore_validation::quadrature::GaussRule;
use lenzbore_validation::{Error, cases, elliptic, endless};
use puruspe::{In, Kn};

fn ring(inner_radius_m: f64, outer_radius_m: f64, length_m: f64, remanence_tesla: f64) -> Source {
    Source::Magnet { inner_radius_m, outer_radius_m, length_m, remanence_tesla }
}

fn coil(inner_radius_m: f64, outer_radius_m: f64, length_m: f64, ampere_turns: f64) -> Source {
    Source::Coil { inner_radius_m, outer_radius_m, length_m, ampere_turns }
}

fn loop_at(radius_m: f64, centre_m: f64, current_a: f64) -> Emitter {
    Emitter { name: "loop".into(), centre_m, shape: Shape::Loop { radius_m, current_a } }
}

/// A mover with parts in the bore, between the layers and around the wall.
fn three_places() -> (Vec<Layer>, Mover) {
    let layers = vec![
        cases::layer("liner", (10e-3, 11e-3), 20e6, 1.0),
        cases::layer("steel", (13e-3, 15e-3), 5e6, 80.0),
        cases::layer("jacket", (15e-3, 16e-3), 58e6, 1.0),
    ];
    let mover = cases::mover(vec![
        cases::part("core", -1e-3, ring(3e-3, 8e-3, 9e-3, 1.1)),
        cases::part("sleeve", 4e-3, ring(11.4e-3, 12.5e-3, 6e-3, -0.7)),
        cases::part("coil", 2e-3, coil(17e-3, 19e-3, 8e-3, 900.0)),
    ]);
    (layers, mover)
}

#[test]
fn a_layer_cut_in_two_is_the_same_layer() {
    let (layers, mover) = three_places();
    let mut cut = layers.clone();
    cut[1].outer_radius_m = 13.7e-3;
    cut.push(Layer { inner_radius_m: 13.7e-3, ..layers[1].clone() });
    for speed in [0.01, 3.0, 80.0] {
        let whole = endless::drag(&cases::endless(layers.clone()), &mover, speed).unwrap();
        let split = endless::drag(&cases::endless(cut.clone()), &mover, speed).unwrap();
        assert_relative_eq!(whole.value, split.value, max_relative = 1e-10);
        assert!(whole.error < 1e-10 * whole.value);
    }
}

#[test]
fn drag_is_even_in_north_odd_in_direction_and_follows_sigma_v() {
    let (layers, mover) = three_places();
    let mut flipped = mover.clone();
    for part in &mut flipped.parts {
        part.source = match part.source {
            Source::Magnet { inner_radius_m, outer_radius_m, length_m, remanence_tesla } => {
                ring(inner_radius_m, outer_radius_m, length_m, -remanence_tesla)
            }
            Source::Coil { inner_radius_m, outer_radius_m, length_m, ampere_turns } => {
                coil(inner_radius_m, outer_radius_m, length_m, -ampere_turns)
            }
            Source::Dipole { moment_a_m2 } => Source::Dipole { moment_a_m2: -moment_a_m2 },
        };
    }
    let wall = cases::endless(layers.clone());
    let drag = endless::drag(&wall, &mover, 7.0).unwrap().value;
    assert_relative_eq!(drag, endless::drag(&wall, &flipped, 7.0).unwrap().value, max_relative = 1e-13);
    assert_relative_eq!(drag, endless::drag(&wall, &mover, -7.0).unwrap().value, max_relative = 1e-10);
    let resistive =
        layers.iter().map(|l| Layer { conductivity_s_per_m: 0.1 * l.conductivity_s_per_m, ..l.clone() }).collect();
    let faster = endless::drag(&cases::endless(resistive), &mover, 70.0).unwrap().value;
    assert_relative_eq!(drag, faster, max_relative = 1e-10);
}

/// Drag of several groups is a quadratic form of their strengths.
#[test]
fn parallelogram_law_over_groups() {
    let (layers, mover) = three_places();
    let wall = cases::endless(layers);
    let with = |signs: [f64; 2]| {
        let emitters = Emitter::all_of(&mover);
        let mut both = vec![emitters[0].clone(), emitters[2].clone()];
        both.retain(|e| signs[usize::from(e.name == "coil")] != 0.0);
        for emitter in &mut both {
            let sign = signs[usize::from(emitter.name == "coil")];
            if let Shape::Source(Source::Coil { ampere_turns, .. }) = &mut emitter.shape {
                *ampere_turns *= sign;
            }
        }
        Endless::new(&wall, both).unwrap().drag(5.0).unwrap().value
    };
    let (sum, difference) = (with([1.0, 1.0]), with([1.0, -1.0]));
    let alone = 2.0 * (with([1.0, 0.0]) + with([0.0, 1.0]));
    assert_relative_eq!(sum + difference, alone, max_relative = 1e-10);
    assert!((sum - difference).abs() > 1e-3 * alone);
}

/// A loop of radius R outside a sheet of radius a: its free field A = (mu0 I R/pi) K1(kR) I1(ka) is reduced by the sheet's own to
/// |A|^2 / (1 + X^2 I1^2 K1^2) with X = mu0 sigma w v k a, and drag = 2 pi^2 v sigma w a integral k^2 |A|^2 dk.
#[test]
fn loop_around_a_sheet() {
    let (a, radius, current, loss, speed) = (10e-3, 12e-3, 40.0, 2.0, 3.0);
    let exact = |v: f64| {
        let rule = GaussRule::new(40);
        let mut sum = 0.0;
        for panel in 0..40 {
            let from = 500.0 * f64::from(panel);
            for (k, weight) in rule.on(from, from + 500.0) {
                let (i1, k1, outer) = (In(1, k * a), Kn(1, k * a), Kn(1, k * radius));
                let x = loss * v * k * a;
                let free = MU0 * current * radius / PI * outer * i1;
                let square = free * free / (1.0 + (x * i1 * k1).powi(2));
                sum += weight * 2.0 * PI * PI * k * k * v * a * loss / MU0 * square;
            }
        }
        sum
    };
    let thin = |ratio: f64| {
        let sigma = loss / (MU0 * a * ratio);
        let wall = cases::endless_tube((a * (1.0 - 0.5 * ratio), a * (1.0 + 0.5 * ratio)), sigma, 1.0);
        Endless::new(&wall, vec![loop_at(radius, 3e-3, current)]).unwrap().drag(speed).unwrap().value
    };
    let found = 2.0 * thin(1e-5) - thin(2e-5);
    assert_relative_eq!(found, exact(speed), max_relative = 1e-8);
}

/// Both loops of a pair, one inside and one outside a non-conducting, non-permeable tube, meet the field of free space.
#[test]
fn an_idle_tube_changes_nothing() {
    let wall = cases::endless_tube((10e-3, 12e-3), 0.0, 1.0);
    let emitters = vec![loop_at(8e-3, 0.0, 2.0), loop_at(15e-3, 4e-3, -3.0)];
    let idle = Endless::new(&wall, emitters).unwrap();
    for r in [2e-3, 9e-3, 11e-3, 13e-3, 25e-3] {
        let found = idle.flux_density_along(5.0, r, &[1e-3, -20e-3]).unwrap();
        for (z, b) in [1e-3, -20e-3].into_iter().zip(found) {
            let psi = |r: f64, z: f64| {
                2.0 * elliptic::mutual_inductance(8e-3, r, z) - 3.0 * elliptic::mutual_inductance(15e-3, r, z - 4e-3)
            };
            let h = 1e-6;
            let radial = -(psi(r, z + h) - psi(r, z - h)) / (2.0 * h) / (2.0 * PI * r);
            let axial = (psi(r + h, z) - psi(r - h, z)) / (2.0 * h) / (2.0 * PI * r);
            assert_relative_eq!(b.radial.value, radial, max_relative = 1e-5, epsilon = 1e-11);
            assert_relative_eq!(b.axial.value, axial, max_relative = 1e-5, epsilon = 1e-11);
        }
    }
    assert!(idle.drag(5.0).unwrap().value.abs() <= 0.0);
}

/// Work done against drag = heat of the current density in space.
#[test]
fn heat_of_the_currents_is_the_work() {
    let (a, b, sigma, speed) = (7.5e-3, 9.5e-3, 58e6, 15.0);
    let wall = cases::endless_tube((a, b), sigma, 1.0);
    let mover = cases::cylinder(5e-3, 10e-3, 1.2);
    let step = 0.75e-3;
    let heights: Vec<f64> = (-340..=170).map(|i| step * f64::from(i)).collect();
    let mut heat = 0.0;
    for (r, weight) in GaussRule::new(8).on(a, b) {
        let line = endless::current_density_along(&wall, &mover, speed, r, &heights).unwrap();
        let squares: f64 = line.iter().map(|j| j.value * j.value).sum();
        heat += weight * 2.0 * PI * r * squares * step / sigma;
    }
    let drag = endless::drag(&wall, &mover, speed).unwrap().value;
    // The wake beyond the heights carries 2e-8 of it.
    assert_relative_eq!(heat, drag * speed, max_relative = 1e-7);
}

/// The field is continuous through the faces as physics asks: B_r always, B_z/mu where no sheet current flows.
#[test]
fn fields_join_at_faces() {
    let (layers, mover) = three_places();
    let wall = cases::endless(layers);
    let heights = [-12e-3, 0.0, 7e-3];
    for (face, ratio) in [(10e-3, 1.0), (13e-3, 80.0), (15e-3, 1.0 / 80.0), (16e-3, 1.0)] {
        let nudge = 1e-12;
        let below = endless::flux_density_along(&wall, &mover, 20.0, face - nudge, &heights).unwrap();
        let above = endless::flux_density_along(&wall, &mover, 20.0, face + nudge, &heights).unwrap();
        for (below, above) in below.into_iter().zip(above) {
            assert_relative_eq!(below.radial.value, above.radial.value, max_relative = 1e-6, epsilon = 1e-9);
            assert_relative_eq!(below.axial.value * ratio, above.axial.value, max_relative = 1e-6, epsilon = 1e-9);
        }
    }
}

/// Low-speed lag of a dipole in a sheet: tau = mu0 sigma w a integral k^4 K1^2 I1 K1 / integral k^4 K1^2.
#[test]
fn lag_of_a_sheet() {
    let (mut above, mut below) = (0.0, 0.0);
    for panel in 0..60 {
        for (x, weight) in GaussRule::new(20).on(f64::from(panel), f64::from(panel) + 1.0) {
            let square = weight * x.powi(4) * Kn(1, x).powi(2);
            below += square;
            above += square * In(1, x) * Kn(1, x);
        }
    }
    let (a, loss) = (8e-3, 0.1);
    let thin = |ratio: f64| {
        let sigma = loss / (MU0 * a * ratio);
        let wall = cases::endless_tube((a * (1.0 - 0.5 * ratio), a * (1.0 + 0.5 * ratio)), sigma, 1.0);
        endless::low_speed(&wall, &cases::dipole(1.0)).unwrap().lag_time.value
    };
    assert_relative_eq!(2.0 * thin(1e-4) - thin(2e-4), loss * a * above / below, max_relative = 1e-7);
}

#[test]
fn drag_tends_to_the_damping_coefficient() {
    let (layers, mover) = three_places();
    let wall = cases::endless(layers);
    let coefficient = endless::damping_coefficient(&wall, &mover).unwrap().value;
    for speed in [1e-9, 1e-5] {
        let drag = endless::drag(&wall, &mover, speed).unwrap().value;
        assert_relative_eq!(drag / speed, coefficient, max_relative = 1e-8);
    }
}

#[test]
fn peak_current_density_is_on_the_bore_behind_or_ahead() {
    let wall = cases::endless_tube((7.5e-3, 9.5e-3), 58e6, 1.0);
    let mover = cases::cylinder(5e-3, 10e-3, 1.2);
    let peak = endless::current_density_peak(&wall, &mover, 5.0).unwrap();
    assert_relative_eq!(peak.r_m, 7.5e-3);
    for shift in [-0.2e-3, 0.2e-3] {
        let beside = endless::current_density(&wall, &mover, 5.0, 7.5e-3 + 1e-12, peak.z_m + shift).unwrap();
        assert!(beside.value.abs() < peak.magnitude.value);
        assert!(beside.value.abs() > 0.97 * peak.magnitude.value);
    }
}

#[test]
fn impossible_questions_are_refused() {
    let tube = cases::endless_tube((10e-3, 12e-3), 58e6, 1.0);
    let magnet = |radius| cases::cylinder(radius, 10e-3, 1.0);
    assert!(matches!(endless::drag(&tube, &magnet(10.5e-3), 1.0), Err(Error::PartInWall { .. })));
    assert!(matches!(endless::drag(&tube, &magnet(5e-3), f64::NAN), Err(Error::OutOfRange { .. })));
    let ends = cases::finite_tube((10e-3, 12e-3), 0.1, 58e6);
    assert!(matches!(endless::drag(&ends, &magnet(5e-3), 1.0), Err(Error::WallEnds { .. })));
    let overlap =
        cases::endless(vec![cases::layer("a", (10e-3, 12e-3), 1e6, 1.0), cases::layer("b", (11e-3, 13e-3), 1e6, 1.0)]);
    assert!(matches!(endless::drag(&overlap, &magnet(5e-3), 1.0), Err(Error::LayersOverlap { .. })));
    let rod = cases::endless_tube((0.0, 12e-3), 58e6, 1.0);
    assert!(matches!(endless::drag(&rod, &cases::dipole(1.0), 1.0), Err(Error::PartInWall { .. })));
    assert!(matches!(endless::flux_density(&tube, &magnet(5e-3), 1.0, 5e-3, 0.0), Err(Error::PointInSource { .. })));
}

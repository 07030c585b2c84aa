#![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

use approx::assert_relative_eq;

use super::*;
use crate::monitor::Unwatched;
use crate::problem::{
    Accuracy, Extent, Free, Layer, Mover, Outline, Part, Problem, SnapshotPlan, Travel, Traverse, Wall,
};
use crate::sources::Source;

const SIGMA: f64 = 5.8e7;

pub(super) fn cylinder(radius: f64, length: f64, remanence: f64, centre: f64) -> Part {
    Part {
        name: "M".into(),
        centre_m: centre,
        source: Source::Magnet {
            inner_radius_m: 0.0,
            outer_radius_m: radius,
            length_m: length,
            remanence_tesla: remanence,
        },
        outline: Outline { inner_radius_m: 0.0, outer_radius_m: radius, length_m: length },
        coercivity_a_per_m: None,
    }
}

pub(super) fn problem(a: f64, b: f64, length: Option<f64>, parts: Vec<Part>, travel: Travel) -> Problem {
    let layer = Layer {
        name: "tube".into(),
        inner_radius_m: a,
        outer_radius_m: b,
        from_m: 0.0,
        to_m: length.unwrap_or(0.0),
        conductivity_s_per_m: SIGMA,
        relative_permeability: 1.0,
    };
    Problem {
        wall: Wall {
            slots: 0,
            extent: length.map_or(Extent::Endless, |length_m| Extent::Finite { length_m }),
            layers: vec![layer],
        },
        mover: Mover { parts, mass_kg: Some(0.06), recoil: None },
        travel,
        accuracy: Accuracy::default(),
        snapshots: SnapshotPlan::None,
        stations: Vec::new(),
        warming: None,
    }
}

fn endless(a: f64, b: f64, parts: Vec<Part>) -> Problem {
    problem(a, b, None, parts, Travel::Steady { velocity_m_per_s: 1.0 })
}

fn coefficient(problem: &Problem, assumptions: Assumptions) -> f64 {
    RingSum::new(problem, assumptions).unwrap().damping_coefficient()
}

/// Damping coefficients of uniformly magnetised cylinders of radius 5 mm, 1.2 T, 58 MS/m, and the thick-wall dipole rule
/// (length mm, a mm, b mm, coefficient, dipole; N s/m): computed independently from
/// 8 sigma mu0^2 M^2 R^2 int sin^2(kL/2) I1(kR)^2 [G(k, b) - G(k, a)] dk, G = (r^2/2)(K1^2 - K0 K2). Tolerance: the digits given.
const CYLINDERS: [(f64, f64, f64, f64, f64); 8] = [
    (5.0, 5.5, 6.5, 0.740_511, 0.446_994),
    (5.0, 10.0, 12.0, 0.093_041, 0.079_486),
    (10.0, 6.0, 7.0, 0.956_005, 1.293_652),
    (10.0, 7.5, 9.5, 0.755_653, 0.908_647),
    (20.0, 5.5, 6.5, 1.602_305, 7.151_898),
    (20.0, 10.0, 12.0, 0.598_778, 1.271_772),
    (40.0, 5.5, 6.5, 1.692_383, 28.607_592),
    (40.0, 7.5, 9.5, 1.448_999, 14.538_349),
];

#[test]
fn val_resistive_rings_give_the_published_coefficients() {
    for (length, a, b, c, dipole) in CYLINDERS {
        let case = endless(1e-3 * a, 1e-3 * b, vec![cylinder(5e-3, 1e-3 * length, 1.2, 0.0)]);
        assert_relative_eq!(coefficient(&case, Assumptions::RESISTIVE), c, max_relative = 3e-6);
        let thick = Assumptions { wall: WallModel::Thickness, ..Assumptions::DIPOLE_RULE };
        assert_relative_eq!(coefficient(&case, thick), dipole, epsilon = 1e-6, max_relative = 1e-7);
    }
}

#[test]
fn val_the_dipole_rule_is_10_to_17_times_high_for_long_magnets() {
    // 40 mm long in a bore of 11 and 15 mm: 28.607592/1.692383 = 16.9 and 14.538349/1.448999 = 10.03 (as above).
    for (a, b, low, high) in [(5.5e-3, 6.5e-3, 16.85, 16.95), (7.5e-3, 9.5e-3, 10.0, 10.1)] {
        let case = endless(a, b, vec![cylinder(5e-3, 40e-3, 1.2, 0.0)]);
        let thick = Assumptions { wall: WallModel::Thickness, ..Assumptions::DIPOLE_RULE };
        let times = coefficient(&case, thick) / coefficient(&case, Assumptions::RESISTIVE);
        assert!((low..high).contains(&times), "{times}");
    }
}

#[test]
fn val_stacks_act_together() {
    // Two magnets of 10 mm, touching: aiding 1.243784, opposed 1.778830 N s/m (computed independently, as above).
    for (remanence, expected) in [(1.2, 1.243_784), (-1.2, 1.778_830)] {
        let parts = vec![cylinder(5e-3, 10e-3, 1.2, -5e-3), cylinder(5e-3, 10e-3, remanence, 5e-3)];
        let found = coefficient(&endless(7.5e-3, 9.5e-3, parts), Assumptions::RESISTIVE);
        assert_relative_eq!(found, expected, max_relative = 2e-6);
    }
}

#[test]
fn the_ring_sum_of_a_dipole_is_the_closed_form() {
    let dipole = Part {
        source: Source::Dipole { moment_a_m2: 0.8 },
        outline: Outline { inner_radius_m: 0.0, outer_radius_m: 0.0, length_m: 0.0 },
        ..cylinder(1e-3, 1e-3, 1.0, 2e-3)
    };
    let case = endless(7.5e-3, 9.5e-3, vec![dipole]);
    let rule = thin_wall_coefficient(0.8, 7.5e-3, SIGMA * 2e-3);
    assert_relative_eq!(coefficient(&case, Assumptions::DIPOLE_RULE), rule, max_relative = 1e-7);
    assert_relative_eq!(coefficient(&case, Assumptions::RINGS_INNER), rule, max_relative = 1e-7);
    let mean = thin_wall_coefficient(0.8, 8.5e-3, SIGMA * 2e-3);
    assert_relative_eq!(coefficient(&case, Assumptions::RINGS_MEAN), mean, max_relative = 1e-7);
}

#[test]
fn deep_in_a_long_wall_the_ends_are_not_felt() {
    let parts = vec![cylinder(5e-3, 10e-3, 1.2, 0.0)];
    let case = problem(7.5e-3, 9.5e-3, Some(0.6), parts, Travel::Free(Free::let_go(0.7, -0.1, [0.6, 0.0])));
    let model = RingSum::new(&case, Assumptions::RESISTIVE).unwrap();
    assert_relative_eq!(model.damping_at(0.3), model.damping_coefficient(), max_relative = 1e-6);
    assert_relative_eq!(model.damping_at(0.0), 0.5 * model.damping_coefficient(), max_relative = 1e-6);
    assert!(model.damping_at(0.7) < 1e-6 * model.damping_coefficient());
}

#[test]
fn a_fall_ends_at_the_speed_that_weight_and_drag_agree_on() {
    let parts = vec![cylinder(5e-3, 10e-3, 1.2, 0.0)];
    let law = Free::let_go(0.45, 0.05, [0.4, 0.1]);
    let mut case = problem(7.5e-3, 9.5e-3, Some(0.5), parts, Travel::Free(law.clone()));
    case.mover.mass_kg = Some(0.01);
    let model = RingSum::new(&case, Assumptions { ends: EndModel::Switched, ..Assumptions::RESISTIVE }).unwrap();
    let found = model.travel(&case, &Unwatched).unwrap();
    let get = |name: &str| found.figures.iter().find(|f| f.name == name).unwrap().value;
    // v = vt (1 - exp(-t/tau)), z = z0 - vt (t - tau (1 - exp(-t/tau))): exact for a constant coefficient.
    let c = model.damping_coefficient();
    let (terminal, tau) = (0.01 * law.gravity_m_per_s2 / c, 0.01 / c);
    assert_relative_eq!(get("terminal_speed"), terminal, max_relative = 1e-6);
    assert_relative_eq!(get("exit_speed"), terminal, max_relative = 1e-6);
    let late = |travel: f64| travel / terminal + tau;
    assert_relative_eq!(get("exit_time"), late(0.35), max_relative = 1e-5);
    let weight_work = 0.01 * law.gravity_m_per_s2 * 0.4 - 0.5 * 0.01 * terminal * terminal;
    assert_relative_eq!(get("dissipated_energy"), weight_work, max_relative = 1e-4);
}

#[test]
fn a_passage_loses_the_integral_of_the_drag() {
    let parts = vec![cylinder(5e-3, 10e-3, 1.2, 0.0)];
    let travel = Travel::Traverse(Traverse { speed_m_per_s: 0.5, from_m: 0.4, to_m: -0.3 });
    let case = problem(7.5e-3, 9.5e-3, Some(0.1), parts, travel);
    let found = RingSum::new(&case, Assumptions::RESISTIVE).unwrap().travel(&case, &Unwatched).unwrap();
    let get = |name: &str| found.figures.iter().find(|f| f.name == name).unwrap().value;
    // Integral of c(z) over the passage = c of the endless wall times its length: each ring is passed once by the whole field.
    let c = coefficient(&case, Assumptions::RESISTIVE);
    assert_relative_eq!(get("impulse"), c * 0.1, max_relative = 1e-5);
    assert_relative_eq!(get("dissipated_energy"), 0.5 * c * 0.1, max_relative = 1e-5);
    assert_relative_eq!(get("drag_peak"), 0.5 * c, max_relative = 1e-3);
}

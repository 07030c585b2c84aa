#![allow(
    clippy::unwrap_used,
    clippy::expect_used,
    clippy::float_cmp,
    clippy::panic,
    reason = "tests may stop at the first fault"
)]

use super::*;
use crate::sources::Source;

fn layer(name: &str, inner_mm: f64, outer_mm: f64) -> Layer {
    Layer {
        name: name.to_owned(),
        inner_radius_m: inner_mm / 2e3,
        outer_radius_m: outer_mm / 2e3,
        from_m: 0.0,
        to_m: 0.6,
        conductivity_s_per_m: 50e6,
        relative_permeability: 1.0,
    }
}

fn magnet(name: &str, inner_mm: f64, outer_mm: f64, centre_mm: f64) -> Part {
    let (inner_radius_m, outer_radius_m, length_m) = (inner_mm / 2e3, outer_mm / 2e3, 0.012);
    Part {
        name: name.to_owned(),
        centre_m: centre_mm / 1e3,
        source: Source::Magnet { inner_radius_m, outer_radius_m, length_m, remanence_tesla: 1.3 },
        outline: Outline { inner_radius_m, outer_radius_m, length_m },
        coercivity_a_per_m: None,
    }
}

fn traverse() -> Travel {
    Travel::Traverse(Traverse { speed_m_per_s: 1.0, from_m: 0.8, to_m: -0.2 })
}

fn problem() -> Problem {
    Problem {
        wall: Wall { slots: 0, extent: Extent::Finite { length_m: 0.6 }, layers: vec![layer("sleeve", 25.0, 28.0)] },
        mover: Mover { parts: vec![magnet("M", 0.0, 22.0, 0.0)], mass_kg: Some(0.4), recoil: None },
        travel: traverse(),
        accuracy: Accuracy::default(),
        snapshots: SnapshotPlan::default(),
        stations: Vec::new(),
        warming: None,
    }
}

/// The one fault of a problem, as its message.
fn only(problem: &Problem) -> String {
    let faults = problem.faults();
    assert_eq!(faults.len(), 1, "{faults:?}");
    faults[0].to_string()
}

#[test]
fn a_sound_problem_has_no_fault() {
    assert_eq!(problem().faults(), []);
}

#[test]
fn movers_run_in_the_bore_between_layers_and_around_the_wall() {
    for (inner, outer) in [(0.0, 22.0), (30.0, 34.0), (42.0, 60.0)] {
        let mut p = problem();
        p.wall.layers.push(layer("shell", 36.0, 40.0));
        p.mover.parts = vec![magnet("M", inner, outer, 0.0)];
        assert_eq!(p.faults(), [], "{inner} to {outer}");
    }
}

#[test]
fn a_part_needs_running_clearance() {
    for (inner, outer) in [(0.0, 25.0), (0.0, 26.0), (26.0, 27.0), (28.0, 40.0), (20.0, 40.0)] {
        let mut p = problem();
        p.mover.parts = vec![magnet("M", inner, outer, 0.0)];
        let message = only(&p);
        assert!(
            message.contains("'M'") && message.contains("'sleeve'") && message.contains("25 mm to 28 mm"),
            "{message}"
        );
    }
}

#[test]
fn a_rod_leaves_no_bore_even_for_a_dipole() {
    let mut p = problem();
    p.wall.layers = vec![layer("rod", 0.0, 10.0)];
    p.mover.parts = vec![Part {
        name: "D".to_owned(),
        centre_m: 0.0,
        source: Source::Dipole { moment_a_m2: 1.0 },
        outline: Outline { inner_radius_m: 0.0, outer_radius_m: 0.0, length_m: 0.0 },
        coercivity_a_per_m: None,
    }];
    assert!(matches!(p.faults()[..], [ProblemFault::NoClearance { .. }]));
    assert!(p.faults()[0].legal().unwrap().contains("wider than 10 mm"));
}

#[test]
fn layers_that_touch_are_sound_and_layers_that_overlap_are_not() {
    let mut p = problem();
    let mut shell = layer("shell", 28.0, 30.0);
    shell.inner_radius_m *= 1.0 - 1e-12;
    p.wall.layers.push(shell);
    assert_eq!(p.faults(), []);
    p.wall.layers[1].inner_radius_m = 0.0139;
    let message = only(&p);
    assert!(message.contains("27.8 mm to 28 mm") && message.contains("0 mm to 600 mm"), "{message}");
    p.wall.layers[0].to_m = 0.3;
    p.wall.layers[1].from_m = 0.3;
    assert_eq!(p.faults(), [], "same radii at different heights do not overlap");
}

#[test]
fn joined_faces_are_equal_to_the_bit() {
    let mut p = problem();
    let mut shell = layer("shell", 28.0, 30.0);
    shell.inner_radius_m *= 1.0 + 1e-13;
    shell.to_m = 0.6 * (1.0 - 1e-13);
    p.wall.layers.push(shell);
    let wall = p.wall.with_faces_joined();
    assert_eq!(wall.layers[0].outer_radius_m, wall.layers[1].inner_radius_m);
    assert_eq!(wall.layers[1].to_m, 0.6);
    assert_eq!(wall.layers[1].outer_radius_m, 0.015);
}

#[test]
fn sections_stay_within_the_wall() {
    let mut p = problem();
    p.wall.layers[0].to_m = 0.61;
    assert!(matches!(p.faults()[..], [ProblemFault::LayerBeyondWall { .. }]));
    p.wall.layers[0].from_m = 0.3;
    p.wall.layers[0].to_m = 0.2;
    assert!(matches!(p.faults()[..], [ProblemFault::LayerEmpty { .. }]));
}

#[test]
fn parts_may_touch_but_not_overlap() {
    let mut p = problem();
    p.mover.parts = vec![magnet("A", 0.0, 22.0, 0.0), magnet("B", 0.0, 22.0, 12.0)];
    assert_eq!(p.faults(), []);
    p.mover.parts[1].centre_m = 0.011;
    assert!(only(&p).contains("'A' and 'B' overlap along 1 mm"));
    p.mover.parts[0] = magnet("A", 23.0, 24.0, 0.0);
    assert_eq!(p.faults(), [], "one inside the other's hole");
}

#[test]
fn numbers_that_are_not_finite_or_absurd_are_named() {
    for value in [f64::NAN, f64::INFINITY, -1.0, 1e11] {
        let mut p = problem();
        p.wall.layers[0].conductivity_s_per_m = value;
        assert!(only(&p).contains("impossible conductivity"), "{value}");
    }
    for value in [0.0, -1.0, f64::NAN] {
        let mut p = problem();
        p.wall.layers[0].relative_permeability = value;
        assert!(only(&p).contains("relative permeability"), "{value}");
    }
    let mut p = problem();
    p.mover.parts[0].source =
        Source::Magnet { inner_radius_m: 0.0, outer_radius_m: 0.011, length_m: 0.012, remanence_tesla: 13.0 };
    let faults = p.faults();
    assert_eq!(faults[0].legal().unwrap(), "sensible: -10 to 10 T");
}

#[test]
fn laws_must_fit_the_wall() {
    let mut p = problem();
    p.travel = Travel::Steady { velocity_m_per_s: 2.0 };
    assert!(p.faults()[0].mend().unwrap().contains("traverse"));
    p.wall.extent = Extent::Endless;
    assert_eq!(p.faults(), []);
    p.travel = traverse();
    assert!(matches!(p.faults()[..], [ProblemFault::TravelNeedsEnds { law: "traverse" }]));
}

#[test]
fn free_motion_needs_mass_and_two_gates() {
    let mut p = problem();
    p.mover.mass_kg = None;
    p.travel = Travel::Free(Free {
        release_m: 0.64,
        entry_velocity_m_per_s: 0.0,
        until_m: -0.06,
        time_limit_s: 60.0,
        gravity_m_per_s2: 9.80665,
        tilt_rad: 0.0,
        push_newton: 0.0,
        friction_newton: -1.0,
        friction_coefficient: 0.0,
        air_drag_n_s2_per_m2: 0.0,
        spring_rate_n_per_m: 0.0,
        spring_free_at_m: 0.0,
        gates_m: [0.3, 0.3],
    });
    let messages: Vec<String> = p.faults().iter().map(ToString::to_string).collect();
    assert_eq!(messages.len(), 3, "{messages:?}");
    assert!(messages[0].contains("friction") && messages[1].contains("gates") && messages[2].contains("mass"));
}

#[test]
fn nothing_to_solve_is_said() {
    let mut p = problem();
    p.wall.layers[0].conductivity_s_per_m = 0.0;
    assert_eq!(p.faults(), [ProblemFault::InertWall]);
    p.wall.layers[0].relative_permeability = 100.0;
    assert_eq!(p.faults(), []);
    p.mover.parts.clear();
    assert_eq!(p.faults(), [ProblemFault::NoPart]);
    p.wall.layers.clear();
    assert_eq!(p.faults(), [ProblemFault::NoLayer, ProblemFault::NoPart]);
}

#[test]
fn accuracy_and_snapshot_plans_are_checked() {
    let mut p = problem();
    p.accuracy = Accuracy { target_relative: 0.0, levels: Some(2), cells_across_wall: Some(5) };
    p.snapshots = SnapshotPlan::Instants { times_s: vec![0.2, 0.1] };
    assert_eq!(p.faults().len(), 4);
}

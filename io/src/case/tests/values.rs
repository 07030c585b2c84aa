//! What a sound case resolves to.

use lenzbore_solver::constants::STANDARD_GRAVITY;
use lenzbore_solver::problem::{Extent, Free, Outline, SnapshotPlan, Travel, Traverse};
use lenzbore_solver::sources::Source;

use super::{CASE, good, with};

fn free(text: &str) -> Free {
    match good(text, &[]).problem.travel {
        Travel::Free(free) => free,
        other => panic!("{other:?}"),
    }
}

fn traverse(words: &str) -> Traverse {
    match good(&with("law = \"free\"\nrelease = \"640 mm\"", &format!("law = \"traverse\"\n{words}")), &[])
        .problem
        .travel
    {
        Travel::Traverse(t) => t,
        other => panic!("{other:?}"),
    }
}

#[test]
fn sizes_become_radii() {
    let p = good(CASE, &[]).problem;
    let layer = &p.wall.layers[0];
    assert_eq!((layer.inner_radius_m, layer.outer_radius_m), (0.0125, 0.014));
    assert_eq!((layer.from_m, layer.to_m, p.wall.extent), (0.0, 0.6, Extent::Finite { length_m: 0.6 }));
    assert_eq!((layer.conductivity_s_per_m, layer.relative_permeability), (50e6, 1.0));
    assert_eq!(p.mover.mass_kg, Some(0.42));
    let part = &p.mover.parts[0];
    assert_eq!(part.outline, Outline { inner_radius_m: 0.0, outer_radius_m: 0.011, length_m: 0.012 });
    assert_eq!(
        part.source,
        Source::Magnet { inner_radius_m: 0.0, outer_radius_m: 0.011, length_m: 0.012, remanence_tesla: 1.3 }
    );
}

#[test]
fn any_two_sizes_give_the_third() {
    for sizes in [
        "size = \"28 x 1.5 mm\"",
        "size = \"28x1.5mm\"",
        "size = \"28 mm \u{d7} 1.5 mm\"",
        "size = \"2.8 cm x 1500 um\"",
        "inner_diameter = \"25 mm\"\nouter_diameter = \"28 mm\"",
        "inner_diameter = \"25 mm\"\nthickness = \"1.5 mm\"",
        "outer_diameter = 0.028\nthickness = 0.0015",
    ] {
        let case = good(&with("outer_diameter = \"28 mm\"\nthickness = \"1.5 mm\"", sizes), &[]);
        for (word, value) in [("inner_diameter", 0.025), ("outer_diameter", 0.028), ("thickness", 0.0015)] {
            approx::assert_relative_eq!(
                case.resolved.number(&format!("wall.sleeve.{word}")).unwrap(),
                value,
                max_relative = 1e-12
            );
        }
        approx::assert_relative_eq!(case.problem.wall.layers[0].inner_radius_m, 0.0125, max_relative = 1e-12);
    }
}

#[test]
fn a_rod_with_a_ring_around_it_resolves() {
    let text = with("outer_diameter = \"28 mm\"\nthickness = \"1.5 mm\"", "size = \"10 x 5 mm\"")
        .replace("outer_diameter = \"22 mm\"", "outer_diameter = \"22 mm\"\ninner_diameter = \"12 mm\"");
    assert_eq!(good(&text, &[]).problem.wall.layers[0].inner_radius_m, 0.0);
}

#[test]
fn resistivity_follows_temperature() {
    let warm = with("length = \"600 mm\"", "length = \"600 mm\"\ntemperature = \"70 degC\"");
    approx::assert_relative_eq!(
        good(&warm, &[]).problem.wall.layers[0].conductivity_s_per_m,
        50e6 / 1.2,
        max_relative = 1e-12
    );
    let measured_warm = with("name = \"sleeve\"", "name = \"sleeve\"\nconductivity_at = \"70 degC\"");
    approx::assert_relative_eq!(
        good(&measured_warm, &[]).problem.wall.layers[0].conductivity_s_per_m,
        50e6 * 1.0 / (1.0 - 0.004 * 50.0),
        max_relative = 1e-12
    );
    // The book's coefficient holds at 20 degC wherever the conductivity was measured.
    let book = measured_warm.replace("temperature_coefficient = \"0.004 /K\"", "material = \"Cu-ETP\"");
    approx::assert_relative_eq!(
        good(&book, &[]).problem.wall.layers[0].conductivity_s_per_m,
        50e6 * (1.0 + 0.00393 * 50.0),
        max_relative = 1e-12
    );
}

#[test]
fn remanence_follows_temperature() {
    let text = with("mass = \"0.42 kg\"", "mass = \"0.42 kg\"\ntemperature = \"70 degC\"")
        .replace("remanence = \"1.3 T\"", "remanence = \"1.3 T\"\nremanence_coefficient = \"-0.12 %/K\"");
    let case = good(&text, &[]);
    let Source::Magnet { remanence_tesla, .. } = case.problem.mover.parts[0].source else { panic!() };
    approx::assert_relative_eq!(remanence_tesla, 1.3 * (1.0 - 0.0012 * 50.0), max_relative = 1e-12);
    assert_eq!(case.resolved.number("mover.M.remanence"), Some(1.3));
}

#[test]
fn book_grades_fill_in_what_is_not_given() {
    let text =
        with("conductivity = \"50 MS/m\"\ntemperature_coefficient = \"0.004 /K\"", "material = \"copper Cu-ETP\"")
            .replace(
                "remanence = \"1.3 T\"\nrecoil_permeability = 1",
                "material = \"NdFeB N42SH\"\ngrade_value = \"minimum\"",
            );
    let case = good(&text, &[]);
    assert_eq!(case.problem.wall.layers[0].conductivity_s_per_m, 58e6);
    let Source::Magnet { remanence_tesla, .. } = case.problem.mover.parts[0].source else { panic!() };
    assert_eq!(remanence_tesla, 1.28);
    assert_eq!(case.resolved.number("mover.M.recoil_permeability"), Some(1.05));
    assert_eq!(case.problem.mover.recoil.as_ref().unwrap().permeability(), [1.05]);
    assert!(!case.cautions.iter().any(|c| c.contains("recoil")), "{:?}", case.cautions);
}

#[test]
fn what_is_taken_without_being_given_is_a_caution() {
    let has = |text: &str, words: &str| {
        let cautions = good(text, &[]).cautions;
        assert!(cautions.iter().any(|c| c.contains(words)), "{words}: {cautions:?}");
    };
    has(&with("temperature_coefficient = \"0.004 /K\"\n", ""), "without a temperature coefficient");
    has(&with("recoil_permeability = 1\n", ""), "no recoil permeability is given or known of its grade");
    has(
        &with("mass = \"0.42 kg\"", "mass = \"0.42 kg\"\ntemperature = \"70 degC\""),
        "without a coefficient its remanence",
    );
    has(&with("", "friction_coefficient = 0.2\n"), "in a vertical bore it does nothing");
    has(&with("conductivity = \"50 MS/m\"", "material = \"steel S235\""), "saturates");
    has(
        &with("length = \"600 mm\"", "length = \"600 mm\"\ntemperature = \"300 degC\""),
        "a linear temperature coefficient is trusted",
    );
    has(
        &with("remanence = \"1.3 T\"", "material = \"N52\"")
            .replace("[mover]\n", "[mover]\ntemperature = \"90 degC\"\n"),
        "made for at most 80 degC",
    );
    has(&with("name = \"M\"", "name = \"M\"\nat = \"3 mm\""), "3.0000 mm below the middle");
    assert_eq!(good(CASE, &[]).cautions, Vec::<String>::new());
}

#[test]
fn defaults_of_free_travel() {
    let f = free(CASE);
    assert_eq!((f.release_m, f.entry_velocity_m_per_s, f.time_limit_s), (0.64, 0.0, 60.0));
    assert_eq!((f.gravity_m_per_s2, f.tilt_rad, f.push_newton, f.friction_newton), (STANDARD_GRAVITY, 0.0, 0.0, 0.0));
    assert_eq!((f.gates_m, f.spring_rate_n_per_m), ([0.6, 0.0], 0.0));
    approx::assert_relative_eq!(f.until_m, -0.05, max_relative = 1e-12);
    // Let go below the middle: the gates turn round, and the run ends above.
    let f = free(&with("release = \"640 mm\"", "release = \"-40 mm\"\nentry_velocity = \"4 m/s\""));
    assert_eq!(f.gates_m, [0.0, 0.6]);
    approx::assert_relative_eq!(f.until_m, 0.65, max_relative = 1e-12);
}

#[test]
fn every_force_of_free_travel_is_read() {
    let f = free(&with(
        "",
        "until = \"-60 mm\"\ntime_limit = \"2 min\"\ngravity = \"9.81 m/s2\"\ntilt_from_vertical = \"30 deg\"\npush = \"-1 N\"\n\
         friction = \"0.1 N\"\nfriction_coefficient = 0.2\nair_drag = \"0.002 N s2/m2\"\nspring_rate = \"2 N/mm\"\n\
         spring_free_at = \"300 mm\"\ngates = [\"500 mm\", \"100 mm\"]\n",
    ));
    assert_eq!((f.until_m, f.time_limit_s, f.gravity_m_per_s2, f.push_newton), (-0.06, 120.0, 9.81, -1.0));
    assert_eq!((f.friction_newton, f.friction_coefficient, f.air_drag_n_s2_per_m2), (0.1, 0.2, 0.002));
    assert_eq!((f.spring_rate_n_per_m, f.spring_free_at_m, f.gates_m), (2000.0, 0.3, [0.5, 0.1]));
    approx::assert_relative_eq!(f.tilt_rad, std::f64::consts::PI / 6.0, max_relative = 1e-15);
}

#[test]
fn a_traverse_starts_and_ends_clear_of_the_wall() {
    // 6 bores of 25 mm and half the magnet of 12 mm beyond either end.
    let t = traverse("speed = \"2 m/s\"");
    approx::assert_relative_eq!(t.from_m, -0.156, max_relative = 1e-12);
    approx::assert_relative_eq!(t.to_m, 0.756, max_relative = 1e-12);
    let t = traverse("speed = \"2 m/s\"\nfrom = \"700 mm\"");
    assert_eq!(t.from_m, 0.7);
    approx::assert_relative_eq!(t.to_m, -0.156, max_relative = 1e-12);
    let t = traverse("speed = \"2 m/s\"\nto = \"0 mm\"");
    approx::assert_relative_eq!(t.from_m, 0.756, max_relative = 1e-12);
    let t = traverse("speed = \"2 m/s\"\nfrom = \"0 mm\"\nto = \"100 mm\"");
    assert_eq!((t.speed_m_per_s, t.from_m, t.to_m), (2.0, 0.0, 0.1));
}

#[test]
fn steady_travel_in_an_endless_wall() {
    let text = with("\"600 mm\"", "\"endless\"")
        .replace("law = \"free\"\nrelease = \"640 mm\"", "law = \"steady\"\nspeed = \"2 m/s\"");
    let case = good(&text, &[]);
    assert_eq!(case.problem.travel, Travel::Steady { velocity_m_per_s: 2.0 });
    assert_eq!(case.problem.wall.extent, Extent::Endless);
    assert!(case.not_modelled.is_empty());
}

#[test]
fn a_case_may_ask_for_a_curve_alone() {
    let text = with(
        "[travel]\nlaw = \"free\"\nrelease = \"640 mm\"\n",
        "[curve]\nspeeds = [\"0.1 m/s\", \"10 m/s\"]\npoints = 3\n",
    );
    let case = good(&text, &[]);
    assert!(!case.travel_given);
    let curve = case.curve.as_ref().unwrap();
    assert_eq!((curve.speeds_m_per_s[0], curve.speeds_m_per_s[2]), (0.1, 10.0));
    approx::assert_relative_eq!(curve.speeds_m_per_s[1], 1.0, max_relative = 1e-12);
    assert!(curve.cautions[0].contains("600 mm have ends that are left out"));
    let problem = case.curve_problem().unwrap();
    assert_eq!((problem.wall.extent, problem.faults()), (Extent::Endless, Vec::new()));
}

#[test]
fn curves_are_spread_or_listed() {
    let curve = |words: &str| good(&with("", &format!("[curve]\n{words}\n")), &[]).curve.unwrap().speeds_m_per_s;
    assert_eq!(curve("speeds = [1, 3]\npoints = 5\nspacing = \"linear\""), [1.0, 1.5, 2.0, 2.5, 3.0]);
    assert_eq!(curve("speeds = [1, 2, 5]"), [1.0, 2.0, 5.0]);
    let forty = curve("speeds = [\"0.01 m/s\", \"50 m/s\"]");
    assert_eq!((forty.len(), forty[0], forty[39]), (40, 0.01, 50.0));
    assert!(forty.windows(2).all(|w| w[0] < w[1]));
}

#[test]
fn a_curve_sweeps_temperatures_positions_and_strokes() {
    let plan = |words: &str| good(&with("", &format!("[curve]\n{words}\n")), &[]).curve.unwrap();
    let hot = plan("speeds = [1, 2, 5]\ntemperatures = [\"-30 degC\", \"70 degC\"]");
    approx::assert_relative_eq!(hot.temperatures_k[0], 243.15, max_relative = 1e-12);
    assert_eq!((hot.temperatures_k.len(), hot.positions_m.len(), hot.strokes), (2, 0, None));
    let along = plan("positions = [\"0 mm\", \"90 mm\"]\npoints = 4");
    assert_eq!((along.speeds_m_per_s.len(), along.positions_m.len(), along.length_m), (0, 4, Some(0.6)));
    approx::assert_relative_eq!(along.positions_m[1], 0.03, max_relative = 1e-12);
    assert!(along.cautions.is_empty(), "nothing is taken as endless");
    let travel = "[travel]\nlaw = \"free\"\nrelease = \"640 mm\"\n";
    let alone = good(&with(travel, "[curve]\npositions = [0, 0.02, 0.3]\n"), &[]);
    let problem = alone.positions_problem().unwrap();
    assert_eq!((problem.faults(), problem.wall.length_m(), alone.curve_problem()), (Vec::new(), Some(0.6), None));
    let stroke = "[travel]\nlaw = \"sine\"\namplitude = \"4 mm\"\nfrequency = \"20 Hz\"\n";
    let swept = good(&with(travel, &format!("{stroke}[curve]\nfrequencies = [10, 20]\n")), &[]);
    let strokes = swept.curve.as_ref().unwrap().strokes.clone().unwrap();
    assert_eq!(
        (strokes.frequencies_hz.as_slice(), strokes.amplitudes_m.as_slice()),
        ([10.0, 20.0].as_slice(), [0.004].as_slice())
    );
    assert_eq!(swept.stroke_problem(10.0, 0.004).unwrap().faults(), []);
}

#[test]
fn stacks_are_built_bottom_to_top_about_their_middle() {
    let p = good(
        &with("[mover]\n", "[mover]\nstack = [\"M+\", \"S\", \"M-\"]\nstack_gap = \"0.1 mm\"\n")
            .replace("[travel]", "[[mover.spacer]]\nname = \"S\"\nlength = \"4 mm\"\n[travel]"),
        &[],
    )
    .problem;
    // 12 + 0.1 + 4 + 0.1 + 12 = 28.2 mm: centres 8.1 mm from the middle.
    let centres: Vec<f64> = p.mover.parts.iter().map(|p| p.centre_m).collect();
    approx::assert_relative_eq!(centres[0], -0.0081, max_relative = 1e-12);
    approx::assert_relative_eq!(centres[1], 0.0081, max_relative = 1e-12);
    let remanences: Vec<f64> = p
        .mover
        .parts
        .iter()
        .map(|p| match p.source {
            Source::Magnet { remanence_tesla, .. } => remanence_tesla,
            _ => 0.0,
        })
        .collect();
    assert_eq!(remanences, [1.3, -1.3]);
}

#[test]
fn the_reference_point_of_a_stack_can_be_moved() {
    let first = |reference: &str| {
        let text = with("[mover]\n", &format!("[mover]\nstack = [\"M+\", \"M-\"]\nreference = {reference}\n"));
        good(&text, &[]).problem.mover.parts[0].centre_m
    };
    for (reference, centre) in
        [("\"middle\"", -0.006), ("\"lower end\"", 0.006), ("\"upper end\"", -0.018), ("\"2 mm\"", 0.004)]
    {
        approx::assert_relative_eq!(first(reference), centre, max_relative = 1e-12);
    }
}

#[test]
fn stacks_with_faults_point_at_the_entry() {
    for (stack, words) in [
        ("[\"M+\", \"N-\"]", "t.toml:11:16: no part of [mover] is named 'N'"),
        ("[\"M\"]", "a sign behind the name says where its north points"),
        ("[\"S+\"]", "a spacer has no north"),
        ("[\"D+\"]", "a dipole has no length to stack"),
        ("[3]", "a stack lists the names of its parts"),
        ("[]", "a stack names 1 to 1000 parts"),
        ("\"M+\"", "'stack' is a text here, and a list belongs here"),
    ] {
        let extra = "[[mover.spacer]]\nname = \"S\"\nlength = \"4 mm\"\n[[mover.dipole]]\nname = \"D\"\nmoment = \"1 A m2\"\n[travel]";
        let text = with("[mover]\n", &format!("[mover]\nstack = {stack}\n")).replace("[travel]", extra);
        let shown = super::bad(&text, &[]).to_string();
        assert!(shown.contains(words), "{stack}\n{shown}");
    }
}

#[test]
fn coatings_make_the_material_smaller_and_the_body_not() {
    let p =
        good(&with("length = \"12 mm\"", "length = \"12 mm\"\ninner_diameter = \"6 mm\"\ncoating = \"0.1 mm\""), &[])
            .problem;
    assert_eq!(p.mover.parts[0].outline, Outline { inner_radius_m: 0.003, outer_radius_m: 0.011, length_m: 0.012 });
    let Source::Magnet { inner_radius_m, outer_radius_m, length_m, .. } = p.mover.parts[0].source else { panic!() };
    approx::assert_relative_eq!(inner_radius_m, 0.0031, max_relative = 1e-12);
    approx::assert_relative_eq!(outer_radius_m, 0.0109, max_relative = 1e-12);
    approx::assert_relative_eq!(length_m, 0.0118, max_relative = 1e-12);
}

#[test]
fn dipoles_and_coils_are_read() {
    let text = with("[travel]", "[[mover.dipole]]\nname = \"D\"\nmoment = \"-1.2 A m2\"\nat = \"-50 mm\"\n[[mover.coil]]\nname = \"C\"\ninner_diameter = \"10 mm\"\nouter_diameter = \"20 mm\"\nlength = \"15 mm\"\nturns = 200\ncurrent = \"-2 A\"\nat = \"40 mm\"\n[travel]")
        .replace("name = \"M\"", "name = \"M\"\nat = \"0 mm\"\nnorth = \"down\"");
    let p = good(&text, &[]).problem;
    let names: Vec<&str> = p.mover.parts.iter().map(|p| p.name.as_str()).collect();
    assert_eq!(names, ["D", "M", "C"]);
    assert_eq!(p.mover.parts[0].source, Source::Dipole { moment_a_m2: -1.2 });
    assert!(matches!(p.mover.parts[1].source, Source::Magnet { remanence_tesla, .. } if remanence_tesla == -1.3));
    assert_eq!(
        p.mover.parts[2].source,
        Source::Coil { inner_radius_m: 0.005, outer_radius_m: 0.01, length_m: 0.015, ampere_turns: -400.0 }
    );
}

#[test]
fn plans_of_snapshots_are_read() {
    let plan = |words: &str| good(&with("", &format!("[output]\n{words}\n")), &[]);
    assert_eq!(plan("").problem.snapshots, SnapshotPlan::Automatic);
    assert_eq!(plan("fields = \"every 20 mm\"").problem.snapshots, SnapshotPlan::EveryTravel { step_m: 0.02 });
    assert_eq!(plan("fields = \"every 5 ms\"").problem.snapshots, SnapshotPlan::EveryTime { step_s: 0.005 });
    assert_eq!(
        plan("fields = [\"0 s\", \"0.1 s\"]").problem.snapshots,
        SnapshotPlan::Instants { times_s: vec![0.0, 0.1] }
    );
    let none = plan("fields = \"none\"");
    assert_eq!((none.problem.snapshots, none.output.fields, none.output.pictures), (SnapshotPlan::None, false, true));
    let few = plan("write = [\"summary\", \"trace\"]");
    assert_eq!((few.output.trace, few.output.fields, few.output.pictures), (true, false, false));
    assert_eq!(few.problem.snapshots, SnapshotPlan::None);
}

#[test]
fn accuracy_is_read() {
    let a =
        good(&with("", "[accuracy]\ntarget = \"0.1 %\"\nlevels = 4\ncells_across_wall = 6\n"), &[]).problem.accuracy;
    assert_eq!((a.target_relative, a.levels, a.cells_across_wall), (1e-3, Some(4), Some(6)));
    assert_eq!(good(CASE, &[]).problem.accuracy.target_relative, 1e-4);
}

#[test]
fn the_starter_resolves_and_says_only_what_it_must() {
    let case = good(super::STARTER, &[]);
    assert!(case.travel_given && case.curve.is_some() && case.problem.faults().is_empty());
    assert!(case.cautions.is_empty(), "{:?}", case.cautions);
}

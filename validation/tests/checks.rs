//! Every check of the registry, one test each, so that a fault names its table.
#![allow(clippy::unwrap_used, clippy::panic, reason = "tests may stop at the first fault")]

use lenzbore_solver::monitor::Unwatched;
use lenzbore_validation::checks::{self, Comparison, Verdict};

fn run(name: &str) {
    let check = checks::named(name).unwrap_or_else(|| panic!("no check named {name}"));
    let verdict = (check.run)(&Unwatched).unwrap();
    assert!(verdict.passed(), "{name} ({}):\n{verdict}", check.source.citation);
    for factor in [1.03, 0.97, -1.0] {
        assert!(sees(&verdict, factor), "{name} passes with references times {factor}:\n{verdict}");
    }
}

/// Whether a check would see references that are wrong by a factor: in most of its figures, zeros and bands aside. (Fields far
/// from their source are held to a share of the greatest one, and may be small beside it.)
fn sees(verdict: &Verdict, factor: f64) -> bool {
    let planted = |c: &Comparison| Comparison { expected: factor * c.expected, ..c.clone() };
    let all: Vec<Comparison> = verdict.comparisons.iter().filter(|c| c.expected.abs() > 0.0).map(planted).collect();
    let caught = all.iter().filter(|c| !c.passes()).count();
    all.is_empty() || 2 * caught > all.len()
}

macro_rules! checks {
    ($($test:ident: $name:literal,)*) => {
        $(#[test] fn $test() { run($name); })*

        #[test]
        fn every_check_has_a_test() {
            let tested = [$($name),*];
            for check in checks::all() {
                assert!(tested.contains(&check.name), "{} is not tested", check.name);
            }
        }
    };
}

checks! {
    val_loops: "loops",
    val_self_inductance: "self-inductance",
    val_coil_inductance: "coil-inductance",
    val_source_solenoid: "source-solenoid",
    val_source_force: "source-force",
    val_source_loop: "source-loop",
    val_slots: "slots",
    val_demagnetisation: "demagnetisation",
    val_recoil_moment: "recoil-moment",
    val_recoil_damping: "recoil-damping",
    val_grid_convergence: "grid-convergence",
    val_step_rod: "step-rod",
    val_step_tube: "step-tube",
    val_step_sphere: "step-sphere",
    val_integral_dipole: "integral-dipole",
    val_integral_cylinders: "integral-cylinders",
    val_integral_dipole_coefficient: "integral-dipole-coefficient",
    val_integral_stacks: "integral-stacks",
    val_integral_speeds: "integral-speeds",
    val_integral_permeable: "integral-permeable",
    val_integral_thin_wall: "integral-thin-wall",
    val_integral_moving_loop: "integral-moving-loop",
    val_rings_long_wall: "rings-long-wall",
    val_rings_fall: "rings-fall",
    val_field_dipole: "field-dipole",
    val_field_cylinders: "field-cylinders",
    val_field_stacks: "field-stacks",
    val_field_speeds: "field-speeds",
    val_field_permeable: "field-permeable",
    val_field_thin_wall: "field-thin-wall",
    val_field_critical_speed: "field-critical-speed",
    val_field_moving_loop: "field-moving-loop",
    val_field_coverage: "field-coverage",
    val_field_passage: "field-passage",
    val_field_fall: "field-fall",
    val_field_position: "field-position",
    val_field_station: "field-station",
    val_field_stroke: "field-stroke",
    val_alternating_coil: "alternating-coil",
    val_alternating_rod: "alternating-rod",
    val_alternating_skin_depth: "alternating-skin-depth",
    val_alternating_tube: "alternating-tube",
    val_alternating_sphere: "alternating-sphere",
    val_cooling_slab: "cooling-slab",
    val_cooling_rod: "cooling-rod",
    val_cooling_tube: "cooling-tube",
    val_experiment_falling_magnet: "experiment-falling-magnet",
}

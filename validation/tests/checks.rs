//! Every check of the registry, one test each, so that a fault names its table.
#![allow(clippy::unwrap_used, clippy::panic, reason = "tests may stop at the first fault")]

use lenzbore_validation::checks;

fn run(name: &str) {
    let check = checks::named(name).unwrap_or_else(|| panic!("no check named {name}"));
    let verdict = (check.run)().unwrap();
    assert!(verdict.passed(), "{name} ({}):\n{verdict}", check.source.citation);
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
    val_source_solenoid: "source-solenoid",
    val_source_force: "source-force",
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
    val_field_coverage: "field-coverage",
    val_field_passage: "field-passage",
    val_field_fall: "field-fall",
}

//! The two programs of `examples/` run and say their headline numbers.

use std::path::PathBuf;
use std::process::Command;

use lenzbore_solver::problem::{Extent, Layer, Mover, Outline, Part, Wall};
use lenzbore_solver::sources::Source;
use lenzbore_validation::endless;

/// A program of `examples/`, which lies beside the binary in the target folder and is built with the tests.
fn program(name: &str) -> PathBuf {
    let path = assert_cmd::cargo::cargo_bin!("lenzbore").parent().unwrap().join("examples").join(name);
    assert!(path.is_file(), "{} is not built; cargo builds it with all tests", path.display());
    path
}

/// The number behind `name = ` in what a program says.
fn said(text: &str, name: &str) -> f64 {
    let line = text.lines().find_map(|l| l.strip_prefix(name)?.trim_start().strip_prefix('=')).unwrap();
    line.split_whitespace().next().unwrap().parse().unwrap()
}

fn output_of(name: &str) -> String {
    let output = Command::new(program(name)).output().unwrap();
    assert!(output.status.success(), "{}", String::from_utf8_lossy(&output.stderr));
    String::from_utf8(output.stdout).unwrap()
}

/// The same tube and magnet by the Fourier-Bessel integral, an independent method.
#[test]
fn drag_speed_says_the_greatest_drag() {
    let text = output_of("drag_speed");
    let tube = Layer {
        name: "tube".into(),
        inner_radius_m: 12.5e-3,
        outer_radius_m: 14e-3,
        from_m: 0.0,
        to_m: 0.0,
        conductivity_s_per_m: 58e6,
        relative_permeability: 1.0,
    };
    let source = Source::Magnet { inner_radius_m: 0.0, outer_radius_m: 11e-3, length_m: 20e-3, remanence_tesla: 1.3 };
    let outline = Outline { inner_radius_m: 0.0, outer_radius_m: 11e-3, length_m: 20e-3 };
    let wall = Wall { slots: 0, extent: Extent::Endless, layers: vec![tube] };
    let mover = Mover {
        parts: vec![Part { name: "M".into(), centre_m: 0.0, source, outline, coercivity_a_per_m: None }],
        mass_kg: None,
        recoil: None,
    };
    let at = |speed: f64| endless::drag(&wall, &mover, speed).unwrap().value;

    let (critical, greatest) = (said(&text, "critical_speed"), said(&text, "drag_max"));
    assert!((greatest / at(critical) - 1.0).abs() < 2e-5, "{greatest} against {}", at(critical));
    assert!(at(0.97 * critical) < at(critical) && at(1.03 * critical) < at(critical), "{critical}");
}

/// The speed at the lower end is that of the same magnet in the same tube twice as long, 0.2288 m/s within 0.0001 by two
/// independent methods (a coupled-ring circuit and a prototype of the scheme): the magnet has long settled in either.
/// The time is a `reg_` number.
#[test]
fn free_fall_says_the_transit_time() {
    let text = output_of("free_fall");
    assert!((said(&text, "exit_speed") - 0.2288).abs() < 1e-4, "{text}");
    assert!((said(&text, "transit_time") / 1.021_012 - 1.0).abs() < 1e-4, "{text}");
}

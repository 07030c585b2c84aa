#![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

use lenzbore_solver::problem::{Extent, Layer, Outline, Part};
use lenzbore_solver::sources::Source;

use super::*;
use crate::picture::look;
use crate::result::demo;

#[test]
fn a_fall_is_shown_at_its_strongest_instant() {
    let (problem, outcome) = demo::free();
    let picture = section("Latch damper, copper sleeve on an aluminium liner", &problem, &outcome).unwrap();
    look::keep(&picture);
    let text = look::words(&picture);
    for word in
        ["Ø25", "Ø26.2", "Ø30", "Ø22.03", "gap 1.485", "26.03", "A/mm²", "Height z, mm", "into the page", " N ", " S "]
    {
        assert!(text.contains(word), "{word} is missing");
    }
    assert!(!look::has_non_numbers(&picture));
    assert!(picture.svg.len() < 500_000, "{} bytes", picture.svg.len());
    assert_eq!(picture, section("Latch damper, copper sleeve on an aluminium liner", &problem, &outcome).unwrap());
}

#[test]
fn a_dipole_needs_no_body() {
    let (problem, outcome) = demo::steady();
    let mut picture = section("Dipole in a copper tube", &problem, &outcome).unwrap();
    picture.name = "section_dipole";
    look::keep(&picture);
    assert!(look::words(&picture).contains("5 m/s"));
    assert!(!look::words(&picture).contains("gap"));
}

#[test]
fn without_field_metals_are_hatched() {
    let (problem, _) = demo::free();
    let mut picture = at_rest("Latch damper, before anything is solved", &problem, None).unwrap();
    picture.name = "section_hatched";
    look::keep(&picture);
    assert!(picture.svg.contains("<pattern") && !picture.svg.contains("<image"));
}

#[test]
fn rings_around_a_rod_and_long_stacks_fit_too() {
    let (mut problem, mut outcome) = demo::steady();
    let rod = Layer { inner_radius_m: 0.0, outer_radius_m: 8e-3, name: "rod".into(), ..problem.wall.layers[0].clone() };
    problem.wall.layers = vec![rod];
    problem.mover.parts = vec![ring("ring", 0.0, 1.2)];
    outcome.fields = Some(demo::fields(&problem, &[0.0], 1.2));
    problem.travel = Travel::Steady { velocity_m_per_s: 1.2 };
    let mut picture = section("Ring magnet around an aluminium rod", &problem, &outcome).unwrap();
    picture.name = "section_rod";
    look::keep(&picture);
    assert!(look::words(&picture).contains("gap 0.9"), "{}", look::words(&picture));
    assert!(look::words(&picture).contains("rod: solid, 58 MS/m"));

    let (mut problem, mut outcome) = demo::free();
    let parts = (0..7).map(|i| {
        let mut part = problem.mover.parts[0].clone();
        part.centre_m = 14e-3 * (f64::from(i) - 3.0);
        if i % 2 == 1 {
            part.source = part.source.reversed();
        }
        part
    });
    problem.mover.parts = parts.collect();
    problem.wall.extent = Extent::Finite { length_m: 0.5 };
    problem.wall.layers.truncate(1);
    problem.wall.layers[0].to_m = 0.5;
    outcome.fields = Some(demo::fields(&problem, &[0.25], -2.0));
    let mut picture = section("Seven magnets, poles alternating", &problem, &outcome).unwrap();
    picture.name = "section_stack";
    look::keep(&picture);
}

#[test]
fn a_mover_outside_the_wall_is_drawn_without_it() {
    let (problem, mut outcome) = demo::free();
    outcome.fields = Some(demo::fields(&problem, &[0.4], -1.0));
    let picture = section("Before the entry", &problem, &outcome).unwrap();
    let text = look::words(&picture);
    assert!(text.contains("Ø22.03") && !text.contains("Ø25") && !text.contains("gap"), "{text}");
    assert!(!look::has_non_numbers(&picture));
    picture.png().unwrap();
}

#[test]
fn a_coil_shows_the_sense_of_its_current() {
    let (mut problem, mut outcome) = demo::steady();
    problem.mover.parts = vec![Part {
        name: "coil".into(),
        centre_m: 0.0,
        source: Source::Coil { inner_radius_m: 5e-3, outer_radius_m: 9e-3, length_m: 16e-3, ampere_turns: 900.0 },
        outline: Outline { inner_radius_m: 5e-3, outer_radius_m: 9e-3, length_m: 16e-3 },
        coercivity_a_per_m: None,
    }];
    outcome.fields = Some(demo::fields(&problem, &[0.0], -5.0));
    let mut picture = section("Coil in a copper tube", &problem, &outcome).unwrap();
    picture.name = "section_coil";
    look::keep(&picture);
}

fn ring(name: &str, centre: f64, remanence: f64) -> Part {
    Part {
        name: name.into(),
        centre_m: centre,
        source: Source::Magnet {
            inner_radius_m: 8.9e-3,
            outer_radius_m: 15e-3,
            length_m: 10e-3,
            remanence_tesla: remanence,
        },
        outline: Outline { inner_radius_m: 8.9e-3, outer_radius_m: 15e-3, length_m: 10e-3 },
        coercivity_a_per_m: None,
    }
}

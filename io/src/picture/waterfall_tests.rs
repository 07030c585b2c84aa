#![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

use lenzbore_solver::ladder::ladder;
use lenzbore_solver::monitor::Unwatched;
use lenzbore_solver::problem::{Accuracy, Extent, Layer, Mover, Outline, Part, Problem, SnapshotPlan, Travel, Wall};
use lenzbore_solver::sources::Source;

use super::*;
use crate::picture::{error_map, look};

/// A magnet of 16 mm in a copper tube of 20 x 36 mm at 4 m/s: rings at the mean radius are right by cancellation only.
fn outcome() -> LadderOutcome {
    let layer = Layer {
        name: "tube".into(),
        inner_radius_m: 10e-3,
        outer_radius_m: 18e-3,
        from_m: 0.0,
        to_m: 0.0,
        conductivity_s_per_m: 58e6,
        relative_permeability: 1.0,
    };
    let source = Source::Magnet { inner_radius_m: 0.0, outer_radius_m: 8e-3, length_m: 16e-3, remanence_tesla: 1.2 };
    let outline = Outline { inner_radius_m: 0.0, outer_radius_m: 8e-3, length_m: 16e-3 };
    let problem = Problem {
        wall: Wall { slots: 0, extent: Extent::Endless, layers: vec![layer] },
        mover: Mover {
            parts: vec![Part { name: "M".into(), centre_m: 0.0, source, outline, coercivity_a_per_m: None }],
            mass_kg: None,
            recoil: None,
        },
        travel: Travel::Steady { velocity_m_per_s: 4.0 },
        accuracy: Accuracy::default(),
        snapshots: SnapshotPlan::None,
        stations: Vec::new(),
        warming: None,
    };
    ladder(&problem, &Unwatched).unwrap()
}

#[test]
fn rungs_and_their_worth_are_shown() {
    let outcome = outcome();
    let picture = waterfall("Ladder of a tube", &outcome).unwrap();
    look::keep(&picture);
    let text = look::words(&picture);
    for word in ["quick rule", "finite magnet", "wall thickness", "induction", "drag, N"] {
        assert!(text.contains(word), "{word} lacks in {text}");
    }
    assert!(!look::has_non_numbers(&picture));
    let map = error_map("Ladder of a tube", &outcome).unwrap().unwrap();
    look::keep(&map);
    let text = look::words(&map);
    assert!(text.contains("rings at the mean radius") && text.contains("Speed, m/s"), "{text}");
    assert!(!look::has_non_numbers(&map));
}

#[test]
fn per_cents_have_signs() {
    assert_eq!(signed_percent(0.3456), "+34.6 %");
    assert_eq!(signed_percent(-1.5), "−150 %");
    assert_eq!(signed_percent(-0.00123), "−0.12 %");
    assert_eq!(signed_percent(1e-7), "±0.00 %");
}

#![allow(
    clippy::unwrap_used,
    clippy::expect_used,
    clippy::panic,
    clippy::print_stdout,
    reason = "tests may stop at the first fault and print what they measured"
)]

use approx::assert_relative_eq;

use super::ring_tests::{cylinder, problem};
use super::*;
use crate::constants::MU0;
use crate::monitor::Unwatched;
use crate::problem::{Free, Outline, Part, Problem, Travel, Traverse};
use crate::sources::Source;

const SIGMA: f64 = 5.8e7;

fn quick(outcome: &LadderOutcome, assumptions: Assumptions) -> &QuickModel {
    outcome.quick.iter().find(|q| q.assumptions == assumptions).unwrap()
}

fn inside(model: &QuickModel, swept: Swept, tolerance: f64) -> &[Interval] {
    let range = model.ranges.iter().find(|r| r.swept == swept).unwrap();
    &range.inside.iter().find(|i| (i.tolerance - tolerance).abs() < 1e-12).unwrap().intervals
}

/// The top of the ladder is the run itself, and the steps lead there.
fn assert_climbs(problem: &Problem, outcome: &LadderOutcome) {
    let run = crate::solve(problem, &Unwatched).unwrap();
    let last = outcome.rungs.last().unwrap();
    for figure in &run.figures {
        assert_relative_eq!(last.figure(&figure.name).unwrap(), figure.value, max_relative = 1e-12);
        let climbed = outcome.figures.iter().find(|f| f.name == figure.name).unwrap();
        let first = climbed.values.iter().flatten().next().unwrap();
        let worth: f64 = climbed.steps.iter().map(|s| s.worth).sum();
        assert_relative_eq!(first + worth * figure.value.abs(), figure.value, max_relative = 1e-9);
    }
}

/// V = mu0 sigma w v at which the law of low speed is high by 1, 2, 5, 10 % of itself (drag = 0.99 c v, ...), dipole in a thin wall:
/// computed independently from the thin sheet's integral (M. H. Partovi, E. J. Morris, Canadian Journal of Physics 84, 253-271
/// (2006)). Tolerance: 0.3 % for a wall of 1/500 of its radius instead of none.
const LINEAR_LAW: [(f64, f64); 4] = [(0.01, 0.2465), (0.02, 0.3505), (0.05, 0.5639), (0.10, 0.8219)];

#[test]
fn val_the_low_speed_law_is_high_at_the_published_speeds() {
    let a = 10e-3;
    let dipole = Part {
        source: Source::Dipole { moment_a_m2: 1.0 },
        outline: Outline { inner_radius_m: 0.0, outer_radius_m: 0.0, length_m: 0.0 },
        ..cylinder(1e-3, 1e-3, 1.0, 0.0)
    };
    let case = problem(a, a * 1.002, None, vec![dipole], Travel::Steady { velocity_m_per_s: 100.0 });
    let outcome = ladder(&case, &Unwatched).unwrap();
    assert_eq!(outcome.falls_below.len(), LINEAR_LAW.len());
    for (found, (share, expected)) in outcome.falls_below.iter().zip(LINEAR_LAW) {
        assert_relative_eq!(found.share, share);
        assert_relative_eq!(found.magnetic_reynolds, expected, max_relative = 3e-3);
        assert_relative_eq!(MU0 * SIGMA * 0.002 * a * found.speed_m_per_s, expected, max_relative = 3e-3);
    }
    // Relative to the truth the law is 10 % high a little earlier: 0.77926 (computed independently from the same integral).
    let found = inside(quick(&outcome, Assumptions::RESISTIVE), Swept::Speed, 0.10);
    assert!(found.len() == 1 && found[0].open_below, "{found:?}");
    assert_relative_eq!(MU0 * SIGMA * 0.002 * a * found[0].to, 0.77926, max_relative = 3e-3);
}

/// A magnet of 0.8 of the bore in a thick wall: the ring sum at the mean radius is far too low when slow, too high when fast, and
/// looks right near mu0 sigma v a = 3 (an independent study of the same kind of case; the place, not a digit of it, is held).
#[test]
fn the_mean_radius_and_the_missing_inductance_cancel() {
    let a = 10e-3;
    let speed = 3.0 / (MU0 * SIGMA * a);
    let parts = vec![cylinder(8e-3, 16e-3, 1.2, 0.0)];
    let case = problem(a, 20e-3, None, parts, Travel::Steady { velocity_m_per_s: speed });
    let outcome = ladder(&case, &Unwatched).unwrap();
    assert_climbs(&case, &outcome);
    let mean = quick(&outcome, Assumptions::RINGS_MEAN);
    let slow = mean.ranges[0].errors[0].1;
    assert!((-0.6..-0.2).contains(&slow), "{slow}");
    let found = inside(mean, Swept::Speed, 0.10);
    assert!(found.len() == 1 && found[0].by_cancellation, "{found:?}");
    let number = |v: f64| MU0 * SIGMA * a * v;
    assert!(number(found[0].from) > 1.0 && number(found[0].to) < 6.0, "{found:?}");
    let drag = mean.errors.iter().find(|e| e.name == "drag").unwrap();
    println!("{slow} {found:?} {drag:?}");
}

#[test]
fn a_fall_climbs_to_its_run() {
    let parts = vec![cylinder(9e-3, 12e-3, 1.25, 0.0)];
    let law = Free::let_go(0.18, -0.03, [0.15, 0.0]);
    let case = problem(11e-3, 13e-3, Some(0.15), parts, Travel::Free(law));
    let outcome = ladder(&case, &Unwatched).unwrap();
    assert_climbs(&case, &outcome);
    for f in &outcome.figures {
        println!("{} {:?} {:?}", f.name, f.values, f.steps.iter().map(|s| s.worth).collect::<Vec<_>>());
    }
    // Coupled rings and field solve the same equations: what is left between them is the rings' own coarseness.
    for name in ["transit_time", "exit_speed", "dissipated_energy", "drag_peak"] {
        let figure = outcome.figures.iter().find(|f| f.name == name).unwrap();
        let step = figure.steps.last().unwrap();
        assert_eq!(step.effects, [Effect::Field]);
        assert!(step.worth.abs() < 1e-3, "{name}: {}", step.worth);
    }
}

#[test]
fn a_passage_climbs_to_its_run() {
    let parts = vec![cylinder(9e-3, 12e-3, 1.25, -6.5e-3), cylinder(9e-3, 12e-3, -1.25, 6.5e-3)];
    let law = Traverse { speed_m_per_s: 5.0, from_m: 0.16, to_m: -0.1 };
    let case = problem(11e-3, 13e-3, Some(0.06), parts, Travel::Traverse(law));
    let outcome = ladder(&case, &Unwatched).unwrap();
    assert_climbs(&case, &outcome);
    for f in &outcome.figures {
        println!("{} {:?} {:?}", f.name, f.values, f.steps.iter().map(|s| s.worth).collect::<Vec<_>>());
    }
    let impulse = outcome.figures.iter().find(|f| f.name == "impulse").unwrap();
    assert!(impulse.steps.last().unwrap().worth.abs() < 1e-3, "{impulse:?}");
    let effects: Vec<Effect> = outcome.rungs.iter().map(|r| r.effect).collect();
    use Effect::*;
    assert_eq!(effects, [Foot, Neighbours, FiniteMagnet, WallThickness, FiniteLength, Induction, Field]);
}

//! A time step allocates nothing: counted, not promised.
#![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

use lenzbore_mesh::Refinement;

use super::answer::Journey;
use super::run::Run;
use crate::problem::{Problem, Sine, Travel};
use crate::verification::cases::{fall, finite, layer, long_passage, magnet, problem, warmed};

/// Steps before the count, and counted.
const WARM: u32 = 4;
const COUNTED: u32 = 20;

/// Allocations of whole steps, with their record, on the coarsest level of `problem`.
fn allocations(problem: &Problem, dt: f64) -> u64 {
    let journey = Journey::new(problem).unwrap();
    let mut level = journey.level(Refinement::COARSEST, false).unwrap();
    let mut run = Run::new(&mut level, &journey.motion, &journey.course, journey.window()).unwrap();
    run.make_ready(64, dt).unwrap();
    let mut steps = |from: u32, count: u32| {
        for k in from..from + count {
            run.step_and_record(f64::from(k) * dt, dt).unwrap();
        }
    };
    steps(0, WARM);
    allocation_counter::measure(|| steps(WARM, COUNTED)).count_total
}

#[test]
fn a_step_at_uniform_speed_allocates_nothing() {
    assert_eq!(allocations(&long_passage(0.3, 3.0), 1e-4), 0);
    assert_eq!(allocations(&warmed(long_passage(0.3, 3.0)), 1e-4), 0);
}

#[test]
fn a_step_of_free_motion_allocates_nothing() {
    let wall = finite(0.3, vec![layer(11.0, 13.0, 58.0, 1.0)]);
    let mover = vec![magnet(0.0, 9.0, 12.0, 1.25, 0.0)];
    assert_eq!(allocations(&problem(wall, mover, Travel::Free(fall(310.0, -60.0, 300.0)), 3), 1e-3), 0);
}

#[test]
fn a_step_through_a_permeable_wall_allocates_nothing() {
    let wall = finite(0.1, vec![layer(11.0, 13.0, 6.0, 20.0)]);
    let mover = vec![magnet(0.0, 9.0, 12.0, 1.25, 0.0)];
    assert_eq!(allocations(&problem(wall, mover, Travel::Free(fall(110.0, -60.0, 100.0)), 3), 1e-3), 0);
}

#[test]
fn a_step_of_a_stroke_allocates_nothing() {
    let wall = finite(0.1, vec![layer(11.0, 13.0, 58.0, 1.0)]);
    let mover = vec![magnet(0.0, 9.0, 12.0, 1.25, 0.0)];
    let sine = Sine { centre_m: 0.05, amplitude_m: 5e-3, frequency_hz: 20.0, cycles: None };
    assert_eq!(allocations(&problem(wall, mover, Travel::Sine(sine), 3), 1e-3), 0);
}

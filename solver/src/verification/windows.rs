//! A march through windows that travel with the mover finds what the whole grid finds, from far fewer nodes.

use lenzbore_mesh::Refinement;

use super::cases::{answer, fall, finite, layer, long_passage, magnet, problem, traverse};
use crate::march::{coarsest_both_ways, march_on_whole_grids};
use crate::monitor::Unwatched;
use crate::problem::{Problem, Travel};

/// Every figure of the windows lies within `share_of_band` of the whole grid's, in parts of its band.
fn assert_same(problem: &Problem, share_of_band: f64) {
    let (windows, whole) = (answer(problem), march_on_whole_grids(problem, &Unwatched).unwrap());
    for (a, b) in windows.grids.iter().zip(&whole.grids) {
        println!("{} of {} nodes along z, {} steps", a.nodes_z, b.nodes_z, a.steps);
        assert!(a.nodes_z * 4 < b.nodes_z * 3 && a.steps == b.steps);
    }
    assert_eq!(windows.figures.len(), whole.figures.len());
    for (a, b) in windows.figures.iter().zip(&whole.figures) {
        let off = (a.value - b.value).abs();
        println!("{:24} off by {:.1e} of its band {:.1e} relative", a.name, off / b.band, b.band / b.value.abs());
        assert!(a.name == b.name && off <= share_of_band * b.band, "{}: {} and {}", a.name, a.value, b.value);
    }
    let ledger = windows.ledger.unwrap();
    assert!(ledger.imbalance_relative.abs() < 1e-5, "{ledger:?}");
}

#[test]
fn a_slow_and_a_fast_passage() {
    assert_same(&long_passage(0.5, 3.0), 0.05);
    assert_same(&long_passage(0.5, 40.0), 0.05);
}

#[test]
fn a_fall_through_a_wall_with_a_collar() {
    let mut wall = finite(0.6, vec![layer(11.0, 13.0, 58.0, 1.0), layer(13.0, 16.0, 30.0, 1.0)]);
    (wall.layers[1].from_m, wall.layers[1].to_m) = (0.15, 0.2);
    let mover = vec![magnet(0.0, 9.0, 12.0, 1.25, 0.0)];
    assert_same(&problem(wall, mover, Travel::Free(fall(630.0, -60.0, 600.0)), 3), 0.3);
}

/// The coarsest level alone: its figures through windows are within 1e-5 of the whole grid's, a hundredth of its own error.
#[test]
fn a_permeable_wall() {
    let wall = finite(0.7, vec![layer(11.0, 13.0, 2.0, 10.0)]);
    let mover = vec![magnet(0.0, 9.0, 12.0, 1.25, 0.0)];
    let problem = problem(wall, mover, traverse(3.0, 740.0, 230.0), 3);
    for (name, [windows, whole]) in coarsest_both_ways(&problem, &Unwatched).unwrap() {
        println!("{name}: {windows:.9e}, on the whole grid {whole:.9e}");
        assert!((windows / whole - 1.0).abs() < 1e-5, "{name}: {windows} and {whole}");
    }
}

/// Four times the wall, four times the steps, and nodes that grow by no more than a logarithm.
#[test]
fn work_grows_as_the_length_of_the_wall() {
    let run = |length: f64| {
        let outcome = answer(&long_passage(length, 3.0));
        let finest = outcome.grids[Refinement::first(3).len() - 1].clone();
        (finest.nodes_z as f64, finest.steps as f64)
    };
    let (short, long) = (run(0.5), run(2.0));
    assert!(long.0 < short.0 * 1.3, "{short:?} {long:?}");
    assert!(long.1 < short.1 * 4.0, "{short:?} {long:?}");
}

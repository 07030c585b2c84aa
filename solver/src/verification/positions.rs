//! The zero-speed damping coefficient in a wall with ends, by other ways.

use super::cases::{dipole, finite, layer, magnet, problem, traverse};
use crate::monitor::Unwatched;
use crate::outcome::AtPosition;
use crate::problem::{Problem, Wall};

fn magnet_in(wall: Wall) -> Problem {
    problem(wall, vec![magnet(0.0, 9.0, 12.0, 1.25, 0.0)], traverse(1.0, -60.0, 160.0), 3)
}

fn at(problem: &Problem, positions_m: &[f64]) -> Vec<AtPosition> {
    crate::damping_against_position(problem, positions_m, &Unwatched).unwrap().sweeps.positions
}

/// Low frequency: small strokes about the same places. c falls with the square of the frequency; 0.1 Hz is 1/1700 of that at which it falls
/// to a half.
fn assert_low_frequency(case: &Problem, positions_m: &[f64]) {
    for found in at(case, positions_m) {
        let small = crate::small_strokes(case, found.position_m, &[0.1], &Unwatched).unwrap()[0];
        let apart = (found.damping - small.damping).abs();
        println!("{} m: {} and {}, apart {apart:.1e}", found.position_m, found.damping, small.damping);
        assert!(apart <= found.damping_band + small.damping_band + 1e-6 * small.damping);
    }
}

#[test]
fn it_is_that_of_slow_small_strokes() {
    assert_low_frequency(&magnet_in(finite(0.1, vec![layer(11.0, 13.0, 58.0, 1.0)])), &[0.05, 0.096, -0.008]);
}

/// A wall of two layers, one of them permeable and shorter, moves the field along with it.
#[test]
fn a_permeable_jacket_counts() {
    let mut wall = finite(0.08, vec![layer(11.0, 13.0, 30.0, 1.0), layer(13.0, 14.0, 5.0, 4.0)]);
    (wall.layers[1].from_m, wall.layers[1].to_m) = (0.02, 0.06);
    assert_low_frequency(&magnet_in(wall), &[0.04, 0.065]);
}

/// Twice the conductivity damps twice as much, and both ends are alike.
#[test]
fn it_goes_with_the_conductivity_and_both_ends_are_alike() {
    let case = |sigma: f64| {
        problem(finite(0.04, vec![layer(8.0, 9.0, sigma, 1.0)]), vec![dipole()], traverse(1.0, -50.0, 90.0), 3)
    };
    let (single, double) = (at(&case(20.0), &[-0.005, 0.02, 0.045]), at(&case(40.0), &[-0.005, 0.02, 0.045]));
    for (a, b) in single.iter().zip(&double) {
        approx::assert_relative_eq!(2.0 * a.damping, b.damping, max_relative = 1e-12);
    }
    approx::assert_relative_eq!(single[0].damping, single[2].damping, max_relative = 1e-9);
}

//! Strokes and motions from a table: limits at low and high frequency, two routes at small amplitude, settling.

use std::f64::consts::{PI, TAU};

use faer::prelude::Solve;
use faer::sparse::{SparseColMat, Triplet};
use lenzbore_mesh::Refinement;
use num_complex::Complex64;

use super::cases::{answer, figure, finite, layer, magnet, problem, steady, traverse, value};
use crate::march::small_test::coarsest;
use crate::monitor::Unwatched;
use crate::outcome::{Outcome, SmallStroke};
use crate::problem::{MotionTable, Problem, Sine, Travel};

const DAMPING: &str = "damping_coefficient_equivalent";
/// Middle of the wall, m.
const MIDDLE: f64 = 0.12;

/// A magnet of 18 mm diameter x 12 mm, 1.25 T, in 240 mm of copper tube, 22 to 26 mm diameter.
fn in_copper(travel: Travel) -> Problem {
    let wall = finite(0.24, vec![layer(11.0, 13.0, 58.0, 1.0)]);
    problem(wall, vec![magnet(0.0, 9.0, 12.0, 1.25, 0.0)], travel, 3)
}

fn stroke(amplitude_mm: f64, frequency_hz: f64, cycles: Option<u32>) -> Problem {
    in_copper(Travel::Sine(Sine { centre_m: MIDDLE, amplitude_m: amplitude_mm * 1e-3, frequency_hz, cycles }))
}

fn small(problem: &Problem, centre_m: f64, frequencies_hz: &[f64]) -> Vec<SmallStroke> {
    crate::small_strokes(problem, centre_m, frequencies_hz, &Unwatched).unwrap()
}

fn assert_within_bands(name: &str, (a, a_band): (f64, f64), (b, b_band): (f64, f64), beside: f64) {
    println!("{name}: {a:.8} +- {a_band:.1e} and {b:.8} +- {b_band:.1e}, apart {:.1e}", (a - b).abs());
    assert!((a - b).abs() <= a_band + b_band + beside, "{name}: {a} and {b}");
}

fn banded(outcome: &Outcome, name: &str) -> (f64, f64) {
    let figure = figure(outcome, name);
    (figure.value, figure.band)
}

/// Cross-check: a march of 5 um strokes, settled, and the frequency domain at vanishing amplitude. The next power of the amplitude adds
/// (X / wavelength)^2 / 8, the field's shortest wave along z being about the running clearance of 2 mm: 1e-6.
#[test]
fn small_strokes_are_those_of_the_frequency_domain() {
    for frequency in [20.0, 400.0, 3000.0] {
        let case = stroke(5e-3, frequency, None);
        let (marched, point) = (answer(&case), small(&case, MIDDLE, &[frequency])[0]);
        let size = point.stiffness.hypot(TAU * frequency * point.damping);
        let beside = 1e-6 * size;
        assert_within_bands(
            "damping",
            banded(&marched, DAMPING),
            (point.damping, point.damping_band),
            beside / (TAU * frequency),
        );
        assert_within_bands(
            "stiffness",
            banded(&marched, "stiffness"),
            (point.stiffness, point.stiffness_band),
            beside,
        );
        assert!(figure(&marched, DAMPING).band < 3e-4 * point.damping, "a band that tells something");
    }
}

/// Near an end of the wall, with permeability: the stroke's dynamic part and the frequency domain, both without the static pull.
#[test]
fn a_permeable_wall_adds_its_static_pull_to_the_stiffness_alone() {
    let wall = finite(0.06, vec![layer(11.0, 13.0, 6.0, 1.5)]);
    let sine = Sine { centre_m: 0.045, amplitude_m: 2e-5, frequency_hz: 800.0, cycles: None };
    let case = problem(wall, vec![magnet(0.0, 9.0, 12.0, 1.25, 0.0)], Travel::Sine(sine), 3);
    let (marched, point) = (answer(&case), small(&case, 0.045, &[800.0])[0]);
    let (all, rest) = (banded(&marched, "stiffness"), banded(&marched, "stiffness_static"));
    assert!(rest.0.abs() > all.1 + rest.1, "the pull has a stiffness");
    // Corners converge more slowly than even powers: what the levels leave there is no part of this check.
    let corners = 1e-4 * point.stiffness.abs();
    assert_within_bands(
        "stiffness",
        (all.0 - rest.0, all.1 + rest.1),
        (point.stiffness, point.stiffness_band),
        corners,
    );
    let damping = (point.damping, point.damping_band);
    assert_within_bands("damping", banded(&marched, DAMPING), damping, corners / (TAU * 800.0));
}

/// Code verification: k + i omega c of the recurrence against a complex sparse LU of K + i omega G on the same grid.
#[test]
fn the_recurrence_gives_the_response_of_a_complex_lu() {
    let case = stroke(1.0, 100.0, None);
    let frequencies = [3.0, 100.0, 5000.0];
    let (operators, slope, found) = coarsest(&case, MIDDLE, &frequencies, Refinement::COARSEST);
    let (n, wall) = (operators.unknowns(), &operators.wall);
    for (frequency, [stiffness, damping]) in frequencies.into_iter().zip(found) {
        let i_omega = Complex64::new(0.0, TAU * frequency);
        let mut entries: Vec<Triplet<usize, usize, Complex64>> = Vec::new();
        for (row, values) in operators.stiffness.outer_iterator().enumerate() {
            entries.extend(values.iter().map(|(column, &v)| Triplet::new(row, column, Complex64::from(v))));
        }
        let mut right = faer::Mat::<Complex64>::zeros(n, 1);
        for ((&u, &g), &s) in wall.unknown.iter().zip(&wall.conductance).zip(&slope) {
            entries.push(Triplet::new(u, u, i_omega * g));
            right[(u, 0)] = -i_omega * g * s;
        }
        let phi = SparseColMat::try_new_from_triplets(n, n, &entries).unwrap().sp_lu().unwrap().solve(&right);
        let nodes = wall.unknown.iter().zip(&wall.conductance).zip(&slope);
        let sum: Complex64 = nodes.map(|((&u, &g), &s)| g * s * (s + phi[(u, 0)])).sum();
        let wanted = 2.0 * PI * i_omega * sum;
        let off = (Complex64::new(stiffness, TAU * frequency * damping) - wanted).norm() / wanted.norm();
        println!("{frequency} Hz: {wanted:.6}, off {off:.1e}");
        assert!(off < 1e-9);
    }
}

/// Low frequency: the damping coefficient of settled fields at low speed in an endless wall, an independent solution. 1 Hz is 1/170 of the
/// frequency at which c falls to a half, and c falls with its square: 1e-5 at 1 Hz; the wall's ends, ten bore radii away, leave out 1e-7.
#[test]
fn slow_strokes_have_the_zero_speed_damping_coefficient() {
    let mut wall = in_copper(traverse(1.0, 0.0, 1.0)).wall;
    wall.extent = crate::problem::Extent::Endless;
    let still = answer(&steady(wall, vec![magnet(0.0, 9.0, 12.0, 1.25, 0.0)], 1e-3));
    let slow = answer(&stroke(1.0, 1.0, None));
    let c = banded(&still, "damping_coefficient");
    assert_within_bands("damping", banded(&slow, DAMPING), c, 2e-5 * c.0);
    // The stiffness is omega^2 times the lag time, which goes with the square of the frequency.
    let slower = answer(&stroke(1.0, 0.5, None));
    approx::assert_relative_eq!(value(&slow, "stiffness") / value(&slower, "stiffness"), 4.0, max_relative = 1e-4);
}

/// High frequency: currents within the skin depth delta move the face of a perfect conductor outwards by delta (1 - i) / 2, so that
/// k + i omega c = k_p - b (1 - i) / sqrt(omega): c falls with the frequency to the power -3/2, and k lacks as much as omega c. The next
/// order is delta over the clearance of 2 mm, 0.06 at 0.3 MHz; it halves with the frequency quadrupled.
#[test]
fn fast_strokes_have_the_skin_depth_limit() {
    let frequencies = [0.25e6, 1e6, 4e6];
    let points = small(&stroke(1.0, 100.0, None), MIDDLE, &frequencies);
    let slope = |a: usize, b: usize| (points[b].damping / points[a].damping).log(frequencies[b] / frequencies[a]);
    let (early, late) = (slope(0, 1), slope(1, 2));
    let reactive = |a: usize, b: usize| {
        let loss = |k: usize| TAU * frequencies[k] * points[k].damping;
        (points[b].stiffness - points[a].stiffness) / (loss(a) - loss(b))
    };
    println!("slopes {early:.4} {late:.4}, ratios {:.4} {:.4}", reactive(0, 1), reactive(1, 2));
    assert!((late + 1.5).abs() < 0.02 && (late + 1.5).abs() < 0.7 * (early + 1.5).abs());
    assert!((reactive(1, 2) - 1.0).abs() < 0.05 && (reactive(1, 2) - 1.0).abs() < 0.7 * (reactive(0, 1) - 1.0).abs());
}

/// With the wall at rest at first, currents that die away within some cycles add to the first.
#[test]
fn the_first_cycle_is_some_per_cent_off() {
    let (first, settled) = (answer(&stroke(1.0, 1000.0, Some(1))), answer(&stroke(1.0, 1000.0, None)));
    let off = value(&first, DAMPING) / value(&settled, DAMPING) - 1.0;
    println!("first cycle off by {off:.3}, its band {:.1e}", figure(&first, DAMPING).band);
    assert!(off.abs() > 0.02);
    // The band of a cycle that has not settled holds the settled figure.
    assert!((value(&first, DAMPING) - value(&settled, DAMPING)).abs() <= figure(&first, DAMPING).band);
    assert!(first.cautions.iter().any(|c| c.text.contains("settled, loss or stiffness would differ")));
    assert!(settled.cautions.iter().any(|c| c.text.contains("by which the stroke had settled")));
    let ledger = settled.ledger.unwrap();
    assert!((ledger.work / ledger.heat - 1.0).abs() < 1e-6 && ledger.imbalance_relative.abs() < 1e-6, "{ledger:?}");
    approx::assert_relative_eq!(ledger.work, value(&settled, "loss_per_cycle"), max_relative = 1e-9);
    let forces = settled.forces.unwrap();
    assert!(forces.agree, "{forces:?}");
    approx::assert_relative_eq!(forces.wall_newton, value(&settled, "drag_peak"), max_relative = 1e-4);
}

/// A stroke about the wall's end and one of several bore radii settle and close their balance too; the mover's own field is crossed by ends.
#[test]
fn long_strokes_through_an_end_close_their_balance() {
    let sine = Sine { centre_m: 0.23, amplitude_m: 0.04, frequency_hz: 12.0, cycles: None };
    let outcome = answer(&in_copper(Travel::Sine(sine)));
    let ledger = outcome.ledger.unwrap();
    println!("{ledger:?} {:?}", outcome.figures);
    assert!(ledger.imbalance_relative.abs() < 3e-6 && outcome.forces.unwrap().agree);
    assert!(outcome.accuracy.met, "{:?}", outcome.accuracy);
}

/// A table of a straight motion is a traverse.
#[test]
fn a_straight_table_is_a_traverse() {
    let whole = answer(&in_copper(traverse(2.0, -150.0, 390.0)));
    let time_s: Vec<f64> = [0.0, 0.1, 0.13, 0.27].into_iter().collect();
    let position_m = time_s.iter().map(|t| -0.15 + 2.0 * t).collect();
    let table = answer(&in_copper(Travel::Table(MotionTable { time_s, position_m })));
    for name in ["drag_peak", "impulse", "dissipated_energy", "current_density_peak"] {
        assert_within_bands(name, banded(&whole, name), banded(&table, name), 0.0);
    }
    assert!(table.ledger.unwrap().imbalance_relative.abs() < 1e-6);
}

/// A table that samples one cycle of a stroke dissipates what the first cycle of the stroke does. The spline's ends have slopes of parabolas,
/// off by (omega h)^2 / 3 = 1.4e-3 of the greatest speed at 96 points a cycle, which dies away within a few points: 1e-4 of the energy at most.
#[test]
fn a_sampled_cycle_dissipates_what_the_cycle_does() {
    let stroke = answer(&stroke(3.0, 100.0, Some(1)));
    let time_s: Vec<f64> = (0..=96).map(|k| 0.01 * f64::from(k) / 96.0).collect();
    let position_m = time_s.iter().map(|t| MIDDLE + 3e-3 * (TAU * 100.0 * t).sin()).collect();
    let table = answer(&in_copper(Travel::Table(MotionTable { time_s, position_m })));
    let (a, b) = (value(&stroke, "loss_per_cycle"), value(&table, "dissipated_energy"));
    println!("{a} {b} {:.1e}", b / a - 1.0);
    assert!((b / a - 1.0).abs() < 1e-4);
    let ledger = table.ledger.unwrap();
    assert!(ledger.imbalance_relative.abs() < 1e-4, "{ledger:?}");
}

//! The other way to alternating fields: one complex sparse LU of K + i omega G a frequency, and exact limits. In tests.
#![allow(
    clippy::unwrap_used,
    clippy::panic,
    clippy::print_stdout,
    reason = "tests may stop at the first fault and print what they measured"
)]

use std::f64::consts::PI;

use faer::linalg::solvers::Solve;
use faer::sparse::{SparseColMat, Triplet};
use lenzbore_mesh::Refinement;
use num_complex::Complex64;

use super::groups::groups;
use super::heat::heat_watt;
use super::level::HarmonicLevel;
use super::{grid, in_the_walls_frame};
use crate::monitor::Unwatched;
use crate::operators::Operators;
use crate::outcome::Outcome;
use crate::placement::Placement;
use crate::problem::{Accuracy, Alternating, Extent, Layer, Mover, Outline, Part, Problem, SnapshotPlan, Travel, Wall};
use crate::sources::Source;

fn layer(inner_mm: f64, outer_mm: f64, sigma: f64, mu_r: f64, ends_mm: (f64, f64)) -> Layer {
    Layer {
        name: format!("from {inner_mm}"),
        inner_radius_m: 1e-3 * inner_mm,
        outer_radius_m: 1e-3 * outer_mm,
        from_m: 1e-3 * ends_mm.0,
        to_m: 1e-3 * ends_mm.1,
        conductivity_s_per_m: sigma,
        relative_permeability: mu_r,
    }
}

/// A coil of `turns` at one ampere, radii and length in mm.
fn coil(inner_mm: f64, outer_mm: f64, length_mm: f64, turns: f64, centre_mm: f64) -> Part {
    let (inner_radius_m, outer_radius_m, length_m) = (1e-3 * inner_mm, 1e-3 * outer_mm, 1e-3 * length_mm);
    let source = Source::Coil { inner_radius_m, outer_radius_m, length_m, ampere_turns: turns };
    let outline = Outline { inner_radius_m, outer_radius_m, length_m };
    Part { name: format!("coil at {centre_mm}"), centre_m: 1e-3 * centre_mm, source, outline, coercivity_a_per_m: None }
}

fn problem(extent: Extent, layers: Vec<Layer>, parts: Vec<Part>, law: Alternating) -> Problem {
    Problem {
        wall: Wall { slots: 0, extent, layers },
        mover: Mover { parts, mass_kg: None, recoil: None },
        travel: Travel::Alternating(law),
        accuracy: Accuracy::default(),
        snapshots: SnapshotPlan::None,
        stations: Vec::new(),
        warming: None,
    }
}

/// A probe coil in a tube.
fn probe(sigma: f64, mu_r: f64, frequencies_hz: Vec<f64>) -> Problem {
    let tube = layer(7.5, 9.5, sigma, mu_r, (0.0, 0.0));
    problem(
        Extent::Endless,
        vec![tube],
        vec![coil(6.0, 7.0, 5.0, 100.0, 0.0)],
        Alternating::at(0.0, 1.0, frequencies_hz),
    )
}

/// A coil around a copper rod with a permeable collar, off its middle, and one opposed to it inside nothing: with ends.
fn collared() -> Problem {
    let extent = Extent::Finite { length_m: 0.06 };
    let layers = vec![layer(0.0, 8.0, 58e6, 1.0, (0.0, 60.0)), layer(8.0, 10.0, 5e6, 80.0, (15.0, 35.0))];
    let parts = vec![coil(12.0, 15.0, 8.0, 200.0, -6.0), coil(12.0, 15.0, 8.0, -120.0, 9.0)];
    problem(extent, layers, parts, Alternating::at(0.025, 1.0, vec![50.0, 2e3, 1e5]))
}

fn law(problem: &Problem) -> &Alternating {
    let Travel::Alternating(law) = &problem.travel else { unreachable!("made so above") };
    law
}

fn level(problem: &Problem, refinement: Refinement) -> HarmonicLevel {
    let omegas = law(problem).angular_frequencies();
    let placed = in_the_walls_frame(problem, law(problem));
    let highest = omegas.iter().copied().fold(0.0, f64::max);
    let plan = grid::plan(&placed, &Placement::new(&placed), highest).unwrap();
    HarmonicLevel::new(&placed, &plan, plan.grid(refinement), &groups(&omegas), &Unwatched).unwrap()
}

/// phi at the wall's nodes by a complex sparse LU: (K + i omega G) phi = -i omega G psi_0.
fn by_lu(operators: &Operators, flux: &[f64], omega: f64) -> Vec<Complex64> {
    let (n, wall) = (operators.unknowns(), &operators.wall);
    let mut entries: Vec<Triplet<usize, usize, Complex64>> = Vec::new();
    for (row, values) in operators.stiffness.outer_iterator().enumerate() {
        entries.extend(values.iter().map(|(column, &value)| Triplet::new(row, column, Complex64::from(value))));
    }
    let mut right = faer::Mat::<Complex64>::zeros(n, 1);
    for ((&u, g), f) in wall.unknown.iter().zip(&wall.conductance).zip(flux) {
        entries.push(Triplet::new(u, u, Complex64::new(0.0, omega * g)));
        right[(u, 0)] = Complex64::new(0.0, -omega * g * f);
    }
    let matrix = SparseColMat::try_new_from_triplets(n, n, &entries).unwrap();
    let lu = matrix.sp_lu().unwrap();
    let first = lu.solve(&right);
    let rest = &right - &matrix * &first;
    let x = &first + lu.solve(&rest);
    let left = (&right - &matrix * &x).norm_l2() / right.norm_l2();
    assert!(left < 1e-11, "the sparse LU left a residual of {left:.1e}");
    wall.unknown.iter().map(|&u| x[(u, 0)]).collect()
}

/// The same reaction and the same impedance on the same grid by recurrence and by LU, at the ends and in the middle of what one recurrence
/// serves; heat at the rings and power of the coils balance to rounding; the tridiagonal problem alone gives the impedance.
#[test]
fn the_recurrence_gives_the_reaction_of_a_complex_lu() {
    let cases = [probe(58e6, 1.0, vec![100.0, 1e3, 1e4]), probe(5e6, 50.0, vec![300.0, 3e4]), collared()];
    for case in &cases {
        let level = level(case, Refinement::COARSEST);
        for omega in law(case).angular_frequencies() {
            let reaction = level.reaction(omega);
            let wanted = by_lu(&level.operators, &level.flux, omega);
            let size = wanted.iter().fold(0.0_f64, |m, p| m.max(p.norm()));
            let found = reaction.flux.iter().zip(&level.flux).map(|(f, own)| f - own);
            let off = found.zip(&wanted).fold(0.0_f64, |m, (f, w)| m.max((f - w).norm()));
            let linked = level.linked(&reaction);
            let wall = &level.operators.wall;
            let by_rings: f64 = reaction
                .currents
                .iter()
                .zip(&wall.conductance)
                .filter(|c| *c.1 > 0.0)
                .map(|(i, g)| i.norm_sqr() / g)
                .sum();
            let by_coil = (Complex64::new(0.0, omega) * linked).re;
            let quick = level.linked_quickly(omega);
            println!(
                "{} Hz: flux off {:.1e}, rings {:.1e}, tridiagonal {:.1e}, left {:.1e}, {} vectors",
                omega / (2.0 * PI),
                off / size,
                by_rings / by_coil - 1.0,
                (quick - linked).norm() / linked.norm(),
                level.left(omega),
                level.counters.recurrence
            );
            assert!(off < 1e-9 * size);
            assert!((by_rings / by_coil - 1.0).abs() < 1e-9);
            assert!((quick - linked).norm() < 1e-9 * linked.norm());
        }
    }
}

/// Heat by cells and by rings draw together with the square of the cell size.
#[test]
fn heat_by_cells_converges_to_heat_by_rings() {
    let case = probe(58e6, 1.0, vec![1e3]);
    let apart: Vec<f64> = [Refinement::COARSEST, Refinement::first(3)[2]]
        .iter()
        .map(|&refinement| {
            let level = level(&case, refinement);
            let omega = law(&case).angular_frequencies()[0];
            let reaction = level.reaction(omega);
            let by_coil = PI * (Complex64::new(0.0, omega) * level.linked(&reaction)).re;
            heat_watt(&level.operators, &reaction) / by_coil - 1.0
        })
        .collect();
    let order = (apart[0] / apart[1]).log2();
    println!("{apart:?}, order {order}");
    assert!((order - 2.0).abs() < 0.1 && apart[0].abs() < 0.05);
}

fn answer(problem: &Problem) -> Outcome {
    assert_eq!(problem.faults(), []);
    crate::solve(problem, &Unwatched).unwrap()
}

/// A long tube gives what an endless one gives, by another grid along z and another way of keeping its ends; a coil in its middle.
#[test]
fn a_long_wall_is_as_good_as_an_endless_one() {
    let frequencies = vec![200.0, 5e3];
    let endless = answer(&probe(58e6, 1.0, frequencies.clone()));
    let tube = layer(7.5, 9.5, 58e6, 1.0, (0.0, 300.0));
    let law = Alternating::at(0.15, 1.0, frequencies);
    let parts = vec![coil(6.0, 7.0, 5.0, 100.0, 0.0)];
    let finite = answer(&problem(Extent::Finite { length_m: 0.3 }, vec![tube], parts, law));
    let points = |o: &Outcome| o.frequency.clone().unwrap().points;
    for (a, b) in points(&endless).iter().zip(points(&finite)) {
        for (a, b) in [(a.resistance_change, b.resistance_change), (a.reactance_change, b.reactance_change)] {
            println!("{a:?} {b:?}");
            // What lies beyond 140 mm of the coil adds 1e-6 at most; both bands hold what is left.
            assert!((a.value - b.value).abs() < a.band + b.band + 1e-6 * a.value.abs());
            assert!(a.band + b.band < 2e-4 * a.value.abs());
        }
    }
}

/// At low frequency resistance grows with the square of the frequency and reactance with its third power; a coil of twice the turns has
/// four times the impedance whatever its current.
#[test]
fn low_frequency_powers_and_turns() {
    let of = |turns: f64, current: f64| {
        let mut case = probe(1.4e6, 1.0, vec![10.0, 20.0]);
        case.mover.parts = vec![coil(6.0, 7.0, 5.0, turns * current, 0.0)];
        case.travel = Travel::Alternating(Alternating::at(0.0, current, vec![10.0, 20.0]));
        answer(&case).frequency.unwrap().points
    };
    let (one, two) = (of(100.0, 1.0), of(200.0, 0.3));
    approx::assert_relative_eq!(
        one[1].resistance_change.value / one[0].resistance_change.value,
        4.0,
        max_relative = 1e-5
    );
    approx::assert_relative_eq!(
        one[1].reactance_change.value / one[0].reactance_change.value,
        8.0,
        max_relative = 1e-5
    );
    for (a, b) in one.iter().zip(&two) {
        approx::assert_relative_eq!(4.0 * a.resistance_change.value, b.resistance_change.value, max_relative = 1e-10);
        approx::assert_relative_eq!(4.0 * a.reactance_change.value, b.reactance_change.value, max_relative = 1e-8);
    }
}

/// One frequency: figures, balance, fields of two instants, and nothing that is not finite.
#[test]
fn one_frequency_has_figures_and_fields() {
    let mut case = collared();
    case.travel =
        Travel::Alternating(Alternating { winding_resistance_ohm: 2.0, ..Alternating::at(0.025, 1.0, vec![2e3]) });
    case.accuracy.levels = Some(3);
    case.snapshots = SnapshotPlan::Automatic;
    let outcome = answer(&case);
    let names: Vec<&str> = outcome.figures.iter().map(|f| f.name.as_str()).collect();
    println!("{names:?}");
    for figure in &outcome.figures {
        println!("{} {} {} {:.1e}", figure.name, figure.value, figure.unit, figure.band);
        assert!(figure.value.is_finite() && figure.band.is_finite());
    }
    let wanted = ["resistance", "reactance", "inductance", "resistance_change", "reactance_change", "inductance_alone"];
    assert_eq!(names[..6], wanted);
    let value = |name: &str| outcome.figures.iter().find(|f| f.name == name).unwrap().value;
    approx::assert_relative_eq!(value("resistance"), 2.0 + value("resistance_change"), max_relative = 1e-12);
    approx::assert_relative_eq!(value("inductance") * 2.0 * PI * 2e3, value("reactance"), max_relative = 1e-12);
    let fields = outcome.fields.unwrap();
    let [peak, quarter] = fields.snapshots.as_slice() else { panic!("two instants") };
    approx::assert_relative_eq!(quarter.time_s, 0.25 / 2e3, max_relative = 1e-12);
    // Mean heat is half of the sum of both instants a quarter period apart.
    let mut heat = 0.0;
    let (nr, nz) = (fields.r_m.len() - 1, fields.z_m.len() - 1);
    for j in 0..nz {
        for i in 0..nr {
            let area = (fields.r_m[i + 1].powi(2) - fields.r_m[i].powi(2)) * PI * (fields.z_m[j + 1] - fields.z_m[j]);
            heat += 0.5 * area * (peak.heat_density[j * nr + i] + quarter.heat_density[j * nr + i]);
        }
    }
    println!("{heat} {}", value("dissipated_power"));
    approx::assert_relative_eq!(heat, value("dissipated_power"), max_relative = 2e-2);
    assert!(outcome.ledger.unwrap().imbalance_relative.abs() < 1e-3);
}

/// The greatest ratio of a sweep stands where a finer sweep has it.
#[test]
fn a_sweep_finds_its_critical_frequency() {
    let steps =
        |from: f64, to: f64, n: i32| (0..n).map(|k| from * (to / from).powf(f64::from(k) / f64::from(n - 1))).collect();
    let wide = answer(&probe(58e6, 1.0, steps(50.0, 2e4, 9)));
    let figure = |name: &str| wide.figures.iter().find(|f| f.name == name).unwrap().clone();
    let (at, most) = (figure("critical_frequency"), figure("resistance_ratio_max"));
    let near = answer(&probe(58e6, 1.0, steps(0.98 * at.value, 1.02 * at.value, 3)));
    let alone = near.figures.iter().find(|f| f.name == "inductance_alone").unwrap().value;
    let ratios: Vec<f64> = near
        .frequency
        .unwrap()
        .points
        .iter()
        .map(|p| p.resistance_change.value / (2.0 * PI * p.frequency_hz * alone))
        .collect();
    println!("{at:?} {most:?} {ratios:?}");
    assert!(ratios[1] > ratios[0] && ratios[1] > ratios[2]);
    approx::assert_relative_eq!(ratios[1], most.value, max_relative = 1e-6);
}

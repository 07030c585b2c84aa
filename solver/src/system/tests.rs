//! The systems that leave the crate are those that it solves.

#![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

use std::f64::consts::PI;

use super::*;
use crate::monitor::Unwatched;
use crate::problem::{Accuracy, Layer, Mover, Outline, Part, SnapshotPlan, Travel, Wall};
use crate::sources::Source;

fn problem(extent: Extent, permeability: f64, source: Source, travel: Travel) -> Problem {
    let to_m = if let Extent::Finite { length_m } = extent { length_m } else { 0.0 };
    let layer = Layer {
        name: "tube".to_owned(),
        inner_radius_m: 0.0105,
        outer_radius_m: 0.0125,
        from_m: 0.0,
        to_m,
        conductivity_s_per_m: 30.0e6,
        relative_permeability: permeability,
    };
    let outline = match source {
        Source::Coil { inner_radius_m, outer_radius_m, length_m, .. } => {
            Outline { inner_radius_m, outer_radius_m, length_m }
        }
        _ => Outline { inner_radius_m: 0.0, outer_radius_m: 0.0, length_m: 0.0 },
    };
    Problem {
        wall: Wall { slots: 0, extent, layers: vec![layer] },
        mover: Mover {
            parts: vec![Part { name: "P".to_owned(), centre_m: 0.0, source, outline, coercivity_a_per_m: None }],
            mass_kg: None,
            recoil: None,
        },
        travel,
        accuracy: Accuracy { levels: Some(3), ..Accuracy::default() },
        snapshots: SnapshotPlan::None,
        warming: None,
        stations: Vec::new(),
    }
}

const DIPOLE: Source = Source::Dipole { moment_a_m2: 1.0 };

#[test]
fn settled_systems_give_each_levels_damping_coefficient() {
    for permeability in [1.0, 20.0] {
        let problem = problem(Extent::Endless, permeability, DIPOLE, Travel::Steady { velocity_m_per_s: 0.0 });
        let speeds = [0.01, 0.02];
        let outcome = crate::drag_curve(&problem, &speeds, &Unwatched).unwrap();
        let figure = outcome.figures.iter().find(|f| f.name == "damping_coefficient_zero_speed").unwrap();
        let systems = settled_systems(&problem, 0.02, figure.levels.len(), &Unwatched).unwrap();
        for (system, wanted) in systems.iter().zip(&figure.levels) {
            let sum: f64 = system.slope.iter().zip(&system.conductance).map(|(q, g)| g * q * q).sum();
            approx::assert_relative_eq!(2.0 * PI * sum, *wanted, max_relative = 1e-12);
        }
    }
}

#[test]
fn stiffness_is_symmetric_and_convection_skew() {
    let problem = problem(Extent::Endless, 5.0, DIPOLE, Travel::Steady { velocity_m_per_s: 2.0 });
    let system = settled_systems(&problem, 2.0, 1, &Unwatched).unwrap().remove(0);
    let n = system.rows.len();
    assert_eq!(n, (system.r_m.len() - 2) * (system.z_m.len() - 2));
    // x . A y against y . A x for two vectors without symmetry of their own.
    let x: Vec<f64> = (0..n).map(|k| (k as f64 * 0.37).sin()).collect();
    let y: Vec<f64> = (0..n).map(|k| (k as f64 * 0.91 + 0.3).cos()).collect();
    let dot = |a: &[f64], b: &[f64]| a.iter().zip(b).map(|(a, b)| a * b).sum::<f64>();
    let (k, c) = (&system.stiffness, system.convection.as_ref().unwrap());
    let size = |m: &SparseMatrix| m.values.iter().map(|v| v.abs()).sum::<f64>();
    assert!((dot(&x, &k.times(&y)) - dot(&y, &k.times(&x))).abs() < 1e-13 * size(k));
    assert!((dot(&x, &c.times(&y)) + dot(&y, &c.times(&x))).abs() < 1e-13 * size(c));
    assert!(dot(&x, &k.times(&x)) > 0.0);
}

#[test]
fn rows_know_their_place() {
    let problem = problem(Extent::Endless, 1.0, DIPOLE, Travel::Steady { velocity_m_per_s: 2.0 });
    let system = settled_systems(&problem, 2.0, 1, &Unwatched).unwrap().remove(0);
    for (row, g) in system.rows.iter().zip(&system.conductance) {
        let r = system.r_m[row.i];
        assert_eq!(row.region == 1, (0.0105 - 1e-9..0.0125 + 1e-9).contains(&r), "{r}");
        assert_eq!(row.region == 1, *g > 0.0);
    }
    let first = system.rows.first().unwrap();
    assert_eq!((first.i, first.j, first.beside), (1, 1, [true, false, true, false]));
    assert_eq!(system.rows.last().unwrap().beside, [false, true, false, true]);
    assert!(
        settled_systems(
            &self::problem(Extent::Finite { length_m: 0.1 }, 1.0, DIPOLE, problem.travel),
            1.0,
            1,
            &Unwatched
        )
        .is_err()
    );
}

#[test]
fn alternating_systems_give_the_resistance_at_low_frequency() {
    // As omega falls the currents are -i omega G psi_0: the wall adds 2 pi omega^2 psi_0 . G psi_0 / current^2.
    let coil = Source::Coil { inner_radius_m: 0.006, outer_radius_m: 0.009, length_m: 0.008, ampere_turns: 10.0 };
    let law =
        Alternating { frequencies_hz: vec![1e-2], current_ampere: 0.1, position_m: 0.03, winding_resistance_ohm: 0.0 };
    let problem = problem(Extent::Finite { length_m: 0.05 }, 1.0, coil, Travel::Alternating(law.clone()));
    let outcome = crate::solve(&problem, &Unwatched).unwrap();
    let figure = outcome.figures.iter().find(|f| f.name == "resistance_change").unwrap();
    let systems = alternating_systems(&problem, &law, figure.levels.len(), &Unwatched).unwrap();
    let omega = 2.0 * PI * 1e-2;
    for (system, wanted) in systems.iter().zip(&figure.levels) {
        assert!(system.convection.is_none());
        let sum: f64 = system.source.iter().zip(&system.conductance).map(|(p, g)| g * p * p).sum();
        approx::assert_relative_eq!(2.0 * PI * omega * omega * sum / 0.01, *wanted, max_relative = 1e-7);
    }
}

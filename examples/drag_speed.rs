//! Drag against speed from scratch: a cylinder magnet in an endless copper tube, and the speed at which it is greatest.

#![expect(clippy::print_stdout, reason = "a program that says its result")]

use std::error::Error;

use lenzbore_solver::drag_curve;
use lenzbore_solver::monitor::Unwatched;
use lenzbore_solver::problem::{Accuracy, Extent, Layer, Mover, Outline, Part, Problem, SnapshotPlan, Travel, Wall};
use lenzbore_solver::sources::Source;

fn main() -> Result<(), Box<dyn Error>> {
    // Sizes in metres: the magnet's radius R and length L, the wall from a to b.
    let (radius, length) = (11e-3, 20e-3);
    let (a, b) = (12.5e-3, 14e-3);
    let tube = Layer {
        name: "tube".into(),
        inner_radius_m: a,
        outer_radius_m: b,
        from_m: 0.0,
        to_m: 0.0,
        conductivity_s_per_m: 58e6,
        relative_permeability: 1.0,
    };
    let magnet = Part {
        name: "M".into(),
        centre_m: 0.0,
        source: Source::Magnet { inner_radius_m: 0.0, outer_radius_m: radius, length_m: length, remanence_tesla: 1.3 },
        outline: Outline { inner_radius_m: 0.0, outer_radius_m: radius, length_m: length },
        coercivity_a_per_m: None,
    };
    let problem = Problem {
        wall: Wall { slots: 0, extent: Extent::Endless, layers: vec![tube] },
        mover: Mover { parts: vec![magnet], mass_kg: None, recoil: None },
        travel: Travel::Steady { velocity_m_per_s: 1.0 },
        accuracy: Accuracy::default(),
        snapshots: SnapshotPlan::None,
        stations: Vec::new(),
        warming: None,
    };

    // v = 0.1 * 2^k m/s.
    let speeds: Vec<f64> = (0..10).map(|k| 0.1 * 2f64.powi(k)).collect();
    let outcome = drag_curve(&problem, &speeds, &Unwatched)?;

    for point in outcome.curve.iter().flat_map(|curve| &curve.points) {
        println!("{:7.2} m/s  {:10.5} N +/- {:.1e}", point.speed_m_per_s, point.drag_newton, point.band_newton);
    }
    for figure in outcome.figures.iter().filter(|f| ["critical_speed", "drag_max"].contains(&f.name.as_str())) {
        println!("{} = {:.5} {} +/- {:.1e}", figure.name, figure.value, figure.unit, figure.band);
    }
    Ok(())
}

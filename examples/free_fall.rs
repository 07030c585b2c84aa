//! The equation of motion: a magnet let go above a copper tube 150 mm long, timed between the tube's ends.

#![expect(clippy::print_stdout, reason = "a program that says its result")]

use std::error::Error;

use lenzbore_solver::monitor::Unwatched;
use lenzbore_solver::problem::{
    Accuracy, Extent, Free, Layer, Mover, Outline, Part, Problem, SnapshotPlan, Travel, Wall,
};
use lenzbore_solver::solve;
use lenzbore_solver::sources::Source;

fn main() -> Result<(), Box<dyn Error>> {
    let (radius, length, tube_length) = (9e-3, 12e-3, 0.15);
    let tube = Layer {
        name: "tube".into(),
        inner_radius_m: 11e-3,
        outer_radius_m: 13e-3,
        from_m: 0.0,
        to_m: tube_length,
        conductivity_s_per_m: 58e6,
        relative_permeability: 1.0,
    };
    let magnet = Part {
        name: "M".into(),
        centre_m: 0.0,
        source: Source::Magnet { inner_radius_m: 0.0, outer_radius_m: radius, length_m: length, remanence_tesla: 1.25 },
        outline: Outline { inner_radius_m: 0.0, outer_radius_m: radius, length_m: length },
        coercivity_a_per_m: None,
    };
    // m dv/dt = -m g + F(z, v, history): F is the force of the wall's currents on the magnet.
    let fall = Free::let_go(tube_length + 30e-3, -30e-3, [tube_length, 0.0]);
    let problem = Problem {
        wall: Wall { slots: 0, extent: Extent::Finite { length_m: tube_length }, layers: vec![tube] },
        mover: Mover { parts: vec![magnet], mass_kg: Some(0.06), recoil: None },
        travel: Travel::Free(fall),
        accuracy: Accuracy::default(),
        snapshots: SnapshotPlan::None,
        stations: Vec::new(),
        warming: None,
    };

    let outcome = solve(&problem, &Unwatched)?;
    for name in ["transit_time", "exit_speed"] {
        if let Some(figure) = outcome.figures.iter().find(|f| f.name == name) {
            println!("{name} = {:.6} {} +/- {:.1e}", figure.value, figure.unit, figure.band);
        }
    }
    Ok(())
}

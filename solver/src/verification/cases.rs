//! Problems that several tests share, and the reading of their answers.

use crate::monitor::Unwatched;
use crate::outcome::{Figure, Outcome};
use crate::placement::source_sizes;
use crate::problem::{
    Accuracy, Extent, Free, Layer, LayerHeat, Mover, Outline, Part, Problem, SnapshotPlan, Travel, Traverse, Wall,
    Warming,
};
use crate::sources::Source;

/// A layer over the whole length of its wall, radii in mm, conductivity in MS/m.
pub(crate) fn layer(inner_mm: f64, outer_mm: f64, sigma_ms: f64, mu_r: f64) -> Layer {
    Layer {
        name: format!("{inner_mm} to {outer_mm}"),
        inner_radius_m: inner_mm * 1e-3,
        outer_radius_m: outer_mm * 1e-3,
        from_m: 0.0,
        to_m: 0.0,
        conductivity_s_per_m: sigma_ms * 1e6,
        relative_permeability: mu_r,
    }
}

/// The wall without thick or thin ends of it.
pub(crate) fn endless(layers: Vec<Layer>) -> Wall {
    Wall { slots: 0, extent: Extent::Endless, layers }
}

/// The same layers from z = 0 to `length_m`.
pub(crate) fn finite(length_m: f64, mut layers: Vec<Layer>) -> Wall {
    layers.iter_mut().for_each(|l| l.to_m = length_m);
    Wall { slots: 0, extent: Extent::Finite { length_m }, layers }
}

/// A part without coating at `centre_mm`.
pub(super) fn part(source: Source, centre_mm: f64) -> Part {
    let (inner_radius_m, outer_radius_m, half) = source_sizes(&source);
    let outline = Outline { inner_radius_m, outer_radius_m, length_m: 2.0 * half };
    Part { name: format!("at {centre_mm} mm"), centre_m: centre_mm * 1e-3, source, outline, coercivity_a_per_m: None }
}

/// A dipole of 1 A m2.
pub(super) fn dipole() -> Part {
    part(Source::Dipole { moment_a_m2: 1.0 }, 0.0)
}

/// A cylinder (`inner_mm` = 0) or ring magnet, radii and length in mm.
pub(crate) fn magnet(inner_mm: f64, outer_mm: f64, length_mm: f64, remanence_tesla: f64, centre_mm: f64) -> Part {
    let source = Source::Magnet {
        inner_radius_m: inner_mm * 1e-3,
        outer_radius_m: outer_mm * 1e-3,
        length_m: length_mm * 1e-3,
        remanence_tesla,
    };
    part(source, centre_mm)
}

/// A coil, radii and length in mm.
pub(super) fn coil(inner_mm: f64, outer_mm: f64, length_mm: f64, ampere_turns: f64) -> Part {
    let source = Source::Coil {
        inner_radius_m: inner_mm * 1e-3,
        outer_radius_m: outer_mm * 1e-3,
        length_m: length_mm * 1e-3,
        ampere_turns,
    };
    part(source, 0.0)
}

/// A problem with no snapshots, on `levels` grids.
pub(crate) fn problem(wall: Wall, parts: Vec<Part>, travel: Travel, levels: usize) -> Problem {
    Problem {
        wall,
        mover: Mover { parts, mass_kg: Some(0.02), recoil: None },
        travel,
        accuracy: Accuracy { levels: Some(levels), ..Accuracy::default() },
        snapshots: SnapshotPlan::None,
        stations: Vec::new(),
        warming: None,
    }
}

/// Settled fields at a signed velocity, on three levels.
pub(super) fn steady(wall: Wall, parts: Vec<Part>, velocity_m_per_s: f64) -> Problem {
    problem(wall, parts, Travel::Steady { velocity_m_per_s }, 3)
}

/// Uniform speed through a finite wall, from and to in mm.
pub(crate) fn traverse(speed_m_per_s: f64, from_mm: f64, to_mm: f64) -> Travel {
    Travel::Traverse(Traverse { speed_m_per_s, from_m: from_mm * 1e-3, to_m: to_mm * 1e-3 })
}

/// A magnet of 18 mm diameter x 12 mm, 1.25 T, down through a tube of 11 to 13 mm radius at uniform speed.
pub(crate) fn long_passage(length_m: f64, speed_m_per_s: f64) -> Problem {
    let wall = finite(length_m, vec![layer(11.0, 13.0, 58.0, 1.0)]);
    let travel = traverse(speed_m_per_s, length_m * 1e3 + 60.0, -60.0);
    problem(wall, vec![magnet(0.0, 9.0, 12.0, 1.25, 0.0)], travel, 3)
}

/// A fall from rest under standard gravity, with nothing but the wall to slow it; gates at both ends of the wall.
pub(crate) fn fall(release_mm: f64, until_mm: f64, wall_mm: f64) -> Free {
    Free::let_go(release_mm * 1e-3, until_mm * 1e-3, [wall_mm * 1e-3, 0.0])
}

/// The same problem with its wall's heat followed: every layer as aluminium, insulated.
pub(crate) fn warmed(problem: Problem) -> Problem {
    let layer = LayerHeat {
        density_kg_per_m3: 2700.0,
        specific_heat_j_per_kg_k: 900.0,
        thermal_conductivity_w_per_m_k: Some(200.0),
        resistivity_coefficient_per_k: Some(0.004),
        trusted_to_k: 473.15,
        melting_k: None,
    };
    let layers = vec![layer; problem.wall.layers.len()];
    Problem { warming: Some(Warming { start_k: 293.15, layers, cooling: None, duty: None }), ..problem }
}

/// The answer to a sound problem.
pub(crate) fn answer(problem: &Problem) -> Outcome {
    assert_eq!(problem.faults(), []);
    crate::solve(problem, &Unwatched).unwrap()
}

/// A figure by its name.
pub(crate) fn figure<'o>(outcome: &'o Outcome, name: &str) -> &'o Figure {
    outcome.figures.iter().find(|f| f.name == name).unwrap_or_else(|| panic!("no figure {name}"))
}

/// A figure's value by its name.
pub(crate) fn value(outcome: &Outcome, name: &str) -> f64 {
    figure(outcome, name).value
}

//! Walls and movers of the checks, in a line each.

use lenzbore_solver::problem::{
    Accuracy, Extent, Free, Layer, Mover, Outline, Part, Problem, SnapshotPlan, Travel, Wall,
};
use lenzbore_solver::sources::Source;

/// One layer over its whole length, without a mover's clearance to mind.
#[must_use]
pub fn layer(name: &str, radii_m: (f64, f64), conductivity_s_per_m: f64, relative_permeability: f64) -> Layer {
    Layer {
        name: name.to_owned(),
        inner_radius_m: radii_m.0,
        outer_radius_m: radii_m.1,
        from_m: 0.0,
        to_m: 0.0,
        conductivity_s_per_m,
        relative_permeability,
    }
}

/// An endless wall of these layers.
#[must_use]
pub fn endless(layers: Vec<Layer>) -> Wall {
    Wall { slots: 0, extent: Extent::Endless, layers }
}

/// An endless wall of one layer.
#[must_use]
pub fn endless_tube(radii_m: (f64, f64), conductivity_s_per_m: f64, relative_permeability: f64) -> Wall {
    endless(vec![layer("tube", radii_m, conductivity_s_per_m, relative_permeability)])
}

/// A wall of one layer from z = 0 to `length_m`.
#[must_use]
pub fn finite_tube(radii_m: (f64, f64), length_m: f64, conductivity_s_per_m: f64) -> Wall {
    let tube = Layer { to_m: length_m, ..layer("tube", radii_m, conductivity_s_per_m, 1.0) };
    Wall { slots: 0, extent: Extent::Finite { length_m }, layers: vec![tube] }
}

/// A part with its centre at `centre_m`; its outline is that of its currents.
#[must_use]
pub fn part(name: &str, centre_m: f64, source: Source) -> Part {
    let (inner_radius_m, outer_radius_m, length_m) = match source {
        Source::Dipole { .. } => (0.0, 0.0, 0.0),
        Source::Magnet { inner_radius_m, outer_radius_m, length_m, .. }
        | Source::Coil { inner_radius_m, outer_radius_m, length_m, .. } => (inner_radius_m, outer_radius_m, length_m),
    };
    Part {
        name: name.to_owned(),
        centre_m,
        source,
        outline: Outline { inner_radius_m, outer_radius_m, length_m },
        coercivity_a_per_m: None,
    }
}

/// A mover of these parts without mass.
#[must_use]
pub fn mover(parts: Vec<Part>) -> Mover {
    Mover { parts, mass_kg: None, recoil: None }
}

/// A point dipole.
#[must_use]
pub fn dipole(moment_a_m2: f64) -> Mover {
    mover(vec![part("dipole", 0.0, Source::Dipole { moment_a_m2 })])
}

/// A cylinder magnet.
#[must_use]
pub fn cylinder(radius_m: f64, length_m: f64, remanence_tesla: f64) -> Mover {
    stack(radius_m, length_m, remanence_tesla, &[1.0], 0.0)
}

/// Equal cylinder magnets with signs, bottom to top, spacers between; the reference point is the middle.
#[must_use]
pub fn stack(radius_m: f64, length_m: f64, remanence_tesla: f64, signs: &[f64], spacer_m: f64) -> Mover {
    let pitch = length_m + spacer_m;
    let mut centre = -0.5 * pitch * (signs.len() as f64 - 1.0);
    let mut parts = Vec::with_capacity(signs.len());
    for (i, sign) in signs.iter().enumerate() {
        let source = Source::Magnet {
            inner_radius_m: 0.0,
            outer_radius_m: radius_m,
            length_m,
            remanence_tesla: sign * remanence_tesla,
        };
        parts.push(part(&format!("magnet {}", i + 1), centre, source));
        centre += pitch;
    }
    mover(parts)
}

/// A question at default accuracy that keeps no fields.
#[must_use]
pub fn question(wall: Wall, mover: Mover, travel: Travel) -> Problem {
    let (accuracy, snapshots) = (Accuracy::default(), SnapshotPlan::None);
    Problem { wall, mover, travel, accuracy, snapshots, stations: Vec::new(), warming: None }
}

/// A fall under standard gravity from rest at `release_m`, ending at `until_m`, timed between two gates.
#[must_use]
pub fn free_fall(release_m: f64, until_m: f64, gates_m: [f64; 2]) -> Free {
    Free::let_go(release_m, until_m, gates_m)
}

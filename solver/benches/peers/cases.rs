//! The questions that are timed. The first three are those of the Python peers.

use lenzbore_solver::problem::{
    Accuracy, Extent, Free, Layer, Mover, Outline, Part, Problem, SnapshotPlan, Travel, Traverse, Wall,
};
use lenzbore_solver::sources::Source;

const CONDUCTIVITY: f64 = 58.0e6;
/// Drop of the fall before the wall and after it, m.
const BEFORE_M: f64 = 0.030;
const AFTER_M: f64 = 0.060;

/// One case by name, with the greatest speed where it is a curve.
pub(crate) struct Case {
    pub(crate) name: &'static str,
    pub(crate) about: &'static str,
    pub(crate) problem: Problem,
    pub(crate) curve: Option<Vec<f64>>,
}

/// The cases on which the forecast is held against the solve.
pub(crate) fn all() -> Vec<Case> {
    let plain = |name, about, problem| Case { name, about, problem, curve: None };
    let curve = |name, about, problem| Case { name, about, problem, curve: Some(curve_speeds()) };
    vec![
        plain("slow", "steady, dipole, 0.1 m/s", steady(dipole(), 0.1)),
        plain("fast", "steady, cylinder in a wall as thick as its bore, 50 m/s", steady(thick(), 50.0)),
        plain("permeable", "steady, dipole, permeability 50, 5 m/s", steady(permeable(), 5.0)),
        curve("curve", "60 speeds, dipole", dipole()),
        curve("curve-cylinder", "60 speeds, cylinder", cylinder()),
        plain("traverse", "3 m/s through 300 mm", traverse(0.3, 3.0)),
        plain("free", "the fall through 300 mm", fall(0.3)),
        plain("free-long", "a fall through 1.2 m", fall(1.2)),
    ]
}

/// The speeds of the curve, m/s: 60 from 0.01 to 100, evenly in the logarithm.
pub(crate) fn curve_speeds() -> Vec<f64> {
    (0..60).map(|k| 0.01 * 10.0_f64.powf(4.0 * f64::from(k) / 59.0)).collect()
}

/// Dipole of 1 A m2 in an endless wall, 10.5 to 12.5 mm radius.
pub(crate) fn dipole() -> Problem {
    endless(part(Source::Dipole { moment_a_m2: 1.0 }), 10.5e-3, 12.5e-3, 1.0)
}

/// Cylinder of 1.2 T, 5 mm radius, 10 mm long in an endless wall, 7.5 to 9.5 mm radius.
pub(crate) fn cylinder() -> Problem {
    endless(part(magnet(5.0e-3, 10.0e-3, 1.2)), 7.5e-3, 9.5e-3, 1.0)
}

fn thick() -> Problem {
    endless(part(magnet(5.0e-3, 10.0e-3, 1.2)), 6.0e-3, 12.0e-3, 1.0)
}

fn permeable() -> Problem {
    endless(part(Source::Dipole { moment_a_m2: 1.0 }), 10.5e-3, 12.5e-3, 50.0)
}

fn steady(problem: Problem, velocity_m_per_s: f64) -> Problem {
    Problem { travel: Travel::Steady { velocity_m_per_s }, ..problem }
}

/// A magnet of 18 mm diameter x 12 mm, 1.25 T, 60 g falls through a wall of 11 to 13 mm radius, released at rest 30 mm above it.
pub(crate) fn fall(length_m: f64) -> Problem {
    let law = Free { time_limit_s: 120.0, ..Free::let_go(length_m + BEFORE_M, -AFTER_M, [length_m, 0.0]) };
    finite(length_m, Travel::Free(law))
}

/// The same magnet at uniform speed through such a wall, from one side to the other.
pub(crate) fn traverse(length_m: f64, speed_m_per_s: f64) -> Problem {
    finite(length_m, Travel::Traverse(Traverse { speed_m_per_s, from_m: length_m + AFTER_M, to_m: -AFTER_M }))
}

fn finite(length_m: f64, travel: Travel) -> Problem {
    let layer = layer(11.0e-3, 13.0e-3, length_m, 1.0);
    Problem {
        wall: Wall { slots: 0, extent: Extent::Finite { length_m }, layers: vec![layer] },
        mover: Mover { parts: vec![part(magnet(9.0e-3, 12.0e-3, 1.25))], mass_kg: Some(0.060), recoil: None },
        travel,
        accuracy: Accuracy::default(),
        snapshots: SnapshotPlan::None,
        stations: Vec::new(),
        warming: None,
    }
}

fn endless(part: Part, inner_radius_m: f64, outer_radius_m: f64, relative_permeability: f64) -> Problem {
    let layer = layer(inner_radius_m, outer_radius_m, 0.0, relative_permeability);
    Problem {
        wall: Wall { slots: 0, extent: Extent::Endless, layers: vec![layer] },
        mover: Mover { parts: vec![part], mass_kg: None, recoil: None },
        travel: Travel::Steady { velocity_m_per_s: 1.0 },
        accuracy: Accuracy::default(),
        snapshots: SnapshotPlan::None,
        stations: Vec::new(),
        warming: None,
    }
}

fn layer(inner_radius_m: f64, outer_radius_m: f64, to_m: f64, relative_permeability: f64) -> Layer {
    let name = "tube".to_owned();
    Layer {
        name,
        inner_radius_m,
        outer_radius_m,
        from_m: 0.0,
        to_m,
        conductivity_s_per_m: CONDUCTIVITY,
        relative_permeability,
    }
}

fn magnet(outer_radius_m: f64, length_m: f64, remanence_tesla: f64) -> Source {
    Source::Magnet { inner_radius_m: 0.0, outer_radius_m, length_m, remanence_tesla }
}

fn part(source: Source) -> Part {
    let (outer_radius_m, length_m) = match source {
        Source::Magnet { outer_radius_m, length_m, .. } | Source::Coil { outer_radius_m, length_m, .. } => {
            (outer_radius_m, length_m)
        }
        Source::Dipole { .. } => (0.0, 0.0),
    };
    let outline = Outline { inner_radius_m: 0.0, outer_radius_m, length_m };
    Part { name: "magnet".to_owned(), centre_m: 0.0, source, outline, coercivity_a_per_m: None }
}

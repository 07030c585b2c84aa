//! A layout as the bodies of a problem, for drawing: nothing is asked of it.

use lenzbore_solver::problem::{Accuracy, Extent, Layer, Mover, Outline, Part, Problem, SnapshotPlan, Travel, Wall};
use lenzbore_solver::sources::Source;

use super::{BodyKind, BodyLayout, LayerLayout, Layout};

impl Layout {
    /// Wall and mover at rest; spacers, which have no field, are left out.
    pub(crate) fn bodies(&self) -> Problem {
        let extent = self.wall.length_m.map_or(Extent::Endless, |length_m| Extent::Finite { length_m });
        Problem {
            wall: Wall { extent, layers: self.wall.layers.iter().map(layer).collect(), slots: 0 },
            mover: Mover { parts: self.mover.iter().filter_map(part).collect(), mass_kg: None, recoil: None },
            travel: Travel::Steady { velocity_m_per_s: 0.0 },
            accuracy: Accuracy::default(),
            snapshots: SnapshotPlan::None,
            stations: Vec::new(),
            warming: None,
        }
    }
}

fn layer(layer: &LayerLayout) -> Layer {
    Layer {
        name: layer.name.clone(),
        inner_radius_m: 0.5 * layer.inner_diameter_m,
        outer_radius_m: 0.5 * layer.outer_diameter_m,
        from_m: layer.from_m,
        to_m: layer.to_m,
        conductivity_s_per_m: layer.conductivity_s_per_m,
        relative_permeability: layer.relative_permeability,
    }
}

fn part(body: &BodyLayout) -> Option<Part> {
    let (inner_radius_m, outer_radius_m) = (0.5 * body.inner_diameter_m, 0.5 * body.outer_diameter_m);
    let length_m = body.length_m;
    let source = match body.kind {
        BodyKind::Magnet { remanence_tesla } => {
            Source::Magnet { inner_radius_m, outer_radius_m, length_m, remanence_tesla }
        }
        BodyKind::Coil { ampere_turns } => Source::Coil { inner_radius_m, outer_radius_m, length_m, ampere_turns },
        BodyKind::Dipole { moment_a_m2 } => Source::Dipole { moment_a_m2 },
        BodyKind::Spacer => return None,
    };
    let outline = Outline { inner_radius_m, outer_radius_m, length_m };
    Some(Part { name: body.name.clone(), centre_m: body.at_m, source, outline, coercivity_a_per_m: None })
}

//! Where the mover runs relative to the wall: gaps, radii for the Maxwell stress, characteristic lengths.

use crate::fault::SolveFault;
use crate::problem::{Part, Problem};
use crate::sources::Source;

/// On which side of a wall face the mover lies.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum MoverSide {
    /// The mover is inside the cylinder.
    Inside,
    /// The mover is outside the cylinder.
    Outside,
}

/// A wall face across a running gap, and the radius at which the Maxwell stress is taken: the face itself, where the mover's
/// field is at its smoothest; mid-gap before a finite permeable wall, whose corners make the field at the face singular.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct StressFace {
    pub(crate) face_m: f64,
    pub(crate) radius_m: f64,
    pub(crate) mover: MoverSide,
}

/// Lengths that the grid and the forces need.
#[derive(Debug, Clone, PartialEq)]
pub(crate) struct Placement {
    /// Least radial distance between a source and the wall, m (dipole: half the bore radius).
    pub(crate) gap_m: f64,
    /// Bore radius for a mover inside, rod radius for a mover around, m.
    pub(crate) scale_m: f64,
    /// Shortest length over which the source varies at the wall: min(scale, 2 gap), m.
    pub(crate) wavelength_m: f64,
    /// Outer radius of the mover's sources, m.
    pub(crate) mover_outer_m: f64,
    /// Radii of current sheets, m, increasing.
    pub(crate) source_radii_m: Vec<f64>,
    /// Ends of sources from the reference point, m, increasing.
    pub(crate) source_ends_m: Vec<f64>,
    /// Lowest and highest source end, m.
    pub(crate) lowest_m: f64,
    /// Highest source end, m.
    pub(crate) highest_m: f64,
    /// Faces on which the Maxwell stress is taken.
    pub(crate) stress_faces: Vec<StressFace>,
}

/// Inner and outer radius and half length of a source; zeros for a dipole.
pub(crate) fn source_sizes(source: &Source) -> (f64, f64, f64) {
    match *source {
        Source::Dipole { .. } => (0.0, 0.0, 0.0),
        Source::Magnet { inner_radius_m, outer_radius_m, length_m, .. }
        | Source::Coil { inner_radius_m, outer_radius_m, length_m, .. } => {
            (inner_radius_m, outer_radius_m, 0.5 * length_m)
        }
    }
}

impl Placement {
    /// Measures `problem`.
    pub(crate) fn new(problem: &Problem) -> Self {
        let parts = &problem.mover.parts;
        let (mut radii, mut ends) = (Vec::new(), Vec::new());
        for part in parts {
            let (inner, outer, half) = source_sizes(&part.source);
            radii.extend([inner, outer].into_iter().filter(|&r| r > 0.0));
            ends.extend([part.centre_m - half, part.centre_m + half]);
        }
        radii.sort_by(f64::total_cmp);
        ends.sort_by(f64::total_cmp);
        let stress_faces = stress_faces(problem);
        let (gap_m, scale_m) = gap_and_scale(problem);
        Self {
            gap_m,
            scale_m,
            wavelength_m: scale_m.min(2.0 * gap_m),
            mover_outer_m: radii.last().copied().unwrap_or(0.0),
            lowest_m: ends.first().copied().unwrap_or(0.0),
            highest_m: ends.last().copied().unwrap_or(0.0),
            source_radii_m: radii,
            source_ends_m: ends,
            stress_faces,
        }
    }
}

/// Where the field is asked for, against the running gap: at the wall's faces, and half-way to them before the corners of a permeable
/// wall.
const ASKED_FROM: (f64, f64) = (0.95, 0.45);

impl Problem {
    /// The same problem with recoil permeabilities, one a part of the mover (1 for what is no magnet); see [`crate::problem::Mover::with_recoil`].
    ///
    /// # Errors
    /// Those of that.
    pub fn with_recoil(mut self, permeability: &[f64]) -> Result<Self, SolveFault> {
        let (gap, _) = gap_and_scale(&self);
        let share =
            if self.wall.is_permeable() && self.wall.length_m().is_some() { ASKED_FROM.1 } else { ASKED_FROM.0 };
        self.mover = self.mover.with_recoil(permeability, share * gap)?;
        Ok(self)
    }
}

/// Least gap, and the radius of the wall face across it. A dipole counts as half the bore radius away.
fn gap_and_scale(problem: &Problem) -> (f64, f64) {
    let mut best = (f64::INFINITY, problem.wall.outer_radius_m());
    for part in &problem.mover.parts {
        for layer in &problem.wall.layers {
            let (inner, outer, _) = source_sizes(&part.source);
            let candidate = if is_inside(part, layer.inner_radius_m) {
                let gap = layer.inner_radius_m - outer;
                (if outer > 0.0 { gap } else { 0.5 * gap }, layer.inner_radius_m)
            } else {
                (inner - layer.outer_radius_m, layer.outer_radius_m)
            };
            if candidate.0 < best.0 {
                best = candidate;
            }
        }
    }
    best
}

fn is_inside(part: &Part, inner_radius: f64) -> bool {
    source_sizes(&part.source).1 < inner_radius
}

/// The wall's face at every gap between a mover's source and a wall layer next to it.
fn stress_faces(problem: &Problem) -> Vec<StressFace> {
    let mut spans: Vec<(f64, f64, bool)> = Vec::new();
    spans.extend(problem.wall.layers.iter().map(|l| (l.inner_radius_m, l.outer_radius_m, true)));
    for part in &problem.mover.parts {
        let (inner, outer, _) = source_sizes(&part.source);
        spans.push((inner, outer, false));
    }
    spans.sort_by(|p, q| p.0.total_cmp(&q.0).then(p.1.total_cmp(&q.1)));
    let mut faces = Vec::new();
    // Outer radius of everything of the same kind seen so far in this run of neighbours.
    let mut reach: Option<(f64, bool)> = None;
    for (inner, outer, wall) in spans {
        reach = match reach {
            Some((edge, was_wall)) if was_wall != wall => {
                let (face_m, mover) = if wall { (inner, MoverSide::Inside) } else { (edge, MoverSide::Outside) };
                let corners = problem.wall.is_permeable() && problem.wall.length_m().is_some();
                let radius_m = if corners { 0.5 * (edge + inner) } else { face_m };
                faces.push(StressFace { face_m, radius_m, mover });
                Some((outer, wall))
            }
            Some((edge, _)) => Some((edge.max(outer), wall)),
            None => Some((outer, wall)),
        };
    }
    faces
}

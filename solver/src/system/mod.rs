//! The systems of equations of each grid level, to be solved elsewhere: K, G, C, the source, and which row is which node.
//!
//! Unknowns are psi = r A_phi of the wall's reaction at all nodes but axis and boundary, where psi = 0, Wb/rad. With psi_0 the
//! mover's own field in free space (and the static reaction of a permeable wall), taken at the wall's nodes:
//!
//! - settled fields at velocity v, in the mover's frame: (K - v C) psi = v G q, q = d psi_0/dz. Ring currents are
//!   I = v (C psi + G q), A; the drag, positive against the motion, is 2 pi q . I, N, for v > 0; heat in the wall is
//!   2 pi sum I^2 / G, W. q is exact for the mover's own field: G q stands for C psi_0 without the error of its differences.
//! - alternating fields at omega: (K + i omega G) psi = -i omega G psi_0. Ring currents are I = -i omega G (psi_0 + psi); what the wall
//!   adds to the impedance is i 2 pi omega / current^2 (psi_0 . I + static linkage), ohm.
//!
//! ```
//! use lenzbore_solver::monitor::Unwatched;
//! use lenzbore_solver::problem::{Accuracy, Extent, Layer, Mover, Outline, Part, Problem, SnapshotPlan, Travel, Wall};
//! use lenzbore_solver::sources::Source;
//! use lenzbore_solver::system::settled_systems;
//! let outline = Outline { inner_radius_m: 0.0, outer_radius_m: 0.0, length_m: 0.0 };
//! let source = Source::Dipole { moment_a_m2: 1.0 };
//! let layer = Layer { name: "tube".into(), inner_radius_m: 0.0105, outer_radius_m: 0.0125, from_m: 0.0, to_m: 0.0,
//!     conductivity_s_per_m: 58.0e6, relative_permeability: 1.0 };
//! let problem = Problem {
//!     wall: Wall { slots: 0, extent: Extent::Endless, layers: vec![layer] },
//!     mover: Mover { parts: vec![Part { name: "D".into(), centre_m: 0.0, source, outline, coercivity_a_per_m: None }], mass_kg: None, recoil: None },
//!     travel: Travel::Steady { velocity_m_per_s: 1.0 },
//!     accuracy: Accuracy::default(),
//!     snapshots: SnapshotPlan::None, warming: None, stations: Vec::new(),
//! };
//! let systems = settled_systems(&problem, 1.0, 1, &Unwatched)?;
//! let level = &systems[0];
//! // Zero-speed damping coefficient of this level, 2 pi q . G q; the exact value is 0.4721 N s/m.
//! let q_g_q: f64 = level.slope.iter().zip(&level.conductance).map(|(q, g)| g * q * q).sum();
//! assert!((2.0 * std::f64::consts::PI * q_g_q / 0.4721 - 1.0).abs() < 5e-3);
//! # Ok::<(), lenzbore_solver::fault::SolveFault>(())
//! ```

mod build;
mod sparse;
#[cfg(test)]
mod tests;

use lenzbore_mesh::Refinement;

use crate::fault::SolveFault;
use crate::grid_rules::GridPlan;
use crate::monitor::Monitor;
use crate::placement::Placement;
use crate::problem::{Alternating, Extent, Problem};
pub use sparse::SparseMatrix;

/// One row of the system: a node, and where it lies.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SystemRow {
    /// Index of its radius among the node radii.
    pub i: usize,
    /// Index of its height among the node heights.
    pub j: usize,
    /// Number of its region, a place in `region_names`: 0 for free space; a node on a face belongs to the wall's layer, between two
    /// layers to the first in the order of the case.
    pub region: usize,
    /// Whether a neighbour lies on axis, outer, lower or upper boundary, where psi = 0.
    pub beside: [bool; 4],
}

/// The system of one grid level.
#[derive(Debug, Clone, PartialEq)]
pub struct LevelSystem {
    /// Refinement factor f relative to the coarsest level.
    pub refinement: f64,
    /// Node radii, m, from the axis to the boundary.
    pub r_m: Vec<f64>,
    /// Node heights, m.
    pub z_m: Vec<f64>,
    /// Names of the regions; the first is free space.
    pub region_names: Vec<String>,
    /// The rows in order.
    pub rows: Vec<SystemRow>,
    /// K, A rad/Wb: symmetric, positive definite.
    pub stiffness: SparseMatrix,
    /// G, the diagonal: conductance of each row's ring, S; 0 off the wall.
    pub conductance: Vec<f64>,
    /// C = G d/dz by central differences, S/m, skew-symmetric; for settled fields.
    pub convection: Option<SparseMatrix>,
    /// psi_0 at the wall's nodes, Wb/rad; 0 elsewhere.
    pub source: Vec<f64>,
    /// q = d psi_0/dz at the wall's nodes, Wb/(rad m); 0 elsewhere.
    pub slope: Vec<f64>,
    /// Static reaction of a permeable wall, Wb/rad, at every row: what is to be added to the solution for the whole reaction; 0 where the
    /// wall is not permeable.
    pub static_reaction: Vec<f64>,
    /// What it adds to 1/(2 pi) of ampere-turns times linkage, A Wb/rad.
    pub static_linkage: f64,
}

/// Systems of settled fields on the first `count` levels of the grids made for `velocity_m_per_s`: that of the travel or, for a
/// curve, its highest speed.
///
/// # Errors
/// A wall with ends, a grid that cannot be built, or what a solve for the static reaction says.
pub fn settled_systems(
    problem: &Problem,
    velocity_m_per_s: f64,
    count: usize,
    monitor: &dyn Monitor,
) -> Result<Vec<LevelSystem>, SolveFault> {
    if problem.wall.extent != Extent::Endless {
        return Err(SolveFault::Unsuited("settled fields need an endless wall"));
    }
    let plan = crate::settled::plan(problem, &Placement::new(problem), velocity_m_per_s)?;
    levels(problem, &plan, true, count, monitor)
}

/// Systems of coils at rest on the first `count` levels.
///
/// # Errors
/// As [`settled_systems`].
pub fn alternating_systems(
    problem: &Problem,
    law: &Alternating,
    count: usize,
    monitor: &dyn Monitor,
) -> Result<Vec<LevelSystem>, SolveFault> {
    let (plan, _) = crate::harmonic::plan(problem, law)?;
    levels(&crate::harmonic::in_the_walls_frame(problem, law), &plan, false, count, monitor)
}

fn levels(
    problem: &Problem,
    plan: &GridPlan,
    moving: bool,
    count: usize,
    monitor: &dyn Monitor,
) -> Result<Vec<LevelSystem>, SolveFault> {
    let one = |refinement: Refinement| {
        if monitor.cancelled() { Err(SolveFault::Interrupted) } else { build::level(problem, plan, refinement, moving) }
    };
    Refinement::first(count).into_iter().map(one).collect()
}

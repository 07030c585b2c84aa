//! The wall as independent resistive rings: what quick calculators do.
//!
//! Each ring of resistance R sees the voltage v df/dz and carries it away as heat (v df/dz)^2 / R; no ring feels another's current
//! nor its own field. The drag at a speed is c v with c = sum of (df/dz)^2 / R, taken here in the limit of many rings.
//!
//! Published forms of it: Y. Levin, F. L. da Silveira, F. B. Rizzato, American Journal of Physics 74, 815-817 (2006) (dipole, thin
//! rings); G. Donoso, C. L. Ladera, P. Martin, European Journal of Physics 30, 855-869 (2009) (thickness of the wall integrated);
//! N. Derby, S. Olbert, American Journal of Physics 78, 229-235 (2010) (field of a cylinder instead of a dipole's). Citations from
//! memory. Range: mu0 sigma w v << 1 and slow against the decay of the wall's currents.

use super::assumptions::{Assumptions, EndModel, MagnetModel};
use super::drive::{Drive, simplified};
use super::rows::{Row, faces, rows, runs_inside};
use crate::fault::SolveFault;
use crate::problem::{Problem, Wall};

/// A model of independent rings for one wall and mover, ready for any speed and place.
///
/// ```
/// use lenzbore_solver::ladder::{Assumptions, RingSum};
/// # use lenzbore_solver::problem::*;
/// # use lenzbore_solver::sources::Source;
/// # let layer = Layer { name: "tube".into(), inner_radius_m: 7.5e-3, outer_radius_m: 9.5e-3, from_m: 0.0, to_m: 0.0,
/// #     conductivity_s_per_m: 5.8e7, relative_permeability: 1.0 };
/// # let source = Source::Magnet { inner_radius_m: 0.0, outer_radius_m: 5e-3, length_m: 10e-3, remanence_tesla: 1.2 };
/// # let outline = Outline { inner_radius_m: 0.0, outer_radius_m: 5e-3, length_m: 10e-3 };
/// # let part = Part { name: "M".into(), centre_m: 0.0, source, outline, coercivity_a_per_m: None };
/// # let problem = Problem {
/// #     wall: Wall { slots: 0, extent: Extent::Endless, layers: vec![layer] },
/// #     mover: Mover { parts: vec![part], mass_kg: None, recoil: None },
/// #     travel: Travel::Steady { velocity_m_per_s: 1.0 },
/// #     accuracy: Accuracy::default(), snapshots: SnapshotPlan::None, stations: Vec::new(),
/// #     warming: None,
/// # };
/// // A magnet of 10 x 10 mm, 1.2 T, in a copper tube of 15 to 19 mm: 0.755653 N s/m (computed independently).
/// let model = RingSum::new(&problem, Assumptions::RESISTIVE)?;
/// assert!((model.damping_coefficient() / 0.755653 - 1.0).abs() < 2e-6);
/// # Ok::<(), lenzbore_solver::fault::SolveFault>(())
/// ```
#[derive(Debug, Clone)]
pub struct RingSum {
    assumptions: Assumptions,
    rows: Vec<(Row, Drive)>,
    faces: Vec<(Row, Drive)>,
}

impl RingSum {
    /// Tabulates the model for the wall and mover of `problem`.
    ///
    /// Layers are taken as if their permeability were 1. Accuracy of the model's own figures: 1e-6 relative.
    /// Cost: some 10 ms a layer.
    ///
    /// # Errors
    /// [`SolveFault::Unsuited`] where dipoles are asked for a mover that runs around (part of) the wall.
    pub fn new(problem: &Problem, assumptions: Assumptions) -> Result<Self, SolveFault> {
        let (wall, mover) = (&problem.wall, &problem.mover);
        if assumptions.magnet != MagnetModel::Finite && !takes_dipoles(problem) {
            return Err(SolveFault::Unsuited("a mover around the wall is no point dipole"));
        }
        let simple = simplified(mover, assumptions.magnet);
        let drive = |row: Row| (row, Drive::new(&simple, assumptions.magnet, row.radius));
        Ok(Self {
            assumptions,
            rows: rows(wall, mover, assumptions.wall).into_iter().map(drive).collect(),
            faces: faces(wall, mover).into_iter().map(drive).collect(),
        })
    }

    /// What it takes for granted.
    #[must_use]
    pub fn assumptions(&self) -> Assumptions {
        self.assumptions
    }

    /// Damping coefficient in an endless wall, N s/m.
    #[must_use]
    pub fn damping_coefficient(&self) -> f64 {
        self.rows.iter().map(|(row, drive)| conductance(row) * drive.total()).sum()
    }

    /// Drag at `speed` (m/s) in an endless wall, N.
    #[must_use]
    pub fn drag(&self, speed_m_per_s: f64) -> f64 {
        self.damping_coefficient() * speed_m_per_s
    }

    /// Damping coefficient with the mover's reference point at `z`, N s/m.
    #[must_use]
    pub fn damping_at(&self, z_m: f64) -> f64 {
        let share = |(row, drive): &(Row, Drive)| match self.assumptions.ends {
            EndModel::Switched if z_m < row.from || z_m > row.to => 0.0,
            EndModel::Switched => conductance(row) * drive.total(),
            EndModel::Gradual => conductance(row) * (drive.integral(row.to - z_m) - drive.integral(row.from - z_m)),
        };
        self.rows.iter().map(share).sum()
    }

    /// Greatest current density in the wall per speed with the mover at `z`, A s/m3: sigma |B_r| at the faces towards the mover.
    #[must_use]
    pub fn current_density_at(&self, z_m: f64) -> f64 {
        let peak = |(row, drive): &(Row, Drive)| {
            let slope = match self.assumptions.ends {
                EndModel::Switched if z_m < row.from || z_m > row.to => 0.0,
                EndModel::Switched => drive.greatest_slope(f64::NEG_INFINITY, f64::INFINITY),
                EndModel::Gradual => drive.greatest_slope(row.from - z_m, row.to - z_m),
            };
            row.sigma * slope / (2.0 * std::f64::consts::PI * row.radius)
        };
        self.faces.iter().map(peak).fold(0.0, f64::max)
    }

    /// Positions between which the damping varies, m: each end of each layer, for the steps of a motion.
    pub(super) fn ends(&self) -> Vec<f64> {
        self.rows.iter().flat_map(|(row, _)| [row.from, row.to]).filter(|z| z.is_finite()).collect()
    }
}

/// Conductance of a ring per length, S/m.
fn conductance(row: &Row) -> f64 {
    row.sheet / (2.0 * std::f64::consts::PI * row.radius)
}

/// Whether point dipoles can stand for the mover: it runs inside every layer.
#[must_use]
pub fn takes_dipoles(problem: &Problem) -> bool {
    let Wall { layers, .. } = &problem.wall;
    layers.iter().all(|layer| runs_inside(layer, &problem.mover))
}

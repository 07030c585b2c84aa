//! The mover's parts as coaxial currents in free space.

use lenzbore_solver::constants::MU0;
use lenzbore_solver::problem::{Mover, Part};
use lenzbore_solver::sources::{Filament, Source};

use crate::Error;

/// What a part is made of, as currents.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Shape {
    /// Any source of the solver.
    Source(Source),
    /// Filament loop.
    Loop {
        /// Radius, m.
        radius_m: f64,
        /// Current, A, positive for a moment along +z.
        current_a: f64,
    },
}

/// One part: its currents and the height of its centre over the mover's reference point.
#[derive(Debug, Clone, PartialEq)]
pub struct Emitter {
    /// The user's name of it.
    pub name: String,
    /// Centre over the reference point, m.
    pub centre_m: f64,
    /// Its currents.
    pub shape: Shape,
}

impl Emitter {
    /// All parts of a mover, and a filament for each that stands for its recoil permeability.
    #[must_use]
    pub fn all_of(mover: &Mover) -> Vec<Self> {
        let part = |p: &Part| Self { name: p.name.clone(), centre_m: p.centre_m, shape: Shape::Source(p.source) };
        let filament = |f: Filament| Self {
            name: "recoil permeability".to_owned(),
            centre_m: f.height_m,
            shape: Shape::Loop { radius_m: f.radius_m, current_a: f.tesla_metre / MU0 },
        };
        let recoil = mover.recoil.iter().flat_map(|recoil| recoil.filaments());
        mover.parts.iter().map(part).chain(recoil.map(filament)).collect()
    }

    /// Smallest and largest radius at which it carries current, m.
    pub(super) fn radii(&self) -> (f64, f64) {
        match self.shape {
            Shape::Loop { radius_m, .. } => (radius_m, radius_m),
            Shape::Source(Source::Dipole { .. }) => (0.0, 0.0),
            Shape::Source(Source::Magnet { inner_radius_m, outer_radius_m, .. }) => {
                (if inner_radius_m > 0.0 { inner_radius_m } else { outer_radius_m }, outer_radius_m)
            }
            Shape::Source(Source::Coil { inner_radius_m, outer_radius_m, .. }) => (inner_radius_m, outer_radius_m),
        }
    }

    /// Whether its currents flow at radius r: on a sheet, or within a coil's section.
    pub(super) fn carries_current_at(&self, r: f64) -> bool {
        let (inner, outer) = self.radii();
        match self.shape {
            Shape::Source(Source::Coil { .. }) => r >= inner && r <= outer,
            Shape::Source(Source::Dipole { .. }) => false,
            _ => (r - inner).abs() < 1e-12 * inner || (r - outer).abs() < 1e-12 * outer,
        }
    }

    /// Half its length, m.
    pub(super) fn half_length(&self) -> f64 {
        match self.shape {
            Shape::Loop { .. } | Shape::Source(Source::Dipole { .. }) => 0.0,
            Shape::Source(Source::Magnet { length_m, .. } | Source::Coil { length_m, .. }) => 0.5 * length_m,
        }
    }

    /// Refuses sizes that are no sizes.
    pub(super) fn check(&self) -> Result<(), Error> {
        let fault = |what, found, legal| Err(Error::OutOfRange { what, found, legal });
        if !self.centre_m.is_finite() {
            return fault("centre of a part, m", self.centre_m, "finite");
        }
        match self.shape {
            Shape::Source(Source::Dipole { moment_a_m2 }) if !moment_a_m2.is_finite() => {
                fault("moment of a dipole, A m2", moment_a_m2, "finite")
            }
            Shape::Source(Source::Dipole { .. }) => Ok(()),
            Shape::Loop { radius_m, .. } if !(radius_m > 0.0 && radius_m.is_finite()) => {
                fault("radius of a loop, m", radius_m, "greater than 0")
            }
            Shape::Loop { .. } => Ok(()),
            Shape::Source(
                Source::Magnet { inner_radius_m, outer_radius_m, length_m, .. }
                | Source::Coil { inner_radius_m, outer_radius_m, length_m, .. },
            ) => {
                if !(inner_radius_m >= 0.0 && outer_radius_m > inner_radius_m && outer_radius_m.is_finite()) {
                    return fault("outer radius of a part, m", outer_radius_m, "greater than the inner radius");
                }
                if !(length_m > 0.0 && length_m.is_finite()) {
                    return fault("length of a part, m", length_m, "greater than 0");
                }
                Ok(())
            }
        }
    }
}

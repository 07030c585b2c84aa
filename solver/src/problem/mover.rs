//! Everything that travels: parts with their own closed-form fields.

use std::sync::Arc;

use crate::sources::{Recoil, Source};

/// Outline of a part's body over any coating, for clearance and overlap; `None` radii for a point dipole.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Outline {
    /// Inner radius over the coating, m.
    pub inner_radius_m: f64,
    /// Outer radius over the coating, m.
    pub outer_radius_m: f64,
    /// Axial length over the coating, m.
    pub length_m: f64,
}

/// One magnetic part of the mover.
#[derive(Debug, Clone, PartialEq)]
pub struct Part {
    /// The user's name of it.
    pub name: String,
    /// Its centre from the mover's reference point, m, upward positive.
    pub centre_m: f64,
    /// Its field.
    pub source: Source,
    /// Its body (zero sizes for a dipole).
    pub outline: Outline,
    /// Intrinsic coercivity HcJ at the mover's temperature, A/m, of a magnet that is to be watched; `None` where it is not known.
    pub coercivity_a_per_m: Option<f64>,
}

/// The mover: parts fixed to one another, and their common mass.
#[derive(Debug, Clone, PartialEq)]
pub struct Mover {
    /// Magnetic parts, bottom to top.
    pub parts: Vec<Part>,
    /// Mass of everything that travels, kg; needed by `Travel::Free`.
    pub mass_kg: Option<f64>,
    /// What recoil permeability changes; `None` where it is 1 throughout. See [`Mover::with_recoil`].
    pub recoil: Option<Arc<Recoil>>,
}

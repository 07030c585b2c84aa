//! The movers' own fields in free space, by closed forms.
//!
//! Every source is coaxial with the z axis and centred at z = 0 of its own frame. Cylindrical coordinates (r, z), r >= 0.

mod coil;
mod current_loop;
mod dipole;
pub mod elliptic;
pub(crate) mod gauss;
mod magnet;
#[cfg(test)]
mod quadrature;
mod recoil;
mod sheet;
mod spacing;
mod stack;
mod superpose;
mod table;

pub use coil::Coil;
pub use dipole::Dipole;
pub use magnet::Magnet;
pub use recoil::{Filament, Recoil};
pub use sheet::CylinderSheet;
pub use stack::{North, Stack, StackItem, coated_magnet};
pub use table::SourceTable;

/// An axisymmetric field in free space.
pub trait AxialField {
    /// psi = r A_phi, Wb/rad: 2 pi psi is the flux through the disc of radius `r` at height `z`.
    fn psi(&self, r: f64, z: f64) -> f64;
    /// Radial flux density, T.
    fn flux_density_r(&self, r: f64, z: f64) -> f64;
    /// Axial flux density, T.
    fn flux_density_z(&self, r: f64, z: f64) -> f64;
}

/// The kinds of source.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Source {
    /// Ideal axial point dipole.
    Dipole {
        /// Moment along +z, A m2, signed.
        moment_a_m2: f64,
    },
    /// Cylinder or ring, uniformly magnetised along the axis; a recoil permeability other than 1 is the mover's.
    Magnet {
        /// Inner radius, m; 0 for a cylinder.
        inner_radius_m: f64,
        /// Outer radius, m.
        outer_radius_m: f64,
        /// Length, m.
        length_m: f64,
        /// Remanence along +z, T, signed (north up positive); magnetisation = remanence / mu0.
        remanence_tesla: f64,
    },
    /// Direct-current coil of rectangular section with uniform current density.
    Coil {
        /// Inner radius, m.
        inner_radius_m: f64,
        /// Outer radius, m.
        outer_radius_m: f64,
        /// Length, m.
        length_m: f64,
        /// Turns times current, A, positive for a moment along +z.
        ampere_turns: f64,
    },
}

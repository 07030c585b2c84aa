//! Recoil permeability of magnets: what it changes in the mover's own field, by a boundary integral over the magnets' surfaces.
//!
//! A magnet of B = mu0 mu_rec H + Br carries bound currents on its faces alone (curl M = 0 inside). They are those of recoil
//! permeability 1 (Br/mu0 on its cylinders, in closed form) and a change c, which the field of all parts drives: `faces.rs` has the
//! conditions, `solve.rs` the equations, solved once a mover. Far from the faces c is a sum over filaments (`filaments.rs`), close to
//! them, and inside the magnets, an integral over its panels. B follows everywhere, inside the material too.
//!
//! The media are linear, and the field is the mover's own: what the wall's currents do to the permeability is not in it.
//! The equation is the usual one of the second kind for equivalent surface currents (derived here from the continuity of the
//! tangential H; compare J. D. Jackson, Classical Electrodynamics, 3rd ed. 1999, sections 5.8 to 5.10; from memory).

mod faces;
mod filaments;
mod panels;
mod solve;
#[cfg(test)]
mod tests;

use std::sync::Arc;

use super::AxialField;
use super::current_loop::{Jet, LoopGeometry};
use super::superpose::Parts;
use crate::fault::SolveFault;
use crate::problem::{Mover, Part, Quantity};
use faces::{Face, faces};
pub use filaments::Filament;
use filaments::{Tier, tiers};
use panels::{Basis, Density, near_points};
use solve::{Fineness, solve};

/// Recoil permeabilities of a mover's parts, solved.
///
/// Made by [`Mover::with_recoil`]. Accuracy 1e-8 of the mover's field outside the magnets, 1e-6 within a thousandth of their size of
/// an edge.
#[derive(Debug, Clone, PartialEq)]
pub struct Recoil {
    parts: Vec<Part>,
    permeability: Vec<f64>,
    clearance_m: f64,
    basis: Basis,
    charged: Vec<Charged>,
}

/// A face with its currents.
#[derive(Debug, Clone, PartialEq)]
struct Charged {
    face: Face,
    density: Density,
    tiers: Vec<Tier>,
}

impl Recoil {
    /// Solves for `parts` with `permeability`, one a part.
    ///
    /// # Errors
    /// A permeability out of range, or none for a part; a solution that is not finite.
    fn new(parts: &[Part], permeability: &[f64], clearance_m: f64, fineness: Fineness) -> Result<Self, SolveFault> {
        if parts.len() != permeability.len() {
            return Err(SolveFault::Unsuited(
                "each part of the mover needs its recoil permeability (1 for what is no magnet)",
            ));
        }
        let range = Quantity::RecoilPermeability.sensible();
        if let Some(&found) = permeability.iter().find(|m| !range.holds(**m)) {
            return Err(SolveFault::OutOfRange { what: "recoil permeability", found, legal: "1 to 20" });
        }
        if !(clearance_m.is_finite() && clearance_m > 0.0) {
            return Err(SolveFault::OutOfRange { what: "clearance", found: clearance_m, legal: "greater than 0" });
        }
        let basis = Basis::new(fineness.nodes);
        let faces = faces(parts, permeability);
        let densities = solve(&faces, &Parts(parts), &basis, fineness.size)?;
        let share = faces.iter().fold(0.0, |m: f64, f| m.max(f.factor.abs()));
        let charge = |(face, density): (Face, Density)| Charged {
            tiers: tiers(&face, &density, &basis, clearance_m, share),
            face,
            density,
        };
        let charged = faces.into_iter().zip(densities).map(charge).collect();
        Ok(Self { parts: parts.to_vec(), permeability: permeability.to_vec(), clearance_m, basis, charged })
    }

    /// Recoil permeability of each part.
    #[must_use]
    pub fn permeability(&self) -> &[f64] {
        &self.permeability
    }

    /// Whether it was solved for these parts.
    #[must_use]
    pub fn belongs_to(&self, parts: &[Part]) -> bool {
        self.parts == parts
    }

    /// Filaments that stand for the change of the bound currents at the clearance and further off.
    pub fn filaments(&self) -> impl Iterator<Item = Filament> + '_ {
        self.charged.iter().filter_map(|c| c.tiers.first()).flat_map(|t| t.filaments.iter().copied())
    }

    /// Adds up `field(loop, mu0 I)` over what stands for the currents as seen from (r, z).
    fn over_loops(&self, r: f64, z: f64, mut field: impl FnMut(&LoopGeometry, f64)) {
        for Charged { face, density, tiers } in &self.charged {
            let distance = face.distance((r, z), (face.from, face.to));
            if let Some(tier) = tiers.iter().rev().find(|t| t.clearance <= distance) {
                for f in &tier.filaments {
                    field(&LoopGeometry::new(f.radius_m, r, z - f.height_m), f.tesla_metre);
                }
                continue;
            }
            for (k, panel) in density.panels.iter().enumerate() {
                let values = density.of_panel(k, &self.basis);
                let mut at = |u: f64, tesla_metre: f64| {
                    let (a, height) = face.at(panel.place(u).0);
                    field(&LoopGeometry::new(a, r, z - height), tesla_metre);
                };
                let near = near_points(face, panel, (r, z), &mut |u, weight| {
                    at(u, weight * self.basis.value(values, u));
                });
                if !near {
                    self.basis.nodes.iter().zip(values).for_each(|(&(u, weight), value)| at(u, weight * value));
                }
            }
        }
    }

    /// psi and its first two derivatives along z.
    pub(crate) fn jet(&self, r: f64, z: f64) -> Jet {
        let mut sum = Jet::default();
        self.over_loops(r, z, |geometry, current| sum = sum.plus(current, geometry.jet()));
        sum
    }
}

impl AxialField for Recoil {
    fn psi(&self, r: f64, z: f64) -> f64 {
        let mut sum = 0.0;
        self.over_loops(r, z, |geometry, current| sum += current * geometry.psi_over_r2());
        r * r * sum
    }

    fn flux_density_r(&self, r: f64, z: f64) -> f64 {
        let mut sum = 0.0;
        self.over_loops(r, z, |geometry, current| sum += current * geometry.slope_over_r2());
        -r * sum
    }

    fn flux_density_z(&self, r: f64, z: f64) -> f64 {
        let mut sum = 0.0;
        self.over_loops(r, z, |geometry, current| sum += current * geometry.flux_density_z());
        sum
    }
}

/// A recoil permeability so close to 1 is 1.
const NEXT_TO_NOTHING: f64 = 1.0e-12;

impl Mover {
    /// The same mover with recoil permeabilities, one a part (1 for what is no magnet).
    ///
    /// `clearance_m` (> 0, m) is where the field will mostly be asked for: from that distance of the magnets on it costs some hundred
    /// filaments a magnet, closer to them several times as much. Solved once, 10 to 400 ms for one to four magnets.
    ///
    /// ```
    /// use lenzbore_solver::problem::{Mover, Outline, Part};
    /// use lenzbore_solver::sources::{AxialField, Source};
    /// let source = Source::Magnet { inner_radius_m: 0.0, outer_radius_m: 0.011, length_m: 0.012, remanence_tesla: 1.3 };
    /// let outline = Outline { inner_radius_m: 0.0, outer_radius_m: 0.011, length_m: 0.012 };
    /// let part = Part { name: "M".into(), centre_m: 0.0, source, outline, coercivity_a_per_m: None };
    /// let mover = Mover { parts: vec![part], mass_kg: None, recoil: None };
    /// let real = mover.clone().with_recoil(&[1.05], 1e-3)?;
    /// let weaker = real.flux_density_r(0.0125, 0.006) / mover.flux_density_r(0.0125, 0.006);
    /// assert!(weaker > 0.97 && weaker < 0.99);
    /// # Ok::<(), lenzbore_solver::fault::SolveFault>(())
    /// ```
    ///
    /// # Errors
    /// A permeability outside 1 to 20, not one a part, or a solution that is not finite.
    pub fn with_recoil(mut self, permeability: &[f64], clearance_m: f64) -> Result<Self, SolveFault> {
        self.recoil = None;
        let trivial =
            permeability.len() == self.parts.len() && permeability.iter().all(|m| (m - 1.0).abs() <= NEXT_TO_NOTHING);
        if !trivial {
            self.recoil = Some(Arc::new(Recoil::new(&self.parts, permeability, clearance_m, Fineness::USUAL)?));
        }
        Ok(self)
    }

    /// The same mover with recoil permeability 1 throughout.
    #[must_use]
    pub fn without_recoil(&self) -> Self {
        Self { recoil: None, ..self.clone() }
    }

    /// Solves the recoil permeabilities again for parts that have changed; their number must not have.
    ///
    /// # Errors
    /// As [`Mover::with_recoil`].
    pub fn renew_recoil(&mut self) -> Result<(), SolveFault> {
        if let Some(old) = self.recoil.as_ref().filter(|old| !old.belongs_to(&self.parts)) {
            let solved = Recoil::new(&self.parts, &old.permeability, old.clearance_m, Fineness::USUAL)?;
            self.recoil = Some(Arc::new(solved));
        }
        Ok(())
    }
}

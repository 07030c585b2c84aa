//! Superposition: the field of a `Source` by its kind, and of a whole mover as the sum over its parts.

use super::current_loop::Jet;
use super::{AxialField, Coil, Dipole, Magnet, Source};
use crate::problem::{Mover, Part};

/// One of the closed forms.
#[derive(Debug, Clone, Copy)]
enum Form {
    Dipole(Dipole),
    Magnet(Magnet),
    Coil(Coil),
}

impl Form {
    fn of(source: &Source) -> Self {
        match *source {
            Source::Dipole { moment_a_m2 } => Self::Dipole(Dipole { moment_a_m2 }),
            Source::Magnet { inner_radius_m, outer_radius_m, length_m, remanence_tesla } => {
                Self::Magnet(Magnet { inner_radius_m, outer_radius_m, half_length_m: 0.5 * length_m, remanence_tesla })
            }
            Source::Coil { inner_radius_m, outer_radius_m, length_m, ampere_turns } => {
                Self::Coil(Coil { inner_radius_m, outer_radius_m, half_length_m: 0.5 * length_m, ampere_turns })
            }
        }
    }

    fn field(&self) -> &dyn AxialField {
        match self {
            Self::Dipole(form) => form,
            Self::Magnet(form) => form,
            Self::Coil(form) => form,
        }
    }
}

impl Source {
    /// psi and its first two derivatives along z.
    pub(crate) fn jet(&self, r: f64, z: f64) -> Jet {
        match Form::of(self) {
            Form::Dipole(form) => form.jet(r, z),
            Form::Magnet(form) => form.jet(r, z),
            Form::Coil(form) => form.jet(r, z),
        }
    }

    /// The same body with remanence, moment or ampere-turns reversed.
    #[must_use]
    pub fn reversed(self) -> Self {
        match self {
            Self::Dipole { moment_a_m2 } => Self::Dipole { moment_a_m2: -moment_a_m2 },
            Self::Magnet { inner_radius_m, outer_radius_m, length_m, remanence_tesla } => {
                Self::Magnet { inner_radius_m, outer_radius_m, length_m, remanence_tesla: -remanence_tesla }
            }
            Self::Coil { inner_radius_m, outer_radius_m, length_m, ampere_turns } => {
                Self::Coil { inner_radius_m, outer_radius_m, length_m, ampere_turns: -ampere_turns }
            }
        }
    }
}

impl AxialField for Source {
    fn psi(&self, r: f64, z: f64) -> f64 {
        Form::of(self).field().psi(r, z)
    }

    fn flux_density_r(&self, r: f64, z: f64) -> f64 {
        Form::of(self).field().flux_density_r(r, z)
    }

    fn flux_density_z(&self, r: f64, z: f64) -> f64 {
        Form::of(self).field().flux_density_z(r, z)
    }
}

/// Parts that add up, all with recoil permeability 1.
pub(super) struct Parts<'p>(pub(super) &'p [Part]);

impl AxialField for Parts<'_> {
    fn psi(&self, r: f64, z: f64) -> f64 {
        self.0.iter().map(|part| part.source.psi(r, z - part.centre_m)).sum()
    }

    fn flux_density_r(&self, r: f64, z: f64) -> f64 {
        self.0.iter().map(|part| part.source.flux_density_r(r, z - part.centre_m)).sum()
    }

    fn flux_density_z(&self, r: f64, z: f64) -> f64 {
        self.0.iter().map(|part| part.source.flux_density_z(r, z - part.centre_m)).sum()
    }
}

impl Mover {
    /// psi and its first two derivatives along z, z from the reference point.
    pub(crate) fn jet(&self, r: f64, z: f64) -> Jet {
        let parts =
            self.parts.iter().fold(Jet::default(), |sum, part| sum.plus(1.0, part.source.jet(r, z - part.centre_m)));
        self.recoil.as_ref().map_or(parts, |recoil| parts.plus(1.0, recoil.jet(r, z)))
    }

    fn sum(&self, r: f64, z: f64, field: impl Fn(&dyn AxialField, f64, f64) -> f64) -> f64 {
        let parts = field(&Parts(&self.parts), r, z);
        self.recoil.as_ref().map_or(parts, |recoil| parts + field(&**recoil, r, z))
    }
}

/// The sum over all parts at their centres, and what recoil permeability changes; z is measured from the mover's reference point.
impl AxialField for Mover {
    fn psi(&self, r: f64, z: f64) -> f64 {
        self.sum(r, z, |f, r, z| f.psi(r, z))
    }

    fn flux_density_r(&self, r: f64, z: f64) -> f64 {
        self.sum(r, z, |f, r, z| f.flux_density_r(r, z))
    }

    fn flux_density_z(&self, r: f64, z: f64) -> f64 {
        self.sum(r, z, |f, r, z| f.flux_density_z(r, z))
    }
}

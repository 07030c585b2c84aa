//! How fast a mover's psi bends along z at a given radius: bounds on its sixth derivative, which set a table's spacing.
//!
//! psi(z) at fixed r is analytic but for branch points at z = z_end +- i |r - a| (each edge of a part) or poles of order
//! three at z = z_0 +- i r (a dipole). With d the distance of a real z from them:
//! - a sheet's edge: psi' ~ (mu0 K sqrt(a r)/2 pi) ln(1/d), so |psi^(6)| <~ (mu0 K sqrt(a r)/2 pi) 4!/d^5 and, further
//!   off than the loop's size, at most the dipole's (mu0 K a^2 r^2/4) (7!/2)/d^8;
//! - a coil's corner: the same, spread over its width w: times d/(4 w) where that is below 1;
//! - a dipole: |psi^(6)| <= (mu0 m r^2/4 pi) (8!/2)/d^9 (derivatives of (r^2 + z^2)^(-3/2) are Gegenbauer polynomials).
//!
//! The first two are leading terms, not strict bounds: the table measures its error and refines where they fall short.

use super::{AxialField, Source};
use crate::constants::MU0;
use crate::problem::{Mover, Part};
use std::f64::consts::PI;

/// A place near the real z axis where psi at one radius is not smooth.
#[derive(Debug, Clone, Copy)]
struct Rough {
    /// Height from the mover's reference point, m.
    z: f64,
    /// Distance across, m; 0 where the row runs through it.
    across: f64,
    kind: Kind,
}

#[derive(Debug, Clone, Copy)]
enum Kind {
    /// An edge: strength mu0 K sqrt(a r) 4!/(2 pi), size sqrt(a r), width of a coil's section (0 for a sheet).
    Edge { strength: f64, size: f64, width: f64 },
    /// A dipole: strength (mu0 m r^2/4 pi) 8!/2.
    Pole { strength: f64 },
}

/// All rough places of a mover seen along one radius.
#[derive(Debug, Clone)]
pub(crate) struct Roughness {
    places: Vec<Rough>,
}

impl Roughness {
    pub(crate) fn new(mover: &Mover, r: f64) -> Self {
        let mut places = Vec::new();
        for part in &mover.parts {
            add_part(part, r, &mut places);
        }
        Self { places }
    }

    /// About the largest |psi^(6)|, Wb/(rad m6), on `centre` +- `half`; infinite where the row runs through an edge.
    pub(crate) fn sixth_derivative(&self, centre: f64, half: f64) -> f64 {
        self.places
            .iter()
            .map(|place| {
                let along = ((centre - place.z).abs() - half).max(0.0);
                place.kind.sixth_derivative((along * along + place.across * place.across).sqrt())
            })
            .sum()
    }
}

impl Kind {
    fn sixth_derivative(&self, d: f64) -> f64 {
        if d <= 0.0 {
            return f64::INFINITY;
        }
        match *self {
            Self::Edge { strength, size, width } => {
                let ratio = size / d;
                let far = (165.0 * ratio * ratio * ratio).min(1.0);
                let spread = if width > 0.0 { (0.25 * d / width).min(1.0) } else { 1.0 };
                strength * far * spread / d.powi(5)
            }
            Self::Pole { strength } => strength / d.powi(9),
        }
    }
}

fn add_part(part: &Part, r: f64, places: &mut Vec<Rough>) {
    let mut ends = |half_length: f64, across: f64, kind: Kind| {
        places.push(Rough { z: part.centre_m - half_length, across, kind });
        places.push(Rough { z: part.centre_m + half_length, across, kind });
    };
    match part.source {
        Source::Dipole { moment_a_m2 } => {
            let strength = MU0 * moment_a_m2.abs() * r * r / (4.0 * PI) * 20_160.0;
            places.push(Rough { z: part.centre_m, across: r, kind: Kind::Pole { strength } });
        }
        Source::Magnet { inner_radius_m, outer_radius_m, length_m, remanence_tesla } => {
            for a in [inner_radius_m, outer_radius_m].into_iter().filter(|&a| a > 0.0) {
                ends(0.5 * length_m, (r - a).abs(), edge(remanence_tesla, a, r, 0.0));
            }
        }
        Source::Coil { inner_radius_m, outer_radius_m, length_m, ampere_turns } => {
            let width = outer_radius_m - inner_radius_m;
            let across = (inner_radius_m - r).max(r - outer_radius_m).max(0.0);
            ends(0.5 * length_m, across, edge(MU0 * ampere_turns / length_m, outer_radius_m, r, width));
        }
    }
}

fn edge(tesla: f64, a: f64, r: f64, width: f64) -> Kind {
    let size = (a * r).sqrt();
    Kind::Edge { strength: tesla.abs() * size * 24.0 / (2.0 * PI), size, width }
}

/// About the largest |psi| along the radius: the largest of samples at all parts' ends, centres and quarters.
pub(crate) fn largest_psi(mover: &Mover, r: f64) -> f64 {
    let mut largest = 0.0_f64;
    for part in &mover.parts {
        let length = match part.source {
            Source::Dipole { .. } => r,
            Source::Magnet { length_m, .. } | Source::Coil { length_m, .. } => length_m,
        };
        for share in [-0.5, -0.25, 0.0, 0.25, 0.5] {
            largest = largest.max(mover.psi(r, part.centre_m + share * length).abs());
        }
    }
    largest
}

//! Where magnets are watched: points across each of them, and the field of the mover's own parts there.

use crate::constants::MU0;
use crate::problem::{Mover, Part};
use crate::sources::{AxialField, Source};

/// Points across and along a magnet.
const ACROSS: u32 = 9;
const ALONG: u32 = 15;
/// How far within its faces, as a share of its radial or axial size: on an edge the field of a uniformly magnetised body depends on the
/// direction from which the edge is approached.
const WITHIN: f64 = 0.02;

/// A point of a magnet whose coercivity is known.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Point {
    /// Radius, m.
    pub(crate) r: f64,
    /// Height over the mover's reference point, m.
    pub(crate) z: f64,
    /// Sense of the magnetisation along +z.
    pub(super) sense: f64,
    /// mu0 (-H) without the wall, T.
    pub(super) own: f64,
    /// mu0 HcJ, T.
    pub(super) coercivity: f64,
}

/// The points of all magnets whose coercivity is known.
pub(super) fn points_of(mover: &Mover) -> Vec<Point> {
    mover.parts.iter().flat_map(|part| points_within(mover, part)).collect()
}

fn points_within(mover: &Mover, part: &Part) -> Vec<Point> {
    let (Source::Magnet { inner_radius_m, outer_radius_m, length_m, remanence_tesla }, Some(coercivity)) =
        (part.source, part.coercivity_a_per_m)
    else {
        return Vec::new();
    };
    let place = |k: u32, of: u32, low: f64, high: f64| {
        let share = WITHIN + (1.0 - 2.0 * WITHIN) * f64::from(k) / f64::from(of - 1);
        low + share * (high - low)
    };
    let sense = if remanence_tesla < 0.0 { -1.0 } else { 1.0 };
    let (bottom, top) = (part.centre_m - 0.5 * length_m, part.centre_m + 0.5 * length_m);
    let mut points = Vec::new();
    for j in 0..ALONG {
        for i in 0..ACROSS {
            let (r, z) = (place(i, ACROSS, inner_radius_m, outer_radius_m), place(j, ALONG, bottom, top));
            let parts = mover.parts.iter().map(|p| p.source.flux_density_z(r, z - p.centre_m));
            let own = remanence_tesla.abs() - sense * parts.sum::<f64>();
            points.push(Point { r, z, sense, own, coercivity: MU0 * coercivity });
        }
    }
    points
}

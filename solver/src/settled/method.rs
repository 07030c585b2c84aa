//! Which way to settled fields is cheaper: one recurrence for all speeds, or an elimination for each.
//!
//! An elimination takes as long as some 200 recurrence vectors: 95 to 540 (middle half 135 to 240) on grids of 40 x 70 to 190 x 275
//! unknowns, walls of 0.05 to 1 bore radii, relative permeability 1 and 50 (measured by `timing.rs`). How many vectors a speed
//! needs follows from its magnetic Reynolds number.

use crate::constants::MU0;
use crate::grid_rules::reynolds_per_speed;
use crate::problem::Wall;

/// Recurrence vectors that take as long as one elimination (measured, see above).
const ELIMINATION_IN_VECTORS: f64 = 200.0;
/// The recurrence may take so many times the vectors expected before speeds are eliminated instead.
const PATIENCE: f64 = 2.0;
/// Vectors that any recurrence may take.
const FEW: usize = 60;

/// Recurrence vectors for settled fields from the magnetic Reynolds number: within 40 % from 0.01 to 100 for walls of 0.05 to 1 bore
/// radii and gaps of 0.1 to 0.5 of it (measured); permeable walls need fewer.
pub(crate) fn vectors(wall: &Wall, speed: f64) -> f64 {
    let share = if wall.is_permeable() { 6.0 } else { 10.0 };
    4.0 + share * (reynolds_per_speed(wall) * speed.abs()).powf(0.8)
}

/// Ratio of the field that the wall's currents make to that of the mover, as far as they oppose it by induction alone:
/// mu0 sigma w v, without the permeability. Far above 1 the wall shuts the field out, and what is left is a small difference.
pub(crate) fn shielding(wall: &Wall, speed: f64) -> f64 {
    wall.layers.iter().map(|l| MU0 * l.conductivity_s_per_m * l.thickness_m()).sum::<f64>() * speed.abs()
}

/// How speeds are shared between the two ways.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Share {
    /// Greatest speed that the recurrence is made for, m/s; higher ones are eliminated one by one.
    pub(crate) reach: f64,
    /// Vectors after which it is left as it is.
    pub(crate) most: usize,
    /// Vectors expected.
    pub(crate) vectors: f64,
    /// Speeds to eliminate.
    pub(crate) eliminated: usize,
}

/// The cheapest sharing of `speeds` (magnitudes in any order).
pub(crate) fn share(wall: &Wall, speeds: &[f64]) -> Share {
    let mut sorted: Vec<f64> = speeds.iter().map(|v| v.abs()).collect();
    sorted.sort_by(f64::total_cmp);
    let mut best = (f64::INFINITY, Share { reach: 0.0, most: 1, vectors: 1.0, eliminated: sorted.len() });
    for served in 0..=sorted.len() {
        let reach = if served > 0 { sorted[served - 1] } else { 0.0 };
        let vectors = if served > 0 { vectors(wall, reach) } else { 1.0 };
        let eliminated = sorted.len() - served;
        let cost = vectors + ELIMINATION_IN_VECTORS * count(eliminated);
        if cost < best.0 {
            let most = if served > 0 { FEW.max(whole(PATIENCE * vectors)) } else { 1 };
            best = (cost, Share { reach, most, vectors, eliminated });
        }
    }
    best.1
}

#[expect(clippy::cast_precision_loss, reason = "a small count")]
fn count(n: usize) -> f64 {
    n as f64
}

#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "a positive number of vectors")]
fn whole(x: f64) -> usize {
    x.ceil() as usize
}

#[cfg(test)]
mod tests {
    #![allow(clippy::float_cmp, reason = "speeds come back as they went in")]
    use super::*;
    use crate::problem::{Extent, Layer};

    #[test]
    fn slow_speeds_share_a_recurrence_and_fast_ones_are_eliminated() {
        let layer = Layer {
            name: "tube".to_owned(),
            inner_radius_m: 0.01,
            outer_radius_m: 0.012,
            from_m: 0.0,
            to_m: 0.0,
            conductivity_s_per_m: 58e6,
            relative_permeability: 1.0,
        };
        let wall = Wall { slots: 0, extent: Extent::Endless, layers: vec![layer] };
        let at = |reynolds: f64| reynolds / reynolds_per_speed(&wall);
        assert_eq!(share(&wall, &[at(10.0)]).eliminated, 0);
        let fast = share(&wall, &[-at(1000.0)]);
        assert_eq!((fast.reach, fast.most, fast.eliminated), (0.0, 1, 1));
        // Many fast speeds are worth a long recurrence; one far above them is not.
        let mut speeds: Vec<f64> = (1..=40).map(|k| at(5.0 * f64::from(k))).collect();
        speeds.push(at(1e5));
        let shared = share(&wall, &speeds);
        assert_eq!((shared.reach, shared.eliminated), (at(200.0), 1));
        assert!(shared.most > 1000);
    }
}

//! Values at the wall's nodes carried from one set of heights to another, radius by radius.
//!
//! Where heights coincide the value is copied; elsewhere it is interpolated by a polynomial through the nearest nodes within the
//! same stretch between two changes of material, as the field's second derivative jumps there.

use crate::wall_nodes::WallNodes;

/// Nodes of the polynomial, where the stretch has as many.
const POINTS: usize = 8;

/// The wall's nodes on one z-line: their heights, and where materials change.
#[derive(Debug, Clone)]
pub(super) struct Heights {
    pub(super) z: Vec<f64>,
    pub(super) wall: WallNodes,
}

/// `values` at the wall's nodes on `from`, carried to those on `to`. `ends` are the heights where materials change, increasing.
pub(super) fn carry(from: &Heights, values: &[f64], to: (&[f64], &WallNodes), ends: &[f64]) -> Vec<f64> {
    let (z, wall) = to;
    let mut carried = vec![0.0; wall.len()];
    for (old, new) in from.wall.rows.iter().zip(&wall.rows) {
        let places = &from.z[old.j..old.j + old.count];
        let samples = &values[old.start..old.start + old.count];
        let heights = &z[new.j..new.j + new.count];
        resample(places, samples, heights, ends, &mut carried[new.start..new.start + new.count]);
    }
    carried
}

/// `samples` at `places` read at `heights`, both increasing.
pub(super) fn resample(places: &[f64], samples: &[f64], heights: &[f64], ends: &[f64], out: &mut [f64]) {
    for (&z, out) in heights.iter().zip(out) {
        let (first, last) = stretch(places, ends, z);
        *out = interpolated(&places[first..last], &samples[first..last], z);
    }
}

/// The places between the two changes of material around `z`, both included.
fn stretch(places: &[f64], ends: &[f64], z: f64) -> (usize, usize) {
    let above = ends.partition_point(|&e| e <= z);
    let low = above.checked_sub(1).map_or(f64::NEG_INFINITY, |k| ends[k]);
    let high = ends.get(above).copied().unwrap_or(f64::INFINITY);
    let first = places.partition_point(|&p| p < low);
    let last = places.partition_point(|&p| p <= high);
    if last > first { (first, last) } else { (0, places.len()) }
}

/// The polynomial through the nodes nearest to `z`, by Neville's scheme.
fn interpolated(places: &[f64], samples: &[f64], z: f64) -> f64 {
    let points = POINTS.min(places.len());
    let above = places.partition_point(|&p| p < z);
    if let (Some(&place), Some(&sample)) = (places.get(above), samples.get(above))
        && (place - z).abs() <= 1.0e-12 * z.abs().max(place.abs())
    {
        return sample;
    }
    let first = above.saturating_sub(points / 2).min(places.len() - points);
    let x = &places[first..first + points];
    let mut p = [0.0; POINTS];
    p[..points].copy_from_slice(&samples[first..first + points]);
    for width in 1..points {
        for k in 0..points - width {
            p[k] = ((z - x[k + width]) * p[k] + (x[k] - z) * p[k + 1]) / (x[k] - x[k + width]);
        }
    }
    p[0]
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn polynomials_are_carried_exactly_and_nodes_copied() {
        let places: Vec<f64> = (0..30).map(|k| 0.01 * f64::from(k) * (1.0 + 0.02 * f64::from(k))).collect();
        let samples: Vec<f64> = places.iter().map(|z| 1.0 + z - 3.0 * z.powi(5) + z.powi(7)).collect();
        let heights = [0.0, places[7], 0.113, 0.2, 0.37];
        let mut out = [0.0; 5];
        resample(&places, &samples, &heights, &[0.0, places[29]], &mut out);
        for (z, found) in heights.iter().zip(out) {
            approx::assert_relative_eq!(found, 1.0 + z - 3.0 * z.powi(5) + z.powi(7), max_relative = 1e-12);
        }
        approx::assert_relative_eq!(out[1], samples[7], max_relative = 0.0);
    }

    #[test]
    fn a_kink_at_a_change_of_material_stays_in_its_place() {
        let places: Vec<f64> = (0..41).map(|k| 0.05 * f64::from(k)).collect();
        let kinked = |z: f64| if z < 1.0 { z * z } else { 1.0 + 5.0 * (z - 1.0) };
        let samples: Vec<f64> = places.iter().map(|&z| kinked(z)).collect();
        let heights = [0.93, 0.99, 1.01, 1.07];
        let mut out = [0.0; 4];
        resample(&places, &samples, &heights, &[0.0, 1.0, 2.0], &mut out);
        for (z, found) in heights.iter().zip(out) {
            approx::assert_relative_eq!(found, kinked(*z), max_relative = 1e-11);
        }
    }
}

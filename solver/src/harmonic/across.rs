//! Current density along a line across the wall, and how deep it reaches.

use num_complex::Complex64;

use super::level::Reaction;
use crate::interpolate::{ALONG_POINTS, Stencil};
use crate::operators::Operators;
use crate::problem::{Extent, Layer, Problem};

/// Intervals between samples of a layer; the samples are Chebyshev's points, close at both faces.
const INTERVALS: u32 = 64;

/// Samples of one layer.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Line {
    /// Index of the layer.
    pub(super) layer: usize,
    /// Radii from face to face, m.
    pub(super) radii_m: Vec<f64>,
}

/// The lines across every layer that conducts at height `z`.
pub(super) fn lines(problem: &Problem, z: f64) -> Vec<Line> {
    let reaches = |l: &Layer| match problem.wall.extent {
        Extent::Endless => true,
        Extent::Finite { .. } => l.from_m <= z && z <= l.to_m,
    };
    let mut all: Vec<Line> = Vec::new();
    for (layer, l) in problem.wall.layers.iter().enumerate() {
        if reaches(l) && l.conductivity_s_per_m > 0.0 {
            let radius = |k: u32| {
                let share = 0.5 * (1.0 - (std::f64::consts::PI * f64::from(k) / f64::from(INTERVALS)).cos());
                l.inner_radius_m + share * l.thickness_m()
            };
            all.push(Line { layer, radii_m: (0..=INTERVALS).map(radius).collect() });
        }
    }
    // Where two sections meet at this very height, the lower one stands.
    all.sort_by(|a, b| a.radii_m[0].total_cmp(&b.radii_m[0]).then(a.layer.cmp(&b.layer)));
    all.dedup_by(|next, kept| (next.radii_m[0] - kept.radii_m[0]).abs() <= 0.0);
    all
}

/// J_phi at the samples of `line` at height `z`, A/m2: sigma E = -i omega sigma psi / r.
pub(super) fn current_density(
    operators: &Operators,
    reaction: &Reaction,
    (problem, line): (&Problem, &Line),
    z: f64,
) -> Vec<Complex64> {
    let layer = &problem.wall.layers[line.layer];
    let nodes = operators.grid.r.nodes();
    let first = operators.grid.r.nearest(layer.inner_radius_m);
    let last = operators.grid.r.nearest(layer.outer_radius_m);
    let scale = Complex64::new(0.0, -reaction.omega * layer.conductivity_s_per_m);
    let at_node =
        |i: usize| if i == 0 { Complex64::ZERO } else { scale * along(operators, reaction, layer, i, z) / nodes[i] };
    let values: Vec<Complex64> = (first..=last).map(at_node).collect();
    let positions = &nodes[first..=last];
    line.radii_m.iter().map(|&r| across(positions, &values, r)).collect()
}

/// psi at height `z` and radial node `i`, within the layer.
fn along(operators: &Operators, reaction: &Reaction, layer: &Layer, i: usize, z: f64) -> Complex64 {
    let heights = operators.grid.z.nodes();
    let ends = if layer.to_m > layer.from_m { (layer.from_m, layer.to_m) } else { (f64::NEG_INFINITY, f64::INFINITY) };
    let room = 1.0e-9 * layer.outer_radius_m;
    for row in operators.wall.rows.iter().filter(|row| row.i == i) {
        let inside = |j: &usize| heights[*j] >= ends.0 - room && heights[*j] <= ends.1 + room;
        let own: Vec<usize> = (row.j..row.j + row.count).filter(inside).collect();
        let (Some(&low), Some(&high)) = (own.first(), own.last()) else { continue };
        if heights[low] <= z + room && z <= heights[high] + room {
            let start = row.start + (low - row.j);
            return interpolated(&heights[low..=high], &reaction.flux[start..start + own.len()], z);
        }
    }
    Complex64::ZERO
}

/// Within a layer across: six points, or five where there are no more.
fn across(positions: &[f64], values: &[Complex64], r: f64) -> Complex64 {
    match positions.len() {
        0..=4 => interpolated(positions, values, r),
        5 => weighted(&Stencil::<5>::at(positions, r), values),
        6 | 7 => weighted(&Stencil::<6>::at(positions, r), values),
        _ => weighted(&Stencil::<8>::at(positions, r), values),
    }
}

/// As many points as there are, up to ten.
fn interpolated(positions: &[f64], values: &[Complex64], s: f64) -> Complex64 {
    match positions.len() {
        0 => Complex64::ZERO,
        1 => values[0],
        2..=4 => weighted(&Stencil::<2>::at(positions, s), values),
        5..=9 => weighted(&Stencil::<5>::at(positions, s), values),
        _ => weighted(&Stencil::<ALONG_POINTS>::at(positions, s), values),
    }
}

fn weighted<const N: usize>(stencil: &Stencil<N>, values: &[Complex64]) -> Complex64 {
    stencil.value.iter().zip(&values[stencil.first..]).map(|(w, v)| *w * v).sum()
}

/// Depth below a face at which the magnitude has fallen to 1/e of what it is there, m; `None` where it does not within the layer.
pub(super) fn depth_of_fall(line: &Line, values: &[Complex64], from_inner: bool) -> Option<f64> {
    let (radii, face) = (&line.radii_m, if from_inner { 0 } else { line.radii_m.len() - 1 });
    let wanted = values[face].norm() / std::f64::consts::E;
    if wanted <= 0.0 {
        return None;
    }
    let mut order: Vec<usize> = (0..radii.len()).collect();
    if !from_inner {
        order.reverse();
    }
    let pair = order.windows(2).find(|p| values[p[1]].norm() <= wanted)?;
    // Bisect |J| of the polynomial through all samples, which at Chebyshev's points is as good as the best one.
    let (mut above, mut below) = (radii[pair[0]], radii[pair[1]]);
    for _ in 0..60 {
        let middle = 0.5 * (above + below);
        if barycentric(radii, values, middle).norm() > wanted { above = middle } else { below = middle }
    }
    Some((0.5 * (above + below) - radii[face]).abs())
}

/// The polynomial through values at Chebyshev's points (J.-P. Berrut and L. N. Trefethen, "Barycentric Lagrange interpolation", SIAM Review 46,
/// 501-517, 2004, eq. (5.4); from memory).
fn barycentric(radii: &[f64], values: &[Complex64], r: f64) -> Complex64 {
    let (mut top, mut bottom) = (Complex64::ZERO, 0.0);
    let last = radii.len() - 1;
    for (k, (x, v)) in radii.iter().zip(values).enumerate() {
        let off = r - x;
        if off.abs() <= 0.0 {
            return *v;
        }
        let sign = if k % 2 == 0 { 1.0 } else { -1.0 };
        let weight = if k == 0 || k == last { 0.5 * sign } else { sign } / off;
        top += weight * v;
        bottom += weight;
    }
    top / bottom
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]
    use super::*;

    #[test]
    fn a_decaying_wave_falls_to_one_over_e_at_its_depth() {
        let radii: Vec<f64> =
            (0..=INTERVALS).map(|k| 2.0 - (std::f64::consts::PI * f64::from(k) / 64.0).cos()).collect();
        let line = Line { layer: 0, radii_m: radii.clone() };
        for depth in [0.02, 0.1, 0.7] {
            let inward: Vec<Complex64> =
                radii.iter().map(|r| (Complex64::new(1.0, 1.0) * (r - 3.0) / depth).exp()).collect();
            approx::assert_relative_eq!(depth_of_fall(&line, &inward, false).unwrap(), depth, max_relative = 1e-9);
            let outward: Vec<Complex64> =
                radii.iter().map(|r| (-Complex64::new(1.0, 1.0) * (r - 1.0) / depth).exp()).collect();
            approx::assert_relative_eq!(depth_of_fall(&line, &outward, true).unwrap(), depth, max_relative = 1e-9);
        }
        let shallow: Vec<Complex64> = radii.iter().map(|r| Complex64::from((r - 3.0).exp() + 1.0)).collect();
        assert_eq!(depth_of_fall(&line, &shallow, false), None);
    }
}

//! The wall as rows of thin rings: radius, conductance, ends.

use super::assumptions::WallModel;
use crate::placement::source_sizes;
use crate::problem::{Extent, Layer, Mover, Wall};
use crate::sources::gauss;

/// Radial points of a layer whose thickness is integrated.
const ACROSS: usize = 8;

/// Thin rings of one radius, side by side along z.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Row {
    /// Radius, m.
    pub radius: f64,
    /// Conductivity times radial share, S: a ring of length dz has conductance `sheet` dz / (2 pi radius).
    pub sheet: f64,
    /// Ends, m; infinite for an endless wall.
    pub from: f64,
    /// Upper end, m.
    pub to: f64,
    /// Conductivity, S/m, for current densities.
    pub sigma: f64,
}

/// The rows of all conducting layers.
pub(super) fn rows(wall: &Wall, mover: &Mover, model: WallModel) -> Vec<Row> {
    let conducting = wall.layers.iter().filter(|l| l.conductivity_s_per_m > 0.0);
    conducting.flat_map(|layer| layer_rows(layer, wall.extent, mover, model)).collect()
}

/// One row a layer at the face towards the mover: where the current densities are greatest.
pub(super) fn faces(wall: &Wall, mover: &Mover) -> Vec<Row> {
    rows(wall, mover, WallModel::FacingRadius)
}

fn layer_rows(layer: &Layer, extent: Extent, mover: &Mover, model: WallModel) -> Vec<Row> {
    let (from, to) = match extent {
        Extent::Endless => (f64::NEG_INFINITY, f64::INFINITY),
        Extent::Finite { .. } => (layer.from_m, layer.to_m),
    };
    let sigma = layer.conductivity_s_per_m;
    let thin = |radius| vec![Row { radius, sheet: sigma * layer.thickness_m(), from, to, sigma }];
    let (inner, outer) = (layer.inner_radius_m, layer.outer_radius_m);
    match model {
        WallModel::FacingRadius => thin(facing_radius(layer, mover)),
        WallModel::MeanRadius => thin(0.5 * (inner + outer)),
        WallModel::Thickness => {
            across(inner, outer).map(|(radius, share)| Row { radius, sheet: sigma * share, from, to, sigma }).collect()
        }
    }
}

/// The layer's inner radius where the mover runs inside it, else its outer radius.
pub(super) fn facing_radius(layer: &Layer, mover: &Mover) -> f64 {
    if runs_inside(layer, mover) { layer.inner_radius_m } else { layer.outer_radius_m }
}

/// Whether all of the mover's sources lie inside the layer's inner radius.
pub(super) fn runs_inside(layer: &Layer, mover: &Mover) -> bool {
    mover.parts.iter().all(|p| source_sizes(&p.source).1 < layer.inner_radius_m)
}

/// Radii and shares of the thickness. Gauss points in ln r where there is an inner radius, so that thick walls, whose inner part
/// does most, are met too: drag falls as r^-3 or faster.
fn across(inner: f64, outer: f64) -> impl Iterator<Item = (f64, f64)> {
    let log = inner > 0.0;
    let (low, high) = if log { (inner.ln(), outer.ln()) } else { (inner, outer) };
    let (middle, half) = (0.5 * (low + high), 0.5 * (high - low));
    gauss::rule(ACROSS).points.iter().map(move |&(x, w)| {
        let s = middle + half * x;
        if log { (s.exp(), half * w * s.exp()) } else { (s, half * w) }
    })
}

//! The rings: sections of rectangular shape, all of one layer on a common lattice.

use crate::problem::{Extent, Layer, Wall};

use crate::fault::SolveFault;

/// How finely a wall is cut.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Cutting {
    /// Rings across each layer.
    pub across: usize,
    /// Wanted length of a ring, m; the nearest that divides each layer evenly is taken.
    pub pitch_m: f64,
}

/// One interval.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Span {
    pub from: f64,
    pub to: f64,
}

impl Span {
    pub fn width(self) -> f64 {
        self.to - self.from
    }

    pub fn middle(self) -> f64 {
        0.5 * (self.from + self.to)
    }
}

/// The rings of one layer: `radial.len()` times `count`, the axial index running fastest.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Lattice {
    /// Radial extents of the rows.
    pub radial: Vec<Span>,
    /// Lower end, m.
    pub from: f64,
    /// Length of a ring, m.
    pub pitch: f64,
    /// Rings along z.
    pub count: usize,
    /// Conductivity, S/m.
    pub sigma: f64,
}

impl Lattice {
    /// Axial extent of ring `i`.
    pub fn axial(&self, i: usize) -> Span {
        let from = self.from + self.pitch * i as f64;
        Span { from, to: from + self.pitch }
    }

    /// Number of rings.
    pub fn len(&self) -> usize {
        self.radial.len() * self.count
    }

    /// Resistance of a ring of row `row`, ohm: 2 pi r / (sigma section) for an even current.
    pub fn resistance(&self, row: usize) -> f64 {
        let span = self.radial[row];
        2.0 * std::f64::consts::PI * span.middle() / (self.sigma * span.width() * self.pitch)
    }

    fn of(layer: &Layer, cutting: Cutting) -> Self {
        let width = (layer.outer_radius_m - layer.inner_radius_m) / cutting.across as f64;
        let edge = |i: usize| layer.inner_radius_m + width * i as f64;
        let radial = (0..cutting.across).map(|i| Span { from: edge(i), to: edge(i + 1) }).collect();
        let length = layer.to_m - layer.from_m;
        let wanted = (length / cutting.pitch_m).round().clamp(1.0, 100_000.0);
        #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped to 1..100000 above")]
        let count = wanted as usize;
        Self { radial, from: layer.from_m, pitch: length / wanted, count, sigma: layer.conductivity_s_per_m }
    }
}

/// Cuts every conducting layer.
pub(super) fn lattices(wall: &Wall, cutting: Cutting) -> Result<Vec<Lattice>, SolveFault> {
    if wall.extent == Extent::Endless {
        return Err(SolveFault::Unsuited("coupled rings need the wall's length"));
    }
    if cutting.across == 0 || cutting.pitch_m.is_nan() || cutting.pitch_m <= 0.0 {
        return Err(SolveFault::OutOfRange {
            what: "length of a ring, m",
            found: cutting.pitch_m,
            legal: "greater than 0",
        });
    }
    for layer in &wall.layers {
        if (layer.relative_permeability - 1.0).abs() > 0.0 {
            return Err(SolveFault::PermeableRings { layer: layer.name.clone(), found: layer.relative_permeability });
        }
        if !(layer.outer_radius_m > layer.inner_radius_m && layer.inner_radius_m >= 0.0 && layer.to_m > layer.from_m) {
            return Err(SolveFault::OutOfRange {
                what: "thickness of a layer, m",
                found: layer.thickness_m(),
                legal: "greater than 0, as its length",
            });
        }
    }
    Ok(wall.layers.iter().filter(|l| l.conductivity_s_per_m > 0.0).map(|l| Lattice::of(l, cutting)).collect())
}

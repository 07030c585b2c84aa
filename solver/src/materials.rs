//! Conductivity and permeability of every cell.

use lenzbore_mesh::Regions;

use crate::problem::{Layer, Wall};

/// Material of each cell.
#[derive(Debug, Clone)]
pub(crate) struct Materials {
    /// Conductivity, S/m.
    pub(crate) sigma: Vec<f64>,
    /// Relative permeability.
    pub(crate) mu_r: Vec<f64>,
    /// Region, 0 for free space, else layer index + 1.
    pub(crate) region: Vec<usize>,
}

impl Materials {
    /// Reads the wall's layers through the regions of a grid.
    pub(crate) fn new(wall: &Wall, regions: &Regions) -> Self {
        let region = regions.of_cell().to_vec();
        let of = |k: usize, free: f64, value: fn(&Layer) -> f64| {
            if k == 0 { free } else { value(&wall.layers[k - 1]) }
        };
        Self {
            sigma: region.iter().map(|&k| of(k, 0.0, |l| l.conductivity_s_per_m)).collect(),
            mu_r: region.iter().map(|&k| of(k, 1.0, |l| l.relative_permeability)).collect(),
            region,
        }
    }
}

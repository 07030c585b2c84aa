//! The radial sequence of annuli from the axis to infinity, air included.

use lenzbore_solver::constants::MU0;
use lenzbore_solver::problem::{Extent, Layer, Wall};
use num_complex::Complex64;

use crate::Error;

/// One annulus of homogeneous material; the first starts at the axis, the last never ends.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Region {
    /// Inner radius, m; 0 for the first.
    pub inner: f64,
    /// Outer radius, m; infinite for the last.
    pub outer: f64,
    /// Conductivity, S/m.
    pub sigma: f64,
    /// Permeability, H/m.
    pub mu: f64,
    /// Whether it is part of the wall (as opposed to air).
    pub solid: bool,
}

impl Region {
    fn air(inner: f64, outer: f64) -> Self {
        Self { inner, outer, sigma: 0.0, mu: MU0, solid: false }
    }

    /// Radial wavenumber at axial wavenumber k, fields varying as exp(s t) in the wall's frame: q^2 = k^2 + mu sigma s.
    pub fn q(&self, k: f64, s: Complex64) -> Complex64 {
        (k * k + self.mu * self.sigma * s).sqrt()
    }

    /// True where currents can flow.
    pub fn conducts(&self) -> bool {
        self.sigma > 0.0
    }
}

/// Sorts the layers and fills the gaps with air.
pub(super) fn regions(wall: &Wall) -> Result<Vec<Region>, Error> {
    if let Extent::Finite { length_m } = wall.extent {
        return Err(Error::WallEnds { length_m });
    }
    let mut layers: Vec<&Layer> = wall.layers.iter().collect();
    for layer in &layers {
        check(layer)?;
    }
    layers.sort_by(|a, b| a.inner_radius_m.total_cmp(&b.inner_radius_m));
    for pair in layers.windows(2) {
        if pair[1].inner_radius_m < pair[0].outer_radius_m {
            return Err(Error::LayersOverlap { first: pair[0].name.clone(), second: pair[1].name.clone() });
        }
    }
    let mut out = Vec::with_capacity(2 * layers.len() + 1);
    let mut reached = 0.0;
    for layer in layers {
        if layer.inner_radius_m > reached {
            out.push(Region::air(reached, layer.inner_radius_m));
        }
        reached = layer.outer_radius_m;
        out.push(Region {
            inner: layer.inner_radius_m,
            outer: layer.outer_radius_m,
            sigma: layer.conductivity_s_per_m,
            mu: MU0 * layer.relative_permeability,
            solid: true,
        });
    }
    out.push(Region::air(reached, f64::INFINITY));
    Ok(out)
}

fn check(layer: &Layer) -> Result<(), Error> {
    let fault = |what, found, legal| Err(Error::OutOfRange { what, found, legal });
    if !(layer.inner_radius_m >= 0.0 && layer.inner_radius_m.is_finite()) {
        return fault("inner radius of a layer, m", layer.inner_radius_m, "at least 0");
    }
    if !(layer.outer_radius_m > layer.inner_radius_m && layer.outer_radius_m.is_finite()) {
        return fault("outer radius of a layer, m", layer.outer_radius_m, "greater than the inner radius");
    }
    if !(layer.conductivity_s_per_m >= 0.0 && layer.conductivity_s_per_m.is_finite()) {
        return fault("conductivity of a layer, S/m", layer.conductivity_s_per_m, "at least 0");
    }
    if !(layer.relative_permeability > 0.0 && layer.relative_permeability.is_finite()) {
        return fault("relative permeability of a layer", layer.relative_permeability, "greater than 0");
    }
    Ok(())
}

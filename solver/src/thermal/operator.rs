//! The heat equation on the wall: rho c dT/dt = div(k grad T), Newton's cooling at faces to the air.
//!
//! Finite volumes with the temperature at nodes: every cell gives a quarter of itself to each of its corners, so that faces of layers
//! carry nodes and touching layers are in perfect contact. Fluxes: k 2 pi r dz / dr across, k (annulus) / dz along. Capacities and fluxes
//! use exact volumes and areas; the error runs in even powers of the cell size. C dT/dt = -K (T - ambient) + heat, K symmetric.

use std::f64::consts::PI;
use std::sync::Arc;

use sprs::{CsMat, TriMat};

use super::grid::ThermalGrid;
use crate::fault::SolveFault;
use crate::linear::Pattern;
use crate::problem::{Cooling, LayerHeat};

/// C, K and what they stand on.
#[derive(Debug, Clone)]
pub(crate) struct HeatOperator {
    pub(crate) space: ThermalGrid,
    /// Unknown of each node, `[z][r]`; `None` where there is no wall.
    pub(crate) unknown: Vec<Option<usize>>,
    /// Heat capacity, J/K.
    pub(crate) capacity: Vec<f64>,
    /// Film coefficient times area, W/K.
    pub(crate) film: Vec<f64>,
    /// Conduction and films, W/K.
    pub(crate) conduction: CsMat<f64>,
    pub(crate) pattern: Arc<Pattern>,
    /// Unknowns on the bore's surface and on the outside.
    pub(crate) bore: Vec<usize>,
    pub(crate) outside: Vec<usize>,
}

/// What is gathered cell by cell.
struct Assembly<'a> {
    space: &'a ThermalGrid,
    layers: &'a [LayerHeat],
    cooling: Option<Cooling>,
    unknown: &'a [Option<usize>],
    capacity: Vec<f64>,
    film: Vec<f64>,
    bore: Vec<bool>,
    outside: Vec<bool>,
    entries: Vec<(usize, usize, f64)>,
}

impl HeatOperator {
    /// Assembles the operator; a layer without thermal conductivity conducts no heat.
    ///
    /// # Errors
    /// A matrix that cannot be analysed.
    pub(crate) fn new(space: ThermalGrid, layers: &[LayerHeat], cooling: Option<Cooling>) -> Result<Self, SolveFault> {
        let unknown = numbering(&space);
        let n = unknown.iter().flatten().count();
        let (zeros, none) = (vec![0.0; n], vec![false; n]);
        let mut assembly = Assembly {
            space: &space,
            layers,
            cooling,
            unknown: &unknown,
            capacity: zeros.clone(),
            film: zeros,
            bore: none.clone(),
            outside: none,
            entries: Vec::new(),
        };
        for j in 0..space.grid.nz() - 1 {
            for i in 0..space.grid.nr() - 1 {
                if let Some(layer) = space.layer(Some(i), Some(j)) {
                    assembly.cell(i, j, layer);
                }
            }
        }
        let Assembly { capacity, film, bore, outside, entries, .. } = assembly;
        let mut matrix = TriMat::with_capacity((n, n), 4 * entries.len() + n);
        for (a, b, g) in entries {
            for (row, column, value) in [(a, a, g), (b, b, g), (a, b, -g), (b, a, -g)] {
                matrix.add_triplet(row, column, value);
            }
        }
        film.iter().enumerate().for_each(|(u, &f)| matrix.add_triplet(u, u, f));
        let conduction: CsMat<f64> = matrix.to_csr();
        let pattern = Pattern::new(&conduction)?;
        let listed = |marks: &[bool]| (0..n).filter(|&u| marks[u]).collect::<Vec<_>>();
        let (bore, outside) = (listed(&bore), listed(&outside));
        Ok(Self { space, unknown, capacity, film, conduction, pattern, bore, outside })
    }

    /// Number of unknowns.
    pub(crate) fn len(&self) -> usize {
        self.capacity.len()
    }

    /// Heat capacity of the whole wall, J/K.
    pub(crate) fn total_capacity(&self) -> f64 {
        self.capacity.iter().sum()
    }

    /// Values of the unknowns on all nodes, `elsewhere` where there is no wall.
    pub(crate) fn on_nodes(&self, values: &[f64], elsewhere: f64) -> Vec<f64> {
        self.unknown.iter().map(|u| u.map_or(elsewhere, |u| values[u])).collect()
    }
}

/// Nodes that touch the wall, numbered along r first.
fn numbering(space: &ThermalGrid) -> Vec<Option<usize>> {
    let grid = &space.grid;
    let mut next = 0;
    let mut unknown = vec![None; grid.nodes()];
    for j in 0..grid.nz() {
        for i in 0..grid.nr() {
            let around =
                |a: Option<usize>| space.layer(a, j.checked_sub(1)).is_some() || space.layer(a, Some(j)).is_some();
            if around(i.checked_sub(1)) || around(Some(i)) {
                unknown[grid.node(i, j)] = Some(next);
                next += 1;
            }
        }
    }
    unknown
}

impl Assembly<'_> {
    fn unknown(&self, i: usize, j: usize) -> usize {
        // Every corner of a wall cell has one.
        self.unknown[self.space.grid.node(i, j)].unwrap_or(0)
    }

    fn cell(&mut self, i: usize, j: usize, layer: usize) {
        let (r, z) = (self.space.grid.r.nodes(), self.space.grid.z.nodes());
        let (inner, outer, dz) = (r[i], r[i + 1], z[j + 1] - z[j]);
        let middle = 0.5 * (inner + outer);
        // Annuli of the inner and of the outer half of the cell.
        let annulus = [PI * (middle * middle - inner * inner), PI * (outer * outer - middle * middle)];
        let heat = self.layers[layer];
        let k = heat.thermal_conductivity_w_per_m_k.unwrap_or(0.0);
        let across = k * 2.0 * PI * middle * 0.5 * dz / (outer - inner);
        for b in [j, j + 1] {
            self.entries.push((self.unknown(i, b), self.unknown(i + 1, b), across));
            for (half, area) in annulus.iter().enumerate() {
                let u = self.unknown(i + half, b);
                self.capacity[u] += heat.volumetric_j_per_m3_k() * area * 0.5 * dz;
            }
        }
        for (half, area) in annulus.iter().enumerate() {
            self.entries.push((self.unknown(i + half, j), self.unknown(i + half, j + 1), k * area / dz));
        }
        self.faces_across(i, j, (inner, outer), dz);
        self.faces_along(i, j, annulus);
    }

    /// Films of the bore's surface and of the outside.
    fn faces_across(&mut self, i: usize, j: usize, (inner, outer): (f64, f64), dz: f64) {
        let next = |a: Option<usize>| self.space.layer(a, Some(j)).is_none();
        let bore = inner > 0.0 && next(i.checked_sub(1)) && !self.space.wall_beyond(i, j, true);
        let outside = next(Some(i + 1)) && !self.space.wall_beyond(i, j, false);
        let (inside_film, outside_film) =
            self.cooling.map_or((0.0, 0.0), |c| (c.bore_w_per_m2_k, c.outside_w_per_m2_k));
        for b in [j, j + 1] {
            if bore {
                let u = self.unknown(i, b);
                self.film[u] += inside_film * 2.0 * PI * inner * 0.5 * dz;
                self.bore[u] = true;
            }
            if outside {
                let u = self.unknown(i + 1, b);
                self.film[u] += outside_film * 2.0 * PI * outer * 0.5 * dz;
                self.outside[u] = true;
            }
        }
    }

    /// Films of the faces that look along the axis.
    fn faces_along(&mut self, i: usize, j: usize, annulus: [f64; 2]) {
        let film = self.cooling.map_or(0.0, |c| c.ends_w_per_m2_k);
        for (beyond, b) in [(j.checked_sub(1), j), (Some(j + 1), j + 1)] {
            let open = match beyond.filter(|&b| b + 1 < self.space.grid.nz()) {
                Some(b) => self.space.layer(Some(i), Some(b)).is_none() && !self.space.is_gap(i, b),
                None => true,
            };
            if open {
                for (half, area) in annulus.iter().enumerate() {
                    let u = self.unknown(i + half, b);
                    self.film[u] += film * area;
                }
            }
        }
    }
}

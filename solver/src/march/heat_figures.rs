//! What one level's heat warms without conduction: the hottest point, the hottest cross-section, the mean, both surfaces.

use std::f64::consts::PI;

use super::figures::LevelFigure;
use super::heating::{HeatLeft, WholeWall};
use crate::interpolate::peak;
use crate::outcome::Location;
use crate::problem::{LayerHeat, Warming};

/// A value and where it is, m.
#[derive(Debug, Clone, Copy, Default)]
pub(crate) struct Hottest {
    pub(crate) value: f64,
    pub(crate) r: f64,
    pub(crate) z: f64,
}

impl Hottest {
    fn or(self, other: Self) -> Self {
        if other.value > self.value { other } else { self }
    }

    fn at(&self) -> Option<Location> {
        Some(Location { r_m: Some(self.r), z_m: Some(self.z), t_s: None })
    }
}

/// The quarter of a cell that belongs to one of its corners.
pub(crate) struct Quarter {
    pub(crate) layer: usize,
    /// Index of the corner's height.
    j: usize,
    /// Heat left in it, J.
    pub(crate) heat: f64,
    /// Radii and heights that it fills, m.
    pub(crate) r: (f64, f64),
    pub(crate) z: (f64, f64),
}

impl Quarter {
    /// Its volume, m3.
    pub(crate) fn volume(&self) -> f64 {
        PI * (self.r.1 * self.r.1 - self.r.0 * self.r.0) * (self.z.1 - self.z.0)
    }
}

/// Nodes that a layer spans, both ends included.
struct Span {
    i: (usize, usize),
    j: (usize, usize),
}

impl WholeWall {
    /// The nodes of layer `k`; `None` where it has no cell.
    fn span(&self, k: usize) -> Option<Span> {
        let grid = &self.grid;
        let mut span: Option<Span> = None;
        for j in 0..grid.nz() - 1 {
            for i in 0..grid.nr() - 1 {
                if self.materials.region[grid.cell(i, j)] == k + 1 {
                    let s = span.get_or_insert(Span { i: (i, i), j: (j, j) });
                    *s = Span { i: (s.i.0.min(i), s.i.1.max(i + 1)), j: (s.j.0.min(j), s.j.1.max(j + 1)) };
                }
            }
        }
        span
    }

    /// Whether no wall lies between the cell and the axis, or the outside.
    fn is_surface(&self, cell: (usize, usize), inward: bool) -> bool {
        let (i, j) = cell;
        let free = |a: usize| self.materials.region[self.grid.cell(a, j)] == 0;
        if inward { (0..i).all(free) } else { (i + 1..self.grid.nr() - 1).all(free) }
    }
}

impl HeatLeft {
    /// The integral of e^2 at all nodes.
    fn on_nodes(&self) -> Vec<f64> {
        let grid = &self.wall.grid;
        let mut all = vec![0.0; grid.nodes()];
        for row in &self.wall.nodes.rows {
            for k in 0..row.count {
                all[grid.node(row.i, row.j + k)] = self.drive_squared[row.start + k];
            }
        }
        all
    }

    /// Calls `visit` with each quarter cell around every node that lies in a layer.
    pub(crate) fn quarters(&self, mut visit: impl FnMut(&Quarter)) {
        let (grid, materials) = (&self.wall.grid, &self.wall.materials);
        let (r, z) = (grid.r.nodes(), grid.z.nodes());
        for row in &self.wall.nodes.rows {
            for k in 0..row.count {
                let (i, j, s) = (row.i, row.j + k, self.drive_squared[row.start + k]);
                for (a, b) in [(i - 1, j - 1), (i, j - 1), (i - 1, j), (i, j)] {
                    let cell = grid.cell(a, b);
                    let Some(layer) = materials.region[cell].checked_sub(1) else { continue };
                    let half = |nodes: &[f64], at: usize, cell: usize| {
                        let middle = 0.5 * (nodes[cell] + nodes[cell + 1]);
                        (nodes[at].min(middle), nodes[at].max(middle))
                    };
                    let (across, along) = (half(r, i, a), half(z, j, b));
                    let area = (across.1 - across.0) * (along.1 - along.0);
                    let heat = 2.0 * PI * s * materials.sigma[cell] * area / r[i];
                    visit(&Quarter { layer, j, heat, r: across, z: along });
                }
            }
        }
    }

    /// Heat in each of `count` layers, J.
    pub(crate) fn by_layer(&self, count: usize) -> Vec<f64> {
        let mut heat = vec![0.0; count];
        self.quarters(|q| heat[q.layer] += q.heat);
        heat
    }

    /// Greatest local rise in layer `k` without conduction: sigma / (rho c) times the integral of e^2 over r^2, K.
    pub(crate) fn hottest_in(&self, k: usize, layer: &LayerHeat) -> Hottest {
        let Some(span) = self.wall.span(k) else { return Hottest::default() };
        let nodes = self.on_nodes();
        let rows = (span.i.0.max(1)..=span.i.1).map(|i| self.hottest_along(&nodes, (k, layer), i, span.j));
        rows.fold(Hottest::default(), Hottest::or)
    }

    /// The same along the nodes of radius `i` between heights `j`.
    fn hottest_along(&self, nodes: &[f64], (k, layer): (usize, &LayerHeat), i: usize, j: (usize, usize)) -> Hottest {
        let grid = &self.wall.grid;
        let r = grid.r.nodes()[i];
        let sigma = (j.0..j.1)
            .flat_map(|b| [i.saturating_sub(1), i.min(grid.nr() - 2)].map(|a| grid.cell(a, b)))
            .find(|&cell| self.wall.materials.region[cell] == k + 1)
            .map_or(0.0, |cell| self.wall.materials.sigma[cell]);
        let column: Vec<f64> = (j.0..=j.1).map(|b| nodes[grid.node(i, b)]).collect();
        let (z, s) = peak(&grid.z.nodes()[j.0..=j.1], &column);
        Hottest { value: sigma * s / (layer.volumetric_j_per_m3_k() * r * r), r, z }
    }

    /// Greatest rise of a layer's cross-section, its heat evened out across the layer, K.
    fn hottest_section(&self, layers: &[LayerHeat]) -> Hottest {
        let grid = &self.wall.grid;
        let z = grid.z.nodes();
        let mut heat = vec![vec![0.0; grid.nz()]; layers.len()];
        let mut capacity = heat.clone();
        self.quarters(|q| {
            heat[q.layer][q.j] += q.heat;
            capacity[q.layer][q.j] += q.volume() * layers[q.layer].volumetric_j_per_m3_k();
        });
        let mut hottest = Hottest::default();
        for (heat, capacity) in heat.iter().zip(&capacity) {
            let Some(first) = capacity.iter().position(|&c| c > 0.0) else { continue };
            let last = capacity.iter().rposition(|&c| c > 0.0).unwrap_or(first);
            let rises: Vec<f64> =
                (first..=last).map(|j| if capacity[j] > 0.0 { heat[j] / capacity[j] } else { 0.0 }).collect();
            let (at, value) = peak(&z[first..=last], &rises);
            hottest = hottest.or(Hottest { value, r: 0.0, z: at });
        }
        hottest
    }

    /// Greatest rise on the bore's surface or the outside, without conduction, K; `None` where there is no such surface.
    fn hottest_surface(&self, layers: &[LayerHeat], inward: bool) -> Option<Hottest> {
        let nodes = self.on_nodes();
        let mut hottest: Option<Hottest> = None;
        for (k, layer) in layers.iter().enumerate() {
            let Some(span) = self.wall.span(k) else { continue };
            let (face, cell) = if inward { (span.i.0, span.i.0) } else { (span.i.1, span.i.1 - 1) };
            if face == 0 {
                continue;
            }
            let mut from = span.j.0;
            while from < span.j.1 {
                let to = (from..span.j.1).take_while(|&j| self.wall.is_surface((cell, j), inward)).count() + from;
                if to > from {
                    let here = self.hottest_along(&nodes, (k, layer), face, (from, to));
                    hottest = Some(hottest.map_or(here, |h| h.or(here)));
                }
                from = to + 1;
            }
        }
        hottest
    }
}

/// The thermal figures of one level: rises without conduction and the surfaces right after the event.
pub(crate) fn heat_figures(left: &HeatLeft, warming: &Warming, heat: f64, capacity: f64) -> Vec<LevelFigure> {
    let layers = &warming.layers;
    let every = layers.iter().enumerate();
    let hottest = every.map(|(k, l)| left.hottest_in(k, l)).fold(Hottest::default(), Hottest::or);
    let section = left.hottest_section(layers);
    let figure = |name, value, location| LevelFigure { name, unit: "K", value, location };
    let along = Some(Location { r_m: None, z_m: Some(section.z), t_s: None });
    let mut figures = vec![
        figure("temperature_rise_peak", hottest.value, hottest.at()),
        figure("temperature_rise_section_peak", section.value, along),
        figure("temperature_rise_mean", heat / capacity, None),
    ];
    if warming.duty.is_none() {
        let surfaces = [("surface_temperature_bore", true), ("surface_temperature_outside", false)];
        for (name, inward) in surfaces {
            if let Some(h) = left.hottest_surface(layers, inward) {
                figures.push(figure(name, warming.start_k + h.value, h.at()));
            }
        }
    }
    figures
}

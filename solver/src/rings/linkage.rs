//! df/dz: how the flux of the mover through each ring changes as the mover moves.
//!
//! A current sheet of radius R, length L and current per length K at height z has through a loop at z_r the flux slope
//! K (M(R, r, h - L/2) - M(R, r, h + L/2)), h = z_r - z: the mutual inductance of loops does it all. Averages over ring sections
//! are tabulated once by Chebyshev panels in h, relative accuracy about 1e-9.

use std::f64::consts::PI;

use crate::constants::MU0;
use crate::problem::Mover;
use crate::sources::{AxialField, Source};

use super::cell::Lattice;
use super::loops::mutual_inductance;
use super::points::GaussRule;

/// Chebyshev points a panel.
const POINTS: usize = 16;

/// Flux slopes of a mover through all rings of a wall.
pub(super) struct Linkage {
    rows: Vec<Row>,
}

/// One row of rings.
struct Row {
    /// Height of the first ring's middle, m.
    first: f64,
    pitch: f64,
    count: usize,
    table: Table,
}

/// Panels of Chebyshev coefficients over h.
struct Table {
    from: f64,
    width: f64,
    panels: Vec<[f64; POINTS]>,
}

impl Linkage {
    /// Tables for mover positions from `low` to `high`.
    pub fn new(lattices: &[Lattice], mover: &Mover, low: f64, high: f64) -> Self {
        let mut rows = Vec::new();
        for lattice in lattices {
            for radial in &lattice.radial {
                let first = lattice.axial(0).middle();
                let last = lattice.axial(lattice.count - 1).middle();
                let gap = mover.parts.iter().map(|p| clearance(p.source, radial.from, radial.to));
                let gap = gap.fold(f64::INFINITY, f64::min);
                let slope = |h: f64| section_average(mover, radial.from, radial.to, lattice.pitch, h, gap);
                let table = Table::new(slope, first - high, last - low, gap);
                rows.push(Row { first, pitch: lattice.pitch, count: lattice.count, table });
            }
        }
        Self { rows }
    }

    /// Writes df/dz of all rings for the mover at `z`, Wb/m.
    pub fn slopes(&self, z: f64, out: &mut [f64]) {
        let mut i = 0;
        for row in &self.rows {
            for n in 0..row.count {
                out[i] = row.table.at(row.first + row.pitch * n as f64 - z);
                i += 1;
            }
        }
    }
}

impl Table {
    fn new(slope: impl Fn(f64) -> f64, from: f64, to: f64, gap: f64) -> Self {
        let wanted = ((to - from) / gap).ceil().clamp(1.0, 100_000.0);
        let width = (to - from) / wanted;
        let mut panels = Vec::new();
        let mut left = from;
        while left < to - 0.5 * width {
            panels.push(coefficients(|x| slope(left + 0.5 * width * (x + 1.0))));
            left += width;
        }
        Self { from, width, panels }
    }

    /// Value at h, by Clenshaw's sum; beyond its ends the nearest panel is continued by its end value.
    fn at(&self, h: f64) -> f64 {
        let place = ((h - self.from) / self.width).clamp(0.0, self.panels.len() as f64 - 1e-12);
        #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped to the panels above")]
        let index = (place as usize).min(self.panels.len() - 1);
        let x = 2.0 * (place - index as f64) - 1.0;
        let c = &self.panels[index];
        let (mut b1, mut b2) = (0.0, 0.0);
        for k in (1..POINTS).rev() {
            (b1, b2) = (2.0 * x * b1 - b2 + c[k], b1);
        }
        x * b1 - b2 + c[0]
    }
}

/// Chebyshev coefficients of `f` on [-1, 1].
fn coefficients(f: impl Fn(f64) -> f64) -> [f64; POINTS] {
    let angle = |j: usize| PI * (j as f64 + 0.5) / POINTS as f64;
    let mut values = [0.0; POINTS];
    for (j, value) in values.iter_mut().enumerate() {
        *value = f(angle(j).cos());
    }
    let mut c = [0.0; POINTS];
    for (k, c) in c.iter_mut().enumerate() {
        let sum: f64 = values.iter().enumerate().map(|(j, v)| v * (k as f64 * angle(j)).cos()).sum();
        *c = sum * if k == 0 { 1.0 } else { 2.0 } / POINTS as f64;
    }
    c
}

/// Distance between a source's currents and a row of rings, m.
fn clearance(source: Source, from: f64, to: f64) -> f64 {
    let (inner, outer) = match source {
        Source::Dipole { .. } => (0.0, 0.0),
        Source::Magnet { inner_radius_m, outer_radius_m, .. } => {
            (if inner_radius_m > 0.0 { inner_radius_m } else { outer_radius_m }, outer_radius_m)
        }
        Source::Coil { inner_radius_m, outer_radius_m, .. } => (inner_radius_m, outer_radius_m),
    };
    (from - outer).max(inner - to)
}

/// Average of the flux slope over a ring's section, its middle `h` above the mover.
fn section_average(mover: &Mover, from: f64, to: f64, pitch: f64, h: f64, gap: f64) -> f64 {
    // Eight points a panel no longer than twice the gap.
    let rule = GaussRule::new(8);
    let panels = (0.5 * pitch / gap).ceil().max(1.0);
    let width = pitch / panels;
    let mut sum = 0.0;
    let mut low = h - 0.5 * pitch;
    while low < h + 0.5 * pitch - 0.5 * width {
        for (height, weight_z) in rule.on(low, low + width) {
            for (r, weight_r) in rule.on(from, to) {
                let each = mover.parts.iter().map(|p| slope(p.source, r, height - p.centre_m));
                // The flux falls as the mover comes nearer from below: 2 pi d psi/dz of the mover's own field with the other sign.
                let recoil =
                    mover.recoil.as_ref().map_or(0.0, |recoil| 2.0 * PI * r * recoil.flux_density_r(r, height));
                sum += weight_z * weight_r * (each.sum::<f64>() + recoil);
            }
        }
        low += width;
    }
    sum / (pitch * (to - from))
}

/// Flux slope of one part through a loop of radius r, h above the part's centre, Wb/m.
fn slope(source: Source, r: f64, h: f64) -> f64 {
    match source {
        Source::Dipole { moment_a_m2 } => {
            let distance = r.hypot(h);
            1.5 * MU0 * moment_a_m2 * r * r * h / distance.powi(5)
        }
        Source::Magnet { inner_radius_m, outer_radius_m, length_m, remanence_tesla } => {
            let outer = sheet(outer_radius_m, length_m, r, h);
            let inner = if inner_radius_m > 0.0 { sheet(inner_radius_m, length_m, r, h) } else { 0.0 };
            remanence_tesla / MU0 * (outer - inner)
        }
        Source::Coil { inner_radius_m, outer_radius_m, length_m, ampere_turns } => {
            let density = ampere_turns / (length_m * (outer_radius_m - inner_radius_m));
            let rule = GaussRule::new(10);
            density * rule.on(inner_radius_m, outer_radius_m).map(|(a, w)| w * sheet(a, length_m, r, h)).sum::<f64>()
        }
    }
}

/// Flux slope of a sheet of unit current per length.
fn sheet(radius: f64, length: f64, r: f64, h: f64) -> f64 {
    mutual_inductance(radius, r, h - 0.5 * length) - mutual_inductance(radius, r, h + 0.5 * length)
}

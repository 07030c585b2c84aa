//! Gauges read off the reaction on one grid: polynomials through the nodes around, of s = r^2 across and of z along, on the gauge's own side of
//! every face and end of the wall, where psi has kinks.
//!
//! With s = r^2, psi is smooth down to the axis, B_z = 2 d psi / ds there too, and B_r = -(1/r) d psi / dz. The mover's own field is no part
//! of it: it is added in closed form where the series is read.

use crate::operators::Operators;
use crate::problem::{Gauge, Layer, Station, Wall};
use crate::sources::gauss::rule;

/// Points across and along at most.
const ACROSS: usize = 8;
const ALONG: usize = 10;
/// Faces nearer than this share of the radius count as the gauge's own place.
const AT_FACE: f64 = 1.0e-9;
/// Sections of a search coil's length, of 16 Gauss points each, a radius of it at most.
const SECTIONS_A_RADIUS: f64 = 1.0;

/// Weights of nodes for a value and its derivative.
#[derive(Debug, Clone, Default)]
struct Weights {
    first: usize,
    value: Vec<f64>,
    slope: Vec<f64>,
}

/// One gauge on one grid.
#[derive(Debug, Clone)]
pub(super) struct Reader {
    gauge: Gauge,
    radius: f64,
    across: Weights,
    along: Weights,
    /// Conductivity where a current density is read, S/m.
    sigma: f64,
}

/// Series that a gauge records.
pub(super) fn channels(gauge: Gauge) -> usize {
    if gauge == Gauge::FluxDensity { 2 } else { 1 }
}

/// Heights over which a search coil is spread, with weights that sum to 1.
pub(super) fn turns_along(at: f64, radius: f64, length: f64) -> Vec<(f64, f64)> {
    if length <= 0.0 {
        return vec![(at, 1.0)];
    }
    let sections = (length / (SECTIONS_A_RADIUS * radius)).ceil().clamp(1.0, 200.0);
    let mut list = Vec::new();
    let mut k = 0.0;
    while k < sections {
        let (low, size) = (at - 0.5 * length + k * length / sections, length / sections);
        list.extend(rule(16).points.iter().map(|(x, w)| (low + 0.5 * size * (1.0 + x), 0.5 * w / sections)));
        k += 1.0;
    }
    list
}

impl Reader {
    /// The reader of `station` on the grid of `operators`.
    pub(super) fn new(station: &Station, operators: &Operators, wall: &Wall) -> Self {
        let (radius, at) = (station.radius_m, station.at_m);
        let (r, z) = (operators.grid.r.nodes(), operators.grid.z.nodes());
        let side = Side::new(station, wall);
        let squares: Vec<f64> = r.iter().map(|r| r * r).collect();
        let faces: Vec<f64> = wall.layers.iter().flat_map(|l| [l.inner_radius_m, l.outer_radius_m]).collect();
        let ends: Vec<f64> = wall.layers.iter().flat_map(|l| [l.from_m, l.to_m]).collect();
        let span = between(r, &faces, (radius, side.outward), AT_FACE * wall.outer_radius_m());
        let across = weights(&squares, span, ACROSS, radius * radius);
        let margin = AT_FACE * wall.outer_radius_m();
        let height = |h: f64| weights(z, between(z, &ends, (h, side.upward), margin), ALONG, h);
        let along = match station.gauge {
            Gauge::SearchCoil { length_m, .. } => {
                mean(turns_along(at, radius, length_m).into_iter().map(|(h, w)| (height(h), w)))
            }
            Gauge::FluxDensity | Gauge::CurrentDensity => height(at),
        };
        let sigma = conductivity_at(station, wall);
        Self { gauge: station.gauge, radius, across, along, sigma }
    }

    /// What it reads of the reaction `psi` at all nodes: B_r and B_z, or the linkage 2 pi turns psi.
    fn flux(&self, operators: &Operators, psi: &[f64]) -> [f64; 2] {
        let sum = |across: &[f64], along: &[f64]| -> f64 {
            let row = |(n, w): (usize, &f64)| -> f64 {
                let j = self.along.first + n;
                let nodes = across.iter().enumerate();
                w * nodes.map(|(m, v)| v * psi[operators.grid.node(self.across.first + m, j)]).sum::<f64>()
            };
            along.iter().enumerate().map(row).sum()
        };
        match self.gauge {
            Gauge::FluxDensity => {
                let radial =
                    if self.radius > 0.0 { -sum(&self.across.value, &self.along.slope) / self.radius } else { 0.0 };
                [radial, 2.0 * sum(&self.across.slope, &self.along.value)]
            }
            Gauge::SearchCoil { turns, .. } => {
                [std::f64::consts::TAU * turns * sum(&self.across.value, &self.along.value), 0.0]
            }
            Gauge::CurrentDensity => [0.0; 2],
        }
    }

    /// Current density of the reaction's part of the field, A/m2: sigma (E - own E), E = I / (G r) at the wall's nodes; `own` is the mover's part of
    /// r E there.
    fn current(&self, operators: &Operators, currents: &[f64], own: &dyn Fn(f64, f64) -> f64) -> f64 {
        if self.radius <= 0.0 {
            return 0.0;
        }
        let (r, z) = (operators.grid.r.nodes(), operators.grid.z.nodes());
        let wall = &operators.wall;
        let mut sum = 0.0;
        for row in &wall.rows {
            let Some(v) = row.i.checked_sub(self.across.first).and_then(|m| self.across.value.get(m)) else { continue };
            for (n, w) in self.along.value.iter().enumerate() {
                let j = self.along.first + n;
                let Some(k) = j.checked_sub(row.j).filter(|k| *k < row.count) else { continue };
                let node = row.start + k;
                if wall.conductance[node] > 0.0 {
                    sum += v * w * (currents[node] / wall.conductance[node] - own(r[row.i], z[j]));
                }
            }
        }
        self.sigma * sum / self.radius
    }
}

/// All gauges of a problem on one grid.
#[derive(Debug, Clone, Default)]
pub(super) struct Gauges {
    readers: Vec<Reader>,
}

impl Gauges {
    pub(super) fn new(stations: &[Station], operators: &Operators, wall: &Wall) -> Self {
        Self { readers: stations.iter().map(|s| Reader::new(s, operators, wall)).collect() }
    }

    /// Reads all, channel by channel. `own` is the mover's part of r E_phi at (r, z), V.
    pub(super) fn read(
        &self,
        operators: &Operators,
        (psi, currents): (&[f64], &[f64]),
        own: &dyn Fn(f64, f64) -> f64,
        mut put: impl FnMut(usize, f64),
    ) {
        let mut channel = 0;
        for reader in &self.readers {
            let values = match reader.gauge {
                Gauge::CurrentDensity => [reader.current(operators, currents, own), 0.0],
                _ => reader.flux(operators, psi),
            };
            for value in values.iter().take(channels(reader.gauge)) {
                put(channel, *value);
                channel += 1;
            }
        }
    }
}

/// On which side of a face or an end of the wall a gauge reads.
struct Side {
    outward: bool,
    upward: bool,
    layer: Option<usize>,
}

impl Side {
    /// Flux is read in free space where the gauge sits on a face or an end, between two layers in the outer one; a current in its layer.
    fn new(station: &Station, wall: &Wall) -> Self {
        let wants_layer = station.gauge == Gauge::CurrentDensity;
        let small = AT_FACE * wall.outer_radius_m() * 2.0;
        let sides = [(true, true), (true, false), (false, true), (false, false)];
        let at = |(outward, upward): (bool, bool)| {
            let step = |out: bool| if out { small } else { -small };
            layer_at(wall, station.radius_m + step(outward), station.at_m + step(upward))
        };
        let best = sides.into_iter().find(|s| at(*s).is_some() == wants_layer).unwrap_or((true, true));
        Self { outward: best.0, upward: best.1, layer: at(best) }
    }
}

/// Conductivity of the layer in which a current density is read, S/m.
pub(super) fn conductivity_at(station: &Station, wall: &Wall) -> f64 {
    Side::new(station, wall).layer.map_or(0.0, |k| wall.layers[k].conductivity_s_per_m)
}

/// The layer that (r, z) lies in.
pub(crate) fn layer_at(wall: &Wall, r: f64, z: f64) -> Option<usize> {
    let endless = wall.length_m().is_none();
    let holds =
        |l: &Layer| (l.inner_radius_m..l.outer_radius_m).contains(&r) && (endless || (l.from_m..l.to_m).contains(&z));
    wall.layers.iter().position(holds)
}

/// First and last node of the stretch between `breaks` that holds `s`, on the upper side where it lies on one.
fn between(nodes: &[f64], breaks: &[f64], (s, upper): (f64, bool), margin: f64) -> (usize, usize) {
    let side = if upper { s + 2.0 * margin } else { s - 2.0 * margin };
    let low = breaks.iter().copied().filter(|b| *b <= side).fold(f64::NEG_INFINITY, f64::max);
    let high = breaks.iter().copied().filter(|b| *b > side).fold(f64::INFINITY, f64::min);
    let first = nodes.partition_point(|x| *x < low - margin);
    let last = nodes.partition_point(|x| *x <= high + margin).saturating_sub(1);
    (first.min(last), last)
}

/// The polynomial through at most `most` of the nodes `span` that lie around `s`.
fn weights(nodes: &[f64], (low, high): (usize, usize), most: usize, s: f64) -> Weights {
    let count = (high - low + 1).min(most);
    let above = nodes.partition_point(|x| *x <= s);
    let first = above.saturating_sub(count / 2).clamp(low, high + 1 - count);
    let x = &nodes[first..first + count];
    let mut found = Weights { first, ..Weights::default() };
    for k in 0..count {
        let others = || (0..count).filter(move |m| *m != k);
        let scale: f64 = others().map(|m| x[k] - x[m]).product();
        let without = |skip: usize| others().filter(|m| *m != skip).map(|m| s - x[m]).product::<f64>();
        found.value.push(others().map(|m| s - x[m]).product::<f64>() / scale);
        found.slope.push(others().map(without).sum::<f64>() / scale);
    }
    found
}

/// The weighted sum of several.
fn mean(parts: impl Iterator<Item = (Weights, f64)>) -> Weights {
    let parts: Vec<(Weights, f64)> = parts.collect();
    let first = parts.iter().map(|(w, _)| w.first).min().unwrap_or(0);
    let last = parts.iter().map(|(w, _)| w.first + w.value.len()).max().unwrap_or(first);
    let mut sum = Weights { first, value: vec![0.0; last - first], slope: vec![0.0; last - first] };
    for (part, weight) in parts {
        for (n, (value, slope)) in part.value.iter().zip(&part.slope).enumerate() {
            sum.value[part.first - first + n] += weight * value;
            sum.slope[part.first - first + n] += weight * slope;
        }
    }
    sum
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn weights_keep_to_their_side_of_a_face() {
        let nodes = [0.0, 0.2, 0.5, 1.0, 1.3, 1.7, 2.0, 3.0];
        let (inside, outside) =
            (between(&nodes, &[1.0, 2.0], (1.0, true), 1e-9), between(&nodes, &[1.0, 2.0], (1.0, false), 1e-9));
        assert_eq!((inside, outside), ((3, 6), (0, 3)));
        let kinked = |x: f64| if x < 1.0 { x * x } else { 5.0 - 4.0 * x };
        for (span, s, slope) in [(inside, 1.0, -4.0), (outside, 1.0, 2.0), (outside, 0.3, 0.6)] {
            let w = weights(&nodes, span, 6, s);
            let value = |k: usize| {
                let x = nodes[w.first + k];
                if span == outside { x * x } else { kinked(x) }
            };
            let found: f64 = w.slope.iter().enumerate().map(|(k, v)| v * value(k)).sum();
            approx::assert_relative_eq!(found, slope, max_relative = 1e-11);
        }
    }

    #[test]
    fn a_long_coil_averages() {
        let turns = turns_along(0.5, 0.01, 0.05);
        let sum = |f: fn(f64) -> f64| turns.iter().map(|(z, w)| w * f(*z)).sum::<f64>();
        approx::assert_relative_eq!(sum(|_| 1.0), 1.0, max_relative = 1e-13);
        approx::assert_relative_eq!(sum(|z| z * z), 0.25 + 0.05 * 0.05 / 12.0, max_relative = 1e-12);
    }
}

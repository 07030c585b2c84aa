//! What gauges read over time: the reaction that each level recorded, the mover's own field in closed form, extrapolated, with bands.
//!
//! Band of a reading at an instant: [`STEPS`] times the greatest last step of the extrapolation within [`NEAR`] instants (two extrapolations may
//! agree by accident where a reading passes zero), half of what the boundary at half its distance changes, and [`FLOOR`] of the greatest reading
//! for the interpolation between nodes and steps.

use super::gauge::{channels, conductivity_at, turns_along};
use super::series::Series;
use crate::band::Ladder;
use crate::interpolate::{ALONG_POINTS, Stencil, greatest};
use crate::outcome::{Location, StationSeries, StationTrace};
use crate::problem::{Gauge, Problem, Station};
use crate::sources::AxialField;

/// Steps of the extrapolation that count.
const STEPS: f64 = 8.0;
/// Instants either way over which the greatest step counts.
const NEAR: usize = 6;
/// Share of what the nearer boundary changes.
const CUT: f64 = 0.5;
/// Share of the greatest reading.
const FLOOR: f64 = 1.0e-5;

/// The levels that were marched.
pub(super) struct Marched<'s> {
    pub(super) levels: Vec<&'s Series>,
    pub(super) cut: Option<&'s Series>,
    pub(super) factors: &'s [f64],
    /// Powers of the cell size at the corners of a permeable wall.
    pub(super) corners: Option<Vec<f64>>,
}

/// Name with the unit, unit and meaning of each reading of a gauge.
const FLUX_DENSITY: [(&str, &str, &str); 2] = [
    ("flux_density_r_T", "T", "radial flux density, outward positive"),
    ("flux_density_z_T", "T", "axial flux density, upward positive"),
];
const CURRENT_DENSITY: [(&str, &str, &str); 1] =
    [("current_density_phi_A_per_m2", "A/m2", "azimuthal current density, right-handed about +z")];
const SEARCH_COIL: [(&str, &str, &str); 1] =
    [("emf_V", "V", "electromotive force, -turns d(flux)/dt, right-handed about +z")];

/// One reading of one station.
struct Reading<'p> {
    problem: &'p Problem,
    station: &'p Station,
    /// Number of its series on a level.
    channel: usize,
    /// Which of its station's readings it is.
    part: usize,
    sigma: f64,
    turns: Vec<(f64, f64)>,
}

impl Reading<'_> {
    /// On one level at `t`.
    fn at(&self, series: &Series, t: f64) -> f64 {
        let recorded = &series.stations[self.channel];
        let (r, mover) = (self.station.radius_m, &self.problem.mover);
        let position = series.at(&series.position, t);
        let height = self.station.at_m - position;
        match self.station.gauge {
            Gauge::FluxDensity if self.part == 0 => series.mid_at(recorded, t) + mover.flux_density_r(r, height),
            Gauge::FluxDensity => series.mid_at(recorded, t) + mover.flux_density_z(r, height),
            // E_phi = -(1/r) d psi_s / dt = -v B_r.
            Gauge::CurrentDensity => {
                let own = -series.velocity_at(t) * mover.flux_density_r(r, height);
                series.mid_at(recorded, t) + self.sigma * own
            }
            Gauge::SearchCoil { turns, .. } => {
                let radial: f64 = self.turns.iter().map(|(z, w)| w * mover.flux_density_r(r, z - position)).sum();
                let own = std::f64::consts::TAU * turns * r * series.velocity_at(t) * radial;
                -(slope(&series.time_mid, recorded, t) + own)
            }
        }
    }

    fn ladder(&self, marched: &Marched<'_>, t: f64) -> Ladder {
        let values = marched.levels.iter().map(|s| self.at(s, t)).collect();
        match &marched.corners {
            Some(powers) => Ladder::beside_corners(marched.factors, values, powers),
            None => Ladder::new(marched.factors, values),
        }
    }

    /// What the nearer boundary changes at `t`.
    fn change(&self, marched: &Marched<'_>, t: f64) -> f64 {
        let coarsest = marched.levels.first().map_or(0.0, |s| self.at(s, t));
        marched.cut.map_or(0.0, |cut| (self.at(cut, t) - coarsest).abs())
    }

    fn series(
        &self,
        (name, unit, description): (&'static str, &'static str, &'static str),
        marched: &Marched<'_>,
        instants: &[f64],
        since: f64,
    ) -> StationSeries {
        let ladders: Vec<Ladder> = instants.iter().map(|&t| self.ladder(marched, t)).collect();
        let values: Vec<f64> = ladders.iter().map(|l| l.value).collect();
        let largest = values.iter().fold(0.0_f64, |m, v| m.max(v.abs()));
        let band = |k: usize| {
            let near = &ladders[k.saturating_sub(NEAR)..(k + NEAR + 1).min(ladders.len())];
            let step = near.iter().map(|l| l.step).fold(0.0, f64::max);
            STEPS * step + CUT * self.change(marched, instants[k]) + FLOOR * largest
        };
        let bands: Vec<f64> = (0..instants.len()).map(band).collect();
        let counts = |k: &usize| instants[*k] >= since;
        let best = (0..instants.len()).filter(counts).max_by(|&a, &b| values[a].abs().total_cmp(&values[b].abs()));
        let best = best.unwrap_or(0);
        let (low, high) = (best.saturating_sub(1), (best + 1).min(instants.len().saturating_sub(1)));
        let (from, to) = (instants.get(low).copied().unwrap_or(0.0), instants.get(high).copied().unwrap_or(0.0));
        let sharp =
            greatest(|t| self.ladder(marched, t).value.abs(), from, to, 1.0e-4 * (to - from).max(f64::MIN_POSITIVE));
        let ladder = self.ladder(marched, sharp);
        let around = bands.get(low..=high).unwrap_or_default();
        StationSeries {
            name,
            unit,
            description,
            peak: ladder.value,
            peak_band: around.iter().copied().fold(STEPS * ladder.step, f64::max),
            peak_at: Location { r_m: Some(self.station.radius_m), z_m: Some(self.station.at_m), t_s: Some(sharp) },
            peak_levels: ladder.levels,
            values,
            bands,
        }
    }
}

/// Slope of a series of step middles.
fn slope(times: &[f64], values: &[f64], t: f64) -> f64 {
    match times.len() {
        0 | 1 => 0.0,
        n if n < ALONG_POINTS => Stencil::<2>::at(times, t).slope_of(values),
        _ => Stencil::<ALONG_POINTS>::at(times, t).slope_of(values),
    }
}

/// What every station reads at `instants`; peaks count from `since` on.
pub(super) fn station_traces(
    problem: &Problem,
    marched: &Marched<'_>,
    (instants, position_m): (&[f64], &[f64]),
    since: f64,
) -> Vec<StationTrace> {
    let mut channel = 0;
    let mut traces = Vec::new();
    for station in &problem.stations {
        let parts: &[(&str, &str, &str)] = match station.gauge {
            Gauge::FluxDensity => &FLUX_DENSITY,
            Gauge::CurrentDensity => &CURRENT_DENSITY,
            Gauge::SearchCoil { .. } => &SEARCH_COIL,
        };
        let turns = match station.gauge {
            Gauge::SearchCoil { length_m, .. } => turns_along(station.at_m, station.radius_m, length_m),
            _ => Vec::new(),
        };
        let reading = |part: usize| Reading {
            problem,
            station,
            channel: channel + part,
            part,
            sigma: conductivity_at(station, &problem.wall),
            turns: turns.clone(),
        };
        let series = parts.iter().enumerate().map(|(k, about)| reading(k).series(*about, marched, instants, since));
        traces.push(StationTrace {
            name: station.name.clone(),
            at_m: station.at_m,
            radius_m: station.radius_m,
            what: station.gauge.word(),
            time_s: instants.to_vec(),
            position_m: position_m.to_vec(),
            series: series.collect(),
        });
        channel += channels(station.gauge);
    }
    traces
}

//! What gauges at fixed places read over time.

use super::{Basis, Figure, Location};

/// One reading of a gauge over time.
#[derive(Debug, Clone, PartialEq)]
pub struct StationSeries {
    /// Name with the unit, as `flux_density_z_T`.
    pub name: &'static str,
    /// SI unit.
    pub unit: &'static str,
    /// What it is.
    pub description: &'static str,
    /// Extrapolated values, one an instant.
    pub values: Vec<f64>,
    /// Half-widths of their bands.
    pub bands: Vec<f64>,
    /// Greatest magnitude over the run, signed as read there.
    pub peak: f64,
    /// Half-width of its band.
    pub peak_band: f64,
    /// The gauge's place, and when.
    pub peak_at: Location,
    /// The peak on each grid level, coarse to fine.
    pub peak_levels: Vec<f64>,
}

/// A gauge at a fixed place in the wall's frame, and what it reads.
#[derive(Debug, Clone, PartialEq)]
pub struct StationTrace {
    /// The user's name of it.
    pub name: String,
    /// Height, m.
    pub at_m: f64,
    /// Radius, m.
    pub radius_m: f64,
    /// What sort of gauge, in words.
    pub what: &'static str,
    /// Instants, s from the start.
    pub time_s: Vec<f64>,
    /// Position of the mover's reference point at each, m.
    pub position_m: Vec<f64>,
    /// Its readings.
    pub series: Vec<StationSeries>,
}

impl StationTrace {
    /// The peaks as figures, named as `station.gauge 1.flux_density_z_peak`.
    #[must_use]
    pub fn figures(&self) -> Vec<Figure> {
        let figure = |s: &StationSeries| Figure {
            name: format!("station.{}.{}_peak", self.name, StationSeries::stem(s.name)),
            value: s.peak,
            unit: s.unit,
            band: s.peak_band,
            basis: Basis::Extrapolated,
            location: Some(s.peak_at),
            levels: s.peak_levels.clone(),
        };
        self.series.iter().map(figure).collect()
    }
}

impl StationSeries {
    /// The name without its unit.
    fn stem(name: &'static str) -> &'static str {
        ["_A_per_m2", "_T", "_V"].into_iter().find_map(|unit| name.strip_suffix(unit)).unwrap_or(name)
    }
}

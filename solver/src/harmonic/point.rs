//! One frequency of all levels, extrapolated, with bands.

use std::f64::consts::PI;

use num_complex::Complex64;

use super::levels::{Levels, Reading};
use crate::band::{self, Ladder};
use crate::constants::MU0;
use crate::outcome::{CurrentSample, FrequencyPoint, Measured, Shielding};

/// Round-off of the impedance change that either part of it may carry, relative to the whole.
const ROUND_OFF: f64 = 1.0e-13;

/// A point, and the ladders of its two headline figures.
pub(super) struct Point {
    pub(super) point: FrequencyPoint,
    pub(super) resistance: Ladder,
    pub(super) reactance: Ladder,
    pub(super) by_heat: Ladder,
}

/// The point of frequency `k`; `alone` is the coils' inductance without the wall.
pub(super) fn point(levels: &Levels<'_>, k: usize, alone: Measured) -> Point {
    let frequency_hz = levels.law.frequencies_hz[k];
    let omega = 2.0 * PI * frequency_hz;
    let resistance = levels.read(k, |r| r.change.re);
    let reactance = levels.read(k, |r| r.change.im);
    let by_heat = levels.read(k, |r| r.by_heat);
    let residual = levels.residual(k);
    let floor = ROUND_OFF * resistance.value.hypot(reactance.value);
    let cut = levels.cut_change(k, |r| r.change.re);
    let band = band::two_routes(&resistance, &by_heat, cut, residual * resistance.value.abs() + floor);
    let resistance_change = Measured { value: resistance.value, band };
    let cut = levels.cut_change(k, |r| r.change.im);
    let band = band::one_route(&reactance, cut, residual * reactance.value.abs() + floor);
    let reactance_change = Measured { value: reactance.value, band };
    let reactance_ohm = omega * alone.value + reactance.value;
    let facing = levels.places.facing.map(|(line, _)| &levels.problem.wall.layers[levels.places.lines[line].layer]);
    let point = FrequencyPoint {
        frequency_hz,
        resistance_change,
        reactance_change,
        resistance_ohm: levels.law.winding_resistance_ohm + resistance.value,
        reactance_ohm,
        inductance_henry: reactance_ohm / omega,
        resistance_by_heat_ohm: by_heat.value,
        shielding: shielding(levels, k),
        skin_depth_m: facing
            .map(|l| (2.0 / (omega * MU0 * l.relative_permeability * l.conductivity_s_per_m)).sqrt())
            .filter(|d| d.is_finite()),
        current_depth: current_depth(levels, k),
        across: across(levels, k),
    };
    Point { point, resistance, reactance, by_heat }
}

/// A complex figure that all levels have.
fn complex(levels: &Levels<'_>, k: usize, of: impl Fn(&Reading) -> Complex64) -> (Complex64, f64) {
    let (real, imaginary) = (levels.read(k, |r| of(r).re), levels.read(k, |r| of(r).im));
    let cut = levels.cut_change(k, |r| of(r).norm());
    let value = Complex64::new(real.value, imaginary.value);
    let residual = levels.residual(k) * value.norm();
    let band = band::local(&real, cut, residual).hypot(band::local(&imaginary, 0.0, residual));
    (value, band)
}

fn shielding(levels: &Levels<'_>, k: usize) -> Option<Shielding> {
    let all = || levels.readings.iter().chain([&levels.cut]);
    if all().any(|r| r[k].shield.is_none()) {
        return None;
    }
    let (value, band) = complex(levels, k, |r| r.shield.unwrap_or(Complex64::ONE));
    Some(Shielding { real: value.re, imaginary: value.im, band })
}

fn current_depth(levels: &Levels<'_>, k: usize) -> Option<Measured> {
    let depths: Option<Vec<f64>> = levels.readings.iter().map(|r| r[k].depth).collect();
    let ladder = levels.ladder(depths?);
    Some(Measured { value: ladder.value, band: band::local(&ladder, 0.0, levels.residual(k) * ladder.value) })
}

fn across(levels: &Levels<'_>, k: usize) -> Vec<CurrentSample> {
    let mut samples = Vec::new();
    for (n, line) in levels.places.lines.iter().enumerate() {
        for (s, &r_m) in line.radii_m.iter().enumerate() {
            let (value, band) = complex(levels, k, |r| r.density[n][s]);
            samples.push(CurrentSample { layer: line.layer, r_m, real: value.re, imaginary: value.im, band });
        }
    }
    samples
}

//! Do the bands hold the truth? Drawn cases of all kinds against the Fourier-Bessel integral.

use lenzbore_solver::constants::MU0;
use lenzbore_solver::fault::SolveFault;
use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::problem::{Layer, Mover, Travel, Wall};
use lenzbore_solver::sources::Source as Field;

use super::field_fall::figure;
use super::{Check, Kind, Verdict};
use crate::references::integral;
use crate::side_by_side::side_by_side;
use crate::{Error, cases, endless};

pub(super) const CHECKS: &[Check] = &[Check {
    name: "field-coverage",
    about: "share of bands that hold the truth, and median band over median error, on drawn cases",
    kind: Kind::CodeVerification,
    source: &integral::SOURCE,
    run: coverage,
}];

/// Cases of the check: two bands of forty may miss. Fewer leave the ratio of medians to chance (12 to 41 over twenty cases, 12 to 19
/// over a hundred).
const CASES: u32 = 40;

/// What drawn cases say of the bands.
#[derive(Debug, Clone, PartialEq)]
pub struct Coverage {
    /// Error of the drag over the drag, by case.
    pub errors: Vec<f64>,
    /// Half-width of its band over the drag, by case.
    pub bands: Vec<f64>,
}

impl Coverage {
    /// Solves `cases` drawn cases at default settings on all cores and holds them against the integral; about half a second
    /// each on one core.
    ///
    /// # Errors
    /// A failure of either method, or a request to stop.
    pub fn study(cases: u32, seed: u64, monitor: &dyn Monitor) -> Result<Self, Error> {
        let drawn = drawn(cases, seed);
        let found = side_by_side(&drawn, monitor, |_| "drawn cases".to_owned(), error_and_band);
        Self::of(found.ok_or(SolveFault::Interrupted)?)
    }

    /// The same on one core.
    fn study_alone(cases: u32, seed: u64, monitor: &dyn Monitor) -> Result<Self, Error> {
        Self::of(drawn(cases, seed).iter().map(|case| error_and_band(case, monitor)).collect())
    }

    fn of(found: Vec<Result<(f64, f64), Error>>) -> Result<Self, Error> {
        let mut study = Self { errors: Vec::new(), bands: Vec::new() };
        for pair in found {
            let (error, band) = pair?;
            study.errors.push(error);
            study.bands.push(band);
        }
        Ok(study)
    }

    /// Whether each band holds the truth (known to 1e-10).
    pub fn holds(&self) -> impl Iterator<Item = bool> {
        self.errors.iter().zip(&self.bands).map(|(error, band)| *error <= *band + KNOWN_WITHIN)
    }

    /// Share of bands that do not hold the truth.
    #[must_use]
    pub fn missed(&self) -> f64 {
        self.holds().filter(|holds| !holds).count() as f64 / self.errors.len() as f64
    }

    /// At least 95 % of the bands hold the truth, and the median band is at most 30 times the median error.
    #[must_use]
    pub fn verdict(&self) -> Verdict {
        let mut verdict = Verdict::default();
        verdict.compare("share of bands that miss the truth", self.missed(), 0.0, MOST_MISSED, "1");
        verdict.compare("worst relative error", self.worst(), 0.0, WORST_ERROR, "1");
        verdict.compare("median band over median error", self.ratio(), 0.0, MOST_RATIO, "1");
        verdict
    }

    /// Medians of error and band.
    #[must_use]
    pub fn medians(&self) -> (f64, f64) {
        (median(&self.errors), median(&self.bands))
    }

    /// Greatest relative error.
    #[must_use]
    pub fn worst(&self) -> f64 {
        self.errors.iter().fold(0.0, |m: f64, e| m.max(*e))
    }

    /// Median band over median error.
    #[must_use]
    pub fn ratio(&self) -> f64 {
        median(&self.bands) / median(&self.errors)
    }
}

/// How well the integral knows the truth, relative.
const KNOWN_WITHIN: f64 = 1e-10;
/// Share of bands that may miss.
const MOST_MISSED: f64 = 0.05;
/// Median band over median error, at most.
const MOST_RATIO: f64 = 30.0;
/// Greatest error of any case.
const WORST_ERROR: f64 = 2e-4;
/// Seed of the cases drawn unless another is named.
pub const COVERAGE_SEED: u64 = 0x9e37_79b9_7f4a_7c15;

fn coverage(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    Ok(Coverage::study_alone(CASES, COVERAGE_SEED, monitor)?.verdict())
}

type Case = (Wall, Mover, f64);

fn drawn(cases: u32, seed: u64) -> Vec<Case> {
    let mut draw = Draw(seed.max(1));
    (0..cases).map(|_| draw.case()).collect()
}

/// Error and band of the drag, over the drag.
fn error_and_band((wall, mover, velocity): &Case, monitor: &dyn Monitor) -> Result<(f64, f64), Error> {
    let truth = endless::drag(wall, mover, *velocity)?.value;
    let travel = Travel::Steady { velocity_m_per_s: *velocity };
    let problem = cases::question(wall.clone(), mover.clone(), travel);
    let drag = figure(&lenzbore_solver::solve(&problem, monitor)?, "drag")?;
    Ok(((drag.value / truth - 1.0).abs(), drag.band / truth))
}

fn median(values: &[f64]) -> f64 {
    let mut values = values.to_vec();
    values.sort_by(f64::total_cmp);
    values[values.len() / 2]
}

/// A fixed sequence of numbers (xorshift, G. Marsaglia, Journal of Statistical Software 8(14), 2003).
struct Draw(u64);

impl Draw {
    /// Evenly between `low` and `high`.
    fn between(&mut self, low: f64, high: f64) -> f64 {
        self.0 ^= self.0 << 13;
        self.0 ^= self.0 >> 7;
        self.0 ^= self.0 << 17;
        low + (high - low) * (self.0 >> 11) as f64 / (1_u64 << 53) as f64
    }

    /// Evenly in the logarithm.
    fn scale(&mut self, low: f64, high: f64) -> f64 {
        self.between(low.ln(), high.ln()).exp()
    }

    /// Wall, mover and velocity: bores of 4 to 30 mm radius, one to three layers, permeability 1 to 200, dipoles, cylinders,
    /// rings, coils and stacks, magnetic Reynolds numbers 0.01 to 100.
    fn case(&mut self) -> (Wall, Mover, f64) {
        let bore = self.scale(4e-3, 30e-3);
        let wall = cases::endless(self.layers(bore));
        let gap = bore * self.scale(0.05, 0.5);
        let mover = self.mover(bore - gap);
        let loss: f64 = (wall.layers.iter())
            .map(|l| MU0 * l.conductivity_s_per_m * l.relative_permeability * l.thickness_m())
            .sum();
        let speed = self.scale(0.01, 100.0) / loss;
        (wall, mover, if self.between(0.0, 1.0) < 0.5 { speed } else { -speed })
    }

    fn layers(&mut self, bore: f64) -> Vec<Layer> {
        let mut reached = bore;
        let mut layers = Vec::new();
        let more = self.between(0.0, 1.0);
        for index in 0..3 {
            if index > 0 && more < [1.0, 0.5, 0.8][index] {
                break;
            }
            let from = if self.between(0.0, 1.0) < 0.5 { reached } else { reached + bore * self.between(0.02, 0.2) };
            let from = if index == 0 { bore } else { from };
            reached = from + bore * self.scale(0.05, 0.6);
            let permeable = self.between(0.0, 1.0) < 0.3;
            let mu = if permeable { self.scale(2.0, 200.0) } else { 1.0 };
            layers.push(cases::layer(&format!("layer {index}"), (from, reached), self.scale(1e6, 60e6), mu));
        }
        layers
    }

    fn mover(&mut self, outer: f64) -> Mover {
        let length = outer * self.scale(0.4, 4.0);
        match self.between(0.0, 5.0) {
            x if x < 1.0 => cases::dipole(self.scale(0.1, 10.0)),
            x if x < 2.0 => cases::cylinder(outer, length, 1.2),
            x if x < 3.0 => cases::stack(outer, length, 1.2, &[1.0, -1.0, 1.0], 0.3 * length),
            x if x < 4.0 => {
                let inner_radius_m = outer * self.between(0.3, 0.8);
                let ring =
                    Field::Magnet { inner_radius_m, outer_radius_m: outer, length_m: length, remanence_tesla: -1.1 };
                cases::mover(vec![cases::part("ring", 0.1 * length, ring)])
            }
            _ => {
                let inner_radius_m = outer * self.between(0.5, 0.9);
                let coil = Field::Coil { inner_radius_m, outer_radius_m: outer, length_m: length, ampere_turns: 500.0 };
                cases::mover(vec![cases::part("coil", 0.0, coil)])
            }
        }
    }
}

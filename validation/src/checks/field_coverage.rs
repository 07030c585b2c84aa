//! Do the bands hold the truth? Drawn cases of all kinds against the Fourier-Bessel integral.

use lenzbore_solver::constants::MU0;
use lenzbore_solver::monitor::Unwatched;
use lenzbore_solver::problem::{Layer, Mover, Travel, Wall};
use lenzbore_solver::sources::Source as Field;

use super::field_fall::figure;
use super::{Check, Kind, Verdict};
use crate::references::integral;
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
    /// Solves `cases` drawn cases at default settings and holds them against the integral; about half a second each.
    ///
    /// # Errors
    /// A failure of either method.
    pub fn study(cases: u32, seed: u64) -> Result<Self, Error> {
        let mut draw = Draw(seed.max(1));
        let mut study = Self { errors: Vec::new(), bands: Vec::new() };
        for _ in 0..cases {
            let (wall, mover, velocity) = draw.case();
            let truth = endless::drag(&wall, &mover, velocity)?.value;
            let problem = cases::question(wall, mover, Travel::Steady { velocity_m_per_s: velocity });
            let drag = figure(&lenzbore_solver::solve(&problem, &Unwatched)?, "drag")?;
            study.errors.push((drag.value / truth - 1.0).abs());
            study.bands.push(drag.band / truth);
        }
        Ok(study)
    }

    /// Share of bands that do not hold the truth (known to 1e-10).
    #[must_use]
    pub fn missed(&self) -> f64 {
        let missed = self.errors.iter().zip(&self.bands).filter(|(error, band)| **error > **band + 1e-10).count();
        missed as f64 / self.errors.len() as f64
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

fn coverage() -> Result<Verdict, Error> {
    let study = Coverage::study(CASES, 0x9e37_79b9_7f4a_7c15)?;
    let mut verdict = Verdict::default();
    verdict.compare("share of bands that miss the truth", study.missed(), 0.0, 0.05, "1");
    verdict.compare("worst relative error", study.worst(), 0.0, 2e-4, "1");
    verdict.compare("median band over median error", study.ratio(), 0.0, 30.0, "1");
    Ok(verdict)
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

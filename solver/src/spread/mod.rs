//! What the tolerances of the inputs make of a figure.
//!
//! Each input is varied alone, the others staying: the figure at a handful of offsets gives its slope at the nominal
//! value ([`slope_weights`]), its changes at both ends of the tolerance, and how far these depart from a straight line
//! ([`Response`]). The changes of independent inputs combine by root sum square (JCGM 100:2008, 5.1.2, equation 10, with
//! the actual changes in place of slope times half-width), or add up in the worst case ([`FigureSpread`]).
//! [`MonteCarlo`] sums up a run of random draws that moves all inputs at once, and so sees their interplay too.
//!
//! Half-widths are taken as 95 % of a normal distribution: 1.96 standard deviations.
//!
//! This module solves nothing: it says where to look ([`plan_offsets`], [`FigureSpread::corner`], [`Draws`]) and combines
//! what was found there.

mod combine;
mod draws;
mod monte_carlo;
mod offsets;
mod response;

pub use combine::{FigureSpread, Spread, rank};
pub use draws::Draws;
pub use monte_carlo::{MonteCarlo, Sampled};
pub use offsets::{OffsetPlan, plan_offsets, slope_weights};
pub use response::{Response, STRAIGHT};

/// Standard deviations in a half-width of 95 %.
pub const COVERAGE: f64 = 1.959_963_984_540_054;

/// An input with its tolerance.
#[derive(Debug, Clone, PartialEq)]
pub struct Input {
    /// Its word, as `wall.sleeve.thickness`.
    pub path: String,
    /// SI unit; empty for a pure number.
    pub unit: &'static str,
    /// Nominal value, SI.
    pub value: f64,
    /// Half-width below the nominal value, SI, >= 0.
    pub minus: f64,
    /// Half-width above, SI, >= 0.
    pub plus: f64,
    /// The tolerance as the user wrote it.
    pub written: String,
    /// Sizes that stay while this one is varied, where others follow.
    pub stays: Vec<String>,
    /// Sizes that follow.
    pub follows: Vec<String>,
}

impl Input {
    /// Whether a per cent of the value means something: not of a temperature (its zero is absolute) and not of zero.
    #[must_use]
    pub fn has_per_cent(&self) -> bool {
        self.unit != "K" && self.value.abs() > 0.0
    }

    /// The larger half-width.
    #[must_use]
    pub fn widest(&self) -> f64 {
        self.minus.max(self.plus)
    }
}

/// A figure in one solution: value and half-width of the numerical band.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Reading {
    /// Value.
    pub value: f64,
    /// Half-width of its numerical band.
    pub band: f64,
}

/// A figure at the nominal inputs.
#[derive(Debug, Clone, PartialEq)]
pub struct Nominal {
    /// Its name.
    pub name: String,
    /// SI unit.
    pub unit: &'static str,
    /// Value and band.
    pub reading: Reading,
}

#[cfg(test)]
mod tests;

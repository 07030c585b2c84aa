//! What the ladder answers.

use super::assumptions::Assumptions;
use super::effect::Effect;
use super::path::{ModelFigure, Simulated};
use crate::outcome::Outcome;

/// One rung: a model, and what it makes of the case.
#[derive(Debug, Clone, PartialEq)]
pub struct Rung {
    /// What it restores that the rung below leaves out.
    pub effect: Effect,
    /// The model in words.
    pub model: String,
    /// Its published source.
    pub source: &'static str,
    /// What the independent rings take for granted; none from the coupled rings on.
    pub assumptions: Option<Assumptions>,
    /// Its figures; those that the model has no answer for are missing.
    pub figures: Vec<ModelFigure>,
    /// Its travel, where the case has one (simplified models only; the field solution's is in its own outcome).
    pub travel: Option<Simulated>,
}

impl Rung {
    /// The value of a figure.
    #[must_use]
    pub fn figure(&self, name: &str) -> Option<f64> {
        self.figures.iter().find(|f| f.name == name).map(|f| f.value)
    }
}

/// What restoring an effect does to a figure.
#[derive(Debug, Clone, PartialEq)]
pub struct Step {
    /// The effect restored; several where no model between them has the figure.
    pub effects: Vec<Effect>,
    /// Figure before.
    pub before: f64,
    /// Figure after.
    pub after: f64,
    /// (after - before) / |value at the top of the ladder|.
    pub worth: f64,
}

/// One headline figure up the ladder.
#[derive(Debug, Clone, PartialEq)]
pub struct FigureLadder {
    /// Name as in a run's summary.
    pub name: String,
    /// SI unit.
    pub unit: &'static str,
    /// Value at each rung, in the order of [`LadderOutcome::rungs`]; none where the model has no answer.
    pub values: Vec<Option<f64>>,
    /// What each rung with an answer is worth.
    pub steps: Vec<Step>,
    /// Index into `steps` of the one that moves the figure most.
    pub dominant: Option<usize>,
    /// Value at the top: the field solution.
    pub top: f64,
    /// Half-width of its numerical band.
    pub band: f64,
}

/// Two large errors that nearly cancel in a small one.
#[derive(Debug, Clone, PartialEq)]
pub struct Cancelling {
    /// Effects whose absence makes the figure too high.
    pub high_effects: Vec<Effect>,
    /// By how much together, relative to the top, > 0.
    pub high: f64,
    /// Effects whose absence makes it too low.
    pub low_effects: Vec<Effect>,
    /// By how much together, relative to the top, < 0.
    pub low: f64,
}

/// How far a quick model is off in one figure, and why.
#[derive(Debug, Clone, PartialEq)]
pub struct QuickError {
    /// Name as in a run's summary.
    pub name: String,
    /// SI unit.
    pub unit: &'static str,
    /// The quick model's value.
    pub value: f64,
    /// (value - top) / |top|: positive where the model says too much.
    pub error: f64,
    /// What restoring each effect that it leaves out is worth, from this model to the top: `error` is minus the sum of `worth`.
    pub causes: Vec<Step>,
    /// Set where a small error is two large ones cancelling.
    pub cancelling: Option<Cancelling>,
}

/// A model that quick calculators use, held against the top of the ladder.
#[derive(Debug, Clone, PartialEq)]
pub struct QuickModel {
    /// Which.
    pub assumptions: Assumptions,
    /// Figures that it has an answer for.
    pub errors: Vec<QuickError>,
    /// Its travel, where the case has one.
    pub travel: Option<Simulated>,
    /// Where it may be used: in an endless wall of this design, one sweep at a time.
    pub ranges: Vec<Range>,
}

/// A quantity that is swept to see how far a quick model reaches.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Swept {
    /// Speed of travel, m/s.
    Speed,
    /// Wall thickness over bore radius (a rod: over its radius); the face towards the mover stays.
    ThicknessRatio,
    /// Scale of all magnets, radius and length, with the distances of their centres; 1 is the design.
    MagnetScale,
}

impl Swept {
    /// Name in results.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            Self::Speed => "speed",
            Self::ThicknessRatio => "wall thickness / bore radius",
            Self::MagnetScale => "magnet size / its size in this design",
        }
    }
}

/// Error of a quick model's drag along one sweep, and where it stays small.
#[derive(Debug, Clone, PartialEq)]
pub struct Range {
    /// What is swept; everything else is the design's.
    pub swept: Swept,
    /// Value of the design on this axis.
    pub here: f64,
    /// (value, relative error of the drag), increasing.
    pub errors: Vec<(f64, f64)>,
    /// Where the error stays inside each tolerance.
    pub inside: Vec<Inside>,
}

/// Where a quick model's error stays inside a tolerance.
#[derive(Debug, Clone, PartialEq)]
pub struct Inside {
    /// Tolerance, relative.
    pub tolerance: f64,
    /// Intervals of the swept quantity; empty where there is none.
    pub intervals: Vec<Interval>,
}

/// One interval in which the error stays inside a tolerance.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Interval {
    /// Lower end.
    pub from: f64,
    /// Upper end.
    pub to: f64,
    /// The sweep itself begins here: the interval may reach further down (a speed: to rest).
    pub open_below: bool,
    /// The sweep itself ends here: the interval may reach further up.
    pub open_above: bool,
    /// Inside only while two larger errors pass through a cancellation: the error is beyond the tolerance on both sides with
    /// opposite signs.
    pub by_cancellation: bool,
}

/// A speed at which the field solution's drag has fallen below the law of low speed, c v with c from resistance alone.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct FallsBelow {
    /// By this share of what the law says: drag = (1 - share) c v.
    pub share: f64,
    /// The speed, m/s.
    pub speed_m_per_s: f64,
    /// mu0 sum(sigma mu_r w) times it.
    pub magnetic_reynolds: f64,
}

/// Error of the ring sums over speed and wall thickness, endless wall.
#[derive(Debug, Clone, PartialEq)]
pub struct ErrorMap {
    /// Speeds, m/s, increasing.
    pub speeds_m_per_s: Vec<f64>,
    /// Wall thickness over bore radius (a rod: over its radius), increasing.
    pub thickness_ratios: Vec<f64>,
    /// Models and their relative errors of drag, `[thickness][speed]`.
    pub errors: Vec<(Assumptions, Vec<Vec<f64>>)>,
    /// The design: speed, m/s, and thickness ratio.
    pub here: (f64, f64),
}

/// An effect that the ladder of this case does not have, and why.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Skipped {
    /// What in plain words.
    pub what: &'static str,
    /// Why.
    pub why: String,
}

/// The whole ladder of a case.
#[derive(Debug, Clone, PartialEq)]
pub struct LadderOutcome {
    /// Rungs from the foot to the top.
    pub rungs: Vec<Rung>,
    /// Headline figures of the law of travel, and the damping coefficient at zero speed in an endless wall.
    pub figures: Vec<FigureLadder>,
    /// Quick models beside the ladder.
    pub quick: Vec<QuickModel>,
    /// Speeds at which the drag has fallen 1, 2, 5 and 10 % below the law of low speed, in an endless wall.
    pub falls_below: Vec<FallsBelow>,
    /// Error of the quick models over speed and wall thickness.
    pub map: Option<ErrorMap>,
    /// Effects that are not on this ladder.
    pub skipped: Vec<Skipped>,
    /// The top: what `run` gives, or for a curve what `curve` gives.
    pub top: Outcome,
}

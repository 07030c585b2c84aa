//! Everything around the figures.

use super::{Fields, Figure, FrequencyResponse, SlottedDrag, StationTrace, StrokeResponse, Sweeps, Thermal};

/// Drag by three routes at one instant, N, each with the same meaning: positive opposes the motion.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Forces {
    /// J x B over the wall.
    pub wall_newton: f64,
    /// Reaction field on the mover's equivalent currents.
    pub mover_newton: f64,
    /// Maxwell stress on cylinders in the running gap.
    pub stress_newton: f64,
    /// Half-width within which the three must agree.
    pub band_newton: f64,
    /// Whether they do.
    pub agree: bool,
    /// Instant, s (0 for settled fields).
    pub time_s: f64,
}

/// Where the work went, J (settled fields: W).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Ledger {
    /// Work done against the drag.
    pub work: f64,
    /// Heat in the wall.
    pub heat: f64,
    /// Change of field energy.
    pub field_energy: f64,
    /// (work - heat - field energy) / the largest of the three.
    pub imbalance_relative: f64,
    /// `J` or, for settled fields, `W`.
    pub unit: &'static str,
}

/// Dimensionless numbers that say which effects matter.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Regime {
    /// Total wall thickness / bore radius (rod: / rod radius).
    pub thickness_ratio: f64,
    /// Running gap / bore radius.
    pub gap_ratio: f64,
    /// Magnetic Reynolds number mu0 sum(sigma mu_r w) v at the characteristic speed.
    pub magnetic_reynolds: f64,
    /// Least skin or wake depth sqrt(2 lambda / (mu sigma v)) / layer thickness; none at rest.
    pub depth_ratio: Option<f64>,
    /// Characteristic speed used, m/s.
    pub speed_m_per_s: f64,
}

/// One grid level.
#[derive(Debug, Clone, PartialEq)]
pub struct GridReport {
    /// Refinement factor f relative to the coarsest level.
    pub refinement: f64,
    /// Nodes along r.
    pub nodes_r: usize,
    /// Nodes along z.
    pub nodes_z: usize,
    /// Fewest cells across any layer.
    pub cells_across_wall: usize,
    /// Cells across the least skin or wake depth; none at rest.
    pub cells_across_depth: Option<f64>,
    /// Largest ratio of neighbouring cells.
    pub growth: f64,
    /// Largest aspect ratio of a wall cell.
    pub aspect: f64,
    /// Time steps taken (0 for settled fields).
    pub steps: usize,
    /// Largest relative residual after a linear solve.
    pub residual: f64,
}

/// Whole-number work counters, so that a silent change of algorithm shows.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub struct WorkCounters {
    /// Cholesky factorisations.
    pub factorisations: usize,
    /// Back-solves (right-hand sides).
    pub solves: usize,
    /// Time steps.
    pub steps: usize,
    /// Recurrence vectors.
    pub recurrence: usize,
}

/// A caution, in the user's words.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Caution {
    /// One sentence or two.
    pub text: String,
}

/// Why a run ended.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Stop {
    /// Settled fields: nothing to end.
    Settled,
    /// The end of travel was reached.
    EndOfTravel,
    /// The time limit was reached first.
    TimeLimit,
    /// The mover came to rest and stays there.
    AtRest,
    /// The mover left the wall's field, away from the end of travel, and nothing brings it back.
    OutOfReach,
}

impl Stop {
    /// The words used in results.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            Self::Settled => "settled",
            Self::EndOfTravel => "end of travel",
            Self::TimeLimit => "time limit",
            Self::AtRest => "at rest",
            Self::OutOfReach => "out of reach of wall and end of travel",
        }
    }
}

/// The series of a run; empty for settled fields. Columns have equal length.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Trace {
    /// Time from the start, s.
    pub time_s: Vec<f64>,
    /// Position of the reference point, m.
    pub position_m: Vec<f64>,
    /// Signed velocity, m/s.
    pub velocity_m_per_s: Vec<f64>,
    /// Drag, N, positive against the motion.
    pub drag_newton: Vec<f64>,
    /// Half-width of its band, N.
    pub drag_band_newton: Vec<f64>,
    /// Heat rate in the wall, W.
    pub heat_watt: Vec<f64>,
}

/// One point of a drag-speed curve.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct DragPoint {
    /// Speed, m/s.
    pub speed_m_per_s: f64,
    /// Drag, N.
    pub drag_newton: f64,
    /// Half-width of its band, N.
    pub band_newton: f64,
    /// Heat in the wall by its own route, W.
    pub heat_watt: f64,
    /// Peak current density, A/m2.
    pub current_density_peak: f64,
    /// Half-width of its band, A/m2.
    pub current_density_band: f64,
}

/// Drag against speed with settled fields.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct DragCurve {
    /// Points in order of speed.
    pub points: Vec<DragPoint>,
}

/// Whether the wanted accuracy was met.
#[derive(Debug, Clone, PartialEq)]
pub struct Accuracies {
    /// Wanted relative half-width; a hundred times as wide for a local figure (`current_density_peak`).
    pub target_relative: f64,
    /// Whether every headline figure meets it.
    pub met: bool,
    /// Figure furthest from its target, with its relative half-width.
    pub worst: Option<(String, f64)>,
    /// What would meet it, in the user's words, where it was missed.
    pub advice: Option<String>,
}

/// The whole answer.
#[derive(Debug, Clone, PartialEq)]
pub struct Outcome {
    /// Headline figures in the order they are shown.
    pub figures: Vec<Figure>,
    /// Three routes at the instant of greatest drag.
    pub forces: Option<Forces>,
    /// Energy ledger.
    pub ledger: Option<Ledger>,
    /// Which effects matter.
    pub regime: Regime,
    /// Grid levels, coarse to fine.
    pub grids: Vec<GridReport>,
    /// Work done.
    pub counters: WorkCounters,
    /// Cautions.
    pub cautions: Vec<Caution>,
    /// Why it ended.
    pub stop: Stop,
    /// Wanted accuracy.
    pub accuracy: Accuracies,
    /// The series.
    pub trace: Trace,
    /// Drag against speed, where a curve was asked.
    pub curve: Option<DragCurve>,
    /// What coils at rest see over frequency, where that was asked.
    pub frequency: Option<FrequencyResponse>,
    /// Small strokes over frequency, where the travel is a stroke.
    pub strokes: Option<StrokeResponse>,
    /// What a curve sweeps beside speed.
    pub sweeps: Sweeps,
    /// What gauges at fixed places read.
    pub stations: Vec<StationTrace>,
    /// How warm the wall gets, where that is known.
    pub thermal: Option<Thermal>,
    /// What full-length slots leave of the drag, where the wall has them.
    pub slotted: Option<SlottedDrag>,
    /// Fields, where they were asked.
    pub fields: Option<Fields>,
}

//! What accuracy is wanted, and when fields are kept.

/// Wanted accuracy and overrides of the automatic grids.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Accuracy {
    /// Wanted half-width of the band on each headline figure, relative to the figure (default 1e-4).
    pub target_relative: f64,
    /// Number of grid levels, 3 to 5 (default: 3, more where the target asks for it).
    pub levels: Option<usize>,
    /// Cells across each wall layer at the coarsest level, even, >= 4 (default: by the size rules).
    pub cells_across_wall: Option<usize>,
}

impl Default for Accuracy {
    fn default() -> Self {
        Self { target_relative: 1e-4, levels: None, cells_across_wall: None }
    }
}

/// When field snapshots are kept; unless none are, the instant of the greatest drag is among them.
#[derive(Debug, Clone, PartialEq, Default)]
pub enum SnapshotPlan {
    /// Never.
    None,
    /// At the instant of the greatest drag only (steady: the settled field).
    #[default]
    Automatic,
    /// Every so many metres of travel.
    EveryTravel {
        /// Travel between snapshots, m.
        step_m: f64,
    },
    /// Every so many seconds.
    EveryTime {
        /// Time between snapshots, s.
        step_s: f64,
    },
    /// At these instants, s from the start.
    Instants {
        /// Increasing instants, s.
        times_s: Vec<f64>,
    },
}

//! What is asked: wall, mover, travel, accuracy, all in SI units. [`Problem::faults`] says why a problem has no answer.

mod accuracy;
mod faces;
mod fault;
mod mover;
mod quantity;
mod reach;
mod station;
mod station_faults;
mod stroke;
mod travel;
mod validity;
mod wall;
mod warming;

pub use accuracy::{Accuracy, SnapshotPlan};
pub use fault::{Named, ProblemFault, Subject};
pub use mover::{Mover, Outline, Part};
pub use quantity::{Quantity, SensibleRange};
pub use station::{Gauge, Station};
pub use stroke::{MOST_CYCLES, MotionTable, Sine};
pub use travel::{Alternating, Free, Travel, Traverse};
pub use wall::{Extent, Layer, Wall};
pub use warming::{Cooling, Duty, LayerHeat, MOST_STOPS, Warming};

#[cfg(test)]
mod tests;

/// One question for the solver.
#[derive(Debug, Clone, PartialEq)]
pub struct Problem {
    /// The conductor at rest.
    pub wall: Wall,
    /// Everything that travels.
    pub mover: Mover,
    /// How it travels.
    pub travel: Travel,
    /// What accuracy is wanted, and overrides of the automatic grids.
    pub accuracy: Accuracy,
    /// When the fields are kept.
    pub snapshots: SnapshotPlan,
    /// Gauges at fixed places.
    pub stations: Vec<Station>,
    /// How the wall warms, where it is known; `None` leaves its temperature out.
    pub warming: Option<Warming>,
}

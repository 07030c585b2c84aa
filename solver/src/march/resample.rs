//! Snapshots of a march through windows, all on the whole grid.

use super::lines::LevelLines;
use super::transfer::{Heights, carry, resample};
use crate::fault::SolveFault;
use crate::fields::snapshot;
use crate::materials::Materials;
use crate::operators::Operators;
use crate::outcome::Snapshot;
use crate::problem::Problem;
use lenzbore_mesh::Regions;

/// The whole grid, onto which snapshots are carried.
pub(super) struct Resampler {
    pub(super) whole: Operators,
    ends: Vec<f64>,
}

/// One instant on the grid that the window has then.
pub(super) struct Instant<'x> {
    /// Reaction at all nodes.
    pub(super) psi: &'x [f64],
    /// Ring currents at the wall's nodes.
    pub(super) currents: &'x [f64],
    pub(super) time: f64,
    pub(super) position: f64,
}

impl Resampler {
    /// For the level of `lines`.
    ///
    /// # Errors
    /// A line that cannot be built.
    pub(super) fn new(problem: &Problem, lines: &LevelLines<'_>) -> Result<Self, SolveFault> {
        let grid = lines.grid(None)?;
        let materials = Materials::new(&problem.wall, &Regions::new(&grid, &lines.plan.rectangles));
        let ends = lines.rule().map_or_else(Vec::new, |rule| rule.ends().to_vec());
        Ok(Self { whole: Operators::new(grid, materials), ends })
    }

    /// The snapshot of `instant`, which stands on the grid of `operators`.
    pub(super) fn snapshot(&self, operators: &Operators, problem: &Problem, instant: &Instant<'_>) -> Snapshot {
        let (grid, whole) = (&operators.grid, &self.whole.grid);
        let (nr, mut psi) = (grid.nr(), vec![0.0; whole.nodes()]);
        let (mut column, mut carried) = (vec![0.0; grid.nz()], vec![0.0; whole.nz()]);
        for i in 1..nr - 1 {
            column.iter_mut().enumerate().for_each(|(j, x)| *x = instant.psi[grid.node(i, j)]);
            resample(grid.z.nodes(), &column, whole.z.nodes(), &self.ends, &mut carried);
            carried.iter().enumerate().for_each(|(j, x)| psi[whole.node(i, j)] = *x);
        }
        // What is smooth along the wall is the field that drives the rings, not their currents.
        let drive: Vec<f64> =
            instant.currents.iter().zip(&operators.wall.conductance).map(|(i, g)| over(*i, *g)).collect();
        let from = Heights { z: grid.z.nodes().to_vec(), wall: operators.wall.clone() };
        let mut currents = carry(&from, &drive, (whole.z.nodes(), &self.whole.wall), &self.ends);
        currents.iter_mut().zip(&self.whole.wall.conductance).for_each(|(i, g)| *i *= g);
        snapshot(&self.whole, problem, &psi, &currents, instant.time, instant.position)
    }
}

fn over(current: f64, conductance: f64) -> f64 {
    if conductance > 0.0 { current / conductance } else { 0.0 }
}

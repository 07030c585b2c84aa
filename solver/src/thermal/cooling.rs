//! One level of a wall that cools from one temperature.

use lenzbore_mesh::Refinement;

use super::grid::ThermalPlan;
use super::operator::HeatOperator;
use super::step::Period;
use crate::fault::SolveFault;
use crate::problem::{Wall, Warming};

/// Share of a first stretch's length that its shortest step is.
const FIRST: f64 = 1.0 / 4096.0;
/// Cells across a layer: a body that cools steeply wants more of them than a thin wall.
const ACROSS: f64 = 16.0;

/// How long to cool, and since when it has.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Duration {
    pub(crate) length_s: f64,
    pub(crate) passed_s: f64,
}

/// A level under way; temperatures over the ambient, 1 at the start.
pub(crate) struct CoolingLevel {
    operator: HeatOperator,
    refinement: Refinement,
    above: Vec<f64>,
}

impl CoolingLevel {
    pub(crate) fn new(wall: &Wall, warming: &Warming, refinement: Refinement) -> Result<Self, SolveFault> {
        let space = ThermalPlan::with_cells(wall, ACROSS)?.level(refinement);
        let operator = HeatOperator::new(space, &warming.layers, warming.cooling)?;
        Ok(Self { above: vec![1.0; operator.len()], operator, refinement })
    }

    /// Cools on. From the start the steps grow from a small part of the time; later they are an eighth of what has passed at most.
    pub(crate) fn cool(&mut self, duration: Duration) -> Result<(), SolveFault> {
        let Duration { length_s, passed_s } = duration;
        let first = if passed_s > 0.0 { (0.25 * passed_s).min(length_s) } else { FIRST * length_s };
        Period::new(&self.operator, length_s, first, self.refinement)?.conduct(
            &self.operator,
            &mut self.above,
            |_| (),
        )?;
        Ok(())
    }

    /// Values at the nodes nearest to `places`, and the mean.
    pub(crate) fn read(&self, places: impl Iterator<Item = (f64, f64)>) -> Vec<f64> {
        let grid = &self.operator.space.grid;
        let at = |(r, z): (f64, f64)| {
            let node = grid.node(grid.r.nearest(r), grid.z.nearest(z));
            self.operator.unknown[node].map_or(0.0, |u| self.above[u])
        };
        let stored: f64 = self.operator.capacity.iter().zip(&self.above).map(|(c, v)| c * v).sum();
        places.map(at).chain([stored / self.operator.total_capacity()]).collect()
    }
}

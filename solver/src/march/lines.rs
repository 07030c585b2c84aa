//! The grids that one level of a march goes through: the whole one, or one a window.

use lenzbore_mesh::{Grid, MeshFault, Refinement};

use super::window::{Window, WindowRule};
use crate::grid_rules::GridPlan;

/// The grids of one level.
#[derive(Debug, Clone)]
pub(crate) struct LevelLines<'a> {
    pub(crate) plan: &'a GridPlan,
    rule: Option<&'a WindowRule>,
    pub(crate) refinement: Refinement,
    /// With the boundary at half the distance.
    half: bool,
    whole: Grid,
}

impl<'a> LevelLines<'a> {
    /// The level `refinement` of `plan`, through windows where there is a rule for them.
    pub(crate) fn new(plan: &'a GridPlan, rule: Option<&'a WindowRule>, refinement: Refinement, half: bool) -> Self {
        Self { plan, rule, refinement, half, whole: plan.grid(refinement) }
    }

    /// The grid of `window`, or the whole one.
    ///
    /// # Errors
    /// A line that cannot be built.
    pub(crate) fn grid(&self, window: Option<Window>) -> Result<Grid, MeshFault> {
        let grid = match (self.rule, window) {
            (Some(rule), Some(window)) => {
                let z = rule.line(window, &self.whole.z, self.refinement)?;
                Grid { r: self.whole.r.clone(), z }
            }
            _ => self.whole.clone(),
        };
        Ok(if self.half { self.plan.halved(&grid) } else { grid })
    }

    /// The rule of the windows.
    pub(crate) fn rule(&self) -> Option<&'a WindowRule> {
        self.rule
    }
}

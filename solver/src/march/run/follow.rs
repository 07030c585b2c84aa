//! The window follows the mover: when it moves, and what is carried over.

use super::Run;
use crate::fault::SolveFault;
use crate::march::gauge::Gauges;
use crate::march::schedule::Schedule;
use crate::march::step::Stepper;
use crate::march::transfer::{Heights, carry};
use crate::march::window::Window;

impl Run<'_, '_> {
    /// Moves the window where it no longer has fine cells all around the mover.
    pub(super) fn follow(&mut self, schedule: &mut Schedule) -> Result<(), SolveFault> {
        let (Some(rule), Some(window)) = (self.level.lines.rule(), self.window) else { return Ok(()) };
        let direction = self.direction();
        if !rule.covers(window, self.state.position, direction) {
            let window = rule.choose(self.state.position, direction);
            schedule.move_window(window);
            self.enter(window)?;
        }
        Ok(())
    }

    /// Sense in which the mover travels, or is about to.
    fn direction(&self) -> f64 {
        let velocity = self.state.velocity;
        if velocity.abs() > 0.0 { velocity.signum() } else { self.state.first_acceleration().signum() }
    }

    /// Goes over to the grid of `window`: the reaction at the wall is carried along, the mover's own field is exact.
    pub(super) fn enter(&mut self, window: Window) -> Result<(), SolveFault> {
        let Some(rule) = self.level.lines.rule() else { return Ok(()) };
        let from = Heights { z: self.level.operators.grid.z.nodes().to_vec(), wall: self.level.operators.wall.clone() };
        let reaction: Vec<f64> = self.state.flux.iter().zip(&self.state.source).map(|(y, s)| y - s).collect();
        if let Some(heating) = &mut self.heating {
            heating.leave(self.level);
        }
        self.level.enter(window)?;
        if let Some(heating) = &mut self.heating {
            heating.enter(self.level);
        }
        let operators = &self.level.operators;
        let (wall, nodes) = (operators.wall.len(), operators.grid.nodes());
        let mut flux = carry(&from, &reaction, (operators.grid.z.nodes(), &operators.wall), rule.ends());
        let (mut source, mut slope) = (vec![0.0; wall], vec![0.0; wall]);
        self.level.fill_source(self.state.position, &mut source, &mut slope);
        flux.iter_mut().zip(&source).for_each(|(y, s)| *y += s);
        self.state = self.state.carried(flux, source);
        self.saved = self.state.clone();
        self.stepper = Stepper::new(self.level);
        self.currents = vec![0.0; wall];
        self.psi_nodes = vec![0.0; nodes];
        let problem = self.level.problem;
        self.gauges = Gauges::new(&problem.stations, &self.level.operators, &problem.wall);
        self.window = Some(window);
        Ok(())
    }
}

//! Which models of independent rings a case has, in which order they are climbed, and what each makes of it.

use super::assumptions::{Assumptions, EndModel, MagnetModel, WallModel};
use super::effect::Effect;
use super::path::{ModelFigure, Simulated};
use super::ring_sum::{RingSum, takes_dipoles};
use crate::fault::SolveFault;
use crate::monitor::Monitor;
use crate::problem::{Problem, Travel};
use crate::sources::Source;

/// What of the case the simplified models can tell apart.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Features {
    /// The mover runs inside the wall.
    pub dipoles: bool,
    /// Some part has a size.
    pub sized: bool,
    /// More than one part.
    pub neighbours: bool,
    /// The wall has ends and the travel passes through them.
    pub ends: bool,
}

impl Features {
    pub fn of(problem: &Problem) -> Self {
        let parts = &problem.mover.parts;
        Self {
            dipoles: takes_dipoles(problem),
            sized: parts.iter().any(|p| !matches!(p.source, Source::Dipole { .. })),
            neighbours: parts.len() > 1,
            ends: problem.wall.length_m().is_some() && !matches!(problem.travel, Travel::Steady { .. }),
        }
    }

    /// The same model in the form in which this case writes it.
    pub fn plain(self, mut assumptions: Assumptions) -> Assumptions {
        let finite = MagnetModel::Finite;
        if !self.ends {
            assumptions.ends = EndModel::Gradual;
        }
        // One magnet is alone in both dipole models: the rule keeps its name, the ring sum its own.
        let only = if assumptions.ends == EndModel::Switched { MagnetModel::LoneDipoles } else { MagnetModel::Dipoles };
        match assumptions.magnet {
            MagnetModel::Dipoles if !self.sized => assumptions.magnet = finite,
            MagnetModel::LoneDipoles if !self.sized && !self.neighbours => assumptions.magnet = finite,
            MagnetModel::LoneDipoles | MagnetModel::Dipoles if !self.neighbours => assumptions.magnet = only,
            _ => {}
        }
        assumptions
    }

    /// The rungs from `foot` up to all that independent rings can tell, each with the effect that it restores.
    pub fn climb(self, foot: Assumptions) -> Vec<(Effect, Assumptions)> {
        let mut now = foot;
        let mut rungs = vec![(Effect::Foot, self.plain(now))];
        let mut restore = |effect, change: &dyn Fn(&mut Assumptions)| {
            change(&mut now);
            let plain = self.plain(now);
            if rungs.last().is_none_or(|(_, last)| *last != plain) {
                rungs.push((effect, plain));
            }
        };
        if foot.magnet == MagnetModel::LoneDipoles {
            restore(Effect::Neighbours, &|a| a.magnet = MagnetModel::Dipoles);
        }
        restore(Effect::FiniteMagnet, &|a| a.magnet = MagnetModel::Finite);
        restore(Effect::WallThickness, &|a| a.wall = WallModel::Thickness);
        restore(Effect::FiniteLength, &|a| a.ends = EndModel::Gradual);
        rungs
    }

    /// The foot of the main ladder.
    pub fn foot(self) -> Assumptions {
        let magnet = if self.dipoles { MagnetModel::LoneDipoles } else { MagnetModel::Finite };
        Assumptions { magnet, ..Assumptions::DIPOLE_RULE }
    }

    /// The models that quick calculators use and this case can have, without doubles.
    pub fn quick(self) -> Vec<Assumptions> {
        let all = [
            Assumptions::DIPOLE_RULE,
            Assumptions::DIPOLE_RINGS_INNER,
            Assumptions::DIPOLE_RINGS_MEAN,
            Assumptions::RINGS_INNER,
            Assumptions::RINGS_MEAN,
            Assumptions::RESISTIVE,
        ];
        let mut kept: Vec<Assumptions> = Vec::new();
        for assumptions in all {
            let plain = self.plain(assumptions);
            if (self.dipoles || plain.magnet == MagnetModel::Finite) && !kept.contains(&plain) {
                kept.push(plain);
            }
        }
        kept
    }
}

/// What a model makes of the case.
#[derive(Debug, Clone)]
pub(super) struct Answer {
    pub assumptions: Assumptions,
    pub figures: Vec<ModelFigure>,
    pub travel: Option<Simulated>,
}

/// Answers already given, so that no model runs twice.
pub(super) struct Answers<'a> {
    problem: &'a Problem,
    /// Speed at which `drag_max` of a curve is read.
    critical: Option<f64>,
    given: Vec<Answer>,
}

impl<'a> Answers<'a> {
    pub fn new(problem: &'a Problem, critical: Option<f64>) -> Self {
        Self { problem, critical, given: Vec::new() }
    }

    pub fn of(&mut self, assumptions: Assumptions, monitor: &dyn Monitor) -> Result<Answer, SolveFault> {
        if let Some(found) = self.given.iter().find(|a| a.assumptions == assumptions) {
            return Ok(found.clone());
        }
        let model = RingSum::new(self.problem, assumptions)?;
        let at_rest = ModelFigure::new(AT_REST, "N s/m", model.damping_coefficient());
        let answer = match &self.problem.travel {
            Travel::Steady { velocity_m_per_s } => {
                let figures = match self.critical {
                    Some(speed) => vec![at_rest, ModelFigure::new("drag_max", "N", model.drag(speed))],
                    None => steady_figures(&model, *velocity_m_per_s),
                };
                Answer { assumptions, figures, travel: None }
            }
            Travel::Traverse(_) | Travel::Free(_) | Travel::Sine(_) | Travel::Table(_) | Travel::Alternating(_) => {
                let travel = model.travel(self.problem, monitor)?;
                let mut figures = travel.figures.clone();
                figures.push(at_rest);
                Answer { assumptions, figures, travel: Some(travel) }
            }
        };
        self.given.push(answer.clone());
        Ok(answer)
    }
}

/// The damping coefficient in an endless wall at zero speed, as a curve names it.
pub(super) const AT_REST: &str = "damping_coefficient_zero_speed";

/// Figures of `steady` by independent rings; signs as in a run.
fn steady_figures(model: &RingSum, velocity: f64) -> Vec<ModelFigure> {
    let (c, speed) = (model.damping_coefficient(), velocity.abs());
    vec![
        ModelFigure::new("drag", "N", c * speed),
        ModelFigure::new("damping_coefficient", "N s/m", c),
        ModelFigure::new("dissipated_power", "W", c * speed * speed),
        ModelFigure::new("current_density_peak", "A/m2", model.current_density_at(0.0) * speed),
    ]
}

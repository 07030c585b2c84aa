//! An event on the coarsest levels alone: what another temperature of the wall makes of its heat and its drag.

use lenzbore_mesh::Refinement;

use super::answer::{Journey, LevelRecord, Records};
use super::course::Course;
use super::figures::{LevelFigure, drag_peak, end_of, level_figures};
use super::heat_figures::heat_figures;
use super::heating::HeatLeft;
use super::series::Series;
use crate::fault::SolveFault;
use crate::monitor::{Monitor, Quiet};
use crate::outcome::{Caution, Outcome};
use crate::problem::Problem;
use crate::thermal::{self, Event};

/// What one level says of an event.
#[derive(Debug, Clone)]
pub(crate) struct CoarseEvent {
    /// Heat left in the wall, J.
    pub(crate) heat: f64,
    /// Greatest drag, N.
    pub(crate) drag_peak: f64,
    /// Where the heat was left.
    pub(crate) left: HeatLeft,
}

/// The event on the coarsest `levels` levels.
///
/// # Errors
/// See [`SolveFault`].
pub(crate) fn coarse_events(
    problem: &Problem,
    levels: usize,
    monitor: &dyn Monitor,
) -> Result<Vec<CoarseEvent>, SolveFault> {
    let quiet = Quiet { inner: monitor };
    let journey = Journey::new(problem)?;
    let mut records = journey.first(&quiet)?;
    for &refinement in Refinement::first(levels).iter().skip(1) {
        let finer = journey.replay(&records.schedule, refinement, false, &[], false, &quiet)?;
        records.levels.push(finer);
    }
    let events = records.levels.iter().filter_map(|l| journey.event(l, &records.course));
    Ok(events.collect())
}

impl Journey<'_> {
    /// All figures of a level, those of its warming included.
    pub(super) fn figures_of(&self, level: &LevelRecord, course: &Course) -> Vec<LevelFigure> {
        let mut figures = level_figures(self.problem, &level.series, course);
        if let (Some(warming), Some(left)) = (&self.problem.warming, left(level, course)) {
            let capacity = warming.heat_capacity_j_per_k(&self.problem.wall);
            figures.extend(heat_figures(&left, warming, heat_of(&level.series, course), capacity));
        }
        figures
    }

    /// What a level says of the event.
    fn event(&self, level: &LevelRecord, course: &Course) -> Option<CoarseEvent> {
        let left = left(level, course)?;
        Some(CoarseEvent { heat: heat_of(&level.series, course), drag_peak: drag_peak(&level.series, course).1, left })
    }

    /// Adds how warm the wall gets to an answer.
    ///
    /// # Errors
    /// Those of the heat equation, and of the event at other temperatures.
    pub(super) fn warm(
        &self,
        records: &Records,
        outcome: &mut Outcome,
        monitor: &dyn Monitor,
    ) -> Result<(), SolveFault> {
        let Some(warming) = &self.problem.warming else { return Ok(()) };
        let events: Vec<CoarseEvent> = records.levels.iter().filter_map(|l| self.event(l, &records.course)).collect();
        let (_, end) = end_of(&records.levels[0].series, &records.course);
        let event = Event { levels: events, duration_s: end - records.course.since };
        let warmed = thermal::warm(self.problem, warming, &event, &outcome.figures, monitor)?;
        outcome.figures.extend(warmed.figures);
        outcome.cautions.extend(warmed.cautions.into_iter().map(|text| Caution { text }));
        outcome.thermal = Some(warmed.thermal);
        Ok(())
    }
}

/// Heat left in the wall while the run counts, J.
fn heat_of(series: &Series, course: &Course) -> f64 {
    series.at(&series.heat, end_of(series, course).1) - series.at(&series.heat, course.since)
}

/// Where a level's heat was left.
fn left(level: &LevelRecord, course: &Course) -> Option<HeatLeft> {
    level.series.heat_left.clone().map(|left| left.scaled_to(heat_of(&level.series, course)))
}

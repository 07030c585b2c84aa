//! The climb: every rung in turn, the field solution last.

use super::assumptions::Assumptions;
use super::causes::{cancelling, dominant, steps};
use super::coupled_rings::{coupled, unmagnetic};
use super::design::endless;
use super::effect::Effect;
use super::models::{AT_REST, Answer, Answers, Features};
use super::outcome::{FigureLadder, LadderOutcome, QuickError, QuickModel, Rung, Skipped};
use super::path::ModelFigure;
use super::share::Share;
use super::sources;
use super::sweeps::{Designs, Sweeps};
use crate::fault::SolveFault;
use crate::monitor::Monitor;
use crate::outcome::Outcome;
use crate::problem::{Problem, SnapshotPlan, Travel};

/// What the ladder is climbed for.
#[derive(Debug, Clone, Copy)]
pub struct Question<'a> {
    /// The case.
    pub problem: &'a Problem,
    /// The same case with wall and mover at 20 degC, where it is not there anyway.
    pub at_20_degc: Option<&'a Problem>,
    /// Speeds of a curve (m/s, endless wall), instead of the problem's travel.
    pub speeds_m_per_s: Option<&'a [f64]>,
}

/// Climbs the ladder of a problem's law of travel.
///
/// # Errors
/// As [`crate::solve`].
pub fn ladder(problem: &Problem, monitor: &dyn Monitor) -> Result<LadderOutcome, SolveFault> {
    climb(&Question { problem, at_20_degc: None, speeds_m_per_s: None }, monitor)
}

/// Climbs the ladder of a question: simplified models, coupled rings, the field solution, sweeps of the quick models' errors.
///
/// The last rung is what [`crate::solve`] or [`crate::drag_curve`] gives. Cost: that solution, one more for each of
/// permeability and temperature where the case has them, seconds for the coupled rings, and some 25 coarse settled solutions.
///
/// # Errors
/// As [`crate::solve`].
pub fn climb(question: &Question<'_>, monitor: &dyn Monitor) -> Result<LadderOutcome, SolveFault> {
    let share = |from, to, doing| Share { inner: monitor, from, to, doing };
    let seen = question.at_20_degc.unwrap_or(question.problem);
    let top = question.solve(question.problem, &share(0.0, 0.4, "field solution"))?;
    let critical = question.speeds_m_per_s.map(|speeds| critical_speed(&top, speeds));
    let features = Features::of(seen);
    // Quick models take magnets with recoil permeability 1.
    let plain = Problem { mover: seen.mover.without_recoil(), ..seen.clone() };
    let mut answers = Answers::new(&plain, critical);
    let mut rungs = Vec::new();
    for (effect, assumptions) in features.climb(features.foot()) {
        let answer = answers.of(assumptions, monitor)?;
        rungs.push(ring_rung(effect, answer));
    }
    rungs.extend(question.upper_rungs(seen, &top, &share(0.4, 0.7, "coupled rings and simpler fields"))?);
    let here = speed_here(question, &top);
    let quick = features.quick();
    let sweeps = sweeps(question, seen, here, &quick, &share(0.7, 1.0, "reach of the quick models"))?;
    let mut figures = headline(&top);
    if let Some(sweeps) = sweeps.as_ref().filter(|_| features.ends) {
        add_at_rest(&mut rungs, &mut figures, sweeps.at_rest);
    }
    let above: Vec<Rung> = rungs.iter().filter(|r| r.assumptions.is_none()).cloned().collect();
    let mut models = Vec::new();
    for (k, &assumptions) in quick.iter().enumerate() {
        let mut path = Vec::new();
        for (effect, assumptions) in features.climb(assumptions) {
            path.push(ring_rung(effect, answers.of(assumptions, monitor)?));
        }
        path.extend(above.iter().cloned());
        let ranges = sweeps.as_ref().and_then(|s| s.ranges.get(k).cloned()).unwrap_or_default();
        models.push(quick_model(assumptions, path, &figures, ranges));
    }
    monitor.progress(1.0, "ladder");
    Ok(LadderOutcome {
        figures: figures.iter().map(|f| figure_ladder(f, &rungs)).collect(),
        skipped: skipped(question, features, sweeps.is_some()),
        falls_below: sweeps.as_ref().map(|s| s.falls_below.clone()).unwrap_or_default(),
        map: sweeps.and_then(|s| s.map),
        rungs,
        quick: models,
        top,
    })
}

/// A figure at the top: name, unit, value, band.
struct Headline {
    name: String,
    unit: &'static str,
    value: f64,
    band: f64,
}

impl Question<'_> {
    fn solve(&self, problem: &Problem, monitor: &dyn Monitor) -> Result<Outcome, SolveFault> {
        match self.speeds_m_per_s {
            Some(speeds) => crate::drag_curve(problem, speeds, monitor),
            // How warm the wall gets is no rung.
            None => crate::solve(&Problem { warming: None, ..problem.clone() }, monitor),
        }
    }

    /// Coupled rings and fields, those below the top without what the top adds.
    fn upper_rungs(&self, seen: &Problem, top: &Outcome, monitor: &dyn Monitor) -> Result<Vec<Rung>, SolveFault> {
        let mut rungs = Vec::new();
        let passage = seen.wall.length_m().is_some() && !matches!(seen.travel, Travel::Steady { .. });
        if passage {
            let plain = Problem { mover: seen.mover.without_recoil(), ..seen.clone() };
            rungs.push(coupled_rung(&plain, monitor)?);
        }
        let mut fields = vec![if passage { Effect::Field } else { Effect::Induction }];
        if seen.mover.recoil.is_some() {
            fields.push(Effect::RecoilPermeability);
        }
        if seen.wall.is_permeable() {
            fields.push(Effect::WallPermeability);
        }
        if self.at_20_degc.is_some() {
            fields.push(Effect::Temperature);
        }
        while let Some(effect) = fields.first().copied() {
            fields.remove(0);
            let outcome = if fields.is_empty() {
                top.clone()
            } else {
                let mut simpler = Problem { snapshots: SnapshotPlan::None, ..seen.clone() };
                if effect < Effect::WallPermeability {
                    simpler.wall = unmagnetic(&seen.wall);
                }
                if effect < Effect::RecoilPermeability {
                    simpler.mover = seen.mover.without_recoil();
                }
                self.solve(&simpler, monitor)?
            };
            rungs.push(field_rung(effect, &outcome));
        }
        Ok(rungs)
    }
}

fn ring_rung(effect: Effect, answer: Answer) -> Rung {
    Rung {
        effect,
        model: answer.assumptions.words(),
        source: sources::of_rings(answer.assumptions),
        assumptions: Some(answer.assumptions),
        figures: answer.figures,
        travel: answer.travel,
    }
}

fn coupled_rung(seen: &Problem, monitor: &dyn Monitor) -> Result<Rung, SolveFault> {
    let found = coupled(seen, monitor)?;
    Ok(Rung {
        effect: Effect::Induction,
        model: format!("{} rings coupled by mutual and self-inductance", found.rings),
        source: sources::COUPLED,
        assumptions: None,
        figures: found.simulated.figures.clone(),
        travel: Some(found.simulated),
    })
}

fn field_rung(effect: Effect, outcome: &Outcome) -> Rung {
    let model = match effect {
        Effect::RecoilPermeability => "field solution with the magnets' recoil permeability",
        Effect::WallPermeability => "field solution with the wall's permeability",
        Effect::Temperature => "field solution at the case's temperatures",
        _ => "field solution",
    };
    let figures = outcome.figures.iter().map(|f| ModelFigure::new(&f.name, f.unit, f.value)).collect();
    Rung { effect, model: model.to_owned(), source: sources::FIELD, assumptions: None, figures, travel: None }
}

fn headline(top: &Outcome) -> Vec<Headline> {
    let moving = top.figures.iter().filter(|f| f.value.abs() > 0.0);
    moving.map(|f| Headline { name: f.name.clone(), unit: f.unit, value: f.value, band: f.band }).collect()
}

/// Adds the damping coefficient in an endless wall to a passage: at zero speed, induction does nothing.
fn add_at_rest(rungs: &mut [Rung], figures: &mut Vec<Headline>, (value, band): (f64, f64)) {
    if let Some(last) = rungs.last_mut() {
        last.figures.push(ModelFigure::new(AT_REST, "N s/m", value));
    }
    figures.push(Headline { name: AT_REST.to_owned(), unit: "N s/m", value, band });
}

fn figure_ladder(figure: &Headline, rungs: &[Rung]) -> FigureLadder {
    let all: Vec<&Rung> = rungs.iter().collect();
    let steps = steps(&all, &figure.name, figure.value);
    FigureLadder {
        name: figure.name.clone(),
        unit: figure.unit,
        values: rungs.iter().map(|r| r.figure(&figure.name)).collect(),
        dominant: dominant(&steps),
        steps,
        top: figure.value,
        band: figure.band,
    }
}

fn quick_model(
    assumptions: Assumptions,
    path: Vec<Rung>,
    figures: &[Headline],
    ranges: Vec<super::outcome::Range>,
) -> QuickModel {
    let all: Vec<&Rung> = path.iter().collect();
    let error = |figure: &Headline| {
        let value = path.first()?.figure(&figure.name)?;
        let causes = steps(&all, &figure.name, figure.value);
        let error = (value - figure.value) / figure.value.abs();
        let cancelling = cancelling(error, &causes);
        Some(QuickError { name: figure.name.clone(), unit: figure.unit, value, error, causes, cancelling })
    };
    let errors = figures.iter().filter_map(error).collect();
    let travel = path.into_iter().next().and_then(|r| r.travel);
    QuickModel { assumptions, errors, travel, ranges }
}

/// The critical speed of a curve, or its fastest.
fn critical_speed(top: &Outcome, speeds: &[f64]) -> f64 {
    let figure = top.figures.iter().find(|f| f.name == "critical_speed").map(|f| f.value);
    figure.unwrap_or_else(|| speeds.iter().copied().fold(0.0, f64::max))
}

/// The speed at which the design is judged: its own, that of the greatest drag of a motion, a curve's critical speed.
fn speed_here(question: &Question<'_>, top: &Outcome) -> f64 {
    if let Some(speeds) = question.speeds_m_per_s {
        return critical_speed(top, speeds);
    }
    match &question.problem.travel {
        Travel::Steady { velocity_m_per_s } => velocity_m_per_s.abs(),
        Travel::Traverse(law) => law.speed_m_per_s,
        Travel::Alternating(_) => 0.0,
        Travel::Free(_) | Travel::Sine(_) | Travel::Table(_) => {
            let drag = &top.trace.drag_newton;
            let greatest = (0..drag.len()).max_by(|&a, &b| drag[a].total_cmp(&drag[b]));
            greatest.and_then(|k| top.trace.velocity_m_per_s.get(k)).map_or(0.0, |v| v.abs())
        }
    }
}

fn sweeps(
    question: &Question<'_>,
    seen: &Problem,
    here: f64,
    quick: &[Assumptions],
    monitor: &dyn Monitor,
) -> Result<Option<Sweeps>, SolveFault> {
    let (Some(truth), Some(mut seen)) = (endless(question.problem, here), endless(seen, here)) else {
        return Ok(None);
    };
    if here <= 0.0 || !truth.faults().is_empty() {
        return Ok(None);
    }
    seen.wall = unmagnetic(&seen.wall);
    seen.mover = seen.mover.without_recoil();
    Designs { truth: &truth, seen: &seen, here }.sweep(quick, monitor)
}

fn skipped(question: &Question<'_>, features: Features, swept: bool) -> Vec<Skipped> {
    let mut skipped = Vec::new();
    let mut add = |when: bool, what, why: &str| {
        if when {
            skipped.push(Skipped { what, why: why.to_owned() });
        }
    };
    let problem = question.problem;
    add(!features.dipoles, "dipole models", "the mover runs around the wall, where a point dipole stands for nothing");
    add(features.dipoles && !features.sized, "finite magnet", "the mover is a dipole in this case");
    add(!features.ends, "finite length", "settled fields have an endless wall");
    add(problem.mover.recoil.is_none(), "recoil permeability", "every magnet has recoil permeability 1");
    let permeable = problem.wall.is_permeable();
    add(!permeable, "wall permeability", "every layer has relative permeability 1");
    add(question.at_20_degc.is_none(), "temperature", "wall and mover are taken at the temperature of their data");
    add(true, "pole pieces and back iron", "not modelled yet");
    let sections =
        "no sweeps: the wall has sections, is at rest, or has nothing that conducts, so no endless wall stands for it";
    add(!swept, "range of the quick models", sections);
    skipped
}

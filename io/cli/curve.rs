//! `lenzbore curve`: what is swept, and how the answers come together.

use lenzbore_io::case::{CurvePlan, ResolvedCase};
use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::outcome::{AtStroke, AtTemperature, Figure, Outcome, Sweeps, Trace};
use lenzbore_solver::problem::{Problem, Travel};
use lenzbore_solver::{damping_against_position, drag_curve, settled_stroke};

use crate::end::End;
use crate::job::CaseInput;
use crate::memory;
use crate::spread::side_by_side;

/// The case's curve: over speed, over position; over strokes where it has nothing else.
pub fn answer(case: &ResolvedCase, monitor: &dyn Monitor) -> Result<(Problem, Outcome, Vec<String>), End> {
    let Some(plan) = case.curve.as_ref() else {
        return Err(End::Input(
            "the case has no [curve]; add\n  [curve]\n  speeds = [\"0.01 m/s\", \"50 m/s\"]\n  points = 40".to_owned(),
        ));
    };
    let mut all: Option<(Problem, Outcome)> = None;
    if let Some(problem) = case.curve_problem() {
        memory::require_of(case, &problem, plan.speeds_m_per_s.last().copied())?;
        let outcome = drag_curve(&problem, &plan.speeds_m_per_s, monitor)?;
        all = Some((problem, outcome));
    }
    if let Some(problem) = case.positions_problem() {
        memory::require_of(case, &problem, None)?;
        let outcome = damping_against_position(&problem, &plan.positions_m, monitor)?;
        all = Some(joined(all, (problem, outcome)));
    }
    if all.is_none() {
        all = strokes(case, plan, monitor)?;
    }
    let (problem, outcome) = all.ok_or_else(|| End::Input("the [curve] of the case is empty".to_owned()))?;
    Ok((problem, outcome, plan.cautions.clone()))
}

/// What stands beside it: the curve at other temperatures, strokes. Gives cautions that the case at its own temperature has not.
pub fn beside(
    input: &CaseInput,
    case: &ResolvedCase,
    outcome: &mut Outcome,
    monitor: &dyn Monitor,
) -> Result<Vec<String>, End> {
    let Some(plan) = case.curve.as_ref() else { return Ok(Vec::new()) };
    if outcome.sweeps.strokes.is_empty()
        && let Some((_, swept)) = strokes(case, plan, monitor)?
    {
        absorb(outcome, swept);
    }
    let mut cautions: Vec<String> = Vec::new();
    if !plan.temperatures_k.is_empty() {
        let (at, more) = temperatures(input, case, plan, monitor)?;
        outcome.sweeps.temperatures = at;
        cautions = more;
    }
    Ok(cautions)
}

/// The first answer, with the second beside it.
fn joined(first: Option<(Problem, Outcome)>, second: (Problem, Outcome)) -> (Problem, Outcome) {
    let Some((problem, mut outcome)) = first else { return second };
    absorb(&mut outcome, second.1);
    (problem, outcome)
}

/// Figures, sweeps and cautions of `other` go to `outcome`; the accuracy is met where both meet it.
fn absorb(outcome: &mut Outcome, other: Outcome) {
    outcome.figures.extend(other.figures);
    let Sweeps { temperatures, positions, length_m, strokes } = other.sweeps;
    outcome.sweeps.length_m = outcome.sweeps.length_m.or(length_m);
    outcome.sweeps.temperatures.extend(temperatures);
    outcome.sweeps.positions.extend(positions);
    outcome.sweeps.strokes.extend(strokes);
    let new: Vec<_> = other.cautions.into_iter().filter(|c| !outcome.cautions.contains(c)).collect();
    outcome.cautions.extend(new);
    if outcome.accuracy.met && !other.accuracy.met {
        outcome.accuracy = other.accuracy;
    }
}

/// The curve with wall and mover at each temperature, and what the case then says that it did not say before.
fn temperatures(
    input: &CaseInput,
    case: &ResolvedCase,
    plan: &CurvePlan,
    monitor: &dyn Monitor,
) -> Result<(Vec<AtTemperature>, Vec<String>), End> {
    let mut cases = Vec::new();
    let mut cautions: Vec<String> = Vec::new();
    for kelvin in &plan.temperatures_k {
        let sets = [format!("wall.temperature=\"{kelvin} K\""), format!("mover.temperature=\"{kelvin} K\"")];
        let hot = input.read(&sets)?;
        for caution in &hot.cautions {
            if !case.cautions.contains(caution) && !cautions.contains(caution) {
                cautions.push(caution.clone());
            }
        }
        cases.push((*kelvin, hot));
    }
    let own = case.curve_problem().ok_or_else(|| End::Input("temperatures of [curve] need speeds".to_owned()))?;
    let size = (&own, Some(plan.speeds_m_per_s.as_slice()));
    let at = side_by_side(&cases, size, monitor, "temperatures", &|(kelvin, hot), monitor| {
        let problem =
            hot.curve_problem().ok_or_else(|| End::Input("temperatures of [curve] need speeds".to_owned()))?;
        let outcome = drag_curve(&problem, &plan.speeds_m_per_s, monitor)?;
        Ok(AtTemperature {
            temperature_k: *kelvin,
            conductivities_s_per_m: problem.wall.layers.iter().map(|l| l.conductivity_s_per_m).collect(),
            figures: outcome.figures,
            points: outcome.curve.map(|c| c.points).unwrap_or_default(),
        })
    })?;
    Ok((at, cautions))
}

/// Every frequency with every amplitude, each followed until it settles.
fn strokes(case: &ResolvedCase, plan: &CurvePlan, monitor: &dyn Monitor) -> Result<Option<(Problem, Outcome)>, End> {
    let Some(swept) = &plan.strokes else { return Ok(None) };
    let mut all: Option<(Problem, Outcome)> = None;
    let total = swept.amplitudes_m.len() * swept.frequencies_hz.len();
    for (a, &amplitude) in swept.amplitudes_m.iter().enumerate() {
        for (f, &frequency) in swept.frequencies_hz.iter().enumerate() {
            let Some(problem) = case.stroke_problem(frequency, amplitude) else { continue };
            memory::require_of(case, &problem, None)?;
            let part = Part { inner: monitor, done: a * swept.frequencies_hz.len() + f, total };
            let outcome = row(&problem, settled_stroke(&problem, &part)?, (frequency, amplitude));
            all = Some(joined(all, (problem, outcome)));
        }
    }
    if let Some((_, outcome)) = &mut all {
        // The greatest equivalent damping coefficient of all.
        let greatest = std::mem::take(&mut outcome.figures).into_iter().max_by(|a, b| a.value.total_cmp(&b.value));
        outcome.figures.extend(greatest);
    }
    Ok(all)
}

/// One settled stroke as a row of the sweep, its own series and balances left out; its cautions say which stroke they are of.
fn row(problem: &Problem, outcome: Outcome, (frequency, amplitude): (f64, f64)) -> Outcome {
    let row = match &problem.travel {
        Travel::Sine(sine) => AtStroke::of(sine, &outcome),
        _ => None,
    };
    let named = |f: Figure| Figure { name: "damping_coefficient_equivalent_greatest".to_owned(), ..f };
    let damping = outcome.figures.iter().find(|f| f.name == "damping_coefficient_equivalent").cloned();
    let mut outcome = Outcome {
        figures: damping.map(named).into_iter().collect(),
        trace: Trace::default(),
        forces: None,
        ledger: None,
        strokes: None,
        sweeps: Sweeps { strokes: row.into_iter().collect(), ..Sweeps::default() },
        ..outcome
    };
    // That a stroke has settled is what the sweep is about.
    outcome.cautions.retain(|c| !c.text.contains("by which the stroke had settled"));
    for caution in &mut outcome.cautions {
        if caution.text.contains("cycle") {
            caution.text = format!("{frequency} Hz, {} mm: {}", 1e3 * amplitude, caution.text);
        }
    }
    outcome
}

/// One of many jobs: its progress is a part of the whole.
struct Part<'m> {
    inner: &'m dyn Monitor,
    done: usize,
    total: usize,
}

impl Monitor for Part<'_> {
    fn progress(&self, fraction: f64, _doing: &str) {
        let count = |n: usize| f64::from(u32::try_from(n).unwrap_or(u32::MAX));
        self.inner.progress((count(self.done) + fraction) / count(self.total.max(1)), "strokes");
    }

    fn cancelled(&self) -> bool {
        self.inner.cancelled()
    }
}

//! The study itself: what is varied, solved and combined.

use std::collections::BTreeMap;

use lenzbore_io::case::ResolvedCase;
use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::problem::{Problem, Travel};
use lenzbore_solver::spread::{
    Draws, FigureSpread, Input, MonteCarlo, Nominal, OffsetPlan, Reading, Response, Sampled, Spread, plan_offsets, rank,
};

use super::cases::Variable;
use super::workers::side_by_side;
use crate::arguments::SpreadWords;
use crate::end::End;
use crate::job::CaseInput;

/// Where both sides of the stencil disagree by more than this share, half the step is solved too.
const CURVED: f64 = 0.02;
/// Share of the half-width that the numerical bands may take before a caution is due.
const NUMERICAL: f64 = 0.1;
/// So many draws may be impossible for one that is possible.
const REDRAWS: usize = 20;

/// Answers one case with its figures.
pub type Answer<'a> = dyn Fn(&ResolvedCase, &dyn Monitor) -> Result<Vec<Nominal>, End> + Sync + 'a;

/// What is asked of every varied case.
pub struct Question<'a> {
    /// The case as it was named.
    pub input: &'a CaseInput,
    /// The same, resolved.
    pub case: &'a ResolvedCase,
    /// Its problem and a curve's speeds, for the memory of one solution.
    pub size: (&'a Problem, Option<&'a [f64]>),
    /// The figures at the nominal inputs.
    pub nominal: &'a [Nominal],
    /// How a case is answered.
    pub answer: &'a Answer<'a>,
    /// Whether the worst cases are solved too.
    pub worst: bool,
    /// Progress, and the request to stop.
    pub monitor: &'a dyn Monitor,
}

/// The figures of one varied case, by name.
type Found = BTreeMap<String, Reading>;

/// Varies every input, solves, combines; on request draws at random.
pub fn study(question: &Question<'_>, words: &SpreadWords) -> Result<Spread, End> {
    let variable = Variable::new(question.input, question.case);
    let inputs = variable.inputs()?;
    let runs = question.one_by_one(&variable, &inputs)?;
    let responses = |name: &str, nominal: Reading| -> Vec<Option<Response>> {
        inputs.iter().zip(&runs).map(|(input, run)| run.response(input, name, nominal)).collect()
    };
    let mut figures: Vec<FigureSpread> =
        question.nominal.iter().map(|n| FigureSpread::new(n, &inputs, responses(&n.name, n.reading))).collect();
    let mut cautions = Vec::new();
    let corners = if question.worst { question.corners(&variable, &inputs, &mut figures, &mut cautions)? } else { 0 };
    let monte_carlo = match words.monte_carlo {
        Some(draws) => {
            let draws = usize::try_from(draws).unwrap_or(usize::MAX);
            Some(question.draw(&variable, &inputs, &figures, (draws, words.seed))?)
        }
        None => None,
    };
    remark(&figures, monte_carlo.as_ref(), &mut cautions);
    let alone: usize = runs.iter().map(|r| r.found.len()).sum();
    let solutions = alone + corners + monte_carlo.as_ref().map_or(0, |m| m.draws);
    let ranking = rank(&figures, inputs.len());
    Ok(Spread { inputs, figures, ranking, monte_carlo, solutions, cautions })
}

/// What was solved for one input.
struct Run {
    step: f64,
    found: Vec<(f64, Found)>,
}

impl Run {
    fn response(&self, input: &Input, name: &str, nominal: Reading) -> Option<Response> {
        let readings: Option<Vec<(f64, Reading)>> =
            self.found.iter().map(|(offset, found)| found.get(name).map(|r| (*offset, *r))).collect();
        Response::new(input, nominal, self.step, &readings?)
    }

    /// Whether any figure answers unevenly to both sides.
    fn curved(&self, nominal: &[Nominal]) -> bool {
        let at = |sign: f64| self.found.iter().find(|(o, _)| (o - sign * self.step).abs() <= 1e-9 * self.step);
        let (Some((_, low)), Some((_, high))) = (at(-1.0), at(1.0)) else { return true };
        nominal.iter().any(|n| match (low.get(&n.name), high.get(&n.name)) {
            (Some(l), Some(h)) => {
                let bands = l.band + h.band + 2.0 * n.reading.band;
                let uneven = (l.value + h.value - 2.0 * n.reading.value).abs();
                uneven > CURVED * (h.value - l.value).abs() + bands
            }
            _ => false,
        })
    }
}

impl Question<'_> {
    fn solve(&self, cases: &[ResolvedCase], doing: &str) -> Result<Vec<Found>, End> {
        side_by_side(cases, self.size, self.monitor, doing, &|case, monitor| {
            let figures = (self.answer)(case, monitor)?;
            Ok(figures.into_iter().map(|f| (f.name, f.reading)).collect())
        })
    }

    /// Solves the stencil of every input, and the ends of its tolerance that lie outside.
    fn one_by_one(&self, variable: &Variable<'_>, inputs: &[Input]) -> Result<Vec<Run>, End> {
        let plans: Vec<(OffsetPlan, Vec<f64>)> = inputs
            .iter()
            .enumerate()
            .map(|(i, input)| possible_offsets(variable, i, input))
            .collect::<Result<_, _>>()?;
        let mut runs: Vec<Run> = plans.iter().map(|(p, _)| Run { step: p.step, found: Vec::new() }).collect();
        // Settled fields cost little: all offsets at once. A march first tells by the outer pair whether it is curved.
        let cheap = matches!(self.case.problem.travel, Travel::Steady { .. }) || self.size.1.is_some();
        for inner in [false, true] {
            let mut jobs = Vec::new();
            for (i, (plan, offsets)) in plans.iter().enumerate() {
                let one_sided = offsets.iter().all(|o| *o >= 0.0) || offsets.iter().all(|o| *o <= 0.0);
                let wanted = |o: &&f64| {
                    let is_inner = o.abs() < plan.step * (1.0 - 1e-9) && !one_sided;
                    is_inner == inner && (!inner || cheap || runs[i].curved(self.nominal))
                };
                jobs.extend(offsets.iter().filter(wanted).map(|o| (i, *o)));
            }
            let cases = jobs
                .iter()
                .map(|(i, o)| variable.alone(*i, *o).map_err(|f| variable.impossible(*i, *o, &f)))
                .collect::<Result<Vec<_>, _>>()?;
            let found = self.solve(&cases, "input spread, one by one")?;
            for ((i, offset), found) in jobs.into_iter().zip(found) {
                runs[i].found.push((offset, found));
            }
        }
        Ok(runs)
    }

    /// Solves the worst case of every figure, each corner once; gives the number of solutions.
    fn corners(
        &self,
        variable: &Variable<'_>,
        inputs: &[Input],
        figures: &mut [FigureSpread],
        cautions: &mut Vec<String>,
    ) -> Result<usize, End> {
        let mut corners: Vec<Vec<f64>> = Vec::new();
        let same = |a: &[f64], b: &[f64]| a.iter().zip(b).all(|(x, y)| (x - y).abs() <= 0.0);
        for corner in figures.iter().flat_map(|f| [f.corner(inputs, false), f.corner(inputs, true)]) {
            if !corners.iter().any(|c| same(c, &corner)) {
                corners.push(corner);
            }
        }
        let read: Vec<Option<ResolvedCase>> = corners.iter().map(|c| variable.at(c).ok()).collect();
        let possible: Vec<ResolvedCase> = read.iter().flatten().cloned().collect();
        let mut solved = self.solve(&possible, "input spread, worst case")?.into_iter();
        let found: Vec<Option<Found>> = read.iter().map(|r| r.as_ref().and_then(|_| solved.next())).collect();
        let at = |corner: &[f64], name: &str| -> Option<f64> {
            let k = corners.iter().position(|c| same(c, corner))?;
            found[k].as_ref()?.get(name).map(|r| r.value)
        };
        let mut added = Vec::new();
        for figure in figures.iter_mut() {
            let low = at(&figure.corner(inputs, false), &figure.name);
            let high = at(&figure.corner(inputs, true), &figure.name);
            match (low, high) {
                (Some(low), Some(high)) => figure.solved_worst(low, high),
                _ => added.push(figure.name.clone()),
            }
        }
        if !added.is_empty() {
            cautions.push(format!(
                "worst case of {}: the case cannot be with all inputs at their worst ends, so the single changes are added up",
                added.join(", ")
            ));
        }
        Ok(possible.len())
    }

    /// Draws all inputs at random.
    fn draw(
        &self,
        variable: &Variable<'_>,
        inputs: &[Input],
        figures: &[FigureSpread],
        (count, seed): (usize, u64),
    ) -> Result<MonteCarlo, End> {
        let mut draws = Draws::new(seed);
        let (mut cases, mut redrawn) = (Vec::with_capacity(count), 0);
        while cases.len() < count {
            match variable.at(&draws.offsets(inputs)) {
                Ok(case) => cases.push(case),
                Err(_) if redrawn < REDRAWS * count => redrawn += 1,
                Err(faults) => {
                    return Err(End::Input(format!("most random draws of the inputs are no possible case:\n{faults}")));
                }
            }
        }
        let found = self.solve(&cases, "input spread, random draws")?;
        let sampled = figures.iter().filter_map(|f| {
            let values: Option<Vec<f64>> = found.iter().map(|d| d.get(&f.name).map(|r| r.value)).collect();
            Sampled::new(f, &values?)
        });
        Ok(MonteCarlo { draws: count, redrawn, seed, figures: sampled.collect() })
    }
}

/// The offsets of an input at which the case is possible: both sides, a narrower stencil, or the one side that there is.
fn possible_offsets(variable: &Variable<'_>, which: usize, input: &Input) -> Result<(OffsetPlan, Vec<f64>), End> {
    let plan = plan_offsets(input);
    let can = |offset: f64| variable.alone(which, offset);
    for end in &plan.ends {
        can(*end).map_err(|f| variable.impossible(which, *end, &f))?;
    }
    let narrow = OffsetPlan { step: input.widest(), ..plan_offsets(&Input { unit: "K", ..input.clone() }) };
    for tried in [&plan, &narrow] {
        if tried.step <= plan.step && [-tried.step, tried.step].iter().all(|o| can(*o).is_ok()) {
            return Ok((tried.clone(), [tried.stencil.clone(), tried.ends.clone()].concat()));
        }
    }
    let one_sided = |sign: f64| [plan.one_sided(sign), plan.ends.clone()].concat();
    if input.minus <= 0.0 && can(plan.step).is_ok() {
        return Ok((plan.clone(), one_sided(1.0)));
    }
    if input.plus <= 0.0 && can(-plan.step).is_ok() {
        return Ok((plan.clone(), one_sided(-1.0)));
    }
    let fault = |offset: f64| can(offset).err().map(|f| variable.impossible(which, offset, &f));
    let end = fault(-input.minus).or_else(|| fault(input.plus)).or_else(|| fault(-plan.step));
    Err(end.or_else(|| fault(plan.step)).unwrap_or_else(|| End::Input(format!("{} cannot be varied", input.path))))
}

/// What a reader must know of a study.
fn remark(figures: &[FigureSpread], monte_carlo: Option<&MonteCarlo>, cautions: &mut Vec<String>) {
    let name_where = |is: &dyn Fn(&FigureSpread) -> bool| -> Option<String> {
        let names: Vec<&str> = figures.iter().filter(|f| is(f)).map(|f| f.name.as_str()).collect();
        (!names.is_empty()).then(|| names.join(", "))
    };
    if let Some(names) = name_where(&|f| !f.complete()) {
        cautions.push(format!("{names}: not had in every varied run, so the input spread is incomplete there"));
    }
    if let Some(names) = name_where(&|f| f.half_width() > 0.0 && f.numerical > NUMERICAL) {
        cautions.push(format!(
            "{names}: the changes are not far above the numerical bands; a closer [accuracy] target makes the input spread surer"
        ));
    }
    let bent = |f: &FigureSpread| {
        f.responses.iter().zip(&f.shares).any(|(r, s)| *s > 0.01 && r.is_some_and(|r| !r.is_linear()))
    };
    if let Some(names) = name_where(&bent) {
        cautions.push(format!(
            "{names}: not linear within a tolerance, so the changes below and above differ from the slope by more than 5 % (marked ~)"
        ));
    }
    if let Some(run) = monte_carlo {
        let apart: Vec<&str> = run.figures.iter().filter(|s| !s.agrees).map(|s| s.name.as_str()).collect();
        if !apart.is_empty() {
            cautions.push(format!(
                "{}: the random draws spread otherwise than the root sum square; the inputs work together there, and the draws count",
                apart.join(", ")
            ));
        }
    }
}

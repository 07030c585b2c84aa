//! Which simplified model made the table, or which dropped effect explains its differences best.

use lenzbore_solver::fault::SolveFault;
use lenzbore_solver::ladder::{Assumptions, Effect, EndModel, MagnetModel, WallModel};
use lenzbore_solver::problem::{Extent, Problem};

use super::asked::Asked;
use super::solved::Solved;
use crate::end::End;

/// A table that lies this close to a model, root mean square, and three times closer than to the field, is that model's.
const SAME: f64 = 0.02;
/// How many times closer.
const CLOSER: f64 = 3.0;

/// A model and how much of the difference it explains.
#[derive(Debug, Clone, PartialEq)]
pub struct Explanation {
    /// The model in words.
    pub model: String,
    /// What it leaves out.
    pub leaves_out: Vec<&'static str>,
    /// Root mean square of (table - model) over the scale.
    pub apart: f64,
    /// 1 - apart / what the table and the field are apart.
    pub explains: f64,
    /// Whether the table is that model's.
    pub same: bool,
    /// What its rings take for granted, at the temperatures of the case.
    pub assumptions: Option<Assumptions>,
}

const MODELS: [Assumptions; 6] = [
    Assumptions::DIPOLE_RULE,
    Assumptions::DIPOLE_RINGS_INNER,
    Assumptions::DIPOLE_RINGS_MEAN,
    Assumptions::RINGS_INNER,
    Assumptions::RINGS_MEAN,
    Assumptions::RESISTIVE,
];

/// Compares the table with every simplified model; the one that explains it best comes first. `field` is how far table and field
/// solution are apart; with `deeper` fields with one effect dropped are solved too.
pub fn explanations(asked: &Asked<'_>, scales: &[f64], field: f64, deeper: bool) -> Result<Vec<Explanation>, End> {
    let mut out = Vec::new();
    let mut add =
        |model: String, leaves_out: Vec<&'static str>, values: &[Option<f64>], assumptions: Option<Assumptions>| {
            if let Some(found) = asked.likeness(values, scales) {
                let explains = if field > 0.0 { 1.0 - found.apart / field } else { 0.0 };
                let same = found.apart <= SAME && CLOSER * found.apart <= field;
                out.push(Explanation { model, leaves_out, apart: found.apart, explains, same, assumptions });
            }
        };
    let problems = |warm: bool| -> Option<Vec<Problem>> {
        let cold = ["wall.temperature=20 degC".to_owned(), "mover.temperature=20 degC".to_owned()];
        let of = |g: &super::groups::Group| {
            if warm { Some(g.case.problem.clone()) } else { Some(g.input.read(&cold).ok()?.problem) }
        };
        asked.groups.iter().map(of).collect()
    };
    let warm = problems(true).unwrap_or_default();
    let cold = problems(false).filter(|cold| *cold != warm);
    for (problems, at) in [(Some(&warm), ""), (cold.as_ref(), " at 20 degC")] {
        let Some(problems) = problems else { continue };
        for assumptions in MODELS {
            if let Some(values) = by_rings(asked, problems, assumptions)? {
                let mut left = left_out(assumptions, &problems[0]);
                left.extend((!at.is_empty()).then_some(Effect::Temperature.left_out()));
                add(format!("{}{at}", assumptions.words()), left, &values, at.is_empty().then_some(assumptions));
            }
        }
    }
    if deeper {
        if let Some(cold) = &cold {
            let values = asked.changed_to(cold)?;
            add("field solution at 20 degC".to_owned(), vec![Effect::Temperature.left_out()], &values, None);
        }
        if warm.iter().any(|p| p.mover.recoil.is_some())
            && let Some(values) = asked.changed(&without_recoil)?
        {
            let model = "field solution, recoil permeability 1".to_owned();
            add(model, vec![Effect::RecoilPermeability.left_out()], &values, None);
        }
        let permeable = |p: &Problem| p.wall.layers.iter().any(|l| l.relative_permeability > 1.001);
        if warm.iter().any(permeable)
            && let Some(values) = asked.changed(&unmagnetic)?
        {
            add(
                "field solution, wall not permeable".to_owned(),
                vec![Effect::WallPermeability.left_out()],
                &values,
                None,
            );
        }
    }
    out.sort_by(|a, b| a.apart.total_cmp(&b.apart));
    Ok(out)
}

/// Errors smaller than this, relative, are no large ones that cancel.
const LARGE: f64 = 0.02;

/// Where the table's model is nearly right because two larger errors cancel, in a sentence.
pub fn cancelling(asked: &Asked<'_>, best: &Explanation, ours: &[f64], scales: &[f64]) -> Result<Option<String>, End> {
    let Some(assumptions) = best.assumptions.filter(|a| best.same && *a != Assumptions::RESISTIVE) else {
        return Ok(None);
    };
    let now: Vec<Problem> = asked.groups.iter().map(|g| g.case.problem.clone()).collect();
    let (Some(model), Some(resistive)) =
        (by_rings(asked, &now, assumptions)?, by_rings(asked, &now, Assumptions::RESISTIVE)?)
    else {
        return Ok(None);
    };
    let parts = |k: usize| -> Option<(f64, f64)> {
        let (m, r) = (model[k]?, resistive[k]?);
        Some(((m - r) / scales[k], (r - ours[k]) / scales[k]))
    };
    let smaller = |(a, b): (f64, f64)| a.abs().min(b.abs());
    let found = (0..ours.len())
        .filter_map(|k| parts(k).map(|p| (k, p)))
        .filter(|(_, (a, b))| a * b < 0.0 && smaller((*a, *b)) >= LARGE.max(2.0 * (a + b).abs()))
        .max_by(|x, y| smaller(x.1).total_cmp(&smaller(y.1)));
    Ok(found.map(|(k, (shape, induction))| {
        format!(
            "it is nearly right on line {} because two errors cancel: {:+.1} % for what it leaves out of magnets and wall, {:+.1} % for the field of the wall's own currents; elsewhere they do not",
            asked.table.rows[asked.cells[k].row].line,
            100.0 * shape,
            100.0 * induction
        )
    }))
}

fn unmagnetic(problem: &Problem) -> Problem {
    let mut plain = problem.clone();
    for layer in &mut plain.wall.layers {
        layer.relative_permeability = 1.0;
    }
    plain
}

/// The case as quick calculators see its magnets.
fn without_recoil(problem: &Problem) -> Problem {
    Problem { mover: problem.mover.without_recoil(), ..problem.clone() }
}

/// A ring model's values with recoil permeability 1, cell by cell; `None` where the model does not suit.
pub fn by_rings(
    asked: &Asked<'_>,
    problems: &[Problem],
    assumptions: Assumptions,
) -> Result<Option<Vec<Option<f64>>>, End> {
    let mut solved = Vec::new();
    for (problem, need) in problems.iter().zip(&asked.needs) {
        let plain = without_recoil(problem);
        match Solved::by_rings(&plain, assumptions, need, asked.monitor) {
            Ok(one) => solved.push(one),
            Err(SolveFault::Interrupted) => return Err(End::Interrupted),
            // A dipole has no place around a rod; a model may find no end of a motion.
            Err(_) => return Ok(None),
        }
    }
    Ok(Some(asked.read_all(&solved)))
}

/// What a ring model leaves out of a case.
fn left_out(assumptions: Assumptions, problem: &Problem) -> Vec<&'static str> {
    let mut effects = Vec::new();
    if assumptions.magnet == MagnetModel::LoneDipoles && problem.mover.parts.len() > 1 {
        effects.push(Effect::Neighbours);
    }
    if assumptions.magnet != MagnetModel::Finite {
        effects.push(Effect::FiniteMagnet);
    }
    if assumptions.wall != WallModel::Thickness {
        effects.push(Effect::WallThickness);
    }
    if assumptions.ends == EndModel::Switched && matches!(problem.wall.extent, Extent::Finite { .. }) {
        effects.push(Effect::FiniteLength);
    }
    effects.push(Effect::Induction);
    if problem.mover.recoil.is_some() {
        effects.push(Effect::RecoilPermeability);
    }
    if problem.wall.layers.iter().any(|l| l.relative_permeability > 1.001) {
        effects.push(Effect::WallPermeability);
    }
    effects.into_iter().map(Effect::left_out).collect()
}

impl Asked<'_> {
    /// The field's values of other problems, one a group.
    fn changed_to(&self, problems: &[Problem]) -> Result<Vec<Option<f64>>, End> {
        let mut solved = Vec::new();
        for (k, problem) in problems.iter().enumerate() {
            solved.push(Solved::of_problem(problem, &self.groups[k].case, &self.needs[k], self.monitor)?);
        }
        Ok(self.read_all(&solved))
    }
}

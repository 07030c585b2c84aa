//! `lenzbore ladder`: simplified models one step at a time, up to the field solution, and what each step is worth.

mod text;

use lenzbore_io::case::ResolvedCase;
use lenzbore_io::result::{folder, ladder_summary, write_ladder};
use lenzbore_solver::ladder::{LadderOutcome, Question, climb};
use lenzbore_solver::problem::Problem;

use crate::arguments::LadderWords;
use crate::end::End;
use crate::job::CaseInput;
use crate::progress::Terminal;
use crate::{job, memory, say};

/// Climbs, writes and says.
pub fn run(words: &LadderWords) -> Result<(), End> {
    let input = CaseInput::open(&words.case)?;
    let case = input.read(&[])?;
    let target = words.out.clone().unwrap_or_else(|| job::default_folder(&words.case, "-ladder"));
    folder::vet(&target, words.replace)?;
    let terminal = Terminal::new()?;
    let outcome = answer(&input, &case, words.curve, &terminal)?;
    terminal.finish();
    let cautions = case.curve.as_ref().filter(|_| asks_curve(&case, words.curve)).map(|c| c.cautions.clone());
    let header = job::header(&case, "ladder", None, &cautions.unwrap_or_default());
    let options = job::write_options(&case.output, words.replace);
    let written = write_ladder(&target, &options, &header, &outcome, &terminal)?;
    if words.case.json {
        say::to_standard_output(&format!("{:#}\n", ladder_summary(&header, &outcome)?));
    } else {
        say::to_standard_output(&text::ladder(&header, &outcome));
        let files = written.files.join(", ");
        say::to_standard_output(&format!("\nwritten to {}: {files}\n", target.display()));
    }
    if outcome.top.accuracy.met {
        return Ok(());
    }
    let advice = outcome.top.accuracy.advice.clone().unwrap_or_default();
    Err(End::Missed(format!("the accuracy target was missed: {advice}")))
}

/// Whether the ladder is climbed for the curve: asked for, or all that the case has.
fn asks_curve(case: &ResolvedCase, wanted: bool) -> bool {
    wanted || !case.travel_given
}

fn answer(input: &CaseInput, case: &ResolvedCase, curve: bool, terminal: &Terminal) -> Result<LadderOutcome, End> {
    let curve = asks_curve(case, curve);
    let Some(problem) = asked(case, curve) else {
        return Err(End::Input(
            "the case has no [curve] with speeds; add\n  [curve]\n  speeds = [\"0.01 m/s\", \"50 m/s\"]\n  points = 40"
                .to_owned(),
        ));
    };
    let speeds = case.curve.as_ref().filter(|_| curve).map(|plan| plan.speeds_m_per_s.clone());
    memory::require(&problem, speeds.as_ref().and_then(|s| s.last().copied()))?;
    let cool = at_20_degc(input).and_then(|cool| asked(&cool, curve)).filter(|cool| *cool != problem);
    let question = Question { problem: &problem, at_20_degc: cool.as_ref(), speeds_m_per_s: speeds.as_deref() };
    Ok(climb(&question, terminal)?)
}

fn asked(case: &ResolvedCase, curve: bool) -> Option<Problem> {
    if curve { case.curve_problem() } else { Some(case.problem.clone()) }
}

/// The case with wall and mover at 20 degC, which is what quick models take.
fn at_20_degc(input: &CaseInput) -> Option<ResolvedCase> {
    let sets = ["wall.temperature=\"20 degC\"", "mover.temperature=\"20 degC\""].map(str::to_owned);
    input.read(&sets).ok()
}

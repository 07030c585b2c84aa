//! `lenzbore run` and `lenzbore curve`: solve, write, say.

use lenzbore_io::case::{BACK_ACTION, ResolvedCase};
use lenzbore_io::result::{ResultHeader, folder, summary, write};
use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::outcome::{Figure, Outcome};
use lenzbore_solver::problem::{Problem, Travel};
use lenzbore_solver::solve;
use lenzbore_solver::spread::{Nominal, Reading, Spread};
use lenzbore_validation::endless;
use serde_json::{Value, json};

use crate::arguments::{SolveWords, SpreadWords};
use crate::end::End;
use crate::job::CaseInput;
use crate::progress::Terminal;
use crate::spread::{self, spread_text};
use crate::{curve, job, memory, recoil, say};

/// What is asked of a case.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Question {
    /// Its law of travel.
    Travel,
    /// Drag against speed.
    Curve,
}

impl Question {
    /// The command that asks it.
    pub const fn command(self) -> &'static str {
        match self {
            Self::Travel => "run",
            Self::Curve => "curve",
        }
    }

    /// What a command asks.
    pub fn of_command(command: &str) -> Option<Self> {
        [Self::Travel, Self::Curve].into_iter().find(|q| q.command() == command)
    }
}

/// Solves and writes.
pub fn run(words: &SolveWords, question: Question) -> Result<(), End> {
    let input = CaseInput::open(&words.case)?;
    let case = input.read(&[])?;
    spread_can_be_asked(&case, &words.spread)?;
    let suffix = if question == Question::Curve { "-curve" } else { "" };
    let target = words.out.clone().unwrap_or_else(|| job::default_folder(&words.case, suffix));
    folder::vet(&target, words.replace)?;
    let terminal = Terminal::new()?;
    let (problem, mut outcome, mut cautions) = answer(&case, question, &terminal)?;
    if question == Question::Curve {
        cautions.extend(curve::beside(&input, &case, &mut outcome, &terminal)?);
    }
    terminal.finish();
    let spread = input_spread(&input, &case, question, (&problem, &outcome), &words.spread, &terminal)?;
    let independent = independent(&problem, &outcome, question);
    let mut header = ResultHeader { spread, ..job::header(&case, question.command(), independent, &cautions) };
    if let Some(words) = recoil::back_action(&problem, &outcome, &terminal)? {
        header.not_modelled.retain(|w| w != BACK_ACTION);
        header.not_modelled.push(words);
    }
    let options = job::write_options(&case.output, words.replace);
    let written = write(&target, &options, &header, &problem, &outcome, &terminal)?;
    if words.case.json {
        say::to_standard_output(&format!("{:#}\n", summary(&header, &outcome)?));
    } else {
        say::to_standard_output(&say::answer(&header, &outcome));
        if let Some(spread) = &header.spread {
            say::to_standard_output(&spread_text(spread));
        }
        let files = written.files.join(", ");
        say::to_standard_output(&format!("\nwritten to {}: {files}\n", target.display()));
    }
    missed(&outcome)
}

/// Random draws need something to draw.
fn spread_can_be_asked(case: &ResolvedCase, words: &SpreadWords) -> Result<(), End> {
    if words.monte_carlo.is_some() && case.tolerances.is_empty() {
        let text = "--monte-carlo draws the inputs within their tolerances, and the case has none; add\n  \
                    [tolerance]\n  \"wall.sleeve.thickness\" = \"10 %\"";
        return Err(End::Input(text.to_owned()));
    }
    Ok(())
}

/// What the tolerances make of the figures, where the case has any.
fn input_spread(
    input: &CaseInput,
    case: &ResolvedCase,
    question: Question,
    (problem, outcome): (&Problem, &Outcome),
    words: &SpreadWords,
    terminal: &Terminal,
) -> Result<Option<Spread>, End> {
    if case.tolerances.is_empty() || words.no_spread {
        return Ok(None);
    }
    let speeds = case.curve.as_ref().filter(|_| question == Question::Curve).map(|c| c.speeds_m_per_s.as_slice());
    let varied = spread::Question {
        input,
        case,
        size: (problem, speeds),
        nominal: &nominal(outcome),
        answer: &|case, monitor| Ok(nominal(&answer(case, question, monitor)?.1)),
        worst: true,
        monitor: terminal,
    };
    let study = spread::study(&varied, words)?;
    terminal.finish();
    Ok(Some(study))
}

/// The figures of an outcome, as the study of the inputs takes them.
pub fn nominal(outcome: &Outcome) -> Vec<Nominal> {
    let of =
        |f: &Figure| Nominal { name: f.name.clone(), unit: f.unit, reading: Reading { value: f.value, band: f.band } };
    outcome.figures.iter().map(of).collect()
}

/// The problem that was solved, its outcome, and cautions that belong to the question.
pub fn answer(
    case: &ResolvedCase,
    question: Question,
    monitor: &dyn Monitor,
) -> Result<(Problem, Outcome, Vec<String>), End> {
    match question {
        Question::Travel => {
            if !case.travel_given {
                return Err(End::Input("the case has no [travel]; `lenzbore curve` sweeps its [curve]".to_owned()));
            }
            memory::require_of(case, &case.problem, None)?;
            let outcome = solve(&case.problem, monitor)?;
            Ok((case.problem.clone(), outcome, Vec::new()))
        }
        Question::Curve => curve::answer(case, monitor),
    }
}

/// A semi-analytic value of the drag by the Fourier-Bessel integral, where the case allows one: settled fields.
fn independent(problem: &Problem, outcome: &Outcome, question: Question) -> Option<Value> {
    let (name, velocity) = match (question, &problem.travel) {
        (Question::Curve, _) => ("drag_max", outcome.figures.iter().find(|f| f.name == "critical_speed")?.value),
        (Question::Travel, Travel::Steady { velocity_m_per_s }) => ("drag", *velocity_m_per_s),
        _ => return None,
    };
    let figure = outcome.figures.iter().find(|f| f.name == name)?;
    let exact = endless::drag(&problem.wall, &problem.mover, velocity).ok()?;
    exact.value.is_finite().then(|| {
        json!({
            "figure": name,
            "value": exact.value,
            "unit": figure.unit,
            "error": exact.error,
            "inside_band": (exact.value - figure.value).abs() <= figure.band + exact.error,
            "method": "Fourier-Bessel integral over axial wavenumbers for the endless layered wall (after Partovi and Morris, Can. J. Phys. 84, 253-271, 2006)",
        })
    })
}

fn missed(outcome: &Outcome) -> Result<(), End> {
    if outcome.accuracy.met {
        return Ok(());
    }
    let advice = outcome.accuracy.advice.clone().unwrap_or_default();
    Err(End::Missed(format!("the accuracy target was missed: {advice}")))
}

//! `lenzbore validate`: the published checks, and the study of the bands.

use std::path::Path;

use lenzbore_io::message::nearest;
use lenzbore_io::result::IoFault;
use lenzbore_io::result::folder::{PendingFolder, vet};
use lenzbore_solver::fault::SolveFault;
use lenzbore_validation::Error;
use lenzbore_validation::checks::{self, Check};
use lenzbore_validation::report::{CoverageReport, Report, list};

use crate::arguments::ValidateWords;
use crate::end::End;
use crate::progress::Terminal;
use crate::say;

const VERSION: &str = env!("CARGO_PKG_VERSION");

/// Lists or runs the checks, or studies the bands.
pub fn run(words: &ValidateWords) -> Result<(), End> {
    let checks = chosen(&words.only)?;
    if words.list {
        say::to_standard_output(&list(&checks));
        return Ok(());
    }
    if let Some(folder) = &words.out {
        vet(folder, words.replace)?;
    }
    if words.coverage { study(words) } else { hold(words, &checks) }
}

/// The checks named, in the order of the registry; all where none is named.
fn chosen(only: &[String]) -> Result<Vec<Check>, End> {
    let all = checks::all();
    let unknown: Vec<String> = (only.iter())
        .filter(|name| !all.iter().any(|c| c.name == name.as_str()))
        .map(|name| {
            let hint =
                nearest(name, all.iter().map(|c| c.name)).map_or(String::new(), |n| format!("; did you mean '{n}'?"));
            format!("'{name}' is no check{hint}")
        })
        .collect();
    if !unknown.is_empty() {
        return Err(End::Input(format!("{}\n`lenzbore validate --list` names them all", unknown.join("\n"))));
    }
    Ok(all.into_iter().filter(|c| only.is_empty() || only.iter().any(|name| name == c.name)).collect())
}

fn hold(words: &ValidateWords, checks: &[Check]) -> Result<(), End> {
    let terminal = Terminal::new()?;
    let report = Report::run(checks, VERSION, &terminal).map_err(fault)?;
    terminal.finish();
    save(words.out.as_deref(), words.replace, |folder| report.write(folder))?;
    tell(words, || format!("{:#}\n", report.json()), || report.text());
    verdict(&report)
}

/// One that falls short counts before one without an answer.
fn verdict(report: &Report) -> Result<(), End> {
    let short: Vec<&str> = report.short().map(|f| f.check.name).collect();
    if !short.is_empty() {
        let all = report.findings.len();
        return Err(End::No(format!("{} of {all} checks fall short: {}", short.len(), short.join(", "))));
    }
    let unanswered: Vec<String> = report.unanswered().map(|(f, e)| format!("{}: {e}", f.check.name)).collect();
    if unanswered.is_empty() { Ok(()) } else { Err(End::Failed(unanswered.join("\n"))) }
}

fn study(words: &ValidateWords) -> Result<(), End> {
    let terminal = Terminal::new()?;
    let seed = words.seed.unwrap_or(checks::COVERAGE_SEED);
    let report = CoverageReport::run(words.cases, seed, VERSION, &terminal).map_err(fault)?;
    terminal.finish();
    save(words.out.as_deref(), words.replace, |folder| report.write(folder))?;
    tell(words, || format!("{:#}\n", report.json()), || report.text());
    if report.passed() { Ok(()) } else { Err(End::No("the bands are not worth what is said of them".to_owned())) }
}

/// Writes into a folder that appears whole, where one is named.
fn save(
    target: Option<&Path>,
    replace: bool,
    write: impl FnOnce(&mut PendingFolder) -> Result<(), IoFault>,
) -> Result<(), End> {
    let Some(target) = target else { return Ok(()) };
    let mut folder = PendingFolder::begin(target, replace)?;
    write(&mut folder).map_err(|fault| folder.in_users_words(fault))?;
    folder.commit()?;
    Ok(())
}

/// Prints the one JSON object, or the text and where it was written.
fn tell(words: &ValidateWords, json: impl FnOnce() -> String, text: impl FnOnce() -> String) {
    if words.json {
        say::to_standard_output(&json());
        return;
    }
    say::to_standard_output(&text());
    if let Some(target) = &words.out {
        say::to_standard_output(&format!("written to {}\n", target.display()));
    }
}

fn fault(fault: Error) -> End {
    match fault {
        Error::Solver(SolveFault::Interrupted) => End::Interrupted,
        other => End::Failed(other.to_string()),
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use lenzbore_solver::monitor::{Monitor, Unwatched};
    use lenzbore_validation::checks::Verdict;

    use super::*;

    /// The check of mutual inductances as it stands, with references 3 % off, and one whose method fails.
    fn loops() -> Check {
        checks::named("loops").unwrap()
    }

    fn planted(monitor: &dyn Monitor) -> Result<Verdict, Error> {
        let mut verdict = (loops().run)(monitor)?;
        verdict.comparisons.iter_mut().for_each(|c| c.expected *= 1.03);
        Ok(verdict)
    }

    fn failing(_: &dyn Monitor) -> Result<Verdict, Error> {
        Err(Error::MissingFigure("drag"))
    }

    fn ends(checks: &[Check]) -> Result<(), End> {
        verdict(&Report::run(checks, VERSION, &Unwatched).unwrap())
    }

    #[test]
    fn a_shortfall_ends_with_no_and_a_failure_with_failed() {
        let off = Check { name: "loops-off", run: planted, ..loops() };
        let lost = Check { name: "loops-lost", run: failing, ..loops() };
        assert!(ends(&[loops()]).is_ok());
        assert!(
            matches!(ends(&[loops(), lost, off]), Err(End::No(text)) if text == "1 of 3 checks fall short: loops-off")
        );
        assert!(matches!(ends(&[loops(), lost]), Err(End::Failed(_))));
    }
}

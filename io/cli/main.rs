//! The `lenzbore` command: typed words, a validated problem, work, an exit status.
//!
//! Exit status: 0 done; 1 the answer is no; 2 the input is wrong; 3 the computation or a file failed; 4 undecided, or the
//! accuracy target was missed; 130 interrupted.

mod arguments;
mod check;
mod compare;
mod completions;
mod curve;
mod end;
mod explain;
mod export;
mod job;
mod ladder;
mod materials;
mod memory;
mod new;
mod progress;
mod recoil;
mod report;
mod rerun;
mod say;
mod schema;
mod sketch;
mod solve;
mod spread;
mod validate;

use std::process::ExitCode;

use clap::Parser;

use arguments::{Arguments, Command};
use end::End;

fn main() -> ExitCode {
    let arguments = Arguments::parse();
    let end = match arguments.command {
        Command::New(words) => new::run(&words),
        Command::Check(words) => check::run(&words),
        Command::Run(words) => solve::run(&words, solve::Question::Travel),
        Command::Curve(words) => solve::run(&words, solve::Question::Curve),
        Command::Ladder(words) => ladder::run(&words),
        Command::Compare(words) => compare::run(&words),
        Command::Report(words) => report::run(&words),
        Command::Validate(words) => validate::run(&words),
        Command::Materials(words) => materials::run(&words),
        Command::Export(words) => export::run(&words),
        Command::Rerun(words) => rerun::run(&words),
        Command::Schema => schema::run(),
        Command::Explain(words) => explain::run(&words),
        Command::Completions(words) => completions::run(&words),
        Command::Unbuilt(words) => Err(End::unbuilt(&words)),
    };
    match end {
        Ok(()) => ExitCode::SUCCESS,
        Err(end) => end.report(),
    }
}

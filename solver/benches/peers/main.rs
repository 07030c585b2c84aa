//! Times lenzbore beside its peers and against what this machine could do at best. Every ratio is the median over
//! repetitions in which both sides ran, one after the other, in this one run; absolute figures stand beside it.
//!
//! `cargo bench --bench peers -- [SECTION ...]`; without a section, all of them. See ../README.md.
#![expect(clippy::print_stdout, reason = "a benchmark prints its figures")]

mod back_solve;
mod cases;
mod child;
mod curve;
mod duel;
mod elements;
mod fall;
mod fault;
mod forecast;
mod length;
mod machine;
mod python;
mod sample;

use std::process::ExitCode;

use fault::BenchFault;

type Section = (&'static str, fn() -> Result<(), BenchFault>);

const SECTIONS: [Section; 6] = [
    ("solve", back_solve::run),
    ("curve", curve::run),
    ("elements", elements::run),
    ("free", fall::run),
    ("length", length::run),
    ("forecast", forecast::run),
];

fn main() -> ExitCode {
    let arguments: Vec<String> = std::env::args().skip(1).filter(|a| !a.starts_with("--")).collect();
    let done = match arguments.first().map(String::as_str) {
        // One case in a process of its own, for its peak memory: started by this program itself.
        Some("child") => child::run(&arguments[1..]),
        _ => sections(&arguments),
    };
    match done {
        Ok(()) => ExitCode::SUCCESS,
        Err(fault) => {
            println!("stopped: {fault}");
            ExitCode::FAILURE
        }
    }
}

/// Runs the sections named, or all.
fn sections(names: &[String]) -> Result<(), BenchFault> {
    if let Some(unknown) = names.iter().find(|n| SECTIONS.iter().all(|(name, _)| name != n)) {
        let known = SECTIONS.map(|(name, _)| name).join(", ");
        return Err(BenchFault::Argument { found: unknown.clone(), known });
    }
    machine::describe();
    for (name, run) in SECTIONS {
        if names.is_empty() || names.iter().any(|n| n == name) {
            println!("\n== {name}");
            match run() {
                Err(BenchFault::NoPython(why)) => println!("skipped: {why}"),
                other => other?,
            }
        }
    }
    Ok(())
}

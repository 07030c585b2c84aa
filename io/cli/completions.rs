//! `lenzbore completions`: the script that completes commands and options in a shell.

use clap::CommandFactory;

use crate::arguments::{Arguments, CompletionsWords};
use crate::end::End;
use crate::say;

/// Prints the script.
pub fn run(words: &CompletionsWords) -> Result<(), End> {
    let mut script = Vec::new();
    clap_complete::generate(words.shell, &mut Arguments::command(), "lenzbore", &mut script);
    let script = String::from_utf8(script).map_err(|e| End::Failed(format!("the script is no text: {e}")))?;
    say::to_standard_output(&script);
    Ok(())
}

//! How a command ends when it does not end well: a message in the user's words, and the exit status.

use std::process::ExitCode;

use lenzbore_io::message::{Diagnostics, nearest};
use lenzbore_io::result::IoFault;
use lenzbore_solver::fault::SolveFault;

/// Commands of the vocabulary that are not built yet.
const LATER: [&str; 2] = ["sweep", "identify"];

/// Why a command ended.
#[derive(Debug)]
pub enum End {
    /// The input is wrong.
    Input(String),
    /// The computation or a file failed.
    Failed(String),
    /// The answer is no; results were written.
    No(String),
    /// The uncertainties do not let one tell; results were written.
    Undecided(String),
    /// The accuracy target was missed; results were written.
    Missed(String),
    /// The user stopped it.
    Interrupted,
}

impl End {
    /// A command that is not built yet, or that does not exist.
    pub fn unbuilt(words: &[String]) -> Self {
        let word = words.first().map_or("", String::as_str);
        if LATER.contains(&word) {
            return Self::Input(format!("'lenzbore {word}' is not built yet"));
        }
        let built = crate::arguments::commands();
        let names: Vec<&str> = built.iter().map(|(name, _)| name.as_str()).collect();
        let known = names.join(", ");
        let hint = nearest(word, names).map_or(String::new(), |n| format!("; did you mean '{n}'?"));
        Self::Input(format!("'{word}' is no command of lenzbore{hint}\ncommands: {known}"))
    }

    /// Says why on standard error, and gives the exit status.
    pub fn report(self) -> ExitCode {
        let (text, status) = match self {
            Self::Input(text) => (text, 2),
            Self::Failed(text) => (text, 3),
            Self::No(text) => (text, 1),
            Self::Missed(text) | Self::Undecided(text) => (text, 4),
            Self::Interrupted => ("interrupted; nothing was written".to_owned(), 130),
        };
        crate::say::to_standard_error(&text);
        ExitCode::from(status)
    }
}

impl From<Diagnostics> for End {
    fn from(faults: Diagnostics) -> Self {
        Self::Input(faults.to_string())
    }
}

impl From<SolveFault> for End {
    fn from(fault: SolveFault) -> Self {
        match fault {
            SolveFault::Interrupted => Self::Interrupted,
            SolveFault::Unsuited(_) | SolveFault::Mesh(_) | SolveFault::Memory { .. } => Self::Input(fault.to_string()),
            _ => Self::Failed(fault.to_string()),
        }
    }
}

impl From<IoFault> for End {
    fn from(fault: IoFault) -> Self {
        match fault {
            IoFault::Interrupted => Self::Interrupted,
            _ if fault.is_of_the_input() => Self::Input(fault.to_string()),
            _ => Self::Failed(fault.to_string()),
        }
    }
}

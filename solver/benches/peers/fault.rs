//! Why the benchmark stops or leaves something out.

use lenzbore_solver::fault::SolveFault;

/// A benchmark that gave no figures.
#[derive(Debug, thiserror::Error)]
pub(crate) enum BenchFault {
    /// The Python part can't run here; its sections are left out.
    #[error("{0}")]
    NoPython(String),
    /// A Python peer failed.
    #[error("{script} failed: {message}")]
    Peer { script: String, message: String },
    /// A process of our own failed.
    #[error("the case {case} failed in its own process: {message}")]
    Child { case: String, message: String },
    /// A number that should be in an answer isn't.
    #[error("no `{key}` in the answer of {from}")]
    Value { from: String, key: String },
    /// A section or case that doesn't exist.
    #[error("`{found}` is none of {known}")]
    Argument { found: String, known: String },
    /// The solver failed.
    #[error("the solve failed: {0}")]
    Solve(#[from] SolveFault),
    /// A file or process failed.
    #[error("{0}")]
    Io(#[from] std::io::Error),
    /// An answer is no JSON.
    #[error("{0}")]
    Json(#[from] serde_json::Error),
}

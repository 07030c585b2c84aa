//! What a result says of itself besides the outcome: filled in from the resolved case.

use lenzbore_solver::spread::Spread;
use serde_json::{Map, Value};

use crate::layout::Layout;

/// The program that computed a result.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Program {
    /// Its name.
    pub name: String,
    /// Its version.
    pub version: String,
}

/// Title, record, resolved case and what stands beside the figures.
#[derive(Debug, Clone, PartialEq)]
pub struct ResultHeader {
    /// Title of the case.
    pub title: String,
    /// The case's `[record]`: document, revision, purpose and the like.
    pub record: Map<String, Value>,
    /// Digest of the resolved case.
    pub digest: String,
    /// The program and its version.
    pub program: Program,
    /// The command that computed it, as `run`.
    pub command: &'static str,
    /// The whole case in one piece, see [`crate::case::KeptCase`].
    pub case: Value,
    /// The case with every default and book value and its source.
    pub resolved: Value,
    /// Where every body stands.
    pub geometry: Layout,
    /// What the model leaves out.
    pub not_modelled: Vec<String>,
    /// A semi-analytic value to hold the figures against, where the case allows one.
    pub independent: Option<Value>,
    /// What the tolerances of the inputs make of the figures, where the case has any.
    pub spread: Option<Spread>,
    /// Cautions that come from the case itself; those of the computation follow them.
    pub cautions: Vec<String>,
}

//! What every word of the case file means: one entry a word, table by table. Schema, `explain` and editors live on it.
//!
//! A word of [`crate::case::TABLES`] without an entry here fails a test that names it; so does an entry without its word.

mod across;
mod curve;
mod mover;
mod output;
mod top;
mod travel;
mod wall;
mod warming;

use super::form::Form;

pub(super) use travel::LAW_MEANINGS;

/// What a word of the case file means.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct CaseWord {
    /// The word.
    pub word: &'static str,
    /// What it takes.
    pub form: Form,
    /// What it means, in a sentence or two.
    pub about: &'static str,
    /// What holds where it is absent.
    pub absent: &'static str,
    /// A line of a case file.
    pub example: &'static str,
    /// Where a default or a definition is from; empty where it is our own.
    pub source: &'static str,
}

/// One word; `absent` says what holds where it is left out.
const fn word(
    word: &'static str,
    form: Form,
    about: &'static str,
    absent: &'static str,
    example: &'static str,
) -> CaseWord {
    CaseWord { word, form, about, absent, example, source: "" }
}

impl CaseWord {
    /// The same with the source of its default or definition.
    const fn from(self, source: &'static str) -> Self {
        Self { source, ..self }
    }
}

/// What a table of the case file holds, and its words.
#[derive(Debug, Clone, Copy)]
pub struct CaseTable {
    /// Path, as in [`crate::case::TableWords`].
    pub path: &'static str,
    /// What it is for.
    pub about: &'static str,
    /// Its words.
    pub words: &'static [CaseWord],
}

/// Every table.
pub const CASE_TABLES: &[CaseTable] = &[
    top::TOP,
    top::RECORD,
    wall::WALL,
    wall::LAYER,
    mover::MOVER,
    mover::MAGNET,
    mover::SPACER,
    mover::DIPOLE,
    mover::COIL,
    mover::IRON,
    travel::TRAVEL,
    warming::COOLING,
    warming::DUTY,
    curve::CURVE,
    output::ACCURACY,
    output::OUTPUT,
    output::STATION,
];

/// The words of the table at a path; `None` where it is unknown.
#[must_use]
pub fn case_table(path: &str) -> Option<&'static CaseTable> {
    CASE_TABLES.iter().find(|t| t.path == path)
}

/// One word of the table at a path.
#[must_use]
pub fn case_word(path: &str, word: &str) -> Option<&'static CaseWord> {
    case_table(path)?.words.iter().find(|w| w.word == word)
}

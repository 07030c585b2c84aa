//! What can be wrong with a case.

use lenzbore_solver::problem::ProblemFault;

use crate::table::TableFault;
use crate::units::QuantityFault;

/// One fault of a case file, of a base file or of an override, in the user's words. Where it stands is kept beside it.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
#[non_exhaustive]
pub enum CaseFault {
    /// The text is no TOML.
    #[error("{detail}")]
    Syntax {
        /// What the reader stumbled over.
        detail: String,
        /// What to write instead, where that can be guessed.
        hint: Option<String>,
    },
    /// A file that cannot be read.
    #[error("cannot read {path}: {why}")]
    UnreadableFile {
        /// The path as given.
        path: String,
        /// The system's reason.
        why: String,
    },
    /// Case files that start from each other.
    #[error("case files start from one another in a circle: {}", chain.join(" -> "))]
    LikeCircle {
        /// The files in order.
        chain: Vec<String>,
    },
    /// Too many case files that start from one another.
    #[error("more than {most} case files start from one another")]
    LikeTooLong {
        /// The limit.
        most: usize,
    },
    /// An override that is no `path=value`.
    #[error("an override is written PATH=VALUE")]
    NoOverride,
    /// An override whose path leads nowhere.
    #[error("'{path}' leads to no word of a case: {why}")]
    OverridePath {
        /// The path as given.
        path: String,
        /// What is wrong with it.
        why: &'static str,
    },
    /// A name that no part has.
    #[error("no part of {table} is named '{name}'")]
    UnknownName {
        /// The name found.
        name: String,
        /// The table.
        table: String,
        /// The names there are.
        names: Vec<String>,
        /// The nearest of them.
        nearest: Option<String>,
    },
    /// A word that the table does not have.
    #[error("'{word}' is no word of {table}")]
    UnknownWord {
        /// The word found.
        word: String,
        /// The table, as `[[wall.layer]]`.
        table: String,
        /// The nearest legal word.
        nearest: Option<&'static str>,
        /// A table that has this very word.
        elsewhere: Option<&'static str>,
        /// All legal words.
        legal: Vec<&'static str>,
    },
    /// Something that the vocabulary has and the model has not.
    #[error("{what}: not modelled yet")]
    NotModelled {
        /// The words found.
        what: String,
        /// What can be done instead.
        instead: Option<String>,
    },
    /// A word that must be there.
    #[error("{table} lacks '{word}': {why}")]
    Missing {
        /// The table.
        table: String,
        /// The word.
        word: &'static str,
        /// What it is needed for.
        why: &'static str,
        /// How it would be written.
        example: &'static str,
    },
    /// A text where a table belongs, and the like.
    #[error("'{word}' is {found} here, and {wanted} belongs here")]
    WrongShape {
        /// The word.
        word: String,
        /// What was found.
        found: &'static str,
        /// What belongs there.
        wanted: &'static str,
        /// How it would be written.
        example: &'static str,
    },
    /// A value that is no quantity of the kind.
    #[error("{word}: {fault}")]
    Quantity {
        /// The word.
        word: String,
        /// What is wrong.
        fault: QuantityFault,
    },
    /// A value outside what can be.
    #[error("{word} = {found} is impossible")]
    Impossible {
        /// The word.
        word: String,
        /// The value found, with its unit.
        found: String,
        /// What would be legal.
        legal: String,
        /// The mend.
        mend: Option<String>,
    },
    /// A value that is none of the choices.
    #[error("{word} = '{found}' is none of its values")]
    UnknownChoice {
        /// The word.
        word: String,
        /// The value found.
        found: String,
        /// The legal values.
        choices: Vec<String>,
        /// The nearest of them.
        nearest: Option<String>,
    },
    /// A metal or magnet family without its grade.
    #[error("'{found}' names no grade")]
    BareMaterial {
        /// The words found.
        found: String,
        /// The grades of the book.
        grades: Vec<String>,
        /// The word that gives the value itself.
        instead: &'static str,
    },
    /// A material that the book does not have, or one that does not fit the part.
    #[error("the material book has no {wanted} '{found}'")]
    UnknownMaterial {
        /// The words found.
        found: String,
        /// `conductor` or `magnet`.
        wanted: &'static str,
        /// The nearest grade.
        nearest: Option<String>,
        /// Grades to choose from.
        grades: Vec<String>,
    },
    /// Words that say the same thing twice, or contradict each other.
    #[error("{words}: {why}")]
    Clash {
        /// The words.
        words: String,
        /// Why they clash.
        why: String,
        /// What to do.
        mend: String,
    },
    /// A name that cannot be used.
    #[error("the name '{name}' {why}")]
    Name {
        /// The name.
        name: String,
        /// What is wrong with it.
        why: &'static str,
    },
    /// A list that does not hold what it should.
    #[error("{word}: {why}")]
    List {
        /// The word.
        word: String,
        /// What is wrong.
        why: &'static str,
        /// How it would be written.
        example: &'static str,
    },
    /// A fault of a table to compare with.
    #[error("{0}")]
    Table(TableFault),
    /// Geometry or physics that cannot be.
    #[error("{0}")]
    Problem(ProblemFault),
}

impl CaseFault {
    /// What would be legal.
    #[must_use]
    pub fn legal(&self) -> Option<String> {
        match self {
            Self::UnknownWord { nearest: None, elsewhere: None, legal, .. } => {
                Some(format!("words of this table: {}", legal.join(", ")))
            }
            Self::UnknownName { names, .. } if names.is_empty() => Some("no part has a name yet".to_owned()),
            Self::UnknownName { names, .. } => Some(format!("names there are: {}", names.join(", "))),
            Self::Quantity { fault, .. } => fault.legal(),
            Self::Impossible { legal, .. } => Some(legal.clone()),
            Self::UnknownChoice { choices, .. } => Some(format!("legal values: {}", quoted(choices))),
            Self::BareMaterial { grades, .. } => Some(format!("grades in the material book: {}", quoted(grades))),
            Self::UnknownMaterial { grades, .. } => Some(format!("grades to choose from: {}", quoted(grades))),
            Self::NoOverride => Some("for example: --set wall.sleeve.thickness=\"2.1 mm\"".to_owned()),
            Self::OverridePath { .. } => Some(
                "a path is a table and a word, or a table, a part's name and a word: wall.sleeve.thickness".to_owned(),
            ),
            Self::Table(fault) => fault.legal(),
            Self::Problem(fault) => fault.legal(),
            _ => None,
        }
    }

    /// What to write or do instead.
    #[must_use]
    pub fn mend(&self) -> Option<String> {
        match self {
            Self::Syntax { hint, .. } => hint.clone(),
            Self::LikeCircle { .. } => Some("take one of the 'like' lines out".to_owned()),
            Self::UnknownName { nearest: Some(name), .. } => Some(format!("did you mean '{name}'?")),
            Self::UnknownWord { nearest: Some(word), .. } => Some(format!("did you mean '{word}'?")),
            Self::UnknownWord { elsewhere: Some(table), word, .. } => Some(format!("'{word}' is a word of {table}")),
            Self::NotModelled { instead, .. } => instead.clone(),
            Self::Missing { example, .. } | Self::WrongShape { example, .. } | Self::List { example, .. } => {
                Some(format!("for example: {example}"))
            }
            Self::Quantity { fault, .. } => fault.mend(),
            Self::Impossible { mend, .. } => mend.clone(),
            Self::UnknownChoice { nearest: Some(near), .. } | Self::UnknownMaterial { nearest: Some(near), .. } => {
                Some(format!("did you mean \"{near}\"?"))
            }
            Self::BareMaterial { instead, .. } => {
                Some(format!("the {instead} differs by grade: name one, or give '{instead}' itself"))
            }
            Self::Clash { mend, .. } => Some(mend.clone()),
            Self::Table(fault) => fault.mend(),
            Self::Problem(fault) => fault.mend(),
            _ => None,
        }
    }
}

fn quoted(words: &[String]) -> String {
    words.iter().map(|w| format!("\"{w}\"")).collect::<Vec<_>>().join(", ")
}

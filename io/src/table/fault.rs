//! What can be wrong with a table.

use crate::message::CaseFault;
use crate::units::QuantityFault;

/// One fault of a table, in the user's words.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
#[non_exhaustive]
pub enum TableFault {
    /// Nothing in it.
    #[error("the table has {what}")]
    Empty {
        /// `no header`, `no rows below its header`, ...
        what: &'static str,
    },
    /// A column whose name says nothing.
    #[error("the column '{header}' is none that can be compared or set")]
    UnknownColumn {
        /// The header as written.
        header: String,
        /// What it may have been meant as.
        nearest: Option<String>,
        /// A reason, where there is a closer one.
        why: Option<String>,
    },
    /// A column without a unit.
    #[error("the column '{header}' has no unit")]
    NoUnit {
        /// The header as written.
        header: String,
        /// Units that fit.
        fitting: Vec<&'static str>,
    },
    /// A unit that cannot be read, or of another kind.
    #[error("the column '{header}': {fault}")]
    Unit {
        /// The header as written.
        header: String,
        /// What is wrong.
        fault: QuantityFault,
    },
    /// Two columns that say the same.
    #[error("the columns '{first}' and '{second}' {why}")]
    Twice {
        /// The earlier.
        first: String,
        /// The later.
        second: String,
        /// What is wrong with having both.
        why: &'static str,
    },
    /// An uncertainty that belongs to no column.
    #[error("the column '{header}' says how uncertain something is, and it is not clear what")]
    WhoseUncertainty {
        /// The header as written.
        header: String,
    },
    /// A row with too few or too many cells.
    #[error("the row has {found} cell{}, the header {expected}", if *found == 1 { "" } else { "s" })]
    Uneven {
        /// Cells of the row.
        found: usize,
        /// Cells of the header.
        expected: usize,
        /// Whether decimal commas may have split numbers.
        commas: bool,
    },
    /// A cell that is no number.
    #[error("'{found}' is no number{}", if found.is_empty() { ": the cell is empty" } else { "" })]
    NoNumber {
        /// As written.
        found: String,
        /// The column.
        header: String,
        /// What to do.
        mend: Option<&'static str>,
    },
    /// A number outside what the row can be compared with.
    #[error("{header} = {found} is out of range")]
    OutOfRange {
        /// The column.
        header: String,
        /// As shown.
        found: String,
        /// What would be in range.
        legal: String,
    },
    /// A table that gives no motion.
    #[error("the table has {what}")]
    NoMotion {
        /// What it has, or lacks.
        what: String,
        /// What to write instead.
        mend: String,
    },
    /// The case does not give what the table has.
    #[error("the case gives no {what}")]
    NotOfTheCase {
        /// What the table has.
        what: String,
        /// What would give it.
        mend: String,
    },
}

impl From<TableFault> for CaseFault {
    fn from(fault: TableFault) -> Self {
        Self::Table(fault)
    }
}

impl TableFault {
    /// What would be legal.
    #[must_use]
    pub fn legal(&self) -> Option<String> {
        match self {
            Self::UnknownColumn { nearest: None, why: None, .. } => Some(
                "columns are speed, velocity, time, position, displacement, drag, temperature, any figure of a run, \
                 a word of the case as wall.sleeve.thickness, uncertainty and k, each with its unit"
                    .to_owned(),
            ),
            Self::NoUnit { fitting, .. } if !fitting.is_empty() => {
                Some(format!("units that fit: {}", fitting.join(", ")))
            }
            Self::Unit { fault, .. } => fault.legal(),
            Self::OutOfRange { legal, .. } => Some(legal.clone()),
            _ => None,
        }
    }

    /// What to write or do instead.
    #[must_use]
    pub fn mend(&self) -> Option<String> {
        match self {
            Self::Empty { .. } => Some("a header with units, and rows below: speed [m/s];drag [N]".to_owned()),
            Self::UnknownColumn { why: Some(why), .. } => Some(why.clone()),
            Self::UnknownColumn { nearest: Some(nearest), .. } => Some(format!("did you mean '{nearest}'?")),
            Self::NoUnit { header, fitting } => {
                fitting.first().map(|unit| format!("for example: {} [{unit}]", header.trim()))
            }
            Self::Unit { fault, .. } => fault.mend(),
            Self::Twice { .. } => Some("take one of them out".to_owned()),
            Self::WhoseUncertainty { .. } => {
                Some("name the column it belongs to, as 'drag uncertainty (k=2) [N]'".to_owned())
            }
            Self::Uneven { commas: true, .. } => {
                Some("decimal commas need semicolons or tabs between the columns".to_owned())
            }
            Self::NoNumber { mend, .. } => mend.map(str::to_owned),
            Self::NotOfTheCase { mend, .. } | Self::NoMotion { mend, .. } => Some(mend.clone()),
            _ => None,
        }
    }
}

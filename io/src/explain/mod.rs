//! What every word means: of the case file, of a result, of a table. One table of words, which the JSON Schema of the case file is
//! made of too; tests hold it in step with the reader and with every figure that a result holds.
//!
//! ```
//! use lenzbore_io::explain::{find, meanings};
//! let all = meanings();
//! let found = find("wall.layer.thickness", &all);
//! assert_eq!(found[0].what, "word of [[wall.layer]]");
//! assert!(found[0].about.contains("half the difference"));
//! ```

mod case_words;
mod columns;
mod figures;
mod form;
mod meaning;
mod results;
#[cfg(test)]
mod tests;

pub use case_words::{CASE_TABLES, CaseTable, CaseWord, case_table, case_word};
pub use figures::{FIGURES, FigureMeaning, figure_meaning};
pub use form::Form;
pub(crate) use form::short;
pub use meaning::{Meaning, find, meanings, nearest_names};
pub use results::{FILES, KEYS};
#[cfg(test)]
pub(crate) use tests::assert_explained;

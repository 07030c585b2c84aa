//! The material book: conductor and magnet grades with a source beside every number. Bare metals are not in it: what
//! a "copper" conducts differs by a factor of two between its grades.
//!
//! Own materials come from a file in the book's format, which a case names by `materials = "own-materials.toml"`:
//!
//! ```toml
//! [sources]
//! lab = "measured on the batch of May 2025, four points, 20 degC"
//!
//! [[conductor]]
//! family = "copper"
//! name = "tube, batch 7"
//! conductivity = { typical = "44.1 MS/m", minimum = "43.8 MS/m", maximum = "44.4 MS/m", source = "lab" }
//! ```
//!
//! ```
//! use lenzbore_io::materials::{GradeValue, book};
//! let grade = book().conductor("copper Cu-ETP")?;
//! assert_eq!(grade.conductivity_s_per_m.pick(GradeValue::Typical), 58.0e6);
//! assert!(book().conductor("copper").is_err());
//! # Ok::<(), lenzbore_io::message::CaseFault>(())
//! ```

mod book;
mod grade;
mod listed;
mod lookup;
mod number;
mod read;
mod shelf;
mod words;

pub(crate) use book::own_materials;
pub use book::{book, read_own_materials};
pub use grade::{Book, BookNumber, Conductor, Grade, GradeValue, MagnetGrade, Permeability};
pub use words::{CONDUCTOR_NUMBERS, MAGNET_NUMBERS, NumberWord};

#[cfg(test)]
mod tests;

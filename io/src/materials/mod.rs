//! The material book: conductor and magnet grades with a source beside every number. Bare metals are not in it: what
//! a "copper" conducts differs by a factor of two between its grades.
//!
//! ```
//! use lenzbore_io::materials::{GradeValue, conductor};
//! let grade = conductor("copper Cu-ETP")?;
//! assert_eq!(grade.conductivity_s_per_m.pick(GradeValue::Typical), 58.0e6);
//! assert!(conductor("copper").is_err());
//! # Ok::<(), lenzbore_io::message::CaseFault>(())
//! ```

mod book;
mod lookup;
mod raw;

pub use book::{Book, BookNumber, Conductor, Grade, GradeValue, MagnetGrade, book};
pub use lookup::{conductor, magnet, search};

#[cfg(test)]
mod tests;

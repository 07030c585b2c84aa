//! Quantities as people write them: a number and its unit, read to SI with the dimension checked.
//!
//! The unit table is our own: SI and its prefixes, the trade's inches, mils, gauss, oersted, kilogram-force,
//! pound-force and `%IACS`, and products and quotients of them. [`Kind`] says what a word measures and which units
//! fit it; [`read_quantity`] turns `"17.2 nohm m"`, wanted as a conductivity, into 5.81e7 S/m.
//!
//! ```
//! use lenzbore_io::units::{Kind, read_quantity};
//! assert_eq!(read_quantity("12 mm", Kind::Length)?.si, 0.012);
//! assert_eq!(read_quantity("100 %IACS", Kind::Conductivity)?.si, 58.0e6);
//! assert!(read_quantity("12 mT", Kind::Length).is_err());
//! # Ok::<(), lenzbore_io::units::QuantityFault>(())
//! ```

mod dimension;
mod expression;
mod fault;
mod kind;
mod number;
mod quantity;
mod table;

pub use dimension::Dimension;
pub use expression::read_unit;
pub use fault::QuantityFault;
pub use kind::Kind;
pub use quantity::{Quantity, read_bare_number, read_quantity};
pub use table::{Unit, unit_names};

#[cfg(test)]
mod tests;

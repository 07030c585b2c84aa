//! How strongly magnets are driven against their own magnetisation, and how much their coercivity leaves.
//!
//! Inside a magnet of recoil permeability 1, mu0 H = B - Br along its magnetisation. The opposing field -H has three parts: that of its own
//! poles, that of the mover's other parts, and that of the wall's currents (and of a permeable wall), which oppose what drives them. Its
//! greatest value over all magnets and over the travel stands against the intrinsic coercivity HcJ at the mover's temperature:
//!
//!   margin = 1 - (-H) / HcJ.
//!
//! A real magnet loses strength from the knee of its curve on, below HcJ; how far below is for its maker's data sheet to say. A recoil permeability
//! above 1 makes the opposing field weaker by that factor at most, which is left out: the margin errs on the safe side.

mod points;
mod watch;

pub(crate) use watch::{Opposed, Watch};

/// Name of the greatest opposing field, A/m.
pub(crate) const FIELD: &str = "demagnetising_field_peak";
/// Name of what the coercivity leaves.
pub(crate) const MARGIN: &str = "demagnetisation_margin";

#[cfg(test)]
mod tests;

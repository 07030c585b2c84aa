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

use crate::outcome::{Caution, Outcome};

/// Name of the greatest opposing field, A/m.
pub(crate) const FIELD: &str = "demagnetising_field_peak";
/// Name of what the coercivity leaves.
pub(crate) const MARGIN: &str = "demagnetisation_margin";

/// Share of the coercivity below which the rest is small: the knee of a square curve lies some tenth below HcJ (common practice).
const SMALL: f64 = 0.15;

/// Says so where the coercivity leaves little.
pub(crate) fn caution_in(outcome: &mut Outcome) {
    let Some(figure) = outcome.figures.iter().find(|f| f.name == MARGIN && f.value < SMALL) else { return };
    let text = if figure.value > 0.0 {
        format!(
            "The demagnetisation margin is only {:.1} %: a magnet loses strength for good from the knee of its curve on, before the margin is \
             0; hold it against the maker's curve at the mover's temperature.",
            100.0 * figure.value
        )
    } else {
        "The field against a magnet exceeds its coercivity: it would be demagnetised there, and the other figures do not hold.".to_owned()
    };
    outcome.cautions.push(Caution { text });
}

#[cfg(test)]
mod tests;

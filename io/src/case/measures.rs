//! Measures that several tables of a case share: what a word is to measure, and its sensible range.

use lenzbore_solver::problem::{Quantity as Number, SensibleRange};

use super::reader::{Wanted, wanted};
use crate::units::Kind;

/// A length that is more than nothing.
pub(super) const LENGTH: Wanted = wanted(Kind::Length, Number::Length);
/// A height, signed.
pub(super) const POSITION: Wanted = wanted(Kind::Length, Number::Position);
/// A length that may be nothing: a bore, a coating, a gap.
pub(super) const HOLE: Wanted = wanted(Kind::Length, Number::InnerRadius);
/// A relative change with temperature, signed.
pub(super) const COEFFICIENT: Wanted = Wanted {
    kind: Kind::TemperatureCoefficient,
    range: SensibleRange { lowest: 0.0, highest: 1.0, zero: true, signed: true },
};

//! Sizes that several tables share.

use super::{CaseWord, word};
use crate::explain::form::{Form, HOLE, LENGTH, POSITION};

/// The name of a part or a layer.
pub(super) const fn name(about: &'static str, example: &'static str) -> CaseWord {
    word("name", Form::Text, about, "its place in the list, as \"magnet 1\"", example)
}

/// Outer diameter of a part.
pub(super) const OUTER: CaseWord =
    word("outer_diameter", LENGTH, "outer diameter of the part", "needed", "outer_diameter = \"22 mm\"");
/// Inner diameter of a part.
pub(super) const INNER: CaseWord =
    word("inner_diameter", HOLE, "diameter of the hole through the part", "no hole", "inner_diameter = \"6 mm\"");
/// Axial length of a part.
pub(super) const LONG: CaseWord = word("length", LENGTH, "axial length of the part", "needed", "length = \"12 mm\"");
/// Centre of a part.
pub(super) const AT: CaseWord = word(
    "at",
    POSITION,
    "height of the part's centre over the mover's reference point, where no stack places it",
    "the reference point, for the only part; needed where there are several and no stack",
    "at = \"0 mm\"",
);

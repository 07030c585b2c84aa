//! `[curve]`.

use lenzbore_solver::problem::SensibleRange;

use super::{CaseTable, word};
use crate::explain::form::{Form, POSITION, TEMPERATURE};
use crate::units::Kind;

const CURVE_SPEED: Form =
    Form::Quantity(Kind::Speed, SensibleRange { lowest: 1e-9, highest: 3e6, zero: false, signed: false });

pub(super) const CURVE: CaseTable = CaseTable {
    path: "curve",
    about: "what `lenzbore curve` sweeps: settled fields in an endless wall (a finite length is taken as endless, and a caution says so)",
    words: &[
        word(
            "speeds",
            Form::List { of: &CURVE_SPEED, least: 2, most: None },
            "two speeds between which `points` are spread, or an increasing list as it stands",
            "needed",
            "speeds = [\"0.01 m/s\", \"50 m/s\"]",
        ),
        word(
            "points",
            Form::Count { least: 2, most: 10_000 },
            "how many speeds lie between the two",
            "40",
            "points = 40",
        ),
        word(
            "spacing",
            Form::Choice(&["log", "linear"]),
            "whether the points are evenly spread over the logarithm of speed or over speed",
            "\"log\"",
            "spacing = \"log\"",
        ),
        word(
            "temperatures",
            Form::List { of: &TEMPERATURE, least: 1, most: None },
            "temperatures of wall and mover together, a curve each: not modelled yet, and refused",
            "that of the case",
            "temperatures = [\"-30 degC\", \"20 degC\"]",
        ),
        word(
            "positions",
            Form::List { of: &POSITION, least: 1, most: None },
            "positions in a finite wall for the zero-speed damping coefficient: not modelled yet, and refused",
            "none",
            "positions = [\"0 mm\", \"90 mm\"]",
        ),
    ],
};

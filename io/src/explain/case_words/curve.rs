//! `[curve]`.

use lenzbore_solver::problem::{Quantity as Number, SensibleRange};

use super::{CaseTable, word};
use crate::explain::form::{FREQUENCY, Form, POSITION, TEMPERATURE, quantity};
use crate::units::Kind;

const CURVE_SPEED: Form =
    Form::Quantity(Kind::Speed, SensibleRange { lowest: 1e-9, highest: 3e6, zero: false, signed: false });

const AMPLITUDE: Form = quantity(Kind::Length, Number::Amplitude);

pub(super) const CURVE: CaseTable = CaseTable {
    path: "curve",
    about: "what `lenzbore curve` sweeps: speeds with settled fields in an endless wall (a finite length is taken as endless, and a caution says so), positions in a wall with ends, frequencies and amplitudes of strokes",
    words: &[
        word(
            "speeds",
            Form::List { of: &CURVE_SPEED, least: 2, most: None },
            "two speeds between which `points` are spread, or an increasing list as it stands",
            "needed, but where positions or strokes alone are swept",
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
            "temperatures of wall and mover together: a curve of drag against speed at each",
            "that of the case",
            "temperatures = [\"-30 degC\", \"20 degC\"]",
        ),
        word(
            "positions",
            Form::List { of: &POSITION, least: 1, most: None },
            "positions of the reference point in a wall with ends: the damping coefficient as the speed vanishes at each; between two, points are spread",
            "none",
            "positions = [\"0 mm\", \"90 mm\"]",
        ),
        word(
            "frequencies",
            Form::List { of: &FREQUENCY, least: 1, most: None },
            "frequencies of strokes (law sine), each swept with every amplitude",
            "the travel's frequency, where amplitudes are swept",
            "frequencies = [\"10 Hz\", \"50 Hz\"]",
        ),
        word(
            "amplitudes",
            Form::List { of: &AMPLITUDE, least: 1, most: None },
            "amplitudes of strokes (law sine), zero to peak, each swept with every frequency",
            "the travel's amplitude, where frequencies are swept",
            "amplitudes = [\"1 mm\", \"4 mm\"]",
        ),
    ],
};

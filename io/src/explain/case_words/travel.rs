//! `[travel]`: the laws and their words.

use lenzbore_solver::problem::{MOST_CYCLES, Quantity as Number};

use super::{CaseTable, word};
use crate::explain::form::{FREQUENCY, Form, POSITION, quantity};
use crate::units::Kind;

const VELOCITY: Form = quantity(Kind::Speed, Number::Velocity);
/// The laws of travel.
const LAW_NAMES: &[&str] = &["steady", "traverse", "free", "sine", "table", "alternating"];

/// Every law of travel and what it is.
pub(in crate::explain) const LAW_MEANINGS: &[(&str, &str)] = &[
    ("steady", "uniform speed in an endless wall, with settled fields"),
    ("traverse", "uniform speed through the whole wall, ends included"),
    ("free", "equation of motion: weight, push, friction, air, spring and the drag itself"),
    (
        "sine",
        "strokes to and fro: position = centre + amplitude sin(2 pi frequency t), until a cycle is as good as the next",
    ),
    ("table", "positions over time from a file, joined by a cubic spline"),
    (
        "alternating",
        "coils at rest with alternating current, in series: impedance, shielding and current density over frequency",
    ),
];

pub(super) const TRAVEL: CaseTable = CaseTable {
    path: "travel",
    about: "how the mover travels: a law, and the words of that law",
    words: &[
        word(
            "law",
            Form::Choice(LAW_NAMES),
            "the law of travel; it decides which other words belong here",
            "needed",
            "law = \"free\"",
        ),
        word("speed", VELOCITY, "uniform speed, a magnitude: 0 or greater", "needed", "speed = \"2 m/s\""),
        word(
            "from",
            POSITION,
            "where the reference point starts; from below `to` the mover travels upward",
            "the whole mover 6 bore diameters clear of the wall's end",
            "from = \"130 mm\"",
        ),
        word(
            "to",
            POSITION,
            "where the reference point ends",
            "the whole mover 6 bore diameters clear of the wall's other end",
            "to = \"-90 mm\"",
        ),
        word(
            "release",
            POSITION,
            "where the reference point is when the mover is let go",
            "needed",
            "release = \"640 mm\"",
        ),
        word(
            "entry_velocity",
            VELOCITY,
            "velocity at the release, upward positive",
            "0 m/s: let go at rest",
            "entry_velocity = \"-3 m/s\"",
        ),
        word(
            "until",
            POSITION,
            "where the run ends",
            "2 bore diameters beyond the gate that lies away from the release",
            "until = \"-60 mm\"",
        ),
        word(
            "time_limit",
            quantity(Kind::Time, Number::Time),
            "a run that has not ended by then is stopped, and says so",
            "60 s",
            "time_limit = \"60 s\"",
        ),
        word(
            "gravity",
            quantity(Kind::Acceleration, Number::Gravity),
            "acceleration of gravity, along -z where nothing is tilted",
            "9.80665 m/s2",
            "gravity = \"9.80665 m/s2\"",
        )
        .from("standard acceleration of gravity: 3rd General Conference on Weights and Measures, 1901 (from memory)"),
        word(
            "tilt_from_vertical",
            quantity(Kind::Angle, Number::Tilt),
            "angle between the axis and the vertical: 90 deg is level",
            "0 deg: vertical",
            "tilt_from_vertical = \"30 deg\"",
        ),
        word(
            "push",
            quantity(Kind::Force, Number::Push),
            "constant force along the axis on top of the weight, upward positive",
            "none",
            "push = \"-2 N\"",
        ),
        word(
            "friction",
            quantity(Kind::Force, Number::Friction),
            "constant friction against the motion, as of a seal",
            "none",
            "friction = \"0.4 N\"",
        ),
        word(
            "friction_coefficient",
            quantity(Kind::Ratio, Number::FrictionCoefficient),
            "friction on the weight across the axis; does nothing in a vertical bore",
            "0",
            "friction_coefficient = 0.15",
        ),
        word(
            "air_drag",
            quantity(Kind::AirDrag, Number::AirDrag),
            "quadratic air drag: force = air_drag x speed squared",
            "none",
            "air_drag = \"0.002 N s2/m2\"",
        ),
        word(
            "spring_rate",
            quantity(Kind::SpringRate, Number::SpringRate),
            "rate of a linear spring on the mover",
            "no spring",
            "spring_rate = \"120 N/m\"",
        ),
        word(
            "spring_free_at",
            POSITION,
            "position at which the spring is free of force",
            "needed with a spring",
            "spring_free_at = \"300 mm\"",
        ),
        word(
            "gates",
            Form::List { of: &POSITION, least: 2, most: Some(2) },
            "heights at which the reference point is timed: entry at the first that it passes, exit at the second",
            "the wall's ends, the nearer to the release first",
            "gates = [\"600 mm\", \"0 mm\"]",
        ),
        word(
            "centre",
            POSITION,
            "position about which the mover swings",
            "the middle of the wall",
            "centre = \"30 mm\"",
        ),
        word(
            "amplitude",
            quantity(Kind::Length, Number::Amplitude),
            "zero to peak: half the stroke, from the centre to a turning point",
            "needed",
            "amplitude = \"4 mm\"",
        ),
        word(
            "frequency",
            FREQUENCY,
            "law sine: strokes to and fro a second; law alternating: frequency of the current",
            "needed; law alternating takes `frequencies` instead",
            "frequency = \"50 Hz\"",
        ),
        word(
            "frequencies",
            Form::List { of: &FREQUENCY, least: 2, most: None },
            "two frequencies between which `points` are spread over the logarithm, or an increasing list as it stands",
            "`frequency` alone",
            "frequencies = [\"50 Hz\", \"200 kHz\"]",
        ),
        word(
            "points",
            Form::Count { least: 2, most: 1000 },
            "how many frequencies a sweep between two has",
            "25",
            "points = 25",
        ),
        word(
            "position",
            POSITION,
            "law alternating: height of the reference point of the coils at rest",
            "the wall's middle; in an endless wall heights count from it",
            "position = \"60 mm\"",
        ),
        word(
            "winding_resistance",
            quantity(Kind::Resistance, Number::Resistance),
            "resistance of the coils' own winding, added to what the wall adds",
            "0, with a caution",
            "winding_resistance = \"1.4 ohm\"",
        ),
        word(
            "cycles",
            Form::Count { least: 1, most: MOST_CYCLES },
            "how many cycles of strokes are followed; figures are those of the last",
            "as many as it takes until loss and stiffness no longer change",
            "cycles = 6",
        ),
        word(
            "file",
            Form::Text,
            "a table of time and position beside the case, with units in its header",
            "needed for law table",
            "file = \"motion.csv\"",
        ),
    ],
};

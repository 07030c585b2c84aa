//! `[accuracy]`, `[output]` and its stations.

use lenzbore_solver::problem::{Quantity as Number, SensibleRange};

use super::across::name;
use super::{CaseTable, word};
use crate::explain::form::{Form, HOLE, LENGTH, POSITION, quantity};
use crate::units::Kind;

const INSTANT: Form =
    Form::Quantity(Kind::Time, SensibleRange { lowest: 1e-12, highest: 1e9, zero: true, signed: false });
const PICTURE_WIDTH: Form =
    Form::Quantity(Kind::Length, SensibleRange { lowest: 0.05, highest: 1.2, zero: false, signed: false });
const TURNS: Form =
    Form::Quantity(Kind::Ratio, SensibleRange { lowest: 1e-3, highest: 1e7, zero: false, signed: false });
const RESULT: Form = Form::Choice(&["summary", "trace", "fields", "pictures", "report"]);

pub(super) const ACCURACY: CaseTable = CaseTable {
    path: "accuracy",
    about: "the wanted band of the figures, and overrides of the automatic grids",
    words: &[
        word(
            "target",
            quantity(Kind::Ratio, Number::TargetRelative),
            "wanted half-width of every headline figure's band, as a share of the figure; a hundred times as wide for a local figure",
            "0.01 %",
            "target = \"0.1 %\"",
        ),
        word(
            "levels",
            Form::Count { least: 3, most: 5 },
            "how many grid levels are solved",
            "three, and more while the target is missed",
            "levels = 3",
        ),
        word(
            "cells_across_wall",
            Form::Count { least: 4, most: 200 },
            "least number of cells across every layer on the coarsest level",
            "as the grid rules say",
            "cells_across_wall = 8",
        ),
    ],
};

pub(super) const OUTPUT: CaseTable = CaseTable {
    path: "output",
    about: "what the result folder holds",
    words: &[
        word(
            "write",
            Form::List { of: &RESULT, least: 0, most: None },
            "which results are written beside the summary, which always is",
            "all that apply",
            "write = [\"summary\", \"trace\", \"fields\", \"pictures\", \"report\"]",
        ),
        word(
            "fields",
            Form::Any(&[
                Form::Pattern("^\\s*(none|every .*[0-9].*)\\s*$"),
                Form::List { of: &INSTANT, least: 1, most: None },
            ]),
            "instants at which the fields are kept: every so much travel or time, a list of instants, or \"none\"",
            "instants that the program chooses",
            "fields = \"every 20 mm\"",
        ),
        word(
            "picture_width",
            PICTURE_WIDTH,
            "how wide the pictures are on paper; letters and lines grow in proportion",
            "85 mm, one column of a page",
            "picture_width = \"170 mm\"",
        ),
        word("station", Form::Tables, "gauges at fixed places, for laying beside a measurement", "none", ""),
    ],
};

pub(super) const STATION: CaseTable = CaseTable {
    path: "output.station",
    about: "a gauge at a fixed place, whose readings over a motion in time have bands; under steady and alternating refused as not modelled yet",
    words: &[
        name("what results call the gauge", "name = \"G1\""),
        word("at", POSITION, "height of the gauge, of a search coil of its middle", "needed", "at = \"90 mm\""),
        word(
            "radius",
            HOLE,
            "radius at which it sits",
            "half the diameter, and one of the two is needed",
            "radius = \"16 mm\"",
        ),
        word(
            "what",
            Form::Choice(&["flux density", "current density", "search coil"]),
            "what it reads",
            "needed",
            "what = \"search coil\"",
        ),
        word("turns", TURNS, "turns of a search coil", "needed for a search coil", "turns = 100"),
        word(
            "diameter",
            HOLE,
            "diameter at which it sits, of a search coil that of its turns",
            "twice the radius, and one of the two is needed",
            "diameter = \"40 mm\"",
        ),
        word(
            "length",
            LENGTH,
            "length over which the turns of a search coil are spread",
            "all turns at one height",
            "length = \"3 mm\"",
        ),
    ],
};

//! The words of the file itself, and of `[record]`.

use super::{CaseTable, CaseWord, word};
use crate::explain::form::Form;

const NOT_ASKED: &str = "not asked";

pub(super) const TOP: CaseTable = CaseTable {
    path: "",
    about: "a case: what stands still, what travels, and how; heights count from the wall's lower end, sizes across are diameters",
    words: &[
        word("title", Form::Text, "what the case is called in results", "the file's name", "title = \"Arrest sleeve\""),
        word(
            "like",
            Form::Text,
            "another case file, beside this one, that it starts from: its words hold where this file has none; parts are matched by name",
            "it starts from nothing",
            "like = \"base.toml\"",
        ),
        word(
            "materials",
            Form::Text,
            "a file of own materials beside the case; every number in it names its source",
            "the material book alone",
            "materials = \"own-materials.toml\"",
        ),
        word("record", Form::Table, "texts for the report: document, revision, purpose and the like", "no record", ""),
        word("wall", Form::Table, "the conductor at rest: tube, sleeve, layers or rod", "needed", ""),
        word("mover", Form::Table, "everything that travels (under law alternating: the coils at rest)", "needed", ""),
        word("travel", Form::Table, "how the mover travels", "`curve` alone is asked", ""),
        word(
            "cooling",
            Form::Table,
            "how the wall gives off heat to the air",
            "the wall gives off none: one event warms it without loss",
            "",
        ),
        word("duty", Form::Table, "the event of [travel] again and again, the wall warming", "one event", ""),
        word("curve", Form::Table, "what `lenzbore curve` sweeps", NOT_ASKED, ""),
        word(
            "tolerance",
            Form::Tolerances,
            "how far inputs may be off, as half-widths that are taken as 95 %, each under the path of its word",
            "inputs are taken as exact, and figures have no input spread",
            "\"wall.sleeve.thickness\" = \"10 %\"",
        ),
        word(
            "accuracy",
            Form::Table,
            "the wanted band of the figures, and overrides of the automatic grids",
            "its defaults",
            "",
        ),
        word("output", Form::Table, "what the result folder holds", "its defaults", ""),
    ],
};

const fn text(name: &'static str, about: &'static str, example: &'static str) -> CaseWord {
    word(name, Form::Text, about, "left out", example)
}

pub(super) const RECORD: CaseTable = CaseTable {
    path: "record",
    about: "texts that are printed on the report and are part of the digest",
    words: &[
        text("document", "number of the document that the result belongs to", "document = \"EB-104\""),
        text("revision", "its revision", "revision = \"B\""),
        text("purpose", "what the figures are for", "purpose = \"first sizing\""),
        text("prepared", "who prepared the case, and when", "prepared = \"A. Example, 3 May\""),
        text("checked", "who checked it, and when", "checked = \"B. Example, 5 May\""),
    ],
};

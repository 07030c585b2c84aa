//! The vocabulary: every table of a case file and the words it has.

/// One table of the case file.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct TableWords {
    /// Path, as `wall.layer`; empty for the file itself.
    pub path: &'static str,
    /// How messages call it, as `[[wall.layer]]`.
    pub label: &'static str,
    /// Its words.
    pub words: &'static [&'static str],
    /// Those of its words that are lists of tables, addressed by the `name` of each.
    pub lists: &'static [&'static str],
}

/// Every table.
pub const TABLES: [TableWords; 17] = [
    TableWords {
        path: "",
        label: "a case file",
        words: &[
            "title",
            "like",
            "materials",
            "record",
            "wall",
            "mover",
            "travel",
            "cooling",
            "duty",
            "curve",
            "tolerance",
            "accuracy",
            "output",
        ],
        lists: &[],
    },
    TableWords {
        path: "record",
        label: "[record]",
        words: &["document", "revision", "purpose", "prepared", "checked"],
        lists: &[],
    },
    TableWords {
        path: "wall",
        label: "[wall]",
        words: &["length", "temperature", "slots", "layer"],
        lists: &["layer"],
    },
    TableWords {
        path: "wall.layer",
        label: "[[wall.layer]]",
        words: &[
            "name",
            "material",
            "grade_value",
            "conductivity",
            "conductivity_at",
            "temperature_coefficient",
            "permeability",
            "density",
            "specific_heat",
            "thermal_conductivity",
            "size",
            "inner_diameter",
            "outer_diameter",
            "thickness",
            "from",
            "to",
        ],
        lists: &[],
    },
    TableWords {
        path: "mover",
        label: "[mover]",
        words: &[
            "mass",
            "temperature",
            "stack",
            "stack_gap",
            "reference",
            "magnet",
            "spacer",
            "dipole",
            "coil",
            "iron",
        ],
        lists: &["magnet", "spacer", "dipole", "coil", "iron"],
    },
    TableWords {
        path: "mover.magnet",
        label: "[[mover.magnet]]",
        words: &[
            "name",
            "material",
            "grade_value",
            "remanence",
            "remanence_coefficient",
            "recoil_permeability",
            "coercivity_hcj",
            "coercivity_hcj_coefficient",
            "outer_diameter",
            "inner_diameter",
            "length",
            "coating",
            "at",
            "north",
        ],
        lists: &[],
    },
    TableWords { path: "mover.spacer", label: "[[mover.spacer]]", words: &["name", "length"], lists: &[] },
    TableWords { path: "mover.dipole", label: "[[mover.dipole]]", words: &["name", "moment", "at"], lists: &[] },
    TableWords {
        path: "mover.coil",
        label: "[[mover.coil]]",
        words: &["name", "inner_diameter", "outer_diameter", "length", "turns", "current", "at"],
        lists: &[],
    },
    TableWords {
        path: "mover.iron",
        label: "[[mover.iron]]",
        words: &["name", "material", "permeability", "inner_diameter", "outer_diameter", "length", "at"],
        lists: &[],
    },
    TableWords { path: "travel", label: "[travel]", words: &TRAVEL_WORDS, lists: &[] },
    TableWords {
        path: "cooling",
        label: "[cooling]",
        words: &["bore_film_coefficient", "outside_film_coefficient", "ends_film_coefficient", "ambient"],
        lists: &[],
    },
    TableWords { path: "duty", label: "[duty]", words: &["period", "repeats"], lists: &[] },
    TableWords {
        path: "curve",
        label: "[curve]",
        words: &["speeds", "points", "spacing", "temperatures", "positions", "frequencies", "amplitudes"],
        lists: &[],
    },
    TableWords { path: "accuracy", label: "[accuracy]", words: &["target", "levels", "cells_across_wall"], lists: &[] },
    TableWords {
        path: "output",
        label: "[output]",
        words: &["write", "fields", "picture_width", "station"],
        lists: &["station"],
    },
    TableWords {
        path: "output.station",
        label: "[[output.station]]",
        words: &["name", "at", "radius", "diameter", "what", "turns", "length"],
        lists: &[],
    },
];

/// Words of `[travel]` under any law.
const TRAVEL_WORDS: [&str; 26] = [
    "law",
    "speed",
    "from",
    "to",
    "release",
    "entry_velocity",
    "until",
    "time_limit",
    "gravity",
    "tilt_from_vertical",
    "push",
    "friction",
    "friction_coefficient",
    "air_drag",
    "spring_rate",
    "spring_free_at",
    "gates",
    "centre",
    "amplitude",
    "frequency",
    "frequencies",
    "position",
    "winding_resistance",
    "cycles",
    "file",
    "points",
];

/// A law of travel and the words it takes beside `law`.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct LawWords {
    /// The law.
    pub law: &'static str,
    /// Its words.
    pub words: &'static [&'static str],
    /// Whether it can be solved.
    pub modelled: bool,
}

/// Every law of travel.
pub const LAWS: [LawWords; 6] = [
    LawWords { law: "steady", words: &["speed"], modelled: true },
    LawWords { law: "traverse", words: &["speed", "from", "to"], modelled: true },
    LawWords {
        law: "free",
        words: &[
            "release",
            "entry_velocity",
            "until",
            "time_limit",
            "gravity",
            "tilt_from_vertical",
            "push",
            "friction",
            "friction_coefficient",
            "air_drag",
            "spring_rate",
            "spring_free_at",
            "gates",
        ],
        modelled: true,
    },
    LawWords { law: "sine", words: &["centre", "amplitude", "frequency", "cycles"], modelled: true },
    LawWords { law: "table", words: &["file"], modelled: true },
    LawWords {
        law: "alternating",
        words: &["frequency", "frequencies", "points", "position", "winding_resistance"],
        modelled: true,
    },
];

/// The law of that name.
#[must_use]
pub fn law_words(law: &str) -> Option<&'static LawWords> {
    LAWS.iter().find(|l| l.law == law)
}

/// The table at a path.
#[must_use]
pub fn table_words(path: &str) -> Option<&'static TableWords> {
    TABLES.iter().find(|t| t.path == path)
}

/// A table other than `path` that has this very word.
#[must_use]
pub fn elsewhere(word: &str, path: &str) -> Option<&'static str> {
    TABLES.iter().find(|t| t.path != path && t.words.contains(&word)).map(|t| t.label)
}

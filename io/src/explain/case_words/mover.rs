//! `[mover]` and its parts.

use lenzbore_solver::problem::{Quantity as Number, SensibleRange};

use super::across::{AT, INNER, LONG, OUTER, name};
use super::{CaseTable, word};
use crate::explain::form::{
    COEFFICIENT, Form, GRADE_VALUE, HOLE, LENGTH, PERMEABILITY, POSITION, TEMPERATURE, quantity,
};
use crate::units::Kind;

const TURNS: Form =
    Form::Quantity(Kind::Ratio, SensibleRange { lowest: 1e-3, highest: 1e7, zero: false, signed: false });
const COERCIVITY: SensibleRange = SensibleRange { lowest: 1e2, highest: 1e8, zero: false, signed: false };
const CURRENT: Form =
    Form::Quantity(Kind::Current, SensibleRange { lowest: 0.0, highest: 1e7, zero: true, signed: true });

pub(super) const MOVER: CaseTable = CaseTable {
    path: "mover",
    about: "everything that travels: magnets, spacers, dipoles, coils, with mass and temperature; its positions are those of its reference point",
    words: &[
        word(
            "mass",
            quantity(Kind::Mass, Number::Mass),
            "mass of all that travels, carrier and load included",
            "not needed but for law free",
            "mass = \"0.42 kg\"",
        ),
        word(
            "temperature",
            TEMPERATURE,
            "temperature of the magnets; remanence follows it by its coefficient",
            "20 degC",
            "temperature = \"20 degC\"",
        ),
        word(
            "stack",
            Form::List { of: &Form::Text, least: 1, most: Some(1000) },
            "names of the parts from bottom to top; behind a magnet's or coil's name + turns its north up, - down; a name may recur",
            "each part is placed by `at`",
            "stack = [\"M+\", \"S\", \"M-\"]",
        ),
        word(
            "stack_gap",
            HOLE,
            "gap between neighbours of the stack, as of adhesive",
            "neighbours touch",
            "stack_gap = \"0.1 mm\"",
        ),
        word(
            "reference",
            Form::Any(&[Form::Choice(&["middle", "lower end", "upper end"]), POSITION]),
            "the stack's reference point, which positions, gates and release count for; a length is its height over the stack's lower end",
            "\"middle\" of the mover's length",
            "reference = \"lower end\"",
        ),
        word("magnet", Form::Tables, "axially magnetised cylinders or rings", "none", ""),
        word("spacer", Form::Tables, "parts of a stack that neither conduct nor have a field", "none", ""),
        word("dipole", Form::Tables, "ideal axial point dipoles", "none", ""),
        word("coil", Form::Tables, "coils of rectangular section", "none", ""),
        word("iron", Form::Tables, "pole pieces and back iron: not modelled yet, and refused", "none", ""),
    ],
};

pub(super) const MAGNET: CaseTable = CaseTable {
    path: "mover.magnet",
    about: "an axially magnetised cylinder or ring",
    words: &[
        name("what stack, overrides and results call the magnet", "name = \"M\""),
        word(
            "material",
            Form::Text,
            "a grade of the material book or of the case's own materials",
            "remanence is needed",
            "material = \"NdFeB N42SH\"",
        ),
        word(
            "grade_value",
            GRADE_VALUE,
            "which bound of the grade's remanence is taken",
            "\"typical\"",
            "grade_value = \"minimum\"",
        ),
        word(
            "remanence",
            quantity(Kind::FluxDensity, Number::Remanence),
            "remanence at 20 degC",
            "the material's",
            "remanence = \"1.30 T\"",
        ),
        word(
            "remanence_coefficient",
            COEFFICIENT,
            "relative change of remanence with temperature from 20 degC",
            "the material's; with neither, remanence stays as it is and a caution says so",
            "remanence_coefficient = \"-0.12 %/K\"",
        ),
        word(
            "recoil_permeability",
            quantity(Kind::Ratio, Number::RecoilPermeability),
            "relative recoil permeability of the magnet",
            "the material's, else 1 with a caution",
            "recoil_permeability = 1.05",
        ),
        word(
            "coercivity_hcj",
            Form::Quantity(Kind::FieldStrength, COERCIVITY),
            "intrinsic coercivity HcJ at 20 degC: the opposing field at which the polarisation is gone",
            "the material's least, else no demagnetisation figures",
            "coercivity_hcj = \"20 kOe\"",
        ),
        word(
            "coercivity_hcj_coefficient",
            COEFFICIENT,
            "relative change of the intrinsic coercivity with temperature",
            "the material's, else none and a caution",
            "coercivity_hcj_coefficient = \"-0.55 %/K\"",
        ),
        OUTER,
        INNER,
        LONG,
        word(
            "coating",
            HOLE,
            "thickness of the coating on every side; the magnet's sizes are over it, and it has no field",
            "no coating",
            "coating = \"15 um\"",
        ),
        AT,
        word(
            "north",
            Form::Choice(&["up", "down"]),
            "where its north points, where no stack says it",
            "\"up\"",
            "north = \"down\"",
        ),
    ],
};

pub(super) const SPACER: CaseTable = CaseTable {
    path: "mover.spacer",
    about: "a part of a stack that neither conducts nor has a field",
    words: &[
        name("what the stack calls the spacer", "name = \"S\""),
        word("length", LENGTH, "axial length of the spacer", "needed", "length = \"4 mm\""),
    ],
};

pub(super) const DIPOLE: CaseTable = CaseTable {
    path: "mover.dipole",
    about: "an ideal axial point dipole",
    words: &[
        name("what overrides and results call the dipole", "name = \"D\""),
        word(
            "moment",
            quantity(Kind::Moment, Number::Moment),
            "magnetic moment; negative turns its north down",
            "needed",
            "moment = \"1.2 A m2\"",
        ),
        AT,
    ],
};

pub(super) const COIL: CaseTable = CaseTable {
    path: "mover.coil",
    about: "a coil of rectangular section with evenly spread turns",
    words: &[
        name("what stack, overrides and results call the coil", "name = \"probe\""),
        INNER,
        OUTER,
        LONG,
        word("turns", TURNS, "number of turns", "needed", "turns = 200"),
        word(
            "current",
            CURRENT,
            "current in each turn: steady, or zero to peak under law alternating; negative turns the field round",
            "needed",
            "current = \"2 A\"",
        ),
        AT,
    ],
};

pub(super) const IRON: CaseTable = CaseTable {
    path: "mover.iron",
    about: "a pole piece or back iron that travels: not modelled yet, and refused",
    words: &[
        name("what overrides and results call the piece", "name = \"P\""),
        word(
            "material",
            Form::Text,
            "a grade of the material book",
            "permeability is needed",
            "material = \"steel S235JR\"",
        ),
        word("permeability", PERMEABILITY, "relative magnetic permeability", "the material's", "permeability = 500"),
        INNER,
        OUTER,
        LONG,
        AT,
    ],
};

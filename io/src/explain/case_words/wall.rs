//! `[wall]` and its layers.

use lenzbore_solver::problem::Quantity as Number;

use super::across::name;
use super::{CaseTable, word};
use crate::case::{CONDUCTION, DENSITY, SPECIFIC_HEAT};
use crate::explain::form::{
    COEFFICIENT, Form, GRADE_VALUE, HOLE, LENGTH, PERMEABILITY, POSITION, TEMPERATURE, quantity,
};
use crate::units::Kind;

pub(super) const WALL: CaseTable = CaseTable {
    path: "wall",
    about: "the conductor at rest: tube, sleeve, layers or rod; z = 0 is its lower end",
    words: &[
        word(
            "length",
            Form::Any(&[LENGTH, Form::Choice(&["endless"])]),
            "axial length of the wall, or \"endless\" for settled fields far from the ends",
            "needed",
            "length = \"600 mm\"",
        ),
        word(
            "temperature",
            TEMPERATURE,
            "temperature of the whole wall; conductivities follow it by their temperature coefficients",
            "20 degC",
            "temperature = \"60 degC\"",
        ),
        word(
            "slots",
            Form::Count { least: 1, most: 1000 },
            "number of narrow slots along the whole wall, evenly round it; what they leave of the drag is given beside the field \
             solution, which has none, as an approximation with a model band",
            "none",
            "slots = 6",
        ),
        word("layer", Form::Tables, "one or more layers; they may touch or leave gaps, never overlap", "needed", ""),
    ],
};

const SIZE: &str =
    "follows from the other two sizes; two of inner_diameter, outer_diameter and thickness are needed, or size";

pub(super) const LAYER: CaseTable = CaseTable {
    path: "wall.layer",
    about: "one layer of the wall: its metal, its sizes across (two of the three, or the trade size) and its axial extent",
    words: &[
        name("what overrides, tolerances and results call the layer, as in wall.sleeve.thickness", "name = \"sleeve\""),
        word(
            "material",
            Form::Text,
            "a grade of the material book or of the case's own materials; `lenzbore materials` lists them",
            "conductivity is needed",
            "material = \"copper Cu-DHP\"",
        ),
        word(
            "grade_value",
            GRADE_VALUE,
            "which bound of the grade's conductivity is taken",
            "\"typical\"",
            "grade_value = \"minimum\"",
        ),
        word(
            "conductivity",
            quantity(Kind::Conductivity, Number::Conductivity),
            "electrical conductivity at conductivity_at; a resistivity is read too, and inverted",
            "the material's",
            "conductivity = \"85 %IACS\"",
        )
        .from("100 %IACS = 58.0 MS/m at 20 degC: IEC 60028, 1925 (from memory)"),
        word(
            "conductivity_at",
            TEMPERATURE,
            "temperature at which a given conductivity holds",
            "20 degC",
            "conductivity_at = \"20 degC\"",
        ),
        word(
            "temperature_coefficient",
            COEFFICIENT,
            "relative rise of resistivity with temperature, at the temperature of the conductivity; resistivity is taken as linear in temperature",
            "the material's; with neither, conductivity stays as it is and a caution says so",
            "temperature_coefficient = \"0.0033 /K\"",
        ),
        word(
            "permeability",
            PERMEABILITY,
            "relative magnetic permeability, linear and without hysteresis",
            "the material's, else 1",
            "permeability = 100",
        ),
        word(
            "density",
            Form::Quantity(DENSITY.kind, DENSITY.range),
            "density, for how warm the wall gets",
            "the material's; with neither, temperatures are left out",
            "density = \"8940 kg/m3\"",
        ),
        word(
            "specific_heat",
            Form::Quantity(SPECIFIC_HEAT.kind, SPECIFIC_HEAT.range),
            "specific heat, taken as constant",
            "the material's; with neither, temperatures are left out",
            "specific_heat = \"385 J/(kg K)\"",
        ),
        word(
            "thermal_conductivity",
            Form::Quantity(CONDUCTION.kind, CONDUCTION.range),
            "thermal conductivity, taken as constant; [cooling] and [duty] need it",
            "the material's",
            "thermal_conductivity = \"340 W/(m K)\"",
        ),
        word(
            "size",
            Form::Pattern("[0-9].*[xX\u{d7}].*[0-9].*[A-Za-z]"),
            "trade size: outer diameter x thickness",
            "given by two of the three sizes",
            "size = \"28 x 1.5 mm\"",
        ),
        word(
            "inner_diameter",
            HOLE,
            "inner diameter; 0 makes the innermost layer a rod",
            SIZE,
            "inner_diameter = \"25 mm\"",
        ),
        word("outer_diameter", LENGTH, "outer diameter", SIZE, "outer_diameter = \"28 mm\""),
        word(
            "thickness",
            LENGTH,
            "half the difference of outer and inner diameter; of two given sizes both stay when one is swept, and the third follows",
            SIZE,
            "thickness = \"1.5 mm\"",
        ),
        word(
            "from",
            POSITION,
            "height of the layer's lower end within the wall",
            "the wall's lower end",
            "from = \"0 mm\"",
        ),
        word(
            "to",
            POSITION,
            "height of the layer's upper end within the wall",
            "the wall's upper end",
            "to = \"300 mm\"",
        ),
    ],
};

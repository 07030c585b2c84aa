//! `[cooling]` and `[duty]`.

use lenzbore_solver::problem::MOST_STOPS;

use super::{CaseTable, word};
use crate::case::{FILM, PERIOD, UNTIL_SETTLED};
use crate::explain::form::{Form, TEMPERATURE};

const FILM_FORM: Form = Form::Quantity(FILM.kind, FILM.range);

pub(super) const COOLING: CaseTable = CaseTable {
    path: "cooling",
    about: "how the wall gives off heat to the air, by Newton's law: flux = film coefficient x (surface - ambient); faces in gaps between layers are insulated, touching layers in perfect contact",
    words: &[
        word(
            "bore_film_coefficient",
            FILM_FORM,
            "film coefficient of the bore's surface (common practice: 5 to 10 W/(m2 K) in still air, radiation of a dull surface included)",
            "0: insulated",
            "bore_film_coefficient = \"8 W/(m2 K)\"",
        ),
        word(
            "outside_film_coefficient",
            FILM_FORM,
            "film coefficient of the outside",
            "0: insulated",
            "outside_film_coefficient = \"12 W/(m2 K)\"",
        ),
        word(
            "ends_film_coefficient",
            FILM_FORM,
            "film coefficient of the faces across the axis: both ends of the wall and of its sections",
            "0: insulated",
            "ends_film_coefficient = \"10 W/(m2 K)\"",
        ),
        word(
            "ambient",
            TEMPERATURE,
            "temperature of the air in the bore and outside",
            "wall.temperature",
            "ambient = \"25 degC\"",
        ),
    ],
};

pub(super) const DUTY: CaseTable = CaseTable {
    path: "duty",
    about: "the event of [travel] again and again: each leaves its heat at one instant, the wall conducts and cools until the next, and drag and heat follow the wall's temperature",
    words: &[
        word(
            "period",
            Form::Quantity(PERIOD.kind, PERIOD.range),
            "time from the start of one event to the next",
            "needed",
            "period = \"20 s\"",
        ),
        word(
            "repeats",
            Form::Any(&[Form::Count { least: 1, most: MOST_STOPS }, Form::Choice(&[UNTIL_SETTLED])]),
            "number of events, or \"until settled\", which needs [cooling]",
            "\"until settled\"",
            "repeats = 30",
        ),
    ],
};

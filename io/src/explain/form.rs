//! What a word of the case file takes: a quantity, a text, one of several choices, a list.

use lenzbore_solver::problem::{Quantity as Number, SensibleRange};

use crate::units::Kind;

/// What a word takes.
#[derive(Debug, Clone, Copy, PartialEq)]
#[non_exhaustive]
pub enum Form {
    /// A table, whose words stand in [`crate::case::TABLES`].
    Table,
    /// A list of tables.
    Tables,
    /// Tolerances by the path of a word.
    Tolerances,
    /// A text.
    Text,
    /// A number with its unit; a bare number is in the SI unit.
    Quantity(Kind, SensibleRange),
    /// One of these texts.
    Choice(&'static [&'static str]),
    /// A whole number.
    Count {
        /// The least.
        least: u32,
        /// The greatest.
        most: u32,
    },
    /// A list of values of one form.
    List {
        /// The form of each.
        of: &'static Form,
        /// So many at least.
        least: u32,
        /// So many at most.
        most: Option<u32>,
    },
    /// A text of a pattern of its own, which the example shows; the regular expression stands in the schema.
    Pattern(&'static str),
    /// Any of these.
    Any(&'static [Form]),
}

/// A quantity of `kind` in the sensible range of `number`.
pub(super) const fn quantity(kind: Kind, number: Number) -> Form {
    Form::Quantity(kind, number.sensible())
}

/// A length that is more than nothing.
pub(super) const LENGTH: Form = quantity(Kind::Length, Number::Length);
/// A height, signed.
pub(super) const POSITION: Form = quantity(Kind::Length, Number::Position);
/// A length that may be nothing.
pub(super) const HOLE: Form = quantity(Kind::Length, Number::InnerRadius);
/// A relative change with temperature, signed.
pub(super) const COEFFICIENT: Form =
    Form::Quantity(Kind::TemperatureCoefficient, SensibleRange { lowest: 0.0, highest: 1.0, zero: true, signed: true });
/// A temperature.
pub(super) const TEMPERATURE: Form =
    Form::Quantity(Kind::Temperature, SensibleRange { lowest: 1.0, highest: 2000.0, zero: false, signed: false });
/// A frequency.
pub(super) const FREQUENCY: Form = quantity(Kind::Frequency, Number::Frequency);
/// A relative permeability.
pub(super) const PERMEABILITY: Form = quantity(Kind::Ratio, Number::RelativePermeability);
/// Which of a grade's values.
pub(super) const GRADE_VALUE: Form = Form::Choice(&["minimum", "typical", "maximum"]);

impl Form {
    /// In words: `a length, as mm, um, cm, m, in, mil; a bare number is in m`.
    #[must_use]
    pub fn words(&self) -> String {
        match self {
            Self::Table => "a table".to_owned(),
            Self::Tables => "a list of tables".to_owned(),
            Self::Tolerances => {
                "the path of a word with its half-width, [minus, plus], or a share of its value".to_owned()
            }
            Self::Text => "a text".to_owned(),
            Self::Pattern(_) => "a text, as in the example".to_owned(),
            Self::Quantity(kind, _) => of_kind(*kind),
            Self::Choice(choices) => {
                choices.iter().map(|c| format!("\"{c}\"")).collect::<Vec<_>>().join(", ").replace("\", \"", "\" or \"")
            }
            Self::Count { least, most } => format!("a whole number from {least} to {most}"),
            Self::List { of, least, most: Some(most) } if least == most => {
                format!("a list of {least}, each {}", of.words())
            }
            Self::List { of, .. } => format!("a list, each {}", of.words()),
            Self::Any(forms) => forms.iter().map(Self::words).collect::<Vec<_>>().join("; or "),
        }
    }

    /// The sensible range in words, with its unit, where it takes a quantity.
    #[must_use]
    pub fn range(&self) -> Option<String> {
        match self {
            Self::Quantity(kind, range) => Some(in_words(*kind, range)),
            Self::List { of, .. } => of.range(),
            Self::Any(forms) => forms.iter().find_map(Self::range),
            _ => None,
        }
    }

    /// The kinds of quantity that it takes.
    #[must_use]
    pub fn kinds(&self) -> Vec<Kind> {
        match self {
            Self::Quantity(kind, _) => vec![*kind],
            Self::List { of, .. } => of.kinds(),
            Self::Any(forms) => forms.iter().flat_map(Self::kinds).collect(),
            _ => Vec::new(),
        }
    }
}

fn of_kind(kind: Kind) -> String {
    if kind == Kind::Ratio {
        return "a number, or a share in %".to_owned();
    }
    format!("{kind} with its unit, as {}; a bare number is in {}", kind.fitting_units().join(", "), kind.si_unit())
}

fn in_words(kind: Kind, range: &SensibleRange) -> String {
    let unit = if kind == Kind::Ratio { String::new() } else { format!(" {}", kind.si_unit()) };
    let SensibleRange { lowest, highest, zero, signed } = *range;
    match (signed, zero) {
        (true, _) => format!("{}{unit} to {}{unit}", short(-highest), short(highest)),
        (false, true) => format!("0, or {}{unit} to {}{unit}", short(lowest), short(highest)),
        (false, false) => format!("{}{unit} to {}{unit}", short(lowest), short(highest)),
    }
}

/// A bound in few digits.
pub(crate) fn short(x: f64) -> String {
    // A right angle is the one bound that is no round number.
    if (x.abs() - std::f64::consts::FRAC_PI_2).abs() < 1.0e-12 {
        return format!("{x:.4}");
    }
    if x.abs() > 0.0 && !(1.0e-3..1.0e5).contains(&x.abs()) { format!("{x:e}") } else { format!("{x}") }
}

//! What can be wrong with a written quantity.

use super::kind::Kind;

/// Why a text is no quantity of the wanted kind. The message leaves out where it stands: the case reader adds that.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
#[non_exhaustive]
pub enum QuantityFault {
    /// No number at the start.
    #[error("'{text}' does not start with a number")]
    NoNumber {
        /// The whole text.
        text: String,
    },
    /// A comma where the decimal point belongs.
    #[error("'{text}' has a comma in its number")]
    DecimalComma {
        /// The whole text.
        text: String,
        /// The same with a decimal point.
        suggestion: String,
    },
    /// NaN, an infinity, or a number beyond what a float holds.
    #[error("'{text}' is not a finite number")]
    NotFinite {
        /// The whole text.
        text: String,
    },
    /// A number with nothing behind it, inside quotes.
    #[error("'{text}' has no unit")]
    MissingUnit {
        /// The whole text.
        text: String,
        /// What was wanted.
        wanted: Kind,
    },
    /// A unit that the table does not know.
    #[error("'{unit}' is no known unit")]
    UnknownUnit {
        /// The part that is not known.
        unit: String,
        /// The nearest name that is known, if any is near.
        nearest: Option<String>,
        /// What was wanted.
        wanted: Kind,
    },
    /// A unit that can be read in two ways, or cannot be read as products and quotients.
    #[error("the unit '{unit}' cannot be read: {why}")]
    Unreadable {
        /// The whole unit.
        unit: String,
        /// What is wrong with it.
        why: &'static str,
        /// What was wanted.
        wanted: Kind,
    },
    /// A unit of another kind.
    #[error("'{unit}' does not measure {wanted}{}", measures.map(|k| format!(" but {k}")).unwrap_or_default())]
    WrongKind {
        /// The unit found.
        unit: String,
        /// What it measures, where that has a name here.
        measures: Option<Kind>,
        /// What was wanted.
        wanted: Kind,
    },
    /// A resistivity of zero where a conductivity is wanted.
    #[error("a resistivity of zero has no conductivity")]
    ZeroResistivity,
}

impl QuantityFault {
    /// What would be legal, in the user's words.
    #[must_use]
    pub fn legal(&self) -> Option<String> {
        match self {
            Self::MissingUnit { wanted, .. }
            | Self::UnknownUnit { wanted, .. }
            | Self::Unreadable { wanted, .. }
            | Self::WrongKind { wanted, .. } => Some(match wanted.fitting_units() {
                [] => format!("{wanted} is a bare number"),
                units => format!("units that fit {wanted}: {}", units.join(", ")),
            }),
            Self::NoNumber { .. } => Some("a number followed by its unit, as \"12 mm\"".to_owned()),
            Self::DecimalComma { .. } | Self::NotFinite { .. } | Self::ZeroResistivity => None,
        }
    }

    /// What to write instead, in the user's words.
    #[must_use]
    pub fn mend(&self) -> Option<String> {
        match self {
            Self::DecimalComma { suggestion, .. } => {
                Some(format!("the decimal mark is a point and digits are not grouped: did you mean '{suggestion}'?"))
            }
            Self::UnknownUnit { nearest: Some(nearest), .. } => Some(format!("did you mean '{nearest}'?")),
            Self::MissingUnit { text, wanted } => wanted.fitting_units().first().map(|unit| {
                format!("did you mean \"{} {unit}\"? A number without quotes is in {}", text.trim(), wanted.si_unit())
            }),
            Self::WrongKind { unit, wanted: Kind::Temperature, .. } if unit == "C" || unit == "F" => {
                Some(format!("did you mean 'deg{unit}'?"))
            }
            _ => None,
        }
    }
}

//! The prefix that keeps the numbers along an axis short.

/// A unit as shown, and what a value in SI is multiplied by.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Shown {
    pub unit: String,
    pub factor: f64,
}

impl Shown {
    /// `unit` with the prefix that brings `largest` between 1 and 1000, as far as milli and mega go.
    pub(super) fn prefixed(unit: &str, largest: f64) -> Self {
        let (prefix, factor) = match largest.abs() {
            m if m >= 2e6 => ("M", 1e-6),
            m if m >= 2e3 => ("k", 1e-3),
            m if m >= 0.2 || m <= 0.0 => ("", 1.0),
            m if m >= 2e-4 => ("m", 1e3),
            _ => ("µ", 1e6),
        };
        Self { unit: format!("{prefix}{unit}"), factor }
    }

    /// Lengths: millimetres as drawings have them, metres from twenty up.
    pub(super) fn length(largest: f64) -> Self {
        if largest.abs() >= 20.0 {
            Self { unit: "m".into(), factor: 1.0 }
        } else {
            Self { unit: "mm".into(), factor: 1e3 }
        }
    }

    /// Speeds: m/s, slow ones in mm/s.
    pub(super) fn speed(largest: f64) -> Self {
        if largest.abs() > 0.0 && largest.abs() < 0.05 {
            Self { unit: "mm/s".into(), factor: 1e3 }
        } else {
            Self { unit: "m/s".into(), factor: 1.0 }
        }
    }

    /// Current densities: A/mm² where that gives readable numbers.
    pub(super) fn current_density(largest: f64) -> Self {
        let (unit, factor) = match largest.abs() {
            m if m >= 1e5 => ("A/mm²", 1e-6),
            m if m >= 1e2 => ("kA/m²", 1e-3),
            _ => ("A/m²", 1.0),
        };
        Self { unit: unit.into(), factor }
    }
}

//! One figure with its numerical band.

/// Where a value comes from.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Basis {
    /// Extrapolated over the grid levels.
    Extrapolated,
    /// Value of the finest grid.
    FinestGrid,
    /// Exact by a closed form (for example zero drag at rest).
    ClosedForm,
    /// One-sided bound.
    Bound,
    /// A simplified model on top of the field solution; the band is a model band.
    Approximation,
}

impl Basis {
    /// The word used in results.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            Self::Extrapolated => "extrapolated",
            Self::FinestGrid => "finest grid",
            Self::ClosedForm => "closed form",
            Self::Bound => "bound",
            Self::Approximation => "approximation",
        }
    }
}

/// Place and instant of a figure; absent coordinates do not apply.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Location {
    /// Radius, m.
    pub r_m: Option<f64>,
    /// Height, m (wall's frame; for an endless wall, from the mover's reference point).
    pub z_m: Option<f64>,
    /// Time, s from the start.
    pub t_s: Option<f64>,
}

/// A named figure: the value and the half-width of its numerical band.
#[derive(Debug, Clone, PartialEq)]
pub struct Figure {
    /// Name as in results, for example `drag`.
    pub name: String,
    /// Value in `unit`.
    pub value: f64,
    /// SI unit, for example `N s/m`.
    pub unit: &'static str,
    /// Half-width of the numerical band, same unit; meant to hold the truth in 95 % of cases.
    pub band: f64,
    /// Where the value comes from.
    pub basis: Basis,
    /// Where and when, for peaks and events.
    pub location: Option<Location>,
    /// The figure on each grid level, coarse to fine.
    pub levels: Vec<f64>,
}

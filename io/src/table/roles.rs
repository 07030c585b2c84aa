//! What a column can be: its names, and what it measures.

use crate::units::Kind;

/// What the rows run along.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Abscissa {
    /// Speed, a magnitude.
    Speed,
    /// Time from the start of the run.
    Time,
    /// Position of the mover's reference point.
    Position,
    /// Distance from the start, along the travel.
    Displacement,
}

impl Abscissa {
    /// Its name in results.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Speed => "speed",
            Self::Time => "time",
            Self::Position => "position",
            Self::Displacement => "displacement",
        }
    }

    /// Its SI unit.
    #[must_use]
    pub const fn unit(self) -> &'static str {
        match self {
            Self::Speed => "m/s",
            Self::Time => "s",
            Self::Position | Self::Displacement => "m",
        }
    }
}

/// A figure of a run or a curve that a column can hold.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct FigureName {
    /// Its name in results.
    pub name: &'static str,
    /// What it measures.
    pub kind: Kind,
}

const fn figure(name: &'static str, kind: Kind) -> FigureName {
    FigureName { name, kind }
}

/// Every figure that a column can hold.
pub const FIGURES: [FigureName; 21] = [
    figure("drag", Kind::Force),
    figure("damping_coefficient", Kind::DampingCoefficient),
    figure("dissipated_power", Kind::Power),
    figure("current_density_peak", Kind::CurrentDensity),
    figure("damping_coefficient_zero_speed", Kind::DampingCoefficient),
    figure("critical_speed", Kind::Speed),
    figure("drag_max", Kind::Force),
    figure("lag_time", Kind::Time),
    figure("drag_peak", Kind::Force),
    figure("impulse", Kind::Impulse),
    figure("dissipated_energy", Kind::Energy),
    figure("entry_time", Kind::Time),
    figure("exit_time", Kind::Time),
    figure("transit_time", Kind::Time),
    figure("exit_speed", Kind::Speed),
    figure("terminal_speed", Kind::Speed),
    figure("deceleration_peak", Kind::Acceleration),
    figure("felt_acceleration_peak", Kind::Ratio),
    figure("stiffness", Kind::SpringRate),
    figure("damping_coefficient_equivalent", Kind::DampingCoefficient),
    figure("loss_per_cycle", Kind::Energy),
];

/// What a named column is, before the other columns decide between abscissa and value.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum Role {
    Speed,
    Velocity,
    Time,
    Position,
    Displacement,
    Temperature,
    Figure(FigureName),
    /// Half-width or standard uncertainty, of the column before it unless a name stands in the header.
    Uncertainty {
        expanded: bool,
    },
    Coverage,
    FigureWord,
    Value,
    Unit,
    Remark,
}

impl Role {
    /// What it measures; `None` for what has no unit of its own.
    pub fn kind(self) -> Option<Kind> {
        match self {
            Self::Speed | Self::Velocity => Some(Kind::Speed),
            Self::Time => Some(Kind::Time),
            Self::Position | Self::Displacement => Some(Kind::Length),
            Self::Temperature => Some(Kind::Temperature),
            Self::Figure(figure) => Some(figure.kind),
            _ => None,
        }
    }
}

/// Other names of columns, in lower case with underscores; the figures' own names are known besides.
const NAMES: [(&str, Role); 43] = [
    ("speed", Role::Speed),
    ("v", Role::Speed),
    ("|v|", Role::Speed),
    ("velocity", Role::Velocity),
    ("vz", Role::Velocity),
    ("v_z", Role::Velocity),
    ("time", Role::Time),
    ("t", Role::Time),
    ("elapsed", Role::Time),
    ("position", Role::Position),
    ("z", Role::Position),
    ("height", Role::Position),
    ("displacement", Role::Displacement),
    ("distance", Role::Displacement),
    ("travel", Role::Displacement),
    ("stroke", Role::Displacement),
    ("s", Role::Displacement),
    ("x", Role::Displacement),
    ("temperature", Role::Temperature),
    ("temp", Role::Temperature),
    ("drag", Role::Figure(FIGURES[0])),
    ("force", Role::Figure(FIGURES[0])),
    ("f", Role::Figure(FIGURES[0])),
    ("drag_force", Role::Figure(FIGURES[0])),
    ("braking_force", Role::Figure(FIGURES[0])),
    ("brake_force", Role::Figure(FIGURES[0])),
    ("c", Role::Figure(FIGURES[1])),
    ("damping", Role::Figure(FIGURES[1])),
    ("peak_drag", Role::Figure(FIGURES[8])),
    ("peak_force", Role::Figure(FIGURES[8])),
    ("fall_time", Role::Figure(FIGURES[12])),
    ("uncertainty", Role::Uncertainty { expanded: true }),
    ("expanded_uncertainty", Role::Uncertainty { expanded: true }),
    ("standard_uncertainty", Role::Uncertainty { expanded: false }),
    ("k", Role::Coverage),
    ("coverage_factor", Role::Coverage),
    ("figure", Role::FigureWord),
    ("quantity", Role::FigureWord),
    ("value", Role::Value),
    ("unit", Role::Unit),
    ("remark", Role::Remark),
    ("note", Role::Remark),
    ("comment", Role::Remark),
];

/// Every known name with its role.
pub(super) fn names() -> impl Iterator<Item = (&'static str, Role)> {
    NAMES.into_iter().chain(FIGURES.into_iter().map(|f| (f.name, Role::Figure(f))))
}

/// The role of a name that stands alone, in lower case with underscores.
pub(super) fn role_of(name: &str) -> Option<Role> {
    names().find(|(n, _)| *n == name).map(|(_, r)| r)
}

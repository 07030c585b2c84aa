//! Gauges at fixed places: what a measurement at the same place would read.

/// What a gauge reads.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Gauge {
    /// Radial and axial flux density, T, the mover's own and that of the wall. On a face, in the free space before it; between two layers,
    /// in the outer one.
    FluxDensity,
    /// Azimuthal current density in the layer that it sits in, A/m2; on a face, in the layer behind it.
    CurrentDensity,
    /// Electromotive force of a coil around the axis, V: -turns d(flux)/dt, right-handed about +z.
    SearchCoil {
        /// Number of turns, > 0.
        turns: f64,
        /// Length over which the turns are spread evenly, m; 0 for turns at one height.
        length_m: f64,
    },
}

impl Gauge {
    /// The word for it.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::FluxDensity => "flux density",
            Self::CurrentDensity => "current density",
            Self::SearchCoil { .. } => "search coil",
        }
    }
}

/// A gauge at a fixed place in the wall's frame.
#[derive(Debug, Clone, PartialEq)]
pub struct Station {
    /// The user's name of it.
    pub name: String,
    /// Height, m, from the wall's lower end; of a search coil, of its middle.
    pub at_m: f64,
    /// Radius, m; of a search coil, of its turns.
    pub radius_m: f64,
    /// What it reads.
    pub gauge: Gauge,
}

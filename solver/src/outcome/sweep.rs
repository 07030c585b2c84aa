//! What a curve sweeps beside speed: temperature, position, strokes.

use super::{DragPoint, Figure};

/// What was swept; empty lists where nothing was asked.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Sweeps {
    /// Drag against speed at each temperature of wall and mover.
    pub temperatures: Vec<AtTemperature>,
    /// Zero-speed damping coefficient at each position in a wall with ends.
    pub positions: Vec<AtPosition>,
    /// Settled strokes at each frequency and amplitude.
    pub strokes: Vec<AtStroke>,
}

/// Drag against speed with wall and mover at one temperature.
#[derive(Debug, Clone, PartialEq)]
pub struct AtTemperature {
    /// Temperature of wall and mover, K.
    pub temperature_k: f64,
    /// Conductivity of each layer at it, S/m.
    pub conductivities_s_per_m: Vec<f64>,
    /// The figures of the curve: damping coefficient at zero speed, critical speed, greatest drag, lag time.
    pub figures: Vec<Figure>,
    /// Drag at each speed.
    pub points: Vec<DragPoint>,
}

impl AtTemperature {
    /// The figure of that name.
    #[must_use]
    pub fn figure(&self, name: &str) -> Option<&Figure> {
        self.figures.iter().find(|f| f.name == name)
    }
}

/// The zero-speed damping coefficient with the mover at one position.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct AtPosition {
    /// Position of the reference point, m, from the wall's lower end.
    pub position_m: f64,
    /// Drag over speed as the speed vanishes, N s/m.
    pub damping: f64,
    /// Half-width of its band, N s/m.
    pub damping_band: f64,
}

/// A settled stroke.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct AtStroke {
    /// Frequency, Hz.
    pub frequency_hz: f64,
    /// Amplitude, zero to peak, m.
    pub amplitude_m: f64,
    /// Equivalent damping coefficient, loss / (pi omega X^2), N s/m.
    pub damping: f64,
    /// Half-width of its band, N s/m.
    pub damping_band: f64,
    /// In-phase stiffness of the wall's currents, N/m, positive where it restores.
    pub stiffness: f64,
    /// Half-width of its band, N/m.
    pub stiffness_band: f64,
    /// Loss in a cycle, J.
    pub loss: f64,
    /// Half-width of its band, J.
    pub loss_band: f64,
    /// Greatest drag in the cycle, N.
    pub drag_peak: f64,
    /// Half-width of its band, N.
    pub drag_peak_band: f64,
}

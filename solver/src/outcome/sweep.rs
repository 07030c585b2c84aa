//! What a curve sweeps beside speed: temperature, position, strokes.

use super::{DragPoint, Figure, Outcome};
use crate::problem::Sine;

/// What was swept; empty lists where nothing was asked.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Sweeps {
    /// Drag against speed at each temperature of wall and mover.
    pub temperatures: Vec<AtTemperature>,
    /// Zero-speed damping coefficient at each position in a wall with ends.
    pub positions: Vec<AtPosition>,
    /// Length of that wall, m.
    pub length_m: Option<f64>,
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
    /// In-phase stiffness, N/m, positive where it restores: of the wall's currents, and of its static pull where it is permeable.
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

impl AtStroke {
    /// The figures of a settled stroke in one row; `None` where the outcome is of another law.
    #[must_use]
    pub fn of(sine: &Sine, outcome: &Outcome) -> Option<Self> {
        let figure = |name: &str| outcome.figures.iter().find(|f| f.name == name).map(|f| (f.value, f.band));
        let (damping, damping_band) = figure("damping_coefficient_equivalent")?;
        let (stiffness, stiffness_band) = figure("stiffness")?;
        let (loss, loss_band) = figure("loss_per_cycle")?;
        let (drag_peak, drag_peak_band) = figure("drag_peak")?;
        Some(Self {
            frequency_hz: sine.frequency_hz,
            amplitude_m: sine.amplitude_m,
            damping,
            damping_band,
            stiffness,
            stiffness_band,
            loss,
            loss_band,
            drag_peak,
            drag_peak_band,
        })
    }
}

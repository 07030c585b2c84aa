//! What strokes of small amplitude come to.

/// The response of the wall's currents to a stroke of vanishing amplitude: force on the mover = -(k z + c dz/dt).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SmallStroke {
    /// Frequency, Hz.
    pub frequency_hz: f64,
    /// k, N/m: the part in phase, positive where it restores.
    pub stiffness: f64,
    /// Half-width of its band, N/m.
    pub stiffness_band: f64,
    /// c, N s/m: the part in quadrature over the angular frequency.
    pub damping: f64,
    /// Half-width of its band, N s/m.
    pub damping_band: f64,
}

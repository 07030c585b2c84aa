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

/// A damper and a spring in series: lag dF/dt + F = -damping v.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LumpedTerm {
    /// c_k, N s/m.
    pub damping_n_s_per_m: f64,
    /// tau_k, s.
    pub lag_s: f64,
}

/// A wall's currents as a few first-order lags: c(omega) = sum of c_k / (1 + i omega tau_k), for strokes small against the mover.
#[derive(Debug, Clone, PartialEq)]
pub struct LumpedModel {
    /// The terms, slowest first.
    pub terms: Vec<LumpedTerm>,
    /// Largest |model - c| / |c| at the frequencies it was fitted to.
    pub largest_error: f64,
}

impl LumpedModel {
    /// Damping coefficient at low frequency, N s/m: the sum of c_k.
    #[must_use]
    pub fn damping_at_rest(&self) -> f64 {
        self.terms.iter().map(|t| t.damping_n_s_per_m).sum()
    }

    /// Lag time at low frequency, s: F = -c (v - lag dv/dt); the sum of c_k tau_k over that of c_k.
    #[must_use]
    pub fn lag(&self) -> f64 {
        self.terms.iter().map(|t| t.damping_n_s_per_m * t.lag_s).sum::<f64>() / self.damping_at_rest()
    }
}

/// Strokes of small amplitude over frequency, and what stands for them in a simulation of a system.
#[derive(Debug, Clone, PartialEq)]
pub struct StrokeResponse {
    /// The frequencies, increasing.
    pub points: Vec<SmallStroke>,
    /// Lumped models fitted to them, of one term and more.
    pub lumped: Vec<LumpedModel>,
}

//! What coils at rest see of the wall over frequency. Amplitudes are zero to peak; quantities vary as exp(+i omega t), so that a
//! positive phase leads the coils' current.

/// A value with the half-width of its numerical band.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Measured {
    /// The value.
    pub value: f64,
    /// Half-width of its band, same unit.
    pub band: f64,
}

/// Current density at one radius, A/m2, as a complex amplitude.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct CurrentSample {
    /// Index of the wall's layer; a face that two layers share has a sample of each.
    pub layer: usize,
    /// Radius, m.
    pub r_m: f64,
    /// In phase with the coils' current, A/m2.
    pub real: f64,
    /// A quarter period ahead of it, A/m2.
    pub imaginary: f64,
    /// Half-width of the magnitude's band, A/m2.
    pub band: f64,
}

impl CurrentSample {
    /// Magnitude, A/m2, zero to peak.
    #[must_use]
    pub fn magnitude(&self) -> f64 {
        self.real.hypot(self.imaginary)
    }

    /// Phase ahead of the coils' current, rad, in -pi to pi.
    #[must_use]
    pub fn phase_rad(&self) -> f64 {
        self.imaginary.atan2(self.real)
    }
}

/// Field with the wall over the field without it, along the direction of the latter.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Shielding {
    /// Real part.
    pub real: f64,
    /// Imaginary part.
    pub imaginary: f64,
    /// Half-width of the magnitude's band.
    pub band: f64,
}

impl Shielding {
    /// Magnitude: the shielding factor, below 1 where the wall weakens the field.
    #[must_use]
    pub fn magnitude(&self) -> f64 {
        self.real.hypot(self.imaginary)
    }

    /// Phase, rad, in -pi to pi; negative where the field lags.
    #[must_use]
    pub fn phase_rad(&self) -> f64 {
        self.imaginary.atan2(self.real)
    }
}

/// One frequency.
#[derive(Debug, Clone, PartialEq)]
pub struct FrequencyPoint {
    /// Frequency, Hz.
    pub frequency_hz: f64,
    /// What the wall adds to the resistance, ohm.
    pub resistance_change: Measured,
    /// What the wall adds to the reactance, ohm.
    pub reactance_change: Measured,
    /// Resistance, ohm: the winding's own as given, and what the wall adds.
    pub resistance_ohm: f64,
    /// Reactance, ohm.
    pub reactance_ohm: f64,
    /// Inductance, H: reactance / (2 pi frequency).
    pub inductance_henry: f64,
    /// The resistance change again, from the wall's heat I^2 R summed cell by cell, ohm.
    pub resistance_by_heat_ohm: f64,
    /// Shielding, where the coils alone make a field at that point.
    pub shielding: Option<Shielding>,
    /// Skin depth sqrt(2 / (omega mu sigma)) of the layer whose face is nearest to the coils, m; `None` where it does not conduct.
    pub skin_depth_m: Option<f64>,
    /// Depth below that face at which the current density has fallen to 1/e of what it is there, m; `None` where it does not
    /// within the layer.
    pub current_depth: Option<Measured>,
    /// Current density across the wall.
    pub across: Vec<CurrentSample>,
}

/// Coils at rest, over frequency.
#[derive(Debug, Clone, PartialEq)]
pub struct FrequencyResponse {
    /// Current in the coils, A, zero to peak.
    pub current_ampere: f64,
    /// Resistance of the winding itself, ohm, as given.
    pub winding_resistance_ohm: f64,
    /// Inductance of the coils in series without the wall, H.
    pub inductance_alone: Measured,
    /// Height of the line across the wall on which the current density stands, m.
    pub height_m: f64,
    /// Radius and height of the point at which shielding is taken, m.
    pub shielding_at_m: (f64, f64),
    /// Index of the layer whose face is nearest to the coils.
    pub facing_layer: usize,
    /// Names of the wall's layers.
    pub layer_names: Vec<String>,
    /// Points in order of frequency.
    pub points: Vec<FrequencyPoint>,
}

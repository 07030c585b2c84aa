//! What the heat left in the wall meets: densities, specific heats, cooling, and how often it comes.

use std::f64::consts::PI;

use super::Wall;

/// Repeats of an event at most, where none are given.
pub const MOST_STOPS: u32 = 4000;

/// Everything that the wall's temperature follows from; conductivities of the layers hold at its start.
#[derive(Debug, Clone, PartialEq)]
pub struct Warming {
    /// Temperature of the whole wall at the start, K.
    pub start_k: f64,
    /// One a layer, in the order of the wall's layers.
    pub layers: Vec<LayerHeat>,
    /// Heat given off to the air; `None`: insulated all round.
    pub cooling: Option<Cooling>,
    /// The event once every period; `None`: once.
    pub duty: Option<Duty>,
}

/// How a layer takes and conducts heat.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LayerHeat {
    /// Density, kg/m3, > 0.
    pub density_kg_per_m3: f64,
    /// Specific heat, J/(kg K), > 0.
    pub specific_heat_j_per_kg_k: f64,
    /// Thermal conductivity, W/(m K), > 0; needed by cooling and duty.
    pub thermal_conductivity_w_per_m_k: Option<f64>,
    /// Temperature coefficient of resistivity referred to the start, 1/K: rho = rho(start) [1 + coefficient (T - start)]; `None`:
    /// not known, the conductivity is taken as constant.
    pub resistivity_coefficient_per_k: Option<f64>,
    /// Temperature up to which the numbers above are trusted, K.
    pub trusted_to_k: f64,
    /// Melting begins here, K, where it is known.
    pub melting_k: Option<f64>,
}

impl LayerHeat {
    /// rho c, J/(m3 K).
    #[must_use]
    pub fn volumetric_j_per_m3_k(&self) -> f64 {
        self.density_kg_per_m3 * self.specific_heat_j_per_kg_k
    }
}

/// Newton's law of cooling: heat flux = film coefficient x (surface - ambient). Faces in gaps between layers are insulated.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Cooling {
    /// Film coefficient of the bore's surface, W/(m2 K), >= 0.
    pub bore_w_per_m2_k: f64,
    /// Film coefficient of the outside, W/(m2 K), >= 0.
    pub outside_w_per_m2_k: f64,
    /// Film coefficient of the faces across the axis, W/(m2 K), >= 0.
    pub ends_w_per_m2_k: f64,
    /// Temperature of the air in the bore and outside, K.
    pub ambient_k: f64,
}

impl Cooling {
    /// Whether any face gives off heat.
    #[must_use]
    pub fn cools(&self) -> bool {
        self.bore_w_per_m2_k.max(self.outside_w_per_m2_k).max(self.ends_w_per_m2_k) > 0.0
    }
}

/// The event again and again.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Duty {
    /// From the start of one event to the next, s.
    pub period_s: f64,
    /// Number of events; `None`: until the temperatures have settled.
    pub repeats: Option<u32>,
}

impl Warming {
    /// Mass of layer `index`, kg.
    #[must_use]
    pub fn mass_kg(&self, wall: &Wall, index: usize) -> f64 {
        let (layer, heat) = (&wall.layers[index], &self.layers[index]);
        let [inner, outer] = [layer.inner_radius_m, layer.outer_radius_m];
        heat.density_kg_per_m3 * PI * (outer * outer - inner * inner) * (layer.to_m - layer.from_m)
    }

    /// Heat capacity of the whole wall, J/K.
    #[must_use]
    pub fn heat_capacity_j_per_k(&self, wall: &Wall) -> f64 {
        (0..self.layers.len()).map(|k| self.mass_kg(wall, k) * self.layers[k].specific_heat_j_per_kg_k).sum()
    }

    /// Conductivity of layer `index` at the wall's temperature `at_k`, over that at the start: 1 / (1 + coefficient (T - start)).
    #[must_use]
    pub fn conductivity_ratio(&self, index: usize, at_k: f64) -> f64 {
        let coefficient = self.layers.get(index).and_then(|l| l.resistivity_coefficient_per_k).unwrap_or(0.0);
        1.0 / (1.0 + coefficient * (at_k - self.start_k)).max(f64::MIN_POSITIVE)
    }
}

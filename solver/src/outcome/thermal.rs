//! How warm the wall gets.

/// Heat and mass of one layer.
#[derive(Debug, Clone, PartialEq)]
pub struct LayerWarmth {
    /// The user's name of the layer.
    pub name: String,
    /// Mass, kg.
    pub mass_kg: f64,
    /// Heat capacity, J/K.
    pub heat_capacity_j_per_k: f64,
    /// Heat left in it by one event, J.
    pub heat_joule: f64,
    /// That over the heat capacity, K.
    pub rise_mean_k: f64,
    /// Greatest local rise without conduction, K.
    pub rise_peak_k: f64,
    /// Change of conductivity at the hottest point over one event, relative; the run holds it at its start. `None` where the
    /// temperature coefficient isn't known.
    pub conductivity_change: Option<f64>,
}

/// Where the heat of all events went, J.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct HeatLedger {
    /// Left in the wall by currents.
    pub heat: f64,
    /// Sum of heat capacity times rise at the end.
    pub stored: f64,
    /// Given off to the air.
    pub lost: f64,
    /// (heat - stored - lost) / heat.
    pub imbalance_relative: f64,
}

/// Temperatures of the wall at one moment.
#[derive(Debug, Clone, PartialEq)]
pub struct TemperatureField {
    /// What moment, in a word or two with `_` between: `after_event`, `before_last_stop`, `after_last_stop`.
    pub moment: &'static str,
    /// What moment, in words.
    pub description: &'static str,
    /// At nodes, `[z][r]`, K; the ambient or starting temperature where there is no wall.
    pub temperature_k: Vec<f64>,
}

/// One repeat of a duty.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct DutyStop {
    /// Its number, from 1.
    pub number: f64,
    /// When it begins, s.
    pub time_s: f64,
    /// Heat that it leaves in the wall, J.
    pub energy_joule: f64,
    /// Greatest drag, N.
    pub drag_peak_newton: f64,
    /// Temperature before it, weighted by where the event's heat falls, K: what its drag and heat follow.
    pub temperature_before_k: f64,
    /// Mean temperature of the wall right after it, by heat capacity, K.
    pub temperature_mean_k: f64,
    /// Hottest point right after it, K.
    pub temperature_peak_k: f64,
    /// Hottest point of the bore's surface right after it, K.
    pub surface_bore_k: f64,
    /// Hottest point of the outside from its event to the next, K.
    pub surface_outside_k: f64,
}

/// What a repeated event comes to.
#[derive(Debug, Clone, PartialEq)]
pub struct DutyOutcome {
    /// Stop by stop, extrapolated over the grids.
    pub stops: Vec<DutyStop>,
    /// Whether the wall has a bore; without one `surface_bore_k` repeats the outside.
    pub has_bore: bool,
    /// Whether the temperatures have settled by the last.
    pub settled: bool,
    /// Temperatures of the whole wall at which the event was solved, K, and the heat, J, and greatest drag, N, that it had there.
    pub solved_at: Vec<[f64; 3]>,
    /// Relative change of the greatest drag if the whole wall were as hot as its hottest point before the last stop: what taking the
    /// wall's temperature as uniform in the event may cost at most.
    pub uniform_cost: f64,
}

/// The thermal side of an answer.
#[derive(Debug, Clone, PartialEq)]
pub struct Thermal {
    /// Temperature at the start, K.
    pub start_k: f64,
    /// Layer by layer.
    pub layers: Vec<LayerWarmth>,
    /// Change of conductivity over one event, weighted by where its heat falls, relative: about what the damping coefficient of a slow
    /// mover would lose by the end of the event.
    pub conductivity_change_mean: Option<f64>,
    /// Where the heat went.
    pub ledger: HeatLedger,
    /// Radii of the thermal grid's nodes, m.
    pub r_m: Vec<f64>,
    /// Heights of the thermal grid's nodes, m.
    pub z_m: Vec<f64>,
    /// Temperatures on it.
    pub fields: Vec<TemperatureField>,
    /// The duty, where one was asked.
    pub duty: Option<DutyOutcome>,
}

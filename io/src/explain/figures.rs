//! What every figure of a result means: one entry a figure, with its unit, the commands and laws that give it, and the
//! source of its definition.

/// What a figure means.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct FigureMeaning {
    /// Its name in results.
    pub name: &'static str,
    /// SI unit; `1` for a pure number.
    pub unit: &'static str,
    /// The command or the laws of travel that give it.
    pub by: &'static str,
    /// What it means.
    pub about: &'static str,
    /// Where its definition is from.
    pub source: &'static str,
}

const fn figure(
    name: &'static str,
    unit: &'static str,
    by: &'static str,
    about: &'static str,
    source: &'static str,
) -> FigureMeaning {
    FigureMeaning { name, unit, by, about, source }
}

const TRADE: &str = "common practice";
const OWN: &str = "defined here";
const SLOTS: &str =
    "defined here; its factor after R. L. Russell and K. H. Norsworthy, Proceedings of the IEE 105A, 163-175 (1958)";
const GIVEN: &str = "`run`, laws traverse and table";
const ALL_TRAVEL: &str = "`run`, laws traverse, table, free and sine";
const WARM: &str = "`run`, laws traverse, table, free and sine, where densities and specific heats are known";
const REPEATED: &str = "`run` with [duty]";
const COILS: &str = "`run`, law alternating";

/// Every figure.
pub const FIGURES: &[FigureMeaning] = &[
    figure(
        "drag",
        "N",
        "`run`, law steady",
        "axial force of the field on the mover against its motion, settled fields",
        TRADE,
    ),
    figure(
        "damping_coefficient_greatest",
        "N s/m",
        "`curve`, positions",
        "greatest damping coefficient at zero speed of those at the positions asked for, at the z beside it",
        OWN,
    ),
    figure(
        "damping_coefficient_equivalent_greatest",
        "N s/m",
        "`curve`, frequencies and amplitudes",
        "greatest equivalent damping coefficient of the strokes asked for",
        OWN,
    ),
    figure("damping_coefficient", "N s/m", "`run`, law steady", "drag over speed at this speed", TRADE),
    figure(
        "dissipated_power",
        "W",
        "`run`, laws steady and alternating",
        "heat in the wall per second (alternating: mean of a period)",
        TRADE,
    ),
    figure(
        "current_density_peak",
        "A/m2",
        "`run`, laws steady, traverse, table, free and sine",
        "greatest magnitude of the azimuthal current density in the wall: a local figure, at the r, z and t beside it",
        OWN,
    ),
    figure(
        "damping_coefficient_zero_speed",
        "N s/m",
        "`curve`",
        "slope of drag over speed at low speed: drag = coefficient x speed there",
        TRADE,
    ),
    figure(
        "demagnetising_field_peak",
        "A/m",
        "`run`, laws steady, traverse, table, free and sine, magnets of known coercivity",
        "greatest field against a magnet's own magnetisation: its own poles, its neighbours and the wall's reaction, recoil permeability 1",
        OWN,
    ),
    figure(
        "demagnetisation_margin",
        "1",
        "`run`, laws steady, traverse, table, free and sine, magnets of known coercivity",
        "1 - demagnetising field / intrinsic coercivity HcJ at the mover's temperature, where it is least; real magnets lose strength \
         from the knee of their curve on, before it is 0",
        OWN,
    ),
    figure(
        "slot_factor_low_speed",
        "1",
        "`run` and `curve`, walls with slots",
        "share of the drag at low speed that full-length slots leave in an endless wall: an approximation with a model band",
        SLOTS,
    ),
    figure(
        "slot_factor",
        "1",
        "`run`, law steady, walls with slots",
        "share of the drag that full-length slots leave at this speed: an approximation with a model band",
        SLOTS,
    ),
    figure(
        "drag_slotted",
        "N",
        "`run`, law steady, walls with slots",
        "drag with slots: drag x slot_factor, an approximation with a model band",
        SLOTS,
    ),
    figure(
        "damping_coefficient_slotted",
        "N s/m",
        "`run`, law steady, walls with slots",
        "drag with slots over speed, an approximation with a model band",
        SLOTS,
    ),
    figure(
        "damping_coefficient_zero_speed_slotted",
        "N s/m",
        "`curve`, walls with slots",
        "damping_coefficient_zero_speed x slot_factor_low_speed, an approximation with a model band",
        SLOTS,
    ),
    figure(
        "critical_speed",
        "m/s",
        "`curve`",
        "speed of the greatest drag with settled fields",
        "common practice in eddy-current brakes",
    ),
    figure("drag_max", "N", "`curve`", "greatest drag over speed, at the critical speed", TRADE),
    figure(
        "lag_time",
        "s",
        "`curve`",
        "tau in drag = c (v - tau dv/dt) for slow changes of a low speed v, c the zero-speed damping coefficient",
        "defined here: first term of the expansion of the force in rates of change",
    ),
    figure(
        "drag_peak",
        "N",
        ALL_TRAVEL,
        "greatest drag of the travel (a motion that turns round: greatest force either way), without the static pull of a permeable wall",
        OWN,
    ),
    figure("impulse", "N s", GIVEN, "integral of the drag over time", TRADE),
    figure(
        "dissipated_energy",
        "J",
        "`run`, laws traverse, table and free",
        "heat in the wall, and what is still in the field of its currents at the end",
        OWN,
    ),
    figure(
        "entry_time",
        "s",
        "`run`, law free",
        "time from the release until the reference point passes the first gate",
        OWN,
    ),
    figure(
        "exit_time",
        "s",
        "`run`, law free",
        "time from the release until the reference point passes the second gate",
        OWN,
    ),
    figure("transit_time", "s", "`run`, law free", "time between the gates: exit time less entry time", OWN),
    figure("exit_speed", "m/s", "`run`, law free", "speed at the second gate", OWN),
    figure(
        "terminal_speed",
        "m/s",
        "`run`, law free, where it is reached",
        "speed where it hardly changes any more (less than a thousandth over the field's length), well inside the wall",
        OWN,
    ),
    figure("deceleration_peak", "m/s2", "`run`, law free", "greatest loss of speed per second", TRADE),
    figure(
        "felt_acceleration_peak",
        "1",
        "`run`, law free",
        "greatest acceleration that a load feels along the axis, weight included, in multiples of standard gravity 9.80665 m/s2",
        "common practice in drop tests; standard gravity: 3rd General Conference on Weights and Measures, 1901",
    ),
    figure(
        "static_pull_peak",
        "N",
        ALL_TRAVEL,
        "greatest axial pull of a permeable wall's ends on the mover that it would have at rest; no part of the drag",
        OWN,
    ),
    figure(
        "damping_coefficient_equivalent",
        "N s/m",
        "`run`, law sine",
        "of the linear damper that takes the same energy: loss per cycle / (pi omega X^2), X the amplitude",
        "common practice in vibration; equivalent viscous damping",
    ),
    figure(
        "stiffness",
        "N/m",
        "`run`, law sine",
        "part of the force in phase with the displacement, over the amplitude; positive where it restores; the currents' alone",
        TRADE,
    ),
    figure(
        "stiffness_static",
        "N/m",
        "`run`, law sine, permeable wall",
        "the same of the permeable wall's pull at rest",
        OWN,
    ),
    figure("loss_per_cycle", "J", "`run`, law sine", "heat of one settled cycle", TRADE),
    figure(
        "resistance",
        "ohm",
        COILS,
        "resistance of the coils in series: the winding's as given, and what the wall adds",
        TRADE,
    ),
    figure("reactance", "ohm", COILS, "reactance of the coils in series, with the wall", TRADE),
    figure("inductance", "H", COILS, "reactance / (2 pi frequency)", TRADE),
    figure("inductance_alone", "H", COILS, "inductance of the coils in series without the wall", TRADE),
    figure("resistance_change", "ohm", COILS, "what the wall adds to the resistance", TRADE),
    figure(
        "reactance_change",
        "ohm",
        COILS,
        "what the wall adds to the reactance; negative where the currents drive the field out",
        TRADE,
    ),
    figure(
        "shielding_factor",
        "1",
        COILS,
        "field with the wall over field without it, at the place beside it: below 1 where the wall weakens the field",
        TRADE,
    ),
    figure(
        "skin_depth",
        "m",
        COILS,
        "sqrt(2 / (omega mu sigma)) of the layer that faces the coils: the handbook's figure for a flat metal",
        TRADE,
    ),
    figure(
        "current_depth",
        "m",
        COILS,
        "depth below the facing surface at which the current density has fallen to 1/e of what it is there: the skin depth read off the field",
        OWN,
    ),
    figure(
        "critical_frequency",
        "Hz",
        "`run`, law alternating, sweep",
        "frequency at which the resistance change over omega is greatest",
        OWN,
    ),
    figure(
        "resistance_ratio_max",
        "1",
        "`run`, law alternating, sweep",
        "greatest resistance change over omega times the inductance without the wall",
        OWN,
    ),
    figure("wall_mass", "kg", WARM, "mass of all layers", TRADE),
    figure("wall_heat_capacity", "J/K", WARM, "sum of mass times specific heat over the layers", TRADE),
    figure(
        "temperature_rise_mean",
        "K",
        WARM,
        "heat left in the wall over its heat capacity, no heat given off (law sine: by one settled cycle)",
        TRADE,
    ),
    figure(
        "temperature_rise_peak",
        "K",
        WARM,
        "greatest local rise if no heat spread at all: integral of J^2 / sigma over time, over rho c; a local figure",
        OWN,
    ),
    figure(
        "temperature_rise_section_peak",
        "K",
        WARM,
        "greatest rise of a layer's cross-section with the heat evened out across it and none spreading along",
        OWN,
    ),
    figure(
        "surface_temperature_bore",
        "K",
        WARM,
        "hottest point of the bore's surface right after the event; with [duty], from the last stop to the next",
        OWN,
    ),
    figure(
        "surface_temperature_outside",
        "K",
        WARM,
        "hottest point of the outside right after the event; with [duty], from the last stop to the next",
        OWN,
    ),
    figure(
        "cooling_time_constant",
        "s",
        "`run` with [cooling]",
        "time in which the slowest part of the wall's warmth falls to 1/e of itself",
        "lowest eigenvalue of the heat equation with the films given",
    ),
    figure("energy_per_stop", "J", REPEATED, "heat left in the wall by the last stop", OWN),
    figure("temperature_rise_per_stop", "K", REPEATED, "that over the wall's heat capacity", OWN),
    figure(
        "drag_fade",
        "1",
        REPEATED,
        "1 - greatest drag of the last stop over that of the first",
        "common practice: brakes fade as they warm",
    ),
    figure("temperature_settled_mean", "K", REPEATED, "mean of the wall right after the last stop, settled", OWN),
    figure("temperature_settled_peak", "K", REPEATED, "hottest point right after the last stop, settled", OWN),
    figure("temperature_last_mean", "K", REPEATED, "mean of the wall right after the last stop, not yet settled", OWN),
    figure("temperature_last_peak", "K", REPEATED, "hottest point right after the last stop, not yet settled", OWN),
    figure(
        "stops_to_settle",
        "1",
        REPEATED,
        "first stop before which the wall is within 1 % of its whole rise from where it settles",
        OWN,
    ),
];

/// The meaning of a figure.
#[must_use]
pub fn figure_meaning(name: &str) -> Option<&'static FigureMeaning> {
    FIGURES.iter().find(|f| f.name == name)
}

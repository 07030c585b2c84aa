//! Names of figures and columns in the words of people who did not compute them.

use crate::explain;

/// A figure: its name in results, its heading, and what it says.
type Figure = (&'static str, &'static str, &'static str);

/// Known figures, in the order in which people ask for them.
const FIGURES: &[Figure] = &[
    ("drag", "Drag", "the force that brakes the mover at this speed"),
    ("drag_max", "Greatest drag", "the most that this brake can give at any steady speed"),
    ("drag_peak", "Peak drag", "the largest braking force on the way"),
    ("critical_speed", "Critical speed", "the speed of greatest drag; beyond it the brake weakens as speed rises"),
    ("damping_coefficient", "Damping coefficient", "drag over speed, at this speed"),
    ("damping_coefficient_zero_speed", "Damping coefficient at low speed", "drag over speed where the mover is slow"),
    (
        "damping_coefficient_equivalent",
        "Equivalent damping coefficient",
        "the viscous damper that takes the same energy each cycle",
    ),
    ("transit_time", "Transit time", "from the first gate to the second"),
    ("exit_speed", "Speed at the second gate", "how fast the mover arrives there"),
    ("terminal_speed", "Terminal speed", "where drag and the driving force balance"),
    ("deceleration_peak", "Peak deceleration", "the fastest loss of speed"),
    ("felt_acceleration_peak", "Peak felt acceleration", "what the load feels, in multiples of standard gravity"),
    ("entry_time", "Time at the first gate", "from release"),
    ("exit_time", "Time at the second gate", "from release"),
    ("impulse", "Impulse", "drag summed over the whole passage"),
    ("stiffness", "Stiffness", "the part of the force that follows the displacement; positive where it restores"),
    ("loss_per_cycle", "Loss per cycle", "energy turned into heat each cycle"),
    ("dissipated_power", "Dissipated power", "heat in the wall"),
    ("dissipated_energy", "Dissipated energy", "what the wall takes up as heat, what is still in the field included"),
    ("current_density_peak", "Peak current density", "the densest current anywhere in the wall"),
    ("temperature_rise_peak", "Peak temperature rise", "the hottest point of the wall, before heat has spread"),
    ("temperature_rise_mean", "Mean temperature rise", "heat over the heat capacity of the wall"),
    ("surface_temperature_bore", "Hottest bore surface", "right after the event; with repeats, the last one"),
    ("surface_temperature_outside", "Hottest outer surface", "right after the event; with repeats, until the next"),
    ("temperature_settled_peak", "Settled peak temperature", "the hottest point once the repeats have settled"),
    ("temperature_settled_mean", "Settled mean temperature", "of the wall once the repeats have settled"),
    ("drag_fade", "Fade of the drag", "share of the first stop's greatest drag that the last stop lacks"),
    (
        "demagnetisation_margin",
        "Demagnetisation margin",
        "share of the coercivity that the field against a magnet leaves",
    ),
    (
        "demagnetising_field_peak",
        "Peak demagnetising field",
        "its own poles, its neighbours and the wall against a magnet",
    ),
    ("lag_time", "Lag time", "how far the drag trails behind a change of speed"),
    ("resistance", "Resistance", "of the coils, with the wall"),
    ("reactance", "Reactance", "of the coils, with the wall"),
    ("inductance", "Inductance", "of the coils, with the wall"),
    ("inductance_alone", "Inductance alone", "of the coils without the wall"),
    ("resistance_change", "Added resistance", "what the wall adds to the coils' resistance"),
    ("reactance_change", "Added reactance", "what the wall adds to the coils' reactance"),
    (
        "resistance_ratio_max",
        "Greatest relative added resistance",
        "added resistance over the reactance of the coils alone",
    ),
    ("critical_frequency", "Frequency of greatest added resistance", "over the reactance of the coils alone"),
];

/// Columns whose names need more than their underscores taken out.
const COLUMNS: &[(&str, &str)] = &[
    ("time", "Time"),
    ("position", "Position of the mover"),
    ("heat", "Heat rate in the wall"),
    ("drag_slotted", "Drag with slots"),
    ("slot_factor", "Share of the drag that the slots leave"),
    ("current_density_peak", "Peak current density"),
    ("r", "Radius"),
    ("phase", "Phase ahead of the coils' current"),
    ("shielding_phase", "Phase of the shielded field"),
    ("resistance_change", "Resistance added by the wall"),
    ("reactance_change", "Reactance added by the wall"),
    ("current_depth", "Depth at which the current density falls to 1/e"),
];

/// The place of a figure in the order of headlines; unknown ones come last.
pub(super) fn rank(name: &str) -> usize {
    FIGURES.iter().position(|f| f.0 == name).unwrap_or(FIGURES.len())
}

/// What gauges read, by the last word of its figure's name.
const READINGS: &[(&str, &str)] = &[
    ("emf_peak", "Peak e.m.f."),
    ("flux_density_r_peak", "Peak radial flux density"),
    ("flux_density_z_peak", "Peak axial flux density"),
    ("current_density_phi_peak", "Peak current density"),
];

/// The heading of a figure.
pub(super) fn heading(name: &str) -> String {
    if let Some((gauge, reading)) = name.strip_prefix("station.").and_then(|rest| rest.rsplit_once('.')) {
        let known = READINGS.iter().find(|r| r.0 == reading).map_or_else(|| plain(reading), |r| r.1.to_owned());
        return format!("{known}, gauge {gauge}");
    }
    FIGURES.iter().find(|f| f.0 == name).map_or_else(|| plain(name), |f| f.1.to_owned())
}

/// What a figure says, where that is known.
pub(super) fn meaning(name: &str) -> Option<&'static str> {
    let explained = || explain::figure_meaning(name).map(|f| f.about);
    FIGURES.iter().find(|f| f.0 == name).map(|f| f.2).or_else(explained)
}

/// The heading of a column, without unit.
pub(super) fn column(stem: &str) -> String {
    COLUMNS.iter().find(|c| c.0 == stem).map_or_else(|| heading(stem), |c| c.1.to_owned())
}

/// A name with blanks for underscores and a capital.
pub(super) fn plain(name: &str) -> String {
    let spaced = name.replace('_', " ");
    let mut letters = spaced.chars();
    letters.next().map_or_else(String::new, |first| first.to_uppercase().chain(letters).collect())
}

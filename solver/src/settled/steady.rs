//! Settled fields at one speed.

use super::balance::{cautions, three_forces, wanted_fields};
use super::level::Wanted;
use super::levels::{Levels, Point, damping_at_rest};
use super::magnets::magnet_figures;
use crate::band::{self, Ladder};
use crate::fault::SolveFault;
use crate::monitor::Monitor;
use crate::outcome::{Basis, Figure, Ledger, Location, Outcome, Stop, Sweeps, Trace};
use crate::problem::Problem;
use crate::regime::regime;
use crate::target::{MOST_LEVELS, levels_wanted, refine, verdict};

/// Settled fields at one velocity.
///
/// # Errors
/// See [`SolveFault`].
pub(crate) fn steady(problem: &Problem, velocity: f64, monitor: &dyn Monitor) -> Result<Outcome, SolveFault> {
    let speeds = [velocity.abs()];
    let wanted = Wanted { velocity, speeds: &speeds, monitor };
    let mut levels = Levels::new(problem, wanted, levels_wanted(&problem.accuracy))?;
    refine(&problem.accuracy, MOST_LEVELS, |count| {
        levels.grow(wanted, count)?;
        steady_on(problem, velocity, &mut levels)
    })
}

fn steady_on(problem: &Problem, velocity: f64, levels: &mut Levels<'_>) -> Result<Outcome, SolveFault> {
    let speed = velocity.abs();
    let mut cautions = cautions(problem);
    let conducts = problem.wall.layers.iter().any(|l| l.conductivity_s_per_m > 0.0);
    let (figures, forces, ledger, fields) = if speed > 0.0 && conducts {
        let point = levels.point(velocity)?;
        cautions.extend(band::order_caution("drag", &point.drag));
        let forces = three_forces(problem, levels, velocity, &point)?;
        let fields = wanted_fields(problem, levels, velocity)?;
        let power = point.heat.value * velocity;
        let ledger = Ledger {
            work: point.drag.value * velocity,
            heat: power,
            field_energy: 0.0,
            imbalance_relative: (point.drag.value - point.heat.value) / point.drag.value,
            unit: "W",
        };
        let mut figures = moving_figures(&point, velocity);
        figures.extend(magnet_figures(problem, levels, velocity)?);
        (figures, Some(forces), Some(ledger), fields)
    } else {
        let fields = if speed > 0.0 { wanted_fields(problem, levels, velocity)? } else { None };
        (resting_figures(levels), None, None, fields)
    };
    let accuracy = verdict(&figures, problem.accuracy.target_relative, levels.levels.len());
    levels.monitor.progress(1.0, "settled fields");
    Ok(Outcome {
        regime: regime(problem, &levels.placement, speed),
        grids: levels.reports(problem),
        counters: levels.counters(),
        cautions,
        stop: Stop::Settled,
        accuracy,
        trace: Trace::default(),
        curve: None,
        frequency: None,
        strokes: None,
        sweeps: Sweeps::default(),
        stations: Vec::new(),
        thermal: None,
        slotted: None,
        figures,
        forces,
        ledger,
        fields,
    })
}

fn moving_figures(point: &Point, velocity: f64) -> Vec<Figure> {
    let sign = velocity.signum();
    let scaled = |name: &str, ladder: &Ladder, unit, factor: f64, band: f64| Figure {
        name: name.to_owned(),
        value: factor * ladder.value,
        unit,
        band: factor.abs() * band,
        basis: Basis::Extrapolated,
        location: None,
        levels: ladder.levels.iter().map(|v| factor * v).collect(),
    };
    let mut peak = scaled("current_density_peak", &point.peak, "A/m2", 1.0, point.peak_band);
    peak.location = Some(Location { r_m: Some(point.peak_at.0), z_m: Some(point.peak_at.1), t_s: None });
    vec![
        scaled("drag", &point.drag, "N", sign, point.drag_band),
        scaled("damping_coefficient", &point.drag, "N s/m", 1.0 / velocity, point.drag_band),
        scaled("dissipated_power", &point.heat, "W", velocity, point.drag_band),
        peak,
    ]
}

fn resting_figures(levels: &Levels<'_>) -> Vec<Figure> {
    let zero = |name: &str, unit| Figure {
        name: name.to_owned(),
        value: 0.0,
        unit,
        band: 0.0,
        basis: Basis::ClosedForm,
        location: None,
        levels: vec![0.0; levels.levels.len()],
    };
    vec![
        zero("drag", "N"),
        damping_at_rest(levels, "damping_coefficient"),
        zero("dissipated_power", "W"),
        zero("current_density_peak", "A/m2"),
    ]
}

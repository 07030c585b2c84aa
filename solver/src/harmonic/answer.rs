//! Figures, tables and fields for coils at rest.

use std::f64::consts::PI;

use super::inductance::inductance;
use super::levels::Levels;
use super::point::{Point, point};
use super::search::greatest_ratio;
use crate::band;
use crate::fault::SolveFault;
use crate::fields::{empty_fields, snapshot};
use crate::monitor::Monitor;
use crate::outcome::{
    Basis, Caution, Fields, Figure, FrequencyResponse, Ledger, Location, Measured, Outcome, Stop, Sweeps, Trace,
};
use crate::problem::{Alternating, Problem, SnapshotPlan};
use crate::regime::regime;
use crate::target::verdict;

/// Speed of light, m/s.
const LIGHT_M_PER_S: f64 = 299_792_458.0;
/// Wavelengths below so many times the largest size deserve a caution.
const NEAR: f64 = 50.0;

/// The answer on `count` levels; `problem` has its mover in the wall's frame.
///
/// # Errors
/// See [`SolveFault`].
pub(super) fn answer(
    problem: &Problem,
    law: &Alternating,
    count: usize,
    monitor: &dyn Monitor,
) -> Result<Outcome, SolveFault> {
    let mut levels = Levels::new(problem, law, count, monitor)?;
    let alone = inductance(&problem.mover, law.current_ampere);
    let points: Vec<Point> = (0..law.frequencies_hz.len()).map(|k| point(&levels, k, alone)).collect();
    let mut cautions = cautions(problem, law);
    let target = problem.accuracy.target_relative;
    for p in &points {
        let (dr, dx) = (p.point.resistance_change, p.point.reactance_change);
        let whole = dr.value.hypot(dx.value);
        // Levels that agree far within the target may come together in any order.
        let slow = [
            ("resistance_change", &p.resistance, dr.band > target * dr.value.abs()),
            ("reactance_change", &p.reactance, dx.band > target * whole),
        ];
        for (name, ladder, wide) in slow {
            let caution = band::order_caution(&format!("{name} at {:.6e} Hz", p.point.frequency_hz), ladder);
            cautions.extend(caution.filter(|_| wide));
        }
    }
    let mut figures = vec![closed("inductance_alone", "H", alone.value, alone.band)];
    let mut ledger = None;
    if let [only] = points.as_slice() {
        figures.splice(0..0, impedance(only, alone));
        figures.extend(beside(only, &levels));
        ledger = Some(balance(only, law));
    } else if let Some(found) = greatest_ratio(&levels, &points, alone) {
        figures.extend(found);
    } else {
        cautions.push(Caution {
            text: "The greatest ratio of resistance change to reactance without the wall does not lie inside the range of \
                   frequencies: critical_frequency and resistance_ratio_max are left out."
                .to_owned(),
        });
    }
    let accuracy = verdict(&judged(&points, &figures), problem.accuracy.target_relative, count);
    let highest = law.angular_frequencies().into_iter().fold(0.0, f64::max);
    let speed = levels.placement.wavelength_m * highest;
    let fields = wanted_fields(&mut levels)?;
    monitor.progress(1.0, "alternating fields");
    Ok(Outcome {
        regime: regime(problem, &levels.placement, speed),
        grids: levels.reports(speed),
        counters: levels.counters(),
        cautions,
        stop: Stop::Settled,
        accuracy,
        trace: Trace::default(),
        curve: None,
        frequency: Some(response(&levels, points, alone)),
        strokes: None,
        sweeps: Sweeps::default(),
        stations: Vec::new(),
        thermal: None,
        slotted: None,
        figures,
        forces: None,
        ledger,
        fields,
    })
}

fn response(levels: &Levels<'_>, points: Vec<Point>, inductance_alone: Measured) -> FrequencyResponse {
    let (problem, law, places) = (levels.problem, levels.law, &levels.places);
    FrequencyResponse {
        current_ampere: law.current_ampere,
        winding_resistance_ohm: law.winding_resistance_ohm,
        inductance_alone,
        height_m: places.height,
        shielding_at_m: places.shield_at,
        facing_layer: places.facing.map_or(0, |(line, _)| places.lines[line].layer),
        layer_names: problem.wall.layers.iter().map(|l| l.name.clone()).collect(),
        points: points.into_iter().map(|p| p.point).collect(),
    }
}

fn closed(name: &str, unit: &'static str, value: f64, band: f64) -> Figure {
    Figure { name: name.to_owned(), value, unit, band, basis: Basis::ClosedForm, location: None, levels: Vec::new() }
}

/// Resistance, reactance, inductance, and what the wall adds.
fn impedance(p: &Point, alone: Measured) -> Vec<Figure> {
    let omega = 2.0 * PI * p.point.frequency_hz;
    let (dr, dx) = (p.point.resistance_change, p.point.reactance_change);
    let figure = |name: &str, unit, value: f64, band: f64, levels: Vec<f64>| Figure {
        name: name.to_owned(),
        value,
        unit,
        band,
        basis: Basis::Extrapolated,
        location: None,
        levels,
    };
    let shifted = |levels: &[f64], by: f64, scale: f64| levels.iter().map(|v| scale * (by + v)).collect::<Vec<f64>>();
    let winding = p.point.resistance_ohm - dr.value;
    let own = omega * alone.value;
    let reactance_band = dx.band + omega * alone.band;
    let (r, x) = (&p.resistance.levels, &p.reactance.levels);
    vec![
        figure("resistance", "ohm", p.point.resistance_ohm, dr.band, shifted(r, winding, 1.0)),
        figure("reactance", "ohm", p.point.reactance_ohm, reactance_band, shifted(x, own, 1.0)),
        figure("inductance", "H", p.point.inductance_henry, reactance_band / omega, shifted(x, own, 1.0 / omega)),
        figure("resistance_change", "ohm", dr.value, dr.band, r.clone()),
        figure("reactance_change", "ohm", dx.value, dx.band, x.clone()),
    ]
}

/// Heat, shielding and depths at the one frequency of a case.
fn beside(p: &Point, levels: &Levels<'_>) -> Vec<Figure> {
    let half_square = 0.5 * levels.law.current_ampere * levels.law.current_ampere;
    let dr = p.point.resistance_change;
    let extrapolated = |name: &str, unit, value, band, location| Figure {
        basis: Basis::Extrapolated,
        location,
        ..closed(name, unit, value, band)
    };
    let mut figures = vec![Figure {
        levels: p.resistance.levels.iter().map(|v| half_square * v).collect(),
        ..extrapolated("dissipated_power", "W", half_square * dr.value, half_square * dr.band, None)
    }];
    if let Some(s) = p.point.shielding {
        let (r, z) = levels.places.shield_at;
        let at = Location { r_m: Some(r), z_m: Some(z), t_s: None };
        figures.push(extrapolated("shielding_factor", "1", s.magnitude(), s.band, Some(at)));
    }
    figures.extend(p.point.skin_depth_m.map(|d| closed("skin_depth", "m", d, 0.0)));
    if let Some(d) = p.point.current_depth {
        let at = Location { r_m: None, z_m: Some(levels.places.height), t_s: None };
        figures.push(extrapolated("current_depth", "m", d.value, d.band, Some(at)));
    }
    figures
}

/// Power that the coils take beyond their own, and heat in the wall, W.
fn balance(p: &Point, law: &Alternating) -> Ledger {
    let half_square = 0.5 * law.current_ampere * law.current_ampere;
    let (work, heat) = (half_square * p.resistance.value, half_square * p.by_heat.value);
    let imbalance_relative = if work.abs() > 0.0 { (work - heat) / work } else { 0.0 };
    Ledger { work, heat, field_energy: 0.0, imbalance_relative, unit: "W" }
}

/// What the wanted accuracy is held against: the resistance change by itself, the reactance change against the whole change of the
/// impedance (it may pass through zero), and what a sweep says beside.
fn judged(points: &[Point], figures: &[Figure]) -> Vec<Figure> {
    let one = |p: &Point| {
        let (dr, dx) = (p.point.resistance_change, p.point.reactance_change);
        [
            closed("resistance_change", "ohm", dr.value, dr.band),
            closed("reactance_change", "ohm", dr.value.hypot(dx.value), dx.band),
        ]
    };
    let swept = figures.iter().filter(|f| f.name == "resistance_ratio_max").cloned();
    points.iter().flat_map(one).chain(swept).collect()
}

/// Two instants of the finest level at the highest frequency: the coils' current at its peak, and a quarter period later.
fn wanted_fields(levels: &mut Levels<'_>) -> Result<Option<Fields>, SolveFault> {
    let problem = levels.problem;
    if problem.snapshots == SnapshotPlan::None {
        return Ok(None);
    }
    let highest = levels.law.angular_frequencies().into_iter().fold(0.0, f64::max);
    let position = levels.law.position_m;
    let Some(finest) = levels.levels.last_mut() else { return Ok(None) };
    let reaction = finest.reaction(highest);
    let [real, imaginary] = finest.spread(&reaction)?;
    let operators = &finest.operators;
    let mut fields = empty_fields(&operators.grid, &operators.materials, &problem.wall);
    let of = |part: fn(&num_complex::Complex64) -> f64| reaction.currents.iter().map(part).collect::<Vec<f64>>();
    let mut peak = snapshot(operators, problem, &real, &of(|c| c.re), 0.0, 0.0);
    // Re((a + i b) exp(i pi/2)) = -b: the coils' own field vanishes then, and so does their current.
    let negative: Vec<f64> = imaginary.iter().map(|x| -x).collect();
    let mut without = problem.clone();
    without.mover.parts.clear();
    let mut quarter = snapshot(operators, &without, &negative, &of(|c| -c.im), 0.5 * PI / highest, 0.0);
    (peak.mover_position_m, quarter.mover_position_m) = (position, position);
    fields.snapshots.extend([peak, quarter]);
    Ok(Some(fields))
}

/// What the user should know of the model here.
fn cautions(problem: &Problem, law: &Alternating) -> Vec<Caution> {
    let mut texts = Vec::new();
    if problem.wall.is_permeable() {
        texts.push("Permeability is taken as linear and without hysteresis: a steel behaves otherwise.".to_owned());
    }
    if law.winding_resistance_ohm <= 0.0 {
        texts.push(
            "The winding's own resistance is not given: resistance is what the wall adds. Skin effect within the winding and its \
             capacitance are left out in any case."
                .to_owned(),
        );
    }
    let highest = law.frequencies_hz.iter().copied().fold(0.0, f64::max);
    let sizes = problem.mover.parts.iter().map(|p| p.outline.outer_radius_m.max(p.outline.length_m));
    let largest = sizes.fold(problem.wall.outer_radius_m(), f64::max);
    if LIGHT_M_PER_S / highest < NEAR * largest {
        texts.push(format!(
            "Displacement currents are left out, and at {highest:.3e} Hz the wavelength in air is no more than {:.0} times the \
             largest size.",
            LIGHT_M_PER_S / highest / largest
        ));
    }
    texts.into_iter().map(|text| Caution { text }).collect()
}

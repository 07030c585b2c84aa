//! Strokes of vanishing amplitude: the response of the wall's currents at a frequency, on the grids of a march.
//!
//! With the mover at c + X exp(i omega t) and X small, psi_s moves by X s, s = d psi_s / d position at c (with the static reaction of a permeable
//! wall), and (K + i omega G) phi = -i omega G s. The force on the mover is -(k + i omega c) X with
//!
//!   k + i omega c = 2 pi i omega (s^T G s + s^T G phi),
//!
//! so that c(omega) = 2 pi s^T G (K + i omega G)^-1 K s: a sum of first-order lags, one a mode of the wall's currents, with positive weights. One
//! real symmetric recurrence serves a range of frequencies.

use lenzbore_mesh::Refinement;

use super::course::life_time;
use super::level::MarchLevel;
use super::lines::LevelLines;
use super::lumped::with_models;
use crate::band::{self, Ladder};
use crate::direct::DirectPlan;
use crate::fault::SolveFault;
use crate::grid_rules::{Frame, GridPlan};
use crate::harmonic::{Group, Recurrence, group_of, groups};
use crate::monitor::Monitor;
use crate::outcome::{SmallStroke, StrokeResponse};
use crate::placement::Placement;
use crate::problem::{Problem, Sine};
use crate::target::levels_wanted;

/// Stiffness and damping coefficient at vanishing amplitude about `centre_m`, at each of `frequencies_hz`, extrapolated, with bands.
///
/// # Errors
/// See [`SolveFault`].
pub(crate) fn small_strokes(
    problem: &Problem,
    centre_m: f64,
    frequencies_hz: &[f64],
    monitor: &dyn Monitor,
) -> Result<Vec<SmallStroke>, SolveFault> {
    let omegas: Vec<f64> = frequencies_hz.iter().map(|f| std::f64::consts::TAU * f).collect();
    let refinements = Refinement::first(levels_wanted(&problem.accuracy));
    let placement = Placement::new(problem);
    let plan = plan(problem, &placement, centre_m, &omegas)?;
    let mut by_level = Vec::new();
    for &refinement in &refinements {
        by_level.push(responses(problem, &placement, &plan, (refinement, false), (centre_m, &omegas), monitor)?);
    }
    let cut = responses(problem, &placement, &plan, (Refinement::COARSEST, true), (centre_m, &omegas), monitor)?;
    let factors: Vec<f64> = refinements.iter().map(|f| f.factor()).collect();
    let figure = |k: usize, part: usize| {
        let ladder = Ladder::new(&factors, by_level.iter().map(|l| l[k][part]).collect());
        (ladder.value, band::one_route(&ladder, cut[k][part] - by_level[0][k][part], 0.0))
    };
    Ok(frequencies_hz
        .iter()
        .enumerate()
        .map(|(k, &frequency_hz)| {
            let ((stiffness, stiffness_band), (damping, damping_band)) = (figure(k, 0), figure(k, 1));
            SmallStroke { frequency_hz, stiffness, stiffness_band, damping, damping_band }
        })
        .collect())
}

/// Frequencies of a stroke's response, each 1.3 times the one before.
const RATIO: f64 = 1.3;
/// How far they go beyond the stroke's own frequency and that of the currents' life time.
const BEYOND: f64 = 10.0;

/// The response around a stroke: from a tenth of its frequency, and of 1 / (2 pi times the life time of currents), to ten times both.
///
/// # Errors
/// See [`SolveFault`].
pub(super) fn around(problem: &Problem, sine: &Sine, monitor: &dyn Monitor) -> Result<StrokeResponse, SolveFault> {
    let characteristic = 1.0 / (std::f64::consts::TAU * life_time(&problem.wall));
    let own = sine.frequency_hz;
    let (low, high) = (own.min(characteristic) / BEYOND, own.max(characteristic) * BEYOND);
    let steps = |far: f64| (far / own).ln().abs() / RATIO.ln();
    let mut frequencies = vec![own];
    let mut k = 1.0;
    while k <= steps(high) {
        frequencies.push(own * RATIO.powf(k));
        k += 1.0;
    }
    let mut k = 1.0;
    while k <= steps(low) {
        frequencies.insert(0, own * RATIO.powf(-k));
        k += 1.0;
    }
    Ok(with_models(small_strokes(problem, sine.centre_m, &frequencies, monitor)?))
}

pub(super) fn plan(
    problem: &Problem,
    placement: &Placement,
    centre_m: f64,
    omegas: &[f64],
) -> Result<GridPlan, SolveFault> {
    let highest = omegas.iter().copied().fold(0.0, f64::max);
    let speed = highest * placement.wavelength_m;
    Ok(GridPlan::new(problem, placement, Frame::Wall { low: centre_m, high: centre_m, speed })?)
}

/// The level and s at its wall's nodes.
pub(super) fn level_and_slope<'a>(
    problem: &'a Problem,
    placement: &'a Placement,
    plan: &'a GridPlan,
    (refinement, half): (Refinement, bool),
    centre_m: f64,
) -> Result<(MarchLevel<'a>, Vec<f64>), SolveFault> {
    let lines = LevelLines::new(plan, None, refinement, half);
    let mut level = MarchLevel::new(problem, placement, lines, None, (centre_m, centre_m))?;
    let nodes = level.operators.wall.len();
    let (mut own, mut slope) = (vec![0.0; nodes], vec![0.0; nodes]);
    level.fill_source(centre_m, &mut own, &mut slope);
    let (slope, _) = level.field_at_rest(&slope)?;
    Ok((level, slope))
}

/// [k, c] at each of `omegas` on one level.
pub(super) fn responses(
    problem: &Problem,
    placement: &Placement,
    plan: &GridPlan,
    level: (Refinement, bool),
    (centre_m, omegas): (f64, &[f64]),
    monitor: &dyn Monitor,
) -> Result<Vec<[f64; 2]>, SolveFault> {
    let (level, slope) = level_and_slope(problem, placement, plan, level, centre_m)?;
    let operators = &level.operators;
    let direct = DirectPlan::new(operators)?;
    let groups: Vec<Group> = groups(omegas);
    let mut recurrences = Vec::new();
    for group in &groups {
        let mut factor = direct.factor(operators, group.shift)?;
        let ends = [group.range.0, group.range.1];
        recurrences.push(Recurrence::new(operators, &mut factor, &slope, (group.shift, &ends), monitor)?);
    }
    let own: f64 = operators.wall.conductance.iter().zip(&slope).map(|(g, s)| g * s * s).sum();
    let response = |&omega: &f64| {
        let linked = recurrences[group_of(&groups, omega)].linked(omega);
        let admitted = 2.0 * std::f64::consts::PI * (own + linked);
        // i omega (x + i y) = -omega y + i omega x.
        [-omega * admitted.im, admitted.re]
    };
    Ok(omegas.iter().map(response).collect())
}

//! The field solver's flux density around a moving loop, read between the nodes and taken to the limit of fine grids.

use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::outcome::Fields;
use lenzbore_solver::problem::{Mover, SnapshotPlan, Travel, Wall};
use lenzbore_solver::sources::{AxialField, Source as Field};

use super::{Check, Kind, Verdict};
use crate::references::half_figure;
use crate::references::moving_loop::{self as reference, Row};
use crate::rings::extrapolate;
use crate::{Error, cases};

/// Side of the square section that stands for the filament, m: it changes the field 1 mm away by (side/gap)^2/24 = 2e-5.
const SECTION_M: f64 = 20e-6;
/// Numbers of levels solved on, and their finest grids' cell sizes relative to the coarsest of all.
const LEVELS: [(usize, f64); 3] = [(3, 1.0 / 2.0), (4, 1.0 / 2.5), (5, 1.0 / 3.0)];

/// A loop of 1 A.
pub(super) fn loop_source() -> Field {
    let (radius, half) = (reference::LOOP_RADIUS_M, 0.5 * SECTION_M);
    Field::Coil { inner_radius_m: radius - half, outer_radius_m: radius + half, length_m: SECTION_M, ampere_turns: 1.0 }
}

pub(super) const CHECKS: &[Check] = &[Check {
    name: "field-moving-loop",
    about: "flux density of a moving loop inside and outside a tube of permeability 1 and 50",
    kind: Kind::CodeVerification,
    source: &reference::SOURCE,
    run: moving_loop,
}];

/// Lines along the tube: radius, radii between which the reaction is smooth, error of the table, uT.
const LINES: [(f64, (f64, f64), f64); 2] = [
    (reference::INSIDE_RADIUS_M, (0.0, reference::TUBE_M.0), reference::INSIDE_ERROR_UT),
    (reference::OUTSIDE_RADIUS_M, (reference::TUBE_M.1, f64::INFINITY), 0.0),
];
/// Greatest difference over the loop's own greatest field on the line, by component: 1.5 times what was found.
const TOLERANCE: f64 = 5e-5;
/// For the rows at rest the loop creeps: the wall's currents change the field by 1e-7.
const CREEP_M_PER_S: f64 = 1e-7;

fn moving_loop(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let rows: Vec<[Row; 2]> = reference::INSIDE.into_iter().zip(reference::OUTSIDE).map(|(i, o)| [i, o]).collect();
    moving_loop_against(&rows, monitor)
}

/// Holds the field against rows inside and outside of the same case.
fn moving_loop_against(rows: &[[Row; 2]], monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let mover = cases::mover(vec![cases::part("loop", 0.0, loop_source())]);
    let sizes = LEVELS.map(|(_, size)| size);
    let mut verdict = Verdict::default();
    for pair in rows {
        let mu = pair[0].relative_permeability;
        let wall = cases::endless_tube(reference::TUBE_M, reference::CONDUCTIVITY_S_PER_M, mu);
        let speed = pair[0].speed_m_per_s.max(CREEP_M_PER_S);
        let mut levels = Vec::new();
        for (count, _) in LEVELS {
            levels.push(reaction(&wall, &mover, speed, count, monitor)?);
        }
        for (l, row) in pair.iter().enumerate() {
            for h in 0..reference::HEIGHTS_M.len() {
                let of = |component: usize| -> Vec<f64> { levels.iter().map(|v| v[l][h][component]).collect() };
                hold(&mut verdict, (l, h), row, [0, 1].map(|c| extrapolate(&sizes, &of(c)).value));
            }
        }
    }
    Ok(verdict)
}

/// Holds both components at height `h` of line `l`: the loop's own field and the reaction, T.
fn hold(verdict: &mut Verdict, (l, h): (usize, usize), row: &Row, reaction: [f64; 2]) {
    let (r, _, error) = LINES[l];
    let z = reference::HEIGHTS_M[h];
    let source = loop_source();
    let own = |z: f64| [source.flux_density_r(r, z), source.flux_density_z(r, z)];
    for (c, name) in ["B_r", "B_z"].into_iter().enumerate() {
        let most = reference::HEIGHTS_M.iter().fold(0.0_f64, |m, z| m.max(1e6 * own(*z)[c].abs()));
        let expected = [row.radial_microtesla, row.axial_microtesla][c][h];
        let allowed = half_figure(expected, reference::FIGURES) + error + TOLERANCE * most;
        let (speed, mu) = (row.speed_m_per_s, row.relative_permeability);
        let place = format!("{name}, r {} mm, z {} mm, {speed} m/s, permeability {mu}", 1e3 * r, 1e3 * z);
        verdict.compare(place, 1e6 * (own(z)[c] + reaction[c]), expected, allowed, "uT");
    }
}

/// (B_r, B_z) of the reaction on the finest of `levels` grids: `[line][height]`, T.
fn reaction(
    wall: &Wall,
    mover: &Mover,
    speed: f64,
    levels: usize,
    monitor: &dyn Monitor,
) -> Result<Vec<Vec<[f64; 2]>>, Error> {
    let mut problem = cases::question(wall.clone(), mover.clone(), Travel::Steady { velocity_m_per_s: speed });
    problem.accuracy.levels = Some(levels);
    problem.snapshots = SnapshotPlan::Automatic;
    let outcome = lenzbore_solver::solve(&problem, monitor)?;
    let fields = outcome.fields.filter(|f| !f.snapshots.is_empty()).ok_or(Error::MissingFigure("fields"))?;
    let along = |r: f64, span| reference::HEIGHTS_M.iter().map(|z| curl(&fields, r, *z, span)).collect();
    Ok(LINES.iter().map(|(r, span, _)| along(*r, *span)).collect())
}

/// Points of the interpolation along each axis.
const POINTS: usize = 6;

/// (B_r, B_z) of the reaction at (r, z) from psi at the nodes around it within `span` of radii, T.
fn curl(fields: &Fields, r: f64, z: f64, span: (f64, f64)) -> [f64; 2] {
    let columns = fields.r_m.len();
    let psi = &fields.snapshots[0].psi_reaction;
    let across = Stencil::new(&fields.r_m, r, span);
    let along = Stencil::new(&fields.z_m, z, (f64::NEG_INFINITY, f64::INFINITY));
    let (mut by_r, mut by_z) = (0.0, 0.0);
    for j in 0..POINTS {
        let row = (along.first + j) * columns + across.first;
        for i in 0..POINTS {
            by_r += along.value[j] * across.slope[i] * psi[row + i];
            by_z += along.slope[j] * across.value[i] * psi[row + i];
        }
    }
    [-by_z / r, by_r / r]
}

/// Weights of a value and of a slope at one place of a node line.
struct Stencil {
    first: usize,
    value: [f64; POINTS],
    slope: [f64; POINTS],
}

impl Stencil {
    fn new(nodes: &[f64], at: f64, (from, to): (f64, f64)) -> Self {
        let slack = 1e-9 * at.abs();
        let low = nodes.partition_point(|x| *x < from - slack);
        let high = nodes.partition_point(|x| *x <= to + slack);
        let above = nodes.partition_point(|x| *x < at);
        let first = above.saturating_sub(POINTS / 2).clamp(low, high.saturating_sub(POINTS).max(low));
        let x = &nodes[first..first + POINTS];
        let (mut value, mut slope) = ([0.0; POINTS], [0.0; POINTS]);
        for k in 0..POINTS {
            let factor = |m: usize| (at - x[m]) / (x[k] - x[m]);
            let others = || (0..POINTS).filter(move |m| *m != k);
            value[k] = others().map(factor).product();
            slope[k] =
                others().map(|m| others().filter(|n| *n != m).map(factor).product::<f64>() / (x[k] - x[m])).sum();
        }
        Self { first, value, slope }
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use lenzbore_solver::monitor::Unwatched;

    use super::*;

    /// Errors planted in the rows at 10 m/s, permeability 50: one value off by 3 % of the row's peak, one sign turned, and the
    /// velocity turned round.
    #[test]
    fn planted_errors_are_seen() {
        let good = [reference::INSIDE[6], reference::OUTSIDE[6]];
        let run = |pair: [Row; 2]| moving_loop_against(&[pair], &Unwatched).unwrap();
        assert!(run(good).passed());
        let mut bad = good;
        bad[0].radial_microtesla[4] *= 1.03;
        bad[1].axial_microtesla[2] *= -1.0;
        let verdict = run(bad);
        let caught: Vec<&str> = verdict.comparisons.iter().filter(|c| !c.passes()).map(|c| c.what.as_str()).collect();
        let names =
            ["B_r, r 13 mm, z -5 mm, 10 m/s, permeability 50", "B_z, r 24 mm, z -20 mm, 10 m/s, permeability 50"];
        assert_eq!(caught, names);
        let mut turned = good;
        for row in &mut turned {
            row.axial_microtesla.reverse();
        }
        assert!(!run(turned).passed());
    }

    /// Weights of the interpolation give a polynomial and its slope back, one-sided at the end of the span too.
    #[test]
    fn stencils_are_exact_for_quintics() {
        let nodes: Vec<f64> = (0..20).map(|i| (0.3 * f64::from(i)).powf(1.2)).collect();
        for (at, span) in [(2.0, (0.0, 9.0)), (nodes[9] - 1e-3, (0.0, nodes[9])), (nodes[9], (nodes[9], 99.0))] {
            let stencil = Stencil::new(&nodes, at, span);
            let used = &nodes[stencil.first..stencil.first + POINTS];
            assert!(used[0] >= span.0 && used[POINTS - 1] <= span.1 + 1e-12);
            let value: f64 = used.iter().zip(stencil.value).map(|(x, w)| w * x.powi(5)).sum();
            let slope: f64 = used.iter().zip(stencil.slope).map(|(x, w)| w * x.powi(5)).sum();
            approx::assert_relative_eq!(value, at.powi(5), max_relative = 1e-9);
            approx::assert_relative_eq!(slope, 5.0 * at.powi(4), max_relative = 1e-9);
        }
    }
}

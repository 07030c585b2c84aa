//! Flux lines: level lines of the total psi, with equal flux between neighbours.

use contour::ContourBuilder;
use lenzbore_solver::outcome::{Fields, Snapshot};
use lenzbore_solver::problem::Problem;
use lenzbore_solver::sources::{AxialField as _, Source};

use super::sample::Patch;
use super::view::View;
use crate::picture::simplify::simplified;
use crate::picture::svg::polygon;
use crate::result::IoFault;

/// Spacing of the samples on paper, 0.1 mm.
const PITCH: f64 = 2.8;
/// Samples beyond the window, so that the closing edges of the lines fall outside it.
const BEYOND: usize = 3;
/// Lines wanted from the axis to the greatest flux.
const LINES: f64 = 11.0;
/// psi near a point dipole grows without bound: within this part of the bore radius it sets no level.
const NEAR_DIPOLE: f64 = 0.4;

/// The right half's lines as path data, and the flux between neighbours, Wb.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct FluxLines {
    pub path: String,
    pub step_weber: f64,
}

/// psi on even samples of the right half: column 0 on the axis, row 0 at the lower edge.
struct Samples {
    columns: usize,
    rows: usize,
    pitch: f64,
    low: f64,
    psi: Vec<f64>,
    largest: f64,
}

/// The flux lines, or nothing where there is no field.
///
/// Between the nodes the mover's own part is taken from its closed form and the reaction is interpolated, so that the
/// lines bend at the faces of a magnet and nowhere else.
///
/// # Errors
/// [`IoFault::Picture`] where the level lines cannot be found.
pub(super) fn lines(
    problem: &Problem,
    fields: &Fields,
    snapshot: &Snapshot,
    view: &View,
) -> Result<Option<FluxLines>, IoFault> {
    let samples = Samples::take(problem, fields, snapshot, view);
    let tau = std::f64::consts::TAU;
    if samples.largest <= 0.0 {
        return Ok(None);
    }
    let step = near_round(tau * samples.largest / LINES) / tau;
    let mut path = String::new();
    for sign in [1.0, -1.0] {
        path.push_str(&samples.level_lines(sign, step, view)?);
    }
    Ok(Some(FluxLines { path, step_weber: tau * step }))
}

impl Samples {
    fn take(problem: &Problem, fields: &Fields, snapshot: &Snapshot, view: &View) -> Self {
        let pitch = PITCH / view.scale;
        let columns = count(view.half_width / pitch) + 1 + BEYOND;
        let rows = count((view.high - view.low) / pitch) + 1 + 2 * BEYOND;
        let low = view.low - pitch * real(BEYOND);
        let reaction = Patch::of_nodes(&fields.r_m, &fields.z_m, &snapshot.psi_reaction);
        let dipoles = dipoles(problem, snapshot.mover_position_m);
        let near = NEAR_DIPOLE * problem.wall.inner_radius_m().max(0.2 * view.half_width);
        let mut samples = Self { columns, rows, pitch, low, psi: Vec::with_capacity(columns * rows), largest: 0.0 };
        for row in 0..rows {
            for column in 0..columns {
                let (r, z) = (pitch * real(column), low + pitch * real(row));
                let own = problem.mover.psi(r, z - snapshot.mover_position_m);
                let psi = if own.is_finite() { own + reaction.at(r, z) } else { 0.0 };
                samples.psi.push(psi);
                if dipoles.iter().all(|at| r.hypot(z - at) > near) {
                    samples.largest = samples.largest.max(psi.abs());
                }
            }
        }
        samples
    }

    /// Closed lines at `sign` times 1, 2, 3... steps; where psi runs out of the window they close beyond it.
    fn level_lines(&self, sign: f64, step: f64, view: &View) -> Result<String, IoFault> {
        let fault = |e: contour::Error| IoFault::Picture { picture: "section", source: Box::new(e) };
        let values: Vec<f64> = self.psi.iter().map(|psi| sign * psi).collect();
        let highest = values.iter().copied().fold(0.0, f64::max).min(1.001 * self.largest);
        let levels: Vec<f64> = (1..=40).map(|k| step * f64::from(k)).take_while(|level| *level < highest).collect();
        let builder = ContourBuilder::new(self.columns, self.rows, true);
        let mut path = String::new();
        for line in builder.lines(&values, &levels).map_err(fault)? {
            for ring in line.geometry() {
                let points: Vec<(f64, f64)> = ring.coords().map(|c| self.on_paper(c.x, c.y, view)).collect();
                let points = simplified(&points, 0.15);
                if points.len() > 3 {
                    path.push_str(&polygon(&points));
                }
            }
        }
        Ok(path)
    }

    /// A place among the samples, whose first lies at one half, on paper.
    fn on_paper(&self, column: f64, row: f64, view: &View) -> (f64, f64) {
        (view.x(self.pitch * (column - 0.5)), view.y(self.low + self.pitch * (row - 0.5)))
    }
}

fn dipoles(problem: &Problem, position: f64) -> Vec<f64> {
    let parts = problem.mover.parts.iter().filter(|p| matches!(p.source, Source::Dipole { .. }));
    parts.map(|p| position + p.centre_m).collect()
}

/// The nearest of a few round numbers times a power of ten.
fn near_round(value: f64) -> f64 {
    let power = 10.0_f64.powf(value.log10().floor());
    let rounds = [1.0, 1.5, 2.0, 2.5, 3.0, 4.0, 5.0, 6.0, 8.0, 10.0];
    let far = |round: f64| (round * power / value).ln().abs();
    rounds.into_iter().min_by(|a, b| far(*a).total_cmp(&far(*b))).unwrap_or(1.0) * power
}

#[expect(
    clippy::cast_possible_truncation,
    clippy::cast_sign_loss,
    reason = "a few hundred samples; a cast keeps within range"
)]
fn count(exact: f64) -> usize {
    exact.ceil().clamp(1.0, 4000.0) as usize
}

#[expect(clippy::cast_precision_loss, reason = "a few hundred samples")]
fn real(n: usize) -> f64 {
    n as f64
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use super::*;
    use crate::result::demo;

    #[test]
    fn lines_lie_where_psi_has_their_value() {
        let (problem, outcome) = demo::steady();
        let mut fields = outcome.fields.unwrap();
        fields.snapshots[0].psi_reaction.fill(0.0);
        let snapshot = &fields.snapshots[0];
        let view = View::about(&problem, 0.0, 0.0, 0.0);
        let flux = lines(&problem, &fields, snapshot, &view).unwrap().unwrap();
        let mut seen = 0;
        for point in flux.path.split(['M', 'L', 'Z']).filter(|p| !p.is_empty()) {
            let (x, y) = point.split_once(' ').unwrap();
            let (r, z) = (
                (x.parse::<f64>().unwrap() - view.axis) / view.scale,
                view.high - y.parse::<f64>().unwrap() / view.scale,
            );
            if r.hypot(z) < 3.5e-3 || r > view.half_width || z < view.low || z > view.high {
                continue;
            }
            let steps = std::f64::consts::TAU * problem.mover.psi(r, z) / flux.step_weber;
            assert!((steps - steps.round()).abs() < 0.03 * steps.max(1.0) && steps > 0.9, "{steps} steps at {r}, {z}");
            seen += 1;
        }
        assert!(seen > 200, "{seen}");
    }

    #[test]
    fn steps_are_round() {
        approx::assert_relative_eq!(near_round(2.3e-6), 2.5e-6, max_relative = 1e-12);
        approx::assert_relative_eq!(near_round(0.97), 1.0, max_relative = 1e-12);
        approx::assert_relative_eq!(near_round(7.1e-9), 8e-9, max_relative = 1e-12);
    }
}

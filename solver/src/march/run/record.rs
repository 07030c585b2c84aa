//! What a step leaves: the series at its end and middle, the other two forces, the greatest current density, snapshots.

use super::Run;
use crate::fault::SolveFault;
use crate::fields::snapshot;
use crate::force::{by_stress, on_mover};
use crate::interpolate::{ALONG_POINTS, Stencil, peak_near, sampled};
use crate::march::heating::share_before_end;
use crate::march::motion::{Motion, losses};
use crate::march::resample::{Instant, Resampler};
use crate::march::step::{StepReport, heat_rate};
use crate::settled::greatest_node;
use crate::sources::AxialField;

/// Nodes on either side of the greatest current density that its peak is read from.
pub(super) const PEAK_REACH: usize = 8;
/// Share of the greatest drag so far above which the stress is taken too.
const NEAR_GREATEST: f64 = 0.8;

impl Run<'_, '_> {
    pub(super) fn record(&mut self, begin: f64, dt: f64, report: &StepReport) {
        let series = &mut self.series;
        let middle = self.state.position - 0.5 * report.travel;
        self.heat += report.heat;
        self.work += report.force * report.travel;
        if let Motion::Free { law, mass } = self.motion {
            self.losses += losses(law, *mass, report.travel, report.travel / dt);
        }
        series.time.push(begin + dt);
        series.position.push(self.state.position);
        series.velocity.push(self.state.velocity);
        series.heat.push(self.heat);
        series.work.push(self.work);
        series.losses.push(self.losses);
        series.time_mid.push(begin + 0.5 * dt);
        series.position_mid.push(middle);
        series.force_mid.push(report.force);
        series.heat_rate_mid.push(heat_rate(self.level, &self.currents));
        series.energy_mid.push(report.energy);
        series.acceleration_mid.push(report.acceleration);
        if let Some(heating) = &mut self.heating {
            let ends = (self.state.position - report.travel, self.state.position);
            let share = share_before_end(&self.course, (begin, dt), ends);
            heating.add(self.level, &self.currents, (dt, share), self.motion.cycle(begin + 0.5 * dt));
        }
        if report.held {
            let before = series.velocity[series.velocity.len() - 2];
            series.stopped_at = Some(begin + dt * before / (before - self.state.velocity));
        }
        let pull = self.level.static_pull(middle);
        self.series.pull_mid.push(pull);
        self.record_routes(middle, begin + 0.5 * dt);
        self.record_peak(dt, report.travel);
        self.record_stations(dt, report.travel);
        self.record_magnets(middle);
    }

    /// How strongly magnets are driven against their magnetisation at the step's middle.
    fn record_magnets(&mut self, middle: f64) {
        let Some(watch) = &self.magnets else { return };
        let worst = watch.worst(&self.level.operators.grid, &self.psi_nodes, middle);
        let push = |series: &mut [Vec<f64>; 3], value: f64, (r, z): (f64, f64)| {
            for (column, value) in series.iter_mut().zip([value, r, z + middle]) {
                column.push(value);
            }
        };
        push(&mut self.series.opposing_mid, worst.field, worst.field_at);
        push(&mut self.series.margin_mid, worst.margin, worst.margin_at);
    }

    /// The two other routes at the step's middle.
    fn record_routes(&mut self, middle: f64, time_mid: f64) {
        let operators = &self.level.operators;
        let (nr, grid) = (operators.grid.nr(), &operators.grid);
        for (j, row) in self.stepper.reaction().chunks_exact(nr - 2).enumerate() {
            self.psi_nodes[(j + 1) * nr + 1..(j + 2) * nr - 1].copy_from_slice(row);
        }
        let (problem, placement) = (self.level.problem, self.level.placement);
        self.series.force_on_mover_mid.push(on_mover(grid, &self.psi_nodes, &problem.mover, middle, placement.gap_m));
        // The stress is wanted at the greatest drag alone: it is taken where the drag is near its greatest so far.
        let last = |values: &[f64]| values.last().copied().unwrap_or(0.0);
        let drag = (last(&self.series.force_mid) - last(&self.series.pull_mid)).abs();
        let cycle = self.motion.cycle(time_mid);
        if cycle != self.cycle {
            (self.cycle, self.greatest_drag) = (cycle, 0.0);
        }
        self.greatest_drag = self.greatest_drag.max(drag);
        if drag >= NEAR_GREATEST * self.greatest_drag {
            self.series.time_stress.push(time_mid);
            self.series.force_by_stress.push(by_stress(grid, &self.psi_nodes, problem, placement, middle));
        }
    }

    /// The greatest current density over the step: sigma |dpsi/dt| / r, the mover's own part exact between nodes.
    fn record_peak(&mut self, dt: f64, travel: f64) {
        let operators = &self.level.operators;
        let wall = &operators.wall;
        let (value, r, z) = greatest_node(operators, &self.currents).map_or((0.0, 0.0, 0.0), |(row, k)| {
            let r = operators.grid.r.nodes()[row.i];
            let heights = &operators.grid.z.nodes()[row.j..row.j + row.count];
            let (end, mover) = (self.state.position, &self.level.problem.mover);
            let own = |z: f64| (mover.psi(r, z - end + travel) - mover.psi(r, z - end)) / (r * dt);
            // Only the nodes around the greatest are read by the interpolation.
            let (from, to) = (k.saturating_sub(PEAK_REACH), (k + PEAK_REACH + 1).min(row.count));
            for (n, (near, &z)) in self.near.iter_mut().zip(&heights[from..to]).enumerate() {
                let w = row.start + from + n;
                *near = self.currents[w] / (wall.conductance[w] * r) - own(z);
            }
            let (places, near) = (&heights[from..to], &self.near[..to - from]);
            let (at, field) = peak_near(places, k - from, |z| own(z) + along(places, near, z));
            (wall.sigma_max[row.start + k] * field, r, at)
        });
        self.series.peak_mid.push(value);
        self.series.peak_r_mid.push(r);
        self.series.peak_z_mid.push(z);
    }

    /// What the gauges read of the reaction at the step's middle.
    fn record_stations(&mut self, dt: f64, travel: f64) {
        let (end, mover) = (self.state.position, &self.level.problem.mover);
        let own = |r: f64, z: f64| (mover.psi(r, z - end + travel) - mover.psi(r, z - end)) / dt;
        let series = &mut self.series.stations;
        let put = |channel: usize, value: f64| {
            if let Some(values) = series.get_mut(channel) {
                values.push(value);
            }
        };
        self.gauges.read(&self.level.operators, (&self.psi_nodes, &self.currents), &own, put);
    }

    pub(super) fn keep_snapshot(&mut self, time: f64, travel: f64) -> Result<(), SolveFault> {
        let position = self.state.position - 0.5 * travel;
        let (operators, problem) = (&self.level.operators, self.level.problem);
        if self.window.is_some() {
            if self.resampler.is_none() {
                self.resampler = Some(Resampler::new(problem, &self.level.lines)?);
            }
            let instant = Instant { psi: &self.psi_nodes, currents: &self.currents, time, position };
            self.snapshots.extend(self.resampler.as_ref().map(|whole| whole.snapshot(operators, problem, &instant)));
        } else {
            self.snapshots.push(snapshot(operators, problem, &self.psi_nodes, &self.currents, time, position));
        }
        Ok(())
    }
}

/// Interpolated value along the wall, or linear between the few nodes of a very short one.
fn along(places: &[f64], values: &[f64], z: f64) -> f64 {
    if places.len() < ALONG_POINTS {
        return sampled(places, values, z);
    }
    Stencil::<ALONG_POINTS>::at(places, z).value_of(values)
}

//! A uniform axial field switched on around rod, tube and hollow sphere: the solver's operators and steps against series.

use lenzbore_mesh::{Anchor, PlannedLine, Refinement, SizeLaw};
use lenzbore_solver::fault::SolveFault;
use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::step_field::StepField;

use super::{Check, Kind, Verdict};
use crate::Error;
use crate::diffusion::{Body, Form, StepResponse};
use crate::references::{half_decimal, half_figure, step_rod, step_tube};
use crate::rings::extrapolate;
use lenzbore_solver::constants::MU0;

pub(super) const CHECKS: &[Check] = &[
    Check {
        name: "step-rod",
        about: "field in a long rod after a uniform axial field is switched on, by series and by the solver's operators",
        kind: Kind::CodeVerification,
        source: &step_rod::SOURCE,
        run: rod,
    },
    Check {
        name: "step-tube",
        about: "field in the bore of a long tube after a uniform axial field is switched on, likewise",
        kind: Kind::CodeVerification,
        source: &step_tube::SOURCE,
        run: tube,
    },
];

/// Greatest difference of the solver from the series, over the applied field.
const TOLERANCE: f64 = 5e-7;

fn rod(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    rod_against(&step_rod::FIELD, monitor)
}

fn rod_against(table: &[(f64, [f64; 3])], monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let (a, sigma) = (step_rod::RADIUS_M, step_rod::CONDUCTIVITY_S_PER_M);
    let body = Body { form: Form::Long, inner_radius_m: 0.0, outer_radius_m: a, conductivity_s_per_m: sigma };
    let series = StepResponse::new(body);
    let times: Vec<f64> = table.iter().map(|(fourier, _)| fourier * MU0 * sigma * a * a).collect();
    let found = long_body(body, &times, &[Reading::Axis, Reading::Half, Reading::Mean(a)], monitor)?;
    let mut verdict = Verdict::default();
    let printed = half_decimal(step_rod::DECIMALS);
    for ((&(fourier, expected), time), found) in table.iter().zip(times).zip(found) {
        let by_series = [series.on_axis(time), series.at(0.5 * a, time), series.mean(a, time)];
        for (i, place) in ["axis", "half radius", "mean"].into_iter().enumerate() {
            let what = format!("{place} at t = {fourier} mu0 sigma a^2");
            verdict.compare(format!("{what}, series"), by_series[i], expected[i], printed, "1");
            verdict.compare(what, found[i], expected[i], TOLERANCE + printed, "1");
        }
    }
    Ok(verdict)
}

fn tube(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let (inner_radius_m, outer_radius_m) = step_tube::WALL_M;
    let conductivity_s_per_m = step_tube::CONDUCTIVITY_S_PER_M;
    let body = Body { form: Form::Long, inner_radius_m, outer_radius_m, conductivity_s_per_m };
    let series = StepResponse::new(body);
    let mut verdict = Verdict::default();
    for (n, ((expected, figures), found)) in
        step_tube::TIME_CONSTANTS_US.iter().zip(series.time_constants_s()).enumerate()
    {
        let what = format!("time constant {}, series", n + 1);
        verdict.compare(what, 1e6 * found, *expected, half_figure(*expected, *figures), "us");
    }
    let found = long_body(body, &step_tube::BORE.map(|(t, ..)| t), &[Reading::Mean(inner_radius_m)], monitor)?;
    for ((time, expected, known), found) in step_tube::BORE.into_iter().zip(found) {
        let what = format!("bore at {:.0} us", 1e6 * time);
        let exact = series.mean(inner_radius_m, time);
        verdict.compare(format!("{what}, series"), exact, expected, 1.001 * known, "1");
        verdict.compare(what, found[0], exact, TOLERANCE, "1");
    }
    Ok(verdict)
}

/// Steps in which the time doubles, on the coarsest level.
const STEPS: usize = 10;
/// Halvings of the first instant that the steps begin with.
const HALVINGS: i32 = 10;
/// Refinement levels of a long body.
const LEVELS: usize = 4;
/// Cells across the metal on the coarsest level.
const ACROSS: usize = 12;
/// Distance of the outer boundary of a long body, in its radii: flux that returns within it is 1e-8 of what is kept out.
const FAR: f64 = 1e4;

/// Takes the field to each of `samples_s` (increasing), the step growing with the time passed, and reads it there.
pub(super) fn follow(
    field: &mut StepField,
    samples_s: &[f64],
    refinement: Refinement,
    monitor: &dyn Monitor,
    mut read: impl FnMut(&StepField) -> Result<(), SolveFault>,
) -> Result<(), Error> {
    let mut reached = 0.0;
    for &sample in samples_s {
        for end in stages(reached, sample) {
            if monitor.cancelled() {
                return Err(SolveFault::Interrupted.into());
            }
            let steps = refinement.times(STEPS);
            field.advance((end - reached) / steps as f64, steps)?;
            reached = end;
        }
        read(field)?;
    }
    Ok(())
}

/// Ends of stages from `from` to `to`, each at most twice the one before it.
fn stages(from: f64, to: f64) -> Vec<f64> {
    if from <= 0.0 {
        return (0..=HALVINGS).rev().map(|k| to * 0.5_f64.powi(k)).collect();
    }
    let count = (to / from).log2().ceil().max(1.0);
    let mut ends = Vec::new();
    let mut k = 1.0;
    while k < count + 0.5 {
        ends.push(from * (to / from).powf(k / count));
        k += 1.0;
    }
    ends
}

/// What is read of a long body.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum Reading {
    /// B_z on the axis.
    Axis,
    /// B_z at half the outer radius.
    Half,
    /// Mean of B_z over the disc of this radius, m.
    Mean(f64),
}

/// Readings at all samples, extrapolated over the levels: `[sample][reading]`.
pub(super) fn long_body(
    body: Body,
    samples_s: &[f64],
    readings: &[Reading],
    monitor: &dyn Monitor,
) -> Result<Vec<Vec<f64>>, Error> {
    let (inner, outer) = (body.inner_radius_m, body.outer_radius_m);
    let law = SizeLaw {
        growth: 0.5,
        anchors: vec![Anchor { position_m: outer, size_m: (outer - inner) / ACROSS as f64 }],
        caps: Vec::new(),
    };
    let outside = PlannedLine::new(&[outer, FAR * outer], &law).map_err(SolveFault::from)?;
    let heights: Vec<f64> = (-12..=12).map(|j| 0.5 * f64::from(j) * FAR * outer).collect();
    let levels = Refinement::first(LEVELS);
    let mut found = vec![vec![Vec::new(); readings.len()]; samples_s.len()];
    for refinement in &levels {
        let mut r = evenly(0.0, inner, if inner > 0.0 { refinement.times(2) } else { 0 });
        r.extend(evenly(inner, outer, refinement.times(ACROSS)));
        r.extend(outside.nodes(*refinement).nodes());
        let r = r.as_slice();
        let of_column = |i: usize| 0.5 * (r[i] + r[i + 1]);
        let metal =
            |i: usize| if of_column(i) > inner && of_column(i) < outer { body.conductivity_s_per_m } else { 0.0 };
        let sigma: Vec<f64> = (0..(r.len() - 1) * (heights.len() - 1)).map(|c| metal(c % (r.len() - 1))).collect();
        let mut field = StepField::new(r, &heights, &sigma, 1.0)?;
        let mut sample = 0;
        follow(&mut field, samples_s, *refinement, monitor, |field| {
            let mean = field.mean_flux_density()?;
            let middle = &mean[12 * r.len()..13 * r.len()];
            for (values, reading) in found[sample].iter_mut().zip(readings) {
                values.push(read(r, middle, *reading, outer));
            }
            sample += 1;
            Ok(())
        })?;
    }
    let sizes: Vec<f64> = levels.iter().map(|f| 1.0 / f.factor()).collect();
    let limit = |values: &Vec<f64>| extrapolate(&sizes, values).value;
    Ok(found.iter().map(|sample| sample.iter().map(limit).collect()).collect())
}

/// The start of each of `cells` equal cells between two places.
pub(super) fn evenly(from: f64, to: f64, cells: usize) -> Vec<f64> {
    (0..cells).map(|i| from + (to - from) * i as f64 / cells as f64).collect()
}

/// A reading from the means over discs that end at the nodes `r`.
fn read(r: &[f64], mean: &[f64], reading: Reading, outer: f64) -> f64 {
    let nearest = |radius: f64| {
        let off = |i: &usize| (r[*i] - radius).abs();
        (1..r.len()).min_by(|a, b| off(a).total_cmp(&off(b))).unwrap_or(1)
    };
    let flux = |i: usize| mean[i] * r[i] * r[i];
    match reading {
        // The mean goes as B(0) + B'' r^2/4: its second term is taken out.
        Reading::Axis => (r[2] * r[2] * mean[1] - r[1] * r[1] * mean[2]) / (r[2] * r[2] - r[1] * r[1]),
        Reading::Half => {
            let i = nearest(0.5 * outer);
            (flux(i + 1) - flux(i - 1)) / (r[i + 1] * r[i + 1] - r[i - 1] * r[i - 1])
        }
        Reading::Mean(radius) => mean[nearest(radius)],
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use lenzbore_solver::monitor::Unwatched;

    use super::*;

    #[test]
    fn planted_errors_are_seen() {
        let mut table = [step_rod::FIELD[1], step_rod::FIELD[3]];
        assert!(rod_against(&table, &Unwatched).unwrap().passed());
        table[0].1[0] *= 1.03;
        table[1].1.swap(1, 2);
        let verdict = rod_against(&table, &Unwatched).unwrap();
        // Series and solver both see each of the three.
        assert_eq!(verdict.comparisons.iter().filter(|c| !c.passes()).count(), 6, "{verdict}");
    }

    #[test]
    fn stages_double_at_most_and_end_at_the_samples() {
        let first = stages(0.0, 1.0);
        assert!((first[first.len() - 1] - 1.0).abs() < 1e-15 && first.len() == 11);
        let next = stages(1.0, 5.0);
        assert!(next.len() == 3 && (next[2] - 5.0).abs() < 1e-14 && next[0] < 2.0);
    }
}

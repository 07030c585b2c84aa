//! At which instants the fields are kept.

use super::course::Course;
use super::figures::{drag_peak, end_of};
use super::series::Series;
use crate::problem::SnapshotPlan;

/// Instants of a plan and that of the greatest drag, read off the coarsest level's series, increasing, s.
pub(crate) fn instants(plan: &SnapshotPlan, series: &Series, course: &Course) -> Vec<f64> {
    let end = end_of(series, course).1;
    let mut instants = match plan {
        SnapshotPlan::None => return Vec::new(),
        SnapshotPlan::Automatic => Vec::new(),
        SnapshotPlan::EveryTravel { step_m } => by_travel(series, *step_m, end),
        SnapshotPlan::EveryTime { step_s } => multiples(*step_s, end),
        SnapshotPlan::Instants { times_s } => times_s.iter().copied().filter(|&t| t <= end).collect(),
    };
    instants.push(drag_peak(series, course).0);
    instants.retain(|&t| t >= course.since || matches!(plan, SnapshotPlan::Instants { .. }));
    instants.sort_by(f64::total_cmp);
    instants.dedup();
    instants
}

fn multiples(step: f64, end: f64) -> Vec<f64> {
    (0_u32..).map(|n| f64::from(n) * step).take_while(|&t| t <= end).collect()
}

/// Instants at which the path run reaches whole multiples of `step`.
fn by_travel(series: &Series, step: f64, end: f64) -> Vec<f64> {
    let mut instants = vec![0.0];
    let (mut path, mut next) = (0.0, 1_u32);
    for (t, z) in series.time.windows(2).zip(series.position.windows(2)) {
        let stretch = (z[1] - z[0]).abs();
        while stretch > 0.0 && f64::from(next) * step <= path + stretch {
            let share = (f64::from(next) * step - path) / stretch;
            let instant = t[0] + share * (t[1] - t[0]);
            if instant > end {
                return instants;
            }
            instants.push(instant);
            next += 1;
        }
        path += stretch;
    }
    instants
}

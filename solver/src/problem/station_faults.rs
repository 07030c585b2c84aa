//! Why a gauge cannot be where it is.

use super::fault::{Named, ProblemFault};
use super::{Gauge, Problem, Station, Travel};
use crate::march::layer_at;

/// Radii of the wall within which a gauge is read: farther out cells are too coarse to tell anything.
const FARTHEST: f64 = 10.0;

/// Every reason why a station has no reading.
pub(super) fn station_faults(problem: &Problem, faults: &mut Vec<ProblemFault>) {
    if problem.stations.is_empty() {
        return;
    }
    let law = match &problem.travel {
        Travel::Steady { .. } => Some("steady"),
        Travel::Alternating(_) => Some("alternating"),
        _ => None,
    };
    if let Some(law) = law {
        faults.push(ProblemFault::StationLaw { law });
        return;
    }
    for (index, station) in problem.stations.iter().enumerate() {
        faults.extend(fault_of(problem, index, station));
    }
}

fn fault_of(problem: &Problem, index: usize, station: &Station) -> Option<ProblemFault> {
    let named = Named { index, name: station.name.clone() };
    let length = match station.gauge {
        Gauge::SearchCoil { length_m, turns } => {
            if !(turns.is_finite() && turns > 0.0 && station.radius_m > 0.0) {
                return Some(ProblemFault::StationCoil { station: named });
            }
            length_m
        }
        _ => 0.0,
    };
    let outer = problem.wall.outer_radius_m();
    let top = problem.wall.length_m().unwrap_or(0.0);
    let (low, high) = sweep(problem)?;
    let within = |z: f64| (low.min(0.0) - FARTHEST * outer..=high.max(top) + FARTHEST * outer).contains(&z);
    let known = [station.radius_m, station.at_m, length].iter().all(|x| x.is_finite());
    let near = station.radius_m <= FARTHEST * outer
        && within(station.at_m - 0.5 * length)
        && within(station.at_m + 0.5 * length);
    if !known || station.radius_m < 0.0 || length < 0.0 || !near {
        return Some(ProblemFault::StationFar { station: named, radius_m: station.radius_m, at_m: station.at_m });
    }
    if station.gauge == Gauge::CurrentDensity && !in_conductor(problem, station) {
        return Some(ProblemFault::StationNoConductor { station: named });
    }
    in_path(problem, station, length, (low, high)).map(|part| ProblemFault::StationInPath { station: named, part })
}

/// Lowest and highest position of the reference point.
fn sweep(problem: &Problem) -> Option<(f64, f64)> {
    let ends = match &problem.travel {
        Travel::Traverse(t) => vec![t.from_m, t.to_m],
        Travel::Free(f) => vec![f.release_m, f.until_m],
        Travel::Sine(s) => vec![s.centre_m - s.amplitude_m, s.centre_m + s.amplitude_m],
        Travel::Table(t) => t.position_m.clone(),
        Travel::Steady { .. } | Travel::Alternating(_) => return None,
    };
    let span = ends.iter().fold((f64::INFINITY, f64::NEG_INFINITY), |(a, b), z| (a.min(*z), b.max(*z)));
    (span.0 <= span.1).then_some(span)
}

fn in_conductor(problem: &Problem, station: &Station) -> bool {
    let small = 1.0e-9 * problem.wall.outer_radius_m();
    let around = [(1.0, 1.0), (1.0, -1.0), (-1.0, 1.0), (-1.0, -1.0)];
    let layers = around
        .iter()
        .filter_map(|(r, z)| layer_at(&problem.wall, station.radius_m + r * small, station.at_m + z * small));
    layers.into_iter().any(|k| problem.wall.layers[k].conductivity_s_per_m > 0.0)
}

/// The part of the mover that passes through the gauge.
fn in_path(problem: &Problem, station: &Station, length: f64, (low, high): (f64, f64)) -> Option<Named> {
    problem.mover.parts.iter().enumerate().find_map(|(index, part)| {
        let across = (part.outline.inner_radius_m..=part.outline.outer_radius_m).contains(&station.radius_m);
        let half = 0.5 * (part.outline.length_m + length);
        let along = (low + part.centre_m - half..=high + part.centre_m + half).contains(&station.at_m);
        (across && along).then(|| Named { index, name: part.name.clone() })
    })
}

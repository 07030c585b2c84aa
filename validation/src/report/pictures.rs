//! The pictures of a report: what the findings that are there can show.

use lenzbore_io::picture::Picture;
use lenzbore_io::picture::validation::{ConvergenceLine, DifferenceRow, convergence, differences, thin_wall};

use super::{Finding, Report};
use crate::checks::Series;
use crate::references::thin_wall as reference;

/// All that can be drawn.
pub(super) fn all(report: &Report) -> Vec<Picture> {
    let heading = format!("Published checks of lenzbore {}", report.version);
    let rows: Vec<DifferenceRow> = report.findings.iter().map(row).collect();
    let curve = series(report, "field-thin-wall").and_then(|s| s.first()).map_or(&[][..], |s| &s.points);
    let lines: Vec<ConvergenceLine> = series(report, "step-sphere")
        .unwrap_or_default()
        .iter()
        .map(|s| ConvergenceLine { name: s.name.clone(), points: s.points.clone() })
        .collect();
    let sphere = "Field switched on around a hollow sphere: what a curved rim on a rectangular grid costs";
    [
        differences(&heading, &rows),
        thin_wall(&heading, curve, &reference::CURVE, reference::SLOPE, reference::GREATEST),
        convergence(&heading, sphere, "Cell size over the thickness of the shell", &lines),
    ]
    .into_iter()
    .flatten()
    .collect()
}

fn series<'r>(report: &'r Report, name: &str) -> Option<&'r [Series]> {
    let finding = report.findings.iter().find(|f| f.check.name == name)?;
    finding.verdict.as_ref().ok().map(|v| v.series.as_slice())
}

/// A check without an answer is drawn beyond the limit.
fn row(finding: &Finding) -> DifferenceRow {
    let name = finding.check.name.to_owned();
    let Ok(verdict) = &finding.verdict else { return DifferenceRow { name, of_allowed: f64::NAN, of_band: None } };
    let shares: Vec<(f64, Option<f64>)> = verdict.comparisons.iter().map(|c| c.shares()).collect();
    let of_band = shares.iter().filter_map(|s| s.1).reduce(f64::max);
    DifferenceRow {
        name,
        of_allowed: shares.iter().fold(0.0, |m: f64, s| if s.0.is_nan() { s.0 } else { m.max(s.0) }),
        of_band,
    }
}

//! Current density across the wall, magnitude and phase, at a few frequencies.

use lenzbore_solver::outcome::{CurrentSample, FrequencyPoint, Outcome};

use super::axes::{Axis, Frame, frame, grid, linear, room_below, room_left, tight};
use super::key::{Swatch, key, title};
use super::paper::{COLUMN, Picture};
use super::scale::significant;
use super::style::{BLUE, MARGIN, ORANGE};
use super::svg::{Stroke, Svg, polyline};

const MAGNITUDE_HEIGHT: f64 = 400.0;
const PHASE_HEIGHT: f64 = 240.0;
/// Frequencies shown at most.
const MOST: usize = 4;
/// Below this part of the greatest magnitude a phase is not drawn.
const FAINT: f64 = 1e-4;

const LINES: [Stroke; MOST] = [
    Stroke::full(BLUE, 4.5),
    Stroke::dashed(ORANGE, 4.5, "18 8"),
    Stroke::dashed("#2e7d4f", 4.5, "8 7"),
    Stroke::dashed("#6a3d9a", 4.5, "18 7 4 7"),
];

/// Draws the current density, or nothing where no current was solved for or there is none.
#[must_use]
pub fn current_across(heading: &str, outcome: &Outcome) -> Option<Picture> {
    let response = outcome.frequency.as_ref()?;
    let shown = chosen(&response.points);
    let samples = &shown.first()?.across;
    let (first, last) = (samples.first()?, samples.last()?);
    if shown.iter().all(|p| greatest(p) <= 0.0) {
        return None;
    }
    let mut svg = Svg::new(COLUMN);
    let subtitle = format!("Current density across the wall at z = {} mm", significant(1e3 * response.height_m, 4));
    let top = title(&mut svg, COLUMN, heading, &subtitle);
    let phases: Vec<Vec<Vec<(f64, f64)>>> = shown.iter().map(|p| phase_lines(p)).collect();
    let all = || phases.iter().flatten().flatten().map(|p| p.1);
    let (low, high) = (all().fold(0.0, f64::min), all().fold(0.0, f64::max));
    let middle = top + MAGNITUDE_HEIGHT + 26.0;
    let bottom = middle + PHASE_HEIGHT;
    let magnitude =
        Axis { scale: linear(0.0, 1.0, top + MAGNITUDE_HEIGHT, top), title: "Part of its greatest".to_owned() };
    let phase = Axis { scale: linear(low, high, bottom, middle), title: "Phase, degrees".to_owned() };
    let left = MARGIN + room_left(&magnitude).max(room_left(&phase));
    let right = COLUMN - MARGIN - 8.0;
    let radii = tight(1e3 * first.r_m, 1e3 * last.r_m, left, right);
    let bare = Axis { scale: radii, title: String::new() };
    let x = Axis { scale: radii, title: "Radius, mm".to_owned() };
    let upper = Frame { edge: MARGIN, left, right, top, bottom: top + MAGNITUDE_HEIGHT };
    let lower = Frame { edge: MARGIN, left, right, top: middle, bottom };
    grid(&mut svg, &upper, &bare, &magnitude);
    grid(&mut svg, &lower, &x, &phase);
    let mut entries = Vec::new();
    for ((point, stroke), phases) in shown.iter().zip(LINES).zip(&phases) {
        let on = |x: &Axis, y: &Axis, line: &[(f64, f64)]| {
            polyline(&line.iter().map(|p| (x.scale.at(p.0), y.scale.at(p.1))).collect::<Vec<_>>())
        };
        for line in magnitude_lines(point) {
            svg.path(&on(&x, &magnitude, &line), stroke);
        }
        for line in phases {
            svg.path(&on(&x, &phase, line), stroke);
        }
        entries.push((Swatch::Line(stroke), words(point)));
    }
    entries.push((Swatch::None, "Amplitudes, zero to peak; phase ahead of the coils' current.".to_owned()));
    frame(&mut svg, &upper, &bare, &magnitude);
    frame(&mut svg, &lower, &x, &phase);
    let end = key(&mut svg, left, COLUMN - MARGIN, lower.bottom + room_below() + 6.0, &entries);
    Some(Picture { name: "current_across", svg: svg.finish(end + MARGIN, heading, "Current density across the wall") })
}

/// First and last frequency and those spread evenly between.
fn chosen(points: &[FrequencyPoint]) -> Vec<&FrequencyPoint> {
    let count = points.len().min(MOST);
    (0..count).filter_map(|k| points.get(if count > 1 { k * (points.len() - 1) / (count - 1) } else { 0 })).collect()
}

fn greatest(point: &FrequencyPoint) -> f64 {
    point.across.iter().map(CurrentSample::magnitude).fold(0.0, f64::max)
}

fn words(point: &FrequencyPoint) -> String {
    let depth = point.skin_depth_m.map_or(String::new(), |d| format!(", skin depth {} mm", significant(1e3 * d, 3)));
    let densest = significant(1e-6 * greatest(point), 3);
    format!("{} Hz: at most {densest} A/mm²{depth}", significant(point.frequency_hz, 3))
}

/// Samples layer by layer, as lines.
fn layers(point: &FrequencyPoint) -> impl Iterator<Item = &[CurrentSample]> {
    point.across.chunk_by(|a, b| a.layer == b.layer)
}

fn magnitude_lines(point: &FrequencyPoint) -> Vec<Vec<(f64, f64)>> {
    let most = greatest(point);
    layers(point).map(|l| l.iter().map(|s| (1e3 * s.r_m, s.magnitude() / most)).collect()).collect()
}

/// Phases without jumps of a whole turn, where there is current enough to have one.
fn phase_lines(point: &FrequencyPoint) -> Vec<Vec<(f64, f64)>> {
    let most = greatest(point);
    let mut lines = Vec::new();
    for layer in layers(point) {
        let mut line: Vec<(f64, f64)> = Vec::new();
        for sample in layer.iter().filter(|s| s.magnitude() > FAINT * most) {
            let mut degrees = sample.phase_rad().to_degrees();
            if let Some(before) = line.last() {
                degrees += 360.0 * ((before.1 - degrees) / 360.0).round();
            }
            line.push((1e3 * sample.r_m, degrees));
        }
        lines.push(line);
    }
    lines
}

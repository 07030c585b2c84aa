//! What the wall makes of the coils' impedance over frequency.

use lenzbore_solver::outcome::{FrequencyPoint, FrequencyResponse, Outcome};

use super::axes::{Axis, Frame, frame, grid, linear, logarithmic, room_below, room_left};
use super::key::{Swatch, key, title};
use super::paper::{COLUMN, Picture};
use super::ribbon::Banded;
use super::scale::{significant, with_band};
use super::smooth::smooth;
use super::style::{CURVE, MARGIN, MARK, ORANGE};
use super::svg::{Stroke, Svg, polyline};
use super::units::Shown;

const HEIGHT: f64 = 520.0;
/// The reactance.
const REACTANCE: Stroke = Stroke::full(ORANGE, 4.5);

/// Draws resistance change and reactance over the reactance without the wall, or nothing where there are fewer than two frequencies.
#[must_use]
pub fn impedance(heading: &str, outcome: &Outcome) -> Option<Picture> {
    let response = outcome.frequency.as_ref()?;
    let (first, last) = (response.points.first()?, response.points.last()?);
    if response.points.len() < 2 {
        return None;
    }
    let mut svg = Svg::new(COLUMN);
    let top = title(&mut svg, COLUMN, heading, "Impedance over frequency, in parts of the reactance without the wall");
    let unit = Shown::prefixed("Hz", last.frequency_hz);
    let curves = [resistance(response, unit.factor), reactance(response, unit.factor)];
    let all = || curves.iter().flat_map(|c| c.y.iter().copied());
    let (low, high) = (all().fold(0.0, f64::min), all().fold(0.0, f64::max));
    let y = Axis { scale: linear(low, high, top + HEIGHT, top), title: "Resistance, reactance, parts".to_owned() };
    let area =
        Frame { edge: MARGIN, left: MARGIN + room_left(&y), right: COLUMN - MARGIN - 8.0, top, bottom: top + HEIGHT };
    let (from, to) = (first.frequency_hz * unit.factor, last.frequency_hz * unit.factor);
    let x =
        Axis { scale: logarithmic(from, to, 1.0, area.left, area.right), title: format!("Frequency, {}", unit.unit) };
    grid(&mut svg, &area, &x, &y);
    let mut entries = Vec::new();
    for (curve, stroke, name) in [
        (&curves[0], CURVE, ("resistance that the wall adds", "resistance")),
        (&curves[1], REACTANCE, ("reactance with the wall", "reactance")),
    ] {
        let line = smooth(curve, &x.scale, &y.scale);
        let points: Vec<(f64, f64)> =
            line.x.iter().zip(&line.y).map(|(a, b)| (x.scale.at(*a), y.scale.at(*b))).collect();
        svg.path(&polyline(&super::simplify::simplified(&points, 0.2)), stroke);
        for (a, b) in curve.x.iter().zip(&curve.y) {
            svg.circle((x.scale.at(*a), y.scale.at(*b)), 4.4, stroke.colour, None);
        }
        entries.push((Swatch::Line(stroke), format!("{}; {}", name.0, curve.remark_on_greatest(&y.scale, name.1))));
    }
    critical(&mut svg, (outcome, &unit), (&x, &y, &area), &mut entries);
    entries.push((
        Swatch::None,
        format!(
            "Without the wall the coils have {} H. Dots: computed frequencies.",
            significant(response.inductance_alone.value, 6)
        ),
    ));
    frame(&mut svg, &area, &x, &y);
    let end = key(&mut svg, area.left, COLUMN - MARGIN, area.bottom + room_below() + 6.0, &entries);
    Some(Picture { name: "impedance", svg: svg.finish(end + MARGIN, heading, "Impedance over frequency") })
}

/// One curve over frequency, in parts of the reactance without the wall.
fn relative(response: &FrequencyResponse, factor: f64, of: impl Fn(&FrequencyPoint, f64) -> (f64, f64)) -> Banded {
    let mut curve = Banded::default();
    for p in &response.points {
        let own = 2.0 * std::f64::consts::PI * p.frequency_hz * response.inductance_alone.value;
        let (value, band) = of(p, own);
        curve.x.push(p.frequency_hz * factor);
        curve.y.push(value / own);
        curve.band.push(band / own);
    }
    curve
}

fn resistance(response: &FrequencyResponse, factor: f64) -> Banded {
    relative(response, factor, |p, _| (p.resistance_change.value, p.resistance_change.band))
}

fn reactance(response: &FrequencyResponse, factor: f64) -> Banded {
    relative(response, factor, |p, own| (own + p.reactance_change.value, p.reactance_change.band))
}

/// Rings the greatest ratio and drops lines to both axes.
fn critical(
    svg: &mut Svg,
    (outcome, unit): (&Outcome, &Shown),
    (x, y, area): (&Axis, &Axis, &Frame),
    entries: &mut Vec<(Swatch, String)>,
) {
    let figure = |name: &str| outcome.figures.iter().find(|f| f.name == name);
    let (Some(at), Some(most)) = (figure("critical_frequency"), figure("resistance_ratio_max")) else { return };
    let place = (x.scale.at(at.value * unit.factor), y.scale.at(most.value));
    svg.line((place.0, area.bottom), place, MARK);
    svg.line((area.left, place.1), place, MARK);
    svg.circle(place, 9.0, "#ffffff", Some(Stroke::full(ORANGE, 3.4)));
    let text = format!(
        "greatest part {} at critical frequency {} Hz",
        with_band(most.value, most.band),
        with_band(at.value, at.band)
    );
    entries.push((Swatch::Ring(ORANGE), text));
}

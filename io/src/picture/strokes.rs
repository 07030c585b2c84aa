//! Damping coefficient and stiffness of strokes over frequency.

use std::f64::consts::TAU;

use lenzbore_solver::outcome::{LumpedModel, Outcome, SmallStroke};
use lenzbore_solver::problem::{Problem, Travel};

use super::axes::{Axis, Frame, frame, grid, linear, logarithmic, room_below, room_left};
use super::key::{Swatch, key, title};
use super::paper::{COLUMN, Picture};
use super::ribbon::Banded;
use super::scale::significant;
use super::smooth::smooth;
use super::style::{CURVE, MARGIN, ORANGE};
use super::svg::{Stroke, Svg, polyline};
use super::units::Shown;

const PANEL: f64 = 330.0;
const BETWEEN: f64 = 26.0;
/// The lumped model, over the line that it follows.
const MODEL: Stroke = Stroke::dashed("#e8b878", 2.2, "10 8");
/// Points of the lumped model's line.
const POINTS: u32 = 120;

/// Draws both over frequency, with the lumped model of most terms and the stroke that was asked for; nothing without them.
#[must_use]
pub fn stroke_response(heading: &str, problem: &Problem, outcome: &Outcome) -> Option<Picture> {
    let response = outcome.strokes.as_ref()?;
    let (first, last) = (response.points.first()?, response.points.last()?);
    if response.points.len() < 2 {
        return None;
    }
    let subtitle = "Damping coefficient and stiffness of small strokes over frequency";
    let mut svg = Svg::new(COLUMN);
    let top = title(&mut svg, COLUMN, heading, subtitle);
    let lower = top + PANEL + BETWEEN;
    let unit = Shown::prefixed("Hz", last.frequency_hz);
    let model = response.lumped.last();
    let (damping, stiffness) = (Part::damping(&response.points), Part::stiffness(&response.points));
    let axes = [damping.axis(top), stiffness.axis(lower)];
    let left = MARGIN + room_left(&axes[0]).max(room_left(&axes[1]));
    let right = COLUMN - MARGIN - 8.0;
    let scale = logarithmic(first.frequency_hz * unit.factor, last.frequency_hz * unit.factor, 1.0, left, right);
    let x = Axis { scale, title: format!("Frequency, {}", unit.unit) };
    let mut entries = Vec::new();
    for (part, (y, top)) in [&damping, &stiffness].into_iter().zip(axes.iter().zip([top, lower])) {
        let area = Frame { edge: MARGIN, left, right, top, bottom: top + PANEL };
        grid(&mut svg, &area, &x, y);
        let curve = Banded {
            x: response.points.iter().map(|p| p.frequency_hz * unit.factor).collect(),
            y: part.values.clone(),
            band: part.bands.clone(),
        };
        let line = smooth(&curve, &x.scale, &y.scale);
        let places: Vec<(f64, f64)> =
            line.x.iter().zip(&line.y).map(|(a, b)| (x.scale.at(*a), y.scale.at(*b))).collect();
        svg.path(&polyline(&super::simplify::simplified(&places, 0.2)), CURVE);
        if let Some(model) = model {
            svg.path(&part.line_of(model, (first, last), (&x, y), unit.factor), MODEL);
        }
        part.own(&mut svg, (problem, outcome), (&x, y), unit.factor);
        let remark = curve.remark_on_greatest(&y.scale, part.name);
        entries.push((Swatch::Line(CURVE), format!("{}, vanishing amplitude; {remark}", part.name)));
        let shown = if part.title_below { x.clone() } else { Axis { title: String::new(), ..x.clone() } };
        frame(&mut svg, &area, &shown, y);
    }
    if let Some(model) = model {
        let error = significant(100.0 * model.largest_error, 2);
        entries.push((Swatch::Line(MODEL), format!("{} lags, within {error} % of the force", model.terms.len())));
    }
    if let Travel::Sine(sine) = &problem.travel {
        let text = format!("settled stroke of {} mm amplitude", significant(1e3 * sine.amplitude_m, 4));
        entries.push((Swatch::Ring(ORANGE), text));
    }
    let end = key(&mut svg, left, COLUMN - MARGIN, lower + PANEL + room_below() + 6.0, &entries);
    Some(Picture { name: "stroke_response", svg: svg.finish(end + MARGIN, heading, subtitle) })
}

/// One of the two panels, in its unit.
struct Part {
    name: &'static str,
    /// Name of the settled stroke's figure.
    figure: &'static str,
    unit: Shown,
    values: Vec<f64>,
    bands: Vec<f64>,
    title_below: bool,
    /// From c(omega) = re + i im and omega.
    of_model: fn(f64, f64, f64) -> f64,
}

impl Part {
    fn damping(points: &[SmallStroke]) -> Self {
        let unit = Shown { unit: "N s/m".into(), factor: 1.0 };
        Self {
            name: "damping coefficient",
            figure: "damping_coefficient_equivalent",
            values: points.iter().map(|p| p.damping).collect(),
            bands: points.iter().map(|p| p.damping_band).collect(),
            title_below: false,
            of_model: |re, _, _| re,
            unit,
        }
    }

    fn stiffness(points: &[SmallStroke]) -> Self {
        let most = points.iter().map(|p| p.stiffness.abs()).fold(0.0, f64::max);
        let unit = Shown::prefixed("N/m", most);
        Self {
            name: "stiffness",
            figure: "stiffness",
            values: points.iter().map(|p| p.stiffness * unit.factor).collect(),
            bands: points.iter().map(|p| p.stiffness_band * unit.factor).collect(),
            title_below: true,
            of_model: |_, im, omega| -omega * im,
            unit,
        }
    }

    fn axis(&self, top: f64) -> Axis {
        let low = self.values.iter().copied().fold(0.0, f64::min);
        let high = self.values.iter().copied().fold(0.0, f64::max);
        let name = if self.title_below { "Stiffness" } else { "Damping coefficient" };
        Axis { scale: linear(low, high, top + PANEL, top), title: format!("{name}, {}", self.unit.unit) }
    }

    fn line_of(
        &self,
        model: &LumpedModel,
        (first, last): (&SmallStroke, &SmallStroke),
        (x, y): (&Axis, &Axis),
        factor: f64,
    ) -> String {
        let ratio = last.frequency_hz / first.frequency_hz;
        let places = (0..=POINTS).map(|k| {
            let frequency = first.frequency_hz * ratio.powf(f64::from(k) / f64::from(POINTS));
            let omega = TAU * frequency;
            let (mut re, mut im) = (0.0, 0.0);
            for term in &model.terms {
                let t = omega * term.lag_s;
                re += term.damping_n_s_per_m / (1.0 + t * t);
                im -= term.damping_n_s_per_m * t / (1.0 + t * t);
            }
            let value = self.unit.factor * (self.of_model)(re, im, omega);
            (x.scale.at((frequency * factor).clamp(x.scale.low, x.scale.high)), y.scale.at(value.min(y.scale.high)))
        });
        polyline(&places.collect::<Vec<_>>())
    }

    /// Rings the settled stroke.
    fn own(&self, svg: &mut Svg, (problem, outcome): (&Problem, &Outcome), (x, y): (&Axis, &Axis), factor: f64) {
        let (Travel::Sine(sine), Some(figure)) =
            (&problem.travel, outcome.figures.iter().find(|f| f.name == self.figure))
        else {
            return;
        };
        let (along, up) = (sine.frequency_hz * factor, figure.value * self.unit.factor);
        if x.scale.holds(along) && y.scale.holds(up) {
            svg.circle((x.scale.at(along), y.scale.at(up)), 9.0, "#ffffff", Some(Stroke::full(ORANGE, 3.4)));
        }
    }
}

//! A repeated event stop by stop: temperatures of the wall above, greatest drag below.

use lenzbore_solver::outcome::{DutyOutcome, DutyStop, Outcome};

use super::axes::{Axis, Frame, frame, grid, linear, room_below, room_left};
use super::key::{Swatch, key, title};
use super::paper::{COLUMN, Picture};
use super::scale::significant;
use super::style::{CURVE, LAW, MARGIN, ORANGE};
use super::svg::{Stroke, Svg, polyline};

const PANEL: f64 = 330.0;
const BETWEEN: f64 = 26.0;
const CELSIUS_ZERO_K: f64 = 273.15;
const HOTTEST: Stroke = Stroke::full(ORANGE, 3.6);

/// A line of a panel.
struct Line {
    stroke: Stroke,
    of: fn(&DutyStop) -> f64,
}

/// The lines of the upper panel, degC.
const WARMTH: [Line; 3] = [
    Line { stroke: HOTTEST, of: |s| s.temperature_peak_k - CELSIUS_ZERO_K },
    Line { stroke: CURVE, of: |s| s.temperature_mean_k - CELSIUS_ZERO_K },
    Line { stroke: LAW, of: |s| s.temperature_before_k - CELSIUS_ZERO_K },
];
/// The line of the lower panel, N.
const DRAG: [Line; 1] = [Line { stroke: CURVE, of: |s| s.drag_peak_newton }];

/// Draws it; nothing without a duty of two stops or more.
#[must_use]
pub fn duty(heading: &str, outcome: &Outcome) -> Option<Picture> {
    let duty = outcome.thermal.as_ref()?.duty.as_ref()?;
    if duty.stops.len() < 2 {
        return None;
    }
    let subtitle = "Temperature of the wall and greatest drag, stop by stop";
    let mut svg = Svg::new(COLUMN);
    let top = title(&mut svg, COLUMN, heading, subtitle);
    let lower = top + PANEL + BETWEEN;
    let axes = [
        axis(&duty.stops, &WARMTH, "Temperature, °C", false, top),
        axis(&duty.stops, &DRAG, "Greatest drag, N", true, lower),
    ];
    let left = MARGIN + room_left(&axes[0]).max(room_left(&axes[1]));
    let right = COLUMN - MARGIN - 8.0;
    let last = duty.stops[duty.stops.len() - 1].number;
    let x = Axis { scale: linear(0.0, last, left, right), title: "Stop".to_owned() };
    for (y, (lines, top, titled)) in axes.iter().zip([(&WARMTH[..], top, false), (&DRAG[..], lower, true)]) {
        let area = Frame { edge: MARGIN, left, right, top, bottom: top + PANEL };
        grid(&mut svg, &area, &x, y);
        for line in lines {
            let place = |s: &DutyStop| (x.scale.at(s.number), y.scale.at((line.of)(s)));
            let places: Vec<(f64, f64)> = duty.stops.iter().map(place).collect();
            svg.path(&polyline(&super::simplify::simplified(&places, 0.2)), line.stroke);
        }
        let shown = if titled { x.clone() } else { Axis { title: String::new(), ..x.clone() } };
        frame(&mut svg, &area, &shown, y);
    }
    let end = key(&mut svg, left, COLUMN - MARGIN, lower + PANEL + room_below() + 6.0, &entries(duty));
    Some(Picture { name: "duty", svg: svg.finish(end + MARGIN, heading, subtitle) })
}

/// An axis that holds all lines; from zero up where `from_zero`.
fn axis(stops: &[DutyStop], lines: &[Line], title: &str, from_zero: bool, top: f64) -> Axis {
    let values = || lines.iter().flat_map(|l| stops.iter().map(l.of));
    let low = if from_zero { 0.0 } else { values().fold(f64::INFINITY, f64::min) };
    let high = values().fold(f64::NEG_INFINITY, f64::max);
    // A wall that hardly warms still has an axis.
    let room = (high - low).max(0.01);
    Axis { scale: linear(low, low + 1.05 * room, top + PANEL, top), title: title.to_owned() }
}

fn entries(duty: &DutyOutcome) -> Vec<(Swatch, String)> {
    let (first, last) = (&duty.stops[0], &duty.stops[duty.stops.len() - 1]);
    let state = if duty.settled { "settled" } else { "not settled" };
    let hottest = significant(last.temperature_peak_k - CELSIUS_ZERO_K, 3);
    let fade = significant(100.0 * (1.0 - last.drag_peak_newton / first.drag_peak_newton), 2);
    vec![
        (Swatch::Line(HOTTEST), format!("hottest point right after a stop; last {hottest} °C, {state}")),
        (Swatch::Line(CURVE), "mean of the wall right after a stop".to_owned()),
        (Swatch::Line(LAW), "where the heat falls, before a stop".to_owned()),
        (Swatch::None, format!("the last stop's drag is {fade} % lower than the first's")),
    ]
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use super::*;
    use crate::picture::look::{has_non_numbers, keep, words};
    use crate::result::demo;

    #[test]
    fn a_duty_is_drawn_and_one_stop_is_not() {
        let mut outcome = demo::duty().1;
        let picture = duty("Brake", &outcome).unwrap();
        keep(&picture);
        assert!(!has_non_numbers(&picture));
        let words = words(&picture);
        assert!(words.contains("Temperature, °C") && words.contains("Greatest drag, N"), "{words}");
        outcome.thermal.as_mut().unwrap().duty.as_mut().unwrap().stops.truncate(1);
        assert!(duty("Brake", &outcome).is_none());
    }
}

//! Band against true error of many drawn cases: a point above the diagonal is a band that holds the truth.

use super::{framed, positive_range};
use crate::picture::axes::{Axis, frame, grid, logarithmic, room_below};
use crate::picture::key::{Swatch, key, title};
use crate::picture::paper::{COLUMN, Picture};
use crate::picture::style::{BLUE, LAW, MARGIN, MARK, ORANGE};
use crate::picture::svg::{Stroke, Svg};

/// One case, both relative to the figure.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct CoveragePoint {
    /// True error, not negative.
    pub error: f64,
    /// Half-width of the band.
    pub band: f64,
    /// Whether the band holds the truth.
    pub holds: bool,
}

const DIAGONAL: Stroke = Stroke::full("#444444", 2.6);

/// Draws the cases with the medians of both; `None` without a positive band.
#[must_use]
pub fn coverage(heading: &str, verdict: &str, points: &[CoveragePoint], medians: (f64, f64)) -> Option<Picture> {
    if !points.iter().any(|p| p.band > 0.0) {
        return None;
    }
    let (left, right) = positive_range(points.iter().map(|p| p.error));
    let (low, high) = positive_range(points.iter().map(|p| p.band));
    let mut svg = Svg::new(COLUMN);
    let top = title(&mut svg, COLUMN, heading, verdict);
    let x = Axis { scale: logarithmic(left, right, 1.6, 0.0, 1.0), title: "True error over the figure".to_owned() };
    let y = Axis { scale: logarithmic(low, high, 1.6, 0.0, 1.0), title: "Band over the figure".to_owned() };
    let (area, x, y) = framed(top, x, y);
    grid(&mut svg, &area, &x, &y);
    let place = |error: f64, band: f64| (x.scale.at(error.max(x.scale.low)), y.scale.at(band.max(y.scale.low)));
    for (factor, stroke) in [(1.0, DIAGONAL), (30.0, LAW)] {
        let from = x.scale.low.max(y.scale.low / factor);
        let to = x.scale.high.min(y.scale.high / factor);
        if to > from {
            svg.line(place(from, factor * from), place(to, factor * to), stroke);
        }
    }
    for (value, upright) in [(medians.0, true), (medians.1, false)] {
        let at = place(value, value);
        match upright {
            true if x.scale.holds(value) => svg.line((at.0, area.top), (at.0, area.bottom), MARK),
            false if y.scale.holds(value) => svg.line((area.left, at.1), (area.right, at.1), MARK),
            _ => {}
        }
    }
    for point in points {
        let at = place(point.error, point.band);
        match point.holds {
            true => svg.circle(at, 4.4, BLUE, None),
            false => svg.circle(at, 7.0, "#ffffff", Some(Stroke::full(ORANGE, 3.2))),
        }
    }
    frame(&mut svg, &area, &x, &y);
    let missed = points.iter().filter(|p| !p.holds).count();
    let entries = [
        (Swatch::Dot(BLUE), format!("the band holds the truth: {} cases", points.len() - missed)),
        (Swatch::Ring(ORANGE), format!("it misses it: {missed}")),
        (Swatch::Line(DIAGONAL), "band = error".to_owned()),
        (Swatch::Line(LAW), "band = 30 times the error".to_owned()),
        (Swatch::Line(MARK), "medians of error and band".to_owned()),
    ];
    let end = key(&mut svg, area.left, COLUMN - MARGIN, area.bottom + room_below() + 6.0, &entries);
    Some(Picture { name: "coverage", svg: svg.finish(end + MARGIN, heading, "Band against true error") })
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use super::*;
    use crate::picture::look;

    #[test]
    fn every_case_is_a_point() {
        let case = |i: i32| {
            let error = 10.0_f64.powf(-9.0 + 0.1 * f64::from(i));
            let band = error * 10.0_f64.powf(1.0 + 1.2 * (1.7 * f64::from(i)).sin());
            CoveragePoint { error, band, holds: band >= error }
        };
        let mut points: Vec<CoveragePoint> = (0..40).map(case).collect();
        points.push(CoveragePoint { error: 0.0, band: 1e-7, holds: true });
        let picture = coverage("Coverage of the bands", "41 drawn cases", &points, (1e-7, 1e-6)).unwrap();
        look::keep(&picture);
        assert_eq!(picture.svg.matches("<circle").count(), 41 + 2);
        assert!(!look::has_non_numbers(&picture));
        assert_eq!(coverage("x", "x", &[], (1.0, 1.0)), None);
    }
}

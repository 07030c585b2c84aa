//! Error against cell size, both logarithmic, beside the slopes of first and second order.

use super::{framed, positive_range};
use crate::picture::axes::{Axis, frame, grid, logarithmic, room_below};
use crate::picture::key::{Swatch, key, title};
use crate::picture::paper::{COLUMN, Picture};
use crate::picture::style::{BLUE, LAW, MARGIN, MARK, ORANGE};
use crate::picture::svg::{Stroke, Svg, polyline};

/// Errors of one way of laying out the same body.
#[derive(Debug, Clone, PartialEq)]
pub struct ConvergenceLine {
    /// What it is, with its order.
    pub name: String,
    /// Cell size and error, both positive.
    pub points: Vec<(f64, f64)>,
}

/// Draws up to two lines of errors; `None` where none has two points.
#[must_use]
pub fn convergence(heading: &str, subtitle: &str, x_title: &str, lines: &[ConvergenceLine]) -> Option<Picture> {
    if !lines.iter().any(|l| l.points.len() > 1) {
        return None;
    }
    let all = || lines.iter().flat_map(|l| l.points.iter().copied());
    let (left, right) = positive_range(all().map(|p| p.0));
    let (low, high) = positive_range(all().map(|p| p.1));
    let mut svg = Svg::new(COLUMN);
    let top = title(&mut svg, COLUMN, heading, subtitle);
    let x = Axis { scale: logarithmic(left, right, 1.15, 0.0, 1.0), title: x_title.to_owned() };
    let y = Axis { scale: logarithmic(low, high, 2.0, 0.0, 1.0), title: "Error over the applied field".to_owned() };
    let (area, x, y) = framed(top, x, y);
    grid(&mut svg, &area, &x, &y);
    let at = |(h, e): (f64, f64)| (x.scale.at(h), y.scale.at(e));
    for (order, stroke) in [(1.0, MARK), (2.0, LAW)] {
        // Through the upper right corner of the errors.
        let start = left.max(right * (y.scale.low / (1.5 * high)).powf(1.0 / order));
        svg.line(at((right, 1.5 * high)), at((start, 1.5 * high * (start / right).powf(order))), stroke);
    }
    let mut entries = Vec::new();
    for (line, colour) in lines.iter().zip([BLUE, ORANGE]) {
        let stroke = Stroke::full(colour, 3.2);
        let points: Vec<(f64, f64)> = line.points.iter().copied().map(at).collect();
        svg.path(&polyline(&points), stroke);
        for point in points {
            svg.circle(point, 6.0, colour, None);
        }
        entries.push((Swatch::Line(stroke), line.name.clone()));
    }
    entries.push((Swatch::Line(MARK), "first order".to_owned()));
    entries.push((Swatch::Line(LAW), "second order".to_owned()));
    frame(&mut svg, &area, &x, &y);
    let end = key(&mut svg, area.left, COLUMN - MARGIN, area.bottom + room_below() + 6.0, &entries);
    Some(Picture { name: "convergence", svg: svg.finish(end + MARGIN, heading, "Error against cell size") })
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use super::*;
    use crate::picture::look;

    #[test]
    fn lines_and_slopes_are_there() {
        let line = |name: &str, order: f64| ConvergenceLine {
            name: name.to_owned(),
            points: [0.25, 0.125, 0.1].map(|h: f64| (h, 0.03 * h.powf(order))).to_vec(),
        };
        let lines = [line("steps, order 1.4", 1.4), line("shares, order 2.0", 2.0)];
        let picture = convergence("Hollow sphere", "Curved rim", "Cell over thickness", &lines).unwrap();
        look::keep(&picture);
        assert_eq!(picture.svg.matches("<circle").count(), 6);
        assert!(look::words(&picture).contains("shares, order 2.0"));
        assert!(!look::has_non_numbers(&picture));
        assert_eq!(convergence("x", "x", "x", &[]), None);
    }
}

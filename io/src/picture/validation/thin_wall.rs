//! The universal curve of a dipole in a thin wall, with the points of its reference.

use super::framed;
use crate::picture::axes::{Axis, frame, grid, logarithmic, room_below};
use crate::picture::key::{Swatch, key, title};
use crate::picture::paper::{COLUMN, Picture};
use crate::picture::scale::significant;
use crate::picture::style::{CURVE, LAW, MARGIN, ORANGE};
use crate::picture::svg::{Stroke, Svg, polyline};

/// Draws f = drag a^4/(mu0 m^2) against V = mu0 sigma w v: the field solver's `curve`, the reference's `points`, the law of low
/// speed f = `slope` V and the reference's greatest drag. All values positive; `None` without a curve.
#[must_use]
pub fn thin_wall(
    heading: &str,
    curve: &[(f64, f64)],
    points: &[(f64, f64)],
    slope: f64,
    greatest: (f64, f64),
) -> Option<Picture> {
    let (first, last) = (curve.first()?, curve.last()?);
    let fs = || curve.iter().chain(points).map(|(_, f)| *f);
    let (low, high) = (fs().fold(f64::INFINITY, f64::min), fs().fold(0.0, f64::max));
    let mut svg = Svg::new(COLUMN);
    let top = title(&mut svg, COLUMN, heading, "Dipole on the axis of a thin wall: drag against speed");
    let x = Axis { scale: logarithmic(first.0, last.0, 1.0, 0.0, 1.0), title: "V = μ_{0} σ w v".to_owned() };
    let y = Axis { scale: logarithmic(low, high, 1.6, 0.0, 1.0), title: "Drag · a^{4} / (μ_{0} m^{2})".to_owned() };
    let (area, x, y) = framed(top, x, y);
    grid(&mut svg, &area, &x, &y);
    let at = |(v, f): (f64, f64)| (x.scale.at(v), y.scale.at(f));
    let end = last.0.min(y.scale.high / slope);
    svg.line(at((first.0, slope * first.0)), at((end, slope * end)), LAW);
    svg.path(&polyline(&curve.iter().copied().map(at).collect::<Vec<_>>()), CURVE);
    for point in points {
        svg.circle(at(*point), 7.0, "#ffffff", Some(Stroke::full(ORANGE, 3.0)));
    }
    frame(&mut svg, &area, &x, &y);
    let (v, f) = (significant(greatest.0, 5), significant(greatest.1, 6));
    let entries = [
        (Swatch::Line(CURVE), "field solver".to_owned()),
        (Swatch::Ring(ORANGE), format!("reference; greatest drag {f} at V = {v}")),
        (Swatch::Line(LAW), "law of low speed, 45 V / 1024".to_owned()),
    ];
    let end = key(&mut svg, area.left, COLUMN - MARGIN, area.bottom + room_below() + 6.0, &entries);
    Some(Picture { name: "thin_wall", svg: svg.finish(end + MARGIN, heading, "Universal curve of a thin wall") })
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use super::*;
    use crate::picture::look;

    #[test]
    fn curve_points_and_law_are_there() {
        let f = |v: f64| 0.044 * v / (1.0 + (v / 2.7).powi(2));
        let curve: Vec<(f64, f64)> =
            (0..=40).map(|i| 0.01 * 10.0_f64.powf(0.1 * f64::from(i))).map(|v| (v, f(v))).collect();
        let points = [0.1, 1.0, 2.7, 10.0].map(|v| (v, f(v)));
        let picture = thin_wall("Published checks", &curve, &points, 0.044, (2.7, 0.0594)).unwrap();
        look::keep(&picture);
        assert_eq!(picture.svg.matches("<circle").count(), 5);
        assert!(look::words(&picture).contains("greatest drag 0.0594"));
        assert!(!look::has_non_numbers(&picture));
        assert_eq!(thin_wall("x", &[], &points, 0.044, (2.7, 0.0594)), None);
    }
}

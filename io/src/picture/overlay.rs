//! The table laid over our solution.

use super::axes::{Axis, Frame, frame, grid, room_below, room_left};
use super::compared::{ComparedPlot, PlotPanel, bar, capital, kept, mark, y_axis};
use super::key::{Swatch, key, title};
use super::paper::{COLUMN, Picture};
use super::ribbon::FILL;
use super::scale::Kind;
use super::style::{BLUE, MARGIN, ORANGE};
use super::svg::{Stroke, Svg, polygon, polyline};
use super::units::Shown;

const HEIGHT: f64 = 430.0;
/// Columns drawn at most.
const MOST_PANELS: usize = 6;
const OURS: Stroke = Stroke::full("#3c3c3c", 4.0);
const BAR: Stroke = Stroke::full("#555555", 2.2);

/// Draws the table's values over ours, one panel a column; nothing where there is no point.
#[must_use]
pub fn overlay(plot: &ComparedPlot) -> Option<Picture> {
    plot.all().next()?;
    let mut svg = Svg::new(COLUMN);
    let mut top = title(&mut svg, COLUMN, &plot.heading, "The table over the field solution");
    let shown = plot.x_shown();
    for panel in plot.panels.iter().take(MOST_PANELS).filter(|p| p.curves.iter().any(|c| !c.points.is_empty())) {
        top = draw(&mut svg, plot, panel, &shown, top);
    }
    let entries = [
        (Swatch::Line(OURS), "field solution, with its uncertainty shaded (95 %)".to_owned()),
        (Swatch::Patch(BLUE), "table: passes (dots)".to_owned()),
        (Swatch::Ring("#7a7a7a"), "undecided (rings)".to_owned()),
        (Swatch::Patch(ORANGE), "falls short (squares)".to_owned()),
        (Swatch::None, format!("Verdict: {}. Bars: uncertainty of the table, 95 %.", plot.verdict)),
    ];
    let end = key(&mut svg, MARGIN, COLUMN - MARGIN, top, &entries);
    Some(Picture { name: "overlay", svg: svg.finish(end + MARGIN, &plot.heading, "A table over the field solution") })
}

fn draw(svg: &mut Svg, plot: &ComparedPlot, panel: &PlotPanel, x_shown: &Shown, top: f64) -> f64 {
    let points = || panel.curves.iter().flat_map(|c| &c.points);
    let largest = points().map(|p| p.ours.abs().max(p.table.abs())).fold(0.0, f64::max);
    let y_shown = match panel.unit {
        "m" => Shown::length(largest),
        "m/s" => Shown::speed(largest),
        "A/m2" => Shown::current_density(largest),
        "1" => Shown { unit: String::new(), factor: 1.0 },
        unit => Shown::prefixed(unit, largest),
    };
    let f = y_shown.factor;
    let values: Vec<f64> = points()
        .flat_map(|p| [p.table - p.table_half, p.table + p.table_half, p.ours - p.ours_half, p.ours + p.ours_half])
        .map(|v| f * v)
        .collect();
    let (start, end) = (top + HEIGHT, top);
    let probe = Frame { edge: MARGIN, left: MARGIN, right: COLUMN - MARGIN - 8.0, top, bottom: start };
    let log = plot.x_axis(x_shown, &probe).scale.kind == Kind::Log;
    let y_title = if y_shown.unit.is_empty() {
        capital(&panel.name)
    } else {
        format!("{}, {}", capital(&panel.name), y_shown.unit)
    };
    let y = Axis { scale: y_axis(&values, log, start, end), title: y_title };
    let area = Frame { left: MARGIN + room_left(&y), ..probe };
    let x = plot.x_axis(x_shown, &area);
    grid(svg, &area, &x, &y);
    let at = |px: f64, py: f64| (x.scale.at(px * x_shown.factor), y.scale.at(kept(&y.scale, f * py)));
    for curve in &panel.curves {
        let edge = |sign: f64| curve.points.iter().map(move |p| (p.x, p.ours + sign * p.ours_half));
        let mut outline: Vec<(f64, f64)> = edge(1.0).map(|(a, b)| at(a, b)).collect();
        outline.extend(edge(-1.0).map(|(a, b)| at(a, b)).collect::<Vec<_>>().into_iter().rev());
        if curve.points.len() > 1 && !plot.x_unit.is_empty() {
            svg.area(&polygon(&outline), FILL, 1.0, None);
            let line: Vec<(f64, f64)> = curve.points.iter().map(|p| at(p.x, p.ours)).collect();
            svg.path(&polyline(&line), OURS);
        } else {
            for p in &curve.points {
                let (px, py) = at(p.x, p.ours);
                svg.line((px - 16.0, py), (px + 16.0, py), OURS);
            }
        }
    }
    for p in points() {
        let place = at(p.x, p.table);
        bar(svg, place.0, &y.scale, (f * (p.table - p.table_half), f * (p.table + p.table_half)), BAR);
        mark(svg, place, p.verdict);
    }
    frame(svg, &area, &x, &y);
    area.bottom + room_below() + 14.0
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use super::*;
    use crate::picture::look;
    use crate::result::demo;

    #[test]
    fn it_shows_both_and_the_verdict() {
        let picture = overlay(&demo::compared()).unwrap();
        look::keep(&picture);
        let text = look::words(&picture);
        assert!(
            text.contains("Speed, m/s") && text.contains("Drag, N") && text.contains("Verdict: falls short"),
            "{text}"
        );
        assert!(!look::has_non_numbers(&picture));
    }

    #[test]
    fn nothing_gives_no_picture() {
        let mut plot = demo::compared();
        plot.panels.clear();
        assert!(overlay(&plot).is_none());
    }
}

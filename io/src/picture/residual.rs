//! The differences between table and solution, with what is allowed.

use super::axes::{Axis, Frame, frame, grid, room_below, room_left};
use super::compared::{ComparedPlot, PlotPanel, bar, capital, colour, kept, mark, y_axis};
use super::key::{Swatch, key, title};
use super::paper::{COLUMN, Picture};
use super::scale::significant;
use super::style::{BLUE, MARGIN, ORANGE, SMALL, letters};
use super::svg::{Anchor, Stroke, Svg, Type, polygon};
use super::units::Shown;

const HEIGHT: f64 = 360.0;
const MOST_PANELS: usize = 6;
const ZERO: Stroke = Stroke::full("#444444", 2.2);
/// Where differences run beyond so many times what is allowed, the axis is cut so that what is allowed can be seen.
const CUT_FROM: f64 = 15.0;
/// It is cut here, times what is allowed; points beyond stand at the edge with their number.
const CUT_AT: f64 = 6.0;
/// Ground of what is allowed.
const ALLOWED: &str = "#e3eedd";

/// Draws (table - ours) in per cent with the validation uncertainty, on the ground of what is allowed.
#[must_use]
pub fn residual(plot: &ComparedPlot) -> Option<Picture> {
    plot.all().next()?;
    let mut svg = Svg::new(COLUMN);
    let mut top = title(&mut svg, COLUMN, &plot.heading, "Table less field solution");
    let shown = plot.x_shown();
    for panel in plot.panels.iter().take(MOST_PANELS).filter(|p| p.curves.iter().any(|c| !c.points.is_empty())) {
        top = draw(&mut svg, plot, panel, &shown, top);
    }
    let entries = [
        (Swatch::Patch(ALLOWED), "allowed".to_owned()),
        (Swatch::Patch(BLUE), "passes (dots)".to_owned()),
        (Swatch::Ring("#7a7a7a"), "undecided (rings)".to_owned()),
        (Swatch::Patch(ORANGE), "falls short (squares)".to_owned()),
        (Swatch::None, format!("Verdict: {}. Bars: validation uncertainty, 95 %.", plot.verdict)),
    ];
    let end = key(&mut svg, MARGIN, COLUMN - MARGIN, top, &entries);
    let svg = svg.finish(end + MARGIN, &plot.heading, "Differences between a table and the field solution");
    Some(Picture { name: "residual", svg })
}

fn draw(svg: &mut Svg, plot: &ComparedPlot, panel: &PlotPanel, x_shown: &Shown, top: f64) -> f64 {
    let points = || panel.curves.iter().flat_map(|c| &c.points);
    let per_cent = |x: f64| 100.0 * x;
    // What is allowed is always in sight; where every difference is small, a little beyond it.
    let mut values: Vec<f64> =
        points().flat_map(|p| [p.share - p.share_half, p.share + p.share_half, 0.0]).map(per_cent).collect();
    let allowed = points().map(|p| per_cent(p.share_allowed)).fold(0.0, f64::max);
    values.extend([if plot.judged.1 { -1.2 * allowed } else { 0.0 }, if plot.judged.0 { 1.2 * allowed } else { 0.0 }]);
    let reach = values.iter().fold(0.0, |m: f64, v| m.max(v.abs()));
    if allowed > 0.0 && reach > CUT_FROM * allowed {
        values.iter_mut().for_each(|v| *v = v.clamp(-CUT_AT * allowed, CUT_AT * allowed));
    }
    let (start, end) = (top + HEIGHT, top);
    let y =
        Axis { scale: y_axis(&values, false, start, end), title: format!("{}, difference in %", capital(&panel.name)) };
    let area = Frame { edge: MARGIN, left: MARGIN + room_left(&y), right: COLUMN - MARGIN - 8.0, top, bottom: start };
    let x = plot.x_axis(x_shown, &area);
    ground(svg, plot, panel, x_shown, (&x, &y), &area);
    grid(svg, &area, &x, &y);
    svg.line((area.left, y.scale.at(0.0)), (area.right, y.scale.at(0.0)), ZERO);
    for p in points() {
        let place = (x.scale.at(p.x * x_shown.factor), y.scale.at(kept(&y.scale, per_cent(p.share))));
        let ends = (per_cent(p.share - p.share_half), per_cent(p.share + p.share_half));
        bar(svg, place.0, &y.scale, ends, Stroke::full(colour(p.verdict), 2.4));
        mark(svg, place, p.verdict);
        if !y.scale.holds(per_cent(p.share)) {
            beyond(svg, &area, place, per_cent(p.share));
        }
    }
    frame(svg, &area, &x, &y);
    area.bottom + room_below() + 14.0
}

/// The number of a point that stands at the edge because it lies beyond.
fn beyond(svg: &mut Svg, area: &Frame, place: (f64, f64), per_cent: f64) {
    let right = place.0 > 0.5 * (area.left + area.right);
    let (anchor, aside) = if right { (Anchor::End, -13.0) } else { (Anchor::Start, 13.0) };
    let down = if per_cent > 0.0 { 26.0 } else { -10.0 };
    let text = format!("{} %", significant(per_cent, 3));
    svg.text(place.0 + aside, place.1 + down, &text, Type { rim: "#ffffff", ..letters(SMALL, anchor) });
}

/// Shades what is allowed; a side that is not judged is allowed without end.
fn ground(
    svg: &mut Svg,
    plot: &ComparedPlot,
    panel: &PlotPanel,
    x_shown: &Shown,
    (x, y): (&Axis, &Axis),
    area: &Frame,
) {
    let mut all: Vec<(f64, f64)> = panel
        .curves
        .iter()
        .flat_map(|c| &c.points)
        .map(|p| (x.scale.at(p.x * x_shown.factor), 100.0 * p.share_allowed))
        .collect();
    all.sort_by(|a, b| a.0.total_cmp(&b.0));
    let (Some(first), Some(last)) = (all.first().copied(), all.last().copied()) else { return };
    let along: Vec<(f64, f64)> = [(area.left, first.1)].into_iter().chain(all).chain([(area.right, last.1)]).collect();
    let place = |value: f64| y.scale.at(kept(&y.scale, value));
    let upper = along.iter().map(|(px, a)| (*px, if plot.judged.0 { place(*a) } else { area.top }));
    let lower = along.iter().rev().map(|(px, a)| (*px, if plot.judged.1 { place(-a) } else { area.bottom }));
    svg.area(&polygon(&upper.chain(lower).collect::<Vec<_>>()), ALLOWED, 1.0, None);
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use super::*;
    use crate::picture::look;
    use crate::result::demo;

    #[test]
    fn it_shows_what_is_allowed() {
        let mut plot = demo::compared();
        let picture = residual(&plot).unwrap();
        look::keep(&picture);
        let text = look::words(&picture);
        assert!(text.contains("Drag, difference in %") && text.contains("allowed"), "{text}");
        assert!(!look::has_non_numbers(&picture));
        plot.judged = (true, false);
        let mut one_sided = residual(&plot).unwrap();
        one_sided.name = "residual_one_sided";
        look::keep(&one_sided);
        assert_ne!(one_sided.svg, picture.svg);
        // One point far beyond cuts the axis and shows its number.
        plot.panels[0].curves[0].points[6].share = 3.42;
        let mut cut = residual(&plot).unwrap();
        cut.name = "residual_cut";
        look::keep(&cut);
        assert!(look::words(&cut).contains("342 %"), "{}", look::words(&cut));
    }

    #[test]
    fn single_points_are_drawn_too() {
        let mut plot = demo::compared();
        plot.panels[0].curves[0].points.truncate(1);
        for x_unit in ["", "m/s", "s"] {
            plot.x_unit = x_unit;
            let pictures = [residual(&plot).unwrap(), crate::picture::overlay(&plot).unwrap()];
            assert!(pictures.iter().all(|p| !look::has_non_numbers(p)));
        }
    }
}

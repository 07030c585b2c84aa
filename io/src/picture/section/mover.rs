//! The mover in section: magnets with their poles, coils, the arrow of its motion.

use lenzbore_solver::problem::{Part, Problem};
use lenzbore_solver::sources::Source;

use super::dimension::arrow_head;
use super::view::{Body, View};
use crate::picture::letters::{CAPITAL, width};
use crate::picture::scale::significant;
use crate::picture::style::{SMALL, letters};
use crate::picture::svg::{Anchor, Stroke, Svg, Type};
use crate::picture::units::Shown;

const EDGE: Stroke = Stroke::full("#222222", 3.0);
/// Letters smaller than this (0.1 mm at column width, 4 points) are left out.
const LEAST: f64 = 14.0;
const MAGNET: &str = "#dcdfe3";
const COPPER: &str = "#f0d9c4";

/// The bodies, to lie under the flux lines.
pub(super) fn bodies(svg: &mut Svg, problem: &Problem, view: &View, position: f64) {
    for part in &problem.mover.parts {
        let fill = if matches!(part.source, Source::Coil { .. }) { COPPER } else { MAGNET };
        for rectangle in rectangles(part, view, position) {
            svg.rectangle(rectangle[0], rectangle[1], rectangle[2], rectangle[3], fill, None);
        }
    }
}

/// Edges and signs, to lie on the flux lines.
pub(super) fn signs(svg: &mut Svg, problem: &Problem, view: &View, position: f64) {
    for part in &problem.mover.parts {
        for [x0, y0, x1, y1] in rectangles(part, view, position) {
            svg.rectangle(x0, y0, x1, y1, "none", Some(EDGE));
        }
        match part.source {
            Source::Magnet { remanence_tesla, .. } => poles(svg, part, view, position, remanence_tesla > 0.0),
            Source::Coil { ampere_turns, .. } => windings(svg, part, view, position, ampere_turns > 0.0),
            Source::Dipole { moment_a_m2 } => point(svg, view, position + part.centre_m, moment_a_m2 > 0.0),
        }
    }
}

/// Both halves of a ring, or the whole of a cylinder: left, top, right, bottom.
fn rectangles(part: &Part, view: &View, position: f64) -> Vec<[f64; 4]> {
    let body = &part.outline;
    if body.outer_radius_m <= 0.0 || body.length_m <= 0.0 {
        return Vec::new();
    }
    let middle = position + part.centre_m;
    let (top, bottom) = (view.y(middle + 0.5 * body.length_m), view.y(middle - 0.5 * body.length_m));
    let (inner, outer) = (body.inner_radius_m, body.outer_radius_m);
    if inner <= 0.0 {
        return vec![[view.x(-outer), top, view.x(outer), bottom]];
    }
    vec![[view.x(inner), top, view.x(outer), bottom], [view.x(-outer), top, view.x(-inner), bottom]]
}

/// N and S on both halves, as large as the body allows.
fn poles(svg: &mut Svg, part: &Part, view: &View, position: f64, north_up: bool) {
    let body = &part.outline;
    let (wide, high) = (view.scale * (body.outer_radius_m - body.inner_radius_m), view.scale * body.length_m);
    let size = (0.30 * high).min(0.62 * wide).min(34.0);
    if size < LEAST {
        return;
    }
    let r = 0.5 * (body.inner_radius_m + body.outer_radius_m);
    let inset = 0.5 * body.length_m - (0.5 * CAPITAL * size + (0.07 * high).max(4.0)) / view.scale;
    let kind = Type { bold: true, rim: MAGNET, ..letters(size, Anchor::Middle) };
    for side in [1.0, -1.0] {
        for (end, upper) in [(1.0, true), (-1.0, false)] {
            let letter = if upper == north_up { "N" } else { "S" };
            let y = view.y(position + part.centre_m + end * inset) + 0.5 * CAPITAL * size;
            svg.text(view.x(side * r), y, letter, kind);
        }
    }
}

/// The sense of the current in a coil: a cross where it runs into the page, a dot where it comes out.
fn windings(svg: &mut Svg, part: &Part, view: &View, position: f64, moment_up: bool) {
    let body = &part.outline;
    let r = 0.5 * (body.inner_radius_m + body.outer_radius_m);
    let room = view.scale * (body.outer_radius_m - body.inner_radius_m).min(body.length_m);
    let radius = (0.28 * room).min(16.0);
    let ink = Stroke::full("#222222", 2.0);
    for side in [1.0, -1.0] {
        let (x, y) = (view.x(side * r), view.y(position + part.centre_m));
        svg.circle((x, y), radius, "#ffffff", Some(ink));
        if (side > 0.0) == moment_up {
            let reach = 0.7 * radius;
            svg.line((x - reach, y - reach), (x + reach, y + reach), ink);
            svg.line((x - reach, y + reach), (x + reach, y - reach), ink);
        } else {
            svg.circle((x, y), 0.28 * radius, "#222222", None);
        }
    }
}

/// A dipole: a dot with an arrow the way its moment points.
fn point(svg: &mut Svg, view: &View, z: f64, moment_up: bool) {
    let along = if moment_up { -1.0 } else { 1.0 };
    let (x, y) = (view.axis, view.y(z));
    svg.line((x, y - 34.0 * along), (x, y + 20.0 * along), Stroke::full("#222222", 5.0));
    arrow_head(svg, (x, y + 40.0 * along), (0.0, along), (24.0, 18.0));
    svg.circle((x, y), 8.0, "#222222", None);
    let kind = Type { bold: true, rim: "#ffffff", ..letters(SMALL, Anchor::Start) };
    svg.text(x + 14.0, y + 40.0 * along + 0.5 * CAPITAL * SMALL, "m", kind);
}

/// An arrow ahead of the mover with its speed, on the axis or, for a mover around the wall, on the right; none at rest.
pub(super) fn motion(svg: &mut Svg, problem: &Problem, view: &View, position: f64, velocity: f64) {
    if velocity.abs() <= 0.0 {
        return;
    }
    let body = Body::of(&problem.mover);
    let around = body.inner >= problem.wall.outer_radius_m();
    let x = if around { view.x(0.5 * (body.inner + body.outer)) } else { view.axis };
    let up = velocity > 0.0;
    let along = if up { -1.0 } else { 1.0 };
    let clear = if body.is_solid() { 16.0 } else { 60.0 };
    let from = view.y(position + if up { body.high } else { body.low }) + clear * along;
    let to = from + 84.0 * along;
    svg.line((x, from), (x, to - 20.0 * along), Stroke::full("#222222", 7.0));
    arrow_head(svg, (x, to), (0.0, along), (32.0, 24.0));
    let unit = Shown::speed(velocity);
    let text = format!("{} {}", significant(unit.factor * velocity.abs(), 4), unit.unit);
    let fits = x + 18.0 + width(&text, SMALL, false) < view.right();
    let (place, anchor) = if fits { (x + 18.0, Anchor::Start) } else { (x - 18.0, Anchor::End) };
    let kind = Type { rim: "#ffffff", ..letters(SMALL, anchor) };
    svg.text(place, 0.5 * (from + to) + 0.5 * CAPITAL * SMALL, &text, kind);
}

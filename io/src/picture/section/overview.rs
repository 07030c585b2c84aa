//! The whole course to scale: the wall over its full length, the mover where it starts and where it ends, the gates.

use super::dimension::upright;
use super::metal::Metal;
use super::sizes::millimetres;
use crate::layout::{BodyKind, BodyLayout, Layout};
use crate::picture::key::title;
use crate::picture::letters::{CAPITAL, fitting};
use crate::picture::paper::{COLUMN, Picture};
use crate::picture::style::{GREY, MARGIN, SMALL, letters};
use crate::picture::svg::{Anchor, Stroke, Svg, Type, polyline};

/// Greatest height and width of the drawing, 0.1 mm on paper.
const ROOM: (f64, f64) = (1000.0, 300.0);
/// Air beyond the outermost bodies, over the whole height.
const AIR: f64 = 0.03;
/// Least distance of the lines of text on the right.
const LEADING: f64 = 32.0;

const EDGE: Stroke = Stroke::full("#222222", 2.6);
const CENTRE: Stroke = Stroke::dashed("#222222", 1.8, "34 7 4 7");
const PHANTOM: Stroke = Stroke::dashed("#444444", 1.8, "26 6 5 6 5 6");
const GATE: Stroke = Stroke::dashed("#1f5a96", 2.2, "12 7");
const LEADER: Stroke = Stroke::full("#777777", 1.2);

/// A height on paper.
struct View {
    scale: f64,
    high: f64,
    top: f64,
    axis: f64,
}

impl View {
    fn y(&self, z: f64) -> f64 {
        self.top + self.scale * (self.high - z)
    }

    fn x(&self, r: f64) -> f64 {
        self.axis + self.scale * r
    }
}

/// The course of a travel in a wall with ends; nothing for an endless wall.
#[must_use]
pub fn overview(heading: &str, layout: &Layout) -> Option<Picture> {
    let length = layout.wall.length_m?;
    let (low, high) = heights(layout, length);
    let outer = outermost(layout);
    let mut svg = Svg::new(COLUMN);
    let subtitle = "The whole course, to scale";
    let top = title(&mut svg, COLUMN, heading, subtitle) + 12.0;
    let scale = (ROOM.0 / (high - low)).min(ROOM.1 / (2.0 * outer));
    let view = View { scale, high, top, axis: MARGIN + 92.0 + scale * outer };
    wall(&mut svg, &view, layout);
    let mut labels: Vec<(f64, String)> = Vec::new();
    if let Some(end) = layout.end_m {
        mover(&mut svg, &view, layout, end, true);
        labels.push((end, format!("reference point at the end, {} mm", millimetres(end))));
    }
    if let Some(start) = layout.start_m {
        mover(&mut svg, &view, layout, start, false);
        let when = if layout.end_m.is_some() { " at the start" } else { "" };
        labels.push((start, format!("reference point{when}, {} mm", millimetres(start))));
    }
    let reach = 1.25 * outer;
    for (name, gate) in ["first gate", "second gate"].iter().zip(&layout.gates_m) {
        svg.line((view.x(-reach), view.y(*gate)), (view.x(reach), view.y(*gate)), GATE);
        labels.push((*gate, format!("{name}, {} mm", millimetres(*gate))));
    }
    let axis = view.axis;
    svg.line((axis, view.y(high) - 4.0), (axis, view.y(low) + 4.0), CENTRE);
    write(&mut svg, &view, view.x(reach), labels);
    upright(&mut svg, (view.y(length), view.y(0.0)), view.x(-outer), view.x(-outer) - 40.0, &millimetres(length));
    let end = view.y(low) + 16.0 + SMALL;
    let ends = "; the mover drawn through at the start, in broken lines at the end";
    let both = layout.start_m.is_some() && layout.end_m.is_some();
    let note = format!("sizes and heights in millimetres from the wall's lower end{}", if both { ends } else { "" });
    let mut y = end;
    for line in crate::picture::letters::lines(&note, SMALL, false, COLUMN - 2.0 * MARGIN) {
        svg.text(MARGIN, y, &line, Type { colour: GREY, ..Type::plain(SMALL) });
        y += LEADING;
    }
    Some(Picture { name: "course", svg: svg.finish(y - LEADING + MARGIN, heading, subtitle) })
}

/// Lowest and highest point that is shown, with some air.
fn heights(layout: &Layout, length: f64) -> (f64, f64) {
    let ends = [layout.start_m, layout.end_m].into_iter().flatten();
    let of_mover = ends.flat_map(|at| {
        layout.mover.iter().flat_map(move |b| [at + b.at_m - 0.5 * b.length_m, at + b.at_m + 0.5 * b.length_m])
    });
    let all = of_mover.chain(layout.gates_m.iter().copied()).chain([0.0, length]);
    let (low, high) = all.fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), z| (low.min(z), high.max(z)));
    let air = AIR * (high - low);
    (low - air, high + air)
}

/// Radius of the outermost body.
fn outermost(layout: &Layout) -> f64 {
    let walls = layout.wall.layers.iter().map(|l| l.outer_diameter_m);
    0.5 * walls.chain(layout.mover.iter().map(|b| b.outer_diameter_m)).fold(0.0, f64::max)
}

/// Every layer, hatched, both halves.
fn wall(svg: &mut Svg, view: &View, layout: &Layout) {
    let bodies = layout.bodies();
    for (n, layer) in bodies.wall.layers.iter().enumerate() {
        let (top, bottom) = (view.y(layer.to_m), view.y(layer.from_m));
        for side in [1.0, -1.0] {
            let name = Metal::of(layer, Some(layout)).pattern(svg, (n % 2 == 0) == (side > 0.0));
            let (x0, x1) = (view.x(side * layer.inner_radius_m), view.x(side * layer.outer_radius_m));
            svg.rectangle(x0, top, x1, bottom, &format!("url(#{name})"), Some(EDGE));
        }
    }
}

/// The mover at a position: filled, or in broken lines.
fn mover(svg: &mut Svg, view: &View, layout: &Layout, at: f64, phantom: bool) {
    for body in &layout.mover {
        let (fill, stroke) = match (phantom, body.kind) {
            (true, _) => ("none", PHANTOM),
            (false, BodyKind::Coil { .. }) => ("#f0d9c4", EDGE),
            (false, BodyKind::Spacer) => ("#ffffff", PHANTOM),
            (false, _) => ("#dcdfe3", EDGE),
        };
        let radii = match body.kind {
            BodyKind::Spacer => spacer_radii(layout),
            _ => (0.5 * body.inner_diameter_m, 0.5 * body.outer_diameter_m),
        };
        body_at(svg, view, body, at, (fill, stroke), radii);
    }
}

fn body_at(svg: &mut Svg, view: &View, body: &BodyLayout, at: f64, look: (&str, Stroke), (inner, outer): (f64, f64)) {
    let (top, bottom) = (view.y(at + body.at_m + 0.5 * body.length_m), view.y(at + body.at_m - 0.5 * body.length_m));
    if matches!(body.kind, BodyKind::Dipole { .. }) {
        svg.circle((view.axis, view.y(at + body.at_m)), 7.0, look.0, Some(look.1));
        return;
    }
    if inner <= 0.0 {
        svg.rectangle(view.x(-outer), top, view.x(outer), bottom, look.0, Some(look.1));
        return;
    }
    for side in [1.0, -1.0] {
        let (x0, x1) = (view.x(side * inner), view.x(side * outer));
        svg.rectangle(x0, top, x1, bottom, look.0, Some(look.1));
    }
}

/// Radii of a spacer, which has none in a case: it is drawn within those of its neighbours, around the same hole.
pub(super) fn spacer_radii(layout: &Layout) -> (f64, f64) {
    let solid = || layout.mover.iter().filter(|b| b.outer_diameter_m > 0.0);
    let inner = solid().map(|b| 0.5 * b.inner_diameter_m).fold(f64::INFINITY, f64::min);
    let outer = solid().map(|b| 0.5 * b.outer_diameter_m).fold(0.0, f64::max);
    let inner = if inner.is_finite() { inner } else { 0.0 };
    (inner, inner + 0.7 * (outer - inner))
}

/// Labels on the right, each with a leader to its height, moved apart where they would meet.
fn write(svg: &mut Svg, view: &View, from: f64, mut labels: Vec<(f64, String)>) {
    labels.sort_by(|a, b| b.0.total_cmp(&a.0));
    let mut lowest = f64::NEG_INFINITY;
    for (z, text) in labels {
        let exact = view.y(z);
        let y = exact.max(lowest + LEADING);
        lowest = y;
        let x = from + 60.0;
        svg.path(&polyline(&[(from + 6.0, exact), (from + 30.0, exact), (x - 6.0, y)]), LEADER);
        let text = fitting(&text, SMALL, false, COLUMN - MARGIN - x);
        svg.text(x, y + 0.5 * CAPITAL * SMALL, &text, letters(SMALL, Anchor::Start));
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use super::*;
    use crate::layout::{LayerLayout, WallLayout};
    use crate::picture::{drawing, look};

    fn body(name: &str, at_m: f64, sizes: (f64, f64, f64), kind: BodyKind) -> BodyLayout {
        let (inner_diameter_m, outer_diameter_m, length_m) = sizes;
        BodyLayout { name: name.into(), material: None, inner_diameter_m, outer_diameter_m, length_m, at_m, kind }
    }

    /// Two opposed rings with a spacer between them around an aluminium rod.
    fn rings() -> Layout {
        let rod = LayerLayout {
            name: "rod".into(),
            material: Some("aluminium EN AW-6060 T66".into()),
            inner_diameter_m: 0.0,
            outer_diameter_m: 20e-3,
            from_m: 0.0,
            to_m: 0.2,
            conductivity_s_per_m: 28e6,
            relative_permeability: 1.0,
        };
        let ring = |at, remanence_tesla| body("R", at, (24e-3, 44e-3, 10e-3), BodyKind::Magnet { remanence_tesla });
        Layout {
            wall: WallLayout { length_m: Some(0.2), layers: vec![rod] },
            mover: vec![ring(-9e-3, 1.2), body("S", 0.0, (0.0, 0.0, 8e-3), BodyKind::Spacer), ring(9e-3, -1.2)],
            gates_m: vec![0.2, 0.0],
            start_m: Some(0.26),
            end_m: Some(-0.06),
        }
    }

    #[test]
    fn the_course_names_gates_start_and_end() {
        let picture = overview("Rings around a rod", &rings()).unwrap();
        look::keep(&picture);
        let words = look::words(&picture);
        for part in ["first gate, 200 mm", "second gate, 0 mm", "at the start, 260 mm", "at the end, −60 mm"] {
            assert!(words.contains(part), "{part}: {words}");
        }
        assert!(!look::has_non_numbers(&picture));
        assert_eq!(overview("Rings around a rod", &rings()).unwrap(), picture);
        let endless = Layout { wall: WallLayout { length_m: None, ..rings().wall }, ..rings() };
        assert!(overview("x", &endless).is_none());
    }

    #[test]
    fn a_section_by_its_layout_names_metals_and_spacers() {
        let picture = drawing("Rings around a rod", &rings()).unwrap();
        look::keep(&picture);
        let words = look::words(&picture);
        for part in ["hatched: aluminium; spacers in broken lines", "gap 2", "Ø44", "Ø24", "Ø20"] {
            assert!(words.contains(part), "{part}: {words}");
        }
    }

    #[test]
    fn spacers_lie_within_their_neighbours() {
        let (inner, outer) = spacer_radii(&rings());
        assert!((inner - 12e-3).abs() < 1e-12 && outer > inner && outer < 22e-3);
    }
}

//! The sizes set into a section: diameters of wall and mover, running gap, length.

use lenzbore_solver::problem::Problem;

use super::dimension::{ROW, level, upright};
use super::view::{Body, View};
use super::wall::Cut;
use crate::picture::scale::significant;
use crate::picture::svg::Svg;

/// More diameters than this, and only the bore and the outside are set.
const MOST: usize = 4;

/// Radii of the wall to be set, m, small to large.
pub(super) fn wall_radii(problem: &Problem) -> Vec<f64> {
    let all = problem.wall.layers.iter().flat_map(|l| [l.inner_radius_m, l.outer_radius_m]);
    let all = distinct(all);
    if all.len() <= MOST { all } else { distinct([problem.wall.inner_radius_m(), problem.wall.outer_radius_m()]) }
}

/// Outer and inner radii of the mover to be set, m, small to large.
pub(super) fn mover_radii(problem: &Problem) -> Vec<f64> {
    let all = distinct(problem.mover.parts.iter().flat_map(|p| [p.outline.inner_radius_m, p.outline.outer_radius_m]));
    let body = Body::of(&problem.mover);
    if all.len() < MOST { all } else { distinct([body.outer]) }
}

/// The running gap's inner and outer radius, m, where mover and wall pass one another.
pub(super) fn gap(problem: &Problem) -> Option<(f64, f64)> {
    let body = Body::of(&problem.mover);
    if !body.is_solid() {
        return None;
    }
    let (inner, outer) = (problem.wall.inner_radius_m(), problem.wall.outer_radius_m());
    let in_bore = (body.outer, inner);
    let around = (outer, body.inner);
    [in_bore, around].into_iter().find(|(from, to)| to > from && *from > 0.0)
}

/// Positive values without repeats, small to large.
fn distinct(values: impl IntoIterator<Item = f64>) -> Vec<f64> {
    let mut all: Vec<f64> = values.into_iter().filter(|v| *v > 0.0).collect();
    all.sort_by(f64::total_cmp);
    all.dedup_by(|b, a| *b - *a < 1e-6 * *b);
    all
}

/// Height that the rows above a drawing take.
pub(super) fn room_above(problem: &Problem) -> f64 {
    #[expect(clippy::cast_precision_loss, reason = "a few rows")]
    let rows = wall_radii(problem).len() as f64;
    rows * ROW + 14.0
}

/// Diameters of the wall above, of the mover and the gap below; gives the place below all.
pub(super) fn diameters(svg: &mut Svg, problem: &Problem, view: &View, position: f64, cuts: &[Cut<'_>]) -> f64 {
    let mut y = view.top - 14.0;
    for radius in wall_radii(problem) {
        let with_it = cuts.iter().filter(|c| c.radii().iter().any(|r| (r - radius).abs() < 1e-9));
        if let Some(highest) = with_it.map(|c| c.high).max_by(f64::total_cmp) {
            let from = view.y(highest);
            level(svg, (view.x(-radius), view.x(radius)), (from, from), y, &diameter(radius));
            y -= ROW;
        }
    }
    let low = view.y(position + Body::of(&problem.mover).low);
    let gap = gap(problem).filter(|_| !cuts.is_empty());
    let first = view.bottom() + ROW;
    let mut y = first + if gap.is_some() { ROW } else { 0.0 };
    for radius in mover_radii(problem) {
        level(svg, (view.x(-radius), view.x(radius)), (low, low), y, &diameter(radius));
        y += ROW;
    }
    if let Some(gap) = gap {
        running_gap(svg, problem, view, (gap, low, first), cuts);
    }
    y - ROW + 10.0
}

/// The running gap on the right half, with extension lines from the mover at height `low` and from the wall's lower end.
fn running_gap(svg: &mut Svg, problem: &Problem, view: &View, place: ((f64, f64), f64, f64), cuts: &[Cut<'_>]) {
    let ((inner, outer), low, y) = place;
    let wall = view.y(cuts.iter().map(|c| c.low).fold(view.high, f64::min));
    let in_bore = Body::of(&problem.mover).outer <= inner * (1.0 + 1e-9);
    let from = if in_bore { (low, wall) } else { (wall, low) };
    level(svg, (view.x(inner), view.x(outer)), from, y, &format!("gap {}", millimetres(outer - inner)));
}

/// The mover's length on its right; gives the right edge.
pub(super) fn length(svg: &mut Svg, problem: &Problem, view: &View, position: f64) -> f64 {
    let body = Body::of(&problem.mover);
    if !body.is_solid() {
        return view.right();
    }
    let x = view.right() + 44.0;
    let heights = (view.y(position + body.high), view.y(position + body.low));
    upright(svg, heights, view.x(body.outer), x, &millimetres(body.high - body.low));
    x + 12.0
}

fn diameter(radius: f64) -> String {
    format!("Ø{}", millimetres(2.0 * radius))
}

/// Millimetres to a micrometre, idle zeros dropped.
pub(super) fn millimetres(metres: f64) -> String {
    let rounded = (1e6 * metres).round() / 1e3;
    significant(rounded, 7)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::result::demo;

    #[test]
    fn gap_and_radii_are_those_of_the_case() {
        let (problem, _) = demo::free();
        assert_eq!(wall_radii(&problem), [12.5e-3, 13.1e-3, 15.0e-3]);
        assert_eq!(gap(&problem), Some((11.015e-3, 12.5e-3)));
        let (mut problem, _) = demo::steady();
        assert_eq!(gap(&problem), None);
        assert!(mover_radii(&problem).is_empty());
        problem.wall.layers[0].inner_radius_m = 0.0;
        assert_eq!(wall_radii(&problem), [12.5e-3]);
    }

    #[test]
    fn sizes_read_as_on_a_drawing() {
        assert_eq!(diameter(14.0e-3), "Ø28");
        assert_eq!(millimetres(1.485e-3), "1.485");
        assert_eq!(millimetres(0.1 + 0.2), "300");
    }
}

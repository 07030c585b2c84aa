//! The grid for coils at rest: the rules of `grid_rules.rs` with the skin depth delta = sqrt(2 / (omega mu sigma)) in the place of the wake's.
//!
//! - across: as there, h(face) = min(w/4, delta/4, lambda/8), and at most delta/2 within a layer up to 8 delta thick;
//! - along: breakpoints at the coils' ends with h = gap/2 there (gap/4 for permeable walls), at most a/8 (a/16 for permeable) to a distance a
//!   beyond them and between ends less than 2 a apart; a long coil's middle, where its field hardly varies, is left coarser;
//! - along, ends of layers: breakpoints with the same size, or delta/4 where that is less, growing with the distance from the coils;
//! - boundary: 400 b from all that stands there. What the boundary sends back falls with the third power of its distance in an inductance, with the
//!   fifth in a force; ten times the distance costs nine more cells.

use lenzbore_mesh::{Anchor, Cap, MeshFault, PlannedLine, Rectangle, SizeLaw};

use crate::grid_rules::{
    GROWTH, GridPlan, axial_cap, axial_size, depth, insert_apart, plan_r, rectangle, sorted_apart,
};
use crate::placement::Placement;
use crate::problem::{Layer, Problem, Wall};

/// Distance of the boundary in outer radii.
const BOUNDARY: f64 = 400.0;
/// Growth of the cell at a layer's end for each distance from the coils beyond a.
const FAR_GROWTH: f64 = 0.15;

/// The grid plan for coils at rest (in the wall's frame) at angular frequencies up to `omega`, rad/s.
///
/// # Errors
/// A line that cannot be built.
pub(super) fn plan(problem: &Problem, placement: &Placement, omega: f64) -> Result<GridPlan, MeshFault> {
    let outer = problem.wall.outer_radius_m().max(placement.mover_outer_m);
    let r_max = outer + BOUNDARY * outer;
    // delta = sqrt(2 lambda / (mu sigma v)) with v = lambda omega.
    let speed = placement.wavelength_m * omega;
    let r = plan_r(&with_cells_in_depth(problem, omega), placement, speed, GROWTH, r_max)?;
    let reach = BOUNDARY * outer;
    let length = problem.wall.length_m();
    let low = length.map_or(placement.lowest_m, |_| placement.lowest_m.min(0.0));
    let high = length.map_or(placement.highest_m, |l| placement.highest_m.max(l));
    let size = axial_size(problem, placement);
    let least =
        problem.wall.layers.iter().map(|l| depth(l, placement.wavelength_m, speed)).fold(f64::INFINITY, f64::min);
    let (points, law) = along(problem, placement, size, 0.25 * least);
    let mut points = points;
    points.extend([low - reach, high + reach]);
    let z = PlannedLine::new(&sorted_apart(points, 0.0), &law)?;
    let half = (outer + 0.5 * reach, low - 0.5 * reach, high + 0.5 * reach);
    Ok(GridPlan::of_lines(r, z, rectangles(&problem.wall), half, size))
}

/// Least and greatest number of cells across a layer.
const CELLS: (f64, f64) = (4.0, 16.0);

/// `problem` with two cells a skin depth all through the layers, as far as that takes no more than 16: beyond eight depths nothing is left to
/// resolve but at the faces. More where the case asks for more.
fn with_cells_in_depth(problem: &Problem, omega: f64) -> Problem {
    let depths = |l: &Layer| l.thickness_m() / depth(l, 1.0, omega);
    let most = problem.wall.layers.iter().map(depths).fold(0.0, f64::max);
    #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped to 4 .. 16")]
    let cells = (2.0 * most.ceil()).clamp(CELLS.0, CELLS.1) as usize;
    let mut finer = problem.clone();
    finer.accuracy.cells_across_wall = Some(problem.accuracy.cells_across_wall.unwrap_or(0).max(cells));
    finer
}

/// Where each layer lies on the grid.
fn rectangles(wall: &Wall) -> Vec<Rectangle> {
    let ends = |l: &Layer| match wall.length_m() {
        None => (f64::NEG_INFINITY, f64::INFINITY),
        Some(_) => (l.from_m, l.to_m),
    };
    wall.layers.iter().map(|l| rectangle(l, ends(l).0, ends(l).1)).collect()
}

/// Breakpoints along z between the boundaries, and the law of the cell size.
fn along(problem: &Problem, placement: &Placement, size: f64, shallow: f64) -> (Vec<f64>, SizeLaw) {
    let mut law = SizeLaw { growth: GROWTH, ..SizeLaw::default() };
    let spans = spans(placement);
    let mut points = Vec::new();
    if problem.wall.length_m().is_some() {
        points = sorted_apart(problem.wall.layers.iter().flat_map(|l| [l.from_m, l.to_m]).collect(), 0.0);
        // From the coils themselves, not from their ends: a wall that ends within a long coil has all of its field.
        let coils = problem.mover.parts.iter().map(|p| (p.centre_m, 0.5 * p.outline.length_m));
        let away =
            |z: f64| coils.clone().map(|(c, half)| ((z - c).abs() - half).max(0.0)).fold(f64::INFINITY, f64::min);
        let grown = |z: f64| size.min(shallow) + FAR_GROWTH * (away(z) - placement.scale_m).max(0.0);
        law.anchors.extend(points.iter().map(|&position_m| Anchor { position_m, size_m: grown(position_m) }));
    }
    for &end in &placement.source_ends_m {
        let before = points.len();
        insert_apart(&mut points, end, 0.25 * size);
        if points.len() > before {
            law.anchors.push(Anchor { position_m: end, size_m: size });
        }
    }
    let cap = axial_cap(problem, placement);
    let cap_of = |&(from_m, to_m): &(f64, f64)| Cap { from_m, to_m, size_m: cap, release_m: Some(placement.scale_m) };
    law.caps.extend(spans.iter().map(cap_of));
    (points, law)
}

/// The coils' ends, those less than 2 a apart joined to a span.
fn spans(placement: &Placement) -> Vec<(f64, f64)> {
    let mut spans: Vec<(f64, f64)> = Vec::new();
    for &end in &placement.source_ends_m {
        match spans.last_mut() {
            Some(span) if end - span.1 < 2.0 * placement.scale_m => span.1 = end,
            _ => spans.push((end, end)),
        }
    }
    spans
}

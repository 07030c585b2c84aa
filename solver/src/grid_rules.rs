//! Where grid lines go and how small cells are.
//!
//! Between breakpoints (faces, magnet ends, axis, boundary) all levels share one smooth map, so that
//! the scheme's error runs in even powers of the cell size. With a = bore radius, w = layer thickness,
//! lambda = min(a, 2 gap), delta = sqrt(2 lambda / (mu sigma v)), b = outer radius of everything:
//!
//! - across: h(face) = min(w/4, delta/4, lambda/8), capped at w/4 inside a layer and a/6 in the bore,
//!   growing by 0.26 per distance from the faces (0.4 in the wall's frame);
//! - along, in the mover's frame: breakpoints at magnet ends with h = gap/2 there (gap/4 for permeable
//!   walls), at most a/8 (a/16 for permeable) to a distance a beyond them, growing likewise from there;
//! - along, in the wall's frame: min(3/4 gap, a/8) all over the swept part of the wall (half for permeable);
//! - boundary: 40 b outward and ahead, 40 b + 4 a Re behind the mover.

use lenzbore_mesh::{Anchor, Cap, Grid, MeshFault, NodeLine, PlannedLine, Rectangle, Refinement, SizeLaw};

use crate::constants::MU0;
use crate::placement::Placement;
use crate::problem::{Layer, Problem, Wall};

/// Growth of the cell size per distance, in the mover's frame.
pub(crate) const GROWTH: f64 = 0.26;
/// The same in the wall's frame, where steps in time cost more than they gain from it.
const SWEPT_GROWTH: f64 = 0.4;
/// Distance of the boundary in outer radii.
const BOUNDARY: f64 = 40.0;
/// Wake behind the mover in bore radii a magnetic Reynolds number.
const WAKE: f64 = 4.0;

/// Frame of the grid.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) enum Frame {
    /// The mover's: settled fields at this signed velocity, m/s.
    Mover {
        /// Velocity, m/s.
        velocity: f64,
    },
    /// The wall's: the reference point sweeps from `low` to `high`, m, at up to `speed`, m/s.
    Wall {
        /// Lowest position, m.
        low: f64,
        /// Highest position, m.
        high: f64,
        /// Greatest speed, m/s.
        speed: f64,
    },
}

/// A grid planned for all refinement levels.
#[derive(Debug, Clone)]
pub(crate) struct GridPlan {
    r: PlannedLine,
    z: PlannedLine,
    /// Painted regions, in the order of the wall's layers.
    pub(crate) rectangles: Vec<Rectangle>,
    /// Where the domain is cut to see the boundary's error, m.
    pub(crate) half_extent: (f64, f64, f64),
    /// Axial cell size in the swept part, m (coarsest level).
    pub(crate) axial_cell_m: f64,
}

/// Sum of mu0 mu_r sigma w over the layers, s/m: times speed, the magnetic Reynolds number.
pub(crate) fn reynolds_per_speed(wall: &Wall) -> f64 {
    wall.layers.iter().map(|l| MU0 * l.relative_permeability * l.conductivity_s_per_m * l.thickness_m()).sum()
}

/// Skin or wake depth delta = sqrt(2 lambda / (mu sigma v)) in a layer, m; infinite where nothing conducts or moves.
pub(crate) fn depth(layer: &Layer, lambda: f64, speed: f64) -> f64 {
    (2.0 * lambda / (MU0 * layer.relative_permeability * layer.conductivity_s_per_m * speed)).sqrt()
}

impl GridPlan {
    /// Plans the grid of `problem` in `frame`.
    ///
    /// # Errors
    /// A line that cannot be built.
    pub(crate) fn new(problem: &Problem, placement: &Placement, frame: Frame) -> Result<Self, MeshFault> {
        let outer = problem.wall.outer_radius_m().max(placement.mover_outer_m);
        let r_max = outer + BOUNDARY * outer;
        let speed = match frame {
            Frame::Mover { velocity } => velocity.abs(),
            Frame::Wall { speed, .. } => speed,
        };
        let growth = if let Frame::Mover { .. } = frame { GROWTH } else { SWEPT_GROWTH };
        let r = plan_r(problem, placement, speed, growth, r_max)?;
        let (z, rectangles, half, cell) = match frame {
            Frame::Mover { velocity } => plan_z_mover(problem, placement, velocity, outer)?,
            Frame::Wall { low, high, .. } => plan_z_wall(problem, placement, (low, high), outer)?,
        };
        Ok(Self { r, z, rectangles, half_extent: (outer + 0.5 * BOUNDARY * outer, half.0, half.1), axial_cell_m: cell })
    }

    /// A plan of lines made elsewhere: coils at rest have their own.
    pub(crate) fn of_lines(
        r: PlannedLine,
        z: PlannedLine,
        rectangles: Vec<Rectangle>,
        half_extent: (f64, f64, f64),
        axial_cell_m: f64,
    ) -> Self {
        Self { r, z, rectangles, half_extent, axial_cell_m }
    }

    /// Nodes of the coarsest level.
    pub(crate) fn coarsest_nodes(&self) -> usize {
        (self.r.cells() + 1) * (self.z.cells() + 1)
    }

    /// The grid of one level.
    pub(crate) fn grid(&self, refinement: Refinement) -> Grid {
        Grid { r: self.r.nodes(refinement), z: self.z.nodes(refinement) }
    }

    /// The same grid with the boundary at half the distance.
    pub(crate) fn half_grid(&self, refinement: Refinement) -> Grid {
        self.halved(&self.grid(refinement))
    }

    /// `grid` with the boundary at half the distance.
    pub(crate) fn halved(&self, grid: &Grid) -> Grid {
        let (r_max, z_min, z_max) = self.half_extent;
        Grid { r: grid.r.cut(0.0, r_max), z: grid.z.cut(z_min, z_max) }
    }

    /// The line of heights of one level.
    pub(crate) fn heights(&self, refinement: Refinement) -> NodeLine {
        self.z.nodes(refinement)
    }
}

/// The line of radii for depths at `speed`, m/s.
///
/// # Errors
/// A line that cannot be built.
pub(crate) fn plan_r(
    problem: &Problem,
    placement: &Placement,
    speed: f64,
    growth: f64,
    r_max: f64,
) -> Result<PlannedLine, MeshFault> {
    let lambda = placement.wavelength_m;
    let mut law = SizeLaw { growth, ..SizeLaw::default() };
    let mut points = vec![0.0, r_max];
    for layer in &problem.wall.layers {
        let quarter = match problem.accuracy.cells_across_wall {
            #[expect(clippy::cast_precision_loss, reason = "a small whole number")]
            Some(cells) => layer.thickness_m() / cells as f64,
            None => layer.thickness_m() / 4.0,
        };
        let face = quarter.min(depth(layer, lambda, speed) / 4.0).min(lambda / 8.0);
        for radius in [layer.inner_radius_m, layer.outer_radius_m] {
            if radius > 0.0 {
                law.anchors.push(Anchor { position_m: radius, size_m: face });
                points.push(radius);
            }
        }
        law.caps.push(held(layer.inner_radius_m, layer.outer_radius_m, quarter));
    }
    let bore = problem.wall.inner_radius_m();
    if bore > 0.0 {
        law.caps.push(held(0.0, bore, bore / 6.0));
    }
    keep_finest_anchor(&mut law.anchors);
    let mut points = sorted_apart(points, 0.0);
    for &radius in &placement.source_radii_m {
        insert_apart(&mut points, radius, 0.2 * placement.gap_m);
    }
    PlannedLine::new(&points, &law)
}

fn held(from_m: f64, to_m: f64, size_m: f64) -> Cap {
    Cap { from_m, to_m, size_m, release_m: None }
}

type AxialPlan = (PlannedLine, Vec<Rectangle>, (f64, f64), f64);

/// Axial size in the wall's frame, where no cell stays at the magnet's ends.
fn swept_size(problem: &Problem, placement: &Placement) -> f64 {
    (0.75 * placement.gap_m / finer(problem)).min(axial_cap(problem, placement))
}

/// Axial size at the magnet's ends in the mover's frame.
pub(crate) fn axial_size(problem: &Problem, placement: &Placement) -> f64 {
    (placement.gap_m / (2.0 * finer(problem))).min(axial_cap(problem, placement))
}

/// Greatest axial size near the mover.
pub(crate) fn axial_cap(problem: &Problem, placement: &Placement) -> f64 {
    placement.scale_m / (8.0 * finer(problem))
}

fn finer(problem: &Problem) -> f64 {
    if problem.wall.is_permeable() { 2.0 } else { 1.0 }
}

fn plan_z_mover(problem: &Problem, placement: &Placement, velocity: f64, outer: f64) -> Result<AxialPlan, MeshFault> {
    let size = axial_size(problem, placement);
    let mut law = SizeLaw { growth: GROWTH, ..SizeLaw::default() };
    let mut points: Vec<f64> = Vec::new();
    for &end in &placement.source_ends_m {
        insert_apart(&mut points, end, 0.25 * size);
    }
    law.anchors.extend(points.iter().map(|&position_m| Anchor { position_m, size_m: size }));
    law.caps.push(Cap {
        from_m: placement.lowest_m,
        to_m: placement.highest_m,
        size_m: axial_cap(problem, placement),
        release_m: Some(placement.scale_m),
    });
    let wake = WAKE * placement.scale_m * reynolds_per_speed(&problem.wall) * velocity.abs();
    let (ahead, behind) = (BOUNDARY * outer, BOUNDARY * outer + wake);
    let (below, above) = if velocity < 0.0 { (ahead, behind) } else { (behind, ahead) };
    let (low, high) = (placement.lowest_m, placement.highest_m);
    points.extend([low - below, high + above]);
    let points = sorted_apart(points, 0.0);
    let line = PlannedLine::new(&points, &law)?;
    let rectangles = problem.wall.layers.iter().map(|l| rectangle(l, f64::NEG_INFINITY, f64::INFINITY)).collect();
    Ok((line, rectangles, (low - 0.5 * below, high + 0.5 * above), size))
}

fn plan_z_wall(
    problem: &Problem,
    placement: &Placement,
    (low, high): (f64, f64),
    outer: f64,
) -> Result<AxialPlan, MeshFault> {
    let size = swept_size(problem, placement);
    let length = problem.wall.length_m().unwrap_or(0.0);
    let mut law = SizeLaw { growth: SWEPT_GROWTH, ..SizeLaw::default() };
    let reach = 6.0 * placement.scale_m;
    let swept = ((low + placement.lowest_m - reach).max(0.0), (high + placement.highest_m + reach).min(length));
    let mut points = Vec::new();
    for layer in &problem.wall.layers {
        points.extend([layer.from_m, layer.to_m]);
    }
    let mut points = sorted_apart(points, 0.0);
    if swept.0 < swept.1 {
        insert_apart(&mut points, swept.0, 0.5 * size);
        insert_apart(&mut points, swept.1, 0.5 * size);
        law.caps.push(held(swept.0, swept.1, size));
    }
    let points = sorted_apart(points, 0.0);
    law.anchors.extend(points.iter().map(|&position_m| Anchor { position_m, size_m: size }));
    let (bottom, top) = (-BOUNDARY * outer, length + BOUNDARY * outer);
    let mut all = points;
    all.extend([bottom, top]);
    let line = PlannedLine::new(&sorted_apart(all, 0.0), &law)?;
    let rectangles = problem.wall.layers.iter().map(|l| rectangle(l, l.from_m, l.to_m)).collect();
    let half = (0.5 * bottom, length + 0.5 * BOUNDARY * outer);
    Ok((line, rectangles, half, size))
}

pub(crate) fn rectangle(layer: &Layer, z_from_m: f64, z_to_m: f64) -> Rectangle {
    Rectangle { r_from_m: layer.inner_radius_m, r_to_m: layer.outer_radius_m, z_from_m, z_to_m }
}

/// Sorted, without values closer than `apart` (or equal up to round-off) to the one before.
pub(crate) fn sorted_apart(mut points: Vec<f64>, apart: f64) -> Vec<f64> {
    points.sort_by(f64::total_cmp);
    let scale = points.iter().fold(0.0_f64, |m, p| m.max(p.abs()));
    let least = apart.max(1.0e-12 * scale);
    points.dedup_by(|next, kept| *next - *kept <= least);
    points
}

/// Inserts `point` into the sorted list unless one stands within `apart`.
pub(crate) fn insert_apart(points: &mut Vec<f64>, point: f64, apart: f64) {
    if points.iter().all(|p| (p - point).abs() > apart) {
        points.push(point);
        points.sort_by(f64::total_cmp);
    }
}

/// Faces that two layers share keep the finer of their sizes, once.
fn keep_finest_anchor(anchors: &mut Vec<Anchor>) {
    anchors.sort_by(|a, b| a.position_m.total_cmp(&b.position_m).then(a.size_m.total_cmp(&b.size_m)));
    anchors.dedup_by(|next, kept| next.position_m - kept.position_m <= 1.0e-12 * kept.position_m);
}

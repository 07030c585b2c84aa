//! The thermal grid: the wall alone, from its innermost to its outermost radius and from end to end.
//!
//! Heat spreads more evenly than currents, so its cells are its own: a sixth of each layer across, a quarter of the bore's radius along
//! (at most some hundreds). Faces and ends of layers are breakpoints, and all levels share one smooth map between them.

use lenzbore_mesh::{Cap, Grid, MeshFault, PlannedLine, Rectangle, Refinement, Regions, SizeLaw};

use crate::grid_rules::{rectangle, sorted_apart};
use crate::problem::Wall;

/// Cells across a layer.
const ACROSS: f64 = 6.0;
/// Cells a bore radius along.
const ALONG: f64 = 4.0;
/// Cells along the wall at most, about.
const MOST_ALONG: f64 = 240.0;

/// The lines of all levels.
#[derive(Debug, Clone)]
pub(crate) struct ThermalPlan {
    r: PlannedLine,
    z: PlannedLine,
    rectangles: Vec<Rectangle>,
}

/// One level's grid, with the layer of every cell (0: none, else layer index + 1).
#[derive(Debug, Clone)]
pub(crate) struct ThermalGrid {
    pub(crate) grid: Grid,
    pub(crate) region: Vec<usize>,
}

impl ThermalPlan {
    /// The plan for a wall with ends.
    ///
    /// # Errors
    /// A line that cannot be built.
    pub(crate) fn new(wall: &Wall) -> Result<Self, MeshFault> {
        Self::with_cells(wall, ACROSS)
    }

    /// The same with `across` cells across a layer, and as many more along.
    ///
    /// # Errors
    /// A line that cannot be built.
    pub(crate) fn with_cells(wall: &Wall, across: f64) -> Result<Self, MeshFault> {
        let (inner, outer) = (wall.inner_radius_m(), wall.outer_radius_m());
        let scale = if inner > 0.0 { inner } else { outer };
        let radii = wall.layers.iter().flat_map(|l| [l.inner_radius_m, l.outer_radius_m]).collect();
        let heights: Vec<f64> = wall.layers.iter().flat_map(|l| [l.from_m, l.to_m]).collect();
        let r =
            line(radii, wall.layers.iter().map(|l| (l.inner_radius_m, l.outer_radius_m, l.thickness_m() / across)))?;
        let (bottom, top) = (fold(&heights, f64::min), fold(&heights, f64::max));
        let size = (scale / ALONG).max((top - bottom) / MOST_ALONG) * ACROSS / across;
        let z = line(heights, [(bottom, top, size)].into_iter())?;
        let rectangles = wall.layers.iter().map(|l| rectangle(l, l.from_m, l.to_m)).collect();
        Ok(Self { r, z, rectangles })
    }

    /// The grid of one level.
    pub(crate) fn level(&self, refinement: Refinement) -> ThermalGrid {
        let grid = Grid { r: self.r.nodes(refinement), z: self.z.nodes(refinement) };
        let region = Regions::new(&grid, &self.rectangles).of_cell().to_vec();
        ThermalGrid { grid, region }
    }
}

fn fold(values: &[f64], with: fn(f64, f64) -> f64) -> f64 {
    values.iter().copied().reduce(with).unwrap_or(0.0)
}

/// A line through `points` with cells no longer than the sizes asked, and at least two a stretch.
fn line(points: Vec<f64>, sizes: impl Iterator<Item = (f64, f64, f64)>) -> Result<PlannedLine, MeshFault> {
    let points = sorted_apart(points, 0.0);
    let (first, last) = (points[0], points[points.len() - 1]);
    let mut caps: Vec<Cap> =
        sizes.map(|(from_m, to_m, size_m)| Cap { from_m, to_m, size_m, release_m: None }).collect();
    caps.push(Cap { from_m: first, to_m: last, size_m: last - first, release_m: None });
    PlannedLine::new(&points, &SizeLaw { growth: 0.0, anchors: Vec::new(), caps })
}

impl ThermalGrid {
    /// Layer of a cell, `None` where there is no wall or no such cell.
    pub(crate) fn layer(&self, i: Option<usize>, j: Option<usize>) -> Option<usize> {
        let (i, j) = (i?, j?);
        let inside = i + 1 < self.grid.nr() && j + 1 < self.grid.nz();
        if inside { self.region[self.grid.cell(i, j)].checked_sub(1) } else { None }
    }

    /// Whether there is wall in the cells inward (or outward) of cell `i` at height `j`.
    pub(crate) fn wall_beyond(&self, i: usize, j: usize, inward: bool) -> bool {
        let wall = |a: usize| self.region[self.grid.cell(a, j)] > 0;
        if inward { (0..i).any(wall) } else { (i + 1..self.grid.nr() - 1).any(wall) }
    }

    /// Whether an empty cell lies in a gap, with wall on both sides.
    pub(crate) fn is_gap(&self, i: usize, j: usize) -> bool {
        self.wall_beyond(i, j, true) && self.wall_beyond(i, j, false)
    }
}

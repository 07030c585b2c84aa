//! A graded node line: breakpoints joined by one smooth map a segment, shared by all refinement levels.

use crate::quadrature::gauss8;
use crate::{MeshFault, Refinement, SizeLaw};

/// More cells than this along one line at the coarsest level is refused.
const MOST_CELLS: usize = 200_000;

/// Panels an average cell for the integral of ds/h.
const PANELS_PER_CELL: f64 = 3.0;

/// A planned line: segments between breakpoints, each with an even number of cells at the coarsest level.
///
/// ```
/// use lenzbore_mesh::{Anchor, PlannedLine, Refinement, SizeLaw};
/// // From 0.1 m at s = 1 m on, sizes grow by a quarter of the distance: dx/ds = 1/(0.1 + (s - 1)/4), in all 4 ln(23.5) = 12.628 cells
/// // to s = 10 m (by hand), and 14 is the next even number.
/// let law = SizeLaw { growth: 0.25, anchors: vec![Anchor { position_m: 1.0, size_m: 0.1 }], caps: vec![] };
/// let plan = PlannedLine::new(&[1.0, 10.0], &law)?;
/// assert_eq!(plan.cells(), 14);
/// // Level 1.5 has 21 cells on the same map: every third node of it is every second of the coarsest.
/// let levels = Refinement::first(2);
/// let (coarse, finer) = (plan.nodes(levels[0]), plan.nodes(levels[1]));
/// assert_eq!((coarse.len(), finer.len()), (15, 22));
/// assert!((coarse.nodes()[4] - finer.nodes()[6]).abs() < 1e-12);
/// // The map in closed form: s(x) = 1 + 0.4 (23.5^(x/14) - 1).
/// assert!((coarse.nodes()[4] - (1.0 + 0.4 * (23.5_f64.powf(4.0 / 14.0) - 1.0))).abs() < 1e-9);
/// # Ok::<(), lenzbore_mesh::MeshFault>(())
/// ```
#[derive(Debug, Clone)]
pub struct PlannedLine {
    segments: Vec<Segment>,
}

/// One segment: the cumulative integral of ds/h at panel ends, scaled so that its end is the cell count.
#[derive(Debug, Clone)]
struct Segment {
    from: f64,
    to: f64,
    cells: usize,
    scale: f64,
    panel_ends: Vec<f64>,
    cumulative: Vec<f64>,
    law: SizeLaw,
}

impl PlannedLine {
    /// Plans a line through `breakpoints` (strictly increasing, m) with cell sizes by `law`.
    ///
    /// # Errors
    /// Breakpoints out of order, sizes that are not positive, or too many cells.
    pub fn new(breakpoints: &[f64], law: &SizeLaw) -> Result<Self, MeshFault> {
        if let Some(&first) = breakpoints.first()
            && !first.is_finite()
        {
            return Err(MeshFault::Breakpoints { index: 0, position_m: first });
        }
        let mut segments = Vec::with_capacity(breakpoints.len());
        for (index, pair) in breakpoints.windows(2).enumerate() {
            if pair[1] <= pair[0] || !pair[1].is_finite() {
                return Err(MeshFault::Breakpoints { index: index + 1, position_m: pair[1] });
            }
            segments.push(Segment::new(pair[0], pair[1], law)?);
        }
        Ok(Self { segments })
    }

    /// Cells at the coarsest level.
    #[must_use]
    pub fn cells(&self) -> usize {
        self.segments.iter().map(|s| s.cells).sum()
    }

    /// The nodes of one refinement level: x(i / f) of the shared map.
    #[must_use]
    pub fn nodes(&self, refinement: Refinement) -> NodeLine {
        let mut nodes: Vec<f64> = self.segments.first().map(|s| s.from).into_iter().collect();
        for segment in &self.segments {
            segment.push_nodes(refinement, &mut nodes);
        }
        NodeLine { nodes }
    }
}

impl Segment {
    fn new(from: f64, to: f64, law: &SizeLaw) -> Result<Self, MeshFault> {
        let size = |s: f64| law.size_in(s, from, to);
        let mut panel_ends = vec![from];
        let mut cumulative = vec![0.0];
        let (mut s, mut total) = (from, 0.0);
        while s < to {
            let h = size(s);
            if !h.is_finite() || h <= 0.0 {
                return Err(MeshFault::Size { position_m: s, size_m: h });
            }
            let mut end = s + h / PANELS_PER_CELL;
            if end >= to || to - end < 0.01 * h {
                end = to;
            }
            total += gauss8(s, end, |t| 1.0 / size(t));
            panel_ends.push(end);
            cumulative.push(total);
            s = end;
            if !total.is_finite() || total > 1.0e6 {
                return Err(MeshFault::TooManyCells { cells: total, limit: MOST_CELLS });
            }
        }
        let cells = even_at_least(total).ok_or(MeshFault::TooManyCells { cells: total, limit: MOST_CELLS })?;
        #[expect(clippy::cast_precision_loss, reason = "cell counts are far below 2^52")]
        let scale = cells as f64 / total;
        Ok(Self { from, to, cells, scale, panel_ends, cumulative, law: law.clone() })
    }

    fn push_nodes(&self, refinement: Refinement, nodes: &mut Vec<f64>) {
        let count = refinement.times(self.cells);
        for i in 1..count {
            #[expect(clippy::cast_precision_loss, reason = "cell counts are far below 2^52")]
            let x = i as f64 / refinement.factor();
            nodes.push(self.position(x / self.scale));
        }
        nodes.push(self.to);
    }

    /// Solves integral of ds/h from the segment's start = `target` by Newton steps within its panel.
    fn position(&self, target: f64) -> f64 {
        let size = |s: f64| self.law.size_in(s, self.from, self.to);
        let panel = self.cumulative.partition_point(|&c| c <= target).clamp(1, self.panel_ends.len() - 1) - 1;
        let (start, end, base) = (self.panel_ends[panel], self.panel_ends[panel + 1], self.cumulative[panel]);
        let mut s = start + (target - base) * size(start);
        for _ in 0..6 {
            s = s.clamp(start, end);
            let missing = target - base - gauss8(start, s, |t| 1.0 / size(t));
            s += missing * size(s);
        }
        s.clamp(start, end)
    }
}

/// The smallest even number >= `cells` (less a hair), at least 2.
#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "range checked just before")]
fn even_at_least(cells: f64) -> Option<usize> {
    let halves = (0.5 * cells - 1.0e-9).ceil().max(1.0);
    (halves.is_finite() && halves <= 0.5 * 200_000.0).then(|| 2 * halves as usize)
}

/// The nodes of one line at one level, strictly increasing, m.
///
/// ```
/// use lenzbore_mesh::NodeLine;
/// let line = NodeLine::from_nodes(vec![0.0, 1.0, 3.0])?;
/// // Half of each neighbouring cell.
/// assert_eq!((line.dual(0), line.dual(1), line.dual(2)), (0.5, 1.5, 1.0));
/// # Ok::<(), lenzbore_mesh::MeshFault>(())
/// ```
#[derive(Debug, Clone, PartialEq)]
pub struct NodeLine {
    nodes: Vec<f64>,
}

impl NodeLine {
    /// A line through given nodes.
    ///
    /// # Errors
    /// Nodes that are not finite and strictly increasing.
    pub fn from_nodes(nodes: Vec<f64>) -> Result<Self, MeshFault> {
        for (index, pair) in nodes.windows(2).enumerate() {
            if pair[1] <= pair[0] || !pair[1].is_finite() {
                return Err(MeshFault::Breakpoints { index: index + 1, position_m: pair[1] });
            }
        }
        Ok(Self { nodes })
    }

    /// The nodes, m.
    #[must_use]
    pub fn nodes(&self) -> &[f64] {
        &self.nodes
    }

    /// Number of nodes.
    #[must_use]
    pub fn len(&self) -> usize {
        self.nodes.len()
    }

    /// True for a line without nodes.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        self.nodes.is_empty()
    }

    /// Length of the cell between nodes `i` and `i + 1`, m.
    #[must_use]
    pub fn cell(&self, i: usize) -> f64 {
        self.nodes[i + 1] - self.nodes[i]
    }

    /// Dual length at node `i`: half of each neighbouring cell, m.
    #[must_use]
    pub fn dual(&self, i: usize) -> f64 {
        let below = if i > 0 { self.cell(i - 1) } else { 0.0 };
        let above = if i + 1 < self.len() { self.cell(i) } else { 0.0 };
        0.5 * (below + above)
    }

    /// Index of the node nearest to `s`.
    #[must_use]
    pub fn nearest(&self, s: f64) -> usize {
        let above = self.nodes.partition_point(|&x| x < s).min(self.len() - 1);
        if above > 0 && s - self.nodes[above - 1] < self.nodes[above] - s { above - 1 } else { above }
    }

    /// Index of the cell that holds `s`, clamped to the line.
    #[must_use]
    pub fn cell_at(&self, s: f64) -> usize {
        self.nodes.partition_point(|&x| x <= s).clamp(1, self.len() - 1) - 1
    }

    /// The same nodes without those below `low` or above `high`: the same grid, cut shorter.
    #[must_use]
    pub fn cut(&self, low: f64, high: f64) -> Self {
        Self { nodes: self.nodes.iter().copied().filter(|&s| s >= low && s <= high).collect() }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::{Anchor, Cap};

    fn law() -> SizeLaw {
        SizeLaw {
            growth: 0.26,
            anchors: vec![Anchor { position_m: 1.0, size_m: 0.1 }, Anchor { position_m: 2.0, size_m: 0.05 }],
            caps: vec![Cap { from_m: 1.0, to_m: 2.0, size_m: 0.2, release_m: None }],
        }
    }

    #[test]
    fn levels_share_breakpoints_and_one_map() -> Result<(), MeshFault> {
        let plan = PlannedLine::new(&[0.0, 1.0, 2.0, 50.0], &law())?;
        let levels: Vec<_> = Refinement::first(3).into_iter().map(|f| plan.nodes(f)).collect();
        for breakpoint in [0.0, 1.0, 2.0, 50.0] {
            assert!(levels.iter().all(|l| l.nodes().iter().any(|&s| (s - breakpoint).abs() < 1e-300)));
        }
        // Every node of f = 1 is a node of f = 2, and every second one of f = 1.5.
        for (i, s) in levels[0].nodes().iter().enumerate() {
            approx::assert_relative_eq!(*s, levels[2].nodes()[2 * i], max_relative = 1e-13, epsilon = 1e-14);
            if i % 2 == 0 {
                approx::assert_relative_eq!(*s, levels[1].nodes()[3 * i / 2], max_relative = 1e-13, epsilon = 1e-14);
            }
        }
        Ok(())
    }

    #[test]
    fn cells_follow_the_size_law() -> Result<(), MeshFault> {
        let plan = PlannedLine::new(&[0.0, 1.0, 2.0, 50.0], &law())?;
        let line = plan.nodes(Refinement::COARSEST);
        for i in 0..line.len() - 1 {
            let (a, b) = (line.nodes()[i], line.nodes()[i + 1]);
            let wanted = law().size_in(0.5 * (a + b), a, b);
            assert!((b - a) < 1.05 * wanted, "cell {a}..{b} is wider than {wanted}");
        }
        Ok(())
    }

    #[test]
    fn unordered_breakpoints_are_refused() {
        assert!(matches!(PlannedLine::new(&[0.0, 2.0, 1.0], &law()), Err(MeshFault::Breakpoints { index: 2, .. })));
        assert!(PlannedLine::new(&[0.0, f64::NAN], &law()).is_err());
    }

    #[test]
    fn cutting_keeps_the_nodes() -> Result<(), MeshFault> {
        let line = PlannedLine::new(&[0.0, 1.0, 2.0, 50.0], &law())?.nodes(Refinement::COARSEST);
        let cut = line.cut(0.0, 25.0);
        assert!(cut.len() < line.len());
        assert_eq!(cut.nodes(), &line.nodes()[..cut.len()]);
        Ok(())
    }
}

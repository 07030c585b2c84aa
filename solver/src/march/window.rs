//! A window of fine z-lines that travels with the mover, so that a long wall costs no more cells than a short one.
//!
//! Within the window the nodes are those of the whole line; beyond it the cells grow with the distance to its edges. Every
//! window's line is one smooth map a segment with breakpoints at even nodes, so all levels stay similar and the error stays in
//! even powers. The coarsest level chooses when the window moves; finer levels replay it at the same instants.

use lenzbore_mesh::{Anchor, Cap, MeshFault, NodeLine, PlannedLine, Refinement, SizeLaw};

use crate::grid_rules::{GridPlan, reynolds_per_speed};
use crate::placement::Placement;
use crate::problem::Problem;

/// Fine cells ahead of the mover's ends, in bore radii.
const AHEAD: f64 = 4.0;
/// Fine cells behind it, in bore radii, and in bore radii a magnetic Reynolds number: currents live as long.
const BEHIND: f64 = 6.0;
const WAKE: f64 = 2.0;
/// Both before a permeable wall, which spreads the field along itself.
const PERMEABLE: f64 = 2.0;
/// Travel between two windows, in bore radii.
const PITCH: f64 = 5.0;
/// Growth of the cell size per distance outside the window.
const GROWTH: f64 = 0.12;
/// Share of the whole line's cells above which a window isn't worth its changes.
const WORTH: f64 = 0.75;
/// Cells between the wall and the boundary at least.
const OUTSIDE_CELLS: f64 = 8.0;

/// Nodes of the whole line at the coarsest level between which its cells are kept; both even.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) struct Window {
    first: usize,
    last: usize,
}

/// Where windows lie.
#[derive(Debug, Clone)]
pub(crate) struct WindowRule {
    /// The whole line's nodes at the coarsest level.
    whole: NodeLine,
    /// Where materials change along z.
    ends: Vec<f64>,
    /// Lowest and highest end of the mover from its reference point.
    mover: (f64, f64),
    ahead_m: f64,
    behind_m: f64,
    pitch_m: f64,
    /// A place within a bore radius of an end is taken to the end.
    near_m: f64,
}

impl WindowRule {
    /// The rule for motion at up to `speed`; `None` where the whole line has hardly more cells than a window.
    ///
    /// # Errors
    /// A line that cannot be built.
    pub(crate) fn new(
        problem: &Problem,
        placement: &Placement,
        plan: &GridPlan,
        reach: (f64, f64),
        speed: f64,
    ) -> Result<Option<Self>, MeshFault> {
        let a = placement.scale_m;
        let further = if problem.wall.is_permeable() { PERMEABLE } else { 1.0 };
        let mut ends: Vec<f64> = problem.wall.layers.iter().flat_map(|l| [l.from_m, l.to_m]).collect();
        ends.sort_by(f64::total_cmp);
        ends.dedup();
        let rule = Self {
            whole: plan.heights(Refinement::COARSEST),
            ends,
            mover: (placement.lowest_m, placement.highest_m),
            ahead_m: further * AHEAD * a,
            behind_m: (further * BEHIND + WAKE * reynolds_per_speed(&problem.wall) * speed) * a,
            pitch_m: PITCH * a,
            near_m: a,
        };
        let typical = rule.line(rule.typical(reach), &rule.whole, Refinement::COARSEST)?;
        #[expect(clippy::cast_precision_loss, reason = "cell counts are far below 2^52")]
        let share = typical.len() as f64 / rule.whole.len() as f64;
        Ok((share < WORTH).then_some(rule))
    }

    /// The window for the mover at `position` about to travel in the sense of `direction`.
    pub(crate) fn choose(&self, position: f64, direction: f64) -> Window {
        let (below, above) = self.wanted(position, direction);
        let (low, high) = if direction < 0.0 { (below - self.pitch_m, above) } else { (below, above + self.pitch_m) };
        let taken_in = |end: f64| self.ends.iter().copied().find(|e| (e - end).abs() < self.near_m);
        let (low, high) = (taken_in(low).map_or(low, |e| e.min(low)), taken_in(high).map_or(high, |e| e.max(high)));
        let nodes = self.whole.nodes();
        let first = nodes.partition_point(|&z| z <= low).saturating_sub(1) / 2 * 2;
        let last = nodes.partition_point(|&z| z < high).div_ceil(2) * 2;
        Window { first, last: last.min(nodes.len() - 1) }
    }

    /// The window half way along `reach`.
    pub(crate) fn typical(&self, reach: (f64, f64)) -> Window {
        self.choose(0.5 * (reach.0 + reach.1), 1.0)
    }

    /// How many windows there are along `reach`, about.
    #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "a small number above 0")]
    pub(crate) fn windows_along(&self, reach: (f64, f64)) -> usize {
        1 + ((reach.1 - reach.0) / self.pitch_m) as usize
    }

    /// Whether `window` still has fine cells all around the mover at `position`.
    pub(crate) fn covers(&self, window: Window, position: f64, direction: f64) -> bool {
        let (low, high) = self.wanted(position, direction);
        let nodes = self.whole.nodes();
        let (first, last) = (nodes[window.first], nodes[window.last]);
        (window.first == 0 || first <= low) && (window.last + 1 == nodes.len() || last >= high)
    }

    /// Where materials change along z, increasing, m.
    pub(crate) fn ends(&self) -> &[f64] {
        &self.ends
    }

    fn wanted(&self, position: f64, direction: f64) -> (f64, f64) {
        let (below, above) =
            if direction < 0.0 { (self.ahead_m, self.behind_m) } else { (self.behind_m, self.ahead_m) };
        (position + self.mover.0 - below, position + self.mover.1 + above)
    }

    /// The z-line of `window` on the level whose whole line is `whole`.
    ///
    /// # Errors
    /// A line that cannot be built.
    pub(crate) fn line(&self, window: Window, whole: &NodeLine, refinement: Refinement) -> Result<NodeLine, MeshFault> {
        let (first, last) = (refinement.times(window.first), refinement.times(window.last));
        let mut nodes = Vec::new();
        if first > 0 {
            nodes.extend_from_slice(self.below(window.first)?.nodes(refinement).nodes());
            nodes.pop();
        }
        nodes.extend_from_slice(&whole.nodes()[first..=last]);
        if last + 1 < whole.len() {
            nodes.extend_from_slice(&self.above(window.last)?.nodes(refinement).nodes()[1..]);
        }
        NodeLine::from_nodes(nodes)
    }

    /// From the boundary up to node `edge`.
    fn below(&self, edge: usize) -> Result<PlannedLine, MeshFault> {
        let nodes = self.whole.nodes();
        let size = nodes[edge] - nodes[edge - 1];
        self.outside(nodes[0], nodes[edge], Anchor { position_m: nodes[edge], size_m: size })
    }

    /// From node `edge` up to the boundary.
    fn above(&self, edge: usize) -> Result<PlannedLine, MeshFault> {
        let nodes = self.whole.nodes();
        let size = nodes[edge + 1] - nodes[edge];
        self.outside(nodes[edge], nodes[nodes.len() - 1], Anchor { position_m: nodes[edge], size_m: size })
    }

    fn outside(&self, from: f64, to: f64, edge: Anchor) -> Result<PlannedLine, MeshFault> {
        let mut points = vec![from];
        points.extend(self.ends.iter().copied().filter(|&e| e > from && e < to));
        points.push(to);
        // Outside the wall a few cells to the boundary must stay, so that it can be cut at half the distance.
        let (first, last) = (self.ends[0], self.ends[self.ends.len() - 1]);
        let nodes = self.whole.nodes();
        let (bottom, top) = (nodes[0], nodes[nodes.len() - 1]);
        let cap =
            |from_m: f64, to_m: f64| Cap { from_m, to_m, size_m: (to_m - from_m) / OUTSIDE_CELLS, release_m: None };
        let caps = vec![cap(bottom, first), cap(last, top)];
        PlannedLine::new(&points, &SizeLaw { growth: GROWTH, anchors: vec![edge], caps })
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use super::*;
    use crate::verification::cases::long_passage;

    fn rule(length_m: f64) -> (WindowRule, GridPlan) {
        let problem = long_passage(length_m, 3.0);
        let placement = Placement::new(&problem);
        let (plan, speed) = super::super::plan(&problem, &placement).unwrap();
        (WindowRule::new(&problem, &placement, &plan, (0.0, length_m), speed).unwrap().unwrap(), plan)
    }

    #[test]
    fn levels_of_a_window_are_similar_and_keep_the_wholes_nodes() {
        let (rule, plan) = rule(1.0);
        for position in [1.05, 0.98, 0.6, 0.02, -0.05] {
            let window = rule.choose(position, -1.0);
            let line = |f: Refinement| rule.line(window, &plan.heights(f), f).unwrap();
            let [coarse, middle, fine] = [0, 1, 2].map(|k| line(Refinement::first(3)[k]));
            assert_eq!((coarse.len() - 1) * 3, (middle.len() - 1) * 2);
            for (k, z) in coarse.nodes().iter().enumerate() {
                approx::assert_relative_eq!(*z, fine.nodes()[2 * k], max_relative = 1e-12, epsilon = 1e-13);
            }
            let whole = rule.whole.nodes();
            let kept = &whole[window.first..=window.last];
            assert!(kept.iter().all(|z| coarse.nodes().contains(z)));
            assert!([0.0, 1.0].iter().all(|z| coarse.nodes().contains(z)), "the wall's ends are nodes");
        }
    }

    #[test]
    fn a_window_has_room_for_its_pitch_and_no_more() {
        let (rule, _) = rule(1.0);
        for direction in [-1.0, 1.0] {
            let window = rule.choose(0.5, direction);
            let at = |travel: f64| rule.covers(window, 0.5 + direction * travel, direction);
            assert!(at(0.0) && at(rule.pitch_m));
            assert!(!at(rule.pitch_m + 2.0 * rule.near_m) && !at(-rule.near_m));
        }
    }

    #[test]
    fn nodes_grow_with_the_logarithm_of_the_length() {
        let nodes = |length: f64| {
            let (rule, _) = rule(length);
            let window = rule.choose(0.5 * length, -1.0);
            rule.line(window, &rule.whole, Refinement::COARSEST).unwrap().len()
        };
        // Ten times the length at a growth of 0.12 a distance: 2 ln(10) / 0.12 = 38 cells more, and an even number a stretch.
        assert!(nodes(20.0) <= nodes(2.0) + 44, "{} {}", nodes(2.0), nodes(20.0));
    }
}

//! The heat that the rings leave in the wall, node by node: the integral over time of e^2, e = -dpsi/dt the drive of a ring.
//!
//! A ring of conductance G takes 2 pi G e^2, W; a layer of conductivity sigma takes sigma e^2 / r^2, W/m3. The integral is kept on the
//! level's whole grid; in a window it is gathered on the window's nodes and carried over when the window is left, so that a step
//! allocates nothing. Heat is conserved in the carrying: every node's own goes to the nodes whose share of the wall it overlaps.

use std::f64::consts::PI;
use std::sync::Arc;

use lenzbore_mesh::{Grid, Regions};

use super::course::{Course, End};
use super::level::MarchLevel;
use super::transfer::Heights;
use crate::fault::SolveFault;
use crate::materials::Materials;
use crate::wall_nodes::{WallNodes, WallRow};

/// The wall on a level's whole grid.
#[derive(Debug, Clone)]
pub(crate) struct WholeWall {
    pub(crate) grid: Grid,
    pub(crate) materials: Materials,
    pub(crate) nodes: WallNodes,
}

/// What has been left so far.
pub(super) struct Heating {
    whole: Arc<WholeWall>,
    /// Integral of e^2 at the nodes of the grid under way, V2 s / rad2.
    sum: Vec<f64>,
    /// The same on the whole grid, from windows that were left.
    carried: Vec<f64>,
    /// The same of the last whole cycle of a stroke.
    last_cycle: Vec<f64>,
    cycle: u32,
    ended: bool,
    saved: Vec<f64>,
    saved_ended: bool,
    windows: bool,
}

/// What an event has left: the integral of e^2 at the wall's nodes.
#[derive(Debug, Clone)]
pub(crate) struct HeatLeft {
    pub(crate) wall: Arc<WholeWall>,
    pub(crate) drive_squared: Vec<f64>,
}

impl Heating {
    /// For the level, which stands on the grid that the run begins with.
    ///
    /// # Errors
    /// A line that cannot be built.
    pub(super) fn new(level: &MarchLevel<'_>) -> Result<Self, SolveFault> {
        let grid = level.lines.grid(None)?;
        let materials = Materials::new(&level.problem.wall, &Regions::new(&grid, &level.lines.plan.rectangles));
        let nodes = WallNodes::new(&grid, &materials);
        let (here, all) = (level.operators.wall.len(), nodes.len());
        let windows = level.lines.rule().is_some();
        Ok(Self {
            whole: Arc::new(WholeWall { grid, materials, nodes }),
            sum: vec![0.0; here],
            carried: vec![0.0; all],
            last_cycle: vec![0.0; all],
            cycle: 0,
            ended: false,
            saved: vec![0.0; here],
            saved_ended: false,
            windows,
        })
    }

    /// Adds a step's heat: `currents` for `dt`, of which `share` lies before the end. Allocates nothing within a cycle.
    pub(super) fn add(&mut self, level: &MarchLevel<'_>, currents: &[f64], (dt, share): (f64, f64), cycle: u32) {
        if cycle != self.cycle {
            self.turn_over(level);
            self.cycle = cycle;
        }
        let weight = if self.ended { 0.0 } else { share * dt };
        self.ended |= share < 1.0;
        for ((sum, i), g) in self.sum.iter_mut().zip(currents).zip(&level.operators.wall.conductance) {
            if *g > 0.0 {
                *sum += weight * (i / g) * (i / g);
            }
        }
    }

    /// A new cycle of a stroke begins: what the last one left is set apart.
    fn turn_over(&mut self, level: &MarchLevel<'_>) {
        self.leave(level);
        std::mem::swap(&mut self.last_cycle, &mut self.carried);
        self.carried.fill(0.0);
    }

    /// Keeps what there is, in case the steps to come are rejected.
    pub(super) fn save(&mut self) {
        self.saved.copy_from_slice(&self.sum);
        self.saved_ended = self.ended;
    }

    /// Forgets what came since.
    pub(super) fn restore(&mut self) {
        self.sum.copy_from_slice(&self.saved);
        self.ended = self.saved_ended;
    }

    /// Carries what the present grid has gathered over to the whole one.
    pub(super) fn leave(&mut self, level: &MarchLevel<'_>) {
        let wall = &level.operators.wall;
        if self.windows {
            let from = Heights { z: level.operators.grid.z.nodes().to_vec(), wall: wall.clone() };
            carry_heat(&from, &self.sum, &self.whole, &mut self.carried);
        } else {
            self.carried.iter_mut().zip(&self.sum).for_each(|(all, here)| *all += here);
        }
        self.sum.fill(0.0);
    }

    /// Goes on with as many nodes as the level now has.
    pub(super) fn enter(&mut self, level: &MarchLevel<'_>) {
        let here = level.operators.wall.len();
        self.sum = vec![0.0; here];
        self.saved = vec![0.0; here];
    }

    /// What has been left by the end: over the run, or over the last whole cycle of a stroke.
    pub(super) fn finish(mut self, level: &MarchLevel<'_>, stroke: bool) -> HeatLeft {
        self.leave(level);
        HeatLeft { wall: self.whole, drive_squared: if stroke { self.last_cycle } else { self.carried } }
    }
}

/// Share of a step from `begin`, from one position to another, that lies before the end of `course`.
pub(super) fn share_before_end(course: &Course, (begin, dt): (f64, f64), (from, to): (f64, f64)) -> f64 {
    let by_time = ((course.time_limit - begin) / dt).clamp(0.0, 1.0);
    // A sliver of a step is rounding.
    let by_time = if by_time > 1.0 - 1.0e-9 { 1.0 } else { by_time };
    match course.end {
        End::Place(until) if course.passed(to) && (to - from).abs() > 0.0 => {
            by_time.min(((until - from) / (to - from)).clamp(0.0, 1.0))
        }
        _ => by_time,
    }
}

/// Conductance of a row's rings per axial length, summed from the row's start to each node of the grid.
fn summed_conductance(whole: &WholeWall, row: &WallRow) -> Vec<f64> {
    let (grid, i) = (&whole.grid, row.i);
    let radius = grid.r.nodes()[i];
    let mut sums = vec![0.0];
    for j in row.j - 1..row.j + row.count {
        let sigma_dr = |a: usize| 0.5 * whole.materials.sigma[grid.cell(a, j)] * grid.r.cell(a);
        let per_length = (sigma_dr(i - 1) + sigma_dr(i)) / radius;
        sums.push(sums[sums.len() - 1] + per_length * grid.z.cell(j));
    }
    sums
}

/// `samples` read linearly at `z` between increasing `places`, constant beyond them.
fn linear(places: &[f64], samples: &[f64], z: f64) -> f64 {
    let k = places.partition_point(|&p| p <= z).clamp(1, places.len() - 1);
    let share = ((z - places[k - 1]) / (places[k] - places[k - 1])).clamp(0.0, 1.0);
    samples[k - 1] + share * (samples[k] - samples[k - 1])
}

/// Adds the heat of `values` (integrals of e^2 at the nodes of `from`) to `into`, at the nodes of the whole grid.
fn carry_heat(from: &Heights, values: &[f64], whole: &WholeWall, into: &mut [f64]) {
    let z = whole.grid.z.nodes();
    for (old, new) in from.wall.rows.iter().zip(&whole.nodes.rows) {
        let places = &z[new.j - 1..=new.j + new.count];
        let sums = summed_conductance(whole, new);
        let middle = |nodes: &[f64], j: usize| 0.5 * (nodes[j] + nodes[j + 1]);
        let mut target = 0;
        for k in 0..old.count {
            let value = values[old.start + k];
            let (low, high) = (middle(&from.z, old.j + k - 1), middle(&from.z, old.j + k));
            while target + 1 < new.count && middle(z, new.j + target) <= low {
                target += 1;
            }
            let (mut at, mut begin) = (target, low);
            loop {
                let last = at + 1 == new.count;
                let end = if last { high } else { high.min(middle(z, new.j + at)) };
                let overlap = linear(places, &sums, end) - linear(places, &sums, begin);
                let conductance = whole.nodes.conductance[new.start + at];
                if overlap > 0.0 && conductance > 0.0 {
                    into[new.start + at] += value * overlap / conductance;
                }
                if last || end >= high {
                    break;
                }
                (at, begin) = (at + 1, end);
            }
        }
    }
}

impl HeatLeft {
    /// Heat in the whole wall, J: 2 pi sum of G times the integral of e^2.
    pub(crate) fn total(&self) -> f64 {
        2.0 * PI * self.drive_squared.iter().zip(&self.wall.nodes.conductance).map(|(s, g)| s * g).sum::<f64>()
    }

    /// The same map with its heat brought to `heat`, J: the series knows the end to a higher order than a share of a step.
    pub(crate) fn scaled_to(mut self, heat: f64) -> Self {
        let total = self.total();
        if total > 0.0 {
            self.drive_squared.iter_mut().for_each(|s| *s *= heat / total);
        }
        self
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use super::*;
    use crate::verification::cases::{finite, layer};
    use lenzbore_mesh::{NodeLine, Rectangle};

    fn wall_on(z: Vec<f64>) -> WholeWall {
        let wall = finite(0.1, vec![layer(10.0, 12.0, 58.0, 1.0), layer(12.0, 13.0, 20.0, 1.0)]);
        let r = NodeLine::from_nodes(vec![0.0, 5e-3, 10e-3, 10.5e-3, 11e-3, 12e-3, 12.5e-3, 13e-3, 20e-3]).unwrap();
        let grid = Grid { r, z: NodeLine::from_nodes(z).unwrap() };
        let rectangle = |l: &crate::problem::Layer| Rectangle {
            r_from_m: l.inner_radius_m,
            r_to_m: l.outer_radius_m,
            z_from_m: l.from_m,
            z_to_m: l.to_m,
        };
        let rectangles: Vec<Rectangle> = wall.layers.iter().map(rectangle).collect();
        let materials = Materials::new(&wall, &Regions::new(&grid, &rectangles));
        let nodes = WallNodes::new(&grid, &materials);
        WholeWall { grid, materials, nodes }
    }

    #[test]
    fn carrying_conserves_the_heat_and_copies_where_nodes_coincide() {
        let even = |n: u32| (0..=n).map(move |k| 0.1 * f64::from(k) / f64::from(n));
        let around = |inner: Vec<f64>| [vec![-0.05, -0.02], inner, vec![0.13, 0.2]].concat();
        let whole = wall_on(around(even(40).collect()));
        let coarse: Vec<f64> = even(40).enumerate().filter(|(k, _)| *k < 20 || k % 5 == 0).map(|(_, z)| z).collect();
        let window = wall_on(around(coarse));
        let values: Vec<f64> = (0..window.nodes.len()).map(|k| 1.0 + (0.37 * k as f64).sin()).collect();
        let from = Heights { z: window.grid.z.nodes().to_vec(), wall: window.nodes.clone() };
        let mut into = vec![0.0; whole.nodes.len()];
        carry_heat(&from, &values, &whole, &mut into);
        let total =
            |wall: &WholeWall, s: &[f64]| HeatLeft { wall: Arc::new(wall.clone()), drive_squared: s.to_vec() }.total();
        approx::assert_relative_eq!(total(&whole, &into), total(&window, &values), max_relative = 1e-13);
        // Well inside the fine part the nodes and their shares of the wall are the same.
        for (old, new) in window.nodes.rows.iter().zip(&whole.nodes.rows) {
            for k in 0..18 {
                approx::assert_relative_eq!(into[new.start + k], values[old.start + k], max_relative = 1e-9);
            }
        }
    }

    #[test]
    fn a_step_across_the_end_counts_in_part() {
        let course = |end, time_limit| Course { from: 1.0, velocity: -1.0, end, time_limit, since: 0.0, stride: 0.0 };
        let share = |course: &Course, begin, to| share_before_end(course, (begin, 0.1), (0.2, to));
        assert!((share(&course(End::Place(0.15), 9.0), 0.5, 0.1) - 0.5).abs() < 1e-12);
        assert!((share(&course(End::Place(0.05), 9.0), 0.5, 0.1) - 1.0).abs() < 1e-12);
        assert!((share(&course(End::Instant, 0.525), 0.5, 0.1) - 0.25).abs() < 1e-12);
        assert!(share(&course(End::Instant, 0.5), 0.5, 0.1).abs() < 1e-12);
    }
}

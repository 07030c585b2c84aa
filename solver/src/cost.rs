//! What a solve will take: grids, steps, memory and time, before it starts.
//!
//! Every level is assembled and factored, and a few solves on it are timed: that takes as long as a few steps of the solve itself.
//! Time and memory are meant to hold within a factor of two.

use std::time::Instant;

use lenzbore_mesh::{Grid, Refinement, Regions};

use crate::band::near_permeable_wall;
use crate::direct::DirectPlan;
use crate::fault::SolveFault;
use crate::grid_report::grid_report;
use crate::grid_rules::GridPlan;
use crate::harmonic;
use crate::march;
use crate::materials::Materials;
use crate::operators::Operators;
use crate::outcome::{GridReport, Regime};
use crate::placement::Placement;
use crate::problem::{Problem, SnapshotPlan, Travel};
use crate::regime::regime;
use crate::settled::{self, Share, elimination_bytes, elimination_seconds, share, shielding};
use crate::target::levels_wanted;

/// Solves timed on each level.
const TIMED_SOLVES: usize = 5;
/// Time of a step over that of its solves (sources, currents, forces; measured).
const STEP_OVERHEAD: f64 = 2.3;
/// Time of a recurrence vector over that of its solve (measured).
const VECTOR_OVERHEAD: f64 = 1.5;
/// Time of a level's set-up over that of assembly and factorisation (grid, sources, figures; measured).
const SET_UP_OVERHEAD: f64 = 2.0;
/// Time of the program itself (start, reading, writing; measured), s.
const PROGRAM_S: f64 = 0.02;
/// Bytes of a node in operators and work arrays (measured), and of the program itself with its libraries.
const NODE_BYTES: f64 = 360.0;
const PROGRAM_BYTES: f64 = 14.0e6;
/// Bytes of a node in a layered factor; walls of more layers than this may need a sparse one.
const LAYERED_BYTES: f64 = 40.0;
const FEW_LAYERS: usize = 4;
/// How the number of vectors grows with the refinement (measured: a third more at f = 2).
const FINER_VECTORS: f64 = 0.4;
/// Time to add one node of a vector into one point's ring current, s (measured, from memory).
const ADDING_S: f64 = 8.0e-10;
/// Shielding above which the peak current density usually asks for a level more than three (at 100 and 1000 in every wall tried, at
/// 10 in none).
const LEVEL_MORE: f64 = 40.0;
/// Doubt by a permeable wall above which the same holds.
const DOUBT_MORE: f64 = 20.0;
/// Factors kept by a level of a march.
const KEPT_FACTORS: f64 = 4.0;

/// The forecast of a solve.
#[derive(Debug, Clone, PartialEq)]
pub struct Forecast {
    /// Grid levels, coarse to fine.
    pub grids: Vec<GridReport>,
    /// Unknowns on the finest level.
    pub unknowns: usize,
    /// Bytes of the finest level's factor.
    pub factor_bytes: usize,
    /// Back-solves on all levels.
    pub solves: f64,
    /// Time steps on all levels (0 for settled fields).
    pub steps: f64,
    /// Peak memory, bytes.
    pub memory_bytes: f64,
    /// Time on this machine, s.
    pub time_s: f64,
    /// The regime at the speed that the grids are made for.
    pub regime: Regime,
    /// Least radial running clearance between the mover's magnetic parts and the wall, m.
    pub gap_m: f64,
}

/// A first estimate of the peak memory from the node counts alone, bytes: tells in no time that a case is far too large.
///
/// # Errors
/// A grid that cannot be built.
pub fn rough_memory_bytes(problem: &Problem, curve_speed_m_per_s: Option<f64>) -> Result<f64, SolveFault> {
    let placement = Placement::new(problem);
    let (plan, speed) = match (curve_speed_m_per_s, &problem.travel) {
        (Some(speed), _) => (settled::plan(problem, &placement, speed)?, Some(speed)),
        (None, Travel::Steady { velocity_m_per_s: v }) => (settled::plan(problem, &placement, *v)?, Some(*v)),
        (None, Travel::Alternating(law)) => (harmonic::plan(problem, law)?.0, Some(0.0)),
        (None, _) => (march::plan(problem, &placement)?.0, None),
    };
    let factors = if speed.is_some() { 1.0 } else { KEPT_FACTORS };
    let eliminated = speed.is_some_and(|v| share(&problem.wall, &[v]).eliminated > 0);
    let coarsest = count(plan.coarsest_nodes());
    let level = |f: Refinement| {
        let nodes = coarsest * f.factor() * f.factor();
        let few = problem.wall.layers.len() <= FEW_LAYERS;
        let factor = if few { LAYERED_BYTES } else { 12.0 * nodes.log2() };
        // Grids are about twice as high as wide.
        let elimination = if eliminated { 8.0 * (0.5 * nodes).sqrt() } else { 0.0 };
        nodes * (factors * factor + elimination + NODE_BYTES + snapshots(problem) * 48.0)
    };
    Ok(Refinement::first(levels_wanted(&problem.accuracy)).into_iter().map(level).sum())
}

/// One level's size.
struct LevelSize {
    grid: Grid,
    unknowns: usize,
    wall_nodes: usize,
    factor_bytes: usize,
    set_up_seconds: f64,
    solve_seconds: f64,
    elimination_seconds: f64,
}

/// Forecasts [`crate::solve`] for the problem's own law, or [`crate::drag_curve`] over `curve_speeds_m_per_s` where given.
///
/// # Errors
/// A grid that cannot be built.
pub fn forecast(problem: &Problem, curve_speeds_m_per_s: Option<&[f64]>) -> Result<Forecast, SolveFault> {
    let placement = Placement::new(problem);
    let (plan, speed) = match (curve_speeds_m_per_s, &problem.travel) {
        (Some(speeds), _) => (settled::plan(problem, &placement, fastest(speeds))?, fastest(speeds)),
        (None, Travel::Steady { velocity_m_per_s: v }) => (settled::plan(problem, &placement, *v)?, v.abs()),
        (None, Travel::Alternating(law)) => harmonic::plan(problem, law)?,
        (None, _) => march::plan(problem, &placement)?,
    };
    let alone = [speed];
    let settled = match (curve_speeds_m_per_s, &problem.travel) {
        (Some(speeds), _) => Some(speeds),
        (None, Travel::Steady { .. }) => Some(alone.as_slice()),
        (None, _) => None,
    };
    let work = settled
        .map(|speeds| SettledWork { share: share(&problem.wall, speeds), speeds: speeds.len() })
        .or_else(|| alternating_work(problem));
    let refinements = Refinement::first(levels_expected(
        problem,
        placement.gap_m,
        work.is_some() && curve_speeds_m_per_s.is_none(),
        speed,
    ));
    let (grids, windows) = if work.is_some() {
        (refinements.iter().map(|&f| plan.grid(f)).collect(), 1)
    } else {
        march::grids_on_the_way(problem, &placement, (&plan, speed), &refinements)?
    };
    let sizes = sizes(problem, &plan, grids)?;
    let mut forecast = Forecast {
        grids: Vec::new(),
        unknowns: sizes.last().map_or(0, |s| s.unknowns),
        factor_bytes: sizes.last().map_or(0, |s| s.factor_bytes),
        solves: 0.0,
        steps: 0.0,
        memory_bytes: PROGRAM_BYTES,
        time_s: 0.0,
        regime: regime(problem, &placement, speed),
        gap_m: placement.gap_m,
    };
    let (mut level_seconds, mut points_seconds) = (Vec::new(), 0.0);
    for (size, refinement) in sizes.iter().zip(&refinements) {
        let f = refinement.factor();
        let (steps, solves) = work
            .map_or_else(|| march_work(problem, &plan, f), |w| (0.0, w.share.vectors * f.powf(FINER_VECTORS) + 2.0));
        let own = match work {
            Some(work) => {
                points_seconds += work.points_seconds(size, solves);
                solves * size.solve_seconds * VECTOR_OVERHEAD + work.own_seconds(size)
            }
            None => solves * size.solve_seconds * STEP_OVERHEAD,
        };
        level_seconds.push(own + SET_UP_OVERHEAD * count(windows) * size.set_up_seconds);
        forecast.steps += steps;
        forecast.solves += solves;
        // Snapshots stand on the whole grid.
        let kept = snapshots(problem) * count(plan.coarsest_nodes()) * f * f * 48.0;
        forecast.memory_bytes += memory(size, work, solves) + kept;
        let mut report = grid_report(problem, &placement, &size.grid, f, speed);
        report.steps = rounded(steps);
        forecast.grids.push(report);
    }
    if let (Some(work), Some(finest)) = (work, sizes.last()) {
        forecast.memory_bytes += work.elimination_bytes(finest);
    }
    // Levels that the target asks for come after the first, one by one.
    let (at_first, later) = level_seconds.split_at(levels_wanted(&problem.accuracy).min(level_seconds.len()));
    let later: f64 = later.iter().sum();
    forecast.time_s = beside(at_first, work.is_some()) + later + points_seconds + PROGRAM_S;
    Ok(forecast)
}

/// Levels that the target will probably take.
fn levels_expected(problem: &Problem, gap_m: f64, steady: bool, speed: f64) -> usize {
    let first = levels_wanted(&problem.accuracy);
    let hard = shielding(&problem.wall, speed) > LEVEL_MORE || near_permeable_wall(problem, gap_m, first) > DOUBT_MORE;
    let more = steady && problem.accuracy.levels.is_none() && hard;
    if more { first + 1 } else { first }
}

/// Vectors of the recurrences of an alternating current, and the two solves of each frequency.
fn alternating_work(problem: &Problem) -> Option<SettledWork> {
    let Travel::Alternating(law) = &problem.travel else { return None };
    let vectors = harmonic::vectors(law) + 2.0 * count(law.frequencies_hz.len());
    Some(SettledWork { share: Share { reach: 0.0, most: 0, vectors, eliminated: 0 }, speeds: 1 })
}

fn fastest(speeds: &[f64]) -> f64 {
    speeds.iter().copied().fold(0.0, f64::max)
}

fn cores() -> usize {
    std::thread::available_parallelism().map_or(1, std::num::NonZero::get)
}

/// Work for settled fields.
#[derive(Debug, Clone, Copy)]
struct SettledWork {
    share: Share,
    speeds: usize,
}

impl SettledWork {
    /// Seconds of a level beside its recurrence: its one speed, where that is eliminated.
    fn own_seconds(self, size: &LevelSize) -> f64 {
        if self.speeds == 1 && self.share.eliminated == 1 { size.elimination_seconds } else { 0.0 }
    }

    /// Seconds that a level adds to the points of a curve, which both cores share.
    fn points_seconds(self, size: &LevelSize, vectors: f64) -> f64 {
        if self.speeds < 2 {
            return 0.0;
        }
        let (served, eliminated) = (count(self.speeds - self.share.eliminated), count(self.share.eliminated));
        let adding = served * vectors * count(size.wall_nodes) * ADDING_S;
        adding + eliminated * size.elimination_seconds / count(cores().min(2))
    }

    /// Bytes of the eliminations under way at once.
    fn elimination_bytes(self, finest: &LevelSize) -> f64 {
        let at_once = if self.share.eliminated > 0 { 2.0 } else { 0.0 };
        at_once * count(elimination_bytes(finest.grid.nr() - 2, finest.grid.nz() - 2))
    }
}

/// The finest level beside the others (the coarsest once more on half the domain); in a march the coarsest goes before all.
fn beside(level_seconds: &[f64], settled: bool) -> f64 {
    let first = level_seconds.first().copied().unwrap_or(0.0);
    let finest = level_seconds.last().copied().unwrap_or(0.0);
    let others = level_seconds.iter().sum::<f64>() - finest + if settled { first } else { 0.0 };
    let before = if settled { 0.0 } else { first };
    before + if cores() > 1 { finest.max(others) } else { finest + others }
}

fn sizes(problem: &Problem, plan: &GridPlan, grids: Vec<Grid>) -> Result<Vec<LevelSize>, SolveFault> {
    grids.into_iter().map(|grid| LevelSize::new(problem, plan, grid)).collect()
}

impl LevelSize {
    /// Assembles and factors one level, and times a few solves.
    fn new(problem: &Problem, plan: &GridPlan, grid: Grid) -> Result<Self, SolveFault> {
        let begin = Instant::now();
        let materials = Materials::new(&problem.wall, &Regions::new(&grid, &plan.rectangles));
        let operators = Operators::new(grid, materials);
        let direct = DirectPlan::new(&operators)?;
        let mut factor = direct.factor(&operators, 0.0)?;
        let set_up_seconds = begin.elapsed().as_secs_f64();
        let mut right = vec![0.0; operators.unknowns()];
        operators.wall.unknown.iter().for_each(|&u| right[u] = 1.0);
        let mut psi = right.clone();
        factor.solve_in_place(&mut psi);
        let begin = Instant::now();
        for _ in 0..TIMED_SOLVES {
            psi.copy_from_slice(&right);
            factor.solve_in_place(&mut psi);
            factor.check(&operators, &psi, &right, f64::INFINITY)?;
        }
        Ok(Self {
            unknowns: operators.unknowns(),
            wall_nodes: operators.wall.len(),
            factor_bytes: direct.factor_bytes(),
            set_up_seconds,
            solve_seconds: begin.elapsed().as_secs_f64() / count(TIMED_SOLVES),
            elimination_seconds: elimination_seconds(&operators)?,
            grid: operators.grid,
        })
    }
}

/// Steps and back-solves of a march on one level.
fn march_work(problem: &Problem, plan: &GridPlan, f: f64) -> (f64, f64) {
    // Free motion takes v dt <= h and a ladder of powers of two; where the speed is held, v dt = h / 2.
    let pull = if problem.wall.is_permeable() { 1.0 } else { 0.0 };
    if let Some(steps) = march::prescribed_steps(problem, plan) {
        return (f * steps, f * steps * (1.0 + pull));
    }
    let (distance, strides_a_cell, columns) = match &problem.travel {
        Travel::Traverse(t) => ((t.to_m - t.from_m).abs(), 2.0, 1.0),
        Travel::Free(law) => ((law.until_m - law.release_m).abs(), 1.45, 2.0),
        Travel::Steady { .. } | Travel::Sine(_) | Travel::Table(_) | Travel::Alternating(_) => (0.0, 0.0, 0.0),
    };
    let steps = f * strides_a_cell * distance / plan.axial_cell_m;
    (steps, steps * (columns + pull))
}

/// Bytes of one level: factors with workspace, operators, stored vectors.
fn memory(size: &LevelSize, work: Option<SettledWork>, solves: f64) -> f64 {
    let factors = if work.is_some() { 1.0 } else { KEPT_FACTORS };
    let vectors = work.map_or(0.0, |_| solves * count(size.wall_nodes) * 16.0);
    let nodes = count(size.grid.nodes());
    factors * count(size.factor_bytes) + nodes * NODE_BYTES + vectors
}

fn snapshots(problem: &Problem) -> f64 {
    let distance = match &problem.travel {
        Travel::Traverse(t) => (t.to_m - t.from_m).abs(),
        Travel::Free(law) => (law.until_m - law.release_m).abs(),
        Travel::Sine(sine) => 4.0 * sine.amplitude_m,
        Travel::Table(table) => table.position_m.windows(2).map(|z| (z[1] - z[0]).abs()).sum(),
        Travel::Steady { .. } | Travel::Alternating(_) => 0.0,
    };
    let time = match &problem.travel {
        Travel::Traverse(t) => distance / t.speed_m_per_s,
        Travel::Free(law) => law.time_limit_s,
        Travel::Sine(sine) => sine.period_s(),
        Travel::Table(table) => table.time_s.last().zip(table.time_s.first()).map_or(0.0, |(end, start)| end - start),
        Travel::Steady { .. } | Travel::Alternating(_) => 0.0,
    };
    match &problem.snapshots {
        SnapshotPlan::None => 0.0,
        SnapshotPlan::Automatic => 1.0,
        SnapshotPlan::EveryTravel { step_m } => 1.0 + distance / step_m,
        SnapshotPlan::EveryTime { step_s } => 1.0 + time / step_s,
        SnapshotPlan::Instants { times_s } => count(times_s.len()),
    }
}

#[expect(clippy::cast_precision_loss, reason = "sizes stay far below 2^52")]
fn count(n: usize) -> f64 {
    n as f64
}

#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "a step count, positive and small")]
fn rounded(x: f64) -> usize {
    x.round() as usize
}

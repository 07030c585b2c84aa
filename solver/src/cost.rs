//! What a solve will take: grids, steps, memory and time, before it starts.
//!
//! The grids and factors are sized exactly (symbolic factorisation); a few back-solves on the coarsest level tell this machine's speed.
//! Time and memory are meant to hold within a factor of two.

use std::time::Instant;

use lenzbore_mesh::{Grid, Refinement, Regions};

use crate::fault::SolveFault;
use crate::grid_report::grid_report;
use crate::grid_rules::{GridPlan, reynolds_per_speed};
use crate::linear::{Factor, Pattern};
use crate::march;
use crate::materials::Materials;
use crate::operators::Operators;
use crate::outcome::{GridReport, Regime};
use crate::placement::Placement;
use crate::problem::{Problem, SnapshotPlan, Travel};
use crate::regime::regime;
use crate::settled;
use crate::target::levels_wanted;

/// Back-solves timed.
const TIMED_SOLVES: u32 = 6;
/// Share of a time step that is not back-solves (sources, residual, forces).
const STEP_OVERHEAD: f64 = 1.35;
/// Factors kept by a level of a march.
const KEPT_FACTORS: f64 = 4.0;

/// The forecast of a solve.
#[derive(Debug, Clone, PartialEq)]
pub struct Forecast {
    /// Grid levels, coarse to fine.
    pub grids: Vec<GridReport>,
    /// Unknowns on the finest level.
    pub unknowns: usize,
    /// Stored entries of the finest level's factor.
    pub factor_entries: usize,
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
    let (plan, settled) = match (curve_speed_m_per_s, &problem.travel) {
        (Some(speed), _) => (settled::plan(problem, &placement, speed)?, true),
        (None, Travel::Steady { velocity_m_per_s: v }) => (settled::plan(problem, &placement, *v)?, true),
        (None, _) => (march::plan(problem, &placement)?.0, false),
    };
    let factors = if settled { 1.0 } else { KEPT_FACTORS };
    let coarsest = count(plan.coarsest_nodes());
    let level = |f: Refinement| {
        let nodes = coarsest * f.factor() * f.factor();
        nodes * (factors * 12.0 * nodes.log2() + 8.0 * 60.0 + snapshots(problem) * 48.0)
    };
    Ok(Refinement::first(levels_wanted(&problem.accuracy)).into_iter().map(level).sum())
}

/// One level's size.
struct LevelSize {
    grid: Grid,
    unknowns: usize,
    wall_nodes: usize,
    entries: usize,
    seconds_per_solve: f64,
}

/// Forecasts [`crate::solve`] for the problem's own law, or [`crate::drag_curve`] up to `curve_speed_m_per_s` where given.
///
/// # Errors
/// A grid that cannot be built.
pub fn forecast(problem: &Problem, curve_speed_m_per_s: Option<f64>) -> Result<Forecast, SolveFault> {
    let placement = Placement::new(problem);
    let (plan, speed) = match (curve_speed_m_per_s, &problem.travel) {
        (Some(speed), _) => (settled::plan(problem, &placement, speed)?, speed),
        (None, Travel::Steady { velocity_m_per_s: v }) => (settled::plan(problem, &placement, *v)?, v.abs()),
        (None, _) => march::plan(problem, &placement)?,
    };
    let settled = curve_speed_m_per_s.is_some() || matches!(problem.travel, Travel::Steady { .. });
    let refinements = Refinement::first(levels_wanted(&problem.accuracy));
    let sizes = sizes(problem, &plan, &refinements)?;
    let mut forecast = Forecast {
        grids: Vec::new(),
        unknowns: sizes.last().map_or(0, |s| s.unknowns),
        factor_entries: sizes.last().map_or(0, |s| s.entries),
        solves: 0.0,
        steps: 0.0,
        memory_bytes: 0.0,
        time_s: 0.0,
        regime: regime(problem, &placement, speed),
        gap_m: placement.gap_m,
    };
    let mut level_seconds = Vec::new();
    for (size, refinement) in sizes.iter().zip(&refinements) {
        let f = refinement.factor();
        let (steps, solves) =
            if settled { (0.0, vectors(problem, speed) + 2.0) } else { march_work(problem, &plan, f) };
        let overhead = if settled { 1.2 } else { STEP_OVERHEAD };
        level_seconds.push(solves * size.seconds_per_solve * overhead + set_up(size));
        forecast.steps += steps;
        forecast.solves += solves;
        forecast.memory_bytes += memory(problem, size, settled, solves);
        let mut report = grid_report(problem, &placement, &size.grid, f, speed);
        report.steps = rounded(steps);
        forecast.grids.push(report);
    }
    forecast.time_s = if settled { level_seconds.iter().sum::<f64>() * 1.1 } else { beside(&level_seconds) };
    Ok(forecast)
}

/// The coarsest level first, then the finest beside the others (the coarsest once more on half the domain).
fn beside(level_seconds: &[f64]) -> f64 {
    let first = level_seconds.first().copied().unwrap_or(0.0);
    let finest = level_seconds.last().copied().unwrap_or(0.0);
    let all: f64 = level_seconds.iter().sum();
    first + finest.max(all - finest)
}

fn sizes(problem: &Problem, plan: &GridPlan, refinements: &[Refinement]) -> Result<Vec<LevelSize>, SolveFault> {
    let mut sizes: Vec<LevelSize> = Vec::with_capacity(refinements.len());
    let mut seconds_per_entry = 0.0;
    for &refinement in refinements {
        let grid = plan.grid(refinement);
        let materials = Materials::new(&problem.wall, &Regions::new(&grid, &plan.rectangles));
        let operators = Operators::new(grid, materials);
        let pattern = Pattern::new(&operators.stiffness)?;
        let entries = pattern.factor_entries();
        if sizes.is_empty() {
            let mut factor = Factor::new(&pattern, &operators.stiffness, None)?;
            seconds_per_entry = timed(&mut factor, operators.unknowns()) / count(entries);
        }
        sizes.push(LevelSize {
            unknowns: operators.unknowns(),
            wall_nodes: operators.wall.len(),
            entries,
            seconds_per_solve: seconds_per_entry * count(entries),
            grid: operators.grid,
        });
    }
    Ok(sizes)
}

/// Seconds of a back-solve.
fn timed(factor: &mut Factor, unknowns: usize) -> f64 {
    let mut column = vec![1.0; unknowns];
    factor.solve_in_place(&mut column);
    let begin = Instant::now();
    for _ in 0..TIMED_SOLVES {
        column.fill(1.0);
        factor.solve_in_place(&mut column);
    }
    begin.elapsed().as_secs_f64() / f64::from(TIMED_SOLVES)
}

/// Assembly, ordering and factorisation: as long as some tens of back-solves.
fn set_up(size: &LevelSize) -> f64 {
    40.0 * size.seconds_per_solve
}

/// Recurrence vectors for settled fields, from the magnetic Reynolds number and the wall's relative thickness.
fn vectors(problem: &Problem, speed: f64) -> f64 {
    let wall = &problem.wall;
    let reynolds = reynolds_per_speed(wall) * speed;
    let relative = (wall.outer_radius_m() - wall.inner_radius_m()) / wall.outer_radius_m();
    4.0 + reynolds * (1.0 + 12.0 * relative)
}

/// Steps and back-solves of a march on one level.
fn march_work(problem: &Problem, plan: &GridPlan, f: f64) -> (f64, f64) {
    let (distance, strides_a_cell, columns) = match &problem.travel {
        Travel::Traverse(t) => ((t.to_m - t.from_m).abs(), 2.0, 1.0),
        Travel::Free(law) => ((law.until_m - law.release_m).abs(), 2.0, 2.0),
        Travel::Steady { .. } => (0.0, 0.0, 0.0),
    };
    let pull = if problem.wall.is_permeable() { 1.0 } else { 0.0 };
    let steps = f * strides_a_cell * distance / plan.axial_cell_m;
    (steps, steps * (columns + pull))
}

/// Bytes of one level: factors with workspace, operators, stored vectors, snapshots.
fn memory(problem: &Problem, size: &LevelSize, settled: bool, solves: f64) -> f64 {
    let factors = if settled { 1.0 } else { KEPT_FACTORS };
    let vectors = if settled { solves * count(size.wall_nodes) * 8.0 } else { 0.0 };
    let nodes = count(size.grid.nodes());
    factors * count(size.entries) * 12.0 + nodes * 8.0 * 60.0 + vectors + snapshots(problem) * nodes * 48.0
}

fn snapshots(problem: &Problem) -> f64 {
    let distance = match &problem.travel {
        Travel::Traverse(t) => (t.to_m - t.from_m).abs(),
        Travel::Free(law) => (law.until_m - law.release_m).abs(),
        Travel::Steady { .. } => 0.0,
    };
    let time = match &problem.travel {
        Travel::Traverse(t) => distance / t.speed_m_per_s,
        Travel::Free(law) => law.time_limit_s,
        Travel::Steady { .. } => 0.0,
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

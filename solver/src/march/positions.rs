//! The zero-speed damping coefficient against position in a wall with ends.
//!
//! As the speed vanishes, the currents follow from the static field psi_0 of the mover (and of a permeable wall) alone, and the drag over
//! the speed is their heat over the speed squared:
//!
//!   c(z) = 2 pi sum G (d psi_0 / dz)^2,   z the mover's position, psi_0 taken at fixed points of the wall.
//!
//! Both sides of a wall's end stand on a node line, so the sum runs in even powers of the cell size.

use lenzbore_mesh::Refinement;

use super::level::MarchLevel;
use super::lines::LevelLines;
use crate::band::{self, Ladder};
use crate::corner::corner_powers;
use crate::fault::SolveFault;
use crate::grid_report::grid_report;
use crate::grid_rules::{Frame, GridPlan};
use crate::monitor::Monitor;
use crate::outcome::{
    AtPosition, Basis, Caution, Figure, GridReport, Location, Outcome, Stop, Sweeps, Trace, WorkCounters,
};
use crate::placement::Placement;
use crate::problem::Problem;
use crate::regime::regime;
use crate::target::{MOST_LEVELS, refine, verdict};

/// One level: c at each position.
struct Level {
    damping: Vec<f64>,
    report: GridReport,
    counters: WorkCounters,
}

/// The zero-speed damping coefficient at each of `positions`, m, with bands; the figure is the greatest of them.
///
/// # Errors
/// See [`SolveFault`].
pub(crate) fn damping_against_position(
    problem: &Problem,
    positions: &[f64],
    monitor: &dyn Monitor,
) -> Result<Outcome, SolveFault> {
    if positions.is_empty() {
        return Err(SolveFault::Unsuited("damping against position needs a position"));
    }
    let placement = Placement::new(problem);
    let low = positions.iter().copied().fold(f64::INFINITY, f64::min);
    let high = positions.iter().copied().fold(f64::NEG_INFINITY, f64::max);
    let plan = GridPlan::new(problem, &placement, Frame::Wall { low, high, speed: 0.0 })?;
    let on = |refinement, half| level(problem, &placement, &plan, (refinement, half), (positions, low, high), monitor);
    let mut levels: Vec<Level> = Vec::new();
    let mut cut: Option<Vec<f64>> = None;
    refine(&problem.accuracy, MOST_LEVELS, |count| {
        for &refinement in &Refinement::first(count)[levels.len()..] {
            levels.push(on(refinement, false)?);
        }
        if cut.is_none() {
            cut = Some(on(Refinement::COARSEST, true)?.damping);
        }
        Ok(outcome(problem, &placement, positions, &levels, cut.as_deref().unwrap_or_default()))
    })
}

fn level(
    problem: &Problem,
    placement: &Placement,
    plan: &GridPlan,
    (refinement, half): (Refinement, bool),
    (positions, low, high): (&[f64], f64, f64),
    monitor: &dyn Monitor,
) -> Result<Level, SolveFault> {
    let lines = LevelLines::new(plan, None, refinement, half);
    let mut level = MarchLevel::new(problem, placement, lines, None, (low, high))?;
    let nodes = level.operators.wall.len();
    let (mut own, mut slope) = (vec![0.0; nodes], vec![0.0; nodes]);
    let mut damping = Vec::with_capacity(positions.len());
    for &position in positions {
        if monitor.cancelled() {
            return Err(SolveFault::Interrupted);
        }
        level.fill_source(position, &mut own, &mut slope);
        let (total, _) = level.field_at_rest(&slope)?;
        let wall = &level.operators.wall;
        let sum: f64 = wall.conductance.iter().zip(&total).map(|(g, s)| g * s * s).sum();
        damping.push(2.0 * std::f64::consts::PI * sum);
    }
    let report = grid_report(problem, placement, &level.operators.grid, refinement.factor(), 0.0);
    Ok(Level { damping, report, counters: level.counters })
}

fn outcome(problem: &Problem, placement: &Placement, positions: &[f64], levels: &[Level], cut: &[f64]) -> Outcome {
    let factors: Vec<f64> = levels.iter().map(|l| l.report.refinement).collect();
    let corners = corner_powers(&problem.wall, factors.len());
    let ladder = |k: usize| {
        let values = levels.iter().map(|l| l.damping[k]).collect();
        match &corners {
            Some(powers) => Ladder::beside_corners(&factors, values, powers),
            None => Ladder::new(&factors, values),
        }
    };
    let ladders: Vec<Ladder> = (0..positions.len()).map(ladder).collect();
    let point = |(k, &position_m): (usize, &f64)| {
        let change = cut.get(k).map_or(0.0, |c| c - levels[0].damping[k]);
        AtPosition { position_m, damping: ladders[k].value, damping_band: band::one_route(&ladders[k], change, 0.0) }
    };
    let points: Vec<AtPosition> = positions.iter().enumerate().map(point).collect();
    let figures: Vec<Figure> = greatest(&points, &ladders).into_iter().collect();
    let mut counters = WorkCounters::default();
    for level in levels {
        counters.factorisations += level.counters.factorisations;
        counters.solves += level.counters.solves;
    }
    Outcome {
        regime: regime(problem, placement, 0.0),
        grids: levels.iter().map(|l| l.report.clone()).collect(),
        counters,
        cautions: cautions(problem),
        stop: Stop::Settled,
        accuracy: verdict(&figures, problem.accuracy.target_relative, levels.len()),
        trace: Trace::default(),
        curve: None,
        frequency: None,
        strokes: None,
        thermal: None,
        slotted: None,
        sweeps: Sweeps { positions: points, length_m: problem.wall.length_m(), ..Sweeps::default() },
        stations: Vec::new(),
        forces: None,
        ledger: None,
        fields: None,
        figures,
    }
}

/// The greatest coefficient of those at the positions asked for, and where.
fn greatest(points: &[AtPosition], ladders: &[Ladder]) -> Option<Figure> {
    let best = (0..points.len()).max_by(|&a, &b| points[a].damping.total_cmp(&points[b].damping))?;
    let point = points[best];
    Some(Figure {
        name: "damping_coefficient_greatest".to_owned(),
        value: point.damping,
        unit: "N s/m",
        band: point.damping_band,
        basis: Basis::Extrapolated,
        location: Some(Location { z_m: Some(point.position_m), ..Location::default() }),
        levels: ladders[best].levels.clone(),
    })
}

fn cautions(problem: &Problem) -> Vec<Caution> {
    if !problem.wall.is_permeable() {
        return Vec::new();
    }
    let text = "A permeable wall with ends pulls on the mover at rest too: the damping coefficient leaves that static pull out.";
    vec![Caution { text: text.to_owned() }]
}

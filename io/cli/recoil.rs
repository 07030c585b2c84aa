//! How much the wall's back-action on the magnets' recoil permeability, which no field solution here has, would change the drag.

use lenzbore_solver::fault::SolveFault;
use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::outcome::Outcome;
use lenzbore_solver::problem::{Problem, Travel};
use lenzbore_solver::recoil_back_action;

use crate::end::End;

/// The words of [`lenzbore_io::case::BACK_ACTION`] with its size at the speeds that matter; none where no magnet has a recoil
/// permeability, or nothing moves.
pub fn back_action(problem: &Problem, outcome: &Outcome, monitor: &dyn Monitor) -> Result<Option<String>, End> {
    let speeds = speeds(problem, outcome);
    if problem.mover.recoil.is_none() || speeds.is_empty() {
        return Ok(None);
    }
    let changes = match recoil_back_action(problem, &speeds, monitor) {
        Ok(changes) => changes,
        Err(SolveFault::Interrupted) => return Err(End::Interrupted),
        Err(fault) => {
            return Ok(Some(format!("{}; its size could not be found: {fault}", lenzbore_io::case::BACK_ACTION)));
        }
    };
    let each: Vec<String> = speeds.iter().zip(&changes).map(|(v, change)| size(*v, *change)).collect();
    let kind = match problem.travel {
        Travel::Steady { .. } => "settled fields, the magnets meshed in their own frame, coarsest grid",
        _ => "estimated from settled fields at these speeds, the magnets meshed in their own frame, coarsest grid",
    };
    Ok(Some(format!("{}: it would {} ({kind})", lenzbore_io::case::BACK_ACTION, each.join(", "))))
}

fn size(speed: f64, change: f64) -> String {
    let way = if change < 0.0 { "lower" } else { "raise" };
    format!("{way} the drag by {:.2} % at {speed:.4} m/s", 100.0 * change.abs())
}

/// The speed of the greatest drag, and the greatest at which a tenth of it acts; of a curve its critical and its greatest speed.
fn speeds(problem: &Problem, outcome: &Outcome) -> Vec<f64> {
    let mut speeds: Vec<f64> = Vec::new();
    if let Some(curve) = &outcome.curve {
        speeds.extend(outcome.figures.iter().find(|f| f.name == "critical_speed").map(|f| f.value));
        speeds.push(curve.points.iter().map(|p| p.speed_m_per_s).fold(0.0, f64::max));
    } else if let Travel::Steady { velocity_m_per_s } = problem.travel {
        speeds.push(velocity_m_per_s.abs());
    } else {
        let trace = &outcome.trace;
        let points: Vec<(f64, f64)> =
            trace.velocity_m_per_s.iter().map(|v| v.abs()).zip(trace.drag_newton.iter().copied()).collect();
        let peak = points.iter().copied().max_by(|a, b| a.1.total_cmp(&b.1)).unwrap_or((0.0, 0.0));
        speeds.push(peak.0);
        speeds.push(points.iter().filter(|p| p.1 >= 0.1 * peak.1).map(|p| p.0).fold(0.0, f64::max));
    }
    speeds.retain(|v| *v > 0.0);
    speeds.dedup_by(|a, b| (*a - *b).abs() <= 0.01 * a.abs());
    speeds
}

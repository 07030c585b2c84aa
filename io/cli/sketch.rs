//! The parts to scale in letters: a half section, axis along the bottom, up the tube to the right.

use lenzbore_solver::problem::{Part, Problem};
use lenzbore_solver::sources::Source;

/// Letters along the axis.
const COLUMNS: u16 = 76;
/// Lines across.
const LINES: u16 = 10;
/// Height of a letter over its width on a usual terminal.
const LETTER: f64 = 2.0;

/// A half section: `#` wall, `N` and `S` the halves of a magnet towards its poles, `o` coil, `x` dipole, `.-` the axis.
pub fn half_section(problem: &Problem) -> String {
    let parts = &problem.mover.parts;
    let low = parts.iter().map(|p| p.centre_m - 0.5 * p.outline.length_m).fold(f64::INFINITY, f64::min);
    let high = parts.iter().map(|p| p.centre_m + 0.5 * p.outline.length_m).fold(f64::NEG_INFINITY, f64::max);
    let mover_outer = parts.iter().map(|p| p.outline.outer_radius_m).fold(0.0, f64::max);
    let outer = problem.wall.outer_radius_m().max(mover_outer);
    let line = outer / f64::from(LINES);
    let column = (line / LETTER).max((high - low) / f64::from(COLUMNS - 8));
    let middle = 0.5 * (low + high);
    let mut text =
        format!("half section to scale, {:.2} mm a letter along, {:.2} mm a line across:\n", 1e3 * column, 1e3 * line);
    for k in (0..LINES).rev() {
        let r = (f64::from(k) + 0.5) * line;
        let row: String = (0..COLUMNS)
            .map(|c| letter(problem, r, middle + (f64::from(c) + 0.5 - 0.5 * f64::from(COLUMNS)) * column, column))
            .collect();
        text.push_str("  ");
        text.push_str(row.trim_end());
        text.push('\n');
    }
    let axis: String = ['-', '-', '-', '-', '.', '-'].into_iter().cycle().take(usize::from(COLUMNS)).collect();
    text.push_str("  ");
    text.push_str(&axis);
    text.push('\n');
    text
}

fn letter(problem: &Problem, r: f64, z: f64, column: f64) -> char {
    let inside = |p: &&Part| {
        let o = &p.outline;
        r > o.inner_radius_m && r < o.outer_radius_m && (z - p.centre_m).abs() < 0.5 * o.length_m
    };
    if let Some(part) = problem.mover.parts.iter().find(inside) {
        return match part.source {
            Source::Magnet { remanence_tesla, .. } => {
                if (z - part.centre_m) * remanence_tesla > 0.0 {
                    'N'
                } else {
                    'S'
                }
            }
            Source::Coil { .. } => 'o',
            Source::Dipole { .. } => 'x',
        };
    }
    let dipole = |p: &Part| matches!(p.source, Source::Dipole { .. }) && (z - p.centre_m).abs() <= 0.5 * column;
    if r < problem.wall.outer_radius_m() / f64::from(LINES) && problem.mover.parts.iter().any(dipole) {
        return 'x';
    }
    let wall = problem.wall.layers.iter().any(|l| r > l.inner_radius_m && r < l.outer_radius_m);
    if wall { '#' } else { ' ' }
}

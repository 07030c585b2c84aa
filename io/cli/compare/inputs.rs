//! What the tolerances of the inputs make of each compared value.

use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::spread::{Nominal, Reading};

use super::asked::Asked;
use super::solved::{Need, Solved};
use crate::arguments::SpreadWords;
use crate::end::End;
use crate::spread::{self, Question};

/// Half-widths of the input spread (95 %), cell by cell, and what a reader must know of them.
pub fn input_halves(
    asked: &Asked<'_>,
    ours: &[Reading],
    monitor: &dyn Monitor,
) -> Result<(Vec<f64>, Vec<String>), End> {
    let mut halves = vec![0.0; ours.len()];
    let mut cautions: Vec<String> = Vec::new();
    for (k, group) in asked.groups.iter().enumerate() {
        let cells: Vec<usize> = (0..ours.len()).filter(|c| asked.cells[*c].group == k).collect();
        let name = |cell: usize| {
            let c = asked.cells[cell];
            format!("{} of line {}", asked.table.ordinates[c.ordinate].name, asked.table.rows[c.row].line)
        };
        let nominal: Vec<Nominal> =
            cells.iter().map(|&c| Nominal { name: name(c), unit: "", reading: ours[c] }).collect();
        let need: &Need = &asked.needs[k];
        let answer = |case: &lenzbore_io::case::ResolvedCase, monitor: &dyn Monitor| -> Result<Vec<Nominal>, End> {
            let solved = Solved::by_field(case, need, monitor)?;
            let read = |&c: &usize| {
                let cell = asked.cells[c];
                let reading = solved.read(asked.table, cell.row, cell.ordinate, asked.asks[cell.ordinate]).ok()?;
                Some(Nominal { name: name(c), unit: "", reading })
            };
            Ok(cells.iter().filter_map(read).collect())
        };
        let speeds = (!need.run).then_some(need.speeds.as_slice()).filter(|s| !s.is_empty());
        let question = Question {
            input: &group.input,
            case: &group.case,
            size: (&group.case.problem, speeds),
            nominal: &nominal,
            answer: &answer,
            worst: false,
            monitor,
        };
        let study = spread::study(&question, &SpreadWords { no_spread: false, monte_carlo: None, seed: 1 })?;
        for &c in &cells {
            if let Some(figure) = study.figure(&name(c)) {
                halves[c] = figure.half_width();
                if !figure.complete() {
                    cautions.push(format!(
                        "{}: not had in every varied run, so its input spread is incomplete",
                        figure.name
                    ));
                }
            }
        }
    }
    Ok((halves, cautions))
}

//! Everything that is compared: the cells of the table in one row, and what answers each.

use lenzbore_io::table::{Entry, Table, TableFault};
use lenzbore_solver::comparison::{Likeness, likeness};
use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::problem::Problem;
use lenzbore_solver::spread::Reading;

use super::groups::Group;
use super::solved::{Ask, Need, Solved};
use crate::end::End;
use crate::spread::side_by_side;

/// A cell that is compared.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Cell {
    pub row: usize,
    pub ordinate: usize,
    pub group: usize,
}

/// The table and the cases that it asks.
pub struct Asked<'a> {
    pub table: &'a Table,
    /// Where the answer to each ordinate comes from.
    pub asks: Vec<Ask>,
    pub groups: Vec<Group>,
    pub needs: Vec<Need>,
    /// The cells in the order of the rows.
    pub cells: Vec<Cell>,
    pub monitor: &'a dyn Monitor,
}

impl<'a> Asked<'a> {
    pub fn new(table: &'a Table, asks: Vec<Ask>, groups: Vec<Group>, monitor: &'a dyn Monitor) -> Self {
        let needs = groups.iter().map(|g| Need::of(table, &g.rows, &asks)).collect();
        let mut cells: Vec<Cell> = Vec::new();
        for (group, g) in groups.iter().enumerate() {
            for &row in &g.rows {
                let given = table.rows[row].values.iter().enumerate().filter(|(_, v)| v.is_some());
                cells.extend(given.map(|(ordinate, _)| Cell { row, ordinate, group }));
            }
        }
        cells.sort_by_key(|c| (c.row, c.ordinate));
        Self { table, asks, groups, needs, cells, monitor }
    }

    /// The table's value at a cell.
    pub fn entry(&self, cell: Cell) -> Option<&Entry> {
        self.table.rows[cell.row].values[cell.ordinate].as_ref()
    }

    /// The table's values, cell by cell.
    pub fn values(&self) -> Vec<f64> {
        self.cells.iter().map(|c| self.entry(*c).map_or(f64::NAN, |e| e.value)).collect()
    }

    /// Our values by the field, every case side by side; faults of rows that have no answer point into the table.
    pub fn field(&self) -> Result<(Vec<Reading>, Vec<String>), End> {
        let solved = self.solve("field solution", &|k| self.groups[k].case.problem.clone())?;
        let mut faults = Vec::new();
        let mut out = Vec::new();
        for cell in &self.cells {
            match solved[cell.group].read(self.table, cell.row, cell.ordinate, self.asks[cell.ordinate]) {
                Ok(reading) => out.push(reading),
                Err(fault) => {
                    let row = &self.table.rows[cell.row];
                    let of_the_row = matches!(fault, TableFault::OutOfRange { .. });
                    let place = row.at_place.clone().filter(|_| of_the_row);
                    let place = place.or_else(|| self.entry(*cell).map(|e| e.place.clone()));
                    faults.extend(place.map(|p| (p, fault)));
                }
            }
        }
        if !faults.is_empty() {
            return Err(self.table.diagnostics(faults).into());
        }
        let mut cautions: Vec<String> = Vec::new();
        for text in solved.into_iter().flat_map(|s| s.cautions) {
            if !cautions.contains(&text) {
                cautions.push(text);
            }
        }
        Ok((out, cautions))
    }

    fn solve(&self, doing: &str, problem: &(dyn Fn(usize) -> Problem + Sync)) -> Result<Vec<Solved>, End> {
        let jobs: Vec<usize> = (0..self.groups.len()).collect();
        let first = &self.groups[0];
        let speeds = (!self.needs[0].run).then_some(self.needs[0].speeds.as_slice()).filter(|s| !s.is_empty());
        side_by_side(&jobs, (&first.case.problem, speeds), self.monitor, doing, &|k, monitor| {
            Solved::of_problem(&problem(*k), &self.groups[*k].case, &self.needs[*k], monitor)
        })
    }

    /// The field's values of changed cases, cell by cell; `None` where a changed case is none, or gives no such figure.
    pub fn changed(&self, change: &(dyn Fn(&Problem) -> Problem + Sync)) -> Result<Option<Vec<Option<f64>>>, End> {
        let problem = |k: usize| change(&self.groups[k].case.problem);
        if (0..self.groups.len()).any(|k| !problem(k).faults().is_empty()) {
            return Ok(None);
        }
        let solved = self.solve("a changed case", &problem)?;
        Ok(Some(self.read_all(&solved)))
    }

    /// What is read from each case's answers, cell by cell.
    pub fn read_all(&self, solved: &[Solved]) -> Vec<Option<f64>> {
        let read = |c: &Cell| solved[c.group].read(self.table, c.row, c.ordinate, self.asks[c.ordinate]);
        self.cells.iter().map(|c| read(c).ok().map(|r| r.value)).collect()
    }

    /// How closely values say what the table says.
    pub fn likeness(&self, values: &[Option<f64>], scales: &[f64]) -> Option<Likeness> {
        // A model that has no answer to most of the table explains nothing.
        likeness(&self.values(), values, scales).filter(|l| 2 * l.points > self.cells.len())
    }
}

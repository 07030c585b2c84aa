//! Which cells of a stored field go onto the page.

use hdf5::File;
use serde_json::{Value, json};

use super::stored::{CellArray, StoredFields};
use crate::layout::Layout;
use crate::report::thin;
use crate::result::IoFault;

/// Air shown beside the outermost body, over its radius.
const BESIDE: f64 = 0.35;
/// Reach above and below the mover where the whole wall is shown, over the outermost radius.
const BEYOND: f64 = 2.5;
/// How a field may be cut, the best first: reach about the mover over the outermost radius (none: the whole wall), cells merged along,
/// cells merged across outside the wall.
const CUTS: [(Option<f64>, usize, usize); 10] = [
    (None, 1, 1),
    (Some(6.0), 1, 1),
    (None, 2, 1),
    (Some(4.0), 1, 1),
    (Some(4.0), 2, 1),
    (Some(4.0), 2, 2),
    (Some(3.0), 3, 2),
    (Some(2.5), 4, 3),
    (Some(2.5), 8, 4),
    (Some(2.5), 16, 8),
];

/// What is known before anything is cut.
#[derive(Debug)]
pub(super) struct Plan {
    /// Lower and upper end of the mover from its reference point, m.
    pub body_m: (f64, f64),
    /// Radius of the outermost body, m.
    pub outer_radius_m: f64,
    /// Radius of the bore, m.
    pub inner_radius_m: f64,
    /// Heights of the wall; none where it is endless.
    wall_m: Option<(f64, f64)>,
    /// Instants kept.
    instants: Vec<usize>,
    /// Edges of all cells.
    r_m: Vec<f64>,
    z_m: Vec<f64>,
    positions_m: Vec<f64>,
    /// Columns that are never merged: those within the wall.
    wall_radii_m: (f64, f64),
}

/// One way to cut.
#[derive(Debug)]
pub(super) struct Cut {
    /// Groups of columns: first cell and behind the last.
    columns: Vec<(usize, usize)>,
    /// Groups of rows over the whole height that any instant shows.
    lines: Vec<(usize, usize)>,
    /// For each instant kept: its number, and which groups of rows it shows.
    windows: Vec<(usize, usize, usize)>,
    r_m: Vec<f64>,
    z_m: Vec<f64>,
    merged: bool,
    whole: bool,
}

impl Plan {
    /// Looks at grid, instants and layout.
    pub(super) fn new(stored: &StoredFields, layout: Option<&Layout>, most: usize) -> Result<Self, IoFault> {
        let conductor = stored.conductor()?;
        let radii = conductor.map_or((0.0, stored.r_m.last().copied().unwrap_or(0.0)), |c| c.radii);
        let bodies = layout.map_or(&[][..], |l| l.mover.as_slice());
        let low = bodies.iter().map(|b| b.at_m - 0.5 * b.length_m).fold(f64::INFINITY, f64::min);
        let high = bodies.iter().map(|b| b.at_m + 0.5 * b.length_m).fold(f64::NEG_INFINITY, f64::max);
        let body_m = if high >= low { (low, high) } else { (-radii.1, radii.1) };
        let outer = bodies.iter().map(|b| 0.5 * b.outer_diameter_m).fold(radii.1, f64::max);
        let endless = layout.map(|l| l.wall.length_m.is_none());
        let wall_m = conductor.map(|c| c.heights).filter(|_| endless == Some(false));
        Ok(Self {
            body_m,
            outer_radius_m: outer,
            inner_radius_m: radii.0,
            wall_m,
            instants: thin::evenly(stored.times_s.len(), most),
            r_m: stored.r_m.clone(),
            z_m: stored.z_m.clone(),
            positions_m: stored.positions_m.clone(),
            wall_radii_m: radii,
        })
    }

    /// All ways to cut, the best first.
    pub(super) fn cuts(&self) -> impl Iterator<Item = Cut> + '_ {
        CUTS.iter().map(|(reach, along, across)| self.cut(*reach, *along, *across))
    }

    fn cut(&self, reach: Option<f64>, along: usize, across: usize) -> Cut {
        let last = cells_within(&self.r_m, (0.0, (1.0 + BESIDE) * self.outer_radius_m)).1;
        let columns = groups(&self.r_m, (0, last), across, Some(self.wall_radii_m));
        let shown: Vec<(f64, f64)> = self.instants.iter().map(|t| self.heights(*t, reach)).collect();
        let all = shown.iter().fold((f64::INFINITY, f64::NEG_INFINITY), |a, b| (a.0.min(b.0), a.1.max(b.1)));
        let lines = groups(&self.z_m, cells_within(&self.z_m, all), along, None);
        let windows = self.instants.iter().zip(&shown).map(|(t, heights)| {
            let (low, high) = cells_within(&self.z_m, *heights);
            let first = lines.partition_point(|g| g.1 <= low);
            let end = lines.partition_point(|g| g.0 < high).max(first + 1).min(lines.len());
            (*t, first, end)
        });
        let windows = windows.collect();
        Cut {
            columns,
            windows,
            lines,
            r_m: self.r_m.clone(),
            z_m: self.z_m.clone(),
            merged: along * across > 1,
            whole: reach.is_none(),
        }
    }

    /// Heights shown at an instant.
    fn heights(&self, instant: usize, reach: Option<f64>) -> (f64, f64) {
        let about = |position: f64, reach: f64| {
            let margin = reach * self.outer_radius_m;
            (position + self.body_m.0 - margin, position + self.body_m.1 + margin)
        };
        let here = self.positions_m.get(instant).copied().unwrap_or(0.0);
        if let Some(reach) = reach {
            return about(here, reach);
        }
        let Some(wall) = self.wall_m else { return about(here, 2.0 * BEYOND) };
        let ends = self.instants.iter().filter_map(|t| self.positions_m.get(*t)).map(|p| about(*p, BEYOND));
        let margin = BEYOND * self.outer_radius_m;
        ends.fold((wall.0 - margin, wall.1 + margin), |a, b| (a.0.min(b.0), a.1.max(b.1)))
    }
}

/// First cell and the one behind the last that a range touches.
fn cells_within(edges: &[f64], range: (f64, f64)) -> (usize, usize) {
    let cells = edges.len().saturating_sub(1);
    let first = edges.partition_point(|e| *e <= range.0).saturating_sub(1);
    let end = edges.partition_point(|e| *e < range.1).clamp(first + 1, cells.max(first + 1));
    (first.min(cells), end.min(cells))
}

/// Cells in groups of so many, none of which crosses an edge of `kept`, within which every cell stays alone.
fn groups(edges: &[f64], range: (usize, usize), size: usize, kept: Option<(f64, f64)>) -> Vec<(usize, usize)> {
    let alone = |cell: usize| {
        let middle = 0.5 * (edges[cell] + edges[cell + 1]);
        kept.is_some_and(|(low, high)| middle > low && middle < high)
    };
    let mut out = Vec::new();
    let mut from = range.0;
    while from < range.1 {
        let mut end = from + 1;
        while !alone(from) && end < range.1 && end - from < size && !alone(end) {
            end += 1;
        }
        out.push((from, end));
        from = end;
    }
    out
}

/// The cell of a group that stands for it.
fn middle(group: &(usize, usize)) -> usize {
    usize::midpoint(group.0, group.1 - 1)
}

impl Cut {
    /// Columns of cells.
    pub(super) fn columns(&self) -> usize {
        self.columns.len()
    }

    /// Cells of all instants together.
    pub(super) fn count(&self) -> usize {
        self.columns() * self.rows().iter().sum::<usize>()
    }

    /// Rows of cells, instant by instant.
    pub(super) fn rows(&self) -> Vec<usize> {
        self.windows.iter().map(|(_, first, end)| end - first).collect()
    }

    /// Radii of the nodes at the edges of the columns.
    pub(super) fn node_radii(&self) -> Vec<f64> {
        edges(&self.columns, &self.r_m)
    }

    /// Values of whole cells, instant by instant, row by row.
    pub(super) fn cells(&self, file: &File, stored: &StoredFields, array: &CellArray) -> Result<Vec<f64>, IoFault> {
        let (columns, lines): (Vec<usize>, Vec<usize>) =
            (self.columns.iter().map(middle).collect(), self.lines.iter().map(middle).collect());
        self.pick(file, stored, &array.name, &columns, &lines, 0)
    }

    /// Total psi at the nodes at the edges of the cells.
    pub(super) fn nodes(&self, file: &File, stored: &StoredFields) -> Result<Vec<f64>, IoFault> {
        let ends = |groups: &[(usize, usize)]| {
            let mut all: Vec<usize> = groups.iter().map(|g| g.0).collect();
            all.extend(groups.last().map(|g| g.1));
            all
        };
        self.pick(file, stored, "psi_total_Wb_per_rad", &ends(&self.columns), &ends(&self.lines), 1)
    }

    /// Chosen columns and, of the chosen lines, those in each window and `more`.
    fn pick(
        &self,
        file: &File,
        stored: &StoredFields,
        name: &str,
        columns: &[usize],
        lines: &[usize],
        more: usize,
    ) -> Result<Vec<f64>, IoFault> {
        let mut out = Vec::new();
        let (Some(first_column), Some(last_column)) = (columns.first(), columns.last()) else { return Ok(out) };
        for (instant, first, end) in &self.windows {
            let lines = &lines[*first..(end + more).min(lines.len())];
            let (Some(low), Some(high)) = (lines.first(), lines.last()) else { continue };
            let block = stored.slice(file, name, *instant, (*low, high + 1), (*first_column, last_column + 1))?;
            for line in lines {
                out.extend(columns.iter().map(|column| block[[0, line - low, column - first_column]]));
            }
        }
        Ok(out)
    }

    /// Edges of the cells on the page, and which cells of the file they are.
    pub(super) fn about(&self) -> Value {
        let centres = |groups: &[(usize, usize)], edges: &[f64]| {
            let centre = |g: &(usize, usize)| 0.5 * (edges[middle(g)] + edges[middle(g) + 1]);
            groups.iter().map(centre).collect::<Vec<f64>>()
        };
        json!({
            "r_edges": self.node_radii(),
            "z_edges": edges(&self.lines, &self.z_m),
            "r_centres": centres(&self.columns, &self.r_m),
            "z_centres": centres(&self.lines, &self.z_m),
            "r_cells": self.columns.iter().map(middle).collect::<Vec<_>>(),
            "z_cells": self.lines.iter().map(middle).collect::<Vec<_>>(),
        })
    }

    /// Time, position and shown rows of every instant.
    pub(super) fn instants(&self, stored: &StoredFields) -> Vec<Value> {
        let one = |(t, first, end): &(usize, usize, usize)| json!({"index": t, "time": stored.times_s[*t], "position": stored.positions_m[*t], "first": first, "rows": end - first});
        self.windows.iter().map(one).collect()
    }

    /// What was left out.
    pub(super) fn remark(&self, stored: &StoredFields) -> String {
        let mut out = vec![if self.whole {
            "The field about wall and mover".to_owned()
        } else {
            "The field about the mover at each instant".to_owned()
        }];
        out.push(if self.merged {
            ", thinned by whole cells to fit the page (every value shown is that of one cell of run.h5)".to_owned()
        } else {
            ", every cell of the finest grid".to_owned()
        });
        if self.windows.len() < stored.times_s.len() {
            out.push(format!("; {} of {} stored instants", self.windows.len(), stored.times_s.len()));
        }
        out.push(". Values are rounded to seven digits; run.h5 has all of them and the whole domain.".to_owned());
        out.concat()
    }
}

/// Outer edges of groups of cells.
fn edges(groups: &[(usize, usize)], all: &[f64]) -> Vec<f64> {
    let mut out: Vec<f64> = groups.iter().map(|g| all[g.0]).collect();
    out.extend(groups.last().map(|g| all[g.1]));
    out
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn groups_leave_the_wall_alone_and_lose_no_cell() {
        let edges = [0.0, 1.0, 2.0, 3.0, 4.0, 4.5, 5.0, 6.0, 7.0, 8.0, 9.0];
        let all = groups(&edges, (0, 10), 3, Some((4.0, 5.0)));
        assert_eq!(all, [(0, 3), (3, 4), (4, 5), (5, 6), (6, 9), (9, 10)]);
        assert_eq!(groups(&edges, (2, 5), 1, None), [(2, 3), (3, 4), (4, 5)]);
    }

    #[test]
    fn a_range_takes_every_cell_that_it_touches() {
        let edges = [0.0, 1.0, 2.0, 3.0];
        assert_eq!(cells_within(&edges, (0.5, 1.5)), (0, 2));
        assert_eq!(cells_within(&edges, (-9.0, 9.0)), (0, 3));
        assert_eq!(cells_within(&edges, (1.0, 2.0)), (1, 2));
    }
}

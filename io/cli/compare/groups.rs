//! Rows that set the same words of the case are one case: each is read once.

use lenzbore_io::case::ResolvedCase;
use lenzbore_io::table::Table;

use crate::end::End;
use crate::job::CaseInput;

/// One case and the rows that ask it.
pub struct Group {
    /// How it was named, with the rows' words set.
    pub input: CaseInput,
    /// The same, resolved.
    pub case: ResolvedCase,
    /// Indices of the rows.
    pub rows: Vec<usize>,
}

/// Sorts the rows by what they set; `more` gives settings besides those of the table's own columns.
pub fn groups(input: &CaseInput, table: &Table, more: &dyn Fn(usize) -> Vec<String>) -> Result<Vec<Group>, End> {
    let mut keys: Vec<(Vec<String>, Vec<usize>)> = Vec::new();
    for (k, row) in table.rows.iter().enumerate() {
        let sets: Vec<String> = row.settings.iter().flat_map(|s| s.sets.iter().cloned()).chain(more(k)).collect();
        match keys.iter_mut().find(|(s, _)| *s == sets) {
            Some((_, rows)) => rows.push(k),
            None => keys.push((sets, vec![k])),
        }
    }
    let mut out = Vec::new();
    let mut faults: Vec<String> = Vec::new();
    for (sets, rows) in keys {
        let input = input.with(&sets);
        match input.read(&[]) {
            Ok(case) => out.push(Group { input, case, rows }),
            Err(found) => {
                let row = &table.rows[rows[0]];
                let place = row.settings.first().map(|s| &s.place).or(row.at_place.as_ref());
                let place = place.map_or_else(|| format!("line {}", row.line), |p| table.describe(p));
                faults.push(format!("{place}: the case of this row cannot be:\n{found}"));
            }
        }
    }
    if faults.is_empty() { Ok(out) } else { Err(End::Input(faults.join("\n"))) }
}

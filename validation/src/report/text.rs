//! The table on the terminal.

use std::fmt::Write as _;

use super::{Finding, KINDS, Report, number, rough, unit};
use crate::checks::{Check, Comparison};

impl Report {
    /// One line a check, with the comparison that comes nearest to its limit; then all that fall short.
    #[must_use]
    pub fn text(&self) -> String {
        let mut text = String::new();
        let head =
            ["check", "kind", "source", "reference", "ours", "band", "difference", "allowed", "verdict", "figure"]
                .map(str::to_owned);
        let mut rows = vec![head];
        rows.extend(self.findings.iter().map(row));
        let widths = widths(&rows);
        for row in &rows {
            line(&mut text, row, &widths);
        }
        // Writing into a string cannot fail.
        let _ = writeln!(
            text,
            "\nEach line shows the comparison of the check that comes nearest to its limit; difference = ours - reference."
        );
        for (kind, meaning) in KINDS {
            let _ = writeln!(text, "{}: {meaning}.", kind.words());
        }
        self.bad(&mut text);
        let _ = writeln!(text, "\n{}", self.sentence());
        text
    }

    fn bad(&self, text: &mut String) {
        for finding in self.short() {
            let bad = finding.verdict.iter().flat_map(|v| &v.comparisons).filter(|c| !c.passes());
            let _ = writeln!(text, "\n{} falls short:", finding.check.name);
            for comparison in bad {
                let _ = writeln!(text, "  {comparison}");
            }
            let _ = writeln!(text, "  reference: {}", finding.check.source.citation);
        }
        for (finding, error) in self.unanswered() {
            let _ = writeln!(text, "\n{} gave no answer: {error}", finding.check.name);
        }
    }
}

/// The registry, one check a line.
#[must_use]
pub fn list(checks: &[Check]) -> String {
    let mut text = String::new();
    let rows: Vec<[String; 4]> =
        checks.iter().map(|c| [c.name, c.kind.words(), c.source.short, c.about].map(str::to_owned)).collect();
    let widths = widths(&rows);
    for row in &rows {
        line(&mut text, row, &widths);
    }
    text
}

fn row(finding: &Finding) -> [String; 10] {
    let check = finding.check;
    let [name, kind, source] = [check.name, check.kind.words(), check.source.short].map(str::to_owned);
    let verdict = finding.verdict.as_ref().ok();
    let count = verdict.map_or(0, |v| v.comparisons.len());
    let passed = verdict.map_or(0, |v| v.comparisons.iter().filter(|c| c.passes()).count());
    let word = format!("{} ({passed} of {count})", finding.word());
    match verdict.and_then(|v| v.worst()) {
        Some(c) => {
            let [reference, ours, band, difference, allowed] = cells(c);
            [name, kind, source, reference, ours, band, difference, allowed, word, c.what.clone()]
        }
        None => [name, kind, source, "".into(), "".into(), "".into(), "".into(), "".into(), word, "".into()],
    }
}

/// Reference with its unit, ours, band, difference, allowed.
pub(super) fn cells(c: &Comparison) -> [String; 5] {
    let band = c.band.map_or_else(|| "-".to_owned(), rough);
    let reference = format!("{}{}", number(c.expected), unit(c.unit));
    [reference, number(c.found), band, rough(c.difference()), rough(c.allowed)]
}

fn widths<const N: usize>(rows: &[[String; N]]) -> [usize; N] {
    let mut widths = [0; N];
    for row in rows {
        for (width, cell) in widths.iter_mut().zip(row) {
            *width = (*width).max(cell.chars().count());
        }
    }
    widths
}

fn line<const N: usize>(text: &mut String, row: &[String; N], widths: &[usize; N]) {
    let mut line = String::new();
    for (cell, width) in row.iter().zip(widths) {
        let _ = write!(line, "{cell:<width$}  ");
    }
    let _ = writeln!(text, "{}", line.trim_end());
}

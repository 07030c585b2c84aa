//! Faults as plain text: where, what, the line with a caret, what would be legal, the mend.

use std::fmt::{Display, Formatter, Result};

use super::diagnostics::{Diagnostic, Diagnostics};
use super::place::{Place, SourceKind, Sources, floor_boundary};

/// So many faults are shown; the rest are counted.
const MOST_SHOWN: usize = 40;
/// Longest excerpt of a line, in characters.
const LONGEST_EXCERPT: usize = 110;

impl Display for Diagnostics {
    fn fmt(&self, f: &mut Formatter<'_>) -> Result {
        let faults = self.faults();
        for (i, diagnostic) in faults.iter().take(MOST_SHOWN).enumerate() {
            if i > 0 {
                writeln!(f)?;
            }
            one(f, self.sources(), diagnostic)?;
        }
        match faults.len() {
            0 | 1 => Ok(()),
            n if n > MOST_SHOWN => writeln!(f, "\n{n} faults, of which {MOST_SHOWN} are shown"),
            n => writeln!(f, "\n{n} faults"),
        }
    }
}

fn one(f: &mut Formatter<'_>, sources: &Sources, diagnostic: &Diagnostic) -> Result {
    let fault = &diagnostic.fault;
    match &diagnostic.place {
        Some(place) => {
            writeln!(f, "{}: {fault}", header(sources, place))?;
            excerpt(f, sources, place)?;
        }
        None => writeln!(f, "{fault}")?,
    }
    for (place, why) in &diagnostic.related {
        writeln!(f, "  {why}: {}", sources.describe(place))?;
    }
    for line in [fault.legal(), fault.mend()].into_iter().flatten() {
        writeln!(f, "  {line}")?;
    }
    Ok(())
}

fn header(sources: &Sources, place: &Place) -> String {
    match sources.text(place) {
        Some(source) if source.kind == SourceKind::Option => source.label.clone(),
        _ => sources.describe(place),
    }
}

/// The line of the place, and carets below the words meant.
fn excerpt(f: &mut Formatter<'_>, sources: &Sources, place: &Place) -> Result {
    let (Some(source), Some(at)) = (sources.text(place), sources.position(place)) else { return Ok(()) };
    let start = floor_boundary(&source.text, place.start);
    let end = floor_boundary(&source.text, place.end).max(start);
    let Some(line) = source.text.lines().nth(at.line - 1) else { return Ok(()) };
    let line: String = line.chars().filter(|c| *c != '\u{feff}').map(printable).collect();
    let marked = source.text[start..end].lines().next().unwrap_or("").chars().count().max(1);
    let (shown, before) = window(&line, at.column - 1);
    let number = if source.kind == SourceKind::File { at.line.to_string() } else { String::new() };
    let room = shown.chars().count().saturating_sub(before).max(1);
    writeln!(f, "{number:>5} | {shown}")?;
    writeln!(f, "      | {}{}", " ".repeat(before), "^".repeat(marked.min(room)))
}

/// Tabs take one column, control characters a dot, so that the caret stays below its word.
fn printable(c: char) -> char {
    match c {
        '\t' => ' ',
        c if c.is_control() => '.',
        c => c,
    }
}

/// Cuts a long line so that the column stays in sight; returns the piece and the characters before the column in it.
fn window(line: &str, column: usize) -> (String, usize) {
    let skipped = if column > LONGEST_EXCERPT / 2 && line.chars().count() > LONGEST_EXCERPT {
        column - LONGEST_EXCERPT / 2
    } else {
        0
    };
    (line.chars().skip(skipped).take(LONGEST_EXCERPT).collect(), column - skipped)
}

//! Cells of a table, each with its place: the separator is found, quotes are taken off, remarks are left out.

use crate::message::Place;

/// A cell and where it stands.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Cell {
    pub text: String,
    pub place: Place,
}

/// A line of cells.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Line {
    pub number: usize,
    pub cells: Vec<Cell>,
    pub place: Place,
}

/// The separator that the header uses most, outside quotes and brackets.
pub(super) fn separator(text: &str) -> u8 {
    let header = text.lines().find(|l| !is_remark(l)).unwrap_or_default();
    let count = |separator: char| {
        let (mut quoted, mut depth, mut count) = (false, 0_i32, 0_usize);
        for c in header.chars() {
            match c {
                '"' => quoted = !quoted,
                '[' | '(' => depth += 1,
                ']' | ')' => depth -= 1,
                c if c == separator && !quoted && depth <= 0 => count += 1,
                _ => {}
            }
        }
        count
    };
    let candidates = [(b'\t', '\t'), (b';', ';'), (b',', ','), (b'|', '|')];
    let best = candidates.into_iter().max_by_key(|(_, c)| (count(*c), u32::from(*c == ';')));
    best.filter(|(_, c)| count(*c) > 0).map_or(b',', |(b, _)| b)
}

fn is_remark(line: &str) -> bool {
    line.trim().is_empty() || line.trim_start().starts_with('#')
}

/// Every line that has cells.
pub(super) fn lines(text: &str, separator: u8, source: usize) -> Vec<Line> {
    let mut reader = csv::ReaderBuilder::new()
        .delimiter(separator)
        .has_headers(false)
        .flexible(true)
        .comment(Some(b'#'))
        .from_reader(text.as_bytes());
    let mut out = Vec::new();
    // Every text is a table for this reader: with `flexible`, only a failure to read could be an error, and memory has none.
    for record in reader.records().map_while(Result::ok) {
        let start = record.position().map_or(0, |p| usize::try_from(p.byte()).unwrap_or(usize::MAX)).min(text.len());
        let begin = start + text[start..].find(|c| c != '\n' && c != '\r').unwrap_or(0);
        let places = field_places(&text[begin..], separator, begin, record.len());
        let number = 1 + text[..begin].matches('\n').count();
        let cells: Vec<Cell> = record
            .iter()
            .zip(places)
            .map(|(cell, range)| Cell { text: cell.trim().to_owned(), place: Place::new(source, range) })
            .collect();
        if cells.iter().all(|c| c.text.is_empty()) {
            continue;
        }
        let end = cells.last().map_or(begin, |c| c.place.end);
        out.push(Line { number, cells, place: Place::new(source, begin..end) });
    }
    out
}

/// Where each of `count` fields stands in a record that begins at `begin`, without blanks and quotes around.
fn field_places(record: &str, separator: u8, begin: usize, count: usize) -> Vec<std::ops::Range<usize>> {
    let mut places = Vec::with_capacity(count);
    let (mut start, mut quoted) = (0, false);
    for (i, byte) in record.bytes().chain([b'\n']).enumerate() {
        match byte {
            b'"' => quoted = !quoted,
            b if !quoted && (b == separator || b == b'\n' || b == b'\r') => {
                let raw = &record[start..i];
                let lead = raw.len() - raw.trim_start().len();
                let inner = raw.trim().trim_matches('"');
                let lead = lead + usize::from(raw.trim().starts_with('"'));
                places.push(begin + start + lead..begin + start + lead + inner.len().max(1));
                start = i + 1;
                if b != separator || places.len() == count {
                    break;
                }
            }
            _ => {}
        }
    }
    places.resize(count, begin..begin + 1);
    places
}

/// A number as written, with a decimal comma where `comma` allows one; `None` where it is none.
pub(super) fn number(text: &str, comma: bool) -> Option<f64> {
    let plain = text.trim().replace('\u{2212}', "-").replace(['\u{a0}', '\u{202f}'], "");
    let plain =
        if comma && plain.matches(',').count() == 1 && !plain.contains('.') { plain.replace(',', ".") } else { plain };
    let digits = plain.bytes().any(|b| b.is_ascii_digit());
    plain.parse::<f64>().ok().filter(|x| x.is_finite() && digits)
}

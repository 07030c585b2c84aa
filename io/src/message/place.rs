//! Where something stands: a range of bytes in one of the texts that were read.

use std::ops::Range;

/// What kind of text a place points into.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum SourceKind {
    /// A file (or standard input): places have line and column.
    File,
    /// An option of the command line.
    Option,
}

/// One text that was read.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct SourceText {
    /// The file's name as given, or `--set`.
    pub label: String,
    /// The whole text.
    pub text: String,
    /// File or option.
    pub kind: SourceKind,
}

/// A range of bytes in one text of [`Sources`].
#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord)]
pub struct Place {
    /// Index of the text.
    pub source: usize,
    /// First byte.
    pub start: usize,
    /// One past the last byte.
    pub end: usize,
}

impl Place {
    /// From a range of bytes.
    #[must_use]
    pub fn new(source: usize, range: Range<usize>) -> Self {
        Self { source, start: range.start, end: range.end }
    }
}

/// Line and column, both from 1; the column counts characters.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Position {
    /// Line, from 1.
    pub line: usize,
    /// Column in characters, from 1.
    pub column: usize,
}

/// All texts that were read for one case.
#[derive(Debug, Clone, PartialEq, Eq, Default)]
pub struct Sources {
    texts: Vec<SourceText>,
}

impl Sources {
    /// Adds a text and returns its index.
    pub fn add(&mut self, label: &str, text: &str, kind: SourceKind) -> usize {
        self.texts.push(SourceText { label: label.to_owned(), text: text.to_owned(), kind });
        self.texts.len() - 1
    }

    /// The text a place points into.
    #[must_use]
    pub fn text(&self, place: &Place) -> Option<&SourceText> {
        self.texts.get(place.source)
    }

    /// Names of the files read, in the order of reading.
    pub fn files(&self) -> impl Iterator<Item = &str> {
        self.texts.iter().filter(|t| t.kind == SourceKind::File).map(|t| t.label.as_str())
    }

    /// Line and column of the start of a place.
    #[must_use]
    pub fn position(&self, place: &Place) -> Option<Position> {
        let text = &self.text(place)?.text;
        let start = floor_boundary(text, place.start);
        let before = &text[..start];
        let line_start = before.rfind('\n').map_or(0, |i| i + 1);
        Some(Position {
            line: before.matches('\n').count() + 1,
            column: before[line_start..].chars().filter(|c| *c != '\u{feff}').count() + 1,
        })
    }

    /// `sleeve.toml:12:1`, or `--set path=value`.
    #[must_use]
    pub fn describe(&self, place: &Place) -> String {
        match (self.text(place), self.position(place)) {
            (Some(source), Some(at)) if source.kind == SourceKind::File => {
                format!("{}:{}:{}", source.label, at.line, at.column)
            }
            (Some(source), _) => format!("{} {}", source.label, source.text),
            _ => "?".to_owned(),
        }
    }

    /// The written text at a place, without quotes.
    #[must_use]
    pub fn written(&self, place: &Place) -> String {
        let Some(source) = self.text(place) else { return String::new() };
        let start = floor_boundary(&source.text, place.start);
        let end = floor_boundary(&source.text, place.end).max(start);
        source.text[start..end].trim().trim_matches('"').trim_matches('\'').to_owned()
    }
}

/// The last character boundary at or before `index`.
pub(super) fn floor_boundary(text: &str, index: usize) -> usize {
    let mut at = index.min(text.len());
    while !text.is_char_boundary(at) {
        at -= 1;
    }
    at
}

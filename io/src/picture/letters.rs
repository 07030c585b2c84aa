//! The bundled letters: their widths, lowered and raised runs, lines of a given width.

use std::sync::OnceLock;

use skrifa::instance::{LocationRef, Size};
use skrifa::{FontRef, MetadataProvider as _};

/// The upright face.
pub(super) const REGULAR: &[u8] = include_bytes!("../../fonts/LenzboreSans-Regular.ttf");
/// The bold face.
pub(super) const BOLD: &[u8] = include_bytes!("../../fonts/LenzboreSans-Bold.ttf");
/// The name both answer to.
pub(super) const FAMILY: &str = "Lenzbore Sans";

/// Height of a capital letter over its size: for setting a text at mid-height of a point.
pub(super) const CAPITAL: f64 = 0.716;

const LOWERED: f64 = -0.2;
const RAISED: f64 = 0.36;
const SMALL: f64 = 0.7;

/// A stretch of text at one height.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Run<'a> {
    /// The letters.
    pub text: &'a str,
    /// Height above the base line over the letter size.
    pub shift: f64,
    /// Size over the letter size.
    pub scale: f64,
}

/// Splits `_{lowered}` and `^{raised}` stretches off; an unclosed brace is taken as plain text.
pub(super) fn runs(text: &str) -> Vec<Run<'_>> {
    let mut out = Vec::new();
    let mut rest = text;
    while let Some((at, shift)) = next_mark(rest) {
        let Some(end) = rest[at..].find('}').map(|e| at + e) else { break };
        if at > 0 {
            out.push(Run { text: &rest[..at], shift: 0.0, scale: 1.0 });
        }
        out.push(Run { text: &rest[at + 2..end], shift, scale: SMALL });
        rest = &rest[end + 1..];
    }
    if !rest.is_empty() {
        out.push(Run { text: rest, shift: 0.0, scale: 1.0 });
    }
    out
}

fn next_mark(text: &str) -> Option<(usize, f64)> {
    match (text.find("_{"), text.find("^{")) {
        (Some(low), Some(high)) if high < low => Some((high, RAISED)),
        (Some(low), _) => Some((low, LOWERED)),
        (None, Some(high)) => Some((high, RAISED)),
        (None, None) => None,
    }
}

/// Width of a text at letter size `size`, in the unit of `size`; letters the face lacks count as wide as an `M`.
#[must_use]
pub(super) fn width(text: &str, size: f64, bold: bool) -> f64 {
    let table = widths(bold);
    runs(text).iter().map(|run| run.scale * run.text.chars().map(|c| table.of(c)).sum::<f64>()).sum::<f64>() * size
}

/// Breaks a text into lines no wider than `limit`; a single word that is wider is cut.
#[must_use]
pub(super) fn lines(text: &str, size: f64, bold: bool, limit: f64) -> Vec<String> {
    let mut out: Vec<String> = Vec::new();
    let mut line = String::new();
    for word in text.split_whitespace() {
        let longer = if line.is_empty() { word.to_owned() } else { format!("{line} {word}") };
        if width(&longer, size, bold) <= limit {
            line = longer;
            continue;
        }
        if !line.is_empty() {
            out.push(std::mem::take(&mut line));
        }
        line = fitting(word, size, bold, limit);
    }
    if !line.is_empty() {
        out.push(line);
    }
    out
}

/// `text` itself where it fits, else its beginning with an ellipsis.
#[must_use]
pub(super) fn fitting(text: &str, size: f64, bold: bool, limit: f64) -> String {
    if width(text, size, bold) <= limit {
        return text.to_owned();
    }
    let mut kept = String::new();
    for c in text.chars() {
        kept.push(c);
        if width(&format!("{kept}…"), size, bold) > limit {
            kept.pop();
            break;
        }
    }
    format!("{}…", kept.trim_end())
}

/// Widths of the commonest letters, over the letter size.
struct Widths {
    table: Vec<f64>,
    other: f64,
}

impl Widths {
    /// Every letter of the face lies below this.
    const END: u32 = 0x2300;

    fn of_face(face: &[u8]) -> Self {
        let Ok(font) = FontRef::new(face) else { return Self { table: Vec::new(), other: 0.7 } };
        let (map, metrics) = (font.charmap(), font.glyph_metrics(Size::new(1.0), LocationRef::default()));
        let of = |code: u32| map.map(code).and_then(|glyph| metrics.advance_width(glyph)).map_or(0.83, f64::from);
        Self { table: (0..Self::END).map(of).collect(), other: 0.83 }
    }

    fn of(&self, c: char) -> f64 {
        usize::try_from(u32::from(c)).ok().and_then(|code| self.table.get(code).copied()).unwrap_or(self.other)
    }
}

fn widths(bold: bool) -> &'static Widths {
    static FACES: OnceLock<[Widths; 2]> = OnceLock::new();
    let [regular, heavy] = FACES.get_or_init(|| [Widths::of_face(REGULAR), Widths::of_face(BOLD)]);
    if bold { heavy } else { regular }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::float_cmp, reason = "widths are read from a table")]

    use super::*;

    #[test]
    fn widths_are_those_of_the_face() {
        // Advance widths of the face in 1/2048 of its size: digits 1139, "i" 455, "W" 1933.
        approx::assert_relative_eq!(width("0", 2048.0, false), 1139.0, max_relative = 1e-6);
        approx::assert_relative_eq!(width("i", 2048.0, false), 455.0, max_relative = 1e-6);
        approx::assert_relative_eq!(width("W", 2048.0, false), 1933.0, max_relative = 1e-6);
        assert!(width("Drag", 10.0, true) > width("Drag", 10.0, false));
        approx::assert_relative_eq!(width("_{0}", 2048.0, false), 0.7 * 1139.0, max_relative = 1e-6);
    }

    #[test]
    fn marks_split_runs() {
        let all = runs("J_{φ} in 10^{-3}");
        assert_eq!(all.iter().map(|r| r.text).collect::<Vec<_>>(), ["J", "φ", " in 10", "-3"]);
        assert!(all[1].shift < 0.0 && all[3].shift > 0.0 && all[2].shift == 0.0);
        assert_eq!(runs("a_{b").len(), 1);
    }

    #[test]
    fn lines_keep_to_the_width() {
        let text = "An arrest sleeve whose title runs on and on beyond any column Donaudampfschifffahrtsgesellschaftskapitänsmütze";
        let all = lines(text, 26.0, true, 300.0);
        assert!(all.len() > 3);
        assert!(all.iter().all(|l| width(l, 26.0, true) <= 300.0));
        assert!(all.last().is_some_and(|l| l.ends_with('…')));
    }
}

//! Title above a picture and key below it.

use super::letters::{CAPITAL, lines};
use super::style::{GREY, INK, LABEL, MARGIN, SMALL, TITLE, letters};
use super::svg::{Anchor, Stroke, Svg, Type};

/// What stands before a line of the key.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum Swatch {
    /// A line.
    Line(Stroke),
    /// A line within its ribbon.
    Ribbon(Stroke),
    /// A ring.
    Ring(&'static str),
    /// A filled dot.
    Dot(&'static str),
    /// A filled patch.
    Patch(&'static str),
    /// Nothing: a remark.
    None,
}

const SWATCH: f64 = 58.0;
const LEADING: f64 = 32.0;

/// Sets the title in at most two lines and gives the place below it.
pub(super) fn title(svg: &mut Svg, width: f64, title: &str, subtitle: &str) -> f64 {
    let mut y = MARGIN;
    let room = width - 2.0 * MARGIN;
    let mut all = lines(title, TITLE, true, room);
    if all.len() > 2 {
        all.truncate(2);
        if let Some(last) = all.last_mut() {
            *last = super::letters::fitting(&format!("{last} …"), TITLE, true, room);
        }
    }
    for line in all {
        y += 1.05 * TITLE;
        svg.text(MARGIN, y, &line, Type { bold: true, ..Type::plain(TITLE) });
    }
    for line in lines(subtitle, LABEL, false, room) {
        y += 1.25 * LABEL;
        svg.text(MARGIN, y, &line, Type { colour: GREY, ..Type::plain(LABEL) });
    }
    y + 16.0
}

/// Sets the key from `top` down and gives the place below it.
pub(super) fn key(svg: &mut Svg, left: f64, right: f64, top: f64, entries: &[(Swatch, String)]) -> f64 {
    let mut y = top;
    for (swatch, text) in entries {
        let indent = if *swatch == Swatch::None { 0.0 } else { SWATCH + 14.0 };
        let middle = y + LEADING - 0.5 * CAPITAL * SMALL;
        draw_swatch(svg, *swatch, left, middle);
        for line in lines(text, SMALL, false, right - left - indent) {
            y += LEADING;
            svg.text(left + indent, y, &line, Type { colour: INK, ..letters(SMALL, Anchor::Start) });
        }
        y += 4.0;
    }
    y
}

fn draw_swatch(svg: &mut Svg, swatch: Swatch, left: f64, y: f64) {
    let right = left + SWATCH;
    match swatch {
        Swatch::Line(stroke) => svg.line((left, y), (right, y), stroke),
        Swatch::Ribbon(stroke) => {
            svg.rectangle(left, y - 9.0, right, y + 9.0, super::ribbon::FILL, None);
            svg.line((left, y), (right, y), stroke);
        }
        Swatch::Ring(colour) => {
            let stroke = Some(Stroke::full(colour, 3.0));
            svg.circle((0.5 * (left + right), y), 8.0, "#ffffff", stroke);
        }
        Swatch::Dot(colour) => svg.circle((0.5 * (left + right), y), 5.5, colour, None),
        Swatch::Patch(colour) => svg.rectangle(left, y - 9.0, right, y + 9.0, colour, None),
        Swatch::None => {}
    }
}

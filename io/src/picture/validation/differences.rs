//! Each check's greatest difference from its reference, over what is allowed and over the program's own band.

use crate::picture::axes::{Axis, Frame, level_frame, level_grid, logarithmic, room_below};
use crate::picture::key::{Swatch, key, title};
use crate::picture::letters::{CAPITAL, width};
use crate::picture::paper::{COLUMN, Picture};
use crate::picture::style::{BLUE, MARGIN, ORANGE, SMALL, letters};
use crate::picture::svg::{Anchor, Stroke, Svg};

/// One check.
#[derive(Debug, Clone, PartialEq)]
pub struct DifferenceRow {
    /// Its name.
    pub name: String,
    /// Greatest difference over what is allowed.
    pub of_allowed: f64,
    /// Greatest difference over the band that must hold it, where a band is held.
    pub of_band: Option<f64>,
}

const LINE: f64 = 31.0;
/// Differences below this share are drawn at it.
const LEAST: f64 = 1e-3;
/// Where the axis ends unless a difference is greater.
const MOST: f64 = 3.0;
const LIMIT: Stroke = Stroke::full("#8c1d18", 3.0);

/// Draws a line for each check; `None` without checks.
#[must_use]
pub fn differences(heading: &str, rows: &[DifferenceRow]) -> Option<Picture> {
    let widest = rows.iter().map(|r| width(&r.name, SMALL, false)).reduce(f64::max)?;
    let mut svg = Svg::new(COLUMN);
    let top = title(&mut svg, COLUMN, heading, "Greatest difference of each check from its reference");
    let count = f64::from(u32::try_from(rows.len()).unwrap_or(u32::MAX));
    let left = MARGIN + widest + 14.0;
    let area = Frame { edge: MARGIN, left, right: COLUMN - MARGIN - 16.0, top, bottom: top + LINE * count + 8.0 };
    let most = rows.iter().flat_map(|r| [Some(r.of_allowed), r.of_band]).flatten().filter(|v| v.is_finite());
    let scale = logarithmic(LEAST, most.fold(MOST, f64::max), 1.6, area.left, area.right);
    let x = Axis { scale, title: "Difference over its limit".to_owned() };
    level_grid(&mut svg, &area, &x);
    svg.line((scale.at(1.0), area.top), (scale.at(1.0), area.bottom), LIMIT);
    for (k, row) in rows.iter().enumerate() {
        let y = top + 4.0 + LINE * (f64::from(u32::try_from(k).unwrap_or(0)) + 0.5);
        svg.text(left - 12.0, y + 0.5 * CAPITAL * SMALL, &row.name, letters(SMALL, Anchor::End));
        let at = |share: f64| (scale.at(if share.is_nan() { scale.high } else { share.clamp(LEAST, scale.high) }), y);
        if let Some(share) = row.of_band {
            svg.circle(at(share), 7.0, "#ffffff", Some(Stroke::full(ORANGE, 3.0)));
        }
        svg.circle(at(row.of_allowed), 5.5, BLUE, None);
    }
    level_frame(&mut svg, &area, &x);
    let entries = [
        (Swatch::Dot(BLUE), "over what the check allows".to_owned()),
        (Swatch::Ring(ORANGE), "over the program's own band, where that is held".to_owned()),
        (Swatch::Line(LIMIT), "limit: beyond it the check falls short".to_owned()),
        (Swatch::None, "Shares below 0.001 are drawn there.".to_owned()),
    ];
    let end = key(&mut svg, MARGIN, COLUMN - MARGIN, area.bottom + room_below() + 6.0, &entries);
    Some(Picture { name: "differences", svg: svg.finish(end + MARGIN, heading, "Differences of the published checks") })
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use super::*;
    use crate::picture::look;

    #[test]
    fn each_check_has_its_line_and_one_beyond_the_limit_widens_the_axis() {
        let row = |name: &str, of_allowed, of_band| DifferenceRow { name: name.to_owned(), of_allowed, of_band };
        let rows = [
            row("loops", 0.0, None),
            row("field-speeds", 0.02, Some(0.4)),
            row("a-check-that-fell-short", 41.0, None),
            row("no-number", f64::NAN, None),
        ];
        let picture = differences("Published checks", &rows).unwrap();
        look::keep(&picture);
        let text = look::words(&picture);
        assert!(rows.iter().all(|r| text.contains(&r.name)), "{text}");
        assert!(!look::has_non_numbers(&picture));
        assert_eq!(picture.svg.matches("<circle").count(), 4 + 1 + 2, "a dot each, a ring, and two in the key");
        assert_eq!(differences("x", &[]), None);
    }
}

//! Colours of the current density, and their bar.

use std::fmt::Write as _;

use crate::picture::axes::tight;
use crate::picture::letters::{CAPITAL, width};
use crate::picture::style::{FRAME, LABEL, SMALL, letters};
use crate::picture::svg::{Anchor, Stroke, Svg};
use crate::picture::units::Shown;

const BAR: f64 = 30.0;
const TICK: Stroke = Stroke::full("#444444", 1.8);

/// Red for `+largest`, blue for `-largest`, near white between; the darkest ends are left out, for lines to show on them.
pub(super) fn colour(value: f64, largest: f64) -> [u8; 3] {
    let part = (value / largest).clamp(-1.0, 1.0);
    let c = colorous::RED_BLUE.eval_continuous(0.5 - 0.42 * part);
    [c.r, c.g, c.b]
}

/// Draws the bar between `top` and `bottom` and gives its right edge, labels included.
pub(super) fn bar(svg: &mut Svg, left: f64, top: f64, bottom: f64, largest: f64) -> f64 {
    let name = svg.name("bar");
    let mut stops = format!("<linearGradient id=\"{name}\" x1=\"0\" y1=\"1\" x2=\"0\" y2=\"0\">");
    for i in 0..=20 {
        let part = f64::from(i) / 20.0;
        let [r, g, b] = colour(largest * (2.0 * part - 1.0), largest);
        let _ = write!(stops, "<stop offset=\"{part}\" stop-color=\"#{r:02x}{g:02x}{b:02x}\"/>");
    }
    svg.define(&(stops + "</linearGradient>"));
    svg.rectangle(left, top, left + BAR, bottom, &format!("url(#{name})"), Some(FRAME));
    let unit = Shown::current_density(largest);
    let scale = tight(-largest * unit.factor, largest * unit.factor, bottom, top);
    let mut edge = left + BAR;
    for tick in scale.ticks(60.0) {
        let y = scale.at(tick.value);
        svg.line((left + BAR, y), (left + BAR + 8.0, y), TICK);
        svg.text(left + BAR + 14.0, y + 0.5 * CAPITAL * SMALL, &tick.label, letters(SMALL, Anchor::Start));
        edge = edge.max(left + BAR + 14.0 + width(&tick.label, SMALL, false));
    }
    svg.text(left, top - 18.0 - 1.3 * LABEL, "J_{φ},", letters(LABEL, Anchor::Start));
    svg.text(left, top - 18.0, &unit.unit, letters(LABEL, Anchor::Start));
    edge
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn colours_are_symmetric_about_white() {
        let [r, g, b] = colour(0.0, 5.0);
        assert!(r > 235 && g > 235 && b > 235);
        let ([r1, _, b1], [r2, _, b2]) = (colour(5.0, 5.0), colour(-5.0, 5.0));
        assert!(r1 > b1 && b2 > r2);
        assert_eq!(colour(50.0, 5.0), colour(5.0, 5.0));
    }
}

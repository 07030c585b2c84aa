//! The ladder as a waterfall: each bar is what restoring one effect moves a figure by.

use lenzbore_solver::ladder::{FigureLadder, LadderOutcome};

use super::axes::{Axis, Frame, level_frame, level_grid, linear, room_below};
use super::key::{Swatch, key, title};
use super::letters::{CAPITAL, fitting, width};
use super::paper::{COLUMN, Picture};
use super::scale::{Scale, significant, with_band};
use super::style::{BLUE, GREY, INK, LABEL, MARGIN, ORANGE, SMALL, letters};
use super::svg::{Anchor, Stroke, Svg, Type};
use super::units::Shown;

/// Height of one rung's line.
const LINE: f64 = 40.0;
/// Half the height of a bar.
const HALF: f64 = 12.0;
/// Figures shown, those that are there, in this order.
const SHOWN: [&str; 8] = [
    "drag",
    "drag_max",
    "transit_time",
    "exit_speed",
    "drag_peak",
    "impulse",
    "damping_coefficient_zero_speed",
    "current_density_peak",
];
/// At most so many.
const MOST: usize = 4;
const TOP: Stroke = Stroke::full(INK, 4.0);
const LINK: Stroke = Stroke::full("#9a9a9a", 1.6);

/// Draws the waterfall, or nothing where no figure has a step.
#[must_use]
pub fn waterfall(heading: &str, outcome: &LadderOutcome) -> Option<Picture> {
    let figure = |name: &&str| outcome.figures.iter().find(|f| f.name == **name && !f.steps.is_empty());
    let figures: Vec<&FigureLadder> = SHOWN.iter().filter_map(figure).take(MOST).collect();
    if figures.is_empty() {
        return None;
    }
    let mut svg = Svg::new(COLUMN);
    let mut y = title(&mut svg, COLUMN, heading, "The ladder: one dropped effect restored at a time");
    let panels: Vec<Panel> = figures.iter().map(|f| Panel::new(f, outcome)).collect();
    let widest = panels.iter().flat_map(|p| p.lines.iter()).map(|l| width(&l.label, SMALL, false)).fold(0.0, f64::max);
    for panel in &panels {
        y = panel.draw(&mut svg, MARGIN + widest + 14.0, y) + 18.0;
    }
    let entries = [
        (Swatch::Patch(ORANGE), "the figure rises when the effect is restored (per cent of the top)".to_owned()),
        (Swatch::Patch(BLUE), "the figure falls".to_owned()),
        (Swatch::Line(TOP), "the top of the ladder: the field solution".to_owned()),
    ];
    let end = key(&mut svg, MARGIN, COLUMN - MARGIN, y, &entries);
    Some(Picture { name: "waterfall", svg: svg.finish(end + MARGIN, heading, "What each simplification costs") })
}

struct Line {
    label: String,
    before: f64,
    after: f64,
    note: String,
}

struct Panel {
    name: String,
    unit: Shown,
    top: f64,
    value: String,
    lines: Vec<Line>,
}

impl Panel {
    fn new(figure: &FigureLadder, outcome: &LadderOutcome) -> Self {
        let largest = figure.values.iter().flatten().fold(figure.top.abs(), |m: f64, v| m.max(v.abs()));
        let unit = Shown::prefixed(figure.unit, largest);
        let first = outcome.rungs.iter().zip(&figure.values).find_map(|(r, v)| v.map(|v| (r, v)));
        let mut lines = Vec::new();
        if let Some((rung, value)) = first {
            let note = format!("{} {}", significant(value * unit.factor, 4), unit.unit);
            lines.push(Line { label: rung.effect.word().to_owned(), before: 0.0, after: value * unit.factor, note });
        }
        for step in &figure.steps {
            let label = step.effects.iter().map(|e| e.word()).collect::<Vec<_>>().join(", ");
            let note = signed_percent(step.worth);
            lines.push(Line { label, before: step.before * unit.factor, after: step.after * unit.factor, note });
        }
        let value = with_band(figure.top * unit.factor, figure.band * unit.factor);
        Self { name: figure.name.replace('_', " "), top: figure.top * unit.factor, unit, value, lines }
    }

    fn draw(&self, svg: &mut Svg, left: f64, top: f64) -> f64 {
        let head = format!("{}: {} {}", self.name, self.value, self.unit.unit);
        let kind = Type { bold: true, ..letters(LABEL, Anchor::Start) };
        svg.text(MARGIN, top + LABEL, &fitting(&head, LABEL, true, COLUMN - 2.0 * MARGIN), kind);
        let frame_top = top + LABEL + 14.0;
        let bottom = frame_top + LINE * (self.lines.len() as f64 + 0.3);
        let area = Frame { edge: MARGIN, left, right: COLUMN - MARGIN - 8.0, top: frame_top, bottom };
        let values = || self.lines.iter().flat_map(|l| [l.before, l.after]).chain([self.top]);
        let (low, high) = (values().fold(0.0, f64::min), values().fold(0.0, f64::max));
        let scale = linear(low, high, area.left, area.right);
        let x = Axis { scale, title: format!("{}, {}", self.name, self.unit.unit) };
        level_grid(svg, &area, &x);
        svg.line((x.scale.at(self.top), area.top), (x.scale.at(self.top), area.bottom), TOP);
        for (k, line) in self.lines.iter().enumerate() {
            let y = area.top + LINE * (k as f64 + 0.65);
            self.bar(svg, line, k, y, &x.scale, &area);
        }
        level_frame(svg, &area, &x);
        bottom + room_below()
    }

    fn bar(&self, svg: &mut Svg, line: &Line, k: usize, y: f64, scale: &Scale, area: &Frame) {
        let (from, to) = (scale.at(line.before), scale.at(line.after));
        let colour = match k {
            0 => "#c4c4c4",
            _ if line.after >= line.before => ORANGE,
            _ => BLUE,
        };
        svg.rectangle(from.min(to), y - HALF, from.max(to).max(from.min(to) + 2.0), y + HALF, colour, None);
        if k + 1 < self.lines.len() {
            svg.line((to, y + HALF), (to, y + LINE - HALF), LINK);
        }
        let base = y + 0.5 * CAPITAL * SMALL;
        svg.text(area.left - 12.0, base, &line.label, letters(SMALL, Anchor::End));
        let room = width(&line.note, SMALL, false) + 10.0;
        let (at, anchor) = if from.max(to) + room < area.right {
            (from.max(to) + 10.0, Anchor::Start)
        } else {
            (from.min(to) - 10.0, Anchor::End)
        };
        let within = at - room < area.left && anchor == Anchor::End;
        let at = if within { from.max(to) - 10.0 } else { at };
        let (colour, rim) = match (within, k) {
            (true, 0) => (INK, ""),
            (true, _) => ("#ffffff", ""),
            (false, 0) => (GREY, "#ffffff"),
            (false, _) => (INK, "#ffffff"),
        };
        svg.text(at, base, &line.note, Type { colour, rim, ..letters(SMALL, anchor) });
    }
}

/// A relative change in per cent with its sign.
fn signed_percent(relative: f64) -> String {
    let percent = 100.0 * relative;
    let size = percent.abs();
    if size < 0.005 {
        return "±0.00 %".to_owned();
    }
    let digits = if size >= 100.0 {
        0
    } else if size >= 10.0 {
        1
    } else {
        2
    };
    format!("{}{size:.digits$} %", if percent < 0.0 { "−" } else { "+" })
}

#[cfg(test)]
#[path = "waterfall_tests.rs"]
mod tests;

//! What each input makes of each figure, as bars: the longest is what to measure better first.

use lenzbore_solver::spread::{FigureSpread, Response, Spread};

use super::axes::{Axis, Frame, level_frame, level_grid, linear, room_below};
use super::key::{Swatch, key, title};
use super::letters::{CAPITAL, fitting, width};
use super::paper::{COLUMN, Picture};
use super::scale::{Scale, significant};
use super::style::{BLUE, GREY, INK, MARGIN, ORANGE, SMALL, letters};
use super::svg::{Anchor, Stroke, Svg, Type};

/// Height of one bar's line.
const LINE: f64 = 34.0;
/// Bars of a figure at most; the others have smaller shares than the last shown.
const MOST_BARS: usize = 6;
/// Shares below this are left out.
const LEAST_SHARE: f64 = 0.002;
/// Figures whose bars agree this closely, relative, share one panel.
const ALIKE: f64 = 2e-3;
/// Widest label of an input.
const WIDEST_LABEL: f64 = 390.0;

/// Where the input falls.
const LOW: &str = "#7fa8cf";

/// Draws the bars, or nothing where no figure spreads.
#[must_use]
pub fn spread(heading: &str, study: &Spread) -> Option<Picture> {
    let panels = panels(study);
    if panels.is_empty() {
        return None;
    }
    let mut svg = Svg::new(COLUMN);
    let mut y = title(&mut svg, COLUMN, heading, "Input spread: what to measure better first");
    let labels = panels.iter().flat_map(|p| p.bars.iter().map(|b| width(&b.label, SMALL, false))).fold(0.0, f64::max);
    let left = MARGIN + labels.min(WIDEST_LABEL) + 12.0;
    for panel in &panels {
        y = panel.draw(&mut svg, left, y);
    }
    let entries = [
        (Swatch::Patch(BLUE), "input at the upper end of its tolerance (95 %), the others nominal".to_owned()),
        (Swatch::Patch(LOW), "input at the lower end".to_owned()),
        (Swatch::Line(TOGETHER), "all inputs together, 95 % (root sum square)".to_owned()),
        (Swatch::Line(WORST), "worst case".to_owned()),
        (Swatch::None, "Beside each bar: per cent of the figure per per cent of the input.".to_owned()),
    ];
    let end = key(&mut svg, MARGIN, COLUMN - MARGIN, y, &entries);
    Some(Picture { name: "input_spread", svg: svg.finish(end + MARGIN, heading, "Input spread of each figure") })
}

const TOGETHER: Stroke = Stroke::full(INK, 5.0);
const WORST: Stroke = Stroke::full(ORANGE, 2.6);

struct Bar {
    label: String,
    /// Changes at both ends, per cent of the figure.
    low: f64,
    high: f64,
    note: String,
    share: f64,
}

struct Panel {
    names: Vec<String>,
    value: String,
    bars: Vec<Bar>,
    left_out: usize,
    together: (f64, f64),
    worst: (f64, f64),
}

/// One panel a figure; figures that answer alike, as drag and damping coefficient do, share theirs.
fn panels(study: &Spread) -> Vec<Panel> {
    let mut out: Vec<(Panel, &FigureSpread)> = Vec::new();
    for figure in study.figures.iter().filter(|f| f.half_width() > 0.0 && f.nominal.value.abs() > 0.0) {
        match out.iter_mut().find(|(_, first)| alike(first, figure)) {
            Some((panel, _)) => panel.names.push(plain(&figure.name)),
            None => out.push((panel(study, figure), figure)),
        }
    }
    out.into_iter()
        .map(|(panel, _)| panel)
        .map(|p| if p.names.len() > 1 { Panel { value: String::new(), ..p } } else { p })
        .collect()
}

fn alike(a: &FigureSpread, b: &FigureSpread) -> bool {
    let share = |f: &FigureSpread, r: &Response| (r.low / f.nominal.value, r.high / f.nominal.value);
    let scale = a.half_width() / a.nominal.value.abs();
    a.responses.iter().zip(&b.responses).all(|(x, y)| match (x, y) {
        (Some(x), Some(y)) => {
            let ((l, h), (m, k)) = (share(a, x), share(b, y));
            (l - m).abs() <= ALIKE * scale && (h - k).abs() <= ALIKE * scale
        }
        (None, None) => true,
        _ => false,
    })
}

/// `wall.sleeve.thickness` as `sleeve thickness`, `wall.temperature` as `wall temperature`.
fn named(path: &str) -> String {
    let pieces: Vec<&str> = path.split('.').collect();
    plain(&pieces[pieces.len().saturating_sub(2)..].join(" "))
}

fn plain(name: &str) -> String {
    name.replace('_', " ")
}

fn panel(study: &Spread, figure: &FigureSpread) -> Panel {
    let per_cent = |change: f64| 100.0 * change / figure.nominal.value.abs();
    let mut bars: Vec<Bar> = study
        .inputs
        .iter()
        .zip(figure.responses.iter().zip(&figure.shares))
        .filter_map(|(input, (response, share))| {
            let r = response.as_ref().filter(|_| *share >= LEAST_SHARE)?;
            let label = format!("{} ± {}", named(&input.path), input.written);
            let note = r.per_cent.map_or_else(String::new, |p| significant(p, 2));
            let label = label.replace("± -", "-").replace('-', "\u{2212}");
            Some(Bar { label, low: per_cent(r.low), high: per_cent(r.high), note, share: *share })
        })
        .collect();
    bars.sort_by(|a, b| b.share.total_cmp(&a.share));
    let left_out = bars.len().saturating_sub(MOST_BARS);
    bars.truncate(MOST_BARS);
    Panel {
        names: vec![plain(&figure.name)],
        value: format!(
            "{} {}",
            significant(figure.nominal.value, 4),
            if figure.unit == "1" { "" } else { figure.unit }
        ),
        bars,
        left_out,
        together: (per_cent(-figure.minus), per_cent(figure.plus)),
        worst: (per_cent(figure.worst_minus), per_cent(figure.worst_plus)),
    }
}

impl Panel {
    fn draw(&self, svg: &mut Svg, left: f64, top: f64) -> f64 {
        let mut y = top;
        let heading = if self.value.is_empty() {
            self.names.join(", ")
        } else {
            format!("{}: {}", self.names.join(", "), self.value)
        };
        for line in super::letters::lines(&heading, SMALL, true, COLUMN - 2.0 * MARGIN) {
            y += 1.2 * SMALL;
            svg.text(MARGIN, y, &line, Type { bold: true, ..letters(SMALL, Anchor::Start) });
        }
        y += 8.0;
        let lines = f64::from(u32::try_from(self.bars.len()).unwrap_or(1)) + 1.0;
        let area = Frame { edge: MARGIN, left, right: COLUMN - MARGIN - 62.0, top: y, bottom: y + LINE * lines + 8.0 };
        let reach = |pick: fn(f64, f64) -> f64| {
            let ends = self.bars.iter().flat_map(|b| [b.low, b.high]);
            ends.chain([self.together.0, self.together.1, self.worst.0, self.worst.1]).fold(0.0, pick)
        };
        let scale = linear(reach(f64::min), reach(f64::max), area.left, area.right);
        let x = Axis { scale, title: "Change, %".to_owned() };
        level_grid(svg, &area, &x);
        for (k, bar) in self.bars.iter().enumerate() {
            let middle = y + 4.0 + LINE * (f64::from(u32::try_from(k).unwrap_or(0)) + 0.5);
            bar.draw(svg, &x.scale, left, area.right, middle);
        }
        let middle = area.bottom - 4.0 - 0.5 * LINE;
        self.draw_together(svg, &x.scale, left, middle);
        svg.line((x.scale.at(0.0), area.top), (x.scale.at(0.0), area.bottom), Stroke::full("#444444", 1.8));
        level_frame(svg, &area, &x);
        let mut end = area.bottom + room_below();
        if self.left_out > 0 {
            end += SMALL;
            let (inputs, are) = if self.left_out == 1 { ("input", "is") } else { ("inputs", "are") };
            let text = format!("{} {inputs} with a smaller share {are} not shown", self.left_out);
            svg.text(left, end, &text, Type { colour: GREY, ..letters(SMALL, Anchor::Start) });
        }
        end + 14.0
    }

    fn draw_together(&self, svg: &mut Svg, x: &Scale, left: f64, y: f64) {
        svg.text(
            left - 12.0,
            y + 0.5 * CAPITAL * SMALL,
            "all together",
            Type { bold: true, ..letters(SMALL, Anchor::End) },
        );
        for ((from, to), stroke, tip) in [(self.worst, WORST, 9.0), (self.together, TOGETHER, 9.0)] {
            let (from, to) = (x.at(from), x.at(to));
            svg.line((from, y), (to, y), stroke);
            for end in [from, to] {
                svg.line((end, y - tip), (end, y + tip), stroke);
            }
        }
    }
}

impl Bar {
    fn draw(&self, svg: &mut Svg, x: &Scale, left: f64, right: f64, y: f64) {
        let label = fitting(&self.label, SMALL, false, WIDEST_LABEL);
        svg.text(left - 12.0, y + 0.5 * CAPITAL * SMALL, &label, letters(SMALL, Anchor::End));
        let same_side = self.low * self.high > 0.0;
        for (value, colour, half) in [(self.low, LOW, 11.0), (self.high, BLUE, if same_side { 5.0 } else { 11.0 })] {
            svg.rectangle(x.at(0.0), y - half, x.at(value), y + half, colour, None);
        }
        svg.text(right + 8.0, y + 0.5 * CAPITAL * SMALL, &self.note, letters(SMALL, Anchor::Start));
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use super::*;
    use crate::picture::look;
    use crate::result::demo;

    #[test]
    fn bars_show_inputs_shares_and_the_whole() {
        let study = demo::study();
        let picture = spread("Latch damper", &study).unwrap();
        look::keep(&picture);
        let text = look::words(&picture);
        // Drag and damping coefficient answer alike: one panel.
        assert!(text.contains("drag, damping coefficient"), "{text}");
        assert!(text.contains("exit speed: 0.25 m/s"), "{text}");
        assert!(text.contains("all together") && text.contains("sleeve thickness ± 10 %"), "{text}");
        assert!(!look::has_non_numbers(&picture));
    }

    #[test]
    fn nothing_to_show_gives_no_picture() {
        let mut study = demo::study();
        study.figures.clear();
        assert!(spread("x", &study).is_none());
    }
}

//! A curve with its numerical band as a ribbon.

use super::scale::{Kind, Scale, significant};
use super::simplify::simplified;
use super::style::CURVE;
use super::svg::{Svg, polygon, polyline};

/// Colour of the ribbon on white.
pub(super) const FILL: &str = "#bcd3ea";

/// Half the stray of a simplified line: far below a dot of the printed picture.
const TOLERANCE: f64 = 0.25;

/// A curve: places along both axes in shown units, with half-widths.
#[derive(Debug, Clone, PartialEq, Default)]
pub(super) struct Banded {
    pub x: Vec<f64>,
    pub y: Vec<f64>,
    pub band: Vec<f64>,
}

impl Banded {
    /// Draws ribbon and line.
    pub(super) fn draw(&self, svg: &mut Svg, x: &Scale, y: &Scale) {
        if self.is_visible(y) {
            for (from, to) in self.one_way() {
                let edge = |sign: f64| {
                    let points: Vec<(f64, f64)> =
                        (from..=to).map(|i| (x.at(self.x[i]), clamped(y, self.y[i] + sign * self.band[i]))).collect();
                    simplified(&points, TOLERANCE)
                };
                let mut outline = edge(1.0);
                outline.extend(edge(-1.0).into_iter().rev());
                svg.area(&polygon(&outline), FILL, 1.0, None);
            }
        }
        let points: Vec<(f64, f64)> = self.x.iter().zip(&self.y).map(|(a, b)| (x.at(*a), clamped(y, *b))).collect();
        svg.path(&polyline(&simplified(&points, TOLERANCE)), CURVE);
    }

    /// First and last index of each stretch along which x runs one way: a ribbon that turns back would cancel itself.
    fn one_way(&self) -> Vec<(usize, usize)> {
        let mut out = Vec::new();
        let mut from = 0;
        for i in 1..self.x.len() {
            let turns = i + 1 < self.x.len() && (self.x[i + 1] - self.x[i]) * (self.x[i] - self.x[i - 1]) < 0.0;
            if turns || i + 1 == self.x.len() {
                out.push((from, i));
                from = i;
            }
        }
        out
    }

    /// Whether the ribbon is anywhere wider than the line that lies on it.
    pub(super) fn is_visible(&self, y: &Scale) -> bool {
        (0..self.y.len()).any(|i| {
            let above = clamped(y, self.y[i] + self.band[i]);
            let below = clamped(y, self.y[i] - self.band[i]);
            (above - below).abs() > CURVE.width
        })
    }

    /// What the key says of the band: its half-width over the value, each at its own place.
    pub(super) fn remark_on_each(&self, y: &Scale) -> String {
        let top = self.largest();
        let relative = |i: usize| self.band[i] / self.y[i].abs();
        let worst = (0..self.y.len()).filter(|i| self.y[*i].abs() > 1e-3 * top).map(relative).fold(0.0, f64::max);
        self.remark(y, &format!("{} %", significant(round_up(100.0 * worst), 2)))
    }

    /// The same over the greatest value, for a series that passes through zero.
    pub(super) fn remark_on_greatest(&self, y: &Scale, name: &str) -> String {
        let top = self.largest();
        let widest = self.band.iter().copied().fold(0.0, f64::max);
        let worst = if top > 0.0 { widest / top } else { 0.0 };
        self.remark(y, &format!("{} % of the greatest {name}", significant(round_up(100.0 * worst), 2)))
    }

    fn remark(&self, y: &Scale, worst: &str) -> String {
        if self.is_visible(y) {
            format!("numerical band, at most ± {worst}")
        } else {
            format!("numerical band narrower than the line: ≤ {worst}")
        }
    }

    fn largest(&self) -> f64 {
        self.y.iter().fold(0.0_f64, |m, v| m.max(v.abs()))
    }
}

/// Rounded up to two digits, so that "at most" holds.
fn round_up(value: f64) -> f64 {
    if value <= 0.0 {
        return 0.0;
    }
    let unit = 10.0_f64.powf(value.log10().floor() - 1.0);
    (value / unit - 1e-9).ceil() * unit
}

/// Place on paper, kept on the axis.
fn clamped(y: &Scale, value: f64) -> f64 {
    let value = if y.kind == Kind::Log { value.max(y.low) } else { value };
    y.at(value.clamp(y.low, y.high))
}

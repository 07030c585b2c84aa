//! Scales of axes: value to place on paper, round ticks with labels of equal precision.

use super::svg::short;

/// Linear or logarithmic.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Kind {
    Linear,
    Log,
}

/// An axis from `low` to `high` (values already in the axis's unit) laid along paper from `start` to `end`.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Scale {
    pub kind: Kind,
    pub low: f64,
    pub high: f64,
    pub start: f64,
    pub end: f64,
}

/// A labelled tick.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Tick {
    pub value: f64,
    pub label: String,
}

impl Scale {
    /// Place on paper of a value; on a logarithmic axis, of a positive one.
    pub(super) fn at(&self, value: f64) -> f64 {
        let fraction = match self.kind {
            Kind::Linear => (value - self.low) / (self.high - self.low),
            Kind::Log => (value / self.low).ln() / (self.high / self.low).ln(),
        };
        self.start + fraction * (self.end - self.start)
    }

    /// Whether a value lies on the axis.
    pub(super) fn holds(&self, value: f64) -> bool {
        let slack = 1e-9 * (self.high - self.low).abs();
        value >= self.low - slack && value <= self.high + slack
    }

    /// Labelled ticks, at least `apart` on paper from one another.
    pub(super) fn ticks(&self, apart: f64) -> Vec<Tick> {
        match self.kind {
            Kind::Linear => self.linear_ticks(apart),
            Kind::Log => self.log_ticks(apart),
        }
    }

    /// Small ticks between: the whole multiples inside each decade, or halves and fifths of a linear step.
    pub(super) fn small_ticks(&self, apart: f64) -> Vec<f64> {
        match self.kind {
            Kind::Linear => {
                let step = self.step(apart);
                let parts = if leading_digit(step) == 2 { 4.0 } else { 5.0 };
                multiples(step / parts, self.low, self.high)
            }
            Kind::Log => self.in_decades(&[1.0, 2.0, 3.0, 4.0, 5.0, 6.0, 7.0, 8.0, 9.0]),
        }
    }

    fn step(&self, apart: f64) -> f64 {
        let length = (self.end - self.start).abs();
        round_step((self.high - self.low).abs() * apart / length)
    }

    fn linear_ticks(&self, apart: f64) -> Vec<Tick> {
        let step = self.step(apart);
        let decimals = decimals(step);
        multiples(step, self.low, self.high)
            .into_iter()
            .map(|value| Tick { value, label: fixed(value, decimals) })
            .collect()
    }

    fn log_ticks(&self, apart: f64) -> Vec<Tick> {
        let decade = (self.end - self.start).abs() / (self.high / self.low).log10();
        let digits: &[f64] = match decade {
            d if 0.28 * d > apart => &[1.0, 2.0, 5.0],
            d if 0.45 * d > apart => &[1.0, 3.0],
            _ => &[1.0],
        };
        let ticks = self.in_decades(digits);
        let every = if digits.len() == 1 { (apart / decade).ceil().max(1.0) } else { 1.0 };
        let kept = |value: &f64| (value.log10().round() / every).fract().abs() < 1e-9 || every < 1.5;
        ticks.into_iter().filter(kept).map(|value| Tick { value, label: log_label(value) }).collect()
    }

    fn in_decades(&self, digits: &[f64]) -> Vec<f64> {
        let (first, last) = (self.low.log10().floor(), self.high.log10().ceil());
        let mut out = Vec::new();
        let mut decade = first;
        while decade <= last + 0.5 {
            let base = 10.0_f64.powf(decade);
            let on_axis = |v: &f64| *v >= self.low * (1.0 - 1e-9) && *v <= self.high * (1.0 + 1e-9);
            out.extend(digits.iter().map(|d| d * base).filter(on_axis));
            decade += 1.0;
        }
        out
    }
}

/// The next larger of 1, 2, 5 times a power of ten.
pub(super) fn round_step(least: f64) -> f64 {
    let power = 10.0_f64.powf(least.log10().floor());
    let digit = [1.0, 2.0, 5.0].into_iter().find(|d| d * power >= least * (1.0 - 1e-9)).unwrap_or(10.0);
    digit * power
}

fn leading_digit(step: f64) -> i32 {
    let digit = step / 10.0_f64.powf(step.log10().floor() + 1e-9).max(f64::MIN_POSITIVE);
    if (digit - 2.0).abs() < 0.5 { 2 } else { 5 }
}

/// Whole multiples of `step` from `low` to `high`.
fn multiples(step: f64, low: f64, high: f64) -> Vec<f64> {
    let first = (low / step - 1e-6).ceil();
    let mut out = Vec::new();
    let mut n = first;
    while n * step <= high + 1e-6 * step && out.len() < 1000 {
        out.push(n * step + 0.0);
        n += 1.0;
    }
    out
}

/// Decimals that multiples of `step` need.
fn decimals(step: f64) -> usize {
    (0..12)
        .find(|d| {
            let scaled = step * 10.0_f64.powi(*d);
            (scaled - scaled.round()).abs() < 1e-6 * scaled
        })
        .and_then(|d| usize::try_from(d).ok())
        .unwrap_or(12)
}

/// A number with that many decimals and a true minus sign.
pub(super) fn fixed(value: f64, decimals: usize) -> String {
    let text = format!("{value:.decimals$}");
    let nil = text.trim_start_matches('-').chars().all(|c| c == '0' || c == '.');
    if nil { text.trim_start_matches('-').to_owned() } else { text.replace('-', "\u{2212}") }
}

/// A number with that many significant digits, idle zeros dropped, as a power of ten where it runs long.
pub(super) fn significant(value: f64, digits: usize) -> String {
    if value == 0.0 {
        return "0".to_owned();
    }
    let scientific = format!("{value:.*e}", digits.max(1) - 1);
    let (mantissa, exponent) = scientific.split_once('e').unwrap_or((&scientific, "0"));
    let power: i32 = exponent.parse().unwrap_or(0);
    if (-4..6).contains(&power) {
        let places = usize::try_from(i32::try_from(digits).unwrap_or(12) - 1 - power).unwrap_or(0);
        let text = fixed(value, places);
        return if text.contains('.') { text.trim_end_matches('0').trim_end_matches('.').to_owned() } else { text };
    }
    let mantissa = if mantissa.contains('.') { mantissa.trim_end_matches('0').trim_end_matches('.') } else { mantissa };
    format!("{}\u{b7}10^{{{}}}", mantissa.replace('-', "\u{2212}"), exponent.replace('-', "\u{2212}"))
}

/// `value ± band`, the band to two significant digits and the value to the band's last place.
pub(super) fn with_band(value: f64, band: f64) -> String {
    if band <= 0.0 {
        return significant(value, 6);
    }
    let place = 1.0 - band.abs().log10().floor();
    #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped to 0 to 9")]
    let decimals = place.clamp(0.0, 9.0) as usize;
    if place > 9.0 || value.abs() >= 1e6 {
        return format!("{} \u{b1} {}", significant(value, 6), significant(band, 2));
    }
    format!("{} \u{b1} {}", fixed(value, decimals), fixed(band, decimals))
}

fn log_label(value: f64) -> String {
    if (1e-3..9.9e4).contains(&value) {
        short_decimal(value)
    } else {
        let exponent = value.log10().floor();
        let digit = (value / 10.0_f64.powf(exponent)).round();
        let power = short(exponent).replace('-', "\u{2212}");
        if (digit - 1.0).abs() < 0.5 {
            format!("10^{{{power}}}")
        } else {
            format!("{}\u{b7}10^{{{power}}}", short(digit))
        }
    }
}

fn short_decimal(value: f64) -> String {
    let text = format!("{value:.4}");
    text.trim_end_matches('0').trim_end_matches('.').to_owned()
}

#[cfg(test)]
mod tests {
    #![allow(clippy::float_cmp, reason = "round numbers")]

    use super::*;

    fn linear(low: f64, high: f64) -> Scale {
        Scale { kind: Kind::Linear, low, high, start: 100.0, end: 700.0 }
    }

    fn log(low: f64, high: f64) -> Scale {
        Scale { kind: Kind::Log, low, high, start: 100.0, end: 700.0 }
    }

    fn labels(ticks: &[Tick]) -> Vec<&str> {
        ticks.iter().map(|t| t.label.as_str()).collect()
    }

    #[test]
    fn values_land_where_they_belong() {
        assert_eq!(linear(-1.0, 1.0).at(0.0), 400.0);
        approx::assert_relative_eq!(log(0.01, 100.0).at(1.0), 400.0);
        assert_eq!(linear(0.0, 1.0).at(1.0), 700.0);
    }

    #[test]
    fn linear_ticks_are_round_and_alike() {
        assert_eq!(labels(&linear(0.0, 1.0).ticks(100.0)), ["0.0", "0.2", "0.4", "0.6", "0.8", "1.0"]);
        assert_eq!(labels(&linear(-40.0, 160.0).ticks(120.0)), ["0", "50", "100", "150"]);
        assert_eq!(labels(&linear(-0.3, 0.3).ticks(200.0)), ["\u{2212}0.2", "0.0", "0.2"]);
        assert_eq!(labels(&linear(0.0, 0.0007).ticks(200.0)), ["0.0000", "0.0005"]);
    }

    #[test]
    fn log_ticks_follow_the_room_there_is() {
        assert_eq!(labels(&log(0.01, 50.0).ticks(80.0)), ["0.01", "0.1", "1", "10"]);
        assert_eq!(labels(&log(1.0, 20.0).ticks(80.0)), ["1", "2", "5", "10", "20"]);
        assert_eq!(labels(&log(1e-8, 1e4).ticks(120.0)), ["10^{\u{2212}6}", "0.001", "1", "1000"]);
    }

    #[test]
    fn figures_show_their_band() {
        assert_eq!(with_band(2.212_929_281, 3.2e-5), "2.212929 \u{b1} 0.000032");
        assert_eq!(with_band(17.36, 0.4), "17.36 \u{b1} 0.40");
        assert_eq!(with_band(0.5, 0.0), "0.5");
        assert_eq!(with_band(44.0e6, 2.0e3), "4.4\u{b7}10^{7} \u{b1} 2000");
    }

    #[test]
    fn significant_digits() {
        assert_eq!(significant(0.000_200_4, 3), "0.0002");
        assert_eq!(significant(1234.6, 3), "1235");
        assert_eq!(significant(-2.5e-9, 3), "\u{2212}2.5\u{b7}10^{\u{2212}9}");
        assert_eq!(significant(0.0, 3), "0");
    }
}

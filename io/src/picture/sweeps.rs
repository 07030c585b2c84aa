//! What a curve sweeps beside speed: drag-speed curves over temperature, damping against position, strokes over frequency and amplitude.

use lenzbore_solver::outcome::{AtStroke, AtTemperature, DragPoint, Outcome};

use super::axes::{Axis, linear, logarithmic, tight};
use super::family::{Family, HEIGHT, Member};
use super::paper::Picture;
use super::ribbon::Banded;
use super::scale::{significant, with_band};
use super::style::LAW;
use super::units::Shown;

/// 0 degC, K.
const CELSIUS_ZERO_K: f64 = 273.15;
/// A range wider than this is shown on a logarithmic axis.
const WIDE: f64 = 40.0;

/// An axis over `low` to `high` in shown units: logarithmic where the range is wide.
fn along(low: f64, high: f64, start: f64, end: f64) -> super::scale::Scale {
    if low > 0.0 && high / low >= WIDE {
        logarithmic(low, high, 1.0, start, end)
    } else if low > 0.0 && low <= 0.35 * high {
        tight(0.0, high, start, end)
    } else {
        tight(low, high, start, end)
    }
}

/// One curve a temperature; nothing where none was swept.
#[must_use]
pub fn temperatures(heading: &str, outcome: &Outcome) -> Option<Picture> {
    let all = &outcome.sweeps.temperatures;
    let points: Vec<&DragPoint> = all.iter().flat_map(|t| &t.points).collect();
    let most = points.iter().map(|p| p.drag_newton).fold(0.0, f64::max);
    let least = points.iter().map(|p| p.drag_newton).fold(f64::INFINITY, f64::min);
    let (slow, fast) = range(points.iter().map(|p| p.speed_m_per_s))?;
    let (force, speed) = (Shown::prefixed("N", most), Shown::speed(fast));
    let member = |at: &AtTemperature| Member {
        curve: Banded {
            x: at.points.iter().map(|p| p.speed_m_per_s * speed.factor).collect(),
            y: at.points.iter().map(|p| p.drag_newton * force.factor).collect(),
            band: at.points.iter().map(|p| p.band_newton * force.factor).collect(),
        },
        label: label(at),
        stroke: None,
    };
    let family = Family {
        name: "drag_speed_temperatures",
        heading,
        subtitle: "Drag against speed at temperatures of wall and mover, endless wall",
        smooth: true,
        members: all.iter().map(member).collect(),
        marks: Vec::new(),
        marks_label: None,
    };
    let wide = slow > 0.0 && fast / slow >= WIDE && least > 0.0 && most / least >= WIDE;
    let drag = |start: f64, end: f64| {
        let (low, high) = (least * force.factor, most * force.factor);
        let scale = if wide { logarithmic(low, high, 1.6, start, end) } else { linear(0.0, high, start, end) };
        Axis { scale, title: format!("Drag, {}", force.unit) }
    };
    let level = |start: f64, end: f64| Axis {
        scale: along(slow * speed.factor, fast * speed.factor, start, end),
        title: format!("Speed, {}", speed.unit),
    };
    Some(family.draw(level, drag))
}

fn label(at: &AtTemperature) -> String {
    let celsius = significant(at.temperature_k - CELSIUS_ZERO_K, 4);
    let c0 = at.figure("damping_coefficient_zero_speed");
    let c0 = c0.map_or_else(String::new, |f| format!(": {} N s/m at low speed", with_band(f.value, f.band)));
    let most = at.figure("drag_max").zip(at.figure("critical_speed"));
    let most = most.map_or_else(String::new, |(f, v)| {
        format!(", at most {} N at {} m/s", significant(f.value, 4), significant(v.value, 4))
    });
    format!("{celsius} °C{c0}{most}")
}

fn range(values: impl Iterator<Item = f64>) -> Option<(f64, f64)> {
    let (low, high) = values.fold((f64::INFINITY, f64::NEG_INFINITY), |(a, b), v| (a.min(v), b.max(v)));
    (low < high).then_some((low, high))
}

/// The damping coefficient against position, with the wall's ends; nothing where none was swept.
#[must_use]
pub fn positions(heading: &str, outcome: &Outcome) -> Option<Picture> {
    let all = &outcome.sweeps.positions;
    let (low, high) = range(all.iter().map(|p| p.position_m))?;
    let unit = Shown::length(low.abs().max(high.abs()));
    let curve = Banded {
        x: all.iter().map(|p| p.position_m * unit.factor).collect(),
        y: all.iter().map(|p| p.damping).collect(),
        band: all.iter().map(|p| p.damping_band).collect(),
    };
    let most = curve.y.iter().copied().fold(0.0, f64::max);
    let remark = curve.remark_on_greatest(&linear(0.0, most, HEIGHT, 0.0), "value");
    let mut members = vec![Member { curve, label: format!("wall with its ends; {remark}"), stroke: None }];
    let endless = outcome.figures.iter().find(|f| f.name == "damping_coefficient_zero_speed");
    if let Some(c0) = endless {
        let ends = vec![low * unit.factor, high * unit.factor];
        let curve = Banded { x: ends, y: vec![c0.value; 2], band: vec![0.0; 2] };
        let label = format!("endless wall: {} N s/m", with_band(c0.value, c0.band));
        members.push(Member { curve, label, stroke: Some(LAW) });
    }
    let ends = outcome.sweeps.length_m.map(|l| vec![0.0, l * unit.factor]).unwrap_or_default();
    let top = members.iter().flat_map(|m| m.curve.y.iter().copied()).fold(0.0, f64::max);
    let marks_label = (!ends.is_empty()).then(|| "ends of the wall".to_owned());
    let family = Family {
        name: "damping_position",
        heading,
        subtitle: "Damping coefficient at zero speed against position",
        smooth: true,
        members,
        marks: ends,
        marks_label,
    };
    let level = |start: f64, end: f64| Axis {
        scale: tight(low * unit.factor, high * unit.factor, start, end),
        title: format!("Position of the reference point, {}", unit.unit),
    };
    let up = |start: f64, end: f64| Axis {
        scale: linear(0.0, top, start, end),
        title: "Damping coefficient, N s/m".to_owned(),
    };
    Some(family.draw(level, up))
}

/// The equivalent damping coefficient over frequency, one curve an amplitude; over amplitude where there is one frequency only.
#[must_use]
pub fn strokes(heading: &str, outcome: &Outcome) -> Option<Picture> {
    let all = &outcome.sweeps.strokes;
    let over_frequency = range(all.iter().map(|s| s.frequency_hz)).is_some();
    let place: fn(&AtStroke) -> f64 = if over_frequency { |s| s.frequency_hz } else { |s| s.amplitude_m };
    let other: fn(&AtStroke) -> f64 = if over_frequency { |s| s.amplitude_m } else { |s| s.frequency_hz };
    let (low, high) = range(all.iter().map(place))?;
    let unit = if over_frequency { Shown::prefixed("Hz", high) } else { Shown::length(high) };
    let mut kinds: Vec<f64> = all.iter().map(other).collect();
    kinds.sort_by(f64::total_cmp);
    kinds.dedup();
    let member = |kind: &f64| {
        let rows: Vec<&AtStroke> = all.iter().filter(|s| (other(s) - kind).abs() <= 0.0).collect();
        let label = if over_frequency {
            format!("amplitude {} mm", significant(1e3 * kind, 4))
        } else {
            format!("{} Hz", significant(*kind, 4))
        };
        let curve = Banded {
            x: rows.iter().map(|s| place(s) * unit.factor).collect(),
            y: rows.iter().map(|s| s.damping).collect(),
            band: rows.iter().map(|s| s.damping_band).collect(),
        };
        Member { curve, label, stroke: None }
    };
    let top = all.iter().map(|s| s.damping + s.damping_band).fold(0.0, f64::max);
    let family = Family {
        name: "stroke_curve",
        heading,
        subtitle: "Equivalent damping coefficient of settled strokes",
        smooth: true,
        members: kinds.iter().map(member).collect(),
        marks: Vec::new(),
        marks_label: None,
    };
    let level = |start: f64, end: f64| Axis {
        scale: along(low * unit.factor, high * unit.factor, start, end),
        title: format!("{}, {}", if over_frequency { "Frequency" } else { "Amplitude" }, unit.unit),
    };
    let up = |start: f64, end: f64| Axis {
        scale: linear(0.0, top, start, end),
        title: "Damping coefficient, N s/m".to_owned(),
    };
    Some(family.draw(level, up))
}

//! The force-displacement loop of a stroke's settled cycle.

use lenzbore_solver::outcome::{Outcome, Trace};
use lenzbore_solver::problem::{Problem, Sine, Travel};

use super::axes::{Axis, Frame, frame, grid, linear, room_below, room_left};
use super::key::{Swatch, key, title};
use super::paper::{COLUMN, Picture};
use super::ribbon::Banded;
use super::scale::with_band;
use super::style::{CURVE, LAW, MARGIN, MARK};
use super::svg::Svg;
use super::units::Shown;

const HEIGHT: f64 = 560.0;
/// Points drawn between two of the series.
const FINER: u32 = 8;

/// Draws the loop, or nothing where the travel is no stroke.
#[must_use]
pub fn force_loop(heading: &str, problem: &Problem, outcome: &Outcome) -> Option<Picture> {
    let Travel::Sine(sine) = &problem.travel else { return None };
    let figure = |name: &str| outcome.figures.iter().find(|f| f.name == name);
    let cycle = last_cycle(&outcome.trace, sine)?;
    let (along, across) = (Shown::length(sine.amplitude_m), shown_force(&cycle));
    let curve = closed(&cycle, along.factor, across.factor);
    let subtitle = "Force on the mover against displacement, settled cycle";
    let mut svg = Svg::new(COLUMN);
    let top = title(&mut svg, COLUMN, heading, subtitle);
    let edge = |values: &[f64]| values.iter().fold(0.0_f64, |m, v| m.max(v.abs()));
    let (reach, most) = (edge(&curve.x), edge(&curve.y));
    let y =
        Axis { scale: linear(-most, most, top + HEIGHT, top), title: format!("Force (up positive), {}", across.unit) };
    let area =
        Frame { edge: MARGIN, left: MARGIN + room_left(&y), right: COLUMN - MARGIN - 8.0, top, bottom: top + HEIGHT };
    let x = Axis {
        scale: linear(-reach, reach, area.left, area.right),
        title: format!("Displacement from the centre, {}", along.unit),
    };
    grid(&mut svg, &area, &x, &y);
    svg.line((x.scale.at(0.0), area.top), (x.scale.at(0.0), area.bottom), MARK);
    svg.line((area.left, y.scale.at(0.0)), (area.right, y.scale.at(0.0)), MARK);
    let mut entries = Vec::new();
    if let Some(stiffness) = figure("stiffness") {
        let force = stiffness.value * sine.amplitude_m * across.factor;
        let span = sine.amplitude_m * along.factor;
        svg.line((x.scale.at(-span), y.scale.at(force)), (x.scale.at(span), y.scale.at(-force)), LAW);
        let text = format!("part in phase: stiffness {} N/m", with_band(stiffness.value, stiffness.band));
        entries.push((Swatch::Line(LAW), text));
    }
    curve.draw(&mut svg, &x.scale, &y.scale);
    let lost = figure("loss_per_cycle").map_or_else(String::new, |loss| {
        format!("encloses the loss, {} J a cycle; ", with_band(loss.value, loss.band))
    });
    let text = format!("force; {lost}{}", curve.remark_on_greatest(&y.scale, "force"));
    let swatch = if curve.is_visible(&y.scale) { Swatch::Ribbon(CURVE) } else { Swatch::Line(CURVE) };
    entries.insert(0, (swatch, text));
    frame(&mut svg, &area, &x, &y);
    let end = key(&mut svg, area.left, COLUMN - MARGIN, area.bottom + room_below() + 6.0, &entries);
    Some(Picture { name: "force_loop", svg: svg.finish(end + MARGIN, heading, subtitle) })
}

/// One instant of the cycle, SI: displacement, force on the mover, half-width of its band.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Instant {
    displacement: f64,
    force: f64,
    band: f64,
}

/// The last whole cycle of the series.
fn last_cycle(trace: &Trace, sine: &Sine) -> Option<Vec<Instant>> {
    let [.., before, last] = trace.time_s.as_slice() else { return None };
    let since = last - sine.period_s() + 0.5 * (last - before);
    let from = trace.time_s.partition_point(|t| *t < since);
    let cycle: Vec<Instant> = (from..trace.time_s.len())
        .map(|k| Instant {
            displacement: trace.position_m[k] - sine.centre_m,
            force: -trace.velocity_m_per_s[k].signum() * trace.drag_newton[k],
            band: trace.drag_band_newton[k],
        })
        .collect();
    (cycle.len() > 4).then_some(cycle)
}

fn shown_force(cycle: &[Instant]) -> Shown {
    Shown::prefixed("N", cycle.iter().fold(0.0, |m, i| m.max(i.force.abs())))
}

/// The loop, closed, with points between those given: the cubic through the four nearest, as they are even in time.
fn closed(cycle: &[Instant], along: f64, across: f64) -> Banded {
    let count = cycle.len();
    let mut curve = Banded::default();
    for k in 0..count {
        let near = [k + count - 1, k, k + 1, k + 2].map(|i| cycle[i % count]);
        let steps = if k + 1 == count { FINER + 1 } else { FINER };
        for n in 0..steps {
            let s = f64::from(n) / f64::from(FINER);
            let w = [
                -s * (s - 1.0) * (s - 2.0) / 6.0,
                (s + 1.0) * (s - 1.0) * (s - 2.0) / 2.0,
                -(s + 1.0) * s * (s - 2.0) / 2.0,
                (s + 1.0) * s * (s - 1.0) / 6.0,
            ];
            let of = |read: fn(&Instant) -> f64| w.iter().zip(&near).map(|(w, i)| w * read(i)).sum::<f64>();
            curve.x.push(along * of(|i| i.displacement));
            curve.y.push(across * of(|i| i.force));
            curve.band.push(across * of(|i| i.band).abs());
        }
    }
    curve
}

#[cfg(test)]
mod tests {
    use super::*;

    /// F = -k z - c v encloses pi omega c X^2.
    #[test]
    fn the_loop_closes_and_encloses_the_loss() {
        let (k, c, x, omega) = (300.0, 5.0, 4e-3, 200.0);
        let cycle: Vec<Instant> = (0..48)
            .map(|n| {
                let phase = std::f64::consts::TAU * (f64::from(n) + 0.25) / 48.0;
                let force = -k * x * phase.sin() - c * omega * x * phase.cos();
                Instant { displacement: x * phase.sin(), force, band: 0.0 }
            })
            .collect();
        let curve = closed(&cycle, 1.0, 1.0);
        let last = curve.x.len() - 1;
        approx::assert_relative_eq!(curve.x[0], curve.x[last], max_relative = 1e-12);
        approx::assert_relative_eq!(curve.y[0], curve.y[last], max_relative = 1e-12);
        let area: f64 = (0..last).map(|i| -0.5 * (curve.y[i] + curve.y[i + 1]) * (curve.x[i + 1] - curve.x[i])).sum();
        approx::assert_relative_eq!(area, std::f64::consts::PI * omega * c * x * x, max_relative = 2e-4);
    }
}

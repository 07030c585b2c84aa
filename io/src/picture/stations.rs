//! What gauges read over time: a panel a station, all over the same time.

use lenzbore_solver::outcome::{Outcome, StationSeries, StationTrace};

use super::axes::{Axis, Frame, frame, grid, linear, room_below, room_left, tight};
use super::family::{draw, stroke};
use super::key::{Swatch, key, title};
use super::letters::fitting;
use super::paper::{COLUMN, Picture};
use super::ribbon::Banded;
use super::scale::significant;
use super::smooth::smooth;
use super::style::{MARGIN, MARK, SMALL, letters};
use super::svg::{Anchor, Svg};
use super::units::Shown;

const PANEL: f64 = 260.0;
const BETWEEN: f64 = 58.0;

/// One station's panel.
struct Panel<'a> {
    station: &'a StationTrace,
    unit: Shown,
    curves: Vec<Banded>,
}

/// Draws all stations; nothing where there are none.
#[must_use]
pub fn stations(heading: &str, outcome: &Outcome) -> Option<Picture> {
    let first = outcome.stations.first()?;
    let (start, end) = (*first.time_s.first()?, *first.time_s.last()?);
    if first.time_s.len() < 2 {
        return None;
    }
    let time = Shown::prefixed("s", end);
    let panels: Vec<Panel<'_>> = outcome.stations.iter().map(|s| Panel::of(s, &time)).collect();
    let subtitle = "Readings of gauges at fixed places, over time";
    let mut svg = Svg::new(COLUMN);
    let mut top = title(&mut svg, COLUMN, heading, subtitle) + 34.0;
    let left = MARGIN + panels.iter().map(|p| room_left(&p.axis(top))).fold(0.0, f64::max);
    let right = COLUMN - MARGIN - 8.0;
    let start = if start < 0.02 * end { 0.0 } else { start };
    let x = Axis {
        scale: tight(start * time.factor, end * time.factor, left, right),
        title: format!("Time from the start, {}", time.unit),
    };
    let mut entries = Vec::new();
    let count = panels.len();
    for (k, panel) in panels.iter().enumerate() {
        let y = panel.axis(top);
        let area = Frame { edge: MARGIN, left, right, top, bottom: top + PANEL };
        grid(&mut svg, &area, &x, &y);
        if y.scale.holds(0.0) {
            svg.line((left, y.scale.at(0.0)), (right, y.scale.at(0.0)), MARK);
        }
        for (n, curve) in panel.curves.iter().enumerate() {
            let line = smooth(curve, &x.scale, &y.scale);
            draw(&mut svg, &line, (&x.scale, &y.scale), stroke(n, 2));
        }
        let heading = fitting(&panel.heading(), SMALL, false, right - left);
        svg.text(left, top - 10.0, &heading, letters(SMALL, Anchor::Start));
        let below = if k + 1 == count { x.clone() } else { Axis { title: String::new(), ..x.clone() } };
        frame(&mut svg, &area, &below, &y);
        entries.extend(panel.entries());
        top += PANEL + BETWEEN;
    }
    let bottom = top - BETWEEN + room_below() + 6.0;
    let end = key(&mut svg, left, COLUMN - MARGIN, bottom, &entries);
    Some(Picture { name: "stations", svg: svg.finish(end + MARGIN, heading, subtitle) })
}

impl<'a> Panel<'a> {
    fn of(station: &'a StationTrace, time: &Shown) -> Self {
        let most = station.series.iter().flat_map(|s| &s.values).fold(0.0_f64, |m, v| m.max(v.abs()));
        let unit = match station.series.first().map(|s| s.unit) {
            Some("A/m2") => Shown::current_density(most),
            Some(unit) => Shown::prefixed(unit, most),
            None => Shown { unit: String::new(), factor: 1.0 },
        };
        let curve = |s: &StationSeries| Banded {
            x: station.time_s.iter().map(|t| t * time.factor).collect(),
            y: s.values.iter().map(|v| v * unit.factor).collect(),
            band: s.bands.iter().map(|v| v * unit.factor).collect(),
        };
        let curves = station.series.iter().map(curve).collect();
        Self { station, unit, curves }
    }

    fn axis(&self, top: f64) -> Axis {
        let values = || self.curves.iter().flat_map(|c| c.y.iter().copied());
        let (low, high) = (values().fold(0.0, f64::min), values().fold(0.0, f64::max));
        let what = match self.station.what {
            "search coil" => "E.m.f.",
            "current density" => "Current density",
            _ => "Flux density",
        };
        Axis { scale: linear(low, high, top + PANEL, top), title: format!("{what}, {}", self.unit.unit) }
    }

    fn heading(&self) -> String {
        let s = self.station;
        let place = (significant(2e3 * s.radius_m, 4), significant(1e3 * s.at_m, 4));
        format!("{}: {}, diameter {} mm, height {} mm", s.name, s.what, place.0, place.1)
    }

    fn entries(&self) -> Vec<(Swatch, String)> {
        let several = self.curves.len() > 1;
        let entry = |(n, (series, curve)): (usize, (&StationSeries, &Banded))| {
            let part = match series.name {
                "flux_density_r_T" => " radial,",
                "flux_density_z_T" => " axial,",
                _ => "",
            };
            let remark = curve.remark_on_greatest(&self.axis(0.0).scale, "reading");
            let remark = if several { remark.replace("numerical band", "band") } else { remark };
            (Swatch::Line(stroke(n, 2)), format!("{}:{part} {remark}", self.station.name))
        };
        self.station.series.iter().zip(&self.curves).enumerate().map(entry).collect()
    }
}

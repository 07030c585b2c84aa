//! Full section of wall and mover with the current density in the wall and the flux lines, or hatched and without field.

mod colours;
mod dimension;
mod flux;
mod metal;
mod mover;
mod overview;
mod sample;
mod sizes;
mod view;
mod wall;

use lenzbore_solver::outcome::{Fields, Outcome, Snapshot, Trace};
use lenzbore_solver::problem::{Problem, Travel};

use super::axes::tight;
use super::key::{Swatch, key, title};
use super::letters::{CAPITAL, width};
use super::paper::{COLUMN, Picture};
use super::scale::significant;
use super::style::{LABEL, MARGIN, SMALL, letters};
use super::svg::{Anchor, Stroke, Svg, Type, polygon};
use super::units::Shown;
use crate::layout::{BodyKind, Layout};
use crate::result::IoFault;
use flux::FluxLines;
use metal::Metal;
pub use overview::overview;
use sample::Patch;
use sizes::millimetres;
use view::{Body, View};
use wall::Cut;

const NAME: &str = "section";
const WINDOW: Stroke = Stroke::full("#b8b8b8", 1.4);
const CENTRE: Stroke = Stroke::dashed("#222222", 1.8, "34 7 4 7");
const FLUX: Stroke = Stroke { colour: "#333333", width: 1.7, dash: "", opacity: 0.85 };
const SPACER: Stroke = Stroke::dashed("#444444", 1.6, "14 7");
const TICK: Stroke = Stroke::full("#444444", 1.8);
/// Room for the heights on the left.
const LEFT: f64 = 96.0;

/// The section at the stored instant of the greatest current density; hatched where no field was stored.
///
/// # Errors
/// [`IoFault::Picture`] where level lines or colours cannot be made.
pub fn section(heading: &str, problem: &Problem, outcome: &Outcome) -> Result<Picture, IoFault> {
    let fields = outcome.fields.as_ref();
    let shown = fields.and_then(|f| strongest(f).map(|snapshot| (f, snapshot)));
    match shown {
        None => at_rest(heading, problem, None),
        Some((fields, snapshot)) => {
            let velocity = velocity(problem, &outcome.trace, snapshot.time_s);
            Sheet {
                problem,
                position: snapshot.mover_position_m,
                velocity,
                field: Some((fields, snapshot)),
                layout: None,
            }
            .draw(heading)
        }
    }
}

/// The parts to scale, without field: the mover half way along a finite wall.
///
/// # Errors
/// As [`section`].
pub fn drawing(heading: &str, layout: &Layout) -> Result<Picture, IoFault> {
    at_rest(heading, &layout.bodies(), Some(layout))
}

fn at_rest(heading: &str, problem: &Problem, layout: Option<&Layout>) -> Result<Picture, IoFault> {
    let body = Body::of(&problem.mover);
    let position = problem.wall.length_m().map_or(0.0, |length| 0.5 * length - 0.5 * (body.low + body.high));
    let position = match layout {
        Some(Layout { start_m: Some(start), end_m: None, .. }) => *start,
        _ => position,
    };
    let picture = Sheet { problem, position, velocity: 0.0, field: None, layout }.draw(heading)?;
    Ok(if layout.is_some() { Picture { name: "parts", ..picture } } else { picture })
}

/// What is drawn.
struct Sheet<'a> {
    problem: &'a Problem,
    position: f64,
    velocity: f64,
    field: Option<(&'a Fields, &'a Snapshot)>,
    /// Materials and spacers, where they are known.
    layout: Option<&'a Layout>,
}

/// The currents to be coloured, layer by layer, and their largest magnitude.
struct Currents {
    patches: Vec<Option<Patch>>,
    largest: f64,
}

impl Sheet<'_> {
    fn draw(&self, heading: &str) -> Result<Picture, IoFault> {
        let mut svg = Svg::new(COLUMN);
        let subtitle = self.subtitle();
        let top = title(&mut svg, COLUMN, heading, &subtitle) + sizes::room_above(self.problem);
        let view = View::about(self.problem, self.position, MARGIN + LEFT, top);
        let cuts = wall::cuts(self.problem, &view);
        let currents = self.currents(&cuts);
        let flux = match self.field {
            Some((fields, snapshot)) => flux::lines(self.problem, fields, snapshot, &view)?,
            None => None,
        };
        self.paint_wall(&mut svg, &view, &cuts, &currents)?;
        self.paint_mover_and_flux(&mut svg, &view, flux.as_ref());
        for cut in &cuts {
            cut.edges(&mut svg, &view);
        }
        centre_line(&mut svg, &view);
        mover::signs(&mut svg, self.problem, &view, self.position);
        mover::motion(&mut svg, self.problem, &view, self.position, self.velocity);
        heights(&mut svg, &view);
        let below = sizes::diameters(&mut svg, self.problem, &view, self.position, &cuts);
        let right = sizes::length(&mut svg, self.problem, &view, self.position);
        if currents.largest > 0.0 {
            let middle = 0.5 * (view.top + view.bottom());
            let half = (0.5 * (view.bottom() - view.top) - 70.0).clamp(90.0, 230.0);
            colours::bar(&mut svg, right + 22.0, middle - half, middle + half, currents.largest);
        }
        let entries = self.entries(flux.as_ref(), currents.largest > 0.0);
        let end = key(&mut svg, MARGIN, COLUMN - MARGIN, below.max(view.bottom()) + 26.0, &entries);
        Ok(Picture { name: NAME, svg: svg.finish(end + MARGIN, heading, &subtitle) })
    }

    fn currents(&self, cuts: &[Cut<'_>]) -> Currents {
        let patch = |cut: &Cut<'_>| self.field.and_then(|(fields, snapshot)| cut.current(fields, snapshot));
        let patches: Vec<Option<Patch>> = cuts.iter().map(patch).collect();
        let largest = patches.iter().flatten().map(Patch::largest).fold(0.0, f64::max);
        Currents { patches, largest }
    }

    fn paint_wall(&self, svg: &mut Svg, view: &View, cuts: &[Cut<'_>], currents: &Currents) -> Result<(), IoFault> {
        for (n, (cut, patch)) in cuts.iter().zip(&currents.patches).enumerate() {
            match patch {
                Some(patch) if currents.largest > 0.0 => cut.paint(svg, view, patch, currents.largest)?,
                _ => cut.hatch(svg, view, n % 2 == 0, Metal::of(cut.layer(), self.layout)),
            }
        }
        Ok(())
    }

    fn paint_mover_and_flux(&self, svg: &mut Svg, view: &View, flux: Option<&FluxLines>) {
        let window = [
            (view.left(), view.top),
            (view.right(), view.top),
            (view.right(), view.bottom()),
            (view.left(), view.bottom()),
        ];
        mover::bodies(svg, self.problem, view, self.position);
        self.paint_spacers(svg, view);
        if let Some(flux) = flux {
            let right_half = [(view.axis, view.top), window[1], window[2], (view.axis, view.bottom())];
            let clip = svg.clip(&polygon(&right_half));
            let name = svg.name("flux");
            svg.open(&format!("id=\"{name}\" clip-path=\"url(#{clip})\""));
            svg.path(&flux.path, FLUX);
            svg.close();
            svg.again(&name, &wall::mirror(view));
        }
        svg.path(&polygon(&window), WINDOW);
    }

    /// Spacers in broken lines: a case gives their length alone.
    fn paint_spacers(&self, svg: &mut Svg, view: &View) {
        let Some(layout) = self.layout else { return };
        let (inner, outer) = overview::spacer_radii(layout);
        for body in layout.mover.iter().filter(|b| matches!(b.kind, BodyKind::Spacer)) {
            let middle = self.position + body.at_m;
            let (top, bottom) = (view.y(middle + 0.5 * body.length_m), view.y(middle - 0.5 * body.length_m));
            let halves = if inner > 0.0 { vec![(inner, outer), (-outer, -inner)] } else { vec![(-outer, outer)] };
            for (from, to) in halves {
                svg.rectangle(view.x(from), top, view.x(to), bottom, "#ffffff", Some(SPACER));
            }
        }
    }

    fn subtitle(&self) -> String {
        match (self.field, &self.problem.travel) {
            (None, _) => "Section of wall and mover, to scale".to_owned(),
            (Some(_), Travel::Steady { .. }) => "Section of wall and mover, settled fields".to_owned(),
            (Some((_, snapshot)), _) => format!(
                "Section at {} s, reference point at {} mm",
                significant(snapshot.time_s, 4),
                significant(1e3 * snapshot.mover_position_m, 4)
            ),
        }
    }

    fn entries(&self, flux: Option<&FluxLines>, coloured: bool) -> Vec<(Swatch, String)> {
        let mut entries = Vec::new();
        if let Some(flux) = flux {
            let unit = Shown::prefixed("Wb", flux.step_weber);
            let step = significant(flux.step_weber * unit.factor, 3);
            entries.push((
                Swatch::Line(FLUX),
                format!("flux lines of the total field, {step} {} between neighbours", unit.unit),
            ));
        }
        if coloured {
            let text = "current density positive: into the page on the right half, out of it on the left";
            entries.push((Swatch::None, text.to_owned()));
        }
        if !coloured {
            entries.push((Swatch::None, self.hatching()));
        }
        let sizes = "sizes in millimetres";
        entries.push((Swatch::None, format!("{}; {sizes}", self.materials())));
        entries
    }

    /// Which hatching stands for which metal.
    fn hatching(&self) -> String {
        let mut metals: Vec<Metal> = self.problem.wall.layers.iter().map(|l| Metal::of(l, self.layout)).collect();
        metals.sort_unstable();
        metals.dedup();
        let words: Vec<&str> = metals.iter().map(|m| m.words()).collect();
        let spacers = self.layout.is_some_and(|l| l.mover.iter().any(|b| matches!(b.kind, BodyKind::Spacer)));
        let spacers = if spacers { "; spacers in broken lines" } else { "" };
        format!("hatched: {}{spacers}", words.join(", "))
    }

    /// The layers in words, inside out.
    fn materials(&self) -> String {
        let mut layers: Vec<_> = self.problem.wall.layers.iter().collect();
        layers.sort_by(|a, b| a.inner_radius_m.total_cmp(&b.inner_radius_m));
        let one = |layer: &&lenzbore_solver::problem::Layer| {
            let iron = if (layer.relative_permeability - 1.0).abs() > 1e-9 {
                format!(", relative permeability {}", significant(layer.relative_permeability, 4))
            } else {
                String::new()
            };
            let conductivity = significant(1e-6 * layer.conductivity_s_per_m, 4);
            let body = if layer.inner_radius_m > 0.0 {
                format!("{} thick", millimetres(layer.thickness_m()))
            } else {
                "solid".to_owned()
            };
            format!("{}: {body}, {conductivity} MS/m{iron}", layer.name)
        };
        layers.iter().map(one).collect::<Vec<_>>().join("; ")
    }
}

/// The dash-dotted centre line, a little beyond the window.
fn centre_line(svg: &mut Svg, view: &View) {
    svg.line((view.axis, view.top - 10.0), (view.axis, view.bottom() + 14.0), CENTRE);
}

/// Heights along the left edge of the window.
fn heights(svg: &mut Svg, view: &View) {
    let scale = tight(1e3 * view.low, 1e3 * view.high, view.bottom(), view.top);
    let mut widest = 0.0_f64;
    for tick in scale.ticks(80.0) {
        let y = scale.at(tick.value);
        svg.line((view.left(), y), (view.left() + 9.0, y), TICK);
        svg.text(view.left() - 9.0, y + 0.5 * CAPITAL * SMALL, &tick.label, letters(SMALL, Anchor::End));
        widest = widest.max(width(&tick.label, SMALL, false));
    }
    let kind = Type { upright: true, ..letters(LABEL, Anchor::Middle) };
    svg.text(view.left() - widest - 22.0, 0.5 * (view.top + view.bottom()), "Height z, mm", kind);
}

/// The stored instant with the greatest current density; the first where no current flows.
fn strongest(fields: &Fields) -> Option<&Snapshot> {
    let peak = |s: &Snapshot| s.current_density_phi.iter().fold(0.0_f64, |m, j| m.max(j.abs()));
    fields.snapshots.iter().rev().max_by(|a, b| peak(a).total_cmp(&peak(b)))
}

/// Signed velocity at an instant.
fn velocity(problem: &Problem, trace: &Trace, time: f64) -> f64 {
    match &problem.travel {
        Travel::Steady { velocity_m_per_s } => *velocity_m_per_s,
        Travel::Alternating(_) => 0.0,
        Travel::Traverse(t) => t.speed_m_per_s * (t.to_m - t.from_m).signum(),
        Travel::Free(_) | Travel::Sine(_) | Travel::Table(_) => {
            let at = trace.time_s.partition_point(|t| *t < time).min(trace.velocity_m_per_s.len().saturating_sub(1));
            let at_start = if let Travel::Free(free) = &problem.travel { free.entry_velocity_m_per_s } else { 0.0 };
            trace.velocity_m_per_s.get(at).copied().unwrap_or(at_start)
        }
    }
}

#[cfg(test)]
#[path = "tests.rs"]
mod tests;

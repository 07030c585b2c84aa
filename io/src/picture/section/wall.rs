//! The wall in section: layers cut through, hatched or coloured by the current in them.

use lenzbore_solver::outcome::{Fields, Snapshot};
use lenzbore_solver::problem::{Extent, Layer, Problem};

use super::colours::colour;
use super::metal::Metal;
use super::sample::Patch;
use super::view::View;
use crate::picture::svg::{Stroke, Svg, polygon, polyline};
use crate::result::IoFault;

const BREAK: Stroke = Stroke::full("#222222", 1.6);
/// A picture element of the colours on paper, 0.1 mm.
const ELEMENT: f64 = 1.6;
/// Swing of a break line.
const SWING: f64 = 6.0;

/// One layer as far as the window shows it.
pub(super) struct Cut<'a> {
    layer: &'a Layer,
    /// The wave of all break lines: where it begins and its length, on paper.
    wave: (f64, f64),
    /// Heights shown, m.
    pub low: f64,
    pub high: f64,
    ends: (bool, bool),
}

/// The layers that the window shows.
pub(super) fn cuts<'a>(problem: &'a Problem, view: &View) -> Vec<Cut<'a>> {
    let endless = problem.wall.extent == Extent::Endless;
    let thickness = view.scale * (problem.wall.outer_radius_m() - problem.wall.inner_radius_m());
    // On a rod the wave is symmetric about the axis.
    let quarter = if problem.wall.inner_radius_m() > 0.0 { 0.0 } else { 0.25 };
    let length = thickness / (thickness / 90.0).round().max(1.0);
    let wave = (view.x(problem.wall.inner_radius_m()) - quarter * length, length);
    let cut = |layer: &'a Layer| {
        let (from, to) = if endless { (f64::NEG_INFINITY, f64::INFINITY) } else { (layer.from_m, layer.to_m) };
        let (low, high) = (from.max(view.low), to.min(view.high));
        (high > low).then_some(Cut { layer, wave, low, high, ends: (from >= view.low, to <= view.high) })
    };
    problem.wall.layers.iter().filter_map(cut).collect()
}

impl Cut<'_> {
    /// Current density in this layer, by its own cells only.
    pub(super) fn current(&self, fields: &Fields, snapshot: &Snapshot) -> Option<Patch> {
        let radii = (self.layer.inner_radius_m, self.layer.outer_radius_m);
        let slack = 0.05 * (self.high - self.low);
        let heights = (
            if self.ends.0 { self.layer.from_m } else { self.low - slack },
            if self.ends.1 { self.layer.to_m } else { self.high + slack },
        );
        Patch::of_cells(&fields.r_m, &fields.z_m, &snapshot.current_density_phi, radii, heights)
    }

    /// The outline of the right half on paper, with break lines where the layer goes on beyond the window.
    fn outline(&self, view: &View) -> Vec<(f64, f64)> {
        let mut points = self.end(view, true);
        points.extend(self.end(view, false).into_iter().rev());
        points
    }

    /// The upper or lower end of the right half, inner face first.
    fn end(&self, view: &View, upper: bool) -> Vec<(f64, f64)> {
        let (x0, x1) = (view.x(self.layer.inner_radius_m), view.x(self.layer.outer_radius_m));
        let y = view.y(if upper { self.high } else { self.low });
        let is_end = if upper { self.ends.1 } else { self.ends.0 };
        if is_end {
            return vec![(x0, y), (x1, y)];
        }
        let inward = if upper { SWING } else { -SWING };
        let at = |i: i32| {
            let x = x0 + f64::from(i) / 24.0 * (x1 - x0);
            (x, y + inward + SWING * (std::f64::consts::TAU * (x - self.wave.0) / self.wave.1).sin())
        };
        (0..=24).map(at).collect()
    }

    /// Colours of the current on both halves.
    pub(super) fn paint(&self, svg: &mut Svg, view: &View, current: &Patch, largest: f64) -> Result<(), IoFault> {
        let (r0, r1) = (self.layer.inner_radius_m, self.layer.outer_radius_m);
        let (x0, x1, y0, y1) = (view.x(r0), view.x(r1), view.y(self.high), view.y(self.low));
        let (columns, rows) = (elements(x1 - x0), elements(y1 - y0));
        let mut dots = Vec::with_capacity(columns * rows * 3);
        for row in 0..rows {
            let z = self.high - (self.high - self.low) * middle(row, rows);
            for column in 0..columns {
                let r = r0 + (r1 - r0) * middle(column, columns);
                dots.extend(colour(current.at(r, z), largest));
            }
        }
        let png =
            raster(columns, rows, &dots).map_err(|e| IoFault::Picture { picture: "section", source: e.into() })?;
        let clip = svg.clip(&polygon(&self.outline(view)));
        let name = svg.name("layer");
        svg.open(&format!("id=\"{name}\" clip-path=\"url(#{clip})\""));
        svg.raster(x0, y0, x1 - x0, y1 - y0, &png);
        svg.close();
        svg.again(&name, &mirror(view));
        Ok(())
    }

    /// Hatching of both halves by family of metal; neighbouring layers lean opposite ways.
    pub(super) fn hatch(&self, svg: &mut Svg, view: &View, leans_right: bool, metal: Metal) {
        let outline = self.outline(view);
        let mirrored: Vec<(f64, f64)> = outline.iter().map(|(x, y)| (2.0 * view.axis - x, *y)).collect();
        for (outline, leans_right) in [(outline, leans_right), (mirrored, !leans_right)] {
            let name = metal.pattern(svg, leans_right);
            svg.area(&polygon(&outline), &format!("url(#{name})"), 1.0, None);
        }
    }

    /// The layer.
    pub(super) fn layer(&self) -> &Layer {
        self.layer
    }

    /// Faces, ends and break lines of both halves.
    pub(super) fn edges(&self, svg: &mut Svg, view: &View) {
        let edge = Stroke::full("#222222", (0.1 * view.scale * self.layer.thickness_m()).clamp(1.3, 3.0));
        for side in [1.0, -1.0] {
            let on_side = |points: Vec<(f64, f64)>| -> Vec<(f64, f64)> {
                points.into_iter().map(|(x, y)| (view.axis + side * (x - view.axis), y)).collect()
            };
            let (upper, lower) = (on_side(self.end(view, true)), on_side(self.end(view, false)));
            for (line, is_end) in [(&upper, self.ends.1), (&lower, self.ends.0)] {
                svg.path(&polyline(line), if is_end { edge } else { BREAK });
            }
            let faces = upper.iter().zip(&lower);
            let outer = [upper.last().copied().zip(lower.last().copied())];
            let inner = faces.take(1).map(|(a, b)| Some((*a, *b))).filter(|_| self.layer.inner_radius_m > 0.0);
            for (a, b) in inner.chain(outer).flatten() {
                svg.line(a, b, edge);
            }
        }
    }

    /// Outer and inner radius, m.
    pub(super) fn radii(&self) -> [f64; 2] {
        [self.layer.inner_radius_m, self.layer.outer_radius_m]
    }
}

/// The transform that lays the right half onto the left.
pub(super) fn mirror(view: &View) -> String {
    format!("translate({} 0) scale(-1 1)", crate::picture::svg::short(2.0 * view.axis))
}

#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped")]
fn elements(length: f64) -> usize {
    (length.abs() / ELEMENT).ceil().clamp(4.0, 700.0) as usize
}

#[expect(clippy::cast_precision_loss, reason = "a few hundred elements")]
fn middle(index: usize, count: usize) -> f64 {
    (index as f64 + 0.5) / count as f64
}

fn raster(columns: usize, rows: usize, dots: &[u8]) -> Result<Vec<u8>, png::EncodingError> {
    let size = |n: usize| u32::try_from(n).unwrap_or(u32::MAX);
    let mut file = Vec::new();
    let mut encoder = png::Encoder::new(&mut file, size(columns), size(rows));
    encoder.set_color(png::ColorType::Rgb);
    encoder.set_depth(png::BitDepth::Eight);
    encoder.set_compression(png::Compression::High);
    encoder.write_header()?.write_image_data(dots)?;
    Ok(file)
}

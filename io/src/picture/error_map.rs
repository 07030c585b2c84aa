//! How far the ring sum is off, over speed and wall thickness.

use lenzbore_solver::ladder::{Assumptions, ErrorMap, LadderOutcome, WallModel};

use super::axes::{Axis, Frame, frame, room_below, room_left};
use super::key::{Swatch, key, title};
use super::paper::{COLUMN, Picture};
use super::scale::{Kind, Scale};
use super::style::{INK, LABEL, MARGIN, letters};
use super::svg::{Anchor, Stroke, Svg, Type};
use super::units::Shown;
use crate::result::IoFault;

const HEIGHT: f64 = 360.0;
/// Dots of the raster.
const DOTS: (usize, usize) = (480, 300);
/// Upper limit of |error|, colour where the model says too much, colour where it says too little.
const CLASSES: [(f64, [u8; 3], [u8; 3]); 7] = [
    (0.01, [0x1b, 0x78, 0x37], [0x1b, 0x78, 0x37]),
    (0.02, [0x5a, 0xae, 0x61], [0x5a, 0xae, 0x61]),
    (0.05, [0xa6, 0xdb, 0xa0], [0xa6, 0xdb, 0xa0]),
    (0.10, [0xd9, 0xf0, 0xd3], [0xd9, 0xf0, 0xd3]),
    (0.25, [0xfd, 0xd5, 0xb0], [0xd0, 0xe1, 0xf2]),
    (1.00, [0xf0, 0x90, 0x4a], [0x7f, 0xa8, 0xcf]),
    (f64::INFINITY, [0xb5, 0x50, 0x0c], [0x1f, 0x5a, 0x96]),
];

/// Draws the maps of the ring sums at the mean and at the inner radius, or nothing where there is no map.
///
/// # Errors
/// [`IoFault::Picture`] where the raster cannot be made.
pub fn error_map(heading: &str, outcome: &LadderOutcome) -> Result<Option<Picture>, IoFault> {
    let Some(map) = &outcome.map else { return Ok(None) };
    let mut svg = Svg::new(COLUMN);
    let subtitle = "Error of the drag by sums of independent rings, endless wall";
    let mut y = title(&mut svg, COLUMN, heading, subtitle);
    for assumptions in [Assumptions::RINGS_MEAN, Assumptions::RINGS_INNER] {
        if let Some((_, errors)) = map.errors.iter().find(|(a, _)| *a == assumptions) {
            y = panel(&mut svg, map, assumptions, errors, y)?;
        }
    }
    let end = key(&mut svg, MARGIN, COLUMN - MARGIN, y, &entries());
    let svg = svg.finish(end + MARGIN, heading, "Error of the ring sum over speed and wall thickness");
    Ok(Some(Picture { name: "error_map", svg }))
}

fn panel(
    svg: &mut Svg,
    map: &ErrorMap,
    assumptions: Assumptions,
    errors: &[Vec<f64>],
    top: f64,
) -> Result<f64, IoFault> {
    let words = if assumptions.wall == WallModel::MeanRadius {
        "rings at the mean radius"
    } else {
        "rings at the inner radius"
    };
    svg.text(MARGIN, top + LABEL, words, Type { bold: true, ..letters(LABEL, Anchor::Start) });
    let speed = Shown::speed(map.here.0);
    let log = |values: &[f64], factor: f64, start, end| {
        let (low, high) = (values.first().copied().unwrap_or(1.0), values.last().copied().unwrap_or(2.0));
        Scale { kind: Kind::Log, low: low * factor, high: high * factor, start, end }
    };
    let (area_top, bottom) = (top + LABEL + 14.0, top + LABEL + 14.0 + HEIGHT);
    let y =
        Axis { scale: log(&map.thickness_ratios, 1.0, bottom, area_top), title: "Wall thickness / radius".to_owned() };
    let left = MARGIN + room_left(&y);
    let area = Frame { edge: MARGIN, left, right: COLUMN - MARGIN - 8.0, top: area_top, bottom };
    let x = Axis {
        scale: log(&map.speeds_m_per_s, speed.factor, area.left, area.right),
        title: format!("Speed, {}", speed.unit),
    };
    let png = raster(errors).map_err(|e| IoFault::Picture { picture: "error_map", source: e.into() })?;
    svg.raster(area.left, area.top, area.right - area.left, area.bottom - area.top, &png);
    let here = (x.scale.at(map.here.0 * speed.factor), y.scale.at(map.here.1));
    svg.circle(here, 10.0, "#ffffff", Some(Stroke::full(INK, 4.0)));
    frame(svg, &area, &x, &y);
    Ok(bottom + room_below() + 24.0)
}

/// The errors as coloured classes, thickness upward, speed to the right; linear between the points (whose axes are logarithmic).
fn raster(errors: &[Vec<f64>]) -> Result<Vec<u8>, png::EncodingError> {
    let (columns, rows) = DOTS;
    let mut dots = Vec::with_capacity(3 * columns * rows);
    for row in 0..rows {
        let up = 1.0 - (row as f64 + 0.5) / rows as f64;
        for column in 0..columns {
            let along = (column as f64 + 0.5) / columns as f64;
            dots.extend(colour(between(errors, up, along)));
        }
    }
    let mut file = Vec::new();
    let mut encoder = png::Encoder::new(&mut file, 480, 300);
    encoder.set_color(png::ColorType::Rgb);
    encoder.set_depth(png::BitDepth::Eight);
    encoder.set_compression(png::Compression::High);
    encoder.write_header()?.write_image_data(&dots)?;
    Ok(file)
}

/// Bilinear value at fractions `up` and `along` of the table.
fn between(errors: &[Vec<f64>], up: f64, along: f64) -> f64 {
    let (row, v) = place(up, errors.len());
    let (column, u) = place(along, errors.first().map_or(0, Vec::len));
    let at = |i: usize, j: usize| errors.get(i).and_then(|r| r.get(j)).copied().unwrap_or(0.0);
    let lower = at(row, column) * (1.0 - u) + at(row, column + 1) * u;
    let upper = at(row + 1, column) * (1.0 - u) + at(row + 1, column + 1) * u;
    lower * (1.0 - v) + upper * v
}

/// Cell and place in it of a fraction of `count` points.
fn place(fraction: f64, count: usize) -> (usize, f64) {
    let last = count.saturating_sub(2) as f64;
    let exact = fraction * count.saturating_sub(1) as f64;
    let cell = exact.floor().clamp(0.0, last);
    #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped to the table above")]
    let index = cell as usize;
    (index, exact - cell)
}

fn colour(error: f64) -> [u8; 3] {
    let class = CLASSES.iter().find(|c| error.abs() <= c.0).unwrap_or(&CLASSES[CLASSES.len() - 1]);
    if error >= 0.0 { class.1 } else { class.2 }
}

fn entries() -> Vec<(Swatch, String)> {
    [
        (Swatch::Patch("#1b7837"), "within 1 % of the field solution"),
        (Swatch::Patch("#5aae61"), "within 2 %"),
        (Swatch::Patch("#a6dba0"), "within 5 %"),
        (Swatch::Patch("#d9f0d3"), "within 10 %"),
        (Swatch::Patch("#fdd5b0"), "too high by 10 to 25 %; darker: to 100 %, beyond"),
        (Swatch::Patch("#d0e1f2"), "too low by 10 to 25 %; darker: more"),
        (Swatch::Ring(INK), "this design"),
        (Swatch::None, "A green stripe between orange and blue is two errors that cancel, not a model that is right."),
    ]
    .map(|(swatch, text)| (swatch, text.to_owned()))
    .to_vec()
}

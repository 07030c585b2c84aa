//! A finished picture: SVG text, and the same as PNG.

use std::sync::{Arc, OnceLock};

use resvg::tiny_skia::{Color, Pixmap, Transform};
use resvg::usvg::{self, fontdb};

use super::letters;
use super::svg::short;
use crate::result::IoFault;

/// Dots to an inch of the PNG files: fine at column width, still 300 dpi at twice that.
pub const DOTS_PER_INCH: f32 = 600.0;

/// Width of every picture on paper, 0.1 mm: one column of a two-column page.
pub(super) const COLUMN: f64 = 850.0;

/// A finished picture.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Picture {
    /// Its name, the stem of its files.
    pub name: &'static str,
    /// The SVG file.
    pub svg: String,
}

/// Width of a picture on paper where none is asked for, m: one column of a two-column page.
pub const COLUMN_WIDTH_M: f64 = 1e-4 * COLUMN;

impl Picture {
    /// The same picture so wide on paper, letters and lines in proportion: at 85 mm its letters are of 7 to 8 points.
    #[must_use]
    pub fn at_width(self, width_m: f64) -> Self {
        Self { svg: resized(&self.svg, width_m).unwrap_or(self.svg), ..self }
    }

    /// The picture as a PNG file at [`DOTS_PER_INCH`], with that resolution stated in it; the same bytes on every machine.
    ///
    /// # Errors
    /// [`IoFault::Picture`] where the SVG cannot be read or no memory is had.
    pub fn png(&self) -> Result<Vec<u8>, IoFault> {
        self.png_at(DOTS_PER_INCH)
    }

    /// The picture as a PNG file at another resolution.
    ///
    /// # Errors
    /// As [`Picture::png`].
    pub fn png_at(&self, dots_per_inch: f32) -> Result<Vec<u8>, IoFault> {
        let fault = |source: Box<dyn std::error::Error + Send + Sync>| IoFault::Picture { picture: self.name, source };
        let options = usvg::Options { fontdb: fonts(), ..usvg::Options::default() };
        let tree = usvg::Tree::from_str(&self.svg, &options).map_err(|e| fault(e.into()))?;
        // usvg lays a millimetre out as 96/25.4 dots.
        let scale = dots_per_inch / 96.0;
        let (wide, high) = (dots(tree.size().width() * scale), dots(tree.size().height() * scale));
        let mut map = Pixmap::new(wide, high).ok_or_else(|| fault("no memory for its pixels".into()))?;
        map.fill(Color::WHITE);
        resvg::render(&tree, Transform::from_scale(scale, scale), &mut map.as_mut());
        encoded(&map, dots_per_inch).map_err(|e| fault(e.into()))
    }
}

/// A drawing of ours at another width on paper; nothing where the text is no such drawing.
#[must_use]
pub fn resized(svg: &str, width_m: f64) -> Option<String> {
    let width = Size::of(svg, " width=\"")?;
    let height = Size::of(svg, " height=\"")?;
    if width.millimetres <= 0.0 || height.at < width.end {
        return None;
    }
    let scale = 1e3 * width_m / width.millimetres;
    let size = |of: &Size| short(scale * of.millimetres);
    let (before, between, after) = (&svg[..width.at], &svg[width.end..height.at], &svg[height.end..]);
    Some(format!("{before}{}{between}{}{after}", size(&width), size(&height)))
}

/// A size of the outermost element, in millimetres, and where its digits stand.
struct Size {
    at: usize,
    end: usize,
    millimetres: f64,
}

impl Size {
    fn of(svg: &str, word: &str) -> Option<Self> {
        let head = svg.find("<svg")?;
        let tag = &svg[head..head + svg[head..].find('>')?];
        let at = head + tag.find(word)? + word.len();
        let end = at + svg[at..].find("mm\"")?;
        Some(Self { at, end, millimetres: svg[at..end].parse().ok()? })
    }
}

/// A drawing of ours as a PNG file at [`DOTS_PER_INCH`].
///
/// # Errors
/// As [`Picture::png`].
pub fn png_of(svg: &str) -> Result<Vec<u8>, IoFault> {
    Picture { name: "of a folder", svg: svg.to_owned() }.png()
}

/// The bundled faces alone: what is installed on the machine makes no difference.
fn fonts() -> Arc<fontdb::Database> {
    static FONTS: OnceLock<Arc<fontdb::Database>> = OnceLock::new();
    let load = || {
        let mut all = fontdb::Database::new();
        all.load_font_data(letters::REGULAR.to_vec());
        all.load_font_data(letters::BOLD.to_vec());
        all.set_sans_serif_family(letters::FAMILY);
        Arc::new(all)
    };
    FONTS.get_or_init(load).clone()
}

/// Opaque pixels with the resolution in dots a metre.
fn encoded(map: &Pixmap, dots_per_inch: f32) -> Result<Vec<u8>, png::EncodingError> {
    let opaque: Vec<u8> = map.pixels().iter().flat_map(|p| [p.red(), p.green(), p.blue()]).collect();
    let mut file = Vec::new();
    let mut encoder = png::Encoder::new(&mut file, map.width(), map.height());
    encoder.set_color(png::ColorType::Rgb);
    encoder.set_depth(png::BitDepth::Eight);
    encoder.set_compression(png::Compression::Balanced);
    encoder.set_filter(png::Filter::NoFilter);
    encoder.set_pixel_dims(Some(dots_per_metre(dots_per_inch)));
    encoder.write_header()?.write_image_data(&opaque)?;
    Ok(file)
}

fn dots_per_metre(dots_per_inch: f32) -> png::PixelDimensions {
    let dots = dots(dots_per_inch / 0.0254);
    png::PixelDimensions { xppu: dots, yppu: dots, unit: png::Unit::Meter }
}

/// A positive number of dots far below 2^32, rounded.
#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "a cast keeps within the type's range")]
fn dots(exact: f32) -> u32 {
    exact.round() as u32
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use super::*;
    use crate::picture::svg::{Svg, Type};

    fn sheet() -> Picture {
        let mut svg = Svg::new(COLUMN);
        svg.text(30.0, 60.0, "Drag, N", Type::plain(26.0));
        Picture { name: "sheet", svg: svg.finish(500.0, "a width=\"1mm\"", "b") }
    }

    /// Width and height from the head of a PNG file.
    fn dots_of(png: &[u8]) -> (u32, u32) {
        let number = |at: usize| u32::from_be_bytes(png[at..at + 4].try_into().unwrap());
        (number(16), number(20))
    }

    #[test]
    fn a_picture_is_as_wide_as_asked_and_keeps_its_shape() {
        let wide = sheet().at_width(0.17);
        assert!(wide.svg.contains("width=\"170mm\" height=\"100mm\" viewBox=\"0 0 850 500\""), "{}", wide.svg);
        // 170 mm at 600 dots an inch.
        assert_eq!(dots_of(&wide.png().unwrap()), (4016, 2362));
        assert_eq!(sheet().at_width(COLUMN_WIDTH_M), sheet());
        assert_eq!(resized("<svg viewBox=\"0 0 1 1\"></svg>", 0.1), None);
    }

    #[test]
    fn the_same_drawing_gives_the_same_bytes() {
        assert_eq!(sheet().svg, sheet().svg);
        assert_eq!(sheet().png().unwrap(), sheet().png().unwrap());
        assert_eq!(png_of(&sheet().svg).unwrap(), sheet().png().unwrap());
    }
}

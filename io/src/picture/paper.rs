//! A finished picture: SVG text, and the same as PNG.

use std::sync::{Arc, OnceLock};

use resvg::tiny_skia::{Color, Pixmap, Transform};
use resvg::usvg::{self, fontdb};

use super::letters;
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

impl Picture {
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

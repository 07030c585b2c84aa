//! `lenzbore report`: the page of a result folder, made again of its files, and its pictures at another width.

use lenzbore_io::report;
use lenzbore_io::units::{Kind, read_quantity};

use crate::arguments::ReportWords;
use crate::end::End;
use crate::say;

/// Narrowest and widest picture, m.
const WIDTHS: (f64, f64) = (0.05, 1.2);

/// Writes the page, and the pictures where asked to; says where.
pub fn run(words: &ReportWords) -> Result<(), End> {
    let width = words.width.as_deref().map(width).transpose()?;
    let page = report::write(&words.folder, words.replace)?;
    let mut written = vec![page];
    if let Some(width) = width {
        written.extend(report::resize_pictures(&words.folder, width)?);
    }
    for path in written {
        say::to_standard_output(&format!("written: {}\n", path.display()));
    }
    Ok(())
}

fn width(text: &str) -> Result<f64, End> {
    let width = read_quantity(text, Kind::Length).map_err(|fault| End::Input(format!("--width: {fault}")))?.si;
    if width >= WIDTHS.0 && width <= WIDTHS.1 {
        return Ok(width);
    }
    Err(End::Input(format!("--width \"{text}\": pictures are 50 mm to 1.2 m wide")))
}

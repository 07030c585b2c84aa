//! `report.html`: one page that shows a result folder to people. It is made of the folder's files alone, so that it can be made
//! again at any time; it holds everything it shows, asks no network, and what it takes from a result is escaped.
//!
//! A section is a function of `source::Source`; a figure, table or part of the summary that no section knows is shown all the
//! same, as a table and a chart of its own.

mod chart;
mod escape;
mod fields;
mod folder_tables;
mod numbers;
mod page;
mod sections;
mod source;
mod table;
mod thin;
mod words;

use std::path::{Path, PathBuf};

use crate::picture;
use crate::result::{IoFault, names, write_beside};

/// The page of a result folder.
///
/// # Errors
/// [`IoFault::NoSummary`], [`IoFault::Unread`] or [`IoFault::Misread`] where the folder is not as a run writes it.
pub fn build(folder: &Path) -> Result<String, IoFault> {
    let source = source::Source::read(folder)?;
    let mut charts = chart::Charts::default();
    let sections = sections::all(&source, &mut charts)?;
    Ok(page::page(&source, &sections, &charts))
}

/// Writes the page into its folder; gives its path.
///
/// # Errors
/// As [`build`], [`IoFault::PageExists`] where it stands there and is not to be replaced, or what the system says.
pub fn write(folder: &Path, replace: bool) -> Result<PathBuf, IoFault> {
    let path = folder.join(names::REPORT);
    if path.exists() && !replace {
        return Err(IoFault::PageExists { path });
    }
    write_beside(&path, build(folder)?.as_bytes())?;
    Ok(path)
}

/// Makes every picture of a folder (SVG of ours, and its PNG) so wide on paper; gives the files written.
///
/// # Errors
/// [`IoFault::Picture`], [`IoFault::Unread`], or what the system says.
pub fn resize_pictures(folder: &Path, width_m: f64) -> Result<Vec<PathBuf>, IoFault> {
    let unread = |source| IoFault::Unread { path: folder.to_path_buf(), source };
    let mut drawings = Vec::new();
    for entry in std::fs::read_dir(folder).map_err(unread)? {
        let path = entry.map_err(unread)?.path();
        if path.extension().is_some_and(|e| e == "svg") {
            drawings.push(path);
        }
    }
    drawings.sort();
    let mut written = Vec::new();
    for path in drawings {
        let svg = std::fs::read_to_string(&path).map_err(|source| IoFault::Unread { path: path.clone(), source })?;
        let Some(svg) = picture::resized(&svg, width_m) else { continue };
        write_beside(&path, svg.as_bytes())?;
        let raster = path.with_extension("png");
        write_beside(&raster, &picture::png_of(&svg)?)?;
        written.extend([path, raster]);
    }
    Ok(written)
}

#[cfg(test)]
mod tests;

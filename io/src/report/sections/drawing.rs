//! The case as a drawing office would draw it: the section about the mover, and the whole course.

use super::Section;
use crate::picture::{self, Picture};
use crate::report::escape::text;
use crate::report::source::Source;
use crate::result::IoFault;

/// Both drawings, where the summary says where the bodies stand.
///
/// # Errors
/// [`IoFault::Picture`].
pub(super) fn section(source: &Source) -> Result<Option<Section>, IoFault> {
    let Some(layout) = &source.layout else { return Ok(None) };
    let parts = picture::drawing("Section", layout)?;
    let mut html = inline(&parts, "Full section about the mover: wall hatched, diameters, running clearance, poles.");
    if let Some(course) = picture::overview("Course", layout) {
        html.push_str(&inline(&course, "The whole course: wall, start, end and gates."));
    }
    Ok(Some(Section::new("drawing", "The case", format!("<div class=\"drawings\">\n{html}</div>\n"))))
}

/// A picture as an element of the page, its names made its own.
fn inline(picture: &Picture, says: &str) -> String {
    let body = picture.svg.find("<svg").map_or("", |start| &picture.svg[start..]);
    let own = format!("{}-", picture.name);
    let body = body
        .replace(" id=\"", &format!(" id=\"{own}"))
        .replace("url(#", &format!("url(#{own}"))
        .replace("href=\"#", &format!("href=\"#{own}"))
        .replacen("<svg ", &format!("<svg role=\"img\" aria-label=\"{}\" ", text(says)), 1);
    format!("<figure class=\"drawing\">{body}</figure>\n")
}

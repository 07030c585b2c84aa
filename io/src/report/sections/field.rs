//! The field player: instants of the stored fields, in colour with flux lines.

use super::Section;
use crate::report::chart::Charts;
use crate::report::escape::{json, text};
use crate::report::fields::page_fields;
use crate::report::source::Source;
use crate::result::IoFault;

/// Controls, picture and data.
///
/// # Errors
/// What the HDF5 library says.
pub(super) fn section(source: &Source, _: &mut Charts) -> Result<Option<Section>, IoFault> {
    let Some(stored) = &source.fields else { return Ok(None) };
    let Some(mut fields) = page_fields(stored, source.layout.as_ref())? else { return Ok(None) };
    if let Some(about) = fields.about.as_object_mut() {
        about.insert("layout".to_owned(), serde_json::to_value(&source.layout).unwrap_or_default());
        about.insert("alternating".to_owned(), (source.law() == "alternating").into());
        about.insert("settled".to_owned(), (source.law() == "steady").into());
    }
    let arrays: String = fields
        .arrays
        .iter()
        .map(|a| {
            format!(
                "<script type=\"text/plain\" class=\"field-data\" data-name=\"{}\">{}</script>\n",
                text(&a.name),
                a.base64
            )
        })
        .collect();
    let html = PLAYER.replace("{{remark}}", &text(&fields.remark)).replace("{{about}}", &json(&fields.about));
    Ok(Some(Section::new("field", "The field", format!("{html}{arrays}"))))
}

/// The player's controls.
const PLAYER: &str = include_str!("../page/player.html");

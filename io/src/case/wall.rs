//! `[wall]` and its layers.

use lenzbore_solver::problem::{Extent, Layer, Wall};

use super::across::diameters;
use super::conductor::material;
use super::measures::{LENGTH, POSITION};
use super::names::{Names, name_of};
use super::reader::{Reader, Section};
use super::temperature::temperature;
use super::tree::Value;
use crate::message::CaseFault;

/// What `[wall]` says.
#[derive(Debug)]
pub(super) struct WallReading<'t> {
    pub section: Section<'t>,
    pub wall: Wall,
    /// One a layer of `wall`, in the same order.
    pub layers: Vec<Section<'t>>,
    /// `None` where the length could not be read.
    pub extent: Option<Extent>,
    /// Whether every layer could be read.
    pub complete: bool,
}

/// Most slots round a wall.
const MOST_SLOTS: u32 = 1000;

const EXAMPLE: &str = "[[wall.layer]] with name, material and size = \"28 x 1.5 mm\"";

/// Reads the wall; `None` where there is none.
pub(super) fn read_wall<'t>(reader: &mut Reader, root: &Section<'t>) -> Option<WallReading<'t>> {
    if !root.table.has("wall") {
        reader.missing(root, "wall", "the conductor at rest", "[wall]");
    }
    let section = reader.table(root, "wall", "[wall]")?;
    reader.check_words(&section);
    let extent = extent(reader, &section);
    let warmth = temperature(reader, &section, "temperature");
    let slots = reader.count(&section, "slots", 1, MOST_SLOTS).unwrap_or(0);
    let sections = reader.tables(&section, "layer", EXAMPLE);
    if !section.table.has("layer") {
        reader.missing(&section, "layer", "a wall has at least one layer", EXAMPLE);
    }
    let mut names = Names::default();
    let (mut layers, mut kept) = (Vec::new(), Vec::new());
    let complete_before = reader.faults.len();
    for (i, mut layer) in sections.into_iter().enumerate() {
        let name = name_of(reader, &layer, "wall", format!("layer {}", i + 1), &mut names);
        layer.path = vec!["wall".to_owned(), name.clone()];
        let before = reader.faults.len();
        let read = read_layer(reader, &layer, name, extent, warmth);
        if let Some(read) = read.filter(|_| reader.faults.len() == before) {
            layers.push(read);
            kept.push(layer);
        }
    }
    let complete = reader.faults.len() == complete_before && !layers.is_empty();
    let wall = Wall { slots, extent: extent.unwrap_or(Extent::Endless), layers }.with_faces_joined();
    Some(WallReading { section, wall, layers: kept, extent, complete })
}

fn extent(reader: &mut Reader, section: &Section<'_>) -> Option<Extent> {
    let example = "length = \"600 mm\", or length = \"endless\"";
    let Some(node) = section.table.get("length") else {
        reader.missing(section, "length", "the wall ends somewhere, or is endless", example);
        return None;
    };
    if let Value::Text(text) = &node.value {
        if text.trim() == "endless" {
            reader.note_text(section, "length", "endless");
            return Some(Extent::Endless);
        }
        if !text.contains(|c: char| c.is_ascii_digit()) {
            let near = crate::message::nearest(text, ["endless"]).map(str::to_owned);
            let choices = vec!["endless".to_owned(), "600 mm (any length)".to_owned()];
            let fault =
                CaseFault::UnknownChoice { word: "length".to_owned(), found: text.clone(), choices, nearest: near };
            reader.fault(node.place.clone(), fault);
            return None;
        }
    }
    reader.quantity(section, "length", LENGTH).map(|length_m| Extent::Finite { length_m })
}

fn read_layer(
    reader: &mut Reader,
    section: &Section<'_>,
    name: String,
    extent: Option<Extent>,
    warmth: f64,
) -> Option<Layer> {
    reader.check_words(section);
    let diameters = diameters(reader, section);
    let electric = material(reader, section, &name, warmth);
    let (from_m, to_m) = axial_extent(reader, section, extent);
    let ([inner, outer], (conductivity_s_per_m, relative_permeability)) = (diameters?, electric?);
    Some(Layer {
        name,
        inner_radius_m: 0.5 * inner,
        outer_radius_m: 0.5 * outer,
        from_m,
        to_m,
        conductivity_s_per_m,
        relative_permeability,
    })
}

/// Lower and upper end of a layer; the whole wall where it does not say.
fn axial_extent(reader: &mut Reader, section: &Section<'_>, extent: Option<Extent>) -> (f64, f64) {
    if extent == Some(Extent::Endless) {
        for word in ["from", "to"] {
            if section.table.has(word) {
                let words = format!("'{word}' in an endless wall");
                let why = "an endless wall has no sections".to_owned();
                let mend = "give the wall a length, or take 'from' and 'to' out".to_owned();
                reader.fault(section.place_of(word), CaseFault::Clash { words, why, mend });
            }
        }
        return (0.0, 0.0);
    }
    let length = match extent {
        Some(Extent::Finite { length_m }) => length_m,
        _ => 0.0,
    };
    let from = reader.quantity_or(section, "from", POSITION, 0.0, "the wall's lower end");
    let to = reader.quantity_or(section, "to", POSITION, length, "the wall's upper end");
    (from, to)
}

//! `[mover]`: its parts, placed one by one or as a stack.

use lenzbore_solver::problem::{Mover, Part, Quantity as Number};
use lenzbore_solver::sources::{North, Stack, StackItem};

use super::measures::{HOLE, POSITION};
use super::names::{Names, name_of};
use super::parts::{Body, read_coil, read_dipole, read_magnet, read_spacer};
use super::reader::{Reader, Section, wanted};
use super::resolved::ResolvedValue;
use super::temperature::temperature;
use super::tree::{Node, Value};
use crate::message::{CaseFault, nearest};
use crate::units::Kind;

/// What `[mover]` says.
#[derive(Debug)]
pub(super) struct MoverReading<'t> {
    pub section: Section<'t>,
    pub mover: Mover,
    /// Recoil permeability of each part of `mover`; the mover itself has it not yet.
    pub recoil: Vec<f64>,
    /// One a part of `mover`, in the same order.
    pub parts: Vec<Section<'t>>,
    /// Whether everything could be read.
    pub complete: bool,
    /// Lower and upper end from the reference point, m.
    pub ends_m: [f64; 2],
}

/// One entry of the mover.
struct Item<'t> {
    name: String,
    section: Section<'t>,
    body: Body,
}

/// A placed part, its section, and the lower and upper end that it brings.
struct Placed<'t> {
    parts: Vec<(Part, Section<'t>)>,
    ends_m: [f64; 2],
}

/// So many parts fit a stack.
const LONGEST_STACK: usize = 1000;

/// Reads the mover; `None` where there is none.
pub(super) fn read_mover<'t>(reader: &mut Reader, root: &Section<'t>) -> Option<MoverReading<'t>> {
    if !root.table.has("mover") {
        reader.missing(root, "mover", "everything that travels", "[mover]");
    }
    let section = reader.table(root, "mover", "[mover]")?;
    let before = reader.faults.len();
    reader.check_words(&section);
    let mass_kg = reader.quantity(&section, "mass", wanted(Kind::Mass, Number::Mass));
    let warmth = temperature(reader, &section, "temperature");
    let items = items(reader, &section, warmth);
    let known: Vec<(String, f64)> = items.iter().map(|i| (i.name.clone(), i.body.recoil())).collect();
    let placed = match reader.list(&section, "stack", "stack = [\"M+\", \"S\", \"M-\"]") {
        Some(nodes) => stacked(reader, &section, &items, nodes),
        None => placed_one_by_one(reader, &section, items),
    };
    let (parts, parts_sections): (Vec<Part>, Vec<Section<'t>>) = placed.parts.into_iter().unzip();
    let recoil_of = |p: &Part| known.iter().find(|(name, _)| *name == p.name).map_or(1.0, |(_, recoil)| *recoil);
    let recoil = parts.iter().map(recoil_of).collect();
    let complete = reader.faults.len() == before;
    let mover = Mover { parts, mass_kg, recoil: None };
    Some(MoverReading { section, mover, recoil, parts: parts_sections, complete, ends_m: placed.ends_m })
}

/// Reads every magnet, spacer, dipole and coil.
fn items<'t>(reader: &mut Reader, section: &Section<'t>, warmth: f64) -> Vec<Item<'t>> {
    let mut items = Vec::new();
    let mut names = Names::default();
    for (list, example) in [
        ("magnet", "[[mover.magnet]] with material, outer_diameter and length"),
        ("spacer", "[[mover.spacer]] with name and length"),
        ("dipole", "[[mover.dipole]] with moment"),
        ("coil", "[[mover.coil]] with diameters, length, turns and current"),
    ] {
        for (i, mut entry) in reader.tables(section, list, example).into_iter().enumerate() {
            let name = name_of(reader, &entry, "mover", format!("{list} {}", i + 1), &mut names);
            entry.path = vec!["mover".to_owned(), name.clone()];
            reader.check_words(&entry);
            let body = match list {
                "magnet" => read_magnet(reader, &entry, &name, warmth),
                "spacer" => read_spacer(reader, &entry),
                "dipole" => read_dipole(reader, &entry),
                _ => read_coil(reader, &entry),
            };
            items.push(Item { name, section: entry, body });
        }
    }
    if let Some(entry) = section.table.entry("iron") {
        reader.not_modelled_yet(
            entry,
            "pole pieces and back iron ([[mover.iron]])",
            Some("leave the iron out: the figures are then those of the magnets alone"),
        );
    } else if !["magnet", "dipole", "coil"].iter().any(|w| section.table.has(w)) {
        reader.missing(
            section,
            "magnet",
            "something that has a field: a magnet, a dipole or a coil",
            "[[mover.magnet]] with material, outer_diameter and length",
        );
    }
    items
}

/// Parts placed by `at`.
fn placed_one_by_one<'t>(reader: &mut Reader, section: &Section<'t>, items: Vec<Item<'t>>) -> Placed<'t> {
    for word in ["stack_gap", "reference"] {
        if section.table.has(word) && !section.table.has("stack") {
            let words = format!("'{word}' without 'stack'");
            let why = if word == "reference" {
                "parts placed by 'at' count from the reference point, which is where at = 0"
            } else {
                "it is the gap between neighbours of a stack"
            };
            let mend = format!("place the parts by 'stack', or take '{word}' out");
            reader.fault(section.place_of(word), CaseFault::Clash { words, why: why.to_owned(), mend });
        }
    }
    let alone = items.iter().filter(|i| !matches!(i.body, Body::Spacer { .. })).count() == 1;
    let mut parts = Vec::new();
    for item in items {
        if matches!(item.body, Body::Spacer { .. }) {
            reader.cautions.push(format!(
                "spacer '{}' is not used: spacers keep parts of a stack apart, and there is no 'stack'",
                item.name
            ));
            continue;
        }
        let at = position(reader, &item.section, alone);
        if let (Body::Magnetic { source, outline, north, coercivity_a_per_m, .. }, Some(centre_m)) = (&item.body, at) {
            let source = if *north == North::Down { source.reversed() } else { *source };
            let part =
                Part { name: item.name, centre_m, source, outline: *outline, coercivity_a_per_m: *coercivity_a_per_m };
            parts.push((part, item.section));
        }
    }
    parts.sort_by(|a, b| a.0.centre_m.total_cmp(&b.0.centre_m));
    let ends_m = ends(&parts);
    caution_if_lopsided(reader, ends_m);
    Placed { parts, ends_m }
}

fn position(reader: &mut Reader, section: &Section<'_>, alone: bool) -> Option<f64> {
    if alone {
        return Some(reader.quantity_or(section, "at", POSITION, 0.0, "the only part sits at the reference point"));
    }
    let why = "where there are several parts and no 'stack', each says where its centre is";
    reader.required(section, "at", POSITION, why, "at = \"0 mm\"")
}

fn ends(parts: &[(Part, Section<'_>)]) -> [f64; 2] {
    parts.iter().fold([f64::INFINITY, f64::NEG_INFINITY], |[low, high], (part, _)| {
        let half = 0.5 * part.outline.length_m;
        [low.min(part.centre_m - half), high.max(part.centre_m + half)]
    })
}

/// With `at`, the reference point need not be the middle of the mover's length; that is worth saying.
fn caution_if_lopsided(reader: &mut Reader, [low, high]: [f64; 2]) {
    let middle = 0.5 * (low + high);
    if middle.is_finite() && middle.abs() > 1e-6 * (high - low) {
        reader.cautions.push(format!(
            "the mover's reference point is where at = 0, which is {:.4} mm {} the middle of its length; positions and gates count from there",
            1e3 * middle.abs(),
            if middle > 0.0 { "below" } else { "above" }
        ));
    }
}

/// Parts placed by `stack`.
fn stacked<'t>(reader: &mut Reader, section: &Section<'t>, items: &[Item<'t>], nodes: &[Node]) -> Placed<'t> {
    let nothing = || Placed { parts: Vec::new(), ends_m: [0.0, 0.0] };
    let gap = reader.quantity_or(section, "stack_gap", HOLE, 0.0, "neighbours touch");
    if nodes.is_empty() || nodes.len() > LONGEST_STACK {
        let why = "a stack names 1 to 1000 parts, bottom to top";
        list_fault(reader, section, why);
        return nothing();
    }
    let before = reader.faults.len();
    let mut stack = Vec::new();
    let mut order = Vec::new();
    for node in nodes {
        if let Some((item, piece)) = stack_item(reader, items, node) {
            if matches!(piece, StackItem::Magnetic { .. }) {
                order.push(item.section.clone());
            }
            stack.push(piece);
        }
    }
    say_what_is_left_out(reader, items, nodes);
    if reader.faults.len() > before || stack.len() < nodes.len() {
        return nothing();
    }
    note_stack(reader, section, nodes);
    let built = Stack::new(&stack, gap);
    let reference = reference(reader, section, built.length_m);
    let shift = 0.5 * built.length_m - reference;
    let coercivity_of = |name: &str| items.iter().find(|i| i.name == name).and_then(|i| i.body.coercivity_a_per_m());
    let parts = built.parts.into_iter().map(|p| Part {
        centre_m: p.centre_m + shift,
        coercivity_a_per_m: coercivity_of(&p.name),
        ..p
    });
    Placed { parts: parts.zip(order).collect(), ends_m: [-reference, built.length_m - reference] }
}

fn list_fault(reader: &mut Reader, section: &Section<'_>, why: &'static str) {
    let example = "stack = [\"M+\", \"S\", \"M-\"]";
    reader.fault(section.place_of("stack"), CaseFault::List { word: "stack".to_owned(), why, example });
}

fn note_stack(reader: &mut Reader, section: &Section<'_>, nodes: &[Node]) {
    let texts = nodes.iter().filter_map(|n| match &n.value {
        Value::Text(text) => Some(ResolvedValue::Text(text.trim().to_owned())),
        _ => None,
    });
    let (list, origin) = (ResolvedValue::List(texts.collect()), reader.origin(&section.place_of("stack")));
    reader.note(section, "stack", list, "", origin);
}

/// A name and the sign behind it.
fn name_and_sign(text: &str) -> (&str, Option<North>) {
    let text = text.trim();
    if let Some(name) = text.strip_suffix('+') {
        return (name.trim_end(), Some(North::Up));
    }
    match text.strip_suffix(['-', '\u{2212}']) {
        Some(name) => (name.trim_end(), Some(North::Down)),
        None => (text, None),
    }
}

fn stack_item<'a, 't>(reader: &mut Reader, items: &'a [Item<'t>], node: &Node) -> Option<(&'a Item<'t>, StackItem)> {
    let fault = |why| CaseFault::List { word: "stack".to_owned(), why, example: "stack = [\"M+\", \"S\", \"M-\"]" };
    let Value::Text(text) = &node.value else {
        reader.fault(node.place.clone(), fault("a stack lists the names of its parts"));
        return None;
    };
    let (name, sign) = name_and_sign(text);
    let Some(item) = items.iter().find(|i| i.name == name) else {
        let names: Vec<String> = items.iter().map(|i| i.name.clone()).collect();
        let near = nearest(name, names.iter().map(String::as_str)).map(str::to_owned);
        let (name, table) = (name.to_owned(), "[mover]".to_owned());
        reader.fault(node.place.clone(), CaseFault::UnknownName { name, table, names, nearest: near });
        return None;
    };
    let piece = match (&item.body, sign) {
        (Body::Faulty, _) => None,
        (Body::Spacer { length_m }, None) => Some(StackItem::Spacer { length_m: *length_m }),
        (Body::Spacer { .. }, Some(_)) => {
            reader.fault(node.place.clone(), fault("a spacer has no north: write its name without a sign"));
            None
        }
        (Body::Magnetic { outline, .. }, _) if outline.length_m <= 0.0 => {
            reader.fault(node.place.clone(), fault("a dipole has no length to stack: place it by 'at'"));
            None
        }
        (Body::Magnetic { .. }, None) => {
            reader.fault(node.place.clone(), fault("a sign behind the name says where its north points: + up, - down"));
            None
        }
        (Body::Magnetic { source, outline, .. }, Some(north)) => {
            Some(StackItem::Magnetic { name: item.name.clone(), source: *source, outline: *outline, north })
        }
    };
    piece.map(|piece| (item, piece))
}

/// Words and parts that a stack overrules or leaves out are named.
fn say_what_is_left_out(reader: &mut Reader, items: &[Item<'_>], nodes: &[Node]) {
    let stacked: Vec<&str> = nodes
        .iter()
        .filter_map(|n| match &n.value {
            Value::Text(text) => Some(name_and_sign(text).0),
            _ => None,
        })
        .collect();
    for item in items {
        if !stacked.contains(&item.name.as_str()) {
            reader.cautions.push(format!("part '{}' is not in the stack and does not travel", item.name));
            continue;
        }
        for word in ["at", "north"].into_iter().filter(|w| item.section.table.has(w)) {
            reader.cautions.push(format!("part '{}': the stack places it, so its '{word}' is not used", item.name));
        }
    }
}

/// Height of the reference point above the stack's lower end, m.
fn reference(reader: &mut Reader, section: &Section<'_>, length_m: f64) -> f64 {
    let middle = 0.5 * length_m;
    let Some(node) = section.table.get("reference") else {
        let origin = super::resolved::Origin::Default { why: "the middle of the mover's length".to_owned() };
        reader.note(section, "reference", ResolvedValue::Text("middle".to_owned()), "", origin);
        return middle;
    };
    let choices = ["middle", "lower end", "upper end"];
    let named = match &node.value {
        Value::Text(text) => !text.contains(|c: char| c.is_ascii_digit()),
        _ => false,
    };
    if named {
        return match reader.choice(section, "reference", &choices, "reference = \"lower end\"") {
            Some("lower end") => 0.0,
            Some("upper end") => length_m,
            _ => middle,
        };
    }
    reader.quantity(section, "reference", POSITION).unwrap_or(middle)
}

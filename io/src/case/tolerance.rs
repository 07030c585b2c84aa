//! `[tolerance]`: how far the inputs may be off, as half-widths that are taken as 95 %.
//!
//! A tolerance is relative (`"10 %"` of the value) or absolute with the word's unit (`"0.1 mm"`; a temperature's is a
//! difference, `"5 K"`), the same both ways or `[minus, plus]`. Any number of the case that is no list can have one,
//! given, default or from the material book.

use super::overrides::path_fault;
use super::reader::{Reader, Section, unit_of};
use super::resolved::{Resolved, ResolvedValue};
use super::sizes::ACROSS;
use super::tree::{Entry, Node, Table, Value};
use crate::message::{CaseFault, Place, SourceKind};
use crate::units::{Kind, QuantityFault, read_bare_number, read_quantity};

const EXAMPLE: &str = "\"wall.sleeve.thickness\" = \"10 %\"";
const FORMS: &str = "a share of the value as \"10 %\", a half-width with its unit as \"0.1 mm\", or [minus, plus]";

/// The tolerance of one word.
#[derive(Debug, Clone, PartialEq)]
pub struct Tolerance {
    /// The word, as `wall.sleeve.thickness`.
    pub path: String,
    /// Its SI unit; empty for a pure number.
    pub unit: &'static str,
    /// Its value, SI.
    pub value: f64,
    /// Half-width below it, SI, >= 0.
    pub minus: f64,
    /// Half-width above it, SI, >= 0.
    pub plus: f64,
    /// As written.
    pub written: String,
    /// Where, as `sleeve.toml:12:1`.
    pub place: String,
}

impl Tolerance {
    /// The override that moves the word by `offset` (SI) from its value.
    #[must_use]
    pub fn setting(&self, offset: f64) -> String {
        format!("{}={:e}", self.path, self.value + offset)
    }

    /// Of the other sizes across of the same part, those that stay and those that follow when this word is varied:
    /// found by comparing the case with a varied one. Both are empty where no
    /// other size follows.
    #[must_use]
    pub fn companions(&self, nominal: &Resolved, varied: &Resolved) -> (Vec<String>, Vec<String>) {
        let Some((part, word)) = self.path.rsplit_once('.').filter(|(_, w)| ACROSS.contains(w)) else {
            return (Vec::new(), Vec::new());
        };
        let others = ACROSS.into_iter().filter(|w| *w != word);
        let known = others.filter_map(|w| {
            let path = format!("{part}.{w}");
            let (before, after) = (nominal.number(&path)?, varied.number(&path)?);
            Some((w.to_owned(), (before - after).abs() <= 1e-9 * before.abs()))
        });
        let (stays, follows): (Vec<_>, Vec<_>) = known.partition(|(_, stays)| *stays);
        if follows.is_empty() {
            // A magnet's sizes are given one by one.
            return (Vec::new(), Vec::new());
        }
        let names = |list: Vec<(String, bool)>| list.into_iter().map(|(w, _)| w).collect();
        (names(stays), names(follows))
    }
}

/// Reads `[tolerance]` once every other word is resolved; faults are collected.
pub(super) fn read_tolerances(reader: &mut Reader, root: &Section<'_>) -> Vec<Tolerance> {
    let Some(section) = reader.table(root, "tolerance", "[tolerance]") else { return Vec::new() };
    let mut words = Vec::new();
    flatten(section.table, "", &mut words);
    let mut all: Vec<(Tolerance, Place)> = Vec::new();
    for (path, entry) in words {
        let place = entry.word_place.clone();
        let Some(tolerance) = one(reader, root, &path, entry) else { continue };
        let on_command_line = reader.sources.text(&place).is_some_and(|s| s.kind == SourceKind::Option);
        match all.iter_mut().find(|(t, _)| t.path == tolerance.path) {
            Some(old) if on_command_line => *old = (tolerance, place),
            Some(_) => {
                let words = format!("'{}' twice in [tolerance]", tolerance.path);
                clash(reader, place, words, "a word has one tolerance", "take one of them out");
            }
            None => all.push((tolerance, place)),
        }
    }
    refuse_three_sizes(reader, &all);
    let all: Vec<Tolerance> = all.into_iter().map(|(t, _)| t).collect();
    for t in &all {
        let origin = reader.origin(&section.place_of(&t.path));
        let list = ResolvedValue::List(vec![ResolvedValue::Number(t.minus), ResolvedValue::Number(t.plus)]);
        reader.note(&section, &t.path, list, t.unit, origin);
    }
    all
}

/// `"wall.sleeve.thickness" = ...` and `wall.sleeve.thickness = ...` say the same.
fn flatten<'t>(table: &'t Table, above: &str, out: &mut Vec<(String, &'t Entry)>) {
    for entry in &table.entries {
        let word = entry.word.split('.').map(|w| w.trim().trim_matches(['"', '\''])).collect::<Vec<_>>().join(".");
        let path = if above.is_empty() { word } else { format!("{above}.{word}") };
        match &entry.node.value {
            Value::Table(inner) => flatten(inner, &path, out),
            _ => out.push((path, entry)),
        }
    }
}

fn one(reader: &mut Reader, root: &Section<'_>, path: &str, entry: &Entry) -> Option<Tolerance> {
    let place = &entry.word_place;
    if let Some(what) = not_an_input(path) {
        let words = format!("'{path}' in [tolerance]");
        clash(reader, place.clone(), words, what, "give tolerances to what is built, placed or fed");
        return None;
    }
    if let Some(fault) = path_fault(path, place, root.table) {
        reader.faults.push(fault);
        return None;
    }
    let path = without_list(path);
    // A word that is legal and has no value is either absent with no default, or has a fault of its own.
    let Some(word) = reader.resolved.get(&path).cloned() else {
        if reader.faults.is_empty() {
            let words = format!("'{path}' in [tolerance]");
            clash(reader, place.clone(), words, "the case gives it no value", "give it one, or take its tolerance out");
        }
        return None;
    };
    let ResolvedValue::Number(value) = word.value else {
        let shape = if matches!(word.value, ResolvedValue::Text(_)) { "it is a text" } else { "it is a list" };
        let why = format!("{shape}, and a tolerance belongs to a single number");
        clash(reader, place.clone(), format!("'{path}' in [tolerance]"), &why, "give tolerances to numbers");
        return None;
    };
    let [minus, plus] = half_widths(reader, &entry.node, &path, kind_of(word.unit), value)?;
    let written = match &entry.node.value {
        Value::List(nodes) => {
            let parts: Vec<String> = nodes.iter().map(|n| reader.sources.written(&n.place)).collect();
            format!("-{} +{}", parts[0].trim_start_matches(['-', '\u{2212}']), parts[1].trim_start_matches('+'))
        }
        _ => reader.sources.written(&entry.node.place).trim_start_matches("+/-").trim().to_owned(),
    };
    let place = reader.sources.describe(place);
    Some(Tolerance { path, unit: word.unit, value, minus, plus, written, place })
}

/// Tables that say how to compute and what to keep, not what is built.
fn not_an_input(path: &str) -> Option<&'static str> {
    match path.split('.').next().unwrap_or_default() {
        "accuracy" => Some("[accuracy] says how to compute; its numbers are exact"),
        "output" => Some("[output] says what to keep; its numbers are exact"),
        "curve" => Some("[curve] says at which speeds to compute; its numbers are exact"),
        "title" | "record" => Some("it is a text"),
        _ => None,
    }
}

/// `wall.layer.sleeve.thickness` is `wall.sleeve.thickness`.
fn without_list(path: &str) -> String {
    let pieces: Vec<&str> = path.split('.').collect();
    match pieces.as_slice() {
        [table, _, name, word] => [*table, *name, *word].join("."),
        _ => path.to_owned(),
    }
}

/// The kind whose SI unit is noted beside a resolved value.
fn kind_of(unit: &str) -> Kind {
    const KINDS: [Kind; 21] = [
        Kind::Length,
        Kind::Speed,
        Kind::Temperature,
        Kind::Conductivity,
        Kind::TemperatureCoefficient,
        Kind::FluxDensity,
        Kind::FieldStrength,
        Kind::Moment,
        Kind::Current,
        Kind::Mass,
        Kind::Time,
        Kind::Frequency,
        Kind::Acceleration,
        Kind::Angle,
        Kind::Force,
        Kind::AirDrag,
        Kind::SpringRate,
        Kind::Density,
        Kind::SpecificHeat,
        Kind::ThermalConductivity,
        Kind::FilmCoefficient,
    ];
    KINDS.into_iter().find(|k| unit_of(*k) == unit).unwrap_or(Kind::Ratio)
}

/// Half-widths below and above, SI.
fn half_widths(reader: &mut Reader, node: &Node, path: &str, kind: Kind, value: f64) -> Option<[f64; 2]> {
    let (below, above) = match &node.value {
        Value::List(nodes) => match nodes.as_slice() {
            [minus, plus] => (minus, plus),
            _ => {
                let fault = CaseFault::List {
                    word: format!("tolerance of {path}"),
                    why: "a list of two: how far below and how far above",
                    example: "\"wall.sleeve.thickness\" = [\"0.05 mm\", \"0.1 mm\"]",
                };
                reader.fault(node.place.clone(), fault);
                return None;
            }
        },
        _ => (node, node),
    };
    let is_list = matches!(node.value, Value::List(_));
    let minus = half_width(reader, below, path, kind, value);
    let plus = if is_list { half_width(reader, above, path, kind, value) } else { minus };
    let (minus, plus) = (minus?, plus?);
    // On drawings the lower deviation carries its sign.
    let minus = if is_list { minus.abs() } else { minus };
    if minus < 0.0 || plus < 0.0 || minus.max(plus) <= 0.0 {
        impossible(reader, node, path, "a half-width is greater than 0; of [minus, plus] one may be 0");
        return None;
    }
    Some([minus, plus])
}

/// One half-width, SI.
fn half_width(reader: &mut Reader, node: &Node, path: &str, kind: Kind, value: f64) -> Option<f64> {
    let word = || format!("tolerance of {path}");
    let read = match &node.value {
        Value::Text(text) => {
            let text = text.trim().trim_start_matches("+/-").trim_start_matches('\u{b1}').trim();
            if let Some(share) = relative(text) {
                return share_of(reader, node, path, share, kind, value);
            }
            if kind == Kind::Conductivity && (text.contains("ohm") || text.contains(['\u{3a9}', '\u{2126}'])) {
                impossible(reader, node, path, "of a conductivity: in \"MS/m\" or \"%IACS\", or a share as \"2 %\"");
                return None;
            }
            difference(text, kind)
        }
        Value::Number(number) => read_bare_number(*number, kind).map(|q| q.si),
        other => {
            let (found, wanted) = (other.shape(), FORMS);
            reader.fault(node.place.clone(), CaseFault::WrongShape { word: word(), found, wanted, example: EXAMPLE });
            return None;
        }
    };
    read.map_err(|fault| reader.fault(node.place.clone(), CaseFault::Quantity { word: word(), fault })).ok()
}

/// `10 %` as 0.1.
fn relative(text: &str) -> Option<f64> {
    let number = text.strip_suffix('%')?;
    read_quantity(&format!("{number} %"), Kind::Ratio).ok().map(|q| q.si)
}

fn share_of(reader: &mut Reader, node: &Node, path: &str, share: f64, kind: Kind, value: f64) -> Option<f64> {
    if kind == Kind::Temperature {
        impossible(reader, node, path, "a temperature's tolerance is a difference, as \"5 K\"");
        return None;
    }
    if value.abs() <= 0.0 {
        impossible(reader, node, path, "a share of 0 is nothing: give a half-width with its unit");
        return None;
    }
    Some(share * value.abs())
}

/// A half-width with its unit; `5 degC` is a difference of 5 K.
fn difference(text: &str, kind: Kind) -> Result<f64, QuantityFault> {
    if kind == Kind::Temperature {
        for (ending, kelvin) in [("degC", 1.0), ("\u{b0}C", 1.0), ("degF", 5.0 / 9.0), ("\u{b0}F", 5.0 / 9.0)] {
            if let Some(number) = text.strip_suffix(ending) {
                return read_quantity(&format!("{number} K"), kind).map(|q| q.si * kelvin);
            }
        }
    }
    read_quantity(text, kind).map(|q| q.si)
}

/// Two of the three sizes across may have tolerances: the third follows.
fn refuse_three_sizes(reader: &mut Reader, all: &[(Tolerance, Place)]) {
    for (tolerance, place) in all {
        let Some(part) = tolerance.path.strip_suffix(".outer_diameter").filter(|p| p.starts_with("wall.")) else {
            continue;
        };
        let has = |word: &str| all.iter().any(|(t, _)| t.path == format!("{part}.{word}"));
        if has("inner_diameter") && has("thickness") {
            let words = format!("tolerances of all three sizes across of '{part}'");
            let why = "any two sizes give the third, and its tolerance with it";
            clash(reader, place.clone(), words, why, "keep the two that are measured or made to size");
        }
    }
}

fn impossible(reader: &mut Reader, node: &Node, path: &str, legal: &str) {
    let found = reader.sources.written(&node.place);
    let fault =
        CaseFault::Impossible { word: format!("tolerance of {path}"), found, legal: legal.to_owned(), mend: None };
    reader.fault(node.place.clone(), fault);
}

fn clash(reader: &mut Reader, place: Place, words: String, why: &str, mend: &str) {
    reader.fault(place, CaseFault::Clash { words, why: why.to_owned(), mend: mend.to_owned() });
}

//! One case file laid over another, and overrides laid over both.

use super::sizes::make_way_for;
use super::tree::{Entry, Node, Table, Value};
use super::words::law_words;

/// Lays `over` over `base`. Tables merge word by word, lists of tables by the `name` of their entries, everything
/// else is replaced.
///
/// A word that sets the third of three sizes, and another law of travel, push out old words; `notes` says which.
pub(super) fn overlay(base: Table, over: Table, notes: &mut Vec<String>) -> Table {
    merge(base, over, "", notes)
}

fn merge(mut base: Table, over: Table, path: &str, notes: &mut Vec<String>) -> Table {
    if path == "travel" {
        leave_old_law(&mut base, &over, notes);
    }
    for entry in over.entries {
        let below = if path.is_empty() { entry.word.clone() } else { format!("{path}.{}", entry.word) };
        let old = base.get(&entry.word).cloned();
        let value = match (old.map(|n| n.value), entry.node.value) {
            (Some(Value::Table(old)), Value::Table(new)) => Value::Table(merge(old, new, &below, notes)),
            (Some(Value::List(old)), Value::List(new)) if are_tables(&old) && are_tables(&new) => {
                Value::List(merge_named(old, new, &below, notes))
            }
            (_, new) => new,
        };
        base.put(Entry { node: Node { value, place: entry.node.place }, ..entry });
    }
    base
}

fn are_tables(nodes: &[Node]) -> bool {
    !nodes.is_empty() && nodes.iter().all(|n| matches!(n.value, Value::Table(_)))
}

fn name_of(node: &Node) -> Option<&str> {
    match &node.value {
        Value::Table(table) => table.text("name"),
        _ => None,
    }
}

fn merge_named(mut old: Vec<Node>, new: Vec<Node>, path: &str, notes: &mut Vec<String>) -> Vec<Node> {
    for node in new {
        let Value::Table(over) = node.value else { continue };
        let name = over.text("name").map(str::to_owned);
        let same = old.iter_mut().find(|o| name.is_some() && name_of(o) == name.as_deref());
        match same {
            Some(Node { value: Value::Table(base), .. }) => {
                let mut below = std::mem::take(base);
                if path == "wall.layer" {
                    note_way(&mut below, &over, name.as_deref().unwrap_or_default(), notes);
                }
                *base = merge(below, over, path, notes);
            }
            _ => old.push(Node { value: Value::Table(over), place: node.place }),
        }
    }
    old
}

fn note_way(layer: &mut Table, over: &Table, name: &str, notes: &mut Vec<String>) {
    if let Some(dropped) = make_way_for(layer, over) {
        let plain = |w: &str| w.replace('_', " ");
        let stays = super::sizes::ACROSS.into_iter().find(|w| layer.has(w)).unwrap_or_default();
        let set = super::sizes::ACROSS.into_iter().find(|w| over.has(w)).unwrap_or_default();
        notes.push(format!(
            "layer '{name}': its {} was set although the two given are others; the {} stays and the {} follows",
            plain(set),
            plain(stays),
            plain(dropped)
        ));
    }
}

/// Where `over` names another law, the words that this law does not take leave the base.
fn leave_old_law(base: &mut Table, over: &Table, notes: &mut Vec<String>) {
    let (Some(old), Some(new)) = (base.text("law").map(str::to_owned), over.text("law")) else { return };
    let Some(law) = law_words(new).filter(|_| old != new) else { return };
    let (kept, left): (Vec<Entry>, Vec<Entry>) = std::mem::take(&mut base.entries)
        .into_iter()
        .partition(|e| e.word == "law" || law.words.contains(&e.word.as_str()));
    base.entries = kept;
    if !left.is_empty() {
        let words: Vec<String> = left.iter().map(|e| format!("'{}'", e.word)).collect();
        notes.push(format!("law '{new}' replaces '{old}', whose words {} no longer apply", words.join(", ")));
    }
}

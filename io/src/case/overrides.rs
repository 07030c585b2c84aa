//! `--set wall.sleeve.thickness="2.1 mm"`: any word of the case from the command line.

use super::parse::parse_value;
use super::tree::{Entry, Node, Table, Value};
use super::words::{TableWords, elsewhere, table_words};
use crate::message::{CaseFault, Diagnostic, Place, SourceKind, Sources, nearest};

/// Turns all overrides into one tree to lay over the case. A word that is set twice takes the last value.
pub(super) fn overrides_tree(
    sets: &[String],
    case: &Table,
    sources: &mut Sources,
    faults: &mut Vec<Diagnostic>,
) -> Table {
    let mut tree = Table::default();
    for text in sets {
        let source = sources.add("--set", text, SourceKind::Option);
        match one(text, source, case) {
            Ok(over) => tree = join(tree, over),
            Err(fault) => faults.push(fault),
        }
    }
    tree
}

/// What is wrong with a path as `--set` writes it, told at `place`.
pub(super) fn path_fault(path: &str, place: &Place, case: &Table) -> Option<Diagnostic> {
    let fault = one(&format!("{path}=0"), place.source, case).err()?;
    Some(Diagnostic { place: Some(place.clone()), ..fault })
}

/// A piece of a path and its place.
#[derive(Debug, Clone)]
struct Segment {
    word: String,
    place: Place,
}

fn one(text: &str, source: usize, case: &Table) -> Result<Table, Diagnostic> {
    let whole = Place::new(source, 0..text.len());
    let Some(equals) = end_of_path(text) else { return Err(Diagnostic::at(whole, CaseFault::NoOverride)) };
    let path_place = Place::new(source, 0..equals);
    let wrong = |why| {
        let path = text[..equals].trim().to_owned();
        Diagnostic::at(path_place.clone(), CaseFault::OverridePath { path, why })
    };
    let segments = segments(&text[..equals], source).ok_or_else(|| wrong("a piece of it is empty"))?;
    let value = shell_value(&text[equals + 1..], source, equals + 1);
    let (table_word, rest) = match segments.as_slice() {
        [] => return Err(wrong("it is empty")),
        [only] => {
            return match only.word.as_str() {
                "title" => Ok(leaf(only, value)),
                "like" => Err(wrong("a base file is named in the case file itself")),
                "materials" => Err(wrong("a file of own materials is named in the case file itself")),
                _ => Err(wrong("it names no word below the table")),
            };
        }
        [first, rest @ ..] => (first, rest),
    };
    if table_word.word == "tolerance" {
        return Ok(wrap(table_word, joined_leaf(rest, value)));
    }
    let Some(words) = table_words(&table_word.word).filter(|t| !t.path.is_empty()) else {
        return Err(unknown_word(table_word, "", "a case file"));
    };
    below_table(words, rest, value, case)
        .map(|t| wrap(table_word, t))
        .map_err(|e| e.unwrap_or_else(|| wrong("it is too long")))
}

/// The first `=` outside quotes.
fn end_of_path(text: &str) -> Option<usize> {
    let mut quote = None;
    text.char_indices().find_map(|(i, c)| {
        match (quote, c) {
            (None, '=') => return Some(i),
            (None, '"' | '\'') => quote = Some(c),
            (Some(q), c) if q == c => quote = None,
            _ => {}
        }
        None
    })
}

/// Pieces between points; quotes hold a name with points or blanks together.
fn segments(path: &str, source: usize) -> Option<Vec<Segment>> {
    let mut pieces = Vec::new();
    let (mut start, mut quote) = (0, None);
    let ends = path.char_indices().chain([(path.len(), '.')]);
    for (i, c) in ends {
        let last = i == path.len();
        match (quote, c) {
            (None, '"' | '\'') => quote = Some(c),
            (Some(q), c) if q == c && !last => quote = None,
            (None, '.') => {
                pieces.push((start, i));
                start = i + 1;
            }
            (Some(_), _) if last => return None,
            _ => {}
        }
    }
    pieces
        .into_iter()
        .map(|(from, to)| {
            let raw = &path[from..to];
            let word = raw.trim().trim_matches(['"', '\'']).to_owned();
            let lead = raw.len() - raw.trim_start().len();
            let place = Place::new(source, from + lead..from + lead + raw.trim().len());
            (!word.is_empty()).then_some(Segment { word, place })
        })
        .collect()
}

/// Builds the tree below one table; `Err(None)` means a path with pieces left over.
fn below_table(words: &TableWords, rest: &[Segment], value: Node, case: &Table) -> Result<Table, Option<Diagnostic>> {
    match rest {
        [word] if words.words.contains(&word.word.as_str()) && !words.lists.contains(&word.word.as_str()) => {
            Ok(leaf(word, value))
        }
        [word] if words.lists.contains(&word.word.as_str()) => {
            let why = "it is a list of parts; a word of one of them is set by its name";
            Err(Some(Diagnostic::at(word.place.clone(), CaseFault::OverridePath { path: word.word.clone(), why })))
        }
        [word] => Err(Some(unknown_word(word, words.path, words.label))),
        [list, name, word] if words.lists.contains(&list.word.as_str()) => {
            let list_word = list.word.clone();
            named(words, name, word, value, case, |l| l == list_word).map_err(Some)
        }
        [name, word] if !words.lists.is_empty() => named(words, name, word, value, case, |_| true).map_err(Some),
        _ => Err(None),
    }
}

/// Finds the list that has an entry of that name, and sets its word.
fn named(
    words: &TableWords,
    name: &Segment,
    word: &Segment,
    value: Node,
    case: &Table,
    is_list: impl Fn(&str) -> bool,
) -> Result<Table, Diagnostic> {
    let lists = || words.lists.iter().copied().filter(|l| is_list(l));
    let names_in = |list: &str| -> Vec<String> {
        let tables = case.table(words.path).into_iter().flat_map(|t| t.tables(list).collect::<Vec<_>>());
        tables.filter_map(|t| t.text("name").map(str::to_owned)).collect()
    };
    let Some(list) = lists().find(|l| names_in(l).contains(&name.word)) else {
        let names: Vec<String> = lists().flat_map(names_in).collect();
        let nearest = nearest(&name.word, names.iter().map(String::as_str)).map(str::to_owned);
        let table = words.label.to_owned();
        return Err(Diagnostic::at(
            name.place.clone(),
            CaseFault::UnknownName { name: name.word.clone(), table, names, nearest },
        ));
    };
    let path = format!("{}.{list}", words.path);
    let inner = table_words(&path).map_or(&[][..], |t| t.words);
    if !inner.contains(&word.word.as_str()) {
        return Err(unknown_word(word, &path, table_words(&path).map_or("", |t| t.label)));
    }
    let mut entry = leaf(word, value);
    let name_node = Node { value: Value::Text(name.word.clone()), place: name.place.clone() };
    entry.put(Entry { word: "name".to_owned(), word_place: name.place.clone(), node: name_node });
    let element = Node { value: Value::Table(entry), place: name.place.clone() };
    let list_node = Node { value: Value::List(vec![element]), place: name.place.clone() };
    Ok(Table { entries: vec![Entry { word: list.to_owned(), word_place: name.place.clone(), node: list_node }] })
}

fn unknown_word(word: &Segment, path: &str, label: &str) -> Diagnostic {
    let legal: Vec<&'static str> = table_words(path).map(|t| t.words.to_vec()).unwrap_or_default();
    let fault = CaseFault::UnknownWord {
        word: word.word.clone(),
        table: label.to_owned(),
        nearest: nearest(&word.word, legal.iter().copied()),
        elsewhere: elsewhere(&word.word, path),
        legal,
    };
    Diagnostic::at(word.place.clone(), fault)
}

fn leaf(word: &Segment, node: Node) -> Table {
    Table { entries: vec![Entry { word: word.word.clone(), word_place: word.place.clone(), node }] }
}

/// All pieces as one word, as `[tolerance]` has them.
fn joined_leaf(rest: &[Segment], node: Node) -> Table {
    let word = rest.iter().map(|s| s.word.as_str()).collect::<Vec<_>>().join(".");
    let word_place = rest.first().map_or_else(|| node.place.clone(), |s| s.place.clone());
    Table { entries: vec![Entry { word, word_place, node }] }
}

fn wrap(word: &Segment, table: Table) -> Table {
    leaf(word, Node { value: Value::Table(table), place: word.place.clone() })
}

/// A value as typed on a shell: a TOML list or quoted text, a number, true or false, or plain text.
fn shell_value(raw: &str, source: usize, offset: usize) -> Node {
    let text = raw.trim();
    let start = offset + (raw.len() - raw.trim_start().len());
    let place = Place::new(source, start..start + text.len());
    if let Some(node) = parse_value(text, source, start) {
        return Node { place, ..node };
    }
    match text.strip_prefix('[').and_then(|t| t.strip_suffix(']')) {
        Some(inner) => Node { value: Value::List(shell_list(inner, source, start + 1)), place },
        None => Node { value: Value::Text(text.to_owned()), place },
    }
}

/// A list whose quotes the shell has eaten: `[M+, S, M-]`.
fn shell_list(inner: &str, source: usize, offset: usize) -> Vec<Node> {
    let mut start = offset;
    let mut nodes = Vec::new();
    for piece in inner.split(',') {
        if !piece.trim().is_empty() {
            let mut node = shell_value(piece, source, start);
            if let Value::Text(text) = &mut node.value {
                *text = text.trim_matches(['"', '\'']).to_owned();
            }
            nodes.push(node);
        }
        start += piece.len() + 1;
    }
    nodes
}

/// Joins two trees of overrides; entries of lists join by name, the later value stands.
fn join(mut tree: Table, over: Table) -> Table {
    for entry in over.entries {
        let old = tree.get(&entry.word).cloned();
        let value = match (old.map(|n| n.value), entry.node.value) {
            (Some(Value::Table(a)), Value::Table(b)) => Value::Table(join(a, b)),
            (Some(Value::List(a)), Value::List(b)) if is_named(&a) && is_named(&b) => Value::List(join_named(a, b)),
            (_, new) => new,
        };
        tree.put(Entry { node: Node { value, place: entry.node.place }, ..entry });
    }
    tree
}

fn named_text(node: &Node) -> Option<&str> {
    match &node.value {
        Value::Table(t) => t.text("name"),
        _ => None,
    }
}

fn is_named(nodes: &[Node]) -> bool {
    !nodes.is_empty() && nodes.iter().all(|n| named_text(n).is_some())
}

fn join_named(mut old: Vec<Node>, new: Vec<Node>) -> Vec<Node> {
    for node in new {
        let found = old.iter_mut().find(|o| named_text(o) == named_text(&node));
        match (found, node.value) {
            (Some(Node { value: Value::Table(a), .. }), Value::Table(b)) => *a = join(std::mem::take(a), b),
            (_, value) => old.push(Node { value, place: node.place }),
        }
    }
    old
}

//! TOML text to a tree of words with places.

use toml::Spanned;
use toml::de::{DeTable, DeValue};

use super::tree::{Entry, Node, Table, Value};
use crate::message::{CaseFault, Diagnostic, Place};
use crate::units::{Kind, read_quantity};

/// Reads a whole document; `source` is the index of the text in the list of sources.
pub(crate) fn parse_document(text: &str, source: usize) -> Result<Table, Vec<Diagnostic>> {
    let (document, errors) = DeTable::parse_recoverable(text);
    if errors.is_empty() {
        Ok(table(document.get_ref(), source, 0))
    } else {
        Err(errors.iter().map(|e| syntax(e, text, source)).collect())
    }
}

/// Reads one value that starts at byte `offset` of its source; `None` where it is no TOML value.
pub(super) fn parse_value(text: &str, source: usize, offset: usize) -> Option<Node> {
    let value = DeValue::parse(text).ok()?;
    Some(node(&value, source, offset))
}

fn table(table: &DeTable<'_>, source: usize, offset: usize) -> Table {
    let entries = table
        .iter()
        .map(|(key, value)| Entry {
            word: key.get_ref().to_string(),
            word_place: place(key.span(), source, offset),
            node: node(value, source, offset),
        })
        .collect();
    Table { entries }
}

fn place(span: std::ops::Range<usize>, source: usize, offset: usize) -> Place {
    Place::new(source, span.start + offset..span.end + offset)
}

fn node(spanned: &Spanned<DeValue<'_>>, source: usize, offset: usize) -> Node {
    let value = match spanned.get_ref() {
        DeValue::String(text) => Value::Text(text.to_string()),
        DeValue::Integer(integer) => Value::Number(whole(integer.as_str(), integer.radix())),
        DeValue::Float(float) => Value::Number(float.as_str().parse().unwrap_or(f64::NAN)),
        DeValue::Boolean(flag) => Value::Flag(*flag),
        DeValue::Datetime(_) => Value::Date,
        DeValue::Array(array) => Value::List(array.iter().map(|v| node(v, source, offset)).collect()),
        DeValue::Table(inner) => Value::Table(table(inner, source, offset)),
    };
    Node { value, place: place(spanned.span(), source, offset) }
}

/// A TOML integer as a float; digits beyond 64 bits make it infinite, which is refused where it is used.
fn whole(digits: &str, radix: u32) -> f64 {
    if radix == 10 {
        return digits.parse().unwrap_or(f64::INFINITY);
    }
    u32::from_str_radix(digits, radix).map_or(f64::INFINITY, f64::from)
}

fn syntax(error: &toml::de::Error, text: &str, source: usize) -> Diagnostic {
    let span = error.span().unwrap_or(0..0);
    let detail = in_plain_words(&error.message().replace('\n', "; "));
    let hint = unquoted_quantity(text, span.start);
    Diagnostic::at(
        Place::new(source, span),
        CaseFault::Syntax { detail: format!("not readable as TOML: {detail}"), hint },
    )
}

/// What the TOML library says, where its users' words say more.
fn in_plain_words(detail: &str) -> String {
    match detail {
        "duplicate key" => {
            "this stands here a second time: every word once in its table, every table once (lists of tables in [[ ]])"
                .to_owned()
        }
        "key with no value, expected `=`" => "a word without a value: WORD = VALUE".to_owned(),
        "string values must be quoted, expected literal string" => "a text stands in quotes".to_owned(),
        other => other.to_owned(),
    }
}

/// `length = 600 mm` without quotes is the slip that people make most.
fn unquoted_quantity(text: &str, at: usize) -> Option<String> {
    let mut start = at.min(text.len());
    while !text.is_char_boundary(start) {
        start -= 1;
    }
    let line_start = text[..start].rfind('\n').map_or(0, |i| i + 1);
    let line = text[line_start..].lines().next()?;
    let (word, value) = line.split_once('=')?;
    let value = value.split('#').next()?.trim();
    let quoted = value.contains(['"', '\'']);
    let unit_known = !matches!(
        read_quantity(value, Kind::Ratio),
        Ok(_) | Err(crate::units::QuantityFault::NoNumber { .. } | crate::units::QuantityFault::UnknownUnit { .. })
    );
    (!quoted && unit_known).then(|| format!("a value with a unit stands in quotes: {} = \"{value}\"", word.trim()))
}

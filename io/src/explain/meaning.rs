//! One list of everything that has a meaning, and how a word is found in it.

use crate::case::{LAWS, TABLES};
use crate::message::nearest;

use super::case_words::{CASE_TABLES, CaseTable, CaseWord, LAW_MEANINGS, case_word};
use super::columns::column_meanings;
use super::figures::{FIGURES, FigureMeaning};
use super::form::Form;
use super::results::{FILES, KEYS};

/// What one word means.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Meaning {
    /// The word.
    pub name: String,
    /// Another way to ask for it, as `wall.layer.thickness`; empty where there is none.
    pub path: String,
    /// What it is, as `word of [[wall.layer]]`.
    pub what: String,
    /// What it means.
    pub about: String,
    /// More of it, each with its heading: what it takes, its unit, range, default, example, source.
    pub more: Vec<(&'static str, String)>,
}

/// What a table is.
const TABLE: &str = "table of the case file";

/// Everything that the case file and a result hold; commands are known to the program alone.
#[must_use]
pub fn meanings() -> Vec<Meaning> {
    let mut all = Vec::new();
    for table in CASE_TABLES {
        if !table.path.is_empty() {
            all.push(of_table(table));
        }
        // A word that is a table of its own is explained there.
        let values = table.words.iter().filter(|w| !matches!(w.form, Form::Table | Form::Tables));
        all.extend(values.map(|word| of_word(table, word)));
    }
    all.extend(LAW_MEANINGS.iter().map(|(law, about)| of_law(law, about)));
    all.extend(FIGURES.iter().map(of_figure));
    all.extend(column_meanings().into_iter().map(|c| {
        let what = if c.file.ends_with(".h5") { "array" } else { "column" };
        let unit = c.unit.to_owned();
        plain(c.name, format!("{what} of {}", c.file), c.about, vec![("unit", unit)])
    }));
    all.extend(KEYS.iter().map(|(key, about)| plain(key, "key of summary.json".to_owned(), about, Vec::new())));
    all.extend(FILES.iter().map(|(file, about)| plain(file, "file of a result folder".to_owned(), about, Vec::new())));
    all
}

fn plain(name: &str, what: String, about: &str, more: Vec<(&'static str, String)>) -> Meaning {
    Meaning { name: name.to_owned(), path: String::new(), what, about: about.to_owned(), more }
}

fn of_table(table: &CaseTable) -> Meaning {
    let known = TABLES.iter().find(|t| t.path == table.path);
    let label = known.map_or(table.path, |t| t.label);
    let words = known.map(|t| t.words.join(", ")).unwrap_or_default();
    let (above, word) = table.path.rsplit_once('.').unwrap_or(("", table.path));
    let absent = case_word(above, word).map_or("", |w| w.absent).to_owned();
    let more = vec![("words", words), ("where absent", absent)];
    Meaning { path: table.path.to_owned(), ..plain(label, TABLE.to_owned(), table.about, more) }
}

fn of_word(table: &CaseTable, word: &CaseWord) -> Meaning {
    let label = TABLES.iter().find(|t| t.path == table.path).map_or(table.path, |t| t.label);
    let path = if table.path.is_empty() { String::new() } else { format!("{}.{}", table.path, word.word) };
    let mut more = vec![("takes", word.form.words())];
    more.extend(word.form.range().map(|range| ("range", range)));
    more.push(("where absent", word.absent.to_owned()));
    if table.path == "travel" && word.word != "law" {
        let laws: Vec<&str> = LAWS.iter().filter(|l| l.words.contains(&word.word)).map(|l| l.law).collect();
        more.push(("belongs to", format!("law {}", laws.join(", "))));
    }
    for (heading, text) in [("example", word.example), ("source", word.source)] {
        if !text.is_empty() {
            more.push((heading, text.to_owned()));
        }
    }
    Meaning { path, ..plain(word.word, format!("word of {label}"), word.about, more) }
}

fn of_law(law: &str, about: &str) -> Meaning {
    let words = LAWS.iter().find(|l| l.law == law).map(|l| l.words.join(", ")).unwrap_or_default();
    plain(law, "law of travel".to_owned(), about, vec![("words", words), ("example", format!("law = \"{law}\""))])
}

fn of_figure(figure: &FigureMeaning) -> Meaning {
    let unit = if figure.unit == "1" { "a pure number" } else { figure.unit };
    let more =
        vec![("unit", unit.to_owned()), ("given by", figure.by.to_owned()), ("source", figure.source.to_owned())];
    plain(figure.name, "figure of a result".to_owned(), figure.about, more)
}

/// A word without brackets, quotes and capitals; blanks and hyphens are underscores.
fn tidy(word: &str) -> String {
    let bare = word.trim().trim_start_matches("--").trim_matches(['[', ']', '"', '\'', '`', ' ']);
    bare.to_lowercase().replace([' ', '-'], "_")
}

/// Everything of that name or path, in the order of the list.
#[must_use]
pub fn find<'a>(asked: &str, all: &'a [Meaning]) -> Vec<&'a Meaning> {
    let asked = tidy(asked);
    let is_it = |m: &&Meaning| {
        tidy(&m.name) == asked
            || (!m.path.is_empty() && m.path == asked)
            || (m.what == TABLE && m.path.rsplit('.').next() == Some(asked.as_str()))
    };
    all.iter().filter(is_it).collect()
}

/// So many near words are offered.
const MOST_NEAR: usize = 5;

/// The names nearest to one that is none: those that hold it or a piece of it, else the one spelt most like it.
#[must_use]
pub fn nearest_names(asked: &str, all: &[Meaning]) -> Vec<String> {
    let asked = tidy(asked);
    let mut names: Vec<&str> = all.iter().map(|m| m.name.as_str()).collect();
    names.sort_unstable();
    names.dedup();
    let mut near: Vec<&str> = nearest(&asked, names.iter().copied()).into_iter().collect();
    let pieces: Vec<&str> = asked.split(['_', '.']).filter(|p| p.len() > 2).collect();
    let holds = |name: &str| pieces.iter().filter(|p| tidy(name).contains(**p)).count();
    let mut alike: Vec<&str> = names.iter().copied().filter(|n| holds(n) > 0 && !near.contains(n)).collect();
    alike.sort_by_key(|n| (std::cmp::Reverse(holds(n)), n.len()));
    near.extend(alike);
    near.into_iter().take(MOST_NEAR).map(str::to_owned).collect()
}

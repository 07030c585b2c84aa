//! `lenzbore explain`: what a word means.

use std::fmt::Write;

use clap::CommandFactory;
use lenzbore_io::explain::{Meaning, find, meanings, nearest_names};
use serde_json::{Map, Value, json};

use crate::arguments::{Arguments, ExplainWords, commands};
use crate::end::End;
use crate::say;

/// Width of the text, letters.
const WIDTH: usize = 100;
/// Where what stands behind a heading begins.
const INDENT: usize = 15;

/// Explains one word, or lists all.
pub fn run(words: &ExplainWords) -> Result<(), End> {
    let all = everything();
    let found = match &words.word {
        None => all.iter().collect(),
        Some(word) => {
            let found = find(word, &all);
            if found.is_empty() {
                return Err(unknown(word, &all));
            }
            found
        }
    };
    if words.json {
        let list: Vec<Value> = found.iter().map(|m| object(m)).collect();
        say::to_standard_output(&format!("{:#}\n", json!({"meanings": list})));
    } else if words.word.is_some() {
        let blocks: Vec<String> = found.iter().map(|m| block(m)).collect();
        say::to_standard_output(&blocks.join("\n"));
    } else {
        say::to_standard_output(&listing(&all));
    }
    Ok(())
}

/// Words of case file and results, and the commands with their options.
fn everything() -> Vec<Meaning> {
    let mut all = meanings();
    for (name, about) in commands() {
        let usage = usage(&name);
        let more = vec![("usage", usage)];
        all.push(Meaning { path: String::new(), what: "command".to_owned(), about, more, name });
    }
    all
}

/// `lenzbore run [OPTIONS] <CASE>`.
fn usage(name: &str) -> String {
    let mut all = Arguments::command();
    all.build();
    let text = all.find_subcommand_mut(name).map(|c| c.render_usage().to_string()).unwrap_or_default();
    text.trim_start_matches("Usage: ").trim().to_owned()
}

fn unknown(word: &str, all: &[Meaning]) -> End {
    let near = nearest_names(word, all);
    let hint = match near.as_slice() {
        [] => "`lenzbore explain` lists all".to_owned(),
        near => format!("near it: {}", near.join(", ")),
    };
    End::Input(format!("'{word}' is no word of case files, results or commands\n  {hint}"))
}

fn object(meaning: &Meaning) -> Value {
    let mut entries = Map::new();
    entries.insert("name".to_owned(), json!(meaning.name));
    entries.insert("what".to_owned(), json!(meaning.what));
    entries.insert("about".to_owned(), json!(meaning.about));
    for (heading, text) in &meaning.more {
        entries.insert(heading.replace(' ', "_"), json!(text));
    }
    Value::Object(entries)
}

/// Heading line, meaning, and what else is to be said.
fn block(meaning: &Meaning) -> String {
    // Writing into a string cannot fail.
    let mut text = format!("{}: {}\n", meaning.name, meaning.what);
    let _ = writeln!(text, "  {}", wrapped(&meaning.about, 2));
    for (heading, more) in meaning.more.iter().filter(|(_, more)| !more.is_empty()) {
        let _ = writeln!(text, "  {heading:<width$}{}", wrapped(more, INDENT), width = INDENT - 2);
    }
    text
}

/// Every name, under what it is.
fn listing(all: &[Meaning]) -> String {
    let mut kinds: Vec<&str> = Vec::new();
    for meaning in all {
        if !kinds.contains(&meaning.what.as_str()) {
            kinds.push(&meaning.what);
        }
    }
    let mut text = String::new();
    for kind in kinds {
        let names: Vec<&str> = all.iter().filter(|m| m.what == kind).map(|m| m.name.as_str()).collect();
        let _ = writeln!(text, "{}:\n  {}", plural(kind), wrapped(&names.join(", "), 2));
    }
    text.push_str("\n`lenzbore explain WORD` says what one of them means.\n");
    text
}

/// `words of [wall]` for `word of [wall]`.
fn plural(kind: &str) -> String {
    let (first, rest) = kind.split_once(' ').map_or((kind, ""), |(first, rest)| (first, rest));
    format!("{first}s {rest}").trim_end().to_owned()
}

/// Lines of at most the width, those after the first indented.
fn wrapped(text: &str, indent: usize) -> String {
    let mut lines = vec![String::new()];
    for word in text.split(' ') {
        let line = lines.last().map_or(0, |l| l.chars().count());
        if line > 0 && indent + line + 1 + word.chars().count() > WIDTH {
            lines.push(String::new());
        }
        if let Some(last) = lines.last_mut() {
            if !last.is_empty() {
                last.push(' ');
            }
            last.push_str(word);
        }
    }
    lines.join(&format!("\n{}", " ".repeat(indent)))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_command_has_its_meaning_and_usage() {
        let all = everything();
        for (name, _) in commands() {
            let found = find(&name, &all);
            let command = found.iter().find(|m| m.what == "command");
            assert!(command.is_some_and(|m| m.more[0].1.starts_with("lenzbore ") && !m.about.is_empty()), "{name}");
        }
    }

    #[test]
    fn long_text_is_wrapped() {
        let text = wrapped(&"word ".repeat(60), 4);
        assert!(text.lines().count() > 2 && text.lines().all(|l| l.chars().count() <= WIDTH));
    }
}

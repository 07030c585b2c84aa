//! The user guide in `io/guide/`: its cases can be read, its links lead somewhere, its words, commands and checks are the program's.
//!
//! In the guide a TOML block is a whole case, or says by `toml,on=NAME` which example it is laid over. Backticks hold words of the
//! program, commands, files of this folder, or values in quotes.

use std::collections::BTreeSet;
use std::path::{Path, PathBuf};

use lenzbore_io::case::{CaseSource, read_case};
use lenzbore_io::explain::{Meaning, find, meanings};
use lenzbore_validation::checks;

use crate::rig::{Bench, entries, root};

/// Written by `lenzbore validate`, not by hand.
const TABLE: &str = "checks/overview.md";

fn source() -> PathBuf {
    root().join("io/guide/src")
}

/// Every chapter by its path from `src`, with its text, `SUMMARY.md` first.
fn chapters() -> Vec<(String, String)> {
    let read = |name: &str| (name.to_owned(), std::fs::read_to_string(source().join(name)).unwrap());
    let summary = read("SUMMARY.md");
    let named = links(&summary.1);
    std::iter::once(summary).chain(named.iter().map(|name| read(name))).collect()
}

/// Targets of all links of a text.
fn links(text: &str) -> Vec<String> {
    text.split("](").skip(1).filter_map(|l| l.split(')').next()).map(str::to_owned).collect()
}

/// A fenced block: its info string and its lines.
struct Block {
    info: String,
    text: String,
}

/// The fenced blocks of a chapter, and what stands between them.
fn split(chapter: &str) -> (Vec<Block>, String) {
    let (mut blocks, mut prose, mut open) = (Vec::new(), String::new(), None::<Block>);
    for line in chapter.lines() {
        match (&mut open, line.strip_prefix("```")) {
            (None, Some(info)) => open = Some(Block { info: info.to_owned(), text: String::new() }),
            (Some(_), Some(_)) => blocks.extend(open.take()),
            (Some(block), None) => block.text += &format!("{line}\n"),
            (None, None) => prose += &format!("{line}\n"),
        }
    }
    assert!(open.is_none(), "a block is left open");
    (blocks, prose)
}

fn markdown_files(folder: &Path, within: &str) -> Vec<String> {
    let name = |entry: &str| if within.is_empty() { entry.to_owned() } else { format!("{within}/{entry}") };
    entries(folder)
        .iter()
        .flat_map(|entry| {
            let path = folder.join(entry);
            if path.is_dir() { markdown_files(&path, &name(entry)) } else { vec![name(entry)] }
        })
        .filter(|f| Path::new(f).extension().is_some_and(|e| e == "md"))
        .collect()
}

#[test]
fn the_summary_names_every_chapter_and_every_link_leads_somewhere() {
    let chapters = chapters();
    let named: BTreeSet<&str> = chapters.iter().map(|(name, _)| name.as_str()).collect();
    for file in markdown_files(&source(), "") {
        assert!(named.contains(file.as_str()), "SUMMARY.md does not name {file}");
    }
    for (name, text) in &chapters {
        let folder = source().join(name).parent().unwrap().to_owned();
        for link in links(&split(text).1).iter().filter(|l| !l.starts_with("http")) {
            let file = link.split('#').next().unwrap();
            assert!(file.is_empty() || folder.join(file).exists(), "{name} points at {link}, which is not there");
        }
    }
}

#[test]
fn every_case_of_the_guide_can_be_read() {
    let mut whole = 0;
    for (name, text) in chapters() {
        for block in split(&text).0.iter().filter(|b| b.info.starts_with("toml")) {
            let own_materials = block.text.contains("[[conductor]]");
            if own_materials {
                continue; // Held by `materials.rs`.
            }
            let text = match block.info.split_once("on=") {
                Some((_, base)) => format!("like = \"{base}.toml\"\n{}", block.text),
                None => block.text.clone(),
            };
            whole += u32::from(text == block.text);
            let base_dir = root().join("examples");
            let case = CaseSource::Text { name: &name, text: &text, base_dir: &base_dir };
            if let Err(faults) = read_case(&case, &[]) {
                panic!("{name}: {faults}\n{text}");
            }
        }
    }
    assert!(whole >= 2, "{whole} whole cases");
}

/// The commands of the program, and the options of each.
struct Commands(Vec<(String, String)>);

impl Commands {
    fn ask() -> Self {
        let bench = Bench::new();
        let help = bench.succeed(&["--help"]).output;
        let (_, list) = help.split_once("Commands:").unwrap();
        let names =
            list.lines().skip(1).take_while(|l| l.starts_with("  ")).filter_map(|l| l.split_whitespace().next());
        let with_options = |name: &str| (name.to_owned(), bench.run(&[name, "--help"]).output);
        Self(names.map(with_options).collect())
    }

    fn options(&self, command: &str) -> Option<&str> {
        self.0.iter().find(|(name, _)| name == command).map(|(_, help)| help.as_str())
    }

    /// What is wrong with a command line that begins with `lenzbore`.
    fn fault(&self, line: &str) -> Option<String> {
        let mut words = line.split_whitespace().skip(1);
        let command = words.next()?;
        let Some(options) = self.options(command) else { return Some(format!("no command '{command}'")) };
        for word in words {
            if let Some(option) = word.starts_with("--").then(|| word.split('=').next()).flatten()
                && !has_option(options, option)
            {
                return Some(format!("'{command}' has no {option}"));
            }
            if word.starts_with("examples/") && !root().join(word).exists() {
                return Some(format!("{word} is not there"));
            }
        }
        None
    }
}

/// Whether a help text names an option, as a whole word.
fn has_option(help: &str, option: &str) -> bool {
    help.split(|c: char| !(c.is_alphanumeric() || c == '-')).any(|word| word == option)
}

/// What is wrong with the text of a pair of backticks.
fn fault_of_word(word: &str, commands: &Commands, all: &[Meaning]) -> Option<String> {
    let identifier = |w: &str| {
        w.starts_with(|c: char| c.is_ascii_lowercase()) && w.chars().all(|c| c.is_ascii_alphanumeric() || c == '_')
    };
    let known = |w: &str| !find(w, all).is_empty() || commands.options(w).is_some();
    let is_path = ["examples/", "io/", "solver/", "validation/", "mesh/", "tests/"].iter().any(|p| word.starts_with(p));
    if word.starts_with("lenzbore ") {
        commands.fault(word)
    } else if word.starts_with("--") {
        let option = word.split([' ', '=']).next().unwrap();
        let some = commands.0.iter().any(|(_, help)| has_option(help, option));
        (!some).then(|| format!("no command has {option}"))
    } else if is_path {
        let there = root().join(word).exists();
        (!there).then(|| format!("{word} is not there"))
    } else {
        // Of a path such as wall.sleeve.thickness the last word counts, of `law = "free"` the first.
        let last = word.split(" = ").next().unwrap().rsplit('.').next().unwrap();
        let asked = if known(word) { word } else { last };
        (identifier(asked) && !known(asked)).then(|| format!("'{word}' is not known to explain"))
    }
}

#[test]
fn every_word_and_command_of_the_guide_is_the_programs() {
    let (commands, all) = (Commands::ask(), meanings());
    assert!(fault_of_word("drag_pike", &commands, &all).is_some() && commands.fault("lenzbore runn x").is_some());
    let mut faults = Vec::new();
    for (name, text) in chapters().iter().filter(|(name, _)| name != TABLE) {
        let (blocks, prose) = split(text);
        for line in blocks.iter().filter(|b| b.info == "sh").flat_map(|b| b.text.lines()) {
            let fault = line.starts_with("lenzbore ").then(|| commands.fault(line)).flatten();
            faults.extend(fault.map(|f| format!("{name}: {f}")));
        }
        for word in prose.split('`').skip(1).step_by(2) {
            faults.extend(fault_of_word(word, &commands, &all).map(|f| format!("{name}: {f}")));
        }
    }
    assert!(faults.is_empty(), "{}", faults.join("\n"));
}

/// The table of checks in the guide is that of this program: the same checks in the same order, with kind and source, and all pass.
#[test]
fn the_guide_has_every_check_with_its_source() {
    let text = std::fs::read_to_string(source().join(TABLE)).unwrap();
    let renew = "make it again: `lenzbore validate --out target/checks --replace`, then \
                 `cp target/checks/overview.md target/checks/*.svg io/guide/src/checks/`";
    let rows: Vec<Vec<&str>> =
        text.lines().filter(|l| l.starts_with("| [")).map(|l| l.split(" | ").map(str::trim).collect()).collect();
    let shown: Vec<&str> = rows.iter().filter_map(|r| r[0].split(['[', ']']).nth(1)).collect();
    let all = checks::all();
    let names: Vec<&str> = all.iter().map(|c| c.name).collect();
    assert_eq!(shown, names, "the guide's table of checks is not this program's: {renew}");
    for (row, check) in rows.iter().zip(&all) {
        let verdict = row.last().unwrap().trim_end_matches(" |");
        assert_eq!((row[1], row[2], verdict), (check.kind.words(), check.source.short, "passes"), "{renew}");
        for part in [check.about, check.source.citation, check.source.obtained.words(), check.source.tolerance] {
            assert!(text.contains(part), "{}: {part} is not in the guide: {renew}", check.name);
        }
    }
}

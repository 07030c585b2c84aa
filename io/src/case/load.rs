//! Reads a case file and the files it starts from.

use std::collections::BTreeMap;
use std::io::Read;
use std::path::{Component, Path, PathBuf};

use super::CaseSource;
use super::overlay::overlay;
use super::overrides::overrides_tree;
use super::parse::parse_document;
use super::tree::{Entry, Table, Value};
use crate::materials::{Book, own_materials};
use crate::message::{CaseFault, Diagnostic, Place, SourceKind, Sources};

/// So many files may start from one another.
const LONGEST_CHAIN: usize = 16;
/// A case file is a page or two; anything longer than this is something else.
const LARGEST_FILE_BYTES: u64 = 4_000_000;

/// What was read, before any word is understood.
#[derive(Debug, Default)]
pub(super) struct Loaded {
    pub tree: Table,
    pub sources: Sources,
    pub faults: Vec<Diagnostic>,
    /// What was pushed out by other sizes or another law.
    pub notes: Vec<String>,
    /// Grades of the case's own file of materials.
    pub own_materials: Book,
    /// Contents of the files that the case names, by the name as it stands there.
    pub kept_files: BTreeMap<String, String>,
    /// The word `materials`, which is not in the tree any more.
    pub materials: Option<Entry>,
    /// Whether every file could be read as TOML.
    pub readable: bool,
}

/// Reads the case, its base files and the overrides into one tree.
pub(super) fn load(source: &CaseSource<'_>, sets: &[String]) -> Loaded {
    let mut loaded = Loaded { readable: true, ..Loaded::default() };
    let tree = match source {
        CaseSource::Path(path) => read_file(path, None, &mut Vec::new(), &mut loaded),
        CaseSource::Text { name, text, base_dir } => read_text(name, text, base_dir, &mut Vec::new(), &mut loaded),
        CaseSource::Kept(case) => read_text("the kept case", &case.toml, Path::new(""), &mut Vec::new(), &mut loaded),
    };
    let over = overrides_tree(sets, &tree, &mut loaded.sources, &mut loaded.faults);
    loaded.tree = overlay(tree, over, &mut loaded.notes);
    read_own_materials(source, &mut loaded);
    loaded
}

/// Reads the file that `materials` names, beside the file that names it.
fn read_own_materials(source: &CaseSource<'_>, loaded: &mut Loaded) {
    let Some(entry) = loaded.tree.remove("materials") else { return };
    let place = entry.node.place.clone();
    let fault = match &entry.node.value {
        Value::Text(text) if !text.trim().is_empty() => {
            let (label, content) = named_file(&place, source, &loaded.sources, text.trim());
            let content = content.and_then(utf8);
            match content.map(|content| (own_materials(&label, &content, &mut loaded.sources), content)) {
                Ok((Ok(book), content)) => {
                    loaded.kept_files.insert(text.trim().to_owned(), content);
                    loaded.own_materials = book;
                    loaded.materials = Some(entry);
                    return;
                }
                Ok((Err(faults), _)) => {
                    loaded.faults.extend(faults);
                    loaded.readable = false;
                    return;
                }
                Err(why) => CaseFault::UnreadableFile { path: label, why },
            }
        }
        other => {
            let found = if matches!(other, Value::Text(_)) { "an empty text" } else { other.shape() };
            let (word, wanted) = (entry.word.clone(), "the path of a file of materials");
            CaseFault::WrongShape { word, found, wanted, example: "materials = \"own-materials.toml\"" }
        }
    };
    loaded.faults.push(Diagnostic::at(place, fault));
    loaded.readable = false;
}

/// A file that the case names at `place`: what messages call it, and its bytes or why they cannot be read.
pub(super) fn named_file(
    place: &Place,
    source: &CaseSource<'_>,
    sources: &Sources,
    name: &str,
) -> (String, Result<Vec<u8>, String>) {
    if let CaseSource::Kept(case) = source {
        let content = case.files.get(name).map(|text| text.clone().into_bytes());
        return (name.to_owned(), content.ok_or_else(|| "it was not kept with the case".to_owned()));
    }
    let path = tidy(&folder_of(place, source, sources).join(name));
    (path.display().to_string(), bytes_of(&path))
}

/// The folder of the file that a place points into.
fn folder_of(place: &Place, source: &CaseSource<'_>, sources: &Sources) -> PathBuf {
    match source {
        CaseSource::Text { base_dir, .. } if place.source == 0 => base_dir.to_path_buf(),
        _ => sources.text(place).and_then(|t| Path::new(&t.label).parent()).unwrap_or(Path::new("")).to_owned(),
    }
}

fn read_file(path: &Path, named_at: Option<Place>, chain: &mut Vec<PathBuf>, loaded: &mut Loaded) -> Table {
    match text_of(path) {
        Ok(text) => {
            chain.push(identity(path));
            let base_dir = path.parent().unwrap_or(Path::new(""));
            read_text(&path.display().to_string(), &text, base_dir, chain, loaded)
        }
        Err(why) => {
            let fault = CaseFault::UnreadableFile { path: path.display().to_string(), why };
            loaded.faults.push(match named_at {
                Some(place) => Diagnostic::at(place, fault),
                None => Diagnostic::of_input(fault),
            });
            loaded.readable = false;
            Table::default()
        }
    }
}

/// The text of a file, or why it cannot be read.
pub(crate) fn text_of(path: &Path) -> Result<String, String> {
    utf8(bytes_of(path)?)
}

fn utf8(bytes: Vec<u8>) -> Result<String, String> {
    String::from_utf8(bytes).map_err(|_| "it is not UTF-8 text".to_owned())
}

/// The bytes of a file, or why it cannot be read.
fn bytes_of(path: &Path) -> Result<Vec<u8>, String> {
    let plain = |e: std::io::Error| match e.kind() {
        std::io::ErrorKind::NotFound => "there is no such file".to_owned(),
        std::io::ErrorKind::PermissionDenied => "no permission to read it".to_owned(),
        std::io::ErrorKind::InvalidData => "it is not UTF-8 text".to_owned(),
        _ => e.to_string(),
    };
    let about = std::fs::metadata(path).map_err(plain)?;
    if about.is_dir() {
        return Err("it is a folder".to_owned());
    }
    let too_long = || format!("it is larger than {LARGEST_FILE_BYTES} bytes, too long for a case file");
    if about.len() > LARGEST_FILE_BYTES {
        return Err(too_long());
    }
    // A device or a pipe has no length of its own and may never end.
    let mut bytes = Vec::new();
    let file = std::fs::File::open(path).map_err(plain)?;
    let read = file.take(LARGEST_FILE_BYTES + 1).read_to_end(&mut bytes).map_err(plain)?;
    if u64::try_from(read).map_or(true, |read| read > LARGEST_FILE_BYTES) {
        return Err(too_long());
    }
    Ok(bytes)
}

/// The same file under different spellings of its path.
fn identity(path: &Path) -> PathBuf {
    path.canonicalize().unwrap_or_else(|_| path.to_owned())
}

fn read_text(name: &str, text: &str, base_dir: &Path, chain: &mut Vec<PathBuf>, loaded: &mut Loaded) -> Table {
    let source = loaded.sources.add(name, text, SourceKind::File);
    let mut tree = match parse_document(text, source) {
        Ok(tree) => tree,
        Err(faults) => {
            loaded.faults.extend(faults);
            loaded.readable = false;
            return Table::default();
        }
    };
    let Some(like) = tree.remove("like") else { return tree };
    match base_of(&like, base_dir, chain, loaded) {
        Some(base) => overlay(base, tree, &mut loaded.notes),
        None => tree,
    }
}

fn base_of(like: &Entry, base_dir: &Path, chain: &mut Vec<PathBuf>, loaded: &mut Loaded) -> Option<Table> {
    let place = like.node.place.clone();
    let fault = match &like.node.value {
        Value::Text(text) if text.trim().is_empty() => shape(like, "an empty text"),
        Value::Text(text) => {
            let path = tidy(&base_dir.join(text));
            let known = identity(&path);
            if chain.contains(&known) {
                let start = chain.iter().position(|p| *p == known).unwrap_or(0);
                let circle = chain.iter().skip(start).chain([&known]);
                CaseFault::LikeCircle { chain: circle.map(|p| file_name(p)).collect() }
            } else if chain.len() >= LONGEST_CHAIN {
                CaseFault::LikeTooLong { most: LONGEST_CHAIN }
            } else {
                return Some(read_file(&path, Some(place), chain, loaded));
            }
        }
        other => shape(like, other.shape()),
    };
    loaded.faults.push(Diagnostic::at(place, fault));
    loaded.readable = false;
    None
}

fn shape(like: &Entry, found: &'static str) -> CaseFault {
    let wanted = "the path of a case file";
    CaseFault::WrongShape { word: like.word.clone(), found, wanted, example: "like = \"base.toml\"" }
}

fn file_name(path: &Path) -> String {
    path.file_name().map_or_else(|| path.display().to_string(), |n| n.to_string_lossy().into_owned())
}

/// `cases/../base.toml` is shown as `base.toml`.
fn tidy(path: &Path) -> PathBuf {
    let mut tidy = PathBuf::new();
    for part in path.components() {
        match part {
            Component::CurDir => {}
            Component::ParentDir if matches!(tidy.components().next_back(), Some(Component::Normal(_))) => {
                tidy.pop();
            }
            other => tidy.push(other),
        }
    }
    tidy
}

//! What a result folder holds, read once.

use std::path::Path;

use serde_json::{Map, Value};

use super::fields::StoredFields;
use super::folder_tables::Table;
use crate::layout::Layout;
use crate::result::{IoFault, names};

/// A result folder's content.
#[derive(Debug)]
pub(super) struct Source {
    /// `summary.json`.
    pub summary: Map<String, Value>,
    /// Every CSV file, by name.
    pub tables: Vec<Table>,
    /// `run.h5`, where there is one.
    pub fields: Option<StoredFields>,
    /// Where every body stands, where the summary says so.
    pub layout: Option<Layout>,
}

impl Source {
    /// Reads a folder.
    pub(super) fn read(folder: &Path) -> Result<Self, IoFault> {
        let summary = summary(folder)?;
        let fields_file = folder.join(names::FIELDS);
        let fields = if fields_file.is_file() { StoredFields::read(&fields_file)? } else { None };
        let layout = summary.get("geometry").and_then(|v| serde_json::from_value::<Layout>(v.clone()).ok());
        let layout = layout.filter(|l| !l.wall.layers.is_empty());
        Ok(Self { tables: tables(folder)?, fields, layout, summary })
    }

    /// A part of the summary that is there and not null.
    pub(super) fn part(&self, name: &str) -> Option<&Value> {
        self.summary.get(name).filter(|v| !v.is_null())
    }

    /// A text of the summary.
    pub(super) fn text(&self, name: &str) -> &str {
        self.part(name).and_then(Value::as_str).unwrap_or("")
    }

    /// A list of texts of the summary.
    pub(super) fn texts(&self, name: &str) -> Vec<&str> {
        let list = self.part(name).and_then(Value::as_array);
        list.map_or_else(Vec::new, |l| l.iter().filter_map(Value::as_str).collect())
    }

    /// A table by its file's name.
    pub(super) fn table(&self, file: &str) -> Option<&Table> {
        self.tables.iter().find(|t| t.file == file)
    }

    /// The value of a figure of the summary, SI.
    pub(super) fn figure(&self, name: &str) -> Option<f64> {
        self.part("figures")?.get(name)?.get("value")?.as_f64()
    }

    /// The law of travel, where the case has one.
    pub(super) fn law(&self) -> &str {
        let law = self.part("resolved").and_then(|r| r.pointer("/travel/law/value"));
        law.and_then(Value::as_str).unwrap_or("")
    }
}

fn summary(folder: &Path) -> Result<Map<String, Value>, IoFault> {
    let path = folder.join(names::SUMMARY);
    let text = std::fs::read_to_string(&path).map_err(|source| match source.kind() {
        std::io::ErrorKind::NotFound | std::io::ErrorKind::NotADirectory => {
            IoFault::NoSummary { folder: folder.to_path_buf() }
        }
        _ => IoFault::Unread { path: path.clone(), source },
    })?;
    match serde_json::from_str(&text) {
        Ok(Value::Object(summary)) => Ok(summary),
        Ok(_) => Err(IoFault::Misread { path, why: "it is no JSON object".to_owned() }),
        Err(error) => Err(IoFault::Misread { path, why: error.to_string() }),
    }
}

/// All CSV files in the order of their names, so that the same folder gives the same page.
fn tables(folder: &Path) -> Result<Vec<Table>, IoFault> {
    let unread = |source| IoFault::Unread { path: folder.to_path_buf(), source };
    let mut paths = Vec::new();
    for entry in std::fs::read_dir(folder).map_err(unread)? {
        let path = entry.map_err(unread)?.path();
        if path.extension().is_some_and(|e| e == "csv") && path.is_file() {
            paths.push(path);
        }
    }
    paths.sort();
    paths.iter().map(|path| Table::read(path)).collect()
}

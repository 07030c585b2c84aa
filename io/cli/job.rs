//! A case named on the command line, read and ready.

use std::io::Read;
use std::path::{Path, PathBuf};

use lenzbore_io::case::{CaseSource, OutputPlan, ResolvedCase, read_case};
use lenzbore_io::layout::layout;
use lenzbore_io::message::Diagnostics;
use lenzbore_io::result::{Program, ResultHeader, WriteOptions};
use serde_json::Value;

use crate::arguments::CaseWords;
use crate::end::End;

/// Largest case text read from standard input, bytes.
const LONGEST_INPUT: u64 = 16 << 20;

/// A case that can be read again with more overrides, also where it came from standard input.
#[derive(Debug)]
pub struct CaseInput {
    path: PathBuf,
    /// What standard input held, where the case is `-`.
    text: Option<String>,
    sets: Vec<String>,
}

impl CaseInput {
    /// Takes the case that the words name.
    pub fn open(words: &CaseWords) -> Result<Self, End> {
        let text = if words.case.as_os_str() == "-" { Some(standard_input()?) } else { None };
        Ok(Self { path: words.case.clone(), text, sets: words.set.clone() })
    }

    /// The same case with more overrides of its own.
    pub fn with(&self, more: &[String]) -> Self {
        Self { path: self.path.clone(), text: self.text.clone(), sets: [&self.sets, more].concat() }
    }

    /// Reads it with the overrides of the command line, and more behind them.
    pub fn read(&self, more: &[String]) -> Result<ResolvedCase, Diagnostics> {
        let source = match &self.text {
            Some(text) => CaseSource::Text { name: "-", text, base_dir: Path::new("") },
            None => CaseSource::Path(&self.path),
        };
        read_case(&source, &[&self.sets, more].concat())
    }
}

fn standard_input() -> Result<String, End> {
    let mut text = String::new();
    std::io::stdin()
        .take(LONGEST_INPUT)
        .read_to_string(&mut text)
        .map_err(|e| End::Input(format!("standard input cannot be read as a case: {e}")))?;
    Ok(text)
}

/// Reads the case that the words name.
pub fn read(words: &CaseWords) -> Result<ResolvedCase, End> {
    Ok(CaseInput::open(words)?.read(&[])?)
}

/// The result folder where none was named: out/ and the stem of the case file.
pub fn default_folder(words: &CaseWords, suffix: &str) -> PathBuf {
    let stem = words.case.file_stem().map_or_else(String::new, |s| s.to_string_lossy().into_owned());
    let stem = if stem.is_empty() || stem == "-" { "case".to_owned() } else { stem };
    Path::new("out").join(format!("{stem}{suffix}"))
}

/// Which files a case wants.
pub fn write_options(plan: &OutputPlan, replace: bool) -> WriteOptions {
    WriteOptions {
        replace,
        summary: true,
        trace: plan.trace,
        fields: plan.fields,
        pictures: plan.pictures,
        report: plan.report,
        picture_width_m: plan.picture_width_m,
    }
}

/// What the result says of itself.
pub fn header(
    case: &ResolvedCase,
    command: &'static str,
    independent: Option<Value>,
    more_cautions: &[String],
) -> ResultHeader {
    let mut cautions = case.cautions.clone();
    cautions.extend_from_slice(more_cautions);
    ResultHeader {
        title: case.title.clone(),
        record: case.record.clone(),
        digest: case.digest.clone(),
        program: Program { name: env!("CARGO_PKG_NAME").to_owned(), version: env!("CARGO_PKG_VERSION").to_owned() },
        command,
        case: case.kept.to_json(),
        resolved: case.resolved.to_json(),
        geometry: layout(case),
        not_modelled: case.not_modelled.clone(),
        independent,
        spread: None,
        cautions,
    }
}

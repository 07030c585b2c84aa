//! A result that lies on disk, read again: its case, its figures, its grids.

use std::path::Path;

use serde_json::Value;

use super::fault::IoFault;
use super::names;
use crate::case::KeptCase;

/// A figure of an earlier result.
#[derive(Debug, Clone, PartialEq)]
pub struct EarlierFigure {
    /// Its name.
    pub name: String,
    /// Its value.
    pub value: f64,
    /// Half-width of its band.
    pub band: f64,
    /// Its unit.
    pub unit: String,
}

/// What an earlier result says of itself.
#[derive(Debug, Clone, PartialEq)]
pub struct Earlier {
    /// Title of the case.
    pub title: String,
    /// The command that computed it.
    pub command: String,
    /// Program and version that computed it.
    pub program: String,
    /// Digest of its resolved case.
    pub digest: String,
    /// The case.
    pub case: KeptCase,
    /// Every word of the case, as in `summary.json`.
    pub resolved: Value,
    /// The figures, in the order of their names.
    pub figures: Vec<EarlierFigure>,
    /// Number of grid levels.
    pub levels: usize,
}

/// Reads the summary of a result folder.
///
/// # Errors
/// [`IoFault::NoResult`] where there is none, [`IoFault::Unreadable`] where it cannot be read, [`IoFault::Lacks`] where it does
/// not hold its case.
pub fn read_earlier(folder: &Path) -> Result<Earlier, IoFault> {
    let path = folder.join(names::SUMMARY);
    if !path.is_file() {
        return Err(IoFault::NoResult { folder: folder.to_path_buf() });
    }
    let unreadable = |why: String| IoFault::Unreadable { path: path.clone(), why };
    let text = std::fs::read_to_string(&path).map_err(|e| unreadable(e.to_string()))?;
    let summary: Value = serde_json::from_str(&text).map_err(|e| unreadable(format!("it is no JSON: {e}")))?;
    let lacks = |what: &'static str| IoFault::Lacks { folder: folder.to_path_buf(), what };
    let said = |key: &str| summary[key].as_str().unwrap_or_default().to_owned();
    let program = ["name", "version"].map(|key| summary["program"][key].as_str().unwrap_or_default());
    Ok(Earlier {
        title: said("title"),
        command: said("command"),
        program: program.join(" "),
        digest: said("digest"),
        case: KeptCase::from_json(&summary["case"])
            .ok_or_else(|| lacks("its case: that of a `run` or a `curve` does"))?,
        resolved: summary["resolved"].clone(),
        figures: figures(&summary["figures"]).ok_or_else(|| lacks("its figures"))?,
        levels: summary["grids"].as_array().map_or(0, Vec::len),
    })
}

fn figures(of: &Value) -> Option<Vec<EarlierFigure>> {
    let one = |(name, figure): (&String, &Value)| {
        Some(EarlierFigure {
            name: name.clone(),
            value: figure["value"].as_f64()?,
            band: figure["band"].as_f64()?,
            unit: figure["unit"].as_str()?.to_owned(),
        })
    };
    of.as_object()?.iter().map(one).collect()
}

/// Words whose values differ between two resolved cases, as `(path, then, now)`; what one of them lacks is `null`.
#[must_use]
pub fn changed_words(then: &Value, now: &Value) -> Vec<(String, Value, Value)> {
    let mut changed = Vec::new();
    collect("", then, now, &mut changed);
    changed
}

fn collect(path: &str, then: &Value, now: &Value, into: &mut Vec<(String, Value, Value)>) {
    if is_word(then) || is_word(now) {
        if then["value"] != now["value"] {
            into.push((path.to_owned(), then["value"].clone(), now["value"].clone()));
        }
        return;
    }
    let mut keys: Vec<&String> = [then, now].into_iter().filter_map(Value::as_object).flat_map(|m| m.keys()).collect();
    keys.sort_unstable();
    keys.dedup();
    for key in keys {
        let below = if path.is_empty() { key.clone() } else { format!("{path}.{key}") };
        collect(&below, &then[key.as_str()], &now[key.as_str()], into);
    }
}

/// A resolved word has a value and an origin.
fn is_word(value: &Value) -> bool {
    value.get("value").is_some() && value.get("origin").is_some()
}

#[cfg(test)]
mod tests {
    use serde_json::json;

    use super::*;

    #[test]
    fn changed_words_are_named() {
        let word = |value: f64| json!({"value": value, "unit": "m", "origin": {"from": "given"}});
        let then = json!({"wall": {"length": word(0.6), "sleeve": {"thickness": word(0.002)}}});
        let now = json!({"wall": {"length": word(0.6), "sleeve": {"thickness": word(0.003), "to": word(0.6)}}});
        let changed = changed_words(&then, &now);
        let names: Vec<&str> = changed.iter().map(|c| c.0.as_str()).collect();
        assert_eq!(names, ["wall.sleeve.thickness", "wall.sleeve.to"]);
        assert_eq!(changed[0].1, json!(0.002));
        assert!(changed[1].1.is_null());
        assert!(changed_words(&then, &then).is_empty());
    }

    #[test]
    fn a_folder_without_a_result_says_so() {
        let fault = read_earlier(Path::new("no/such/folder"));
        assert!(matches!(fault, Err(IoFault::NoResult { .. })));
    }
}

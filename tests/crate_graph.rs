//! Imports flow one way: mesh <- solver <- io <- validation <- the binary.

#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, reason = "a test may stop at the first fault")]

use std::collections::BTreeSet;
use std::path::Path;
use std::process::Command;

use serde_json::Value;

/// Each crate, and those of ours that it may use, at run time or in its tests.
const ALLOWED: [(&str, &[&str]); 5] = [
    ("lenzbore-mesh", &[]),
    ("lenzbore-solver", &["lenzbore-mesh"]),
    ("lenzbore-io", &["lenzbore-mesh", "lenzbore-solver"]),
    ("lenzbore-validation", &["lenzbore-mesh", "lenzbore-solver", "lenzbore-io"]),
    ("lenzbore", &["lenzbore-mesh", "lenzbore-solver", "lenzbore-io", "lenzbore-validation"]),
];

fn metadata() -> Value {
    let output = Command::new(env!("CARGO"))
        .args(["metadata", "--format-version", "1", "--no-deps", "--offline"])
        .current_dir(env!("CARGO_MANIFEST_DIR"))
        .output()
        .unwrap();
    assert!(output.status.success(), "{}", String::from_utf8_lossy(&output.stderr));
    serde_json::from_slice(&output.stdout).unwrap()
}

fn names<'v>(list: &'v Value, ours: &BTreeSet<&str>) -> BTreeSet<&'v str> {
    list.as_array().unwrap().iter().map(|d| d["name"].as_str().unwrap()).filter(|n| ours.contains(n)).collect()
}

#[test]
fn imports_flow_one_way() {
    let all = metadata();
    let packages = all["packages"].as_array().unwrap();
    let found: BTreeSet<&str> = packages.iter().map(|p| p["name"].as_str().unwrap()).collect();
    assert_eq!(
        found,
        ALLOWED.iter().map(|(name, _)| *name).collect(),
        "a crate has come or gone: say here what it may use"
    );
    for package in packages {
        let name = package["name"].as_str().unwrap();
        let (_, allowed) = ALLOWED.iter().find(|(n, _)| *n == name).unwrap();
        let used = names(&package["dependencies"], &found);
        let allowed: BTreeSet<&str> = allowed.iter().copied().collect();
        assert!(used.is_subset(&allowed), "{name} uses {:?}", used.difference(&allowed));
    }
}

/// Whether any source file below `folder` has one of `words`.
fn mentions(folder: &Path, words: &[&str]) -> Option<String> {
    for entry in std::fs::read_dir(folder).unwrap().map(Result::unwrap) {
        let path = entry.path();
        if path.is_dir() {
            if let Some(found) = mentions(&path, words) {
                return Some(found);
            }
        } else if path.extension().is_some_and(|e| e == "rs") {
            let text = std::fs::read_to_string(&path).unwrap();
            if let Some(word) = words.iter().find(|w| text.contains(**w)) {
                return Some(format!("{word} in {}", path.display()));
            }
        }
    }
    None
}

/// `mesh` knows no physics and `solver` no files.
#[test]
fn mesh_and_solver_touch_no_files() {
    let root = Path::new(env!("CARGO_MANIFEST_DIR"));
    for folder in ["mesh/src", "solver/src"] {
        assert_eq!(mentions(&root.join(folder), &["std::fs", "std::net", "File::create", "File::open"]), None);
    }
}

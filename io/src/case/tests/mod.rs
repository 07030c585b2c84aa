#![allow(
    clippy::unwrap_used,
    clippy::expect_used,
    clippy::float_cmp,
    clippy::panic,
    clippy::print_stdout,
    reason = "tests may stop at the first fault"
)]

mod alternating;
mod bad_input;
mod bad_overrides;
mod geometry;
mod kept;
mod layering;
mod overrides;
mod random;
mod resolved;
mod tolerance;
mod values;

use std::path::Path;

use super::*;

/// A small sound case of free travel; tests change single lines of it.
pub(super) const CASE: &str = r#"title = "Test sleeve"
[wall]
length = "600 mm"
[[wall.layer]]
name = "sleeve"
conductivity = "50 MS/m"
temperature_coefficient = "0.004 /K"
outer_diameter = "28 mm"
thickness = "1.5 mm"
[mover]
mass = "0.42 kg"
[[mover.magnet]]
name = "M"
remanence = "1.3 T"
recoil_permeability = 1
outer_diameter = "22 mm"
length = "12 mm"
[travel]
law = "free"
release = "640 mm"
"#;

pub(super) fn read(text: &str, sets: &[&str]) -> Result<ResolvedCase, Diagnostics> {
    let sets: Vec<String> = sets.iter().map(|s| (*s).to_owned()).collect();
    read_case(&CaseSource::Text { name: "t.toml", text, base_dir: Path::new("") }, &sets)
}

pub(super) fn good(text: &str, sets: &[&str]) -> ResolvedCase {
    read(text, sets).unwrap_or_else(|faults| panic!("{faults}\nof\n{text}"))
}

pub(super) fn bad(text: &str, sets: &[&str]) -> Diagnostics {
    match read(text, sets) {
        Ok(_) => panic!("no fault found in\n{text}\n{sets:?}"),
        Err(faults) => faults,
    }
}

/// The case with a line replaced (`old` must be there) or, with an empty `old`, with `new` at the end.
pub(super) fn with(old: &str, new: &str) -> String {
    if old.is_empty() {
        return format!("{CASE}{new}");
    }
    assert!(CASE.contains(old), "{old}");
    CASE.replacen(old, new, 1)
}

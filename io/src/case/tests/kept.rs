//! A kept case is the case: read again without its files it is the same to the last bit.

use super::*;

fn folder() -> std::path::PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("../examples")
}

/// Reads it again from what it keeps, by way of JSON as `summary.json` has it.
fn again(case: &ResolvedCase) -> ResolvedCase {
    let kept = KeptCase::from_json(&case.kept.to_json()).unwrap();
    assert_eq!(kept, case.kept);
    read_case(&CaseSource::Kept(&kept), &[]).unwrap_or_else(|e| panic!("{e}\nof\n{}", kept.toml))
}

fn assert_same(case: &ResolvedCase) {
    let other = again(case);
    assert_eq!(other.problem, case.problem);
    assert_eq!(other.curve, case.curve);
    assert_eq!(other.digest, case.digest);
    assert_eq!(other.record, case.record);
    let mut tolerances = [case.tolerances.clone(), other.tolerances.clone()];
    for list in &mut tolerances {
        list.sort_by(|a, b| a.path.cmp(&b.path));
        list.iter_mut().for_each(|t| t.place = String::new());
    }
    assert_eq!(tolerances[0], tolerances[1]);
    // What it keeps of itself keeps.
    assert_eq!(other.kept.files, case.kept.files);
    assert_eq!(again(&other).digest, case.digest);
}

#[test]
fn every_example_comes_back() {
    let mut seen = 0;
    for entry in std::fs::read_dir(folder()).unwrap() {
        let path = entry.unwrap().path();
        if path.extension().is_some_and(|e| e == "toml") {
            assert_same(&read_case(&CaseSource::Path(&path), &[]).unwrap());
            seen += 1;
        }
    }
    assert!(seen >= 9);
}

#[test]
fn overrides_base_files_and_tolerances_are_laid_in() {
    let path = folder().join("arrest-sleeve-tolerances.toml");
    let sets = ["wall.sleeve.inner_diameter=29.2 mm", "mover.M.coating=0", "tolerance.mover.mass=2 %"];
    let case = read_case(&CaseSource::Path(&path), &sets.map(str::to_owned)).unwrap();
    assert!(!case.kept.toml.contains("like"));
    assert_same(&case);
}

#[test]
fn a_motion_from_a_table_comes_with_the_case_and_counts_in_the_digest() {
    let path = folder().join("cam-follower.toml");
    let case = read_case(&CaseSource::Path(&path), &[]).unwrap();
    assert!(case.kept.files["cam-follower.csv"].contains("time"));
    let mut kept = case.kept.clone();
    let other = kept.files["cam-follower.csv"].replacen("0.0", "0.00", 1);
    assert_ne!(other, kept.files["cam-follower.csv"]);
    kept.files.insert("cam-follower.csv".to_owned(), other);
    assert_ne!(read_case(&CaseSource::Kept(&kept), &[]).unwrap().digest, case.digest);
    kept.files.clear();
    let faults = read_case(&CaseSource::Kept(&kept), &[]).unwrap_err();
    assert!(faults.to_string().contains("it was not kept with the case"), "{faults}");
}

#[test]
fn own_materials_come_with_the_case() {
    let folder = tempfile::tempdir().unwrap();
    let own = r#"[sources]
lab = "measured for this test"
[[conductor]]
family = "copper"
name = "tube, batch 7"
conductivity = { typical = "44.1 MS/m", minimum = "43.8 MS/m", maximum = "44.4 MS/m", source = "lab" }
temperature_coefficient = { typical = "0.0030 /K", source = "lab" }
"#;
    std::fs::write(folder.path().join("own.toml"), own).unwrap();
    let text = with(
        "conductivity = \"50 MS/m\"\ntemperature_coefficient = \"0.004 /K\"",
        "material = \"copper tube, batch 7\"\ngrade_value = \"minimum\"",
    );
    std::fs::write(folder.path().join("case.toml"), format!("materials = \"own.toml\"\n{text}")).unwrap();
    let case = read_case(&CaseSource::Path(&folder.path().join("case.toml")), &[]).unwrap();
    assert_eq!(case.resolved.number("wall.sleeve.conductivity"), Some(43.8e6));
    assert_same(&case);
}

#[test]
fn numbers_flags_and_texts_are_written_as_toml() {
    let case =
        good(&with("title = \"Test sleeve\"", "title = \"A \\\"quoted\\\" \\u0007 title\""), &["accuracy.levels=4"]);
    assert!(case.kept.toml.contains("levels = 4"), "{}", case.kept.toml);
    assert_same(&case);
}

//! `like`: one case file on top of another.

use std::path::Path;

use super::*;

fn folder(files: &[(&str, &str)]) -> tempfile::TempDir {
    let folder = tempfile::tempdir().unwrap();
    for (name, text) in files {
        let path = folder.path().join(name);
        std::fs::create_dir_all(path.parent().unwrap()).unwrap();
        std::fs::write(path, text).unwrap();
    }
    folder
}

fn of(folder: &tempfile::TempDir, name: &str) -> Result<ResolvedCase, Diagnostics> {
    read_case(&CaseSource::Path(&folder.path().join(name)), &[])
}

#[test]
fn parts_are_matched_by_name_and_words_replaced() {
    let top = "like = \"base.toml\"\n[[wall.layer]]\nname = \"sleeve\"\nthickness = \"2 mm\"\n[[wall.layer]]\nname = \"shell\"\nconductivity = \"20 MS/m\"\ntemperature_coefficient = \"0.004 /K\"\nsize = \"34 x 2 mm\"\n[mover]\nmass = \"1 kg\"\n";
    let folder = folder(&[("base.toml", CASE), ("top.toml", top)]);
    let case = of(&folder, "top.toml").unwrap();
    assert_eq!(case.problem.wall.layers.len(), 2);
    approx::assert_relative_eq!(case.problem.wall.layers[0].inner_radius_m, 0.012, max_relative = 1e-12);
    assert_eq!(case.problem.mover.mass_kg, Some(1.0));
    assert_eq!(case.title, "Test sleeve");
    assert_eq!(case.files.len(), 2);
    assert!(case.files[1].ends_with("base.toml"));
}

#[test]
fn chains_are_followed_relative_to_each_file() {
    let folder = folder(&[
        ("base.toml", CASE),
        ("a/middle.toml", "like = \"../base.toml\"\n[mover]\nmass = \"1 kg\"\n"),
        ("a/b/top.toml", "like = \"../middle.toml\"\ntitle = \"Top\"\n"),
    ]);
    let case = of(&folder, "a/b/top.toml").unwrap();
    assert_eq!((case.title.as_str(), case.problem.mover.mass_kg), ("Top", Some(1.0)));
}

#[test]
fn faults_of_a_base_file_point_into_it() {
    let folder = folder(&[("base.toml", &with("\"12 mm\"", "\"12 mT\"")), ("top.toml", "like = \"base.toml\"\n")]);
    let shown = of(&folder, "top.toml").unwrap_err().to_string();
    assert!(shown.contains("base.toml:17:10: length: 'mT'"), "{shown}");
    let folder = super::layering::folder(&[("base.toml", "a = "), ("top.toml", "like = \"base.toml\"\n")]);
    let shown = of(&folder, "top.toml").unwrap_err().to_string();
    assert!(shown.contains("base.toml:1:"), "{shown}");
}

#[test]
fn circles_and_missing_files_point_at_like() {
    let folder = folder(&[
        ("a.toml", "title = \"a\"\nlike = \"b.toml\"\n"),
        ("b.toml", "like = \"a.toml\"\n"),
        ("self.toml", "like = \"./self.toml\"\n"),
        ("lost.toml", "title = \"x\"\nlike = \"nowhere.toml\"\n"),
        ("number.toml", "like = 3\n"),
    ]);
    let shown = of(&folder, "a.toml").unwrap_err().to_string();
    assert!(shown.contains("b.toml:1:8: ") && shown.contains("a.toml -> b.toml -> a.toml"), "{shown}");
    assert!(of(&folder, "self.toml").unwrap_err().to_string().contains("self.toml -> self.toml"));
    let shown = of(&folder, "lost.toml").unwrap_err().to_string();
    assert!(shown.contains("lost.toml:2:8: cannot read") && shown.contains("there is no such file"), "{shown}");
    let shown = of(&folder, "number.toml").unwrap_err().to_string();
    assert!(shown.contains("number.toml:1:8: 'like' is a number here"), "{shown}");
}

#[test]
fn long_chains_end() {
    let files: Vec<(String, String)> =
        (0..30).map(|i| (format!("{i}.toml"), format!("like = \"{}.toml\"\n", i + 1))).collect();
    let borrowed: Vec<(&str, &str)> = files.iter().map(|(a, b)| (a.as_str(), b.as_str())).collect();
    let shown = of(&folder(&borrowed), "0.toml").unwrap_err().to_string();
    assert!(shown.contains("more than 16 case files start from one another"), "{shown}");
}

#[test]
fn standard_input_can_start_from_a_file() {
    let folder = folder(&[("base.toml", CASE)]);
    let text = "like = \"base.toml\"\n[mover]\nmass = \"2 kg\"\n";
    let case = read_case(&CaseSource::Text { name: "-", text, base_dir: folder.path() }, &[]).unwrap();
    assert_eq!(case.problem.mover.mass_kg, Some(2.0));
    assert_eq!(case.files[0], "-");
    let lost = read_case(&CaseSource::Text { name: "-", text, base_dir: Path::new("nowhere") }, &[]);
    assert!(lost.unwrap_err().to_string().starts_with("-:1:8: cannot read nowhere/base.toml"));
}

#[test]
fn a_material_from_one_file_and_a_conductivity_from_another_is_a_caution() {
    let folder = folder(&[
        ("base.toml", CASE),
        ("top.toml", "like = \"base.toml\"\n[[wall.layer]]\nname = \"sleeve\"\nmaterial = \"brass CuZn37\"\n"),
    ]);
    let case = of(&folder, "top.toml").unwrap();
    assert!(
        case.cautions.iter().any(|c| c.contains("although its material was named elsewhere")),
        "{:?}",
        case.cautions
    );
}

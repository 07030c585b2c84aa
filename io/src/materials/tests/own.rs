//! Own materials: read as the book is, and refused with pointed messages.

use std::path::Path;

use crate::case::{CaseSource, Origin, read_case};
use crate::materials::{Book, GradeValue, Permeability, read_own_materials};
use crate::message::{Diagnostics, Sources};

const OWN: &str = r#"[sources]
lab = "measured on the batch of May 2025, four points"

[[conductor]]
family = "copper"
name = "tube, batch 7"
conductivity = { typical = "44.1 MS/m", minimum = "43.8 MS/m", maximum = "44.4 MS/m", source = "lab" }
specific_heat = { typical = "0.385 kJ/(kg K)", source = "the maker's data sheet" }

[class.hot]
coercivity_hcj = { minimum = "20 kOe", source = "the maker's data sheet" }

[[magnet]]
family = "NdFeB"
name = "lot 12 "
classes = ["hot"]
remanence = { typical = "1.287 T", source = "Helmholtz coil, ten pieces, mean" }
greatest_temperature = { typical = "150 degC", source = "the maker's data sheet" }
"#;

fn read(text: &str) -> Result<Book, Diagnostics> {
    let mut sources = Sources::default();
    super::super::own_materials("own.toml", text, &mut sources).map_err(|f| Diagnostics::new(sources, f))
}

#[test]
fn own_materials_read_like_the_book() {
    let own = read(OWN).unwrap_or_else(|f| panic!("{f}"));
    let tube = own.conductor("tube, batch 7").unwrap();
    assert_eq!(tube.conductivity_s_per_m.pick(GradeValue::Minimum), 43.8e6);
    assert_eq!(tube.conductivity_s_per_m.source, "measured on the batch of May 2025, four points (own.toml:7:96)");
    assert_eq!(tube.specific_heat_j_per_kg_k.as_ref().unwrap().typical, 385.0);
    assert_eq!(tube.permeability, Permeability::NotGiven);
    assert_eq!(tube.grade.file.as_deref(), Some("own.toml"));
    let magnet = own.magnet("NdFeB lot 12hot").unwrap();
    assert_eq!(magnet.greatest_temperature_c(), Some(150.0));
    assert!(magnet.coercivity_hcj_a_per_m.as_ref().unwrap().is_least);
    assert!(magnet.remanence_coefficient_per_k.is_none());
}

/// Each change of the file, where it points, and what is said.
#[test]
fn faults_point_at_their_words() {
    let tail = |words: &str| format!("{OWN}{words}\n");
    for (text, place, said) in [
        (OWN.replace(", source = \"lab\"", ""), "own.toml:7:16", "lacks 'source'"),
        (OWN.replace("source = \"lab\"", "source = \"labb\""), "own.toml:7:96", "did you mean 'lab'"),
        (OWN.replace("source = \"lab\"", "source = \" \""), "own.toml:7:96", "an empty text"),
        (OWN.replace("44.1 MS/m", "44.1 mm"), "own.toml:7:28", "'mm' does not measure a conductivity but a length"),
        (OWN.replace("44.1 MS/m", "45 MS/m"), "own.toml:7:16", "do not rise in this order"),
        (OWN.replace("44.1 MS/m", "44.1e9 MS/m"), "own.toml:7:28", "is impossible"),
        (OWN.replace("typical = \"44.1 MS/m\", minimum", "typicl"), "own.toml:7:18", "did you mean 'typical'?"),
        (OWN.replace("conductivity =", "conductivty ="), "own.toml:7:1", "did you mean 'conductivity'?"),
        (OWN.replace("conductivity =", "conductivty ="), "own.toml:4:1", "lacks 'conductivity'"),
        (OWN.replace("name = \"tube, batch 7\"\n", ""), "own.toml:4:1", "lacks 'name'"),
        (OWN.replace("\"tube, batch 7\"", "\"Cu-DHP\""), "own.toml:6:8", "the material book has 'copper Cu-DHP'"),
        (OWN.replace("[\"hot\"]", "[\"hat\"]"), "own.toml:16:11", "did you mean 'hot'?"),
        (OWN.replace("[\"hot\"]", "\"hot\""), "own.toml:16:11", "a list of texts belongs here"),
        (OWN.replace("\"150 degC\"", "150"), "own.toml:18:36", "has no unit"),
        (tail("[[conductors]]"), "own.toml:19:3", "did you mean 'conductor'?"),
        (tail("density = 5"), "own.toml:19:11", "a number with its source belongs here"),
        (tail("[[conductor]]\nfamily = \"copper\"\nname = \"Tube batch-7,\""), "own.toml:19:1", "lacks 'conductivity'"),
        (OWN.replace("lab = \"measured", "lab = 7 # \""), "own.toml:2:7", "a text that says where numbers come from"),
        (OWN.replace("[sources]", "[sources"), "own.toml:1:", "not readable as TOML"),
    ] {
        let faults = read(&text).expect_err(said).to_string();
        assert!(faults.contains(place) && faults.contains(said), "{place} {said}\n{faults}");
    }
}

#[test]
fn two_own_grades_of_one_name_are_refused() {
    let twice = format!(
        "{OWN}\n[[conductor]]\nfamily = \"copper\"\nname = \"Tube, batch-7\"\nconductivity = {{ typical = 5e7, source = \"a guess\" }}\n"
    );
    let faults = read(&twice).unwrap_err().to_string();
    assert!(faults.contains("own.toml:22:8") && faults.contains("this file has 'copper tube, batch 7'"), "{faults}");
}

const CASE: &str = r#"materials = "own/own-materials.toml"
[wall]
length = "endless"
temperature = "70 degC"
[[wall.layer]]
name = "sleeve"
material = "copper tube, batch 7"
size = "28 x 1.5 mm"
[mover]
temperature = "160 degC"
[[mover.magnet]]
name = "M"
material = "lot 12hot"
outer_diameter = "22 mm"
length = "12 mm"
[travel]
law = "steady"
speed = "1 m/s"
"#;

fn folder() -> tempfile::TempDir {
    let folder = tempfile::TempDir::new().unwrap();
    std::fs::create_dir(folder.path().join("own")).unwrap();
    std::fs::write(folder.path().join("own/own-materials.toml"), OWN).unwrap();
    std::fs::write(folder.path().join("case.toml"), CASE).unwrap();
    folder
}

#[test]
fn a_case_takes_materials_from_the_file_beside_it() {
    let folder = folder();
    let path = folder.path().join("case.toml");
    let case = read_case(&CaseSource::Path(&path), &["wall.sleeve.grade_value=minimum".to_owned()]).unwrap();
    assert_eq!(case.resolved.number("wall.sleeve.conductivity"), Some(43.8e6));
    let Origin::Book { grade, source } = &case.resolved.get("wall.sleeve.conductivity").unwrap().origin else {
        panic!("not from the own book")
    };
    assert_eq!(grade, "copper tube, batch 7");
    assert!(source.contains("four points (") && source.contains("own-materials.toml:7:96)"), "{source}");
    assert_eq!(case.resolved.number("mover.M.remanence"), Some(1.287));
    assert!(case.files.iter().any(|f| f.ends_with("own-materials.toml")), "{:?}", case.files);
    // No coefficient: constant, with a caution; hotter than the magnet is made for: a caution.
    for said in ["without a temperature coefficient", "made for at most 150 degC", "no recoil permeability"] {
        assert!(case.cautions.iter().any(|c| c.contains(said)), "{said}: {:?}", case.cautions);
    }
    let text = CaseSource::Text { name: "-", text: CASE, base_dir: folder.path() };
    let same = read_case(&text, &["wall.sleeve.grade_value=minimum".to_owned()]).unwrap();
    assert_eq!(same.digest, case.digest);
}

/// `like` in another folder: the path starts from the file that names it.
#[test]
fn the_path_starts_from_the_file_that_names_it() {
    let folder = folder();
    std::fs::create_dir(folder.path().join("cases")).unwrap();
    let path = folder.path().join("cases/hot.toml");
    std::fs::write(&path, "like = \"../case.toml\"\n[wall]\ntemperature = \"90 degC\"\n").unwrap();
    let case = read_case(&CaseSource::Path(&path), &[]).unwrap();
    assert_eq!(case.resolved.number("wall.sleeve.conductivity"), Some(44.1e6));
}

#[test]
fn faults_of_the_own_file_and_its_path_stop_the_case() {
    let folder = folder();
    let read = |case: &str| {
        let source = CaseSource::Text { name: "case.toml", text: case, base_dir: folder.path() };
        read_case(&source, &[]).unwrap_err().to_string()
    };
    let faults = read(&CASE.replace("own/own", "own/on"));
    assert!(faults.contains("case.toml:1:13") && faults.contains("there is no such file"), "{faults}");
    let faults = read(&CASE.replace("\"own/own-materials.toml\"", "7"));
    assert!(faults.contains("case.toml:1:13") && faults.contains("the path of a file of materials"), "{faults}");
    let set = read_case(&CaseSource::Path(&folder.path().join("case.toml")), &["materials=x.toml".to_owned()]);
    assert!(set.unwrap_err().to_string().contains("named in the case file itself"));
    std::fs::write(folder.path().join("own/own-materials.toml"), OWN.replace(", source = \"lab\"", "")).unwrap();
    let faults = read(CASE);
    assert!(faults.contains("own-materials.toml:7:16") && faults.contains("lacks 'source'"), "{faults}");
    assert!(!faults.contains("no conductor"), "the case's own words wait: {faults}");
}

#[test]
fn a_steel_without_linear_permeability_asks_for_one() {
    let steel = CASE.replace("copper tube, batch 7", "steel C45").replace("materials = ", "title = ");
    let steel = steel.replace("lot 12hot", "N42SH");
    let read = |text: &str| read_case(&CaseSource::Text { name: "c", text, base_dir: Path::new("") }, &[]);
    let faults = read(&steel).unwrap_err().to_string();
    assert!(faults.contains("c:7:12") && faults.contains("'steel C45' without 'permeability'"), "{faults}");
    let given = steel.replace("size = ", "permeability = 150\nsize = ");
    assert_eq!(read(&given).unwrap().resolved.number("wall.sleeve.permeability"), Some(150.0));
}

#[test]
fn an_own_file_that_is_not_there_is_named() {
    let faults = read_own_materials(Path::new("no/such/file.toml")).unwrap_err().to_string();
    assert!(faults.contains("no/such/file.toml") && faults.contains("no such file"), "{faults}");
}

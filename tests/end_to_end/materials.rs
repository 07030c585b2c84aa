//! `lenzbore materials`, and own materials beside a case.

use std::collections::BTreeSet;

use crate::rig::{Bench, QUICK, figure, root};

const OWN: &str = r#"[sources]
lab = "measured on the batch of May 2025, four points, 20 degC"

[[conductor]]
family = "copper"
name = "tube, batch 7"
conductivity = { typical = "29 MS/m", source = "lab" }
"#;

#[test]
fn the_list_has_a_line_for_every_grade() {
    let list = Bench::new().succeed(&["materials"]).output;
    for part in
        ["copper Cu-DHP ", "46.4 MS/m (41 to 52)", "NdFeB N42SH ", "1.315 T (1.28 to 1.35)", "lenzbore materials NAME"]
    {
        assert!(list.contains(part), "{part}\n{list}");
    }
    assert!(list.lines().count() > 90, "{list}");
}

#[test]
fn one_grade_shows_every_number_with_its_source() {
    let bench = Bench::new();
    let tube = bench.succeed(&["materials", "Cu-DHP"]).output;
    assert!(tube.starts_with("copper Cu-DHP: "), "{tube}");
    for part in [
        "also CW024A",
        "named in EN 1057",
        "conductivity                46.4 MS/m (41 to 52)",
        "makers' lists of deoxidised high-phosphorus copper",
        "specific_heat               385 J/(kg K)",
        "from memory",
        "caution: the conductivity of Cu-DHP differs",
    ] {
        assert!(tube.contains(part), "{part}\n{tube}");
    }
    let magnet = bench.succeed(&["materials", "NdFeB N42SH"]).output;
    for part in [
        "coercivity_hcj              at least 1591.55 kA/m",
        "coercivity_hcj_coefficient  -0.55 %/K",
        "greatest_temperature        150 degC",
    ] {
        assert!(magnet.contains(part), "{part}\n{magnet}");
    }
    let steel = bench.succeed(&["materials", "C45"]).output;
    assert!(steel.contains("permeability                to be given in the case: "), "{steel}");
}

#[test]
fn a_search_finds_names_standards_and_descriptions() {
    let bench = Bench::new();
    let names = |text: &str| -> Vec<String> {
        let found = bench.succeed(&["materials", "--json", "--search", text]).json();
        found.as_object().unwrap().keys().cloned().collect()
    };
    assert_eq!(names("EN 1057"), ["copper Cu-DHP"]);
    assert_eq!(names("free-cutting"), ["brass CuZn39Pb3"]);
    assert_eq!(names("SmCo5").len(), 5);
    // One find is shown in full.
    assert!(bench.succeed(&["materials", "--search", "EN 1057"]).output.contains("named in EN 1057"));
    let none = bench.run(&["materials", "--search", "unobtainium"]);
    assert_eq!(none.status, Some(2));
    assert!(none.errors.contains("no grade has 'unobtainium'"), "{}", none.errors);
}

#[test]
fn a_name_that_is_no_grade_gets_the_nearest_or_the_grades() {
    let bench = Bench::new();
    for (name, said) in [
        ("copper", "\"copper Cu-DHP\""),
        ("ferrite", "\"ferrite Y30\""),
        ("Cu-DPH", "did you mean \"Cu-DHP\"?"),
        ("N42HS", "did you mean \"N42"),
    ] {
        let ran = bench.run(&["materials", name]);
        assert_eq!(ran.status, Some(2), "{name}");
        assert!(ran.errors.contains(said), "{name}: {}", ran.errors);
    }
}

/// Numbers of the JSON are SI, and each has a unit and its source.
#[test]
fn json_has_every_number_in_si_with_its_source() {
    let all = Bench::new().succeed(&["materials", "--json"]).json();
    let grades = all.as_object().unwrap();
    assert!(grades.len() > 90, "{}", grades.len());
    let mut units = BTreeSet::new();
    for (name, grade) in grades {
        for (word, number) in grade["numbers"].as_object().unwrap() {
            assert!(number["typical"].is_f64(), "{name} {word}");
            assert!(number["source"].as_str().unwrap().len() > 20, "{name} {word}");
            units.insert(number["unit"].as_str().unwrap().to_owned());
        }
    }
    let wanted = ["", "1/K", "A/m", "J/(kg K)", "K", "S/m", "T", "W/(m K)", "kg/m3"];
    assert_eq!(units, wanted.map(str::to_owned).into());
    let copper = &all["copper Cu-DHP"]["numbers"]["conductivity"];
    assert_eq!([&copper["minimum"], &copper["typical"], &copper["maximum"]], [41.0e6, 46.4e6, 52.0e6]);
    assert_eq!(all["NdFeB N42SH"]["numbers"]["coercivity_hcj"]["is_least"], true);
    assert!(all["steel C45"]["not_linear"].as_str().unwrap().contains("saturates"));
}

/// Half the conductivity of QUICK's tube, given by an own material: at low speed half the drag coefficient.
#[test]
fn a_case_is_solved_with_an_own_material() {
    let case = QUICK.replace("conductivity = \"58 MS/m\"", "material = \"copper tube, batch 7\"");
    let bench = Bench::with("case.toml", &format!("materials = \"own-materials.toml\"\n{case}"));
    bench.write("own-materials.toml", OWN);
    bench.write("given.toml", QUICK);
    let slow = ["--json", "--set", "travel.speed=1 mm/s"];
    let drag = |name: &str| {
        let words = [&["run", name, "--out", name.trim_end_matches(".toml")], slow.as_slice()].concat();
        bench.succeed(&words).json()
    };
    let (own, given) = (drag("case.toml"), drag("given.toml"));
    let ratio = figure(&own, "drag") / figure(&given, "drag");
    assert!((ratio - 0.5).abs() < 1e-6, "{ratio}");
    let origin = &own["resolved"]["wall"]["tube"]["conductivity"]["origin"];
    assert_eq!(origin["grade"], "copper tube, batch 7");
    let source = origin["source"].as_str().unwrap();
    assert!(source.starts_with("measured on the batch") && source.ends_with("own-materials.toml:7:48)"), "{source}");
    // The file alone, shown and searched with the book.
    let shown = bench.succeed(&["materials", "tube, batch 7", "--with", "own-materials.toml"]).output;
    assert!(shown.contains("29 MS/m") && shown.contains("four points"), "{shown}");
}

#[test]
fn an_own_number_without_source_is_refused_where_it_stands() {
    let bench = Bench::with("case.toml", &format!("materials = \"own-materials.toml\"\n{QUICK}"));
    bench.write("own-materials.toml", &OWN.replace(", source = \"lab\"", ""));
    for words in [&["check", "case.toml"][..], &["materials", "--with", "own-materials.toml"]] {
        let ran = bench.run(words);
        assert_eq!(ran.status, Some(2), "{words:?}");
        assert!(
            ran.errors.contains("own-materials.toml:7:16: the number 'conductivity' lacks 'source'"),
            "{}",
            ran.errors
        );
    }
}

/// The guide shows what the program says, and its own material can be read.
#[test]
fn the_guide_shows_a_grade_and_an_own_material() {
    let guide = std::fs::read_to_string(root().join("io/guide/src/case/materials.md")).unwrap();
    let (_, section) = guide.split_once("# Materials and temperature").unwrap();
    let block = |fence: &str| section.split_once(fence).unwrap().1.split_once("```").unwrap().0;
    let bench = Bench::new();
    assert_eq!(block("```text\n"), bench.succeed(&["materials", "Cu-DHP"]).output);
    bench.write("own.toml", block("```toml\n"));
    let own = bench.succeed(&["materials", "copper tube, batch 7", "--with", "own.toml", "--json"]).json();
    assert_eq!(own["copper tube, batch 7"]["numbers"]["conductivity"]["typical"], 44.1e6);
}

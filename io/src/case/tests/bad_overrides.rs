//! Faults of `--set` point at the option.

use super::{CASE, bad};

#[test]
fn faults_of_overrides_point_at_the_option() {
    for (set, words) in [
        (
            "wall.sleeve.thickness",
            &["--set: an override is written PATH=VALUE", "for example: --set wall.sleeve.thickness"][..],
        ),
        ("=2 mm", &["leads to no word", "a piece of it is empty"]),
        ("wall..thickness=2 mm", &["a piece of it is empty"]),
        ("wall=2 mm", &["it names no word below the table"]),
        ("like=base.toml", &["a base file is named in the case file itself"]),
        ("wal.sleeve.thickness=2 mm", &["'wal' is no word of a case file", "did you mean 'wall'?", "| ^^^"]),
        (
            "wall.sleve.thickness=2 mm",
            &["no part of [wall] is named 'sleve'", "did you mean 'sleeve'?", "|      ^^^^^"],
        ),
        ("mover.N.remanence=1 T", &["no part of [mover] is named 'N'", "names there are: M"]),
        ("wall.sleeve.thicknes=2 mm", &["'thicknes' is no word of [[wall.layer]]", "did you mean 'thickness'?"]),
        ("mover.M.remanance=1 T", &["'remanance' is no word of [[mover.magnet]]", "did you mean 'remanence'?"]),
        ("travel.relase=1 m", &["'relase' is no word of [travel]", "did you mean 'release'?"]),
        ("wall.layer.sleeve.thickness.x=2 mm", &["it is too long"]),
        ("wall.layer=2", &["'layer' leads to no word of a case", "it is a list of parts"]),
        ("wall.sleeve.thickness=-2 mm", &["--set: thickness = -2 mm is impossible", "                       ^^^^^"]),
        ("wall.sleeve.thickness=2 mT", &["'mT' does not measure a length"]),
        ("wall.sleeve.thickness=2,1 mm", &["did you mean '2.1 mm'?"]),
        (
            "mover.M.outer_diameter=25.5 mm",
            &["--set: part 'M' (diameters 0 mm to 25.5 mm) has no running clearance", "the layer: t.toml:9:13"],
        ),
        ("tolerance.wall.sleeve.thickness=10 mT", &["'mT' does not measure a length"]),
        ("travel.law=sina", &["did you mean \"sine\"?"]),
        ("travel.gates=[600 mm]", &["there are two gates"]),
    ] {
        let shown = bad(CASE, &[set]).to_string();
        assert!(shown.contains(&format!("      | {set}\n")), "{set}\n{shown}");
        for word in words {
            assert!(shown.contains(word), "{set}: '{word}' is not in\n{shown}");
        }
    }
}

#[test]
fn each_override_is_judged_on_its_own() {
    let shown = bad(CASE, &["wall.sleeve.thickness=2 mT", "mover.mass=-1 kg", "title=fine"]).to_string();
    assert!(shown.contains("2 mT\n") && shown.contains("mover.mass=-1 kg\n") && shown.contains("2 faults"), "{shown}");
}

#[test]
fn three_sizes_set_at_once_are_one_too_many() {
    let sets = ["wall.sleeve.thickness=2 mm", "wall.sleeve.inner_diameter=25 mm", "wall.sleeve.outer_diameter=29 mm"];
    assert!(bad(CASE, &sets).to_string().contains("any two of the three sizes give the third"));
}

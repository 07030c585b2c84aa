//! Wrong input: a message that points at it, exit status 2, nothing written.

use crate::rig::{Bench, QUICK, SLOW};

/// What is wrong, the case's text before and after, the place the message must point at, and what it must say.
struct Fault {
    what: &'static str,
    old: &'static str,
    new: &'static str,
    place: &'static str,
    says: &'static [&'static str],
}

const fn fault(
    what: &'static str,
    old: &'static str,
    new: &'static str,
    place: &'static str,
    says: &'static [&'static str],
) -> Fault {
    Fault { what, old, new, place, says }
}

const THICK: &str = "thickness = \"2 mm\"";
const SPEED: &str = "speed = \"5 m/s\"";

/// Faults of the quick case.
const FAULTS: [Fault; 29] = [
    fault("no size", THICK, "", "6:1", &["[[wall.layer]] lacks"]),
    fault("no speed", SPEED, "", "18:2", &["lacks 'speed'"]),
    fault("no law", "law = \"steady\"", "", "18:2", &["lacks 'law'"]),
    fault("negative thickness", THICK, "thickness = \"-2 mm\"", "10:13", &["thickness = -2 mm is impossible"]),
    fault("no thickness", THICK, "thickness = 0", "10:13", &["impossible", "was a unit meant"]),
    fault("NaN", THICK, "thickness = nan", "10:13", &["not a finite number"]),
    fault("NaN in a text", THICK, "thickness = \"nan mm\"", "10:13", &["not a finite number"]),
    fault("infinity", THICK, "thickness = inf", "10:13", &["not a finite number"]),
    fault("minus infinity", SPEED, "speed = \"-inf m/s\"", "20:9", &["not a finite number"]),
    fault("overflow", THICK, "thickness = \"1e400 mm\"", "10:13", &["not a finite number"]),
    fault("not a number", THICK, "thickness = \"thick\"", "10:13", &["does not start with a number"]),
    fault("wrong unit", THICK, "thickness = \"2 mT\"", "10:13", &["does not measure a length", "mm, um"]),
    fault("unknown unit", THICK, "thickness = \"2 mn\"", "10:13", &["no known unit", "did you mean 'mm'?"]),
    fault("unknown word", THICK, "thikness = \"2 mm\"", "10:1", &["no word of", "did you mean 'thickness'?"]),
    fault("unknown table", "[travel]", "[travell]", "18:2", &["did you mean 'travel'?"]),
    fault("unknown law", "\"steady\"", "\"stedy\"", "19:7", &["did you mean \"steady\"?"]),
    fault("half a stroke", "\"steady\"", "\"sine\"", "18:2", &["lacks 'amplitude'", "a word of law 'steady'"]),
    fault("negative speed", SPEED, "speed = \"-5 m/s\"", "20:9", &["a speed is a magnitude"]),
    fault("absurd speed", SPEED, "speed = \"1e9 m/s\"", "20:9", &["impossible"]),
    fault("absurd conductivity", "58 MS/m", "58e9 MS/m", "8:16", &["impossible"]),
    fault("no conductor", "58 MS/m", "0 S/m", "3:2", &["neither conducts"]),
    fault("no field", "1 A m2", "0 A m2", "12:2", &["the mover has no field"]),
    fault("wrong moment", "1 A m2", "1 A", "16:10", &["does not measure a dipole moment"]),
    fault("four sizes", THICK, "thickness = \"2 mm\"\nouter_diameter = \"30 mm\"", "", &["outer_diameter"]),
    fault("one point", "points = 5", "points = 1", "24:10", &["a whole number from 2"]),
    fault("half a point", "points = 5", "points = 5.5", "24:10", &["a whole number from 2"]),
    fault("falling speeds", "[\"0.1 m/s\", \"100 m/s\"]", "[\"9 m/s\", \"1 m/s\"]", "23:10", &["speeds increase"]),
    fault("not TOML", "\"21 mm\"", "\"21 mm", "9:", &["not readable as TOML"]),
    fault("wrong kind", "title = \"Dipole in a tube\"", "title = 7", "1:9", &["a text belongs here"]),
];

fn refuse(name: &str, text: &str, words: &[&str]) -> String {
    let bench = Bench::with("case.toml", text);
    let all: Vec<&str> = ["run", "case.toml"].into_iter().chain(words.iter().copied()).collect();
    let ran = bench.run(&all);
    assert_eq!(ran.status, Some(2), "{name}: {}{}", ran.output, ran.errors);
    assert_eq!(ran.output, "", "{name}");
    assert_eq!(bench.entries(), ["case.toml"], "{name}: nothing is written");
    assert!(!ran.errors.contains("panicked"), "{name}: {}", ran.errors);
    ran.errors
}

#[test]
fn every_fault_is_pointed_at() {
    for f in &FAULTS {
        assert_eq!(QUICK.matches(f.old).count(), 1, "{}: '{}' stands once in the case", f.what, f.old);
        let errors = refuse(f.what, &QUICK.replace(f.old, f.new), &[]);
        let place = format!("case.toml:{}", f.place);
        assert!(errors.lines().any(|l| l.starts_with(&place)), "{}: {place} lacks in\n{errors}", f.what);
        for part in f.says {
            assert!(errors.contains(part), "{}: '{part}' lacks in\n{errors}", f.what);
        }
    }
}

#[test]
fn all_faults_are_said_at_once() {
    let text = QUICK.replace("2 mm", "-2 mm").replace("1 A m2", "1 T").replace("points", "pionts");
    let errors = refuse("three faults", &text, &[]);
    for place in ["case.toml:10:13:", "case.toml:16:10:", "case.toml:24:1:"] {
        assert!(errors.contains(place), "{place} lacks in\n{errors}");
    }
    assert!(errors.contains("3 faults"), "{errors}");
}

#[test]
fn parts_that_overlap_are_named() {
    let layer = "[mover]\n";
    let second = "[[wall.layer]]\nname = \"liner\"\nconductivity = \"20 MS/m\"\ninner_diameter = \"24 mm\"\nthickness = \"3 mm\"\n\n[mover]\n";
    let errors = refuse("layers", &QUICK.replace(layer, second), &[]);
    assert!(errors.contains("layers 'tube' and 'liner' overlap"), "{errors}");

    let magnets = "[[mover.magnet]]\nname = \"A\"\nremanence = 1.2\nouter_diameter = \"16 mm\"\nlength = \"10 mm\"\nat = \"0 mm\"\n\n[[mover.magnet]]\nname = \"B\"\nremanence = 1.2\nouter_diameter = \"16 mm\"\nlength = \"10 mm\"\nat = \"8 mm\"\n";
    let dipole = "[[mover.dipole]]\nname = \"D\"\nmoment = \"1 A m2\"\n";
    assert!(QUICK.contains(dipole));
    let errors = refuse("magnets", &QUICK.replace(dipole, magnets), &[]);
    assert!(errors.contains("parts 'A' and 'B' overlap"), "{errors}");

    let errors =
        refuse("clearance", &QUICK.replace(dipole, &magnets.replace("8 mm", "12 mm").replace("16 mm", "21 mm")), &[]);
    assert!(errors.contains("no running clearance"), "{errors}");
}

#[test]
fn a_case_larger_than_the_machine_is_refused_before_solving() {
    let errors = refuse("a snapshot every two nanometres", SLOW, &["--set", "output.fields=\"every 2 nm\""]);
    assert!(errors.contains("MiB are available"), "{errors}");
    let errors =
        refuse("a wall of 9 km", &SLOW.replace("\"15 m\"", "\"9 km\"").replace("\"15.02 m\"", "\"9001 m\""), &[]);
    assert!(errors.contains("MiB are available") || errors.contains("the grid cannot be built"), "{errors}");
}

#[test]
fn a_wrong_override_points_at_itself() {
    let cases = [
        ("wall.tube.thickness=\"-1 mm\"", "impossible"),
        ("wall.tub.thickness=\"1 mm\"", "did you mean 'tube'?"),
        ("wall.tube.thikness=\"1 mm\"", "did you mean 'thickness'?"),
        ("travel.speed=\"5 kg\"", "does not measure a speed"),
        ("accuracy.levels=6", "from 3 to 5"),
        ("nonsense", "PATH=VALUE"),
    ];
    for (word, says) in cases {
        let errors = refuse(word, QUICK, &["--set", word]);
        assert!(errors.starts_with("--set: ") && errors.contains(says), "{word}: {errors}");
    }
}

#[test]
fn a_law_that_does_not_suit_the_wall_says_which_does() {
    let finite = QUICK.replace("\"endless\"", "\"0.2 m\"");
    let errors = refuse("steady in a finite wall", &finite, &[]);
    assert!(errors.contains("case.toml:19:7:") && errors.contains("traverse"), "{errors}");
    let errors = refuse("free in an endless wall", &SLOW.replace("\"15 m\"", "\"endless\""), &[]);
    assert!(errors.contains("has no ends"), "{errors}");
    let errors = refuse("free without a mass", &SLOW.replace("mass = \"50 g\"", ""), &[]);
    assert!(errors.contains("mass"), "{errors}");
    let errors = refuse("held by friction", &(SLOW.to_owned() + "friction = \"100 N\"\n"), &[]);
    assert!(errors.contains("does not move"), "{errors}");
}

#[test]
fn files_that_are_no_case_are_refused() {
    let bench = Bench::with("empty.toml", "");
    std::fs::write(bench.path("bytes.toml"), [0xff, 0xfe, 0x00]).unwrap();
    bench.write("circle.toml", "like = \"circle.toml\"\n");
    bench.write("lost.toml", "like = \"nowhere.toml\"\n");
    let cases = [
        ("empty.toml", "empty.toml:1:1: a case file lacks 'wall'"),
        ("bytes.toml", "it is not UTF-8 text"),
        ("circle.toml", "circle.toml:1:8: case files start from one another in a circle"),
        ("lost.toml", "lost.toml:1:8: cannot read nowhere.toml"),
        ("nothere.toml", "there is no such file"),
        (".", "it is a folder"),
    ];
    let before = bench.entries();
    for (name, says) in cases {
        let ran = bench.run(&["run", name]);
        assert_eq!(ran.status, Some(2), "{name}");
        assert!(ran.errors.contains(says), "{name}: {}", ran.errors);
    }
    assert_eq!(bench.entries(), before);
}

#![allow(
    clippy::unwrap_used,
    clippy::expect_used,
    clippy::float_cmp,
    clippy::panic,
    reason = "tests may stop at the first fault"
)]

use proptest::prelude::*;

use super::*;

fn unknown(word: &str, nearest: &'static str) -> CaseFault {
    CaseFault::UnknownWord {
        word: word.to_owned(),
        table: "[[wall.layer]]".to_owned(),
        nearest: Some(nearest),
        elsewhere: None,
        legal: vec![nearest],
    }
}

fn place_of(source: usize, text: &str, words: &str) -> Place {
    let start = text.find(words).unwrap();
    Place::new(source, start..start + words.len())
}

#[test]
fn a_fault_points_at_its_words_and_names_the_mend() {
    let text = "[wall]\n[[wall.layer]]\nthicknes = \"1.5 mm\"\n";
    let mut sources = Sources::default();
    let file = sources.add("sleeve.toml", text, SourceKind::File);
    let fault = Diagnostic::at(place_of(file, text, "thicknes"), unknown("thicknes", "thickness"));
    let shown = Diagnostics::new(sources, vec![fault]).to_string();
    let expected = "sleeve.toml:3:1: 'thicknes' is no word of [[wall.layer]]\n    \
                    3 | thicknes = \"1.5 mm\"\n      \
                    | ^^^^^^^^\n  \
                    did you mean 'thickness'?\n";
    assert_eq!(shown, expected);
}

#[test]
fn a_fault_of_an_option_shows_the_option() {
    let text = "wall.sleeve.thicknes=2 mm";
    let mut sources = Sources::default();
    let option = sources.add("--set", text, SourceKind::Option);
    let fault = Diagnostic::at(place_of(option, text, "thicknes"), unknown("thicknes", "thickness"));
    let shown = Diagnostics::new(sources, vec![fault]).to_string();
    let expected = "--set: 'thicknes' is no word of [[wall.layer]]\n      \
                    | wall.sleeve.thicknes=2 mm\n      \
                    |             ^^^^^^^^\n  \
                    did you mean 'thickness'?\n";
    assert_eq!(shown, expected);
}

#[test]
fn columns_count_characters_and_the_caret_stays_below_its_word() {
    let text = "\u{feff}\tname = \"Hülse\"; x = 1";
    let mut sources = Sources::default();
    let file = sources.add("a.toml", text, SourceKind::File);
    let place = place_of(file, text, "x =");
    assert_eq!(sources.position(&place), Some(Position { line: 1, column: 18 }));
    let shown = Diagnostics::new(sources, vec![Diagnostic::at(place, unknown("x", "y"))]).to_string();
    let lines: Vec<&str> = shown.lines().collect();
    assert_eq!(lines[1].chars().nth(8 + 17), Some('x'), "{shown}");
    assert_eq!(lines[2].chars().nth(8 + 17), Some('^'), "{shown}");
}

#[test]
fn faults_are_sorted_counted_and_said_once() {
    let text = "a = 1\nb = 2\n";
    let mut sources = Sources::default();
    let file = sources.add("a.toml", text, SourceKind::File);
    let at = |words: &str, near| Diagnostic::at(place_of(file, text, words), unknown(words, near));
    let all = Diagnostics::new(sources, vec![at("b", "x"), at("a", "y"), at("b", "x")]);
    assert_eq!(all.faults().len(), 2);
    let shown = all.to_string();
    assert!(shown.find("a.toml:1:1").unwrap() < shown.find("a.toml:2:1").unwrap());
    assert!(shown.ends_with("\n2 faults\n"), "{shown}");
}

#[test]
fn long_lines_are_cut_round_the_fault() {
    let text = format!("x = \"{}\" bad {}", "y".repeat(400), "z".repeat(400));
    let mut sources = Sources::default();
    let file = sources.add("a.toml", &text, SourceKind::File);
    let place = place_of(file, &text, "bad");
    let shown = Diagnostics::new(sources, vec![Diagnostic::at(place, unknown("bad", "y"))]).to_string();
    let lines: Vec<&str> = shown.lines().collect();
    assert!(lines[1].len() < 130, "{shown}");
    let caret = lines[2].find("^^^").unwrap();
    assert_eq!(&lines[1][caret..caret + 3], "bad");
}

#[test]
fn nearest_finds_slips_and_leaves_strangers() {
    let words = ["thickness", "temperature", "material", "to", "from"];
    for (word, found) in [
        ("thicknes", Some("thickness")),
        ("tickness", Some("thickness")),
        ("thikcness", Some("thickness")),
        ("THICKNESS", Some("thickness")),
        ("temp", Some("temperature")),
        ("temperatur", Some("temperature")),
        ("materail", Some("material")),
        ("form", Some("from")),
        ("colour", None),
        ("x", None),
    ] {
        assert_eq!(nearest(word, words), found, "{word}");
    }
}

proptest! {
    #[test]
    fn no_place_panics(text in "\\PC{0,60}", start in 0usize..80, length in 0usize..80) {
        let mut sources = Sources::default();
        let file = sources.add("a.toml", &text, SourceKind::File);
        let place = Place::new(file, start..start.saturating_add(length));
        let _ = sources.written(&place);
        let _ = Diagnostics::new(sources, vec![Diagnostic::at(place, unknown("a", "b"))]).to_string();
    }
}

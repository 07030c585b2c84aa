//! The resolved case says where every value comes from; its digest depends on values alone.

use super::*;

#[test]
fn every_word_has_its_origin() {
    let text =
        with("conductivity = \"50 MS/m\"\ntemperature_coefficient = \"0.004 /K\"", "material = \"copper Cu-DHP\"");
    let case = good(&text, &["mover.mass=500 g"]);
    let origin = |path: &str| case.resolved.get(path).unwrap_or_else(|| panic!("{path}")).origin.clone();
    assert_eq!(origin("wall.length"), Origin::Given { place: "t.toml:3:10".to_owned(), text: "600 mm".to_owned() });
    assert_eq!(origin("mover.mass"), Origin::Override { text: "mover.mass=500 g".to_owned() });
    assert!(
        matches!(origin("wall.sleeve.conductivity"), Origin::Book { grade, source } if grade == "copper Cu-DHP" && source.contains("common practice"))
    );
    assert!(matches!(origin("travel.gravity"), Origin::Default { .. }));
    assert!(matches!(origin("travel.until"), Origin::Default { why } if why.contains("2 bore diameters")));
    assert!(matches!(origin("wall.sleeve.inner_diameter"), Origin::Follows { .. }));
    assert!(matches!(origin("accuracy.target"), Origin::Default { .. }));
}

#[test]
fn the_tree_is_nested_by_table_and_name() {
    let json = good(CASE, &[]).resolved.to_json();
    let word = &json["wall"]["sleeve"]["thickness"];
    assert_eq!(word["value"], 0.0015);
    assert_eq!(word["unit"], "m");
    assert_eq!(word["origin"]["place"], "t.toml:9:13");
    assert_eq!(json["mover"]["M"]["remanence"]["value"], 1.3);
    assert_eq!(json["title"]["value"], "Test sleeve");
}

#[test]
fn the_digest_follows_values_and_not_spelling() {
    let digest = |text: &str| good(text, &[]).digest;
    let one = digest(CASE);
    assert_eq!(one.len(), 64);
    assert_eq!(one, digest(&format!("# a comment\n{}", with("\"12 mm\"", "0.012"))));
    assert_eq!(one, digest(&with("\"12 mm\"", "\"12000 um\"")));
    assert_ne!(one, digest(&with("\"12 mm\"", "\"12.1 mm\"")));
    assert_ne!(one, digest(&with("", "[record]\nrevision = \"B\"\n")));
    assert_ne!(one, digest(&with("Test sleeve", "Another")));
    // A default written out is the same case.
    assert_eq!(one, digest(&with("", "gravity = \"9.80665 m/s2\"\n")));
}

#[test]
fn the_record_is_passed_on() {
    let case = good(&with("", "[record]\ndocument = \"D-7\"\nrevision = \"B\"\n"), &[]);
    assert_eq!(case.record["document"], "D-7");
    assert_eq!(case.record.len(), 2);
}

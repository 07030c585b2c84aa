//! Geometry that cannot be points at the words that caused it.

use super::{bad, good, with};

fn shown(old: &str, new: &str) -> String {
    bad(&with(old, new), &[]).to_string()
}

#[test]
fn a_mover_that_touches_the_wall_points_at_its_diameter() {
    let text = shown("\"22 mm\"", "\"25 mm\"");
    assert!(text.starts_with("t.toml:16:18: part 'M' (diameters 0 mm to 25 mm) has no running clearance from layer 'sleeve' (diameters 25 mm to 28 mm)"), "{text}");
    assert!(text.contains("less than 25 mm across, or around it, wider than 28 mm inside"), "{text}");
    assert!(text.contains("the layer: t.toml:9:13"), "{text}");
}

#[test]
fn layers_that_overlap_point_at_both() {
    let layer = "[[wall.layer]]\nname = \"shell\"\nconductivity = \"20 MS/m\"\ninner_diameter = \"27 mm\"\nouter_diameter = \"30 mm\"\n[mover]\n";
    let text = shown("[mover]\n", layer);
    assert!(
        text.starts_with(
            "t.toml:13:18: layers 'sleeve' and 'shell' overlap: both fill diameters 27 mm to 28 mm, from 0 mm to 600 mm"
        ),
        "{text}"
    );
    assert!(text.contains("the other layer: t.toml:9:13"), "{text}");
    good(&with("[mover]\n", &layer.replace("27 mm", "28 mm")), &[]);
}

#[test]
fn sections_beyond_the_wall_point_at_their_end() {
    let text = shown("name = \"sleeve\"", "name = \"sleeve\"\nto = \"700 mm\"");
    assert!(
        text.starts_with("t.toml:6:6: layer 'sleeve' reaches from 0 mm to 700 mm, beyond the wall's 0 to 600 mm"),
        "{text}"
    );
    let text = shown("name = \"sleeve\"", "name = \"sleeve\"\nfrom = \"300 mm\"\nto = \"200 mm\"");
    assert!(text.starts_with("t.toml:7:6: layer 'sleeve' has no length"), "{text}");
}

#[test]
fn parts_that_overlap_point_at_their_positions() {
    let second = "[[mover.magnet]]\nname = \"N\"\nremanence = \"1 T\"\nrecoil_permeability = 1\nouter_diameter = \"22 mm\"\nlength = \"12 mm\"\nat = \"10 mm\"\n[travel]\n";
    let text = bad(&with("[travel]\n", second).replace("name = \"M\"", "name = \"M\"\nat = \"0 mm\""), &[]).to_string();
    assert!(
        text.starts_with("t.toml:25:6: parts 'M' and 'N' overlap along 2 mm of the axis, from 4 mm to 6 mm"),
        "{text}"
    );
    assert!(text.contains("the other part: t.toml:14:6"), "{text}");
}

#[test]
fn laws_that_do_not_fit_the_wall_point_at_the_law() {
    let text = shown("law = \"free\"\nrelease = \"640 mm\"", "law = \"steady\"\nspeed = \"2 m/s\"");
    assert!(
        text.starts_with("t.toml:19:7: law 'steady' has settled fields, and a wall 600 mm long has none"),
        "{text}"
    );
    assert!(text.contains("law = \"traverse\"") && text.contains("the wall's length: t.toml:3:10"), "{text}");
    let text = shown("\"600 mm\"", "\"endless\"");
    assert!(text.starts_with("t.toml:19:7: law 'free' travels from one end"), "{text}");
    let endless = with("\"600 mm\"", "\"endless\"")
        .replace("law = \"free\"\nrelease = \"640 mm\"", "law = \"traverse\"\nspeed = 1");
    assert!(bad(&endless, &[]).to_string().contains("law 'traverse' travels from one end"));
}

#[test]
fn travel_that_goes_nowhere_is_said() {
    let text = shown("release = \"640 mm\"", "release = \"640 mm\"\nuntil = \"640 mm\"");
    assert!(text.starts_with("t.toml:21:9: the travel ends where it starts, at 640 mm"), "{text}");
}

#[test]
fn nothing_to_solve_is_said() {
    let text = shown("\"50 MS/m\"", "0");
    assert!(text.starts_with("t.toml:2:2: the wall neither conducts nor is it permeable"), "{text}");
    let text = shown("\"1.3 T\"", "\"0 T\"");
    assert!(text.starts_with("t.toml:10:2: the mover has no field"), "{text}");
}

#[test]
fn faults_of_geometry_and_of_words_come_together_and_none_is_made_up() {
    // The layer cannot be read: that the wall has no layer is not a fault of its own, and the magnet is still judged.
    let text = bad(&with("\"50 MS/m\"", "\"50 MS\"").replace("\"1.3 T\"", "\"0 T\""), &[]).to_string();
    assert!(
        text.contains("does not measure a conductivity") && text.contains("no field") && text.contains("2 faults"),
        "{text}"
    );
}

#[test]
fn sections_cannot_be_taken_as_endless() {
    let text = bad(
        &format!("{}[curve]\nspeeds = [1, 2]\n", with("name = \"sleeve\"", "name = \"sleeve\"\nfrom = \"100 mm\"")),
        &[],
    )
    .to_string();
    assert!(text.starts_with("t.toml:22:2: [curve] with a wall that changes along its length"), "{text}");
}

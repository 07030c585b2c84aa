//! `--set`, and which size stays when one is set.

use super::{CASE, good, with};

fn sizes(text: &str, sets: &[&str]) -> [f64; 3] {
    let case = good(text, sets);
    ["inner_diameter", "outer_diameter", "thickness"].map(|w| {
        let millimetres = 1e3 * case.resolved.number(&format!("wall.sleeve.{w}")).unwrap();
        (millimetres * 1e9).round() / 1e9
    })
}

#[test]
fn any_word_can_be_set() {
    for (set, path, value) in [
        ("wall.sleeve.thickness=2.1 mm", "wall.sleeve.thickness", 0.0021),
        ("wall.sleeve.thickness = \"2.1 mm\"", "wall.sleeve.thickness", 0.0021),
        ("wall.layer.sleeve.thickness=0.0021", "wall.sleeve.thickness", 0.0021),
        ("wall.\"sleeve\".thickness=2.1mm", "wall.sleeve.thickness", 0.0021),
        ("mover.M.remanence=1.1 T", "mover.M.remanence", 1.1),
        ("mover.mass=500 g", "mover.mass", 0.5),
        ("travel.release=700 mm", "travel.release", 0.7),
        ("travel.push=-2", "travel.push", -2.0),
        ("accuracy.levels=4", "accuracy.levels", 4.0),
        ("wall.temperature=70 degC", "wall.temperature", 343.15),
    ] {
        assert_eq!(good(CASE, &[set]).resolved.number(path), Some(value), "{set}");
    }
    assert_eq!(good(CASE, &["title=Another = title"]).title, "Another = title");
    assert_eq!(good(CASE, &["title=42"]).title, "42");
}

#[test]
fn lists_may_lose_their_quotes_to_the_shell() {
    for set in ["travel.gates=[\"500 mm\", \"100 mm\"]", "travel.gates=[500 mm, 100 mm]", "travel.gates=[0.5,0.1]"] {
        let case = good(CASE, &[set]);
        let lenzbore_solver::problem::Travel::Free(free) = case.problem.travel else { panic!() };
        assert_eq!(free.gates_m, [0.5, 0.1], "{set}");
    }
    assert_eq!(good(CASE, &["mover.stack=[M+,M-]"]).problem.mover.parts.len(), 2);
}

#[test]
fn the_later_of_two_overrides_stands() {
    assert_eq!(good(CASE, &["mover.mass=1 kg", "mover.mass=2 kg"]).problem.mover.mass_kg, Some(2.0));
}

#[test]
fn the_two_given_sizes_stay_when_one_of_them_is_set() {
    let text = with("outer_diameter = \"28 mm\"\nthickness = \"1.5 mm\"", "size = \"28 x 1.5 mm\"");
    assert_eq!(sizes(&text, &["wall.sleeve.thickness=2 mm"]), [24.0, 28.0, 2.0]);
    assert_eq!(sizes(CASE, &["wall.sleeve.thickness=2 mm"]), [24.0, 28.0, 2.0]);
    assert_eq!(sizes(CASE, &["wall.sleeve.outer_diameter=30 mm"]), [27.0, 30.0, 1.5]);
    let bore = with("thickness = \"1.5 mm\"", "inner_diameter = \"25 mm\"");
    assert_eq!(sizes(&bore, &["wall.sleeve.inner_diameter=24 mm"]), [24.0, 28.0, 2.0]);
    assert!(good(CASE, &["wall.sleeve.thickness=2 mm"]).cautions.is_empty());
}

#[test]
fn setting_the_third_size_keeps_the_bore_else_the_gauge_and_says_so() {
    let bore_and_outer = with("thickness = \"1.5 mm\"", "inner_diameter = \"25 mm\"");
    assert_eq!(sizes(&bore_and_outer, &["wall.sleeve.thickness=2 mm"]), [25.0, 29.0, 2.0]);
    let bore_and_gauge = with("outer_diameter = \"28 mm\"", "inner_diameter = \"25 mm\"");
    assert_eq!(sizes(&bore_and_gauge, &["wall.sleeve.outer_diameter=29 mm"]), [25.0, 29.0, 2.0]);
    assert_eq!(sizes(CASE, &["wall.sleeve.inner_diameter=24 mm"]), [24.0, 27.0, 1.5]);
    let cautions = good(&bore_and_outer, &["wall.sleeve.thickness=2 mm"]).cautions;
    assert!(cautions[0].contains("the inner diameter stays and the outer diameter follows"), "{cautions:?}");
}

#[test]
fn two_sizes_or_a_trade_size_replace_all() {
    assert_eq!(sizes(CASE, &["wall.sleeve.inner_diameter=26 mm", "wall.sleeve.thickness=2 mm"]), [26.0, 30.0, 2.0]);
    assert_eq!(sizes(CASE, &["wall.sleeve.size=30 x 2 mm"]), [26.0, 30.0, 2.0]);
}

#[test]
fn another_law_pushes_out_the_words_of_the_old_one() {
    let case = good(CASE, &["travel.law=traverse", "travel.speed=2 m/s"]);
    assert!(matches!(case.problem.travel, lenzbore_solver::problem::Travel::Traverse(_)));
    assert!(
        case.cautions
            .iter()
            .any(|c| c.contains("law 'traverse' replaces 'free', whose words 'release' no longer apply")),
        "{:?}",
        case.cautions
    );
}

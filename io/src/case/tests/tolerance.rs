//! `[tolerance]`: what is read, what is refused, and which size follows.

use super::{CASE, bad, good, with};

fn halves(line: &str) -> (f64, f64, f64) {
    let case = good(&with("", &format!("[tolerance]\n{line}\n")), &[]);
    let [tolerance] = case.tolerances.as_slice() else { panic!("{:?}", case.tolerances) };
    (tolerance.value, tolerance.minus, tolerance.plus)
}

#[test]
fn shares_half_widths_and_lists_are_read() {
    assert_eq!(halves("\"wall.sleeve.thickness\" = \"10 %\""), (1.5e-3, 0.1 * 1.5e-3, 0.1 * 1.5e-3));
    assert_eq!(halves("\"wall.sleeve.thickness\" = \"+/- 0.1 mm\"").1, 1e-4);
    assert_eq!(halves("\"wall.sleeve.thickness\" = [\"0.05 mm\", \"0.2 mm\"]"), (1.5e-3, 5e-5, 2e-4));
    assert_eq!(halves("\"wall.sleeve.thickness\" = [\"-0.05 mm\", \"+0.2 mm\"]"), (1.5e-3, 5e-5, 2e-4));
    assert_eq!(halves("wall.sleeve.thickness = 1e-4").1, 1e-4);
    assert_eq!(halves("wall.layer.sleeve.thickness = 1e-4").1, 1e-4);
    assert_eq!(halves("\"mover.M.remanence\" = \"2 %\""), (1.3, 0.02 * 1.3, 0.02 * 1.3));
    // A default and a value that follows can be off too; a friction only one way.
    assert_eq!(halves("\"travel.gravity\" = \"0.01 m/s2\"").0, 9.80665);
    assert_eq!(halves("\"travel.friction\" = [\"0 N\", \"0.2 N\"]"), (0.0, 0.0, 0.2));
    let (inner, minus, _) = halves("\"wall.sleeve.inner_diameter\" = \"0.2 mm\"");
    assert!((inner - 0.025).abs() < 1e-15 && minus == 2e-4);
}

#[test]
fn temperatures_have_differences() {
    assert_eq!(halves("\"wall.temperature\" = \"5 degC\"").1, 5.0);
    assert_eq!(halves("\"wall.temperature\" = \"5 K\"").2, 5.0);
    assert_eq!(halves("\"wall.temperature\" = \"9 degF\"").1, 5.0);
}

#[test]
fn the_command_line_sets_and_replaces() {
    let case = good(
        &with("", "[tolerance]\nwall.sleeve.thickness = \"10 %\"\n"),
        &["tolerance.wall.sleeve.thickness=0.1 mm", "tolerance.mover.M.remanence=2 %"],
    );
    let found: Vec<(&str, f64)> = case.tolerances.iter().map(|t| (t.path.as_str(), t.minus)).collect();
    assert_eq!(found, [("wall.sleeve.thickness", 1e-4), ("mover.M.remanence", 0.02 * 1.3)]);
    assert_ne!(case.digest, good(CASE, &[]).digest, "a tolerance is an input");
}

#[test]
fn faults_point_at_the_word_or_the_value() {
    for (line, place, words) in [
        ("\"wall.sleeve.thick\" = \"10 %\"", "22:1", "did you mean 'thickness'?"),
        ("\"wall.tube.thickness\" = \"10 %\"", "22:1", "no part of [wall] is named 'tube'"),
        ("\"wall.sleeve.thickness\" = \"10 mT\"", "22:27", "'mT' does not measure a length"),
        ("\"wall.sleeve.thickness\" = \"0.1\"", "22:27", "has no unit"),
        ("\"wall.sleeve.thickness\" = \"0 mm\"", "22:27", "greater than 0"),
        ("\"wall.sleeve.thickness\" = \"-5 %\"", "22:27", "greater than 0"),
        ("\"wall.sleeve.thickness\" = [\"1 %\"]", "22:27", "how far below and how far above"),
        ("\"wall.sleeve.thickness\" = true", "22:27", "10 %"),
        ("\"wall.temperature\" = \"10 %\"", "22:22", "a difference, as \"5 K\""),
        ("\"wall.sleeve.from\" = \"10 %\"", "22:22", "a share of 0 is nothing"),
        ("\"wall.sleeve.conductivity\" = \"1 nohm m\"", "22:30", "MS/m"),
        ("\"wall.sleeve.conductivity_in_use\" = \"1 %\"", "22:1", "is no word of"),
        ("\"travel.law\" = \"1 %\"", "22:1", "it is a text"),
        ("\"travel.gates\" = \"1 mm\"", "22:1", "it is a list"),
        ("\"travel.speed\" = \"1 %\"", "22:1", "gives it no value"),
        ("\"accuracy.target\" = \"1 %\"", "22:1", "how to compute"),
        ("\"title\" = \"1 %\"", "22:1", "it is a text"),
    ] {
        let shown = bad(&with("", &format!("[tolerance]\n{line}\n")), &[]).to_string();
        assert!(shown.contains(&format!("t.toml:{place}:")), "{line}\n{shown}");
        assert!(shown.contains(words), "{line}\n{shown}");
    }
}

#[test]
fn three_sizes_of_a_layer_cannot_all_be_free() {
    let three = "[tolerance]\nwall.sleeve.thickness = \"1 %\"\nwall.sleeve.inner_diameter = \"1 %\"\n\
                 wall.sleeve.outer_diameter = \"1 %\"\n";
    let shown = bad(&with("", three), &[]).to_string();
    assert!(shown.contains("any two sizes give the third"), "{shown}");
}

/// The rule of the sizes holds for a varied one as for `--set`, and the table can say it.
#[test]
fn companions_say_which_size_stays() {
    for (given, word, stays, follows) in [
        ("outer_diameter = \"28 mm\"\nthickness = \"1.5 mm\"", "thickness", "outer_diameter", "inner_diameter"),
        ("inner_diameter = \"25 mm\"\nthickness = \"1.5 mm\"", "thickness", "inner_diameter", "outer_diameter"),
        ("size = \"28 x 1.5 mm\"", "thickness", "outer_diameter", "inner_diameter"),
        ("size = \"28 x 1.5 mm\"", "inner_diameter", "thickness", "outer_diameter"),
        ("inner_diameter = \"25 mm\"\nouter_diameter = \"28 mm\"", "thickness", "inner_diameter", "outer_diameter"),
    ] {
        let text = with("outer_diameter = \"28 mm\"\nthickness = \"1.5 mm\"", given);
        let text = format!("{text}[tolerance]\nwall.sleeve.{word} = \"1 %\"\n");
        let nominal = good(&text, &[]);
        let tolerance = &nominal.tolerances[0];
        let varied = good(&text, &[&tolerance.setting(tolerance.plus)]);
        let (stay, follow) = tolerance.companions(&nominal.resolved, &varied.resolved);
        assert_eq!(
            (stay.as_slice(), follow.as_slice()),
            (&[stays.to_owned()][..], &[follows.to_owned()][..]),
            "{given}"
        );
        // Setting the nominal value changes nothing.
        let same = good(&text, &[&tolerance.setting(0.0)]);
        for layer in [&nominal, &same].map(|c| c.problem.wall.layers[0].clone()) {
            assert!((layer.inner_radius_m - 0.0125).abs() < 1e-12 && (layer.outer_radius_m - 0.014).abs() < 1e-12);
        }
    }
}

//! Coils at rest with alternating current.

use lenzbore_solver::problem::Travel;

use super::*;

const COILS: &str = r#"title = "Probe"
[wall]
length = "120 mm"
[[wall.layer]]
name = "tube"
conductivity = "15.5 MS/m"
inner_diameter = "20 mm"
thickness = "2 mm"
[[mover.coil]]
name = "A"
inner_diameter = "13 mm"
outer_diameter = "18 mm"
length = "8 mm"
turns = 120
current = "50 mA"
at = "-5 mm"
[[mover.coil]]
name = "B"
inner_diameter = "13 mm"
outer_diameter = "18 mm"
length = "8 mm"
turns = 60
current = "-50 mA"
at = "5 mm"
[travel]
law = "alternating"
frequency = "2 kHz"
"#;

fn law(text: &str) -> lenzbore_solver::problem::Alternating {
    let Travel::Alternating(law) = good(text, &[]).problem.travel else { panic!("another law") };
    law
}

#[test]
fn coils_are_in_series_in_the_middle_of_the_wall() {
    let law = law(COILS);
    assert_eq!((law.frequencies_hz.as_slice(), law.current_ampere), ([2e3].as_slice(), 0.05));
    assert_eq!((law.position_m, law.winding_resistance_ohm), (0.06, 0.0));
}

#[test]
fn a_sweep_is_spread_over_the_logarithm() {
    let swept = law(&COILS.replace(
        "frequency = \"2 kHz\"",
        "frequencies = [\"10 Hz\", \"100 kHz\"]\npoints = 5\nposition = \"20 mm\"\nwinding_resistance = \"1.4 ohm\"",
    ));
    for (found, wanted) in swept.frequencies_hz.iter().zip([10.0, 1e2, 1e3, 1e4, 1e5]) {
        approx::assert_relative_eq!(*found, wanted, max_relative = 1e-12);
    }
    assert_eq!((swept.position_m, swept.winding_resistance_ohm), (0.02, 1.4));
    assert_eq!(
        law(&COILS.replace("frequency = \"2 kHz\"", "frequencies = [1, 5, 40]")).frequencies_hz,
        [1.0, 5.0, 40.0]
    );
}

#[test]
fn what_does_not_fit_points_at_its_word() {
    for (old, new, wanted) in [
        ("frequency = \"2 kHz\"", "", "t.toml:25:2: [travel] lacks 'frequency'"),
        ("frequency = \"2 kHz\"", "frequency = \"2 m\"", "frequency = \"2 m\""),
        ("frequency = \"2 kHz\"", "frequency = 2\npoints = 7", "'points' without 'frequencies'"),
        ("frequency = \"2 kHz\"", "frequencies = [5, 5]", "frequencies increase, and there are at least two"),
        ("frequency = \"2 kHz\"", "frequency = 5\nspeed = 2", "'speed' in a travel of law 'alternating'"),
        ("current = \"-50 mA\"", "current = \"-60 mA\"", "are in series: 0.06 A and 0.05 A are two currents"),
        ("length = \"120 mm\"", "length = \"endless\"", ""),
    ] {
        let text = COILS.replace(old, new);
        if wanted.is_empty() {
            good(&text, &[]);
            let shown = bad(&text, &["travel.position=\"3 mm\""]).to_string();
            assert!(shown.contains("'position' in an endless wall"), "{shown}");
        } else {
            let shown = bad(&text, &[]).to_string();
            assert!(shown.contains(wanted), "{wanted}\nis not in\n{shown}");
        }
    }
    let dipole =
        COILS.replace("[travel]", "[[mover.dipole]]\nname = \"D\"\nmoment = \"1 A m2\"\nat = \"40 mm\"\n[travel]");
    let shown = bad(&dipole, &[]).to_string();
    assert!(shown.contains("law 'alternating' drives coils, and part 'D' is none"), "{shown}");
}

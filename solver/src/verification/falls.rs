//! What the trade knows of falls through a tube (common practice, no source).

use super::cases::{answer, fall, finite, layer, magnet, problem, value};
use crate::outcome::Outcome;
use crate::problem::{Free, Travel};

fn through(conductivity_ms: f64, change: impl Fn(&mut Free)) -> Outcome {
    let mut law = fall(60.0, -20.0, 50.0);
    change(&mut law);
    let wall = finite(0.05, vec![layer(8.0, 10.0, conductivity_ms, 1.0)]);
    answer(&problem(wall, vec![magnet(0.0, 5.0, 6.0, 1.2, 0.0)], Travel::Free(law), 3))
}

#[test]
fn lower_resistivity_friction_and_air_add_to_the_time() {
    let base = through(25.0, |_| ());
    let time = |o: &Outcome| value(o, "transit_time");
    println!("base {} s", time(&base));
    for (what, slower) in [
        ("lower resistivity", through(50.0, |_| ())),
        ("friction", through(25.0, |l| l.friction_newton = 0.02)),
        ("air", through(25.0, |l| l.air_drag_n_s2_per_m2 = 0.05)),
    ] {
        println!("{what}: {} s", time(&slower));
        let margin =
            super::cases::figure(&base, "transit_time").band + super::cases::figure(&slower, "transit_time").band;
        assert!(time(&slower) > time(&base) + margin, "{what}");
    }
}

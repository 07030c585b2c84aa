//! Closed forms of coaxial loops, on which the ring circuit rests.

use std::f64::consts::PI;

use lenzbore_solver::constants::MU0;
use lenzbore_solver::monitor::Monitor;

use super::{Check, Kind, Verdict};
use crate::references::{coil_inductance, half_decimal, half_figure, loops, nagaoka};
use crate::rings::self_inductance;
use crate::{Error, elliptic};

pub(super) const CHECKS: &[Check] = &[
    Check {
        name: "loops",
        about: "mutual inductance of coaxial loops and its gradient",
        kind: Kind::CodeVerification,
        source: &loops::SOURCE,
        run: pairs,
    },
    Check {
        name: "self-inductance",
        about: "self-inductance of ever thinner rings against that of a current sheet",
        kind: Kind::CodeVerification,
        source: &nagaoka::SOURCE,
        run: thin_rings,
    },
    Check {
        name: "coil-inductance",
        about: "self-inductance of a coil of rectangular section, as one turn of it times the turns squared",
        kind: Kind::CodeVerification,
        source: &coil_inductance::SOURCE,
        run: coil,
    },
];

fn coil(_: &dyn Monitor) -> Result<Verdict, Error> {
    let turns = coil_inductance::TURNS;
    let found = 1e6 * turns * turns * self_inductance(coil_inductance::RADII_M, coil_inductance::LENGTH_M);
    let expected = coil_inductance::INDUCTANCE_UH;
    let mut verdict = Verdict::default();
    verdict.compare("self-inductance", found, expected, 1e-8 * expected, "uH");
    Ok(verdict)
}

/// The thickness of the ring comes in at first order: taken out over two thicknesses.
fn thin_rings(_: &dyn Monitor) -> Result<Verdict, Error> {
    let mut verdict = Verdict::default();
    for (ratio, coefficient) in nagaoka::TABLE {
        let length = 2.0 / ratio;
        let of = |thickness: f64| self_inductance((1.0 - 0.5 * thickness, 1.0 + 0.5 * thickness), length);
        let thin = 1e-4 * length.min(1.0);
        let found = (2.0 * of(thin) - of(2.0 * thin)) * length / (MU0 * PI);
        verdict.compare(format!("K at diameter/length {ratio}"), found, coefficient, 1e-7, "1");
    }
    Ok(verdict)
}

fn pairs(_: &dyn Monitor) -> Result<Verdict, Error> {
    let mut verdict = Verdict::default();
    for pair in loops::TABLE {
        let what = format!("loops {} and {} m, {} m apart", pair.a_m, pair.b_m, pair.height_m);
        let mutual = 1e9 * elliptic::mutual_inductance(pair.a_m, pair.b_m, pair.height_m);
        verdict.compare(format!("M, {what}"), mutual, pair.mutual_nh, half_decimal(8), "nH");
        let gradient = elliptic::mutual_inductance_gradient(pair.a_m, pair.b_m, pair.height_m);
        let allowed = half_figure(pair.gradient_h_per_m, 9);
        verdict.compare(format!("dM/dh, {what}"), gradient, pair.gradient_h_per_m, allowed, "H/m");
    }
    Ok(verdict)
}

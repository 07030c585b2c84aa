//! Closed forms of coaxial loops, on which the ring circuit rests.

use super::{Check, Kind, Verdict};
use crate::references::{half_decimal, half_figure, loops};
use crate::{Error, elliptic};

pub(super) const CHECKS: &[Check] = &[Check {
    name: "loops",
    about: "mutual inductance of coaxial loops and its gradient",
    kind: Kind::CodeVerification,
    source: &loops::SOURCE,
    run: pairs,
}];

fn pairs() -> Result<Verdict, Error> {
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

//! Slotted walls at low speed: the model's share and band against the strip solved in space.

use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::problem::Travel;
use lenzbore_solver::slots::slot_shares;

use super::{Banded, Check, Limits, Verdict};
use crate::Error;
use crate::cases;
use crate::references::slots::{KNOWN_WITHIN, SHARES, SOURCE};

pub(super) const CHECKS: &[Check] = &[Check::code_verification(
    "slots",
    "share of the low-speed drag that full-length slots leave, thin and thick walls, against the strip solved in space",
    &SOURCE,
    run,
)];

/// Mean radius, m; the share depends on no size.
const RADIUS_M: f64 = 12.0e-3;
/// Thickness over mean radius of a wall that counts as thin: its own effect is below 1e-6.
const THIN: f64 = 1.0e-3;
/// What the share of a thick wall may be off by: its bounds lie so far apart at most.
const THICK: f64 = 0.02;

fn run(_: &dyn Monitor) -> Result<Verdict, Error> {
    Ok(against(&SHARES))
}

fn against(table: &[(u32, f64, f64)]) -> Verdict {
    let mut verdict = Verdict::default();
    for &(slots, thickness, expected) in table {
        let half = 0.5 * RADIUS_M * if thickness > 0.0 { thickness } else { THIN };
        let wall = cases::endless_tube((RADIUS_M - half, RADIUS_M + half), 35.0e6, 1.0);
        let problem = cases::question(wall, cases::dipole(1.0), Travel::Steady { velocity_m_per_s: 1.0 });
        let count = usize::try_from(slots).unwrap_or(0);
        for share in slot_shares(&problem, count, &[0.0]) {
            let what = format!("{slots} slots, thickness / mean radius {thickness}");
            let allowed = if thickness > 0.0 { THICK } else { KNOWN_WITHIN };
            let found = Banded { value: share.value, band: share.band };
            verdict.compare_banded(what, found, expected, Limits { known_within: KNOWN_WITHIN, allowed }, "1");
        }
    }
    verdict
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn planted_errors_are_seen() {
        assert!(against(&SHARES).passed(), "{}", against(&SHARES));
        let mut table = SHARES;
        table.iter_mut().for_each(|row| row.2 *= 1.05);
        let seen = against(&table);
        // The thickest wall's band holds more than that with eight slots.
        assert_eq!(seen.comparisons.iter().filter(|c| !c.passes()).count(), 9, "{seen}");
    }
}

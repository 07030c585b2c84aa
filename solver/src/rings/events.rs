//! When the mover passes a gate within a step.

/// Position, velocity and acceleration at one instant.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Instant {
    pub z: f64,
    pub v: f64,
    pub a: f64,
}

/// Fraction of the step at which z = gate, and the velocity there, if the step crosses it.
///
/// The path is the polynomial of degree five through position, velocity and acceleration at both ends.
pub(super) fn crossing(start: Instant, end: Instant, dt: f64, gate: f64) -> Option<(f64, f64)> {
    let before = start.z - gate;
    let after = end.z - gate;
    if before * after > 0.0 || before.abs() <= 0.0 {
        return None;
    }
    let (mut low, mut high) = (0.0, 1.0);
    for _ in 0..60 {
        let middle = 0.5 * (low + high);
        if (path(start, end, dt, middle).0 - gate) * before > 0.0 {
            low = middle;
        } else {
            high = middle;
        }
    }
    let s = 0.5 * (low + high);
    Some((s, path(start, end, dt, s).1))
}

/// Position and velocity at fraction `s` of the step.
fn path(start: Instant, end: Instant, dt: f64, s: f64) -> (f64, f64) {
    // c0..c2 from the start, c3..c5 from the end.
    let (c0, c1, c2) = (start.z, start.v * dt, 0.5 * start.a * dt * dt);
    let rise = end.z - c0 - c1 - c2;
    let slope = end.v * dt - c1 - 2.0 * c2;
    let bend = end.a * dt * dt - 2.0 * c2;
    let c3 = 10.0 * rise - 4.0 * slope + 0.5 * bend;
    let c4 = -15.0 * rise + 7.0 * slope - bend;
    let c5 = 6.0 * rise - 3.0 * slope + 0.5 * bend;
    let z = c0 + s * (c1 + s * (c2 + s * (c3 + s * (c4 + s * c5))));
    let v = (c1 + s * (2.0 * c2 + s * (3.0 * c3 + s * (4.0 * c4 + s * 5.0 * c5)))) / dt;
    (z, v)
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]
    use super::*;
    use approx::assert_relative_eq;

    #[test]
    fn a_parabola_is_met_exactly() {
        let at = |t: f64| Instant { z: 1.0 - 0.5 * 9.0 * t * t, v: -9.0 * t, a: -9.0 };
        let (s, v) = crossing(at(0.1), at(0.3), 0.2, 0.8).unwrap();
        let t = (0.4_f64 / 9.0).sqrt();
        assert_relative_eq!(0.1 + 0.2 * s, t, max_relative = 1e-13);
        assert_relative_eq!(v, -9.0 * t, max_relative = 1e-12);
        assert!(crossing(at(0.1), at(0.3), 0.2, 0.97).is_none());
    }
}

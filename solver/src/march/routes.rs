//! The three routes to the drag at its peak.

use crate::band::{self, Ladder};
use crate::outcome::Forces;

/// Drag by the three routes at its peak.
pub(super) struct Routes {
    pub(super) wall: Ladder,
    pub(super) mover: Ladder,
    pub(super) stress: Ladder,
}

impl Routes {
    /// The forces with the band within which they must agree: each route's own.
    pub(super) fn forces(&self, time_s: f64) -> Forces {
        let own = |l: &Ladder| band::route(l);
        let band_newton = own(&self.wall) + own(&self.mover).max(own(&self.stress));
        let off = |l: &Ladder| (l.value - self.wall.value).abs();
        Forces {
            wall_newton: self.wall.value,
            mover_newton: self.mover.value,
            stress_newton: self.stress.value,
            band_newton,
            agree: off(&self.mover).max(off(&self.stress)) <= band_newton,
            time_s,
        }
    }

    /// How far the wall and mover routes lie apart, relative.
    pub(super) fn apart(&self) -> f64 {
        if self.wall.value.abs() > 0.0 { (self.mover.value / self.wall.value - 1.0).abs() } else { 0.0 }
    }
}

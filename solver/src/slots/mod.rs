//! Walls with full-length slots, in their axisymmetric effect: what share of the drag is left.
//!
//! `n` narrow slots along the whole wall, evenly round it, cut the azimuthal currents into strips. The field solution has
//! no slots; what is given here is a factor on its drag, an approximation with a model band of its own:
//!
//! - at low speed (resistive limit, no induction) the factor of an endless wall lies between two bounds that hold exactly
//!   ([`thin_strip_share`]): no current along the radius at all, and no resistance along it. A thin wall has both in one:
//!   1 - tanh(x)/x, x = k pi a/n, at each axial wavenumber k;
//! - with induction the mean reaction of the strips' currents is taken in; what varies round the wall is not. Half
//!   of what that changes is added to the band: an estimate, no bound.
//!
//! Limits: endless wall, permeability 1, slots narrow against the strips and without current across them, magnets coaxial.
//!
//! Source of the factor: R. L. Russell and K. H. Norsworthy, Proceedings of the IEE 105A, 163-175 (1958), for sheet rotors (named
//! from memory); derived again in [`thin_strip_share`].

mod ratio;
mod spectrum;
mod strip;

use crate::outcome::{Basis, Caution, DragCurve, Figure, Outcome, SlotShare, SlottedDrag, SlottedPoint};
use crate::problem::{Problem, Travel};
use ratio::SlottedWall;

pub use strip::thin_strip_share;

/// What share of the drag `slots` full-length slots leave in an endless wall at each speed, m/s (0: the low-speed limit).
///
/// The wall's layers are taken as endless. `problem.wall.slots` is not looked at.
#[must_use]
pub fn slot_shares(problem: &Problem, slots: usize, speeds_m_per_s: &[f64]) -> Vec<SlotShare> {
    let wall = SlottedWall::new(problem, slots);
    speeds_m_per_s.iter().map(|&speed| wall.share(speed)).collect()
}

/// Adds what the wall's slots leave of the drag to an outcome without slots.
pub(crate) fn add_to(outcome: &mut Outcome, problem: &Problem) {
    let slots = problem.wall.slots;
    if slots == 0 {
        return;
    }
    let wall = SlottedWall::new(problem, slots);
    let low_speed = wall.share(0.0);
    outcome.figures.push(share_figure("slot_factor_low_speed", low_speed));
    if let (Travel::Steady { velocity_m_per_s }, None) = (&problem.travel, &outcome.curve) {
        steady_figures(outcome, wall.share(velocity_m_per_s.abs()));
    }
    let points = outcome.curve.as_ref().map_or_else(Vec::new, |curve| slotted_points(&wall, curve));
    if outcome.curve.is_some() {
        scaled_figure(outcome, "damping_coefficient_zero_speed", "damping_coefficient_zero_speed_slotted", low_speed);
    }
    outcome.cautions.push(caution(slots, low_speed, outcome));
    outcome.slotted = Some(SlottedDrag { slots, low_speed, points });
}

/// Which figures have the slots in them, and how.
fn caution(slots: usize, low_speed: SlotShare, outcome: &Outcome) -> Caution {
    let settled = outcome.curve.is_some() || outcome.figures.iter().any(|f| f.name == "drag_slotted");
    let (value, band) = (100.0 * low_speed.value, 100.0 * low_speed.band);
    let which = if settled {
        "Figures whose names end in 'slotted' have the slots in them, all others are of the wall without slots."
    } else {
        "All other figures are of the wall without slots: a slotted one brakes less, and lets the mover run faster."
    };
    Caution {
        text: format!(
            "{slots} slots along the whole wall leave {value:.1} % +/- {band:.1} % of its drag at low speed (an approximation with a model \
             band, for an endless wall with narrow slots; at higher speed the band is an estimate). {which}"
        ),
    }
}

fn steady_figures(outcome: &mut Outcome, share: SlotShare) {
    outcome.figures.push(share_figure("slot_factor", share));
    scaled_figure(outcome, "drag", "drag_slotted", share);
    scaled_figure(outcome, "damping_coefficient", "damping_coefficient_slotted", share);
}

fn slotted_points(wall: &SlottedWall, curve: &DragCurve) -> Vec<SlottedPoint> {
    let point = |p: &crate::outcome::DragPoint| {
        let share = wall.share(p.speed_m_per_s);
        let band_newton = share.value * p.band_newton + share.band * p.drag_newton.abs();
        SlottedPoint { speed_m_per_s: p.speed_m_per_s, share, drag_newton: share.value * p.drag_newton, band_newton }
    };
    curve.points.iter().map(point).collect()
}

fn share_figure(name: &str, share: SlotShare) -> Figure {
    Figure {
        name: name.to_owned(),
        value: share.value,
        unit: "1",
        band: share.band,
        basis: Basis::Approximation,
        location: None,
        levels: Vec::new(),
    }
}

/// The figure `of`, scaled by the share, under the name `as_name`.
fn scaled_figure(outcome: &mut Outcome, of: &str, as_name: &str, share: SlotShare) {
    let Some(figure) = outcome.figures.iter().find(|f| f.name == of) else { return };
    let scaled = Figure {
        name: as_name.to_owned(),
        value: share.value * figure.value,
        band: share.value * figure.band + share.band * figure.value.abs(),
        basis: Basis::Approximation,
        location: None,
        levels: Vec::new(),
        unit: figure.unit,
    };
    outcome.figures.push(scaled);
}

#[cfg(test)]
mod tests;

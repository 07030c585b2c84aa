//! Whether a free mover can ever get to the end of its travel.
//!
//! Without a spring the forces other than the wall's are constant along the way: weight and push, N, against which friction can hold up to
//! F. Currents in a wall take energy from the mover and never add any, so with N pointing away from `until` by more than F the mover gets
//! there only on the energy that it has at release, m v^2 / 2 > (N + F) distance; and where it moves away too, never. A permeable wall
//! pulls, and may lend energy or hold the mover: of it nothing is said before the field is solved.

use super::{Free, Problem, Travel};

/// The mover is let go of the wall's field beyond so many outer radii of the wall.
const BEYOND: f64 = 40.0;

/// Why a free mover never gets to the end of its travel.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct OutOfReach {
    /// Weight along the axis and push, upward positive, N.
    pub(crate) force_newton: f64,
    /// Energy that is missing on the way, J; `None` where it moves away for good.
    pub(crate) short_joule: Option<f64>,
}

/// Constant force along the axis, upward positive, and greatest friction, N; `None` where a spring makes the force depend on the place.
fn constant_forces(free: &Free, mass_kg: f64) -> Option<(f64, f64)> {
    let weight = mass_kg * free.gravity_m_per_s2;
    let friction = free.friction_newton + free.friction_coefficient * weight * free.tilt_rad.sin().abs();
    let springless = free.spring_rate_n_per_m.abs() <= 0.0;
    springless.then(|| (free.push_newton - weight * free.tilt_rad.cos(), friction))
}

/// Why the mover can never get from its release to the end of its travel, where that is certain before anything is solved.
pub(crate) fn out_of_reach(problem: &Problem) -> Option<OutOfReach> {
    let (Travel::Free(free), Some(mass)) = (&problem.travel, problem.mover.mass_kg) else { return None };
    let (force, friction) = constant_forces(free, mass).filter(|_| !problem.wall.is_permeable())?;
    let distance = (free.until_m - free.release_m).abs();
    let towards = (free.until_m - free.release_m).signum();
    let (pull, speed) = (force * towards, free.entry_velocity_m_per_s * towards);
    // The cosine of a right angle is not quite zero.
    let nothing = 1.0e-12 * (free.push_newton.abs() + mass * free.gravity_m_per_s2);
    let away = -pull > friction + nothing;
    let coasts = pull.abs() <= nothing && friction <= 0.0;
    if speed < 0.0 && (away || coasts) {
        return Some(OutOfReach { force_newton: force, short_joule: None });
    }
    let short = (friction - pull) * distance - 0.5 * mass * speed * speed;
    (away && short >= 0.0).then_some(OutOfReach { force_newton: force, short_joule: Some(short) })
}

/// Share of the way below which a run has nothing to tell.
const LEAST_SHARE: f64 = 1.0e-6;

/// Greatest distance that a free mover can get within its time limit, m, where that is next to nothing of its way; a permeable wall, which may
/// pull harder than everything else, is left out.
pub(crate) fn next_to_nothing(problem: &Problem) -> Option<f64> {
    let (Travel::Free(free), Some(mass)) = (&problem.travel, problem.mover.mass_kg) else { return None };
    let spring = free.spring_rate_n_per_m * (free.release_m - free.spring_free_at_m).abs();
    let force = mass * free.gravity_m_per_s2 + free.push_newton.abs() + spring;
    let time = free.time_limit_s;
    let far = free.entry_velocity_m_per_s.abs() * time + 0.5 * force / mass * time * time;
    let way = (free.until_m - free.release_m).abs();
    (!problem.wall.is_permeable() && far < LEAST_SHARE * way).then_some(far)
}

impl Problem {
    /// Whether a free mover at `position_m` with `velocity_m_per_s` has left the wall's field for good: the whole of it is more than 40
    /// outer radii of the wall beyond the wall's end, it moves away from wall and end of travel, and neither force nor friction will
    /// turn or stop it. Never with a spring, or under another law of travel.
    #[must_use]
    pub fn is_lost(&self, position_m: f64, velocity_m_per_s: f64) -> bool {
        let (Travel::Free(free), Some(mass), Some(length)) = (&self.travel, self.mover.mass_kg, self.wall.length_m())
        else {
            return false;
        };
        let Some((force, friction)) = constant_forces(free, mass) else { return false };
        let outwards = velocity_m_per_s.signum();
        let ends = self.mover.parts.iter().flat_map(|p| {
            let half = 0.5 * p.outline.length_m;
            [position_m + p.centre_m - half, position_m + p.centre_m + half]
        });
        let beyond = |z: f64| if outwards > 0.0 { z - length } else { -z };
        let clear = ends.map(beyond).fold(f64::INFINITY, f64::min);
        let never_back = force * outwards > friction || (force.abs() <= 0.0 && friction <= 0.0);
        velocity_m_per_s.abs() > 0.0
            && clear > BEYOND * self.wall.outer_radius_m()
            && (free.until_m - position_m) * outwards < 0.0
            && never_back
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, clippy::float_cmp, reason = "tests may stop at the first fault")]
    use super::super::{Accuracy, Extent, Layer, Mover, Outline, Part, SnapshotPlan, Wall};
    use super::*;
    use crate::sources::Source;

    const WEIGHT: f64 = 0.1 * 9.80665;

    /// 100 g beside a wall from 0 to 300 mm.
    fn problem(release: f64, until: f64, change: impl Fn(&mut Free)) -> Problem {
        let layer = Layer {
            name: "tube".to_owned(),
            inner_radius_m: 0.01,
            outer_radius_m: 0.012,
            from_m: 0.0,
            to_m: 0.3,
            conductivity_s_per_m: 58e6,
            relative_permeability: 1.0,
        };
        let source = Source::Dipole { moment_a_m2: 1.0 };
        let outline = Outline { inner_radius_m: 0.0, outer_radius_m: 0.0, length_m: 0.0 };
        let mut free = Free::let_go(release, until, [0.3, 0.0]);
        change(&mut free);
        Problem {
            wall: Wall { slots: 0, extent: Extent::Finite { length_m: 0.3 }, layers: vec![layer] },
            mover: Mover {
                parts: vec![Part { name: "M".to_owned(), centre_m: 0.0, source, outline, coercivity_a_per_m: None }],
                mass_kg: Some(0.1),
                recoil: None,
            },
            travel: Travel::Free(free),
            accuracy: Accuracy::default(),
            snapshots: SnapshotPlan::None,
            stations: Vec::new(),
            warming: None,
        }
    }

    #[test]
    fn what_falls_never_rises_without_energy() {
        let short = out_of_reach(&problem(0.03, 0.05, |_| {})).unwrap();
        approx::assert_relative_eq!(short.short_joule.unwrap(), WEIGHT * 0.02, max_relative = 1e-12);
        assert!(out_of_reach(&problem(0.05, 0.03, |_| {})).is_none());
        let thrown = |v: f64| problem(0.03, 0.05, move |f| f.entry_velocity_m_per_s = v);
        // v^2 / 2 g = 20 mm at 0.6263 m/s.
        assert!(out_of_reach(&thrown(0.62)).is_some());
        assert!(out_of_reach(&thrown(0.63)).is_none());
        assert_eq!(out_of_reach(&thrown(-5.0)).unwrap().short_joule, None);
    }

    #[test]
    fn a_push_above_the_weight_carries_away_what_should_fall() {
        let pushed = |push: f64, friction: f64| {
            problem(0.33, -0.05, move |f| (f.push_newton, f.friction_newton) = (push, friction))
        };
        assert!(out_of_reach(&pushed(0.9 * WEIGHT, 0.0)).is_none());
        assert!(out_of_reach(&pushed(1.1 * WEIGHT, 0.0)).is_some());
        // Friction holds it: it stays at rest, which is an answer.
        assert!(out_of_reach(&pushed(1.1 * WEIGHT, 0.2 * WEIGHT)).is_none());
    }

    #[test]
    fn a_spring_or_a_permeable_wall_may_bring_it_there() {
        assert!(out_of_reach(&problem(0.03, 0.05, |f| f.spring_rate_n_per_m = 10.0)).is_none());
        let mut permeable = problem(0.03, 0.05, |_| {});
        permeable.wall.layers[0].relative_permeability = 2.0;
        assert!(out_of_reach(&permeable).is_none());
    }

    #[test]
    fn level_travel_away_from_the_end_never_turns() {
        let level = |v: f64| {
            problem(0.33, -0.05, move |f| {
                (f.tilt_rad, f.entry_velocity_m_per_s) = (std::f64::consts::FRAC_PI_2, v);
            })
        };
        assert!(out_of_reach(&level(1.0)).is_some());
        assert!(out_of_reach(&level(-1.0)).is_none());
    }

    #[test]
    fn a_nanosecond_is_no_time_to_fall() {
        let limited = |t: f64| problem(0.33, -0.05, move |f| f.time_limit_s = t);
        let far = next_to_nothing(&limited(1e-9)).unwrap();
        approx::assert_relative_eq!(far, 0.5 * 9.80665e-18, max_relative = 1e-12);
        assert!(next_to_nothing(&limited(1e-3)).is_none());
        assert!(
            next_to_nothing(&problem(0.33, -0.05, |f| (f.time_limit_s, f.entry_velocity_m_per_s) = (1e-6, 50.0)))
                .is_none()
        );
    }

    #[test]
    fn lost_is_far_beyond_the_wall_and_on_its_way() {
        let falling = problem(0.2, 0.5, |f| f.entry_velocity_m_per_s = 10.0);
        let reach = 40.0 * 0.012;
        assert!(falling.is_lost(-reach - 0.001, -1.0));
        assert!(!falling.is_lost(-reach + 0.001, -1.0));
        assert!(!falling.is_lost(-reach - 0.001, 1.0), "it moves back");
        assert!(!falling.is_lost(0.3 + reach + 0.001, 1.0), "the weight will turn it");
        assert!(!problem(0.2, -2.0, |_| {}).is_lost(-reach - 0.001, -1.0), "its way leads there");
    }
}

//! A mover among independent resistive rings: at uniform speed, and by its equation of motion m dv/dt = other forces - c(z) v.
//!
//! The free motion takes c and the other forces as constant over a step, at their values in its middle, and integrates exactly:
//! v1 = v0 exp(-k dt) + (f/k)(1 - exp(-k dt)), k = c/m (exponential midpoint rule, order 2, stable for any step; M. Hochbruck,
//! A. Ostermann, Acta Numerica 19, 209-286 (2010), from memory).

use super::path::{Instant, Path, Simulated, crossing};
use super::ring_sum::RingSum;
use crate::fault::SolveFault;
use crate::monitor::Monitor;
use crate::outcome::Stop;
use crate::placement::Placement;
use crate::problem::{Free, Problem, Travel, Traverse};
use crate::rings::equation::Equation;

/// Travel of a step over the length on which the drag varies.
const STEP: f64 = 1.0 / 60.0;
/// Most of the time limit that one step may take.
const LONGEST: f64 = 1.0 / 400.0;
/// Steps between two looks at the monitor.
const LOOKS: usize = 1000;

impl RingSum {
    /// Marches the problem's travel: `traverse` and `free`. Figures to about 1e-4 of the model's own limit.
    ///
    /// # Errors
    /// [`SolveFault::Unsuited`] for `steady` travel, an endless wall or a free mover without mass; [`SolveFault::Interrupted`].
    pub fn travel(&self, problem: &Problem, monitor: &dyn Monitor) -> Result<Simulated, SolveFault> {
        if problem.wall.length_m().is_none() {
            return Err(SolveFault::Unsuited("a passage needs the wall's length"));
        }
        let step = STEP * Placement::new(problem).wavelength_m;
        match &problem.travel {
            Travel::Traverse(law) => Ok(self.traverse(law, step).simulated(problem)),
            Travel::Free(law) => Ok(self.free(problem, law, step, monitor)?.simulated(problem)),
            Travel::Sine(_) | Travel::Table(_) => {
                Err(SolveFault::Unsuited("the ring models follow one passage, not a stroke or a motion from a table"))
            }
            Travel::Steady { .. } | Travel::Alternating(_) => {
                Err(SolveFault::Unsuited("uniform speed in an endless wall has no passage"))
            }
        }
    }

    fn traverse(&self, law: &Traverse, step: f64) -> Path {
        let (speed, travel) = (law.speed_m_per_s, law.to_m - law.from_m);
        let mut places = vec![0.0, 1.0];
        let steps = (travel.abs() / step).ceil().clamp(1.0, 1.0e7);
        let mut n = 1.0;
        while n < steps {
            places.push(n / steps);
            n += 1.0;
        }
        // A drag that is switched on jumps at the wall's ends: both sides of each jump are points of the path.
        let jumps = self.ends().into_iter().map(|z| (z - law.from_m) / travel).filter(|s| *s > 0.0 && *s < 1.0);
        places.extend(jumps.flat_map(|s| [s - 1e-12, s + 1e-12]));
        places.sort_by(f64::total_cmp);
        let velocity = speed * travel.signum();
        let at = |s: &f64| self.instant(s * travel.abs() / speed, law.from_m + s * travel, velocity, 0.0);
        let instants: Vec<Instant> = places.iter().map(at).collect();
        let dissipated = instants.windows(2).map(|p| 0.5 * (p[0].heat + p[1].heat) * (p[1].time - p[0].time)).sum();
        Path { instants, stop: Stop::EndOfTravel, dissipated }
    }

    fn instant(&self, time: f64, z: f64, v: f64, acceleration: f64) -> Instant {
        let c = self.damping_at(z);
        let current = Some(self.current_density_at(z) * v.abs());
        Instant { time, z, v, acceleration, drag: c * v.abs(), heat: c * v * v, current }
    }

    fn free(&self, problem: &Problem, law: &Free, step: f64, monitor: &dyn Monitor) -> Result<Path, SolveFault> {
        let mass = problem.mover.mass_kg.filter(|m| *m > 0.0);
        let mass = mass.ok_or(SolveFault::Unsuited("free travel needs the mover's mass"))?;
        let equation = Equation { mass, law };
        let mut walk = Walk { model: self, equation, step, now: Instant::default(), dissipated: 0.0 };
        walk.now = walk.at(0.0, law.release_m, law.entry_velocity_m_per_s);
        let mut instants = vec![walk.now];
        let longest = LONGEST * law.time_limit_s;
        let stop = loop {
            if instants.len() % LOOKS == 0 && monitor.cancelled() {
                return Err(SolveFault::Interrupted);
            }
            let before = (walk.now, walk.dissipated);
            let Instant { time, z, v, .. } = before.0;
            if v.abs() <= 0.0 && equation.is_held(z, 0.0) {
                break Stop::AtRest;
            }
            walk.step(longest.min(law.time_limit_s - time));
            if (z - law.until_m) * (walk.now.z - law.until_m) <= 0.0 && instants.len() > 1 {
                let (end, _) = crossing(&before.0, &walk.now, law.until_m);
                (walk.now, walk.dissipated) = before;
                walk.step(end - time);
                instants.push(walk.now);
                break Stop::EndOfTravel;
            }
            instants.push(walk.now);
            if walk.now.time >= law.time_limit_s * (1.0 - 1e-12) {
                break Stop::TimeLimit;
            }
        };
        Ok(Path { instants, stop, dissipated: walk.dissipated })
    }
}

/// State of a free motion.
struct Walk<'a> {
    model: &'a RingSum,
    equation: Equation<'a>,
    step: f64,
    now: Instant,
    dissipated: f64,
}

impl Walk<'_> {
    fn at(&self, time: f64, z: f64, v: f64) -> Instant {
        let mut instant = self.model.instant(time, z, v, 0.0);
        let brake = if v.abs() > 0.0 { -instant.drag * v.signum() } else { 0.0 };
        instant.acceleration = (self.equation.force(z, v) + brake) / self.equation.mass;
        instant
    }

    /// One step, no longer than `longest` seconds; it ends early where the mover comes to rest.
    fn step(&mut self, longest: f64) {
        let Instant { time, z, v, acceleration, .. } = self.now;
        let from_rest = (2.0 * self.step / acceleration.abs().max(1e-9)).sqrt();
        let mut dt = from_rest.min(self.step / v.abs().max(1e-12)).min(longest);
        let mut end = self.trial(dt);
        if v * end.1 < 0.0 {
            // Friction turns with the motion: end where the mover stands still.
            dt *= v / (v - end.1);
            end = (self.trial(dt).0, 0.0);
        }
        let middle = self.trial(0.5 * dt);
        let heat = |z: f64, v: f64| self.model.damping_at(z) * v * v;
        self.dissipated += dt / 6.0 * (self.now.heat + 4.0 * heat(middle.0, middle.1) + heat(end.0, end.1));
        self.now = self.at(time + dt, if end.0.is_finite() { end.0 } else { z }, end.1);
    }

    /// Position and velocity after `dt`.
    fn trial(&self, dt: f64) -> (f64, f64) {
        let Instant { z, v, acceleration, .. } = self.now;
        let mass = self.equation.mass;
        // Values for the middle of the step from the values for its start, twice over.
        let sense = if v.abs() > 0.0 { v } else { acceleration };
        let (mut z_middle, mut v_middle) = (z, v);
        for _ in 0..3 {
            let (moved, speed) = exact(
                v,
                self.force(z_middle, v_middle, sense) / mass,
                self.model.damping_at(z_middle) / mass,
                0.5 * dt,
            );
            (z_middle, v_middle) = (z + moved, speed);
        }
        let (moved, speed) =
            exact(v, self.force(z_middle, v_middle, sense) / mass, self.model.damping_at(z_middle) / mass, dt);
        (z + moved, speed)
    }

    /// Other forces with friction against `sense`.
    fn force(&self, z: f64, v: f64, sense: f64) -> f64 {
        let rub = if sense.abs() > 0.0 { self.equation.friction() * sense.signum() } else { 0.0 };
        self.equation.driving_force(z, v) - rub
    }
}

/// Travel and velocity after `t` of dv/dt = f - k v.
fn exact(v: f64, f: f64, k: f64, t: f64) -> (f64, f64) {
    let x = k * t;
    // p1 = (1 - exp(-x))/x, p2 = (1 - p1)/x.
    let p1 = if x > 1e-8 { -(-x).exp_m1() / x } else { 1.0 - 0.5 * x };
    let p2 = if x > 1e-3 { (1.0 - p1) / x } else { 0.5 - x / 6.0 + x * x / 24.0 };
    (v * t * p1 + f * t * t * p2, v * (-x).exp() + f * t * p1)
}

//! A travelled path by a simplified model, and the figures that are read from it as from a run.

use crate::constants::STANDARD_GRAVITY;
use crate::outcome::{Stop, Trace};
use crate::placement::Placement;
use crate::problem::{Free, Problem, Travel};

/// Relative change of speed over a scale length below which the speed counts as terminal, as in a run.
const TERMINAL_CHANGE: f64 = 1.0e-3;

/// A figure by a simplified model; names and units as in a run's summary.
#[derive(Debug, Clone, PartialEq)]
pub struct ModelFigure {
    /// Name, for example `drag_peak`.
    pub name: String,
    /// SI unit.
    pub unit: &'static str,
    /// Value.
    pub value: f64,
}

impl ModelFigure {
    pub(super) fn new(name: &str, unit: &'static str, value: f64) -> Self {
        Self { name: name.to_owned(), unit, value }
    }
}

/// What a simplified model makes of the case's travel.
#[derive(Debug, Clone, PartialEq)]
pub struct Simulated {
    /// The series at the model's steps; bands are 0.
    pub trace: Trace,
    /// Why it ended.
    pub stop: Stop,
    /// Figures of the law of travel, those that the model has.
    pub figures: Vec<ModelFigure>,
}

/// One instant of a path.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub(crate) struct Instant {
    pub time: f64,
    pub z: f64,
    pub v: f64,
    pub acceleration: f64,
    /// Drag, N, positive against the motion.
    pub drag: f64,
    /// Heat rate, W.
    pub heat: f64,
    /// Greatest current density, A/m2, where the model has one.
    pub current: Option<f64>,
}

/// A path and its totals.
#[derive(Debug, Clone, PartialEq)]
pub(crate) struct Path {
    pub instants: Vec<Instant>,
    pub stop: Stop,
    /// Heat in the wall and energy left in the field, J.
    pub dissipated: f64,
}

impl Path {
    /// The path's series and figures.
    pub fn simulated(self, problem: &Problem) -> Simulated {
        let mut figures = Vec::new();
        let mut add = |name: &str, unit, value: Option<f64>| {
            figures.extend(value.map(|value| ModelFigure::new(name, unit, value)));
        };
        let peak = |of: &dyn Fn(&Instant) -> f64| self.greatest(of);
        match &problem.travel {
            Travel::Free(law) => {
                let [entry, exit] = law.gates_m.map(|gate| self.crossing(gate));
                add("entry_time", "s", entry.map(|e| e.0));
                add("exit_time", "s", exit.map(|e| e.0));
                add("transit_time", "s", entry.zip(exit).map(|(a, b)| b.0 - a.0));
                add("exit_speed", "m/s", exit.map(|e| e.1.abs()));
                add("terminal_speed", "m/s", self.terminal_speed(problem));
                add("drag_peak", "N", peak(&|i| i.drag));
                add("deceleration_peak", "m/s2", peak(&|i| -i.acceleration * sense(i.v)).filter(|a| *a > 0.0));
                add("felt_acceleration_peak", "1", peak(&|i| felt(law, i)));
            }
            Travel::Traverse(_)
            | Travel::Steady { .. }
            | Travel::Sine(_)
            | Travel::Table(_)
            | Travel::Alternating(_) => {
                add("drag_peak", "N", peak(&|i| i.drag));
                add("impulse", "N s", Some(self.impulse()));
            }
        }
        add("dissipated_energy", "J", Some(self.dissipated));
        if self.instants.iter().all(|i| i.current.is_some()) {
            add("current_density_peak", "A/m2", peak(&|i| i.current.unwrap_or(0.0)));
        }
        Simulated { trace: self.trace(), stop: self.stop, figures }
    }

    fn trace(&self) -> Trace {
        let column = |of: &dyn Fn(&Instant) -> f64| self.instants.iter().map(of).collect::<Vec<f64>>();
        Trace {
            time_s: column(&|i| i.time),
            position_m: column(&|i| i.z),
            velocity_m_per_s: column(&|i| i.v),
            drag_newton: column(&|i| i.drag),
            drag_band_newton: vec![0.0; self.instants.len()],
            heat_watt: column(&|i| i.heat),
        }
    }

    /// Instant and velocity at the first passage of `gate`; cubic between the instants.
    fn crossing(&self, gate: f64) -> Option<(f64, f64)> {
        let first = self.instants.first()?;
        if (first.z - gate).abs() <= 0.0 {
            return Some((first.time, first.v));
        }
        let pair = self.instants.windows(2).find(|p| (p[0].z - gate) * (p[1].z - gate) <= 0.0)?;
        Some(crossing(&pair[0], &pair[1], gate))
    }

    /// Greatest value over the instants, by the parabola through the largest and its neighbours.
    fn greatest(&self, of: &dyn Fn(&Instant) -> f64) -> Option<f64> {
        let values: Vec<f64> = self.instants.iter().map(of).collect();
        let k = (0..values.len()).max_by(|&a, &b| values[a].total_cmp(&values[b]))?;
        if k == 0 || k + 1 == values.len() {
            return Some(values[k]);
        }
        let [t0, t1, t2] = [k - 1, k, k + 1].map(|i| self.instants[i].time - self.instants[k].time);
        let (y0, y1, y2) = (values[k - 1], values[k], values[k + 1]);
        // Newton's form: y1 + slope t + bend t^2.
        let (left, right) = ((y1 - y0) / (t1 - t0), (y2 - y1) / (t2 - t1));
        let bend = (right - left) / (t2 - t0);
        let slope = left - bend * t0;
        let lift = if bend < 0.0 { -0.25 * slope * slope / bend } else { 0.0 };
        Some(if lift.is_finite() { y1 + lift } else { y1 })
    }

    /// Integral of the drag over time, N s.
    fn impulse(&self) -> f64 {
        self.instants.windows(2).map(|p| 0.5 * (p[0].drag + p[1].drag) * (p[1].time - p[0].time)).sum()
    }

    /// The speed where it hardly changes: the whole mover well inside the wall, as fast a scale length before and after.
    fn terminal_speed(&self, problem: &Problem) -> Option<f64> {
        let placement = Placement::new(problem);
        let margin = 2.0 * placement.scale_m;
        let (low, high) = (margin - placement.lowest_m, problem.wall.length_m()? - margin - placement.highest_m);
        let change = |i: &Instant| {
            let speed = i.v.abs();
            let passing = placement.scale_m / speed;
            [-passing, passing]
                .map(|dt| (self.speed_at(i.time + dt) / speed - 1.0).abs())
                .into_iter()
                .fold(0.0, f64::max)
        };
        let inside = self.instants.iter().filter(|i| (low..high).contains(&i.z) && i.v.abs() > 0.0);
        let steadiest = inside.map(|i| (i.v.abs(), change(i))).min_by(|a, b| a.1.total_cmp(&b.1))?;
        (steadiest.1 < TERMINAL_CHANGE).then_some(steadiest.0)
    }

    /// Speed at an instant, linear between the instants, held beyond them.
    fn speed_at(&self, time: f64) -> f64 {
        let all = &self.instants;
        let k = all.partition_point(|i| i.time <= time);
        if k == 0 || k == all.len() {
            return all[k.saturating_sub(1)].v.abs();
        }
        let (before, after) = (&all[k - 1], &all[k]);
        let part = (time - before.time) / (after.time - before.time);
        (before.v + part * (after.v - before.v)).abs()
    }
}

/// Time and velocity at which the path between two instants passes `gate`.
pub(crate) fn crossing(before: &Instant, after: &Instant, gate: f64) -> (f64, f64) {
    let dt = after.time - before.time;
    let at = |s: f64| {
        let (a, b) = (before.v * dt, after.v * dt);
        let rise = after.z - before.z;
        let (c2, c3) = (3.0 * rise - 2.0 * a - b, a + b - 2.0 * rise);
        (before.z + s * (a + s * (c2 + s * c3)), (a + s * (2.0 * c2 + 3.0 * s * c3)) / dt)
    };
    let start = before.z - gate;
    let (mut low, mut high) = (0.0, 1.0);
    for _ in 0..60 {
        let middle = 0.5 * (low + high);
        if (at(middle).0 - gate) * start > 0.0 {
            low = middle;
        } else {
            high = middle;
        }
    }
    let s = 0.5 * (low + high);
    (before.time + s * dt, at(s).1)
}

/// Acceleration against free fall, in g0: what the load feels.
fn felt(law: &Free, instant: &Instant) -> f64 {
    (instant.acceleration + law.gravity_m_per_s2 * law.tilt_rad.cos()).abs() / STANDARD_GRAVITY
}

/// -1, 0 or 1.
fn sense(v: f64) -> f64 {
    if v.abs() > 0.0 { v.signum() } else { 0.0 }
}

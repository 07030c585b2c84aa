//! Our travel read at the instants and places of a table.

use lenzbore_solver::outcome::Trace;
use lenzbore_solver::spread::{Nominal, Reading};

/// Where the mover is, how fast, and what holds it.
#[derive(Debug, Clone, Copy)]
pub struct State {
    pub time: f64,
    pub position: f64,
    pub velocity: f64,
    pub acceleration: f64,
    pub drag: f64,
    pub drag_band: f64,
}

/// A travelled path.
pub struct Course<'a> {
    trace: &'a Trace,
    /// Half-width of the band of a time and of a speed, relative, after the figures of the run.
    time_share: f64,
    speed_share: f64,
}

impl<'a> Course<'a> {
    /// A path whose times and speeds are as sure as the least sure figure of their kind; at uniform speed (no such figure)
    /// they are exact.
    pub fn new(trace: &'a Trace, figures: &[Nominal]) -> Self {
        let share = |unit: &str| {
            let of = figures.iter().filter(|f| f.unit == unit && f.reading.value.abs() > 0.0);
            of.map(|f| f.reading.band / f.reading.value.abs()).fold(0.0, f64::max)
        };
        Self { trace, time_share: share("s"), speed_share: share("m/s") }
    }

    /// First and last instant, s.
    pub fn times(&self) -> (f64, f64) {
        (self.trace.time_s.first().copied().unwrap_or(0.0), self.trace.time_s.last().copied().unwrap_or(0.0))
    }

    /// Start, and the positions reached, m.
    pub fn positions(&self) -> (f64, f64, f64) {
        let z = &self.trace.position_m;
        let low = z.iter().copied().fold(f64::INFINITY, f64::min);
        let high = z.iter().copied().fold(f64::NEG_INFINITY, f64::max);
        (z.first().copied().unwrap_or(0.0), low, high)
    }

    /// The way the travel goes: 1 upward, -1 downward.
    pub fn sense(&self) -> f64 {
        let z = &self.trace.position_m;
        let (first, last) = (z.first().copied().unwrap_or(0.0), z.last().copied().unwrap_or(0.0));
        if last < first { -1.0 } else { 1.0 }
    }

    /// The state at an instant of the run.
    pub fn at_time(&self, time: f64) -> Option<State> {
        let (first, last) = self.times();
        let slack = 1e-9 * (last - first);
        if time < first - slack || time > last + slack {
            return None;
        }
        let t = &self.trace.time_s;
        let k = t.partition_point(|x| *x <= time).clamp(1, t.len().saturating_sub(1).max(1));
        Some(self.between(k - 1, time.clamp(first, last)))
    }

    /// The state at the first passage of a position.
    pub fn at_position(&self, position: f64) -> Option<State> {
        let z = &self.trace.position_m;
        let k = z.windows(2).position(|p| (p[0] - position) * (p[1] - position) <= 0.0)?;
        let (mut low, mut high) = (self.trace.time_s[k], self.trace.time_s[k + 1]);
        let before = z[k] - position;
        for _ in 0..60 {
            let middle = 0.5 * (low + high);
            let side = self.between(k, middle).position - position;
            if side * before > 0.0 { low = middle } else { high = middle }
        }
        Some(self.between(k, 0.5 * (low + high)))
    }

    /// Cubic in position, linear in velocity and drag, between two instants.
    fn between(&self, k: usize, time: f64) -> State {
        let tr = self.trace;
        let next = (k + 1).min(tr.time_s.len() - 1);
        let dt = tr.time_s[next] - tr.time_s[k];
        let s = if dt > 0.0 { (time - tr.time_s[k]) / dt } else { 0.0 };
        let line = |c: &[f64]| c[k] + s * (c[next] - c[k]);
        let (v0, v1) = (tr.velocity_m_per_s[k], tr.velocity_m_per_s[next]);
        let rise = tr.position_m[next] - tr.position_m[k];
        let (a, b) = (v0 * dt, v1 * dt);
        let position = tr.position_m[k] + s * (a + s * (3.0 * rise - 2.0 * a - b + s * (a + b - 2.0 * rise)));
        State {
            time,
            position,
            velocity: line(&tr.velocity_m_per_s),
            acceleration: if dt > 0.0 { (v1 - v0) / dt } else { 0.0 },
            drag: line(&tr.drag_newton),
            drag_band: line(&tr.drag_band_newton),
        }
    }

    /// A quantity of a state with its band.
    pub fn reading(&self, state: &State, name: &str) -> Option<Reading> {
        let late = self.time_share * state.time.abs();
        let speed_band = state.acceleration.abs() * late + self.speed_share * state.velocity.abs();
        let (start, ..) = self.positions();
        Some(match name {
            "drag" => Reading { value: state.drag, band: state.drag_band },
            "time" => Reading { value: state.time, band: late },
            "velocity" => Reading { value: state.velocity, band: speed_band },
            "speed" => Reading { value: state.velocity.abs(), band: speed_band },
            "position" => Reading { value: state.position, band: state.velocity.abs() * late },
            "displacement" => {
                let value = self.sense() * (state.position - start);
                Reading { value, band: state.velocity.abs() * late }
            }
            _ => return None,
        })
    }
}

//! Prescribed motion: strokes and motions from a table.

/// z = centre + amplitude sin(2 pi f t), from the centre upwards, the wall's field at rest at the start.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Sine {
    /// Middle of the stroke: position of the reference point, m.
    pub centre_m: f64,
    /// Amplitude, zero to peak: half the stroke, m, > 0.
    pub amplitude_m: f64,
    /// Frequency, Hz, > 0.
    pub frequency_hz: f64,
    /// Cycles to run, of which the last gives the figures; `None`: until the figures of a cycle no longer change.
    pub cycles: Option<u32>,
}

impl Sine {
    /// Duration of a cycle, s.
    #[must_use]
    pub fn period_s(&self) -> f64 {
        1.0 / self.frequency_hz
    }

    /// Angular frequency, rad/s.
    #[must_use]
    pub fn angular_frequency(&self) -> f64 {
        std::f64::consts::TAU * self.frequency_hz
    }

    /// Greatest speed, m/s.
    #[must_use]
    pub fn greatest_speed(&self) -> f64 {
        self.angular_frequency() * self.amplitude_m
    }
}

/// Cycles that a stroke may be asked for, and is followed through at most until it settles.
pub const MOST_CYCLES: u32 = 400;

/// Positions at given instants, joined by cubics. The wall's field is at rest at the first point, from which all instants of the answer
/// count.
#[derive(Debug, Clone, PartialEq)]
pub struct MotionTable {
    /// Instants, s, increasing; at least three.
    pub time_s: Vec<f64>,
    /// Position of the reference point at each, m.
    pub position_m: Vec<f64>,
}

impl MotionTable {
    /// Speed between points `k` and `k + 1`, m/s, signed.
    pub(crate) fn chord(&self, k: usize) -> f64 {
        (self.position_m[k + 1] - self.position_m[k]) / (self.time_s[k + 1] - self.time_s[k])
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::problem::{ProblemFault, Travel};
    use crate::verification::cases::{endless, finite, layer, magnet, problem};

    fn faults(travel: Travel) -> Vec<ProblemFault> {
        let wall = finite(0.1, vec![layer(11.0, 13.0, 58.0, 1.0)]);
        problem(wall, vec![magnet(0.0, 9.0, 12.0, 1.25, 0.0)], travel, 3).faults()
    }

    fn table(time_s: &[f64], position_m: &[f64]) -> Vec<ProblemFault> {
        faults(Travel::Table(MotionTable { time_s: time_s.to_vec(), position_m: position_m.to_vec() }))
    }

    #[test]
    fn strokes_have_an_amplitude_a_frequency_and_a_wall_with_ends() {
        let sine = Sine { centre_m: 0.05, amplitude_m: 0.01, frequency_hz: 5.0, cycles: Some(3) };
        assert_eq!(faults(Travel::Sine(sine)), []);
        let none = faults(Travel::Sine(Sine { amplitude_m: 0.0, ..sine }));
        assert!(none[0].to_string().contains("an impossible amplitude: 0 m"), "{}", none[0]);
        assert_eq!(faults(Travel::Sine(Sine { frequency_hz: -1.0, ..sine })).len(), 1);
        assert_eq!(faults(Travel::Sine(Sine { cycles: Some(0), ..sine })), [ProblemFault::Cycles { found: 0 }]);
        let wall = endless(vec![layer(11.0, 13.0, 58.0, 1.0)]);
        let endless = problem(wall, vec![magnet(0.0, 9.0, 12.0, 1.25, 0.0)], Travel::Sine(sine), 3);
        assert_eq!(endless.faults(), [ProblemFault::TravelNeedsEnds { law: "sine" }]);
    }

    #[test]
    fn a_table_has_three_points_in_order_and_no_jumps() {
        assert_eq!(table(&[0.0, 0.1, 0.2], &[0.0, 0.01, 0.0]), []);
        assert_eq!(table(&[0.0, 0.1], &[0.0, 0.01]), [ProblemFault::TableShort { points: 2 }]);
        let back = table(&[0.0, 0.2, 0.1], &[0.0, 0.01, 0.0]);
        assert_eq!(back, [ProblemFault::TableTimes { point: 2, time_s: 0.1, before_s: 0.2 }]);
        assert_eq!(table(&[0.0, 0.1, f64::NAN], &[0.0, 0.01, 0.0]).len(), 1);
        assert_eq!(table(&[0.0, 0.1, 0.2], &[0.0, f64::INFINITY, 0.0]).len(), 1);
        assert!(matches!(table(&[0.0, 1e-6, 0.2], &[0.0, 0.1, 0.0])[..], [ProblemFault::TableJump { point: 1, .. }]));
        assert_eq!(table(&[0.0, 0.1, 0.2], &[0.01; 3]), [ProblemFault::NoTravel { at_m: 0.01 }]);
    }
}

//! Random draws of the inputs: the same seed gives the same draws on every machine.

use super::{COVERAGE, Input};

/// Farthest draw, standard deviations: beyond it no part passes inspection, and a bore could close on the mover.
const FARTHEST: f64 = 3.0;

/// A sequence of draws.
///
/// Uniform numbers by the generator of G. L. Steele, D. Lea and C. H. Flood, "Fast splittable pseudorandom number
/// generators", Proc. OOPSLA 2014, 453-472 (its 64-bit mixer, from memory; checked against its known first outputs), turned
/// into normal ones by G. E. P. Box and M. E. Muller, Ann. Math. Stat. 29, 610-611 (1958).
#[derive(Debug, Clone)]
pub struct Draws {
    state: u64,
}

impl Draws {
    /// Draws of a seed.
    #[must_use]
    pub const fn new(seed: u64) -> Self {
        Self { state: seed }
    }

    /// The next 64 random bits.
    pub(super) fn bits(&mut self) -> u64 {
        self.state = self.state.wrapping_add(0x9e37_79b9_7f4a_7c15);
        let mut z = self.state;
        z = (z ^ (z >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
        z = (z ^ (z >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
        z ^ (z >> 31)
    }

    /// Uniform in (0, 1).
    fn uniform(&mut self) -> f64 {
        let high = u32::try_from(self.bits() >> 32).unwrap_or(u32::MAX);
        (f64::from(high) + 0.5) / 4_294_967_296.0
    }

    /// Normal with mean 0 and standard deviation 1, cut off at 3.
    pub(super) fn normal(&mut self) -> f64 {
        loop {
            let radius = (-2.0 * self.uniform().ln()).sqrt();
            let z = radius * (2.0 * std::f64::consts::PI * self.uniform()).cos();
            if z.abs() <= FARTHEST {
                return z;
            }
        }
    }

    /// One draw of all inputs, as offsets from their nominal values: normal, each side with its own half-width as 95 %.
    pub fn offsets(&mut self, inputs: &[Input]) -> Vec<f64> {
        inputs
            .iter()
            .map(|input| {
                let z = self.normal() / COVERAGE;
                if z < 0.0 { z * input.minus } else { z * input.plus }
            })
            .collect()
    }
}

//! Powers of the base units that a quantity is made of.

/// Exponents of metre, kilogram, second, ampere, kelvin and radian.
///
/// The radian is kept apart so that a tilt in `%` or a friction coefficient in degrees is refused.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Default)]
pub struct Dimension([i8; 6]);

/// Largest exponent of a base unit that a unit may reach.
const LARGEST_EXPONENT: i8 = 24;

impl Dimension {
    /// A pure number.
    pub const NONE: Self = Self([0; 6]);

    /// From the exponents of m, kg, s, A, K; the radian's is 0.
    #[must_use]
    pub const fn new(metre: i8, kilogram: i8, second: i8, ampere: i8, kelvin: i8) -> Self {
        Self([metre, kilogram, second, ampere, kelvin, 0])
    }

    /// A plane angle.
    pub const ANGLE: Self = Self([0, 0, 0, 0, 0, 1]);

    /// Product of this with `other` raised to `power`; `None` where an exponent leaves the sensible range.
    #[must_use]
    pub fn times_power(self, other: Self, power: i8) -> Option<Self> {
        let mut sum = self.0;
        for (a, b) in sum.iter_mut().zip(other.0) {
            *a = b.checked_mul(power).and_then(|b| a.checked_add(b)).filter(|e| e.abs() <= LARGEST_EXPONENT)?;
        }
        Some(Self(sum))
    }

    /// The dimension of the reciprocal.
    #[must_use]
    pub fn reciprocal(self) -> Self {
        Self(self.0.map(|e| -e))
    }
}

impl std::fmt::Display for Dimension {
    /// In base units, as `kg m/s2` would be written without a slash: `m kg s-2`.
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        let words: Vec<String> = ["m", "kg", "s", "A", "K", "rad"]
            .iter()
            .zip(self.0)
            .filter(|(_, e)| *e != 0)
            .map(|(name, e)| if e == 1 { (*name).to_owned() } else { format!("{name}{e}") })
            .collect();
        if words.is_empty() { f.write_str("a pure number") } else { f.write_str(&words.join(" ")) }
    }
}

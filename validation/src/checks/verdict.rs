//! What a check found.

use std::fmt;

/// One figure held against its reference.
#[derive(Debug, Clone, PartialEq)]
pub struct Comparison {
    /// Which figure.
    pub what: String,
    /// Value found.
    pub found: f64,
    /// Half-width of the band that the program put on it, where it did.
    pub band: Option<f64>,
    /// Reference value.
    pub expected: f64,
    /// How well the reference itself is known, where a band must hold it.
    pub known_within: f64,
    /// Greatest difference allowed.
    pub allowed: f64,
    /// Unit of all four.
    pub unit: &'static str,
}

impl Comparison {
    /// Difference to the reference.
    #[must_use]
    pub fn difference(&self) -> f64 {
        self.found - self.expected
    }

    /// Difference over what is allowed, and over the band that must hold it where there is one: above 1 it falls short.
    #[must_use]
    pub fn shares(&self) -> (f64, Option<f64>) {
        let off = self.difference().abs();
        let share = |limit: f64| if off <= 0.0 { 0.0 } else { off / limit };
        (share(self.allowed), self.band.map(|band| share(band + self.known_within)))
    }

    /// Within tolerance, and the reference inside the band where there is one.
    #[must_use]
    pub fn passes(&self) -> bool {
        let off = self.difference().abs();
        off <= self.allowed && self.band.is_none_or(|band| off <= band + self.known_within)
    }
}

impl fmt::Display for Comparison {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let mark = if self.passes() { "ok  " } else { "FAIL" };
        write!(f, "{mark} {}: {:.9e}", self.what, self.found)?;
        if let Some(band) = self.band {
            write!(f, " +/- {band:.1e}")?;
        }
        write!(f, " {} against {:.9e}", self.unit, self.expected)?;
        write!(f, ", difference {:.1e}, allowed {:.1e}", self.difference(), self.allowed)
    }
}

/// All comparisons of a check.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Verdict {
    /// In order.
    pub comparisons: Vec<Comparison>,
    /// What a picture of the check shows.
    pub series: Vec<Series>,
}

/// A line of a picture.
#[derive(Debug, Clone, PartialEq)]
pub struct Series {
    /// What it is.
    pub name: String,
    /// Its points.
    pub points: Vec<(f64, f64)>,
}

impl Verdict {
    /// Whether there is at least one comparison and all pass.
    #[must_use]
    pub fn passed(&self) -> bool {
        !self.comparisons.is_empty() && self.comparisons.iter().all(Comparison::passes)
    }

    /// The comparison that comes nearest to falling short, or falls short farthest; a value that is no number above all.
    #[must_use]
    pub fn worst(&self) -> Option<&Comparison> {
        let share = |c: &&Comparison| {
            let (of_allowed, of_band) = c.shares();
            let worst = of_allowed.max(of_band.unwrap_or(0.0));
            if c.difference().is_nan() { f64::INFINITY } else { worst }
        };
        self.comparisons.iter().max_by(|a, b| share(a).total_cmp(&share(b)))
    }

    /// Adds a comparison without a band.
    pub fn compare(&mut self, what: impl Into<String>, found: f64, expected: f64, allowed: f64, unit: &'static str) {
        let (what, band, known_within) = (what.into(), None, 0.0);
        self.comparisons.push(Comparison { what, found, band, expected, known_within, allowed, unit });
    }

    /// Adds a comparison whose band must hold a reference known within `known_within`.
    pub fn compare_banded(
        &mut self,
        what: impl Into<String>,
        figure: Banded,
        expected: f64,
        limits: Limits,
        unit: &'static str,
    ) {
        self.comparisons.push(Comparison {
            what: what.into(),
            found: figure.value,
            band: Some(figure.band),
            expected,
            known_within: limits.known_within,
            allowed: limits.allowed,
            unit,
        });
    }
}

/// A value with the half-width of its band.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Banded {
    /// The value.
    pub value: f64,
    /// Half-width of its band.
    pub band: f64,
}

/// What a comparison may differ by.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Limits {
    /// Greatest difference allowed.
    pub allowed: f64,
    /// How well the reference itself is known.
    pub known_within: f64,
}

impl fmt::Display for Verdict {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        for comparison in &self.comparisons {
            writeln!(f, "{comparison}")?;
        }
        Ok(())
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use super::*;

    #[test]
    fn the_worst_is_found_whatever_its_limit() {
        let mut verdict = Verdict::default();
        assert!(!verdict.passed() && verdict.worst().is_none());
        verdict.compare("near", 1.001, 1.0, 0.01, "1");
        verdict.compare("exact", 1.0, 1.0, 0.0, "1");
        assert!(verdict.passed());
        assert_eq!(verdict.worst().unwrap().what, "near");
        let limits = Limits { allowed: 0.01, known_within: 1e-9 };
        verdict.compare_banded("band", Banded { value: 1.001, band: 1e-4 }, 1.0, limits, "1");
        assert_eq!(verdict.worst().unwrap().what, "band");
        assert!(!verdict.passed(), "the band does not hold the reference");
        verdict.compare("no number", f64::NAN, 1.0, 1.0, "1");
        assert_eq!(verdict.worst().unwrap().what, "no number");
        assert!(!verdict.worst().unwrap().passes());
    }
}

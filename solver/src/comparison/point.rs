//! One value of the table against ours.

use crate::spread::COVERAGE;

/// Which sign of the error is the dangerous one.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum Unsafe {
    /// Both.
    #[default]
    Both,
    /// A table that says too much (a drag that the brake does not have).
    High,
    /// A table that says too little.
    Low,
}

/// How large a difference is allowed.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Allowed {
    /// A share of the point's scale.
    Share(f64),
    /// The figure's own unit.
    Absolute(f64),
}

/// The answer to one point, or to the whole table.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Verdict {
    /// The difference is within what is allowed, uncertainties included.
    Passes,
    /// The uncertainties do not let one tell.
    Undecided,
    /// The difference is beyond what is allowed, uncertainties included.
    FallsShort,
}

impl Verdict {
    /// The words used in results.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Passes => "passes",
            Self::Undecided => "undecided",
            Self::FallsShort => "falls short",
        }
    }
}

/// One value of the table, ours, and how sure both are. All in the figure's unit.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Point {
    /// The table's value.
    pub table: f64,
    /// Ours.
    pub ours: f64,
    /// Half-width of our numerical band (95 %).
    pub band: f64,
    /// Half-width of the input spread (95 %); 0 where inputs are the same for both.
    pub input: f64,
    /// Standard uncertainty of the table's value; 0 for a calculator's.
    pub data: f64,
    /// What a share of the difference is of: |ours|, or for a series its greatest value.
    pub scale: f64,
}

impl Point {
    /// Comparison error E = table - ours.
    #[must_use]
    pub fn error(&self) -> f64 {
        self.table - self.ours
    }

    /// E over the scale.
    #[must_use]
    pub fn share(&self) -> f64 {
        self.of_scale(self.error())
    }

    /// Standard validation uncertainty u_val.
    #[must_use]
    pub fn standard(&self) -> f64 {
        ((self.band / COVERAGE).powi(2) + (self.input / COVERAGE).powi(2) + self.data.powi(2)).sqrt()
    }

    /// Its half-width at 95 %.
    #[must_use]
    pub fn expanded(&self) -> f64 {
        COVERAGE * self.standard()
    }

    /// A difference over the scale; 0 over 0 is 0.
    #[must_use]
    pub fn of_scale(&self, difference: f64) -> f64 {
        if difference.abs() <= 0.0 { 0.0 } else { difference / self.scale }
    }

    /// The allowed difference in the figure's unit.
    #[must_use]
    pub fn limit(&self, allowed: Allowed) -> f64 {
        match allowed {
            Allowed::Share(share) => share * self.scale,
            Allowed::Absolute(limit) => limit,
        }
    }

    /// Whether [E - U, E + U] lies within what is allowed. A one-sided question judges one sign of E only.
    #[must_use]
    pub fn verdict(&self, allowed: Allowed, dangerous: Unsafe) -> Verdict {
        let (error, limit, half) = (self.error(), self.limit(allowed), self.expanded());
        let judged = match dangerous {
            Unsafe::Both => error.abs(),
            Unsafe::High => error,
            Unsafe::Low => -error,
        };
        if judged + half <= limit {
            Verdict::Passes
        } else if judged - half > limit {
            Verdict::FallsShort
        } else {
            Verdict::Undecided
        }
    }
}

/// The verdict over all points: the worst.
#[must_use]
pub fn overall(verdicts: impl IntoIterator<Item = Verdict>) -> Verdict {
    verdicts.into_iter().max().unwrap_or(Verdict::Passes)
}

/// The factors on the table that keep it on either side of the truth, uncertainties included: a table times `low` never
/// says more than ours - U, times `high` never less than ours + U. Points with a table value of 0 or another sign than ours are left
/// out; none where no point is left.
#[must_use]
pub fn allowance(points: &[Point]) -> Option<(f64, f64)> {
    let usable = points.iter().filter(|p| p.table * p.ours > 0.0);
    let factors: Vec<(f64, f64)> = usable
        .map(|p| {
            let (half, table) = (p.expanded(), p.table.abs());
            ((p.ours.abs() - half) / table, (p.ours.abs() + half) / table)
        })
        .collect();
    let low = factors.iter().map(|f| f.0).fold(f64::INFINITY, f64::min);
    let high = factors.iter().map(|f| f.1).fold(f64::NEG_INFINITY, f64::max);
    (!factors.is_empty()).then_some((low.max(0.0), high))
}

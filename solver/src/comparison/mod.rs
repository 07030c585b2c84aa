//! A table held against the field solution, in the sense of the standard on verification and validation (ASME V&V 20,
//! "Standard for verification and validation in computational fluid dynamics and heat transfer", 2009; from memory).
//!
//! Comparison error E = table - ours. Standard validation uncertainty
//!
//!   u_val^2 = u_num^2 + u_input^2 + u_data^2,
//!
//! u_num and u_input from the numerical band and the input spread (both 95 %: divided by 1.96), u_data as the table says. The error
//! of the table's model lies within E +- 1.96 u_val with 95 %. Against an allowed difference L that gives three verdicts:
//! passes where all of that interval is allowed, falls short where none of it is, undecided between ([`Point::verdict`]).
//!
//! Differences are relative to our value, never to the table's: dividing by the table turns verdicts round at the edge.

mod domain;
mod likeness;
mod point;

pub use domain::{Domain, Interval, RowJudged, Varied, domain};
pub use likeness::{Likeness, likeness, steady_factor};
pub use point::{Allowed, Point, Unsafe, Verdict, allowance, overall};

#[cfg(test)]
mod tests;

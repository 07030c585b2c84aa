//! Case files: from text to a [`Problem`] that can be solved, or to every fault at once.
//!
//! The words are TOML tables; `like` starts from another file, `--set` overrides any word. Every word is resolved to SI
//! with its origin, every default is filled in and said.
//!
//! What the words leave open is settled so:
//!
//! - Of the three sizes across a layer two are given and stay when one of them is set. If the third is set, the inner
//!   diameter stays where it was given, else the thickness; a caution says which size follows.
//! - A `traverse` starts and ends with the whole mover 6 bore diameters clear of the wall (upward where neither `from` nor
//!   `to` is given). `free` travel ends 2 bore diameters below the lower gate, or above the upper one where the release is
//!   below their middle. The bore diameter is the wall's outer diameter where it has no bore.
//! - `mover.reference` is `"middle"`, `"lower end"`, `"upper end"` or a height above the lower end, and serves a stack;
//!   parts placed by `at` count from the reference point.
//! - A given conductivity holds at 20 degC where `conductivity_at` does not say otherwise, a remanence at 20 degC.
//! - Where two sizes across of a layer have tolerances, these two are taken as given and the third follows; a tolerance of
//!   one size moves it as `--set` would.
//! - `[curve]` with two speeds, or two positions, spreads `points` between them; with more it takes them as they are. Temperatures,
//!   frequencies and amplitudes are taken as they are.
//!
//! ```
//! use lenzbore_io::case::{CaseSource, STARTER, read_case};
//! let source = CaseSource::Text { name: "starter.toml", text: STARTER, base_dir: std::path::Path::new("") };
//! let case = read_case(&source, &["wall.sleeve.thickness=2.1 mm".to_owned()])?;
//! assert_eq!(case.resolved.number("wall.sleeve.thickness"), Some(0.0021));
//! # Ok::<(), lenzbore_io::message::Diagnostics>(())
//! ```

mod across;
mod alternating;
mod coercivity;
mod conductor;
mod curve;
mod geometry;
mod kept;
mod load;
mod measures;
mod mover;
mod names;
mod output;
mod overlay;
mod overrides;
pub(crate) mod parse;
mod parts;
mod reader;
mod resolve;
mod resolved;
mod sizes;
mod starters;
mod station;
mod stroke;
mod temperature;
mod tolerance;
mod travel;
pub(crate) mod tree;
mod values;
mod wall;
mod warming;
mod words;

use std::path::Path;

use lenzbore_solver::problem::{Extent, Problem, Sine, SnapshotPlan, Travel, Traverse};

use crate::message::Diagnostics;
pub use kept::KeptCase;
pub(crate) use load::text_of;
pub use resolve::BACK_ACTION;
pub use resolved::{Origin, Resolved, ResolvedValue, ResolvedWord};
pub use starters::{STARTER, STARTERS, Starter, starter};
pub use tolerance::Tolerance;
pub(crate) use warming::{CONDUCTION, DENSITY, FILM, PERIOD, SPECIFIC_HEAT, UNTIL_SETTLED};
pub use words::{LAWS, LawWords, TABLES, TableWords, law_words, table_words};

#[cfg(test)]
mod tests;

/// Where a case comes from.
#[derive(Debug, Clone, Copy)]
pub enum CaseSource<'a> {
    /// A file.
    Path(&'a Path),
    /// A text that was read elsewhere, as from standard input.
    Text {
        /// What messages call it, as `-`.
        name: &'a str,
        /// The text.
        text: &'a str,
        /// Folder that a relative `like` starts from.
        base_dir: &'a Path,
    },
    /// A result that kept it.
    Kept(&'a KeptCase),
}

/// What `lenzbore curve` sweeps. Lists that were not asked for are empty.
#[derive(Debug, Clone, PartialEq)]
pub struct CurvePlan {
    /// Increasing speeds, m/s, all above 0, at which settled drag is wanted.
    pub speeds_m_per_s: Vec<f64>,
    /// Increasing temperatures of wall and mover, K, at each of which the drag is wanted at all these speeds.
    pub temperatures_k: Vec<f64>,
    /// Increasing positions of the reference point, m, at which the zero-speed damping coefficient is wanted.
    pub positions_m: Vec<f64>,
    /// Strokes, where they are asked for.
    pub strokes: Option<StrokesPlan>,
    /// Length of the case's wall, m; `None` where it is endless.
    pub length_m: Option<f64>,
    /// Cautions that belong to the curve alone.
    pub cautions: Vec<String>,
}

/// Frequencies and amplitudes of settled strokes: every one of these with every one of those.
#[derive(Debug, Clone, PartialEq)]
pub struct StrokesPlan {
    /// Increasing frequencies, Hz.
    pub frequencies_hz: Vec<f64>,
    /// Increasing amplitudes, m, zero to peak.
    pub amplitudes_m: Vec<f64>,
}

/// Which results are wanted beside the summary, which is always written.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct OutputPlan {
    /// `trace.csv`.
    pub trace: bool,
    /// `run.h5` and `run.xdmf`.
    pub fields: bool,
    /// Pictures.
    pub pictures: bool,
    /// `report.html`.
    pub report: bool,
    /// Width of the pictures on paper, m.
    pub picture_width_m: f64,
}

/// A case that can be solved.
#[derive(Debug, Clone, PartialEq)]
pub struct ResolvedCase {
    /// Its title; the file's stem, or `case`, where it has none.
    pub title: String,
    /// `[record]`.
    pub record: serde_json::Map<String, serde_json::Value>,
    /// The problem. Without `[travel]` (see [`Self::travel_given`]) its travel is steady at the curve's highest speed.
    pub problem: Problem,
    /// Whether the case has a `[travel]`; if not, it has a curve.
    pub travel_given: bool,
    /// `[curve]`.
    pub curve: Option<CurvePlan>,
    /// `[output]`; when fields are kept stands in [`Problem::snapshots`].
    pub output: OutputPlan,
    /// `[tolerance]`, in the order in which it was read.
    pub tolerances: Vec<Tolerance>,
    /// Every word with its value in SI and its origin.
    pub resolved: Resolved,
    /// What the user should know about the input.
    pub cautions: Vec<String>,
    /// What the case has or asks for and the model leaves out.
    pub not_modelled: Vec<String>,
    /// SHA-256 of the resolved words, see [`Resolved::digest`].
    pub digest: String,
    /// Case file and base files, in the order of reading.
    pub files: Vec<String>,
    /// The whole case in one piece, to be read again without its files.
    pub kept: KeptCase,
}

impl ResolvedCase {
    /// The problem for the positions of `lenzbore curve`: the wall with its ends, and a slow traverse in the place of the travel.
    #[must_use]
    pub fn positions_problem(&self) -> Option<Problem> {
        let curve = self.curve.as_ref()?;
        let (first, last) = (*curve.positions_m.first()?, *curve.positions_m.last()?);
        let length_m = curve.length_m?;
        let mut problem = self.problem.clone();
        problem.wall.extent = Extent::Finite { length_m };
        problem.travel = Travel::Traverse(Traverse { speed_m_per_s: 1.0, from_m: first, to_m: last });
        problem.stations.clear();
        Some(problem)
    }

    /// The problem of one stroke of `lenzbore curve`, without fields; `None` where the travel is no stroke.
    #[must_use]
    pub fn stroke_problem(&self, frequency_hz: f64, amplitude_m: f64) -> Option<Problem> {
        let Travel::Sine(sine) = self.problem.travel else { return None };
        let travel = Travel::Sine(Sine { frequency_hz, amplitude_m, ..sine });
        Some(Problem { travel, snapshots: SnapshotPlan::None, stations: Vec::new(), ..self.problem.clone() })
    }

    /// The problem for `lenzbore curve` over speed: the wall endless, the travel steady at the curve's highest speed.
    #[must_use]
    pub fn curve_problem(&self) -> Option<Problem> {
        let velocity_m_per_s = *self.curve.as_ref()?.speeds_m_per_s.last()?;
        let mut problem = self.problem.clone();
        problem.wall.extent = Extent::Endless;
        for layer in &mut problem.wall.layers {
            (layer.from_m, layer.to_m) = (0.0, 0.0);
        }
        problem.travel = Travel::Steady { velocity_m_per_s };
        Some(problem)
    }
}

/// Reads a case with its base files and overrides.
///
/// # Errors
/// Every fault of the case at once, each with its place, what would be legal and the mend. Where a file cannot be read
/// as TOML, the faults of its text alone.
pub fn read_case(source: &CaseSource<'_>, sets: &[String]) -> Result<ResolvedCase, Diagnostics> {
    resolve::resolve(load::load(source, sets), source)
}

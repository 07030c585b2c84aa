//! The study of the bands, told.

use std::fmt::Write as _;

use lenzbore_io::picture::Picture;
use lenzbore_io::picture::validation::{CoveragePoint, coverage};
use lenzbore_io::result::{IoFault, folder::PendingFolder, names};
use lenzbore_solver::monitor::Monitor;
use serde_json::{Value, json};

use super::html::{escaped, inline, page};
use super::json::comparison;
use super::rough;
use crate::Error;
use crate::checks::{Coverage, Verdict};
use crate::references::integral;

/// A study of drawn cases with its verdict.
#[derive(Debug, Clone, PartialEq)]
pub struct CoverageReport {
    /// Errors and bands.
    pub study: Coverage,
    /// What they come to.
    pub verdict: Verdict,
    /// Seed of the draws.
    pub seed: u64,
    /// Version of the program.
    pub version: String,
}

/// What is drawn.
const RANGE: &str = "bores of 4 to 30 mm radius; one to three layers, touching or with gaps, of 0.05 to 0.6 bore radii each, 1 to 60 MS/m, three in \
                     ten permeable (2 to 200); dipoles, cylinders, rings, coils and stacks of three; magnetic Reynolds numbers 0.01 to 100, both \
                     directions";

impl CoverageReport {
    /// Draws and solves `cases` cases on all cores.
    ///
    /// # Errors
    /// A failure of either method, or a request to stop.
    pub fn run(cases: u32, seed: u64, version: &str, monitor: &dyn Monitor) -> Result<Self, Error> {
        let study = Coverage::study(cases, seed, monitor)?;
        let verdict = study.verdict();
        Ok(Self { study, verdict, seed, version: version.to_owned() })
    }

    /// Whether the bands are worth what is said of them.
    #[must_use]
    pub fn passed(&self) -> bool {
        self.verdict.passed()
    }

    fn sentence(&self) -> String {
        let cases = self.study.errors.len();
        let held = self.study.holds().filter(|h| *h).count();
        let (error, band) = self.study.medians();
        format!(
            "{held} of {cases} bands hold the truth ({:.1} %; at least 95 % are meant to); the median band, {} of the drag, is {:.1} times the \
             median error, {} (at most 30); the greatest error is {}",
            100.0 * held as f64 / cases as f64,
            rough(band),
            self.study.ratio(),
            rough(error),
            rough(self.study.worst()),
        )
    }

    /// The sentence, what was drawn, and what missed.
    #[must_use]
    pub fn text(&self) -> String {
        let mut text = format!(
            "Coverage of the bands on {} drawn cases (seed {}), against the Fourier-Bessel integral\n\n",
            self.study.errors.len(),
            self.seed
        );
        // Writing into a string cannot fail.
        for c in &self.verdict.comparisons {
            let word = if c.passes() { "passes" } else { "FALLS SHORT" };
            let _ = writeln!(text, "{:<38}{:>12.4e}   at most {:<10}{word}", c.what, c.found, c.allowed);
        }
        let _ = writeln!(text, "\n{}.\n\ndrawn: {RANGE}", self.sentence());
        text
    }

    /// Errors and bands of all cases, and the verdict.
    #[must_use]
    pub fn json(&self) -> Value {
        let (error, band) = self.study.medians();
        json!({
            "program": {"name": "lenzbore", "version": self.version},
            "passed": self.passed(),
            "seed": self.seed,
            "drawn": RANGE,
            "source": integral::SOURCE.citation,
            "cases": self.study.errors.len(),
            "share_held": 1.0 - self.study.missed(),
            "median_error": error,
            "median_band": band,
            "median_ratio": self.study.ratio(),
            "comparisons": self.verdict.comparisons.iter().map(comparison).collect::<Vec<_>>(),
            "errors": self.study.errors,
            "bands": self.study.bands,
        })
    }

    fn picture(&self) -> Option<Picture> {
        let each = self.study.errors.iter().zip(&self.study.bands).zip(self.study.holds());
        let points: Vec<CoveragePoint> =
            each.map(|((&error, &band), holds)| CoveragePoint { error, band, holds }).collect();
        let subtitle = format!("{} drawn cases against the Fourier-Bessel integral, seed {}", points.len(), self.seed);
        coverage("Coverage of the numerical bands", &subtitle, &points, self.study.medians())
    }

    /// Writes Markdown, JSON, one HTML page and the picture into a folder that appears whole.
    ///
    /// # Errors
    /// See [`IoFault`].
    pub fn write(&self, folder: &mut PendingFolder) -> Result<(), IoFault> {
        let pictures: Vec<Picture> = self.picture().into_iter().collect();
        let title = format!("Coverage of the bands of lenzbore {}", self.version);
        let source = integral::SOURCE.citation;
        let body = format!(
            "<p>{}.</p>\n{}<p>Drawn with seed {}: {RANGE}.</p>\n<p>Truth: {}.</p>\n",
            escaped(&self.sentence()),
            inline(&pictures),
            self.seed,
            escaped(source)
        );
        let shown: String = pictures.iter().map(|p| format!("\n![{0}]({0}.svg)\n", p.name)).collect();
        let markdown = format!(
            "# {title}\n\n{}.\n{shown}\nDrawn with seed {}: {RANGE}.\n\nTruth: {source}.\n",
            self.sentence(),
            self.seed
        );
        folder.write(names::COVERAGE, format!("{:#}\n", self.json()).as_bytes())?;
        folder.write("coverage.md", markdown.as_bytes())?;
        folder.write("coverage.html", page(&title, &body).as_bytes())?;
        for picture in &pictures {
            folder.write(&format!("{}.svg", picture.name), picture.svg.as_bytes())?;
        }
        Ok(())
    }
}

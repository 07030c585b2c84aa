//! The report as one JSON object.

use serde_json::{Value, json};

use super::{Finding, Report};
use crate::checks::Comparison;

impl Report {
    /// Every comparison of every check with its source.
    #[must_use]
    pub fn json(&self) -> Value {
        let kinds: Vec<Value> = (self.kinds().iter())
            .map(|(kind, all, passed)| json!({"kind": kind.words(), "checks": all, "passed": passed}))
            .collect();
        let (comparisons, within) = self.comparisons();
        json!({
            "program": {"name": "lenzbore", "version": self.version},
            "passed": self.passed(),
            "kinds": kinds,
            "comparisons": comparisons,
            "comparisons_passed": within,
            "time_s": self.seconds,
            "checks": self.findings.iter().map(finding).collect::<Vec<_>>(),
        })
    }
}

fn finding(finding: &Finding) -> Value {
    let source = finding.check.source;
    let verdict = finding.verdict.as_ref();
    json!({
        "name": finding.check.name,
        "about": finding.check.about,
        "kind": finding.check.kind.words(),
        "source": {
            "citation": source.citation,
            "obtained": source.obtained.words(),
            "uncertainty": source.uncertainty,
            "tolerance": source.tolerance,
        },
        "passed": finding.passed(),
        "fault": verdict.err().map(ToString::to_string),
        "time_s": finding.seconds,
        "comparisons": verdict.map_or_else(|_| Vec::new(), |v| v.comparisons.iter().map(comparison).collect()),
    })
}

pub(super) fn comparison(c: &Comparison) -> Value {
    json!({
        "what": c.what,
        "unit": c.unit,
        "reference": c.expected,
        "reference_known_within": c.known_within,
        "value": c.found,
        "band": c.band,
        "difference": c.difference(),
        "allowed": c.allowed,
        "passed": c.passes(),
    })
}

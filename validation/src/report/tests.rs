//! What a report says of checks that pass, fall short, or give no answer.
#![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

use lenzbore_solver::monitor::Unwatched;

use super::*;
use crate::references::{Obtained, Source};

static SOURCE: Source = Source {
    short: "A & B 1999",
    citation: "A. A, B. B, \"On <things>\", Journal 1 (1999), table 2",
    obtained: Obtained::Read,
    uncertainty: "half of the last figure",
    tolerance: "1 %",
};

fn good(_: &dyn Monitor) -> Result<Verdict, Error> {
    let mut verdict = Verdict::default();
    verdict.compare("first", 1.001, 1.0, 0.01, "N");
    verdict.compare("second", 2.0, 2.0, 0.01, "N");
    Ok(verdict)
}

fn bad(_: &dyn Monitor) -> Result<Verdict, Error> {
    let mut verdict = good(&Unwatched)?;
    verdict.compare("third|off by 3 %", 1.03, 1.0, 0.01, "N");
    Ok(verdict)
}

fn broken(_: &dyn Monitor) -> Result<Verdict, Error> {
    Err(Error::MissingFigure("drag"))
}

fn check(name: &'static str, kind: Kind, run: fn(&dyn Monitor) -> Result<Verdict, Error>) -> Check {
    Check { name, about: "something < something", kind, source: &SOURCE, run }
}

fn report(checks: &[Check]) -> Report {
    Report::run(checks, "9.9", &Unwatched).unwrap()
}

#[test]
fn all_forms_name_what_falls_short_and_what_failed() {
    let all = [
        check("good", Kind::CodeVerification, good),
        check("bad", Kind::Validation, bad),
        check("broken", Kind::CrossCheck, broken),
    ];
    let report = report(&all);
    assert!(!report.passed());
    assert_eq!(report.short().map(|f| f.check.name).collect::<Vec<_>>(), ["bad"]);
    assert_eq!(report.unanswered().map(|(f, _)| f.check.name).collect::<Vec<_>>(), ["broken"]);
    assert_eq!(report.comparisons(), (5, 4));
    let text = report.text();
    for part in [
        "passes (2 of 2)",
        "FALLS SHORT (2 of 3)",
        "NO ANSWER",
        "FAIL third|off by 3 %",
        "gave no answer",
        "1 of 3 checks pass",
    ] {
        assert!(text.contains(part), "{part} lacks in\n{text}");
    }
    let json = report.json();
    assert_eq!(json["passed"], false);
    assert_eq!(json["checks"][1]["comparisons"][2]["passed"], false);
    assert_eq!(json["checks"][2]["fault"], "the field solver gave no figure \"drag\"");
    let pictures = pictures::all(&report);
    assert_eq!(pictures.iter().map(|p| p.name).collect::<Vec<_>>(), ["differences"]);
    let markdown = report.markdown(&pictures);
    assert!(
        markdown.contains("| third\\|off by 3 % | 1 N | 1.03 | - | 3.0e-2 | 1.0e-2 | **falls short** |"),
        "{markdown}"
    );
    let html = report.html(&pictures);
    assert!(
        html.contains("something &lt; something") && html.contains("A &amp; B 1999") && html.contains("<svg"),
        "{html}"
    );
    assert!(!html.contains("<?xml") && !html.contains("src="), "one page, nothing to fetch");
}

#[test]
fn a_report_of_good_checks_passes_and_an_empty_one_does_not() {
    assert!(report(&[check("good", Kind::CodeVerification, good)]).passed());
    assert!(!report(&[]).passed());
}

#[test]
fn numbers_are_short_and_whole() {
    for (value, wanted) in [
        (0.0, "0"),
        (1.0, "1"),
        (-0.25, "-0.25"),
        (1_036.664_849_28, "1036.66485"),
        (3.132_5e-5, "3.1325e-5"),
        (2.5e7, "2.5e7"),
        (f64::NAN, "NaN"),
    ] {
        assert_eq!(number(value), wanted);
    }
}

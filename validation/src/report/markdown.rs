//! The report as Markdown.

use std::fmt::Write as _;

use lenzbore_io::picture::Picture;

use super::text::cells;
use super::{Finding, KINDS, Report};

const COLUMNS: &str =
    "| figure | reference | ours | band | difference | allowed | |\n| --- | --- | --- | --- | --- | --- | --- |\n";

impl Report {
    /// Summary, pictures by the names of their files, then every check with its source and all comparisons.
    #[must_use]
    pub fn markdown(&self, pictures: &[Picture]) -> String {
        let mut text = format!("# Published checks of lenzbore {}\n\n{}.\n\n", self.version, self.sentence());
        self.summary(&mut text, pictures);
        for finding in &self.findings {
            let check = finding.check;
            let (name, kind, about) = (check.name, check.kind.words(), check.about);
            let (word, seconds) = (finding.word(), finding.seconds);
            // Writing into a string cannot fail.
            let _ = writeln!(text, "\n## {name}\n\n{kind}: {about} ({word}; {seconds:.1} s).\n");
            source(&mut text, finding);
            comparisons(&mut text, finding);
        }
        text
    }

    /// The same without every comparison and without times: equal runs give equal texts. A chapter of the user guide.
    #[must_use]
    pub fn overview(&self, pictures: &[Picture]) -> String {
        let (all, within) = self.comparisons();
        let mut text = format!(
            "# The table of checks\n\nWritten by `lenzbore validate`, version {}: {} checks, {within} of {all} comparisons within \
             their limits.\n\n",
            self.version,
            self.findings.len()
        );
        self.summary(&mut text, pictures);
        for finding in &self.findings {
            let check = finding.check;
            let _ = writeln!(text, "\n## {}\n\n{}: {}.\n", check.name, check.kind.words(), check.about);
            source(&mut text, finding);
        }
        text
    }

    /// What the kinds are evidence for, a table of all checks, and the pictures.
    fn summary(&self, text: &mut String, pictures: &[Picture]) {
        for ((kind, meaning), (_, all, passed)) in KINDS.iter().zip(self.kinds()) {
            let _ = writeln!(text, "- **{}** ({passed} of {all} pass): {meaning}.", kind.words());
        }
        let _ = writeln!(
            text,
            "\nDifference = ours - reference. Each line shows the comparison that comes nearest to its limit.\n"
        );
        let _ = writeln!(
            text,
            "| check | kind | source | figure | reference | ours | band | difference | allowed | verdict |"
        );
        let _ = writeln!(text, "| --- | --- | --- | --- | --- | --- | --- | --- | --- | --- |");
        for finding in &self.findings {
            let check = finding.check;
            let worst = finding.verdict.as_ref().ok().and_then(|v| v.worst());
            let figure = worst.map_or("", |c| c.what.as_str()).replace('|', "\\|");
            let (link, kind, source) = (check.name, check.kind.words(), check.source.short);
            let _ = writeln!(
                text,
                "| [{link}](#{link}) | {kind} | {source} | {figure} | {} | {} |",
                worst.map(cells).unwrap_or_default().join(" | "),
                finding.word()
            );
        }
        for picture in pictures {
            let _ = writeln!(text, "\n![{}]({}.svg)", picture.name.replace('_', " "), picture.name);
        }
    }
}

/// Where the values come from and what they may differ by.
fn source(text: &mut String, finding: &Finding) {
    let source = finding.check.source;
    let _ = writeln!(text, "- Source: {}.", source.citation);
    let _ = writeln!(text, "- Values: {}; known to {}.", source.obtained.words(), source.uncertainty);
    let _ = writeln!(text, "- Allowed: {}.", source.tolerance);
}

fn comparisons(text: &mut String, finding: &Finding) {
    match &finding.verdict {
        Err(error) => {
            let _ = writeln!(text, "\nNo answer: {error}.");
        }
        Ok(verdict) => {
            text.push('\n');
            text.push_str(COLUMNS);
            for c in &verdict.comparisons {
                let mark = if c.passes() { "passes" } else { "**falls short**" };
                let _ = writeln!(text, "| {} | {} | {mark} |", c.what.replace('|', "\\|"), cells(c).join(" | "));
            }
        }
    }
}

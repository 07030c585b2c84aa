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
        // Writing into a string cannot fail.
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
        for finding in &self.findings {
            section(&mut text, finding);
        }
        text
    }
}

fn section(text: &mut String, finding: &Finding) {
    let (check, source) = (finding.check, finding.check.source);
    let _ = writeln!(
        text,
        "\n## {}\n\n{}: {} ({}; {:.1} s).\n",
        check.name,
        check.kind.words(),
        check.about,
        finding.word(),
        finding.seconds
    );
    let _ = writeln!(text, "- Source: {}.", source.citation);
    let _ = writeln!(text, "- Values: {}; known to {}.", source.obtained.words(), source.uncertainty);
    let _ = writeln!(text, "- Allowed: {}.\n", source.tolerance);
    match &finding.verdict {
        Err(error) => {
            let _ = writeln!(text, "No answer: {error}.");
        }
        Ok(verdict) => {
            text.push_str(COLUMNS);
            for c in &verdict.comparisons {
                let mark = if c.passes() { "passes" } else { "**falls short**" };
                let _ = writeln!(text, "| {} | {} | {mark} |", c.what.replace('|', "\\|"), cells(c).join(" | "));
            }
        }
    }
}

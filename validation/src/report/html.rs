//! The report as one page that needs nothing else: pictures are in it.

use std::fmt::Write as _;

use lenzbore_io::picture::Picture;

use super::text::cells;
use super::{Finding, KINDS, Report};

/// Looks of the page.
const STYLE: &str = "body{font:15px/1.5 Arial,Helvetica,sans-serif;color:#222;max-width:76em;margin:2em auto;padding:0 1em}\
h1{font-size:1.6em}h2{font-size:1.15em;margin-top:2em}table{border-collapse:collapse;font-size:.87em;font-variant-numeric:tabular-nums}\
th,td{text-align:left;padding:.2em .7em;border-bottom:1px solid #ddd;vertical-align:top}td.n{text-align:right;white-space:nowrap}\
.bad{color:#8c1d18;font-weight:bold}.pictures{display:flex;flex-wrap:wrap;gap:1em;align-items:flex-start}.pictures svg{width:23.4em;height:auto}\
.wide{overflow-x:auto}details{margin:.5em 0}summary{cursor:pointer}@media print{details{display:block}}";

/// A whole page around `body`.
pub(super) fn page(title: &str, body: &str) -> String {
    let title = escaped(title);
    format!(
        "<!doctype html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">\n<meta name=\"viewport\" content=\"width=device-width\">\n\
         <title>{title}</title>\n<style>{STYLE}</style>\n</head>\n<body>\n<h1>{title}</h1>\n{body}</body>\n</html>\n"
    )
}

/// The pictures side by side.
pub(super) fn inline(pictures: &[Picture]) -> String {
    let drawing = |p: &Picture| p.svg.find("<svg").map_or(String::new(), |start| p.svg[start..].to_owned());
    format!("<div class=\"pictures\">\n{}</div>\n", pictures.iter().map(drawing).collect::<String>())
}

pub(super) fn escaped(text: &str) -> String {
    text.replace('&', "&amp;").replace('<', "&lt;").replace('>', "&gt;").replace('"', "&quot;")
}

impl Report {
    /// Summary, pictures, then every check with its source and all comparisons.
    #[must_use]
    pub fn html(&self, pictures: &[Picture]) -> String {
        let mut body = format!("<p>{}.</p>\n<ul>\n", escaped(&self.sentence()));
        // Writing into a string cannot fail.
        for ((kind, meaning), (_, all, passed)) in KINDS.iter().zip(self.kinds()) {
            let _ = writeln!(body, "<li><b>{}</b> ({passed} of {all} pass): {meaning}.</li>", kind.words());
        }
        body.push_str("</ul>\n");
        body.push_str(&inline(pictures));
        body.push_str(
            "<p>Difference = ours - reference. Each line shows the comparison that comes nearest to its limit.</p>\n",
        );
        body.push_str("<div class=\"wide\"><table>\n<tr><th>check<th>kind<th>source<th>figure<th>reference<th>ours<th>band<th>difference<th>allowed<th>verdict</tr>\n");
        for finding in &self.findings {
            let check = finding.check;
            let worst = finding.verdict.as_ref().ok().and_then(|v| v.worst());
            let _ = writeln!(
                body,
                "<tr><td><a href=\"#{name}\">{name}</a><td>{}<td>{}<td>{}{}{}</tr>",
                check.kind.words(),
                escaped(check.source.short),
                escaped(worst.map_or("", |c| c.what.as_str())),
                numbers(&worst.map(cells).unwrap_or_default()),
                marked(finding.passed(), finding.word()),
                name = check.name,
            );
        }
        body.push_str("</table></div>\n");
        for finding in &self.findings {
            section(&mut body, finding);
        }
        page(&format!("Published checks of lenzbore {}", self.version), &body)
    }
}

fn numbers(cells: &[String; 5]) -> String {
    cells.iter().fold(String::new(), |row, cell| row + "<td class=\"n\">" + &escaped(cell))
}

fn marked(good: bool, word: &str) -> String {
    format!("<td{}>{word}", if good { "" } else { " class=\"bad\"" })
}

fn section(body: &mut String, finding: &Finding) {
    let (check, source) = (finding.check, finding.check.source);
    let _ = writeln!(
        body,
        "<h2 id=\"{0}\">{0}</h2>\n<p>{1}: {2} ({3}; {4:.1} s).</p>\n<ul>",
        check.name,
        check.kind.words(),
        escaped(check.about),
        finding.word(),
        finding.seconds
    );
    let _ = writeln!(body, "<li>Source: {}.</li>", escaped(source.citation));
    let _ = writeln!(body, "<li>Values: {}; known to {}.</li>", source.obtained.words(), escaped(source.uncertainty));
    let _ = writeln!(body, "<li>Allowed: {}.</li>\n</ul>", escaped(source.tolerance));
    match &finding.verdict {
        Err(error) => {
            let _ = writeln!(body, "<p class=\"bad\">No answer: {}.</p>", escaped(&error.to_string()));
        }
        Ok(verdict) => {
            let open = if verdict.passed() { "" } else { " open" };
            let _ = writeln!(
                body,
                "<details{open}><summary>{} comparisons</summary>\n<div class=\"wide\"><table>",
                verdict.comparisons.len()
            );
            body.push_str("<tr><th>figure<th>reference<th>ours<th>band<th>difference<th>allowed<th></tr>\n");
            for c in &verdict.comparisons {
                let word = if c.passes() { "passes" } else { "falls short" };
                let _ = writeln!(
                    body,
                    "<tr><td>{}{}{}</tr>",
                    escaped(&c.what),
                    numbers(&cells(c)),
                    marked(c.passes(), word)
                );
            }
            body.push_str("</table></div></details>\n");
        }
    }
}

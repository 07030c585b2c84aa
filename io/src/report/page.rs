//! The page itself: head, contents, sections, data, scripts, and a policy by which it can load nothing and run nothing else.

use base64::Engine as _;
use base64::engine::general_purpose::STANDARD;
use sha2::{Digest, Sha256};

use super::chart::Charts;
use super::escape::{json, text};
use super::sections::{Section, record};
use super::source::Source;

const PAGE: &str = include_str!("page/page.html");
const STYLE: &str = include_str!("page/page.css");
/// The charting library, as its makers publish it: see `vendor/README.md`.
const LIBRARY: &str = include_str!("vendor/plotly-cartesian.min.js");
/// Our own scripts, in the order in which they run.
const SCRIPTS: [&str; 4] = [
    include_str!("page/charts.js"),
    include_str!("page/unpack.js"),
    include_str!("page/player.js"),
    include_str!("page/page.js"),
];

/// The whole page.
pub(super) fn page(source: &Source, sections: &[Section], charts: &Charts) -> String {
    let script = format!("\"use strict\";\n(() => {{\n{}}})();\n", SCRIPTS.concat());
    let title = text(&title(source));
    let policy = format!(
        "default-src 'none'; script-src {} {}; style-src 'unsafe-inline'; img-src data: blob:; base-uri 'none'; form-action 'none'",
        hash(LIBRARY),
        hash(&script)
    );
    let contents: String =
        sections.iter().map(|s| format!("<li><a href=\"#{}\">{}</a></li>\n", s.id, text(&s.heading))).collect();
    let body: String = sections.iter().map(section).collect();
    // What a result says goes in last, so that nothing in it is taken for a place of the page.
    let fixed = [("policy", policy.as_str()), ("style", STYLE)];
    let open = fixed.iter().fold(PAGE.to_owned(), |page, (name, with)| page.replace(&format!("{{{{{name}}}}}"), with));
    fill(
        &open,
        &[
            ("title", &title),
            ("kind", &text(&kind(source))),
            ("record", &record::line(source)),
            ("contents", &contents),
            ("sections", &body),
            ("charts", &json(charts)),
            ("library", LIBRARY),
            ("script", &script),
            ("foot", &foot(source)),
        ],
    )
}

/// Puts texts into the places of a page, in one pass.
fn fill(page: &str, places: &[(&str, &str)]) -> String {
    let mut out = String::with_capacity(page.len() + places.iter().map(|p| p.1.len()).sum::<usize>());
    let mut rest = page;
    while let Some(start) = rest.find("{{") {
        let Some(end) = rest[start..].find("}}").map(|e| start + e) else { break };
        out.push_str(&rest[..start]);
        let name = &rest[start + 2..end];
        match places.iter().find(|p| p.0 == name) {
            Some((_, with)) => out.push_str(with),
            None => out.push_str(&rest[start..end + 2]),
        }
        rest = &rest[end + 2..];
    }
    out.push_str(rest);
    out
}

fn section(section: &Section) -> String {
    format!(
        "<section id=\"{id}\" aria-labelledby=\"{id}-heading\">\n<h2 id=\"{id}-heading\">{}</h2>\n{}</section>\n",
        text(&section.heading),
        section.html,
        id = section.id
    )
}

fn title(source: &Source) -> String {
    let title = source.text("title");
    if title.is_empty() { "Result".to_owned() } else { title.to_owned() }
}

/// What was asked, in words.
fn kind(source: &Source) -> String {
    let words = if source.part("points").is_some() {
        "A table held against the field solution"
    } else if source.part("ladder").is_some() {
        "Simplified models, one step at a time, up to the field solution"
    } else if source.part("curve").is_some() {
        "Drag against speed, settled fields in an endless wall"
    } else {
        match source.law() {
            "steady" => "Uniform speed, settled fields",
            "traverse" => "Uniform speed through the wall",
            "free" => "Travel by the equation of motion",
            "sine" => "Strokes to and fro, settled",
            "table" => "Travel by a given motion",
            "alternating" => "Coils at rest with alternating current",
            _ => "Result of a run",
        }
    };
    words.to_owned()
}

fn foot(source: &Source) -> String {
    let of = |key: &str| source.part("program").and_then(|p| p.get(key)).and_then(|v| v.as_str()).unwrap_or("");
    format!(
        "<p>Computed by {} {}. Case digest <code>{}</code>.</p>\n<p>Charts: plotly.js 4.1.1, \u{a9} Plotly, Inc., MIT licence.</p>\n",
        text(of("name")),
        text(of("version")),
        text(source.text("digest"))
    )
}

/// The hash by which the policy knows a script.
fn hash(script: &str) -> String {
    format!("'sha256-{}'", STANDARD.encode(Sha256::digest(script.as_bytes())))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn places_are_filled_once() {
        assert_eq!(fill("a{{x}}b{{y}}c{{z}}", &[("x", "{{y}}"), ("y", "2")]), "a{{y}}b2c{{z}}");
    }

    #[test]
    fn the_library_is_the_one_that_its_note_names() {
        let hex: String = Sha256::digest(LIBRARY.as_bytes()).iter().map(|b| format!("{b:02x}")).collect();
        assert!(include_str!("vendor/README.md").contains(&hex), "{hex}");
    }

    #[test]
    fn the_library_cannot_end_its_element() {
        assert!(!LIBRARY.to_lowercase().contains("</script"));
        assert!(SCRIPTS.iter().all(|s| !s.to_lowercase().contains("</script")));
    }
}

//! Cautions: those of the case and the run, what the model leaves out, and those that belong to every such brake.

use super::Section;
use crate::report::escape::text;
use crate::report::source::Source;

/// What goes with every result of this kind.
const ALWAYS: [&str; 4] = [
    "Strong magnets pinch and pull from a distance, and disturb implants, instruments and cards.",
    "Walls get hot: let them cool before touching, and heed what is mounted on them.",
    "An eddy-current brake holds nothing at rest, and fades as its wall warms up.",
    "A life-safety brake is designed and approved by licensed engineers under the local code. The figures here are model results, not an approval.",
];

/// The section; it is never left out.
pub(super) fn section(source: &Source) -> Option<Section> {
    let mut html = String::new();
    html.push_str(&list("Of this result", &source.texts("cautions")));
    html.push_str(&list("Not modelled", &source.texts("not_modelled")));
    html.push_str(&list("Of every such brake", &ALWAYS));
    Some(Section::new("cautions", "Cautions", html))
}

fn list(heading: &str, items: &[&str]) -> String {
    if items.is_empty() {
        return String::new();
    }
    let items: String = items.iter().map(|i| format!("<li>{}</li>\n", text(i))).collect();
    format!("<h3>{}</h3>\n<ul>\n{items}</ul>\n", text(heading))
}

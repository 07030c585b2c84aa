//! A small SVG writer. Lengths are in tenths of a millimetre on paper, y downward.
//!
//! The same calls give the same bytes: numbers are rounded to a micrometre on paper, and names are counted.

use std::fmt::Write as _;

use base64::Engine as _;
use base64::engine::general_purpose::STANDARD;

use super::letters::{self, Run};

/// The faces asked for: the first that a machine has, all of the same widths; the bundled one answers to the last.
const FAMILY: &str = "Arial, Helvetica, Liberation Sans, sans-serif";

/// How a line is drawn.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Stroke {
    /// Colour, `#rrggbb`.
    pub colour: &'static str,
    /// Width, 0.1 mm.
    pub width: f64,
    /// Dash pattern, 0.1 mm; empty for a full line.
    pub dash: &'static str,
    /// 0 to 1.
    pub opacity: f64,
}

impl Stroke {
    /// A full line.
    #[must_use]
    pub const fn full(colour: &'static str, width: f64) -> Self {
        Self { colour, width, dash: "", opacity: 1.0 }
    }

    /// A broken line.
    #[must_use]
    pub const fn dashed(colour: &'static str, width: f64, dash: &'static str) -> Self {
        Self { colour, width, dash, opacity: 1.0 }
    }

    fn attributes(&self) -> String {
        let mut text = format!("stroke=\"{}\" stroke-width=\"{}\"", self.colour, short(self.width));
        if !self.dash.is_empty() {
            let _ = write!(text, " stroke-dasharray=\"{}\"", self.dash);
        }
        if self.opacity < 1.0 {
            let _ = write!(text, " stroke-opacity=\"{}\"", short(self.opacity));
        }
        text
    }
}

/// Which side of its point a text stands on.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Anchor {
    /// The point is its left end.
    Start,
    /// The point is its middle.
    Middle,
    /// The point is its right end.
    End,
}

/// How a text is set.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Type {
    /// Letter size, 0.1 mm.
    pub size: f64,
    /// Bold face.
    pub bold: bool,
    /// Colour.
    pub colour: &'static str,
    /// Side of the point.
    pub anchor: Anchor,
    /// Turned a quarter against the clock, to be read from the right.
    pub upright: bool,
    /// A rim of this colour keeps it readable over lines; empty for none.
    pub rim: &'static str,
}

impl Type {
    /// Dark letters of `size`, starting at the point.
    #[must_use]
    pub const fn plain(size: f64) -> Self {
        Self { size, bold: false, colour: "#222222", anchor: Anchor::Start, upright: false, rim: "" }
    }

    /// The same, on another side of the point.
    #[must_use]
    pub const fn anchored(mut self, anchor: Anchor) -> Self {
        self.anchor = anchor;
        self
    }
}

/// A drawing under way.
#[derive(Debug, Clone)]
pub struct Svg {
    width: f64,
    body: String,
    definitions: String,
    names: usize,
}

impl Svg {
    /// An empty sheet of `width` tenths of a millimetre; its height is told at the end.
    #[must_use]
    pub fn new(width: f64) -> Self {
        Self { width, body: String::new(), definitions: String::new(), names: 0 }
    }

    /// A rectangle from corner to corner; `fill` `none` for an outline only.
    pub fn rectangle(&mut self, x0: f64, y0: f64, x1: f64, y1: f64, fill: &str, stroke: Option<Stroke>) {
        let stroke = stroke.map_or_else(String::new, |s| s.attributes());
        let (x, y, w, h) = (short(x0.min(x1)), short(y0.min(y1)), short((x1 - x0).abs()), short((y1 - y0).abs()));
        self.push(&format!("<rect x=\"{x}\" y=\"{y}\" width=\"{w}\" height=\"{h}\" fill=\"{fill}\" {stroke}/>"));
    }

    /// A straight line.
    pub fn line(&mut self, from: (f64, f64), to: (f64, f64), stroke: Stroke) {
        let (x1, y1, x2, y2) = (short(from.0), short(from.1), short(to.0), short(to.1));
        self.push(&format!("<line x1=\"{x1}\" y1=\"{y1}\" x2=\"{x2}\" y2=\"{y2}\" {}/>", stroke.attributes()));
    }

    /// An open path; `d` as from [`polyline`].
    pub fn path(&mut self, d: &str, stroke: Stroke) {
        let stroke = stroke.attributes();
        self.push(&format!("<path d=\"{d}\" fill=\"none\" stroke-linejoin=\"round\" {stroke}/>"));
    }

    /// A filled area.
    pub fn area(&mut self, d: &str, fill: &str, opacity: f64, stroke: Option<Stroke>) {
        let stroke = stroke.map_or_else(String::new, |s| s.attributes());
        let opacity = if opacity < 1.0 { format!("fill-opacity=\"{}\"", short(opacity)) } else { String::new() };
        self.push(&format!("<path d=\"{d}\" fill=\"{fill}\" {opacity} {stroke}/>"));
    }

    /// A circle.
    pub fn circle(&mut self, centre: (f64, f64), radius: f64, fill: &str, stroke: Option<Stroke>) {
        let stroke = stroke.map_or_else(String::new, |s| s.attributes());
        let (x, y, r) = (short(centre.0), short(centre.1), short(radius));
        self.push(&format!("<circle cx=\"{x}\" cy=\"{y}\" r=\"{r}\" fill=\"{fill}\" {stroke}/>"));
    }

    /// A text with its base line at `y`; `_{..}` lowers and `^{..}` raises.
    pub fn text(&mut self, x: f64, y: f64, text: &str, kind: Type) {
        let anchor = match kind.anchor {
            Anchor::Start => "",
            Anchor::Middle => " text-anchor=\"middle\"",
            Anchor::End => " text-anchor=\"end\"",
        };
        let (px, py) = (short(x), short(y));
        let turn = if kind.upright { format!(" transform=\"rotate(-90 {px} {py})\"") } else { String::new() };
        let weight = if kind.bold { " font-weight=\"bold\"" } else { "" };
        let rim = if kind.rim.is_empty() {
            String::new()
        } else {
            format!(
                " stroke=\"{}\" stroke-width=\"{}\" stroke-linejoin=\"round\" paint-order=\"stroke\"",
                kind.rim,
                short(0.28 * kind.size)
            )
        };
        let spans = spans(text, kind.size);
        self.push(&format!(
            "<text x=\"{px}\" y=\"{py}\" font-size=\"{}\" fill=\"{}\"{weight}{anchor}{turn}{rim}>{spans}</text>",
            short(kind.size),
            kind.colour
        ));
    }

    /// A raster picture stretched over a rectangle.
    pub fn raster(&mut self, x: f64, y: f64, width: f64, height: f64, png: &[u8]) {
        let data = STANDARD.encode(png);
        self.push(&format!(
            "<image x=\"{}\" y=\"{}\" width=\"{}\" height=\"{}\" preserveAspectRatio=\"none\" xlink:href=\"data:image/png;base64,{data}\"/>",
            short(x), short(y), short(width), short(height)
        ));
    }

    /// Opens a group with attributes of its own.
    pub fn open(&mut self, attributes: &str) {
        self.push(&format!("<g {attributes}>"));
    }

    /// Closes the group opened last.
    pub fn close(&mut self) {
        self.push("</g>");
    }

    /// Repeats the element of that name with a transform.
    pub fn again(&mut self, name: &str, transform: &str) {
        self.push(&format!("<use xlink:href=\"#{name}\" transform=\"{transform}\"/>"));
    }

    /// A name not used before in this drawing.
    pub fn name(&mut self, stem: &str) -> String {
        self.names += 1;
        format!("{stem}{}", self.names)
    }

    /// Defines a clipping area and gives its name.
    pub fn clip(&mut self, d: &str) -> String {
        let name = self.name("clip");
        let _ = writeln!(self.definitions, "<clipPath id=\"{name}\"><path d=\"{d}\"/></clipPath>");
        name
    }

    /// Adds a definition as it stands.
    pub fn define(&mut self, element: &str) {
        self.definitions.push_str(element);
        self.definitions.push('\n');
    }

    /// The finished drawing on white, `height` tenths of a millimetre high.
    #[must_use]
    pub fn finish(self, height: f64, title: &str, description: &str) -> String {
        let (w, h) = (short(self.width), short(height));
        format!(
            "<?xml version=\"1.0\" encoding=\"utf-8\"?>\n\
             <svg xmlns=\"http://www.w3.org/2000/svg\" xmlns:xlink=\"http://www.w3.org/1999/xlink\" \
             width=\"{}mm\" height=\"{}mm\" viewBox=\"0 0 {w} {h}\" font-family=\"{FAMILY}\">\n\
             <title>{}</title>\n<desc>{}</desc>\n<defs>\n{}</defs>\n\
             <rect width=\"{w}\" height=\"{h}\" fill=\"#ffffff\"/>\n{}</svg>\n",
            short(0.1 * self.width),
            short(0.1 * height),
            escaped(title),
            escaped(description),
            self.definitions,
            self.body
        )
    }

    fn push(&mut self, element: &str) {
        self.body.push_str(element);
        self.body.push('\n');
    }
}

/// Path data through points.
#[must_use]
pub fn polyline(points: &[(f64, f64)]) -> String {
    let mut d = String::new();
    for (i, (x, y)) in points.iter().enumerate() {
        let _ = write!(d, "{}{} {}", if i == 0 { "M" } else { "L" }, short(*x), short(*y));
    }
    d
}

/// Path data of a closed area through points.
#[must_use]
pub fn polygon(points: &[(f64, f64)]) -> String {
    polyline(points) + "Z"
}

/// A number with at most two decimals and no idle zeros.
#[must_use]
pub fn short(value: f64) -> String {
    let text = format!("{value:.2}");
    let text = text.trim_end_matches('0').trim_end_matches('.');
    if text == "-0" { "0".to_owned() } else { text.to_owned() }
}

/// Text with what XML gives a meaning to written out; control signs, which it forbids, left out.
fn escaped(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for c in text.chars() {
        match c {
            '&' => out.push_str("&amp;"),
            '<' => out.push_str("&lt;"),
            '>' => out.push_str("&gt;"),
            '"' => out.push_str("&quot;"),
            c if c.is_control() || matches!(c, '\u{fffe}' | '\u{ffff}') => out.push(' '),
            c => out.push(c),
        }
    }
    out
}

/// Lowered and raised runs as spans of smaller letters.
fn spans(text: &str, size: f64) -> String {
    let mut out = String::new();
    let mut level = 0.0;
    for Run { text, shift, scale } in letters::runs(text) {
        let move_by = (level - shift) * size;
        level = shift;
        let plain = move_by.abs() < 1e-9 && (scale - 1.0).abs() < 1e-9;
        if plain {
            out.push_str(&escaped(text));
        } else {
            let _ = write!(
                out,
                "<tspan dy=\"{}\" font-size=\"{}\">{}</tspan>",
                short(move_by),
                short(scale * size),
                escaped(text)
            );
        }
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_are_short() {
        assert_eq!(short(12.0), "12");
        assert_eq!(short(-0.001), "0");
        assert_eq!(short(3.14259), "3.14");
        assert_eq!(short(0.1), "0.1");
    }

    #[test]
    fn a_users_text_cannot_break_the_file() {
        let mut svg = Svg::new(100.0);
        svg.text(0.0, 0.0, "a<b & \"c\" \u{1} ]]>", Type::plain(26.0));
        let text = svg.finish(50.0, "<x>", "&");
        assert!(resvg::usvg::Tree::from_str(&text, &resvg::usvg::Options::default()).is_ok(), "{text}");
    }

    #[test]
    fn lowered_letters_return_to_the_base_line() {
        assert_eq!(
            spans("J_{phi}, A", 10.0),
            "J<tspan dy=\"2\" font-size=\"7\">phi</tspan><tspan dy=\"-2\" font-size=\"10\">, A</tspan>"
        );
    }
}

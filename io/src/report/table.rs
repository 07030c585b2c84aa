//! Tables of the page.

use std::fmt::Write as _;

use super::escape::text;

/// A table with a caption for those who cannot see the page; numbers stand to the right.
pub(super) struct HtmlTable {
    caption: String,
    head: Vec<String>,
    body: String,
}

/// One cell.
pub(super) enum Cell {
    /// Any text.
    Text(String),
    /// A number, as shown.
    Number(String),
}

impl Cell {
    /// A text.
    pub(super) fn text(raw: &str) -> Self {
        Self::Text(raw.to_owned())
    }
}

impl HtmlTable {
    /// An empty table.
    pub(super) fn new(caption: &str, head: &[&str]) -> Self {
        Self { caption: caption.to_owned(), head: head.iter().map(|h| (*h).to_owned()).collect(), body: String::new() }
    }

    /// Adds a row; its first cell is its heading.
    pub(super) fn row(&mut self, cells: &[Cell]) {
        self.body.push_str("<tr>");
        for (i, cell) in cells.iter().enumerate() {
            let (tag, rest) = if i == 0 { ("th scope=\"row\"", "th") } else { ("td", "td") };
            // Writing into a string cannot fail.
            let _ = match cell {
                Cell::Text(raw) => write!(self.body, "<{tag}>{}</{rest}>", text(raw)),
                Cell::Number(raw) => write!(self.body, "<{tag} class=\"n\">{}</{rest}>", text(raw)),
            };
        }
        self.body.push_str("</tr>\n");
    }

    /// The table; wide ones scroll within their own frame.
    pub(super) fn html(&self) -> String {
        let head: String = self.head.iter().map(|h| format!("<th scope=\"col\">{}</th>", text(h))).collect();
        format!(
            "<div class=\"wide\" tabindex=\"0\" role=\"region\" aria-label=\"{caption}\"><table>\n<caption class=\"unseen\">{caption}</caption>\n\
             <thead><tr>{head}</tr></thead>\n<tbody>\n{}</tbody></table></div>\n",
            self.body,
            caption = text(&self.caption),
        )
    }

    /// The table behind a line that opens it.
    pub(super) fn folded(&self, line: &str) -> String {
        format!("<details><summary>{}</summary>\n{}</details>\n", text(line), self.html())
    }
}

//! What users wrote, made harmless: as text of a page, and as JSON within a script element.

use serde::Serialize;

/// Text as it may stand between tags and within quoted attributes; control signs become blanks.
pub(super) fn text(raw: &str) -> String {
    let mut out = String::with_capacity(raw.len());
    for c in raw.chars() {
        match c {
            '&' => out.push_str("&amp;"),
            '<' => out.push_str("&lt;"),
            '>' => out.push_str("&gt;"),
            '"' => out.push_str("&quot;"),
            '\'' => out.push_str("&#39;"),
            '\n' | '\t' => out.push(c),
            c if c.is_control() || is_bidirectional(c) => out.push(' '),
            c => out.push(c),
        }
    }
    out
}

/// Marks that turn the reading direction, by which a text can be made to look like another.
fn is_bidirectional(c: char) -> bool {
    matches!(c, '\u{202a}'..='\u{202e}' | '\u{2066}'..='\u{2069}' | '\u{200e}' | '\u{200f}')
}

/// JSON that cannot end its script element or begin another: every `<` is written out, so is what JavaScript takes for a line end.
pub(super) fn json<T: Serialize>(value: &T) -> String {
    let plain = serde_json::to_string(value).unwrap_or_else(|_| "null".to_owned());
    plain.replace('<', "\\u003c").replace('\u{2028}', "\\u2028").replace('\u{2029}', "\\u2029")
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use super::*;

    #[test]
    fn no_tag_or_quote_survives() {
        let hostile = "</script><img src=x onerror='alert(1)'>\"&\u{202e}\u{1}";
        assert_eq!(text(hostile), "&lt;/script&gt;&lt;img src=x onerror=&#39;alert(1)&#39;&gt;&quot;&amp;  ");
    }

    #[test]
    fn json_keeps_its_meaning_and_never_holds_a_tag() {
        let hostile = "</script><!--<script>\u{2028}";
        let written = json(&hostile);
        assert!(!written.contains('<') && !written.contains('\u{2028}'));
        assert_eq!(serde_json::from_str::<String>(&written).unwrap(), hostile);
    }
}

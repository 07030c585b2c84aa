//! From the bytes of a file to text: byte-order marks, UTF-16, and the 8-bit text of older programs.

/// The text, and what was taken for granted in reading it. A UTF-8 byte-order mark is taken off.
pub(super) fn decode(bytes: &[u8]) -> (String, Option<&'static str>) {
    match bytes {
        [0xef, 0xbb, 0xbf, rest @ ..] => plain(rest),
        [0xff, 0xfe, rest @ ..] => (wide(rest, u16::from_le_bytes), None),
        [0xfe, 0xff, rest @ ..] => (wide(rest, u16::from_be_bytes), None),
        _ => plain(bytes),
    }
}

fn plain(bytes: &[u8]) -> (String, Option<&'static str>) {
    match std::str::from_utf8(bytes) {
        Ok(text) => (text.to_owned(), None),
        // ISO 8859-1: every byte is the character of that number; it has the degree sign, the micro sign and superscripts.
        Err(_) => {
            let text = bytes.iter().map(|b| char::from(*b)).collect();
            (text, Some("the table is not UTF-8: its letters beyond ASCII were read as ISO 8859-1"))
        }
    }
}

fn wide(bytes: &[u8], of: fn([u8; 2]) -> u16) -> String {
    let units: Vec<u16> = bytes.chunks_exact(2).map(|pair| of([pair[0], pair[1]])).collect();
    String::from_utf16_lossy(&units)
}

//! Keeps a test's pictures for a look at them: set `LENZBORE_PICTURES` to a folder.

#![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

use super::Picture;

/// Writes SVG and PNG where asked to, and renders in any case: a picture that cannot be rendered fails the test.
pub(crate) fn keep(picture: &Picture) {
    // 1.4 mm are 4 points: raised and lowered letters, the least that print shows.
    assert!(smallest_letters(picture) >= 14.0, "{}: letters of {}", picture.name, smallest_letters(picture));
    let png = picture.png().unwrap();
    assert!(png.len() > 5_000, "an empty sheet?");
    if let Some(folder) = std::env::var_os("LENZBORE_PICTURES") {
        let stem = std::path::Path::new(&folder).join(picture.name);
        std::fs::create_dir_all(&folder).unwrap();
        std::fs::write(stem.with_extension("svg"), &picture.svg).unwrap();
        std::fs::write(stem.with_extension("png"), png).unwrap();
    }
}

/// Size of the smallest letters, 0.1 mm at column width.
fn smallest_letters(picture: &Picture) -> f64 {
    let sizes =
        picture.svg.split("font-size=\"").skip(1).filter_map(|rest| rest.split('"').next()?.parse::<f64>().ok());
    sizes.fold(f64::INFINITY, f64::min)
}

/// All words in a picture, lines joined by blanks.
pub(crate) fn words(picture: &Picture) -> String {
    let mut out = String::new();
    let mut in_tag = false;
    for c in picture.svg.chars() {
        match c {
            '<' => in_tag = true,
            '>' => in_tag = false,
            '\n' => out.push(' '),
            c if !in_tag => out.push(c),
            _ => {}
        }
    }
    out
}

/// Whether any coordinate came out as NaN or infinite.
pub(crate) fn has_non_numbers(picture: &Picture) -> bool {
    ["NaN", "inf\"", "inf ", "infL"].iter().any(|bad| picture.svg.contains(bad))
}

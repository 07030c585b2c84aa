//! The book that comes with the program, and own materials from a file.

use std::path::Path;
use std::sync::LazyLock;

use super::grade::Book;
use super::read::read_document;
use crate::message::{CaseFault, Diagnostic, Diagnostics, Sources};

/// The files of the book, each with its own sources.
pub(super) const FILES: [(&str, &str); 2] = [
    ("material book, conductors", include_str!("book/conductors.toml")),
    ("material book, magnets", include_str!("book/magnets.toml")),
];

static BOOK: LazyLock<Book> = LazyLock::new(|| {
    #[expect(clippy::expect_used, reason = "the book is compiled in, and a test reads it")]
    read_book().expect("the compiled-in material book reads")
});

/// The material book that comes with the program.
#[must_use]
pub fn book() -> &'static Book {
    &BOOK
}

pub(super) fn read_book() -> Result<Book, Diagnostics> {
    let mut book = Book::default();
    for (label, text) in FILES {
        let mut sources = Sources::default();
        match read_document(label, text, None, &mut sources) {
            Ok(part) => book = book.with(&part),
            Err(faults) => return Err(Diagnostics::new(sources, faults)),
        }
    }
    Ok(book)
}

/// Reads own materials from a text, in the book's own format. The text is added to `sources`, so that places point into
/// it.
///
/// # Errors
/// Every fault at once; a name that the book has is one.
pub(crate) fn own_materials(label: &str, text: &str, sources: &mut Sources) -> Result<Book, Vec<Diagnostic>> {
    read_document(label, text, Some(book()), sources)
}

/// Reads a file of own materials.
///
/// # Errors
/// Every fault of the file at once, each with its place, what would be legal and the mend.
pub fn read_own_materials(path: &Path) -> Result<Book, Diagnostics> {
    let label = path.display().to_string();
    let text = crate::case::text_of(path)
        .map_err(|why| Diagnostics::of_input(CaseFault::UnreadableFile { path: label.clone(), why }))?;
    let mut sources = Sources::default();
    own_materials(&label, &text, &mut sources).map_err(|faults| Diagnostics::new(sources, faults))
}

//! Messages that point: every fault of an input at once, each with file, line and column, the words it is about, what
//! would be legal, and the mend.

mod diagnostics;
mod fault;
mod nearest;
mod place;
mod render;

pub use diagnostics::{Diagnostic, Diagnostics};
pub use fault::CaseFault;
pub use nearest::nearest;
pub use place::{Place, Position, SourceKind, SourceText, Sources};

#[cfg(test)]
mod tests;

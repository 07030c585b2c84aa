//! What can go wrong when a result leaves the program, in the user's nouns.

use std::io;
use std::path::{Path, PathBuf};

/// A result could not be written. Whatever the reason, no half-written result folder stays behind.
#[derive(Debug, thiserror::Error)]
#[non_exhaustive]
pub enum IoFault {
    /// The result folder is there already and nobody asked to replace it.
    #[error("the result folder {} exists already: name another with --out, or say --replace", .folder.display())]
    Exists {
        /// The folder.
        folder: PathBuf,
    },
    /// A file stands where the result folder should go.
    #[error("{} is a file, so no result folder can take its place: name another with --out", .path.display())]
    IsAFile {
        /// The file.
        path: PathBuf,
    },
    /// Asked to replace a folder that no run has written.
    #[error("{} holds no result of a run, so --replace leaves it alone: name another folder with --out", .folder.display())]
    NotAResult {
        /// The folder.
        folder: PathBuf,
    },
    /// The path names no folder that could be made (it is empty, or the root).
    #[error("'{}' names no folder that a result could be written to", .path.display())]
    NoName {
        /// The path as given.
        path: PathBuf,
    },
    /// Writing there is not permitted.
    #[error("no permission to write {}", .path.display())]
    NoPermission {
        /// The file or folder.
        path: PathBuf,
    },
    /// The disk (or the user's share of it) is full.
    #[error("the disk is full: {} could not be written; nothing was kept", .path.display())]
    DiskFull {
        /// The file or folder.
        path: PathBuf,
    },
    /// Any other trouble with the file system.
    #[error("{} could not be written: {source}", .path.display())]
    File {
        /// The file or folder.
        path: PathBuf,
        /// What the system said.
        source: io::Error,
    },
    /// The HDF5 library refused.
    #[error("{} could not be written: {source}", .path.display())]
    FieldFile {
        /// The HDF5 file.
        path: PathBuf,
        /// What the library said.
        source: hdf5::Error,
    },
    /// A number that is to be written is no number.
    #[error("{what} came out as {found}, which is no number a result may hold: a fault of the program")]
    NotFinite {
        /// Which number.
        what: String,
        /// The value found: NaN, inf or -inf.
        found: f64,
    },
    /// Arrays that belong together differ in length.
    #[error("{what} holds {found} values where {expected} belong: a fault of the program")]
    Length {
        /// Which array.
        what: String,
        /// Number of values expected.
        expected: usize,
        /// Number of values found.
        found: usize,
    },
    /// A picture could not be drawn.
    #[error("the picture {picture} could not be drawn: {source}")]
    Picture {
        /// Name of the picture.
        picture: &'static str,
        /// What the drawing library said.
        source: Box<dyn std::error::Error + Send + Sync>,
    },
    /// A report is asked of a folder without a summary.
    #[error("{} holds no summary.json, so there is nothing to report on: name the folder that a run has written", .folder.display())]
    NoSummary {
        /// The folder.
        folder: PathBuf,
    },
    /// A file of a result could not be read.
    #[error("{} could not be read: {source}", .path.display())]
    Unread {
        /// The file.
        path: PathBuf,
        /// What the system said.
        source: io::Error,
    },
    /// A file of a result is not what a run writes.
    #[error("{} is not as a run writes it: {why}", .path.display())]
    Misread {
        /// The file.
        path: PathBuf,
        /// What is amiss.
        why: String,
    },
    /// The page is there already and nobody asked to replace it.
    #[error("{} exists already: say --replace to write it again", .path.display())]
    PageExists {
        /// The page.
        path: PathBuf,
    },
    /// A folder that holds no result.
    #[error("{} holds no result of a run: there is no summary.json in it", .folder.display())]
    NoResult {
        /// The folder.
        folder: PathBuf,
    },
    /// A file of a result that cannot be read.
    #[error("{} cannot be read: {why}", .path.display())]
    Unreadable {
        /// The file.
        path: PathBuf,
        /// Why.
        why: String,
    },
    /// A result that does not hold what is asked of it.
    #[error("the result in {} does not hold {what}", .folder.display())]
    Lacks {
        /// The folder.
        folder: PathBuf,
        /// What it lacks.
        what: &'static str,
    },
    /// The user stopped the program while it wrote.
    #[error("stopped while writing; nothing was kept")]
    Interrupted,
}

impl IoFault {
    /// True where another command line would mend it (exit status 2), false where the machine or the program failed (3).
    #[must_use]
    pub fn is_of_the_input(&self) -> bool {
        matches!(
            self,
            Self::Exists { .. }
                | Self::IsAFile { .. }
                | Self::NotAResult { .. }
                | Self::NoName { .. }
                | Self::NoSummary { .. }
                | Self::Misread { .. }
                | Self::PageExists { .. }
                | Self::NoResult { .. }
                | Self::Unreadable { .. }
                | Self::Lacks { .. }
        )
    }

    /// The same fault of another path, where it names one.
    #[must_use]
    pub(super) fn with_path(self, rename: impl Fn(&PathBuf) -> PathBuf) -> Self {
        match self {
            Self::NoPermission { path } => Self::NoPermission { path: rename(&path) },
            Self::DiskFull { path } => Self::DiskFull { path: rename(&path) },
            Self::File { path, source } => Self::File { path: rename(&path), source },
            Self::FieldFile { path, source } => Self::FieldFile { path: rename(&path), source },
            Self::Unread { path, source } => Self::Unread { path: rename(&path), source },
            Self::Misread { path, why } => Self::Misread { path: rename(&path), why },
            other => other,
        }
    }

    /// Sorts an error of the file system by what the user can do about it.
    #[must_use]
    pub fn from_file(path: &Path, source: io::Error) -> Self {
        let path = path.to_path_buf();
        match source.kind() {
            io::ErrorKind::StorageFull | io::ErrorKind::QuotaExceeded => Self::DiskFull { path },
            io::ErrorKind::PermissionDenied | io::ErrorKind::ReadOnlyFilesystem => Self::NoPermission { path },
            io::ErrorKind::NotADirectory => Self::IsAFile { path },
            _ => Self::File { path, source },
        }
    }

    /// Sorts an error of the HDF5 library likewise; the library only hands over text.
    #[must_use]
    pub fn from_field_file(path: &Path, source: hdf5::Error) -> Self {
        let said = everything_said(&source);
        let path = path.to_path_buf();
        let says = |words: &[&str]| words.iter().any(|word| said.contains(word));
        if says(&["No space left", "quota exceeded", "File too large"]) {
            Self::DiskFull { path }
        } else if says(&["Permission denied", "Read-only file system"]) {
            Self::NoPermission { path }
        } else {
            Self::FieldFile { path, source }
        }
    }
}

/// The whole stack of messages: the system's own words sit at its bottom.
fn everything_said(error: &hdf5::Error) -> String {
    match error {
        hdf5::Error::Internal(text) => text.clone(),
        hdf5::Error::HDF5(stack) => match stack.clone().expand() {
            Ok(frames) => (0..frames.len())
                .filter_map(|level| frames.get(level).map(|frame| frame.description().to_owned()))
                .collect::<Vec<_>>()
                .join("\n"),
            Err(_) => String::new(),
        },
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn system_errors_become_the_users_words() {
        let of = |code| IoFault::from_file(Path::new("out/x"), io::Error::from_raw_os_error(code));
        assert!(matches!(of(28), IoFault::DiskFull { .. }));
        assert!(matches!(of(122), IoFault::DiskFull { .. }));
        assert!(matches!(of(13), IoFault::NoPermission { .. }));
        assert!(matches!(of(30), IoFault::NoPermission { .. }));
        assert!(matches!(of(20), IoFault::IsAFile { .. }));
        assert!(matches!(of(5), IoFault::File { .. }));
        assert!(!of(28).is_of_the_input());
        assert!(of(28).to_string().contains("out/x"));
    }

    #[test]
    fn field_file_errors_are_sorted_by_their_text() {
        let of = |text: &str| IoFault::from_field_file(Path::new("run.h5"), hdf5::Error::from(text));
        assert!(matches!(of("write failed: errno = 28, No space left on device"), IoFault::DiskFull { .. }));
        assert!(matches!(of("unable to open: errno = 13, Permission denied"), IoFault::NoPermission { .. }));
        assert!(matches!(of("bad atom"), IoFault::FieldFile { .. }));
    }
}

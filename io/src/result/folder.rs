//! The result folder: written beside its place under a dot-name, moved there whole.
//!
//! Until [`PendingFolder::commit`] nothing stands under the name the user gave: a fault, a panic or a stop removes
//! the half-written folder, and a killed process leaves only `.NAME.partial-XXXXXX` beside it.

use std::ffi::OsString;
use std::fs::{self, File};
use std::io::{ErrorKind, Write as _};
use std::path::{Path, PathBuf};

use tempfile::TempDir;

use super::fault::IoFault;
use super::names;

/// A result folder that is still being written.
#[derive(Debug)]
pub struct PendingFolder {
    target: PathBuf,
    replace: bool,
    parents_made: Vec<PathBuf>,
    partial: Option<TempDir>,
}

/// Says whether a result can be written to `target`, before anything is computed; nothing of it stays.
///
/// # Errors
/// [`IoFault::Exists`], [`IoFault::IsAFile`], [`IoFault::NotAResult`], [`IoFault::NoName`], [`IoFault::NoPermission`] or
/// what else the system says.
pub fn vet(target: &Path, replace: bool) -> Result<(), IoFault> {
    vet_place(target, replace)?;
    let target = resolve(target)?;
    let parent = target.ancestors().skip(1).find(|p| p.exists()).unwrap_or(Path::new("/"));
    hidden_folder(&OsString::from(".lenzbore-trial-"), parent).map(drop)
}

/// Whether the place is free, or holds an old result that may go.
fn vet_place(target: &Path, replace: bool) -> Result<(), IoFault> {
    match fs::metadata(target) {
        Ok(meta) if !meta.is_dir() => Err(IoFault::IsAFile { path: target.to_path_buf() }),
        Ok(_) if !replace => Err(IoFault::Exists { folder: target.to_path_buf() }),
        Ok(_) => vet_replaced(target),
        Err(error) if matches!(error.kind(), ErrorKind::NotFound | ErrorKind::NotADirectory) => vet_parents(target),
        Err(error) => Err(IoFault::from_file(target, error)),
    }
}

/// Only an empty folder or one that a run has written is ever replaced: `--out ~ --replace` harms nothing.
fn vet_replaced(target: &Path) -> Result<(), IoFault> {
    let entries = fs::read_dir(target).map_err(|e| IoFault::from_file(target, e))?;
    let mut empty = true;
    for entry in entries {
        let entry = entry.map_err(|e| IoFault::from_file(target, e))?;
        if names::RESULT_MARKS.iter().any(|mark| entry.file_name() == *mark) {
            return Ok(());
        }
        empty = false;
    }
    if empty { Ok(()) } else { Err(IoFault::NotAResult { folder: target.to_path_buf() }) }
}

fn vet_parents(target: &Path) -> Result<(), IoFault> {
    if target.file_name().is_none() {
        return Err(IoFault::NoName { path: target.to_path_buf() });
    }
    let nearest = target.ancestors().skip(1).find(|p| !p.as_os_str().is_empty() && p.exists());
    match nearest {
        Some(path) if !path.is_dir() => Err(IoFault::IsAFile { path: path.to_path_buf() }),
        _ => Ok(()),
    }
}

impl PendingFolder {
    /// Makes the hidden folder beside `target`, and `target`'s parents where they lack.
    ///
    /// # Errors
    /// As [`vet`].
    pub fn begin(target: &Path, replace: bool) -> Result<Self, IoFault> {
        vet_place(target, replace)?;
        let target = resolve(target)?;
        let mut prefix = OsString::from(".");
        prefix.push(file_name(&target)?);
        prefix.push(".partial-");
        let parent = target.parent().unwrap_or(Path::new("/")).to_path_buf();
        let parents_made = make_parents(&parent)?;
        let mut pending = Self { target, replace, parents_made, partial: None };
        pending.partial = Some(hidden_folder(&prefix, &parent)?);
        Ok(pending)
    }

    /// Where the files go until the folder is complete.
    #[must_use]
    pub fn path(&self) -> &Path {
        self.partial.as_ref().map_or(&self.target, TempDir::path)
    }

    /// Writes one file of the result.
    ///
    /// # Errors
    /// What the system says.
    pub fn write(&self, name: &str, bytes: &[u8]) -> Result<(), IoFault> {
        write_file(&self.path().join(name), bytes)
    }

    /// The fault with the hidden folder's name replaced by the one that the user gave.
    #[must_use]
    pub fn in_users_words(&self, fault: IoFault) -> IoFault {
        let partial = self.path().to_path_buf();
        fault.with_path(|path| path.strip_prefix(&partial).map_or_else(|_| path.clone(), |name| self.target.join(name)))
    }

    /// Moves the complete folder into its place; an old result is set aside first and deleted last.
    ///
    /// # Errors
    /// As [`vet`], or what the system says; the old result is then where it was.
    pub fn commit(mut self) -> Result<PathBuf, IoFault> {
        settle_on_disk(self.path())?;
        vet_place(&self.target, self.replace)?;
        let old = self.set_old_aside()?;
        if let Err(error) = fs::rename(self.path(), &self.target) {
            if let Some(aside) = &old {
                // The old result goes back; should even that fail, it still lies beside, complete.
                let _ = fs::rename(aside, &self.target);
            }
            return Err(match error.kind() {
                ErrorKind::DirectoryNotEmpty | ErrorKind::AlreadyExists => {
                    IoFault::Exists { folder: self.target.clone() }
                }
                _ => IoFault::from_file(&self.target, error),
            });
        }
        if let Some(partial) = self.partial.take() {
            let _moved = partial.keep();
        }
        self.parents_made.clear();
        if let Some(aside) = old {
            // The new result stands; what cannot be deleted of the old one stays hidden beside it.
            let _ = fs::remove_dir_all(&aside);
        }
        Ok(self.target.clone())
    }

    /// The old result under a hidden name beside, or nothing where there is none.
    fn set_old_aside(&self) -> Result<Option<PathBuf>, IoFault> {
        if !self.target.exists() {
            return Ok(None);
        }
        let mut name = self.path().file_name().unwrap_or_default().to_os_string();
        name.push("-replaced");
        let aside = self.path().with_file_name(name);
        fs::rename(&self.target, &aside).map_err(|e| IoFault::from_file(&self.target, e))?;
        Ok(Some(aside))
    }
}

impl Drop for PendingFolder {
    fn drop(&mut self) {
        drop(self.partial.take());
        for parent in self.parents_made.iter().rev() {
            // Not empty any more: someone else has moved in.
            let _ = fs::remove_dir(parent);
        }
    }
}

/// Writes `bytes` to a new file.
///
/// # Errors
/// What the system says, sorted by [`IoFault::from_file`].
pub(crate) fn write_file(path: &Path, bytes: &[u8]) -> Result<(), IoFault> {
    let write = || -> std::io::Result<()> {
        let mut file = File::create(path)?;
        file.write_all(bytes)?;
        file.flush()
    };
    write().map_err(|e| IoFault::from_file(path, e))
}

/// Writes `bytes` under another name beside `path` and puts it in its place, so that a reader sees the old file or the new one whole.
///
/// # Errors
/// As [`write_file`].
pub(crate) fn write_beside(path: &Path, bytes: &[u8]) -> Result<(), IoFault> {
    let fault = |e| IoFault::from_file(path, e);
    let parent = path.parent().filter(|p| !p.as_os_str().is_empty()).unwrap_or(Path::new("."));
    let mut builder = tempfile::Builder::new();
    builder.prefix(".lenzbore-");
    #[cfg(unix)]
    {
        use std::os::unix::fs::PermissionsExt as _;
        builder.permissions(fs::Permissions::from_mode(0o666));
    }
    let mut file = builder.tempfile_in(parent).map_err(fault)?;
    file.write_all(bytes).and_then(|()| file.flush()).map_err(fault)?;
    file.persist(path).map_err(|e| fault(e.error))?;
    Ok(())
}

/// Absolute, with links followed where the folder exists, so that a link's target is replaced and not the link.
fn resolve(target: &Path) -> Result<PathBuf, IoFault> {
    let resolved = if target.exists() { fs::canonicalize(target) } else { std::path::absolute(target) };
    resolved.map_err(|e| IoFault::from_file(target, e))
}

fn file_name(target: &Path) -> Result<&std::ffi::OsStr, IoFault> {
    target.file_name().ok_or_else(|| IoFault::NoName { path: target.to_path_buf() })
}

/// Makes the missing parents, outermost first, and says which.
fn make_parents(parent: &Path) -> Result<Vec<PathBuf>, IoFault> {
    let missing: Vec<PathBuf> = parent.ancestors().take_while(|p| !p.exists()).map(Path::to_path_buf).collect();
    fs::create_dir_all(parent).map_err(|e| IoFault::from_file(parent, e))?;
    Ok(missing.into_iter().rev().collect())
}

/// A hidden folder that removes itself; readable as any other folder, since it becomes the result.
fn hidden_folder(prefix: &OsString, parent: &Path) -> Result<TempDir, IoFault> {
    let mut builder = tempfile::Builder::new();
    builder.prefix(prefix);
    #[cfg(unix)]
    {
        use std::os::unix::fs::PermissionsExt as _;
        builder.permissions(fs::Permissions::from_mode(0o777));
    }
    builder.tempdir_in(parent).map_err(|e| IoFault::from_file(parent, e))
}

/// Asks the system to bring every file to the disk before the folder gets its name.
fn settle_on_disk(folder: &Path) -> Result<(), IoFault> {
    let entries = fs::read_dir(folder).map_err(|e| IoFault::from_file(folder, e))?;
    for entry in entries {
        let path = entry.map_err(|e| IoFault::from_file(folder, e))?.path();
        File::open(&path).and_then(|file| file.sync_all()).map_err(|e| IoFault::from_file(&path, e))?;
    }
    Ok(())
}

#[cfg(test)]
#[path = "folder_tests.rs"]
mod tests;

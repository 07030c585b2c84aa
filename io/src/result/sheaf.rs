//! A folder in the writing: what is in it so far, and the user who may want to stop.

use lenzbore_solver::monitor::Monitor;

use super::fault::IoFault;
use super::folder::PendingFolder;

/// A pending folder and what is in it so far.
pub(crate) struct Sheaf<'a> {
    pub(crate) pending: PendingFolder,
    pub(crate) files: Vec<String>,
    pub(crate) monitor: &'a dyn Monitor,
}

impl Sheaf<'_> {
    /// Writes a file, unless the user wants to stop.
    ///
    /// # Errors
    /// [`IoFault::Interrupted`], or a file that cannot be written.
    pub(crate) fn put(&mut self, name: &str, bytes: &[u8]) -> Result<(), IoFault> {
        self.pause()?;
        self.pending.write(name, bytes)?;
        self.files.push(name.to_owned());
        Ok(())
    }

    /// Ends here if the user wants so.
    ///
    /// # Errors
    /// [`IoFault::Interrupted`].
    pub(crate) fn pause(&self) -> Result<(), IoFault> {
        if self.monitor.cancelled() { Err(IoFault::Interrupted) } else { Ok(()) }
    }
}

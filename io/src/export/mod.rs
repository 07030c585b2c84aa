//! A result folder in other formats: fields for visualisation programs and spreadsheets, systems of equations for other solvers.
//!
//! Every export is a folder of its own that appears whole or not at all; `export.json` in it says what is what, with units.

mod csv;
mod matrix_market;
#[cfg(test)]
mod tests;
mod vtk;

use std::path::Path;

use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::outcome::Fields;
use lenzbore_solver::system::LevelSystem;
use serde_json::{Value, json};

use crate::result::folder::PendingFolder;
use crate::result::{Earlier, IoFault, Sheaf, names, read_fields, xdmf};

pub use csv::Chosen;

/// What is written.
#[derive(Debug)]
pub enum Export<'a> {
    /// One rectilinear file a snapshot, and their series.
    Vtk,
    /// `run.h5` with its index for visualisation programs.
    Xdmf,
    /// The fields of one snapshot, and the series of the run.
    Csv(Chosen),
    /// The systems of equations of every grid level.
    MatrixMarket(&'a Systems),
}

/// Systems of equations, and what drives them.
#[derive(Debug)]
pub struct Systems {
    /// One a grid level.
    pub levels: Vec<LevelSystem>,
    /// What drives them, as `export.json` says it: velocity, or frequencies and current.
    pub drive: Value,
}

/// Writes the export of the result in `folder` to `target`, and gives the names of the files.
///
/// # Errors
/// [`IoFault::Lacks`] where the result has no fields, [`IoFault::Exists`] and its like, what disk and libraries say.
pub fn export(
    folder: &Path,
    earlier: &Earlier,
    what: &Export<'_>,
    (target, replace): (&Path, bool),
    monitor: &dyn Monitor,
) -> Result<Vec<String>, IoFault> {
    let pending = PendingFolder::begin(target, replace)?;
    let mut sheaf = Sheaf { pending, files: Vec::new(), monitor };
    let filled = match what {
        Export::Vtk => fields(folder).and_then(|f| vtk::write(&mut sheaf, &f)),
        Export::Xdmf => copy_with_index(&mut sheaf, folder),
        Export::Csv(chosen) => csv::write(&mut sheaf, folder, chosen),
        Export::MatrixMarket(systems) => matrix_market::write(&mut sheaf, systems),
    };
    let about = filled.and_then(|about| {
        let object = json!({
            "title": earlier.title, "digest": earlier.digest, "command": earlier.command, "computed_by": earlier.program,
            "format": what.word(), "about": about,
        });
        sheaf.put(names::EXPORT, format!("{object:#}\n").as_bytes())
    });
    if let Err(fault) = about {
        return Err(sheaf.pending.in_users_words(fault));
    }
    sheaf.pending.commit()?;
    Ok(sheaf.files)
}

impl Export<'_> {
    /// The format's name.
    #[must_use]
    pub const fn word(&self) -> &'static str {
        match self {
            Self::Vtk => "vtk",
            Self::Xdmf => "xdmf",
            Self::Csv(_) => "csv",
            Self::MatrixMarket(_) => "matrix-market",
        }
    }
}

/// The fields of a result.
fn fields(folder: &Path) -> Result<Fields, IoFault> {
    let path = folder.join(names::FIELDS);
    if path.is_file() {
        read_fields(&path)
    } else {
        Err(IoFault::Lacks {
            folder: folder.to_path_buf(),
            what: "fields (run.h5): the case asks for them under [output]",
        })
    }
}

/// `run.h5` as it is, and its index made anew.
fn copy_with_index(sheaf: &mut Sheaf<'_>, folder: &Path) -> Result<Value, IoFault> {
    let fields = fields(folder)?;
    let (from, to) = (folder.join(names::FIELDS), sheaf.pending.path().join(names::FIELDS));
    std::fs::copy(&from, &to).map_err(|e| IoFault::from_file(&to, e))?;
    sheaf.files.push(names::FIELDS.to_owned());
    sheaf.put(names::FIELDS_INDEX, xdmf(&fields).as_bytes())?;
    Ok(json!("open run.xdmf: the half-plane lies with r along x and z along y; names of arrays end in their units"))
}

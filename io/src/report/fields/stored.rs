//! `run.h5` as it lies in the folder: grid, instants, and which arrays there are.

use std::path::{Path, PathBuf};

use hdf5::types::VarLenUnicode;
use hdf5::{Dataset, File};
use ndarray::Array3;

use crate::report::folder_tables::Column;
use crate::result::IoFault;

/// What is stored.
#[derive(Debug)]
pub(in crate::report) struct StoredFields {
    path: PathBuf,
    /// Node radii, m.
    pub r_m: Vec<f64>,
    /// Node heights, m.
    pub z_m: Vec<f64>,
    /// Instants, s.
    pub times_s: Vec<f64>,
    /// Positions of the mover's reference point, m.
    pub positions_m: Vec<f64>,
    /// Arrays at cells, `[t, z, r]`.
    pub cells: Vec<CellArray>,
}

/// An array at cells.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(in crate::report) struct CellArray {
    /// Its name.
    pub name: String,
    /// Its name without unit.
    pub stem: String,
    /// Its SI unit.
    pub unit: String,
}

/// Where the conductor lies: its radii and heights, m.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Conductor {
    pub radii: (f64, f64),
    pub heights: (f64, f64),
}

impl StoredFields {
    /// Reads grid and instants; `None` where no snapshot was stored.
    pub(in crate::report) fn read(path: &Path) -> Result<Option<Self>, IoFault> {
        let inner = || -> hdf5::Result<Option<Self>> {
            let file = File::open(path)?;
            let Ok(group) = file.group("snapshots") else { return Ok(None) };
            let numbers = |name: &str| file.dataset(name)?.read_raw::<f64>();
            let (r_m, z_m) = (numbers("grid/r_m")?, numbers("grid/z_m")?);
            let times_s = group.dataset("time_s")?.read_raw()?;
            let positions_m = group.dataset("mover_position_m")?.read_raw()?;
            let shape = vec![Vec::len(&times_s), z_m.len().saturating_sub(1), r_m.len().saturating_sub(1)];
            let mut cells = Vec::new();
            let mut names = group.member_names()?;
            names.sort();
            for name in names {
                let set = group.dataset(&name)?;
                if set.shape() == shape {
                    cells.push(cell_array(&set, &name)?);
                }
            }
            Ok(Some(Self { path: path.to_path_buf(), r_m, z_m, times_s, positions_m, cells }))
        };
        inner().map_err(|e| misread(path, &e))
    }

    /// The open file.
    pub(super) fn open(&self) -> Result<File, IoFault> {
        File::open(&self.path).map_err(|e| misread(&self.path, &e))
    }

    /// One instant of an array of the group `snapshots`, within rows and columns: `[0, z, r]`.
    pub(super) fn slice(
        &self,
        file: &File,
        name: &str,
        instant: usize,
        rows: (usize, usize),
        columns: (usize, usize),
    ) -> Result<Array3<f64>, IoFault> {
        let read = || -> hdf5::Result<Array3<f64>> {
            let set = file.dataset(&format!("snapshots/{name}"))?;
            set.read_slice((instant..=instant, rows.0..rows.1, columns.0..columns.1))
        };
        read().map_err(|e| misread(&self.path, &e))
    }

    /// Where conductivity or permeability differ from those of air.
    pub(super) fn conductor(&self) -> Result<Option<Conductor>, IoFault> {
        let file = self.open()?;
        let read = || file.dataset("regions/number")?.read_2d::<u32>();
        let regions = read().map_err(|e| misread(&self.path, &e))?;
        let mut found: Option<Conductor> = None;
        for ((j, i), _) in regions.indexed_iter().filter(|(_, n)| **n > 0) {
            let (Some(r), Some(z)) = (self.r_m.get(i..=i + 1), self.z_m.get(j..=j + 1)) else { continue };
            let (radii, heights) = ((r[0], r[1]), (z[0], z[1]));
            let join = |a: (f64, f64), b: (f64, f64)| (a.0.min(b.0), a.1.max(b.1));
            found = Some(match found {
                Some(c) => Conductor { radii: join(c.radii, radii), heights: join(c.heights, heights) },
                None => Conductor { radii, heights },
            });
        }
        Ok(found)
    }
}

fn cell_array(set: &Dataset, name: &str) -> hdf5::Result<CellArray> {
    let unit = match set.attr("units") {
        Ok(attribute) => attribute.read_scalar::<VarLenUnicode>()?.to_string(),
        Err(_) => String::new(),
    };
    let stem = Column::stem_of(name);
    Ok(CellArray { name: name.to_owned(), stem, unit })
}

fn misread(path: &Path, error: &hdf5::Error) -> IoFault {
    IoFault::Misread { path: path.to_path_buf(), why: error.to_string() }
}

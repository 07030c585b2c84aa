//! Reads the fields of a result back from `run.h5`.

use std::path::Path;

use hdf5::types::VarLenUnicode;
use hdf5::{File, Group};
use lenzbore_solver::outcome::{Fields, Snapshot};

use crate::result::fault::IoFault;

/// Grid, regions and every snapshot.
///
/// # Errors
/// [`IoFault::Unreadable`] where the file is none of ours or is damaged.
pub fn read_fields(path: &Path) -> Result<Fields, IoFault> {
    fields(path).map_err(|e| IoFault::Unreadable { path: path.to_path_buf(), why: e.to_string() })
}

fn fields(path: &Path) -> hdf5::Result<Fields> {
    let file = File::open(path)?;
    let (grid, regions) = (file.group("grid")?, file.group("regions")?);
    let number = regions.dataset("number")?;
    let names: VarLenUnicode = number.attr("names")?.read_scalar()?;
    let region: Vec<u32> = number.read_raw()?;
    Ok(Fields {
        r_m: numbers(&grid, "r_m")?,
        z_m: numbers(&grid, "z_m")?,
        region: region.into_iter().map(|n| usize::try_from(n).unwrap_or(usize::MAX)).collect(),
        region_names: names.as_str().split('\n').map(str::to_owned).collect(),
        conductivity: numbers(&regions, "conductivity_S_per_m")?,
        relative_permeability: numbers(&regions, "relative_permeability")?,
        snapshots: snapshots(&file.group("snapshots")?)?,
    })
}

fn numbers(group: &Group, name: &str) -> hdf5::Result<Vec<f64>> {
    group.dataset(name)?.read_raw()
}

fn snapshots(group: &Group) -> hdf5::Result<Vec<Snapshot>> {
    let times = numbers(group, "time_s")?;
    let positions = numbers(group, "mover_position_m")?;
    if times.is_empty() {
        return Ok(Vec::new());
    }
    // One array at a time: each is cut into its instants.
    let cut = |name: &str| -> hdf5::Result<Vec<Vec<f64>>> {
        let all = numbers(group, name)?;
        Ok(all.chunks(all.len() / times.len()).map(<[f64]>::to_vec).collect())
    };
    let mut total = cut("psi_total_Wb_per_rad")?.into_iter();
    let mut reaction = cut("psi_reaction_Wb_per_rad")?.into_iter();
    let mut radial = cut("flux_density_r_T")?.into_iter();
    let mut axial = cut("flux_density_z_T")?.into_iter();
    let mut current = cut("current_density_phi_A_per_m2")?.into_iter();
    let mut heat = cut("heat_density_W_per_m3")?.into_iter();
    let mut next = |time_s: f64, mover_position_m: f64| {
        Some(Snapshot {
            time_s,
            mover_position_m,
            psi_total: total.next()?,
            psi_reaction: reaction.next()?,
            flux_density_r: radial.next()?,
            flux_density_z: axial.next()?,
            current_density_phi: current.next()?,
            heat_density: heat.next()?,
        })
    };
    let all: Option<Vec<Snapshot>> = times.iter().zip(&positions).map(|(t, z)| next(*t, *z)).collect();
    all.ok_or_else(|| hdf5::Error::Internal("snapshots of unequal number".to_owned()))
}

//! The fields at each kept instant.

use std::path::Path;

use hdf5::{Dataset, File, Group};
use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::outcome::{Fields, Snapshot};
use ndarray::ArrayView3;

use super::dataset::{About, packed, put, say};
use crate::result::fault::IoFault;

/// Names of a snapshot's arrays at nodes, with the arrays.
pub(super) fn node_arrays(snapshot: &Snapshot) -> [(&'static str, &[f64]); 2] {
    [("psi_total_Wb_per_rad", &snapshot.psi_total), ("psi_reaction_Wb_per_rad", &snapshot.psi_reaction)]
}

/// Names of a snapshot's arrays at cell centres, with the arrays.
pub(super) fn cell_arrays(snapshot: &Snapshot) -> [(&'static str, &[f64]); 4] {
    [
        ("flux_density_r_T", &snapshot.flux_density_r),
        ("flux_density_z_T", &snapshot.flux_density_z),
        ("current_density_phi_A_per_m2", &snapshot.current_density_phi),
        ("heat_density_W_per_m3", &snapshot.heat_density),
    ]
}

/// Name, unit and description of every array of a snapshot, as `run.h5` holds them.
const ARRAYS: [(&str, &str, &str); 6] = [
    ("psi_total_Wb_per_rad", "Wb/rad", "psi = r A_phi, total"),
    ("psi_reaction_Wb_per_rad", "Wb/rad", "psi of wall currents and permeable wall, without the mover's own"),
    ("flux_density_r_T", "T", "radial flux density, total"),
    ("flux_density_z_T", "T", "axial flux density, total"),
    ("current_density_phi_A_per_m2", "A/m2", "azimuthal current density, right-handed about +z"),
    ("heat_density_W_per_m3", "W/m3", "heat density"),
];

/// Name, unit and description of every array of a snapshot.
pub fn snapshot_arrays() -> impl Iterator<Item = (&'static str, &'static str, &'static str)> {
    ARRAYS.into_iter()
}

/// Unit and description of a snapshot's array.
fn about(name: &str) -> (&'static str, &'static str) {
    ARRAYS.iter().find(|a| a.0 == name).map_or(("1", ""), |a| (a.1, a.2))
}

/// Writes `/snapshots`, and looks after each array whether the user wants to stop.
///
/// # Errors
/// [`IoFault::Interrupted`], else what disk and library say.
pub(super) fn write(file: &File, fields: &Fields, path: &Path, monitor: &dyn Monitor) -> Result<(), IoFault> {
    let blame = |error| IoFault::from_field_file(path, error);
    let group = file.create_group("snapshots").map_err(blame)?;
    instants(&group, fields).map_err(blame)?;
    let count = fields.snapshots.len();
    let (nz, nr) = (fields.z_m.len(), fields.r_m.len());
    let Some(first) = fields.snapshots.first() else { return Ok(()) };
    let node_sets = sets(&group, "node", &node_arrays(first), [count, nz, nr]).map_err(blame)?;
    let cell_sets = sets(&group, "cell", &cell_arrays(first), [count, nz - 1, nr - 1]).map_err(blame)?;
    for (t, snapshot) in fields.snapshots.iter().enumerate() {
        let arrays = node_arrays(snapshot).into_iter().zip(&node_sets);
        for ((_, values), set) in arrays.chain(cell_arrays(snapshot).into_iter().zip(&cell_sets)) {
            if monitor.cancelled() {
                return Err(IoFault::Interrupted);
            }
            layer(set, t, values).map_err(blame)?;
        }
    }
    Ok(())
}

fn instants(group: &Group, fields: &Fields) -> hdf5::Result<()> {
    let count = fields.snapshots.len();
    let times: Vec<f64> = fields.snapshots.iter().map(|s| s.time_s).collect();
    let positions: Vec<f64> = fields.snapshots.iter().map(|s| s.mover_position_m).collect();
    let series = |units, description| About { units, description, location: "none" };
    put(group, "time_s", &[count], &times, &series("s", "time from the start"))?;
    put(group, "mover_position_m", &[count], &positions, &series("m", "position of the mover's reference point"))?;
    Ok(())
}

/// One empty data set an array, one chunk a snapshot.
fn sets(group: &Group, location: &str, arrays: &[(&str, &[f64])], shape: [usize; 3]) -> hdf5::Result<Vec<Dataset>> {
    let one = |(name, _): &(&str, &[f64])| {
        let set = packed::<f64>(group, name, &shape, &[1, shape[1], shape[2]])?;
        let (units, description) = about(name);
        say(&set, &About { units, description, location })?;
        Ok(set)
    };
    arrays.iter().map(one).collect()
}

/// Writes one instant of one array.
fn layer(set: &Dataset, t: usize, values: &[f64]) -> hdf5::Result<()> {
    let shape = set.shape();
    let view = ArrayView3::from_shape((1, shape[1], shape[2]), values)
        .map_err(|e| hdf5::Error::Internal(format!("snapshot array: {e}")))?;
    set.write_slice(view, (t..=t, .., ..))
}

//! `/temperature`: the wall's temperatures on the thermal grid.

use hdf5::File;
use lenzbore_solver::outcome::Thermal;

use super::dataset::{About, put, put_packed};

/// Writes nodes and temperatures; where there is no wall stands the temperature of the air.
pub(super) fn write(file: &File, thermal: &Thermal) -> hdf5::Result<()> {
    let group = file.create_group("temperature")?;
    let lines = [
        ("r_m", &thermal.r_m, "radii of the thermal grid's node lines"),
        ("z_m", &thermal.z_m, "heights of the thermal grid's node lines"),
    ];
    for (name, values, description) in lines {
        put(&group, name, &[values.len()], values, &About { units: "m", description, location: "node" })?;
    }
    let shape = [thermal.z_m.len(), thermal.r_m.len()];
    for field in &thermal.fields {
        let description = format!("temperature of the wall {}", field.description);
        let about = About { units: "K", description: &description, location: "node" };
        put_packed(&group, &format!("{}_K", field.moment), &shape, &field.temperature_k, &about)?;
    }
    Ok(())
}

//! `/stations/NAME`: what each gauge reads over time.

use hdf5::File;
use lenzbore_solver::outcome::StationTrace;

use super::dataset::{About, put, text};
use crate::result::stations::columns;

/// Writes a group a station.
pub(super) fn write(file: &File, stations: &[StationTrace]) -> hdf5::Result<()> {
    if stations.is_empty() {
        return Ok(());
    }
    let all = file.create_group("stations")?;
    for station in stations {
        let group = all.create_group(&station.name.replace('/', " "))?;
        text(&group, "what", station.what)?;
        let about = |units, description| About { units, description, location: "none" };
        put(&group, "height_m", &[1], &[station.at_m], &about("m", "height above the wall's lower end"))?;
        put(&group, "radius_m", &[1], &[station.radius_m], &about("m", "radius"))?;
        let length = [station.time_s.len()];
        put(&group, "time_s", &length, &station.time_s, &about("s", "time from the start"))?;
        put(
            &group,
            "position_m",
            &length,
            &station.position_m,
            &about("m", "position of the mover's reference point"),
        )?;
        for (name, unit, description, values) in station.series.iter().flat_map(columns) {
            put(&group, &name, &[values.len()], values, &about(unit, description))?;
        }
    }
    Ok(())
}

//! What each cell is made of.

use hdf5::types::FixedUnicode;
use hdf5::{File, Group};
use lenzbore_solver::outcome::Fields;

use super::dataset::{About, put_packed, text};

/// Writes `/regions`.
pub(super) fn write(file: &File, fields: &Fields) -> hdf5::Result<()> {
    let group = file.create_group("regions")?;
    let shape = [fields.z_m.len() - 1, fields.r_m.len() - 1];
    let cell = |units, description| About { units, description, location: "cell" };
    put_packed(
        &group,
        "conductivity_S_per_m",
        &shape,
        &fields.conductivity,
        &cell("S/m", "electrical conductivity at the wall's temperature"),
    )?;
    put_packed(
        &group,
        "relative_permeability",
        &shape,
        &fields.relative_permeability,
        &cell("1", "relative magnetic permeability"),
    )?;
    let numbers: Vec<u32> = fields.region.iter().map(|n| u32::try_from(*n).unwrap_or(u32::MAX)).collect();
    let about = cell("1", "number of the region, 0 for free space: its place in the attribute `names`");
    let set = put_packed(&group, "number", &shape, &numbers, &about)?;
    text(&set, "names", &fields.region_names.join("\n"))?;
    names(&group, &shape, fields)
}

/// The names cell by cell, in the shortest of a few fixed lengths: fixed text compresses to almost nothing.
fn names(group: &Group, shape: &[usize], fields: &Fields) -> hdf5::Result<()> {
    match fields.region_names.iter().map(String::len).max().unwrap_or(0) {
        0..16 => fixed_names::<16>(group, shape, fields),
        16..64 => fixed_names::<64>(group, shape, fields),
        _ => fixed_names::<256>(group, shape, fields),
    }
}

fn fixed_names<const N: usize>(group: &Group, shape: &[usize], fields: &Fields) -> hdf5::Result<()> {
    let table = fields.region_names.iter().map(|name| fixed::<N>(name)).collect::<hdf5::Result<Vec<_>>>()?;
    let unnamed = FixedUnicode::<N>::new();
    let cells: Vec<FixedUnicode<N>> = fields.region.iter().map(|n| table.get(*n).copied().unwrap_or(unnamed)).collect();
    let about = About { units: "1", description: "name of the region", location: "cell" };
    put_packed(group, "name", shape, &cells, &about)?;
    Ok(())
}

/// `name` cut to the last whole letter that fits.
fn fixed<const N: usize>(name: &str) -> hdf5::Result<FixedUnicode<N>> {
    let fits = name.char_indices().map(|(at, c)| at + c.len_utf8()).take_while(|end| *end <= N).last().unwrap_or(0);
    let text = name[..fits].replace('\0', " ");
    text.parse().map_err(|e| hdf5::Error::Internal(format!("region name '{text}': {e}")))
}

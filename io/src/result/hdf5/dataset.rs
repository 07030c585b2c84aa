//! Data sets and text attributes, each with what a reader must know of it.

use hdf5::types::VarLenUnicode;
use hdf5::{Dataset, Group, H5Type, Location};

/// Compression of grid arrays: shuffled bytes deflate well at a low level.
const DEFLATE_LEVEL: u8 = 4;

/// What a reader must know of a data set.
#[derive(Debug, Clone, Copy)]
pub(super) struct About<'a> {
    /// SI unit, `1` for a pure number.
    pub units: &'a str,
    /// What it is, in words.
    pub description: &'a str,
    /// `node`, `cell` or `none`.
    pub location: &'a str,
}

/// Writes an array as it stands.
pub(super) fn put<T: H5Type>(
    group: &Group,
    name: &str,
    shape: &[usize],
    values: &[T],
    about: &About<'_>,
) -> hdf5::Result<Dataset> {
    let set = group.new_dataset::<T>().obj_track_times(false).shape(shape).create(name)?;
    set.write_raw(values)?;
    say(&set, about)?;
    Ok(set)
}

/// Writes an array over the grid in compressed chunks.
pub(super) fn put_packed<T: H5Type>(
    group: &Group,
    name: &str,
    shape: &[usize],
    values: &[T],
    about: &About<'_>,
) -> hdf5::Result<Dataset> {
    let set = packed::<T>(group, name, shape, shape)?;
    set.write_raw(values)?;
    say(&set, about)?;
    Ok(set)
}

/// An empty compressed data set.
pub(super) fn packed<T: H5Type>(group: &Group, name: &str, shape: &[usize], chunk: &[usize]) -> hdf5::Result<Dataset> {
    group
        .new_dataset::<T>()
        .obj_track_times(false)
        .chunk(chunk)
        .shuffle()
        .deflate(DEFLATE_LEVEL)
        .shape(shape)
        .create(name)
}

/// Attaches the three attributes that every data set has.
pub(super) fn say(set: &Dataset, about: &About<'_>) -> hdf5::Result<()> {
    text(set, "units", about.units)?;
    text(set, "description", about.description)?;
    text(set, "location", about.location)
}

/// A text attribute; the NUL that HDF5 text cannot hold becomes a blank.
pub(super) fn text(on: &Location, name: &str, value: &str) -> hdf5::Result<()> {
    let value: VarLenUnicode =
        value.replace('\0', " ").parse().map_err(|e| hdf5::Error::Internal(format!("text attribute {name}: {e}")))?;
    on.new_attr::<VarLenUnicode>().create(name)?.write_scalar(&value)
}

/// A number as an attribute.
pub(super) fn value(on: &Location, name: &str, value: f64) -> hdf5::Result<()> {
    on.new_attr::<f64>().create(name)?.write_scalar(&value)
}

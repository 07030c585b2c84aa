//! Case files and units, material book, result folders, HDF5 and XDMF, tables and pictures. Computes no field.

pub mod case;
pub mod explain;
pub mod materials;
pub mod message;
pub mod picture;
pub mod result;
pub mod schema;
pub mod table;
pub mod units;

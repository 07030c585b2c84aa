//! Case files and units, material book, result folders, HDF5 and XDMF, tables, pictures and the report page. Computes no field.

pub mod case;
pub mod explain;
pub mod export;
pub mod layout;
pub mod materials;
pub mod message;
pub mod picture;
pub mod report;
pub mod result;
pub mod schema;
pub mod table;
pub mod units;

//! The book as its data file has it, before its numbers are read to SI.

use std::collections::BTreeMap;

use serde::Deserialize;

#[derive(Debug, Deserialize)]
#[serde(deny_unknown_fields)]
pub(super) struct RawBook {
    pub sources: BTreeMap<String, String>,
    pub conductor: Vec<RawConductor>,
    pub class: BTreeMap<String, RawClass>,
    pub magnet: Vec<RawMagnet>,
}

#[derive(Debug, Deserialize)]
#[serde(deny_unknown_fields)]
pub(super) struct RawConductor {
    pub family: String,
    pub name: String,
    #[serde(default)]
    pub also: Vec<String>,
    pub about: String,
    pub conductivity: RawNumber,
    pub temperature_coefficient: RawNumber,
    pub permeability: RawNumber,
    pub caution: Option<String>,
}

#[derive(Debug, Deserialize)]
#[serde(deny_unknown_fields)]
pub(super) struct RawClass {
    pub coefficient: RawNumber,
    pub highest_temperature: RawNumber,
}

#[derive(Debug, Deserialize)]
#[serde(deny_unknown_fields)]
pub(super) struct RawMagnet {
    pub family: String,
    pub name: String,
    pub classes: Vec<String>,
    pub about: String,
    pub remanence: RawNumber,
    pub recoil_permeability: RawNumber,
}

#[derive(Debug, Deserialize)]
#[serde(deny_unknown_fields)]
pub(super) struct RawNumber {
    pub typical: Written,
    pub minimum: Option<Written>,
    pub maximum: Option<Written>,
    pub source: String,
    pub range_source: Option<String>,
}

/// A number as written: with its unit, or bare.
#[derive(Debug, Deserialize)]
#[serde(untagged)]
pub(super) enum Written {
    Text(String),
    Number(f64),
}

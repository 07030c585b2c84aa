//! Coils at rest: tables over frequency, current density across the wall, and the complex amplitudes of the fields at the highest frequency.

use hdf5::File;
use lenzbore_solver::outcome::{CurrentSample, Fields, FrequencyResponse};

use super::dataset::{About, put, put_packed, text};
use super::snapshots::{cell_arrays, node_arrays};

const AMPLITUDES: &str = "Complex amplitudes, zero to peak, at the highest frequency: a quantity is Re((real + i imaginary) exp(i omega t)), \
     the coils' current real. The two snapshots are its instants t = 0 and a quarter period later.";

/// Writes `/across` and `/amplitudes`.
pub(super) fn write(file: &File, response: &FrequencyResponse, fields: &Fields) -> hdf5::Result<()> {
    across(file, response)?;
    amplitudes(file, fields)
}

/// Samples along the line across the wall, `[frequency, sample]`.
fn across(file: &File, response: &FrequencyResponse) -> hdf5::Result<()> {
    let Some(first) = response.points.first().filter(|p| !p.across.is_empty()) else { return Ok(()) };
    let group = file.create_group("across")?;
    let about = |units, description| About { units, description, location: "none" };
    let samples = first.across.len();
    let r: Vec<f64> = first.across.iter().map(|s| s.r_m).collect();
    put(&group, "r_m", &[samples], &r, &about("m", "radii of the samples, layer by layer"))?;
    let layers: Vec<u64> = first.across.iter().map(|s| s.layer as u64 + 1).collect();
    put(&group, "layer", &[samples], &layers, &about("1", "number of the layer, from 1 in the order of the case"))?;
    let shape = [response.points.len(), samples];
    let columns: [Column; 3] = [
        ("current_density_real_A_per_m2", "current density in phase with the coils' current", |s| s.real),
        ("current_density_imaginary_A_per_m2", "current density a quarter period ahead of it", |s| s.imaginary),
        ("current_density_band_A_per_m2", "half-width of the magnitude's numerical band", |s| s.band),
    ];
    for (name, description, pick) in columns {
        let values: Vec<f64> = response.points.iter().flat_map(|p| p.across.iter().map(pick)).collect();
        put(&group, name, &shape, &values, &about("A/m2", description))?;
    }
    Ok(())
}

/// Name of a data set, what it is, and how it is read off a sample.
type Column = (&'static str, &'static str, fn(&CurrentSample) -> f64);

/// Real and imaginary part of every linear field, from the two snapshots.
fn amplitudes(file: &File, fields: &Fields) -> hdf5::Result<()> {
    let [peak, quarter] = fields.snapshots.as_slice() else { return Ok(()) };
    let group = file.create_group("amplitudes")?;
    text(&group, "meaning", AMPLITUDES)?;
    let (nr, nz) = (fields.r_m.len(), fields.z_m.len());
    let both = |name: &str, real: &[f64], later: &[f64], shape: &[usize], location: &str| -> hdf5::Result<()> {
        let Some((stem, ending, units)) = split(name) else { return Ok(()) };
        let about = |description| About { units, description, location };
        let imaginary: Vec<f64> = later.iter().map(|x| -x + 0.0).collect();
        let (in_phase, ahead) = (about("in phase with the coils' current"), about("a quarter period ahead of it"));
        put_packed(&group, &format!("{stem}_real{ending}"), shape, real, &in_phase)?;
        put_packed(&group, &format!("{stem}_imaginary{ending}"), shape, &imaginary, &ahead)?;
        Ok(())
    };
    for ((name, real), (_, later)) in node_arrays(peak).into_iter().zip(node_arrays(quarter)) {
        both(name, real, later, &[nz, nr], "node")?;
    }
    for ((name, real), (_, later)) in cell_arrays(peak).into_iter().zip(cell_arrays(quarter)) {
        both(name, real, later, &[nz - 1, nr - 1], "cell")?;
    }
    Ok(())
}

/// The name of a field without its unit's ending, the ending, and the unit; `None` for heat, which is no amplitude.
fn split(name: &str) -> Option<(&str, &'static str, &'static str)> {
    let endings = [("_Wb_per_rad", "Wb/rad"), ("_A_per_m2", "A/m2"), ("_T", "T")];
    endings.into_iter().find_map(|(ending, unit)| Some((name.strip_suffix(ending)?, ending, unit)))
}

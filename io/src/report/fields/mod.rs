//! The fields of `run.h5`, cut down to what a page can hold: whole cells about wall and mover, at the stored instants.

mod pack;
mod stored;
mod window;

pub(super) use pack::Packed;
pub(super) use stored::StoredFields;

use serde::Serialize;
use serde_json::{Value, json};

use super::numbers::Unit;
use super::words;
use crate::layout::Layout;
use crate::result::IoFault;
use stored::CellArray;
use window::{Cut, Plan};

/// Characters that all fields together may take on the page.
const ROOM: usize = 2_600_000;
/// Characters that a cell takes at least, all arrays together: measured 9 to 13.
const LEAST_PER_CELL: usize = 8;
/// Instants kept at most.
const INSTANTS: usize = 160;
/// Flux lines wanted from the axis to the greatest flux.
const LINES: f64 = 13.0;

/// The fields as the page holds them.
#[derive(Debug)]
pub(super) struct PageFields {
    /// What the script needs to know of them.
    pub about: Value,
    /// The packed arrays.
    pub arrays: Vec<Packed>,
    /// What was left out, in words.
    pub remark: String,
}

/// A quantity that can be shown in colour.
#[derive(Debug, Clone, PartialEq, Serialize)]
struct Quantity {
    /// Names of the arrays: one, or the two parts of a vector.
    arrays: Vec<String>,
    /// Its name.
    name: String,
    /// Its shown unit.
    unit: String,
    /// Shown over SI.
    factor: f64,
    /// Shown at 0 in SI.
    offset: f64,
    /// Colours run from minus this to this, or from `least` to it; SI.
    largest: f64,
    /// The lowest value of the colours, SI.
    least: f64,
    /// Whether it has a sign, so that the colours part at zero.
    signed: bool,
    /// Colours from the lowest to the highest.
    colours: Vec<String>,
}

/// The fields of a run for its page, as fine as there is room; `None` where nothing was stored.
///
/// # Errors
/// What the HDF5 library says.
pub(super) fn page_fields(stored: &StoredFields, layout: Option<&Layout>) -> Result<Option<PageFields>, IoFault> {
    if stored.times_s.is_empty() {
        return Ok(None);
    }
    let plan = Plan::new(stored, layout, INSTANTS)?;
    let mut last = None;
    let mut cuts = plan.cuts().peekable();
    while let Some(cut) = cuts.next() {
        // What cannot fit is not even read, but for the coarsest.
        if cut.count() * LEAST_PER_CELL > ROOM && cuts.peek().is_some() {
            continue;
        }
        let page = cut_out(stored, &plan, &cut)?;
        let size: usize = page.arrays.iter().map(|a| a.base64.len()).sum();
        last = Some(page);
        if size <= ROOM {
            break;
        }
    }
    Ok(last)
}

/// All arrays of one cut.
fn cut_out(stored: &StoredFields, plan: &Plan, cut: &Cut) -> Result<PageFields, IoFault> {
    let file = stored.open()?;
    let mut arrays = Vec::new();
    let mut extremes = Vec::new();
    for array in &stored.cells {
        let values = cut.cells(&file, stored, array)?;
        extremes.push((array, Extremes::of(&values)));
        arrays.push(Packed::of(&array.name, &values, &cut.rows(), cut.columns()));
    }
    let psi = cut.nodes(&file, stored)?;
    let step = flux_step(&psi, cut, plan.inner_radius_m);
    let rows: Vec<usize> = cut.rows().iter().map(|rows| rows + 1).collect();
    arrays.push(Packed::of("psi", &pack::coarse(&psi), &rows, cut.columns() + 1));
    let about = json!({
        "quantities": quantities(&extremes),
        "grid": cut.about(),
        "instants": cut.instants(stored),
        "flux_step": step,
        "body": [plan.body_m.0, plan.body_m.1],
        "outer": plan.outer_radius_m,
        "inner": plan.inner_radius_m,
    });
    Ok(PageFields { about, arrays, remark: cut.remark(stored) })
}

/// The range of an array.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Extremes {
    least: f64,
    largest: f64,
    /// Exceeded by one value in two hundred only: near an edge or a dipole a field grows without bound.
    usual: f64,
}

impl Extremes {
    fn of(values: &[f64]) -> Self {
        let finite = || values.iter().copied().filter(|v| v.is_finite());
        let mut sizes: Vec<f64> = finite().map(f64::abs).filter(|v| *v > 0.0).collect();
        sizes.sort_unstable_by(f64::total_cmp);
        let usual = sizes.get(sizes.len().saturating_sub(1 + sizes.len() / 200)).copied().unwrap_or(0.0);
        Self {
            least: finite().fold(f64::INFINITY, f64::min),
            largest: finite().fold(f64::NEG_INFINITY, f64::max),
            usual,
        }
    }
}

/// Current density, flux density and heat density first, then whatever else is stored cell by cell.
fn quantities(arrays: &[(&CellArray, Extremes)]) -> Vec<Quantity> {
    let mut out = Vec::new();
    for (array, extremes) in arrays {
        match array.name.as_str() {
            "flux_density_r_T" => {}
            "flux_density_z_T" => out.push(flux_density(arrays)),
            _ => out.push(quantity(array, extremes)),
        }
    }
    let order = ["Current density", "Flux density", "Heat density"];
    out.sort_by_key(|q| order.iter().position(|name| *name == q.name).unwrap_or(order.len()));
    out
}

fn quantity(array: &CellArray, extremes: &Extremes) -> Quantity {
    let size = extremes.largest.abs().max(extremes.least.abs());
    let unit = Unit::for_values(&array.unit, size);
    let signed = extremes.least < 0.0;
    let name = match array.name.as_str() {
        "current_density_phi_A_per_m2" => "Current density".to_owned(),
        "heat_density_W_per_m3" => "Heat density".to_owned(),
        _ => words::column(&array.stem),
    };
    let map = if signed {
        colorous::RED_BLUE
    } else if name == "Heat density" {
        colorous::INFERNO
    } else {
        colorous::VIRIDIS
    };
    // A range that does not begin near zero, as of temperatures, is shown from its least value on.
    let least = if signed || extremes.least < 0.3 * extremes.largest { 0.0 } else { extremes.least };
    let least = if signed { -size } else { least };
    Quantity {
        arrays: vec![array.name.clone()],
        name,
        unit: unit.text.clone(),
        factor: unit.factor,
        offset: unit.offset,
        largest: size,
        least,
        signed,
        colours: stops(map, signed),
    }
}

/// The magnitude of the flux density.
fn flux_density(arrays: &[(&CellArray, Extremes)]) -> Quantity {
    let parts = ["flux_density_r_T", "flux_density_z_T"];
    let usual = arrays.iter().filter(|(a, _)| parts.contains(&a.name.as_str())).map(|(_, e)| e.usual);
    let largest = usual.fold(0.0, f64::max);
    let unit = Unit::for_values("T", largest);
    Quantity {
        arrays: parts.map(str::to_owned).to_vec(),
        name: "Flux density".to_owned(),
        unit: unit.text.clone(),
        factor: unit.factor,
        offset: 0.0,
        largest,
        least: 0.0,
        signed: false,
        colours: stops(colorous::CIVIDIS, false),
    }
}

/// Twenty-one colours from low to high; of a map with two ends the darkest are left out, for lines to show on them.
fn stops(map: colorous::Gradient, signed: bool) -> Vec<String> {
    let of = |i: i32| {
        let part = f64::from(i) / 20.0;
        let c = map.eval_continuous(if signed { 0.92 - 0.84 * part } else { part });
        format!("#{:02x}{:02x}{:02x}", c.r, c.g, c.b)
    };
    (0..=20).map(of).collect()
}

/// A round step of psi between neighbouring flux lines, Wb/rad.
fn flux_step(psi: &[f64], cut: &Cut, inner_radius_m: f64) -> f64 {
    let columns = cut.columns() + 1;
    let far = cut.node_radii().iter().position(|r| *r >= 0.5 * inner_radius_m).unwrap_or(0);
    let outside = psi.chunks(columns).flat_map(|row| row.iter().skip(far));
    let largest = outside.fold(0.0_f64, |m, v| m.max(v.abs()));
    let tau = std::f64::consts::TAU;
    if largest > 0.0 { round_step(tau * largest / LINES) / tau } else { 0.0 }
}

/// The nearest of a few round numbers times a power of ten.
fn round_step(value: f64) -> f64 {
    let power = 10.0_f64.powf(value.log10().floor());
    let far = |round: f64| (round * power / value).ln().abs();
    [1.0, 1.5, 2.0, 2.5, 3.0, 4.0, 5.0, 6.0, 8.0, 10.0]
        .into_iter()
        .min_by(|a, b| far(*a).total_cmp(&far(*b)))
        .unwrap_or(1.0)
        * power
}

//! The heat equation of the wall against exact cooling, and the heat of an event to the last joule.

use lenzbore_solver::cool_down::{Place, cool_down};
use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::problem::{Cooling, Extent, Layer, LayerHeat, Wall, Warming};

use super::{Banded, Check, Limits, Verdict};
use crate::Error;
use crate::references::{cooling, half_decimal};

pub(super) const CHECKS: &[Check] = &[
    Check::code_verification(
        "cooling-slab",
        "a slab that cools by films on both faces: middle, surface and mean by the wall's heat equation against the series",
        &cooling::SOURCE,
        slab,
    ),
    Check::code_verification(
        "cooling-rod",
        "a solid rod that cools by a film around it, likewise",
        &cooling::SOURCE,
        rod,
    ),
    Check::code_verification(
        "cooling-tube",
        "a tube that cools by different films in its bore and outside, likewise",
        &cooling::SOURCE,
        tube,
    ),
];

/// Greatest difference, over the initial excess.
const TOLERANCE: f64 = 1e-4;
/// Where time counts in its own unit.
const AMBIENT_K: f64 = 300.0;

/// A body of one layer, and its films.
struct Body {
    radii_m: [f64; 2],
    length_m: f64,
    /// Of bore, outside and ends, W/(m2 K).
    films: [f64; 3],
    places: [Place; 2],
}

fn diffusivity() -> f64 {
    let [k, density, specific_heat] = cooling::METAL;
    k / (density * specific_heat)
}

impl Body {
    fn against(&self, unit_s: f64, table: &[(f64, [f64; 3])], monitor: &dyn Monitor) -> Result<Verdict, Error> {
        if monitor.cancelled() {
            return Err(lenzbore_solver::fault::SolveFault::Interrupted.into());
        }
        let [k, density, specific_heat] = cooling::METAL;
        let layer = Layer {
            name: "body".to_owned(),
            inner_radius_m: self.radii_m[0],
            outer_radius_m: self.radii_m[1],
            from_m: 0.0,
            to_m: self.length_m,
            conductivity_s_per_m: 0.0,
            relative_permeability: 1.0,
        };
        let heat = LayerHeat {
            density_kg_per_m3: density,
            specific_heat_j_per_kg_k: specific_heat,
            thermal_conductivity_w_per_m_k: Some(k),
            resistivity_coefficient_per_k: None,
            trusted_to_k: f64::MAX,
            melting_k: None,
        };
        let [bore_w_per_m2_k, outside_w_per_m2_k, ends_w_per_m2_k] = self.films;
        let cooling = Cooling { bore_w_per_m2_k, outside_w_per_m2_k, ends_w_per_m2_k, ambient_k: AMBIENT_K };
        let wall = Wall { extent: Extent::Finite { length_m: self.length_m }, layers: vec![layer], slots: 0 };
        let warming = Warming { start_k: AMBIENT_K + 1.0, layers: vec![heat], cooling: Some(cooling), duty: None };
        let times: Vec<f64> = table.iter().map(|(t, _)| t * unit_s).collect();
        let found = cool_down(&wall, &warming, &self.places, &times)?;
        let mut verdict = Verdict::default();
        let limits = Limits { known_within: half_decimal(cooling::DECIMALS), allowed: TOLERANCE };
        for ((time, expected), found) in table.iter().zip(found) {
            for ((what, expected), found) in ["inside", "surface", "mean"].iter().zip(expected).zip(found) {
                let figure = Banded { value: found.value, band: found.band };
                verdict.compare_banded(format!("{what} at t = {time}"), figure, *expected, limits, "1");
            }
        }
        Ok(verdict)
    }
}

fn slab(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let (half, film) = cooling::SLAB;
    let radius = 0.1 * half;
    let at = |z_m| Place { r_m: 0.0, z_m };
    let body =
        Body { radii_m: [0.0, radius], length_m: 2.0 * half, films: [0.0, 0.0, film], places: [at(half), at(0.0)] };
    body.against(half * half / diffusivity(), &cooling::SLAB_EXCESS, monitor)
}

fn rod(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let (radius, film) = cooling::ROD;
    let at = |r_m| Place { r_m, z_m: 0.0 };
    let places = [at(0.0), at(radius)];
    let body = Body { radii_m: [0.0, radius], length_m: radius, films: [0.0, film, 0.0], places };
    body.against(radius * radius / diffusivity(), &cooling::ROD_EXCESS, monitor)
}

fn tube(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let [bore, outside] = cooling::TUBE_M;
    let at = |r_m| Place { r_m, z_m: 0.0 };
    let places = [at(bore), at(outside)];
    let films = [cooling::TUBE_FILMS[0], cooling::TUBE_FILMS[1], 0.0];
    let body = Body { radii_m: [bore, outside], length_m: outside, films, places };
    body.against(1.0, &cooling::TUBE_EXCESS, monitor)
}

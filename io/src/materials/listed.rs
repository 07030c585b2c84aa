//! The numbers of a record with their words, for those who show or export them.

use super::grade::{BookNumber, Conductor, MagnetGrade, Permeability};
use super::words::{CONDUCTOR_NUMBERS, MAGNET_NUMBERS, NumberWord};

impl Conductor {
    /// Its numbers in the order of [`CONDUCTOR_NUMBERS`]; those that it has not are left out.
    #[must_use]
    pub fn numbers(&self) -> Vec<(NumberWord, &BookNumber)> {
        let permeability = match &self.permeability {
            Permeability::Linear(n) => Some(n),
            Permeability::NotLinear(_) | Permeability::NotGiven => None,
        };
        let numbers = [
            Some(&self.conductivity_s_per_m),
            self.temperature_coefficient_per_k.as_ref(),
            permeability,
            self.density_kg_per_m3.as_ref(),
            self.specific_heat_j_per_kg_k.as_ref(),
            self.thermal_conductivity_w_per_m_k.as_ref(),
        ];
        present(&CONDUCTOR_NUMBERS, numbers)
    }
}

impl MagnetGrade {
    /// Its numbers in the order of [`MAGNET_NUMBERS`]; those that it has not are left out.
    #[must_use]
    pub fn numbers(&self) -> Vec<(NumberWord, &BookNumber)> {
        let numbers = [
            Some(&self.remanence_tesla),
            self.remanence_coefficient_per_k.as_ref(),
            self.recoil_permeability.as_ref(),
            self.coercivity_hcb_a_per_m.as_ref(),
            self.coercivity_hcj_a_per_m.as_ref(),
            self.coercivity_hcj_coefficient_per_k.as_ref(),
            self.greatest_temperature_k.as_ref(),
            self.density_kg_per_m3.as_ref(),
            self.specific_heat_j_per_kg_k.as_ref(),
            self.thermal_conductivity_w_per_m_k.as_ref(),
            self.conductivity_s_per_m.as_ref(),
        ];
        present(&MAGNET_NUMBERS, numbers)
    }
}

fn present<'n, const N: usize>(
    words: &[NumberWord; N],
    numbers: [Option<&'n BookNumber>; N],
) -> Vec<(NumberWord, &'n BookNumber)> {
    words.iter().copied().zip(numbers).filter_map(|(w, n)| Some((w, n?))).collect()
}

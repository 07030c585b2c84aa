//! Grades with their numbers in SI, each with its source in full. Book values hold at 20 degC.

use std::sync::Arc;

/// Which of a grade's values is meant.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum GradeValue {
    /// The lowest that the grade allows.
    Minimum,
    /// What is delivered as a rule.
    #[default]
    Typical,
    /// The highest that the grade allows.
    Maximum,
}

/// A number of a grade, SI, with its bounds where it has them.
#[derive(Debug, Clone, PartialEq)]
pub struct BookNumber {
    /// What is delivered as a rule; where the grade only guarantees a least value, that.
    pub typical: f64,
    /// Lowest, where it is known.
    pub minimum: Option<f64>,
    /// Highest, where it is known.
    pub maximum: Option<f64>,
    /// Whether only a least value is known, so that what is delivered lies above [`Self::typical`].
    pub is_least: bool,
    /// Where the typical value comes from, in full.
    pub source: String,
    /// Where the bounds come from, in full.
    pub range_source: String,
}

impl BookNumber {
    /// The value meant; the typical one where that bound is not known.
    #[must_use]
    pub fn pick(&self, which: GradeValue) -> f64 {
        self.bound(which).unwrap_or(self.typical)
    }

    /// Where the value meant comes from.
    #[must_use]
    pub fn source_of(&self, which: GradeValue) -> &str {
        if self.bound(which).is_none() { &self.source } else { &self.range_source }
    }

    fn bound(&self, which: GradeValue) -> Option<f64> {
        match which {
            GradeValue::Minimum => self.minimum,
            GradeValue::Typical => None,
            GradeValue::Maximum => self.maximum,
        }
    }
}

/// What conductors and magnets share.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Grade {
    /// Metal or magnet family: `copper`, `NdFeB`.
    pub family: String,
    /// Its own name: `Cu-DHP`, `N42SH`.
    pub name: String,
    /// Other names for the same.
    pub also: Vec<String>,
    /// Standards that name it; no number comes from them unless its source says so.
    pub standards: Vec<String>,
    /// What it is, in a few words.
    pub about: String,
    /// What a user of this grade should know.
    pub caution: Option<String>,
    /// The file of own materials that has it; `None` for the book's grades.
    pub file: Option<String>,
}

impl Grade {
    /// Family and name, as a case file writes them: `copper Cu-DHP`.
    #[must_use]
    pub fn full_name(&self) -> String {
        format!("{} {}", self.family, self.name)
    }
}

/// Relative permeability of a conductor.
#[derive(Debug, Clone, PartialEq)]
pub enum Permeability {
    /// Linear.
    Linear(BookNumber),
    /// No linear value has a source, and why.
    NotLinear(String),
    /// Own materials may leave it out: then it is 1, as of a layer without a grade.
    NotGiven,
}

/// A conductor grade at 20 degC. The book has every number; own materials may have the conductivity alone.
#[derive(Debug, Clone, PartialEq)]
pub struct Conductor {
    /// Names.
    pub grade: Grade,
    /// Electrical conductivity, S/m.
    pub conductivity_s_per_m: BookNumber,
    /// Temperature coefficient of resistivity, 1/K.
    pub temperature_coefficient_per_k: Option<BookNumber>,
    /// Relative permeability.
    pub permeability: Permeability,
    /// Density, kg/m3.
    pub density_kg_per_m3: Option<BookNumber>,
    /// Specific heat at constant pressure, J/(kg K).
    pub specific_heat_j_per_kg_k: Option<BookNumber>,
    /// Thermal conductivity, W/(m K).
    pub thermal_conductivity_w_per_m_k: Option<BookNumber>,
}

/// A magnet grade at 20 degC. The book has every number; own materials may have the remanence alone.
#[derive(Debug, Clone, PartialEq)]
pub struct MagnetGrade {
    /// Names.
    pub grade: Grade,
    /// Remanence, T.
    pub remanence_tesla: BookNumber,
    /// Relative change of remanence with temperature, 1/K.
    pub remanence_coefficient_per_k: Option<BookNumber>,
    /// Relative recoil permeability.
    pub recoil_permeability: Option<BookNumber>,
    /// Coercivity of the flux density (B = 0), A/m. While the line B(H) is straight down to it, it follows the remanence.
    pub coercivity_hcb_a_per_m: Option<BookNumber>,
    /// Coercivity of the polarisation (J = 0), A/m.
    pub coercivity_hcj_a_per_m: Option<BookNumber>,
    /// Relative change of [`Self::coercivity_hcj_a_per_m`] with temperature, 1/K; a ferrite's is positive.
    pub coercivity_hcj_coefficient_per_k: Option<BookNumber>,
    /// Greatest working temperature, K.
    pub greatest_temperature_k: Option<BookNumber>,
    /// Density, kg/m3.
    pub density_kg_per_m3: Option<BookNumber>,
    /// Specific heat, J/(kg K).
    pub specific_heat_j_per_kg_k: Option<BookNumber>,
    /// Thermal conductivity, W/(m K).
    pub thermal_conductivity_w_per_m_k: Option<BookNumber>,
    /// Electrical conductivity, S/m.
    pub conductivity_s_per_m: Option<BookNumber>,
}

impl MagnetGrade {
    /// Greatest working temperature, degC.
    #[must_use]
    pub fn greatest_temperature_c(&self) -> Option<f64> {
        self.greatest_temperature_k.as_ref().map(|n| n.typical - 273.15)
    }
}

/// Grades of one kind of book, the program's or a user's.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Book {
    /// Conductors, by family.
    pub conductors: Vec<Arc<Conductor>>,
    /// Magnets, by family and remanence.
    pub magnets: Vec<Arc<MagnetGrade>>,
}

impl Book {
    /// This book with the grades of another behind its own.
    #[must_use]
    pub fn with(&self, other: &Self) -> Self {
        Self {
            conductors: self.conductors.iter().chain(&other.conductors).cloned().collect(),
            magnets: self.magnets.iter().chain(&other.magnets).cloned().collect(),
        }
    }
}

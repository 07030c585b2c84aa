//! Grades with their numbers in SI, each with its source in full.

use std::sync::LazyLock;

use super::raw::{RawBook, RawClass, RawConductor, RawMagnet, RawNumber, Written};
use crate::units::{Kind, QuantityFault, read_bare_number, read_quantity};

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

/// A number of the book, SI, with its range where the grade has one.
#[derive(Debug, Clone, PartialEq)]
pub struct BookNumber {
    /// What is delivered as a rule.
    pub typical: f64,
    /// Lowest and highest, where the book has them.
    pub range: Option<[f64; 2]>,
    /// Where the typical value comes from, in full.
    pub source: String,
    /// Where the range comes from, in full.
    pub range_source: String,
}

impl BookNumber {
    /// The value meant; the typical one where the book has no range.
    #[must_use]
    pub fn pick(&self, which: GradeValue) -> f64 {
        match (which, self.range) {
            (GradeValue::Minimum, Some([lowest, _])) => lowest,
            (GradeValue::Maximum, Some([_, highest])) => highest,
            _ => self.typical,
        }
    }

    /// Where the value meant comes from.
    #[must_use]
    pub fn source_of(&self, which: GradeValue) -> &str {
        if which == GradeValue::Typical || self.range.is_none() { &self.source } else { &self.range_source }
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
    /// What it is, in a few words.
    pub about: String,
}

impl Grade {
    /// Family and name, as a case file writes them: `copper Cu-DHP`.
    #[must_use]
    pub fn full_name(&self) -> String {
        format!("{} {}", self.family, self.name)
    }
}

/// A conductor grade at 20 degC.
#[derive(Debug, Clone, PartialEq)]
pub struct Conductor {
    /// Names.
    pub grade: Grade,
    /// Electrical conductivity at 20 degC, S/m.
    pub conductivity_s_per_m: BookNumber,
    /// Temperature coefficient of resistivity at 20 degC, 1/K.
    pub temperature_coefficient_per_k: BookNumber,
    /// Relative permeability, linear.
    pub relative_permeability: BookNumber,
    /// What a user of this grade should know.
    pub caution: Option<String>,
}

/// A magnet grade at 20 degC.
#[derive(Debug, Clone, PartialEq)]
pub struct MagnetGrade {
    /// Names.
    pub grade: Grade,
    /// Remanence at 20 degC, T.
    pub remanence_tesla: BookNumber,
    /// Relative change of remanence with temperature, 1/K.
    pub remanence_coefficient_per_k: BookNumber,
    /// Relative recoil permeability.
    pub recoil_permeability: BookNumber,
    /// Highest working temperature, K.
    pub highest_temperature_k: BookNumber,
}

/// The whole book.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Book {
    /// Conductors, by family.
    pub conductors: Vec<Conductor>,
    /// Magnets, by family and remanence.
    pub magnets: Vec<MagnetGrade>,
}

static BOOK: LazyLock<Book> = LazyLock::new(|| {
    #[expect(clippy::expect_used, reason = "the book is compiled in, and a test reads it")]
    Book::read(include_str!("book.toml")).expect("the compiled-in material book reads")
});

/// The material book that comes with the program.
#[must_use]
pub fn book() -> &'static Book {
    &BOOK
}

/// Why the book's data file cannot be read: a fault of the program, not of a user.
#[derive(Debug, thiserror::Error)]
pub(super) enum BookFault {
    #[error(transparent)]
    Toml(#[from] toml::de::Error),
    #[error(transparent)]
    Number(#[from] QuantityFault),
    #[error("the book has no source '{0}'")]
    NoSource(String),
    #[error("the book has no class '{0}'")]
    NoClass(String),
    #[error("a lowest value needs a highest one, and lowest <= typical <= highest")]
    Range,
}

impl Book {
    pub(super) fn read(text: &str) -> Result<Self, BookFault> {
        let raw: RawBook = toml::from_str(text)?;
        let conductors = raw.conductor.iter().map(|c| conductor(&raw, c)).collect::<Result<_, _>>()?;
        let mut magnets = Vec::new();
        for magnet in &raw.magnet {
            for class in &magnet.classes {
                let numbers = raw.class.get(class).ok_or_else(|| BookFault::NoClass(class.clone()))?;
                magnets.push(magnet_grade(&raw, magnet, class, numbers)?);
            }
        }
        Ok(Self { conductors, magnets })
    }
}

fn conductor(raw: &RawBook, c: &RawConductor) -> Result<Conductor, BookFault> {
    let (family, name, also, about) = (c.family.clone(), c.name.clone(), c.also.clone(), c.about.clone());
    Ok(Conductor {
        grade: Grade { family, name, also, about },
        conductivity_s_per_m: number(raw, &c.conductivity, Kind::Conductivity)?,
        temperature_coefficient_per_k: number(raw, &c.temperature_coefficient, Kind::TemperatureCoefficient)?,
        relative_permeability: number(raw, &c.permeability, Kind::Ratio)?,
        caution: c.caution.clone(),
    })
}

fn magnet_grade(raw: &RawBook, m: &RawMagnet, class: &str, numbers: &RawClass) -> Result<MagnetGrade, BookFault> {
    let letters = if m.name == class { "" } else { class };
    let (family, name, about) = (m.family.clone(), format!("{}{letters}", m.name), m.about.clone());
    Ok(MagnetGrade {
        grade: Grade { family, name, also: Vec::new(), about },
        remanence_tesla: number(raw, &m.remanence, Kind::FluxDensity)?,
        remanence_coefficient_per_k: number(raw, &numbers.coefficient, Kind::TemperatureCoefficient)?,
        recoil_permeability: number(raw, &m.recoil_permeability, Kind::Ratio)?,
        highest_temperature_k: number(raw, &numbers.highest_temperature, Kind::Temperature)?,
    })
}

fn number(raw: &RawBook, n: &RawNumber, kind: Kind) -> Result<BookNumber, BookFault> {
    let read = |written: &Written| match written {
        Written::Text(text) => read_quantity(text, kind).map(|q| q.si),
        Written::Number(value) => read_bare_number(*value, kind).map(|q| q.si),
    };
    let source_of = |id: &String| raw.sources.get(id).cloned().ok_or_else(|| BookFault::NoSource(id.clone()));
    let typical = read(&n.typical)?;
    let range = match (&n.minimum, &n.maximum) {
        (None, None) => None,
        (Some(low), Some(high)) => Some([read(low)?, read(high)?]),
        _ => return Err(BookFault::Range),
    };
    if range.is_some_and(|[low, high]| low > typical || typical > high) {
        return Err(BookFault::Range);
    }
    let source = source_of(&n.source)?;
    let range_source = n.range_source.as_ref().map(source_of).transpose()?.unwrap_or_else(|| source.clone());
    Ok(BookNumber { typical, range, source, range_source })
}

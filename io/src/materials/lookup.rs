//! Finding a grade by what a user wrote.

use std::sync::Arc;

use super::grade::{Book, Conductor, Grade, MagnetGrade};
use crate::message::{CaseFault, nearest};

/// So many grades are named in a message.
const MOST_NAMED: usize = 14;

/// Names that people use for a family, beside its own.
const FAMILY_NAMES: [(&str, &str); 17] = [
    ("cu", "copper"),
    ("aluminum", "aluminium"),
    ("al", "aluminium"),
    ("tin bronze", "bronze"),
    ("phosphor bronze", "bronze"),
    ("stainless steel", "stainless"),
    ("iron", "steel"),
    ("neodymium", "NdFeB"),
    ("neodymium magnet", "NdFeB"),
    ("neo", "NdFeB"),
    ("samarium cobalt", "SmCo"),
    ("samarium", "SmCo"),
    ("SmCo5", "SmCo"),
    ("Sm2Co17", "SmCo"),
    ("hard ferrite", "ferrite"),
    ("ceramic magnet", "ferrite"),
    ("magnet", "NdFeB"),
];

impl Book {
    /// The conductor grade that `text` names, as `copper Cu-DHP`, `Cu-DHP` or `CW024A`.
    ///
    /// # Errors
    /// [`CaseFault::BareMaterial`] for a metal without a grade, [`CaseFault::UnknownMaterial`] otherwise.
    pub fn conductor(&self, text: &str) -> Result<Arc<Conductor>, CaseFault> {
        find(text, "conductor", &self.conductors, |c| &c.grade)
    }

    /// The magnet grade that `text` names, as `NdFeB N42SH` or `N42SH`.
    ///
    /// # Errors
    /// As for [`Self::conductor`].
    pub fn magnet(&self, text: &str) -> Result<Arc<MagnetGrade>, CaseFault> {
        find(text, "magnet", &self.magnets, |m| &m.grade)
    }

    /// Names of all grades.
    pub fn grades(&self) -> impl Iterator<Item = &Grade> {
        self.conductors.iter().map(|c| &c.grade).chain(self.magnets.iter().map(|m| &m.grade))
    }

    /// The grades that have every word of `text` in a name, in their family, in the number of a standard or in what is
    /// said about them.
    #[must_use]
    pub fn search(&self, text: &str) -> Self {
        let words: Vec<String> = text.split_whitespace().map(plain).filter(|w| !w.is_empty()).collect();
        let whole = plain(text);
        let wanted = |g: &Grade| {
            let all: Vec<String> = g
                .also
                .iter()
                .chain(&g.standards)
                .chain([&g.family, &g.name, &g.about, &g.full_name()])
                .map(|n| plain(n))
                .collect();
            let has = |word: &String| all.iter().any(|n| n.contains(word));
            has(&whole) || (!words.is_empty() && words.iter().all(has))
        };
        Self {
            conductors: self.conductors.iter().filter(|c| wanted(&c.grade)).cloned().collect(),
            magnets: self.magnets.iter().filter(|m| wanted(&m.grade)).cloned().collect(),
        }
    }
}

/// Capitals, blanks and hyphens do not tell grades apart.
fn plain(text: &str) -> String {
    text.chars().filter(|c| !c.is_whitespace() && !"-_".contains(*c)).flat_map(char::to_lowercase).collect()
}

/// Every name a grade is found under, in plain letters.
fn names(grade: &Grade) -> impl Iterator<Item = String> + '_ {
    let own = grade.also.iter().chain([&grade.name]);
    own.flat_map(|n| [plain(n), plain(&format!("{}{n}", grade.family))])
}

/// Whether two grades share a name.
pub(super) fn same_name(one: &Grade, other: &Grade) -> bool {
    names(one).any(|a| names(other).any(|b| a == b))
}

fn find<T>(
    text: &str,
    wanted: &'static str,
    rows: &[Arc<T>],
    grade: impl Fn(&T) -> &Grade,
) -> Result<Arc<T>, CaseFault> {
    let sought = family_spelled_out(&plain(text));
    rows.iter()
        .find(|row| names(grade(row)).any(|n| n == sought))
        .cloned()
        .ok_or_else(|| missing(text, &sought, wanted, &rows.iter().map(|r| grade(r)).collect::<Vec<_>>()))
}

/// `aluminum 6061-T6` is looked up as `aluminium 6061-T6`.
fn family_spelled_out(sought: &str) -> String {
    match sought.strip_prefix("aluminum") {
        Some(rest) => format!("aluminium{rest}"),
        None => sought.to_owned(),
    }
}

fn missing(text: &str, sought: &str, wanted: &'static str, grades: &[&Grade]) -> CaseFault {
    let found = text.trim().to_owned();
    let family = family_of(sought, grades);
    let of_family = |g: &&&Grade| family.as_deref().is_some_and(|f| plain(&g.family) == f);
    let mut named: Vec<String> = grades.iter().filter(of_family).map(|g| g.full_name()).collect();
    let is_bare = family.as_deref() == Some(sought) || FAMILY_NAMES.iter().any(|(n, _)| plain(n) == sought);
    if is_bare && !named.is_empty() {
        return CaseFault::BareMaterial { found, grades: named, instead: value_word(wanted) };
    }
    let names: Vec<String> = grades.iter().flat_map(|g| [g.full_name(), g.name.clone()]).collect();
    let nearest = nearest(text.trim(), names.iter().map(String::as_str)).map(str::to_owned);
    if named.is_empty() {
        named = grades.iter().map(|g| g.full_name()).collect();
    }
    named.truncate(MOST_NAMED);
    CaseFault::UnknownMaterial { found, wanted, nearest, grades: named }
}

/// The word that gives the value itself.
fn value_word(wanted: &str) -> &'static str {
    if wanted == "magnet" { "remanence" } else { "conductivity" }
}

/// The family whose name starts what was sought, in plain letters.
fn family_of(sought: &str, grades: &[&Grade]) -> Option<String> {
    if let Some((_, family)) = FAMILY_NAMES.iter().find(|(name, _)| plain(name) == sought) {
        return Some(plain(family));
    }
    grades.iter().map(|g| plain(&g.family)).find(|f| sought.starts_with(f.as_str()))
}

//! Finding a grade by what a user wrote.

use super::book::{Conductor, Grade, MagnetGrade, book};
use crate::message::{CaseFault, nearest};

/// So many grades are named in a message.
const MOST_NAMED: usize = 14;

/// Names that people use for a family, beside its own.
const FAMILY_NAMES: [(&str, &str); 11] = [
    ("cu", "copper"),
    ("aluminum", "aluminium"),
    ("al", "aluminium"),
    ("stainless steel", "stainless"),
    ("iron", "steel"),
    ("neodymium", "NdFeB"),
    ("neodymium magnet", "NdFeB"),
    ("neo", "NdFeB"),
    ("samarium cobalt", "SmCo"),
    ("samarium", "SmCo"),
    ("magnet", "NdFeB"),
];

/// The conductor grade that `text` names, as `copper Cu-DHP`, `Cu-DHP` or `CW024A`.
///
/// # Errors
/// [`CaseFault::BareMaterial`] for a metal without a grade, [`CaseFault::UnknownMaterial`] otherwise.
pub fn conductor(text: &str) -> Result<&'static Conductor, CaseFault> {
    find(text, "conductor", &book().conductors, |c| &c.grade)
}

/// The magnet grade that `text` names, as `NdFeB N42SH` or `N42SH`.
///
/// # Errors
/// As for [`conductor`].
pub fn magnet(text: &str) -> Result<&'static MagnetGrade, CaseFault> {
    find(text, "magnet", &book().magnets, |m| &m.grade)
}

/// Full names of all grades that have `text` in a name, in their family or in what is said about them.
#[must_use]
pub fn search(text: &str) -> Vec<String> {
    let wanted = plain(text);
    all_grades()
        .filter(|g| {
            let names = g.also.iter().chain([&g.family, &g.name, &g.about]);
            names.map(|n| plain(n)).chain([plain(&g.full_name())]).any(|n| n.contains(&wanted))
        })
        .map(Grade::full_name)
        .collect()
}

fn all_grades() -> impl Iterator<Item = &'static Grade> {
    book().conductors.iter().map(|c| &c.grade).chain(book().magnets.iter().map(|m| &m.grade))
}

/// Capitals, blanks and hyphens do not tell grades apart.
fn plain(text: &str) -> String {
    text.chars().filter(|c| !c.is_whitespace() && !"-_".contains(*c)).flat_map(char::to_lowercase).collect()
}

fn find<T>(
    text: &str,
    wanted: &'static str,
    rows: &'static [T],
    grade: impl Fn(&'static T) -> &'static Grade,
) -> Result<&'static T, CaseFault> {
    let sought = family_spelled_out(&plain(text));
    let matches = |g: &Grade| {
        let names = g.also.iter().chain([&g.name]);
        names.into_iter().any(|n| plain(n) == sought || plain(&format!("{}{n}", g.family)) == sought)
    };
    rows.iter()
        .find(|row| matches(grade(row)))
        .ok_or_else(|| missing(text, &sought, wanted, rows.iter().map(grade).collect()))
}

/// `aluminum 6061-T6` is looked up as `aluminium 6061-T6`.
fn family_spelled_out(sought: &str) -> String {
    match sought.strip_prefix("aluminum") {
        Some(rest) => format!("aluminium{rest}"),
        None => sought.to_owned(),
    }
}

fn missing(text: &str, sought: &str, wanted: &'static str, grades: Vec<&'static Grade>) -> CaseFault {
    let found = text.trim().to_owned();
    let family = family_of(sought);
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
    if named.len() > MOST_NAMED {
        named.truncate(MOST_NAMED);
    }
    CaseFault::UnknownMaterial { found, wanted, nearest, grades: named }
}

/// The word that gives the value itself.
fn value_word(wanted: &str) -> &'static str {
    if wanted == "magnet" { "remanence" } else { "conductivity" }
}

/// The family whose name starts what was sought, in plain letters.
fn family_of(sought: &str) -> Option<String> {
    if let Some((_, family)) = FAMILY_NAMES.iter().find(|(name, _)| plain(name) == sought) {
        return Some(plain(family));
    }
    all_grades().map(|g| plain(&g.family)).find(|f| sought.starts_with(f.as_str()))
}

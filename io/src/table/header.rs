//! A header cell: name, unit and coverage factor, in the styles that people write.

use super::roles::{Role, names, role_of};

/// A header cell, taken apart.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Heading {
    /// As written.
    pub written: String,
    /// What it names.
    pub subject: Subject,
    /// Its unit as `read_unit` takes it; empty where there is none.
    pub unit: String,
    /// A coverage factor in the header.
    pub coverage: Option<f64>,
}

/// What a heading names.
#[derive(Debug, Clone, PartialEq)]
pub(super) enum Subject {
    /// A known column.
    Known(Role),
    /// The uncertainty of the column with that name.
    UncertaintyOf { name: String, expanded: bool },
    /// A word of the case.
    Word(String),
    /// Neither.
    Unknown(String),
}

/// Takes a header cell apart: `drag_N`, `drag [N]`, `drag (N)`, `drag / N`, `drag, N`, `U(drag) (k=2) [N]`.
pub(super) fn heading(written: &str) -> Heading {
    let (bare, groups) = without_brackets(written);
    let coverage = groups.iter().find_map(|g| coverage(g));
    let mut free = groups.iter().filter(|g| coverage_free(g));
    // U(drag) and u(drag) name what is uncertain in their first bracket.
    let bare = match matches!(bare.trim(), "U" | "u").then(|| free.next()).flatten() {
        Some(name) => format!("{}_{name}", bare.trim()),
        None => bare,
    };
    let unit = free.next().cloned();
    let (subject, tail) = subject(&bare, unit.is_some());
    let unit = unit.unwrap_or(tail);
    Heading { written: written.to_owned(), subject, unit: plain_unit(&unit), coverage }
}

/// The text outside brackets, and each bracket's content.
fn without_brackets(text: &str) -> (String, Vec<String>) {
    let (mut bare, mut groups, mut depth) = (String::new(), Vec::new(), 0_usize);
    for c in text.chars() {
        match c {
            '[' | '(' => {
                if depth == 0 {
                    groups.push(String::new());
                } else if let Some(group) = groups.last_mut() {
                    group.push(c);
                }
                depth += 1;
            }
            ']' | ')' if depth > 0 => {
                depth -= 1;
                if depth > 0
                    && let Some(group) = groups.last_mut()
                {
                    group.push(c);
                }
            }
            c if depth > 0 => {
                if let Some(group) = groups.last_mut() {
                    group.push(c);
                }
            }
            c => bare.push(c),
        }
    }
    (bare, groups.into_iter().map(|g: String| g.trim().to_owned()).collect())
}

/// `k=2`, `k = 1,96`; `95 %` is k = 1.96.
fn coverage(group: &str) -> Option<f64> {
    if let Some(rest) = group.trim().strip_prefix('k') {
        return super::cells::number(rest.trim_start().strip_prefix('=')?, true).filter(|k| *k > 0.0);
    }
    let percent: String = group.chars().filter(|c| !c.is_whitespace()).collect();
    (percent == "95%").then_some(lenzbore_solver::spread::COVERAGE)
}

fn coverage_free(group: &str) -> bool {
    coverage(group).is_none()
}

/// Lower case, with underscores for blanks and hyphens.
pub(super) fn snake(name: &str) -> String {
    name.trim().to_lowercase().split([' ', '-', '_']).filter(|w| !w.is_empty()).collect::<Vec<_>>().join("_")
}

/// What the bare part names, and what is left of it as a unit.
fn subject(bare: &str, has_unit: bool) -> (Subject, String) {
    let bare = bare.trim();
    if bare.contains('.') && !bare.contains(' ') || bare.split('.').count() > 2 {
        return word(bare, has_unit);
    }
    let name = snake(bare);
    if let Some(uncertain) = uncertainty_of(bare) {
        return uncertain;
    }
    if let Some(role) = role_of(&name) {
        return (Subject::Known(role), String::new());
    }
    if !has_unit
        && let Some((name, tail)) = longest_name(bare)
        && let Some(role) = role_of(&name)
    {
        return (Subject::Known(role), tail);
    }
    (Subject::Unknown(bare.to_owned()), String::new())
}

/// The longest known name at the start, and the unit behind its separator: `speed_m_per_s`, `drag / N`, `drag, N`.
fn longest_name(bare: &str) -> Option<(String, String)> {
    let ends = bare.char_indices().filter(|(_, c)| " _/,:-".contains(*c)).map(|(i, _)| i);
    let splits = ends.map(|i| (snake(&bare[..i]), bare[i..].trim_matches([' ', '_', '/', ',', ':', '-'])));
    let known: Vec<(String, String)> = splits
        .filter(|(name, tail)| !tail.is_empty() && role_of(name).is_some())
        .map(|(name, tail)| (name, tail.to_owned()))
        .collect();
    known.into_iter().max_by_key(|(name, _)| name.len())
}

/// `u_drag`, `U_drag_N`, `drag_uncertainty`, `drag uncertainty`, `drag std`.
fn uncertainty_of(bare: &str) -> Option<(Subject, String)> {
    let of = |name: &str, expanded: bool| -> Option<(Subject, String)> {
        let whole = snake(name);
        if matches!(role_of(&whole), Some(r) if r.kind().is_some()) {
            return Some((Subject::UncertaintyOf { name: whole, expanded }, String::new()));
        }
        let (name, tail) = longest_name(name)?;
        matches!(role_of(&name), Some(r) if r.kind().is_some())
            .then_some((Subject::UncertaintyOf { name, expanded }, tail))
    };
    for (prefix, expanded) in [("u_", false), ("U_", true), ("u ", false), ("U ", true)] {
        if let Some(found) = bare.strip_prefix(prefix).and_then(|rest| of(rest, expanded)) {
            return Some(found);
        }
    }
    for (mark, expanded) in
        [("standard_uncertainty", false), ("expanded_uncertainty", true), ("uncertainty", true), ("std", false)]
    {
        let name = snake(bare);
        if let Some((name, tail)) = name.split_once(&format!("_{mark}")) {
            let found = of(name, expanded);
            // Capitals of a unit are lost in the name: take the unit from the text as written.
            let tail = bare[bare.len() - tail.len().min(bare.len())..].trim_matches(['_', ' ']).to_owned();
            if let Some((subject, _)) = found {
                return Some((subject, tail));
            }
        }
        if name == mark {
            return Some((Subject::Known(Role::Uncertainty { expanded }), String::new()));
        }
        if let Some(tail) = name.strip_prefix(&format!("{mark}_")) {
            let tail = bare[bare.len() - tail.len().min(bare.len())..].to_owned();
            return Some((Subject::Known(Role::Uncertainty { expanded }), tail));
        }
    }
    None
}

/// A word of the case: `wall.sleeve.thickness`, `wall.sleeve.thickness_mm`, `wall.my sleeve.thickness mm`.
fn word(bare: &str, has_unit: bool) -> (Subject, String) {
    let (stem, last) = bare.rsplit_once('.').unwrap_or(("", bare));
    let legal = || crate::case::TABLES.iter().flat_map(|t| t.words.iter().copied());
    let plain = last.trim();
    if has_unit || legal().any(|w| w == plain) {
        return (Subject::Word(format!("{stem}.{plain}")), String::new());
    }
    let split = legal()
        .filter_map(|w| plain.strip_prefix(w).map(|tail| (w, tail)))
        .filter(|(_, tail)| tail.starts_with([' ', '_', '/', ',']))
        .max_by_key(|(w, _)| w.len());
    match split {
        Some((w, tail)) => {
            let unit = tail.trim_matches([' ', '_', '/', ',']).to_owned();
            (Subject::Word(format!("{stem}.{w}")), unit)
        }
        None => (Subject::Word(format!("{stem}.{plain}")), String::new()),
    }
}

/// `m_per_s` as `m/s`, `N_s_per_m` as `N s/m`.
fn plain_unit(unit: &str) -> String {
    unit.trim().replace("_per_", "/").replace(" per ", "/").replace('_', " ")
}

/// Names that a misspelled heading may have meant.
pub(super) fn nearest_name(name: &str) -> Option<String> {
    let mut known: Vec<&str> = names().map(|(n, _)| n).filter(|n| n.len() > 2).collect();
    // The longest of equally near names is meant: "drag_peek" is drag_peak, not drag.
    known.sort_by_key(|n| std::cmp::Reverse(n.len()));
    crate::message::nearest(&snake(name), known).map(str::to_owned)
}

//! `lenzbore materials`: the grades in a list, or one with the source of every number.

use std::fmt::Write;

use lenzbore_io::materials::{Book, BookNumber, Grade, NumberWord, Permeability, book, read_own_materials};
use lenzbore_io::message::{CaseFault, Diagnostics};
use serde_json::{Map, Value, json};

use crate::arguments::MaterialsWords;
use crate::end::End;
use crate::say;

/// Width of the column of names in a list.
const NAME_WIDTH: usize = 24;
/// Width of the column of the foremost number in a list.
const NUMBER_WIDTH: usize = 28;

/// A grade and what is shown of it.
struct Shown<'b> {
    grade: &'b Grade,
    numbers: Vec<(NumberWord, &'b BookNumber)>,
    /// Why there is no linear permeability.
    not_linear: Option<&'b str>,
}

/// Prints one grade with its sources, or a list of all or of what is searched for.
pub fn run(words: &MaterialsWords) -> Result<(), End> {
    let own = words.with.as_deref().map(read_own_materials).transpose()?.unwrap_or_default();
    let whole = book().with(&own);
    let found = match (&words.name, &words.search) {
        (Some(name), _) => named(&whole, name)?,
        (None, Some(text)) => whole.search(text),
        (None, None) => whole,
    };
    let grades = shown(&found);
    if grades.is_empty() {
        let text = words.search.as_deref().unwrap_or_default();
        return Err(End::Input(format!("no grade has '{text}' in its names, its standards or its description")));
    }
    let text = match grades.as_slice() {
        _ if words.json => format!("{:#}\n", as_json(&grades)),
        [one] => in_full(one),
        many => many.iter().map(line).chain([last_line()]).collect(),
    };
    say::to_standard_output(&text);
    Ok(())
}

/// The one grade of that name, conductor or magnet.
fn named(whole: &Book, name: &str) -> Result<Book, End> {
    let fault = match (whole.conductor(name), whole.magnet(name)) {
        (Ok(c), _) => return Ok(Book { conductors: vec![c], magnets: Vec::new() }),
        (_, Ok(m)) => return Ok(Book { conductors: Vec::new(), magnets: vec![m] }),
        (Err(c), Err(m)) => foremost(c, m),
    };
    Err(Diagnostics::of_input(fault).into())
}

/// The one of two faults that tells more.
fn foremost(conductor: CaseFault, magnet: CaseFault) -> CaseFault {
    let tells = |f: &CaseFault| match f {
        CaseFault::BareMaterial { .. } => 2,
        CaseFault::UnknownMaterial { nearest: Some(_), .. } => 1,
        _ => 0,
    };
    if tells(&magnet) > tells(&conductor) { magnet } else { conductor }
}

fn shown(book: &Book) -> Vec<Shown<'_>> {
    let conductors = book.conductors.iter().map(|c| {
        let not_linear = match &c.permeability {
            Permeability::NotLinear(why) => Some(why.as_str()),
            Permeability::Linear(_) | Permeability::NotGiven => None,
        };
        Shown { grade: &c.grade, numbers: c.numbers(), not_linear }
    });
    let magnets = book.magnets.iter().map(|m| Shown { grade: &m.grade, numbers: m.numbers(), not_linear: None });
    conductors.chain(magnets).collect()
}

/// Name, foremost number, description.
fn line(shown: &Shown<'_>) -> String {
    let number = shown.numbers.first().map_or(String::new(), |(word, n)| in_units(word, n));
    let name = shown.grade.full_name();
    format!("{name:<NAME_WIDTH$} {number:<NUMBER_WIDTH$} {}\n", shown.grade.about)
}

fn last_line() -> String {
    "\nat 20 degC; `lenzbore materials NAME` shows every number of a grade with its source\n".to_owned()
}

fn in_full(shown: &Shown<'_>) -> String {
    let grade = shown.grade;
    let mut text = String::new();
    // Writing into a string cannot fail.
    let _ = writeln!(text, "{}: {}", grade.full_name(), grade.about);
    for (what, names) in [("also", &grade.also), ("named in", &grade.standards)] {
        if !names.is_empty() {
            let _ = writeln!(text, "{what} {}", names.join(", "));
        }
    }
    let _ = writeln!(text, "at 20 degC:");
    for (word, number) in &shown.numbers {
        let _ = writeln!(text, "  {:<28}{}", word.word, in_units(word, number));
        let _ = writeln!(text, "      {}", number.source);
        if number.range_source != number.source {
            let _ = writeln!(text, "      range: {}", number.range_source);
        }
    }
    if let Some(why) = shown.not_linear {
        let _ = writeln!(text, "  permeability                to be given in the case: {why}");
    }
    if let Some(caution) = &grade.caution {
        let _ = writeln!(text, "caution: {caution}");
    }
    text
}

/// `46.4 MS/m (41 to 52)`, `at least 955 kA/m`.
fn in_units(word: &NumberWord, number: &BookNumber) -> String {
    let value = |si: f64| six_digits(word.shown(si));
    let range = match (number.minimum, number.maximum) {
        (Some(low), Some(high)) => format!(" ({} to {})", value(low), value(high)),
        (Some(low), None) => format!(" (at least {})", value(low)),
        (None, Some(high)) => format!(" (at most {})", value(high)),
        (None, None) => String::new(),
    };
    let least = if number.is_least { "at least " } else { "" };
    let unit = if word.unit.is_empty() { String::new() } else { format!(" {}", word.unit) };
    format!("{least}{}{unit}{range}", value(number.typical))
}

/// At most six significant digits, without idle zeros.
fn six_digits(x: f64) -> String {
    let size = x.abs();
    if size > 0.0 && !(1e-4..1e6).contains(&size) {
        return format!("{x:e}");
    }
    let before = if size >= 1.0 { size.log10().floor() + 1.0 } else { 0.0 };
    let decimals: u8 = (1..=6).rev().find(|d| f64::from(*d) + before <= 6.0).unwrap_or(0);
    let text = format!("{x:.*}", usize::from(decimals));
    if text.contains('.') { text.trim_end_matches('0').trim_end_matches('.').to_owned() } else { text }
}

/// Every number in SI, by the full name of its grade.
fn as_json(grades: &[Shown<'_>]) -> Value {
    let number = |(word, n): &(NumberWord, &BookNumber)| {
        let about = json!({
            "typical": n.typical, "minimum": n.minimum, "maximum": n.maximum, "is_least": n.is_least,
            "unit": if word.unit.is_empty() { "" } else { word.kind.si_unit() },
            "source": n.source, "range_source": n.range_source,
        });
        (word.word.to_owned(), about)
    };
    let entry = |s: &Shown<'_>| {
        let numbers: Map<String, Value> = s.numbers.iter().map(number).collect();
        let about = json!({
            "about": s.grade.about, "also": s.grade.also, "standards": s.grade.standards, "caution": s.grade.caution,
            "file": s.grade.file, "not_linear": s.not_linear, "numbers": numbers,
        });
        (s.grade.full_name(), about)
    };
    Value::Object(grades.iter().map(entry).collect())
}

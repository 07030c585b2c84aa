//! `lenzbore materials`: the grades, with the source of every number.

use std::fmt::Write;

use lenzbore_io::materials::{BookNumber, Conductor, MagnetGrade, book, search};
use serde_json::{Value, json};

use crate::arguments::MaterialsWords;
use crate::end::End;
use crate::say;

/// A number of the book with how it is shown.
struct Shown<'a> {
    name: &'static str,
    unit: &'static str,
    scale: f64,
    number: &'a BookNumber,
}

/// Prints the book, or what is searched for.
pub fn run(words: &MaterialsWords) -> Result<(), End> {
    let wanted = words.search.as_deref().map(search);
    let shown = |name: &str| wanted.as_ref().is_none_or(|list| list.iter().any(|w| w == name));
    let conductors: Vec<&Conductor> = book().conductors.iter().filter(|c| shown(&c.grade.full_name())).collect();
    let magnets: Vec<&MagnetGrade> = book().magnets.iter().filter(|m| shown(&m.grade.full_name())).collect();
    if conductors.is_empty() && magnets.is_empty() {
        let text = words.search.as_deref().unwrap_or_default();
        return Err(End::Input(format!("no grade of the book has '{text}' in its name or description")));
    }
    if words.json {
        say::to_standard_output(&format!("{:#}\n", as_json(&conductors, &magnets)));
        return Ok(());
    }
    let mut text = String::new();
    for conductor in conductors {
        grade(&mut text, &conductor.grade.full_name(), &conductor.grade.about, &conductor_numbers(conductor));
    }
    for magnet in magnets {
        grade(&mut text, &magnet.grade.full_name(), &magnet.grade.about, &magnet_numbers(magnet));
    }
    say::to_standard_output(&text);
    Ok(())
}

fn conductor_numbers(c: &Conductor) -> Vec<Shown<'_>> {
    vec![
        Shown { name: "conductivity", unit: "MS/m", scale: 1e-6, number: &c.conductivity_s_per_m },
        Shown { name: "temperature_coefficient", unit: "/K", scale: 1.0, number: &c.temperature_coefficient_per_k },
        Shown { name: "permeability", unit: "", scale: 1.0, number: &c.relative_permeability },
    ]
}

fn magnet_numbers(m: &MagnetGrade) -> Vec<Shown<'_>> {
    vec![
        Shown { name: "remanence", unit: "T", scale: 1.0, number: &m.remanence_tesla },
        Shown { name: "remanence_coefficient", unit: "%/K", scale: 100.0, number: &m.remanence_coefficient_per_k },
        Shown { name: "recoil_permeability", unit: "", scale: 1.0, number: &m.recoil_permeability },
        Shown { name: "highest temperature", unit: "K", scale: 1.0, number: &m.highest_temperature_k },
    ]
}

fn grade(text: &mut String, name: &str, about: &str, numbers: &[Shown<'_>]) {
    // Writing into a string cannot fail.
    let _ = writeln!(text, "{name}: {about}");
    for shown in numbers {
        let value = |x: f64| format!("{:.6}", x * shown.scale).trim_end_matches('0').trim_end_matches('.').to_owned();
        let range = shown.number.range.map_or(String::new(), |[a, b]| format!(" ({} to {})", value(a), value(b)));
        let number = value(shown.number.typical);
        let _ = writeln!(text, "  {:<24}{number}{range} {}", shown.name, shown.unit);
        let _ = writeln!(text, "      {}", shown.number.source);
        if shown.number.range.is_some() && shown.number.range_source != shown.number.source {
            let _ = writeln!(text, "      range: {}", shown.number.range_source);
        }
    }
}

fn as_json(conductors: &[&Conductor], magnets: &[&MagnetGrade]) -> Value {
    let numbers = |list: Vec<Shown<'_>>| -> Value {
        let entry = |s: &Shown<'_>| {
            let n = s.number;
            let range = n.range.map(|[a, b]| json!([a * s.scale, b * s.scale]));
            (
                s.name.to_owned(),
                json!({"typical": n.typical * s.scale, "range": range, "unit": s.unit, "source": n.source}),
            )
        };
        list.iter().map(entry).collect::<serde_json::Map<_, _>>().into()
    };
    let mut grades = serde_json::Map::new();
    for c in conductors {
        grades.insert(c.grade.full_name(), json!({"about": c.grade.about, "numbers": numbers(conductor_numbers(c))}));
    }
    for m in magnets {
        grades.insert(m.grade.full_name(), json!({"about": m.grade.about, "numbers": numbers(magnet_numbers(m))}));
    }
    Value::Object(grades)
}

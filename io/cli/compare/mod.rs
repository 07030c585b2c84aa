//! `lenzbore compare`: a calculator's or a measurement's table against the field solution.

mod asked;
mod course;
mod groups;
mod inputs;
mod judged;
mod models;
mod report;
mod slips;
mod solved;

use std::io::Read as _;
use std::path::Path;

use lenzbore_io::case::{ResolvedCase, ResolvedValue};
use lenzbore_io::result::folder::{self, PendingFolder};
use lenzbore_io::result::names;
use lenzbore_io::table::{Abscissa, Table, read_table};
use lenzbore_io::{picture, report as page};
use lenzbore_solver::comparison::{Point, Unsafe, Verdict};
use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::problem::{Extent, Travel};
use lenzbore_solver::spread::Reading;

use crate::arguments::{CompareWords, Side};
use crate::end::End;
use crate::job::CaseInput;
use crate::progress::Terminal;
use crate::{job, say};
use asked::Asked;
use judged::{Judged, Rule, scales};
use report::Report;
use solved::{Ask, ask};

/// Largest table, bytes.
const LARGEST_TABLE: u64 = 64 << 20;
/// So many cases may be solved beside the comparison itself to explain it.
const MOST_CASES: usize = 12;

/// Compares, writes, says.
pub fn run(words: &CompareWords) -> Result<(), End> {
    let input = CaseInput::open(&words.case)?;
    let case = input.read(&[])?;
    let target = words.out.clone().unwrap_or_else(|| job::default_folder(&words.case, "-compare"));
    folder::vet(&target, words.replace)?;
    let table = table(&words.table, &case)?;
    let dangerous = match words.dangerous {
        None => Unsafe::Both,
        Some(Side::High) => Unsafe::High,
        Some(Side::Low) => Unsafe::Low,
    };
    let rule = Rule::read(&words.tolerance, dangerous, &table)?;
    let measured = words.measured || (table.has_uncertainty() && !words.calculated);
    let asks = asks(&table, &case)?;
    let groups = groups::groups(&input, &table, &|row| passage_speed(&table, &asks, row))?;
    let terminal = Terminal::new()?;
    let asked = Asked::new(&table, asks, groups, &terminal);
    let (ours, mut cautions) = asked.field()?;
    let counts = measured && !case.tolerances.is_empty();
    let (halves, more) =
        if counts { inputs::input_halves(&asked, &ours, &terminal)? } else { (vec![0.0; ours.len()], Vec::new()) };
    cautions.extend(more);
    let judged = Judged::new(&asked, rule, points(&asked, &ours, &halves));
    let (apart, explanations, slips) = why(&asked, &judged, &ours)?;
    terminal.finish();
    cautions.extend(general_cautions(&case, &table, &asked, measured));
    let report = Report {
        case: &case,
        table_name: words.table.display().to_string(),
        measured,
        asked: &asked,
        judged: &judged,
        explanations: &explanations,
        apart,
        slips: &slips,
        cautions,
    };
    let files = write(&target, words.replace, &report, &terminal)?;
    if words.case.json {
        say::to_standard_output(&format!("{:#}\n", report.object()));
    } else {
        say::to_standard_output(&report.text());
        say::to_standard_output(&format!("\nwritten to {}: {}\n", target.display(), files.join(", ")));
    }
    match judged.overall {
        Verdict::Passes => Ok(()),
        Verdict::FallsShort => Err(End::No("the table falls short of the tolerance".to_owned())),
        Verdict::Undecided => Err(End::Undecided("undecided: the uncertainties are too wide to tell".to_owned())),
    }
}

/// Reads the table; words of the case that have a number or a text can be columns.
fn table(path: &Path, case: &ResolvedCase) -> Result<Table, End> {
    let fault = |e: std::io::Error| match e.kind() {
        std::io::ErrorKind::NotFound => End::Input(format!("cannot read {}: there is no such file", path.display())),
        _ => End::Input(format!("cannot read {}: {e}", path.display())),
    };
    let mut bytes = Vec::new();
    let file = std::fs::File::open(path).map_err(fault)?;
    file.take(LARGEST_TABLE + 1).read_to_end(&mut bytes).map_err(fault)?;
    if u64::try_from(bytes.len()).unwrap_or(u64::MAX) > LARGEST_TABLE {
        return Err(End::Input(format!("{} is larger than 64 MiB: thin it out", path.display())));
    }
    let words = |word: &str| -> Option<&'static str> {
        let table = word.split('.').next().unwrap_or_default();
        if !["wall", "mover", "travel"].contains(&table) {
            return None;
        }
        let found = case.resolved.get(word)?;
        match found.value {
            ResolvedValue::Number(_) => Some(found.unit),
            ResolvedValue::Text(_) => Some(""),
            ResolvedValue::List(_) => None,
        }
    };
    Ok(read_table(&path.display().to_string(), &bytes, &words)?)
}

/// Where each column's answer comes from; columns without one are faults at their first value.
fn asks(table: &Table, case: &ResolvedCase) -> Result<Vec<Ask>, End> {
    let mut asks = Vec::new();
    let mut faults = Vec::new();
    for (k, ordinate) in table.ordinates.iter().enumerate() {
        match ask(table, ordinate.name, &case.problem.travel, case.travel_given) {
            Ok(found) => asks.push(found),
            Err(fault) => {
                let first = table.rows.iter().find_map(|r| r.values[k].as_ref());
                faults.extend(first.map(|e| (e.place.clone(), fault)));
            }
        }
    }
    if faults.is_empty() { Ok(asks) } else { Err(table.diagnostics(faults).into()) }
}

/// A passage is run at each row's speed.
fn passage_speed(table: &Table, asks: &[Ask], row: usize) -> Vec<String> {
    let runs = table.abscissa == Some(Abscissa::Speed) && asks.contains(&Ask::Run);
    let at = table.rows[row].at.filter(|_| runs);
    at.map(|v| format!("travel.speed={v:e}")).into_iter().collect()
}

fn points(asked: &Asked<'_>, ours: &[Reading], halves: &[f64]) -> Vec<Point> {
    let scales = scales(asked, ours);
    let of = |(k, cell): (usize, &asked::Cell)| {
        let entry = asked.entry(*cell);
        Point {
            table: entry.map_or(f64::NAN, |e| e.value),
            ours: ours[k].value,
            band: ours[k].band,
            input: halves[k],
            data: entry.and_then(|e| e.uncertainty).unwrap_or(0.0),
            scale: scales[k],
        }
    };
    asked.cells.iter().enumerate().map(of).collect()
}

/// How far table and field are apart, which models explain it, and which slips.
fn why(
    asked: &Asked<'_>,
    judged: &Judged,
    ours: &[Reading],
) -> Result<(f64, Vec<models::Explanation>, Vec<String>), End> {
    let scale: Vec<f64> = judged.points.iter().map(|p| p.scale).collect();
    let values: Vec<f64> = ours.iter().map(|r| r.value).collect();
    let own: Vec<Option<f64>> = values.iter().map(|v| Some(*v)).collect();
    let apart = asked.likeness(&own, &scale).map_or(0.0, |l| l.apart);
    let few = asked.groups.len() <= MOST_CASES;
    let deeper = few && judged.overall != Verdict::Passes;
    let explanations = models::explanations(asked, &scale, apart, deeper)?;
    let explained = explanations.first().is_some_and(|e| e.same);
    let mut slips = if deeper && !explained { slips::slips(asked, &values, &scale, apart)? } else { Vec::new() };
    if let Some(best) = explanations.first() {
        slips.extend(models::cancelling(asked, best, &values, &scale)?);
    }
    Ok((apart, explanations, slips))
}

fn general_cautions(case: &ResolvedCase, table: &Table, asked: &Asked<'_>, measured: bool) -> Vec<String> {
    let mut out = case.cautions.clone();
    out.extend(table.notes.iter().cloned());
    let settled = asked.asks.iter().any(|a| matches!(a, Ask::Settled | Ask::Curve));
    if settled && matches!(case.problem.wall.extent, Extent::Finite { .. }) {
        out.push("settled drag at a speed is that of an endless wall: the ends of this one are not in it".to_owned());
    }
    if settled && matches!(case.problem.travel, Travel::Traverse(_)) {
        out.push("the table's drag is held against settled drag, not against the peak of a passage".to_owned());
    }
    match (measured, case.tolerances.is_empty()) {
        (true, true) => out.push(
            "the table is taken as measured, and the case has no [tolerance]: what the inputs are off by is not in the uncertainty"
                .to_owned(),
        ),
        (false, false) => out.push(
            "the table is taken as calculated from the same inputs, so their [tolerance] does not count; --measured makes it count"
                .to_owned(),
        ),
        _ => {}
    }
    out
}

/// Writes the result folder; gives the names of its files.
fn write(target: &Path, replace: bool, report: &Report<'_>, monitor: &dyn Monitor) -> Result<Vec<String>, End> {
    let pending = PendingFolder::begin(target, replace)?;
    let mut files = Vec::new();
    let mut put = |name: &str, bytes: &[u8]| -> Result<(), End> {
        if monitor.cancelled() {
            return Err(End::Interrupted);
        }
        pending.write(name, bytes)?;
        files.push(name.to_owned());
        Ok(())
    };
    put("summary.json", format!("{:#}\n", report.object()).as_bytes())?;
    put("comparison.csv", report.csv().as_bytes())?;
    let plot = report.plot();
    for picture in [picture::overlay(&plot), picture::residual(&plot)].into_iter().flatten() {
        let picture = picture.at_width(report.case.output.picture_width_m);
        put(&format!("{}.svg", picture.name), picture.svg.as_bytes())?;
        put(&format!("{}.png", picture.name), &picture.png()?)?;
    }
    if report.case.output.report {
        put(names::REPORT, page::build(pending.path())?.as_bytes())?;
    }
    pending.commit()?;
    Ok(files)
}

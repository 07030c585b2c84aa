//! Points, verdicts, the domain of use, and the sentence to sign.

use lenzbore_io::table::{Abscissa, Table};
use lenzbore_io::units::{Kind, read_quantity, read_unit};
use lenzbore_solver::comparison::{
    Allowed, Domain, Point, RowJudged, Unsafe, Varied, Verdict, allowance, domain, overall,
};
use lenzbore_solver::spread::Reading;

use super::asked::Asked;
use crate::end::End;

/// What is allowed, as typed.
#[derive(Debug, Clone, PartialEq)]
pub struct Rule {
    pub allowed: Allowed,
    pub dangerous: Unsafe,
    pub written: String,
}

impl Rule {
    /// Reads `--tolerance`: `5 %`, `0.05`, or with the unit that all compared columns share.
    pub fn read(text: &str, dangerous: Unsafe, table: &Table) -> Result<Self, End> {
        let wrong = |why: String| End::Input(format!("--tolerance {text}: {why}"));
        let written = text.trim().to_owned();
        let share = read_quantity(text, Kind::Ratio);
        let allowed = match share {
            Ok(q) => Allowed::Share(q.si),
            Err(fault) => {
                let unit = table.ordinates.first().map_or("", |o| o.unit);
                if table.ordinates.iter().any(|o| o.unit != unit) {
                    return Err(wrong(
                        "the compared columns differ in unit, so a share is needed, as \"5 %\"".to_owned(),
                    ));
                }
                let kind = read_unit(unit, Kind::Ratio).ok().and_then(|u| Kind::of_dimension(u.dimension));
                match kind.map(|k| read_quantity(text, k)) {
                    Some(Ok(q)) => Allowed::Absolute(q.si),
                    _ => return Err(wrong(format!("{fault}; a share as \"5 %\", or a difference in {unit}"))),
                }
            }
        };
        let (Allowed::Share(size) | Allowed::Absolute(size)) = allowed;
        if size > 0.0 {
            Ok(Self { allowed, dangerous, written })
        } else {
            Err(wrong("it is greater than 0".to_owned()))
        }
    }
}

/// What a share of a difference is of, cell by cell: our value, or for a series the greatest of the column (of a position:
/// its span).
pub fn scales(asked: &Asked<'_>, ours: &[Reading]) -> Vec<f64> {
    let series = matches!(asked.table.abscissa, Some(Abscissa::Time | Abscissa::Position | Abscissa::Displacement));
    let of_column = |group: usize, ordinate: usize| -> f64 {
        let values = || {
            asked
                .cells
                .iter()
                .zip(ours)
                .filter(|(c, _)| c.group == group && c.ordinate == ordinate)
                .map(|(_, r)| r.value)
        };
        let greatest = values().map(f64::abs).fold(0.0, f64::max);
        let span = values().fold(f64::NEG_INFINITY, f64::max) - values().fold(f64::INFINITY, f64::min);
        let place = matches!(asked.table.ordinates[ordinate].name, "position" | "displacement");
        if place && span > 0.0 { span } else { greatest }
    };
    let of = |(cell, reading): (&super::asked::Cell, &Reading)| {
        if series { of_column(cell.group, cell.ordinate) } else { reading.value.abs() }
    };
    asked.cells.iter().zip(ours).map(of).collect()
}

/// The whole judgement.
pub struct Judged {
    pub rule: Rule,
    /// One a cell.
    pub points: Vec<Point>,
    pub verdicts: Vec<Verdict>,
    pub overall: Verdict,
    /// What varies over the rows.
    pub varied: Vec<Varied>,
    /// Where each row stands in them.
    pub rows: Vec<RowJudged>,
    pub domain: Option<Domain>,
    /// Factors on the table that keep it below or above ours on all rows.
    pub allowance: Option<(f64, f64)>,
    /// The same over the domain alone.
    pub allowance_inside: Option<(f64, f64)>,
}

impl Judged {
    pub fn new(asked: &Asked<'_>, rule: Rule, points: Vec<Point>) -> Self {
        let verdicts: Vec<Verdict> = points.iter().map(|p| p.verdict(rule.allowed, rule.dangerous)).collect();
        let (varied, places) = varied(asked.table);
        let rows: Vec<RowJudged> = (0..asked.table.rows.len())
            .map(|row| {
                let of_row = asked.cells.iter().zip(&verdicts).filter(|(c, _)| c.row == row).map(|(_, v)| *v);
                RowJudged { at: places[row].clone(), verdict: overall(of_row) }
            })
            .collect();
        let domain = domain(varied.len(), &rows);
        // Along a travel a factor means nothing: a position has no zero of its own, a drag passes through zero.
        let one_figure =
            asked.table.ordinates.len() == 1 && matches!(asked.table.abscissa, None | Some(Abscissa::Speed));
        let inside = |k: &usize| domain.as_ref().is_some_and(|d| d.holds(&rows[asked.cells[*k].row].at));
        let chosen: Vec<Point> = (0..points.len()).filter(inside).map(|k| points[k]).collect();
        Self {
            overall: overall(verdicts.iter().copied()),
            allowance: allowance(&points).filter(|_| one_figure),
            allowance_inside: allowance(&chosen).filter(|_| one_figure),
            rule,
            points,
            verdicts,
            varied,
            rows,
            domain,
        }
    }

    /// How many rows end so.
    pub fn count(&self, verdict: Verdict) -> usize {
        self.rows.iter().filter(|r| r.verdict == verdict).count()
    }

    /// The sentences that a signer can use.
    pub fn sentence(&self, asked: &Asked<'_>) -> String {
        let names: Vec<&str> = asked.table.ordinates.iter().map(|o| o.name).collect();
        let figure = names.join(", ").replace('_', " ");
        let mut text = self.of_domain(asked, &figure);
        text.push_str(&self.of_the_rest(asked, &figure));
        text.push_str(&self.of_allowance(&figure));
        text
    }

    fn allowed_words(&self) -> String {
        let side = match self.rule.dangerous {
            Unsafe::Both => "either way",
            Unsafe::High => "above ours",
            Unsafe::Low => "below ours",
        };
        format!("{} {side}", self.rule.written)
    }

    fn of_domain(&self, asked: &Asked<'_>, figure: &str) -> String {
        let allowed = self.allowed_words();
        let total = self.rows.len();
        match &self.domain {
            None => {
                format!("The table may not be used for {figure}: none of its {total} rows is surely within {allowed}.")
            }
            Some(d) if d.rows == total => {
                let range = self.ranges(d, false);
                let range = if range.is_empty() { String::new() } else { format!(", {range}") };
                format!(
                    "The table may be used for {figure} on all of its {total} rows{range}: {} of ours, within {allowed} with 95 %.",
                    self.shares(asked, &|_| true)
                )
            }
            Some(d) => {
                let narrowed = self.ranges(d, true);
                let range = if narrowed.is_empty() { self.ranges(d, false) } else { narrowed };
                format!(
                    "The table may be used for {figure} where {range} ({} of {total} rows): {} of ours, within {allowed} with 95 %.",
                    d.rows,
                    self.shares(asked, &|row| d.holds(&self.rows[row].at))
                )
            }
        }
    }

    fn ranges(&self, domain: &Domain, narrowed_only: bool) -> String {
        let all = self.varied.iter().zip(&domain.ranges).zip(&domain.narrowed);
        let words = all.filter(|(_, narrowed)| **narrowed || !narrowed_only).map(|((v, r), _)| {
            let unit = if v.unit.is_empty() { String::new() } else { format!(" {}", v.unit) };
            if r.to > r.from {
                format!("{} is {} to {}{unit}", v.name, short(r.from), short(r.to))
            } else {
                format!("{} is {}{unit}", v.name, short(r.from))
            }
        });
        words.collect::<Vec<_>>().join(" and ")
    }

    /// `off by -1.2 to +3.4 %`.
    fn shares(&self, asked: &Asked<'_>, inside: &dyn Fn(usize) -> bool) -> String {
        let shares =
            || asked.cells.iter().zip(&self.points).filter(|(c, _)| inside(c.row)).map(|(_, p)| 100.0 * p.share());
        let low = shares().fold(f64::INFINITY, f64::min);
        let high = shares().fold(f64::NEG_INFINITY, f64::max);
        if high - low < 0.005 { format!("off by {high:+.2} %") } else { format!("off by {low:+.2} to {high:+.2} %") }
    }

    fn of_the_rest(&self, asked: &Asked<'_>, figure: &str) -> String {
        let inside = |row: usize| self.domain.as_ref().is_some_and(|d| d.holds(&self.rows[row].at));
        let beyond = |verdict: Verdict| {
            let all =
                asked.cells.iter().enumerate().filter(move |(k, c)| self.verdicts[*k] == verdict && !inside(c.row));
            all.max_by(|a, b| self.points[a.0].share().abs().total_cmp(&self.points[b.0].share().abs()))
        };
        let mut text = String::new();
        if let Some((k, cell)) = beyond(Verdict::FallsShort) {
            let share = self.points[k].share();
            let does = if share > 0.0 { "overstates" } else { "understates" };
            let danger = match self.rule.dangerous {
                Unsafe::Both => String::new(),
                _ => format!(": unsafe{}", consequence(figure, share)),
            };
            let row = &asked.table.rows[cell.row];
            let at = row.at.map_or_else(String::new, |at| {
                let (word, unit) = asked.table.abscissa.map_or(("", ""), |a| (a.word(), a.unit()));
                format!(", {word} {} {unit}", short(at))
            });
            text.push_str(&format!(
                " {} it {does} {} by up to {:.1} % (line {}{at}){danger}.",
                if self.domain.is_some() { "Elsewhere" } else { "At worst" },
                asked.table.ordinates[cell.ordinate].name.replace('_', " "),
                100.0 * share.abs(),
                row.line
            ));
        }
        let undecided = self.count(Verdict::Undecided);
        if undecided > 0 {
            let rows = if undecided == 1 { "row is" } else { "rows are" };
            text.push_str(&format!(" {undecided} {rows} undecided: the uncertainties are too wide to tell."));
        }
        text
    }

    fn of_allowance(&self, figure: &str) -> String {
        let Some((low, high)) = self.allowance else { return String::new() };
        let whole = match self.rule.dangerous {
            Unsafe::High => format!(" Multiplied by {low:.3} the table's {figure} exceeds ours on no row (95 %)"),
            Unsafe::Low => format!(" Multiplied by {high:.3} the table's {figure} falls below ours on no row (95 %)"),
            Unsafe::Both => {
                format!(" The table's {figure} times {low:.3} to {high:.3} embraces ours on every row (95 %)")
            }
        };
        let inside = match (self.allowance_inside, self.rule.dangerous) {
            (Some(_), _) if self.domain.as_ref().is_some_and(|d| d.rows == d.of) => String::new(),
            (Some((low, _)), Unsafe::High) => format!("; in the domain {low:.3} is enough"),
            (Some((_, high)), Unsafe::Low) => format!("; in the domain {high:.3} is enough"),
            (Some((low, high)), Unsafe::Both) => format!("; in the domain {low:.3} to {high:.3}"),
            (None, _) => String::new(),
        };
        format!("{whole}{inside}.")
    }
}

/// What a wrong figure on the dangerous side means, where that is plain.
fn consequence(figure: &str, share: f64) -> &'static str {
    let brakes = figure.contains("drag") || figure.contains("damping") || figure.contains("impulse");
    match (brakes, share > 0.0) {
        (true, true) => ", the brake is weaker than the table says and the mover lands faster",
        (true, false) => ", the brake is stronger than the table says and the load feels more",
        _ => "",
    }
}

/// Four significant digits.
pub fn short(value: f64) -> String {
    if value.abs() > 0.0 && !(1e-3..1e5).contains(&value.abs()) {
        return format!("{value:.3e}");
    }
    let whole = if value.abs() > 0.0 { value.abs().log10().floor() } else { 0.0 };
    #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped to 0 to 7")]
    let decimals = (3.0 - whole).clamp(0.0, 7.0) as usize;
    let text = format!("{value:.decimals$}");
    if text.contains('.') { text.trim_end_matches('0').trim_end_matches('.').to_owned() } else { text }
}

/// What varies over the rows, and where each row stands in it: the abscissa, and parameters that are numbers and differ.
fn varied(table: &Table) -> (Vec<Varied>, Vec<Vec<f64>>) {
    let mut varied = Vec::new();
    let mut places = vec![Vec::new(); table.rows.len()];
    if let Some(abscissa) = table.abscissa {
        varied.push(Varied { name: abscissa.word().to_owned(), unit: abscissa.unit().to_owned() });
        for (place, row) in places.iter_mut().zip(&table.rows) {
            place.push(row.at.unwrap_or(0.0));
        }
    }
    for (k, parameter) in table.parameters.iter().enumerate() {
        let numbers: Option<Vec<f64>> = table.rows.iter().map(|r| r.settings.get(k)?.number).collect();
        let Some(numbers) = numbers else { continue };
        if numbers.iter().all(|n| (n - numbers[0]).abs() <= 0.0) {
            continue;
        }
        varied.push(Varied { name: parameter.word.clone(), unit: parameter.unit.clone() });
        for (place, number) in places.iter_mut().zip(numbers) {
            place.push(number);
        }
    }
    (varied, places)
}

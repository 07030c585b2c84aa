//! The comparison on its way out: JSON, CSV, text, pictures.

use std::fmt::Write as _;

use lenzbore_io::case::ResolvedCase;
use lenzbore_io::layout::layout;
use lenzbore_io::picture::{ComparedPlot, PlotCurve, PlotPanel, PlotPoint};
use lenzbore_solver::comparison::{Allowed, Unsafe, Verdict};
use lenzbore_solver::spread::COVERAGE;
use serde_json::{Map, Value, json};

use super::asked::Asked;
use super::judged::{Judged, short};
use super::models::Explanation;

/// Explanations that are told.
const MOST_MODELS: usize = 3;
/// Rows shown on the terminal.
const MOST_ROWS: usize = 24;

/// Everything that is told.
pub struct Report<'a> {
    pub case: &'a ResolvedCase,
    pub table_name: String,
    pub measured: bool,
    pub asked: &'a Asked<'a>,
    pub judged: &'a Judged,
    pub explanations: &'a [Explanation],
    /// How far table and field solution are apart, root mean square over the scale.
    pub apart: f64,
    pub slips: &'a [String],
    pub cautions: Vec<String>,
}

impl Report<'_> {
    /// The model that made the table, where it is known.
    fn made_by(&self) -> Option<&Explanation> {
        self.explanations.first().filter(|e| e.same)
    }

    /// Sentences on why.
    fn reasons(&self) -> Vec<String> {
        let mut out = Vec::new();
        let left = |e: &Explanation| e.leaves_out.join(", ");
        match self.explanations.first() {
            Some(best) if best.same => out.push(format!(
                "the table is that of a simplified model, within {:.2} %: {}; it leaves out {}",
                100.0 * best.apart,
                best.model,
                left(best)
            )),
            Some(best) if self.apart > 0.005 && best.explains > 0.5 => out.push(format!(
                "the difference looks most like that of a simplified model: {}, which explains {:.0} % of it; it leaves out {}",
                best.model,
                100.0 * best.explains,
                left(best)
            )),
            Some(_) if self.apart > 0.005 && self.slips.is_empty() => {
                out.push("no simplified model explains the difference".to_owned());
            }
            _ => {}
        }
        out.extend_from_slice(self.slips);
        out
    }

    fn sentence(&self) -> String {
        self.judged.sentence(self.asked)
    }

    /// The object that `--json` prints and `summary.json` holds.
    pub fn object(&self) -> Value {
        let j = self.judged;
        let (kind, size) = match j.rule.allowed {
            Allowed::Share(share) => ("share of our value", share),
            Allowed::Absolute(limit) => ("absolute, SI", limit),
        };
        let dangerous = match j.rule.dangerous {
            Unsafe::Both => Value::Null,
            Unsafe::High => json!("high"),
            Unsafe::Low => json!("low"),
        };
        let factors = |f: Option<(f64, f64)>| f.map(|(low, high)| json!({"low": low, "high": high}));
        json!({
            "title": self.case.title,
            "program": {"name": env!("CARGO_PKG_NAME"), "version": env!("CARGO_PKG_VERSION")},
            "record": self.case.record,
            "digest": self.case.digest,
            "table": self.table_name,
            "table_is": if self.measured { "measured" } else { "calculated" },
            "verdict": j.overall.word(),
            "tolerance": {"written": j.rule.written, "kind": kind, "value": size, "unsafe": dangerous},
            "sentence": self.sentence(),
            "rows": {
                "all": j.rows.len(), "pass": j.count(Verdict::Passes),
                "fall_short": j.count(Verdict::FallsShort), "undecided": j.count(Verdict::Undecided),
            },
            "apart_rms": self.apart,
            "domain": self.domain(),
            "allowance": {"all_rows": factors(j.allowance), "in_domain": factors(j.allowance_inside)},
            "reasons": self.reasons(),
            "made_by": self.made_by().map(|e| e.model.clone()),
            "models": self.explanations.iter().map(|e| json!({
                "model": e.model, "leaves_out": e.leaves_out, "apart_rms": e.apart, "explains": e.explains, "same": e.same,
            })).collect::<Vec<_>>(),
            "points": (0..j.points.len()).map(|k| self.point(k)).collect::<Vec<_>>(),
            "cautions": self.cautions,
            "not_modelled": self.case.not_modelled,
            "geometry": layout(self.case),
            "resolved": self.case.resolved.to_json(),
        })
    }

    fn domain(&self) -> Value {
        let j = self.judged;
        let Some(domain) = &j.domain else { return Value::Null };
        let ranges: Vec<Value> = j
            .varied
            .iter()
            .zip(&domain.ranges)
            .zip(&domain.narrowed)
            .map(|((v, r), n)| json!({"word": v.name, "unit": v.unit, "from": r.from, "to": r.to, "narrowed": n}))
            .collect();
        json!({"rows": domain.rows, "of": domain.of, "ranges": ranges})
    }

    fn point(&self, k: usize) -> Value {
        let (cell, p) = (self.asked.cells[k], &self.judged.points[k]);
        let row = &self.asked.table.rows[cell.row];
        let ordinate = &self.asked.table.ordinates[cell.ordinate];
        let mut settings = Map::new();
        for (parameter, setting) in self.asked.table.parameters.iter().zip(&row.settings) {
            settings.insert(parameter.word.clone(), json!(setting.text));
        }
        json!({
            "line": row.line, "figure": ordinate.name, "unit": ordinate.unit,
            "abscissa": self.asked.table.abscissa.map(|a| json!({"word": a.word(), "unit": a.unit(), "value": row.at})),
            "settings": settings,
            "table": p.table, "ours": p.ours, "error": p.error(), "error_share": p.share(), "scale": p.scale,
            "uncertainty": {
                "numerical": p.band / COVERAGE, "input": p.input / COVERAGE, "data": p.data,
                "validation": p.standard(), "expanded_95": p.expanded(),
            },
            "allowed": p.limit(self.judged.rule.allowed), "verdict": self.judged.verdicts[k].word(),
        })
    }

    /// `comparison.csv`.
    pub fn csv(&self) -> String {
        let mut text = String::from(
            "line,figure,unit,abscissa,table,ours,error,error_share,u_numerical,u_input,u_data,u_validation,allowed,verdict\n",
        );
        for (k, cell) in self.asked.cells.iter().enumerate() {
            let p = &self.judged.points[k];
            let row = &self.asked.table.rows[cell.row];
            let ordinate = &self.asked.table.ordinates[cell.ordinate];
            let at = row.at.map_or_else(String::new, |x| format!("{x:e}"));
            // Writing into a string cannot fail.
            let _ = writeln!(
                text,
                "{},{},{},{at},{:e},{:e},{:e},{:e},{:e},{:e},{:e},{:e},{:e},{}",
                row.line,
                ordinate.name,
                ordinate.unit,
                p.table,
                p.ours,
                p.error(),
                p.share(),
                p.band / COVERAGE,
                p.input / COVERAGE,
                p.data,
                p.standard(),
                p.limit(self.judged.rule.allowed),
                self.judged.verdicts[k].word()
            );
        }
        text
    }

    /// What is said on the terminal.
    pub fn text(&self) -> String {
        let mut text = String::new();
        let j = self.judged;
        let kind = if self.measured { "measured" } else { "calculated from the same inputs" };
        let _ = writeln!(text, "{}\n{} ({kind})\n", self.case.title, self.table_name);
        self.rows(&mut text);
        let _ = writeln!(
            text,
            "\nverdict: {} ({} of {} rows pass, {} fall short, {} undecided; allowed {})",
            j.overall.word().to_uppercase(),
            j.count(Verdict::Passes),
            j.rows.len(),
            j.count(Verdict::FallsShort),
            j.count(Verdict::Undecided),
            j.rule.written
        );
        let _ = writeln!(text, "{}", self.sentence());
        for (heading, list) in [("why", &self.reasons()), ("cautions", &self.cautions)] {
            if !list.is_empty() {
                let _ = writeln!(text, "\n{heading}:");
                for item in list {
                    let _ = writeln!(text, "  - {item}");
                }
            }
        }
        self.models(&mut text);
        text
    }

    fn rows(&self, text: &mut String) {
        let along = self.asked.table.abscissa.map_or("", |a| a.word());
        let unit = self.asked.table.abscissa.map_or("", |a| a.unit());
        let head = if along.is_empty() { String::new() } else { format!("{along} {unit}") };
        let _ = writeln!(
            text,
            "{:>5} {head:>16} {:<24}{:>14}{:>14}  {:<7}{:>10}{:>10}  verdict",
            "line", "figure", "table", "ours", "", "E %", "U95 %"
        );
        let count = self.asked.cells.len();
        let stride = count.div_ceil(MOST_ROWS).max(1);
        for (k, cell) in self.asked.cells.iter().enumerate() {
            let falls = self.judged.verdicts[k] == Verdict::FallsShort && count <= 4 * MOST_ROWS;
            if k % stride != 0 && k + 1 != count && !falls {
                continue;
            }
            let p = &self.judged.points[k];
            let row = &self.asked.table.rows[cell.row];
            let ordinate = &self.asked.table.ordinates[cell.ordinate];
            let settings: Vec<String> = self
                .asked
                .table
                .parameters
                .iter()
                .zip(&row.settings)
                .map(|(p, s)| format!("{} = {}", p.word, s.text))
                .collect();
            let _ = writeln!(
                text,
                "{:>5} {:>16} {:<24}{:>14}{:>14}  {:<7}{:>10.3}{:>10.3}  {}{}",
                row.line,
                row.at.map_or_else(String::new, short),
                ordinate.name,
                short(p.table),
                short(p.ours),
                if ordinate.unit == "1" { "" } else { ordinate.unit },
                100.0 * p.share(),
                100.0 * p.of_scale(p.expanded()),
                self.judged.verdicts[k].word(),
                if settings.is_empty() { String::new() } else { format!("   ({})", settings.join(", ")) }
            );
        }
        if stride > 1 {
            let _ = writeln!(text, "  ... {count} values in all; comparison.csv has each");
        }
    }

    fn models(&self, text: &mut String) {
        if self.explanations.is_empty() || self.apart <= 0.0 {
            return;
        }
        let _ = writeln!(text, "\nthe table beside simplified models (root mean square of the difference):");
        let _ = writeln!(text, "{:>9.3} %  field solution", 100.0 * self.apart);
        for e in self.explanations.iter().take(MOST_MODELS) {
            let _ = writeln!(text, "{:>9.3} %  {}", 100.0 * e.apart, e.model);
        }
    }

    /// What the pictures are drawn from.
    pub fn plot(&self) -> ComparedPlot {
        let j = self.judged;
        let panels = self.asked.table.ordinates.iter().enumerate().map(|(k, ordinate)| {
            let curves = (0..self.asked.groups.len()).map(|g| {
                let mut points: Vec<PlotPoint> = self
                    .asked
                    .cells
                    .iter()
                    .enumerate()
                    .filter(|(_, c)| c.ordinate == k && c.group == g)
                    .map(|(i, c)| self.plot_point(i, c.row))
                    .collect();
                points.sort_by(|a, b| a.x.total_cmp(&b.x));
                PlotCurve { points }
            });
            PlotPanel { name: ordinate.name.to_owned(), unit: ordinate.unit, curves: curves.collect() }
        });
        let abscissa = self.asked.table.abscissa;
        ComparedPlot {
            heading: self.case.title.clone(),
            verdict: j.overall.word().to_owned(),
            x_name: abscissa.map_or("line of the table", |a| a.word()).to_owned(),
            x_unit: abscissa.map_or("", |a| a.unit()),
            judged: (j.rule.dangerous != Unsafe::Low, j.rule.dangerous != Unsafe::High),
            panels: panels.collect(),
        }
    }

    fn plot_point(&self, k: usize, row: usize) -> PlotPoint {
        let p = &self.judged.points[k];
        let row = &self.asked.table.rows[row];
        let line = f64::from(u32::try_from(row.line).unwrap_or(u32::MAX));
        PlotPoint {
            x: row.at.unwrap_or(line),
            table: p.table,
            table_half: COVERAGE * p.data,
            ours: p.ours,
            ours_half: p.band.hypot(p.input),
            share: p.share(),
            share_half: p.of_scale(p.expanded()),
            share_allowed: p.of_scale(p.limit(self.judged.rule.allowed)),
            verdict: self.judged.verdicts[k],
        }
    }
}

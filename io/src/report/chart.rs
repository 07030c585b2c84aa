//! Charts: what the page's script draws, and the table behind each for those who read it otherwise.

use serde::Serialize;

use super::escape::text;
use super::numbers::{significant, with_band};
use super::table::{Cell, HtmlTable};
use super::thin;

/// Rows of the table behind a chart.
const TABLE_ROWS: usize = 40;
/// Points of a line.
const POINTS: usize = 2400;

/// An axis in its shown unit.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub(super) struct Axis {
    /// What it shows.
    pub name: String,
    /// Unit, empty for pure numbers.
    pub unit: String,
    /// Logarithmic.
    pub log: bool,
}

/// How a line is drawn.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub(super) enum Look {
    /// A line.
    Line,
    /// A line with its points.
    Points,
    /// Points alone.
    Dots,
    /// A broken line to compare with.
    Broken,
}

/// One line of a chart, in shown units.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub(super) struct Line {
    /// Its name in the legend.
    pub name: String,
    /// Abscissas.
    pub x: Vec<f64>,
    /// Ordinates.
    pub y: Vec<f64>,
    /// Half-widths of the band; empty for none.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub band: Vec<f64>,
    /// How it is drawn.
    pub look: Look,
}

/// A place that is pointed out.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub(super) struct Mark {
    /// Place.
    pub x: f64,
    /// Place; none marks the abscissa alone.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub y: Option<f64>,
    /// What it says.
    pub text: String,
}

/// A horizontal bar that begins anywhere.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub(super) struct Bar {
    /// Its line.
    pub name: String,
    /// Where it begins.
    pub from: f64,
    /// Where it ends.
    pub to: f64,
    /// What stands beside it.
    pub text: String,
    /// A whole value (true) or a change (false).
    pub whole: bool,
}

/// A chart.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub(super) struct Chart {
    /// Its name on the page.
    pub id: String,
    /// Its title.
    pub title: String,
    /// Level axis.
    pub x: Axis,
    /// Upright axis.
    pub y: Axis,
    /// Its lines.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub lines: Vec<Line>,
    /// Its bars.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub bars: Vec<Bar>,
    /// Its marks.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub marks: Vec<Mark>,
    /// Whether the instant of the field player is shown on it.
    pub cursor: bool,
    /// What it shows, in a sentence.
    #[serde(skip)]
    pub says: String,
    /// The file that holds all of its numbers.
    #[serde(skip)]
    pub file: String,
}

impl Chart {
    /// A chart without lines yet; `id` is made its own by [`Charts::add`].
    pub(super) fn new(id: &str, title: &str, x: Axis, y: Axis) -> Self {
        Self {
            id: id.to_owned(),
            title: title.to_owned(),
            x,
            y,
            lines: Vec::new(),
            bars: Vec::new(),
            marks: Vec::new(),
            cursor: false,
            says: String::new(),
            file: String::new(),
        }
    }

    /// The same chart with another line.
    pub(super) fn with(mut self, line: Line) -> Self {
        self.lines.push(line);
        self
    }
}

/// All charts of a page.
#[derive(Debug, Default, Serialize)]
#[serde(transparent)]
pub(super) struct Charts {
    all: Vec<Chart>,
}

impl Charts {
    /// Takes a chart and gives the figure that stands for it on the page.
    pub(super) fn add(&mut self, mut chart: Chart) -> String {
        chart.id = format!("{}-{}", chart.id, self.all.len() + 1);
        let table = behind(&chart);
        let says = if chart.says.is_empty() { summary(&chart) } else { chart.says.clone() };
        chart.lines.iter_mut().for_each(thinned);
        let html = format!(
            "<figure class=\"chart\" id=\"{id}\">\n<figcaption><b>{title}</b> <span class=\"says\">{says}</span></figcaption>\n\
             <div class=\"plot\" data-chart=\"{id}\" role=\"application\" tabindex=\"0\" aria-roledescription=\"chart\" \
             aria-label=\"{title}. {says} Arrow keys read it point by point.\"></div>\n\
             <p class=\"reading\" aria-live=\"polite\"></p>\n{table}</figure>\n",
            id = text(&chart.id),
            title = text(&chart.title),
            says = text(&says),
        );
        self.all.push(chart);
        html
    }
}

/// What an axis is called with its unit.
pub(super) fn title(axis: &Axis) -> String {
    if axis.unit.is_empty() { axis.name.clone() } else { format!("{}, {}", axis.name, axis.unit) }
}

/// Ends and extremes of the first line in words.
fn summary(chart: &Chart) -> String {
    let Some(line) = chart.lines.first() else { return String::new() };
    let places = || line.x.iter().zip(&line.y).filter(|(x, y)| x.is_finite() && y.is_finite());
    let highest = places().max_by(|a, b| a.1.total_cmp(b.1));
    let lowest = places().min_by(|a, b| a.1.total_cmp(b.1));
    let (Some(high), Some(low)) = (highest, lowest) else { return String::new() };
    let unit = |unit: &str| if unit.is_empty() { String::new() } else { format!("\u{a0}{unit}") };
    let (ux, uy) = (unit(&chart.x.unit), unit(&chart.y.unit));
    let at = |(x, y): (&f64, &f64)| format!("{}{uy} at {}{ux}", significant(*y, 4), significant(*x, 3));
    let whose = if chart.lines.len() > 1 { format!("{}: lowest", line.name) } else { "Lowest".to_owned() };
    format!("{whose} {}, highest {}.", at(low), at(high))
}

fn thinned(line: &mut Line) {
    let kept = thin::rows(&line.y, POINTS);
    let pick = |values: &[f64]| kept.iter().filter_map(|i| values.get(*i).copied().map(rounded)).collect::<Vec<f64>>();
    (line.x, line.y, line.band) = (pick(&line.x), pick(&line.y), pick(&line.band));
}

/// A number to ten digits: more cannot be seen, and fewer characters make a lighter page.
fn rounded(value: f64) -> f64 {
    format!("{value:.9e}").parse().unwrap_or(value)
}

/// The numbers of a chart as a table: one a line, or one with all lines where these share their abscissas.
fn behind(chart: &Chart) -> String {
    if !chart.bars.is_empty() {
        return bars_table(chart);
    }
    let Some(first) = chart.lines.first() else { return String::new() };
    let shared = chart.lines.iter().all(|l| l.x == first.x);
    let groups: Vec<Vec<&Line>> =
        if shared { vec![chart.lines.iter().collect()] } else { chart.lines.iter().map(|l| vec![l]).collect() };
    groups.iter().map(|lines| lines_table(chart, lines, shared)).collect()
}

fn lines_table(chart: &Chart, lines: &[&Line], shared: bool) -> String {
    let Some(first) = lines.first() else { return String::new() };
    let kept = thin::evenly(first.x.len(), TABLE_ROWS);
    let mut head = vec![title(&chart.x)];
    for line in lines {
        let name =
            if chart.lines.len() > 1 { format!("{}: {}", chart.y.name, line.name) } else { chart.y.name.clone() };
        head.push(title(&Axis { name, ..chart.y.clone() }));
        if !line.band.is_empty() {
            head.push("band \u{b1}".to_owned());
        }
    }
    let caption = if shared { chart.title.clone() } else { format!("{}: {}", chart.title, first.name) };
    let head: Vec<&str> = head.iter().map(String::as_str).collect();
    let mut table = HtmlTable::new(&caption, &head);
    for i in &kept {
        let mut cells = vec![Cell::Number(significant(first.x[*i], 5))];
        for line in lines {
            let y = line.y.get(*i).copied().unwrap_or(f64::NAN);
            match line.band.get(*i) {
                Some(band) => {
                    let (value, band) = with_band(y, *band);
                    cells.extend([Cell::Number(value), Cell::Number(band)]);
                }
                None => cells.push(Cell::Number(significant(y, 6))),
            }
        }
        table.row(&cells);
    }
    let all = if kept.len() < first.x.len() {
        let file = if chart.file.is_empty() { String::new() } else { format!("; all of them are in {}", chart.file) };
        format!(" ({} of {} rows{file})", kept.len(), first.x.len())
    } else {
        String::new()
    };
    let of = if shared { String::new() } else { format!(": {}", first.name) };
    table.folded(&format!("The numbers as a table{of}{all}"))
}

fn bars_table(chart: &Chart) -> String {
    let mut table = HtmlTable::new(&chart.title, &[&chart.y.name, &title(&chart.x), "what it says"]);
    for bar in &chart.bars {
        let value = if bar.whole { bar.to } else { bar.to - bar.from };
        table.row(&[Cell::text(&bar.name), Cell::Number(significant(value, 5)), Cell::text(&bar.text)]);
    }
    table.folded("The numbers as a table")
}

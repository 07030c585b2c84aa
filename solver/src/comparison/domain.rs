//! The domain in which the table may be used: a range of each quantity that varies, in which every row passes.

use super::point::Verdict;

/// A quantity that varies over the rows.
#[derive(Debug, Clone, PartialEq)]
pub struct Varied {
    /// Its name.
    pub name: String,
    /// The unit in which its values are given.
    pub unit: String,
}

/// A row with its place in every quantity that varies.
#[derive(Debug, Clone, PartialEq)]
pub struct RowJudged {
    /// One value a quantity.
    pub at: Vec<f64>,
    /// The worst verdict of its points.
    pub verdict: Verdict,
}

/// A closed range.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Interval {
    /// Lower end.
    pub from: f64,
    /// Upper end.
    pub to: f64,
}

impl Interval {
    fn holds(&self, x: f64) -> bool {
        x >= self.from && x <= self.to
    }
}

/// A box over the quantities that vary, in which every row passes.
#[derive(Debug, Clone, PartialEq)]
pub struct Domain {
    /// One range a quantity.
    pub ranges: Vec<Interval>,
    /// Whether a range is narrower than the rows reach.
    pub narrowed: Vec<bool>,
    /// Rows inside.
    pub rows: usize,
    /// All rows.
    pub of: usize,
}

impl Domain {
    /// Whether a row lies inside.
    #[must_use]
    pub fn holds(&self, at: &[f64]) -> bool {
        self.ranges.iter().zip(at).all(|(r, x)| r.holds(*x))
    }
}

/// The largest box by number of rows in which every row passes; `None` where no row passes.
///
/// Cuts one face at a time: of all ways to take a lowest or highest value of one quantity off, the one that loses the fewest
/// passing rows for each failing row it takes away; then grows again where that stays clean. For one quantity that varies
/// every interval is tried, which is exact.
#[must_use]
pub fn domain(quantities: usize, rows: &[RowJudged]) -> Option<Domain> {
    let passing = |r: &&RowJudged| r.verdict == Verdict::Passes;
    if !rows.iter().any(|r| passing(&r)) {
        return None;
    }
    let reach: Vec<Interval> = (0..quantities).map(|q| reach(rows.iter(), q)).collect();
    let ranges = if quantities == 1 { longest_run(rows)? } else { shrink(rows, reach.clone()) };
    let inside: Vec<&RowJudged> = rows.iter().filter(|r| ranges.iter().zip(&r.at).all(|(i, x)| i.holds(*x))).collect();
    if inside.is_empty() {
        return None;
    }
    let tight: Vec<Interval> = (0..quantities).map(|q| self::reach(inside.iter().copied(), q)).collect();
    let narrowed = tight.iter().zip(&reach).map(|(t, r)| t.from > r.from || t.to < r.to).collect();
    Some(Domain { ranges: tight, narrowed, rows: inside.len(), of: rows.len() })
}

fn reach<'a>(rows: impl Iterator<Item = &'a RowJudged> + Clone, q: usize) -> Interval {
    let values = || rows.clone().map(|r| r.at[q]);
    Interval { from: values().fold(f64::INFINITY, f64::min), to: values().fold(f64::NEG_INFINITY, f64::max) }
}

/// Distinct values of a quantity with the verdict of all rows at each, in order; the longest passing run by rows.
fn longest_run(rows: &[RowJudged]) -> Option<Vec<Interval>> {
    let mut sorted: Vec<&RowJudged> = rows.iter().collect();
    sorted.sort_by(|a, b| a.at[0].total_cmp(&b.at[0]));
    let clean = |i: &Interval| rows.iter().filter(|r| i.holds(r.at[0])).all(|r| r.verdict == Verdict::Passes);
    let mut best: Option<(usize, Interval)> = None;
    for (i, first) in sorted.iter().enumerate() {
        for last in sorted.iter().skip(i) {
            let interval = Interval { from: first.at[0], to: last.at[0] };
            if !clean(&interval) {
                break;
            }
            let count = rows.iter().filter(|r| interval.holds(r.at[0])).count();
            if best.is_none_or(|(most, _)| count > most) {
                best = Some((count, interval));
            }
        }
    }
    best.map(|(_, interval)| vec![interval])
}

/// Takes extreme values off until every row inside passes.
fn shrink(rows: &[RowJudged], mut ranges: Vec<Interval>) -> Vec<Interval> {
    loop {
        let inside: Vec<&RowJudged> =
            rows.iter().filter(|r| ranges.iter().zip(&r.at).all(|(i, x)| i.holds(*x))).collect();
        if inside.iter().all(|r| r.verdict == Verdict::Passes) {
            return ranges;
        }
        let mut best: Option<(f64, usize, Interval)> = None;
        for q in 0..ranges.len() {
            for cut in cuts(&inside, q) {
                let (mut good, mut bad) = (0_u32, 0_u32);
                for r in inside.iter().filter(|r| !cut.holds(r.at[q])) {
                    if r.verdict == Verdict::Passes { good += 1 } else { bad += 1 }
                }
                // Failing rows removed for each passing row lost; a cut without failing rows leads nowhere.
                let worth = f64::from(bad) / (f64::from(good) + 0.5);
                if bad > 0 && best.as_ref().is_none_or(|(w, ..)| worth > *w) {
                    best = Some((worth, q, cut));
                }
            }
        }
        let Some((_, q, cut)) = best else { return ranges };
        ranges[q] = cut;
    }
}

/// Ranges of a quantity with its values from below or above taken off.
fn cuts(inside: &[&RowJudged], q: usize) -> Vec<Interval> {
    let mut values: Vec<f64> = inside.iter().map(|r| r.at[q]).collect();
    values.sort_by(f64::total_cmp);
    values.dedup_by(|a, b| (*a - *b).abs() <= 0.0);
    let (Some(first), Some(last)) = (values.first().copied(), values.last().copied()) else { return Vec::new() };
    let from = values.iter().skip(1).map(|v| Interval { from: *v, to: last });
    let to = values.iter().rev().skip(1).map(|v| Interval { from: first, to: *v });
    from.chain(to).collect()
}

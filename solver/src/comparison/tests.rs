#![allow(clippy::unwrap_used, clippy::float_cmp, reason = "tests may stop at the first fault")]

use super::*;
use approx::assert_relative_eq;

fn point(table: f64, ours: f64) -> Point {
    Point { table, ours, band: 0.0, input: 0.0, data: 0.0, scale: ours.abs() }
}

const FIVE: Allowed = Allowed::Share(0.05);

#[test]
fn uncertainties_add_as_squares() {
    let p = Point { band: 1.96 * 3.0, input: 1.96 * 4.0, data: 12.0, ..point(100.0, 90.0) };
    assert_relative_eq!(p.standard(), 13.0, max_relative = 1e-4);
    assert_eq!(p.error(), 10.0);
}

#[test]
fn the_interval_decides() {
    let at = |table: f64, data: f64| Point { data, ..point(table, 100.0) }.verdict(FIVE, Unsafe::Both);
    assert_eq!(at(104.0, 0.0), Verdict::Passes);
    assert_eq!(at(106.0, 0.0), Verdict::FallsShort);
    assert_eq!(at(94.0, 0.0), Verdict::FallsShort);
    // 1.96 x 1 = 1.96: 103 is within 5 with certainty, 104 is not, 106 is not beyond with certainty, 107 is.
    assert_eq!(at(103.0, 1.0), Verdict::Passes);
    assert_eq!(at(104.0, 1.0), Verdict::Undecided);
    assert_eq!(at(106.0, 1.0), Verdict::Undecided);
    assert_eq!(at(107.0, 1.0), Verdict::FallsShort);
}

#[test]
fn relative_to_ours_and_not_to_the_table() {
    // 5.2 % above ours is 4.94 % below the table: only the first is the table's error.
    assert_eq!(point(105.2, 100.0).verdict(FIVE, Unsafe::Both), Verdict::FallsShort);
    assert_eq!(point(95.1, 100.0).verdict(FIVE, Unsafe::Both), Verdict::Passes);
}

#[test]
fn one_sided_questions_judge_one_sign() {
    assert_eq!(point(150.0, 100.0).verdict(FIVE, Unsafe::Low), Verdict::Passes);
    assert_eq!(point(50.0, 100.0).verdict(FIVE, Unsafe::Low), Verdict::FallsShort);
    assert_eq!(point(50.0, 100.0).verdict(FIVE, Unsafe::High), Verdict::Passes);
    assert_eq!(point(150.0, 100.0).verdict(FIVE, Unsafe::High), Verdict::FallsShort);
}

#[test]
fn allowances_keep_to_the_safe_side() {
    let points = [point(110.0, 100.0), point(95.0, 100.0)];
    let (low, high) = allowance(&points).unwrap();
    assert!(points.iter().all(|p| p.table * low <= p.ours + 1e-9 && p.table * high >= p.ours - 1e-9));
    assert_relative_eq!(low, 100.0 / 110.0);
    assert_relative_eq!(high, 100.0 / 95.0);
    assert!(allowance(&[point(-1.0, 1.0)]).is_none());
}

fn row(at: &[f64], good: bool) -> RowJudged {
    RowJudged { at: at.to_vec(), verdict: if good { Verdict::Passes } else { Verdict::FallsShort } }
}

#[test]
fn the_domain_of_a_curve_is_its_longest_passing_stretch() {
    let rows: Vec<RowJudged> = [(0.1, true), (0.5, true), (1.0, true), (5.0, false), (20.0, true), (50.0, false)]
        .into_iter()
        .map(|(v, good)| row(&[v], good))
        .collect();
    let found = domain(1, &rows).unwrap();
    assert_eq!((found.ranges[0].from, found.ranges[0].to), (0.1, 1.0));
    assert_eq!((found.rows, found.of, found.narrowed[0]), (3, 6, true));
    assert!(domain(1, &rows[3..4]).is_none());
}

#[test]
fn the_domain_of_a_family_is_a_box() {
    // Passes where the speed is low whatever the thickness, and fails for the thickest wall.
    let rows: Vec<RowJudged> = [0.5, 1.0, 2.0, 5.0]
        .into_iter()
        .flat_map(|v| [1.0, 2.0, 3.0].map(|w| row(&[v, w], v < 3.0 && w < 2.5)))
        .collect();
    let found = domain(2, &rows).unwrap();
    assert!(rows.iter().filter(|r| found.holds(&r.at)).all(|r| r.verdict == Verdict::Passes));
    assert_eq!((found.ranges[0].to, found.ranges[1].to), (2.0, 2.0));
    assert_eq!(found.rows, 6);
}

#[test]
fn likeness_and_factor() {
    let ours = [1.0, 2.0, 4.0];
    let found = likeness(&[1.1, 2.2, 4.4], &[Some(1.1), None, Some(4.0)], &ours).unwrap();
    assert_eq!(found.points, 2);
    assert_relative_eq!(found.apart, 0.1 / 2.0_f64.sqrt(), max_relative = 1e-9);
    assert_relative_eq!(steady_factor(&[1.03, 2.06, 4.12], &ours, 0.002).unwrap(), 1.03, max_relative = 1e-9);
    assert!(steady_factor(&[1.0, 2.2, 4.0], &ours, 0.02).is_none());
    assert!(likeness(&[1.0], &[None], &[1.0]).is_none());
}

//! A fast table of a mover's psi and d psi/dz along z, for use inside time steps.
//!
//! Each row (radius) is cut into equal bins and each bin into equal cells, as many as the local bend of psi asks for
//! (`spacing.rs`); a cell carries the quintic that meets psi, its slope and its curvature at both ends. The interpolant
//! is twice continuously differentiable and its error is h^6 |psi^(6)|/46080 (t^3 (1-t)^3/6! at most). Finding the cell
//! costs two multiplications and no search.

use super::AxialField;
use super::current_loop::Jet;
use super::spacing::{Roughness, largest_psi};
use crate::problem::Mover;

/// Bins tried a row; the number that needs fewest cells is taken.
const BINS: [u32; 7] = [32, 64, 128, 256, 512, 1024, 2048];
/// A bin that would need more cells than this keeps the closed form (the row runs through an edge there).
const MOST_CELLS: f64 = 2048.0;
/// Share of the tolerance that the spacing rule aims at.
const SHARE: f64 = 0.25;
/// t^3 (1-t)^3/6! at t = 1/2.
const HERMITE: f64 = 1.0 / 46080.0;

/// psi in Horner order over t in [0, 1].
type Cell = [f64; 6];

/// Cells of one bin.
#[derive(Debug, Clone, Copy)]
struct Bin {
    first: u32,
    /// Number of cells; 0: closed form.
    count: u32,
}

#[derive(Debug, Clone)]
struct Row {
    radius_m: f64,
    bins_per_metre: f64,
    bins: Vec<Bin>,
    cells: Vec<Cell>,
}

/// psi(r, z) and d psi/dz of a mover on a set of radii, z from the mover's reference point.
///
/// `fill`, `fill_slope` and `fill_both` allocate nothing; z outside the table's range (or NaN) takes the closed form. The
/// slope is the exact derivative of the interpolant of psi. Rows are numbered as the radii given; a row out of range is
/// the caller's mistake and stops the program.
///
/// Accuracy: psi to `relative_tolerance` of the row's largest |psi|; the slope to some 100 times that, relative to the
/// row's largest slope (0.5 mm from the edge of a magnet of 10.5 mm radius: 2e-11 and 8e-9 measured for 1e-10). Cost: 7
/// ns a value, 11 ns for psi and slope together. Thirty rows over 1 m from a gap of 0.5 mm take 8 ms to build for one
/// magnet, 45 ms for three, 70 ms for a coil, with 330 to 700 cells a row.
///
/// ```
/// use lenzbore_solver::problem::{Mover, Outline, Part};
/// use lenzbore_solver::sources::{AxialField, Source, SourceTable};
/// let source = Source::Magnet { inner_radius_m: 0.0, outer_radius_m: 0.009, length_m: 0.012, remanence_tesla: 1.25 };
/// let outline = Outline { inner_radius_m: 0.0, outer_radius_m: 0.009, length_m: 0.012 };
/// let mover = Mover { parts: vec![Part { name: "M".into(), centre_m: 0.0, source, outline, coercivity_a_per_m: None }], mass_kg: None, recoil: None };
/// let table = SourceTable::new(&mover, &[0.011, 0.012], -0.2, 0.2, 1e-10);
/// let mut psi = [0.0; 2];
/// table.fill(1, &[0.003, 0.3], &mut psi);
/// assert!((psi[0] / mover.psi(0.012, 0.003) - 1.0).abs() < 2e-10);
/// assert!((psi[1] / mover.psi(0.012, 0.3) - 1.0).abs() < 1e-14);
/// ```
#[derive(Debug, Clone)]
pub struct SourceTable {
    mover: Mover,
    z_min: f64,
    rows: Vec<Row>,
}

impl SourceTable {
    /// Tabulates `mover` at `radii` (m, >= 0) for z from `z_min` to `z_max` (m from the reference point).
    ///
    /// `relative_tolerance` is the largest error of psi over the row's largest |psi| (at least 1e-13; 1e-10 is usual). A
    /// range that is empty or not finite gives a table that uses the closed form throughout.
    #[must_use]
    pub fn new(mover: &Mover, radii: &[f64], z_min: f64, z_max: f64, relative_tolerance: f64) -> Self {
        let span = z_max - z_min;
        let build = |&radius: &f64| {
            if span > 0.0 && span.is_finite() {
                RowBuilder::new(mover, radius, z_min, span, relative_tolerance.max(1e-13)).build()
            } else {
                Row { radius_m: radius, bins_per_metre: 0.0, bins: Vec::new(), cells: Vec::new() }
            }
        };
        Self { mover: mover.clone(), z_min, rows: radii.iter().map(build).collect() }
    }

    /// Number of rows.
    #[must_use]
    pub fn row_count(&self) -> usize {
        self.rows.len()
    }

    /// Radius of a row, m.
    #[must_use]
    pub fn radius_m(&self, row: usize) -> f64 {
        self.rows[row].radius_m
    }

    /// Number of cells of all rows (48 bytes each).
    #[must_use]
    pub fn cell_count(&self) -> usize {
        self.rows.iter().map(|row| row.cells.len()).sum()
    }

    /// psi (Wb/rad) at heights `z` (m from the reference point), as many as the shorter of both slices.
    pub fn fill(&self, row: usize, z: &[f64], psi_out: &mut [f64]) {
        let row = &self.rows[row];
        for (&z, out) in z.iter().zip(psi_out) {
            *out = match row.locate(z - self.z_min) {
                Some((cell, t, _)) => value(cell, t),
                None => self.mover.psi(row.radius_m, z),
            };
        }
    }

    /// d psi/dz = -r B_r (Wb/(rad m)) at heights `z` (m from the reference point), as many as the shorter of both slices.
    pub fn fill_slope(&self, row: usize, z: &[f64], slope_out: &mut [f64]) {
        let row = &self.rows[row];
        for (&z, out) in z.iter().zip(slope_out) {
            *out = match row.locate(z - self.z_min) {
                Some((cell, t, per_metre)) => slope(cell, t) * per_metre,
                None => self.closed_slope(row, z),
            };
        }
    }

    /// psi and d psi/dz at heights `z` less `shift` (for nodes at rest seen from a mover at `shift`), as many as the
    /// shortest slice.
    pub fn fill_both(&self, row: usize, z: &[f64], shift: f64, psi_out: &mut [f64], slope_out: &mut [f64]) {
        let row = &self.rows[row];
        for ((&z, psi), along) in z.iter().zip(psi_out).zip(slope_out) {
            let z = z - shift;
            (*psi, *along) = match row.locate(z - self.z_min) {
                Some((cell, t, per_metre)) => (value(cell, t), slope(cell, t) * per_metre),
                None => (self.mover.psi(row.radius_m, z), self.closed_slope(row, z)),
            };
        }
    }

    #[cold]
    fn closed_slope(&self, row: &Row, z: f64) -> f64 {
        -row.radius_m * self.mover.flux_density_r(row.radius_m, z)
    }
}

impl Row {
    /// Cell, place in it (0 to 1) and cells per metre at `height` over the row's lower end.
    #[inline]
    fn locate(&self, height: f64) -> Option<(&Cell, f64, f64)> {
        let x = height * self.bins_per_metre;
        if x < 0.0 || x.is_nan() {
            return None;
        }
        let bin = whole(x);
        let Bin { first, count } = *self.bins.get(bin as usize)?;
        if count == 0 {
            return None;
        }
        let place = (x - f64::from(bin)) * f64::from(count);
        let cell = whole(place).min(count - 1);
        self.cells
            .get((first + cell) as usize)
            .map(|found| (found, place - f64::from(cell), self.bins_per_metre * f64::from(count)))
    }
}

/// Whole part of x >= 0; what is beyond u32 saturates and so lies outside every row.
#[inline]
fn whole(x: f64) -> u32 {
    #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "x >= 0, and saturation is wanted")]
    let index = x as u32;
    index
}

#[inline]
fn value(c: &Cell, t: f64) -> f64 {
    c[0] + t * (c[1] + t * (c[2] + t * (c[3] + t * (c[4] + t * c[5]))))
}

/// d/dt.
#[inline]
fn slope(c: &Cell, t: f64) -> f64 {
    c[1] + t * (2.0 * c[2] + t * (3.0 * c[3] + t * (4.0 * c[4] + t * (5.0 * c[5]))))
}

/// The quintic that meets both ends of a cell of width `h`.
fn quintic(low: Jet, high: Jet, h: f64) -> Cell {
    let rise = high.psi - low.psi;
    let (m0, m1) = (h * low.slope, h * high.slope);
    let (c0, c1) = (h * h * low.curvature, h * h * high.curvature);
    [
        low.psi,
        m0,
        0.5 * c0,
        10.0 * rise - 6.0 * m0 - 4.0 * m1 - 1.5 * c0 + 0.5 * c1,
        -15.0 * rise + 8.0 * m0 + 7.0 * m1 + 1.5 * c0 - c1,
        6.0 * rise - 3.0 * (m0 + m1) - 0.5 * (c0 - c1),
    ]
}

/// Builds one row.
struct RowBuilder<'a> {
    mover: &'a Mover,
    radius_m: f64,
    z_min: f64,
    span: f64,
    /// Allowed error of psi, Wb/rad.
    allowed: f64,
    roughness: Roughness,
}

impl<'a> RowBuilder<'a> {
    fn new(mover: &'a Mover, radius_m: f64, z_min: f64, span: f64, relative_tolerance: f64) -> Self {
        let allowed = relative_tolerance * largest_psi(mover, radius_m);
        Self { mover, radius_m, z_min, span, allowed, roughness: Roughness::new(mover, radius_m) }
    }

    /// Cells that a bin needs by the spacing rule; infinite where an edge lies in it.
    fn cells_by_rule(&self, bin: u32, width: f64) -> f64 {
        let centre = self.z_min + (f64::from(bin) + 0.5) * width;
        let one_cell = HERMITE * self.roughness.sixth_derivative(centre, 0.5 * width) * width.powi(6);
        let excess = one_cell / (SHARE * self.allowed);
        if one_cell <= SHARE * self.allowed { 1.0 } else { excess.powf(1.0 / 6.0).ceil() }
    }

    fn total_by_rule(&self, bins: u32) -> f64 {
        let width = self.span / f64::from(bins);
        (0..bins).map(|bin| self.cells_by_rule(bin, width).min(MOST_CELLS)).sum()
    }

    fn build(&self) -> Row {
        let bins = BINS
            .into_iter()
            .map(|bins| (self.total_by_rule(bins), bins))
            .min_by(|a, b| a.0.total_cmp(&b.0))
            .map_or(1, |(_, bins)| bins);
        let width = self.span / f64::from(bins);
        let mut row = Row {
            radius_m: self.radius_m,
            bins_per_metre: f64::from(bins) / self.span,
            bins: Vec::with_capacity(bins as usize),
            cells: Vec::new(),
        };
        for bin in 0..bins {
            let first = u32::try_from(row.cells.len()).unwrap_or(u32::MAX);
            self.bin(bin, width, &mut row.cells);
            let count = u32::try_from(row.cells.len()).unwrap_or(u32::MAX) - first;
            row.bins.push(Bin { first, count });
        }
        row
    }

    /// Appends the cells of a bin, more than the rule's number where a check in their roughest place demands it; none
    /// where the closed form has to serve.
    fn bin(&self, bin: u32, width: f64, cells: &mut Vec<Cell>) {
        let start = cells.len();
        let mut count = self.cells_by_rule(bin, width);
        while count <= MOST_CELLS {
            cells.truncate(start);
            let (low, h) = (self.z_min + f64::from(bin) * width, width / count);
            let jet = |index: u32| self.mover.jet(self.radius_m, low + f64::from(index) * h);
            let mut previous = jet(0);
            for index in 0..whole(count) {
                let next = jet(index + 1);
                cells.push(quintic(previous, next, h));
                previous = next;
            }
            let excess = self.error_at_roughest(low, h, &cells[start..]) / self.allowed;
            // A row of zeros has no error and no allowance: NaN, and nothing to refine.
            if excess <= 1.0 || excess.is_nan() {
                return;
            }
            count = (1.2 * count * excess.powf(1.0 / 6.0)).ceil();
        }
        cells.truncate(start);
    }

    /// Error in the middle of the first, the middle or the last cell, whichever lies closest to an edge.
    fn error_at_roughest(&self, low: f64, h: f64, cells: &[Cell]) -> f64 {
        let last = cells.len().saturating_sub(1);
        let middle_of = |index: usize| low + (f64::from(u32::try_from(index).unwrap_or(u32::MAX)) + 0.5) * h;
        let roughest = [0, last / 2, last]
            .into_iter()
            .map(|index| (self.roughness.sixth_derivative(middle_of(index), 0.0), index))
            .max_by(|a, b| a.0.total_cmp(&b.0))
            .map_or(0, |(_, index)| index);
        (value(&cells[roughest], 0.5) - self.mover.psi(self.radius_m, middle_of(roughest))).abs()
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::float_cmp, reason = "the closed form must come through unchanged")]
    use super::*;
    use crate::problem::{Outline, Part};
    use crate::sources::Source;
    use approx::assert_relative_eq;

    fn part(centre_m: f64, source: Source) -> Part {
        let outline = Outline { inner_radius_m: 0.0, outer_radius_m: 0.01, length_m: 0.01 };
        Part { name: "part".into(), centre_m, source, outline, coercivity_a_per_m: None }
    }

    fn magnet(inner: f64, outer: f64, length_m: f64, remanence_tesla: f64) -> Source {
        Source::Magnet { inner_radius_m: inner, outer_radius_m: outer, length_m, remanence_tesla }
    }

    fn movers() -> Vec<(&'static str, Mover)> {
        let mover = |parts| Mover { parts, mass_kg: None, recoil: None };
        let coil = Source::Coil { inner_radius_m: 0.006, outer_radius_m: 0.0105, length_m: 0.02, ampere_turns: 900.0 };
        vec![
            ("dipole", mover(vec![part(0.0, Source::Dipole { moment_a_m2: 1.0 })])),
            ("magnet", mover(vec![part(0.0, magnet(0.0, 0.0105, 0.012, 1.25))])),
            ("ring around a rod", mover(vec![part(0.002, magnet(0.0125, 0.02, 0.03, -0.4))])),
            (
                "opposed stack",
                mover(vec![
                    part(-0.0155, magnet(0.0, 0.0105, 0.012, 1.25)),
                    part(0.0, magnet(0.0, 0.0105, 0.012, -1.25)),
                    part(0.0155, magnet(0.003, 0.0105, 0.012, 1.25)),
                ]),
            ),
            ("coil", mover(vec![part(0.0, coil)])),
        ]
    }

    /// Heights that step through the range without keeping time with any cell.
    fn heights(from: f64, to: f64, number: u32) -> Vec<f64> {
        (0..number).map(|i| from + (to - from) * (f64::from(i) + 0.381_966) / f64::from(number)).collect()
    }

    #[test]
    fn meets_its_tolerance_everywhere() {
        let radii = [0.011, 0.0117, 0.0123, 0.015];
        for (name, mover) in movers() {
            for tolerance in [1e-8, 1e-10, 1e-11] {
                let table = SourceTable::new(&mover, &radii, -0.25, 0.2, tolerance);
                for (row, &r) in radii.iter().enumerate() {
                    let number = if name == "coil" { 1501 } else { 6007 };
                    let mut z = heights(-0.25, 0.2, number);
                    z.extend(heights(-0.025, 0.025, number));
                    let (mut psi, mut slope) = (vec![0.0; z.len()], vec![0.0; z.len()]);
                    table.fill_both(row, &z, 0.0, &mut psi, &mut slope);
                    let exact: Vec<f64> = z.iter().map(|&z| mover.psi(r, z)).collect();
                    let exact_slope: Vec<f64> = z.iter().map(|&z| -r * mover.flux_density_r(r, z)).collect();
                    let largest = |v: &[f64]| v.iter().fold(0.0_f64, |m, x| m.max(x.abs()));
                    let worst = |v: &[f64], e: &[f64]| v.iter().zip(e).fold(0.0_f64, |m, (a, b)| m.max((a - b).abs()));
                    let error = worst(&psi, &exact) / largest(&exact);
                    assert!(error < tolerance, "{name} r {r}: psi {error:.1e} for {tolerance:.0e}");
                    let slope_error = worst(&slope, &exact_slope) / largest(&exact_slope);
                    assert!(
                        slope_error < 150.0 * tolerance,
                        "{name} r {r}: slope {slope_error:.1e} for {tolerance:.0e}"
                    );
                }
            }
        }
    }

    #[test]
    fn slope_is_the_derivative_of_the_interpolant_itself() {
        // A coarse table, whose error is far above rounding: its own slope integrates to its own psi.
        let (_, mover) = movers().swap_remove(1);
        let table = SourceTable::new(&mover, &[0.012], -0.1, 0.1, 1e-3);
        let psi = |z: f64| {
            let mut out = [0.0];
            table.fill(0, &[z], &mut out);
            out[0]
        };
        let along = |z: f64| {
            let mut out = [0.0];
            table.fill_slope(0, &[z], &mut out);
            out[0]
        };
        for z in heights(-0.09, 0.09, 97) {
            let h = 1e-7;
            assert_relative_eq!((psi(z + h) - psi(z - h)) / (2.0 * h), along(z), epsilon = 1e-6 * psi(0.0) / 0.01);
        }
    }

    #[test]
    fn both_at_once_equals_one_by_one_and_shifts() {
        let (_, mover) = movers().swap_remove(3);
        let table = SourceTable::new(&mover, &[0.0, 0.0125], -0.1, 0.1, 1e-10);
        let z = heights(-0.12, 0.12, 500);
        let shifted: Vec<f64> = z.iter().map(|z| z - 0.01).collect();
        let (mut psi, mut slope, mut one, mut other) = (vec![0.0; 500], vec![0.0; 500], vec![0.0; 500], vec![0.0; 500]);
        for row in 0..2 {
            table.fill_both(row, &z, 0.01, &mut psi, &mut slope);
            table.fill(row, &shifted, &mut one);
            table.fill_slope(row, &shifted, &mut other);
            assert_eq!((&psi, &slope), (&one, &other));
        }
        assert_eq!((table.row_count(), table.radius_m(1)), (2, 0.0125));
    }

    #[test]
    fn outside_the_range_the_closed_form_serves() {
        let (_, mover) = movers().swap_remove(1);
        let table = SourceTable::new(&mover, &[0.012], -0.01, 0.02, 1e-10);
        let (z, mut psi) = ([-0.010_001, 0.020_001, 5.0, f64::NEG_INFINITY, f64::NAN], [1.0; 5]);
        table.fill(0, &z, &mut psi);
        assert_eq!([psi[0], psi[1], psi[2]], [z[0], z[1], z[2]].map(|z| mover.psi(0.012, z)));
        let empty = SourceTable::new(&mover, &[0.012], 0.0, 0.0, 1e-10);
        empty.fill(0, &z[..1], &mut psi[..1]);
        assert_eq!((psi[0], empty.cell_count()), (mover.psi(0.012, z[0]), 0));
    }

    #[test]
    fn a_row_through_an_edge_keeps_the_closed_form_there() {
        let (_, mover) = movers().swap_remove(1);
        let table = SourceTable::new(&mover, &[0.0105], -0.1, 0.1, 1e-10);
        let z = heights(0.0059, 0.0061, 200);
        let mut psi = vec![0.0; 200];
        table.fill(0, &z, &mut psi);
        let largest = mover.psi(0.0105, 0.0);
        for (z, psi) in z.iter().zip(psi) {
            assert_relative_eq!(psi, mover.psi(0.0105, *z), epsilon = 1e-10 * largest);
        }
        assert!(table.cell_count() > 100);
    }

    #[test]
    fn the_same_every_time() {
        let (_, mover) = movers().swap_remove(3);
        let z = heights(-0.1, 0.1, 300);
        let fill = || {
            let mut psi = vec![0.0; 300];
            SourceTable::new(&mover, &[0.0125], -0.1, 0.1, 1e-10).fill(0, &z, &mut psi);
            psi
        };
        assert_eq!(fill(), fill());
    }
}

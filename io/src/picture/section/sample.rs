//! Values between the lines of a graded grid, by bilinear interpolation.

/// A rectangle of values on its own lines, `[z][r]`.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Patch {
    r: Vec<f64>,
    z: Vec<f64>,
    values: Vec<f64>,
}

impl Patch {
    /// All nodes of a grid.
    pub(super) fn of_nodes(r: &[f64], z: &[f64], values: &[f64]) -> Self {
        Self { r: r.to_vec(), z: z.to_vec(), values: values.to_vec() }
    }

    /// The cells of a grid whose centres lie within radii and heights, as values at these centres; `None` where none do.
    ///
    /// A quantity that jumps at a material face is thus never averaged across it.
    pub(super) fn of_cells(
        r: &[f64],
        z: &[f64],
        values: &[f64],
        radii: (f64, f64),
        heights: (f64, f64),
    ) -> Option<Self> {
        let across = within(r, radii);
        let along = within(z, heights);
        let columns = r.len().checked_sub(1)?;
        let inside = along.iter().flat_map(|(j, _)| across.iter().map(move |(i, _)| j * columns + i));
        let values: Option<Vec<f64>> = inside.map(|n| values.get(n).copied()).collect();
        let patch = Self {
            r: across.iter().map(|(_, at)| *at).collect(),
            z: along.iter().map(|(_, at)| *at).collect(),
            values: values?,
        };
        (!patch.values.is_empty()).then_some(patch)
    }

    /// The value at a point; beyond the outermost lines the last slope goes on for one spacing.
    pub(super) fn at(&self, r: f64, z: f64) -> f64 {
        let (i, s) = bracket(&self.r, r);
        let (j, t) = bracket(&self.z, z);
        let columns = self.r.len();
        let (right, above) = (usize::from(columns > 1), usize::from(self.z.len() > 1));
        let value = |dj: usize, di: usize| self.values[(j + dj * above) * columns + i + di * right];
        let lower = value(0, 0) + s * (value(0, 1) - value(0, 0));
        let upper = value(1, 0) + s * (value(1, 1) - value(1, 0));
        lower + t * (upper - lower)
    }

    /// Largest magnitude.
    pub(super) fn largest(&self) -> f64 {
        self.values.iter().fold(0.0, |m, v| m.max(v.abs()))
    }
}

/// Cells between lines whose centres lie within a range: their index and centre.
fn within(lines: &[f64], range: (f64, f64)) -> Vec<(usize, f64)> {
    lines
        .windows(2)
        .enumerate()
        .map(|(i, pair)| (i, 0.5 * (pair[0] + pair[1])))
        .filter(|(_, at)| *at >= range.0 && *at <= range.1)
        .collect()
}

/// The interval that holds `x` (the nearest one beyond the ends) and the fraction along it.
fn bracket(lines: &[f64], x: f64) -> (usize, f64) {
    if lines.len() < 2 {
        return (0, 0.0);
    }
    let i = lines.partition_point(|line| *line <= x).clamp(1, lines.len() - 1) - 1;
    let fraction = (x - lines[i]) / (lines[i + 1] - lines[i]);
    (i, fraction.clamp(-1.0, 2.0))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn bilinear_data_come_back_exactly_and_faces_are_not_crossed() {
        let r = [0.0, 1.0, 1.5, 3.0, 7.0];
        let z = [-2.0, -1.0, 0.5, 4.0];
        let f = |r: f64, z: f64| 2.0 + 3.0 * r - z + 0.5 * r * z;
        let nodes: Vec<f64> = z.iter().flat_map(|z| r.iter().map(move |r| f(*r, *z))).collect();
        let patch = Patch::of_nodes(&r, &z, &nodes);
        for (a, b) in [(0.3, -1.7), (2.0, 0.0), (6.9, 3.9), (0.0, -2.0), (7.0, 4.0)] {
            approx::assert_relative_eq!(patch.at(a, b), f(a, b), max_relative = 1e-14);
        }
        let centre = |x: &[f64], i: usize| 0.5 * (x[i] + x[i + 1]);
        let cells: Vec<f64> = (0..3)
            .flat_map(|j| (0..4).map(move |i| (i, j)))
            .map(|(i, j)| if i == 1 || i == 2 { f(centre(&r, i), centre(&z, j)) } else { 1e9 })
            .collect();
        let layer =
            Patch::of_cells(&r, &z, &cells, (1.0, 3.0), (-2.0, 4.0)).unwrap_or_else(|| Patch::of_nodes(&r, &z, &nodes));
        approx::assert_relative_eq!(layer.at(1.0, 0.0), f(1.0, 0.0), max_relative = 1e-14);
        approx::assert_relative_eq!(layer.at(2.9, -1.9), f(2.9, -1.9), max_relative = 1e-14);
        assert!(layer.largest() < 100.0);
        assert!(Patch::of_cells(&r, &z, &cells, (8.0, 9.0), (-2.0, 4.0)).is_none());
    }
}

//! Leaves out the points of a line that nobody would miss.

/// The points that keep the line within `tolerance` of itself (Ramer 1972, Douglas and Peucker 1973), ends included.
#[must_use]
pub(super) fn simplified(points: &[(f64, f64)], tolerance: f64) -> Vec<(f64, f64)> {
    let Some(last) = points.len().checked_sub(1) else { return Vec::new() };
    let mut kept = vec![false; points.len()];
    kept[0] = true;
    kept[last] = true;
    let mut spans = vec![(0, last)];
    while let Some((from, to)) = spans.pop() {
        let Some((index, distance)) = farthest(points, from, to) else { continue };
        if distance > tolerance {
            kept[index] = true;
            spans.push((from, index));
            spans.push((index, to));
        }
    }
    points.iter().zip(kept).filter(|(_, keep)| *keep).map(|(point, _)| *point).collect()
}

/// The point between two others that lies farthest from their chord.
fn farthest(points: &[(f64, f64)], from: usize, to: usize) -> Option<(usize, f64)> {
    (from + 1..to).map(|i| (i, distance(points[i], points[from], points[to]))).max_by(|a, b| a.1.total_cmp(&b.1))
}

fn distance(p: (f64, f64), a: (f64, f64), b: (f64, f64)) -> f64 {
    let (dx, dy) = (b.0 - a.0, b.1 - a.1);
    let square = dx * dx + dy * dy;
    let t = if square > 0.0 { (((p.0 - a.0) * dx + (p.1 - a.1) * dy) / square).clamp(0.0, 1.0) } else { 0.0 };
    (p.0 - a.0 - t * dx).hypot(p.1 - a.1 - t * dy)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn it_keeps_corners_and_stays_close() {
        let line: Vec<(f64, f64)> = (0..=1000).map(|i| (f64::from(i), 40.0 * (f64::from(i) / 90.0).sin())).collect();
        let short = simplified(&line, 0.2);
        assert!(short.len() < 150 && short.len() > 20, "{}", short.len());
        for p in &line {
            let nearest = short.windows(2).map(|w| distance(*p, w[0], w[1])).fold(f64::INFINITY, f64::min);
            assert!(nearest <= 0.2, "{p:?} strays by {nearest}");
        }
        assert_eq!(simplified(&[], 1.0), []);
        assert_eq!(simplified(&[(1.0, 2.0)], 1.0), [(1.0, 2.0)]);
        let corner = [(0.0, 0.0), (1.0, 0.0), (2.0, 0.0), (2.0, 5.0)];
        assert_eq!(simplified(&corner, 0.1), [(0.0, 0.0), (2.0, 0.0), (2.0, 5.0)]);
    }
}

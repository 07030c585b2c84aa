//! The wanted cell size h(s) along a line: small at anchors, growing with the distance from them, capped.

/// A place where the size is prescribed.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Anchor {
    /// Position, m.
    pub position_m: f64,
    /// Cell size there, m.
    pub size_m: f64,
}

/// h(s) = (sum over anchors (h_k + g |s - s_k|)^-p + sum over caps cap^-p)^(-1/p), with p = 4.
///
/// Anchors lie on breakpoints, so h is smooth inside every segment; a cap holds within its interval,
/// whose ends are breakpoints too.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct SizeLaw {
    /// Growth of the cell size per distance from an anchor.
    pub growth: f64,
    /// Anchors.
    pub anchors: Vec<Anchor>,
    /// Caps `(from_m, to_m, size_m)`.
    pub caps: Vec<(f64, f64, f64)>,
}

impl SizeLaw {
    /// Size at `s`, taken inside the segment `(from, to)` so that caps are not mixed across a breakpoint.
    #[must_use]
    pub fn size_in(&self, s: f64, from: f64, to: f64) -> f64 {
        let middle = 0.5 * (from + to);
        let mut sum = 0.0;
        for a in &self.anchors {
            sum += inverse_fourth(a.size_m + self.growth * (s - a.position_m).abs());
        }
        for &(low, high, cap) in &self.caps {
            if low <= middle && middle <= high {
                sum += inverse_fourth(cap);
            }
        }
        sum.sqrt().sqrt().recip()
    }
}

fn inverse_fourth(h: f64) -> f64 {
    let q = 1.0 / (h * h);
    q * q
}

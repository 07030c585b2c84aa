//! The wanted cell size h(s) along a line: small at anchors, growing with the distance from them, capped.

/// A place where the size is prescribed.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Anchor {
    /// Position, m.
    pub position_m: f64,
    /// Cell size there, m.
    pub size_m: f64,
}

/// An upper bound on the size.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Cap {
    /// Lower end of its interval, m.
    pub from_m: f64,
    /// Upper end of its interval, m.
    pub to_m: f64,
    /// Greatest size there, m.
    pub size_m: f64,
    /// `None`: holds within the interval alone, whose ends are breakpoints. `Some(p)`: holds on to a distance p outside
    /// it, and grows from there.
    pub release_m: Option<f64>,
}

/// h(s) = (sum over anchors (h_k + g |s - s_k|)^-p + sum over caps C(s)^-p)^(-1/p), with p = 4 and, at a distance d outside
/// a cap's interval, C = (cap^p + (g max(d - release, 0))^p)^(1/p).
///
/// Anchors lie on breakpoints, so h is smooth inside every segment. Sizes need not match across a breakpoint.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct SizeLaw {
    /// Growth of the cell size per distance.
    pub growth: f64,
    /// Anchors.
    pub anchors: Vec<Anchor>,
    /// Caps.
    pub caps: Vec<Cap>,
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
        for cap in &self.caps {
            if let Some(release) = cap.release_m {
                let outside = (cap.from_m - s).max(s - cap.to_m).max(0.0);
                let grown = self.growth * (outside - release).max(0.0);
                sum += 1.0 / (fourth(cap.size_m) + fourth(grown));
            } else if cap.from_m <= middle && middle <= cap.to_m {
                sum += inverse_fourth(cap.size_m);
            }
        }
        sum.sqrt().sqrt().recip()
    }
}

fn fourth(h: f64) -> f64 {
    let q = h * h;
    q * q
}

fn inverse_fourth(h: f64) -> f64 {
    fourth(h).recip()
}

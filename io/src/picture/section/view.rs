//! The stretch of the half-plane that is shown, and its place on paper.

use lenzbore_solver::problem::{Mover, Problem};

/// Greatest width and height of the drawing on paper, 0.1 mm.
const ROOM: (f64, f64) = (520.0, 900.0);
/// Air beside the outermost body, and above and below the mover, over the outermost radius.
const AIR: (f64, f64) = (0.22, 1.15);

/// The window: radii up to `half_width` on both sides, heights from `low` to `high`, all in m.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct View {
    pub half_width: f64,
    pub low: f64,
    pub high: f64,
    /// 0.1 mm on paper for each metre.
    pub scale: f64,
    /// The axis on paper.
    pub axis: f64,
    /// The upper edge on paper.
    pub top: f64,
}

/// Heights and radii that the mover's bodies take, from its reference point.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Body {
    pub low: f64,
    pub high: f64,
    pub inner: f64,
    pub outer: f64,
}

impl Body {
    /// Of all parts together; a dipole is a point on the axis.
    pub(super) fn of(mover: &Mover) -> Self {
        let ends = mover.parts.iter().map(|p| (p.centre_m, 0.5 * p.outline.length_m));
        let (low, high) = ends.fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), (centre, half)| {
            (low.min(centre - half), high.max(centre + half))
        });
        let (low, high) = if high >= low { (low, high) } else { (0.0, 0.0) };
        let inner = mover.parts.iter().map(|p| p.outline.inner_radius_m).fold(f64::INFINITY, f64::min);
        let outer = mover.parts.iter().map(|p| p.outline.outer_radius_m).fold(0.0, f64::max);
        Self { low, high, inner: if inner.is_finite() { inner } else { 0.0 }, outer }
    }

    /// Whether there is a body at all.
    pub(super) fn is_solid(&self) -> bool {
        self.outer > 0.0 && self.high > self.low
    }
}

impl View {
    /// Chosen about the mover at `position`, in the middle of the room right of `left`, with its upper edge at `top` on paper.
    pub(super) fn about(problem: &Problem, position: f64, left: f64, top: f64) -> Self {
        let body = Body::of(&problem.mover);
        let outermost = problem.wall.outer_radius_m().max(body.outer);
        let half_width = (1.0 + AIR.0) * outermost;
        let low = position + body.low - AIR.1 * outermost;
        let high = position + body.high + AIR.1 * outermost;
        let scale = (ROOM.0 / (2.0 * half_width)).min(ROOM.1 / (high - low));
        let centred = 0.5 * (ROOM.0 - 2.0 * scale * half_width);
        Self { half_width, low, high, scale, axis: left + centred + scale * half_width, top }
    }

    /// Place on paper of a radius, negative on the left half.
    pub(super) fn x(&self, r: f64) -> f64 {
        self.axis + self.scale * r
    }

    /// Place on paper of a height.
    pub(super) fn y(&self, z: f64) -> f64 {
        self.top + self.scale * (self.high - z)
    }

    pub(super) fn left(&self) -> f64 {
        self.x(-self.half_width)
    }

    pub(super) fn right(&self) -> f64 {
        self.x(self.half_width)
    }

    pub(super) fn bottom(&self) -> f64 {
        self.y(self.low)
    }
}

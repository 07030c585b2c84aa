//! What full-length slots leave of the drag: an approximation with a model band.

/// A share of the drag without slots, and the half-width of its model band.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SlotShare {
    /// Drag with slots / drag without.
    pub value: f64,
    /// Half-width: what the model leaves open.
    pub band: f64,
}

/// One point of the drag-speed curve with slots.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SlottedPoint {
    /// Speed, m/s.
    pub speed_m_per_s: f64,
    /// Share of the drag without slots.
    pub share: SlotShare,
    /// Drag with slots, N.
    pub drag_newton: f64,
    /// Half-width of its band, numerical and model, N.
    pub band_newton: f64,
}

/// The drag of a slotted wall.
#[derive(Debug, Clone, PartialEq)]
pub struct SlottedDrag {
    /// Number of slots round the wall.
    pub slots: usize,
    /// Share at low speed.
    pub low_speed: SlotShare,
    /// Points of the curve, where one was asked.
    pub points: Vec<SlottedPoint>,
}

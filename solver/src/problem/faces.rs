//! Faces that are meant to touch, made to touch exactly.

use super::validity::TOUCHING_RELATIVE;
use super::{Extent, Wall};

impl Wall {
    /// The same wall with faces that differ by rounding alone (1e-9 of their radius or height) made equal, so that a
    /// tube of "28 x 1.5 mm" inside one of inner diameter "28 mm" leaves no gap of a few 1e-18 m for the grid.
    #[must_use]
    pub fn with_faces_joined(mut self) -> Self {
        let mut radii: Vec<f64> = self.layers.iter().flat_map(|l| [l.inner_radius_m, l.outer_radius_m]).collect();
        let ends = match self.extent {
            Extent::Endless => Vec::new(),
            Extent::Finite { length_m } => vec![0.0, length_m],
        };
        let sections = self.layers.iter().flat_map(|l| [l.from_m, l.to_m]);
        let heights: Vec<f64> = ends.into_iter().chain(sections).collect();
        radii.insert(0, 0.0);
        let (radii, heights) = (Joined::new(radii), Joined::new(heights));
        for layer in &mut self.layers {
            for radius in [&mut layer.inner_radius_m, &mut layer.outer_radius_m] {
                *radius = radii.of(*radius);
            }
            for height in [&mut layer.from_m, &mut layer.to_m] {
                *height = heights.of(*height);
            }
        }
        self
    }
}

/// Distinct faces; the first of those that belong together stands for all.
struct Joined {
    faces: Vec<f64>,
    tolerance: f64,
}

impl Joined {
    fn new(all: Vec<f64>) -> Self {
        let largest = all.iter().fold(0.0, |m: f64, x| m.max(x.abs()));
        let mut joined = Self { faces: Vec::with_capacity(all.len()), tolerance: TOUCHING_RELATIVE * largest };
        for face in all {
            if joined.near(face).is_none() {
                joined.faces.push(face);
            }
        }
        joined
    }

    fn near(&self, face: f64) -> Option<f64> {
        self.faces.iter().copied().find(|f| (f - face).abs() <= self.tolerance)
    }

    fn of(&self, face: f64) -> f64 {
        self.near(face).unwrap_or(face)
    }
}

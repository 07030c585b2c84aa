//! Hatching by family of metal, in the manner of drawing offices: it tells layers apart in black and white too.

use lenzbore_solver::problem::Layer;

use crate::layout::Layout;
use crate::picture::svg::Svg;

/// Families told apart.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Metal {
    /// Copper, brass, bronze: full and broken lines in turn.
    Copper,
    /// Aluminium and its alloys: broken lines.
    Aluminium,
    /// Iron and steel: full lines in pairs.
    Steel,
    /// Anything else, or unknown: single full lines.
    Other,
}

impl Metal {
    /// The family of a layer: by its grade's name, else by its permeability.
    pub(super) fn of(layer: &Layer, layout: Option<&Layout>) -> Self {
        let grade =
            layout.and_then(|l| l.wall.layers.iter().find(|x| x.name == layer.name)).and_then(|l| l.material.clone());
        let grade = grade.unwrap_or_default().to_lowercase();
        let is = |words: &[&str]| words.iter().any(|word| grade.contains(word));
        if is(&["copper", "brass", "bronze", "nickel silver"]) {
            Self::Copper
        } else if is(&["alumin"]) {
            Self::Aluminium
        } else if is(&["steel", "iron"]) || layer.relative_permeability > 1.5 {
            Self::Steel
        } else {
            Self::Other
        }
    }

    /// What its hatching is called in a key.
    pub(super) fn words(self) -> &'static str {
        match self {
            Self::Copper => "copper and its alloys",
            Self::Aluminium => "aluminium",
            Self::Steel => "iron and steel",
            Self::Other => "other conductors",
        }
    }

    /// Defines its pattern, leaning right or left, and gives its name.
    pub(super) fn pattern(self, svg: &mut Svg, leans_right: bool) -> String {
        let name = svg.name("hatch");
        let turn = if leans_right { 45 } else { -45 };
        // A tile of width, height and lines (place, length), turned.
        let (width, height, tint, ink, lines): (f64, f64, &str, &str, &[(f64, f64)]) = match self {
            Self::Copper => (18.0, 24.0, "#faf1e9", "#8f5a33", &[(4.5, 24.0), (13.5, 15.0)]),
            Self::Aluminium => (11.0, 22.0, "#f3f5f7", "#66727e", &[(5.5, 14.0)]),
            Self::Steel => (20.0, 20.0, "#eef0f2", "#4a545e", &[(7.0, 20.0), (12.0, 20.0)]),
            Self::Other => (11.0, 11.0, "#f6f4ef", "#7d7460", &[(5.5, 11.0)]),
        };
        let d: String = lines.iter().map(|(x, length)| format!("M{x} 0V{length}")).collect();
        svg.define(&format!(
            "<pattern id=\"{name}\" width=\"{width}\" height=\"{height}\" patternUnits=\"userSpaceOnUse\" patternTransform=\"rotate({turn})\">\
             <rect width=\"{width}\" height=\"{height}\" fill=\"{tint}\"/>\
             <path d=\"{d}\" stroke=\"{ink}\" stroke-width=\"1.5\"/></pattern>"
        ));
        name
    }
}

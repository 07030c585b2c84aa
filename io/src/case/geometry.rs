//! Faults of the finished problem, each led back to the words that caused it.

use lenzbore_solver::problem::{Part, Problem, ProblemFault, Quantity, Subject};

use super::mover::MoverReading;
use super::reader::{Reader, Section};
use super::wall::WallReading;
use crate::message::{CaseFault, Diagnostic, Place};

/// What the problem was made of.
pub(super) struct Parts<'a, 't> {
    pub root: &'a Section<'t>,
    pub wall: &'a WallReading<'t>,
    pub mover: &'a MoverReading<'t>,
    pub travel: Option<&'a Section<'t>>,
    pub accuracy: Option<&'a Section<'t>>,
    pub output: Option<&'a Section<'t>>,
    /// Those of the stations that could be read.
    pub stations: Vec<&'a Section<'t>>,
    /// Whether wall, mover and travel could be read whole; of what could not, what is missing is no fault.
    pub whole_wall: bool,
    pub whole_mover: bool,
    pub whole_travel: bool,
}

/// Words that give a layer its radii.
const ACROSS: [&str; 4] = ["size", "thickness", "inner_diameter", "outer_diameter"];
const PART_ACROSS: [&str; 2] = ["outer_diameter", "inner_diameter"];

/// Adds the faults of the problem to the others.
pub(super) fn place_faults(reader: &mut Reader, faults: Vec<ProblemFault>, parts: &Parts<'_, '_>) {
    for fault in faults {
        if is_of_what_is_missing(&fault, parts) {
            continue;
        }
        let (place, related) = places(&fault, parts);
        let mut diagnostic = Diagnostic::at(place, CaseFault::Problem(fault));
        if let Some((place, why)) = related {
            diagnostic = diagnostic.with_related(place, why);
        }
        reader.faults.push(diagnostic);
    }
}

/// A part longer than so many bore diameters (around a rod: diameters of the wall) was hardly meant.
const LONG_PARTS: f64 = 20.0;

/// Sizes that are possible but hardly meant, in words.
pub(super) fn odd_sizes(problem: &Problem) -> Vec<String> {
    let (bore, outer) = (2.0 * problem.wall.inner_radius_m(), 2.0 * problem.wall.outer_radius_m());
    let across = if bore > 0.0 { bore } else { outer };
    let long = |p: &&Part| across.is_finite() && p.outline.length_m > LONG_PARTS * across;
    let say = |p: &Part| {
        let (length, across) = (1e3 * p.outline.length_m, 1e3 * across);
        format!("part '{}' is {length} mm long where the wall is {across} mm across: was another unit meant?", p.name)
    };
    let lost = largest_clearance(problem).filter(|(gap, size)| *gap > WIDE_GAP * size);
    let far = lost.map(|(gap, size)| {
        let (gap, size) = (1e3 * gap, 1e3 * size);
        format!("the mover, {size} mm across, runs {gap} mm away from the wall: was another unit meant?")
    });
    problem.mover.parts.iter().filter(long).map(say).chain(far).collect()
}

/// A running clearance of so many diameters of the mover was hardly meant.
const WIDE_GAP: f64 = 20.0;

/// Clearance in a bore and diameter of the widest part, m.
fn largest_clearance(problem: &Problem) -> Option<(f64, f64)> {
    let bore = problem.wall.inner_radius_m();
    let widest = problem.mover.parts.iter().map(|p| p.outline.outer_radius_m).fold(0.0, f64::max);
    (widest > 0.0 && bore > widest && bore.is_finite()).then_some((bore - widest, 2.0 * widest))
}

/// A fault that stems from parts left out because they could not be read.
fn is_of_what_is_missing(fault: &ProblemFault, parts: &Parts<'_, '_>) -> bool {
    match fault {
        ProblemFault::NoLayer | ProblemFault::InertWall => !parts.whole_wall,
        ProblemFault::NoPart | ProblemFault::InertMover | ProblemFault::FreeNeedsMass => {
            !parts.whole_mover || matches!(fault, ProblemFault::FreeNeedsMass) && !parts.whole_travel
        }
        ProblemFault::SteadyNeedsEndlessWall { .. }
        | ProblemFault::TravelNeedsEnds { .. }
        | ProblemFault::OutOfReach { .. }
        | ProblemFault::NoTime { .. }
        | ProblemFault::NoTravel { .. } => !parts.whole_travel || parts.wall.extent.is_none(),
        // Gates that nobody wrote stand at the ends of the wall, and an endless wall has none.
        ProblemFault::GatesCoincide { .. } => !parts.travel.is_some_and(|t| parts.whole_travel && t.table.has("gates")),
        ProblemFault::StationLaw { .. } | ProblemFault::StationInPath { .. } | ProblemFault::StationFar { .. } => {
            !parts.whole_travel || !parts.whole_wall || parts.wall.extent.is_none()
        }
        ProblemFault::LayerEmpty { .. } | ProblemFault::LayerBeyondWall { .. } => parts.wall.extent.is_none(),
        ProblemFault::Impossible { subject: Subject::Wall, .. } => parts.wall.extent.is_none(),
        ProblemFault::Impossible { subject: Subject::Travel, .. } => !parts.whole_travel,
        _ => false,
    }
}

type Related = Option<(Place, &'static str)>;

fn places(fault: &ProblemFault, parts: &Parts<'_, '_>) -> (Place, Related) {
    let root = || parts.root.place.clone();
    let layer = |i: usize, words: &[&str]| parts.wall.layers.get(i).map_or_else(root, |s| s.place_of_any(words));
    let part = |i: usize, words: &[&str]| parts.mover.parts.get(i).map_or_else(root, |s| s.place_of_any(words));
    let station_of = |i: usize, words: &[&str]| parts.stations.get(i).map_or_else(root, |s| s.place_of_any(words));
    let travel = |words: &[&str]| parts.travel.map_or_else(root, |s| s.place_of_any(words));
    match fault {
        ProblemFault::Impossible { subject, quantity, .. } => (of_number(*subject, *quantity, parts), None),
        ProblemFault::SlotsUnmodelled { .. } => (parts.wall.section.place_of("slots"), None),
        ProblemFault::LayerInsideOut { layer: l, .. } => {
            (layer(l.index, &["inner_diameter", "thickness", "size"]), None)
        }
        ProblemFault::LayerEmpty { layer: l, .. } => (layer(l.index, &["to", "from"]), None),
        ProblemFault::LayerBeyondWall { layer: l, from_m, .. } => {
            (layer(l.index, if *from_m < 0.0 { &["from"] } else { &["to", "from"] }), None)
        }
        ProblemFault::LayersOverlap { first, second, .. } => {
            (layer(second.index, &ACROSS), Some((layer(first.index, &ACROSS), "the other layer")))
        }
        ProblemFault::PartInsideOut { part: p, .. } => (part(p.index, &["inner_diameter"]), None),
        ProblemFault::PartsOverlap { first, second, .. } => {
            (part(second.index, &["at", "length"]), Some((part(first.index, &["at", "length"]), "the other part")))
        }
        ProblemFault::NoClearance { part: p, layer: l, .. } => {
            (part(p.index, &PART_ACROSS), Some((layer(l.index, &ACROSS), "the layer")))
        }
        ProblemFault::NoLayer | ProblemFault::InertWall => (parts.wall.section.place.clone(), None),
        ProblemFault::NoPart | ProblemFault::InertMover | ProblemFault::StaleRecoil => {
            (parts.mover.section.place.clone(), None)
        }
        ProblemFault::SteadyNeedsEndlessWall { .. } | ProblemFault::TravelNeedsEnds { .. } => {
            (travel(&["law"]), Some((parts.wall.section.place_of("length"), "the wall's length")))
        }
        ProblemFault::FreeNeedsMass => {
            (parts.mover.section.place.clone(), Some((travel(&["law"]), "the law that needs it")))
        }
        ProblemFault::NoTravel { .. } => (travel(&["to", "until", "file", "from", "release"]), None),
        ProblemFault::NoTime { .. } => (travel(&["time_limit", "law"]), None),
        ProblemFault::OutOfReach { .. } => {
            (travel(&["until", "law"]), Some((travel(&["release"]), "where it is let go")))
        }
        ProblemFault::GatesCoincide { .. } => (travel(&["gates"]), None),
        ProblemFault::NoCoil { part: p } => {
            (part(p.index, &["name"]), Some((travel(&["law"]), "the law that drives coils")))
        }
        ProblemFault::Cycles { .. } => (travel(&["cycles"]), None),
        ProblemFault::TableShort { .. } | ProblemFault::TableTimes { .. } | ProblemFault::TableJump { .. } => {
            (travel(&["file"]), None)
        }
        ProblemFault::Frequencies => (travel(&["frequencies", "frequency"]), None),
        ProblemFault::Levels { .. } => (parts.accuracy.map_or_else(root, |s| s.place_of("levels")), None),
        ProblemFault::CellsAcrossWall { .. } => {
            (parts.accuracy.map_or_else(root, |s| s.place_of("cells_across_wall")), None)
        }
        ProblemFault::StationLaw { .. } => {
            (parts.output.map_or_else(root, |s| s.place_of("station")), Some((travel(&["law"]), "the law")))
        }
        ProblemFault::StationInPath { station, part: p } => {
            (station_of(station.index, &["radius", "diameter", "at"]), Some((part(p.index, &["name"]), "the part")))
        }
        ProblemFault::StationNoConductor { station } | ProblemFault::StationFar { station, .. } => {
            (station_of(station.index, &["radius", "diameter", "at"]), None)
        }
        ProblemFault::StationCoil { station } => (station_of(station.index, &["turns", "diameter", "radius"]), None),
        ProblemFault::Instants => (parts.output.map_or_else(root, |s| s.place_of("fields")), None),
        _ => (root(), None),
    }
}

/// The place of the word behind one number of the problem.
fn of_number(subject: Subject, quantity: Quantity, parts: &Parts<'_, '_>) -> Place {
    let section = match subject {
        Subject::Wall => Some(&parts.wall.section),
        Subject::Layer(i) => parts.wall.layers.get(i),
        Subject::Mover => Some(&parts.mover.section),
        Subject::Part(i) => parts.mover.parts.get(i),
        Subject::Travel => parts.travel,
        Subject::Accuracy => parts.accuracy,
        Subject::Snapshots => parts.output,
    };
    let words: &[&str] = match quantity {
        Quantity::InnerRadius | Quantity::OuterRadius => &ACROSS,
        Quantity::Length => &["length"],
        Quantity::Position => &["at", "release", "from", "to", "until", "gates", "position"],
        Quantity::Conductivity => &["conductivity", "material"],
        Quantity::RelativePermeability => &["permeability", "material"],
        Quantity::RecoilPermeability => &["recoil_permeability", "material"],
        Quantity::Moment => &["moment"],
        Quantity::Remanence => &["remanence", "material"],
        Quantity::AmpereTurns => &["current", "turns"],
        Quantity::Mass => &["mass"],
        Quantity::Speed | Quantity::Velocity => &["speed", "entry_velocity"],
        Quantity::Gravity => &["gravity"],
        Quantity::Tilt => &["tilt_from_vertical"],
        Quantity::Push => &["push"],
        Quantity::Friction => &["friction"],
        Quantity::FrictionCoefficient => &["friction_coefficient"],
        Quantity::AirDrag => &["air_drag"],
        Quantity::SpringRate => &["spring_rate"],
        Quantity::Time => &["time_limit", "fields"],
        Quantity::TargetRelative => &["target"],
        Quantity::Frequency => &["frequency", "frequencies"],
        Quantity::Current => &["current"],
        Quantity::Resistance => &["winding_resistance"],
        _ => &[],
    };
    section.map_or_else(|| parts.root.place.clone(), |s| s.place_of_any(words))
}

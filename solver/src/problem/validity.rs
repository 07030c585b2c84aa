//! Whether a problem can be solved at all: every reason why not, at once.

use super::fault::{Named, ProblemFault, Subject};
use super::quantity::Quantity;
use super::reach::{next_to_nothing, out_of_reach};
use super::station_faults::station_faults;
use super::{
    Alternating, Extent, Layer, MOST_CYCLES, MotionTable, Mover, Part, Problem, Sine, SnapshotPlan, Travel, Wall,
};
use crate::sources::Source;

/// Faces closer than this part of their radius or height count as touching, not as overlapping.
pub(super) const TOUCHING_RELATIVE: f64 = 1e-9;

impl Problem {
    /// Every reason why this problem has no answer; empty where it can be solved.
    ///
    /// Checked: numbers finite and of sensible magnitude, layers and parts right side out and without overlap, layers
    /// within the wall, a running clearance between every part and every layer, a law that fits the wall's ends,
    /// a mass where the law needs one, something that conducts or is permeable, something with a field. A part may run
    /// in the bore, in a gap between layers or around the wall.
    #[must_use]
    pub fn faults(&self) -> Vec<ProblemFault> {
        let mut faults = Vec::new();
        wall_faults(&self.wall, &mut faults);
        slot_faults(self, &mut faults);
        mover_faults(&self.mover, &mut faults);
        clearance_faults(&self.wall, &self.mover, &mut faults);
        travel_faults(self, &mut faults);
        plan_faults(self, &mut faults);
        station_faults(self, &mut faults);
        faults
    }
}

/// Notes numbers outside their sensible range.
struct Numbers<'a> {
    subject: Subject,
    of: String,
    faults: &'a mut Vec<ProblemFault>,
}

impl Numbers<'_> {
    fn check(&mut self, quantity: Quantity, value: f64) -> bool {
        let good = quantity.sensible().holds(value);
        if !good {
            let (subject, of) = (self.subject, self.of.clone());
            self.faults.push(ProblemFault::Impossible { subject, of, quantity, value });
        }
        good
    }
}

fn named(index: usize, name: &str) -> Named {
    Named { index, name: name.to_owned() }
}

fn wall_faults(wall: &Wall, faults: &mut Vec<ProblemFault>) {
    if wall.layers.is_empty() {
        faults.push(ProblemFault::NoLayer);
        return;
    }
    if let Extent::Finite { length_m } = wall.extent {
        Numbers { subject: Subject::Wall, of: "the wall".to_owned(), faults }.check(Quantity::Length, length_m);
    }
    for (index, layer) in wall.layers.iter().enumerate() {
        layer_faults(wall, index, layer, faults);
    }
    for (i, first) in wall.layers.iter().enumerate() {
        for (j, second) in wall.layers.iter().enumerate().skip(i + 1) {
            faults.extend(overlap_of_layers(wall, (i, first), (j, second)));
        }
    }
    let inert = |l: &Layer| l.conductivity_s_per_m.abs() <= 0.0 && (l.relative_permeability - 1.0).abs() <= 0.0;
    if wall.layers.iter().all(inert) {
        faults.push(ProblemFault::InertWall);
    }
}

/// Slots are a factor on the drag of a wall that is a tube of permeability 1.
fn slot_faults(problem: &Problem, faults: &mut Vec<ProblemFault>) {
    if problem.wall.slots == 0 {
        return;
    }
    let mut unmodelled = |what| faults.push(ProblemFault::SlotsUnmodelled { what });
    if problem.wall.is_permeable() {
        unmodelled("a permeable wall");
    }
    if problem.wall.inner_radius_m() <= 0.0 {
        unmodelled("a rod");
    }
    if matches!(problem.travel, Travel::Alternating(_)) {
        unmodelled("a wall around alternating current");
    }
}

fn layer_faults(wall: &Wall, index: usize, layer: &Layer, faults: &mut Vec<ProblemFault>) {
    let mut numbers = Numbers { subject: Subject::Layer(index), of: format!("layer '{}'", layer.name), faults };
    let inner = numbers.check(Quantity::InnerRadius, layer.inner_radius_m);
    let outer = numbers.check(Quantity::OuterRadius, layer.outer_radius_m);
    numbers.check(Quantity::Conductivity, layer.conductivity_s_per_m);
    numbers.check(Quantity::RelativePermeability, layer.relative_permeability);
    let name = || named(index, &layer.name);
    let (inner_radius_m, outer_radius_m) = (layer.inner_radius_m, layer.outer_radius_m);
    if inner && outer && inner_radius_m >= outer_radius_m {
        numbers.faults.push(ProblemFault::LayerInsideOut { layer: name(), inner_radius_m, outer_radius_m });
    }
    let Some(length_m) = wall.length_m() else { return };
    let (from_m, to_m) = (layer.from_m, layer.to_m);
    if !numbers.check(Quantity::Position, from_m) || !numbers.check(Quantity::Position, to_m) {
        return;
    }
    if from_m >= to_m {
        numbers.faults.push(ProblemFault::LayerEmpty { layer: name(), from_m, to_m });
    } else if from_m < -TOUCHING_RELATIVE * length_m || to_m > length_m * (1.0 + TOUCHING_RELATIVE) {
        numbers.faults.push(ProblemFault::LayerBeyondWall { layer: name(), from_m, to_m, length_m });
    }
}

/// The stretch that two intervals share, where it is more than touching.
fn shared(a: [f64; 2], b: [f64; 2]) -> Option<[f64; 2]> {
    let (low, high) = (a[0].max(b[0]), a[1].min(b[1]));
    let scale = a.into_iter().chain(b).fold(0.0, |m: f64, x| m.max(x.abs()));
    (high - low > TOUCHING_RELATIVE * scale).then_some([low, high])
}

fn overlap_of_layers(wall: &Wall, (i, first): (usize, &Layer), (j, second): (usize, &Layer)) -> Option<ProblemFault> {
    let radii = |l: &Layer| [l.inner_radius_m, l.outer_radius_m];
    let radii_m = shared(radii(first), radii(second))?;
    let heights_m = match wall.extent {
        Extent::Endless => None,
        Extent::Finite { .. } => Some(shared([first.from_m, first.to_m], [second.from_m, second.to_m])?),
    };
    let (first, second) = (named(i, &first.name), named(j, &second.name));
    Some(ProblemFault::LayersOverlap { first, second, radii_m, heights_m })
}

fn mover_faults(mover: &Mover, faults: &mut Vec<ProblemFault>) {
    if mover.parts.is_empty() {
        faults.push(ProblemFault::NoPart);
        return;
    }
    if let Some(mass_kg) = mover.mass_kg {
        Numbers { subject: Subject::Mover, of: "the mover".to_owned(), faults }.check(Quantity::Mass, mass_kg);
    }
    for (index, part) in mover.parts.iter().enumerate() {
        part_faults(index, part, faults);
    }
    for (i, first) in mover.parts.iter().enumerate() {
        for (j, second) in mover.parts.iter().enumerate().skip(i + 1) {
            faults.extend(overlap_of_parts((i, first), (j, second)));
        }
    }
    if mover.recoil.as_ref().is_some_and(|recoil| !recoil.belongs_to(&mover.parts)) {
        faults.push(ProblemFault::StaleRecoil);
    }
    if mover.parts.iter().all(|p| strength(&p.source).abs() <= 0.0) {
        faults.push(ProblemFault::InertMover);
    }
}

fn strength(source: &Source) -> f64 {
    match source {
        Source::Dipole { moment_a_m2 } => *moment_a_m2,
        Source::Magnet { remanence_tesla, .. } => *remanence_tesla,
        Source::Coil { ampere_turns, .. } => *ampere_turns,
    }
}

fn part_faults(index: usize, part: &Part, faults: &mut Vec<ProblemFault>) {
    let mut numbers = Numbers { subject: Subject::Part(index), of: format!("part '{}'", part.name), faults };
    numbers.check(Quantity::Position, part.centre_m);
    let body = match part.source {
        Source::Dipole { moment_a_m2 } => {
            numbers.check(Quantity::Moment, moment_a_m2);
            return;
        }
        Source::Magnet { inner_radius_m, outer_radius_m, length_m, remanence_tesla } => {
            numbers.check(Quantity::Remanence, remanence_tesla);
            [inner_radius_m, outer_radius_m, length_m]
        }
        Source::Coil { inner_radius_m, outer_radius_m, length_m, ampere_turns } => {
            numbers.check(Quantity::AmpereTurns, ampere_turns);
            [inner_radius_m, outer_radius_m, length_m]
        }
    };
    let outline = [part.outline.inner_radius_m, part.outline.outer_radius_m, part.outline.length_m];
    for [inner_radius_m, outer_radius_m, length_m] in [body, outline] {
        let before = numbers.faults.len();
        numbers.check(Quantity::InnerRadius, inner_radius_m);
        numbers.check(Quantity::OuterRadius, outer_radius_m);
        numbers.check(Quantity::Length, length_m);
        if numbers.faults.len() > before {
            return;
        }
        if inner_radius_m >= outer_radius_m {
            let part = named(index, &part.name);
            numbers.faults.push(ProblemFault::PartInsideOut { part, inner_radius_m, outer_radius_m });
            return;
        }
    }
}

/// Lower and upper end of a part, from the mover's reference point, m.
fn heights(part: &Part) -> [f64; 2] {
    let half = 0.5 * part.outline.length_m;
    [part.centre_m - half, part.centre_m + half]
}

fn overlap_of_parts((i, first): (usize, &Part), (j, second): (usize, &Part)) -> Option<ProblemFault> {
    let radii = |p: &Part| [p.outline.inner_radius_m, p.outline.outer_radius_m];
    shared(radii(first), radii(second))?;
    let heights_m = shared(heights(first), heights(second))?;
    Some(ProblemFault::PartsOverlap { first: named(i, &first.name), second: named(j, &second.name), heights_m })
}

/// A part that travels must clear every layer by radius alone; it may pass inside, between or around them.
fn clearance_faults(wall: &Wall, mover: &Mover, faults: &mut Vec<ProblemFault>) {
    for (i, part) in mover.parts.iter().enumerate() {
        let part_radii_m = [part.outline.inner_radius_m, part.outline.outer_radius_m];
        for (j, layer) in wall.layers.iter().enumerate() {
            let layer_radii_m = [layer.inner_radius_m, layer.outer_radius_m];
            let inside = part_radii_m[1] < layer_radii_m[0] * (1.0 - TOUCHING_RELATIVE);
            let around = part_radii_m[0] > layer_radii_m[1] * (1.0 + TOUCHING_RELATIVE);
            let finite = part_radii_m.into_iter().chain(layer_radii_m).all(f64::is_finite);
            if finite && !inside && !around {
                let (part, layer) = (named(i, &part.name), named(j, &layer.name));
                faults.push(ProblemFault::NoClearance { part, part_radii_m, layer, layer_radii_m });
            }
        }
    }
}

fn travel_faults(problem: &Problem, faults: &mut Vec<ProblemFault>) {
    let length_m = problem.wall.length_m();
    let mut numbers = Numbers { subject: Subject::Travel, of: "the travel".to_owned(), faults };
    match &problem.travel {
        Travel::Steady { velocity_m_per_s } => {
            numbers.check(Quantity::Velocity, *velocity_m_per_s);
            if let Some(length_m) = length_m {
                numbers.faults.push(ProblemFault::SteadyNeedsEndlessWall { length_m });
            }
        }
        Travel::Traverse(t) => {
            numbers.check(Quantity::Speed, t.speed_m_per_s);
            start_and_end(&mut numbers, t.from_m, t.to_m);
            if length_m.is_none() {
                numbers.faults.push(ProblemFault::TravelNeedsEnds { law: "traverse" });
            }
        }
        Travel::Free(_) => free_faults(problem, &mut numbers),
        Travel::Sine(sine) => {
            sine_faults(sine, &mut numbers);
            if length_m.is_none() {
                numbers.faults.push(ProblemFault::TravelNeedsEnds { law: "sine" });
            }
        }
        Travel::Table(table) => {
            table_faults(table, &mut numbers);
            if length_m.is_none() {
                numbers.faults.push(ProblemFault::TravelNeedsEnds { law: "table" });
            }
        }
        Travel::Alternating(law) => alternating_faults(problem, law, &mut numbers),
    }
}

fn sine_faults(sine: &Sine, numbers: &mut Numbers<'_>) {
    numbers.check(Quantity::Position, sine.centre_m);
    let amplitude = numbers.check(Quantity::Amplitude, sine.amplitude_m);
    let frequency = numbers.check(Quantity::Frequency, sine.frequency_hz);
    if amplitude && frequency {
        numbers.check(Quantity::Speed, sine.greatest_speed());
    }
    if let Some(found) = sine.cycles.filter(|c| !(1..=MOST_CYCLES).contains(c)) {
        numbers.faults.push(ProblemFault::Cycles { found });
    }
}

/// Speed between two points of a table above which they are a slip, m/s: no machine moves so fast.
const FASTEST_CHORD: f64 = 1.0e4;

fn table_faults(table: &MotionTable, numbers: &mut Numbers<'_>) {
    let points = table.time_s.len().min(table.position_m.len());
    if points < 3 || table.time_s.len() != table.position_m.len() {
        numbers.faults.push(ProblemFault::TableShort { points });
        return;
    }
    let (t, z) = (&table.time_s, &table.position_m);
    let finite = z.iter().all(|&z| numbers.check(Quantity::Position, z));
    for k in 1..points {
        let rises = t[k].is_finite() && t[k - 1].is_finite() && t[k] > t[k - 1];
        if !rises {
            numbers.faults.push(ProblemFault::TableTimes { point: k, time_s: t[k], before_s: t[k - 1] });
            return;
        }
        let speed = table.chord(k - 1).abs();
        if finite && speed > FASTEST_CHORD {
            numbers.faults.push(ProblemFault::TableJump {
                point: k,
                from_m: z[k - 1],
                to_m: z[k],
                from_s: t[k - 1],
                to_s: t[k],
                speed_m_per_s: speed,
            });
            return;
        }
    }
    if finite && z.iter().all(|p| (p - z[0]).abs() <= 0.0) {
        numbers.faults.push(ProblemFault::NoTravel { at_m: z[0] });
    }
}

fn alternating_faults(problem: &Problem, law: &Alternating, numbers: &mut Numbers<'_>) {
    for &frequency in &law.frequencies_hz {
        numbers.check(Quantity::Frequency, frequency);
    }
    numbers.check(Quantity::Current, law.current_ampere);
    numbers.check(Quantity::Position, law.position_m);
    numbers.check(Quantity::Resistance, law.winding_resistance_ohm);
    if law.frequencies_hz.is_empty() || law.frequencies_hz.windows(2).any(|w| w[0] >= w[1]) {
        numbers.faults.push(ProblemFault::Frequencies);
    }
    for (index, part) in problem.mover.parts.iter().enumerate() {
        if !matches!(part.source, Source::Coil { .. }) {
            numbers.faults.push(ProblemFault::NoCoil { part: named(index, &part.name) });
        }
    }
}

fn start_and_end(numbers: &mut Numbers<'_>, from_m: f64, to_m: f64) {
    let finite = numbers.check(Quantity::Position, from_m) && numbers.check(Quantity::Position, to_m);
    if finite && (from_m - to_m).abs() <= 0.0 {
        numbers.faults.push(ProblemFault::NoTravel { at_m: from_m });
    }
}

fn free_faults(problem: &Problem, numbers: &mut Numbers<'_>) {
    let Travel::Free(free) = &problem.travel else { return };
    start_and_end(numbers, free.release_m, free.until_m);
    for (quantity, value) in [
        (Quantity::Velocity, free.entry_velocity_m_per_s),
        (Quantity::Time, free.time_limit_s),
        (Quantity::Gravity, free.gravity_m_per_s2),
        (Quantity::Tilt, free.tilt_rad),
        (Quantity::Push, free.push_newton),
        (Quantity::Friction, free.friction_newton),
        (Quantity::FrictionCoefficient, free.friction_coefficient),
        (Quantity::AirDrag, free.air_drag_n_s2_per_m2),
        (Quantity::SpringRate, free.spring_rate_n_per_m),
        (Quantity::Position, free.spring_free_at_m),
        (Quantity::Position, free.gates_m[0]),
        (Quantity::Position, free.gates_m[1]),
    ] {
        numbers.check(quantity, value);
    }
    let [first, second] = free.gates_m;
    if (first - second).abs() <= 0.0 {
        numbers.faults.push(ProblemFault::GatesCoincide { at_m: first });
    }
    if problem.wall.length_m().is_none() {
        numbers.faults.push(ProblemFault::TravelNeedsEnds { law: "free" });
    }
    if problem.mover.mass_kg.is_none() {
        numbers.faults.push(ProblemFault::FreeNeedsMass);
    }
    if let Some(travel_m) = next_to_nothing(problem) {
        numbers.faults.push(ProblemFault::NoTime { time_limit_s: free.time_limit_s, travel_m });
    }
    if let Some(why) = out_of_reach(problem) {
        let (release_m, until_m) = (free.release_m, free.until_m);
        let (force_newton, short_joule) = (why.force_newton, why.short_joule);
        numbers.faults.push(ProblemFault::OutOfReach { release_m, until_m, force_newton, short_joule });
    }
}

fn plan_faults(problem: &Problem, faults: &mut Vec<ProblemFault>) {
    let accuracy = &problem.accuracy;
    let mut numbers = Numbers { subject: Subject::Accuracy, of: "the accuracy".to_owned(), faults };
    numbers.check(Quantity::TargetRelative, accuracy.target_relative);
    if let Some(found) = accuracy.levels.filter(|n| !(3..=5).contains(n)) {
        numbers.faults.push(ProblemFault::Levels { found });
    }
    if let Some(found) = accuracy.cells_across_wall.filter(|n| !(4..=200).contains(n) || n % 2 != 0) {
        numbers.faults.push(ProblemFault::CellsAcrossWall { found });
    }
    let mut numbers = Numbers { subject: Subject::Snapshots, of: "the plan of snapshots".to_owned(), faults };
    match &problem.snapshots {
        SnapshotPlan::None | SnapshotPlan::Automatic => {}
        SnapshotPlan::EveryTravel { step_m } => {
            numbers.check(Quantity::Length, *step_m);
        }
        SnapshotPlan::EveryTime { step_s } => {
            numbers.check(Quantity::Time, *step_s);
        }
        SnapshotPlan::Instants { times_s } => {
            let from_zero = times_s.first().is_none_or(|t| *t >= 0.0);
            let finite = times_s.iter().all(|t| t.is_finite());
            if !from_zero || !finite || times_s.windows(2).any(|w| w[0] >= w[1]) {
                numbers.faults.push(ProblemFault::Instants);
            }
        }
    }
}

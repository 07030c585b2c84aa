//! What can be wrong with a problem.

use std::fmt::{Display, Formatter};

use super::quantity::Quantity;

/// Which part of a problem a number belongs to.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Subject {
    /// The wall as a whole.
    Wall,
    /// A layer, by its index.
    Layer(usize),
    /// The mover as a whole.
    Mover,
    /// A part of the mover, by its index.
    Part(usize),
    /// The travel.
    Travel,
    /// The wanted accuracy.
    Accuracy,
    /// The plan of snapshots.
    Snapshots,
}

/// A layer or part by index and name.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Named {
    /// Index in its list.
    pub index: usize,
    /// The user's name of it.
    pub name: String,
}

impl Display for Named {
    fn fmt(&self, f: &mut Formatter<'_>) -> std::fmt::Result {
        write!(f, "'{}'", self.name)
    }
}

/// One reason why a [`super::Problem`] has no answer.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
#[non_exhaustive]
pub enum ProblemFault {
    /// A number that is not finite, or far outside what can be built.
    #[error("{of} has an impossible {quantity}: {value} {}", quantity.unit())]
    Impossible {
        /// Which part of the problem.
        subject: Subject,
        /// The same in words.
        of: String,
        /// Which number.
        quantity: Quantity,
        /// The value found, SI.
        value: f64,
    },
    /// Slots where their effect is not modelled.
    #[error("slots in {what} are not modelled yet")]
    SlotsUnmodelled {
        /// In what: a permeable wall, a rod, a wall with alternating current.
        what: &'static str,
    },
    /// Recoil permeabilities that were solved for other parts than the mover has.
    #[error("the mover's recoil permeabilities were solved for other parts: solve them again after changing parts")]
    StaleRecoil,
    /// A layer whose inner radius is not below its outer one.
    #[error("layer {layer} has no thickness: inner diameter {} and outer diameter {}",
        mm(2.0 * inner_radius_m), mm(2.0 * outer_radius_m))]
    LayerInsideOut {
        /// The layer.
        layer: Named,
        /// Its inner radius, m.
        inner_radius_m: f64,
        /// Its outer radius, m.
        outer_radius_m: f64,
    },
    /// A layer whose upper end is not above its lower one.
    #[error("layer {layer} has no length: it reaches from {} to {}", mm(*from_m), mm(*to_m))]
    LayerEmpty {
        /// The layer.
        layer: Named,
        /// Its lower end, m.
        from_m: f64,
        /// Its upper end, m.
        to_m: f64,
    },
    /// A layer that reaches beyond the wall's ends.
    #[error("layer {layer} reaches from {} to {}, beyond the wall's 0 to {}", mm(*from_m), mm(*to_m), mm(*length_m))]
    LayerBeyondWall {
        /// The layer.
        layer: Named,
        /// Its lower end, m.
        from_m: f64,
        /// Its upper end, m.
        to_m: f64,
        /// The wall's length, m.
        length_m: f64,
    },
    /// Two layers that fill the same space.
    #[error("layers {first} and {second} overlap: both fill diameters {} to {}{}",
        mm(2.0 * radii_m[0]), mm(2.0 * radii_m[1]), along(*heights_m))]
    LayersOverlap {
        /// The first layer.
        first: Named,
        /// The second layer.
        second: Named,
        /// Radii that both fill, m.
        radii_m: [f64; 2],
        /// Heights that both fill, m; `None` in an endless wall.
        heights_m: Option<[f64; 2]>,
    },
    /// A part whose inner radius is not below its outer one.
    #[error("part {part} has no thickness: inner diameter {} and outer diameter {}",
        mm(2.0 * inner_radius_m), mm(2.0 * outer_radius_m))]
    PartInsideOut {
        /// The part.
        part: Named,
        /// Its inner radius, m.
        inner_radius_m: f64,
        /// Its outer radius, m.
        outer_radius_m: f64,
    },
    /// Two parts of the mover that fill the same space.
    #[error("parts {first} and {second} overlap along {} of the axis, from {} to {}",
        mm(heights_m[1] - heights_m[0]), mm(heights_m[0]), mm(heights_m[1]))]
    PartsOverlap {
        /// The first part.
        first: Named,
        /// The second part.
        second: Named,
        /// Heights that both fill, from the mover's reference point, m.
        heights_m: [f64; 2],
    },
    /// A part without running clearance from a layer.
    #[error("part {part} (diameters {} to {}) has no running clearance from layer {layer} (diameters {} to {})",
        mm(2.0 * part_radii_m[0]), mm(2.0 * part_radii_m[1]), mm(2.0 * layer_radii_m[0]), mm(2.0 * layer_radii_m[1]))]
    NoClearance {
        /// The part.
        part: Named,
        /// Its radii over the coating, m.
        part_radii_m: [f64; 2],
        /// The layer.
        layer: Named,
        /// The layer's radii, m.
        layer_radii_m: [f64; 2],
    },
    /// A wall without layers.
    #[error("the wall has no layer")]
    NoLayer,
    /// A mover without a magnetic part.
    #[error("the mover has no magnet, dipole or coil")]
    NoPart,
    /// A wall in which nothing can happen.
    #[error("the wall neither conducts nor is it permeable: there is nothing to solve")]
    InertWall,
    /// A mover without a field.
    #[error("the mover has no field: every magnet, dipole and coil is of strength zero")]
    InertMover,
    /// Settled fields asked of a wall with ends.
    #[error("law 'steady' has settled fields, and a wall {} long has none", mm(*length_m))]
    SteadyNeedsEndlessWall {
        /// The wall's length, m.
        length_m: f64,
    },
    /// Travel through a wall that has no ends.
    #[error("law '{law}' travels from one end of the wall to the other, and an endless wall has no ends")]
    TravelNeedsEnds {
        /// The law.
        law: &'static str,
    },
    /// Motion under forces without a mass.
    #[error("law 'free' solves the equation of motion, which needs the mass of all that travels")]
    FreeNeedsMass,
    /// Alternating current asked of a part that is no coil.
    #[error("law 'alternating' drives coils, and part {part} is none")]
    NoCoil {
        /// The part.
        part: Named,
    },
    /// Frequencies that do not increase, or none.
    #[error("the frequencies of law 'alternating' do not increase")]
    Frequencies,
    /// No cycle, or more than can be followed.
    #[error("{found} cycles: a stroke is followed through 1 to {most}", most = super::MOST_CYCLES)]
    Cycles {
        /// The number found.
        found: u32,
    },
    /// A table of positions with too few of them.
    #[error("a motion from a table needs at least 3 points, each with time and position, and this one has {points}")]
    TableShort {
        /// Points found: the shorter of both lists.
        points: usize,
    },
    /// Instants of a table that do not increase, or are not finite.
    #[error("the times of the motion do not increase: point {} at {time_s} s follows {before_s} s", point + 1)]
    TableTimes {
        /// Index of the point.
        point: usize,
        /// Its time, s.
        time_s: f64,
        /// The time of the point before it, s.
        before_s: f64,
    },
    /// A jump in a table of positions.
    #[error("the motion jumps from {} to {} between {from_s} s and {to_s} s, at {speed_m_per_s:.3e} m/s", mm(*from_m), mm(*to_m))]
    TableJump {
        /// Index of the point jumped to.
        point: usize,
        /// Position before, m.
        from_m: f64,
        /// Position after, m.
        to_m: f64,
        /// Time before, s.
        from_s: f64,
        /// Time after, s.
        to_s: f64,
        /// Speed in between, m/s.
        speed_m_per_s: f64,
    },
    /// Travel that starts where it ends.
    #[error("the travel ends where it starts, at {}", mm(*at_m))]
    NoTravel {
        /// The position, m.
        at_m: f64,
    },
    /// Two gates at one place.
    #[error("both gates stand at {}", mm(*at_m))]
    GatesCoincide {
        /// The position, m.
        at_m: f64,
    },
    /// An end of travel that a free mover never gets to.
    #[error("a mover let go at {} never gets to {}: weight and push come to {force_newton:.4} N along the axis (up positive){}",
        mm(*release_m), mm(*until_m), short_of(*short_joule))]
    OutOfReach {
        /// Position at release, m.
        release_m: f64,
        /// End of travel, m.
        until_m: f64,
        /// Weight along the axis and push, upward positive, N.
        force_newton: f64,
        /// Energy that is missing on the way, J; `None` where it moves away from the start.
        short_joule: Option<f64>,
    },
    /// A time limit within which a free mover hardly moves.
    #[error(
        "within the time limit of {time_limit_s} s the mover travels {travel_m:.1e} m at most: there is nothing to tell of it"
    )]
    NoTime {
        /// The time limit, s.
        time_limit_s: f64,
        /// Greatest distance within it, m.
        travel_m: f64,
    },
    /// Fewer or more grid levels than extrapolation can use.
    #[error("{found} grid levels: extrapolation and its band need 3 to 5")]
    Levels {
        /// The number found.
        found: usize,
    },
    /// Cells across the wall that the levels cannot refine.
    #[error("{found} cells across the wall: the levels need an even number from 4 to 200")]
    CellsAcrossWall {
        /// The number found.
        found: usize,
    },
    /// Gauges asked of a law without a motion in time.
    #[error("gauges read a motion in time: under law '{law}' they are not modelled yet")]
    StationLaw {
        /// The law.
        law: &'static str,
    },
    /// A gauge that the mover runs through.
    #[error("station {station} stands in the way of part {part}")]
    StationInPath {
        /// The station.
        station: Named,
        /// The part that passes there.
        part: Named,
    },
    /// A current density asked where nothing conducts.
    #[error("station {station} reads a current density where no layer conducts")]
    StationNoConductor {
        /// The station.
        station: Named,
    },
    /// A search coil without turns, or around nothing.
    #[error("station {station} is a search coil without turns or without a diameter")]
    StationCoil {
        /// The station.
        station: Named,
    },
    /// A gauge too far from the wall to be read.
    #[error("station {station} at diameter {} and height {} is farther from wall and travel than ten of the wall's radii",
        mm(2.0 * radius_m), mm(*at_m))]
    StationFar {
        /// The station.
        station: Named,
        /// Its radius, m.
        radius_m: f64,
        /// Its height, m.
        at_m: f64,
    },
    /// Instants of snapshots that do not increase from 0.
    #[error("the instants of the snapshots do not increase from 0")]
    Instants,
}

impl ProblemFault {
    /// What would be legal, in the user's words.
    #[must_use]
    pub fn legal(&self) -> Option<String> {
        match self {
            Self::Impossible { quantity, .. } => {
                let range = quantity.sensible();
                let zero = if range.zero && !range.signed { "0, or " } else { "" };
                let low = if range.signed { -range.highest } else { range.lowest };
                Some(format!("sensible: {zero}{low} to {} {}", range.highest, quantity.unit()).trim_end().to_owned())
            }
            Self::NoClearance { layer_radii_m: [inner, outer], .. } => {
                let around = format!("around it, wider than {} inside", mm(2.0 * outer));
                Some(if *inner > 0.0 {
                    format!("a part runs in the bore, less than {} across, or {around}", mm(2.0 * inner))
                } else {
                    format!("layer and part share the axis: a part runs {around}")
                })
            }
            _ => None,
        }
    }

    /// What to do about it, in the user's words.
    #[must_use]
    pub fn mend(&self) -> Option<String> {
        let text = match self {
            Self::SteadyNeedsEndlessWall { .. } => {
                "use law = \"traverse\" to travel through it, or length = \"endless\" to leave its ends out"
            }
            Self::TravelNeedsEnds { .. } => "give the wall a length, or use law = \"steady\"",
            Self::FreeNeedsMass => "give [mover] its mass, as mass = \"0.42 kg\"",
            Self::LayersOverlap { .. } => {
                "layers may touch or leave gaps, never overlap: change a size, or 'from' and 'to'"
            }
            Self::LayerBeyondWall { .. } => "'from' and 'to' count from the wall's lower end",
            Self::PartsOverlap { .. } => "parts may touch: move one ('at'), or place them by 'stack'",
            Self::InertWall => "give a layer a conductivity",
            Self::SlotsUnmodelled { .. } => "take 'slots' out: the figures are then those of a wall without slots",
            Self::NoTime { .. } => "leave 'time_limit' out for 60 s, or give a longer one",
            Self::OutOfReach { .. } => {
                "put 'until' where it travels to, or change 'push', 'entry_velocity' or 'tilt_from_vertical'"
            }
            Self::TableTimes { .. } => "sort the points by time, and give each instant once",
            Self::TableJump { .. } => "check the units of time and position, and take stray points out",
            Self::NoCoil { .. } => "a steady field takes no part in it: leave magnets and dipoles out",
            Self::StationLaw { .. } => {
                "a 'traverse' through a long wall reads at a gauge in its middle what 'steady' would; or take the stations out"
            }
            Self::StationInPath { .. } => "put it out of the mover's way: into the running gap, the wall or outside",
            Self::StationNoConductor { .. } => "put it into a layer with a conductivity, or read the flux density",
            Self::StationFar { .. } => "put it nearer",
            _ => return None,
        };
        Some(text.to_owned())
    }
}

/// What keeps a mover from its end of travel.
fn short_of(short_joule: Option<f64>) -> String {
    short_joule.map_or_else(
        || ", and it starts the other way".to_owned(),
        |short| format!(", and its energy at release is {short:.3e} J too little"),
    )
}

/// A length in mm with as many digits as it takes.
fn mm(metres: f64) -> String {
    let rounded = (metres * 1e9).round() / 1e6;
    format!("{rounded} mm")
}

fn along(heights_m: Option<[f64; 2]>) -> String {
    heights_m.map(|[a, b]| format!(", from {} to {} along the axis", mm(a), mm(b))).unwrap_or_default()
}

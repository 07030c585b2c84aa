//! What a case answers to the rows of a table: by the field, or by a simplified model.

use lenzbore_io::case::ResolvedCase;
use lenzbore_io::table::{Abscissa, Table, TableFault};
use lenzbore_solver::fault::SolveFault;
use lenzbore_solver::ladder::{Assumptions, RingSum};
use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::outcome::{Outcome, Trace};
use lenzbore_solver::problem::{Extent, Problem, SnapshotPlan, Travel};
use lenzbore_solver::spread::{Nominal, Reading};
use lenzbore_solver::{drag_curve, solve};

use super::course::Course;
use crate::end::End;
use crate::memory;
use crate::solve::nominal;

/// Where the answer to a column comes from.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Ask {
    /// Settled fields at the row's speed.
    Settled,
    /// Along the travel.
    Course,
    /// A figure of the run.
    Run,
    /// A figure of the drag-speed curve.
    Curve,
}

const CURVE_FIGURES: [&str; 4] = ["damping_coefficient_zero_speed", "critical_speed", "drag_max", "lag_time"];
const SETTLED: [&str; 4] = ["drag", "damping_coefficient", "dissipated_power", "current_density_peak"];
/// Figures of a traverse that a column can give against its speed.
const PASSAGE: [&str; 3] = ["drag_peak", "impulse", "dissipated_energy"];
/// Speeds that see a greatest drag, where the case has no curve: shares of 1/(mu0 sigma w) would need the wall.
const ANY_SPEED: f64 = 1.0;

/// Where the answer to a column comes from, or why the case has none.
pub fn ask(table: &Table, name: &str, travel: &Travel, travel_given: bool) -> Result<Ask, TableFault> {
    let missing = |mend: &str| TableFault::NotOfTheCase { what: name.to_owned(), mend: mend.to_owned() };
    let moves = travel_given && !matches!(travel, Travel::Steady { .. } | Travel::Alternating(_));
    match table.abscissa {
        Some(Abscissa::Speed) if SETTLED.contains(&name) => Ok(Ask::Settled),
        Some(Abscissa::Speed) if PASSAGE.contains(&name) && matches!(travel, Travel::Traverse(_)) => Ok(Ask::Run),
        Some(Abscissa::Speed) => Err(missing(
            "against speed a table has drag, damping_coefficient, dissipated_power or current_density_peak, and with law = \"traverse\" drag_peak, impulse or dissipated_energy",
        )),
        Some(_) if !moves => Err(missing(
            "a table along time or place needs a [travel] with a motion in time, as law = \"free\" or \"traverse\"",
        )),
        Some(_) if ["drag", "time", "position", "displacement", "speed", "velocity"].contains(&name) => Ok(Ask::Course),
        Some(_) => {
            Err(missing("it is one figure of the whole run: give it in a table of its own, without time or place"))
        }
        None if CURVE_FIGURES.contains(&name) => Ok(Ask::Curve),
        None if travel_given => Ok(Ask::Run),
        None => Err(missing("the case has no [travel]")),
    }
}

/// What must be solved for some rows.
#[derive(Debug, Clone, Default, PartialEq)]
pub struct Need {
    /// Settled fields at these speeds, increasing.
    pub speeds: Vec<f64>,
    /// The travel.
    pub run: bool,
    /// The figures of the curve.
    pub curve: bool,
}

impl Need {
    pub fn of(table: &Table, rows: &[usize], asks: &[Ask]) -> Self {
        let mut speeds = Vec::new();
        if asks.contains(&Ask::Settled) {
            speeds = rows.iter().filter_map(|&k| table.rows[k].at).filter(|v| *v > 0.0).collect();
            speeds.sort_by(f64::total_cmp);
            speeds.dedup_by(|a, b| (*a - *b).abs() <= 0.0);
        }
        let run = asks.iter().any(|a| matches!(a, Ask::Course | Ask::Run));
        Self { speeds, run, curve: asks.contains(&Ask::Curve) }
    }
}

/// Settled fields at one speed.
#[derive(Debug, Clone, Copy)]
struct Settled {
    speed: f64,
    drag: Reading,
    power: f64,
    current: Option<Reading>,
}

/// What a case answered.
#[derive(Debug, Clone, Default)]
pub struct Solved {
    settled: Vec<Settled>,
    curve: Vec<Nominal>,
    run: Option<(Trace, Vec<Nominal>)>,
    /// Cautions of the solutions.
    pub cautions: Vec<String>,
}

/// The wall endless, the travel steady at `speed`.
pub fn endless(problem: &Problem, speed: f64) -> Result<Problem, End> {
    let mut endless = problem.clone();
    endless.wall.extent = Extent::Endless;
    for layer in &mut endless.wall.layers {
        (layer.from_m, layer.to_m) = (0.0, 0.0);
    }
    endless.travel = Travel::Steady { velocity_m_per_s: speed };
    endless.snapshots = SnapshotPlan::None;
    match endless.faults().first() {
        None => Ok(endless),
        Some(fault) => Err(End::Input(format!(
            "settled drag at a speed is that of an endless wall, and this wall's sections cannot be endless: {fault}"
        ))),
    }
}

/// The problem of the travel, without fields.
fn plain(problem: &Problem) -> Problem {
    Problem { snapshots: SnapshotPlan::None, warming: None, ..problem.clone() }
}

impl Solved {
    /// By the field.
    pub fn by_field(case: &ResolvedCase, need: &Need, monitor: &dyn Monitor) -> Result<Self, End> {
        Self::of_problem(&case.problem, case, need, monitor)
    }

    /// The same of a changed problem.
    pub fn of_problem(problem: &Problem, case: &ResolvedCase, need: &Need, monitor: &dyn Monitor) -> Result<Self, End> {
        let mut out = Self::default();
        if let Some(fastest) = need.speeds.last() {
            let problem = endless(problem, *fastest)?;
            let outcome = drag_curve(&problem, &need.speeds, monitor)?;
            out.settled = outcome.curve.iter().flat_map(|c| &c.points).map(Settled::of_point).collect();
            out.warn(&outcome);
        }
        if need.curve {
            let speeds = case.curve.as_ref().map(|c| c.speeds_m_per_s.clone()).filter(|s| !s.is_empty());
            let speeds = speeds.unwrap_or_else(|| vec![ANY_SPEED]);
            let problem = endless(problem, speeds.last().copied().unwrap_or(ANY_SPEED))?;
            let outcome = drag_curve(&problem, &speeds, monitor)?;
            out.curve = nominal(&outcome);
            if case.curve.is_some() {
                out.warn(&outcome);
            }
        }
        if need.run {
            let problem = plain(problem);
            memory::require(&problem, None)?;
            let outcome = solve(&problem, monitor)?;
            out.warn(&outcome);
            out.run = Some((outcome.trace.clone(), nominal(&outcome)));
        }
        Ok(out)
    }

    /// By a sum of independent rings.
    pub fn by_rings(
        problem: &Problem,
        assumptions: Assumptions,
        need: &Need,
        monitor: &dyn Monitor,
    ) -> Result<Self, SolveFault> {
        let mut out = Self::default();
        let exact = |value: f64| Reading { value, band: 0.0 };
        let figure = |name: &str, unit, value: f64| Nominal { name: name.to_owned(), unit, reading: exact(value) };
        if !need.speeds.is_empty() || need.curve {
            let Ok(endless) = endless(problem, ANY_SPEED) else {
                return Err(SolveFault::Unsuited("sections of a wall cannot be endless"));
            };
            let model = RingSum::new(&endless, assumptions)?;
            out.settled = need
                .speeds
                .iter()
                .map(|&speed| {
                    let drag = model.drag(speed);
                    Settled { speed, drag: exact(drag), power: drag * speed, current: None }
                })
                .collect();
            out.curve = vec![figure("damping_coefficient_zero_speed", "N s/m", model.damping_coefficient())];
        }
        if need.run {
            let model = RingSum::new(problem, assumptions)?;
            out.run = Some(if let Travel::Steady { velocity_m_per_s } = problem.travel {
                let (c, v) = (model.damping_coefficient(), velocity_m_per_s.abs());
                let figures = vec![
                    figure("drag", "N", c * v),
                    figure("damping_coefficient", "N s/m", c),
                    figure("dissipated_power", "W", c * v * v),
                ];
                (Trace::default(), figures)
            } else {
                let found = model.travel(problem, monitor)?;
                (found.trace, found.figures.iter().map(|f| figure(&f.name, f.unit, f.value)).collect())
            });
        }
        Ok(out)
    }

    fn warn(&mut self, outcome: &Outcome) {
        // That a table's speeds do not embrace the greatest drag is nothing to warn of.
        let texts = outcome.cautions.iter().map(|c| c.text.clone()).filter(|t| !t.contains("critical_speed"));
        self.cautions.extend(texts);
        if !outcome.accuracy.met {
            self.cautions.extend(outcome.accuracy.advice.clone());
        }
    }

    /// Our value for a row of the table.
    pub fn read(&self, table: &Table, row: usize, ordinate: usize, ask: Ask) -> Result<Reading, TableFault> {
        let name = table.ordinates[ordinate].name;
        let figure = |list: &[Nominal], mend: &str| {
            list.iter().find(|f| f.name == name).map(|f| f.reading).ok_or_else(|| {
                let had: Vec<&str> = list.iter().map(|f| f.name.as_str()).collect();
                let mend = if had.is_empty() { mend.to_owned() } else { format!("{mend}: {}", had.join(", ")) };
                TableFault::NotOfTheCase { what: name.to_owned(), mend }
            })
        };
        match ask {
            Ask::Settled => {
                let speed = table.rows[row].at.unwrap_or(0.0);
                self.settled_at(speed, name).ok_or_else(|| TableFault::NotOfTheCase {
                    what: format!("{name} at {speed} m/s"),
                    mend: "give speeds above 0".to_owned(),
                })
            }
            Ask::Curve => figure(
                &self.curve,
                "a [curve] whose speeds embrace the greatest drag gives all of its figures; there are",
            ),
            Ask::Run => {
                let list = self.run.as_ref().map_or(&[][..], |(_, f)| f.as_slice());
                figure(list, "this law of travel gives")
            }
            Ask::Course => self.on_course(table, row, name),
        }
    }

    fn settled_at(&self, speed: f64, name: &str) -> Option<Reading> {
        if speed <= 0.0 {
            // At rest there is no drag, exactly.
            return (name == "drag" || name == "dissipated_power").then_some(Reading { value: 0.0, band: 0.0 });
        }
        let s = self.settled.iter().find(|s| (s.speed - speed).abs() <= 1e-12 * speed)?;
        let scaled = |factor: f64| Reading { value: s.drag.value * factor, band: s.drag.band * factor };
        match name {
            "drag" => Some(s.drag),
            "damping_coefficient" => Some(scaled(1.0 / speed)),
            "dissipated_power" => Some(Reading { value: s.power, band: s.drag.band * speed }),
            "current_density_peak" => s.current,
            _ => None,
        }
    }

    fn on_course(&self, table: &Table, row: usize, name: &str) -> Result<Reading, TableFault> {
        let (trace, figures) = self.run.as_ref().ok_or_else(|| TableFault::NotOfTheCase {
            what: name.to_owned(),
            mend: "the travel was not solved".to_owned(),
        })?;
        let course = Course::new(trace, figures);
        let at = table.rows[row].at.unwrap_or(f64::NAN);
        let (abscissa, found, legal) = match table.abscissa {
            Some(Abscissa::Position) => {
                let (_, low, high) = course.positions();
                ("position", course.at_position(at), format!("the mover travels from {low:.6} m to {high:.6} m"))
            }
            Some(Abscissa::Displacement) => {
                let (start, low, high) = course.positions();
                let most = (high - start).max(start - low);
                let place = start + course.sense() * at;
                let found = if at >= 0.0 { course.at_position(place) } else { None };
                ("displacement", found, format!("the mover travels from 0 to {most:.6} m from its start"))
            }
            _ => {
                let (first, last) = course.times();
                ("time", course.at_time(at), format!("the run lasts from {first} s to {last:.6} s"))
            }
        };
        let unit = table.abscissa.map_or("", Abscissa::unit);
        let state = found.ok_or_else(|| TableFault::OutOfRange {
            header: abscissa.to_owned(),
            found: format!("{at} {unit}"),
            legal,
        })?;
        course.reading(&state, name).ok_or_else(|| TableFault::NotOfTheCase {
            what: name.to_owned(),
            mend: "along the travel there are drag, position, displacement, speed and velocity".to_owned(),
        })
    }
}

impl Settled {
    fn of_point(p: &lenzbore_solver::outcome::DragPoint) -> Self {
        Self {
            speed: p.speed_m_per_s,
            drag: Reading { value: p.drag_newton, band: p.band_newton },
            power: p.heat_watt,
            current: Some(Reading { value: p.current_density_peak, band: p.current_density_band }),
        }
    }
}
